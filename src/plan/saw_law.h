/* From when a cut's edge stays sharp, until when the slab waits for it. Hours of the pour: 0 = its
 * first concrete. Private to src/plan. */
#ifndef SLABGAP_PLAN_SAW_LAW_H
#define SLABGAP_PLAN_SAW_LAW_H

#include "plan/plan_early.h"

enum { LAW_LENGTHS = 32 };
struct saw_law {
    const struct plan *plan;
    const struct plan_early *early;
    double pour_h; /* between the first and the last concrete */
    double earliest[2];
    double (*latest)[LAW_LENGTHS]; /* of both, by length of strip; NAN: not asked for yet */
};
/* Runs the last concrete, takes the trial cuts typed. `latest`: two rows of LAW_LENGTHS. */
enum status saw_law_make(struct plan *plan, const struct plan_early *early,
                         double (*latest)[LAW_LENGTHS], struct saw_law *law);
/* When concrete placed then may be cut. */
double saw_law_ready(const struct saw_law *law, double placed_h);
/* When a stretch of this length, placed then, cracks by itself; INFINITY: not within three days. */
double saw_law_cracks(const void *law, double length_m, double placed_h);

#endif
