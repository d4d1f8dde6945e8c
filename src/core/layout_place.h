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
/* Moves the boxes onto common lines within the tolerance, or onto the slab edge. */
bool place_snap(struct work *w);
/* Their lines, with names. */
bool place_name_boxes(struct work *w);
bool place_index_boxes(struct work *w);
/* Forces the lines into a region's families. */
void place_force_lines(const struct work *w, struct rect_slab *slab);

#endif
