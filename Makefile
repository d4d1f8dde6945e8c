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

.PHONY: all clean
clean:
	rm -rf $(B)
-include $(shell find $(B) -name '*.d' 2>/dev/null)
