/* From rows to whole years: order, repeats, missing days and hours. */
#include "core/weather_read.h"
#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

static const double PI = 3.14159265358979323846;
/* Missing stretches up to these are filled; common practice with weather records. */
enum { LINE_HOURS = 6, FILL_HOURS = 72, FILL_DAYS = 3, DAYS_LEAST = 340 };
enum { EVERY = 0 }; /* the year of a record put together from several */

/* ---- order ---- */

static int earlier(const void *a, const void *b)
{
    const struct weather_row *x = a, *y = b;
    int years = x->year - y->year, hours = 24 * (x->day - y->day) + x->hour - y->hour;

    return years != 0 ? years : hours != 0 ? hours : x->line - y->line;
}

static void sort(struct weather_reader *reader)
{
    if (reader->row_count > 1)
        qsort(reader->rows, reader->row_count, sizeof *reader->rows, earlier);
}

static void check_repeats(struct weather_reader *reader)
{
    for (size_t i = 1; i < reader->row_count && reader->errors < SAID_MOST; i++) {
        const struct weather_row *a = &reader->rows[i - 1], *b = &reader->rows[i];
        if (a->year == b->year && a->day == b->day && a->hour == b->hour)
            weather_complain(reader, b->line, "this %s stands on line %d already; keep one%s.",
                             reader->hourly ? "hour" : "day", a->line,
                             reader->hourly ? " (clock times are standard time all year)" : "");
    }
}

/* Whether no day of the year comes in two years: then the rows make one year together. */
static bool is_one_year(const struct weather_reader *reader)
{
    unsigned char *seen = calloc(CLIMATE_HOURS, 1);
    bool one = seen != NULL;

    for (size_t i = 0; one && i < reader->row_count; i++) {
        unsigned char *place = &seen[24 * reader->rows[i].day + reader->rows[i].hour];
        one = *place == 0;
        *place = 1;
    }
    free(seen);
    return one;
}

/* ---- years ---- */

/* Days of the year that begins at rows[from]; *to is its end. */
static int days_of_year(const struct weather_reader *reader, size_t from, size_t *to)
{
    int days = 0, last = -1;
    size_t i;

    for (i = from; i < reader->row_count && reader->rows[i].year == reader->rows[from].year; i++)
        if (reader->rows[i].day != last) {
            last = reader->rows[i].day;
            days++;
        }
    *to = i;
    return days;
}

/* Takes out the years of too few days; returns how many stay. */
static int keep_whole_years(struct weather_reader *reader)
{
    size_t out = 0, to;
    int years = 0;

    for (size_t from = 0; from < reader->row_count; from = to) {
        int days = days_of_year(reader, from, &to);
        if (days >= DAYS_LEAST) {
            memmove(&reader->rows[out], &reader->rows[from], (to - from) * sizeof *reader->rows);
            out += to - from;
            years++;
        } else if (days > 1) {
            weather_note(reader, SEVERITY_NOTE, "%d has only %d days and is left out.",
                         reader->rows[from].year, days);
        }
    }
    reader->row_count = out;
    return years;
}

static int count_years(struct weather_reader *reader)
{
    int distinct = 0, years;

    for (size_t i = 0; i < reader->row_count; i++)
        distinct += i == 0 || reader->rows[i].year != reader->rows[i - 1].year;
    if (distinct > 1 && is_one_year(reader)) {
        size_t end; /* a last midnight may stand in the next year */
        short year =
            days_of_year(reader, 0, &end) >= DAYS_LEAST ? reader->rows[0].year : (short)EVERY;
        for (size_t i = 0; i < reader->row_count; i++)
            reader->rows[i].year = year;
        sort(reader);
        if (distinct > 2)
            weather_note(reader, SEVERITY_WARNING,
                         "months of %d different years: a typical year hides the real extremes; "
                         "type slab-coldest and slab-hottest if you know colder or hotter days.",
                         distinct);
    }
    years = reader->row_count > 0 ? keep_whole_years(reader) : 0;
    if (years == 0)
        weather_complain(reader, 0,
                         "no year has %d days or more; give whole years, from January or any other "
                         "month on.",
                         DAYS_LEAST);
    if (years > WEATHER_YEARS_MOST) {
        weather_complain(reader, 0, "more than %d years; cut the file.", WEATHER_YEARS_MOST);
        return 0;
    }
    return years;
}

/* ---- gaps ---- */

struct series { /* what gaps are looked for in: hours, or days */
    struct weather_reader *reader;
    const int *lines;    /* of each slot; 0: nothing there */
    int count, step_day; /* slots in a day */
    int first_year;
    int years;
};

static void add_date(const struct series *series, int slot, char *out, size_t room)
{
    static const char *const months[] = {"January",   "February", "March",    "April",
                                         "May",       "June",     "July",     "August",
                                         "September", "October",  "November", "December"};
    int day = slot / series->step_day % CLIMATE_DAYS, month = 11;
    int hour = slot % series->step_day;

    while (month > 0 && weather_day_of_year(month + 1, 1) > day)
        month--;
    if (series->step_day > 1)
        snprintf(out, room, "%d %s %02d:00", day - weather_day_of_year(month + 1, 1) + 1,
                 months[month], hour);
    else
        snprintf(out, room, "%d %s", day - weather_day_of_year(month + 1, 1) + 1, months[month]);
}

static int line_before(const struct series *series, int slot)
{
    for (int i = 1; i <= series->count; i++) {
        int at = (slot + series->count - i) % series->count;
        if (series->lines[at] > 0)
            return series->lines[at];
    }
    return 0;
}

/* Complains about every stretch longer than what is filled; counts the rest. */
static void check_gaps(const struct series *series)
{
    int most = series->step_day > 1 ? FILL_HOURS : FILL_DAYS;

    for (int i = 0; i < series->count; i++) {
        int end = i;
        while (end < series->count && series->lines[end] == 0)
            end++;
        if (end - i > most) {
            char from[40], to[40];
            add_date(series, i, from, sizeof from);
            add_date(series, end - 1, to, sizeof to);
            weather_complain(series->reader, 0,
                             "after line %d: nothing from %s to %s; up to %d days are filled, more "
                             "must be in the file.",
                             line_before(series, i), from, to, FILL_DAYS);
        } else {
            series->reader->filled += end - i;
        }
        i = end;
    }
}

/* Neighbours of a missing slot `step` slots apart: the nearest before and after with a value, in a
 * ring. *share: how far from the one before. */
static void neighbours(const struct series *series, int slot, int step, int *before, int *after,
                       float *share)
{
    int back = step, on = step, n = series->count;

    while (back < n && series->lines[(slot + n - back) % n] == 0)
        back += step;
    while (on < n && series->lines[(slot + on) % n] == 0)
        on += step;
    *before = (slot + n - back % n) % n;
    *after = (slot + on) % n;
    *share = (float)back / (float)(back + on);
}

static float between(float a, float b, float share)
{
    return isfinite(a) && isfinite(b) ? a + share * (b - a) : NAN;
}

/* Up to six hours: straight lines; more: between the same hours of the days beside. */
static void fill_hour(const struct series *series, struct weather_hour *hours, int slot)
{
    int before, after;
    float share;

    neighbours(series, slot, 1, &before, &after, &share);
    if ((after - before + series->count) % series->count > LINE_HOURS + 1)
        neighbours(series, slot, 24, &before, &after, &share);
    hours[slot] = (struct weather_hour){
        .air_c = between(hours[before].air_c, hours[after].air_c, share),
        .sun_w_m2 = between(hours[before].sun_w_m2, hours[after].sun_w_m2, share),
        .wind_m_s = between(hours[before].wind_m_s, hours[after].wind_m_s, share),
        .humidity = between(hours[before].humidity, hours[after].humidity, share),
        .dew_c = between(hours[before].dew_c, hours[after].dew_c, share),
        .cloud = between(hours[before].cloud, hours[after].cloud, share),
    };
}

/* ---- from rows to hours ---- */

struct day {
    float low_c, high_c;
    struct weather_hour value;
};

/* Slot of a row in the years that stay, in their order. */
static int slot_of(const struct weather_reader *reader, size_t row, int *year_index, int step_day)
{
    if (row > 0 && reader->rows[row].year != reader->rows[row - 1].year)
        (*year_index)++;
    return (*year_index * CLIMATE_DAYS + reader->rows[row].day) * step_day +
           (step_day > 1 ? reader->rows[row].hour : 0);
}

static bool fill_hourly(struct weather *weather, const struct series *series, int *lines)
{
    struct weather_reader *reader = series->reader;
    int year = 0;

    for (size_t i = 0; i < reader->row_count; i++) {
        int slot = slot_of(reader, i, &year, 24);
        if (!isfinite(reader->rows[i].value.air_c))
            continue;
        weather->hours[slot] = reader->rows[i].value;
        lines[slot] = reader->rows[i].line;
    }
    check_gaps(series);
    for (int i = 0; reader->errors == 0 && i < series->count; i++)
        if (lines[i] == 0)
            fill_hour(series, weather->hours, i);
    return reader->errors == 0;
}

/* Half a cosine from the lowest at 3 h to the highest at 15 h, and on to the next lowest. */
static void spread(const struct day *days, int count, struct weather *weather)
{
    for (int i = 0; i < 24 * count; i++) {
        int d = i / 24, h = i % 24;
        const struct day *day = &days[d], *past = &days[(d + count - 1) % count];
        const struct day *next = &days[(d + 1) % count];
        double from = h < 3 ? past->high_c : h < 15 ? day->low_c : day->high_c;
        double to = h < 15 ? (h < 3 ? day->low_c : day->high_c) : next->low_c;
        double part = ((h + 9) % 12) / 12.0; /* from 3 h or 15 h on */
        weather->hours[i] = day->value;
        weather->hours[i].sun_w_m2 = NAN; /* a daily figure has no hour */
        weather->hours[i].air_c = (float)(from + (to - from) * (1 - cos(PI * part)) / 2);
    }
}

static bool fill_daily(struct weather *weather, const struct series *series, int *lines)
{
    struct weather_reader *reader = series->reader;
    struct day *days = calloc((size_t)series->count, sizeof *days);
    int year = 0;

    if (days == NULL) {
        reader->no_memory = true;
        return false;
    }
    for (size_t i = 0; i < reader->row_count; i++) {
        const struct weather_row *row = &reader->rows[i];
        int slot = slot_of(reader, i, &year, 1);
        if (!isfinite(row->low_c) || !isfinite(row->high_c))
            continue;
        days[slot] = (struct day){row->low_c, row->high_c, row->value};
        lines[slot] = row->line;
    }
    check_gaps(series);
    for (int i = 0; reader->errors == 0 && i < series->count; i++) {
        int before, after;
        float share;
        if (lines[i] != 0)
            continue;
        neighbours(series, i, 1, &before, &after, &share);
        days[i].low_c = between(days[before].low_c, days[after].low_c, share);
        days[i].high_c = between(days[before].high_c, days[after].high_c, share);
        days[i].value = days[before].value;
    }
    if (reader->errors == 0)
        spread(days, series->count, weather);
    free(days);
    return reader->errors == 0;
}

/* ---- what was assumed ---- */

static void say_assumed(struct weather_reader *reader, const struct weather *weather)
{
    if (reader->filled > 0)
        weather_note(reader, SEVERITY_NOTE,
                     "%d %s are missing in the record and filled from those beside them.",
                     reader->filled, weather->hourly ? "hours" : "days");
    if (reader->leap_days > 0)
        weather_note(reader, SEVERITY_NOTE, "29 February is left out: every year has 365 days.");
    if (reader->between_hours > 0)
        weather_note(reader, SEVERITY_NOTE,
                     "clock times between full hours count as the hour before them.");
    if (reader->decimal_commas > 0)
        weather_note(reader, SEVERITY_NOTE, "decimal commas are read as points.");
    if (reader->dry > 0)
        weather_note(reader, SEVERITY_NOTE, "a humidity of 0 is taken as 1 %%.");
    if (reader->columns[WEATHER_SUN].at >= 0 && !weather->hourly)
        weather_note(reader, SEVERITY_NOTE,
                     "a sun column is not used in a file by days; the sun is worked out.");
    if (weather->years == 1 && weather->first_year > 0)
        weather_note(reader, SEVERITY_NOTE,
                     "one year of weather seldom holds the coldest and the hottest of ten.");
}

/* Sun of typical-year files is that of the hour before the clock time: at the full hour it is the
 * mean of the two beside it. */
static void centre_sun(struct weather *weather)
{
    int count = weather->years * CLIMATE_HOURS;
    float first = weather->hours[0].sun_w_m2;

    for (int i = 0; i < count; i++) {
        float next = i + 1 < count ? weather->hours[i + 1].sun_w_m2 : first;
        weather->hours[i].sun_w_m2 = between(weather->hours[i].sun_w_m2, next, 0.5f);
    }
}

static void finish(const struct weather_reader *reader, struct weather *weather)
{
    const unsigned char *bytes = (const unsigned char *)weather->hours;
    int count = weather->years * CLIMATE_HOURS;

    weather->mark = 14695981039346656037u; /* FNV-1a, 64 bit */
    for (size_t i = 0; i < (size_t)count * sizeof *weather->hours; i++)
        weather->mark = (weather->mark ^ bytes[i]) * 1099511628211u;
    weather->coldest_c = INFINITY;
    weather->hottest_c = -INFINITY;
    for (int i = 0; i < count; i++) {
        weather->coldest_c = fmin(weather->coldest_c, weather->hours[i].air_c);
        weather->hottest_c = fmax(weather->hottest_c, weather->hours[i].air_c);
    }
    weather->has_sun = weather->hourly && reader->columns[WEATHER_SUN].at >= 0;
    weather->has_wind = reader->columns[WEATHER_WIND].at >= 0;
    weather->has_damp =
        reader->columns[WEATHER_DAMP].at >= 0 || reader->columns[WEATHER_DEW].at >= 0;
    weather->has_cloud = reader->columns[WEATHER_CLOUD].at >= 0;
}

static struct weather *make_empty(const struct weather_reader *reader, int years)
{
    size_t hours = (size_t)years * CLIMATE_HOURS;
    struct weather *weather = calloc(1, sizeof *weather + hours * sizeof *weather->hours);

    if (weather == NULL)
        return NULL;
    weather->holders = 1;
    weather->years = years;
    weather->hourly = reader->hourly;
    weather->first_year = reader->rows[0].year;
    weather->latitude_deg = reader->latitude_deg;
    return weather;
}

static bool fill(struct weather_reader *reader, struct weather *weather, int *lines)
{
    struct series series = {.reader = reader,
                            .lines = lines,
                            .step_day = reader->hourly ? 24 : 1,
                            .years = weather->years};

    series.count = weather->years * CLIMATE_DAYS * series.step_day;
    if (!(reader->hourly ? fill_hourly : fill_daily)(weather, &series, lines))
        return false;
    if (reader->hourly && reader->has_station)
        centre_sun(weather);
    finish(reader, weather);
    say_assumed(reader, weather);
    return true;
}

struct weather *weather_assemble(struct weather_reader *reader)
{
    struct weather *weather;
    int years, *lines;

    sort(reader);
    check_repeats(reader);
    if (reader->errors > 0 || (years = count_years(reader)) == 0)
        return NULL;
    weather = make_empty(reader, years);
    lines = calloc((size_t)years * CLIMATE_HOURS, sizeof *lines);
    if (weather == NULL || lines == NULL) {
        reader->no_memory = true;
        free(weather);
        weather = NULL;
    } else if (!fill(reader, weather, lines)) {
        free(weather);
        weather = NULL;
    }
    free(lines);
    return weather;
}
