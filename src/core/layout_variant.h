/* Tries other places for the boxes where a rule breaks, and keeps the best plan. */
#ifndef SLABGAP_CORE_LAYOUT_VARIANT_H
#define SLABGAP_CORE_LAYOUT_VARIANT_H

#include "core/layout_work.h"

enum status variant_solve(struct work *w, struct rect_edge *const edges[2], const size_t count[2]);

#endif
