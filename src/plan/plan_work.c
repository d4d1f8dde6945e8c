/* The sealing crew's hours, two-part batches, price, and the same joints at other widths. */
#include "core/quantity.h"
#include "core/sealant.h"
#include "job/table.h"
#include "plan/plan_steps.h"
#include <math.h>

/* ---- hours ---- */

static void add_work(struct plan *plan, const char *name, double pace_m_s, double tools)
{
    struct plan_work *work = &plan->quantities.works[plan->quantities.work_count++];
    double length = plan->quantities.sealed_m;

    *work = (struct plan_work){.name = name,
                               .length_m = length,
                               .pace_m_s = pace_m_s,
                               .tools = tools,
                               .hours = quantity_hours(length, pace_m_s, tools)};
}

/* The operations follow each other along the joint, so the slowest sets the hours. The wide cut is
 * work of another day. */
void plan_set_work(struct plan *plan)
{
    static const char *const tools[] = {"gun", "pump", "melter"};
    const struct job *job = &plan->job;
    struct plan_work *slowest;

    if (isnan(plan->seal.width_m) || !(plan->quantities.sealed_m > 0))
        return;
    plan->quantities.wide_cut_m = plan->quantities.sealed_m;
    add_work(plan, "cleaning", job->takeoff_clean_pace, 1);
    if (isfinite(plan->seal.depth_m) && job->sealant_backing != BACKING_NONE &&
        job->sealant_kind <= SEALANT_HOT_POUR)
        add_work(plan, job->sealant_backing == BACKING_TAPE ? "tape" : "rod", job->takeoff_rod_pace,
                 1);
    if (job->sealant_kind != SEALANT_COMPRESSION_SEAL)
        add_work(plan, tools[job->takeoff_tool], job->takeoff_tool_pace, job->takeoff_tools);
    slowest = &plan->quantities.works[0];
    for (size_t i = 1; i < plan->quantities.work_count; i++)
        if (plan->quantities.works[i].hours > slowest->hours)
            slowest = &plan->quantities.works[i];
    slowest->slowest = true;
    plan->quantities.hours = slowest->hours;
    plan->quantities.days = ceil(3600 * slowest->hours / job->takeoff_day - 1e-9);
    plan->quantities.loss_m3 = job->takeoff_loss_per_day * plan->quantities.days;
}

/* ---- two-part ---- */

/* A batch must be in the joint before it stiffens. */
void plan_set_batch(struct plan *plan)
{
    const struct job *job = &plan->job;
    double per_metre = plan->quantities.sealant_order_m3 / plan->quantities.sealed_m;
    double pace = job->takeoff_tool_pace * job->takeoff_tools;
    struct text batch = {0}, most = {0};

    if (isnan(job->sealant_pot_life) || !(per_metre > 0))
        return;
    plan->quantities.pot_life_s =
        quantity_pot_life(job->sealant_pot_life, plan->temperature.sealing_c);
    plan->quantities.batch_most_m3 = plan->quantities.pot_life_s * pace * per_metre;
    if (isnan(job->sealant_batch))
        return;
    plan->quantities.batch_m = job->sealant_batch / per_metre;
    if (job->sealant_batch <= plan->quantities.batch_most_m3 * (1 + 1e-9))
        return;
    unit_show(&batch, job->sealant_batch, QUANTITY_VOLUME, (enum unit_system)job->job_units);
    unit_show(&most, plan->quantities.batch_most_m3, QUANTITY_VOLUME,
              (enum unit_system)job->job_units);
    finding_add(&plan->findings, SEVERITY_WARNING, "sealant.batch", text_string(&batch),
                text_string(&most), 0, 0,
                "sealant.batch: %s stiffens before it is used up at this slab temperature; mix at "
                "most %s, or put more tools to work.",
                text_string(&batch), text_string(&most));
    text_free(&batch);
    text_free(&most);
}

/* ---- price ---- */

/* Packs (whole boxes of the first size), rod and hours, as far as prices are typed. */
void plan_set_cost(struct plan *plan)
{
    const struct job *job = &plan->job;
    double cost = 0;
    bool any = false;

    for (size_t i = 0; i < plan->quantities.package_count && i < job->takeoff_prices.count; i++) {
        int count = plan->quantities.packages[i].count;
        if (i == 0 && plan->quantities.boxes > 0)
            count = plan->quantities.boxes * (int)lround(job->takeoff_box);
        cost += count * job->takeoff_prices.items[i];
        any = true;
    }
    if (isfinite(job->takeoff_rod_price) && plan->quantities.rod_count > 0) {
        cost += plan->quantities.rods[0].length_m * job->takeoff_rod_price;
        any = true;
    }
    if (isfinite(job->takeoff_hour_price) && isfinite(plan->quantities.hours)) {
        cost += plan->quantities.hours * job->takeoff_hour_price;
        any = true;
    }
    if (any)
        plan->quantities.cost = cost;
}

/* ---- other widths ---- */

static int packs_for(const struct plan *plan, double order_m3)
{
    const struct numbers *sizes = &plan->job.takeoff_packages;
    int counts[NUMBERS_MOST], total = 0;
    double left;

    if (quantity_packages(sizes->items, sizes->count, order_m3, counts, &left) != STATUS_OK)
        return 0;
    for (size_t i = 0; i < sizes->count; i++)
        total += counts[i];
    return total;
}

/* What this width would be and need. The depth is the kind's: one typed for another width does not
 * suit it. */
static struct plan_width width_row(const struct plan *plan, double width, bool now)
{
    const struct sealant_row *kind = &sealant_table[plan->job.sealant_kind];
    struct plan_width row = {.width_m = width, .now = now, .hours = plan->quantities.hours};
    double length = plan->quantities.sealed_m, open = plan->movement.open_m, net;
    double close = plan->movement.close_m, rods[PLAN_BLADES_MOST];
    size_t count = plan_rods(plan, rods);
    struct sealant_strain strains =
        plan_strains(plan, open, close, plan_width_at_sealing(plan, width));
    struct plan_worst worst = plan_worst_movement(plan);

    row.extension = strains.extension;
    row.compression = strains.compression;
    row.verdict = plan_seal_verdict(plan, worst.open, worst.close, width);
    row.when_n3 = plan_seal_verdict(plan, plan->working[2].open_m, plan->working[2].close_m, width);
    row.depth_m =
        now ? plan->seal.depth_m
            : sealant_depth(width, kind->depth_ratio, kind->depth_least, kind->depth_most);
    row.rod_m = now ? plan->seal.rod_m : plan_next_size(rods, count, 1.25 * width);
    net = quantity_bead(length, width, row.depth_m);
    if (plan->job.takeoff_rod_cusps && plan->job.sealant_backing == BACKING_ROD)
        net += quantity_cusps(length, width);
    row.order_m3 = quantity_order(net, plan->job.takeoff_waste) + plan->quantities.loss_m3;
    row.packs = packs_for(plan, row.order_m3);
    return row;
}

static void add_width(struct plan *plan, double width, bool now)
{
    if (plan->quantities.width_count < WIDTH_MOST)
        plan->quantities.widths[plan->quantities.width_count++] = width_row(plan, width, now);
}

/* From the blade below the first that does not fail up to the first that takes one cut in three;
 * the job's own width at its place. */
void plan_set_other_widths(struct plan *plan)
{
    const struct sealant_row *kind = &sealant_table[plan->job.sealant_kind];
    struct plan_worst worst = plan_worst_movement(plan);
    double blades[PLAN_BLADES_MOST], own = plan->seal.width_m;
    size_t count = plan_blades(plan, blades), first = 0;
    bool placed = false, enough = false;

    if (!plan->seal.sealed || plan->working_count < 3 || !(plan->quantities.sealed_m > 0))
        return;
    while (first < count &&
           (blades[first] < kind->width_least - 1e-9 ||
            plan_seal_verdict(plan, worst.open, worst.close, blades[first]) == VERDICT_FAILS))
        first++;
    first -= first > 0 && blades[first - 1] >= kind->width_least - 1e-9;
    for (size_t i = first; i < count && !(placed && enough); i++) {
        if (!placed && own <= blades[i] + 1e-9) {
            add_width(plan, own, true);
            placed = true;
            if (fabs(own - blades[i]) < 1e-6)
                continue;
        }
        if (enough || blades[i] > kind->width_most + 1e-9)
            continue;
        add_width(plan, blades[i], false);
        enough = plan_seal_verdict(plan, plan->working[2].open_m, plan->working[2].close_m,
                                   blades[i]) != VERDICT_FAILS;
    }
    if (!placed)
        add_width(plan, own, true);
}
