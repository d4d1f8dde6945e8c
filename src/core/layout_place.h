/* What forces joints before the slab is solved. False = no memory. */
#ifndef SLABGAP_CORE_LAYOUT_PLACE_H
#define SLABGAP_CORE_LAYOUT_PLACE_H

#include "core/layout_work.h"

bool place_is_rectangle(const struct work *w, const struct layout_object *o);
bool place_boxes(struct work *w);
bool place_lines(struct work *w);
bool place_expansion(struct work *w);
bool place_matches(struct work *w);
bool place_force_boxes(struct work *w);

#endif
