/* Soft board at walls, objects and expansion joints: what pushes, how thick, whether the seal on it
 * holds. */
#include "core/isolation.h"
#include "plan/plan_steps.h"
#include "plan/run.h"
#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

struct direction {
    double x, y;
};

/* ---- which joints make one row ---- */

/* Line id of a joint piece: "J4.1" -> "J4". */
static void line_id(const struct layout_joint *joint, char *out, size_t size)
{
    size_t length = strcspn(joint->id, ".");

    snprintf(out, size, "%.*s", (int)length, joint->id);
}

static void name_row(const struct plan *plan, const struct layout_joint *joint, char *where,
                     size_t size)
{
    char line[48];

    line_id(joint, line, sizeof line);
    if (joint->edge >= 0)
        for (size_t i = 0; i < plan->layout.edge_count; i++) {
            if ((int)plan->layout.edges[i].index != joint->edge)
                continue;
            snprintf(where, size, "edge %zu", plan->layout.edges[i].edge);
            return;
        }
    if (joint->object >= 0)
        snprintf(where, size, "%s", plan->job.objects[joint->object].name);
    else if (joint->opening >= 0)
        snprintf(where, size, "opening %s", plan->job.openings[joint->opening].name);
    else
        snprintf(where, size, "%s %s", joint->expansion ? "expansion joint" : "isolation joint",
                 line);
}

static struct plan_isolation *row_named(struct plan *plan, const char *where)
{
    struct plan_isolation *row;

    for (size_t i = 0; i < plan->isolation_count; i++)
        if (strcmp(plan->isolation[i].where, where) == 0)
            return &plan->isolation[i];
    row = &plan->isolation[plan->isolation_count++];
    *row = (struct plan_isolation){.extension = NAN, .compression = NAN, .verdict = VERDICT_NONE};
    snprintf(row->where, sizeof row->where, "%s", where);
    return row;
}

/* ---- the run that pushes ---- */

/* Slab that pushes on the joint from one side: the longest of several rays along it. */
static double pushing(const struct stop_list *stops, const struct layout_joint *joint,
                      struct direction to, bool fixed)
{
    enum { RAYS = 9 };
    double longest = 0;

    for (int i = 0; i < RAYS; i++) {
        double share = (i + 0.5) / RAYS;
        enum stop stop;
        double run = stop_list_run(stops, joint->x1 + share * (joint->x2 - joint->x1),
                                   joint->y1 + share * (joint->y2 - joint->y1), to.x, to.y, &stop);
        longest = fmax(longest, stop_pushing(run, stop, fixed));
    }
    return longest;
}

static struct direction left_of(const struct layout_joint *joint)
{
    double dx = joint->x2 - joint->x1, dy = joint->y2 - joint->y1, length = hypot(dx, dy);

    if (length < 1e-9)
        return (struct direction){0, 0};
    return (struct direction){-dy / length, dx / length};
}

/* A box is pushed along the slab's axes, not square to its slanting sides. */
static double pushing_on_object(const struct plan *plan, const struct stop_list *stops,
                                const struct layout_joint *joint)
{
    const struct object *object = &plan->job.objects[joint->object];
    double turn = plan->job.rules_axis * 3.14159265358979323846 / 180, longest = 0;
    double ax = (joint->x1 + joint->x2) / 2 - object->x,
           ay = (joint->y1 + joint->y2) / 2 - object->y;

    for (int quarter = 0; quarter < 4; quarter++) {
        static const int c[] = {1, 0, -1, 0}, s[] = {0, 1, 0, -1};
        struct direction to = {c[quarter] * cos(turn) - s[quarter] * sin(turn),
                               c[quarter] * sin(turn) + s[quarter] * cos(turn)};
        if (to.x * ax + to.y * ay > 1e-6)
            longest = fmax(longest, pushing(stops, joint, to, true));
    }
    return longest;
}

static double run_of(const struct plan *plan, const struct stop_list *stops, size_t j)
{
    const struct layout_joint *joint = &plan->layout.joints[j];
    struct direction left = left_of(joint), right = {-left.x, -left.y};
    bool wall = joint->edge >= 0 || joint->opening >= 0;

    if (joint->object >= 0)
        return pushing_on_object(plan, stops, joint);
    if (wall) /* the slab lies on one side only */
        return pushing(stops, joint, plan->joints[j].left_m > 0 ? left : right, true);
    return pushing(stops, joint, left, false) + pushing(stops, joint, right, false);
}

/* ---- board and seal ---- */

/* Width at sealing over a board: warmer than at set, the slab has taken some of it already; colder
 * counts for nothing. */
static double width_over(const struct plan *plan, double run_m, double filler_m)
{
    return filler_m - isolation_demand(plan->concrete.expansion_k, plan->temperature.zero_stress_c,
                                       plan->temperature.sealing_c, run_m);
}

static struct sealant_strain strains_over(const struct plan *plan, const struct plan_isolation *row,
                                          double filler_m)
{
    double close = plan_close_strain(plan) * row->run_m;

    return plan_strains(plan, row->opening_m, close, width_over(plan, row->run_m, filler_m));
}

/* Worst of board and seal as a share of what each stands, tolerance in. */
static double demand(const struct plan *plan, const struct plan_isolation *row, double filler_m)
{
    double worst = row->least_filler_m / filler_m;
    struct sealant_capacity capacity;

    if (plan_capacity(plan, &capacity.extension, &capacity.compression))
        worst = fmax(worst,
                     sealant_demand(strains_over(plan, row, filler_m - plan->job.sealing_tolerance),
                                    capacity));
    return worst;
}

static double choose_board(const struct plan *plan, const struct plan_isolation *row)
{
    const double usual_m = 0.0095; /* from 10 mm, 3/8 in: common practice */
    double boards[PLAN_BLADES_MOST];
    size_t count = plan_boards(plan, boards);

    for (size_t i = 0; i < count; i++)
        if (boards[i] >= usual_m && demand(plan, row, boards[i]) <= 0.9)
            return boards[i];
    return boards[count - 1];
}

static void finish_row(struct plan *plan, struct plan_isolation *row)
{
    double extension, compression;
    struct sealant_strain strains;

    row->from_c = plan->temperature.zero_stress_c;
    row->expansion_m = isolation_demand(plan->concrete.expansion_k, row->from_c,
                                        plan->temperature.hottest_c, row->run_m);
    row->least_filler_m = isolation_filler(row->expansion_m, plan->job.isolation_share);
    row->filler_m =
        isfinite(plan->job.isolation_filler) ? plan->job.isolation_filler : choose_board(plan, row);
    row->verdict = verdict_of(demand(plan, row, row->filler_m), 1);
    if (!plan_capacity(plan, &extension, &compression))
        return;
    strains = strains_over(plan, row, row->filler_m);
    row->extension = strains.extension;
    row->compression = strains.compression;
}

/* What the row says holds for every piece of joint in it. */
static void finish_joint(struct plan *plan, size_t j, const struct plan_isolation *row)
{
    struct plan_joint *joint = &plan->joints[j];

    joint->close_m = plan_close_strain(plan) * row->run_m;
    joint->width_m = row->filler_m;
    joint->extension = row->extension;
    joint->compression = row->compression;
    joint->verdict = row->verdict;
}

/* The seal opens by the slab beside it; when one joint in n works, by n panels of it. */
static double opening(const struct plan *plan, const struct plan_joint *joint)
{
    int n = (int)lround(plan->job.sealing_working);

    return plan_working_movement(plan, n, (joint->left_m + joint->right_m) / 2,
                                 plan_open_strain(plan), joint->open_m);
}

static void make_rows(struct plan *plan, const struct stop_list *stops)
{
    for (size_t j = 0; j < plan->layout.joint_count; j++) {
        const struct layout_joint *joint = &plan->layout.joints[j];
        struct plan_isolation *row;
        char where[sizeof row->where];
        if (joint->kind != LAYOUT_ISOLATION)
            continue;
        name_row(plan, joint, where, sizeof where);
        row = row_named(plan, where);
        row->length_m += plan->joints[j].length_m;
        row->run_m = fmax(row->run_m, run_of(plan, stops, j));
        row->opening_m = fmax(row->opening_m, opening(plan, &plan->joints[j]));
    }
    for (size_t i = 0; i < plan->isolation_count; i++)
        finish_row(plan, &plan->isolation[i]);
    for (size_t j = 0; j < plan->layout.joint_count; j++) {
        char where[sizeof plan->isolation->where];
        if (plan->layout.joints[j].kind != LAYOUT_ISOLATION)
            continue;
        name_row(plan, &plan->layout.joints[j], where, sizeof where);
        finish_joint(plan, j, row_named(plan, where));
    }
}

static void note_expansion_joints(struct plan *plan)
{
    if (isfinite(plan->job.rules_expansion_every))
        finding_add(&plan->findings, SEVERITY_NOTE, "rules.expansion-every", "", "", 0, 0,
                    "rules.expansion-every: between expansion joints the cuts creep open over the "
                    "years; look at their sealant and load transfer.");
}

enum status plan_set_isolation(struct plan *plan)
{
    struct stop_list stops;
    size_t count = 0;

    for (size_t j = 0; plan->joints != NULL && j < plan->layout.joint_count; j++)
        count += plan->layout.joints[j].kind == LAYOUT_ISOLATION;
    note_expansion_joints(plan);
    if (count == 0)
        return STATUS_OK;
    plan->isolation = calloc(count, sizeof *plan->isolation);
    if (plan->isolation == NULL || stop_list_make(&plan->layout, &stops) != STATUS_OK)
        return STATUS_NO_MEMORY;
    make_rows(plan, &stops);
    stop_list_free(&stops);
    return STATUS_OK;
}
