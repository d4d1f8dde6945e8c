/* 200 random rectilinear slabs with openings and columns on no common line: whatever the solver
 * calls free of breaches must be so for the checker with GEOS, and nine in ten must be. */
#include "layout_file.h"
#include <setjmp.h>
#include <stdarg.h>
#include <stddef.h>
#include <stdint.h>
/* cmocka.h needs the headers above */
#include "crowded_check.h"

struct draw {
    uint64_t state;
};

static double pick(struct draw *d, double low, double high, double step)
{
    d->state = d->state * 6364136223846793005u + 1442695040888963407u;
    const double share = (double)(d->state >> 40) / (double)(1u << 24);
    return low + floor((high - low) * share / step) * step;
}

static size_t outline(struct draw *d, double w, double h, struct layout_corner *c)
{
    const double a = pick(d, 0.3 * w, 0.7 * w, 0.5), b = pick(d, 0.3 * h, 0.7 * h, 0.5);
    const double ell[] = {0, 0, w, 0, w, b, a, b, a, h, 0, h};
    const double box[] = {0, 0, w, 0, w, h, 0, h};
    const double tee[] = {0, 0, w, 0, w, b, w - 5, b, w - 5, h, 5, h, 5, b, 0, b};
    const double *const all[] = {box, ell, tee};
    static const size_t count[] = {4, 6, 8};
    const size_t kind = (size_t)pick(d, 0, 3, 1);
    for (size_t i = 0; i < count[kind]; i++)
        c[i] = (struct layout_corner){.x = all[kind][2 * i], .y = all[kind][2 * i + 1]};
    return count[kind];
}

static bool inside(const struct layout_corner *c, size_t n, double x, double y)
{
    struct layout_point p[16];
    for (size_t i = 0; i < n; i++)
        p[i] = (struct layout_point){c[i].x, c[i].y};
    return in_ring(p, n, x, y);
}

static bool roomy(const struct layout_corner *c, size_t n, double x, double y, double reach)
{
    for (int k = 0; k < 9; k++)
        if (!inside(c, n, x + (k % 3 - 1) * reach, y + (k / 3 - 1) * reach))
            return false;
    return true;
}

static bool near_opening(const struct layout_file *f, double x, double y)
{
    const struct layout_corner *c = &f->corners[128];
    return f->input.opening_count && x > c[0].x - 1.5 && x < c[2].x + 1.5 && y > c[0].y - 1.5 &&
           y < c[2].y + 1.5;
}

static void add_column(struct draw *d, struct layout_file *f, double w, double h)
{
    for (int attempt = 0; attempt < 40; attempt++) {
        const double x = pick(d, 1, w - 1, 0.1), y = pick(d, 1, h - 1, 0.1);
        bool free_place =
            roomy(f->corners, f->input.outline.count, x, y, 1.3) && !near_opening(f, x, y);
        for (size_t i = 0; i < f->input.object_count; i++)
            free_place &= fabs(f->objects[i].x - x) > 2.5 || fabs(f->objects[i].y - y) > 2.5;
        if (!free_place)
            continue;
        const size_t n = f->input.object_count++;
        snprintf(f->ids[n], sizeof f->ids[n], "C%zu", n + 1);
        f->objects[n] = (struct layout_object){
            .id = f->ids[n], .kind = "column", .isolate = true, .x = x, .y = y, .w = 0.4, .d = 0.4};
        return;
    }
}

/* An opening at least 1.5 m from every side. */
static void add_opening(struct draw *d, struct layout_file *f, double w, double h)
{
    const double a = pick(d, 1, 3, 0.5), b = pick(d, 1, 3, 0.5);
    for (int attempt = 0; attempt < 40; attempt++) {
        const double x = pick(d, 2, w - 4, 0.5), y = pick(d, 2, h - 4, 0.5);
        if (!roomy(f->corners, f->input.outline.count, x + a / 2, y + b / 2, fmax(a, b) / 2 + 1.5))
            continue;
        struct layout_corner *c = &f->corners[128];
        c[0] = (struct layout_corner){.x = x, .y = y};
        c[1] = (struct layout_corner){.x = x + a, .y = y};
        c[2] = (struct layout_corner){.x = x + a, .y = y + b};
        c[3] = (struct layout_corner){.x = x, .y = y + b};
        f->openings[0] = (struct layout_ring){c, 4};
        f->input.opening_count = 1;
        return;
    }
}

static void random_slabs(void **state)
{
    (void)state;
    struct draw d = {7};
    struct checker c = {.geos = GEOS_init_r()};
    int clean = 0;
    size_t columns = 0;
    const int all = 200;
    for (int i = 0; i < all; i++) {
        struct layout_file *f = calloc(1, sizeof *f);
        assert_non_null(f);
        const double w = pick(&d, 14, 40, 0.5), h = pick(&d, 12, 30, 0.5);
        const double limit = pick(&d, 4, 6, 0.5);
        f->input = (struct layout_input){.outline = {f->corners, outline(&d, w, h, f->corners)},
                                         .openings = f->openings,
                                         .objects = f->objects,
                                         .max_side_x = limit,
                                         .max_side_y = limit,
                                         .max_aspect = 1.5,
                                         .min_side = 0.6,
                                         .min_angle_deg = 60,
                                         .effort = 1};
        if (i % 2)
            add_opening(&d, f, w, h);
        for (int k = (int)pick(&d, 1, 8, 1); k > 0; k--)
            add_column(&d, f, w, h);
        struct layout l = {0};
        assert_int_equal(layout_solve(&f->input, &l), STATUS_OK);
        c.in = &f->input;
        c.out = &l;
        const int faults = checker_run(&c, false);
        if (l.violations == 0 && faults > 0)
            fail_msg("slab %d: none of its own, %d by the checker: %s", i, faults, c.first);
        columns += f->input.object_count;
        clean += l.violations == 0;
        layout_free(&l);
        free(f);
    }
    GEOS_finish_r(c.geos);
    print_message("%d of %d keep every rule, %zu columns\n", clean, all, columns);
    assert_true(clean >= all * 9 / 10);
}

/* Yards of 1 000 panels with 30 columns, and of 50 000 with 900 columns and 20 openings. */
static void crowded_yards(void **state)
{
    (void)state;
    static const struct yard_case plain = {150, 130, 30, 0, 4e6, 0},
                                  holes = {150, 130, 30, 2, 1e7, 0},
                                  fifty = {1050, 900, 900, 20, 1e8, 0};
    struct checker c = {.geos = GEOS_init_r()};
    for (enum yard_order order = YARD_GRID; order <= YARD_ANYWHERE; order++) {
        for (uint64_t seed = 1; seed <= 20; seed++) {
            yard_check(&c, &plain, order, seed);
            yard_check(&c, &holes, order, seed);
        }
        yard_check(&c, &fifty, order, 3);
    }
    GEOS_finish_r(c.geos);
}

int main(void)
{
    const struct CMUnitTest tests[] = {cmocka_unit_test(random_slabs),
                                       cmocka_unit_test(crowded_yards)};
    return cmocka_run_group_tests(tests, NULL, NULL);
}
