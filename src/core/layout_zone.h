/* Lays out a rectilinear region as a whole or, where a rule would break, in zones. */
#ifndef SLABGAP_CORE_LAYOUT_ZONE_H
#define SLABGAP_CORE_LAYOUT_ZONE_H

#include "core/layout_work.h"

/* Families of the region, with the lines and boxes of the slab that lie in it forced. */
enum status zone_build(struct work *w, struct rect_edge *const edges[2], const size_t count[2],
                       struct rect_slab *slab);
/* Marks the boxes that cannot be made as dropped; their number. */
size_t zone_mark_faults(struct work *w);
/* Where every joint goes on across a zone's end, it may be a joint of contraction as well. */
void zone_relabel_cuts(struct work *w);
/* False: the caller wants the best so far. */
bool zone_go_on(struct work *w);
/* More objects and inside corners than a search over the whole slab can go through; more panels. */
bool zone_is_many(const struct work *w, struct rect_edge *const edges[2], const size_t count[2]);
bool zone_is_vast(const struct work *w);
/* Fills chords and panels of the work, and the lines of the joints it adds. parted: for many
 * objects, which take their last places meanwhile. */
enum status zone_solve(struct work *w, struct rect_edge *const edges[2], const size_t count[2],
                       bool parted);

#endif
