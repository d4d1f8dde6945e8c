/* The seal: width chosen or checked, both ends of the year, bead, rod, sealing table and window. */
#include "core/quantity.h"
#include "core/sealant.h"
#include "job/table.h"
#include "plan/plan_steps.h"
#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

/* ---- stock sizes ---- */

static bool in_stock(const struct size_row *row, const struct plan *plan)
{
    return strcmp(row->system, "both") == 0 ||
           (strcmp(row->system, "us") == 0) == (plan->job.job_units == UNITS_US);
}

static int narrower(const void *a, const void *b)
{
    double x = *(const double *)a, y = *(const double *)b;

    return (x > y) - (x < y);
}

size_t plan_stock(const struct plan *plan, const struct size_row *table, size_t rows,
                  double sizes[PLAN_BLADES_MOST])
{
    size_t count = 0;

    for (size_t i = 0; i < rows && count < PLAN_BLADES_MOST; i++)
        if (in_stock(&table[i], plan))
            sizes[count++] = table[i].size;
    qsort(sizes, count, sizeof *sizes, narrower);
    return count;
}

/* What is on the truck, narrow to wide, else the usual sizes. */
static size_t truck(const struct plan *plan, const struct numbers *typed,
                    const struct size_row *table, size_t rows, double sizes[PLAN_BLADES_MOST])
{
    if (typed->count == 0)
        return plan_stock(plan, table, rows, sizes);
    memcpy(sizes, typed->items, typed->count * sizeof *sizes);
    qsort(sizes, typed->count, sizeof *sizes, narrower);
    return typed->count;
}

size_t plan_blades(const struct plan *plan, double widths[PLAN_BLADES_MOST])
{
    return truck(plan, &plan->job.takeoff_blades, blade_table, blade_count, widths);
}

size_t plan_rods(const struct plan *plan, double diameters[PLAN_BLADES_MOST])
{
    return truck(plan, &plan->job.takeoff_rods, rod_table, rod_count, diameters);
}

size_t plan_boards(const struct plan *plan, double thicknesses[PLAN_BLADES_MOST])
{
    return plan_stock(plan, filler_table, filler_count, thicknesses);
}

double plan_next_size(const double *sizes, size_t count, double least)
{
    for (size_t i = 0; i < count; i++)
        if (sizes[i] >= least - 1e-9)
            return sizes[i];
    return count > 0 ? sizes[count - 1] : least;
}

bool plan_capacity(const struct plan *plan, double *extension, double *compression)
{
    *extension = plan->job.sealant_extension;
    *compression = plan->job.sealant_compression;
    return plan->job.sealant_kind <= SEALANT_HOT_POUR;
}

/* ASTM D6690: -18 degC for type I, -29 degC for types II to IV. */
bool plan_bond_test(const struct plan *plan, double *tested_c)
{
    static const double tested[] = {NAN, -18, -29, -29, -29};
    int type = plan->job.sealant_type;

    if (type == 0 || plan->job.sealant_kind != SEALANT_HOT_POUR)
        return false;
    *tested_c = tested[type];
    return true;
}

/* ---- strains of a joint ---- */

struct plan_worst plan_worst_movement(const struct plan *plan)
{
    struct plan_worst worst = {plan->movement.open_m, plan->movement.close_m};

    if (isnan(worst.open))
        worst = (struct plan_worst){0, 0};
    for (size_t j = 0; plan->joints != NULL && j < plan->layout.joint_count; j++)
        if (plan->layout.joints[j].kind != LAYOUT_ISOLATION) {
            worst.open = fmax(worst.open, plan->joints[j].open_m);
            worst.close = fmax(worst.close, plan->joints[j].close_m);
        }
    return worst;
}

/* Width at sealing of a joint cut this wide: cut at another slab temperature it has opened or
 * closed since. */
double plan_width_at_sealing(const struct plan *plan, double width_m)
{
    double warmer = plan->temperature.cut_c - plan->temperature.sealing_c;

    if (!(fabs(warmer) > 0) || isnan(plan->movement.left_m))
        return width_m;
    return width_m + copysign(plan_joint_movement(plan, plan_by_factor(plan), plan->movement.left_m,
                                                  plan->movement.right_m,
                                                  plan->concrete.expansion_k * fabs(warmer)),
                              warmer);
}

enum sealant_basis plan_strain_basis(const struct plan *plan)
{
    return plan->job.sealing_basis == SEALING_MEAN_WIDTH ? SEALANT_OF_REST : SEALANT_OF_WIDTH;
}

struct sealant_strain plan_strains(const struct plan *plan, double open_m, double close_m,
                                   double width_m)
{
    return sealant_strains(plan_strain_basis(plan), open_m, close_m, width_m);
}

/* Share of what the sealant is good for at the width less the tolerance. */
static double demand_of(const struct plan *plan, double open_m, double close_m, double cut_m)
{
    struct sealant_capacity capacity;

    if (plan->job.sealant_kind == SEALANT_COMPRESSION_SEAL)
        return plan_compression_demand(plan, open_m, close_m, cut_m);
    if (!plan_capacity(plan, &capacity.extension, &capacity.compression))
        return NAN;
    return sealant_demand(
        plan_strains(plan, open_m, close_m,
                     plan_width_at_sealing(plan, cut_m) - plan->job.sealing_tolerance),
        capacity);
}

enum verdict plan_seal_verdict(const struct plan *plan, double open_m, double close_m, double cut_m)
{
    return verdict_of(demand_of(plan, open_m, close_m, cut_m), 1);
}

/* ---- width ---- */

double plan_narrowest(const struct plan *plan, double open_m, double close_m)
{
    const struct sealant_row *kind = &sealant_table[plan->job.sealant_kind];
    double widths[PLAN_BLADES_MOST];
    size_t count = plan_blades(plan, widths);

    for (size_t i = 0; i < count; i++) {
        if (widths[i] < kind->width_least - 1e-9 || widths[i] > kind->width_most + 1e-9)
            continue;
        if (!plan->seal.sealed ||
            plan_seal_verdict(plan, open_m, close_m, widths[i]) == VERDICT_HOLDS)
            return widths[i];
    }
    return NAN;
}

static double widest(const struct plan *plan)
{
    const struct sealant_row *kind = &sealant_table[plan->job.sealant_kind];
    double widths[PLAN_BLADES_MOST];
    size_t count = plan_blades(plan, widths);
    double width = kind->width_least;

    for (size_t i = 0; i < count; i++)
        if (widths[i] <= kind->width_most + 1e-9)
            width = fmax(width, widths[i]);
    return width;
}

/* What width the movement asks for, tolerance in, before rounding to a blade. */
static double least_width(const struct plan *plan, struct plan_worst worst)
{
    struct sealant_capacity capacity;
    double least;

    if (!plan_capacity(plan, &capacity.extension, &capacity.compression))
        return NAN;
    if (plan->job.sealing_basis == SEALING_MEAN_WIDTH)
        least = sealant_least_mean_width(worst.open, worst.close,
                                         fmin(capacity.extension, capacity.compression)) +
                plan->job.sealing_tolerance;
    else
        least = sealant_least_width(worst.open, worst.close, capacity, plan->job.sealing_tolerance);
    return least + (plan->seal.width_m - plan_width_at_sealing(plan, plan->seal.width_m));
}

static void warn_width(struct plan *plan)
{
    const struct sealant_row *kind = &sealant_table[plan->job.sealant_kind];
    struct text width = {0}, least = {0}, most = {0};
    enum unit_system units = (enum unit_system)plan->job.job_units;

    if (plan->seal.width_m >= kind->width_least - 1e-9 &&
        plan->seal.width_m <= kind->width_most + 1e-9)
        return;
    unit_show(&width, plan->seal.width_m, QUANTITY_SMALL_LENGTH, units);
    unit_show(&least, kind->width_least, QUANTITY_SMALL_LENGTH, units);
    unit_show(&most, kind->width_most, QUANTITY_SMALL_LENGTH, units);
    finding_add(&plan->findings, SEVERITY_WARNING, "sealant.width", text_string(&width),
                text_string(&most), 0, 0,
                "sealant.width: %s is outside %s to %s, the usual widths for %s; cut another width "
                "or ask the maker.",
                text_string(&width), text_string(&least), text_string(&most), kind->words);
    text_free(&width);
    text_free(&least);
    text_free(&most);
}

static void set_width(struct plan *plan, struct plan_worst worst)
{
    plan->seal.chosen = isnan(plan->job.sealant_width);
    plan->seal.width_m = plan->job.sealant_width;
    if (plan->seal.chosen) {
        plan->seal.width_m = plan_narrowest(plan, worst.open, worst.close);
        if (isnan(plan->seal.width_m))
            plan->seal.width_m = widest(plan); /* fails, and says so */
    }
    plan->seal.least_width_m = least_width(plan, worst);
    plan->seal.tolerance_m = plan->job.sealing_tolerance;
    if (plan->job.sealant_kind != SEALANT_NONE)
        warn_width(plan);
}

static void set_neighbours(struct plan *plan)
{
    double widths[PLAN_BLADES_MOST];
    size_t count = plan_blades(plan, widths);
    double open = plan->movement.open_m, close = plan->movement.close_m;
    struct sealant_strain strains;

    for (size_t i = 0; i < count; i++) {
        if (widths[i] < plan->seal.width_m - 1e-9)
            plan->seal.next_down_m = widths[i];
        if (widths[i] > plan->seal.width_m + 1e-9 && isnan(plan->seal.next_up_m))
            plan->seal.next_up_m = widths[i];
    }
    if (isnan(open))
        return;
    strains = plan_strains(plan, open, close, plan_width_at_sealing(plan, plan->seal.next_down_m));
    if (isfinite(plan->seal.next_down_m)) {
        plan->seal.next_down_extension = strains.extension;
        plan->seal.next_down_compression = strains.compression;
    }
    strains = plan_strains(plan, open, close, plan_width_at_sealing(plan, plan->seal.next_up_m));
    if (isfinite(plan->seal.next_up_m)) {
        plan->seal.next_up_extension = strains.extension;
        plan->seal.next_up_compression = strains.compression;
    }
}

/* ---- bead ---- */

/* One warning about the rod; `a` and `b` go into the sentence. */
__attribute__((format(printf, 4, 0))) static void warn_rod(struct plan *plan, double a_m,
                                                           double b_m, const char *format)
{
    struct text rod = {0}, a = {0}, b = {0};
    enum unit_system units = (enum unit_system)plan->job.job_units;
    char words[400];

    unit_show(&rod, plan->seal.rod_m, QUANTITY_SMALL_LENGTH, units);
    unit_show(&a, a_m, QUANTITY_SMALL_LENGTH, units);
    unit_show(&b, b_m, QUANTITY_SMALL_LENGTH, units);
    snprintf(words, sizeof words, format, text_string(&rod), text_string(&a), text_string(&b));
    finding_add(&plan->findings, SEVERITY_WARNING, "sealant.rod", text_string(&rod),
                text_string(&b), 0, 0, "sealant.rod: %s", words);
    text_free(&rod);
    text_free(&a);
    text_free(&b);
}

static void warn_there_is(struct plan *plan)
{
    double there = plan->job.sealing_slot_depth;
    struct text need = {0}, slot = {0};

    if (isnan(there) || there >= plan->seal.cut_depth_m - 1e-9)
        return;
    unit_show(&need, plan->seal.cut_depth_m, QUANTITY_SMALL_LENGTH,
              (enum unit_system)plan->job.job_units);
    unit_show(&slot, there, QUANTITY_SMALL_LENGTH, (enum unit_system)plan->job.job_units);
    finding_add(&plan->findings, SEVERITY_WARNING, "sealing.slot-depth", text_string(&slot),
                text_string(&need), 0, 0,
                "sealing.slot-depth: the wide cut is %s deep; recess, bead and what lies under it "
                "need %s. Cut deeper, take a smaller rod, or bond-breaker tape.",
                text_string(&slot), text_string(&need));
    text_free(&need);
    text_free(&slot);
}

/* The slot that rod, bead and recess need, and whether the rod can be pressed in and stays. */
static void warn_slot(struct plan *plan)
{
    const double press = 2; /* widths; a quarter more is usual: common practice */
    double width = plan->seal.width_m;

    warn_there_is(plan);
    if (plan->job.sealant_backing == BACKING_NONE)
        finding_add(&plan->findings, SEVERITY_WARNING, "sealant.backing", "none", "", 0, 0,
                    "sealant.backing: with nothing under the bead it sticks to the bottom too and "
                    "tears (three-sided bond); put in a rod, or bond-breaker tape.");
    if (plan->job.sealant_backing != BACKING_ROD)
        return;
    if (plan->seal.cut_depth_m > plan->cut.most_m + 1e-9)
        warn_rod(plan, plan->seal.cut_depth_m, plan->cut.most_m,
                 "a %s rod under the bead needs a slot %s deep, more than a third of the slab "
                 "(%s); take a smaller rod, a thinner bead or bond-breaker tape.");
    if (plan->seal.rod_m < width - 1e-9)
        warn_rod(plan, width, width,
                 "a %s rod is narrower than the %s joint and falls through; take one about a "
                 "quarter wider than %s.");
    if (plan->seal.rod_m > press * width)
        warn_rod(plan, width, press * width,
                 "a %s rod cannot be pressed into a joint %s wide; take one of at most %s.");
}

static void set_bead(struct plan *plan)
{
    const struct sealant_row *kind = &sealant_table[plan->job.sealant_kind];
    double rods[PLAN_BLADES_MOST];
    size_t count = plan_rods(plan, rods);
    double open = isfinite(plan->movement.open_m) ? plan->movement.open_m : 0;
    double close = isfinite(plan->movement.close_m) ? plan->movement.close_m : 0;

    plan->seal.recess_m = plan->job.sealant_recess;
    plan->seal.depth_m = plan->job.sealant_depth;
    if (isnan(plan->seal.depth_m))
        plan->seal.depth_m = sealant_depth(plan->seal.width_m, kind->depth_ratio, kind->depth_least,
                                           kind->depth_most);
    plan->seal.rod_m = plan->job.sealant_rod;
    if (plan->job.sealant_backing != BACKING_ROD)
        plan->seal.rod_m = 0; /* tape is thin; without either the bead lies on the concrete */
    else if (isnan(plan->seal.rod_m))
        plan->seal.rod_m = plan_next_size(rods, count, 1.25 * plan->seal.width_m);
    plan->seal.cut_depth_m = plan->seal.recess_m + plan->seal.depth_m + plan->seal.rod_m;
    plan->seal.bead_strain =
        sealant_bead_strain(plan->seal.width_m, plan->seal.depth_m, plan->seal.width_m + open);
    plan->seal.bulge_m = sealant_bulge(plan->seal.width_m, plan->seal.depth_m,
                                       fmax(plan->seal.width_m - close, plan->seal.width_m / 10));
    warn_slot(plan);
}

/* ---- kinds without a class ---- */

/* A semi-rigid filler has no movement capacity: it fills the whole first cut, flush. */
static void set_floor_filler(struct plan *plan)
{
    struct sealant_strain strains;

    plan->seal.recess_m = 0;
    plan->seal.depth_m =
        isfinite(plan->job.sealant_depth) ? plan->job.sealant_depth : plan->cut.set_m;
    if (isnan(plan->movement.open_m))
        return;
    strains = plan_strains(plan, plan->movement.open_m, plan->movement.close_m, plan->seal.width_m);
    plan->seal.extension = strains.extension;
    plan->seal.compression = strains.compression;
}

/* ---- all together ---- */

static void set_cut(struct plan *plan)
{
    bool bound = plan->job.base_kind == BASE_STABILISED || plan->job.base_kind == BASE_ASPHALT;
    struct quantity_cut cut =
        quantity_cut_depth(plan->job.slab_thickness, bound, plan->job.concrete_aggregate_size);

    plan->cut.least_m = cut.least_m;
    plan->cut.most_m = cut.most_m;
    plan->cut.set_m = isfinite(plan->job.sawing_depth) ? plan->job.sawing_depth : cut.set_m;
}

/* The factor is an average, not a bound: say so when friction gives a worse verdict. */
static void warn_factor(struct plan *plan)
{
    enum verdict friction = plan_seal_verdict(plan, plan->movement.friction_open_m,
                                              plan->movement.friction_close_m, plan->seal.width_m);
    struct sealant_strain strains =
        plan_strains(plan, plan->movement.friction_open_m, plan->movement.friction_close_m,
                     plan_width_at_sealing(plan, plan->seal.width_m));

    if (!plan_by_factor(plan) || friction <= plan->seal.verdict || friction == VERDICT_NONE)
        return;
    finding_add(&plan->findings, SEVERITY_WARNING, "sealing.movement", "factor", "", 0, 0,
                "sealing.movement: the factor is an average, no bound. Worked out from friction "
                "the joint stretches %.1f %% and is squeezed %.1f %%: it %s. Choose the width by "
                "movement = friction.",
                100 * strains.extension, 100 * strains.compression,
                friction == VERDICT_FAILS ? "fails" : "only just holds");
}

static bool anything_to_seal(const struct plan *plan)
{
    if (!plan->has_outline)
        return true;
    for (size_t j = 0; j < plan->layout.joint_count; j++)
        if (plan->layout.joints[j].kind != LAYOUT_ISOLATION)
            return true;
    return false;
}

static void set_sealant(struct plan *plan, struct plan_worst worst)
{
    struct sealant_strain strains;
    double tested_c;

    set_bead(plan);
    set_neighbours(plan);
    if (isnan(plan->movement.open_m))
        return; /* every joint is tied: width and bead only */
    strains = plan_strains(plan, plan->movement.open_m, plan->movement.close_m,
                           plan_width_at_sealing(plan, plan->seal.width_m));
    plan->seal.extension = strains.extension;
    plan->seal.compression = strains.compression;
    plan->seal.verdict = plan_seal_verdict(plan, worst.open, worst.close, plan->seal.width_m);
    if (plan_bond_test(plan, &tested_c) && plan->temperature.coldest_c < tested_c - 1e-9)
        plan->seal.verdict = VERDICT_FAILS;
    plan_set_seal_table(plan);
    warn_factor(plan);
}

void plan_set_seal(struct plan *plan)
{
    struct plan_worst worst = plan_worst_movement(plan);
    int kind = plan->job.sealant_kind;

    set_cut(plan);
    if (kind == SEALANT_NONE || !anything_to_seal(plan))
        return;
    plan->seal.basis =
        plan->job.sealing_basis == SEALING_MEAN_WIDTH ? "width-and-movement" : "width";
    plan->seal.sealed =
        plan_capacity(plan, &plan->seal.extension_capacity, &plan->seal.compression_capacity);
    if (kind == SEALANT_COMPRESSION_SEAL) {
        plan->seal.extension_capacity = NAN;
        plan_set_compression_seal(plan);
        plan_set_working(plan);
        return;
    }
    set_width(plan, worst);
    if (kind == SEALANT_FLOOR_FILLER)
        set_floor_filler(plan);
    else
        set_sealant(plan, worst);
    plan_set_working(plan);
}
