/* The rules of joints on the finished plan: no dead end, neighbours matched, pour lines there and
 * strips narrow enough, objects isolated, no joint where the user forbade one, the slab covered. */
#include "core/layout_index.h"
#include "core/layout_plane.h"
#include "core/layout_work.h"
#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

static const double near_m = 1.5e-3;
static const double pi = 3.14159265358979323846;

static bool add(struct work *w, struct layout_reason reason, const char *cause, const char *remedy)
{
    snprintf(reason.cause, sizeof reason.cause, "%s", cause);
    snprintf(reason.remedy, sizeof reason.remedy, "%s", remedy);
    w->out->violations++;
    return layout_reason_add(&w->out->reasons, &w->out->reason_count, reason);
}

static bool on_side(struct layout_point a, struct layout_point b, double x, double y)
{
    const double dx = b.x - a.x, dy = b.y - a.y, length = hypot(dx, dy);
    const double s = ((x - a.x) * dx + (y - a.y) * dy) / length;
    return fabs((x - a.x) * dy - (y - a.y) * dx) / length < near_m && s > -near_m &&
           s < length + near_m;
}

static bool on_boundary(const struct layout *out, double x, double y)
{
    for (size_t k = 0; k < out->opening_count + 1; k++) {
        const struct layout_point *ring = k ? out->openings[k - 1].points : out->outline;
        const size_t n = k ? out->openings[k - 1].count : out->outline_count;
        for (size_t i = 0; i < n; i++)
            if (on_side(ring[i], ring[(i + 1) % n], x, y))
                return true;
    }
    return false;
}

/* How another joint that touches the end of this one takes it on: ux, uy is the way out. */
static bool takes_on(const struct layout *out, const struct layout_joint *j,
                     const struct layout_joint *o, double x, double y, double ux, double uy,
                     double side)
{
    const double length = hypot(o->x2 - o->x1, o->y2 - o->y1);
    const double vx = (o->x2 - o->x1) / length, vy = (o->y2 - o->y1) / length;
    const double along = (x - o->x1) * vx + (y - o->y1) * vy;
    if (fabs((x - o->x1) * vy - (y - o->y1) * vx) > near_m || along < -near_m ||
        along > length + near_m)
        return false;
    const bool through = along > near_m && along < length - near_m;
    if (o->kind == LAYOUT_ISOLATION)
        return true;
    if (o->kind == LAYOUT_CONSTRUCTION && (j->kind == LAYOUT_CONTRACTION || through))
        return true;
    const double ahead = vx * ux + vy * uy;
    if ((along < length - near_m && ahead > cos(30.5 * pi / 180)) ||
        (along > near_m && -ahead > cos(30.5 * pi / 180)))
        return true;
    const bool at_start = along <= near_m; /* a short piece, turned by 60 at most, to the edge */
    return !through && length <= fmax(1.5, 0.35 * side) &&
           (at_start ? ahead : -ahead) > cos(60.5 * pi / 180) &&
           on_boundary(out, at_start ? o->x2 : o->x1, at_start ? o->y2 : o->y1);
}

struct ends { /* the joints by where they are, in axes along the longest of them */
    struct layout_index index;
    double ux, uy;
};

static bool ends_make(const struct layout *out, struct ends *ends)
{
    struct layout_extent *e = calloc(out->joint_count + 1, sizeof *e);
    double longest = 0;
    if (!e)
        return false;
    *ends = (struct ends){.ux = 1};
    for (size_t i = 0; i < out->joint_count; i++) {
        const double dx = out->joints[i].x2 - out->joints[i].x1,
                     dy = out->joints[i].y2 - out->joints[i].y1, length = hypot(dx, dy);
        if (length <= longest)
            continue;
        longest = length;
        ends->ux = dx / length;
        ends->uy = dy / length;
    }
    for (size_t i = 0; i < out->joint_count; i++) {
        const struct layout_joint *j = &out->joints[i];
        const double x1 = j->x1 * ends->ux + j->y1 * ends->uy,
                     y1 = j->y1 * ends->ux - j->x1 * ends->uy,
                     x2 = j->x2 * ends->ux + j->y2 * ends->uy,
                     y2 = j->y2 * ends->ux - j->x2 * ends->uy;
        e[i] = (struct layout_extent){fmin(x1, x2) - 2 * near_m, fmin(y1, y2) - 2 * near_m,
                                      fmax(x1, x2) + 2 * near_m, fmax(y1, y2) + 2 * near_m};
    }
    const bool fine = layout_index_make(&ends->index, e, out->joint_count);
    free(e);
    return fine;
}

static bool end_is_good(const struct work *w, const struct ends *ends, size_t i, bool second)
{
    const struct layout *out = w->out;
    const struct layout_joint *j = &out->joints[i];
    const double x = second ? j->x2 : j->x1, y = second ? j->y2 : j->y1;
    const double length = hypot(j->x2 - j->x1, j->y2 - j->y1), sign = second ? 1 : -1;
    const double ux = sign * (j->x2 - j->x1) / length, uy = sign * (j->y2 - j->y1) / length;
    const double side = fmax(w->input->max_side_x, w->input->max_side_y);
    if (on_boundary(out, x, y))
        return true;
    const size_t *list;
    const size_t n = layout_index_at(&ends->index, x * ends->ux + y * ends->uy,
                                     y * ends->ux - x * ends->uy, &list);
    for (size_t k = 0; k < n; k++) {
        const struct layout_joint *o = &out->joints[list[k]];
        if (list[k] == i || fmin(o->x1, o->x2) > x + near_m || fmax(o->x1, o->x2) < x - near_m ||
            fmin(o->y1, o->y2) > y + near_m || fmax(o->y1, o->y2) < y - near_m)
            continue;
        if (takes_on(out, j, o, x, y, ux, uy, side))
            return true;
    }
    return false;
}

static bool check_end(struct work *w, const struct ends *ends, size_t i, bool second)
{
    const struct layout_joint *j = &w->out->joints[i];
    char cause[160];
    if (end_is_good(w, ends, i, second))
        return true;
    snprintf(cause, sizeof cause,
             "Joint %.20s ends at %.3f, %.3f m in a panel's side, where nothing takes it on.",
             j->id, second ? j->x2 : j->x1, second ? j->y2 : j->y1);
    return add(w, (struct layout_reason){.code = "DEAD_END", .rule = "joint.end"}, cause,
               "Lead it on to the edge, or make the joint it meets a construction joint.");
}

static bool check_ends(struct work *w)
{
    struct ends ends = {.ux = 1};
    bool fine = ends_make(w->out, &ends);
    for (size_t i = 0; fine && i < w->out->joint_count; i++)
        if (w->out->joints[i].kind != LAYOUT_ISOLATION)
            fine = check_end(w, &ends, i, false) && check_end(w, &ends, i, true);
    layout_index_free(&ends.index);
    return fine;
}

static bool check_matches(struct work *w)
{
    const struct layout *out = w->out;
    for (size_t i = 0; i < out->edge_count; i++) {
        const struct layout_edge_out *e = &out->edges[i];
        const struct layout_point a = out->outline[e->index],
                                  b = out->outline[(e->index + 1) % out->outline_count];
        const double length = hypot(b.x - a.x, b.y - a.y);
        if (e->kind != LAYOUT_EDGE_EXISTING || e->isolate)
            continue;
        for (size_t k = 0; k < e->joint_count; k++) {
            const double t = e->joints[k] / length, x = a.x + t * (b.x - a.x),
                         y = a.y + t * (b.y - a.y);
            bool met = false;
            for (size_t n = 0; n < out->joint_count && !met; n++) {
                const struct layout_joint *j = &out->joints[n];
                met = j->kind != LAYOUT_ISOLATION &&
                      (hypot(j->x1 - x, j->y1 - y) < 2e-3 || hypot(j->x2 - x, j->y2 - y) < 2e-3);
            }
            char cause[160];
            snprintf(
                cause, sizeof cause,
                "The neighbour's joint %.3f m along side %zu goes on in no joint of this slab.",
                e->joints[k], e->edge);
            if (!met && !add(w, (struct layout_reason){.code = "MATCH_GAP", .rule = "edge.match"},
                             cause, "Isolate this side (treat = isolate), or move the joint."))
                return false;
        }
    }
    return true;
}

static double covered_by(const struct layout *out, const struct layout_segment *s)
{
    const double length = hypot(s->x2 - s->x1, s->y2 - s->y1);
    const double ux = (s->x2 - s->x1) / length, uy = (s->y2 - s->y1) / length;
    double sum = 0;
    for (size_t i = 0; i < out->joint_count; i++) {
        const struct layout_joint *j = &out->joints[i];
        const double a = (j->x1 - s->x1) * ux + (j->y1 - s->y1) * uy;
        const double b = (j->x2 - s->x1) * ux + (j->y2 - s->y1) * uy;
        const double p = fabs((j->x1 - s->x1) * uy - (j->y1 - s->y1) * ux),
                     q = fabs((j->x2 - s->x1) * uy - (j->y2 - s->y1) * ux);
        if (j->kind == LAYOUT_CONSTRUCTION && p < 1e-3 && q < 1e-3)
            sum += fmax(0, fmin(fmax(a, b), length) - fmax(fmin(a, b), 0));
    }
    return sum;
}

/* Metres of the segment inside a panel or between two: on the slab and in no box. */
static double on_panels(const struct layout *out, const struct layout_segment *s)
{
    const int n = 400;
    int hits = 0;
    for (int i = 0; i < n; i++) {
        const double t = (i + 0.5) / n;
        const struct layout_point p = {s->x1 + t * (s->x2 - s->x1), s->y1 + t * (s->y2 - s->y1)};
        bool inside =
            plane_holds(out->outline, out->outline_count, p) && !on_boundary(out, p.x, p.y);
        for (size_t k = 0; k < out->opening_count && inside; k++)
            inside = !plane_holds(out->openings[k].points, out->openings[k].count, p);
        for (size_t k = 0; k < out->box_count && inside; k++)
            inside = fabs(p.x - out->boxes[k].x) + fabs(p.y - out->boxes[k].y) >
                     out->boxes[k].half * 1.5;
        hits += inside;
    }
    return hypot(s->x2 - s->x1, s->y2 - s->y1) * hits / n;
}

static bool check_pour_lines(struct work *w)
{
    for (size_t i = 0; w->input->has_pours && i < w->input->pour_line_count; i++) {
        const struct layout_segment *s = &w->input->pour_lines[i];
        const double length = hypot(s->x2 - s->x1, s->y2 - s->y1);
        const double want = on_panels(w->out, s), have = length > 0 ? covered_by(w->out, s) : 0;
        if (have >= want - 0.02 - length / 200)
            continue;
        const struct layout_reason reason = {
            .code = "POUR_LINE", .rule = "pour.line", .value = have, .limit = want};
        if (!add(w, reason, "A pour line is no construction joint over its full length.",
                 "Draw it along the slab's main directions, or move it onto the slab."))
            return false;
    }
    return true;
}

/* The nearest side or joint (none of contraction) from p along (ux, uy). */
static double clear_way(const struct layout *out, struct layout_point p, double ux, double uy)
{
    double least = INFINITY;
    for (size_t i = 0; i < out->joint_count + out->outline_count; i++) {
        struct layout_segment s;
        if (i < out->joint_count) {
            const struct layout_joint *j = &out->joints[i];
            if (j->kind == LAYOUT_CONTRACTION)
                continue;
            s = (struct layout_segment){j->x1, j->y1, j->x2, j->y2};
        } else {
            const struct layout_point a = out->outline[i - out->joint_count];
            const struct layout_point b =
                out->outline[(i - out->joint_count + 1) % out->outline_count];
            s = (struct layout_segment){a.x, a.y, b.x, b.y};
        }
        const double t1 = -(s.x1 - p.x) * uy + (s.y1 - p.y) * ux;
        const double t2 = -(s.x2 - p.x) * uy + (s.y2 - p.y) * ux;
        if ((t1 > 0) == (t2 > 0))
            continue;
        const double f = t1 / (t1 - t2);
        const double way =
            (s.x1 + f * (s.x2 - s.x1) - p.x) * ux + (s.y1 + f * (s.y2 - s.y1) - p.y) * uy;
        if (way > 0)
            least = fmin(least, way);
    }
    return least;
}

/* Square to the pours, from the middle of each panel both ways, the strip is no wider than asked.
 */
static bool check_pour_width(struct work *w)
{
    struct layout *out = w->out;
    if (!w->input->has_pours || w->input->pour_width <= 0)
        return true;
    const double a = w->input->pour_direction_deg * pi / 180;
    double widest = 0;
    for (size_t i = 0; i < out->panel_count; i++) {
        struct layout_point p = {0, 0};
        for (size_t k = 0; k < out->panels[i].count; k++) {
            p.x += out->panels[i].ring[k].x / (double)out->panels[i].count;
            p.y += out->panels[i].ring[k].y / (double)out->panels[i].count;
        }
        widest =
            fmax(widest, clear_way(out, p, -sin(a), cos(a)) + clear_way(out, p, sin(a), -cos(a)));
    }
    const struct layout_reason reason = {
        .code = "POUR_WIDTH", .rule = "pour.width", .value = widest, .limit = w->input->pour_width};
    return widest <= w->input->pour_width * (1 + 2e-3) ||
           add(w, reason, "A pour is wider than asked: no construction joint divides it.",
               "Add a pour line, or allow wider pours.");
}

static bool holds_point(const struct layout *out, const struct layout_index *index,
                        struct layout_point p)
{
    const size_t *list;
    const size_t n = layout_index_at(index, p.x, p.y, &list);
    for (size_t i = 0; i < n; i++)
        if (plane_holds(out->panels[list[i]].ring, out->panels[list[i]].count, p))
            return true;
    return false;
}

static bool index_panels(const struct layout *out, struct layout_index *index)
{
    struct layout_extent *e = calloc(out->panel_count + 1, sizeof *e);
    if (!e)
        return false;
    for (size_t i = 0; i < out->panel_count; i++) {
        e[i] = (struct layout_extent){INFINITY, INFINITY, -INFINITY, -INFINITY};
        for (size_t k = 0; k < out->panels[i].count; k++) {
            const struct layout_point p = out->panels[i].ring[k];
            e[i].x0 = fmin(e[i].x0, p.x);
            e[i].y0 = fmin(e[i].y0, p.y);
            e[i].x1 = fmax(e[i].x1, p.x);
            e[i].y1 = fmax(e[i].y1, p.y);
        }
    }
    const bool fine = layout_index_make(index, e, out->panel_count);
    free(e);
    return fine;
}

/* Corners of an object, drawn in by a hair, must lie in no panel. */
static bool is_isolated(const struct layout *out, const struct layout_index *index,
                        const struct layout_object *o)
{
    const double a = o->angle_deg * pi / 180, hair = 0.999;
    for (int i = 0; i < 8; i++) {
        const double t = i * pi / 4;
        double dx = o->w / 2 * hair * cos(t), dy = o->w / 2 * hair * sin(t);
        if (!o->round) {
            dx = (i & 1 ? 0.5 : -0.5) * o->w * hair * (i & 4 ? 0 : 1);
            dy = (i & 2 ? 0.5 : -0.5) * o->d * hair * (i & 4 ? 0 : 1);
        }
        if (holds_point(out, index,
                        (struct layout_point){o->x + dx * cos(a) - dy * sin(a),
                                              o->y + dx * sin(a) + dy * cos(a)}))
            return false;
    }
    return true;
}

static bool check_objects(struct work *w)
{
    struct layout_index index = {0};
    bool fine = !w->input->object_count || index_panels(w->out, &index);
    for (size_t i = 0; fine && i < w->input->object_count; i++) {
        const struct layout_object *o = &w->input->objects[i];
        bool told = !o->isolate;
        for (size_t k = 0; k < w->box_count; k++)
            told |= w->boxes[k].object == (int)i && w->boxes[k].dropped;
        char cause[160];
        snprintf(cause, sizeof cause, "The box round %.32s does not hold the whole object.", o->id);
        if (!told && !is_isolated(w->out, &index, o))
            fine = add(w, (struct layout_reason){.code = "BOX_CLASH", .rule = "object.isolated"},
                       cause, "Give it a larger box-half, or move its box with box-at.");
    }
    layout_index_free(&index);
    return fine;
}

/* A joint drawn with keep = no: none may run there. */
static bool check_forbidden(struct work *w)
{
    for (size_t i = 0; i < w->input->drawn_count; i++) {
        const struct layout_drawn *d = &w->input->drawn[i];
        const double length = hypot(d->at.x2 - d->at.x1, d->at.y2 - d->at.y1);
        if (d->keep || !(length > 0))
            continue;
        for (size_t k = 0; k < w->out->joint_count; k++) {
            const struct layout_joint *j = &w->out->joints[k];
            const double ux = (d->at.x2 - d->at.x1) / length, uy = (d->at.y2 - d->at.y1) / length;
            const double a = (j->x1 - d->at.x1) * ux + (j->y1 - d->at.y1) * uy;
            const double b = (j->x2 - d->at.x1) * ux + (j->y2 - d->at.y1) * uy;
            const double p = (j->x1 - d->at.x1) * uy - (j->y1 - d->at.y1) * ux;
            const double q = (j->x2 - d->at.x1) * uy - (j->y2 - d->at.y1) * ux;
            if (j->edge >= 0 || j->opening >= 0 || j->object >= 0 || fabs(p) > 2e-3 ||
                fabs(q) > 2e-3 || fmin(fmax(a, b), length) - fmax(fmin(a, b), 0) < 2e-3)
                continue;
            char cause[160];
            snprintf(cause, sizeof cause,
                     "Joint %.20s runs where you allowed none: an object, corner or line needs it.",
                     j->id);
            if (!add(w, (struct layout_reason){.code = "FORBIDDEN", .rule = "joint.end"}, cause,
                     "Allow a joint there, or move what needs it."))
                return false;
            break;
        }
    }
    return true;
}

static double ring_area(const struct layout_point *ring, size_t n)
{
    double area = 0;
    for (size_t i = 0; i < n; i++) {
        const struct layout_point a = ring[i], b = ring[(i + 1) % n], o = ring[0];
        area += (a.x - o.x) * (b.y - o.y) - (b.x - o.x) * (a.y - o.y);
    }
    return fabs(area) / 2;
}

/* Panels that cover more than the slab hold an opening that no joint reaches. */
static bool check_cover(struct work *w)
{
    double slab = ring_area(w->out->outline, w->out->outline_count);
    for (size_t i = 0; i < w->out->opening_count; i++)
        slab -= ring_area(w->out->openings[i].points, w->out->openings[i].count);
    const struct layout_reason reason = {
        .code = "GIVEN_ANGLE", .rule = "panel.corner", .value = w->out->area, .limit = slab};
    if (w->out->panel_count && w->out->area > slab * (1 + 1e-6))
        return add(w, reason, "A panel goes all round an opening or a box: no joint reaches it.",
                   "Draw a joint from the opening to the slab edge.");
    if (!w->out->panel_count && slab > 0 && !w->out->violations)
        return add(w, reason, "No panel could be made of this slab.",
                   "Check the corners of the outline and of the openings.");
    return true;
}

enum status layout_check_joints(struct work *w)
{
    const bool fine = check_ends(w) && check_matches(w) && check_pour_lines(w) &&
                      check_pour_width(w) && check_objects(w) && check_forbidden(w) &&
                      check_cover(w);
    return fine ? STATUS_OK : STATUS_NO_MEMORY;
}
