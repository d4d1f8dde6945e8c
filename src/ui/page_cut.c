/* The page cut: the night of sawing as a bar and an order of lines, or what it hangs on (key v). */
#include "export/names.h"
#include "export/saw_text.h"
#include "ui/app_ask.h"
#include <math.h>
#include <stdio.h>
#include <string.h>

static const enum field_id fields[] = {
    FIELD_pour_date,    FIELD_pour_start,    FIELD_pour_rate,    FIELD_pour_truck,
    FIELD_sawing_saws,  FIELD_sawing_pace,   FIELD_sawing_kind,  FIELD_sawing_trials,
    FIELD_pour_air_low, FIELD_pour_air_high, FIELD_pour_wind,    FIELD_pour_cloud,
    FIELD_pour_cover,   FIELD_sawing_sunset, FIELD_sawing_depth, FIELD_sawing_ravel_strength};
enum { FIELDS = sizeof fields / sizeof *fields };

/* ---- the night's spread: worked out when the page is looked at and the plan is new ---- */

void cut_fill(struct app *app)
{
    if (app->band_done || app->working || !app->has_plan)
        return;
    app->band_done = true;
    app->has_band = saw_band_make(&app->plan, NULL, &app->band) == STATUS_OK;
}

void cut_drop(struct app *app)
{
    app->band_done = app->has_band = false;
}

/* ---- rows ---- */

static bool shows_night(const struct app *app)
{
    return app->has_plan && saw_there(&app->plan) && !app->cut_fields;
}

static int count(const struct app *app)
{
    return shows_night(app) ? (int)app->plan.saw.cut_count : FIELDS;
}

static bool row(const struct app *app, int index, struct entry *out)
{
    return !shows_night(app) && page_row_of(fields, FIELDS, index, out);
}

/* ---- the night ---- */

static void draw_lines(struct canvas *canvas, int top, const char *lines)
{
    while (*lines != '\0') {
        const size_t length = strcspn(lines, "\n");
        char line[4 * CANVAS_MOST];
        snprintf(line, sizeof line, "%.*s", (int)length, lines);
        canvas_words(canvas, top++, 0, canvas->columns, STYLE_PLAIN, line);
        lines += length + (lines[length] != '\0');
    }
}

static void draw_trial(const struct app *app, struct canvas *canvas, int top)
{
    struct text words = {0};

    text_format(&words, "Trial cuts from %s", app->plan.saw.first_trial);
    if (app->has_band)
        saw_band_words(&words, app->band.earliest_from_h, app->band.earliest_to_h);
    text_add(&words, ", every 20 minutes, in the first concrete. Edge stays sharp: start. Edge "
                     "crumbles: wait 20 minutes.");
    canvas_wrap(canvas, top, 8, app->columns - 8, 2, STYLE_PLAIN, text_string(&words));
    text_free(&words);
}

enum { CELL = 40 }; /* columns of one line of the order */

static void draw_cut(const struct app *app, struct canvas *canvas, int line, int column,
                     const struct plan_cut *cut, bool in_hand)
{
    char name[24], spare[16];

    saw_cut_name(&app->plan, cut, name, sizeof name);
    saw_spare_words(cut, spare);
    canvas_format(canvas, line, column, CELL - 1, cut->late ? STYLE_BOLD : STYLE_PLAIN,
                  "%c%2d %-9.9s %5.4g %5.5s %5.5s %s", in_hand ? '>' : ' ', cut->order, name,
                  app_units(app) == UNITS_US ? cut->length_m / 0.3048 : cut->length_m, cut->start,
                  cut->not_after, spare);
}

/* The order in columns, a window of it around the line in hand. */
static void draw_order(const struct app *app, struct canvas *canvas, int top, int rows)
{
    const int columns = app->columns / CELL, total = (int)app->plan.saw.cut_count;
    const int window = rows * columns, at = app->at[PAGE_CUT];
    const int page = window > 0 ? at / window : 0;
    const char *unit = app_units(app) == UNITS_US ? "ft" : "m";

    for (int c = 0; c < columns; c++)
        canvas_format(canvas, top, c * CELL, CELL - 1, STYLE_BOLD,
                      "no. line      %5s start    by spare", unit);
    for (int i = 0; i < window && page * window + i < total; i++) {
        const int index = page * window + i;
        draw_cut(app, canvas, top + 1 + i % rows, i / rows * CELL, &app->plan.saw.cuts[index],
                 index == at);
    }
    if (total > window)
        canvas_format(canvas, top - 1, app->columns - 12, 12, STYLE_BOLD, " %d of %d ", at + 1,
                      total);
}

static void draw_night(const struct app *app, struct canvas *canvas)
{
    const int foot = app->rows - (app_roomy(app) ? 7 : 5);
    struct text words = {0};

    draw_trial(app, canvas, 2);
    canvas_rule(canvas, 4);
    saw_bar(&words, &app->plan, app->has_band ? &app->band : NULL, app->columns);
    draw_lines(canvas, 5, text_string(&words));
    canvas_rule(canvas, 11);
    if (foot - 13 > 0)
        draw_order(app, canvas, 12, foot - 13);
    text_clear(&words);
    saw_trouble(&words, &app->plan);
    canvas_words(canvas, foot, 8, app->columns - 8, STYLE_BOLD, text_string(&words));
    text_free(&words);
}

/* ---- the inputs, and lines without clock times ---- */

static void draw_inputs(const struct app *app, struct canvas *canvas)
{
    canvas_words(canvas, 2, 8, app->columns - 8, STYLE_PLAIN,
                 app->has_plan && saw_there(&app->plan)
                     ? "What the night hangs on. v: back to the night."
                     : "Date, start and rate of the pour give clock times. Trial cuts decide.");
    canvas_rule(canvas, 3);
    page_draw_rows(app, canvas, 4, 22, 22);
}

static void draw(const struct app *app, struct canvas *canvas)
{
    const int foot = app->rows - (app_roomy(app) ? 7 : 5);
    struct text words = {0};

    draw_title(app, canvas, false);
    draw_answers(app, canvas, 1, 1, 1, 1);
    if (shows_night(app))
        draw_night(app, canvas);
    else
        draw_inputs(app, canvas);
    if (shows_night(app) || app_roomy(app)) {
        canvas_words(
            canvas, foot + 1, 0, app->columns, STYLE_PLAIN,
            "LATE    the line nearest the middle first, then halve. Never beside a crack.");
        canvas_words(
            canvas, foot + 2, 0, app->columns, STYLE_PLAIN,
            "SAFE    water or extraction (silica), ears, eyes; lamps; slurry out of drains.");
        canvas_mark(canvas, foot + 1, 0, 5, STYLE_BOLD);
        canvas_mark(canvas, foot + 2, 0, 5, STYLE_BOLD);
    }
    draw_foot(app, canvas,
              shows_night(app) ? "v: weather, mix, saws, trial cuts. A forecast: trial cuts decide."
                               : page_help_words(app, &words));
    text_free(&words);
}

static bool key(struct app *app, uint32_t pressed)
{
    if (pressed != 'v')
        return false;
    app->cut_fields = !app->cut_fields;
    app->at[PAGE_CUT] = 0;
    return true;
}

const struct page page_cut = {"cut", count, row, draw, key};
