/* How much slab pushes on a place: the run from it, square to it, to the next thing that stops or
 * frees the slab. Private to src/plan. */
#ifndef SLABGAP_PLAN_RUN_H
#define SLABGAP_PLAN_RUN_H

#include "core/layout.h"
#include "core/layout_index.h"
#include <stdbool.h>

enum stop {
    STOP_NONE,
    STOP_FREE,
    STOP_MOVES /* expansion, inner isolation */,
    STOP_FIXED /* wall, box */,
    STOP_TIED /* matched slab */
};

struct stop_segment {
    double x1, y1, x2, y2;
    enum stop stop;
};
struct stop_list {
    struct stop_segment *items;
    size_t count, capacity;
    struct layout_index index; /* of their extents: a ray looks only at the cells it crosses */
};

/* All that stops a run: slab sides, holes, isolation joints. */
enum status stop_list_make(const struct layout *layout, struct stop_list *list);
void stop_list_free(struct stop_list *list);
/* Length from (x, y) along (dx, dy) (unit) to the nearest stop farther than 1 mm; STOP_NONE and 0
 * when there is none. */
double stop_list_run(const struct stop_list *list, double x, double y, double dx, double dy,
                     enum stop *stop);
/* The part of that run that pushes on a joint. `fixed`: the joint is at a wall or box, else it is
 * an expansion joint: the whole run when the far end is held, half when both ends can move alike
 * (derived: symmetry of the sliding bar). */
double stop_pushing(double run, enum stop far_end, bool fixed);

#endif
