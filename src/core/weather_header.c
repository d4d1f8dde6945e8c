/* The header of a weather file: which column is what, in which unit. */
#include "core/weather_read.h"
#include <math.h>
#include <stdio.h>
#include <string.h>

/* ---- a name as words: "Dry-bulb (C)" is " dry bulb c " ---- */

static void words_of(const char *name, char out[2 * CELL_MOST])
{
    size_t used = 1;

    out[0] = ' ';
    for (; *name != '\0' && used < 2 * CELL_MOST - 3; name++) {
        const char c = (*name >= 'A' && *name <= 'Z') ? (char)(*name - 'A' + 'a') : *name;
        if ((c >= 'a' && c <= 'z') || (c >= '0' && c <= '9') || c == '%')
            out[used++] = c;
        else if (out[used - 1] != ' ')
            out[used++] = ' ';
    }
    if (out[used - 1] != ' ')
        out[used++] = ' ';
    out[used] = '\0';
}

/* Whether one of the words of `list` ("dew dewpoint") is among those of the name. */
static bool has(const char *words, const char *list)
{
    char word[CELL_MOST];

    while (*list != '\0') {
        size_t length = strcspn(list, " ");
        snprintf(word, sizeof word, " %.*s ", (int)length, list);
        if (strstr(words, word) != NULL)
            return true;
        list += length + (list[length] == ' ');
    }
    return false;
}

static enum weather_what what_of(const char *words)
{
    if (has(words, "source uncert uncertainty flag flags quality attributes dir wdir direction "
                   "gust precipitation pressure"))
        return WEATHER_NOTHING;
    if (has(words, "date datetime timestamp"))
        return WEATHER_DATE;
    if (has(words, "time hour hours") && !has(words, "sun sunshine"))
        return WEATHER_TIME;
    if (has(words, "dew dewpoint dew_point"))
        return WEATHER_DEW;
    if (has(words, "ghi radiation irradiance solar sun global"))
        return WEATHER_SUN;
    if (has(words, "wspd wind windspeed awnd"))
        return WEATHER_WIND;
    if (has(words, "rhum rh humidity humid"))
        return WEATHER_DAMP;
    if (has(words, "totcld cloud clouds cloudcover cover"))
        return WEATHER_CLOUD;
    if (has(words, "tmin tn min minimum lowest low"))
        return WEATHER_LOWEST;
    if (has(words, "tmax tx max maximum highest high"))
        return WEATHER_HIGHEST;
    if (has(words, "drybulb temp temperature air tair") || strncmp(words, " dry bulb ", 10) == 0)
        return WEATHER_AIR;
    if (has(words, "year"))
        return WEATHER_YEAR;
    if (has(words, "month"))
        return WEATHER_MONTH;
    return has(words, "day") ? WEATHER_DAY : WEATHER_NOTHING;
}

/* ---- units ---- */

/* Puts the scale to SI into the column; false: no unit is named that is known. */
static bool unit_of(enum weather_what what, const char *words, struct weather_column *column)
{
    column->scale = 1;
    switch (what) {
    case WEATHER_LOWEST:
    case WEATHER_HIGHEST:
    case WEATHER_AIR:
    case WEATHER_DEW:
        if (has(words, "f degf fahrenheit")) {
            column->scale = 1 / 1.8;
            column->shift = -32 / 1.8;
            return true;
        }
        return has(words, "c degc celsius");
    case WEATHER_SUN:
        return has(words, "w wm2") && !has(words, "k kw");
    case WEATHER_WIND:
        column->scale = has(words, "mph")                ? 0.44704
                        : has(words, "kt kn knot knots") ? 1852.0 / 3600
                        : has(words, "km kmh kph")       ? 1 / 3.6
                                                         : 1;
        return has(words, "mph kt kn knot knots kmh kph ms mps") ||
               (has(words, "m km") && has(words, "s h"));
    case WEATHER_DAMP:
        column->scale = has(words, "ratio") ? 1 : 0.01;
        return has(words, "% percent pct ratio");
    case WEATHER_CLOUD:
        column->scale = has(words, "tenths tenth")         ? 0.1
                        : has(words, "okta oktas eighths") ? 0.125
                        : has(words, "% percent pct")      ? 0.01
                                                           : 1;
        return has(words, "tenths tenth okta oktas eighths % percent pct ratio");
    default:
        return true;
    }
}

static const char *unit_words(enum weather_what what)
{
    switch (what) {
    case WEATHER_SUN:
        return "W/m2";
    case WEATHER_WIND:
        return "m/s, km/h, mph or kt";
    case WEATHER_DAMP:
        return "% or ratio";
    case WEATHER_CLOUD:
        return "tenths, okta, % or ratio";
    default:
        return "C or F";
    }
}

/* ---- the line ---- */

/* A column with a unit missing counts as found: the complaint comes when the header is known. */
static void read_names(struct weather_reader *reader)
{
    for (int w = 0; w < WEATHER_WHATS; w++)
        reader->columns[w] = (struct weather_column){.at = -1};
    for (int at = 0; at < reader->cell_count; at++) {
        char name[CELL_MOST], words[2 * CELL_MOST];
        struct weather_column column = {.at = at};
        enum weather_what what;
        weather_cell_text(reader, at, name);
        words_of(name, words);
        what = what_of(words);
        if (what == WEATHER_NOTHING || reader->columns[what].at >= 0)
            continue;
        if (!unit_of(what, words, &column))
            column.scale = NAN;
        column.month_first = has(words, "mm") && strstr(words, " mm dd ") != NULL;
        column.day_first = strstr(words, " dd mm ") != NULL;
        snprintf(column.name, sizeof column.name, "%s", name);
        reader->columns[what] = column;
    }
}

static bool is_header(const struct weather_reader *reader)
{
    const struct weather_column *c = reader->columns;
    bool date = c[WEATHER_DATE].at >= 0 || (c[WEATHER_MONTH].at >= 0 && c[WEATHER_DAY].at >= 0);

    return date &&
           (c[WEATHER_AIR].at >= 0 || (c[WEATHER_LOWEST].at >= 0 && c[WEATHER_HIGHEST].at >= 0));
}

/* The two-line header of typical-year files: number, name, state, hours from UTC, latitude,
 * longitude, elevation. */
static void read_station(struct weather_reader *reader)
{
    char cell[CELL_MOST];
    double latitude, longitude;

    if (reader->cell_count < 6 || reader->cell_count > 8)
        return;
    weather_cell_text(reader, 4, cell);
    if (!weather_number(reader, cell, &latitude) || fabs(latitude) > 90)
        return;
    weather_cell_text(reader, 5, cell);
    if (!weather_number(reader, cell, &longitude) || fabs(longitude) > 180)
        return;
    reader->has_station = true;
    reader->latitude_deg = latitude;
}

static bool check_units(struct weather_reader *reader)
{
    bool good = true;

    for (int w = WEATHER_LOWEST; w < WEATHER_WHATS; w++) {
        const struct weather_column *column = &reader->columns[w];
        if (column->at < 0 || isfinite(column->scale))
            continue;
        weather_complain(reader, reader->line,
                         "the column '%s' states no unit; write it into the name: %s.",
                         column->name, unit_words((enum weather_what)w));
        good = false;
    }
    return good;
}

bool weather_find_header(struct weather_reader *reader)
{
    enum { LINES_MOST = 30 };

    while (reader->line < LINES_MOST && weather_next(reader)) {
        read_names(reader);
        if (!is_header(reader)) {
            read_station(reader);
            continue;
        }
        reader->header_cells = reader->cell_count;
        if (reader->cell_count >= CELLS_MOST) {
            weather_complain(reader, reader->line, "more than %d columns; leave some out.",
                             CELLS_MOST - 1);
            return false;
        }
        reader->hourly =
            reader->columns[WEATHER_LOWEST].at < 0 || reader->columns[WEATHER_HIGHEST].at < 0;
        return check_units(reader);
    }
    weather_complain(reader, 0,
                     "no header with a date and a temperature in the first %d lines; name the "
                     "columns date, tmin_c and tmax_c (a line a day), or date, time and temp_c (a "
                     "line an hour).",
                     LINES_MOST);
    return false;
}
