#include "plan/plan_front.h"
#include <math.h>
#include <stdlib.h>

struct axis axis_square_to(struct axis axis)
{
    return (struct axis){-axis.y, axis.x};
}

double axis_along(struct axis axis, const struct layout_point *point)
{
    return axis.x * point->x + axis.y * point->y;
}

void axis_reach(struct axis axis, const struct layout_panel *panel, double *from, double *to)
{
    *from = INFINITY;
    *to = -INFINITY;
    for (size_t i = 0; i < panel->count; i++) {
        *from = fmin(*from, axis_along(axis, &panel->ring[i]));
        *to = fmax(*to, axis_along(axis, &panel->ring[i]));
    }
}

struct axis front_axis(const struct plan *plan)
{
    const double turn = plan->job.pours_direction * 3.14159265358979323846 / 180;
    double x0 = INFINITY, y0 = INFINITY, x1 = -INFINITY, y1 = -INFINITY;

    if (plan->job.given[FIELD_pours_direction] || plan->pour_count > 1)
        return (struct axis){cos(turn), sin(turn)};
    for (size_t i = 0; i < plan->layout.outline_count; i++) {
        x0 = fmin(x0, plan->layout.outline[i].x);
        x1 = fmax(x1, plan->layout.outline[i].x);
        y0 = fmin(y0, plan->layout.outline[i].y);
        y1 = fmax(y1, plan->layout.outline[i].y);
    }
    return x1 - x0 >= y1 - y0 ? (struct axis){1, 0} : (struct axis){0, 1};
}

/* ---- area behind the front ---- */

struct event { /* a panel begins or ends: the width of the front changes by so much */
    double at_m, width_m;
};

static int by_place(const void *a, const void *b)
{
    const struct event *p = a, *q = b;

    return p->at_m < q->at_m ? -1 : p->at_m > q->at_m;
}

enum status front_make(const struct plan *plan, const size_t *panels, size_t count,
                       struct axis axis, struct front *front)
{
    struct event *events = calloc(2 * count + 1, sizeof *events);
    double width = 0, area = 0;

    *front = (struct front){.count = 2 * count};
    front->at_m = calloc(front->count + 1, sizeof *front->at_m);
    front->area_m2 = calloc(front->count + 1, sizeof *front->area_m2);
    if (events == NULL || front->at_m == NULL || front->area_m2 == NULL) {
        free(events);
        front_free(front);
        return STATUS_NO_MEMORY;
    }
    for (size_t i = 0; i < count; i++) {
        const struct layout_panel *panel = &plan->layout.panels[panels[i]];
        double from, to;
        axis_reach(axis, panel, &from, &to);
        events[2 * i] = (struct event){from, panel->area / fmax(to - from, 1e-9)};
        events[2 * i + 1] = (struct event){to, -events[2 * i].width_m};
    }
    if (count > 0)
        qsort(events, front->count, sizeof *events, by_place);
    for (size_t i = 0; i < front->count; i++) {
        if (i > 0)
            area += width * (events[i].at_m - events[i - 1].at_m);
        width += events[i].width_m;
        front->at_m[i] = events[i].at_m;
        front->area_m2[i] = area;
    }
    free(events);
    return STATUS_OK;
}

void front_free(struct front *front)
{
    free(front->at_m);
    free(front->area_m2);
    *front = (struct front){0};
}

/* y at x on the line through points sorted by x; held at both ends. */
static double read_line(const double *xs, const double *ys, size_t count, double x)
{
    size_t low = 0, high = count;

    if (count == 0)
        return 0;
    if (x <= xs[0])
        return ys[0];
    if (x >= xs[count - 1])
        return ys[count - 1];
    while (high - low > 1) { /* xs[low] <= x < xs[high] */
        const size_t middle = low + (high - low) / 2;
        if (xs[middle] <= x)
            low = middle;
        else
            high = middle;
    }
    return ys[low] + (ys[high] - ys[low]) * (x - xs[low]) / (xs[high] - xs[low]);
}

double front_area(const struct front *front, double at_m)
{
    return read_line(front->at_m, front->area_m2, front->count, at_m);
}

double front_at(const struct front *front, double area_m2)
{
    return read_line(front->area_m2, front->at_m, front->count, area_m2);
}
