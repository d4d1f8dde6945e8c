/* The lines of a derivation. Private to src/plan. */
#ifndef SLABGAP_PLAN_WHY_STEP_H
#define SLABGAP_PLAN_WHY_STEP_H

#include "plan/result.h"
#include "plan/why.h"
#include "plan/why_table.h"

enum { VALUE_MOST = 48 };

/* One row of a list: symbols of the form ".key" are its columns. */
struct why_cells {
    const struct list *list;
    const void *arrays[2];
    size_t row;
};

enum unit_system why_units(const struct plan *plan);
void why_show_number(const struct plan *plan, double si, enum quantity quantity, char *out,
                     size_t size);
/* "you" or "usual" */
const char *why_whose(const struct plan *plan, enum field_id id);
/* A line of the ladder: "2  Slab cools from 15 to -8   15 - -8   23 K   you". `field`: the input
 * behind it or "". Lines over the number there is room for are left out. */
__attribute__((format(printf, 5, 6))) void why_step(struct why *why, const char *number,
                                                    const char *field, const char *from,
                                                    const char *words, ...);
void why_set_sum(struct why *why, const char *sum, const char *value);
/* A line for every symbol of the row that has a value. `cells` may be NULL. */
void why_add_symbols(const struct plan *plan, const struct why_cells *cells,
                     const struct why_row *row, struct why *why);

/* Result of the result table; the ladder of the joint's width; row of a list. STATUS_REFUSED: no
 * such result. */
enum status why_result(const struct plan *plan, const char *path, struct why *why);
enum status why_width(const struct plan *plan, const char *path, struct why *why);
enum status why_list(const struct plan *plan, const char *path, struct why *why);

#endif
