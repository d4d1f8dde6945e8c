# slabgap: make demo, make test; `make help` lists the rest.
.POSIX:
.SUFFIXES:
MAKEFLAGS += --no-builtin-rules
SHELL = /bin/bash
B = build
VERSION = 0.1.0
CC = gcc
AWK = awk
PREFIX = /usr/local
DESTDIR =
OPT = -O2 -g
SAN =
WARN = -Wall -Wextra -Wpedantic -Wshadow -Wconversion -Wstrict-prototypes
HARDEN = -D_FORTIFY_SOURCE=2 -fstack-protector-strong -fPIE
CFLAGS = -std=c17 -D_GNU_SOURCE -DSLABGAP_VERSION='"$(VERSION)"' $(WARN) $(WERROR) $(OPT) $(HARDEN) -ffp-contract=off -fno-math-errno $(SAN) -Isrc -I$(B)/gen
LDFLAGS = -pie -Wl,-z,relro,-z,now $(SAN)
LIBS = -lm
CURSES = $(shell pkg-config --libs ncursesw 2>/dev/null || echo -lncursesw -ltinfo)

LAYERS = base core job plan export file ui cmd
sources = $(sort $(wildcard src/$(1)/*.c))
objects = $(patsubst src/%.c,$(B)/obj/%.o,$(call sources,$(1)))
LIBDIR = $(B)/lib

all: $(B)/slabgap

$(B)/gen/table_data.c: src/job/tables.awk $(wildcard share/tables/*.txt)
	@mkdir -p $(@D)
	$(AWK) -f src/job/tables.awk $(sort $(wildcard share/tables/*.txt)) > $@.tmp && mv $@.tmp $@

$(B)/obj/%.o: src/%.c
	@mkdir -p $(@D)
	$(CC) $(CFLAGS) -MMD -MP -c -o $@ $<

$(B)/obj/gen/table_data.o: $(B)/gen/table_data.c
	@mkdir -p $(@D)
	$(CC) $(CFLAGS) -c -o $@ $<

define layer_library
$(LIBDIR)/$(1).a: $$(call objects,$(1)) $(if $(filter job,$(1)),$(B)/obj/gen/table_data.o)
	@mkdir -p $$(@D)
	@rm -f $$@
	ar rcs $$@ $$^
endef
$(foreach l,$(LAYERS),$(eval $(call layer_library,$(l))))

# link order: a layer before what it includes
libs_cmd = cmd file export plan job core base
libs_ui = ui file export plan job core base
libs_term = $(libs_ui)
libs_file = file export plan job core base
libs_export = export plan job core base
libs_plan = plan job core base
libs_job = job core base
libs_core = core base
libs_base = base
archives = $(patsubst %,$(LIBDIR)/%.a,$(1))

$(B)/slabgap: $(B)/obj/main.o $(call archives,cmd ui file export plan job core base)
	$(CC) $(CFLAGS) $(LDFLAGS) -o $@ $^ $(CURSES) $(LIBS)

# ---- tests: tests/LAYER/test_NAME.c -> build/tests/LAYER/test_NAME, linked with its layer and those below
TEST_SOURCES = $(sort $(wildcard tests/*/test_*.c))
TESTS = $(patsubst tests/%.c,$(B)/tests/%,$(TEST_SOURCES))
.SECONDEXPANSION:
$(B)/tests/%: tests/%.c $$(call archives,$$(libs_$$(firstword $$(subst /, ,$$*))))
	@mkdir -p $(@D)
	$(CC) $(CFLAGS) -Itests -MMD -MP $(LDFLAGS) -o $@ $< $(filter %.a,$^) -lcmocka $(TEST_LIBS) $(LIBS)

# the form's tests need curses; the terminal's a private terminal type and libvterm
$(B)/tests/ui/%: TEST_LIBS = $(CURSES)
$(B)/tests/term/%: TEST_LIBS = $(CURSES) -lvterm -lutil
$(B)/tests/term/%: CFLAGS += -DTERMINFO_FOLDER='"$(abspath $(B))/terminfo"'
$(B)/tests/term/test_term: $(B)/terminfo/stamp
$(B)/terminfo/stamp: tests/term/slabgap-term.ti
	@mkdir -p $(@D)
	tic -x -o $(@D) $< && touch $@

$(B)/tests/export/%: TEST_LIBS = -ljansson
$(B)/tests/core/test_layout_geos $(B)/tests/core/test_layout_crowd $(B)/tests/core/long_layout: TEST_LIBS = -lgeos_c
$(B)/tests/core/test_sun_set: TEST_LIBS = -lnova
$(B)/tests/cmd/%: CFLAGS += -DSLABGAP_BINARY='"$(abspath $(B))/slabgap"'
$(filter $(B)/tests/cmd/%,$(TESTS)): $(B)/slabgap
WRAP = -Wl,--wrap=malloc,--wrap=calloc,--wrap=realloc,--wrap=strdup
$(filter %/test_memory,$(TESTS)): LDFLAGS += $(WRAP)

# ---- set-up: packages of a fresh Debian by name; a stamp, so a second run asks nothing
PACKAGES_DEMO = libncurses-dev pkgconf
PACKAGES_TEST = $(PACKAGES_DEMO) libcmocka-dev libvterm-dev libjansson-dev libgeos-dev libnova-dev ncurses-bin ncurses-base units
PACKAGES_CHECK = $(PACKAGES_TEST) clang libclang-rt-14-dev clang-format
build/packages-%:
	@.ci/packages $(PACKAGES_$(shell echo $* | tr a-z A-Z))
	@mkdir -p build && touch $@

JOBS = $(shell nproc 2>/dev/null || echo 2)
EXAMPLE = share/examples/e1-service-yard.slab

demo: build/packages-demo
	@$(MAKE) --no-print-directory -j$(JOBS) all
	@$(B)/slabgap report $(EXAMPLE) --only answers
	@echo && $(B)/slabgap draw $(EXAMPLE) --size 78x32
	@echo && echo "Start the form with: $(B)/slabgap $(EXAMPLE)"

test: build/packages-test
	@$(MAKE) --no-print-directory -j$(JOBS) $(B)/slabgap $(TESTS)
	@tests/run $(TESTS)

# writes the golden screens, reports and drawings anew: read the change before you commit it
golden: $(B)/tests/ui/test_ui $(B)/tests/export/test_golden
	SLABGAP_REWRITE_GOLDEN=1 $(B)/tests/ui/test_ui >/dev/null 2>&1
	SLABGAP_REWRITE_GOLDEN=1 $(B)/tests/export/test_golden >/dev/null 2>&1

LONG_TESTS = $(patsubst tests/%.c,$(B)/tests/%,$(sort $(wildcard tests/*/long_*.c)))
test-long: build/packages-test
	@$(MAKE) --no-print-directory -j$(JOBS) $(B)/slabgap $(LONG_TESTS)
	@tests/run $(LONG_TESTS)

# ---- checks: warnings as errors with both compilers, sanitizers, layers, purity, format, fuzz
check: build/packages-check
	$(MAKE) --no-print-directory -j$(JOBS) B=build/gcc CC=gcc WERROR=-Werror everything
	$(MAKE) --no-print-directory -j$(JOBS) B=build/clang CC=clang WERROR=-Werror everything
	.ci/layers build/gcc
	.ci/format
everything: $(B)/slabgap $(TESTS) $(LONG_TESTS) $(B)/tests/bench/bench
sanitize: build/packages-test
	$(MAKE) --no-print-directory -j$(JOBS) B=build/sanitize OPT='-O1 -g' HARDEN=-fno-omit-frame-pointer \
	    SAN='-fsanitize=address,undefined -fno-sanitize-recover=undefined' test

FUZZERS = $(patsubst tests/fuzz/%.c,build/fuzz/%,$(sort $(wildcard tests/fuzz/fuzz_*.c)))
FUZZ_SECONDS = 20
fuzz: build/packages-check
	$(MAKE) --no-print-directory -j$(JOBS) B=build/fuzz CC=clang OPT='-O1 -g' HARDEN= \
	    SAN='-fsanitize=address,undefined,fuzzer-no-link' $(FUZZERS)
	for f in $(FUZZERS); do mkdir -p $$f.corpus && \
	    $$f -max_total_time=$(FUZZ_SECONDS) -timeout=10 -artifact_prefix=$$f- -print_final_stats=1 $$f.corpus || exit 1; done
build/fuzz/fuzz_%: tests/fuzz/fuzz_%.c $(call archives,$(libs_ui))
	$(CC) $(CFLAGS) -fsanitize=fuzzer $(LDFLAGS) -Itests -o $@ $< $(filter %.a,$^) $(CURSES) $(LIBS)

bench: build/packages-test
	@$(MAKE) --no-print-directory -j$(JOBS) $(B)/slabgap $(B)/tests/bench/bench
	@$(B)/tests/bench/bench
$(B)/tests/bench/%: TEST_LIBS = -lgeos_c -lutil
$(B)/tests/bench/%: CFLAGS += -DSLABGAP_BINARY='"$(abspath $(B))/slabgap"'
libs_bench = export plan job core base

install: all
	install -d $(DESTDIR)$(PREFIX)/bin $(DESTDIR)$(PREFIX)/share/slabgap/examples $(DESTDIR)$(PREFIX)/share/slabgap/climate $(DESTDIR)$(PREFIX)/share/doc/slabgap
	install -m 755 $(B)/slabgap $(DESTDIR)$(PREFIX)/bin/slabgap
	install -m 644 share/examples/*.slab $(DESTDIR)$(PREFIX)/share/slabgap/examples
	install -m 644 share/climate/*.csv $(DESTDIR)$(PREFIX)/share/slabgap/climate
	install -m 644 README.md LICENSE docs/*.md $(DESTDIR)$(PREFIX)/share/doc/slabgap
uninstall:
	rm -rf $(DESTDIR)$(PREFIX)/bin/slabgap $(DESTDIR)$(PREFIX)/share/slabgap $(DESTDIR)$(PREFIX)/share/doc/slabgap

format:
	clang-format -i $$(git ls-files "src/*.[ch]" "tests/*.[ch]")

help:
	@echo "make demo       set up, build, show the plan of an example"
	@echo "make test       set up, build, run the tests"
	@echo "make            build $(B)/slabgap"
	@echo "make golden     writes golden screens and reports anew"
	@echo "make check      gcc and clang with warnings as errors, layers, purity, format"
	@echo "make sanitize   the tests with address and undefined-behaviour sanitizers"
	@echo "make test-long  tests that take minutes;  make fuzz FUZZ_SECONDS=20;  make bench"
	@echo "make format     formats the sources"
	@echo "make install PREFIX=/usr/local DESTDIR=;  make uninstall;  make clean"

clean:
	rm -rf build
.PHONY: all demo test golden test-long check everything sanitize fuzz bench install uninstall format help clean
-include $(shell find $(B) -name '*.d' 2>/dev/null)
