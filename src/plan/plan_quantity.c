/* The take-off: metres by kind, sealant, packages, rod, tape, board, compression seal. */
#include "core/quantity.h"
#include "core/sealant.h"
#include "job/table.h"
#include "plan/plan_steps.h"
#include <math.h>

static void add_lengths(struct plan *plan)
{
    for (size_t j = 0; j < plan->layout.joint_count; j++) {
        const struct layout_joint *joint = &plan->layout.joints[j];
        double length = plan->joints[j].length_m;
        switch (joint->kind) {
        case LAYOUT_CONTRACTION:
            plan->quantities.contraction_m += length;
            break;
        case LAYOUT_CONSTRUCTION:
            plan->quantities.construction_m += length;
            break;
        case LAYOUT_ISOLATION:
            if (joint->expansion)
                plan->quantities.expansion_m += length;
            else
                plan->quantities.isolation_m += length;
            break;
        }
    }
    plan->quantities.saw_m = plan->quantities.contraction_m;
    plan->quantities.filler_m2 =
        (plan->quantities.isolation_m + plan->quantities.expansion_m) * plan->job.slab_thickness;
}

static void set_packages(struct plan *plan)
{
    const struct numbers *sizes = &plan->job.takeoff_packages;
    int counts[NUMBERS_MOST];
    double left;
    enum status status = quantity_packages(sizes->items, sizes->count,
                                           plan->quantities.sealant_order_m3, counts, &left);

    if (status == STATUS_NO_MEMORY) {
        plan->findings.failed = true;
        return;
    }
    if (status != STATUS_OK) {
        finding_add(&plan->findings, SEVERITY_WARNING, "takeoff.packages", "", "", 0, 0,
                    "takeoff.packages: more than a million of these packs would be needed; type a "
                    "larger size.");
        return;
    }
    for (size_t i = 0; i < sizes->count; i++)
        plan->quantities.packages[plan->quantities.package_count++] =
            (struct plan_package){.size_m3 = sizes->items[i], .count = counts[i]};
    if (plan->job.takeoff_box > 1)
        plan->quantities.boxes = quantity_boxes(counts[0], (int)lround(plan->job.takeoff_box));
}

static const double spare = 1.05; /* of rod and of seal: common practice */

/* Board of one thickness on one line, and the bead over it: as wide as the board, as deep as the
 * kind asks, on the board and so without a rod. */
static struct plan_board *board_of(struct plan *plan, double thickness_m)
{
    for (size_t i = 0; i < plan->quantities.board_count; i++)
        if (fabs(plan->quantities.boards[i].thickness_m - thickness_m) < 1e-6)
            return &plan->quantities.boards[i];
    if (plan->quantities.board_count == BOARD_MOST)
        return &plan->quantities.boards[BOARD_MOST - 1]; /* more thicknesses than any stock has */
    plan->quantities.boards[plan->quantities.board_count] =
        (struct plan_board){.thickness_m = thickness_m};
    return &plan->quantities.boards[plan->quantities.board_count++];
}

static void set_boards(struct plan *plan)
{
    const struct sealant_row *kind = &sealant_table[plan->job.sealant_kind];
    double net = 0;

    for (size_t j = 0; j < plan->layout.joint_count; j++) {
        double width = plan->joints[j].width_m, length = plan->joints[j].length_m;
        struct plan_board *board;
        if (plan->layout.joints[j].kind != LAYOUT_ISOLATION || isnan(width))
            continue;
        board = board_of(plan, width);
        board->length_m += length;
        board->area_m2 += length * plan->job.slab_thickness;
        if (plan->job.sealant_kind > SEALANT_HOT_POUR)
            continue;
        plan->quantities.board_m += length;
        net += quantity_bead(
            length, width,
            sealant_depth(width, kind->depth_ratio, kind->depth_least, kind->depth_most));
    }
    if (net > 0)
        plan->quantities.board_order_m3 = quantity_order(net, plan->job.takeoff_waste);
}

/* What lies under the bead. */
static void set_backing(struct plan *plan)
{
    double length = plan->quantities.sealed_m * spare;

    if (plan->job.sealant_kind > SEALANT_HOT_POUR)
        return;
    if (plan->job.sealant_backing == BACKING_TAPE)
        plan->quantities.tape_m = length;
    if (plan->job.sealant_backing != BACKING_ROD || !(plan->seal.rod_m > 0))
        return;
    plan->quantities.rods[0] =
        (struct plan_rod){.diameter_m = plan->seal.rod_m, .length_m = length};
    plan->quantities.rod_count = 1;
}

static void set_sealant(struct plan *plan)
{
    double sealed = plan->quantities.sealed_m, width = plan->seal.width_m;
    bool rod =
        plan->job.sealant_kind <= SEALANT_HOT_POUR && plan->job.sealant_backing == BACKING_ROD;

    if (plan->job.sealant_kind == SEALANT_COMPRESSION_SEAL && sealed > 0)
        plan->quantities.strip_m = sealed * spare;
    if (isnan(width) || isnan(plan->seal.depth_m) || !(sealed > 0))
        return;
    plan->quantities.sealant_net_m3 = quantity_bead(sealed, width, plan->seal.depth_m);
    plan->quantities.sealant_cusps_m3 = rod ? quantity_cusps(sealed, width) : 0;
    plan->quantities.sealant_order_m3 =
        quantity_order(plan->quantities.sealant_net_m3 +
                           (plan->job.takeoff_rod_cusps ? plan->quantities.sealant_cusps_m3 : 0),
                       plan->job.takeoff_waste) +
        plan->quantities.loss_m3;
    plan->quantities.primer_m2 = 2 * sealed * plan->seal.depth_m;
    set_packages(plan);
    set_backing(plan);
}

void plan_set_quantities(struct plan *plan)
{
    add_lengths(plan);
    plan->quantities.sealed_m = plan->quantities.contraction_m + plan->quantities.construction_m;
    plan->quantities.length_typed = isfinite(plan->job.takeoff_length);
    if (plan->quantities.length_typed)
        plan->quantities.sealed_m = plan->job.takeoff_length;
    if (plan->has_outline) {
        plan->quantities.area_m2 = plan->layout.area;
        plan->quantities.volume_m3 = plan->layout.area * plan->job.slab_thickness;
    }
    if (plan->job.sealant_kind == SEALANT_NONE)
        plan->quantities.sealed_m = 0;
    plan_set_work(plan);
    set_sealant(plan);
    set_boards(plan);
    plan_set_batch(plan);
    plan_set_cost(plan);
    plan_set_other_widths(plan);
}
