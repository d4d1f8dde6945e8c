/* What the slab does when it may not move, how it curls, and the steel across its joints. */
#include "core/curling.h"
#include "core/mix.h"
#include "core/restraint.h"
#include "core/steel.h"
#include "job/table.h"
#include "plan/bars.h"
#include "plan/plan_steps.h"
#include <math.h>
#include <string.h>

/* ---- curling ---- */

static void largest_panel(const struct plan *plan, double *length, double *width)
{
    *length = plan->spacing.limit_m;
    *width = plan->spacing.across_limit_m;
    for (size_t i = 0; i < plan->layout.panel_count; i++) {
        const struct layout_panel *panel = &plan->layout.panels[i];
        if (i == 0 || panel->length > *length) {
            *length = panel->length;
            *width = panel->width;
        }
    }
}

static void set_curling(struct plan *plan)
{
    const struct job *job = &plan->job;
    struct curling_slab slab = {
        .modulus_pa = plan->concrete.modulus_pa,
        .expansion = plan->concrete.expansion_k,
        .poisson = MIX_POISSON,
        .thickness_m = job->slab_thickness,
        .subgrade_pa_m = job->base_subgrade_modulus,
        .unit_weight = job->concrete_unit_weight,
        .difference_k = fmax(plan->temperature.day_k, plan->temperature.night_k),
    };
    double length, width, radius = plan->concrete.stiffness_radius_m;

    if (!(fabs(slab.difference_k) > 0))
        return;
    largest_panel(plan, &length, &width);
    plan->restraint.bradbury_x = curling_coefficient(length / radius);
    plan->restraint.bradbury_y = curling_coefficient(width / radius);
    plan->restraint.edge_pa = fabs(curling_edge_stress(&slab, plan->restraint.bradbury_x));
    plan->restraint.night_edge_pa =
        plan->restraint.edge_pa * plan->temperature.night_k / slab.difference_k;
    plan->restraint.interior_pa = fabs(
        curling_interior_stress(&slab, plan->restraint.bradbury_x, plan->restraint.bradbury_y));
    plan->restraint.lift_m = fabs(curling_lift(&slab));
    plan->restraint.settlement_m = curling_settlement(&slab);
}

/* ---- held ends ---- */

void plan_set_restraint(struct plan *plan)
{
    const struct job *job = &plan->job;
    double rise = fmax(plan->temperature.hottest_c - plan->temperature.zero_stress_c, 0);
    struct restraint_slab slab = {
        .thickness_m = job->slab_thickness,
        .modulus_pa = plan->concrete.modulus_pa,
        .expansion = plan->concrete.expansion_k,
        .unit_weight = job->concrete_unit_weight,
        .friction = job->base_friction_low,
    };
    double swelling = job->climate_exposure == EXPOSURE_INDOOR ? 0 : RESTRAINT_SWELLING;
    double stiffer;

    set_curling(plan);
    plan->restraint.locked_pa = restraint_locked_stress(slab.modulus_pa, slab.expansion, rise);
    plan->restraint.locked_both_pa =
        restraint_locked_stress_both(slab.modulus_pa, slab.expansion, rise, MIX_POISSON);
    plan->restraint.lift_off_hinge_k = restraint_lift_off(&slab, RESTRAINT_HINGE).rise_k;
    plan->restraint.lift_off_continuous_k = restraint_lift_off(&slab, RESTRAINT_CONTINUOUS).rise_k;
    slab.modulus_pa *= RESTRAINT_STIFFER; /* a stiffer slab lifts earlier */
    stiffer = restraint_lift_off(&slab, RESTRAINT_HINGE).rise_k;
    /* joints full of grit: no closure counts */
    plan->restraint.rise_left_k =
        restraint_rise_left(stiffer, 0, swelling, slab.expansion, plan->temperature.zero_stress_c,
                            plan->temperature.hottest_c);
}

/* ---- steel ---- */

static const struct dowel_row *dowel_row_of(const struct job *job)
{
    static const char *const practice[] = {"plain", "us", "uk", "germany", "australia", "india"};

    for (size_t i = 0; i < dowel_count; i++) {
        const struct dowel_row *row = &dowel_table[i];
        if (strcmp(row->practice, practice[job->job_practice]) == 0 &&
            job->slab_thickness >= row->thickness_least - 1e-9 &&
            (isnan(row->thickness_most) || job->slab_thickness < row->thickness_most - 1e-9))
            return row;
    }
    return NULL;
}

static bool dowelled(const struct plan *plan, size_t j)
{
    const struct layout_joint *joint = &plan->layout.joints[j];
    int joining = joint->along_pour ? plan->job.pours_along : plan->job.pours_across;

    if (joint->kind == LAYOUT_CONSTRUCTION)
        return joining == JOINING_DOWELLED;
    return joint->kind == LAYOUT_CONTRACTION && plan->job.slab_dowels.diameter > 0;
}

static void size_dowels(struct plan *plan)
{
    const struct job *job = &plan->job;
    const struct dowel_row *row = dowel_row_of(job);

    if (job->slab_dowels.diameter > 0) {
        plan->steel.dowel_diameter_m = job->slab_dowels.diameter;
        plan->steel.dowel_length_m = job->slab_dowels.length;
        plan->steel.dowel_spacing_m = job->slab_dowels.spacing;
    } else if (row != NULL) {
        plan->steel.dowel_diameter_m = row->diameter;
        plan->steel.dowel_length_m = row->length;
        plan->steel.dowel_spacing_m = row->spacing;
    } else { /* d = h/8; length and spacing: common practice */
        plan->steel.dowel_diameter_m = steel_dowel_diameter(job->slab_thickness);
        plan->steel.dowel_length_m = job->job_units == UNITS_US ? 18 * 0.0254 : 0.45;
        plan->steel.dowel_spacing_m = job->job_units == UNITS_US ? 12 * 0.0254 : 0.30;
    }
}

static void set_dowels(struct plan *plan)
{
    const struct job *job = &plan->job;
    bool any = job->slab_dowels.diameter > 0 && !plan->has_outline;

    for (size_t j = 0; j < plan->layout.joint_count; j++)
        any = any || dowelled(plan, j);
    if (job->slab_dowels.diameter > 0 && !steel_dowels_fit(job->slab_thickness))
        finding_add(&plan->findings, SEVERITY_WARNING, "slab.dowels", "", "180 mm", 0, 0,
                    "slab.dowels: a slab thinner than about 180 mm (7 in) usually gets none: there "
                    "is too little concrete over the bar. Ask the designer.");
    if (!any || (!(job->slab_dowels.diameter > 0) && !steel_dowels_fit(job->slab_thickness)))
        return;
    size_dowels(plan);
    for (size_t j = 0; j < plan->layout.joint_count; j++)
        if (dowelled(plan, j))
            plan->steel.dowel_count +=
                steel_bar_count(plan->joints[j].length_m, plan->steel.dowel_spacing_m,
                                plan->steel.dowel_spacing_m / 2);
}

/* Free width: from the tied joint to the nearest joint that moves, the larger over all tied joints;
 * each is tied to the narrower of its two sides. */
static double tied_width(const struct plan *plan)
{
    double widest = 0;

    for (size_t j = 0; plan->joints != NULL && j < plan->layout.joint_count; j++)
        if (plan->joints[j].tied)
            widest = fmax(widest, fmin(plan->joints[j].left_m, plan->joints[j].right_m));
    return widest;
}

static void set_ties(struct plan *plan)
{
    const struct job *job = &plan->job;
    double usual = job->job_units == UNITS_US ? 0.0127 : 0.012; /* common practice */
    struct steel_ties ties = {
        .free_width_m = tied_width(plan),
        .thickness_m = job->slab_thickness,
        .unit_weight = job->concrete_unit_weight,
        .friction = job->base_friction,
        .bar_m = job->slab_ties.diameter > 0 ? job->slab_ties.diameter : usual,
        .steel_pa = STEEL_DEFORMED_PA,
        .bond_pa = STEEL_DEFORMED_BOND_PA,
    };
    struct steel_tie_result result;

    if (!(ties.free_width_m > 0))
        return;
    result = steel_ties(&ties);
    plan->steel.tie_diameter_m = ties.bar_m;
    plan->steel.tie_spacing_m =
        job->slab_ties.diameter > 0 ? job->slab_ties.spacing : result.spacing_m;
    plan->steel.tie_length_m =
        job->slab_ties.diameter > 0 ? job->slab_ties.length : result.length_m;
    if (job->slab_ties.diameter > 0 && job->slab_ties.spacing > result.exact_spacing_m * (1 + 1e-6))
        finding_add(
            &plan->findings, SEVERITY_WARNING, "slab.ties", "", "", 0, 0,
            "slab.ties: these bars carry the drag of the slab only to a spacing of %.0f mm; "
            "set them closer or take thicker ones.",
            result.exact_spacing_m * 1000);
}

void plan_set_steel(struct plan *plan)
{
    const struct job *job = &plan->job;
    double length, width;

    set_dowels(plan);
    set_ties(plan);
    if (!job->slab_reinforced)
        return;
    largest_panel(plan, &length, &width);
    plan->steel.drag_steel_m2_per_m =
        steel_drag(job->base_friction, length, job->concrete_unit_weight * job->slab_thickness,
                   STEEL_DEFORMED_PA);
}
