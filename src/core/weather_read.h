/* How a weather file is read, line by line. Private to src/core/weather*.c. */
#ifndef SLABGAP_CORE_WEATHER_READ_H
#define SLABGAP_CORE_WEATHER_READ_H

#include "core/weather.h"
#include <stdbool.h>

enum { CELLS_MOST = 200, CELL_MOST = 64, SAID_MOST = 20 };

enum weather_what {
    WEATHER_NOTHING,
    WEATHER_DATE,
    WEATHER_YEAR,
    WEATHER_MONTH,
    WEATHER_DAY,
    WEATHER_TIME,
    WEATHER_LOWEST,
    WEATHER_HIGHEST,
    WEATHER_AIR,
    WEATHER_SUN,
    WEATHER_WIND,
    WEATHER_DAMP,
    WEATHER_DEW,
    WEATHER_CLOUD,
    WEATHER_WHATS
};

struct weather_column {
    int at; /* -1: there is none */
    double scale, shift;
    bool month_first, day_first; /* 03/04/2027 as the header says */
    char name[CELL_MOST];
};
struct weather_cell {
    const char *start;
    size_t length;
};
/* One line of data. Values NAN where nothing stands. */
struct weather_row {
    short year, day; /* day of the year from 0 */
    signed char hour;
    int line;
    float low_c, high_c;
    struct weather_hour value;
};
struct weather_reader {
    const char *bytes;
    size_t count, at;
    int line;
    char separator;
    struct weather_cell cells[CELLS_MOST];
    int cell_count, header_cells;
    struct weather_column columns[WEATHER_WHATS];
    bool hourly, has_station; /* a line of the station stands above the header */
    double latitude_deg;
    struct finding_list *findings;
    int errors, spikes;
    struct weather_row *rows;
    size_t row_count, row_capacity;
    int leap_days, between_hours, decimal_commas, dry, filled;
    bool no_memory;
};

/* An error at the reader's line, or (line 0) of the whole file; at most 20 are said. */
__attribute__((format(printf, 3, 4))) void weather_complain(struct weather_reader *reader, int line,
                                                            const char *format, ...);
/* A note (or warning) about the whole file. */
__attribute__((format(printf, 3, 4))) void
weather_note(struct weather_reader *reader, enum severity severity, const char *format, ...);
/* The next line, parted into cells; false at the end. Blank lines and # lines are passed over. */
bool weather_next(struct weather_reader *reader);
/* A cell as a short printable text; "" when there is none. */
void weather_cell_text(const struct weather_reader *reader, int at, char out[CELL_MOST]);
/* A number; a comma is its point where commas do not part the cells. */
bool weather_number(struct weather_reader *reader, const char *cell, double *out);
/* 2027-04-12, 2027/04/12, 20270412, 12.04.2027, 04/12/2027 by the column; *rest: what follows. */
bool weather_date(const struct weather_column *column, const char *text, int *year, int *month,
                  int *day, const char **rest);
/* 13, 13:00, 13:00:00; 24 is the midnight that ends the day. */
bool weather_time(const char *text, int *hour, int *minute);
/* Finds the header; false after a complaint. */
bool weather_find_header(struct weather_reader *reader);
/* Makes the record of the rows; NULL after a complaint or without memory. */
struct weather *weather_assemble(struct weather_reader *reader);
/* Days before a date in its year, without 29 February. */
int weather_day_of_year(int month, int day);

#endif
