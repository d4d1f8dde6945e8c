/* Tape readings of the joint lines: positions by hand on rectangles and on a line across a box. */
#include "export/export_help.h"

#include "export/lines.h"

static bool near(double a, double b)
{
    return a - b < 1e-6 && b - a < 1e-6;
}

static void test_yard(void **state)
{
    struct plan plan;
    struct joint_line line;
    struct text words = {0};

    (void)state;
    sample_plan(&samples[0], -1, &plan); /* 4.0 m both ways, L 36 x 24 m */
    assert_int_equal(joint_line_last(&plan.layout), 13);
    assert_false(joint_line_find(&plan.layout, 0, &line));
    assert_false(joint_line_find(&plan.layout, 14, &line));
    for (int number = 1; number <= 13; number++) {
        bool across = number <= 8;
        assert_true(joint_line_find(&plan.layout, number, &line));
        assert_true(near(across ? line.x1 : line.y1, across ? 4.0 * number : 4.0 * (number - 8)));
    }
    assert_true(joint_line_find(&plan.layout, 6, &line)); /* from the inside corner to the south */
    assert_true(near(line.length_m, 12));
    joint_line_describe(&words, &plan, &line);
    assert_string_equal(text_string(&words), "cut 6, 12.0 m; tape from the west 24.000 m at both "
                                             "ends.");
    text_free(&words);
    plan_free(&plan);
}

/* 40 ft and 80 ft: the column lines; each line loses the two half diagonals of its boxes. */
static void test_floor(void **state)
{
    struct plan plan;
    struct joint_line line;
    struct text words = {0};
    double half;

    (void)state;
    sample_plan(&samples[1], -1, &plan);
    half = plan.layout.boxes[0].half;
    assert_true(joint_line_find(&plan.layout, 3, &line));
    assert_true(near(line.x1, 40 * 0.3048));
    assert_true(near(line.length_m, 80 * 0.3048 - 2 * half));
    joint_lines_print(&words, &plan, 4);
    assert_non_null(strstr(text_string(&words), "40'-0\""));
    assert_non_null(strstr(text_string(&words), "+ 9 more"));
    text_free(&words);
    plan_free(&plan);
}

int main(void)
{
    const struct CMUnitTest tests[] = {cmocka_unit_test(test_yard), cmocka_unit_test(test_floor)};

    return cmocka_run_group_tests(tests, NULL, NULL);
}
