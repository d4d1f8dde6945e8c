/* Lays out a slab: its own frame, rings, forced lines, engine, joints and panels, checks. */
#include "core/layout.h"
#include "core/layout_neighbour.h"
#include "core/layout_place.h"
#include "core/layout_shape.h"
#include "core/layout_variant.h"
#include "core/layout_zone.h"
#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

static const double pi = 3.14159265358979323846;

/* The direction of the longest side, between -45 and 45 degrees. */
static void find_frame(struct work *w)
{
    double longest = 0, angle = 0;
    const struct layout *out = w->out;
    for (size_t i = 0; i < out->outline_count; i++) {
        const struct layout_point a = out->outline[i],
                                  b = out->outline[(i + 1) % out->outline_count];
        const double length = hypot(b.x - a.x, b.y - a.y);
        if (length <= longest * (1 + 1e-9))
            continue;
        longest = length;
        angle = atan2(b.y - a.y, b.x - a.x);
    }
    angle -= pi / 2 * floor(angle / (pi / 2) + 0.5);
    if (fabs(angle) < 1e-7)
        angle = 0;
    w->cosine = cos(angle);
    w->sine = angle == 0 ? 0 : sin(angle);
}

static bool ring_make(struct work *w, const struct layout_point *points, size_t count, int object)
{
    struct work_ring *r = &w->rings[w->ring_count];
    r->x = calloc(count + 1, sizeof *r->x);
    r->y = calloc(count + 1, sizeof *r->y);
    r->count = count;
    w->ring_object[w->ring_count++] = object;
    if (!r->x || !r->y)
        return false;
    for (size_t i = 0; i < count; i++)
        work_frame(w, points[i].x, points[i].y, &r->x[i], &r->y[i]);
    return true;
}

/* After turning, coordinates that belong together differ by less than 0.1 mm: make them one. */
static void align(const struct work *w, bool second)
{
    for (size_t r = 0; w->sine != 0 && r < w->ring_count; r++)
        for (size_t i = 0; i < w->rings[r].count; i++)
            for (size_t q = 0; q <= r; q++)
                for (size_t k = 0; k < (q == r ? i : w->rings[q].count); k++) {
                    int64_t *a = second ? w->rings[r].y : w->rings[r].x;
                    const int64_t *b = second ? w->rings[q].y : w->rings[q].x;
                    if (llabs(a[i] - b[k]) <= 8)
                        a[i] = b[k];
                }
}

struct reach {
    int64_t x0, y0, x1, y1;
};

/* The object's extents along the slab's axes, with 50 mm round it. */
static struct reach reach_of(const struct work *w, int index)
{
    const struct layout_object *o = &w->input->objects[index];
    const double a = o->angle_deg * pi / 180, c = cos(a), s = sin(a), clear = 0.05;
    struct reach r = {INT64_MAX, INT64_MAX, INT64_MIN, INT64_MIN};
    for (int k = 0; k < 4; k++) {
        const double dx = (k & 1 ? 0.5 : -0.5) * (o->w + 2 * clear);
        const double dy = (k & 2 ? 0.5 : -0.5) * (o->d + 2 * clear);
        int64_t x, y;
        work_frame(w, o->x + dx * c - dy * s, o->y + dx * s + dy * c, &x, &y);
        r.x0 = x < r.x0 ? x : r.x0;
        r.x1 = x > r.x1 ? x : r.x1;
        r.y0 = y < r.y0 ? y : r.y0;
        r.y1 = y > r.y1 ? y : r.y1;
    }
    return r;
}

static bool is_boxed(const struct layout_object *o)
{
    return o->isolate && !o->box_at_given && !o->box_half_given;
}

/* Boxes with less than 1 m between their objects would leave a sliver: one box for both. Gives back
 * the extents of all objects that hang together with the first; true: more than one. */
static bool merge_objects(const struct work *w, int index, struct reach *all)
{
    const int64_t gap = llround(0.9 * LAYOUT_UNIT);
    const int64_t most = llround(1.4 * LAYOUT_UNIT);
    bool more = false;
    *all = reach_of(w, index);
    for (bool again = true; again;) {
        again = false;
        for (size_t i = 0; i < w->input->object_count; i++) {
            if (w->merged[i] || (int)i == index || !is_boxed(&w->input->objects[i]))
                continue;
            const struct reach r = reach_of(w, (int)i), own = reach_of(w, index);
            const struct reach u = {
                r.x0 < all->x0 ? r.x0 : all->x0, r.y0 < all->y0 ? r.y0 : all->y0,
                r.x1 > all->x1 ? r.x1 : all->x1, r.y1 > all->y1 ? r.y1 : all->y1};
            if (r.x0 > all->x1 + gap || r.x1 < all->x0 - gap || r.y0 > all->y1 + gap ||
                r.y1 < all->y0 - gap || own.x0 - u.x0 > most || u.x1 - own.x1 > most ||
                own.y0 - u.y0 > most || u.y1 - own.y1 > most || r.x0 - u.x0 > most ||
                u.x1 - r.x1 > most || r.y0 - u.y0 > most || u.y1 - r.y1 > most)
                continue;
            *all = u;
            w->merged[i] = more = again = true;
        }
    }
    if (more)
        w->merged[index] = true;
    return more;
}

/* A rectangle round a long thin object or several near ones, run on to the slab edge where the rest
 * would be too narrow. */
static bool ring_object(struct work *w, int index, struct reach box)
{
    int64_t x0 = box.x0, x1 = box.x1, y0 = box.y0, y1 = box.y1;
    const int64_t near = llround(w->input->min_side * LAYOUT_UNIT), mx = x0 + (x1 - x0) / 2,
                  my = y0 + (y1 - y0) / 2;
    const struct work_ring *g = &w->rings[0];
    for (size_t i = 0; i < g->count; i++) {
        const size_t k = (i + 1) % g->count;
        if (g->x[i] == g->x[k] && (g->y[i] < my) != (g->y[k] < my)) {
            x0 = llabs(x0 - g->x[i]) < near ? g->x[i] : x0;
            x1 = llabs(x1 - g->x[i]) < near ? g->x[i] : x1;
        }
        if (g->y[i] == g->y[k] && (g->x[i] < mx) != (g->x[k] < mx)) {
            y0 = llabs(y0 - g->y[i]) < near ? g->y[i] : y0;
            y1 = llabs(y1 - g->y[i]) < near ? g->y[i] : y1;
        }
    }
    struct work_ring *r = &w->rings[w->ring_count];
    const struct layout_point none[4] = {{0, 0}, {0, 0}, {0, 0}, {0, 0}};
    if (!ring_make(w, none, 4, index))
        return false;
    r->x[0] = r->x[3] = x0;
    r->x[1] = r->x[2] = x1;
    r->y[0] = r->y[1] = y0;
    r->y[2] = r->y[3] = y1;
    return true;
}

static bool make_rings(struct work *w)
{
    const size_t room = w->input->opening_count + w->input->object_count + 2;
    w->rings = calloc(room, sizeof *w->rings);
    w->ring_object = calloc(room, sizeof *w->ring_object);
    w->merged = calloc(room, sizeof *w->merged);
    if (!w->rings || !w->merged || !w->ring_object ||
        !ring_make(w, w->out->outline, w->out->outline_count, -1))
        return false;
    for (size_t i = 0; i < w->out->opening_count; i++)
        if (!ring_make(w, w->out->openings[i].points, w->out->openings[i].count, -1))
            return false;
    align(w, false);
    align(w, true);
    for (size_t i = 0; i < w->input->object_count; i++) {
        const struct layout_object *o = &w->input->objects[i];
        struct reach box;
        if (!o->isolate || w->merged[i])
            continue;
        const bool alone = !is_boxed(o) || !merge_objects(w, (int)i, &box);
        if (alone && !place_is_rectangle(w, o))
            continue;
        if (alone)
            box = reach_of(w, (int)i);
        if (!ring_object(w, (int)i, box))
            return false;
    }
    return true;
}

static bool is_rectilinear(const struct work *w)
{
    for (size_t r = 0; r < w->ring_count; r++)
        for (size_t i = 0; i < w->rings[r].count; i++) {
            const struct work_ring *g = &w->rings[r];
            const size_t k = (i + 1) % g->count;
            if (g->x[i] != g->x[k] && g->y[i] != g->y[k])
                return false;
        }
    return true;
}

/* The sides of all rings, those parallel to y and those parallel to x. */
static bool collect_edges(const struct work *w, struct rect_edge *edges[2], size_t count[2])
{
    size_t total = 0;
    for (size_t r = 0; r < w->ring_count; r++)
        total += w->rings[r].count;
    edges[0] = calloc(total + 1, sizeof *edges[0]);
    edges[1] = calloc(total + 1, sizeof *edges[1]);
    for (size_t r = 0; edges[0] && edges[1] && r < w->ring_count; r++)
        for (size_t i = 0; i < w->rings[r].count; i++) {
            const struct work_ring *g = &w->rings[r];
            const size_t k = (i + 1) % g->count;
            const int axis = g->x[i] == g->x[k] ? 0 : 1;
            const int64_t a = axis ? g->x[i] : g->y[i], b = axis ? g->x[k] : g->y[k];
            if (a != b)
                edges[axis][count[axis]++] =
                    (struct rect_edge){axis ? g->y[i] : g->x[i], a < b ? a : b, a < b ? b : a};
        }
    return edges[0] && edges[1];
}

/* A larger slab may be searched longer: by its panels in 300, four times at most. */
static double size_factor(const struct work *w)
{
    double area = 0;
    for (size_t i = 0; i < w->out->outline_count; i++) {
        const struct layout_point a = w->out->outline[i],
                                  b = w->out->outline[(i + 1) % w->out->outline_count];
        area += (a.x * b.y - b.x * a.y) / 2;
    }
    return fmin(4, fmax(1, fabs(area) / (w->input->max_side_x * w->input->max_side_y) / 300));
}

static void set_rules(struct work *w)
{
    const struct layout_input *in = w->input;
    const double turn =
        fabs(sin(in->axis_deg * pi / 180) * w->cosine - cos(in->axis_deg * pi / 180) * w->sine);
    const bool swap = turn > 0.7;
    w->slab.rules.side[swap] = in->max_side_x * LAYOUT_UNIT;
    w->slab.rules.side[!swap] = in->max_side_y * LAYOUT_UNIT;
    w->slab.rules.aspect = in->max_aspect;
    w->slab.rules.least = in->min_side * LAYOUT_UNIT;
    w->slab.rules.raster = in->us_units ? 127 : 80;
    if (in->round_to > 0)
        w->slab.rules.raster = llround(in->round_to * LAYOUT_UNIT);
    w->slab.allowed = (uint64_t)(1e8 * size_factor(w) * (in->effort > 0 ? in->effort : 1));
}

/* Panels meet a scan line in one piece: at least so many across, at least so much joint (design 5).
 */
static void find_bounds(struct work *w)
{
    double length = 0, area = 0;
    for (int axis = 0; axis < 2; axis++)
        for (size_t i = 0; i < w->slab.family[axis].arc_count; i++) {
            const struct rect_arc *a = &w->slab.family[axis].arcs[i];
            const double v = (double)(a->v1 - a->v0), u = (double)(a->u1 - a->u0);
            length += u / LAYOUT_UNIT * (ceil(v / w->slab.rules.side[1 - axis] - 2e-3) - 1);
            area += axis ? 0 : u * v;
        }
    for (size_t i = 0; i < w->box_count; i++)
        length -= 4 * (double)w->boxes[i].half / LAYOUT_UNIT;
    w->out->bound_joint_m = length > 0 ? length : 0;
    const double side[2] = {w->slab.rules.side[0], w->slab.rules.side[1]};
    w->out->bound_panels = (int)ceil(area / (side[0] * side[1]) / (1.002 * 1.002) - 1e-9);
    if (w->rings[0].count == 4 && w->ring_count == 1) {
        const struct rect_arc *a = &w->slab.family[0].arcs[0];
        w->out->bound_panels = (int)(ceil((double)(a->u1 - a->u0) / side[0] - 2e-3) *
                                     ceil((double)(a->v1 - a->v0) / side[1] - 2e-3));
    }
}

/* The zones' ends are said: no rule is broken by them. */
static bool note_zones(struct work *w)
{
    struct layout_reason note = {.code = "ZONE", .rule = "note", .value = (double)w->cut_count};
    snprintf(note.cause, sizeof note.cause,
             "%zu construction joints were put in: lines that run on over the whole slab would "
             "break a rule.",
             w->cut_count);
    snprintf(note.remedy, sizeof note.remedy,
             "Cast the parts on either side apart, or move the objects onto common lines.");
    return layout_reason_add(&w->out->reasons, &w->out->reason_count, note);
}

static bool note_effort(struct work *w)
{
    struct layout_reason note = {.code = "EFFORT_LIMIT", .rule = "note"};
    snprintf(note.cause, sizeof note.cause,
             "The search ended at its limit with rules still broken; not all was tried.");
    snprintf(note.remedy, sizeof note.remedy,
             "Raise rules.effort, or draw construction joints that part the slab.");
    return layout_reason_add(&w->out->reasons, &w->out->reason_count, note);
}

static enum status solve_rectilinear(struct work *w)
{
    struct rect_edge *edges[2] = {NULL, NULL};
    size_t count[2] = {0, 0};
    set_rules(w);
    enum status status = STATUS_NO_MEMORY;
    if (collect_edges(w, edges, count) && place_boxes(w) && place_bans(w) && place_lines(w) &&
        place_expansion(w) && place_matches(w))
        status = variant_solve(w, edges, count);
    if (!status)
        status = zone_build(w, edges, count, &w->slab);
    if (!status && !w->slab.family[0].arc_count)
        status = STATUS_REFUSED; /* no area at all */
    if (!status)
        status = layout_emit(w);
    if (!status && w->broken && w->slab.evaluations > w->slab.allowed / 2 && !note_effort(w))
        status = STATUS_NO_MEMORY;
    if (!status && w->cut_count && !note_zones(w))
        status = STATUS_NO_MEMORY;
    if (!status)
        find_bounds(w);
    free(edges[0]);
    free(edges[1]);
    return status;
}

static int orient(struct layout_point a, struct layout_point b, struct layout_point c)
{
    const double d = (b.x - a.x) * (c.y - a.y) - (b.y - a.y) * (c.x - a.x);
    return (d > 1e-12) - (d < -1e-12);
}

/* Whether `p`, which lies on the line through a and b, lies between them. */
static bool between(struct layout_point a, struct layout_point b, struct layout_point p)
{
    return p.x >= fmin(a.x, b.x) - 1e-9 && p.x <= fmax(a.x, b.x) + 1e-9 &&
           p.y >= fmin(a.y, b.y) - 1e-9 && p.y <= fmax(a.y, b.y) + 1e-9;
}

/* Two sides that are no neighbours have a point in common. */
static bool meet(struct layout_point a, struct layout_point b, struct layout_point c,
                 struct layout_point d)
{
    const int abc = orient(a, b, c), abd = orient(a, b, d);
    const int cda = orient(c, d, a), cdb = orient(c, d, b);
    if (abc * abd < 0 && cda * cdb < 0)
        return true;
    return (abc == 0 && between(a, b, c)) || (abd == 0 && between(a, b, d)) ||
           (cda == 0 && between(c, d, a)) || (cdb == 0 && between(c, d, b));
}

/* The next side goes back over this one. */
static bool folds_back(struct layout_point a, struct layout_point b, struct layout_point c)
{
    return orient(a, b, c) == 0 && (b.x - a.x) * (c.x - b.x) + (b.y - a.y) * (c.y - b.y) < 0;
}

/* Crosses or touches itself: no slab. */
static bool crosses_itself(const struct layout *out)
{
    const size_t n = out->outline_count;
    for (size_t i = 0; i < n; i++) {
        const struct layout_point a = out->outline[i], b = out->outline[(i + 1) % n];
        if (folds_back(a, b, out->outline[(i + 2) % n]))
            return true;
        for (size_t k = i + 2; k < n; k++)
            if (!(i == 0 && k == n - 1) && meet(a, b, out->outline[k], out->outline[(k + 1) % n]))
                return true;
    }
    return false;
}

/* More panels than a plan can hold, or points out of reach of the exact integers: said, not tried.
 */
static bool is_too_large(const struct work *w)
{
    double x0 = INFINITY, x1 = -INFINITY, y0 = INFINITY, y1 = -INFINITY;
    for (size_t i = 0; i < w->out->outline_count; i++) {
        const struct layout_point p = w->out->outline[i];
        x0 = fmin(x0, p.x);
        x1 = fmax(x1, p.x);
        y0 = fmin(y0, p.y);
        y1 = fmax(y1, p.y);
    }
    const double columns = (x1 - x0) / w->input->max_side_x,
                 rows = (y1 - y0) / w->input->max_side_y;
    const double reach = fmax(fmax(fabs(x0), fabs(x1)), fmax(fabs(y0), fabs(y1)));
    return !(reach < 1e5) || !(columns * rows < 2e5) || !(columns < 2e4) || !(rows < 2e4);
}

static enum status solve_too_large(struct work *w)
{
    struct layout_reason reason = {.code = "EFFORT_LIMIT", .rule = "panel.side"};
    snprintf(reason.cause, sizeof reason.cause,
             "The slab needs more than 200 000 panels, or lies more than 100 km from the origin.");
    snprintf(reason.remedy, sizeof reason.remedy,
             "Check the units of the outline and the spacing, or split the slab into jobs.");
    w->out->violations++;
    return layout_reason_add(&w->out->reasons, &w->out->reason_count, reason) ? STATUS_OK
                                                                              : STATUS_NO_MEMORY;
}

static void work_free(struct work *w)
{
    for (size_t i = 0; w->rings && i < w->ring_count; i++) {
        free(w->rings[i].x);
        free(w->rings[i].y);
    }
    free(w->rings);
    free(w->ring_object);
    free(w->merged);
    free(w->boxes);
    free(w->lines);
    layout_index_free(&w->panel_index);
    free(w->bans);
    free(w->chords);
    free(w->box_index);
    free(w->panels);
    rect_free(&w->slab);
}

enum status layout_solve_once(const struct layout_input *input, struct layout *layout)
{
    struct layout out = {0};
    struct work w = {.input = input, .out = &out, .cosine = 1};
    if (input->outline.count < 2 || !(input->max_side_x > 0) || !(input->max_side_y > 0))
        return STATUS_REFUSED;
    enum status status = layout_copy_rings(&w);
    if (!status && (out.outline_count < 3 || crosses_itself(&out)))
        status = STATUS_REFUSED;
    const bool too_large = !status && is_too_large(&w);
    if (too_large)
        status = solve_too_large(&w);
    if (!status && !too_large) {
        find_frame(&w);
        status = make_rings(&w) ? STATUS_OK : STATUS_NO_MEMORY;
    }
    if (!status && !too_large)
        status = is_rectilinear(&w) ? solve_rectilinear(&w) : shape_solve(&w);
    if (!status && (too_large || is_rectilinear(&w)))
        status = layout_check_panels(&w);
    out.evaluations = w.slab.evaluations;
    work_free(&w);
    if (status)
        layout_free(&out);
    else
        *layout = out;
    return status;
}

enum status layout_solve(const struct layout_input *input, struct layout *layout)
{
    struct layout out = {0};
    enum status status = layout_solve_once(input, &out);
    if (!status)
        status = neighbour_choose(input, &out);
    if (status)
        layout_free(&out);
    else
        *layout = out;
    return status;
}

void layout_free(struct layout *layout)
{
    free(layout->outline);
    for (size_t i = 0; i < layout->opening_count; i++)
        free(layout->openings[i].points);
    free(layout->openings);
    for (size_t i = 0; i < layout->edge_count; i++)
        free(layout->edges[i].joints);
    free(layout->edges);
    free(layout->joints);
    for (size_t i = 0; i < layout->panel_count; i++) {
        free(layout->panels[i].ring);
        free(layout->panels[i].reasons);
    }
    free(layout->panels);
    free(layout->boxes);
    free(layout->reasons);
    *layout = (struct layout){0};
}
