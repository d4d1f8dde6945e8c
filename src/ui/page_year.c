/* The year: the width of the joint that moves most, what its sealant stands, and any day by a mark.
 */
#include "export/year_text.h"
#include "ui/app_ask.h"
#include <stdlib.h>
#include <string.h>

/* Worked out when the page is looked at and the plan is new; NULL: there is none. */
void year_fill(struct app *app)
{
    if (app->year_done || app->working || !app->has_plan)
        return;
    app->year_done = true;
    free(app->year);
    app->year = malloc(sizeof *app->year);
    if (app->year == NULL || year_make(&app->plan, app->year) != STATUS_OK) {
        free(app->year);
        app->year = NULL;
        return;
    }
    app->year_day = app->year->widest;
}

void year_drop(struct app *app)
{
    free(app->year);
    app->year = NULL;
    app->year_done = false;
}

static int count(const struct app *app)
{
    (void)app;
    return 0;
}

static bool row(const struct app *app, int index, struct entry *out)
{
    (void)app;
    (void)index;
    (void)out;
    return false;
}

static void draw_lines(struct canvas *canvas, int at, const char *lines)
{
    while (*lines != '\0') {
        size_t length = strcspn(lines, "\n");
        char line[512];
        if (length >= sizeof line)
            return;
        memcpy(line, lines, length);
        line[length] = '\0';
        canvas_words(canvas, at++, 0, canvas->columns, STYLE_PLAIN, line);
        lines += length + (lines[length] != '\0');
    }
}

static void draw_year(const struct app *app, struct canvas *canvas)
{
    int rows = app->rows - (app_roomy(app) ? 8 : 6);
    struct text words = {0};

    year_sentence(&words, &app->plan, app->year);
    canvas_words(canvas, 1, 8, app->columns - 8, STYLE_BOLD, text_string(&words));
    text_clear(&words);
    year_chart(&words, &app->plan, app->year, app->columns - 1, rows, canvas->ascii, app->year_day);
    draw_lines(canvas, 2, text_string(&words));
    text_clear(&words);
    year_day_words(&words, &app->plan, &app->year->days[app->year_day]);
    canvas_words(canvas, rows + 2, 8, app->columns - 8, STYLE_PLAIN, text_string(&words));
    text_clear(&words);
    year_basis(&words, &app->plan, app->year);
    canvas_words(canvas, rows + 3, 8, app->columns - 8, STYLE_PLAIN, text_string(&words));
    text_free(&words);
}

static void draw(const struct app *app, struct canvas *canvas)
{
    draw_title(app, canvas, false);
    canvas_words(canvas, 1, 0, 8, STYLE_BOLD, "YEAR");
    if (app->year != NULL)
        draw_year(app, canvas);
    else
        canvas_words(canvas, 1, 8, app->columns - 8, STYLE_PLAIN,
                     "Indoors, or with no joint that moves, there is no year to show.");
    draw_foot(app, canvas,
              "==== what the sealant stands. Left and right move the mark # by five days.");
}

static bool key(struct app *app, uint32_t pressed)
{
    enum { STEP = 5 };

    if (app->year == NULL || (pressed != PRESS_LEFT && pressed != PRESS_RIGHT))
        return false;
    app->year_day =
        (app->year_day + (pressed == PRESS_LEFT ? CLIMATE_DAYS - STEP : STEP)) % CLIMATE_DAYS;
    return true;
}

const struct page page_year = {"year", count, row, draw, key};
