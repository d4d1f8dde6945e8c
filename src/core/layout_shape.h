/* Slabs with slanting or curved sides: several ways to lay them out, the best is kept. */
#ifndef SLABGAP_CORE_LAYOUT_SHAPE_H
#define SLABGAP_CORE_LAYOUT_SHAPE_H

#include "core/layout_plane.h"

/* One trial: a plan in the result, checked; the better of it and the best so far is kept. */
struct trials {
    struct work *w;
    struct layout best; /* only panels, joints, boxes, reasons, violations */
    double best_length;
    bool any, last_is_best;
    uint64_t allowed;
};
enum status trials_judge(struct trials *t);
enum status trials_run(struct trials *t, const struct plane *plane);
bool trials_go_on(const struct trials *t);

/* Lines right across in two directions square to each other. */
enum status shape_grid(struct trials *t);
/* A strip between two chains of sides: joints across it and rows along it. */
enum status shape_ruled(struct trials *t);
/* Quarter circles at inside corners, the rest as it is without them. */
enum status shape_kerb(struct trials *t);
/* A slab that is not rectilinear: fills the result, already checked. */
enum status shape_solve(struct work *w);

#endif
