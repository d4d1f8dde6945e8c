/* The steps of the chain, in the order plan_make() takes them. Each reads what earlier steps left
 * in the plan and writes its own part. Private to src/plan. */
#ifndef SLABGAP_PLAN_PLAN_STEPS_H
#define SLABGAP_PLAN_PLAN_STEPS_H

#include "core/sealant.h"
#include "plan/plan.h"

void plan_list_assumed(struct plan *plan); /* defaults an answer leans on; overrides */
void plan_set_concrete(struct plan *plan);
enum status plan_set_temperature(struct plan *plan, struct plan_cache *cache);
enum status plan_set_early(struct plan *plan); /* first three days; set temperature */
void plan_set_shrinkage(struct plan *plan);
void plan_set_spacing(struct plan *plan);
enum status plan_set_layout(struct plan *plan, struct plan_cache *cache,
                            const struct plan_progress *progress);
enum status plan_set_movement(struct plan *plan); /* movement, joints, working */
void plan_set_seal(struct plan *plan);            /* width, strains, table, window */
void plan_set_seal_table(struct plan *plan);      /* part of plan_set_seal */
void plan_set_compression_seal(struct plan *plan);
void plan_set_working(struct plan *plan);
void plan_set_choice(struct plan *plan);      /* kinds of sealant, each with its reasons */
void plan_set_joint_seals(struct plan *plan); /* width and strains of every joint */
enum status plan_set_isolation(struct plan *plan);
void plan_set_restraint(struct plan *plan);
void plan_set_steel(struct plan *plan);
void plan_set_quantities(struct plan *plan);
void plan_set_work(struct plan *plan); /* these four are part of plan_set_quantities */
void plan_set_batch(struct plan *plan);
void plan_set_cost(struct plan *plan);
void plan_set_other_widths(struct plan *plan);
enum status plan_set_pours(struct plan *plan);
enum status plan_set_saw(struct plan *plan); /* window, order of cuts */
enum status plan_set_cracks(struct plan *plan);
enum status plan_set_checks(struct plan *plan);

/* ---- shared by the steps ---- */
/* The weather and the column of the simulation; false when the job needs none (indoors). */
bool plan_climate(const struct plan *plan, struct climate_range *range,
                  struct conduction_slab *slab);
/* Hourly weather of `days` days from a day of the year (from 0) on; of a record its first year. The
 * sun of a made year stands highest at hour 12. STATUS_NO_MEMORY. */
enum status plan_hours(const struct plan *plan, int first_day, int days,
                       struct climate_hour *hours);
/* The slab as the shrinkage models see it. */
struct shrinkage_slab;
void plan_shrinkage_slab(const struct plan *plan, struct shrinkage_slab *slab);
/* Whether the slab's temperatures come from it. */
bool plan_simulated(const struct plan *plan);
/* Mean air of a day of the year (from 0) in the job's weather. */
double plan_air_mean(const struct plan *plan, int day);
/* The slab's hours: of the made year, or of the record's year with the widest range.
 * STATUS_REFUSED: indoors. */
enum status plan_slab_year(const struct plan *plan, struct conduction_year *year);
/* The year, or all years of a record: extremes and gradients into *out, from the cache while
 * nothing that enters it changes. */
enum status plan_simulate(const struct plan *plan, struct plan_cache *cache,
                          struct plan_cache *out);
/* Movement of one joint between bars of lengths l1 and l2 (0 = no bar on that side) for a free
 * strain e >= 0: C (l1 + l2)/2 e with the factor; with friction the sum of both end movements, low
 * mu; bars over 15 m move freely. m. */
double plan_joint_movement(const struct plan *plan, bool factor, double l1, double l2,
                           double strain);
/* Whether the job takes the factor. */
bool plan_by_factor(const struct plan *plan);
/* Free strain that opens a joint from sealing to coldest with all drying still to come, and that
 * closes it from sealing to hottest; never below 0. */
double plan_open_strain(const struct plan *plan);
double plan_close_strain(const struct plan *plan);
/* Whether a joint is held by ties (pours.along / pours.across). */
bool plan_joint_tied(const struct plan *plan, const struct layout_joint *joint);
/* Free shortening of the concrete from set to coldest, all drying in (interlock): no credit for
 * drying before sealing when it is not known. */
double plan_crack_strain(const struct plan *plan);
/* Stress the drag of the base may cause, Pa. */
double plan_drag_stress_allowed(const struct plan *plan);
/* Movement of the joint that works when one in n does, m: `one_m` at n = 1, between bars of mean
 * length bar_m (half of it for a joint with one neighbour). */
double plan_working_movement(const struct plan *plan, int n, double bar_m, double strain,
                             double one_m);
/* Stock widths in the job's units, narrow to wide; returns how many. */
enum { PLAN_BLADES_MOST = 32 };
size_t plan_blades(const struct plan *plan, double widths[PLAN_BLADES_MOST]);
/* Rods on the truck, else in stock, thin to thick. */
size_t plan_rods(const struct plan *plan, double diameters[PLAN_BLADES_MOST]);
/* Filler boards in stock in the job's units, thin to thick. */
size_t plan_boards(const struct plan *plan, double thicknesses[PLAN_BLADES_MOST]);
/* Sizes of a stock table in the job's units, narrow to wide. */
struct size_row;
size_t plan_stock(const struct plan *plan, const struct size_row *table, size_t rows,
                  double sizes[PLAN_BLADES_MOST]);
/* The least size of stock not below `least`; the largest when there is none. */
double plan_next_size(const double *sizes, size_t count, double least);
/* Strains of a joint this wide at sealing on the job's basis. */
enum sealant_basis plan_strain_basis(const struct plan *plan);
struct sealant_strain plan_strains(const struct plan *plan, double open_m, double close_m,
                                   double width_m);
/* What the widest-moving sealed joint does: the seal must hold there too. */
struct plan_worst {
    double open, close;
};
struct plan_worst plan_worst_movement(const struct plan *plan);
/* The governing joint as the sealing table and `seal` see it. It points to the plan. */
struct sealant_joint plan_sealant_joint(const struct plan *plan);
/* Share of what a compression seal of seal.rod_m can follow from this slot; above 1 it fails. */
double plan_compression_demand(const struct plan *plan, double open_m, double close_m,
                               double slot_m);
/* The smallest seal in stock that follows from a slot the saw can cut; false: none. */
bool plan_compression_fit(const struct plan *plan, struct plan_worst worst, double *seal_m,
                          double *slot_m);
/* Narrowest blade of the kind that holds with room for these movements; NAN: none. */
double plan_narrowest(const struct plan *plan, double open_m, double close_m);
/* Width at sealing of a joint cut this wide at the cutting temperature. */
double plan_width_at_sealing(const struct plan *plan, double width_m);
/* Verdict of a joint cut this wide, tolerance in; NONE without a capacity. */
enum verdict plan_seal_verdict(const struct plan *plan, double open_m, double close_m,
                               double cut_m);
/* Temperature of the bond test of a hot-poured sealant of a typed ASTM D6690 type; false: none. */
bool plan_bond_test(const struct plan *plan, double *tested_c);
/* Capacities of the sealant; false when the kind has none (none, floor filler, compression seal).
 */
bool plan_capacity(const struct plan *plan, double *extension, double *compression);

#endif
