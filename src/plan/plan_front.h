/* Concrete comes from one end of a pour to the other, its front square to the way it comes: how far
 * the front is after a volume, when each panel is placed. Private to src/plan. */
#ifndef SLABGAP_PLAN_PLAN_FRONT_H
#define SLABGAP_PLAN_PLAN_FRONT_H

#include "plan/plan.h"

struct axis { /* unit vector */
    double x, y;
};
/* The way the concrete comes: along the strips, else along the slab's longer side. */
struct axis front_axis(const struct plan *plan);
struct axis axis_square_to(struct axis axis);
double axis_along(struct axis axis, const struct layout_point *point);
/* From where to where a panel reaches along the axis. */
void axis_reach(struct axis axis, const struct layout_panel *panel, double *from, double *to);

struct front { /* of one pour: area behind the front, by where it stands; straight between */
    double *at_m, *area_m2;
    size_t count;
};
/* `panels`: those of the pour. STATUS_NO_MEMORY. */
enum status front_make(const struct plan *plan, const size_t *panels, size_t count,
                       struct axis axis, struct front *front);
void front_free(struct front *front);
double front_area(const struct front *front, double at_m);
double front_at(const struct front *front, double area_m2);

#endif
