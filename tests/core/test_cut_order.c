/* The order of cuts against every order there is (exhaustive search, small slabs), and what must
 * hold for every slab. */
#include <setjmp.h>
#include <stdarg.h>
#include <stddef.h>
#include <stdint.h>

#include <cmocka.h>

#include "core/cut_order.h"
#include <math.h>
#include <stdio.h>
#include <stdlib.h>

/* A stretch cracks the sooner the longer it is; short ones never. */
struct crack_law {
    double shortest_m, at_once_h, slower_h;
};

static double cracks(const void *context, double length_m, double placed_h)
{
    const struct crack_law *law = context;

    return length_m <= law->shortest_m
               ? INFINITY
               : placed_h + law->at_once_h + law->slower_h * law->shortest_m / length_m;
}

static uint64_t state64;
static double any(double least, double most)
{
    state64 = state64 * 6364136223846793005u + 1442695040888963407u;
    return least + (most - least) * (double)(state64 >> 11) / 9007199254740992.0;
}

enum { LINES = 6 };
struct yard {
    struct cut_family families[2];
    struct cut_line lines[2][LINES];
    struct crack_law law;
    struct cut_task task;
};

static void make_yard(struct yard *yard, size_t along, size_t across)
{
    const size_t counts[2] = {along, across};

    *yard = (struct yard){.law = {any(3, 8), any(5.5, 8), any(0, 6)}};
    for (int f = 0; f < 2; f++) {
        const double length = (double)(counts[f] + 1) * any(3.5, 4.5), wide = any(10, 40);
        yard->families[f] = (struct cut_family){0, length, yard->lines[f], counts[f]};
        for (size_t i = 0; i < counts[f]; i++) {
            const double placed = f == 0 ? any(0, 0.2) + 0.5 * (double)i : 0;
            yard->lines[f][i] =
                (struct cut_line){.id = (int)(10 * (size_t)f + i),
                                  .at_m = length * (double)(i + 1) / (double)(counts[f] + 1),
                                  .length_m = wide,
                                  .placed_h = placed,
                                  .ready_h = placed + any(5, 6)};
        }
    }
    yard->task = (struct cut_task){.families = yard->families,
                                   .family_count = 2,
                                   .saws = 1,
                                   .pace_m_h = any(15, 80),
                                   .cracks = cracks,
                                   .context = &yard->law};
}

/* ---- every order, one saw, by its own reckoning ---- */

struct walk {
    const struct yard *yard;
    size_t total;
    int family[2 * LINES], line[2 * LINES];
    bool cut[2][LINES];
    double best_late;
};

static double crack_time(const struct walk *walk, int f, int line)
{
    const struct cut_family *family = &walk->yard->families[f];
    int first = line, last = line;
    double placed = INFINITY;

    while (first > 0 && !walk->cut[f][first - 1])
        first--;
    while (last + 1 < (int)family->count && !walk->cut[f][last + 1])
        last++;
    for (int i = first; i <= last; i++)
        placed = fmin(placed, family->lines[i].placed_h);
    return cracks(&walk->yard->law,
                  (last + 1 < (int)family->count ? family->lines[last + 1].at_m : family->to_m) -
                      (first > 0 ? family->lines[first - 1].at_m : family->from_m),
                  placed);
}

static void try_all(struct walk *walk, size_t done, double now, double late)
{
    if (late >= walk->best_late)
        return;
    if (done == walk->total) {
        walk->best_late = late;
        return;
    }
    for (size_t i = 0; i < walk->total; i++) {
        const int f = walk->family[i], l = walk->line[i];
        const struct cut_line *line = &walk->yard->families[f].lines[l];
        if (walk->cut[f][l])
            continue;
        const double end = fmax(now, line->ready_h) + line->length_m / walk->yard->task.pace_m_h;
        const double more = end > crack_time(walk, f, l) ? line->length_m : 0;
        walk->cut[f][l] = true;
        try_all(walk, done + 1, end, late + more);
        walk->cut[f][l] = false;
    }
}

static double least_late(const struct yard *yard)
{
    struct walk walk = {.yard = yard, .best_late = INFINITY};

    for (int f = 0; f < 2; f++)
        for (size_t i = 0; i < yard->families[f].count; i++, walk.total++) {
            walk.family[walk.total] = f;
            walk.line[walk.total] = (int)i;
        }
    try_all(&walk, 0, -INFINITY, 0);
    return walk.best_late;
}

static void test_every_order(void **state)
{
    int best = 0, tried = 0, late_ones = 0;
    double lost = 0, least = 0;

    (void)state;
    state64 = 7;
    for (int n = 0; n < 400; n++) {
        struct yard yard;
        struct cut_order order;
        make_yard(&yard, 2 + (size_t)any(0, 3), 1 + (size_t)any(0, 3));
        assert_int_equal(cut_order_make(&yard.task, &order), STATUS_OK);
        const double optimum = least_late(&yard);
        assert_true(order.late_m >= optimum - 1e-9);
        tried++;
        late_ones += optimum > 0 || order.late_m > 0;
        best += order.late_m <= optimum + 1e-9;
        lost += order.late_m - optimum;
        least += optimum;
        cut_order_free(&order);
    }
    printf(
        "    best order in %d of %d, %d of them with cuts late; %.0f m late where %.0f must be\n",
        best, tried, late_ones, lost + least, least);
    assert_true(best >= 0.95 * tried);
}

/* ---- always ---- */

static void check_order(const struct yard *yard, const struct cut_order *order)
{
    size_t total = yard->families[0].count + yard->families[1].count;
    bool seen[2][LINES] = {{0}};
    double busy[64] = {0};

    assert_int_equal(order->count, total);
    for (int i = 0; i < 64; i++)
        busy[i] = -INFINITY;
    for (size_t i = 0; i < order->count; i++) {
        const struct cut_step *step = &order->steps[i];
        const struct cut_line *line = &yard->families[step->family].lines[step->line];
        assert_false(seen[step->family][step->line]); /* each line once */
        seen[step->family][step->line] = true;
        assert_true(step->start_h >= line->ready_h - 1e-9); /* never before its edge is sharp */
        assert_true(step->saw >= 1 && step->saw <= yard->task.saws);
        assert_true(step->start_h >= busy[step->saw] - 1e-9); /* a saw cuts one line at a time */
        busy[step->saw] = step->end_h;
        assert_true(fabs(step->end_h - step->start_h - line->length_m / yard->task.pace_m_h) <
                    1e-9);
        assert_true(step->late == (step->end_h > step->deadline_h));
        assert_true(i == 0 || step->start_h >= order->steps[i - 1].start_h - 1e-9);
    }
}

static void test_properties(void **state)
{
    (void)state;
    state64 = 11;
    for (int n = 0; n < 2000; n++) {
        struct yard yard;
        double end = INFINITY, late = INFINITY;
        int enough;
        make_yard(&yard, (size_t)any(0, 6), (size_t)any(0, 6));
        for (yard.task.saws = 1; yard.task.saws <= 6; yard.task.saws++) {
            struct cut_order order;
            assert_int_equal(cut_order_make(&yard.task, &order), STATUS_OK);
            check_order(&yard, &order);
            if (order.late_m > late + 1e-9) /* more saws never cut more metres late */
                fail_msg("yard %d: %d saws: %g m late; one saw less %g m", n, yard.task.saws,
                         order.late_m, late);
            late = order.late_m;
            cut_order_free(&order);
            assert_int_equal(cut_order_by(&yard.task, CUT_AS_PLACED, &order), STATUS_OK);
            check_order(&yard, &order);
            if (order.end_h > end + 1e-9) /* more saws never finish later */
                fail_msg("yard %d: %d saws end at %g; one saw less %g", n, yard.task.saws,
                         order.end_h, end);
            end = order.end_h;
            cut_order_free(&order);
        }
        yard.task.saws = 1;
        assert_int_equal(cut_order_saws(&yard.task, 20, &enough), STATUS_OK);
        if (enough > 0) {
            struct cut_order order;
            yard.task.saws = enough;
            assert_int_equal(cut_order_make(&yard.task, &order), STATUS_OK);
            assert_true(order.late_m <= 0);
            cut_order_free(&order);
        }
    }
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(test_every_order),
        cmocka_unit_test(test_properties),
    };

    return cmocka_run_group_tests(tests, NULL, NULL);
}
