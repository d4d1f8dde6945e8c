#include "export/drawing_glyph.h"
#include "base/utf8.h"
#include <math.h>
#include <stdlib.h>
#include <string.h>

enum { UP = 1, DOWN = 2, LEFT = 4, RIGHT = 8, FALLS = 16, RISES = 32, ARMS = 15 };

bool glyph_grid_make(struct glyph_grid *grid, int columns, int rows, bool ascii)
{
    size_t count = (size_t)columns * (size_t)rows;

    *grid = (struct glyph_grid){.columns = columns, .rows = rows, .ascii = ascii};
    grid->lines = calloc(count, sizeof *grid->lines);
    grid->cells = calloc(count, sizeof *grid->cells);
    if (grid->lines == NULL || grid->cells == NULL) {
        free(grid->lines);
        free(grid->cells);
        return false;
    }
    for (size_t i = 0; i < count; i++)
        grid->cells[i].code = ' ';
    return true;
}

static bool inside(const struct glyph_grid *grid, int column, int row)
{
    return column >= 0 && row >= 0 && column < grid->columns && row < grid->rows;
}

static size_t index_of(const struct glyph_grid *grid, int column, int row)
{
    return (size_t)row * (size_t)grid->columns + (size_t)column;
}

static void add_arms(struct glyph_grid *grid, int column, int row, int arms, enum drawing_ink ink)
{
    if (inside(grid, column, row))
        grid->lines[index_of(grid, column, row)].arms[ink] |= (unsigned char)arms;
}

static int clamp(int value, int least, int most)
{
    return value < least ? least : value > most ? most : value;
}

static void straight(struct glyph_grid *grid, int c1, int r1, int c2, int r2, enum drawing_ink ink)
{
    bool level = r1 == r2;
    int from = level ? (c1 < c2 ? c1 : c2) : (r1 < r2 ? r1 : r2);
    int to = level ? (c1 < c2 ? c2 : c1) : (r1 < r2 ? r2 : r1);
    int first = clamp(from, -1, level ? grid->columns : grid->rows);
    int last = clamp(to, -1, level ? grid->columns : grid->rows);

    for (int at = first; at <= last; at++) {
        int arms = 0;
        if (at > from)
            arms |= level ? LEFT : UP;
        if (at < to)
            arms |= level ? RIGHT : DOWN;
        add_arms(grid, level ? at : c1, level ? r1 : at, arms, ink);
    }
}

/* A slant is stepped along its longer side; each cell gets the stroke that suits its slope. */
static void slant(struct glyph_grid *grid, int c1, int r1, int c2, int r2, enum drawing_ink ink)
{
    int columns = abs(c2 - c1), rows = abs(r2 - r1), steps = columns > rows ? columns : rows;
    bool falls = (c2 > c1) == (r2 > r1);

    if (steps > 100000)
        return; /* far outside any window */
    for (int i = 0; i <= steps; i++) {
        int column = c1 + (int)lround((double)(c2 - c1) * i / steps);
        int row = r1 + (int)lround((double)(r2 - r1) * i / steps);
        int arms = falls ? FALLS : RISES;
        if (columns > 4 * rows) /* level strokes; the ends meet what stands there */
            arms =
                (i > 0 ? (c2 > c1 ? LEFT : RIGHT) : 0) | (i < steps ? (c2 > c1 ? RIGHT : LEFT) : 0);
        add_arms(grid, column, row, arms, ink);
    }
}

void glyph_line(struct glyph_grid *grid, int c1, int r1, int c2, int r2, enum drawing_ink ink)
{
    if (c1 == c2 && r1 == r2)
        return;
    if (c1 == c2 || r1 == r2)
        straight(grid, c1, r1, c2, r2, ink);
    else
        slant(grid, c1, r1, c2, r2, ink);
}

void glyph_put(struct glyph_grid *grid, int column, int row, uint32_t code, enum drawing_ink ink)
{
    if (inside(grid, column, row))
        grid->cells[index_of(grid, column, row)] = (struct drawing_cell){code, (unsigned char)ink};
}

bool glyph_is_free(const struct glyph_grid *grid, int column, int row)
{
    return !inside(grid, column, row) || grid->cells[index_of(grid, column, row)].code == ' ';
}

void glyph_put_free(struct glyph_grid *grid, int column, int row, uint32_t code,
                    enum drawing_ink ink)
{
    if (glyph_is_free(grid, column, row))
        glyph_put(grid, column, row, code, ink);
}

void glyph_words(struct glyph_grid *grid, int column, int row, const char *words,
                 enum drawing_ink ink)
{
    size_t left = strlen(words);

    while (left > 0) {
        uint32_t code;
        size_t length = utf8_decode(words, left, &code);
        if (length == 0)
            return;
        glyph_put(grid, column++, row, code, ink);
        words += length;
        left -= length;
    }
}

bool glyph_name(struct glyph_grid *grid, int column, int row, const char *name)
{
    int length = (int)strlen(name);

    for (int i = 0; i < length; i++) {
        const struct glyph_cell *cell;
        if (!inside(grid, column + i, row))
            return false;
        cell = &grid->lines[index_of(grid, column + i, row)];
        if (i == 0 && cell->arms[INK_EDGE] == 0)
            return false;
        if (i == 0 && cell->arms[INK_EDGE] != (UP | DOWN) && cell->arms[INK_EDGE] != (LEFT | RIGHT))
            return false;
    }
    glyph_words(grid, column, row, name, INK_NAME);
    return true;
}

/* Characters by arms (up 1, down 2, left 4, right 8), for each kind of line. */
static const uint32_t edge_codes[16] = {' ',    0x2503, 0x2503, 0x2503, 0x2501, 0x251B,
                                        0x2513, 0x252B, 0x2501, 0x2517, 0x250F, 0x2523,
                                        0x2501, 0x253B, 0x2533, 0x254B};
static const uint32_t cut_codes[16] = {' ',    0x250A, 0x250A, 0x250A, 0x2508, 0x253C,
                                       0x253C, 0x253C, 0x2508, 0x253C, 0x253C, 0x253C,
                                       0x2508, 0x253C, 0x253C, 0x253C};
static const uint32_t pour_codes[16] = {' ',    0x2502, 0x2502, 0x2502, 0x2500, 0x2518,
                                        0x2510, 0x2524, 0x2500, 0x2514, 0x250C, 0x251C,
                                        0x2500, 0x2534, 0x252C, 0x253C};
static const uint32_t board_codes[16] = {' ',    0x2551, 0x2551, 0x2551, 0x2550, 0x255D,
                                         0x2557, 0x2563, 0x2550, 0x255A, 0x2554, 0x2560,
                                         0x2550, 0x2569, 0x2566, 0x256C};

static uint32_t ascii_code(int arms, enum drawing_ink ink)
{
    bool upright = (arms & (UP | DOWN)) != 0, level = (arms & (LEFT | RIGHT)) != 0;

    if (ink == INK_EDGE)
        return '#';
    if (ink == INK_BOARD)
        return '=';
    if (upright && level)
        return '+';
    if (ink == INK_CUT)
        return upright ? ':' : '.';
    return upright ? '|' : '-';
}

static uint32_t code_of(const struct glyph_grid *grid, int arms, enum drawing_ink ink)
{
    const uint32_t *codes = ink == INK_EDGE       ? edge_codes
                            : ink == INK_POUR_END ? pour_codes
                            : ink == INK_BOARD    ? board_codes
                                                  : cut_codes;

    if ((arms & ARMS) == 0)
        return (arms & FALLS) && (arms & RISES) ? 'X' : arms & FALLS ? '\\' : '/';
    return grid->ascii ? ascii_code(arms & ARMS, ink) : codes[arms & ARMS];
}

/* The strongest line in a cell decides; a cut that crosses a pour end or a board joins it. Board
 * all along an edge shows, not the edge. */
static void resolve_cell(struct glyph_grid *grid, size_t index)
{
    static const enum drawing_ink order[] = {INK_EDGE, INK_BOARD, INK_POUR_END, INK_CUT};
    const struct glyph_cell *cell = &grid->lines[index];

    if (grid->cells[index].code != ' ')
        return;
    for (size_t i = 0; i < sizeof order / sizeof *order; i++) {
        int arms = cell->arms[order[i]];
        if (arms == 0 || (order[i] == INK_EDGE && (arms & ~cell->arms[INK_BOARD]) == 0))
            continue;
        if (order[i] == INK_POUR_END)
            arms |= cell->arms[INK_CUT];
        grid->cells[index].code = code_of(grid, arms, order[i]);
        grid->cells[index].ink = (unsigned char)order[i];
        return;
    }
}

void glyph_resolve(struct glyph_grid *grid)
{
    size_t count = (size_t)grid->columns * (size_t)grid->rows;

    for (size_t i = 0; i < count; i++)
        resolve_cell(grid, i);
}

struct drawing_cell *glyph_take_cells(struct glyph_grid *grid)
{
    struct drawing_cell *cells = grid->cells;

    free(grid->lines);
    *grid = (struct glyph_grid){0};
    return cells;
}
