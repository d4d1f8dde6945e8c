/* Rings, sides and arcs of the outline as points: into the slab's own frame and back. */
#include "core/layout_work.h"
#include <math.h>
#include <stdlib.h>
#include <string.h>

void work_frame(const struct work *w, double x, double y, int64_t *fx, int64_t *fy)
{
    *fx = llround((x * w->cosine + y * w->sine) * LAYOUT_UNIT);
    *fy = llround((-x * w->sine + y * w->cosine) * LAYOUT_UNIT);
}

/* A corner of the outline or an opening gives back its own typed point. */
struct layout_point work_point(const struct work *w, int64_t x, int64_t y)
{
    const double u = (double)x / LAYOUT_UNIT, v = (double)y / LAYOUT_UNIT;
    if (w->sine == 0)
        return (struct layout_point){u, v};
    for (size_t r = 0; r < w->out->opening_count + 1 && r < w->ring_count; r++)
        for (size_t i = 0; i < w->rings[r].count; i++)
            if (w->rings[r].x[i] == x && w->rings[r].y[i] == y)
                return r ? w->out->openings[r - 1].points[i] : w->out->outline[i];
    return (struct layout_point){u * w->cosine - v * w->sine, u * w->sine + v * w->cosine};
}

/* Chords of an arc: no vertex turns more than 7.5 degrees (formats, "Arcs"). */
static size_t arc_points(const struct layout_corner *a, const struct layout_corner *b,
                         struct layout_point *points)
{
    const double pi = 3.14159265358979323846;
    const double radius = hypot(a->x - b->cx, a->y - b->cy);
    const double from = atan2(a->y - b->cy, a->x - b->cx);
    double turn = atan2(b->y - b->cy, b->x - b->cx) - from;
    if (b->left && turn <= 0)
        turn += 2 * pi;
    if (!b->left && turn >= 0)
        turn -= 2 * pi;
    const size_t n = (size_t)ceil(fabs(turn) / (7.5 * pi / 180) - 1e-9);
    for (size_t i = 1; i < n && points; i++)
        points[i - 1] =
            (struct layout_point){b->cx + radius * cos(from + turn * (double)i / (double)n),
                                  b->cy + radius * sin(from + turn * (double)i / (double)n)};
    return n ? n - 1 : 0;
}

static bool copy_ring(const struct layout_ring *ring, struct layout_point **points, size_t *count,
                      size_t *first_side)
{
    size_t n = ring->count;
    for (size_t i = 0; i < ring->count; i++)
        if (ring->corners[i].arc)
            n += arc_points(&ring->corners[(i + ring->count - 1) % ring->count], &ring->corners[i],
                            NULL);
    struct layout_point *list = calloc(n + 1, sizeof *list);
    if (!list)
        return false;
    n = 0;
    for (size_t i = 0; i < ring->count; i++) {
        if (first_side)
            first_side[i] = n;
        list[n++] = (struct layout_point){ring->corners[i].x, ring->corners[i].y};
        const size_t k = (i + 1) % ring->count;
        if (ring->corners[k].arc)
            n += arc_points(&ring->corners[i], &ring->corners[k], list + n);
    }
    *points = list;
    *count = n;
    return true;
}

static bool copy_edge(struct layout *out, const struct layout_edge *edge, const size_t *first,
                      size_t sides)
{
    const size_t end = edge->side + 1 < sides ? first[edge->side + 1] : out->outline_count;
    double before = 0;
    for (size_t i = first[edge->side]; i < end; i++) {
        struct layout_edge_out *e = &out->edges[out->edge_count++];
        const struct layout_point a = out->outline[i],
                                  b = out->outline[(i + 1) % out->outline_count];
        const double length = hypot(b.x - a.x, b.y - a.y);
        *e = (struct layout_edge_out){
            .index = i, .edge = edge->side + 1, .kind = edge->kind, .isolate = edge->isolate};
        e->joints = calloc(edge->joint_count + 1, sizeof *e->joints);
        if (!e->joints)
            return false;
        for (size_t k = 0; k < edge->joint_count; k++)
            if (edge->joints[k] >= before && edge->joints[k] < before + length)
                e->joints[e->joint_count++] = edge->joints[k] - before;
        before += length;
    }
    return true;
}

enum status layout_copy_rings(struct work *w)
{
    const struct layout_input *in = w->input;
    struct layout *out = w->out;
    size_t *first = calloc(in->outline.count + 1, sizeof *first);
    bool fine = first && copy_ring(&in->outline, &out->outline, &out->outline_count, first);
    if (fine) {
        out->openings = calloc(in->opening_count + 1, sizeof *out->openings);
        out->edges = calloc((in->edge_count + 1) * (out->outline_count + 1), sizeof *out->edges);
        fine = out->openings && out->edges;
    }
    for (size_t i = 0; fine && i < in->opening_count; i++) {
        fine = copy_ring(&in->openings[i], &out->openings[i].points, &out->openings[i].count, NULL);
        out->opening_count += fine;
    }
    for (size_t i = 0; fine && i < in->edge_count; i++)
        if (in->edges[i].side < in->outline.count)
            fine = copy_edge(out, &in->edges[i], first, in->outline.count);
    free(first);
    return fine ? STATUS_OK : STATUS_NO_MEMORY;
}
