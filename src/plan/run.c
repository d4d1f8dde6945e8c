#include "plan/run.h"
#include "base/array.h"
#include <float.h>
#include <math.h>
#include <stdlib.h>

static bool add(struct stop_list *list, double x1, double y1, double x2, double y2, enum stop stop)
{
    if (!array_reserve((void **)&list->items, &list->capacity, list->count + 1,
                       sizeof *list->items))
        return false;
    list->items[list->count++] = (struct stop_segment){x1, y1, x2, y2, stop};
    return true;
}

static enum stop stop_of_side(const struct layout *layout, size_t side)
{
    for (size_t i = 0; i < layout->edge_count; i++) {
        const struct layout_edge_out *edge = &layout->edges[i];
        if (edge->index != side)
            continue;
        if (edge->kind == LAYOUT_EDGE_FIXED || edge->isolate)
            return STOP_FIXED;
        return edge->kind == LAYOUT_EDGE_EXISTING ? STOP_TIED : STOP_FREE;
    }
    return STOP_FREE;
}

static bool add_ring(struct stop_list *list, const struct layout_point *points, size_t count,
                     const struct layout *sides, enum stop stop)
{
    for (size_t i = 0; i < count; i++) {
        const struct layout_point *a = &points[i], *b = &points[(i + 1) % count];
        if (!add(list, a->x, a->y, b->x, b->y, sides != NULL ? stop_of_side(sides, i) : stop))
            return false;
    }
    return true;
}

static enum stop opening_stop(const struct layout *layout, int opening)
{
    for (size_t i = 0; i < layout->joint_count; i++)
        if (layout->joints[i].opening == opening && layout->joints[i].kind == LAYOUT_ISOLATION)
            return STOP_FIXED;
    return STOP_FREE;
}

static bool add_all(const struct layout *layout, struct stop_list *list)
{
    if (!add_ring(list, layout->outline, layout->outline_count, layout, STOP_FREE))
        return false;
    for (size_t i = 0; i < layout->opening_count; i++)
        if (!add_ring(list, layout->openings[i].points, layout->openings[i].count, NULL,
                      opening_stop(layout, (int)i)))
            return false;
    for (size_t i = 0; i < layout->joint_count; i++) {
        const struct layout_joint *joint = &layout->joints[i];
        if (joint->kind != LAYOUT_ISOLATION || joint->edge >= 0 || joint->opening >= 0)
            continue;
        if (!add(list, joint->x1, joint->y1, joint->x2, joint->y2,
                 joint->object >= 0 ? STOP_FIXED : STOP_MOVES))
            return false;
    }
    return true;
}

/* Extents a hair larger than the segments, so that a ray along a cell's side misses none. */
static bool make_index(struct stop_list *list)
{
    const double hair = 1e-5;
    struct layout_extent *extents = calloc(list->count + 1, sizeof *extents);
    bool good = extents != NULL;

    for (size_t i = 0; good && i < list->count; i++) {
        const struct stop_segment *at = &list->items[i];
        extents[i] =
            (struct layout_extent){fmin(at->x1, at->x2) - hair, fmin(at->y1, at->y2) - hair,
                                   fmax(at->x1, at->x2) + hair, fmax(at->y1, at->y2) + hair};
    }
    good = good && layout_index_make(&list->index, extents, list->count);
    free(extents);
    return good;
}

enum status stop_list_make(const struct layout *layout, struct stop_list *list)
{
    *list = (struct stop_list){0};
    if (add_all(layout, list) && make_index(list))
        return STATUS_OK;
    stop_list_free(list);
    return STATUS_NO_MEMORY;
}

void stop_list_free(struct stop_list *list)
{
    layout_index_free(&list->index);
    free(list->items);
    *list = (struct stop_list){0};
}

/* Distance along the ray to a segment; DBL_MAX when it misses. */
static double hit(const struct stop_segment *segment, double x, double y, double dx, double dy)
{
    double ex = segment->x2 - segment->x1, ey = segment->y2 - segment->y1;
    double wx = segment->x1 - x, wy = segment->y1 - y;
    double cross = dx * ey - dy * ex, t, s;

    if (fabs(cross) < 1e-12)
        return DBL_MAX;
    t = (wx * ey - wy * ex) / cross;
    s = (wx * dy - wy * dx) / cross;
    return s >= -1e-9 && s <= 1 + 1e-9 ? t : DBL_MAX;
}

struct nearest {
    double at;
    enum stop stop;
};

static void look_at(const struct stop_segment *segment, double x, double y, double dx, double dy,
                    struct nearest *nearest)
{
    double t = hit(segment, x, y, dx, dy);

    if (t > 1e-3 && t < nearest->at - 1e-9) {
        nearest->at = t;
        nearest->stop = segment->stop;
    } else if (t > 1e-3 && t < nearest->at + 1e-9 && segment->stop > nearest->stop) {
        nearest->stop = segment->stop; /* a wall along a side wins over the side */
    }
}

/* Where along the ray its present cell ends, on one axis. */
static double leaves_cell(double at, double direction, double from, double cell)
{
    double k = floor((at - from) / cell);

    if (fabs(direction) < 1e-12)
        return DBL_MAX;
    return (from + (direction > 0 ? k + 1 : k) * cell - at) / direction;
}

static bool within(const struct layout_index *index, double x, double y)
{
    return x >= index->x && y >= index->y && x <= index->x + (double)index->nx * index->cell &&
           y <= index->y + (double)index->ny * index->cell;
}

double stop_list_run(const struct stop_list *list, double x, double y, double dx, double dy,
                     enum stop *stop)
{
    const struct layout_index *index = &list->index;
    const double hair = 1e-6 * index->cell;
    struct nearest nearest = {DBL_MAX, STOP_NONE};
    double t = 0;

    while (within(index, x + t * dx, y + t * dy)) {
        double px = x + t * dx, py = y + t * dy;
        const size_t *cell;
        size_t count = layout_index_at(index, px, py, &cell);
        for (size_t i = 0; i < count; i++)
            look_at(&list->items[cell[i]], x, y, dx, dy, &nearest);
        t += hair + fmin(leaves_cell(px, dx, index->x, index->cell),
                         leaves_cell(py, dy, index->y, index->cell));
        if (nearest.at < t - 2 * hair)
            break;
    }
    *stop = nearest.stop;
    return nearest.stop == STOP_NONE ? 0 : nearest.at;
}

double stop_pushing(double run, enum stop far_end, bool fixed)
{
    if (far_end == STOP_TIED || (fixed && far_end == STOP_FIXED))
        return run;
    return run / 2;
}
