/* The sealing table and window, the joint that works alone, the seal of every joint of the plan. */
#include "core/sealant.h"
#include "plan/plan_steps.h"
#include <math.h>

/* ---- sealing table and window ---- */

static double move(const void *context, double strain)
{
    const struct plan *plan = context;

    return plan_joint_movement(plan, plan_by_factor(plan), plan->movement.left_m,
                               plan->movement.right_m, strain);
}

struct sealant_joint plan_sealant_joint(const struct plan *plan)
{
    return (struct sealant_joint){
        .basis = plan_strain_basis(plan),
        .tolerance_m = plan->job.sealing_tolerance,
        .width_m = plan->seal.width_m,
        .cut_c = plan->temperature.cut_c,
        .coldest_c = plan->temperature.coldest_c,
        .hottest_c = plan->temperature.hottest_c,
        .expansion = plan->concrete.expansion_k,
        .shrinkage = plan->shrinkage.after_sealing,
        .move = move,
        .context = plan,
        .capacity = {plan->seal.extension_capacity, plan->seal.compression_capacity},
    };
}

static void add_table_row(struct plan *plan, const struct sealant_joint *joint, double slab_c)
{
    struct sealant_moment at = sealant_row_at(joint, slab_c);
    double least =
        joint->basis == SEALANT_OF_REST
            ? sealant_least_mean_width(at.open_m, at.close_m,
                                       fmin(joint->capacity.extension, joint->capacity.compression))
            : sealant_least_width(at.open_m, at.close_m, joint->capacity, 0);

    if (plan->table_count >= TABLE_MOST)
        return;
    plan->table[plan->table_count++] =
        (struct plan_table_row){.slab_c = slab_c,
                                .gap_m = at.gap_m,
                                .least_m = least + joint->tolerance_m,
                                .extension = at.extension,
                                .compression = at.compression,
                                .verdict = verdict_of(at.demand, 1),
                                .too_cold = slab_c < plan->job.sealing_least_temperature};
}

/* Coldest, whole steps, the sealing temperature at its place, hottest. */
void plan_set_seal_table(struct plan *plan)
{
    struct sealant_joint joint = plan_sealant_joint(plan);
    bool us = plan->job.job_units == UNITS_US;
    double coldest = plan->temperature.coldest_c, hottest = plan->temperature.hottest_c;
    double sealing = plan->temperature.sealing_c;
    double step = us ? 10 / 1.8 : 5, zero = us ? -32 / 1.8 : 0;

    while ((hottest - coldest) / step > TABLE_MOST - 4)
        step *= 2;
    add_table_row(plan, &joint, coldest);
    for (double n = floor((coldest - zero) / step + 1e-6) + 1; zero + n * step < hottest - 1e-6;
         n++) {
        double at = zero + n * step;
        if (sealing > plan->table[plan->table_count - 1].slab_c + 1e-6 && sealing < at - 1e-6)
            add_table_row(plan, &joint, sealing);
        add_table_row(plan, &joint, at);
    }
    if (sealing > plan->table[plan->table_count - 1].slab_c + 1e-6 && sealing < hottest - 1e-6)
        add_table_row(plan, &joint, sealing);
    if (hottest > coldest + 1e-6)
        add_table_row(plan, &joint, hottest);
    sealant_window(&joint, &plan->seal.window_coldest_c, &plan->seal.window_hottest_c);
}

/* ---- the working joint ---- */

static void add_working(struct plan *plan, int n)
{
    struct plan_working *row = &plan->working[plan->working_count++];
    double bar = plan->movement.panel_m;
    struct sealant_strain strains;

    row->n = n;
    row->open_m =
        plan_working_movement(plan, n, bar, plan_open_strain(plan), plan->movement.open_m);
    row->close_m =
        plan_working_movement(plan, n, bar, plan_close_strain(plan), plan->movement.close_m);
    row->verdict = plan_seal_verdict(plan, row->open_m, row->close_m, plan->seal.width_m);
    row->extension = row->compression = row->capacity = NAN;
    if (plan->job.sealant_kind == SEALANT_COMPRESSION_SEAL)
        return;
    strains = plan_strains(plan, row->open_m, row->close_m,
                           plan_width_at_sealing(plan, plan->seal.width_m));
    row->extension = strains.extension;
    row->compression = strains.compression;
    row->capacity = plan->seal.extension_capacity;
}

void plan_set_working(struct plan *plan)
{
    int typed = (int)lround(plan->job.sealing_working);

    if (isnan(plan->movement.open_m) || isnan(plan->seal.width_m))
        return;
    for (int n = 1; n <= 3; n++)
        add_working(plan, n);
    if (typed > 3)
        add_working(plan, typed);
    if (plan->seal.sealed)
        plan->seal.holds_when_n3_m =
            plan_narrowest(plan, plan->working[2].open_m, plan->working[2].close_m);
}

/* ---- every joint ---- */

void plan_set_joint_seals(struct plan *plan)
{
    for (size_t j = 0; plan->joints != NULL && j < plan->layout.joint_count; j++) {
        struct plan_joint *joint = &plan->joints[j];
        struct sealant_strain strains;
        if (plan->layout.joints[j].kind == LAYOUT_ISOLATION || isnan(plan->seal.width_m))
            continue;
        joint->width_m = plan->seal.width_m;
        joint->verdict = plan_seal_verdict(plan, joint->open_m, joint->close_m, joint->width_m);
        if (plan->job.sealant_kind == SEALANT_COMPRESSION_SEAL)
            continue;
        strains = plan_strains(plan, joint->open_m, joint->close_m,
                               plan_width_at_sealing(plan, joint->width_m));
        joint->extension = strains.extension;
        joint->compression = strains.compression;
    }
}
