/* Every result can be asked why: a formula, a source and at least one line. Run from the root of
 * the project. */
#include <setjmp.h>
#include <stdarg.h>
#include <stddef.h>
#include <stdint.h>

#include <cmocka.h>

#include <stdio.h>
#include <string.h>

#include "job/document.h"
#include "job/field.h"
#include "plan/result.h"
#include "plan/why.h"
#include "plan/why_table.h"

static void make_plan(const char *path, const char *change, const char *value, struct plan *plan)
{
    static char bytes[1 << 16];
    struct document *document;
    struct finding_list findings = {0};
    struct job job;
    FILE *file = fopen(path, "rb");
    size_t count;

    assert_non_null(file);
    count = fread(bytes, 1, sizeof bytes, file);
    fclose(file);
    assert_int_equal(document_parse(bytes, count, &document, &findings), STATUS_OK);
    if (change != NULL)
        assert_int_equal(document_set(document, change, value, &findings), STATUS_OK);
    job_init(&job);
    document_job(document, &job, &findings);
    assert_int_equal(plan_make(&job, NULL, NULL, plan), STATUS_OK);
    job_free(&job);
    document_free(document);
    finding_free(&findings);
}

static void ask(const struct plan *plan, const char *path)
{
    struct why why;
    struct text text = {0};

    if (why_make(plan, path, &why) != STATUS_OK)
        fail_msg("no derivation of %s", path);
    if (why.formula[0] == '\0' || why.source[0] == '\0' || why.line_count == 0)
        fail_msg("%s: formula '%s', source '%s', %zu lines", path, why.formula, why.source,
                 why.line_count);
    why_print(&text, &why);
    for (char *line = strtok(text.bytes, "\n"); line != NULL; line = strtok(NULL, "\n"))
        if (strlen(line) > 78 && strchr(line, '\xc2') == NULL)
            fail_msg("%s: a line of %zu bytes: %s", path, strlen(line), line);
    text_free(&text);
}

/* Every column of the first rows of a list, by number. */
static void ask_rows(const struct plan *plan, const struct list *list)
{
    const void *arrays[2];
    char path[128];

    if (list->rows(plan, arrays) > 0)
        ask(plan, list->name);
    for (size_t row = 0; row < list->rows(plan, arrays) && row < 5; row++)
        for (size_t i = 0; i < list->column_count; i++) {
            snprintf(path, sizeof path, "%s.%zu.%s", list->name, row + 1, list->columns[i].key);
            ask(plan, path);
        }
}

static void ask_all(const char *path, const char *change, const char *value)
{
    struct plan plan;
    char row[128];

    make_plan(path, change, value, &plan);
    for (size_t i = 0; i < result_count; i++)
        if (result_there(&result_table[i], &plan))
            ask(&plan, result_table[i].path);
    for (size_t i = 0; i < plan.check_count; i++) {
        snprintf(row, sizeof row, "checks.%s", plan.checks[i].id);
        ask(&plan, row);
    }
    for (size_t i = 0; i < plan.spacing.count; i++) {
        snprintf(row, sizeof row, "spacing.limits.%s", plan.spacing.rows[i].rule);
        ask(&plan, row);
    }
    for (size_t i = 0; i < list_count; i++)
        ask_rows(&plan, &list_table[i]);
    plan_free(&plan);
}

static void test_every_result(void **state)
{
    (void)state;
    ask_all("share/examples/e1-service-yard.slab", NULL, NULL);
    ask_all("share/examples/e1-service-yard.slab", "sealing.movement", "friction");
    ask_all("share/examples/e1-service-yard.slab", "sealant.kind", "compression-seal");
    ask_all("share/examples/e1-service-yard.slab", "slab.gradient", "10 K");
    ask_all("share/examples/e2-store-floor.slab", NULL, NULL);
    ask_all("share/examples/e3-two-lane-road.slab", NULL, NULL);
    ask_all("share/examples/e4-footway.slab", NULL, NULL);
    ask_all("share/examples/e5-turn-taper.slab", NULL, NULL);
}

/* The words behind "=" of the derivation of `path`. */
static void expect(const struct plan *plan, const char *path, const char *question,
                   const char *value)
{
    struct why why;

    if (why_make(plan, path, &why) != STATUS_OK)
        fail_msg("no derivation of %s", path);
    assert_string_equal(why.question, question);
    for (size_t i = 0; i < why.line_count; i++)
        if (strcmp(why.lines[i].step, "=") == 0)
            assert_string_equal(why.lines[i].value, value);
}

/* Rows go by name or by number; the numbers are those of the report of this example. */
static void test_rows_by_name(void **state)
{
    struct plan plan;
    struct why why;

    (void)state;
    make_plan("share/examples/e2-store-floor.slab", NULL, NULL, &plan);
    expect(&plan, "isolation.edge1.run_m", "where edge 1, pushed by: 80'-0\"", "80'-0\"");
    expect(&plan, "isolation.3.run_m", "where edge 1, pushed by: 80'-0\"", "80'-0\"");
    expect(&plan, "isolation.C1", "where C1, board: 3/8 in", "3/8 in");
    expect(&plan, "choice.hot-pour.fits", "kind hot-pour, fits: no", "no");
    plan_free(&plan);
    make_plan("share/examples/e4-footway.slab", NULL, NULL, &plan);
    expect(&plan, "isolation.J6", "where expansion joint J6, board: 13 mm", "13 mm");
    plan_free(&plan);
    make_plan("share/examples/e1-service-yard.slab", NULL, NULL, &plan);
    expect(&plan, "working.3.extension", "1 in 3, stretch: 41.3 %", "41.3 %");
    expect(&plan, "quantities.packages", "size 600 ml, packs: 61", "61");
    expect(&plan, "joints.J1.length_m", "joint J1, length: 24.0 m", "24.0 m");
    assert_int_equal(why_make(&plan, "checks.seal.extension.demand", &why), STATUS_OK);
    plan_free(&plan);
}

/* Every symbol of every formula names a result, a field or a cell of its row. */
static void check_symbols(const char *path, const struct why_row *row, const struct list *list)
{
    for (size_t i = 0; row != NULL && i < WHY_SYMBOLS && row->symbols[i].symbol != NULL; i++) {
        const char *at = row->symbols[i].path, *dot = strchr(at, '.');
        char section[32] = "";
        bool known = result_find(at) != NULL;
        assert_non_null(dot);
        snprintf(section, sizeof section, "%.*s", (int)(dot - at), at);
        known = known || field_id_of(section, dot + 1) < FIELD_COUNT;
        for (size_t c = 0; list != NULL && at == dot && c < list->column_count; c++)
            known = known || strcmp(list->columns[c].key, dot + 1) == 0;
        if (!known)
            fail_msg("%s: its formula asks for '%s', which there is not", path, at);
    }
}

static void test_symbols_exist(void **state)
{
    struct plan plan;
    char path[128];

    (void)state;
    make_plan("share/examples/e1-service-yard.slab", NULL, NULL, &plan);
    for (size_t i = 0; i < result_count; i++) {
        assert_non_null(why_row_find(&plan, result_table[i].path));
        check_symbols(result_table[i].path, why_row_find(&plan, result_table[i].path), NULL);
    }
    for (size_t i = 0; i < list_count; i++)
        for (size_t c = 0; c < list_table[i].column_count; c++) {
            const char *name = list_table[i].name;
            snprintf(path, sizeof path, "%s.%s", name, list_table[i].columns[c].key);
            if (strcmp(name, "checks") == 0 || strcmp(name, "spacing.limits") == 0)
                continue; /* formulas by row */
            assert_non_null(why_list_find(&plan, path));
            check_symbols(path, why_list_find(&plan, path), &list_table[i]);
        }
    for (size_t i = 0; i < plan.check_count; i++) {
        snprintf(path, sizeof path, "checks.%s", plan.checks[i].id);
        check_symbols(path, why_check_find(path), NULL);
    }
    for (size_t i = 0; i < plan.spacing.count; i++) {
        snprintf(path, sizeof path, "spacing.limits.%s", plan.spacing.rows[i].rule);
        assert_non_null(why_check_find(path));
        check_symbols(path, why_check_find(path), NULL);
    }
    plan_free(&plan);
}

static void test_no_such_result(void **state)
{
    static const char *const none[] = {"",
                                       "seal",
                                       "seal.",
                                       "seal.width",
                                       "joints.J99.open_m",
                                       "checks.nothing",
                                       "spacing.limits.nothing",
                                       "isolation.99",
                                       "isolation.1.nothing",
                                       "isolation.",
                                       "cracks.1",
                                       "workings.1",
                                       "......"};
    struct plan plan;
    struct why why;

    (void)state;
    make_plan("share/examples/e1-service-yard.slab", NULL, NULL, &plan);
    for (size_t i = 0; i < sizeof none / sizeof *none; i++)
        assert_int_equal(why_make(&plan, none[i], &why), STATUS_REFUSED);
    plan_free(&plan);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(test_every_result),
        cmocka_unit_test(test_rows_by_name),
        cmocka_unit_test(test_symbols_exist),
        cmocka_unit_test(test_no_such_result),
    };

    return cmocka_run_group_tests(tests, NULL, NULL);
}
