/* The character grid behind a drawing: lines are collected as directions per cell and turned into
 * one character each at the end, so crossings and corners join by themselves. */
#ifndef SLABGAP_EXPORT_DRAWING_GLYPH_H
#define SLABGAP_EXPORT_DRAWING_GLYPH_H

#include "export/drawing.h"

struct glyph_cell {
    unsigned char
        arms[INK_BROKEN + 1]; /* per ink: bits up 1, down 2, left 4, right 8, slant 16 / 32 */
};
struct glyph_grid {
    int columns, rows;
    bool ascii, failed; /* failed: no memory for some words */
    struct glyph_cell *lines;
    struct drawing_cell *cells;
};

bool glyph_grid_make(struct glyph_grid *grid, int columns, int rows, bool ascii);
/* A line between two cells, clipped to the grid. */
void glyph_line(struct glyph_grid *grid, int c1, int r1, int c2, int r2, enum drawing_ink ink);
/* One character now, over whatever is there; glyph_put_free: only on an empty cell. */
void glyph_put(struct glyph_grid *grid, int column, int row, uint32_t code, enum drawing_ink ink);
void glyph_put_free(struct glyph_grid *grid, int column, int row, uint32_t code,
                    enum drawing_ink ink);
void glyph_words(struct glyph_grid *grid, int column, int row, const char *words,
                 enum drawing_ink ink);
/* A line's name on an edge cell that is no corner; false when it does not go there. */
bool glyph_name(struct glyph_grid *grid, int column, int row, const char *name);
bool glyph_is_free(const struct glyph_grid *grid, int column, int row);
/* Turns the collected lines into characters. */
void glyph_resolve(struct glyph_grid *grid);
/* Hands the cells over and frees the rest. */
struct drawing_cell *glyph_take_cells(struct glyph_grid *grid);

#endif
