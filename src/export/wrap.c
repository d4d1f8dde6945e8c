#include "export/wrap.h"
#include "base/utf8.h"
#include <string.h>

/* The bytes of the next word and its columns; a word of more than `most` columns is cut there. */
static size_t next_word(const char *words, int most, int *columns)
{
    size_t length = strcspn(words, " "), used = 0;

    *columns = 0;
    while (used < length) {
        uint32_t code;
        size_t step = utf8_decode(words + used, length - used, &code);
        int width = step > 0 ? utf8_width(code) : 1;
        if (*columns + width > most && used > 0)
            break;
        *columns += width;
        used += step > 0 ? step : 1;
    }
    return used;
}

void wrap_add(struct text *out, const char *first, int indent, const char *words, int columns)
{
    int at = utf8_columns(first);
    bool line_start; /* no blank is wanted before the next word */

    text_add(out, first);
    line_start = at < indent || at == 0 || first[strlen(first) - 1] == ' ';
    if (at < indent) {
        text_add_char(out, ' ', (size_t)(indent - at));
        at = indent;
    }
    while (*words != '\0') {
        int width;
        size_t length = next_word(words, columns - indent, &width);
        if (!line_start && at + 1 + width > columns) {
            text_add_char(out, '\n', 1);
            text_add_char(out, ' ', (size_t)indent);
            at = indent;
            line_start = true;
        }
        if (!line_start) {
            text_add_char(out, ' ', 1);
            at++;
        }
        text_add_bytes(out, words, length);
        at += width;
        line_start = false;
        words += length;
        words += strspn(words, " ");
    }
    text_add_char(out, '\n', 1);
}
