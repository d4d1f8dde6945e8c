/* Old joints along a side: meet them, or isolate the side; both are laid out and compared. */
#ifndef SLABGAP_CORE_LAYOUT_NEIGHBOUR_H
#define SLABGAP_CORE_LAYOUT_NEIGHBOUR_H

#include "core/layout_work.h"

/* The plan that meets the old joints is in `layout`. Where it breaks more rules than one with these
 * sides isolated, that one takes its place; a note says what was chosen and the metres of both. */
enum status neighbour_choose(const struct layout_input *input, struct layout *layout);

#endif
