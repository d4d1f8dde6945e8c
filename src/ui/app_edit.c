/* Every change goes through here: a copy of the document, the new plan, one step of undo. */
#include "ui/app_state.h"
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

/* The first error without the file's name of its field, which the row's label says; else "". */
const char *edit_first_error(const struct finding_list *findings)
{
    for (size_t i = 0; i < findings->count; i++) {
        const struct finding *finding = &findings->items[i];
        size_t n = strlen(finding->field);
        if (finding->severity != SEVERITY_ERROR)
            continue;
        if (n > 0 && strncmp(finding->message, finding->field, n) == 0 &&
            strncmp(finding->message + n, ": ", 2) == 0)
            return finding->message + n + 2;
        return finding->message;
    }
    return "";
}

/* The job as it stands, settled, for the rows; whatever could be read is in it. */
static enum status read_job(struct app *app, struct job *raw)
{
    enum status status = document_job(app->document, raw, &app->findings);
    struct finding_list settled = {0};
    struct job shown;

    if (status == STATUS_OK)
        status = weather_attach(app, raw);
    if (status == STATUS_NO_MEMORY || job_copy(&shown, raw) != STATUS_OK)
        return STATUS_NO_MEMORY;
    job_settle(&shown, &settled);
    finding_append(&app->findings, &settled);
    finding_free(&settled);
    job_free(&app->job);
    app->job = shown;
    return status;
}

static void say_outcome(struct app *app, enum status status)
{
    app->stale = status != STATUS_OK;
    year_drop(app);
    cut_drop(app);
    if (status == STATUS_NO_MEMORY)
        app_tell(app, "Not enough memory; close other programs. The answers are the old ones.");
    else if (app->stale)
        app_tell(app, "%s", edit_first_error(&app->findings));
}

void app_take_plan(struct app *app, struct plan *made, enum status status)
{
    app->working = false;
    finding_append(&app->findings, &made->findings);
    if (status == STATUS_OK) {
        plan_free(&app->plan);
        app->plan = *made;
        app->has_plan = true;
    } else {
        plan_free(made);
    }
    say_outcome(app, status);
}

void app_set_maker(struct app *app, const struct plan_maker *maker)
{
    app->maker = *maker;
}

bool app_working(const struct app *app)
{
    return app->working;
}

void edit_stop(struct app *app)
{
    if (!app->working)
        return;
    app->maker.stop(app->maker.context);
    app->working = false;
    app->stale = true;
    app_tell(app, "Stopped. The answers are those of the job before; the next change works anew.");
}

/* Makes the plan, or has it made. */
static void make_plan(struct app *app, const struct job *raw)
{
    struct plan *made = calloc(1, sizeof *made);
    enum status status = STATUS_NO_MEMORY;

    if (made == NULL) {
        say_outcome(app, status);
        return;
    }
    if (app->maker.make == NULL)
        app_take_plan(app, made, plan_make(raw, &app->cache, NULL, made));
    else if (app->maker.make(app->maker.context, raw, made, &status))
        app_take_plan(app, made, status);
    else if (status == STATUS_OK)
        app->working = true;
    else
        say_outcome(app, status);
    free(made);
}

void edit_recompute(struct app *app)
{
    struct job raw;
    enum status status;

    finding_free(&app->findings);
    job_init(&raw);
    app->working = false;
    status = read_job(app, &raw);
    if (status == STATUS_OK) {
        make_plan(app, &raw);
    } else {
        if (app->maker.stop != NULL)
            app->maker.stop(app->maker.context); /* what runs is of an older job */
        say_outcome(app, status);
    }
    job_free(&raw);
}

static bool remember(struct app *app, const char *words)
{
    struct text whole = {0};
    bool done;

    document_write(app->document, &whole);
    done = !whole.failed && history_add(&app->history, text_string(&whole), whole.length, app->path,
                                        app->example, words);
    text_free(&whole);
    return done;
}

/* What the refusal says, and at most 14 cells of it for the row. */
static void say_refused(struct app *app, const struct finding_list *findings)
{
    const char *message = edit_first_error(findings), *word = "to put right";

    if (strstr(message, "at least") != NULL || strstr(message, "too small") != NULL)
        word = "too small";
    else if (strstr(message, "at most") != NULL || strstr(message, "too large") != NULL)
        word = "too large";
    else if (strstr(message, "number") != NULL)
        word = "not a number";
    for (size_t i = 0; i < findings->count; i++) {
        double value = strtod(findings->items[i].value, NULL);
        double limit = strtod(findings->items[i].limit, NULL);
        if (strchr(findings->items[i].limit, ' ') != NULL && value != 0)
            word = value < limit ? "too small" : strstr(word, "put") ? "too large" : word;
    }
    snprintf(app->trouble, sizeof app->trouble, "%s", word);
    app_tell(app, "%s", message[0] != '\0' ? message : "Refused.");
}

/* Whether a path names a whole section: object.C1, opening.pit, joint.2; a path of a value has
 * more. */
static bool is_section(const char *path)
{
    const char *dot = strchr(path, '.');

    return (strncmp(path, "object.", 7) == 0 || strncmp(path, "opening.", 8) == 0 ||
            strncmp(path, "joint.", 6) == 0 || strncmp(path, "crack.", 6) == 0) &&
           strchr(dot + 1, '.') == NULL;
}

bool edit_change(struct app *app, const struct change_item *items, size_t count, const char *words)
{
    struct document *copy = NULL, *old = app->document;
    struct finding_list findings = {0};
    enum status status = document_copy(app->document, &copy);

    for (size_t i = 0; i < count && status == STATUS_OK; i++) {
        if (items[i].value[0] == '\0' && !is_section(items[i].path) &&
            document_get(copy, items[i].path) == NULL)
            continue; /* nothing there to remove */
        status = document_set(copy, items[i].path, items[i].value, &findings);
    }
    if (status != STATUS_OK) {
        if (status == STATUS_REFUSED)
            say_refused(app, &findings);
        else
            app_tell(app, "Not enough memory; nothing was changed.");
        finding_free(&findings);
        document_free(copy);
        return false;
    }
    finding_free(&findings);
    app->document = copy;
    if (!remember(app, words)) {
        app->document = old;
        document_free(copy);
        app_tell(app, "Not enough memory; nothing was changed.");
        return false;
    }
    document_free(old);
    snprintf(app->change, sizeof app->change, "%s", words);
    app->show_change = true;
    edit_recompute(app);
    return true;
}

bool edit_replace(struct app *app, const char *bytes, size_t count, const char *path, bool example,
                  const char *words)
{
    struct document *made = NULL;
    struct finding_list findings = {0};
    enum status status = document_parse(bytes, count, &made, &findings);

    if (status == STATUS_NO_MEMORY || made == NULL) {
        finding_free(&findings);
        app_tell(app, "Not enough memory; nothing was opened.");
        return false;
    }
    document_free(app->document);
    app->document = made;
    app->example = example;
    snprintf(app->path, sizeof app->path, "%s", path);
    app->opened = 0;
    plan_free(&app->plan);
    app->has_plan = false;
    app->change[0] = '\0';
    if (!remember(app, words))
        app_tell(app, "Not enough memory; this cannot be undone.");
    edit_recompute(app);
    if (status == STATUS_REFUSED) {
        app->stale = true;
        app_tell(app, "%s", edit_first_error(&findings));
    }
    finding_append(&app->findings, &findings);
    finding_free(&findings);
    return true;
}

void edit_undo(struct app *app, int step)
{
    struct history *history = &app->history;
    struct document *made = NULL;
    struct finding_list findings = {0};
    size_t target = history->now + (size_t)step;

    if (history->count == 0 || (step < 0 && history->now == 0) || target >= history->count) {
        app_tell(app, step < 0 ? "Nothing to take back." : "Nothing was taken back.");
        return;
    }
    if (document_parse(history->steps[target].bytes, history->steps[target].count, &made,
                       &findings) == STATUS_NO_MEMORY) {
        finding_free(&findings);
        app_tell(app, "Not enough memory; nothing was changed.");
        return;
    }
    finding_free(&findings);
    document_free(app->document);
    app->document = made;
    snprintf(app->change, sizeof app->change, "%s%s", step < 0 ? "taken back: " : "again: ",
             history->steps[step < 0 ? history->now : target].words);
    app->show_change = true;
    history->now = target;
    app->example = history->steps[target].example;
    snprintf(app->path, sizeof app->path, "%s", history->steps[target].path);
    edit_recompute(app);
}

bool edit_unsaved(const struct app *app)
{
    return !app->example && app->history.now != app->history.saved;
}
