/* The questions in the help row. */
#include "ui/app_ask.h"
#include <ctype.h>
#include <stdio.h>
#include <string.h>

void app_ask(struct app *app, enum ask ask, const char *start)
{
    app->ask = ask;
    app->choice = ask == ASK_LEAVE ? 0 : app->choice;
    editor_open(&app->editor, start);
}

void app_ask_replace(struct app *app, const struct request *request)
{
    app_ask(app, ASK_REPLACE, "");
    snprintf(app->held, sizeof app->held, "%s", request->path);
    app->request = (struct request){0};
}

bool ask_has_text(enum ask ask)
{
    return ask == ASK_OPEN || ask == ASK_SAVE || ask == ASK_FIND || ask == ASK_ADD_SIZE ||
           ask == ASK_MOVE || ask == ASK_CRACK || ask == ASK_MEASURED || ask == ASK_CROSS;
}

void ask_words(const struct app *app, struct text *out)
{
    switch (app->ask) {
    case ASK_EXAMPLE:
        text_add(out, "This is the example. Start your own slab with this value? Enter yes, Esc "
                      "keep playing.");
        break;
    case ASK_OPEN:
        text_add(out, "Open which file: ");
        break;
    case ASK_SAVE:
        text_add(out, "Save as: ");
        break;
    case ASK_REPLACE:
        text_format(out, "%.40s is there already. Enter overwrites it, Esc keeps it.", app->held);
        break;
    case ASK_LEAVE:
        text_format(out, "%s%s. %s", app->saved[0] != '\0' ? "Not saved since " : "Not saved",
                    app->saved,
                    app->choice == 0 ? "Enter saves and leaves, Esc stays. Without saving: down."
                                     : "Enter leaves WITHOUT saving, Esc stays.");
        break;
    case ASK_DISCARD:
        text_add(out, "This job is not saved. Enter opens another all the same (u brings it back), "
                      "Esc stays.");
        break;
    case ASK_FIND:
        text_add(out, "Find a row: ");
        break;
    case ASK_ADD_KIND:
        text_format(out, "Add here:  < %s >  left and right choose, Enter takes it, Esc not.",
                    plan_kind_word(app->add_kind));
        break;
    case ASK_ADD_SIZE:
        text_format(out, "Size of the %s: ", plan_kind_word(app->add_kind));
        break;
    case ASK_MOVE:
        if (!plan_move_words(app, out))
            text_add(out, "There is no line any more; Esc. ");
        break;
    case ASK_CRACK:
        text_add(out, "Crack from the cross to (east north, east north): ");
        break;
    case ASK_MEASURED:
        text_add(out, "Measured: ");
        break;
    case ASK_CROSS:
        text_add(out, "Cross to (east, north): ");
        break;
    case ASK_NONE:
        break;
    }
}

/* Example to own slab: the value that was typed goes with it. */
static void leave_example(struct app *app)
{
    char value[EDITOR_MOST];
    enum field_id id = app->row.id;

    snprintf(value, sizeof value, "%s", app->held);
    app->open = OPEN_NOT;
    app_start_own(app);
    if (id == FIELD_slab_thickness)
        snprintf(app->own.thickness, sizeof app->own.thickness, "%.31s", value);
}

static bool contains(const char *text, const char *part)
{
    size_t n = strlen(part);

    for (; *text != '\0'; text++) {
        size_t i = 0;
        while (i < n && tolower((unsigned char)text[i]) == tolower((unsigned char)part[i]))
            i++;
        if (i == n)
            return true;
    }
    return n == 0;
}

static void find(struct app *app, const char *part)
{
    struct entry row;

    for (int i = 0; i < sheet_count(); i++) {
        sheet_row(i, &row);
        if (contains(row.label, part) && (!row.roomy_only || app_roomy(app))) {
            app_go(app, PAGE_JOB);
            app->at[PAGE_JOB] = i;
            return;
        }
    }
    for (int i = 0; i < page_rest.count(app); i++)
        if (page_rest.row(app, i, &row) && row.kind != ROW_HEADING &&
            (contains(row.label, part) || contains(row.path, part))) {
            app_go(app, PAGE_REST);
            app->at[PAGE_REST] = i;
            return;
        }
    app_tell(app, "No row is called '%.60s'.", part);
}

void ask_save(struct app *app, const char *path, bool replace, bool leave)
{
    app->request = (struct request){.kind = REQUEST_SAVE, .replace = replace, .leave = leave};
    snprintf(app->request.path, sizeof app->request.path, "%s", path);
}

static void leave(struct app *app)
{
    if (app->choice != 0)
        app->request.kind = REQUEST_LEAVE;
    else if (app->path[0] != '\0')
        ask_save(app, app->path, true, true);
    else
        app_ask(app, ASK_SAVE, "");
}

/* A name without a suffix gets the one of job files. */
static void save_as(struct app *app, const char *name)
{
    char path[PATH_MOST];
    const char *base = strrchr(name, '/');

    base = base != NULL ? base + 1 : name;
    if (base[0] == '\0') {
        app_tell(app, "Type a name, such as yard.slab.");
        return;
    }
    snprintf(path, sizeof path, "%.*s%s", PATH_MOST - 8, name, strchr(base, '.') ? "" : ".slab");
    ask_save(app, path, strcmp(path, app->path) == 0, false);
}

static void answer(struct app *app)
{
    enum ask ask = app->ask;

    app->ask = ASK_NONE;
    switch (ask) {
    case ASK_EXAMPLE:
        app->asked_example = true;
        leave_example(app);
        break;
    case ASK_OPEN:
        app->request.kind = REQUEST_OPEN;
        snprintf(app->request.path, sizeof app->request.path, "%.*s", PATH_MOST - 1,
                 app->editor.bytes);
        break;
    case ASK_SAVE:
        save_as(app, app->editor.bytes);
        break;
    case ASK_REPLACE:
        ask_save(app, app->held, true, false);
        break;
    case ASK_LEAVE:
        leave(app);
        break;
    case ASK_DISCARD:
        app_ask(app, ASK_OPEN, "");
        break;
    case ASK_FIND:
        find(app, app->editor.bytes);
        break;
    case ASK_ADD_KIND:
        plan_add_kind(app);
        break;
    case ASK_ADD_SIZE:
        plan_add(app);
        break;
    case ASK_MOVE:
        plan_move_line(app);
        break;
    case ASK_CRACK:
        plan_add_crack(app);
        break;
    case ASK_MEASURED:
        seal_take_measured(app);
        break;
    case ASK_CROSS:
        plan_cross_to(app);
        break;
    case ASK_NONE:
        break;
    }
}

/* Esc: the example is kept; the value goes in after all. */
static void refuse(struct app *app)
{
    enum ask ask = app->ask;

    app->ask = ASK_NONE;
    if (ask != ASK_EXAMPLE)
        return;
    app->asked_example = true;
    if (app->open != OPEN_NOT && row_apply(app, &app->row, app->held))
        app->open = OPEN_NOT;
}

void ask_key(struct app *app, uint32_t key)
{
    if (key == PRESS_ENTER)
        answer(app);
    else if (key == PRESS_BACK)
        refuse(app);
    else if (app->ask == ASK_LEAVE && (key == PRESS_DOWN || key == PRESS_UP))
        app->choice = key == PRESS_DOWN;
    else if (app->ask == ASK_ADD_KIND && (key == PRESS_LEFT || key == PRESS_RIGHT))
        plan_next_kind(app, key == PRESS_LEFT ? -1 : 1);
    else if (ask_has_text(app->ask))
        editor_key(&app->editor, key);
}
