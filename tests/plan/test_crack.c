/* Cracks on a yard of 4 m panels: lengths and distances by hand. */
#include "plan/plan_help.h"

#include <math.h>

#define YARD                                                                                       \
    "format = 1\n[slab]\nthickness = 200 mm\n[rules]\nspacing = 4 m\n[outline]\npoint = 0, 0 m\n"  \
    "point = 12, 0 m\npoint = 12, 12 m\npoint = 0, 12 m\n"

static bool near(double a, double b, double tolerance)
{
    return fabs(a - b) <= tolerance;
}

/* From (8.3, 0) by (8.5, 4) to (8.2, 9): mean distance from the line at 8 m
 * (0.40 x 4.005 + 0.35 x 5.009)/9.014 = 0.372 m, below a quarter of 4 m. */
static void test_beside_a_joint(void **state)
{
    struct plan plan;

    (void)state;
    make_plan(YARD "[crack]\npoint = 8.3, 0 m\npoint = 8.5, 4 m\npoint = 8.2, 9 m\n", &plan);
    assert_int_equal(plan.crack_count, 1);
    assert_true(near(plan.cracks[0].length_m, hypot(0.2, 4) + hypot(0.3, 5), 1e-9));
    assert_int_equal(plan.cracks[0].panel_count, 3);
    assert_string_equal(plan.cracks[0].beside, "J2");
    assert_true(near(plan.cracks[0].distance_m, 0.37222, 1e-4));
    plan_free(&plan);
}

/* Across a panel: no joint does it replace; off the slab: said. */
static void test_across_and_off(void **state)
{
    struct plan plan;

    (void)state;
    make_plan(YARD "[crack]\npoint = 1, 1 m\npoint = 3, 3 m\n[crack]\npoint = 20, 1 m\npoint = 21, "
                   "3 m\n",
              &plan);
    assert_int_equal(plan.crack_count, 2);
    assert_int_equal(plan.cracks[0].panel_count, 1);
    assert_int_equal(plan.cracks[0].joint, -1);
    assert_true(near(plan.cracks[0].panels[0].length_m, sqrt(8), 1e-9));
    assert_int_equal(plan.cracks[1].panel_count, 0);
    assert_int_equal(plan.findings.items[plan.findings.count - 1].severity, SEVERITY_WARNING);
    plan_free(&plan);
}

int main(void)
{
    const struct CMUnitTest tests[] = {cmocka_unit_test(test_beside_a_joint),
                                       cmocka_unit_test(test_across_and_off)};

    return cmocka_run_group_tests(tests, NULL, NULL);
}
