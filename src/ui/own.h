/* A slab of one's own from ready shapes with sizes a to d: the questions and what they make. */
#ifndef SLABGAP_UI_OWN_H
#define SLABGAP_UI_OWN_H

#include "base/text.h"
#include <stdbool.h>

enum own_shape {
    OWN_RECTANGLE,
    OWN_L,
    OWN_U,
    OWN_T,
    OWN_STRIP,
    OWN_HOLE,
    OWN_TAPER,
    OWN_CORNERS,
    OWN_SHAPES
};
enum { OWN_SIZE_MOST = 512, OWN_CORNERS_MOST = 64 };

struct own {
    bool reshape; /* only the outline of the job in hand */
    int step;     /* the question in hand */
    int use, practice, shape, corner;
    char size[4][32]; /* a to d as typed */
    char sides[OWN_SIZE_MOST];
    char thickness[32];
};

/* The questions: use, practice, shape, sizes ..., corner, thickness. */
enum own_question {
    OWN_USE,
    OWN_PRACTICE,
    OWN_SHAPE,
    OWN_A,
    OWN_B,
    OWN_C,
    OWN_D,
    OWN_CORNER,
    OWN_SIDES,
    OWN_THICKNESS
};
/* The n-th question that this shape asks; false past the last. */
bool own_question(const struct own *own, int step, enum own_question *question);
const char *own_shape_word(int shape);
const char *own_size_label(int shape, int size); /* "whole length, west to east"; NULL: not asked */
const char *own_corner_word(int corner);

struct own_outline {
    double x[OWN_CORNERS_MOST], y[OWN_CORNERS_MOST];
    int count;
    double hole[4]; /* x0 y0 x1 y1 of the hole in it, all 0: none */
};
/* The corners in metres from the sizes; false with one sentence when they make no slab. */
bool own_make_outline(const struct own *own, struct own_outline *outline, struct text *trouble);
/* "36 east, 12 north, ..., close" to corners, bare numbers in `unit` (m, ft); false with one
 * sentence. */
bool own_read_sides(const char *string, const char *unit, struct own_outline *outline,
                    struct text *trouble);
/* A whole job file with only what was asked typed in it; false as above. */
bool own_write(const struct own *own, struct text *out, struct text *trouble);

#endif
