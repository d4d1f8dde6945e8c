#include "base/utf8.h"
#include "plan/why.h"
#include <stdio.h>
#include <string.h>

enum { WHY_COLUMNS = 78 };

static void pad_to(struct text *out, size_t line_start, int column)
{
    int used = utf8_columns(text_string(out) + line_start);

    text_add_char(out, ' ', used < column ? (size_t)(column - used) : 1);
}

/* Words after a label, wrapped at WHY_COLUMNS with an indent of ten. */
static void paragraph(struct text *out, const char *label, const char *words)
{
    size_t start = out->length;

    if (words[0] == '\0')
        return;
    text_add(out, label);
    pad_to(out, start, 10);
    for (bool blank = false; *words != '\0'; blank = true) {
        size_t length = strcspn(words, " ");
        if (utf8_columns(text_string(out) + start) + blank + (int)length > WHY_COLUMNS) {
            text_add_char(out, '\n', 1);
            start = out->length;
            text_add_char(out, ' ', 10);
        } else if (blank) {
            text_add_char(out, ' ', 1);
        }
        text_add_bytes(out, words, length);
        words += length;
        words += strspn(words, " ");
    }
    text_add_char(out, '\n', 1);
}

/* A value at its column; a long one begins further left, if need be on a line of its own. */
static void add_value(struct text *out, size_t *line_start, const char *value)
{
    enum { VALUE_COLUMN = 54, FROM_COLUMN = 66 };
    int width = utf8_columns(value);
    int column = width < FROM_COLUMN - VALUE_COLUMN ? VALUE_COLUMN : FROM_COLUMN - 1 - width;

    if (utf8_columns(text_string(out) + *line_start) >= column) {
        text_add_char(out, '\n', 1);
        *line_start = out->length;
    }
    pad_to(out, *line_start, column);
    text_add(out, value);
    pad_to(out, *line_start, FROM_COLUMN);
}

/* Column where the words begin: behind the longest symbol. */
static int words_column(const struct why *why)
{
    int column = 11;

    for (size_t i = 0; i < why->line_count; i++) {
        int used = 3 + utf8_columns(why->lines[i].step);
        column = used > column ? used : column;
    }
    return column;
}

static void add_line(struct text *out, const struct why_line *line, int words)
{
    size_t start = out->length;

    text_format(out, "  %s", line->step);
    pad_to(out, start, words);
    text_add(out, line->words);
    if (line->sum[0] != '\0') {
        text_add_char(out, '\n', 1);
        start = out->length;
        pad_to(out, start, 15);
        text_add(out, line->sum);
    }
    add_value(out, &start, line->value);
    text_add(out, line->from);
    while (out->length > 0 && out->bytes[out->length - 1] == ' ')
        out->bytes[--out->length] = '\0';
    text_add_char(out, '\n', 1);
}

void why_print(struct text *out, const struct why *why)
{
    paragraph(out, "WHY", why->question);
    paragraph(out, "", why->answer);
    text_add_char(out, '\n', 1);
    for (size_t i = 0; i < why->line_count; i++)
        add_line(out, &why->lines[i], words_column(why));
    text_add_char(out, '\n', 1);
    paragraph(out, "FORMULA", why->formula);
    for (size_t i = 0; i < why->try_count; i++) {
        size_t start = out->length;
        text_add(out, i == 0 ? "TRY" : "");
        pad_to(out, start, 10);
        text_add(out, why->tries[i].words);
        add_value(out, &start, why->tries[i].value);
        text_format(out, "%s\n", why->tries[i].verdict);
    }
    paragraph(out, "VALID", why->valid);
    paragraph(out, "SOURCE", why->source);
}
