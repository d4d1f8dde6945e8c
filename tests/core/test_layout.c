/* The layout engine on the slabs of the scenarios and on random ones.
 * Expected counts: the scenarios' own hand counts (equal division; arithmetic beside each). */
#include "core/layout.h"
#include <math.h>
#include <setjmp.h>
#include <stdarg.h>
#include <stddef.h>
#include <stdint.h>
#include <stdlib.h>
#include <string.h>
/* cmocka.h needs the four headers above */
#include <cmocka.h>

static const double pi = 3.14159265358979323846;

struct slab {
    struct layout_corner corner[16], hole[4];
    struct layout_ring opening;
    struct layout_object object[4];
    struct layout_edge edge[8];
    struct layout_segment line;
    struct layout_drawn drawn[6];
    struct layout_input input;
};

/* cmocka's own compares in single precision. */
static void assert_near(double found, double expected, double tolerance)
{
    if (!(fabs(found - expected) <= tolerance))
        fail_msg("%.9g is not %.9g", found, expected);
}

static void slab_make(struct slab *s, size_t n, const double *xy, double limit)
{
    *s = (struct slab){0};
    for (size_t i = 0; i < n; i++)
        s->corner[i] = (struct layout_corner){.x = xy[2 * i], .y = xy[2 * i + 1]};
    s->input = (struct layout_input){.outline = {s->corner, n},
                                     .openings = &s->opening,
                                     .objects = s->object,
                                     .edges = s->edge,
                                     .pour_lines = &s->line,
                                     .drawn = s->drawn,
                                     .max_side_x = limit,
                                     .max_side_y = limit,
                                     .max_aspect = 1.5,
                                     .min_side = 0.6,
                                     .min_angle_deg = 60,
                                     .effort = 1};
}

static void slab_turn(struct slab *s, double degrees)
{
    const double c = cos(degrees * pi / 180), d = sin(degrees * pi / 180);
    for (size_t i = 0; i < s->input.outline.count; i++) {
        const double x = s->corner[i].x, y = s->corner[i].y;
        s->corner[i].x = x * c - y * d;
        s->corner[i].y = x * d + y * c;
    }
    for (size_t i = 0; i < s->input.object_count; i++) {
        const double x = s->object[i].x, y = s->object[i].y;
        s->object[i].x = x * c - y * d;
        s->object[i].y = x * d + y * c;
        s->object[i].angle_deg += degrees;
    }
}

static void slab_column(struct slab *s, const char *id, double x, double y, double size)
{
    s->object[s->input.object_count++] = (struct layout_object){
        .id = id, .kind = "column", .isolate = true, .x = x, .y = y, .w = size, .d = size};
}

static double joint_metres(const struct layout *l, enum layout_joint_kind kind)
{
    double sum = 0;
    for (size_t i = 0; i < l->joint_count; i++)
        if (l->joints[i].kind == kind)
            sum += hypot(l->joints[i].x2 - l->joints[i].x1, l->joints[i].y2 - l->joints[i].y1);
    return sum;
}

static double panel_area(const struct layout *l)
{
    double sum = 0;
    for (size_t i = 0; i < l->panel_count; i++)
        sum += l->panels[i].area;
    return sum;
}

static struct layout solved(const struct slab *s)
{
    struct layout l = {0};
    assert_int_equal(layout_solve(&s->input, &l), STATUS_OK);
    return l;
}

static const double yard[] = {0, 0, 36, 0, 36, 12, 24, 12, 24, 24, 0, 24};

/* 36 x 24 less 12 x 12 in squares of 4 m: 9 x 3 + 6 x 3 = 45; 5 + 3 cuts each way: 156 + 144 m. */
static void yard_in_four_metre_panels(void **state)
{
    (void)state;
    struct slab s;
    slab_make(&s, 6, yard, 4.0);
    struct layout l = solved(&s);
    assert_int_equal(l.panel_count, 45);
    assert_int_equal(l.violations, 0);
    assert_near(joint_metres(&l, LAYOUT_CONTRACTION), 300, 1e-6);
    assert_near(panel_area(&l), 720, 1e-6);
    assert_string_equal(l.joints[0].id, "J1");
    layout_free(&l);
    layout_free(&l);
}

/* 24/5 = 4.8 and 12/3 = 4.0: 5 x 3 + 3 x 3 + 5 x 3 = 39 panels, 132 + 144 = 276 m. */
static void yard_left_to_the_program(void **state)
{
    (void)state;
    struct slab s;
    slab_make(&s, 6, yard, 4.8);
    struct layout l = solved(&s);
    assert_int_equal(l.panel_count, 39);
    assert_int_equal(l.violations, 0);
    assert_near(joint_metres(&l, LAYOUT_CONTRACTION), 276, 1e-6);
    layout_free(&l);
}

/* 120 x 80 ft at 13 ft 4 in: 9 x 6 panels, 8 x 80 + 5 x 120 = 1240 ft of lines less what two boxes
 * take out (both diagonals of each), 400 ft of perimeter and the 8 box sides are isolation. */
static void floor_with_two_columns(void **state)
{
    (void)state;
    const double ft = 0.3048, box[] = {0, 0, 120 * ft, 0, 120 * ft, 80 * ft, 0, 80 * ft};
    struct slab s;
    slab_make(&s, 4, box, 13.0 * ft + 4 * 0.0254);
    slab_column(&s, "C1", 40 * ft, 40 * ft, ft);
    slab_column(&s, "C2", 80 * ft, 40 * ft, ft);
    for (size_t i = 0; i < 4; i++)
        s.edge[i] = (struct layout_edge){.side = i, .kind = LAYOUT_EDGE_FIXED, .isolate = true};
    s.input.edge_count = 4;
    s.input.us_units = true;
    struct layout l = solved(&s);
    assert_int_equal(l.panel_count, 54);
    assert_int_equal(l.violations, 0);
    assert_int_equal(l.box_count, 2);
    const double half = l.boxes[0].half;
    assert_near(joint_metres(&l, LAYOUT_CONTRACTION), 1240 * ft - 8 * half, 1e-6);
    assert_near(joint_metres(&l, LAYOUT_ISOLATION), 400 * ft + 8 * half * sqrt(2), 1e-6);
    assert_near(panel_area(&l), 9600 * ft * ft - 4 * half * half, 1e-6);
    layout_free(&l);
}

/* 1000/4.5 -> 223 panels in each of two lanes; 222 x 7 m across and 1000 m along. */
static void road_of_two_lanes(void **state)
{
    (void)state;
    const double road[] = {0, 0, 1000, 0, 1000, 7, 0, 7};
    struct slab s;
    slab_make(&s, 4, road, 4.5);
    s.line = (struct layout_segment){0, 3.5, 1000, 3.5};
    s.input.has_pours = true;
    s.input.pour_line_count = 1;
    struct layout l = solved(&s);
    assert_int_equal(l.panel_count, 446);
    assert_int_equal(l.violations, 0);
    assert_near(joint_metres(&l, LAYOUT_CONTRACTION), 1554, 1e-6);
    assert_near(joint_metres(&l, LAYOUT_CONSTRUCTION), 1000, 1e-6);
    layout_free(&l);
}

/* 60 m: 9 inner expansion joints 6 m apart, and 20 contraction joints between them. */
static void footway_with_expansion(void **state)
{
    (void)state;
    const double way[] = {0, 0, 60, 0, 60, 2, 0, 2};
    struct slab s;
    slab_make(&s, 4, way, 2.0);
    s.input.expansion_every = 6;
    struct layout l = solved(&s);
    size_t expansion = 0;
    for (size_t i = 0; i < l.joint_count; i++)
        expansion += l.joints[i].expansion;
    assert_int_equal(expansion, 9);
    assert_int_equal(l.joint_count, 29);
    assert_int_equal(l.panel_count, 30);
    assert_int_equal(l.violations, 0);
    layout_free(&l);
}

/* Taper 3.5 -> 0.6 m over 24.86 m. Equal panels of 4.143 m: bounding
 * ratios 1.18 1.37 1.64 2.02 2.64 3.82, four over 1.5; shorter ones: ten are enough. */
static void taper(void **state)
{
    (void)state;
    const double lane[] = {0, 0, 24.86, 0, 24.86, 0.6, 0, 3.5};
    const double ratio[] = {1.18, 1.37, 1.64, 2.02, 2.64, 3.82};
    struct slab s;
    slab_make(&s, 4, lane, 4.2);
    struct layout l = solved(&s);
    assert_int_equal(l.violations, 0);
    assert_int_equal(l.panel_count, 10);
    assert_near(panel_area(&l), 24.86 * (3.5 + 0.6) / 2, 1e-6);
    layout_free(&l);
    for (size_t i = 0; i < 5; i++) {
        const double x = 24.86 * (double)(i + 1) / 6;
        s.drawn[i] = (struct layout_drawn){.keep = true, .at = {x, 0, x, 3.5 - 2.9 * x / 24.86}};
    }
    s.input.drawn_count = 5;
    l = solved(&s);
    assert_int_equal(l.panel_count, 6);
    assert_int_equal(l.violations, 4);
    for (size_t i = 0; i < 6; i++) {
        assert_near(l.panels[i].aspect, ratio[i], 0.006);
        assert_int_equal(l.panels[i].reason_count, ratio[i] > 1.5);
    }
    layout_free(&l);
}

/* A turned slab has the same layout, turned: areas, counts and metres agree. */
static void turning_turns_the_layout(void **state)
{
    (void)state;
    for (double degrees = 7; degrees < 180; degrees += 31) {
        struct slab s;
        slab_make(&s, 6, yard, 4.0);
        slab_column(&s, "C1", 12, 8, 0.4);
        struct layout straight = solved(&s);
        slab_turn(&s, degrees);
        struct layout turned = solved(&s);
        assert_int_equal(turned.violations, straight.violations);
        assert_int_equal(turned.panel_count, straight.panel_count);
        assert_near(joint_metres(&turned, LAYOUT_CONTRACTION),
                    joint_metres(&straight, LAYOUT_CONTRACTION), 1e-3);
        assert_near(panel_area(&turned), panel_area(&straight), 1e-3);
        layout_free(&straight);
        layout_free(&turned);
    }
}

static double random_to(uint64_t *seed, double low, double high)
{
    *seed = *seed * 6364136223846793005u + 1442695040888963407u;
    return low + floor((high - low) * 10 * (double)(*seed >> 40) / (double)(1u << 24)) / 10;
}

/* Panels tile: areas add up to the slab less openings; a joint between two panels has both. */
static void random_slabs_are_tiled(void **state)
{
    (void)state;
    uint64_t seed = 11;
    for (int i = 0; i < 60; i++) {
        const double w = random_to(&seed, 10, 30), h = random_to(&seed, 10, 30);
        const double a = random_to(&seed, 5, w - 3), b = random_to(&seed, 5, h - 3);
        const double shape[] = {0, 0, w, 0, w, b, a, b, a, h, 0, h};
        struct slab s;
        slab_make(&s, 6, shape, random_to(&seed, 3, 6));
        const double hole[] = {1.5, 1.5, 3.2, 1.5, 3.2, 3.1, 1.5, 3.1};
        for (size_t k = 0; k < 4; k++)
            s.hole[k] = (struct layout_corner){.x = hole[2 * k], .y = hole[2 * k + 1]};
        s.opening = (struct layout_ring){s.hole, 4};
        s.input.opening_count = 1;
        struct layout l = solved(&s), again = solved(&s);
        assert_near(panel_area(&l), w * b + a * (h - b) - 1.7 * 1.6, 1e-6);
        for (size_t k = 0; k < l.joint_count; k++)
            assert_true(l.joints[k].left_panel >= 0 && l.joints[k].right_panel >= 0);
        assert_int_equal(l.joint_count, again.joint_count);
        assert_memory_equal(l.joints, again.joints, l.joint_count * sizeof *l.joints);
        layout_free(&l);
        layout_free(&again);
    }
}

static void impossible_slabs_are_refused(void **state)
{
    (void)state;
    const double bow[] = {0, 0, 10, 10, 10, 0, 0, 10};
    struct slab s;
    struct layout l = {.violations = 7};
    slab_make(&s, 4, bow, 4);
    assert_int_equal(layout_solve(&s.input, &l), STATUS_REFUSED);
    s.input.outline.count = 2;
    assert_int_equal(layout_solve(&s.input, &l), STATUS_REFUSED);
    assert_int_equal(l.violations, 7);
}

static void huge_slabs_are_said_not_tried(void **state)
{
    (void)state;
    const double plain[] = {0, 0, 1e9, 0, 1e9, 1e9, 0, 1e9};
    struct slab s;
    slab_make(&s, 4, plain, 4);
    struct layout l = solved(&s);
    assert_int_equal(l.panel_count, 0);
    assert_int_equal(l.violations, 1);
    assert_string_equal(l.reasons[0].code, "EFFORT_LIMIT");
    layout_free(&l);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(yard_in_four_metre_panels),
        cmocka_unit_test(yard_left_to_the_program),
        cmocka_unit_test(floor_with_two_columns),
        cmocka_unit_test(road_of_two_lanes),
        cmocka_unit_test(footway_with_expansion),
        cmocka_unit_test(taper),
        cmocka_unit_test(turning_turns_the_layout),
        cmocka_unit_test(random_slabs_are_tiled),
        cmocka_unit_test(impossible_slabs_are_refused),
        cmocka_unit_test(huge_slabs_are_said_not_tried),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
