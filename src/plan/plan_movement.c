/* How much every joint moves. */
#include "core/friction_bar.h"
#include "core/movement.h"
#include "plan/bars.h"
#include "plan/plan_steps.h"
#include <math.h>
#include <stdlib.h>
#include <string.h>

/* Longer bars are taken as free: history matters for them. */
static const double free_bar_m = 15;

bool plan_by_factor(const struct plan *plan)
{
    return plan->job.sealing_movement == MOVEMENT_FACTOR;
}

static double end_movement(const struct plan *plan, double length, double strain)
{
    struct friction_bar bar = {
        .length_m = length,
        .thickness_m = plan->job.slab_thickness,
        .modulus_pa = plan->concrete.modulus_pa,
        .friction = plan->job.base_friction_low,
        .unit_weight = plan->job.concrete_unit_weight,
        .slip_m = plan->job.base_slip,
    };

    if (!(length > 0))
        return 0;
    return length > free_bar_m ? length / 2 * strain : friction_bar_load(&bar, strain).end_m;
}

double plan_joint_movement(const struct plan *plan, bool factor, double l1, double l2,
                           double strain)
{
    if (factor)
        return plan->job.sealing_factor * (l1 + l2) / 2 * strain;
    return end_movement(plan, l1, strain) + end_movement(plan, l2, strain);
}

double plan_open_strain(const struct plan *plan)
{
    return fmax(0, plan->concrete.expansion_k *
                           (plan->temperature.sealing_c - plan->temperature.coldest_c) +
                       plan->shrinkage.after_sealing);
}

double plan_close_strain(const struct plan *plan)
{
    return movement_strain(plan->concrete.expansion_k,
                           fmax(0, plan->temperature.hottest_c - plan->temperature.sealing_c), 0);
}

bool plan_joint_tied(const struct plan *plan, const struct layout_joint *joint)
{
    if (joint->kind != LAYOUT_CONSTRUCTION)
        return false;
    return (joint->along_pour ? plan->job.pours_along : plan->job.pours_across) == JOINING_TIED;
}

static void set_joint(struct plan *plan, const struct bars *bars, size_t j)
{
    const struct layout_joint *at = &plan->layout.joints[j];
    struct plan_joint *joint = &plan->joints[j];
    double left = bars_length(bars, j, +1), right = bars_length(bars, j, -1);

    *joint = (struct plan_joint){
        .tied = bars->tied[j],
        .length_m = hypot(at->x2 - at->x1, at->y2 - at->y1),
        .open_m = 0,
        .close_m = 0,
        .width_m = NAN,
        .extension = NAN,
        .compression = NAN,
        .left_m = left,
        .right_m = right,
        .run_m = left > 0 && right > 0 ? (left + right) / 2 : left + right,
        .verdict = VERDICT_NONE,
    };
    if (joint->tied)
        return;
    /* an isolation joint opens by its one neighbour; its closing is that of the run behind it and
     * is set with the isolation rows */
    joint->open_m =
        plan_joint_movement(plan, plan_by_factor(plan), left, right, plan_open_strain(plan));
    joint->close_m =
        plan_joint_movement(plan, plan_by_factor(plan), left, right, plan_close_strain(plan));
}

/* The contraction joint that moves most, else (no contraction joint) the construction joint. */
static size_t find_governing(const struct plan *plan)
{
    size_t best = SIZE_MAX;

    for (int kind = LAYOUT_CONTRACTION; kind <= LAYOUT_CONSTRUCTION && best == SIZE_MAX; kind++)
        for (size_t j = 0; j < plan->layout.joint_count; j++) {
            const struct plan_joint *joint = &plan->joints[j];
            if ((int)plan->layout.joints[j].kind != kind || joint->tied)
                continue;
            if (best == SIZE_MAX ||
                joint->open_m + joint->close_m >
                    (plan->joints[best].open_m + plan->joints[best].close_m) * (1 + 1e-9))
                best = j;
        }
    return best;
}

static void set_movement(struct plan *plan, double left, double right)
{
    double opens = plan_open_strain(plan), closes = plan_close_strain(plan);
    bool factor = plan_by_factor(plan);

    plan->movement.left_m = left;
    plan->movement.right_m = right;
    plan->movement.panel_m = left > 0 && right > 0 ? (left + right) / 2 : left + right;
    plan->movement.factor_open_m = plan_joint_movement(plan, true, left, right, opens);
    plan->movement.factor_close_m = plan_joint_movement(plan, true, left, right, closes);
    plan->movement.friction_open_m = plan_joint_movement(plan, false, left, right, opens);
    plan->movement.friction_close_m = plan_joint_movement(plan, false, left, right, closes);
    plan->movement.open_m = factor ? plan->movement.factor_open_m : plan->movement.friction_open_m;
    plan->movement.close_m =
        factor ? plan->movement.factor_close_m : plan->movement.friction_close_m;
}

static enum status set_joints(struct plan *plan)
{
    struct bars bars;
    enum status status = bars_make(plan, &bars);

    if (status != STATUS_OK)
        return status;
    plan->joints = calloc(plan->layout.joint_count + 1, sizeof *plan->joints);
    if (plan->joints == NULL)
        status = STATUS_NO_MEMORY;
    for (size_t j = 0; status == STATUS_OK && j < plan->layout.joint_count; j++)
        set_joint(plan, &bars, j);
    bars_free(&bars);
    return status;
}

enum status plan_set_movement(struct plan *plan)
{
    enum status status;

    plan->movement.basis = plan_by_factor(plan) ? "factor" : "friction";
    plan->movement.factor = plan->job.sealing_factor;
    if (!plan->has_outline) { /* one joint between two panels of the limit */
        set_movement(plan, plan->spacing.limit_m, plan->spacing.limit_m);
        return STATUS_OK;
    }
    status = set_joints(plan);
    if (status != STATUS_OK)
        return status;
    plan->governing_joint = find_governing(plan);
    if (plan->governing_joint != SIZE_MAX)
        set_movement(plan, plan->joints[plan->governing_joint].left_m,
                     plan->joints[plan->governing_joint].right_m);
    return STATUS_OK;
}

/* ---- one joint in n works ---- */

/* The bar is n panels long and moves freely; the factor's value is n times the uniform one. */
double plan_working_movement(const struct plan *plan, int n, double bar_m, double strain,
                             double one_m)
{
    if (n <= 1 || plan_by_factor(plan))
        return n * one_m;
    return n * bar_m * strain;
}
