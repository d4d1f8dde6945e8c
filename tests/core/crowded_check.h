/* A crowded yard laid out and checked: by the solver's own check and by the checker with GEOS. */
#ifndef SLABGAP_TESTS_CORE_CROWDED_CHECK_H
#define SLABGAP_TESTS_CORE_CROWDED_CHECK_H

#include "core/crowded_yard.h"
#include "layout_checker.h"
#include <cmocka.h>

struct yard_case {
    double w, h;
    int columns, openings;
    double evaluations; /* at most; 1e8 take about a second */
    int broken;         /* at most */
};

static inline void yard_check(struct checker *c, const struct yard_case *yard,
                              enum yard_order order, uint64_t seed)
{
    struct yard *y = yard_make(yard->w, yard->h, yard->columns, yard->openings, order, seed);
    struct layout l = {0};
    assert_non_null(y);
    assert_true(y->input.object_count + 6 + (size_t)yard->columns / 20 >= (size_t)yard->columns);
    assert_int_equal(layout_solve(&y->input, &l), STATUS_OK);
    c->in = &y->input;
    c->out = &l;
    const int faults = checker_run(c, l.panel_count > 2000);
    if (l.violations > yard->broken || (l.violations == 0 && faults > 0) ||
        (double)l.evaluations > yard->evaluations)
        fail_msg("%d columns, order %d, seed %d: %d of its own, %d by the checker: %s; %.3g",
                 yard->columns, (int)order, (int)seed, l.violations, faults, c->first,
                 (double)l.evaluations);
    layout_free(&l);
    free(y);
}

#endif
