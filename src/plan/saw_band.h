/* How sure the window is: the same night with warmer and colder weather, livelier and lazier
 * cement. */
#ifndef SLABGAP_PLAN_SAW_BAND_H
#define SLABGAP_PLAN_SAW_BAND_H

#include "plan/plan.h"

enum { SAW_BAND_RUNS = 200 };
struct saw_band { /* clock, h from midnight of the pour day; INFINITY: not within three days */
    double earliest_from_h, earliest_to_h, latest_from_h, latest_to_h;
};
/* 5 to 95 of 100 of SAW_BAND_RUNS runs, air and concrete warmer by up to the scatter typed each
 * way, heat and strength likewise, evenly spread and the same every time. STATUS_REFUSED: the plan
 * has no window; STATUS_STOPPED: progress said stop. */
enum status saw_band_make(const struct plan *plan, const struct plan_progress *progress,
                          struct saw_band *band);

#endif
