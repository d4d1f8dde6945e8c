/* The parts of the rectilinear solver: the programs and the search that calls them. */
#ifndef SLABGAP_CORE_LAYOUT_RECT_SOLVE_H
#define SLABGAP_CORE_LAYOUT_RECT_SOLVE_H

#include "core/layout_rect.h"

/* Own weights, in metres of joint (design, "Invented weights"); a broken rule outweighs any length.
 */
#define BROKEN 1e5
#define SLACK 80.0 /* 1 mm: free lines stand on whole mm */

/* Places the chords of one arc, the other family fixed. blind: the other family is not placed yet,
 * equal rows within its limit are assumed. */
enum status rect_solve_arc(struct rect_slab *slab, int axis, size_t arc, bool blind);
/* Places lines common to all arcs of a family, the other family unknown. */
enum status rect_solve_block(struct rect_slab *slab, int axis);
void rect_forget(struct rect_arc *arc);

#endif
