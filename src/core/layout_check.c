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

static double turn_of(struct layout_point a, struct layout_point b, struct layout_point c)
{
    return (b.x - a.x) * (c.y - b.y) - (b.y - a.y) * (c.x - b.x);
}

static bool is_convex_ring(const struct layout_panel *p)
{
    for (size_t i = 0; i < p->count; i++)
        if (turn_of(p->ring[i], p->ring[(i + 1) % p->count], p->ring[(i + 2) % p->count]) < -1e-12)
            return false;
    return true;
}

static int compare_point(const void *a, const void *b)
{
    const struct layout_point *p = a, *q = b;
    if (p->x < q->x || p->x > q->x)
        return p->x < q->x ? -1 : 1;
    return (p->y > q->y) - (p->y < q->y);
}

/* The convex hull, anticlockwise (monotone chain); list holds twice the ring. */
static size_t hull_of(const struct layout_panel *p, struct layout_point *list)
{
    struct layout_point *sorted = list + p->count + 1;
    size_t n = 0;
    memcpy(sorted, p->ring, p->count * sizeof *sorted);
    qsort(sorted, p->count, sizeof *sorted, compare_point);
    for (int half = 0; half < 2; half++) {
        const size_t base = n;
        for (size_t i = 0; i < p->count; i++) {
            const struct layout_point q = sorted[half ? p->count - 1 - i : i];
            while (n > base + 1 && turn_of(list[n - 2], list[n - 1], q) <= 1e-12)
                n--;
            list[n++] = q;
        }
        n--;
    }
    return n;
}

/* Smallest-area rectangle: one of its sides lies along a side of the convex hull.
 * Gives back the smallest width over the same directions. */
static double measure_hull(struct layout_panel *p, const struct layout_point *ring, size_t count)
{
    const struct layout_panel hull = {.ring = (struct layout_point *)(uintptr_t)ring,
                                      .count = count};
    double best = INFINITY, least = INFINITY;
    for (size_t i = 0; i < count; i++) {
        const struct layout_point a = ring[i], b = ring[(i + 1) % count];
        const double length = hypot(b.x - a.x, b.y - a.y);
        if (length < 1e-9)
            continue;
        const struct extents e = extents_along(&hull, (b.x - a.x) / length, (b.y - a.y) / length);
        const double s = e.s1 - e.s0, t = e.t1 - e.t0, big = fmax(s, t), small = fmin(s, t);
        least = fmin(least, t);
        if (s * t < best * (1 - 1e-6) || (s * t < best * (1 + 1e-6) && big < p->length)) {
            best = s * t;
            p->length = big;
            p->width = small;
        }
    }
    return least;
}

static bool measure(struct layout_panel *p, double *least)
{
    p->area = 0;
    for (size_t i = 0; i < p->count; i++) {
        const struct layout_point a = p->ring[i], b = p->ring[(i + 1) % p->count];
        const struct layout_point o = p->ring[0];
        p->area += ((a.x - o.x) * (b.y - o.y) - (b.x - o.x) * (a.y - o.y)) / 2;
    }
    if (is_convex_ring(p)) {
        *least = measure_hull(p, p->ring, p->count);
    } else {
        struct layout_point *list = calloc(2 * p->count + 4, sizeof *list);
        if (!list)
            return false;
        const size_t n = hull_of(p, list);
        *least = measure_hull(p, list, n);
        free(list);
    }
    p->aspect = p->width > 0 ? p->length / p->width : 0;
    p->mean_width = p->length > 0 ? p->area / p->length : 0;
    return true;
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

struct given { /* a corner of the outline or an opening */
    bool found;
    double angle; /* of the slab there */
};

static struct given given_in(const struct layout_point *ring, size_t n, struct layout_point p,
                             bool hole)
{
    for (size_t i = 0; i < n; i++) {
        if (fabs(ring[i].x - p.x) > 1e-3 || fabs(ring[i].y - p.y) > 1e-3)
            continue;
        const struct layout_panel whole = {.ring = (struct layout_point *)(uintptr_t)ring,
                                           .count = n};
        double area = 0;
        for (size_t k = 0; k < n; k++)
            area += ring[k].x * ring[(k + 1) % n].y - ring[(k + 1) % n].x * ring[k].y;
        double angle = angle_at(&whole, i);
        if (area < 0)
            angle = 360 - angle;
        return (struct given){true, hole ? 360 - angle : angle};
    }
    return (struct given){false, 0};
}

static struct given find_given(const struct layout *out, struct layout_point p)
{
    struct given g = given_in(out->outline, out->outline_count, p, false);
    for (size_t k = 0; k < out->opening_count && !g.found; k++)
        g = given_in(out->openings[k].points, out->openings[k].count, p, true);
    return g;
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

struct corner {
    size_t at;
    double angle;
    bool given;
};

/* Corners of a panel: no bend of half a degree, no vertex of an arc (a given one of at most 15
 * degrees). Inside corners are breaches but for the arcs', which may bend by 45 in all. */
static bool check_corners(struct work *w, size_t panel, struct corner *corners, size_t *count)
{
    struct layout_panel *p = &w->out->panels[panel];
    const double least = w->input->min_angle_deg;
    double inward = 0;
    bool fine = true;
    for (size_t i = 0; fine && i < p->count; i++) {
        const double angle = angle_at(p, i);
        if (fabs(angle - 180) <= 0.5)
            continue;
        const struct given g = angle < 90.5 && angle > 89.5 ? (struct given){false, 0}
                                                            : find_given(w->out, p->ring[i]);
        if (angle > 180) {
            if (g.found && angle - 180 <= 15.01)
                inward += angle - 180;
            else
                fine = add(w, panel, "panel.corner", angle, 180, false);
            continue;
        }
        if (g.found && 180 - angle <= 15.01)
            continue;
        corners[(*count)++] = (struct corner){i, angle, g.found};
        if (angle < least - 0.5 && !(g.found && fabs(g.angle - angle) < 0.2))
            fine = add(w, panel, "panel.angle", angle, least, false);
    }
    if (fine && inward > 45)
        fine = add(w, panel, "panel.corner", inward, 45, false);
    return fine;
}

static bool is_boundary(const struct layout *out, struct layout_point a, struct layout_point b)
{
    for (size_t k = 0; k < out->opening_count + 1; k++) {
        const struct layout_point *ring = k ? out->openings[k - 1].points : out->outline;
        const size_t n = k ? out->openings[k - 1].count : out->outline_count;
        for (size_t i = 0; i < n; i++) {
            const struct layout_point p = ring[i], q = ring[(i + 1) % n];
            const struct layout_joint side = {.x1 = p.x, .y1 = p.y, .x2 = q.x, .y2 = q.y};
            if (off_line(&side, a) < 1e-3 && off_line(&side, b) < 1e-3)
                return true;
        }
    }
    return false;
}

/* A side shorter than the least one (a tapered end, a rest beside a box) counts, unless it lies on
 * an isolation joint, is the outline's own, or stands between two blunt corners. */
static bool check_ends(struct work *w, size_t panel, double least, const struct corner *corners,
                       size_t count)
{
    struct layout_panel *p = &w->out->panels[panel];
    for (size_t i = 0; count > 2 && i < count; i++) {
        const struct corner *c = &corners[i], *d = &corners[(i + 1) % count];
        double length = 0;
        for (size_t k = c->at; k != d->at; k = (k + 1) % p->count)
            length += hypot(p->ring[(k + 1) % p->count].x - p->ring[k].x,
                            p->ring[(k + 1) % p->count].y - p->ring[k].y);
        if (length >= least * (1 - 2e-3) || (c->angle >= 134.5 && d->angle >= 134.5))
            continue;
        const struct layout_point a = p->ring[c->at], b = p->ring[d->at];
        if (on_isolation(w->out, a, b) ||
            (find_given(w->out, a).found && find_given(w->out, b).found &&
             is_boundary(w->out, a, b)))
            continue;
        if (!add(w, panel, "panel.side-least", length, least, false))
            return false;
    }
    return true;
}

/* The slack of 0.2 % and half a degree covers rounding to whole millimetres only. */
static bool check_one(struct work *w, size_t i, struct corner *corners)
{
    const struct layout_input *in = w->input;
    struct layout_panel *p = &w->out->panels[i];
    const double slack = 1 + 2e-3, a = in->axis_deg * 3.14159265358979323846 / 180;
    double least = 0;
    if (!measure(p, &least))
        return false;
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
    size_t count = 0;
    fine = fine && check_corners(w, i, corners, &count);
    if (fine && p->aspect > in->max_aspect * slack)
        fine = add(w, i, "panel.aspect", p->aspect, in->max_aspect, false);
    if (fine && least < in->min_side * (2 - slack))
        fine = add(w, i, "panel.side-least", least, in->min_side, false);
    else if (fine)
        fine = check_ends(w, i, in->min_side, corners, count);
    return fine;
}

enum status layout_check_panels(struct work *w)
{
    size_t most = 0;
    w->out->area = 0;
    for (size_t i = 0; i < w->out->panel_count; i++)
        most = w->out->panels[i].count > most ? w->out->panels[i].count : most;
    struct corner *corners = calloc(most + 1, sizeof *corners);
    bool fine = corners != NULL;
    for (size_t i = 0; fine && i < w->out->panel_count; i++) {
        fine = check_one(w, i, corners);
        w->out->area += w->out->panels[i].area;
    }
    free(corners);
    return fine ? layout_check_joints(w) : STATUS_NO_MEMORY;
}
