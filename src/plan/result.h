/* The table of single results: path, label, quantity, where it is. Report, JSON, why and screens
 * loop over it; a new result appears everywhere at once. */
#ifndef SLABGAP_PLAN_RESULT_H
#define SLABGAP_PLAN_RESULT_H

#include "base/unit.h"
#include "plan/plan.h"

enum result_type { RESULT_NUMBER, RESULT_WORD /* const char * */, RESULT_VERDICT };
struct result {
    const char *path;  /* "seal.width_m" = JSON path */
    const char *label; /* for people */
    enum result_type type;
    enum quantity quantity;
    double json_scale; /* SI value x this = JSON value (litres: 1000) */
    size_t offset;     /* in struct plan */
};
extern const struct result result_table[];
extern const size_t result_count;
const struct result *result_find(const char *path);
double result_number(const struct result *result, const struct plan *plan); /* SI; NAN = none */
/* Value for people, in the units given. */
void result_show(struct text *out, const struct result *result, const struct plan *plan,
                 enum unit_system units);

#endif
