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
struct rect_memo;
struct rect_arc {
    int64_t u0, u1, v0, v1;
    int64_t *cut, *forced;
    int64_t (*room)[2];  /* beside each forced one: a box takes so much of the panel below, above */
    int64_t end_room[2]; /* the same at u0 and u1 */
    size_t cut_count, forced_count;
    struct rect_memo *memo; /* chords for rows met before */
    size_t memo_count, memo_next;
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
    size_t *beyond[2], *beyond_first[2]; /* gates on the low and the high side of each arc */
    int64_t limit;                       /* largest side across the chords */
};
struct rect_corner {
    int64_t x, y;
    size_t gate[2]; /* in family 0 (chords parallel to y) and 1 */
    int choice;
    int type;     /* corner of the wall: 0 lower left, anticlockwise to 3 upper left */
    size_t group; /* corners of one opening, or along one stretch of the outline */
};
struct rect_rules {
    double side[2], aspect, least; /* units, ratio, units */
    int64_t raster;                /* free lines on multiples of it */
};
struct rect_panel {
    int64_t x0, y0, x1, y1;
};
struct rect_box { /* a box about (x, y): its tips west, east, south, north */
    int64_t x, y, tip[4];
    size_t number;
};
struct rect_ban { /* no free chord of the axis may run along it */
    int axis;
    int64_t u, v0, v1;
};
struct rect_slab {
    struct rect_family family[2];
    struct rect_corner *corners;
    size_t corner_count, group_count;
    struct rect_rules rules;
    uint64_t evaluations, allowed, start_cost; /* start_cost: what the starts took */
    int extra; /* rows assumed beyond the least number while the other family is unknown */
    bool fine; /* places at every 0.1 m too */
    struct rect_box *boxes; /* sorted by x, then y */
    size_t box_count;
    int64_t longest_tip;
    const struct rect_ban *bans;
    size_t ban_count;
    double cost; /* of the solved slab: metres and penalties */
    size_t broken;
    bool solved; /* a plan is there already: a further search starts from it */
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
/* Both chords through a box's centre; a box on an edge needs only the one square to it. */
enum status rect_add_box(struct rect_slab *slab, const struct rect_box *box);
void rect_sort_boxes(struct rect_box *boxes, size_t count);
const struct rect_box *rect_box_at(const struct rect_slab *slab, int64_t x, int64_t y);
/* Few starts only; all starts and whole openings; single corners too; places at every 0.1 m too. */
enum rect_depth { RECT_GLANCE, RECT_QUICK, RECT_FULL, RECT_FINE };
enum status rect_solve(struct rect_slab *slab, enum rect_depth depth);
/* In no order. */
enum status rect_chords(const struct rect_slab *slab, struct rect_chord **chords, size_t *count);
void rect_sort_chords(struct rect_chord *chords, size_t count);
/* The first of the sorted chords that is not before the key. */
const struct rect_chord *rect_chord_from(const struct rect_chord *chords, size_t count,
                                         const struct rect_chord *key);
enum status rect_panels(const struct rect_slab *slab, struct rect_panel **panels, size_t *count);
/* Metres of joint and penalties (design page 2): the broken rules weigh more than any length. */
double rect_penalty(const struct rect_rules *rules, int64_t along, int64_t across, int axis);
void rect_free(struct rect_slab *slab);

#endif
