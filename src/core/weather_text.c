/* Lines, cells, numbers, dates and clock times of a weather file. */
#include "base/unit.h"
#include "core/weather_read.h"
#include <stdarg.h>
#include <stdio.h>
#include <string.h>

/* ---- what is said ---- */

void weather_complain(struct weather_reader *reader, int line, const char *format, ...)
{
    char words[400], place[40] = "";
    va_list arguments;

    if (++reader->errors > SAID_MOST)
        return;
    va_start(arguments, format);
    vsnprintf(words, sizeof words, format, arguments);
    va_end(arguments);
    if (line > 0)
        snprintf(place, sizeof place, "line %d: ", line);
    finding_add(reader->findings, SEVERITY_ERROR, "climate.file", "", "", 0, 0,
                "climate.file: %s%s%s", place, words,
                reader->errors == SAID_MOST ? " (More lines are wrong; put these right first.)"
                                            : "");
}

void weather_note(struct weather_reader *reader, enum severity severity, const char *format, ...)
{
    char words[400];
    va_list arguments;

    va_start(arguments, format);
    vsnprintf(words, sizeof words, format, arguments);
    va_end(arguments);
    finding_add(reader->findings, severity, "climate.file", "", "", 0, 0, "climate.file: %s",
                words);
}

/* ---- lines and cells ---- */

/* The next line without its end; false at the end of the text. */
static bool take_line(struct weather_reader *reader, const char **line, size_t *length)
{
    const char *start = reader->bytes + reader->at, *end;
    size_t left = reader->count - reader->at;

    if (left == 0)
        return false;
    end = memchr(start, '\n', left);
    *line = start;
    *length = end != NULL ? (size_t)(end - start) : left;
    reader->at += *length + (end != NULL);
    reader->line++;
    while (*length > 0 && ((*line)[*length - 1] == '\r' || (*line)[*length - 1] == ' '))
        (*length)--;
    return true;
}

/* Trims blanks and one pair of quotes. */
static struct weather_cell trim(const char *start, size_t length)
{
    while (length > 0 && (*start == ' ' || *start == '\t')) {
        start++;
        length--;
    }
    while (length > 0 && (start[length - 1] == ' ' || start[length - 1] == '\t'))
        length--;
    if (length >= 2 && start[0] == '"' && start[length - 1] == '"')
        return (struct weather_cell){start + 1, length - 2};
    return (struct weather_cell){start, length};
}

static void part(struct weather_reader *reader, const char *line, size_t length)
{
    size_t from = 0;
    bool quoted = false;

    reader->cell_count = 0;
    for (size_t i = 0; i <= length; i++) {
        if (i < length && line[i] == '"')
            quoted = !quoted;
        if (i < length && (quoted || line[i] != reader->separator))
            continue;
        if (reader->cell_count < CELLS_MOST)
            reader->cells[reader->cell_count++] = trim(line + from, i - from);
        from = i + 1;
    }
}

bool weather_next(struct weather_reader *reader)
{
    const char *line;
    size_t length;

    do {
        if (!take_line(reader, &line, &length))
            return false;
    } while (length == 0 || line[0] == '#');
    if (reader->header_cells == 0) /* still looking for the header: its own separator */
        reader->separator = memchr(line, ';', length) != NULL    ? ';'
                            : memchr(line, '\t', length) != NULL ? '\t'
                                                                 : ',';
    part(reader, line, length);
    return true;
}

void weather_cell_text(const struct weather_reader *reader, int at, char out[CELL_MOST])
{
    size_t length = 0;

    if (at >= 0 && at < reader->cell_count) {
        const struct weather_cell *cell = &reader->cells[at];
        for (; length < cell->length && length < CELL_MOST - 1; length++) {
            unsigned char c = (unsigned char)cell->start[length];
            out[length] = c >= 0x20 && c < 0x7f ? (char)c : '?';
        }
    }
    out[length] = '\0';
}

/* ---- values ---- */

bool weather_number(struct weather_reader *reader, const char *cell, double *out)
{
    char text[CELL_MOST], *comma;
    struct unit_reading reading;

    snprintf(text, sizeof text, "%s", cell);
    comma = strchr(text, ',');
    if (comma != NULL && reader->separator != ',') {
        *comma = '.';
        reader->decimal_commas++;
    }
    reading = unit_read_number(text, strlen(text));
    *out = reading.si;
    return reading.problem == NULL && reading.length == strlen(text);
}

/* Up to `most` digits; false when there are fewer than `least`. */
static bool digits(const char **text, int least, int most, int *out)
{
    int i;

    *out = 0;
    for (i = 0; i < most && **text >= '0' && **text <= '9'; i++, (*text)++)
        *out = 10 * *out + (**text - '0');
    return i >= least;
}

static bool year_first(const char **at, int *year, int *month, int *day)
{
    char mark;

    if (!digits(at, 4, 4, year))
        return false;
    mark = **at;
    if (mark != '-' && mark != '/') /* 20270412 */
        return digits(at, 2, 2, month) && digits(at, 2, 2, day);
    (*at)++;
    if (!digits(at, 1, 2, month) || **at != mark)
        return false;
    (*at)++;
    return digits(at, 1, 2, day);
}

static bool year_last(const struct weather_column *column, const char **at, int *year, int *month,
                      int *day)
{
    int a, b;
    char mark;

    if (!digits(at, 1, 2, &a) || (**at != '.' && **at != '/'))
        return false;
    mark = *(*at)++;
    if (!digits(at, 1, 2, &b) || *(*at)++ != mark || !digits(at, 4, 4, year))
        return false;
    if (mark == '/' && !column->month_first && !column->day_first)
        return false; /* 03/04: which is the month? */
    *month = mark == '/' && column->month_first ? a : b;
    *day = mark == '/' && column->month_first ? b : a;
    return true;
}

bool weather_date(const struct weather_column *column, const char *text, int *year, int *month,
                  int *day, const char **rest)
{
    static const int days[] = {31, 29, 31, 30, 31, 30, 31, 31, 30, 31, 30, 31};
    bool read = strspn(text, "0123456789") >= 4 ? year_first(&text, year, month, day)
                                                : year_last(column, &text, year, month, day);

    *rest = text;
    return read && *year >= 1700 && *year <= 2200 && *month >= 1 && *month <= 12 && *day >= 1 &&
           *day <= days[*month - 1];
}

bool weather_time(const char *text, int *hour, int *minute)
{
    int second;

    text += strspn(text, " T");
    *minute = 0;
    if (!digits(&text, 1, 2, hour))
        return false;
    if (*text == ':' && (text++, !digits(&text, 2, 2, minute)))
        return false;
    if (*text == ':' && (text++, !digits(&text, 2, 2, &second)))
        return false;
    return *text == '\0' && *hour <= 24 && *minute < 60 && (*hour < 24 || *minute == 0);
}

int weather_day_of_year(int month, int day)
{
    static const int before[] = {0, 31, 59, 90, 120, 151, 181, 212, 243, 273, 304, 334};

    return before[month - 1] + day - 1;
}
