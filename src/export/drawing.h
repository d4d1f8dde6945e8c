/* The plan as a grid of characters, independent of output: report, draw and the screen use it. */
#ifndef SLABGAP_EXPORT_DRAWING_H
#define SLABGAP_EXPORT_DRAWING_H

#include "plan/plan.h"
#include "base/text.h"
#include <stdint.h>

enum drawing_ink {
    INK_NONE,
    INK_EDGE,
    INK_CUT,
    INK_POUR_END,
    INK_BOARD,
    INK_OBJECT,
    INK_NAME,
    INK_TAPE,
    INK_BROKEN
};
struct drawing_cell {
    uint32_t code;
    unsigned char ink;
};
struct drawing {
    int columns, rows;
    struct drawing_cell *cells;
    /* world -> cell: column = (x - x0) * per_column, row = (y1 - y) * per_row */
    double x0, y1, columns_per_m, rows_per_m;
    bool joints_drawn; /* false: too small to draw joints; counts instead */
};
struct drawing_options {
    int columns, rows;
    bool ascii;
    bool names, tape, legend;
    bool tape_up;                    /* readings from the south too, right of the slab */
    double zoom, centre_x, centre_y; /* zoom 0 = whole slab */
};
/* STATUS_NO_MEMORY leaves *drawing = {0}. */
enum status drawing_make(const struct plan *plan, const struct drawing_options *options,
                         struct drawing *drawing);
void drawing_print(struct text *out, const struct drawing *drawing);
void drawing_free(struct drawing *drawing);

#endif
