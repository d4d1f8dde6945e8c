/* The rules each panel must keep, measured on the finished rings, and the reason where one gives.
 */
#include "core/layout_work.h"
#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

bool layout_reason_add(struct layout_reason **list, size_t *count, struct layout_reason reason)
{
    struct layout_reason *more = realloc(*list, (*count + 1) * sizeof *more);
    if (!more)
        return false;
    *list = more;
    more[(*count)++] = reason;
    return true;
}

struct extents {
    double s0, s1, t0, t1;
};

static struct extents extents_along(const struct layout_panel *p, double ux, double uy)
{
    struct extents e = {INFINITY, -INFINITY, INFINITY, -INFINITY};
    for (size_t i = 0; i < p->count; i++) {
        const double s = p->ring[i].x * ux + p->ring[i].y * uy;
        const double t = -p->ring[i].x * uy + p->ring[i].y * ux;
        e.s0 = fmin(e.s0, s);
        e.s1 = fmax(e.s1, s);
        e.t0 = fmin(e.t0, t);
        e.t1 = fmax(e.t1, t);
    }
    return e;
}

/* Smallest-area rectangle: one of its sides lies along a side of the hull; panels are convex, or
 * convex but for the chords of an arc, where a side of the ring serves as well.
 * Gives back the smallest width over the same directions. */
static double measure(struct layout_panel *p)
{
    double best = INFINITY, least = INFINITY;
    p->area = 0;
    for (size_t i = 0; i < p->count; i++) {
        const struct layout_point a = p->ring[i], b = p->ring[(i + 1) % p->count];
        const struct layout_point o = p->ring[0];
        p->area += ((a.x - o.x) * (b.y - o.y) - (b.x - o.x) * (a.y - o.y)) / 2;
        const double length = hypot(b.x - a.x, b.y - a.y);
        if (length < 1e-9)
            continue;
        const struct extents e = extents_along(p, (b.x - a.x) / length, (b.y - a.y) / length);
        const double s = e.s1 - e.s0, t = e.t1 - e.t0, big = fmax(s, t), small = fmin(s, t);
        least = fmin(least, t);
        const double limit = best * (1 - 1e-6);
        if (s * t < limit || (s * t < best * (1 + 1e-6) && big < p->length)) {
            best = s * t;
            p->length = big;
            p->width = small;
        }
    }
    p->aspect = p->width > 0 ? p->length / p->width : 0;
    p->mean_width = p->length > 0 ? p->area / p->length : 0;
    return least;
}

static const char *name_of(const struct work *w, int axis, int64_t u, int64_t v, bool *forced)
{
    *forced = true;
    for (size_t i = 0; i < w->line_count; i++) {
        const struct work_line *l = &w->lines[i];
        if (l->axis == axis && l->u == u && l->v0 <= v && v <= l->v1)
            return l->name;
    }
    for (size_t i = 0; i < w->slab.family[axis].gate_count; i++) {
        const struct rect_gate *g = &w->slab.family[axis].gates[i];
        if (g->u == u && g->v0 <= v && v <= g->v1)
            return "the line of an inside corner";
    }
    for (size_t i = 0; i < w->slab.family[axis].arc_count; i++) {
        const struct rect_arc *a = &w->slab.family[axis].arcs[i];
        if ((a->u0 == u || a->u1 == u) && a->v0 <= v && v <= a->v1)
            return "the slab edge";
    }
    *forced = false;
    return "a joint placed by the program";
}

/* The two cuts that bound the bad dimension say what forces it. */
static void find_cause(const struct work *w, size_t panel, bool long_side,
                       struct layout_reason *reason)
{
    const struct rect_panel *r = &w->panels[panel];
    const bool wide = r->x1 - r->x0 >= r->y1 - r->y0;
    const int axis = wide == long_side ? 0 : 1;
    const int64_t from = axis ? r->y0 : r->x0, to = axis ? r->y1 : r->x1;
    const int64_t v = axis ? r->x0 + (r->x1 - r->x0) / 2 : r->y0 + (r->y1 - r->y0) / 2;
    bool first, second;
    const char *a = name_of(w, axis, from, v, &first), *b = name_of(w, axis, to, v, &second);
    snprintf(reason->cause, sizeof reason->cause, "It lies between %s and %s, %.2f m apart%s.", a,
             b, (double)(to - from) / LAYOUT_UNIT,
             first && second ? "; both are fixed" : "; the rows beside it need them");
    reason->code = first && second ? "FORCED_PAIR" : "ROW_COUPLING";
    snprintf(
        reason->remedy, sizeof reason->remedy, "%s",
        first && second
            ? "Move one of the two, put a construction joint between, or reinforce this panel."
            : "Allow a smaller spacing, put a construction joint here, or reinforce this panel.");
}

static bool add(struct work *w, size_t panel, const char *rule, double value, double limit,
                bool long_side)
{
    struct layout_panel *p = &w->out->panels[panel];
    struct layout_reason reason = {.code = "TAPER", .rule = rule, .value = value, .limit = limit};
    if (w->panels) {
        find_cause(w, panel, long_side, &reason);
    } else {
        snprintf(reason.cause, sizeof reason.cause,
                 "The slab edge is slanted here: the panel is %.2f x %.2f m.", p->length, p->width);
        snprintf(
            reason.remedy, sizeof reason.remedy,
            "Place joints closer here, cast the narrow part with its neighbour, or reinforce.");
    }
    w->out->violations++;
    return layout_reason_add(&p->reasons, &p->reason_count, reason);
}

static double angle_at(const struct layout_panel *p, size_t i)
{
    const struct layout_point a = p->ring[(i + p->count - 1) % p->count], b = p->ring[i];
    const struct layout_point c = p->ring[(i + 1) % p->count];
    const double turn = atan2((b.x - a.x) * (c.y - b.y) - (b.y - a.y) * (c.x - b.x),
                              (b.x - a.x) * (c.x - b.x) + (b.y - a.y) * (c.y - b.y));
    return 180 - turn * 180 / 3.14159265358979323846;
}

static bool is_given(const struct layout *out, struct layout_point p)
{
    for (size_t i = 0; i < out->outline_count; i++)
        if (hypot(out->outline[i].x - p.x, out->outline[i].y - p.y) < 1e-3)
            return true;
    for (size_t k = 0; k < out->opening_count; k++)
        for (size_t i = 0; i < out->openings[k].count; i++)
            if (hypot(out->openings[k].points[i].x - p.x, out->openings[k].points[i].y - p.y) <
                1e-3)
                return true;
    return false;
}

static double off_line(const struct layout_joint *j, struct layout_point p)
{
    const double dx = j->x2 - j->x1, dy = j->y2 - j->y1, length = hypot(dx, dy);
    const double s = ((p.x - j->x1) * dx + (p.y - j->y1) * dy) / length;
    const double t = ((p.y - j->y1) * dx - (p.x - j->x1) * dy) / length;
    return s < -1e-3 || s > length + 1e-3 ? INFINITY : fabs(t);
}

static bool on_isolation(const struct layout *out, struct layout_point a, struct layout_point b)
{
    for (size_t i = 0; i < out->joint_count; i++)
        if (out->joints[i].kind == LAYOUT_ISOLATION && off_line(&out->joints[i], a) < 1e-3 &&
            off_line(&out->joints[i], b) < 1e-3)
            return true;
    return false;
}

/* Joints and edges that meet too sharply; an angle of the outline's own is no breach. */
static double sharpest(const struct work *w, const struct layout_panel *p)
{
    double least = 180;
    for (size_t i = 0; i < p->count; i++)
        if (!is_given(w->out, p->ring[i]))
            least = fmin(least, angle_at(p, i));
    return least;
}

/* A side shorter than the least one (a tapered end, a rest beside a box) counts, unless it lies on
 * an isolation joint, is the outline's own, or stands between two blunt corners. */
static bool check_ends(struct work *w, size_t panel, double least)
{
    struct layout_panel *p = &w->out->panels[panel];
    for (size_t i = 0; i < p->count; i++) {
        const size_t k = (i + 1) % p->count;
        const struct layout_point a = p->ring[i], b = p->ring[k];
        const double length = hypot(b.x - a.x, b.y - a.y);
        if (length >= least * (1 - 2e-3) || (angle_at(p, i) >= 134.5 && angle_at(p, k) >= 134.5))
            continue;
        if (on_isolation(w->out, a, b) || (is_given(w->out, a) && is_given(w->out, b)))
            continue;
        if (!add(w, panel, "panel.side-least", length, least, false))
            return false;
    }
    return true;
}

/* The slack of 0.2 % and half a degree covers rounding to whole millimetres only. */
static bool check_one(struct work *w, size_t i)
{
    const struct layout_input *in = w->input;
    struct layout_panel *p = &w->out->panels[i];
    const double least = measure(p), slack = 1 + 2e-3;
    const double a = in->axis_deg * 3.14159265358979323846 / 180;
    const struct extents e = extents_along(p, cos(a), sin(a));
    const double x = e.s1 - e.s0, y = e.t1 - e.t0;
    bool fine = true;
    if (fabs(in->max_side_x - in->max_side_y) < 1e-9) {
        if (p->length > in->max_side_x * slack)
            fine = add(w, i, "panel.side", p->length, in->max_side_x, true);
    } else if (x > in->max_side_x * slack || y > in->max_side_y * slack) {
        const bool over = x > in->max_side_x * slack;
        fine = add(w, i, "panel.side", over ? x : y, over ? in->max_side_x : in->max_side_y,
                   over == (x >= y));
    }
    if (fine && p->aspect > in->max_aspect * slack)
        fine = add(w, i, "panel.aspect", p->aspect, in->max_aspect, false);
    if (fine && least < in->min_side * (2 - slack))
        fine = add(w, i, "panel.side-least", least, in->min_side, false);
    else if (fine)
        fine = check_ends(w, i, in->min_side);
    const double angle = sharpest(w, p);
    if (fine && angle < in->min_angle_deg - 0.5)
        fine = add(w, i, "panel.angle", angle, in->min_angle_deg, false);
    return fine;
}

enum status layout_check_panels(struct work *w)
{
    w->out->area = 0;
    for (size_t i = 0; i < w->out->panel_count; i++) {
        if (!check_one(w, i))
            return STATUS_NO_MEMORY;
        w->out->area += w->out->panels[i].area;
    }
    return STATUS_OK;
}
