/* Cracks that are there already: which panels they cross, and which joint they make needless. A
 * crack that runs beside a planned joint does that joint's work: sawing next to it gives a spalled
 * strip. */
#include "plan/plan_steps.h"
#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

static const double sample_m = 0.05;
/* A crack within this share of the spacing beside a line, and this parallel, takes its place:
 * common practice is to leave out the sawing beside a crack. */
static const double beside_share = 0.25;
static const double parallel_cos = 0.94; /* within 20 degrees */

static bool inside(const struct layout_panel *panel, double x, double y)
{
    bool in = false;

    for (size_t i = 0, j = panel->count - 1; i < panel->count; j = i++) {
        const struct layout_point *a = &panel->ring[i], *b = &panel->ring[j];
        if ((a->y > y) != (b->y > y) && x < (b->x - a->x) * (y - a->y) / (b->y - a->y) + a->x)
            in = !in;
    }
    return in;
}

static int panel_at(const struct layout *layout, double x, double y)
{
    for (size_t i = 0; i < layout->panel_count; i++)
        if (inside(&layout->panels[i], x, y))
            return (int)i;
    return -1;
}

static double distance_to(const struct layout_joint *joint, double x, double y)
{
    double dx = joint->x2 - joint->x1, dy = joint->y2 - joint->y1, length = hypot(dx, dy);
    double t = length > 0 ? ((x - joint->x1) * dx + (y - joint->y1) * dy) / (length * length) : 0;

    t = fmax(0, fmin(1, t));
    return hypot(joint->x1 + t * dx - x, joint->y1 + t * dy - y);
}

/* Length of the crack inside a panel grows by the sample. */
static void note_panel(struct plan_crack *crack, int panel, double length)
{
    for (size_t i = 0; i < crack->panel_count; i++)
        if (crack->panels[i].panel == panel) {
            crack->panels[i].length_m += length;
            return;
        }
    if (panel >= 0 && crack->panel_count < CRACK_PANELS)
        crack->panels[crack->panel_count++] = (struct plan_crack_panel){panel, length};
}

/* Walks along the polyline; `at` is called with the middle of every sample and its length. */
static void walk(const struct rows *rows,
                 void (*at)(void *context, double x, double y, double length), void *context)
{
    for (size_t i = 0; i + 1 < rows->count; i++) {
        const struct row *a = &rows->items[i], *b = &rows->items[i + 1];
        double length = hypot(b->x - a->x, b->y - a->y);
        int steps = (int)fmin(ceil(length / sample_m), 100000);
        for (int s = 0; s < steps; s++) {
            double t = (s + 0.5) / steps;
            at(context, a->x + t * (b->x - a->x), a->y + t * (b->y - a->y), length / steps);
        }
    }
}

struct panels_walk {
    const struct layout *layout;
    struct plan_crack *crack;
};

static void take_panel(void *context, double x, double y, double length)
{
    struct panels_walk *walked = context;

    walked->crack->length_m += length;
    note_panel(walked->crack, panel_at(walked->layout, x, y), length);
}

struct joint_walk {
    const struct layout_joint *joint;
    double sum, length;
};

static void take_distance(void *context, double x, double y, double length)
{
    struct joint_walk *walked = context;

    walked->sum += distance_to(walked->joint, x, y) * length;
    walked->length += length;
}

/* The contraction joint that the crack runs beside. */
static void find_needless(const struct plan *plan, const struct rows *rows,
                          struct plan_crack *crack)
{
    const struct row *first = &rows->items[0], *last = &rows->items[rows->count - 1];
    double dx = last->x - first->x, dy = last->y - first->y, length = hypot(dx, dy);
    double best = beside_share * plan->spacing.limit_m;

    for (size_t j = 0; j < plan->layout.joint_count && length > 0; j++) {
        const struct layout_joint *joint = &plan->layout.joints[j];
        struct joint_walk walked = {.joint = joint};
        double jx = joint->x2 - joint->x1, jy = joint->y2 - joint->y1, own = hypot(jx, jy);
        if (joint->kind != LAYOUT_CONTRACTION || own <= 0 ||
            fabs(jx * dx + jy * dy) < parallel_cos * own * length)
            continue;
        walk(rows, take_distance, &walked);
        if (walked.length > 0 && walked.sum / walked.length < best) {
            best = walked.sum / walked.length;
            crack->joint = (int)j;
            crack->distance_m = best;
        }
    }
}

static void say(struct plan *plan, size_t number, const struct plan_crack *crack)
{
    struct text field = {0}, distance = {0};
    struct finding_list *findings = &plan->findings;

    text_format(&field, "crack.%zu", number);
    if (crack->panel_count == 0)
        finding_add(findings, SEVERITY_WARNING, text_string(&field), "", "", 0, 0,
                    "crack %zu lies off every panel; check its points.", number);
    else if (crack->joint >= 0) {
        unit_show(&distance, crack->distance_m, QUANTITY_SMALL_LENGTH,
                  (enum unit_system)plan->job.job_units);
        finding_add(findings, SEVERITY_NOTE, text_string(&field), "", "", 0, 0,
                    "crack %zu runs %s beside joint %s and does its work: do not saw there (keep = "
                    "no); rout the crack and seal it like a joint.",
                    number, text_string(&distance), plan->layout.joints[crack->joint].id);
    } else {
        finding_add(
            findings, SEVERITY_NOTE, text_string(&field), "", "", 0, 0,
            "crack %zu parts %zu panel%s: each counts as two from now on. Rout and seal it; "
            "under heavy wheels stitch it across or replace the panel.",
            number, crack->panel_count, crack->panel_count == 1 ? "" : "s");
    }
    text_free(&field);
    text_free(&distance);
}

enum status plan_set_cracks(struct plan *plan)
{
    const struct job *job = &plan->job;

    if (job->crack_count == 0 || !plan->has_outline)
        return STATUS_OK;
    plan->cracks = calloc(job->crack_count, sizeof *plan->cracks);
    if (plan->cracks == NULL)
        return STATUS_NO_MEMORY;
    for (size_t i = 0; i < job->crack_count; i++) {
        struct plan_crack *crack = &plan->cracks[plan->crack_count++];
        struct panels_walk walked = {&plan->layout, crack};
        *crack = (struct plan_crack){.number = (int)i + 1, .joint = -1, .distance_m = NAN};
        if (job->cracks[i].rows.count < 2)
            continue;
        walk(&job->cracks[i].rows, take_panel, &walked);
        crack->panels_crossed = (int)crack->panel_count;
        find_needless(plan, &job->cracks[i].rows, crack);
        if (crack->joint >= 0)
            snprintf(crack->beside, sizeof crack->beside, "%s",
                     plan->layout.joints[crack->joint].id);
        say(plan, i + 1, crack);
    }
    return STATUS_OK;
}
