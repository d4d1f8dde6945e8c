/* More: files, units, help, cautions, leaving. */
#include "ui/app_ask.h"
#include <string.h>

enum {
    MORE_SAVE,
    MORE_SAVE_AS,
    MORE_OPEN,
    MORE_NEW,
    MORE_YEAR,
    MORE_PRACTICE,
    MORE_UNITS,
    MORE_REST,
    MORE_HELP,
    MORE_CAUTIONS,
    MORE_LEAVE,
    MORE_COUNT
};
static const struct {
    const char *word, *help;
} items[MORE_COUNT] = {
    {"Save", "Writes the job to its file."},
    {"Save as", "Writes it to another file; .slab is added when no suffix is typed."},
    {"Open a job", "Any file that begins with format = 1."},
    {"My own slab", "A new slab by a few questions; nothing of this one is kept."},
    {"The year", "The joint's width and strain through the year (y)."},
    {"Practice", "Whose usual values stand where you typed none."},
    {"Units", "How numbers are shown. Both systems can always be typed."},
    {"The rest", "Every row that can be typed."},
    {"Keys", "What every key does."},
    {"Cautions", "What this program cannot know."},
    {"Leave", "Ends the program."},
};

static int count(const struct app *app)
{
    (void)app;
    return MORE_COUNT;
}

static bool row(const struct app *app, int index, struct entry *out)
{
    (void)app;
    if (index != MORE_PRACTICE && index != MORE_UNITS)
        return false;
    row_of_field(index == MORE_UNITS ? FIELD_job_units : FIELD_job_practice, out);
    return true;
}

static void draw(const struct app *app, struct canvas *canvas)
{
    struct entry entry;

    draw_title(app, canvas, false);
    canvas_words(canvas, 1, 0, 8, STYLE_BOLD, "MORE");
    canvas_words(canvas, 1, 8, app->columns - 8, STYLE_PLAIN,
                 app->path[0] != '\0' ? app->path : "This job has no file yet.");
    for (int i = 0; i < MORE_COUNT; i++) {
        bool hand = app->at[PAGE_MORE] == i;
        if (row(app, i, &entry)) {
            draw_row(app, canvas, &entry, hand, (struct row_place){3 + i, 3, 16, 16, 8});
            continue;
        }
        canvas_put(canvas, 3 + i, 2, hand ? '>' : ' ', STYLE_BOLD);
        canvas_words(canvas, 3 + i, 3, 40, STYLE_PLAIN, items[i].word);
        if (hand)
            canvas_mark(canvas, 3 + i, 3, 40, STYLE_REVERSE);
    }
    draw_foot(app, canvas, items[app->at[PAGE_MORE]].help);
}

static void leave(struct app *app)
{
    if (edit_unsaved(app))
        app_ask(app, ASK_LEAVE, "");
    else
        app->request.kind = REQUEST_LEAVE;
}

static bool enter(struct app *app)
{
    switch (app->at[PAGE_MORE]) {
    case MORE_SAVE:
        if (app->path[0] != '\0')
            ask_save(app, app->path, true, false);
        else
            app_ask(app, ASK_SAVE, "");
        return true;
    case MORE_SAVE_AS:
        app_ask(app, ASK_SAVE, app->path);
        return true;
    case MORE_OPEN:
        app_ask(app, edit_unsaved(app) ? ASK_DISCARD : ASK_OPEN, "");
        return true;
    case MORE_NEW:
        app_start_own(app);
        return true;
    case MORE_YEAR:
        app_go(app, PAGE_YEAR);
        return true;
    case MORE_REST:
        app_go(app, PAGE_REST);
        app->at[PAGE_REST] = app->at[PAGE_REST] > 0 ? app->at[PAGE_REST] : 1;
        return true;
    case MORE_HELP:
        app_go(app, PAGE_HELP);
        return true;
    case MORE_CAUTIONS:
        app_go(app, PAGE_CAUTIONS);
        return true;
    case MORE_LEAVE:
        leave(app);
        return true;
    default:
        return false;
    }
}

static bool key(struct app *app, uint32_t pressed)
{
    if (pressed == PRESS_BACK) {
        app_go(app, PAGE_JOB);
        return true;
    }
    return pressed == PRESS_ENTER && enter(app);
}

const struct page page_more = {"more", count, row, draw, key};

/* ---- help and cautions: only to read ---- */

static int none(const struct app *app)
{
    (void)app;
    return 0;
}

static bool no_row(const struct app *app, int index, struct entry *out)
{
    (void)app;
    (void)index;
    (void)out;
    return false;
}

static bool no_key(struct app *app, uint32_t pressed)
{
    (void)app;
    (void)pressed;
    return false;
}

/* One key a line; up and down scroll where they do not all fit. */
static int help_window(const struct app *app)
{
    return app->rows - (app_roomy(app) ? 6 : 5);
}

static void help_draw(const struct app *app, struct canvas *canvas)
{
    int window = help_window(app), first = app->at[PAGE_HELP];

    draw_title(app, canvas, false);
    canvas_words(canvas, 1, 0, app->columns, STYLE_BOLD,
                 "KEYS    nothing needs Shift, Ctrl or Alt");
    for (int i = 0; i < window && first + i < (int)key_count; i++) {
        const struct key_row *row = &key_table[first + i];
        canvas_words(canvas, 2 + i, 0, 9, STYLE_BOLD, row->name);
        canvas_words(canvas, 2 + i, 9, app->columns - 10, STYLE_PLAIN, row->help);
    }
    draw_foot(app, canvas, "Up and down show the others. Esc goes back.");
}

static bool help_key(struct app *app, uint32_t pressed)
{
    int most = (int)key_count - help_window(app);

    if (pressed != PRESS_UP && pressed != PRESS_DOWN)
        return false;
    app->at[PAGE_HELP] += pressed == PRESS_UP ? -1 : 1;
    if (app->at[PAGE_HELP] > most)
        app->at[PAGE_HELP] = most;
    if (app->at[PAGE_HELP] < 0)
        app->at[PAGE_HELP] = 0;
    return true;
}

static void cautions_draw(const struct app *app, struct canvas *canvas)
{
    static const char *const words[] = {
        "A planning aid. Local code, the contract and a licensed engineer decide.",
        "Predictions aid judgement: the trial cut, the thermometer and the rule decide on site.",
        "What you measure beats what is worked out here; what the tin says beats the table.",
        "Not every cut cracks at once: look after the first cold spell, count the open ones.",
        "Silica: cut wet or with extraction. Ears, eyes, feet. Slurry out of the drain.",
        "Hot-pour burns; no water in the kettle. Solvents and isocyanates: read the sheet.",
        "Traffic and edges: guard open slots from heels, bicycles and pallet trucks."};
    int line = 3;

    draw_title(app, canvas, false);
    canvas_words(canvas, 1, 0, app->columns, STYLE_BOLD, "CAUTIONS");
    for (size_t i = 0; i < sizeof words / sizeof *words && line < app->rows - 3; i++)
        line += canvas_wrap(canvas, line, 2, app->columns - 3, 2, STYLE_PLAIN, words[i]);
    draw_foot(app, canvas, "Esc goes back.");
}

const struct page page_help = {"keys", none, no_row, help_draw, help_key};
const struct page page_cautions = {"cautions", none, no_row, cautions_draw, no_key};
