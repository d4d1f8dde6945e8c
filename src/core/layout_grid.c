/* Lines right across the slab in two directions square to each other; every inside corner has a
 * line through it in one of the two. Corners are turned one by one as long as the plan gets better.
 */
#include "core/layout_shape.h"
#include <math.h>
#include <stdlib.h>
#include <string.h>

enum { MOST_CORNERS = 64 };
struct inside {
    double at[2]; /* in the frame */
    int choice;   /* 0: the line with this first coordinate, 1: with this second one, 2: both */
};
struct grid {
    struct trials *t;
    double c, s; /* the frame's direction */
    double low[2], high[2];
    struct inside corner[MOST_CORNERS];
    size_t corner_count;
    int more[2]; /* extra divisions in each gap */
};

static void to_frame(const struct grid *g, struct layout_point p, double at[2])
{
    at[0] = p.x * g->c + p.y * g->s;
    at[1] = -p.x * g->s + p.y * g->c;
}

static struct layout_point from_frame(const struct grid *g, double u, double v)
{
    return (struct layout_point){u * g->c - v * g->s, u * g->s + v * g->c};
}

/* Degrees by which the ring turns away from the slab at i: more than 0 at an inside corner. */
static double inward_turn(const struct layout_point *ring, size_t n, size_t i, double sign)
{
    const struct layout_point a = ring[(i + n - 1) % n], b = ring[i], c = ring[(i + 1) % n];
    const double x1 = b.x - a.x, y1 = b.y - a.y, x2 = c.x - b.x, y2 = c.y - b.y;
    return -sign * atan2(x1 * y2 - y1 * x2, x1 * x2 + y1 * y2) * 180 / 3.14159265358979323846;
}

static double ring_sign(const struct layout_point *ring, size_t n)
{
    double area = 0;
    for (size_t i = 0; i < n; i++)
        area += ring[i].x * ring[(i + 1) % n].y - ring[(i + 1) % n].x * ring[i].y;
    return area < 0 ? -1 : 1;
}

/* Sharp inside corners, and along an arc one every 40 degrees at most. */
static void find_corners(struct grid *g, const struct layout_point *ring, size_t n, double sign)
{
    double turned = 0;
    for (size_t i = 0; i < n && g->corner_count < MOST_CORNERS; i++) {
        const double turn = inward_turn(ring, n, i, sign);
        if (turn <= 0.5) {
            turned = 0;
            continue;
        }
        turned += turn;
        const double next = inward_turn(ring, n, (i + 1) % n, sign);
        if (turn <= 15.1 && turned + fmax(next, 0) <= 44)
            continue;
        turned = 0;
        to_frame(g, ring[i], g->corner[g->corner_count++].at);
    }
}

struct stations {
    double *at;
    size_t count, room;
};

static bool station(struct stations *s, double u)
{
    for (size_t i = 0; i < s->count; i++)
        if (fabs(s->at[i] - u) < 1e-3)
            return true;
    if (s->count == s->room) {
        const size_t room = s->room ? 2 * s->room : 32;
        double *more = realloc(s->at, room * sizeof *more);
        if (!more)
            return false;
        s->at = more;
        s->room = room;
    }
    s->at[s->count++] = u;
    return true;
}

static int compare_double(const void *a, const void *b)
{
    const double p = *(const double *)a, q = *(const double *)b;
    return (p > q) - (p < q);
}

static bool add_line(const struct grid *g, struct plane *plane, int axis, double u,
                     struct plane_line line)
{
    const double margin = 1;
    const struct layout_point a =
        axis ? from_frame(g, g->low[0] - margin, u) : from_frame(g, u, g->low[1] - margin);
    const struct layout_point b =
        axis ? from_frame(g, g->high[0] + margin, u) : from_frame(g, u, g->high[1] + margin);
    line.at = (struct layout_segment){a.x, a.y, b.x, b.y};
    line.line = (int)plane->line_count + 1;
    return plane_add(plane, line);
}

/* Pour lines and joints the user drew stand where they are typed, whatever their direction. */
static bool typed_lines(const struct grid *g, struct plane *plane, struct stations fixed[2])
{
    const struct layout_input *in = g->t->w->input;
    const size_t pours = in->has_pours ? in->pour_line_count : 0;
    for (size_t i = 0; i < pours + in->drawn_count; i++) {
        const struct layout_drawn *d = i < pours ? NULL : &in->drawn[i - pours];
        const struct layout_segment *s = d ? &d->at : &in->pour_lines[i];
        if (d && !d->keep)
            continue;
        double a[2], b[2];
        to_frame(g, (struct layout_point){s->x1, s->y1}, a);
        to_frame(g, (struct layout_point){s->x2, s->y2}, b);
        const struct plane_line line = {.at = *s,
                                        .line = (int)plane->line_count + 1,
                                        .kind = d ? d->kind : LAYOUT_CONSTRUCTION,
                                        .expansion = d && d->expansion,
                                        .along_pour = !d};
        if (!plane_add(plane, line))
            return false;
        for (int axis = 0; axis < 2; axis++)
            if (fabs(a[axis] - b[axis]) < 1e-3 && !station(&fixed[axis], a[axis]))
                return false;
    }
    return true;
}

static bool even_lines(const struct grid *g, struct plane *plane, struct stations *fixed, int axis,
                       double apart, struct plane_line line)
{
    const double gap = g->high[axis] - g->low[axis];
    const int n = (int)ceil(gap / apart - 1e-6);
    for (int i = 1; i < n; i++) {
        const double u = g->low[axis] + gap * i / n;
        if (!station(&fixed[axis], u) || !add_line(g, plane, axis, u, line))
            return false;
    }
    return true;
}

static bool asked_lines(const struct grid *g, struct plane *plane, struct stations fixed[2])
{
    const struct layout_input *in = g->t->w->input;
    bool fine = typed_lines(g, plane, fixed);
    if (fine && in->has_pours && in->pour_width > 0) {
        const double a = in->pour_direction_deg * 3.14159265358979323846 / 180;
        const int axis = fabs(cos(a) * g->c + sin(a) * g->s) > 0.7 ? 1 : 0;
        fine = even_lines(g, plane, fixed, axis, in->pour_width,
                          (struct plane_line){.kind = LAYOUT_CONSTRUCTION, .along_pour = true});
    }
    if (fine && in->expansion_every > 0) {
        const int axis = g->high[1] - g->low[1] > g->high[0] - g->low[0];
        fine = even_lines(g, plane, fixed, axis, in->expansion_every,
                          (struct plane_line){.kind = LAYOUT_ISOLATION, .expansion = true});
    }
    return fine;
}

/* The neighbour's joints: a line through each, in the direction that meets the side more squarely.
 */
static bool match_stations(const struct grid *g, struct stations own[2])
{
    const struct layout *out = g->t->w->out;
    for (size_t i = 0; i < out->edge_count; i++) {
        const struct layout_edge_out *e = &out->edges[i];
        if (e->kind != LAYOUT_EDGE_EXISTING || e->isolate)
            continue;
        const struct layout_point p = out->outline[e->index],
                                  q = out->outline[(e->index + 1) % out->outline_count];
        const double length = hypot(q.x - p.x, q.y - p.y);
        const int axis = fabs((q.x - p.x) * g->c + (q.y - p.y) * g->s) < 0.7 * length;
        for (size_t k = 0; k < e->joint_count; k++) {
            const double t = e->joints[k] / length;
            double at[2];
            to_frame(g, (struct layout_point){p.x + t * (q.x - p.x), p.y + t * (q.y - p.y)}, at);
            if (!station(&own[axis], at[axis]))
                return false;
        }
    }
    return true;
}

/* Half diagonal of the diamond along the frame's axes, with 0.1 m clear. */
static double half_of(const struct grid *g, const struct layout_object *o)
{
    if (o->box_half_given)
        return o->box_half;
    if (o->round)
        return o->w / sqrt(2) + 0.1 * sqrt(2);
    const double a = o->angle_deg * 3.14159265358979323846 / 180;
    const double c = cos(a) * g->c + sin(a) * g->s, s = sin(a) * g->c - cos(a) * g->s;
    double half = 0;
    for (int k = -1; k <= 1; k += 2)
        half = fmax(half,
                    fabs(o->w / 2 * c - k * o->d / 2 * s) + fabs(o->w / 2 * s + k * o->d / 2 * c));
    return half + 0.1;
}

static bool place_boxes(const struct grid *g, struct plane *plane, struct stations own[2])
{
    const struct layout_input *in = g->t->w->input;
    plane->boxes = calloc(in->object_count + 1, sizeof *plane->boxes);
    if (!plane->boxes)
        return false;
    for (size_t i = 0; i < in->object_count; i++) {
        const struct layout_object *o = &in->objects[i];
        double at[2];
        if (!o->isolate)
            continue;
        to_frame(g,
                 o->box_at_given ? (struct layout_point){o->box_x, o->box_y}
                                 : (struct layout_point){o->x, o->y},
                 at);
        double half = half_of(g, o);
        if (o->box_at_given && !o->box_half_given)
            half += hypot(o->box_x - o->x, o->box_y - o->y) * sqrt(2);
        struct plane_box *b = &plane->boxes[plane->box_count++];
        *b = (struct plane_box){
            .object = (int)i, .centre = from_frame(g, at[0], at[1]), .half = half};
        b->tip[0] = from_frame(g, at[0] - half, at[1]);
        b->tip[1] = from_frame(g, at[0], at[1] - half);
        b->tip[2] = from_frame(g, at[0] + half, at[1]);
        b->tip[3] = from_frame(g, at[0], at[1] + half);
        if (!station(&own[0], at[0]) || !station(&own[1], at[1]))
            return false;
    }
    return true;
}

/* Equal divisions of every gap wider than a panel may be. */
static bool fill_gaps(const struct grid *g, struct plane *plane, struct stations *own,
                      const struct stations *fixed, int axis)
{
    const struct layout_input *in = g->t->w->input;
    const double limit = fmin(in->max_side_x, in->max_side_y);
    struct stations all = {0};
    bool fine = station(&all, g->low[axis]) && station(&all, g->high[axis]);
    for (size_t i = 0; fine && i < own->count; i++)
        fine = station(&all, own->at[i]);
    for (size_t i = 0; fine && i < fixed->count; i++)
        fine = station(&all, fixed->at[i]);
    if (fine)
        qsort(all.at, all.count, sizeof *all.at, compare_double);
    for (size_t i = 0; fine && i + 1 < all.count; i++) {
        const double gap = all.at[i + 1] - all.at[i];
        const int n = (int)ceil(gap / limit - 1e-6) + (gap > limit / 2 ? g->more[axis] : 0);
        for (int k = 1; fine && k < n; k++)
            fine = add_line(g, plane, axis, all.at[i] + gap * k / n, (struct plane_line){0});
    }
    for (size_t i = 0; fine && i < own->count; i++) {
        bool typed = false;
        for (size_t k = 0; k < fixed->count; k++)
            typed |= fabs(fixed->at[k] - own->at[i]) < 1e-3;
        if (!typed && own->at[i] > g->low[axis] + 1e-3 && own->at[i] < g->high[axis] - 1e-3)
            fine = add_line(g, plane, axis, own->at[i], (struct plane_line){0});
    }
    free(all.at);
    return fine;
}

static enum status run(const struct grid *g)
{
    struct plane plane = {0};
    struct stations fixed[2] = {{0}, {0}}, own[2] = {{0}, {0}};
    bool fine =
        asked_lines(g, &plane, fixed) && match_stations(g, own) && place_boxes(g, &plane, own);
    for (size_t i = 0; fine && i < g->corner_count; i++)
        for (int axis = 0; fine && axis < 2; axis++)
            if (g->corner[i].choice == axis || g->corner[i].choice == 2)
                fine = station(&own[axis], g->corner[i].at[axis]);
    fine = fine && fill_gaps(g, &plane, &own[0], &fixed[0], 0) &&
           fill_gaps(g, &plane, &own[1], &fixed[1], 1);
    const enum status status = fine ? trials_run(g->t, &plane) : STATUS_NO_MEMORY;
    plane_free(&plane);
    for (int axis = 0; axis < 2; axis++) {
        free(fixed[axis].at);
        free(own[axis].at);
    }
    return status;
}

static enum status starts(struct grid *g)
{
    enum status status = STATUS_OK;
    int best_more[2] = {0, 0}, best_start = 0;
    for (int start = 0; !status && start < 3; start++)
        for (int k = 0; !status && k < 4 && trials_go_on(g->t); k++) {
            g->more[0] = k & 1;
            g->more[1] = k >> 1;
            for (size_t i = 0; i < g->corner_count; i++)
                g->corner[i].choice = start;
            status = run(g);
            if (g->t->last_is_best) {
                best_start = start;
                memcpy(best_more, g->more, sizeof best_more);
            }
        }
    memcpy(g->more, best_more, sizeof best_more);
    for (size_t i = 0; i < g->corner_count; i++)
        g->corner[i].choice = best_start;
    return status;
}

static enum status flips(struct grid *g)
{
    enum status status = STATUS_OK;
    for (bool gained = true; gained && !status;) {
        gained = false;
        for (size_t i = 0; !status && i < g->corner_count && trials_go_on(g->t); i++) {
            const int was = g->corner[i].choice;
            int keep = was;
            for (int step = 1; !status && step < 3; step++) {
                g->corner[i].choice = (was + step) % 3;
                status = run(g);
                if (g->t->last_is_best)
                    keep = g->corner[i].choice;
            }
            g->corner[i].choice = keep;
            gained |= keep != was;
        }
    }
    return status;
}

static void grid_make(struct grid *g, double angle)
{
    const struct layout *out = g->t->w->out;
    g->c = cos(angle);
    g->s = sin(angle);
    for (int axis = 0; axis < 2; axis++) {
        g->low[axis] = INFINITY;
        g->high[axis] = -INFINITY;
    }
    for (size_t i = 0; i < out->outline_count; i++) {
        double at[2];
        to_frame(g, out->outline[i], at);
        for (int axis = 0; axis < 2; axis++) {
            g->low[axis] = fmin(g->low[axis], at[axis]);
            g->high[axis] = fmax(g->high[axis], at[axis]);
        }
    }
    find_corners(g, out->outline, out->outline_count, ring_sign(out->outline, out->outline_count));
    for (size_t i = 0; i < out->opening_count; i++)
        find_corners(g, out->openings[i].points, out->openings[i].count,
                     -ring_sign(out->openings[i].points, out->openings[i].count));
}

/* The frame runs along the slab's longest side, or the length-weighted next ones. */
enum status shape_grid(struct trials *t)
{
    const struct layout *out = t->w->out;
    double tried[3];
    int count = 0;
    enum status status = STATUS_OK;
    double limit = INFINITY;
    for (size_t round = 0; !status && round < out->outline_count && count < 3; round++) {
        double longest = 0, angle = 0;
        for (size_t i = 0; i < out->outline_count; i++) {
            const struct layout_point a = out->outline[i],
                                      b = out->outline[(i + 1) % out->outline_count];
            const double length = hypot(b.x - a.x, b.y - a.y);
            if (length > longest && length < limit - 1e-9) {
                longest = length;
                angle = atan2(b.y - a.y, b.x - a.x);
            }
        }
        if (longest <= 0)
            break;
        limit = longest;
        angle -= 3.14159265358979323846 / 2 * floor(angle / (3.14159265358979323846 / 2) + 0.5);
        bool known = false;
        for (int i = 0; i < count; i++)
            known |= fabs(tried[i] - angle) < 1e-3;
        if (known)
            continue;
        tried[count++] = angle;
        struct grid g = {.t = t};
        grid_make(&g, angle);
        status = starts(&g);
        if (!status && t->best.violations)
            status = flips(&g);
        if (t->any && !t->best.violations)
            break;
    }
    return status;
}
