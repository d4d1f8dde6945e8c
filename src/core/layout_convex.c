/* Convex outlines with slanting sides: straight joints right across the outline. A tapered strip
 * gets joints square to its axis, closer where it is narrow; else the user's own joints. */
#include "core/layout_work.h"
#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

struct shape {
    struct layout_point *at;
    size_t count;
};

static double side_of(const struct layout_segment *s, struct layout_point p)
{
    const double length = hypot(s->x2 - s->x1, s->y2 - s->y1);
    const double d = ((s->x2 - s->x1) * (p.y - s->y1) - (s->y2 - s->y1) * (p.x - s->x1)) / length;
    return fabs(d) < 2e-4 ? 0 : d; /* within 0.2 mm of the line is on it */
}

/* The crossing is made from the same end whichever panel asks, so both get the same digits. */
static struct layout_point crossing(const struct layout_segment *s, struct layout_point a,
                                    struct layout_point b)
{
    if (a.x > b.x || (a.x == b.x && a.y > b.y)) {
        const struct layout_point t = a;
        a = b;
        b = t;
    }
    const double da = side_of(s, a), db = side_of(s, b), t = da / (da - db);
    return (struct layout_point){a.x + t * (b.x - a.x), a.y + t * (b.y - a.y)};
}

/* The part of a convex ring left (sign 1) or right (sign -1) of a line. */
static struct shape clip(const struct layout_point *ring, size_t count,
                         const struct layout_segment *s, double sign)
{
    struct shape out = {calloc(2 * count + 2, sizeof(struct layout_point)), 0};
    for (size_t i = 0; out.at && i < count; i++) {
        const struct layout_point a = ring[i], b = ring[(i + 1) % count];
        const double da = sign * side_of(s, a), db = sign * side_of(s, b);
        if (da >= 0)
            out.at[out.count++] = a;
        if (da * db < 0)
            out.at[out.count++] = crossing(s, a, b);
    }
    return out;
}

static bool splits(const struct layout_panel *p, const struct layout_segment *s)
{
    double low = 0, high = 0;
    for (size_t i = 0; i < p->count; i++) {
        low = fmin(low, side_of(s, p->ring[i]));
        high = fmax(high, side_of(s, p->ring[i]));
    }
    return low < 0 && high > 0;
}

static enum status cut_all(struct layout *out, const struct layout_segment *s)
{
    const size_t before = out->panel_count;
    struct layout_panel *more = realloc(out->panels, (2 * before + 1) * sizeof *more);
    if (!more)
        return STATUS_NO_MEMORY;
    out->panels = more;
    for (size_t i = 0; i < before; i++) {
        struct layout_panel *p = &out->panels[i];
        if (!splits(p, s))
            continue;
        const struct shape left = clip(p->ring, p->count, s, 1),
                           right = clip(p->ring, p->count, s, -1);
        if (!left.at || !right.at) {
            free(left.at);
            free(right.at);
            return STATUS_NO_MEMORY;
        }
        free(p->ring);
        p->ring = left.at;
        p->count = left.count;
        out->panels[out->panel_count++] =
            (struct layout_panel){.ring = right.at, .count = right.count};
    }
    return STATUS_OK;
}

/* The joint on a line: from outline to outline. */
static bool add_line(struct layout *out, size_t *room, const struct layout_segment *s,
                     struct layout_joint joint)
{
    struct layout_point end[2];
    size_t n = 0;
    for (size_t i = 0; i < out->outline_count; i++) {
        const struct layout_point a = out->outline[i],
                                  b = out->outline[(i + 1) % out->outline_count];
        const double da = side_of(s, a), db = side_of(s, b);
        if (da == 0 && n < 2)
            end[n++] = a;
        if (da * db < 0 && n < 2)
            end[n++] = crossing(s, a, b);
    }
    if (n < 2)
        return true;
    const bool turn = end[0].x > end[1].x || (end[0].x == end[1].x && end[0].y > end[1].y);
    joint.x1 = end[turn].x;
    joint.y1 = end[turn].y;
    joint.x2 = end[!turn].x;
    joint.y2 = end[!turn].y;
    joint.object = joint.edge = joint.opening = -1;
    joint.line = (int)out->joint_count + 1;
    snprintf(joint.id, sizeof joint.id, "J%d", joint.line);
    return layout_joint_add(out, room, &joint);
}

struct chain { /* cross lines square to an axis */
    struct layout_point origin;
    double ux, uy, from, to;
};

static double width_at(const struct layout *out, const struct chain *c, double s, double *low)
{
    double least = INFINITY, most = -INFINITY;
    for (size_t i = 0; i < out->outline_count; i++) {
        const struct layout_point a = out->outline[i],
                                  b = out->outline[(i + 1) % out->outline_count];
        const double sa = (a.x - c->origin.x) * c->ux + (a.y - c->origin.y) * c->uy - s;
        const double sb = (b.x - c->origin.x) * c->ux + (b.y - c->origin.y) * c->uy - s;
        const double ta = (a.y - c->origin.y) * c->ux - (a.x - c->origin.x) * c->uy;
        const double tb = (b.y - c->origin.y) * c->ux - (b.x - c->origin.x) * c->uy;
        if (sa * sb > 0)
            continue;
        const double t = sa == sb ? ta : ta + (tb - ta) * sa / (sa - sb);
        least = fmin(least, sa == sb ? fmin(ta, tb) : t);
        most = fmax(most, sa == sb ? fmax(ta, tb) : t);
    }
    *low = least;
    return most - least;
}

/* The longest panel that may begin at s and end towards `to`: by side and by aspect (both ends of a
 * taper are looked at; the larger bounds the rectangle). */
static double longest(const struct layout *out, const struct chain *c, double s,
                      const struct layout_input *in)
{
    double low, length = fmin(in->max_side_x, in->max_side_y);
    const double here = width_at(out, c, s, &low);
    for (int i = 0; i < 40; i++) {
        const double end = fmin(s + length, c->to);
        const double wide = fmax(here, width_at(out, c, end, &low));
        if (end - s <= wide * in->max_aspect * 0.995)
            return length;
        length *= 0.97;
    }
    return length;
}

static enum status cross_lines(struct work *w, const struct chain *c, size_t *room)
{
    double at[512], s = c->from + 1e-9, low;
    size_t n = 0;
    while (n < 511 && c->to - s > 1e-3) {
        const double step = longest(w->out, c, s, w->input);
        if (s + step >= c->to - 1e-6)
            break;
        s += step;
        at[n++] = s;
    }
    /* spread the slack: the last panel would be short; all give a little in proportion */
    const double last = n ? c->to - at[n - 1] : 0;
    const double want = n ? longest(w->out, c, at[n - 1], w->input) : 0;
    const double shift = want > last ? (want - last) / (double)(n + 1) : 0;
    for (size_t i = 0; i < n; i++) {
        const double k = floor((at[i] - shift * (double)(i + 1)) * 1000 + 0.5) / 1000;
        const double x = c->origin.x + k * c->ux, y = c->origin.y + k * c->uy;
        if (width_at(w->out, c, k, &low) < 1e-3)
            continue;
        const struct layout_segment s1 = {x, y, x - c->uy, y + c->ux};
        const enum status status = cut_all(w->out, &s1);
        if (status)
            return status;
        if (!add_line(w->out, room, &s1, (struct layout_joint){.kind = LAYOUT_CONTRACTION}))
            return STATUS_NO_MEMORY;
    }
    return STATUS_OK;
}

/* Equal lines along the slab when it is wider than one panel. */
static enum status length_lines(struct work *w, const struct chain *c, size_t *room)
{
    double low = INFINITY, high = -INFINITY;
    for (size_t i = 0; i < w->out->outline_count; i++) {
        const struct layout_point p = w->out->outline[i];
        const double t = (p.y - c->origin.y) * c->ux - (p.x - c->origin.x) * c->uy;
        low = fmin(low, t);
        high = fmax(high, t);
    }
    const double limit = fmin(w->input->max_side_x, w->input->max_side_y);
    const int rows = (int)ceil((high - low) / limit - 1e-9);
    for (int i = 1; i < rows; i++) {
        const double t = low + (high - low) * i / rows;
        const double x = c->origin.x - t * c->uy, y = c->origin.y + t * c->ux;
        const struct layout_segment s = {x, y, x + c->ux, y + c->uy};
        const enum status status = cut_all(w->out, &s);
        if (status)
            return status;
        if (!add_line(w->out, room, &s, (struct layout_joint){.kind = LAYOUT_CONTRACTION}))
            return STATUS_NO_MEMORY;
    }
    return STATUS_OK;
}

/* The axis runs along the longest side. */
static struct chain find_chain(const struct layout *out)
{
    struct chain c = {0};
    double longest_side = 0;
    for (size_t i = 0; i < out->outline_count; i++) {
        const struct layout_point a = out->outline[i],
                                  b = out->outline[(i + 1) % out->outline_count];
        const double length = hypot(b.x - a.x, b.y - a.y);
        if (length <= longest_side + 1e-9)
            continue;
        longest_side = length;
        c = (struct chain){a, (b.x - a.x) / length, (b.y - a.y) / length, 0, 0};
    }
    for (size_t i = 0; i < out->outline_count; i++) {
        const double s =
            (out->outline[i].x - c.origin.x) * c.ux + (out->outline[i].y - c.origin.y) * c.uy;
        c.from = fmin(c.from, s);
        c.to = fmax(c.to, s);
    }
    return c;
}

static enum status drawn_lines(struct work *w, size_t *room, size_t *count)
{
    for (size_t i = 0; i < w->input->drawn_count; i++) {
        const struct layout_drawn *d = &w->input->drawn[i];
        if (!d->keep)
            continue;
        (*count)++;
        const size_t before = w->out->panel_count;
        const enum status status = cut_all(w->out, &d->at);
        if (status)
            return status;
        if (w->out->panel_count > before &&
            !add_line(w->out, room, &d->at,
                      (struct layout_joint){.kind = d->kind, .expansion = d->expansion}))
            return STATUS_NO_MEMORY;
    }
    return STATUS_OK;
}

static int compare_panel(const void *a, const void *b)
{
    const struct layout_panel *p = a, *q = b;
    double low[2][2] = {{INFINITY, INFINITY}, {INFINITY, INFINITY}};
    for (int k = 0; k < 2; k++) {
        const struct layout_panel *r = k ? q : p;
        for (size_t i = 0; i < r->count; i++)
            if (r->ring[i].y < low[k][0] - 1e-9 ||
                (r->ring[i].y < low[k][0] + 1e-9 && r->ring[i].x < low[k][1])) {
                low[k][0] = r->ring[i].y;
                low[k][1] = r->ring[i].x;
            }
    }
    if (fabs(low[0][0] - low[1][0]) > 1e-7)
        return low[0][0] < low[1][0] ? -1 : 1;
    return (low[0][1] > low[1][1]) - (low[0][1] < low[1][1]);
}

static bool isolate_edges(struct layout *out, size_t *room)
{
    for (size_t i = 0; i < out->edge_count; i++) {
        const struct layout_edge_out *e = &out->edges[i];
        if (e->kind != LAYOUT_EDGE_FIXED && !(e->kind == LAYOUT_EDGE_EXISTING && e->isolate))
            continue;
        const struct layout_point a = out->outline[e->index];
        const struct layout_point b = out->outline[(e->index + 1) % out->outline_count];
        struct layout_joint joint = {.kind = LAYOUT_ISOLATION,
                                     .object = -1,
                                     .opening = -1,
                                     .edge = (int)e->edge - 1,
                                     .x1 = a.x,
                                     .y1 = a.y,
                                     .x2 = b.x,
                                     .y2 = b.y};
        snprintf(joint.id, sizeof joint.id, "edge%zu.%zu", e->edge, e->index + 1);
        if (!layout_joint_add(out, room, &joint))
            return false;
    }
    return true;
}

static bool holds(const struct layout_panel *p, double x, double y)
{
    for (size_t i = 0; i < p->count; i++) {
        const struct layout_point a = p->ring[i], b = p->ring[(i + 1) % p->count];
        if ((b.x - a.x) * (y - a.y) - (b.y - a.y) * (x - a.x) < 0)
            return false;
    }
    return true;
}

/* The first panel on each side, a millimetre from the joint's beginning. */
static void find_neighbours(struct layout *out)
{
    for (size_t i = 0; i < out->joint_count; i++) {
        struct layout_joint *j = &out->joints[i];
        const double length = hypot(j->x2 - j->x1, j->y2 - j->y1);
        const double ux = (j->x2 - j->x1) / length, uy = (j->y2 - j->y1) / length;
        const double x = j->x1 + ux * length * 0.01, y = j->y1 + uy * length * 0.01;
        j->left_panel = j->right_panel = -1;
        for (size_t k = 0; k < out->panel_count; k++) {
            if (holds(&out->panels[k], x - uy * 1e-4, y + ux * 1e-4))
                j->left_panel = (int)k;
            if (holds(&out->panels[k], x + uy * 1e-4, y - ux * 1e-4))
                j->right_panel = (int)k;
        }
    }
}

enum status layout_convex(struct work *w)
{
    struct layout *out = w->out;
    size_t room = 0, drawn = 0;
    double area = 0;
    out->panels = calloc(1, sizeof *out->panels);
    struct layout_point *ring = calloc(out->outline_count, sizeof *ring);
    if (!out->panels || !ring) {
        free(ring);
        return STATUS_NO_MEMORY;
    }
    for (size_t i = 0; i < out->outline_count; i++) {
        const struct layout_point a = out->outline[i],
                                  b = out->outline[(i + 1) % out->outline_count];
        area += a.x * b.y - b.x * a.y;
    }
    for (size_t i = 0; i < out->outline_count; i++)
        ring[i] = out->outline[area < 0 ? out->outline_count - 1 - i : i];
    out->panels[out->panel_count++] =
        (struct layout_panel){.ring = ring, .count = out->outline_count};
    enum status status = drawn_lines(w, &room, &drawn);
    if (!status && !drawn) {
        const struct chain c = find_chain(out);
        status = cross_lines(w, &c, &room);
        if (!status)
            status = length_lines(w, &c, &room);
    }
    if (!status && !isolate_edges(out, &room))
        status = STATUS_NO_MEMORY;
    if (status)
        return status;
    qsort(out->panels, out->panel_count, sizeof *out->panels, compare_panel);
    for (size_t i = 0; i < out->panel_count; i++)
        out->panels[i].number = (int)i + 1;
    find_neighbours(out);
    return STATUS_OK;
}
