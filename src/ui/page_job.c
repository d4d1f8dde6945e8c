/* The job: sheet, plan and the six answers on one screen. */
#include "ui/app_ask.h"
#include <string.h>

enum { PLAN_COLUMN = 42, ROOMY_PLAN_COLUMN = 46, ANSWERS = 6 };

static int count(const struct app *app)
{
    (void)app;
    return sheet_count();
}

static bool row(const struct app *app, int index, struct entry *out)
{
    (void)app;
    if (index < 0 || index >= sheet_count())
        return false;
    sheet_row(index, out);
    return true;
}

static const char *heading(const char *group)
{
    static const struct {
        const char *group, *words;
    } table[] = {{"drawing", "FROM THE DRAWING"}, {"ticket", "FROM THE CONCRETE TICKET"},
                 {"weather", "FROM THE WEATHER"}, {"pour", "ON POUR DAY"},
                 {"sealing", "ON SEALING DAY"},   {"tin", "FROM THE TIN"}};

    for (size_t i = 0; i < sizeof table / sizeof *table; i++)
        if (strcmp(table[i].group, group) == 0)
            return table[i].words;
    return NULL;
}

static void draw_roomy_sheet(const struct app *app, struct canvas *canvas)
{
    const char *group = "";
    struct entry entry;
    int line = 1;

    for (int i = 0; i < sheet_count(); i++) {
        sheet_row(i, &entry);
        if (strcmp(entry.group, group) != 0 && heading(entry.group) != NULL)
            canvas_words(canvas, line++, 0, 40, STYLE_PLAIN, heading(entry.group));
        group = entry.group;
        draw_row(app, canvas, &entry, app->at[PAGE_JOB] == i,
                 (struct row_place){line++, 2, 17, 17, 8});
    }
}

/* The small sheet, scrolled when the screen is lower than 24 rows. */
static void draw_small_sheet(const struct app *app, struct canvas *canvas, int rows)
{
    const char *group = "";
    struct entry entry;
    int place = 0, hand = 0, first, all = 0;

    for (int i = 0; i < sheet_count(); i++) {
        sheet_row(i, &entry);
        if (entry.roomy_only)
            continue;
        hand = i == app->at[PAGE_JOB] ? all : hand;
        all++;
    }
    first = draw_scroll(all, rows, hand);
    for (int i = 0; i < sheet_count(); i++) {
        sheet_row(i, &entry);
        if (entry.roomy_only)
            continue;
        if (place >= first && place < first + rows) {
            int line = 1 + place - first;
            if (strcmp(entry.group, group) != 0 && entry.kind != ROW_REST)
                canvas_words(canvas, line, 0, 8, STYLE_PLAIN, entry.group);
            group = entry.group;
            draw_row(app, canvas, &entry, app->at[PAGE_JOB] == i,
                     (struct row_place){line, 9, 13, 14, 5});
        }
        place++;
    }
}

static const char *usual_help(const struct app *app, struct text *words)
{
    struct entry entry;

    if (app->example && app->history.now == 0 && app->open == OPEN_NOT)
        text_add(words, "EXAMPLE, not your slab:  n my own slab  o open a job  b only metres  "
                        "s seal now?");
    else if (app->at[PAGE_JOB] < 0)
        text_add(words, "Title: Enter opens it. Practice and units: more.");
    else if (row(app, app->at[PAGE_JOB], &entry))
        row_help(app, &entry, words);
    return text_string(words);
}

static void draw(const struct app *app, struct canvas *canvas)
{
    bool roomy = app_roomy(app);
    int sheet, answers = ANSWERS, column = roomy ? ROOMY_PLAN_COLUMN : PLAN_COLUMN;
    struct text words = {0};

    draw_title(app, canvas, app->at[PAGE_JOB] < 0);
    if (roomy) {
        answers = app->rows - 32; /* the sheet needs 26 rows */
        answers = answers > 11 ? 11 : answers;
        sheet = app->rows - 6 - answers;
        draw_roomy_sheet(app, canvas);
        canvas_rule(canvas, app->rows - 4);
    } else {
        sheet = app->rows - 3 - answers - 1;
        draw_small_sheet(app, canvas, sheet);
    }
    if (app->columns - column >= 24)
        draw_plan(app, canvas, 1, column, sheet, app->columns - column + 1, false);
    canvas_rule(canvas, sheet + 1);
    draw_answers(app, canvas, sheet + 2, 0, ANSWERS - 1, answers);
    draw_foot(app, canvas, usual_help(app, &words));
    text_free(&words);
}

static bool key(struct app *app, uint32_t pressed)
{
    (void)app;
    (void)pressed;
    return false;
}

const struct page page_job = {"job", count, row, draw, key};
