/* What forces joints before the slab is solved. False = no memory. */
#ifndef SLABGAP_CORE_LAYOUT_PLACE_H
#define SLABGAP_CORE_LAYOUT_PLACE_H

#include "core/layout_work.h"

bool place_is_rectangle(const struct work *w, const struct layout_object *o);
bool place_boxes(struct work *w);
bool place_lines(struct work *w);
/* Where the user wants no joint. */
bool place_bans(struct work *w);
bool place_expansion(struct work *w);
bool place_matches(struct work *w);
/* Onto the slab edge where they are near it. */
void place_on_edges(struct work *w);
/* Onto common lines within the tolerance. */
bool place_snap(struct work *w);
/* One box onto the line at `to`, larger so that it still clears its object; too large: not. */
void place_move_box(const struct work *w, struct work_box *b, int axis, int64_t to);
/* Their lines, with names. */
bool place_name_boxes(struct work *w);
bool place_index_boxes(struct work *w);
/* Forces the lines into a region's families. */
void place_force_lines(const struct work *w, struct rect_slab *slab);

#endif
