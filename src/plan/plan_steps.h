/* The steps of the chain, in the order plan_make() takes them. Each reads what earlier steps left in
 * the plan and writes its own part. Private to src/plan. */
#ifndef SLABGAP_PLAN_PLAN_STEPS_H
#define SLABGAP_PLAN_PLAN_STEPS_H

#include "plan/plan.h"

void plan_set_concrete(struct plan *plan);
void plan_set_temperature(struct plan *plan);
void plan_set_shrinkage(struct plan *plan);
void plan_set_spacing(struct plan *plan);
enum status plan_set_layout(struct plan *plan, const struct plan_progress *progress);
enum status plan_set_movement(struct plan *plan); /* movement, joints, working */
void plan_set_seal(struct plan *plan);            /* width, strains, table, window */
void plan_set_joint_seals(struct plan *plan);     /* width and strains of every joint, working */
enum status plan_set_isolation(struct plan *plan);
void plan_set_restraint(struct plan *plan);
void plan_set_steel(struct plan *plan);
void plan_set_quantities(struct plan *plan);
enum status plan_set_checks(struct plan *plan);

/* ---- shared by the steps ---- */
/* Movement of one joint between bars of lengths l1 and l2 (0 = no bar on that side) for a free strain
 * e >= 0: friction or factor as the job says. m. */
double plan_joint_movement(const struct plan *plan, bool factor, double l1, double l2, double strain);
/* Free strain that opens a joint from sealing to coldest with all drying still to come, and that
 * closes it from sealing to hottest; never below 0. */
double plan_open_strain(const struct plan *plan);
double plan_close_strain(const struct plan *plan);
/* Whether a joint is held by ties (pours.along / pours.across). */
bool plan_joint_tied(const struct plan *plan, const struct layout_joint *joint);
/* Capacities of the sealant; false when the kind has none (none, floor filler, compression seal). */
bool plan_capacity(const struct plan *plan, double *extension, double *compression);

#endif
