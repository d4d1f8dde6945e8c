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

enum status stop_list_make(const struct layout *layout, struct stop_list *list)
{
    *list = (struct stop_list){0};
    if (add_all(layout, list))
        return STATUS_OK;
    stop_list_free(list);
    return STATUS_NO_MEMORY;
}

void stop_list_free(struct stop_list *list)
{
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

double stop_list_run(const struct stop_list *list, double x, double y, double dx, double dy,
                     enum stop *stop)
{
    double nearest = DBL_MAX;

    *stop = STOP_NONE;
    for (size_t i = 0; i < list->count; i++) {
        double t = hit(&list->items[i], x, y, dx, dy);
        if (t > 1e-3 && t < nearest - 1e-9) {
            nearest = t;
            *stop = list->items[i].stop;
        } else if (t > 1e-3 && t < nearest + 1e-9 && list->items[i].stop > *stop) {
            *stop = list->items[i].stop; /* a wall along a side wins over the side */
        }
    }
    return *stop == STOP_NONE ? 0 : nearest;
}

double stop_pushing(double run, enum stop far_end, bool fixed)
{
    if (far_end == STOP_TIED || (fixed && far_end == STOP_FIXED))
        return run;
    return run / 2;
}
