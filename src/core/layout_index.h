/* Finds the boxes (extents of panels) that hold a point, by a raster of cells. */
#ifndef SLABGAP_CORE_LAYOUT_INDEX_H
#define SLABGAP_CORE_LAYOUT_INDEX_H

#include <stdbool.h>
#include <stddef.h>

struct layout_extent {
    double x0, y0, x1, y1;
};
struct layout_index {
    double x, y, cell;
    size_t nx, ny;
    size_t *first, *list;
};

/* False = no memory. */
bool layout_index_make(struct layout_index *index, const struct layout_extent *extents,
                       size_t count);
/* The numbers in the cell at (x, y): from *list, so many. */
size_t layout_index_at(const struct layout_index *index, double x, double y, const size_t **list);
void layout_index_free(struct layout_index *index);

#endif
