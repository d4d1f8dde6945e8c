/* The rectilinear engine: networks of maximal chords in integers of 1/80 mm.
 * A chord runs from slab edge to slab edge. The cross-sections of the slab that go on unchanged
 * form an arc; where two different ones overlap there is a gate. Every re-entrant corner needs one
 * of its two gates; inside an arc the chords are placed by an exact dynamic program, the other
 * family fixed. */
#ifndef SLABGAP_CORE_LAYOUT_RECT_H
#define SLABGAP_CORE_LAYOUT_RECT_H

#include "core/layout.h"

#define LAYOUT_UNIT 80000.0 /* units of 1/80 mm in a metre */

struct rect_edge { /* side at coordinate u, running over v0 < v1 */
    int64_t u, v0, v1;
};
struct rect_arc {
    int64_t u0, u1, v0, v1;
    int64_t *cut, *forced;
    size_t cut_count, forced_count;
};
struct rect_gate {
    int64_t u, v0, v1;
    size_t left, right; /* arcs */
    bool on, forced;
};
struct rect_family {
    struct rect_arc *arcs;
    struct rect_gate *gates;
    size_t arc_count, gate_count;
    int64_t limit; /* largest side across the chords */
};
struct rect_corner {
    int64_t x, y;
    size_t gate[2]; /* in family 0 (chords parallel to y) and 1 */
    int choice;
};
struct rect_rules {
    double side[2], aspect, least; /* units, ratio, units */
    int64_t raster;                /* free lines on multiples of it */
};
struct rect_panel {
    int64_t x0, y0, x1, y1;
};
struct rect_slab {
    struct rect_family family[2];
    struct rect_corner *corners;
    size_t corner_count;
    struct rect_rules rules;
    uint64_t evaluations, allowed;
    bool fine; /* places at every 0.1 m too */
};
struct rect_chord {
    int axis; /* 0: parallel to y at u = x */
    int64_t u, v0, v1;
};

/* edges[0]: sides parallel to y, edges[1]: parallel to x. */
enum status rect_build(struct rect_slab *slab, struct rect_edge *const edges[2],
                       const size_t count[2]);
/* A chord of the family must pass (u, v). False: no chord can pass there. */
bool rect_force(struct rect_slab *slab, int axis, int64_t u, int64_t v);
enum status rect_solve(struct rect_slab *slab);
enum status rect_chords(const struct rect_slab *slab, struct rect_chord **chords, size_t *count);
enum status rect_panels(const struct rect_slab *slab, struct rect_panel **panels, size_t *count);
/* Metres of joint and penalties (design page 2): the broken rules weigh more than any length. */
double rect_penalty(const struct rect_rules *rules, int64_t along, int64_t across, int axis);
void rect_free(struct rect_slab *slab);

#endif
