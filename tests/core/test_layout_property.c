/* What must hold for every slab: the same answer twice, a turned or mirrored slab keeps the rules
 * as well, and small rectangles cost no more than 3 % over the best of all chord layouts on a
 * 0.5 m raster (exhaustive search, its own arithmetic). */
#include "layout_file.h"
#include <dirent.h>
#include <math.h>
#include <setjmp.h>
#include <stdarg.h>
#include <stddef.h>
#include <stdint.h>
/* cmocka.h needs the headers above */
#include <cmocka.h>

static double metres_of(const struct layout *l)
{
    double sum = 0;
    for (size_t i = 0; i < l->joint_count; i++)
        if (l->joints[i].kind != LAYOUT_ISOLATION)
            sum += hypot(l->joints[i].x2 - l->joints[i].x1, l->joints[i].y2 - l->joints[i].y1);
    return sum;
}

/* A quarter turn (mirror = false) or the mirror image at x = y. */
static void change_point(double *x, double *y, bool mirror)
{
    const double t = *x;
    *x = mirror ? *y : -*y;
    *y = t;
}

static void change(struct layout_file *f, bool mirror)
{
    for (size_t i = 0; i < 256; i++) {
        change_point(&f->corners[i].x, &f->corners[i].y, mirror);
        change_point(&f->corners[i].cx, &f->corners[i].cy, mirror);
        f->corners[i].left ^= mirror;
    }
    for (size_t i = 0; i < f->input.object_count; i++) {
        struct layout_object *o = &f->objects[i];
        change_point(&o->x, &o->y, mirror);
        o->angle_deg = mirror ? 90 - o->angle_deg : o->angle_deg + 90;
    }
    for (size_t i = 0; i < f->input.pour_line_count; i++) {
        change_point(&f->lines[i].x1, &f->lines[i].y1, mirror);
        change_point(&f->lines[i].x2, &f->lines[i].y2, mirror);
    }
    for (size_t i = 0; i < f->input.drawn_count; i++) {
        change_point(&f->drawn[i].at.x1, &f->drawn[i].at.y1, mirror);
        change_point(&f->drawn[i].at.x2, &f->drawn[i].at.y2, mirror);
    }
    f->input.pour_direction_deg = 90 - f->input.pour_direction_deg;
}

static void same_twice(const struct layout_file *f, const struct layout *first)
{
    struct layout l = {0};
    assert_int_equal(layout_solve(&f->input, &l), STATUS_OK);
    assert_int_equal(l.panel_count, first->panel_count);
    assert_int_equal(l.joint_count, first->joint_count);
    assert_int_equal(l.evaluations, first->evaluations);
    for (size_t i = 0; i < l.joint_count; i++) {
        const double a[4] = {l.joints[i].x1, l.joints[i].y1, l.joints[i].x2, l.joints[i].y2};
        const struct layout_joint *j = &first->joints[i];
        const double b[4] = {j->x1, j->y1, j->x2, j->y2};
        assert_memory_equal(a, b, sizeof a);
        assert_string_equal(l.joints[i].id, j->id);
    }
    layout_free(&l);
}

static int turned_and_mirrored(const char *name, struct layout_file *f)
{
    struct layout first = {0}, l = {0};
    int bad = 0;
    assert_int_equal(layout_solve(&f->input, &first), STATUS_OK);
    same_twice(f, &first);
    for (int k = 0; k < 2; k++) {
        change(f, k == 1);
        assert_int_equal(layout_solve(&f->input, &l), STATUS_OK);
        const double ratio = (metres_of(&l) + 1) / (metres_of(&first) + 1);
        if (l.violations != first.violations || ratio > 1.05 || ratio < 0.95 ||
            fabs(l.area - first.area) > 0.02 * first.area) {
            print_message("%s %s: %d breaches, %.3f of the metres, area %.3f and %.3f\n", name,
                          k ? "mirrored" : "turned", l.violations, ratio, l.area, first.area);
            bad++;
        }
        layout_free(&l);
    }
    layout_free(&first);
    return bad;
}

/* Ids are unique, every joint between two panels names both. */
static void ids_and_neighbours(const struct layout *l)
{
    for (size_t i = 0; i < l->joint_count; i++) {
        const struct layout_joint *j = &l->joints[i];
        assert_true(j->id[0] != 0);
        assert_true(j->left_panel >= -1 && j->left_panel < (int)l->panel_count);
        if (j->kind == LAYOUT_CONTRACTION)
            assert_true(j->left_panel >= 0 && j->right_panel >= 0);
        for (size_t k = 0; k < i && l->joint_count < 500; k++)
            assert_string_not_equal(l->joints[k].id, j->id);
    }
    for (size_t i = 0; i < l->panel_count; i++)
        assert_int_equal(l->panels[i].number, i + 1);
}

static void every_file(void **state)
{
    (void)state;
    DIR *dir = opendir("tests/layouts");
    int bad = 0, seen = 0;
    assert_non_null(dir);
    for (struct dirent *e = readdir(dir); e; e = readdir(dir)) {
        char path[128];
        if (!strstr(e->d_name, ".txt") || strstr(e->d_name, "thousand"))
            continue;
        snprintf(path, sizeof path, "tests/layouts/%.80s", e->d_name);
        struct layout_file *f = layout_file_read(path);
        assert_non_null(f);
        struct layout l = {0};
        assert_int_equal(layout_solve(&f->input, &l), STATUS_OK);
        ids_and_neighbours(&l);
        layout_free(&l);
        bad += turned_and_mirrored(e->d_name, f);
        seen++;
        free(f);
    }
    closedir(dir);
    assert_true(seen >= 40);
    assert_int_equal(bad, 0);
}

struct cuts { /* of one side: raster positions, smallest and largest gap */
    int n;
    double least, most;
};

/* All ways to cut `size` at raster places, 4 cuts at most; must >= 0: one of them is there. */
static size_t all_cuts(double size, double must, struct cuts *list, size_t room)
{
    const int places = (int)(size / 0.5 + 0.5) - 1;
    size_t n = 0;
    int at[4];
    for (int k = 0; k <= 4; k++)
        for (int i = 0; i < k; i++)
            at[i] = i;
    for (int k = 0; k <= 4; k++) {
        for (int i = 0; i < k; i++)
            at[i] = i;
        while (k <= places) {
            struct cuts c = {k, INFINITY, 0};
            double before = 0;
            bool has = must < 0;
            for (int i = 0; i <= k; i++) {
                const double here = i < k ? 0.5 * (at[i] + 1) : size;
                c.least = fmin(c.least, here - before);
                c.most = fmax(c.most, here - before);
                has |= i < k && fabs(here - must) < 1e-9;
                before = here;
            }
            if (has && n < room)
                list[n++] = c;
            int i = k - 1;
            while (i >= 0 && at[i] == places - k + i)
                i--;
            if (i < 0)
                break;
            at[i]++;
            for (int m = i + 1; m < k; m++)
                at[m] = at[m - 1] + 1;
        }
    }
    return n;
}

/* The least metres of chords over every layout that keeps side, ratio and least side. */
static double best_metres(double w, double h, double limit, double x, double y)
{
    static const size_t room = 20000;
    struct cuts *v = calloc(room, sizeof *v), *u = calloc(room, sizeof *u);
    const size_t nv = all_cuts(w, x, v, room), nu = all_cuts(h, y, u, room);
    double best = INFINITY;
    for (size_t i = 0; i < nv; i++)
        for (size_t k = 0; k < nu; k++) {
            const double a = fmax(v[i].most / u[k].least, u[k].most / v[i].least);
            if (v[i].most > limit + 1e-9 || u[k].most > limit + 1e-9 || a > 1.5 + 1e-9 ||
                v[i].least < 0.6 || u[k].least < 0.6)
                continue;
            best = fmin(best, v[i].n * h + u[k].n * w);
        }
    free(v);
    free(u);
    return best;
}

static void small_rectangles_cost_no_more_than_the_best(void **state)
{
    (void)state;
    static const double slab[][5] = {
        /* width, height, limit, column or -1 */
        {8, 6, 4, -1, -1},     {10, 7, 4.5, -1, -1}, {9, 4.5, 3, -1, -1}, {12, 8, 4, 5, 3.5},
        {10, 8, 4.5, 4, 4.5},  {9, 9, 4, 3.5, 5},    {7.5, 5, 4, 3.5, 2}, {11, 6, 5, 4.5, 3},
        {6, 6, 4.5, 2.5, 3.5}, {12, 4, 4.5, 7.5, 2}, {8, 8, 6, 4.5, 3.5}, {10, 5, 3, -1, -1}};
    for (size_t i = 0; i < sizeof slab / sizeof *slab; i++) {
        const double *s = slab[i];
        const struct layout_corner corner[] = {
            {.x = 0, .y = 0}, {.x = s[0], .y = 0}, {.x = s[0], .y = s[1]}, {.x = 0, .y = s[1]}};
        const struct layout_object column = {.id = "C1",
                                             .kind = "column",
                                             .x = s[3],
                                             .y = s[4],
                                             .w = 0.2,
                                             .d = 0.2,
                                             .isolate = true};
        const struct layout_input in = {.outline = {corner, 4},
                                        .objects = &column,
                                        .object_count = s[3] >= 0,
                                        .max_side_x = s[2],
                                        .max_side_y = s[2],
                                        .max_aspect = 1.5,
                                        .min_side = 0.6,
                                        .min_angle_deg = 60,
                                        .effort = 1};
        const double best = best_metres(s[0], s[1], s[2], s[3], s[4]);
        struct layout l = {0};
        assert_int_equal(layout_solve(&in, &l), STATUS_OK);
        double found = metres_of(&l); /* and through the box: both diagonals */
        for (size_t b = 0; b < l.box_count; b++)
            found += 4 * l.boxes[b].half;
        if (isfinite(best) && (l.violations || found > 1.03 * best + 1e-6))
            fail_msg("slab %zu: %.3f m with %d breaches, best on the raster %.3f m", i, found,
                     l.violations, best);
        layout_free(&l);
    }
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(every_file),
        cmocka_unit_test(small_rectangles_cost_no_more_than_the_best),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
