/* Boxes round objects: their size, the slab edges they stand on, the lines they share. */
#include "core/layout_place.h"
#include "core/layout_sort.h"
#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

#define UNITS(m) llround((m)*LAYOUT_UNIT)
static const double clearance_m = 0.1;  /* own choice: box corner beyond the object's corner */
static const double snap_m = 0.3;       /* design, "Snapping": a box may be moved so far */
static const double box_reach_m = 1.45; /* a box goes at most so far beyond its object (own) */

/* Half diagonal of the diamond that clears the object (design, "Objects"). */
static double half_of(const struct work *w, const struct layout_object *o)
{
    if (o->box_half_given)
        return o->box_half;
    if (o->round)
        return o->w / sqrt(2) + clearance_m * sqrt(2);
    const double a = o->angle_deg * 3.14159265358979323846 / 180;
    const double c = cos(a) * w->cosine + sin(a) * w->sine,
                 s = sin(a) * w->cosine - cos(a) * w->sine;
    double half = 0;
    for (int k = -1; k <= 1; k += 2) {
        const double x = o->w / 2 * c - k * o->d / 2 * s, y = o->w / 2 * s + k * o->d / 2 * c;
        half = fmax(half, fabs(x) + fabs(y));
    }
    return half + clearance_m;
}

/* Long thin and very large things get a rectangle along the slab's axes instead of a diamond. */
bool place_is_rectangle(const struct work *w, const struct layout_object *o)
{
    const double longer = fmax(o->w, o->d), shorter = fmin(o->w, o->d);
    if (o->round || o->box_half_given)
        return false;
    return (longer > 3 * shorter && longer > 1.0) || o->edge_kind_channel || half_of(w, o) > 1.4;
}

/* Half extents of the object along the slab's axes. */
static void extents_of(const struct work *w, const struct layout_object *o, double half[2])
{
    const double a = o->angle_deg * 3.14159265358979323846 / 180;
    const double c = fabs(cos(a) * w->cosine + sin(a) * w->sine),
                 s = fabs(sin(a) * w->cosine - cos(a) * w->sine);
    half[0] = o->round ? o->w / 2 : o->w / 2 * c + o->d / 2 * s;
    half[1] = o->round ? o->w / 2 : o->w / 2 * s + o->d / 2 * c;
}

struct edge_near { /* a slab edge beside a box */
    bool found;
    int64_t u, low, high; /* at u, from low to high */
};

/* The nearest slab edge parallel to an axis that the box would cross or nearly reach. */
static struct edge_near near_edge(const struct work *w, int axis, const struct work_box *box,
                                  int64_t reach)
{
    struct edge_near near = {0};
    int64_t best = reach;
    for (size_t r = 0; r < w->ring_count; r++)
        for (size_t i = 0; i < w->rings[r].count; i++) {
            const struct work_ring *g = &w->rings[r];
            const size_t k = (i + 1) % g->count;
            const int64_t *at = axis ? g->y : g->x, *along = axis ? g->x : g->y;
            const int64_t v = axis ? box->x : box->y, d = llabs(at[i] - (axis ? box->y : box->x));
            const int64_t low = along[i] < along[k] ? along[i] : along[k];
            const int64_t high = along[i] < along[k] ? along[k] : along[i];
            if (at[i] != at[k] || v < low || v > high || d > best || (near.found && d == best))
                continue;
            best = d;
            near = (struct edge_near){true, at[i], low, high};
        }
    return near;
}

bool place_boxes(struct work *w)
{
    const struct layout_input *in = w->input;
    w->boxes = calloc(in->object_count + 1, sizeof *w->boxes);
    if (!w->boxes)
        return false;
    for (size_t i = 0; i < in->object_count; i++) {
        const struct layout_object *o = &in->objects[i];
        if (!o->isolate || w->merged[i] || place_is_rectangle(w, o))
            continue;
        struct work_box *b = &w->boxes[w->box_count++];
        *b = (struct work_box){.object = (int)i, .half = UNITS(half_of(w, o))};
        work_frame(w, o->x, o->y, &b->x, &b->y);
        if (o->box_at_given) {
            int64_t x, y;
            work_frame(w, o->box_x, o->box_y, &x, &y);
            b->half += o->box_half_given ? 0 : llabs(x - b->x) + llabs(y - b->y);
            b->x = x;
            b->y = y;
        }
        b->tip[0] = b->tip[1] = b->tip[2] = b->tip[3] = b->half;
    }
    return true;
}

void place_move_box(const struct work *w, struct work_box *b, int axis, int64_t to)
{
    int64_t *at = axis ? &b->y : &b->x, *moved = axis ? &b->moved_y : &b->moved_x;
    const int64_t shift = to - *at;
    if (b->on_x || b->on_y) { /* the triangle on the edge: its base grows */
        const int64_t more = llround((double)llabs(shift) * b->spread / 80) * 80 + 80;
        double half[2];
        extents_of(w, &w->input->objects[b->object], half);
        if (b->tip[2 * axis] + more + llabs(shift) > UNITS(half[axis] + box_reach_m))
            return;
        *moved = shift;
        *at = to;
        b->tip[2 * axis] += more;
        b->tip[2 * axis + 1] += more;
        return;
    }
    *moved = shift;
    *at = to;
    b->half += llabs(shift);
    b->tip[0] = b->tip[1] = b->tip[2] = b->tip[3] = b->half;
}

/* A box on the slab edge: a triangle with one tip, that holds the object with 50 mm round it. Its
 * base is on the edge, so only the joint square to the edge is needed. False: the edge is short. */
static bool stand_on_edge(const struct work *w, struct work_box *b, int axis, struct edge_near near)
{
    const struct layout_object *o = &w->input->objects[b->object];
    int64_t *at = axis ? &b->y : &b->x;
    const int64_t away = llabs(near.u - *at), v = axis ? b->x : b->y;
    double half[2];
    extents_of(w, o, half);
    const double depth = (double)away / LAYOUT_UNIT + half[axis], clear = 0.05;
    const double beyond = fmin(0.7, fmax(0.3, 0.4 * depth));
    const double wide = (half[1 - axis] + clear) * (depth + beyond) / beyond;
    const int64_t base = o->box_half_given ? b->half : UNITS(ceil(wide * 1e3 - 1e-6) / 1e3);
    if (v - base < near.low || v + base > near.high)
        return false;
    for (int k = 0; k < 2; k++) {
        b->tip[2 * axis + k] =
            o->box_half_given ? b->half + away : UNITS(ceil((depth + beyond) * 1e3 - 1e-6) / 1e3);
        b->tip[2 * (1 - axis) + k] = base;
    }
    b->spread = (depth + beyond) / beyond;
    *(axis ? &b->moved_y : &b->moved_x) = near.u - *at;
    *at = near.u;
    *(axis ? &b->on_y : &b->on_x) = true;
    return true;
}

/* In a corner: both edges, a slanting cut, no joint. False: it would be too large. */
static bool stand_in_corner(const struct work *w, struct work_box *b, int64_t x, int64_t y)
{
    double half[2];
    extents_of(w, &w->input->objects[b->object], half);
    const int64_t dx = llabs(x - b->x), dy = llabs(y - b->y), most = UNITS(box_reach_m);
    const int64_t size = dx + dy + UNITS(half[0] + half[1] + 0.1);
    if (size - dx - UNITS(half[0]) > most || size - dy - UNITS(half[1]) > most)
        return false;
    b->moved_x = x - b->x;
    b->moved_y = y - b->y;
    b->x = x;
    b->y = y;
    b->on_x = b->on_y = true;
    b->tip[0] = b->tip[1] = b->tip[2] = b->tip[3] = b->half = size;
    return true;
}

/* How near the edge a box must be to stand on it: a strip beside it would be no panel. */
static int64_t edge_reach(const struct work *w, const struct work_box *b, int axis)
{
    const struct layout_object *o = &w->input->objects[b->object];
    double half[2];
    extents_of(w, o, half);
    if (o->box_half_given || o->box_at_given || b->keep_off)
        return b->half;
    const int64_t reach =
        UNITS(fmin(half[axis] + 1.3, 0.4 * w->slab.rules.side[axis] / LAYOUT_UNIT));
    return reach > b->half ? reach : b->half;
}

static bool is_slab_corner(const struct work *w, int64_t x, int64_t y)
{
    const struct work_ring *g = &w->rings[0];
    for (size_t i = 0; i < g->count; i++)
        if (g->x[i] == x && g->y[i] == y)
            return true;
    return false;
}

static void find_edge(const struct work *w, struct work_box *b)
{
    const struct edge_near x = near_edge(w, 0, b, edge_reach(w, b, 0));
    const struct edge_near y = near_edge(w, 1, b, edge_reach(w, b, 1));
    if (x.found && y.found && is_slab_corner(w, x.u, y.u) && stand_in_corner(w, b, x.u, y.u))
        return;
    const bool first = x.found && (!y.found || llabs(x.u - b->x) <= llabs(y.u - b->y));
    if (x.found && first && stand_on_edge(w, b, 0, x))
        return;
    if (y.found && stand_on_edge(w, b, 1, y))
        return;
    if (x.found && !first)
        stand_on_edge(w, b, 0, x);
}

/* Centres that lie within twice the tolerance share one line, on a fixed line if there is one. */
static bool snap_axis(struct work *w, int axis, int64_t reach)
{
    int64_t *list = calloc(w->box_count + 1, sizeof *list);
    if (!list)
        return false;
    size_t count = 0;
    for (size_t i = 0; i < w->box_count; i++)
        if (!(axis ? w->boxes[i].on_y : w->boxes[i].on_x) && !w->boxes[i].stay)
            list[count++] = axis ? w->boxes[i].y : w->boxes[i].x;
    sort_int64(list, count);
    for (size_t i = 0; i < count;) {
        size_t k = i;
        while (k + 1 < count && list[k + 1] - list[i] <= 2 * reach)
            k++;
        int64_t to = list[i] + (list[k] - list[i]) / 2 / 80 * 80;
        if (list[i] == list[k])
            to = list[i];
        for (size_t r = 0; r < w->ring_count; r++)
            for (size_t n = 0; n < w->rings[r].count; n++) {
                const int64_t u = axis ? w->rings[r].y[n] : w->rings[r].x[n];
                if (llabs(u - list[i]) <= reach && llabs(u - list[k]) <= reach)
                    to = u;
            }
        for (size_t n = 0; n < w->line_count; n++)
            if (w->lines[n].axis == axis && llabs(w->lines[n].u - list[i]) <= reach &&
                llabs(w->lines[n].u - list[k]) <= reach)
                to = w->lines[n].u;
        for (size_t n = 0; n < w->box_count; n++) {
            const int64_t u = axis ? w->boxes[n].y : w->boxes[n].x;
            const struct layout_object *o = &w->input->objects[w->boxes[n].object];
            const bool fixed = o->box_at_given || (axis ? w->boxes[n].on_y : w->boxes[n].on_x);
            if (u >= list[i] && u <= list[k] && !fixed && u != to && !w->boxes[n].stay)
                place_move_box(w, &w->boxes[n], axis, to);
        }
        i = k + 1;
    }
    free(list);
    return true;
}

static bool name_box(struct work *w, const struct work_box *b)
{
    const struct layout_object *o = &w->input->objects[b->object];
    for (int axis = 0; axis < 2; axis++) {
        if (axis ? b->on_y : b->on_x)
            continue;
        struct work_line line = {.axis = axis,
                                 .u = axis ? b->y : b->x,
                                 .v0 = INT64_MIN,
                                 .v1 = INT64_MAX,
                                 .at_point = true,
                                 .point = axis ? b->x : b->y};
        snprintf(line.name, sizeof line.name, "the line of %.8s %.32s",
                 o->kind ? o->kind : "object", o->id);
        if (!work_line_add(w, line))
            return false;
    }
    return true;
}

void place_on_edges(struct work *w)
{
    for (size_t i = 0; i < w->box_count; i++)
        find_edge(w, &w->boxes[i]);
}

bool place_snap(struct work *w)
{
    const int64_t reach = UNITS(snap_m);
    return snap_axis(w, 0, reach) && snap_axis(w, 1, reach);
}

bool place_name_boxes(struct work *w)
{
    bool fine = true;
    for (size_t i = 0; fine && i < w->box_count; i++)
        fine = name_box(w, &w->boxes[i]);
    return fine;
}

bool place_index_boxes(struct work *w)
{
    free(w->box_index);
    w->box_index = calloc(w->box_count + 1, sizeof *w->box_index);
    for (size_t i = 0; w->box_index && i < w->box_count; i++) {
        w->box_index[i] = (struct rect_box){.x = w->boxes[i].x, .y = w->boxes[i].y, .number = i};
        memcpy(w->box_index[i].tip, w->boxes[i].tip, sizeof w->boxes[i].tip);
    }
    if (w->box_index)
        rect_sort_boxes(w->box_index, w->box_count);
    return w->box_index != NULL;
}
