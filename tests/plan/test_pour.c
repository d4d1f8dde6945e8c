/* Pours: a road of three strips of 3.5 m, 60 m long, cut in two by a day's end at 30 m; by hand six
 * pours of 30 x 3.5 = 105 m2, 26.25 m3 at 250 mm, the middle strip placed second. */
#include "plan/plan_help.h"

static void test_strips(void **state)
{
    struct plan plan;
    double area = 0;

    (void)state;
    make_plan(
        F "[slab]\nthickness = 250 mm\n[rules]\nspacing = 5 m\n[outline]\npoint = 0, 0 m\npoint = "
          "60, 0 m\npoint = 60, 10.5 m\npoint = 0, 10.5 m\n[pours]\nline = 0, 3.5, 60, 3.5 m\nline "
          "= 0, 7, 60, 7 m\nline = 30, 0, 30, 10.5 m\n",
        &plan);
    assert_int_equal(plan.pour_count, 6);
    for (size_t i = 0; i < plan.pour_count; i++) {
        const struct plan_pour *pour = &plan.pours[i];
        assert_true(fabs(pour->area_m2 - 105) < 1e-6);
        assert_true(fabs(pour->volume_m3 - 26.25) < 1e-6);
        assert_int_equal(pour->turn, pour->y > 3.5 && pour->y < 7 ? 2 : 1);
        area += pour->area_m2;
    }
    assert_true(fabs(area - plan.layout.area) < 1e-6);
    plan_free(&plan);
}

/* Nothing parts the slab: one pour; a wall joint all across parts it as well. */
static void test_one(void **state)
{
    struct plan plan;

    (void)state;
    make_plan(F "[rules]\nspacing = 4 m\n[outline]\npoint = 0, 0 m\npoint = 12, 0 m\npoint = 12, 8 "
                "m\npoint = 0, 8 m\n",
              &plan);
    assert_int_equal(plan.pour_count, 1);
    assert_int_equal(plan.pours[0].panels, plan.layout.panel_count);
    plan_free(&plan);
    make_plan(
        F "[rules]\nspacing = 4 m\nexpansion-every = 6 m\n[outline]\npoint = 0, 0 m\npoint = 12, 0 "
          "m\npoint = 12, 8 m\npoint = 0, 8 m\n",
        &plan);
    assert_true(plan.pour_count >= 2);
    plan_free(&plan);
}

int main(void)
{
    const struct CMUnitTest tests[] = {cmocka_unit_test(test_strips), cmocka_unit_test(test_one)};

    return cmocka_run_group_tests(tests, NULL, NULL);
}
