#include "ui/canvas.h"
#include "base/utf8.h"
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

bool canvas_make(struct canvas *canvas, int columns, int rows, bool ascii)
{
    struct cell *cells;

    if (columns < 1 || rows < 1 || columns > CANVAS_MOST || rows > CANVAS_MOST)
        return false;
    cells = malloc((size_t)columns * (size_t)rows * sizeof *cells);
    if (cells == NULL)
        return false;
    *canvas = (struct canvas){.columns = columns, .rows = rows, .ascii = ascii, .cells = cells};
    canvas_clear(canvas);
    return true;
}

void canvas_free(struct canvas *canvas)
{
    free(canvas->cells);
    *canvas = (struct canvas){0};
}

void canvas_clear(struct canvas *canvas)
{
    for (int i = 0; i < canvas->columns * canvas->rows; i++)
        canvas->cells[i] = (struct cell){' ', STYLE_PLAIN};
    canvas->cursor_column = canvas->cursor_row = -1;
}

static struct cell *at(const struct canvas *canvas, int row, int column)
{
    if (row < 0 || column < 0 || row >= canvas->rows || column >= canvas->columns)
        return NULL;
    return &canvas->cells[row * canvas->columns + column];
}

const struct cell *canvas_cell(const struct canvas *canvas, int row, int column)
{
    return at(canvas, row, column);
}

/* One ASCII character for a drawing or trade character. */
static uint32_t in_ascii(uint32_t code)
{
    static const struct {
        uint32_t code;
        char ascii;
    } table[] = {{0xB0, ' '},   {0x2500, '-'}, {0x2501, '#'},  {0x2502, '|'}, {0x2503, '#'},
                 {0x2508, '.'}, {0x250A, ':'}, {0x253C, '+'},  {0xD7, 'x'},   {0xB7, '.'},
                 {0xB1, '+'},   {0x25A0, '@'}, {0x2592, '%'},  {0x2551, '='}, {0x2550, '='},
                 {0x2013, '-'}, {0x2014, '-'}, {0x2019, '\''}, {0xB2, '2'},   {0xB3, '3'},
                 {0x2192, '>'}, {0x2713, 'x'}, {0xB5, 'u'}};

    if (code < 0x80)
        return code;
    for (size_t i = 0; i < sizeof table / sizeof *table; i++)
        if (table[i].code == code)
            return (uint32_t)table[i].ascii;
    if (code >= 0x250C && code <= 0x254B)
        return '#';
    return '?';
}

/* A wide character that loses one half loses the other too. */
static void clear_half(struct canvas *canvas, int row, int column)
{
    struct cell *cell = at(canvas, row, column);
    struct cell *next = at(canvas, row, column + 1), *before = at(canvas, row, column - 1);

    if (cell->code == 0 && before != NULL)
        before->code = ' ';
    else if (next != NULL && next->code == 0)
        next->code = ' ';
}

void canvas_put(struct canvas *canvas, int row, int column, uint32_t code, int style)
{
    struct cell *cell = at(canvas, row, column), *next = at(canvas, row, column + 1);
    int width = utf8_width(code);

    if (cell == NULL)
        return;
    if (width == 0)
        code = '?', width = 1;
    if (canvas->ascii)
        code = in_ascii(code), width = 1;
    if (width == 2 && next == NULL)
        code = '?', width = 1;
    clear_half(canvas, row, column);
    *cell = (struct cell){code, (unsigned char)style};
    if (width == 2) {
        clear_half(canvas, row, column + 1);
        *next = (struct cell){0, (unsigned char)style};
    }
}

int canvas_words(struct canvas *canvas, int row, int column, int most, int style,
                 const char *string)
{
    size_t left = strlen(string);
    int end = column + most;

    while (left > 0) {
        uint32_t code = '?';
        size_t length = utf8_decode(string, left, &code);
        int width;
        if (length == 0)
            length = 1, code = '?';
        if (code < 0x20 || code == 0x7F)
            code = '?';
        width = canvas->ascii ? 1 : utf8_width(code);
        string += length;
        left -= length;
        if (width == 0)
            continue;
        if (column + width > end)
            break;
        canvas_put(canvas, row, column, code, style);
        column += width;
    }
    return column;
}

int canvas_format(struct canvas *canvas, int row, int column, int most, int style,
                  const char *format, ...)
{
    struct text words = {0};
    va_list arguments;

    va_start(arguments, format);
    text_vformat(&words, format, arguments);
    va_end(arguments);
    column = canvas_words(canvas, row, column, most, style, text_string(&words));
    text_free(&words);
    return column;
}

/* Bytes of the longest start of `string` that fits `most` columns, broken at a blank if one is in.
 */
static size_t fitting(const char *string, int most)
{
    size_t left = strlen(string), used = 0, blank = 0;
    int columns = 0;

    while (used < left) {
        uint32_t code = '?';
        size_t length = utf8_decode(string + used, left - used, &code);
        if (length == 0)
            length = 1;
        columns += utf8_width(code);
        if (columns > most)
            return blank > 0 ? blank : used > 0 ? used : length;
        used += length;
        if (string[used] == ' ')
            blank = used;
    }
    return used;
}

int canvas_wrap(struct canvas *canvas, int row, int column, int most, int rows, int style,
                const char *string)
{
    struct text line = {0};
    int used = 0;

    while (*string != '\0' && used < rows && most > 0) {
        size_t count = fitting(string, most);
        text_clear(&line);
        text_add_bytes(&line, string, count);
        canvas_words(canvas, row + used++, column, most, style, text_string(&line));
        string += count;
        string += strspn(string, " ");
    }
    text_free(&line);
    return used;
}

void canvas_right(struct canvas *canvas, int row, int column, int width, int style,
                  const char *string)
{
    int columns = utf8_columns(string);

    canvas_words(canvas, row, column + (columns < width ? width - columns : 0), width, style,
                 string);
}

void canvas_mark(struct canvas *canvas, int row, int column, int count, int style)
{
    for (int i = 0; i < count; i++) {
        struct cell *cell = at(canvas, row, column + i);
        if (cell != NULL)
            cell->style = (unsigned char)(cell->style | style);
    }
}

void canvas_rule(struct canvas *canvas, int row)
{
    for (int column = 0; column < canvas->columns; column++)
        canvas_put(canvas, row, column, 0x2500, STYLE_PLAIN);
}

void canvas_print(const struct canvas *canvas, struct text *out)
{
    for (int row = 0; row < canvas->rows; row++) {
        int used = canvas->columns;
        while (used > 0 && at(canvas, row, used - 1)->code == ' ')
            used--;
        for (int column = 0; column < used; column++) {
            char bytes[4];
            uint32_t code = at(canvas, row, column)->code;
            if (code != 0)
                text_add_bytes(out, bytes, utf8_encode(code, bytes));
        }
        text_add_char(out, '\n', 1);
    }
}
