/* From solved chords to joints and panels: topology first, one point per node. */
#include "core/layout_zone.h"
#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

struct emit {
    struct work *w;
    struct rect_chord *chords;
    size_t chord_count, joint_room;
    const struct work_line **labels;      /* by axis and place, then as they came */
    const struct rect_chord **isolations; /* chords that are isolation joints */
    size_t label_count, isolation_count;
    struct stop *stops; /* room for those of one line */
    int *sides;         /* per object: box sides so far */
};
struct stop {
    int64_t from, to;
};

bool layout_joint_add(struct layout *out, size_t *room, const struct layout_joint *joint)
{
    if (out->joint_count == *room) {
        const size_t more = *room ? 2 * *room : 64;
        struct layout_joint *list = realloc(out->joints, more * sizeof *list);
        if (!list)
            return false;
        out->joints = list;
        *room = more;
    }
    out->joints[out->joint_count++] = *joint;
    return true;
}

static int panel_at(const struct work *w, int64_t x, int64_t y)
{
    const size_t *list;
    const size_t n = layout_index_at(&w->panel_index, (double)x, (double)y, &list);
    for (size_t i = 0; i < n; i++) {
        const struct rect_panel *p = &w->panels[list[i]];
        if (p->x0 < x && x < p->x1 && p->y0 < y && y < p->y1)
            return (int)list[i];
    }
    return -1;
}

static bool index_panels(struct work *w)
{
    struct layout_extent *e = calloc(w->panel_count + 1, sizeof *e);
    if (!e)
        return false;
    for (size_t i = 0; i < w->panel_count; i++) {
        const struct rect_panel *p = &w->panels[i];
        e[i] = (struct layout_extent){(double)p->x0, (double)p->y0, (double)p->x1, (double)p->y1};
    }
    const bool fine = layout_index_make(&w->panel_index, e, w->panel_count);
    free(e);
    return fine;
}

static int compare_stop(const void *a, const void *b)
{
    const struct stop *p = a, *q = b;
    return (p->from > q->from) - (p->from < q->from);
}

static int compare_label(const void *a, const void *b)
{
    const struct work_line *p = *(const struct work_line *const *)a,
                           *q = *(const struct work_line *const *)b;
    if (p->axis != q->axis)
        return p->axis - q->axis;
    if (p->u != q->u)
        return p->u < q->u ? -1 : 1;
    return (p > q) - (p < q);
}

static const struct work_line *label_of(const struct emit *e, const struct rect_chord *c)
{
    const struct work_line key = {.axis = c->axis, .u = c->u};
    size_t low = 0, high = e->label_count;
    while (low < high) {
        const size_t mid = (low + high) / 2;
        const struct work_line *l = e->labels[mid];
        if (l->axis < key.axis || (l->axis == key.axis && l->u < key.u))
            low = mid + 1;
        else
            high = mid;
    }
    for (; low < e->label_count; low++) {
        const struct work_line *l = e->labels[low];
        if (l->axis != c->axis || l->u != c->u)
            break;
        if (l->v0 < c->v1 && l->v1 > c->v0)
            return l;
    }
    return NULL;
}

/* The lines with a kind of their own in order, and the chords that are isolation joints. */
static bool index_labels(struct emit *e)
{
    const struct work *w = e->w;
    e->labels = calloc(w->line_count + 1, sizeof *e->labels);
    e->isolations = calloc(e->chord_count + 1, sizeof *e->isolations);
    e->stops = calloc(w->box_count + e->chord_count + 1, sizeof *e->stops);
    if (!e->labels || !e->isolations || !e->stops)
        return false;
    for (size_t i = 0; i < w->line_count; i++)
        if (w->lines[i].labels)
            e->labels[e->label_count++] = &w->lines[i];
    if (e->label_count)
        qsort(e->labels, e->label_count, sizeof *e->labels, compare_label);
    for (size_t i = 0; i < e->chord_count; i++) {
        const struct work_line *l = label_of(e, &e->chords[i]);
        if (l && l->kind == LAYOUT_ISOLATION)
            e->isolations[e->isolation_count++] = &e->chords[i];
    }
    return true;
}

/* Boxes and crossing isolation joints that interrupt a line at u between v0 and v1. */
static size_t find_stops(const struct emit *e, int axis, int64_t u, int64_t v0, int64_t v1,
                         bool isolation, struct stop *list)
{
    const struct work *w = e->w;
    size_t n = 0;
    for (size_t i = 0; i < w->box_count; i++) {
        const struct work_box *b = &w->boxes[i];
        const int64_t bu = axis ? b->y : b->x, bv = axis ? b->x : b->y;
        const int64_t low = b->tip[axis ? 0 : 2], high = b->tip[axis ? 1 : 3];
        if (!b->dropped && bu == u && bv + high > v0 && bv - low < v1)
            list[n++] = (struct stop){bv - low, bv + high};
    }
    for (size_t i = 0; !isolation && i < e->isolation_count; i++) {
        const struct rect_chord *c = e->isolations[i];
        if (c->axis != axis && c->u > v0 && c->u < v1 && c->v0 < u && c->v1 > u)
            list[n++] = (struct stop){c->u, c->u};
    }
    qsort(list, n, sizeof *list, compare_stop);
    return n;
}

static bool add_piece(struct emit *e, int axis, int64_t u, int64_t from, int64_t to,
                      struct layout_joint joint)
{
    const struct work *w = e->w;
    const int64_t v = from + (to - from < 160 ? (to - from) / 2 : 80);
    const struct layout_point a = axis ? work_point(w, from, u) : work_point(w, u, from);
    const struct layout_point b = axis ? work_point(w, to, u) : work_point(w, u, to);
    joint.x1 = a.x;
    joint.y1 = a.y;
    joint.x2 = b.x;
    joint.y2 = b.y;
    joint.left_panel = axis ? panel_at(w, v, u + 8) : panel_at(w, u - 8, v);
    joint.right_panel = axis ? panel_at(w, v, u - 8) : panel_at(w, u + 8, v);
    return layout_joint_add(w->out, &e->joint_room, &joint);
}

/* The pieces of a line between its stops; `next` counts them. */
static bool add_pieces(struct emit *e, int axis, int64_t u, int64_t v0, int64_t v1,
                       struct layout_joint joint)
{
    struct stop *list = e->stops;
    const size_t n = find_stops(e, axis, u, v0, v1, joint.kind == LAYOUT_ISOLATION, list);
    int64_t at = v0;
    bool fine = true;
    for (size_t i = 0; fine && i <= n; i++) {
        const int64_t end = i < n ? list[i].from : v1;
        if (end > at)
            fine = add_piece(e, axis, u, at, end, joint);
        if (i < n && list[i].to > at)
            at = list[i].to;
    }
    return fine;
}

/* Numbers the pieces of a line: plain when it is one, .1, .2 when it is more. */
static void name_pieces(struct layout *out, size_t from, const char *stem)
{
    const size_t n = out->joint_count - from;
    for (size_t i = from; i < out->joint_count; i++) {
        if (n == 1)
            snprintf(out->joints[i].id, sizeof out->joints[i].id, "%.40s", stem);
        else
            snprintf(out->joints[i].id, sizeof out->joints[i].id, "%.36s.%zu", stem, i - from + 1);
    }
}

static bool emit_lines(struct emit *e)
{
    int line = 0;
    for (size_t i = 0; i < e->chord_count;) {
        const size_t from = e->w->out->joint_count;
        const int axis = e->chords[i].axis;
        const int64_t u = e->chords[i].u;
        char stem[24];
        snprintf(stem, sizeof stem, "J%d", ++line);
        for (; i < e->chord_count && e->chords[i].axis == axis && e->chords[i].u == u; i++) {
            const struct work_line *label = label_of(e, &e->chords[i]);
            const struct layout_joint joint = {.line = line,
                                               .kind = label ? label->kind : LAYOUT_CONTRACTION,
                                               .expansion = label && label->expansion,
                                               .along_pour = label && label->along_pour,
                                               .object = -1,
                                               .edge = -1,
                                               .opening = -1};
            if (!add_pieces(e, axis, u, e->chords[i].v0, e->chords[i].v1, joint))
                return false;
        }
        name_pieces(e->w->out, from, stem);
    }
    return true;
}

static bool emit_side(struct emit *e, const struct work_ring *r, size_t i,
                      struct layout_joint joint, const char *stem)
{
    const size_t k = (i + 1) % r->count, from = e->w->out->joint_count;
    const int axis = r->x[i] == r->x[k] ? 0 : 1;
    const int64_t u = axis ? r->y[i] : r->x[i];
    const int64_t a = axis ? r->x[i] : r->y[i], b = axis ? r->x[k] : r->y[k];
    if (!add_pieces(e, axis, u, a < b ? a : b, a < b ? b : a, joint))
        return false;
    name_pieces(e->w->out, from, stem);
    return true;
}

static bool side_on_outline(const struct work *w, const struct work_ring *r, size_t i)
{
    const size_t k = (i + 1) % r->count;
    const int axis = r->x[i] == r->x[k] ? 0 : 1;
    const int64_t x = r->x[i] + (r->x[k] - r->x[i]) / 2, y = r->y[i] + (r->y[k] - r->y[i]) / 2;
    const int64_t dx = axis ? 0 : 8, dy = axis ? 8 : 0;
    return panel_at(w, x + dx + axis, y + dy + 1 - axis) < 0 &&
           panel_at(w, x - dx + axis, y - dy + 1 - axis) < 0;
}

static bool emit_edges(struct emit *e)
{
    const struct layout_input *in = e->w->input;
    char stem[48];
    for (size_t i = 0; i < in->edge_count; i++) {
        const struct layout_edge *edge = &in->edges[i];
        if (edge->side >= e->w->rings[0].count ||
            !(edge->kind == LAYOUT_EDGE_FIXED ||
              (edge->kind == LAYOUT_EDGE_EXISTING && edge->isolate)))
            continue;
        const struct layout_joint joint = {
            .kind = LAYOUT_ISOLATION, .object = -1, .edge = (int)edge->side, .opening = -1};
        snprintf(stem, sizeof stem, "edge%zu", edge->side + 1);
        if (!emit_side(e, &e->w->rings[0], edge->side, joint, stem))
            return false;
    }
    for (size_t r = 1; r < e->w->ring_count; r++) {
        const int object = e->w->ring_object[r];
        const bool wall = object < 0 && in->opening_wall && in->opening_wall[r - 1];
        int side = 0;
        for (size_t i = 0; (wall || object >= 0) && i < e->w->rings[r].count; i++) {
            if (side_on_outline(e->w, &e->w->rings[r], i))
                continue;
            const struct layout_joint joint = {.kind = LAYOUT_ISOLATION,
                                               .object = object,
                                               .edge = -1,
                                               .opening = object < 0 ? (int)r - 1 : -1};
            if (object < 0)
                snprintf(stem, sizeof stem, "opening%zu.%d", r, ++side);
            else
                snprintf(stem, sizeof stem, "%.36s.%d", in->objects[object].id, ++side);
            if (!emit_side(e, &e->w->rings[r], i, joint, stem))
                return false;
        }
    }
    return true;
}

static const struct work_box *box_at(const struct work *w, int64_t x, int64_t y)
{
    const struct rect_slab index = {.boxes = w->box_index, .box_count = w->box_count};
    const struct rect_box *b = rect_box_at(&index, x, y);
    return b && !w->boxes[b->number].dropped ? &w->boxes[b->number] : NULL;
}

/* Corner k (from the lower left, anticlockwise) cut by a box: two points, and the box side. */
static bool cut_corner(struct emit *e, size_t panel, int k, const struct work_box *b,
                       struct layout_panel *out)
{
    static const int x[4] = {-1, 1, 0, 0}, y[4] = {0, 0, -1, 1}, tips[5] = {3, 0, 2, 1, 3};
    const int f = tips[k], t = k ? tips[k - 1] : 1; /* anticlockwise round the panel */
    const struct layout_point a =
        work_point(e->w, b->x + x[f] * b->tip[f], b->y + y[f] * b->tip[f]);
    const struct layout_point c =
        work_point(e->w, b->x + x[t] * b->tip[t], b->y + y[t] * b->tip[t]);
    out->ring[out->count++] = a;
    out->ring[out->count++] = c;
    struct layout_joint joint = {.kind = LAYOUT_ISOLATION,
                                 .object = b->object,
                                 .edge = -1,
                                 .opening = -1,
                                 .x1 = a.x,
                                 .y1 = a.y,
                                 .x2 = c.x,
                                 .y2 = c.y,
                                 .left_panel = (int)panel,
                                 .right_panel = -1};
    snprintf(joint.id, sizeof joint.id, "%.32s.%d", e->w->input->objects[b->object].id,
             ++e->sides[b->object]);
    return layout_joint_add(e->w->out, &e->joint_room, &joint);
}

static bool emit_panel(struct emit *e, size_t i)
{
    const struct rect_panel *r = &e->w->panels[i];
    struct layout_panel *p = &e->w->out->panels[i];
    const int64_t x[4] = {r->x0, r->x1, r->x1, r->x0}, y[4] = {r->y0, r->y0, r->y1, r->y1};
    p->number = (int)i + 1;
    p->ring = calloc(8, sizeof *p->ring);
    if (!p->ring)
        return false;
    for (int k = 0; k < 4; k++) {
        const struct work_box *b = box_at(e->w, x[k], y[k]);
        if (!b)
            p->ring[p->count++] = work_point(e->w, x[k], y[k]);
        else if (!cut_corner(e, i, k, b, p))
            return false;
    }
    return true;
}

/* A box is made only where all its quadrants are panel corners and it clears the next box. */
static bool drop_clashes(struct work *w)
{
    zone_mark_faults(w);
    for (size_t i = 0; i < w->box_count; i++) {
        const struct work_box *b = &w->boxes[i];
        if (!b->dropped)
            continue;
        struct layout_reason reason = {
            .code = "BOX_CLASH", .rule = "object.isolated", .value = (double)b->half / LAYOUT_UNIT};
        snprintf(reason.cause, sizeof reason.cause,
                 "The box round %.32s has no room: another box, joint or edge is too near.",
                 w->input->objects[b->object].id);
        snprintf(reason.remedy, sizeof reason.remedy,
                 "Give it a smaller box-half, move its box with box-at, or join the two boxes.");
        w->out->violations++;
        if (!layout_reason_add(&w->out->reasons, &w->out->reason_count, reason))
            return false;
    }
    return true;
}

static bool emit_boxes(struct work *w)
{
    w->out->boxes = calloc(w->box_count + 1, sizeof *w->out->boxes);
    if (!w->out->boxes)
        return false;
    for (size_t i = 0; i < w->box_count; i++) {
        const struct work_box *b = &w->boxes[i];
        if (b->dropped)
            continue;
        const struct layout_point at = work_point(w, b->x, b->y);
        struct layout_box *box = &w->out->boxes[w->out->box_count++];
        *box = (struct layout_box){.object = b->object,
                                   .x = at.x,
                                   .y = at.y,
                                   .half = (double)b->half / LAYOUT_UNIT,
                                   .moved_x = (double)b->moved_x / LAYOUT_UNIT,
                                   .moved_y = (double)b->moved_y / LAYOUT_UNIT};
        if (b->moved_x || b->moved_y)
            snprintf(box->words, sizeof box->words, "box moved by %.3f, %.3f m", box->moved_x,
                     box->moved_y);
    }
    return true;
}

/* Plan order: by the lowest, then leftmost corner, in the plan's own axes. */
struct order {
    struct layout_point low;
    struct rect_panel panel;
};

static int compare_order(const void *a, const void *b)
{
    const struct order *p = a, *q = b;
    if (fabs(p->low.y - q->low.y) > 1e-7)
        return p->low.y < q->low.y ? -1 : 1;
    if (fabs(p->low.x - q->low.x) > 1e-7)
        return p->low.x < q->low.x ? -1 : 1;
    return 0;
}

static bool sort_panels(struct work *w)
{
    struct order *list = calloc(w->panel_count + 1, sizeof *list);
    if (!list)
        return false;
    for (size_t i = 0; i < w->panel_count; i++) {
        const struct rect_panel *r = &w->panels[i];
        list[i].panel = *r;
        list[i].low = (struct layout_point){INFINITY, INFINITY};
        for (int k = 0; k < 4; k++) {
            const struct layout_point p =
                work_point(w, k & 1 ? r->x1 : r->x0, k & 2 ? r->y1 : r->y0);
            if (p.y < list[i].low.y - 1e-7 || (p.y < list[i].low.y + 1e-7 && p.x < list[i].low.x))
                list[i].low = p;
        }
    }
    qsort(list, w->panel_count, sizeof *list, compare_order);
    for (size_t i = 0; i < w->panel_count; i++)
        w->panels[i] = list[i].panel;
    free(list);
    return true;
}

enum status layout_emit(struct work *w)
{
    struct emit e = {.w = w, .chords = w->chords, .chord_count = w->chord_count};
    enum status status = STATUS_OK;
    rect_sort_chords(w->chords, w->chord_count);
    if (!status) {
        w->out->panels = calloc(w->panel_count + 1, sizeof *w->out->panels);
        e.sides = calloc(w->input->object_count + 1, sizeof *e.sides);
        bool fine =
            w->out->panels && e.sides && sort_panels(w) && index_panels(w) && drop_clashes(w);
        fine = fine && index_labels(&e) && emit_lines(&e);
        w->out->panel_count = fine ? w->panel_count : 0;
        for (size_t i = 0; fine && i < w->panel_count; i++)
            fine = emit_panel(&e, i);
        fine = fine && emit_edges(&e) && emit_boxes(w);
        status = fine ? STATUS_OK : STATUS_NO_MEMORY;
    }
    free(e.sides);
    free(e.labels);
    free(e.isolations);
    free(e.stops);
    return status;
}
