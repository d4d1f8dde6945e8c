/* Rows of a weather file: where each belongs and what stands in it. */
#include "core/weather.h"
#include "core/weather_read.h"
#include <math.h>
#include <stdlib.h>
#include <string.h>

/* ---- where ---- */

static bool is_leap(int year)
{
    return (year % 4 == 0 && year % 100 != 0) || year % 400 == 0;
}

static bool read_day(struct weather_reader *reader, int *year, int *month, int *day,
                     char clock[CELL_MOST])
{
    const struct weather_column *columns = reader->columns;
    char cell[CELL_MOST];
    const char *rest = "";
    double parts[3] = {0, 0, 0};

    weather_cell_text(reader, columns[WEATHER_TIME].at, clock);
    if (columns[WEATHER_DATE].at >= 0) {
        int hour, minute;
        bool good;
        weather_cell_text(reader, columns[WEATHER_DATE].at, cell);
        good = weather_date(&columns[WEATHER_DATE], cell, year, month, day, &rest);
        if (columns[WEATHER_TIME].at < 0)
            memmove(clock, rest, strlen(rest) + 1);
        else
            good = good && *rest == '\0';
        if (!reader->hourly && *rest != '\0') /* a day has no hour but its midnight */
            good = good && weather_time(rest, &hour, &minute) && hour == 0;
        if (!good)
            weather_complain(reader, reader->line,
                             "'%s' is no date; write 2027-04-12 (03/04/2027 only where the header "
                             "says MM/DD/YYYY or DD/MM/YYYY).",
                             cell);
        return good;
    }
    for (int i = 0; i < 3; i++) {
        const struct weather_column *column = &columns[WEATHER_YEAR + i];
        weather_cell_text(reader, column->at, cell);
        if (column->at >= 0 && !weather_number(reader, cell, &parts[i]))
            parts[i] = -1;
    }
    *year = (int)parts[0];
    *month = (int)parts[1];
    *day = (int)parts[2];
    if (*year >= 0 && *year <= 2200 && *month >= 1 && *month <= 12 && *day >= 1 && *day <= 31)
        return true;
    weather_complain(reader, reader->line, "year, month and day make no date.");
    return false;
}

/* Midnight written as 24:00 is hour 0 of the next day. */
static bool read_clock(struct weather_reader *reader, const char *clock, struct weather_row *row,
                       bool *next_day)
{
    int hour, minute;

    *next_day = false;
    if (!weather_time(clock, &hour, &minute)) {
        weather_complain(reader, reader->line,
                         "'%s' is no clock time; write 13:00, the site's standard time, 24 h.",
                         clock);
        return false;
    }
    reader->between_hours += minute > 0;
    *next_day = hour == 24;
    row->hour = (signed char)(hour % 24);
    return true;
}

/* False: the row is left out (complained about, or 29 February). */
static bool read_place(struct weather_reader *reader, struct weather_row *row)
{
    char clock[CELL_MOST];
    int year, month, day;
    bool next_day = false, leap_day;

    if (!read_day(reader, &year, &month, &day, clock))
        return false;
    if (reader->hourly && !read_clock(reader, clock, row, &next_day))
        return false;
    leap_day = month == 2 && (day == 29 ? !next_day : day == 28 && next_day && is_leap(year));
    if (leap_day) {
        reader->leap_days++;
        return false;
    }
    if (month == 2 && day == 29)
        day = 28; /* its midnight is that of 1 March */
    row->year = (short)year;
    row->day = (short)(weather_day_of_year(month, day) + next_day);
    if (row->day >= CLIMATE_DAYS) {
        row->day = 0;
        row->year++;
    }
    return true;
}

/* ---- what ---- */

static bool is_missing(const char *cell)
{
    static const char *const words[] = {"", "-", "NA", "N/A", "NaN", "nan", "NAN", "null", "M"};

    for (size_t i = 0; i < sizeof words / sizeof *words; i++)
        if (strcmp(cell, words[i]) == 0)
            return true;
    return false;
}

static bool read_value(struct weather_reader *reader, enum weather_what what, double least,
                       double most, float *out)
{
    const struct weather_column *column = &reader->columns[what];
    char cell[CELL_MOST];
    double value;

    *out = NAN;
    weather_cell_text(reader, column->at, cell);
    if (column->at < 0 || is_missing(cell))
        return true;
    if (!weather_number(reader, cell, &value)) {
        weather_complain(reader, reader->line, "'%s' in the column '%s' is no number.", cell,
                         column->name);
        return false;
    }
    if (value <= -999 || value >= 9999) /* how records mark what is missing */
        return true;
    value = value * column->scale + column->shift;
    if (value < least - 1e-9 || value > most + 1e-9) {
        weather_complain(reader, reader->line,
                         "'%s' in the column '%s' cannot be; check the value and the unit in the "
                         "column's name.",
                         cell, column->name);
        return false;
    }
    *out = (float)value;
    return true;
}

static bool read_values(struct weather_reader *reader, struct weather_row *row)
{
    struct weather_hour *value = &row->value;

    if (!read_value(reader, WEATHER_LOWEST, -90, 60, &row->low_c) ||
        !read_value(reader, WEATHER_HIGHEST, -90, 60, &row->high_c) ||
        !read_value(reader, WEATHER_AIR, -90, 60, &value->air_c) ||
        !read_value(reader, WEATHER_SUN, -20, 1500, &value->sun_w_m2) ||
        !read_value(reader, WEATHER_WIND, 0, 80, &value->wind_m_s) ||
        !read_value(reader, WEATHER_DAMP, 0, 1.05, &value->humidity) ||
        !read_value(reader, WEATHER_DEW, -90, 40, &value->dew_c) ||
        !read_value(reader, WEATHER_CLOUD, 0, 1, &value->cloud))
        return false;
    if (!reader->hourly && row->low_c > row->high_c) {
        weather_complain(reader, reader->line, "the lowest, %g degC, is above the highest, %g.",
                         (double)row->low_c, (double)row->high_c);
        return false;
    }
    if (value->humidity < 0.01f) { /* no air is that dry: the dew point would have no bound */
        value->humidity = 0.01f;
        reader->dry++;
    }
    return true;
}

/* More cells than names: most often a decimal comma in a file parted by commas. */
static bool check_cells(struct weather_reader *reader)
{
    int cells = reader->cell_count;

    while (cells > reader->header_cells && reader->cells[cells - 1].length == 0)
        cells--;
    if (cells == reader->header_cells)
        return true;
    if (cells > reader->header_cells)
        weather_complain(reader, reader->line,
                         "%d cells under %d names; write 12.5 for 12,5, or part the cells by ;.",
                         cells, reader->header_cells);
    else
        weather_complain(reader, reader->line, "%d cells under %d names; the line is cut short.",
                         cells, reader->header_cells);
    return false;
}

static bool keep(struct weather_reader *reader, const struct weather_row *row)
{
    const size_t most = (size_t)WEATHER_YEARS_MOST * (CLIMATE_HOURS + 24);

    if (reader->row_count >= most) {
        weather_complain(reader, reader->line, "more than %d years; cut the file.",
                         WEATHER_YEARS_MOST);
        return false;
    }
    if (reader->row_count == reader->row_capacity) {
        size_t wanted = reader->row_capacity > 0 ? 2 * reader->row_capacity : 1024;
        struct weather_row *rows = realloc(reader->rows, wanted * sizeof *rows);
        if (rows == NULL) {
            reader->no_memory = true;
            return false;
        }
        reader->rows = rows;
        reader->row_capacity = wanted;
    }
    reader->rows[reader->row_count++] = *row;
    return true;
}

/* A change no air makes in an hour is said, and kept: it may be true. */
static void watch(struct weather_reader *reader, const struct weather_row *row,
                  const struct weather_row *last)
{
    const float most = 20;

    if (!reader->hourly || 24 * row->day + row->hour != 24 * last->day + last->hour + 1 ||
        !(fabsf(row->value.air_c - last->value.air_c) > most) || ++reader->spikes > 3)
        return;
    weather_note(reader, SEVERITY_WARNING,
                 "line %d: the air goes from %g to %g degC within an hour; check the record.",
                 reader->line, (double)last->value.air_c, (double)row->value.air_c);
}

static void read_rows(struct weather_reader *reader)
{
    struct weather_row last = {.day = -9};

    while (reader->errors < SAID_MOST && !reader->no_memory && weather_next(reader)) {
        struct weather_row row = {.line = reader->line};
        if (!check_cells(reader) || !read_place(reader, &row) || !read_values(reader, &row))
            continue;
        watch(reader, &row, &last);
        if (!keep(reader, &row))
            return;
        last = row;
    }
}

/* ---- all together ---- */

static bool begin(struct weather_reader *reader)
{
    if (reader->count == 0) {
        weather_complain(reader, 0, "the file is empty.");
        return false;
    }
    if (reader->count >= 2 &&
        (memcmp(reader->bytes, "\xff\xfe", 2) == 0 || memcmp(reader->bytes, "\xfe\xff", 2) == 0)) {
        weather_complain(reader, 0, "the file is UTF-16; save it as CSV in UTF-8.");
        return false;
    }
    if (reader->count >= 3 && memcmp(reader->bytes, "\xef\xbb\xbf", 3) == 0)
        reader->at = 3;
    return weather_find_header(reader);
}

enum status weather_parse(const char *bytes, size_t count, struct weather **weather,
                          struct finding_list *findings)
{
    struct weather_reader *reader = calloc(1, sizeof *reader);
    enum status status = STATUS_OK;

    *weather = NULL;
    if (reader == NULL)
        return STATUS_NO_MEMORY;
    reader->bytes = bytes;
    reader->count = count;
    reader->findings = findings;
    reader->latitude_deg = NAN;
    if (begin(reader))
        read_rows(reader);
    if (reader->errors == 0 && !reader->no_memory)
        *weather = weather_assemble(reader);
    if (reader->no_memory || findings->failed)
        status = STATUS_NO_MEMORY;
    else if (*weather == NULL)
        status = STATUS_REFUSED;
    if (status != STATUS_OK) {
        weather_release(*weather);
        *weather = NULL;
    }
    free(reader->rows);
    free(reader);
    return status;
}
