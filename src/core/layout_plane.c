/* The arrangement of the slab's sides, boxes and joint lines: split at every crossing, one node per
 * point, faces walked round by the sharpest turn. */
#include "core/layout_plane.h"
#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

static const double same_m = 2e-5; /* points nearer than this are one node */

enum source { FROM_EDGE, FROM_BOX, FROM_LINE };
struct side { /* a segment before it is split */
    struct layout_segment at;
    enum source source;
    size_t index;
};
struct arm { /* half of an edge: from its node outward */
    size_t from, to, twin, next, face;
    double angle;
    enum source source;
    size_t index;
    double along; /* of its middle on the side it is part of */
    bool dead;
};
struct web {
    struct side *sides;
    size_t side_count;
    double (*split)[2]; /* side, share of its length */
    size_t split_count, split_room;
    struct layout_point *nodes;
    size_t node_count;
    struct arm *arms;
    size_t arm_count;
    int *panel; /* of each face, -1 = none */
    size_t face_count;
};

bool plane_add(struct plane *plane, struct plane_line line)
{
    if (plane->line_count == plane->line_room) {
        const size_t room = plane->line_room ? 2 * plane->line_room : 64;
        struct plane_line *more = realloc(plane->lines, room * sizeof *more);
        if (!more)
            return false;
        plane->lines = more;
        plane->line_room = room;
    }
    plane->lines[plane->line_count++] = line;
    return true;
}

void plane_free(struct plane *plane)
{
    free(plane->lines);
    free(plane->boxes);
    *plane = (struct plane){0};
}

bool plane_holds(const struct layout_point *ring, size_t count, struct layout_point p)
{
    bool inside = false;
    for (size_t i = 0, k = count - 1; i < count; k = i++)
        if ((ring[i].y > p.y) != (ring[k].y > p.y) &&
            p.x < (ring[k].x - ring[i].x) * (p.y - ring[i].y) / (ring[k].y - ring[i].y) + ring[i].x)
            inside = !inside;
    return inside;
}

/* On the slab: in the outline, in no opening and no box. */
static bool on_slab(const struct layout *out, const struct plane *plane, struct layout_point p)
{
    if (!plane_holds(out->outline, out->outline_count, p))
        return false;
    for (size_t i = 0; i < out->opening_count; i++)
        if (plane_holds(out->openings[i].points, out->openings[i].count, p))
            return false;
    for (size_t i = 0; i < plane->box_count; i++)
        if (plane_holds(plane->boxes[i].tip, 4, p))
            return false;
    return true;
}

static void add_ring(struct web *w, const struct layout_point *ring, size_t count,
                     enum source source, size_t index)
{
    for (size_t i = 0; i < count; i++) {
        const struct layout_point a = ring[i], b = ring[(i + 1) % count];
        if (hypot(b.x - a.x, b.y - a.y) > same_m)
            w->sides[w->side_count++] = (struct side){{a.x, a.y, b.x, b.y}, source, index};
    }
}

static bool collect_sides(struct web *w, const struct layout *out, const struct plane *plane)
{
    size_t room = out->outline_count + 4 * plane->box_count + plane->line_count + 1;
    for (size_t i = 0; i < out->opening_count; i++)
        room += out->openings[i].count;
    w->sides = calloc(room, sizeof *w->sides);
    if (!w->sides)
        return false;
    add_ring(w, out->outline, out->outline_count, FROM_EDGE, 0);
    for (size_t i = 0; i < out->opening_count; i++)
        add_ring(w, out->openings[i].points, out->openings[i].count, FROM_EDGE, i + 1);
    for (size_t i = 0; i < plane->box_count; i++)
        add_ring(w, plane->boxes[i].tip, 4, FROM_BOX, i);
    for (size_t i = 0; i < plane->line_count; i++) {
        const struct layout_segment *s = &plane->lines[i].at;
        if (hypot(s->x2 - s->x1, s->y2 - s->y1) > same_m)
            w->sides[w->side_count++] = (struct side){*s, FROM_LINE, i};
    }
    return true;
}

static bool add_split(struct web *w, size_t side, double t)
{
    if (w->split_count == w->split_room) {
        const size_t room = w->split_room ? 2 * w->split_room : 256;
        double(*more)[2] = realloc(w->split, room * sizeof *more);
        if (!more)
            return false;
        w->split = more;
        w->split_room = room;
    }
    w->split[w->split_count][0] = (double)side;
    w->split[w->split_count++][1] = t < 0 ? 0 : t > 1 ? 1 : t;
    return true;
}

/* An end of `other` that lies on the side splits it there. */
static bool split_at_end(struct web *w, size_t i, double x, double y)
{
    const struct layout_segment *s = &w->sides[i].at;
    const double dx = s->x2 - s->x1, dy = s->y2 - s->y1, length = hypot(dx, dy);
    const double t = ((x - s->x1) * dx + (y - s->y1) * dy) / length / length;
    const double off = fabs((x - s->x1) * dy - (y - s->y1) * dx) / length;
    return off > same_m || t * length < -same_m || (t - 1) * length > same_m || add_split(w, i, t);
}

static bool cross(struct web *w, size_t i, size_t k)
{
    const struct layout_segment *a = &w->sides[i].at, *b = &w->sides[k].at;
    const double ax = a->x2 - a->x1, ay = a->y2 - a->y1, bx = b->x2 - b->x1, by = b->y2 - b->y1;
    const double d = ax * by - ay * bx;
    if (fabs(d) < 1e-9 * hypot(ax, ay) * hypot(bx, by))
        return true;
    const double t = ((b->x1 - a->x1) * by - (b->y1 - a->y1) * bx) / d;
    const double u = ((b->x1 - a->x1) * ay - (b->y1 - a->y1) * ax) / d;
    if (t < 0 || t > 1 || u < 0 || u > 1)
        return true;
    return add_split(w, i, t) && add_split(w, k, u);
}

static bool apart(const struct layout_segment *a, const struct layout_segment *b)
{
    return fmax(a->x1, a->x2) < fmin(b->x1, b->x2) - same_m ||
           fmax(b->x1, b->x2) < fmin(a->x1, a->x2) - same_m ||
           fmax(a->y1, a->y2) < fmin(b->y1, b->y2) - same_m ||
           fmax(b->y1, b->y2) < fmin(a->y1, a->y2) - same_m;
}

static int compare_split(const void *a, const void *b)
{
    const double *p = a, *q = b;
    if (p[0] < q[0] || p[0] > q[0])
        return p[0] < q[0] ? -1 : 1;
    return (p[1] > q[1]) - (p[1] < q[1]);
}

static bool split_all(struct web *w)
{
    for (size_t i = 0; i < w->side_count; i++) {
        if (!add_split(w, i, 0) || !add_split(w, i, 1))
            return false;
        const struct layout_segment *a = &w->sides[i].at;
        for (size_t k = i + 1; k < w->side_count; k++) {
            const struct layout_segment *b = &w->sides[k].at;
            if (apart(a, b))
                continue;
            if (!cross(w, i, k) || !split_at_end(w, i, b->x1, b->y1) ||
                !split_at_end(w, i, b->x2, b->y2) || !split_at_end(w, k, a->x1, a->y1) ||
                !split_at_end(w, k, a->x2, a->y2))
                return false;
        }
    }
    qsort(w->split, w->split_count, sizeof *w->split, compare_split);
    return true;
}

struct spot {
    double x, y;
    size_t split;
};

static int compare_spot(const void *a, const void *b)
{
    const struct spot *p = a, *q = b;
    if (p->x < q->x || p->x > q->x)
        return p->x < q->x ? -1 : 1;
    if (p->y < q->y || p->y > q->y)
        return p->y < q->y ? -1 : 1;
    return (p->split > q->split) - (p->split < q->split);
}

/* One node for all spots within the tolerance; a corner of the slab keeps its own digits. */
static bool make_nodes(struct web *w, size_t *node_of)
{
    struct spot *spots = calloc(w->split_count + 1, sizeof *spots);
    w->nodes = calloc(w->split_count + 1, sizeof *w->nodes);
    if (!spots || !w->nodes) {
        free(spots);
        return false;
    }
    for (size_t i = 0; i < w->split_count; i++) {
        const struct layout_segment *s = &w->sides[(size_t)w->split[i][0]].at;
        const double t = w->split[i][1];
        spots[i] = (struct spot){t >= 1 ? s->x2 : s->x1 + t * (s->x2 - s->x1),
                                 t >= 1 ? s->y2 : s->y1 + t * (s->y2 - s->y1), i};
    }
    qsort(spots, w->split_count, sizeof *spots, compare_spot);
    size_t low = 0;
    for (size_t i = 0; i < w->split_count; i++) {
        while (low < w->node_count && w->nodes[low].x < spots[i].x - same_m)
            low++;
        size_t at = SIZE_MAX;
        for (size_t k = low; k < w->node_count && at == SIZE_MAX; k++)
            if (fabs(w->nodes[k].y - spots[i].y) <= same_m)
                at = k;
        if (at == SIZE_MAX) {
            at = w->node_count++;
            w->nodes[at] = (struct layout_point){spots[i].x, spots[i].y};
        }
        node_of[spots[i].split] = at;
    }
    /* the slab's own corners give the digits */
    for (size_t i = 0; i < w->split_count; i++) {
        const struct side *s = &w->sides[(size_t)w->split[i][0]];
        if (s->source == FROM_EDGE && w->split[i][1] <= 0)
            w->nodes[node_of[i]] = (struct layout_point){s->at.x1, s->at.y1};
    }
    free(spots);
    return true;
}

static int compare_arm(const void *a, const void *b)
{
    const struct arm *p = a, *q = b;
    if (p->from != q->from)
        return p->from < q->from ? -1 : 1;
    if (p->to != q->to)
        return p->to < q->to ? -1 : 1;
    if (p->source != q->source)
        return p->source < q->source ? -1 : 1;
    return (p->index > q->index) - (p->index < q->index);
}

/* Edges between neighbouring nodes of a side that lie on the slab or bound it; doubles kept once.
 */
static bool make_arms(struct web *w, const struct layout *out, const struct plane *plane,
                      const size_t *node_of)
{
    w->arms = calloc(2 * w->split_count + 2, sizeof *w->arms);
    if (!w->arms)
        return false;
    size_t n = 0;
    for (size_t i = 0; i + 1 < w->split_count; i++) {
        const size_t a = node_of[i], b = node_of[i + 1];
        const struct side *s = &w->sides[(size_t)w->split[i][0]];
        if (w->split[i][0] < w->split[i + 1][0] || a == b)
            continue;
        const struct layout_point m = {(w->nodes[a].x + w->nodes[b].x) / 2,
                                       (w->nodes[a].y + w->nodes[b].y) / 2};
        if (s->source == FROM_LINE && !on_slab(out, plane, m))
            continue;
        if (s->source == FROM_BOX && !plane_holds(out->outline, out->outline_count, m))
            continue;
        const struct arm arm = {.from = a,
                                .to = b,
                                .source = s->source,
                                .index = s->index,
                                .along = (w->split[i][1] + w->split[i + 1][1]) / 2};
        w->arms[n++] = arm;
        w->arms[n] = arm;
        w->arms[n].from = b;
        w->arms[n++].to = a;
    }
    qsort(w->arms, n, sizeof *w->arms, compare_arm);
    for (size_t i = 0; i < n; i++)
        if (!w->arm_count || w->arms[i].from != w->arms[w->arm_count - 1].from ||
            w->arms[i].to != w->arms[w->arm_count - 1].to)
            w->arms[w->arm_count++] = w->arms[i];
    return true;
}

static size_t find_arm(const struct web *w, size_t from, size_t to)
{
    size_t low = 0, high = w->arm_count;
    while (low < high) {
        const size_t mid = (low + high) / 2;
        const struct arm *a = &w->arms[mid];
        if (a->from < from || (a->from == from && a->to < to))
            low = mid + 1;
        else
            high = mid;
    }
    return low;
}

/* Ends that nothing takes on are cut back. */
static bool trim(struct web *w)
{
    size_t *degree = calloc(w->node_count + 1, sizeof *degree);
    if (!degree)
        return false;
    for (size_t i = 0; i < w->arm_count; i++) {
        w->arms[i].twin = find_arm(w, w->arms[i].to, w->arms[i].from);
        degree[w->arms[i].from]++;
    }
    for (bool again = true; again;) {
        again = false;
        for (size_t i = 0; i < w->arm_count; i++)
            if (!w->arms[i].dead && degree[w->arms[i].from] == 1) {
                w->arms[i].dead = w->arms[w->arms[i].twin].dead = true;
                degree[w->arms[i].from]--;
                degree[w->arms[i].to]--;
                again = true;
            }
    }
    free(degree);
    return true;
}

/* The next arm round a face: from the end, the first one clockwise from the way back. */
static void link_arms(struct web *w)
{
    for (size_t i = 0; i < w->arm_count; i++) {
        const struct layout_point a = w->nodes[w->arms[i].from], b = w->nodes[w->arms[i].to];
        w->arms[i].angle = atan2(b.y - a.y, b.x - a.x);
        w->arms[i].face = SIZE_MAX;
    }
    for (size_t i = 0; i < w->arm_count; i++) {
        if (w->arms[i].dead)
            continue;
        const size_t node = w->arms[i].to;
        const double back = w->arms[w->arms[i].twin].angle;
        double best = INFINITY;
        for (size_t k = find_arm(w, node, 0); k < w->arm_count && w->arms[k].from == node; k++) {
            if (w->arms[k].dead)
                continue;
            double turn = back - w->arms[k].angle;
            if (turn <= 1e-12)
                turn += 2 * 3.14159265358979323846;
            if (turn < best) {
                best = turn;
                w->arms[i].next = k;
            }
        }
    }
}

static bool add_panel(struct web *w, struct layout *out, const struct plane *plane, size_t first)
{
    size_t count = 0, a = first;
    double area = 0, longest = 0;
    struct layout_point inner = {0, 0};
    const struct layout_point o = w->nodes[w->arms[first].from];
    do {
        const struct layout_point p = w->nodes[w->arms[a].from], q = w->nodes[w->arms[a].to];
        const double length = hypot(q.x - p.x, q.y - p.y);
        area += (p.x - o.x) * (q.y - o.y) - (q.x - o.x) * (p.y - o.y);
        if (length > longest) {
            longest = length;
            inner = (struct layout_point){(p.x + q.x) / 2 - (q.y - p.y) / length * 1e-4,
                                          (p.y + q.y) / 2 + (q.x - p.x) / length * 1e-4};
        }
        w->arms[a].face = w->face_count;
        count++;
        a = w->arms[a].next;
    } while (a != first && count <= w->arm_count);
    w->panel[w->face_count++] = -1;
    if (area / 2 < 1e-8 || !on_slab(out, plane, inner))
        return true;
    struct layout_panel *p = &out->panels[out->panel_count];
    *p = (struct layout_panel){.ring = calloc(count, sizeof *p->ring), .count = count};
    if (!p->ring)
        return false;
    for (size_t i = 0; i < count; i++, a = w->arms[a].next)
        p->ring[i] = w->nodes[w->arms[a].from];
    w->panel[w->face_count - 1] = (int)out->panel_count++;
    return true;
}

static bool walk_faces(struct web *w, struct layout *out, const struct plane *plane)
{
    out->panels = calloc(w->arm_count + 1, sizeof *out->panels);
    w->panel = calloc(w->arm_count + 1, sizeof *w->panel);
    if (!out->panels || !w->panel)
        return false;
    for (size_t i = 0; i < w->arm_count; i++)
        if (!w->arms[i].dead && w->arms[i].face == SIZE_MAX && !add_panel(w, out, plane, i))
            return false;
    return true;
}

struct low_corner {
    double x, y;
    size_t panel;
};

static int compare_low(const void *a, const void *b)
{
    const struct low_corner *p = a, *q = b;
    if (fabs(p->y - q->y) > 1e-7)
        return p->y < q->y ? -1 : 1;
    if (fabs(p->x - q->x) > 1e-7)
        return p->x < q->x ? -1 : 1;
    return (p->panel > q->panel) - (p->panel < q->panel);
}

/* Plan order: by the lowest, then leftmost corner. */
static bool order_panels(struct web *w, struct layout *out)
{
    struct low_corner *low = calloc(out->panel_count + 1, sizeof *low);
    struct layout_panel *sorted = calloc(out->panel_count + 1, sizeof *sorted);
    int *place = calloc(out->panel_count + 1, sizeof *place);
    const bool fine = low && sorted && place;
    for (size_t i = 0; fine && i < out->panel_count; i++) {
        low[i] = (struct low_corner){INFINITY, INFINITY, i};
        for (size_t k = 0; k < out->panels[i].count; k++) {
            const struct layout_point p = out->panels[i].ring[k];
            if (p.y < low[i].y - 1e-7 || (p.y < low[i].y + 1e-7 && p.x < low[i].x)) {
                low[i].x = p.x;
                low[i].y = p.y;
            }
        }
    }
    if (fine)
        qsort(low, out->panel_count, sizeof *low, compare_low);
    for (size_t i = 0; fine && i < out->panel_count; i++) {
        sorted[i] = out->panels[low[i].panel];
        sorted[i].number = (int)i + 1;
        place[low[i].panel] = (int)i;
    }
    for (size_t i = 0; fine && i < w->face_count; i++)
        if (w->panel[i] >= 0)
            w->panel[i] = place[w->panel[i]];
    if (fine)
        memcpy(out->panels, sorted, out->panel_count * sizeof *sorted);
    free(low);
    free(sorted);
    free(place);
    return fine;
}

static int panel_of(const struct web *w, size_t arm)
{
    return w->arms[arm].face == SIZE_MAX ? -1 : w->panel[w->arms[arm].face];
}

/* The piece goes on into the next one when they lie end to end on one straight line and nothing
 * but joints of contraction or construction crosses there. */
static bool extends(const struct layout_joint *j, const struct layout_joint *next)
{
    const double ax = j->x2 - j->x1, ay = j->y2 - j->y1, bx = next->x2 - next->x1,
                 by = next->y2 - next->y1;
    return j->line == next->line && j->kind == next->kind &&
           hypot(next->x1 - j->x2, next->y1 - j->y2) < same_m &&
           fabs(ax * by - ay * bx) < 1e-6 * hypot(ax, ay) * hypot(bx, by);
}

struct piece {
    size_t arm;
    size_t index;
    double along;
};

static int compare_piece(const void *a, const void *b)
{
    const struct piece *p = a, *q = b;
    if (p->index != q->index)
        return p->index < q->index ? -1 : 1;
    return (p->along > q->along) - (p->along < q->along);
}

static struct layout_joint joint_of(const struct web *w, size_t arm)
{
    const struct layout_point a = w->nodes[w->arms[arm].from], b = w->nodes[w->arms[arm].to];
    return (struct layout_joint){.object = -1,
                                 .edge = -1,
                                 .opening = -1,
                                 .x1 = a.x,
                                 .y1 = a.y,
                                 .x2 = b.x,
                                 .y2 = b.y,
                                 .left_panel = panel_of(w, arm),
                                 .right_panel = panel_of(w, w->arms[arm].twin)};
}

static bool line_joints(const struct web *w, struct layout *out, const struct plane *plane,
                        size_t *room)
{
    struct piece *pieces = calloc(w->arm_count + 1, sizeof *pieces);
    size_t n = 0;
    bool fine = pieces != NULL;
    for (size_t i = 0; fine && i < w->arm_count; i++) {
        const struct arm *a = &w->arms[i];
        if (a->dead || a->source != FROM_LINE)
            continue;
        const struct layout_segment *s = &plane->lines[a->index].at;
        const struct layout_point p = w->nodes[a->from], q = w->nodes[a->to];
        if ((q.x - p.x) * (s->x2 - s->x1) + (q.y - p.y) * (s->y2 - s->y1) > 0)
            pieces[n++] = (struct piece){i, a->index, a->along};
    }
    if (fine)
        qsort(pieces, n, sizeof *pieces, compare_piece);
    for (size_t i = 0; fine && i < n; i++) {
        const struct plane_line *line = &plane->lines[pieces[i].index];
        struct layout_joint joint = joint_of(w, pieces[i].arm);
        joint.line = line->line;
        joint.kind = line->kind;
        joint.expansion = line->expansion;
        joint.along_pour = line->along_pour;
        struct layout_joint *last = out->joint_count ? &out->joints[out->joint_count - 1] : NULL;
        if (last && i && extends(last, &joint)) {
            last->x2 = joint.x2;
            last->y2 = joint.y2;
        } else {
            fine = layout_joint_add(out, room, &joint);
        }
    }
    free(pieces);
    return fine;
}

static int order_class(const struct layout_joint *j)
{
    if (fabs(j->x1 - j->x2) < 1e-6)
        return 0;
    return fabs(j->y1 - j->y2) < 1e-6 ? 1 : 2;
}

struct line_order {
    int line, class;
    double first, second;
};

static int compare_line(const void *a, const void *b)
{
    const struct line_order *p = a, *q = b;
    if (p->class != q->class)
        return p->class - q->class;
    if (p->first < q->first || p->first > q->first)
        return p->first < q->first ? -1 : 1;
    if (p->second < q->second || p->second > q->second)
        return p->second < q->second ? -1 : 1;
    return p->line - q->line;
}

/* Lines J1, J2 ... in plan order; their pieces J4.1, J4.2 along them. */
static bool name_lines(struct layout *out, int lines)
{
    struct line_order *order = calloc((size_t)lines + 1, sizeof *order);
    int *number = calloc((size_t)lines + 1, sizeof *number),
        *pieces = calloc((size_t)lines + 1, sizeof *pieces),
        *named = calloc((size_t)lines + 1, sizeof *named);
    const bool fine = order && number && pieces && named;
    for (int i = 0; fine && i <= lines; i++)
        order[i] = (struct line_order){i, 9, 0, 0};
    for (size_t i = 0; fine && i < out->joint_count; i++) {
        const struct layout_joint *j = &out->joints[i];
        struct line_order *o = &order[j->line];
        const int class = order_class(j);
        const double low_x = fmin(j->x1, j->x2), low_y = fmin(j->y1, j->y2);
        if (!pieces[j->line]++)
            *o = (struct line_order){j->line, class, class ? low_y : low_x, class ? low_x : low_y};
        if (o->class != class)
            o->class = 2;
    }
    if (fine)
        qsort(order, (size_t)lines + 1, sizeof *order, compare_line);
    for (int i = 0, n = 0; fine && i <= lines; i++)
        if (pieces[order[i].line])
            number[order[i].line] = ++n;
    for (size_t i = 0; fine && i < out->joint_count; i++) {
        struct layout_joint *j = &out->joints[i];
        if (pieces[j->line] == 1)
            snprintf(j->id, sizeof j->id, "J%d", number[j->line]);
        else
            snprintf(j->id, sizeof j->id, "J%d.%d", number[j->line], ++named[j->line]);
        j->line = number[j->line];
    }
    free(order);
    free(number);
    free(pieces);
    free(named);
    return fine;
}

static bool box_joints(const struct web *w, const struct work *work, const struct plane *plane,
                       size_t *room)
{
    struct layout *out = work->out;
    out->boxes = calloc(plane->box_count + 1, sizeof *out->boxes);
    if (!out->boxes)
        return false;
    for (size_t b = 0; b < plane->box_count; b++) {
        const struct plane_box *box = &plane->boxes[b];
        int side = 0;
        out->boxes[out->box_count++] = (struct layout_box){
            .object = box->object, .x = box->centre.x, .y = box->centre.y, .half = box->half};
        for (size_t i = 0; i < w->arm_count; i++) {
            if (w->arms[i].dead || w->arms[i].source != FROM_BOX || w->arms[i].index != b ||
                panel_of(w, i) < 0)
                continue;
            struct layout_joint joint = joint_of(w, i);
            joint.kind = LAYOUT_ISOLATION;
            joint.object = box->object;
            snprintf(joint.id, sizeof joint.id, "%.32s.%d", work->input->objects[box->object].id,
                     ++side);
            if (!layout_joint_add(out, room, &joint))
                return false;
        }
    }
    return true;
}

static bool must_isolate(const struct work *w, const struct arm *a, const struct web *web,
                         int *edge)
{
    const struct layout_point p = web->nodes[a->from], q = web->nodes[a->to];
    const struct layout *out = w->out;
    *edge = -1;
    if (a->index)
        return w->input->opening_wall && w->input->opening_wall[a->index - 1];
    for (size_t i = 0; i < out->edge_count; i++) {
        const struct layout_edge_out *e = &out->edges[i];
        const struct layout_point s = out->outline[e->index],
                                  t = out->outline[(e->index + 1) % out->outline_count];
        const double length = hypot(t.x - s.x, t.y - s.y);
        const double mx = (p.x + q.x) / 2, my = (p.y + q.y) / 2;
        const double along = ((mx - s.x) * (t.x - s.x) + (my - s.y) * (t.y - s.y)) / length;
        const double off = ((mx - s.x) * (t.y - s.y) - (my - s.y) * (t.x - s.x)) / length;
        if (along < 0 || along > length || fabs(off) > 1e-4)
            continue;
        *edge = (int)e->edge - 1;
        return e->kind == LAYOUT_EDGE_FIXED || (e->kind == LAYOUT_EDGE_EXISTING && e->isolate);
    }
    return false;
}

/* Isolation along walls, kerbs and old slabs, and round openings against walls. */
static bool edge_joints(const struct web *w, const struct work *work, size_t *room)
{
    int number = 0;
    for (size_t i = 0; i < w->arm_count; i++) {
        const struct arm *a = &w->arms[i];
        int edge;
        if (a->dead || a->source != FROM_EDGE || panel_of(w, i) < 0 ||
            !must_isolate(work, a, w, &edge))
            continue;
        struct layout_joint joint = joint_of(w, i);
        joint.kind = LAYOUT_ISOLATION;
        joint.edge = edge;
        joint.opening = a->index ? (int)a->index - 1 : -1;
        if (edge >= 0)
            snprintf(joint.id, sizeof joint.id, "edge%d.%d", edge + 1, ++number);
        else
            snprintf(joint.id, sizeof joint.id, "opening%zu.%d", a->index, ++number);
        if (!layout_joint_add(work->out, room, &joint))
            return false;
    }
    return true;
}

/* Joints stand in plan order: by their lines' numbers, boxes and edges after. */
static int compare_joint(const void *a, const void *b)
{
    const struct layout_joint *p = a, *q = b;
    if (p->line != q->line)
        return p->line - q->line;
    int pn = 0, qn = 0;
    const char *pd = strchr(p->id, '.'), *qd = strchr(q->id, '.');
    pn = pd ? atoi(pd + 1) : 0;
    qn = qd ? atoi(qd + 1) : 0;
    return pn - qn;
}

enum status plane_emit(struct work *work, const struct plane *plane)
{
    struct web w = {0};
    struct layout *out = work->out;
    size_t *node_of = NULL, room = 0;
    int lines = 0;
    for (size_t i = 0; i < plane->line_count; i++)
        lines = plane->lines[i].line > lines ? plane->lines[i].line : lines;
    bool fine = collect_sides(&w, out, plane) && split_all(&w);
    fine = fine && (node_of = calloc(w.split_count + 1, sizeof *node_of)) != NULL;
    fine = fine && make_nodes(&w, node_of) && make_arms(&w, out, plane, node_of) && trim(&w);
    if (fine)
        link_arms(&w);
    fine = fine && walk_faces(&w, out, plane) && order_panels(&w, out) &&
           line_joints(&w, out, plane, &room) && name_lines(out, lines);
    if (fine && out->joint_count)
        qsort(out->joints, out->joint_count, sizeof *out->joints, compare_joint);
    fine = fine && box_joints(&w, work, plane, &room) && edge_joints(&w, work, &room);
    free(node_of);
    free(w.sides);
    free(w.split);
    free(w.nodes);
    free(w.arms);
    free(w.panel);
    return fine ? STATUS_OK : STATUS_NO_MEMORY;
}
