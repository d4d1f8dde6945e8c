/* Keys to what they do: a question first, then an opened row, then the page, then everywhere. */
#include "ui/app_ask.h"
#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

const struct page *page_of(enum page_id id)
{
    static const struct page *const pages[PAGE_COUNT] = {
        &page_job,  &page_plan, &page_cut,   &page_seal, &page_buy,  &page_why,     &page_year,
        &page_more, &page_rest, &page_sides, &page_own,  &page_help, &page_cautions};

    return pages[id];
}

struct app *app_make(struct date today)
{
    struct app *app = calloc(1, sizeof *app);

    if (app == NULL)
        return NULL;
    app->today = today;
    app->columns = 80;
    app->rows = 24;
    app->zoom = 1;
    app->history.saved = (size_t)-1;
    job_init(&app->job);
    if (document_new(&app->document) != STATUS_OK) {
        app_free(app);
        return NULL;
    }
    return app;
}

void app_free(struct app *app)
{
    if (app == NULL)
        return;
    document_free(app->document);
    job_free(&app->job);
    plan_free(&app->plan);
    plan_cache_free(&app->cache);
    finding_free(&app->findings);
    history_free(&app->history);
    year_drop(app);
    cut_drop(app);
    weather_drop(app);
    free(app);
}

enum status app_load(struct app *app, const char *bytes, size_t count, const char *path,
                     bool example)
{
    weather_drop(app); /* it may have changed on the disk */
    if (!edit_replace(app, bytes, count, path != NULL ? path : "", example, "opened"))
        return STATUS_NO_MEMORY;
    app->history.saved = path != NULL ? app->history.now : (size_t)-1;
    app->asked_example = false;
    app_go(app, PAGE_JOB);
    app->at[PAGE_JOB] = 2;
    app->cross_x = app->cross_y = 0;
    return app->stale ? STATUS_REFUSED : STATUS_OK;
}

void app_resize(struct app *app, int columns, int rows)
{
    struct entry row;

    app->columns = columns;
    app->rows = rows;
    if (app->at[PAGE_JOB] < 0 || app_roomy(app))
        return;
    sheet_row(app->at[PAGE_JOB], &row);
    if (row.roomy_only)
        app->at[PAGE_JOB]--;
}

bool app_roomy(const struct app *app)
{
    return app->columns >= 110 && app->rows >= 38;
}

enum unit_system app_units(const struct app *app)
{
    return (enum unit_system)app->job.job_units;
}

void app_tell(struct app *app, const char *format, ...)
{
    va_list arguments;

    va_start(arguments, format);
    vsnprintf(app->said, sizeof app->said, format, arguments);
    va_end(arguments);
}

void app_say(struct app *app, const char *sentence)
{
    app_tell(app, "%s", sentence);
}

bool app_take_request(struct app *app, struct request *request)
{
    if (app->request.kind == REQUEST_NONE)
        return false;
    *request = app->request;
    app->request = (struct request){0};
    return true;
}

void app_write(const struct app *app, struct text *out)
{
    document_write(app->document, out);
}

void app_saved(struct app *app, const char *path, const char *clock)
{
    snprintf(app->path, sizeof app->path, "%s", path);
    snprintf(app->saved, sizeof app->saved, "%s", clock);
    app->history.saved = app->history.now;
    app_tell(app, "Saved as %s.", path);
}

bool app_takes_text(const struct app *app)
{
    return app->open != OPEN_NOT || app->ask != ASK_NONE || app->page == PAGE_OWN;
}

/* ---- going about ---- */

void app_go(struct app *app, enum page_id page)
{
    if (app->page != page)
        app->before = app->page;
    app->page = page;
    app->open = OPEN_NOT;
    app->show_change = false;
    app->trouble[0] = '\0';
    if (page == PAGE_PLAN && app->cross_x == 0 && app->cross_y == 0)
        app->cross_x = app->cross_y = app_units(app) == UNITS_US ? 4 * 0.3048 : 1;
}

/* The page and row where a field is filled in. */
void app_goto_field(struct app *app, const char *path)
{
    struct entry row;

    for (int i = 0; i < sheet_count(); i++) {
        sheet_row(i, &row);
        if (strcmp(row.path, path) == 0 && (!row.roomy_only || app_roomy(app))) {
            app_go(app, PAGE_JOB);
            app->at[PAGE_JOB] = i;
            return;
        }
    }
    for (int i = 0; i < page_rest.count(app); i++)
        if (page_rest.row(app, i, &row) && strcmp(row.path, path) == 0) {
            app_go(app, PAGE_REST);
            app->at[PAGE_REST] = i;
            return;
        }
    app_tell(app, "No row stands behind this line.");
}

static bool can_stand(const struct app *app, int index)
{
    struct entry row;

    if (!page_of(app->page)->row(app, index, &row))
        return true;
    return row.kind != ROW_HEADING && (app->page != PAGE_JOB || !row.roomy_only || app_roomy(app));
}

void app_move(struct app *app, int step)
{
    int least = app->page == PAGE_JOB ? -1 : 0, count = page_of(app->page)->count(app);
    int at = app->at[app->page] + step;

    while (at >= 0 && at < count && !can_stand(app, at))
        at += step < 0 ? -1 : 1;
    if (at >= least && at < count)
        app->at[app->page] = at;
}

static bool row_in_hand(const struct app *app, struct entry *row)
{
    int at = app->at[app->page];

    if (app->page == PAGE_JOB && at < 0) {
        row_of_field(FIELD_job_title, row);
        return true;
    }
    return at < page_of(app->page)->count(app) && page_of(app->page)->row(app, at, row) &&
           row->kind != ROW_HEADING;
}

static void next_page(struct app *app, int step)
{
    int page = app->page <= PAGE_MORE ? (int)app->page : (int)PAGE_JOB;

    app_go(app, (enum page_id)((page + step + PAGE_MORE + 1) % (PAGE_MORE + 1)));
}

/* ---- everywhere ---- */

void app_start_own(struct app *app)
{
    app->own = (struct own){.shape = OWN_RECTANGLE,
                            .practice = app->example ? PRACTICE_PLAIN : app->job.job_practice};
    app_go(app, PAGE_OWN);
}

void app_start_new(struct app *app, const char *path)
{
    snprintf(app->new_path, sizeof app->new_path, "%s", path);
    app_start_own(app);
    app_tell(app, "%s is not there yet: these questions begin it.", path);
}

static void go_back(struct app *app)
{
    enum page_id before = app->before;

    if (app->page == PAGE_JOB) {
        app_go(app, PAGE_MORE);
        return;
    }
    app_go(app, app->page == PAGE_WHY && before == PAGE_REST           ? PAGE_REST
                : app->page == PAGE_HELP || app->page == PAGE_CAUTIONS ? PAGE_MORE
                                                                       : PAGE_JOB);
}

static void enter(struct app *app)
{
    struct entry row;

    if (row_in_hand(app, &row) && !row_has_own_page(app, &row))
        app_open_row(app, &row, 0);
}

static void go_why(struct app *app)
{
    struct entry row;

    app->why_path[0] = '\0';
    if ((app->page == PAGE_JOB || app->page == PAGE_REST) && row_in_hand(app, &row))
        snprintf(app->why_path, sizeof app->why_path, "%s", row.path);
    app->why_question =
        strncmp(app->why_path, "rules.", 6) == 0 || strncmp(app->why_path, "slab.", 5) == 0 ? 1 : 0;
    app_go(app, PAGE_WHY);
    app->at[PAGE_WHY] = 0;
}

static bool act_page(struct app *app, enum action action)
{
    switch (action) {
    case ACTION_JOB:
        app_go(app, PAGE_JOB);
        return true;
    case ACTION_PLAN:
        app_go(app, PAGE_PLAN);
        return true;
    case ACTION_CUT:
        app_go(app, PAGE_CUT);
        return true;
    case ACTION_SEAL:
        app_go(app, PAGE_SEAL);
        return true;
    case ACTION_BUY:
        app_go(app, PAGE_BUY);
        return true;
    case ACTION_WHY:
        go_why(app);
        return true;
    case ACTION_YEAR:
        app_go(app, PAGE_YEAR);
        return true;
    case ACTION_MORE:
        app_go(app, PAGE_MORE);
        return true;
    case ACTION_HELP:
        app_go(app, PAGE_HELP);
        return true;
    case ACTION_NEXT_PAGE:
    case ACTION_PAGE_BEFORE:
        next_page(app, action == ACTION_NEXT_PAGE ? 1 : -1);
        return true;
    default:
        return false;
    }
}

static void act(struct app *app, enum action action)
{
    if (act_page(app, action))
        return;
    switch (action) {
    case ACTION_UNDO:
        edit_undo(app, -1);
        break;
    case ACTION_REDO:
        edit_undo(app, 1);
        break;
    case ACTION_FIND:
        app_ask(app, ASK_FIND, "");
        break;
    case ACTION_NEW:
        app_start_own(app);
        break;
    case ACTION_OPEN_JOB:
        app_ask(app, edit_unsaved(app) ? ASK_DISCARD : ASK_OPEN, "");
        break;
    case ACTION_ENTER:
        enter(app);
        break;
    case ACTION_BACK:
        go_back(app);
        break;
    default:
        break;
    }
}

static bool starts_filling(uint32_t key)
{
    return (key >= '0' && key <= '9') || key == '-' || key == '.' || key == ',';
}

static void key_on_page(struct app *app, uint32_t key)
{
    struct entry row;

    if (key == PRESS_BACK && app->working) {
        edit_stop(app);
        return;
    }
    if (page_of(app->page)->key(app, key))
        return;
    if (key == PRESS_UP || key == PRESS_DOWN) {
        app_move(app, key == PRESS_UP ? -1 : 1);
    } else if (key == PRESS_PAGE_UP || key == PRESS_PAGE_DOWN) {
        for (int i = 0; i < 10; i++)
            app_move(app, key == PRESS_PAGE_UP ? -1 : 1);
    } else if (starts_filling(key)) {
        if (row_in_hand(app, &row) && row.kind != ROW_SHAPE && row.kind != ROW_STANDS &&
            row.kind != ROW_TOUCHES && row.kind != ROW_REST && row.id != FIELD_job_title)
            app_open_row(app, &row, key);
    } else {
        act(app, key_action(key, PLACE_EVERYWHERE));
    }
}

void app_key(struct app *app, uint32_t key)
{
    app->said[0] = '\0';
    if (app->columns < CANVAS_LEAST_COLUMNS || app->rows < CANVAS_LEAST_ROWS)
        return;
    if (key == PRESS_UP || key == PRESS_DOWN)
        app->show_change = false;
    if (app->ask != ASK_NONE)
        ask_key(app, key);
    else if (app->open != OPEN_NOT)
        row_key(app, key);
    else
        key_on_page(app, key);
    if (app->page == PAGE_YEAR)
        year_fill(app);
    if (app->page == PAGE_CUT)
        cut_fill(app);
}
