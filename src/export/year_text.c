#include "export/year_text.h"
#include "export/climate_text.h"
#include "export/wrap.h"
#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

enum { AXIS_COLUMNS = 10 };

static enum unit_system units_of(const struct plan *plan)
{
    return (enum unit_system)plan->job.job_units;
}

static void add_date(struct text *out, int day_of_year)
{
    int day;
    const char *month = year_month_word(day_of_year, &day);

    text_format(out, "%d %s", day, month);
}

static void add_width(struct text *out, const struct plan *plan, double metres)
{
    if (units_of(plan) == UNITS_US)
        text_format(out, "%.2f in", metres / 0.0254);
    else
        text_format(out, "%.1f mm", metres * 1000);
}

void year_sentence(struct text *out, const struct plan *plan, const struct year *year)
{
    const struct year_day *wide = &year->days[year->widest], *narrow = &year->days[year->narrowest];

    text_add(out, "Widest about ");
    add_date(out, wide->day_of_year);
    text_add(out, ", ");
    add_width(out, plan, wide->gap_high_m);
    text_add(out, "; narrowest about ");
    add_date(out, narrow->day_of_year);
    text_add(out, ", ");
    add_width(out, plan, narrow->gap_low_m);
    text_add(out, ".");
}

/* The same without its unit: "-8 to -0.9 degC". */
static void add_range(struct text *out, const struct plan *plan, double low_c, double high_c)
{
    bool us = units_of(plan) == UNITS_US;

    unit_add_number(out, us ? low_c * 1.8 + 32 : low_c, 1);
    text_add(out, " to ");
    unit_show(out, high_c, QUANTITY_TEMPERATURE, units_of(plan));
}

void year_day_words(struct text *out, const struct plan *plan, const struct year_day *day)
{
    add_date(out, day->day_of_year);
    text_add(out, ": slab ");
    add_range(out, plan, day->slab_low_c, day->slab_high_c);
    text_add(out, ", joint ");
    add_width(out, plan, day->gap_low_m);
    text_add(out, " to ");
    add_width(out, plan, day->gap_high_m);
    if (day->extension >= day->compression)
        text_format(out, ", +%.1f %%", 100 * day->extension);
    else
        text_format(out, ", -%.1f %%", 100 * day->compression);
}

void year_basis(struct text *out, const struct plan *plan, const struct year *year)
{
    text_add(out, "Simulated from ");
    climate_words(out, &plan->job);
    text_add(out, year->scaled ? ", stretched to the slab temperatures you typed." : ".");
}

/* ---- the chart ---- */

struct chart {
    int columns, rows; /* of the field itself */
    double low_m, high_m;
    char *cells;
};

static int row_of(const struct chart *chart, double width_m)
{
    double share = (chart->high_m - width_m) / (chart->high_m - chart->low_m);

    return (int)lround(fmin(fmax(share, 0), 1) * (chart->rows - 1));
}

/* The limits of what the sealant stands; NAN without a class. */
static double limit(const struct plan *plan, bool wide)
{
    double width = plan->seal.width_m;

    if (!plan->seal.sealed)
        return NAN;
    return wide ? width * (1 + plan->seal.extension_capacity)
                : width * (1 - plan->seal.compression_capacity);
}

static void set_range(struct chart *chart, const struct plan *plan, const struct year *year)
{
    double wide = limit(plan, true), narrow = limit(plan, false);

    chart->high_m = year->days[year->widest].gap_high_m;
    chart->low_m = year->days[year->narrowest].gap_low_m;
    if (isfinite(
            wide)) { /* a wide band (100 %) would press the curve flat: at most three times it */
        double room = 2 * (chart->high_m - chart->low_m) + 1e-4;
        chart->high_m = fmax(chart->high_m, fmin(wide, chart->high_m + room));
        chart->low_m = fmin(chart->low_m, fmax(narrow, chart->low_m - room));
    }
    if (chart->high_m - chart->low_m < 1e-4) {
        chart->high_m += 1e-4;
        chart->low_m -= 1e-4;
    }
}

static char *cell(struct chart *chart, int row, int column)
{
    return &chart->cells[row * chart->columns + column];
}

static void draw_band(struct chart *chart, double width_m)
{
    if (!isfinite(width_m) || width_m > chart->high_m + 1e-9 || width_m < chart->low_m - 1e-9)
        return;
    for (int c = 0; c < chart->columns; c++)
        *cell(chart, row_of(chart, width_m), c) = '=';
}

static void draw_curve(struct chart *chart, const struct year *year, int mark)
{
    for (int c = 0; c < chart->columns; c++) {
        int from = c * CLIMATE_DAYS / chart->columns;
        int to = (c + 1) * CLIMATE_DAYS / chart->columns;
        double high = -INFINITY, low = INFINITY;
        for (int d = from; d < to || d == from; d++) {
            high = fmax(high, year->days[d].gap_high_m);
            low = fmin(low, year->days[d].gap_low_m);
        }
        for (int r = row_of(chart, high); r <= row_of(chart, low); r++)
            *cell(chart, r, c) = mark >= from && mark < to ? '#' : '.';
    }
}

static void print_field(struct text *out, const struct plan *plan, const struct chart *chart,
                        bool ascii)
{
    for (int r = 0; r < chart->rows; r++) {
        struct text label = {0};
        double width = chart->high_m - (chart->high_m - chart->low_m) * r / (chart->rows - 1);
        int used = chart->columns;
        if (r % 3 == 0 || r == chart->rows - 1)
            add_width(&label, plan, width);
        text_format(out, "%*s  ", AXIS_COLUMNS - 2, text_string(&label));
        text_free(&label);
        while (used > 0 && chart->cells[r * chart->columns + used - 1] == ' ')
            used--;
        for (int c = 0; c < used; c++) {
            char code = chart->cells[r * chart->columns + c];
            if (code == '.' && !ascii)
                text_add(out, "·");
            else
                text_add_char(out, code, 1);
        }
        text_add_char(out, '\n', 1);
    }
}

/* "Jan" where the first of a month stands, as far as they fit. */
static void print_months(struct text *out, const struct chart *chart, const struct year *year)
{
    int column = 0;

    text_add_char(out, ' ', AXIS_COLUMNS);
    for (int d = 0; d < CLIMATE_DAYS; d++) {
        int day, at = d * chart->columns / CLIMATE_DAYS;
        const char *month = year_month_word(year->days[d].day_of_year, &day);
        if (day != 1 || at < column || at + 3 > chart->columns)
            continue;
        text_add_char(out, ' ', (size_t)(at - column));
        text_format(out, "%.3s ", month);
        column = at + 4;
    }
    text_add_char(out, '\n', 1);
}

void year_chart(struct text *out, const struct plan *plan, const struct year *year, int columns,
                int rows, bool ascii, int mark)
{
    struct chart chart = {.columns = columns - AXIS_COLUMNS, .rows = rows - 1};

    if (chart.columns < 12 || chart.rows < 4)
        return;
    chart.cells = malloc((size_t)(chart.columns * chart.rows));
    if (chart.cells == NULL) {
        out->failed = true;
        return;
    }
    memset(chart.cells, ' ', (size_t)(chart.columns * chart.rows));
    set_range(&chart, plan, year);
    draw_band(&chart, limit(plan, true));
    draw_band(&chart, limit(plan, false));
    draw_curve(&chart, year, mark);
    print_field(out, plan, &chart, ascii);
    print_months(out, &chart, year);
    free(chart.cells);
}

/* ---- the command ---- */

static void add_month(struct text *out, const struct plan *plan, const struct year *year, int first,
                      int last)
{
    struct year_day whole = year->days[first];
    struct text low = {0}, high = {0};
    int day;

    for (int d = first + 1; d <= last; d++) {
        const struct year_day *next = &year->days[d];
        whole.slab_low_c = fmin(whole.slab_low_c, next->slab_low_c);
        whole.slab_high_c = fmax(whole.slab_high_c, next->slab_high_c);
        whole.gap_low_m = fmin(whole.gap_low_m, next->gap_low_m);
        whole.gap_high_m = fmax(whole.gap_high_m, next->gap_high_m);
        whole.extension = fmax(whole.extension, next->extension);
        whole.compression = fmax(whole.compression, next->compression);
    }
    unit_show(&low, whole.slab_low_c, QUANTITY_TEMPERATURE, units_of(plan));
    unit_show(&high, whole.slab_high_c, QUANTITY_TEMPERATURE, units_of(plan));
    text_format(out, "  %-10s%9s%9s  ", year_month_word(whole.day_of_year, &day), text_string(&low),
                text_string(&high));
    text_clear(&low);
    text_clear(&high);
    add_width(&low, plan, whole.gap_low_m);
    add_width(&high, plan, whole.gap_high_m);
    text_format(out, "%9s%9s%9.1f %%%7.1f %%\n", text_string(&low), text_string(&high),
                100 * whole.extension, 100 * whole.compression);
    text_free(&low);
    text_free(&high);
}

static void add_months(struct text *out, const struct plan *plan, const struct year *year)
{
    int first = 0;

    text_add(out, "  month         slab from   to       width from   to   stretch  squeeze\n");
    for (int d = 1; d <= CLIMATE_DAYS; d++) {
        int a, b = 1;
        const char *here = year_month_word(year->days[d - 1].day_of_year, &a);
        const char *next = d < CLIMATE_DAYS ? year_month_word(year->days[d].day_of_year, &b) : NULL;
        if (next != NULL && strcmp(here, next) == 0)
            continue;
        add_month(out, plan, year, first, d - 1);
        first = d;
    }
}

static void add_basis(struct text *out, const struct plan *plan, const struct year *year)
{
    struct text words = {0};

    year_basis(&words, plan, year);
    wrap_add(out, "  ", 2, text_string(&words), 78);
    out->failed = out->failed || words.failed;
    text_free(&words);
    if (year->drying_known)
        text_add(out, "  The first year from sealing, drying by its model.\n");
    else
        text_add(out,
                 "  Narrowest without any drying, widest with all of it: no dates or no model.\n");
}

void year_report(struct text *out, const struct plan *plan, const struct year *year)
{
    year_sentence(out, plan, year);
    text_add(out, "\n\n");
    year_chart(out, plan, year, 78, 16, false, -1);
    text_add(out, "\n");
    add_months(out, plan, year);
    text_format(
        out,
        "\n  Strain cycles in the year (from temperature): %.0f up to 2 %%, %.0f up to 5 %%, "
        "%.0f up\n  to 10 %%, %.0f above (ASTM E1049 rainflow).\n",
        year->cycles[0], year->cycles[1], year->cycles[2], year->cycles[3]);
    add_basis(out, plan, year);
}

void year_csv(struct text *out, const struct year *year)
{
    text_add(out, "day_of_year,month,day,slab_low_c,slab_high_c,gap_low_m,gap_high_m,extension,"
                  "compression\r\n");
    for (int d = 0; d < CLIMATE_DAYS; d++) {
        const struct year_day *day = &year->days[d];
        int of_month;
        const char *month = year_month_word(day->day_of_year, &of_month);
        text_format(out, "%d,%s,%d,%.3f,%.3f,%.7f,%.7f,%.5f,%.5f\r\n", day->day_of_year + 1, month,
                    of_month, day->slab_low_c, day->slab_high_c, day->gap_low_m, day->gap_high_m,
                    day->extension, day->compression);
    }
}
