/* The screen as a grid of styled cells. Pure memory: the app draws here, the terminal copies it.
 * Everything is clipped; a wide character takes two cells. With `ascii` every character beyond
 * ASCII is replaced by one of the same width. */
#ifndef SLABGAP_UI_CANVAS_H
#define SLABGAP_UI_CANVAS_H

#include "base/text.h"
#include <stdbool.h>
#include <stdint.h>

enum style {
    STYLE_PLAIN = 0,
    STYLE_BOLD = 1,
    STYLE_REVERSE = 2,
    STYLE_UNDERLINE = 4,
    STYLE_GOOD = 8, /* colours help, never alone: the word stands beside */
    STYLE_CARE = 16,
    STYLE_BAD = 32
};
enum { CANVAS_LEAST_COLUMNS = 60, CANVAS_LEAST_ROWS = 16, CANVAS_MOST = 1000 };

struct cell {
    uint32_t code; /* 0: the second half of a wide character */
    unsigned char style;
};
struct canvas {
    int columns, rows;
    bool ascii;
    struct cell *cells;
    int cursor_column, cursor_row; /* -1: hidden */
};

/* Makes an empty grid of 1 to CANVAS_MOST cells each way; false without memory. */
bool canvas_make(struct canvas *canvas, int columns, int rows, bool ascii);
void canvas_free(struct canvas *canvas); /* safe on {0} and twice */
void canvas_clear(struct canvas *canvas);
const struct cell *canvas_cell(const struct canvas *canvas, int row, int column);
void canvas_put(struct canvas *canvas, int row, int column, uint32_t code, int style);
/* Writes a string into at most `most` columns; returns the column behind it. Invalid UTF-8 and
 * control characters become '?'. */
int canvas_words(struct canvas *canvas, int row, int column, int most, int style,
                 const char *string);
__attribute__((format(printf, 6, 7))) int canvas_format(struct canvas *canvas, int row, int column,
                                                        int most, int style, const char *format,
                                                        ...);
/* Breaks a string at blanks into at most `rows` lines; returns the lines used. */
int canvas_wrap(struct canvas *canvas, int row, int column, int most, int rows, int style,
                const char *string);
/* Right-aligned in `width` columns ending before `column + width`. */
void canvas_right(struct canvas *canvas, int row, int column, int width, int style,
                  const char *string);
/* Adds style bits to cells already written. */
void canvas_mark(struct canvas *canvas, int row, int column, int count, int style);
void canvas_rule(struct canvas *canvas, int row); /* a line across */
/* The characters, one line a row, blanks at the end cut. */
void canvas_print(const struct canvas *canvas, struct text *out);

#endif
