#include "export/wrap.h"
#include "base/utf8.h"
#include <string.h>

/* The bytes of the next word and its columns. */
static size_t next_word(const char *words, int *columns)
{
    size_t length = strcspn(words, " ");
    size_t left = length;

    *columns = 0;
    while (left > 0) {
        uint32_t code;
        size_t step = utf8_decode(words + (length - left), left, &code);
        *columns += step > 0 ? utf8_width(code) : 1;
        left -= step > 0 ? step : 1;
    }
    return length;
}

void wrap_add(struct text *out, const char *first, int indent, const char *words, int columns)
{
    int at = utf8_columns(first);
    bool line_start = true;

    text_add(out, first);
    if (at < indent) {
        text_add_char(out, ' ', (size_t)(indent - at));
        at = indent;
    }
    while (*words != '\0') {
        int width;
        size_t length = next_word(words, &width);
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
