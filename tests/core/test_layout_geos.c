/* Invented slabs of tests/layouts against a checker of their own (layout_checker.h), with GEOS
 * (libgeos, reentrant C API) as the oracle for areas, covering and smallest rectangles. */
#include "layout_file.h"
#include <dirent.h>
#include <setjmp.h>
#include <stdarg.h>
#include <stddef.h>
#include <stdint.h>
/* cmocka.h needs the headers above */
#include "layout_checker.h"
#include <cmocka.h>

static const char *const folder = "tests/layouts";

static int by_name(const void *a, const void *b)
{
    return strcmp(a, b);
}

static size_t list_files(char names[][64], size_t most)
{
    DIR *dir = opendir(folder);
    size_t n = 0;
    assert_non_null(dir);
    for (struct dirent *e = readdir(dir); e && n < most; e = readdir(dir))
        if (strstr(e->d_name, ".txt") && strlen(e->d_name) < 60)
            strcpy(names[n++], e->d_name);
    closedir(dir);
    qsort(names, n, sizeof *names, by_name);
    return n;
}

static struct layout_file *read_file(const char *name)
{
    char path[512];
    snprintf(path, sizeof path, "%s/%.60s", folder, name);
    struct layout_file *f = layout_file_read(path);
    assert_non_null(f);
    return f;
}

/* Every slab keeps every rule by both checks, or breaks just as many as its file says. */
static void every_slab_keeps_the_rules(void **state)
{
    (void)state;
    char names[128][64];
    const size_t n = list_files(names, 128);
    size_t clean = 0, bad = 0;
    assert_true(n >= 40);
    struct checker c = {.geos = GEOS_init_r()};
    for (size_t i = 0; i < n; i++) {
        struct layout_file *f = read_file(names[i]);
        struct layout l = {0};
        assert_int_equal(layout_solve(&f->input, &l), STATUS_OK);
        c.in = &f->input;
        c.out = &l;
        const int faults = checker_run(&c, l.panel_count > 2000);
        if (l.violations != f->expect || (faults > 0) != (f->expect > 0)) {
            print_message("%s: %d of its own, %d by the checker (%s), expected %d\n", names[i],
                          l.violations, faults, c.first, f->expect);
            bad++;
        }
        clean += l.violations == 0 && faults == 0;
        layout_free(&l);
        free(f);
    }
    GEOS_finish_r(c.geos);
    assert_int_equal(bad, 0);
    assert_true(clean >= n - 2);
}

static void a_reason_names_rule_cause_and_remedy(const struct layout_reason *r)
{
    assert_true(strlen(r->code) > 0 && strlen(r->rule) > 0);
    assert_true(strlen(r->cause) > 10 && strlen(r->remedy) > 10);
}

/* A slab that cannot keep the rules: 0.9 m between a wall's corner and a column line. */
static void what_gives_is_said(void **state)
{
    (void)state;
    const struct layout_corner corner[] = {
        {.x = 0, .y = 0}, {.x = 30, .y = 0}, {.x = 30, .y = 0.9}, {.x = 0, .y = 0.5}};
    const struct layout_input in = {.outline = {corner, 4},
                                    .max_side_x = 4,
                                    .max_side_y = 4,
                                    .max_aspect = 1.5,
                                    .min_side = 0.6,
                                    .min_angle_deg = 60,
                                    .effort = 1};
    struct layout l = {0};
    size_t reasons = 0;
    assert_int_equal(layout_solve(&in, &l), STATUS_OK);
    assert_true(l.violations > 0);
    for (size_t i = 0; i < l.reason_count; i++)
        a_reason_names_rule_cause_and_remedy(&l.reasons[i]);
    for (size_t i = 0; i < l.panel_count; i++)
        for (size_t k = 0; k < l.panels[i].reason_count; k++, reasons++)
            a_reason_names_rule_cause_and_remedy(&l.panels[i].reasons[k]);
    assert_int_equal(reasons + l.reason_count, l.violations);
    layout_free(&l);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(every_slab_keeps_the_rules),
        cmocka_unit_test(what_gives_is_said),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
