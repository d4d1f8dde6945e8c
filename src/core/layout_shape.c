/* Runs every way that fits a slab with slanting or curved sides and keeps the best plan. */
#include "core/layout_shape.h"
#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

static void drop_result(struct layout *out)
{
    free(out->joints);
    for (size_t i = 0; i < out->panel_count; i++) {
        free(out->panels[i].ring);
        free(out->panels[i].reasons);
    }
    free(out->panels);
    free(out->boxes);
    free(out->reasons);
}

/* Moves panels, joints, boxes and reasons from one to the other, which must hold none. */
static void move_result(struct layout *to, struct layout *from)
{
    to->joints = from->joints;
    to->joint_count = from->joint_count;
    to->panels = from->panels;
    to->panel_count = from->panel_count;
    to->boxes = from->boxes;
    to->box_count = from->box_count;
    to->reasons = from->reasons;
    to->reason_count = from->reason_count;
    to->violations = from->violations;
    to->area = from->area;
    from->joints = NULL;
    from->panels = NULL;
    from->boxes = NULL;
    from->reasons = NULL;
    from->joint_count = from->panel_count = from->box_count = from->reason_count = 0;
    from->violations = 0;
    from->area = 0;
}

static double joint_length(const struct layout *out)
{
    double length = 0;
    for (size_t i = 0; i < out->joint_count; i++) {
        const struct layout_joint *j = &out->joints[i];
        if (j->edge < 0 && j->opening < 0)
            length +=
                hypot(j->x2 - j->x1, j->y2 - j->y1) * (j->kind == LAYOUT_CONTRACTION ? 1 : 2.5);
    }
    return length;
}

enum status trials_judge(struct trials *t)
{
    struct layout *out = t->w->out;
    const enum status status = layout_check_panels(t->w);
    if (status)
        return status;
    t->w->slab.evaluations += 100 * (out->panel_count + out->joint_count);
    const double length = joint_length(out);
    t->last_is_best = !t->any || out->violations < t->best.violations ||
                      (out->violations == t->best.violations && length < t->best_length - 1e-6);
    if (t->last_is_best) {
        drop_result(&t->best);
        t->best = (struct layout){0};
        move_result(&t->best, out);
        t->best_length = length;
        t->any = true;
    } else {
        struct layout none = {0};
        move_result(&none, out);
        drop_result(&none);
    }
    return STATUS_OK;
}

enum status trials_run(struct trials *t, const struct plane *plane)
{
    enum status status = plane_emit(t->w, plane);
    if (!status)
        status = trials_judge(t);
    return status;
}

bool trials_go_on(const struct trials *t)
{
    const struct layout_input *in = t->w->input;
    if (in->go_on && !in->go_on(in->context, (double)t->w->slab.evaluations / (double)t->allowed))
        return false;
    return t->w->slab.evaluations < t->allowed;
}

static bool is_convex(const struct layout *out)
{
    bool left = false, right = false;
    for (size_t i = 0; i < out->outline_count; i++) {
        const struct layout_point a = out->outline[i],
                                  b = out->outline[(i + 1) % out->outline_count];
        const struct layout_point c = out->outline[(i + 2) % out->outline_count];
        const double turn = (b.x - a.x) * (c.y - b.y) - (b.y - a.y) * (c.x - b.x);
        left |= turn > 1e-9;
        right |= turn < -1e-9;
    }
    return left != right;
}

/* Only joints drawn by the user, all of them kept: lines right across a convex outline do. */
static bool is_plain(const struct work *w)
{
    const struct layout_input *in = w->input;
    for (size_t i = 0; i < in->edge_count; i++)
        if (in->edges[i].kind == LAYOUT_EDGE_EXISTING && in->edges[i].joint_count)
            return false;
    return is_convex(w->out) && !w->out->opening_count && !in->object_count && !in->has_pours &&
           in->expansion_every <= 0;
}

static bool has_kept(const struct layout_input *in)
{
    for (size_t i = 0; i < in->drawn_count; i++)
        if (in->drawn[i].keep)
            return true;
    return false;
}

enum status shape_solve(struct work *w)
{
    struct trials t = {.w = w};
    enum status status = STATUS_OK;
    t.allowed = (uint64_t)(2e7 * (w->input->effort > 0 ? w->input->effort : 1));
    if (is_plain(w)) {
        status = layout_convex(w);
        if (!status)
            status = trials_judge(&t);
    }
    const bool user_lines = is_plain(w) && has_kept(w->input);
    if (!status && !user_lines && (!t.any || t.best.violations))
        status = shape_kerb(&t);
    if (!status && !user_lines && (!t.any || t.best.violations))
        status = shape_ruled(&t);
    if (!status && !user_lines && (!t.any || t.best.violations))
        status = shape_grid(&t);
    struct layout none = {0};
    move_result(&none, w->out);
    drop_result(&none);
    move_result(w->out, &t.best);
    return status;
}
