/* Sealing day: go or not, for a joint measured now. What was not measured is said, never assumed
 * good. */
#ifndef SLABGAP_PLAN_SEAL_NOW_H
#define SLABGAP_PLAN_SEAL_NOW_H

#include "plan/plan.h"

enum trend { TREND_UNKNOWN, TREND_RISING, TREND_STEADY, TREND_FALLING };
struct seal_now_input { /* NAN = not measured */
    double slab_c;      /* mean over the depth */
    double surface_c;   /* a reading of the surface, when there is no mean */
    double hour;        /* of that reading, 0 to 24 */
    double width_m;     /* measured, the smallest of three; NAN: the job's cut, at this slab */
    double air_c, humidity /* ratio */;
    enum trend trend;
    int dry, clean;   /* -1 not looked at, 0 no, 1 yes */
    struct date date; /* year 0: the job's day of sealing */
};
void seal_now_input_clear(struct seal_now_input *input);

enum { NOW_REASONS = 12 };
struct seal_now {
    bool go;
    double slab_c, slab_least_c; /* what is taken as the mean; the colder end when it is not sure */
    double width_m, extension, compression, dew_c, age_days, drying_left;
    double needed_m;   /* narrowest stock width that would hold now; NAN: none */
    double turns_hour; /* clock hour at which the slab is warm enough; NAN: not known */
    enum verdict verdict;
    char against[NOW_REASONS][160]; /* why not, most important first */
    size_t against_count;
    char unknown[NOW_REASONS][80]; /* what was not measured */
    size_t unknown_count;
};
/* STATUS_REFUSED: no sealant with a movement class, or nothing moves, or no temperature was given.
 */
enum status seal_now_judge(const struct plan *plan, const struct seal_now_input *input,
                           struct seal_now *now);

#endif
