/* Preformed compression seal: the size of the seal, the slot it sits in, how far it can follow. */
#include "core/sealant.h"
#include "job/table.h"
#include "plan/plan_steps.h"
#include <math.h>

static struct sealant_seal seal_of(const struct plan *plan, double seal_m)
{
    return (struct sealant_seal){.seal_m = seal_m,
                                 .least = plan->job.sealant_seal_least,
                                 .most = plan->job.sealant_seal_most};
}

static double demand_of(const struct plan *plan, double seal_m, struct plan_worst worst,
                        double slot_m)
{
    struct sealant_seal seal = seal_of(plan, seal_m);
    struct sealant_follow follow = sealant_seal_follow(&seal, slot_m, plan->job.sealing_tolerance);

    return sealant_seal_demand(follow, worst.open, worst.close);
}

double plan_compression_demand(const struct plan *plan, double open_m, double close_m,
                               double slot_m)
{
    return demand_of(plan, plan->seal.rod_m, (struct plan_worst){open_m, close_m}, slot_m);
}

/* The slot of the published formula at the sealing temperature, on the saw's raster, held within
 * what both ends of the year allow. */
static double slot_for(const struct plan *plan, double seal_m, struct plan_worst worst)
{
    struct sealant_seal seal = seal_of(plan, seal_m);
    double raster = plan->job.job_units == UNITS_US ? 0.0254 / 32 : 0.0005;
    double tolerance = plan->job.sealing_tolerance, least, most;
    double slot = sealant_seal_slot(&seal, sealant_seal_setting(&seal, plan->temperature.sealing_c,
                                                                plan->temperature.coldest_c,
                                                                plan->temperature.hottest_c));

    slot = round(slot / raster) * raster;
    if (!sealant_seal_slots(&seal, worst.open, worst.close, &least, &most))
        return slot;
    least = ceil((least + tolerance) / raster - 1e-6) * raster;
    most = floor((most - tolerance) / raster + 1e-6) * raster;
    return least <= most ? fmin(fmax(slot, least), most) : slot;
}

static bool typed(double value)
{
    return isfinite(value);
}

/* One size of seal with its slot; true when both ends of the year hold. */
static bool try_size(struct plan *plan, double seal_m, struct plan_worst worst)
{
    plan->seal.rod_m = seal_m;
    plan->seal.width_m =
        typed(plan->job.sealant_width) ? plan->job.sealant_width : slot_for(plan, seal_m, worst);
    return demand_of(plan, seal_m, worst, plan->seal.width_m) <= 1 + 1e-9;
}

bool plan_compression_fit(const struct plan *plan, struct plan_worst worst, double *seal_m,
                          double *slot_m)
{
    double sizes[PLAN_BLADES_MOST];
    size_t count = plan_stock(plan, seal_table, seal_count, sizes);

    for (size_t i = 0; i < count; i++) {
        *seal_m = sizes[i];
        *slot_m = slot_for(plan, sizes[i], worst);
        if (demand_of(plan, sizes[i], worst, *slot_m) <= 1 + 1e-9)
            return true;
    }
    return false;
}

/* The smallest seal in stock that follows; when none does, the published least size, which fails
 * and says so. */
static void choose(struct plan *plan, struct plan_worst worst)
{
    double sizes[PLAN_BLADES_MOST];
    size_t count = plan_stock(plan, seal_table, seal_count, sizes);

    if (typed(plan->job.sealant_rod)) {
        try_size(plan, plan->job.sealant_rod, worst);
        return;
    }
    for (size_t i = 0; i < count; i++)
        if (try_size(plan, sizes[i], worst))
            return;
    try_size(
        plan,
        plan_next_size(sizes, count,
                       sealant_seal_least(worst.open + worst.close, plan->job.sealant_seal_least,
                                          plan->job.sealant_seal_most)),
        worst);
}

void plan_set_compression_seal(struct plan *plan)
{
    struct plan_worst worst = plan_worst_movement(plan);
    struct sealant_seal seal;
    struct sealant_seal_ends ends;
    struct sealant_follow follow;

    plan->seal.recess_m = plan->job.sealant_recess;
    plan->seal.tolerance_m = plan->job.sealing_tolerance;
    plan->seal.chosen = !typed(plan->job.sealant_width);
    choose(plan, worst);
    seal = seal_of(plan, plan->seal.rod_m);
    ends = sealant_seal_check(&seal, plan->seal.width_m, worst.open, worst.close);
    follow = sealant_seal_follow(&seal, plan->seal.width_m, plan->job.sealing_tolerance);
    plan->seal.least_width_m =
        (1 - seal.most) * seal.seal_m + worst.close + plan->job.sealing_tolerance;
    plan->seal.cold_squeeze = fmax(ends.cold, 0);
    plan->seal.compression = fmax(ends.hot, 0);
    plan->seal.compression_capacity = seal.most;
    plan->seal.follow_open_m = follow.open_m;
    plan->seal.follow_close_m = follow.close_m;
    plan->seal.verdict =
        verdict_of(plan_compression_demand(plan, worst.open, worst.close, plan->seal.width_m), 1);
}
