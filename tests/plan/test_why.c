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
#include "plan/result.h"
#include "plan/why.h"

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
    for (size_t i = 0; i < plan.layout.joint_count && i < 5; i++) {
        snprintf(row, sizeof row, "joints.%s.open_m", plan.layout.joints[i].id);
        ask(&plan, row);
    }
    if (plan.working_count > 0 && plan.seal.sealed)
        ask(&plan, "working.3.extension");
    ask(&plan, "sealing_table");
    if (plan.isolation_count > 0 && strncmp(plan.isolation[0].where, "C1", 2) == 0)
        ask(&plan, "isolation.C1");
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

static void test_no_such_result(void **state)
{
    static const char *const none[] = {"",
                                       "seal",
                                       "seal.",
                                       "seal.width",
                                       "joints.J99.open_m",
                                       "checks.nothing",
                                       "spacing.limits.nothing",
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
        cmocka_unit_test(test_no_such_result),
    };

    return cmocka_run_group_tests(tests, NULL, NULL);
}
