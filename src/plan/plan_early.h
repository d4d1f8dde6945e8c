/* The early-age model of a plan: what it is fed with. Private to src/plan. */
#ifndef SLABGAP_PLAN_PLAN_EARLY_H
#define SLABGAP_PLAN_PLAN_EARLY_H

#include "core/early.h"
#include "plan/plan.h"

enum { EARLY_DAYS = 6 }; /* of hourly weather from midnight of the pour day on */
struct plan_early {
    struct early_mix mix;
    struct conduction_slab slab;
    struct conduction_column column;
    struct climate_hour hours[24 * EARLY_DAYS];
    double solar_h; /* hours[] stand that much ahead of the clock */
    double ground_c, deep_c, resistance_m2k_w;
};
/* Whether the job says when concrete is placed: pour.date and pour.start. */
bool plan_has_early(const struct plan *plan);
enum status plan_early_make(const struct plan *plan, struct plan_early *early);
/* Weather at the face of concrete placed so many hours after midnight of the pour day (below 48).
 */
void plan_early_weather(const struct plan_early *early, double clock_h, struct early_weather *out);
/* The strip that pulls, this long. */
struct early_strip plan_early_strip(const struct plan *plan, double length_m);
/* A moment as "16:20", with the day behind it when it is not the pour day: "02:10 13 Apr". */
void plan_clock(const struct plan *plan, double clock_h, char *out, size_t size);

#endif
