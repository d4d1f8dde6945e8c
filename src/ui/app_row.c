/* An opened row: choosing, stepping, filling, keeping. */
#include "ui/app_ask.h"
#include <math.h>
#include <stdio.h>
#include <string.h>

/* ---- an opened row ---- */

static int choice_count(const struct field *field)
{
    int count = 1;

    for (const char *c = field->choices; *c != '\0'; c++)
        count += *c == ' ';
    return count;
}

static int choice_now(const struct app *app, const struct entry *row)
{
    const char *written = document_get(app->document, row->path);
    int index;

    if (row->id != FIELD_COUNT) {
        memcpy(&index, (const char *)&app->job + row->field->offset, sizeof index);
        return index;
    }
    index = written != NULL ? field_choice_index(row->field, written, strlen(written)) : 0;
    return index >= 0 ? index : 0;
}

bool row_has_own_page(struct app *app, const struct entry *row)
{
    if (row->kind == ROW_SHAPE) {
        app->own = (struct own){.reshape = true, .shape = OWN_RECTANGLE};
        app_go(app, PAGE_OWN);
    } else if (row->kind == ROW_STANDS) {
        app->opened |= 1u << app->at[PAGE_JOB];
        app_go(app, PAGE_PLAN);
    } else if (row->kind == ROW_TOUCHES) {
        app->opened |= 1u << app->at[PAGE_JOB];
        app_go(app, PAGE_SIDES);
        app->at[PAGE_SIDES] = 0;
    } else if (row->kind == ROW_REST) {
        app_go(app, PAGE_REST);
        app->at[PAGE_REST] = 1;
    } else {
        return false;
    }
    return true;
}

void app_open_row(struct app *app, const struct entry *row, uint32_t first)
{
    struct text start = {0};

    app->row = *row;
    app->trouble[0] = '\0';
    app->show_change = false;
    if (row_is_choice(row)) {
        if (first != 0) {
            app_tell(app, "%s is chosen, not typed: Enter opens it, left and right step.",
                     row->label);
            return;
        }
        app->open = OPEN_CHOICE;
        app->choice = choice_now(app, row);
        return;
    }
    if (first == 0)
        row_text(app, row, &start);
    app->open = OPEN_TEXT;
    app->filling = first != 0;
    editor_open(&app->editor, text_string(&start));
    if (first != 0)
        editor_key(&app->editor, first);
    text_free(&start);
}

static bool keeps_example(const struct entry *row)
{
    return row->kind == ROW_SHAPE || row->id == FIELD_slab_thickness || row->id == FIELD_job_title;
}

/* Keeps what was typed; the row stays open when it is refused. */
static bool keep_row(struct app *app)
{
    char value[EDITOR_MOST];

    if (app->open == OPEN_CHOICE)
        field_choice_word(app->row.field, app->choice, value, sizeof value);
    else
        snprintf(value, sizeof value, "%s", app->editor.bytes);
    if (app->open == OPEN_TEXT && !app->editor.touched) {
        app->open = OPEN_NOT;
        app->opened |=
            app->page == PAGE_JOB && app->at[PAGE_JOB] >= 0 ? 1u << app->at[PAGE_JOB] : 0;
        return true;
    }
    if (app->example && !app->asked_example && keeps_example(&app->row)) {
        app_ask(app, ASK_EXAMPLE, "");
        snprintf(app->held, sizeof app->held, "%s", value);
        return false;
    }
    if (!row_apply(app, &app->row, value))
        return false;
    app->open = OPEN_NOT;
    app->trouble[0] = '\0';
    return true;
}

static double step_of(const struct entry *row, enum unit_system units)
{
    switch (row->field != NULL ? row->field->quantity : QUANTITY_NONE) {
    case QUANTITY_SMALL_LENGTH:
        if (row->id == FIELD_slab_thickness)
            return units == UNITS_US ? 0.0127 : 0.010;
        return units == UNITS_US ? 0.0015875 : 0.001;
    case QUANTITY_LENGTH:
        return units == UNITS_US ? 0.1524 : 0.1;
    case QUANTITY_TEMPERATURE:
    case QUANTITY_DIFFERENCE:
        return units == UNITS_US ? 1 / 1.8 : 1;
    case QUANTITY_RATIO:
        return 0.01;
    default:
        return row->field != NULL && row->id != FIELD_COUNT && row->field->least >= 1 ? 1 : 0;
    }
}

/* Left and right in a number opened by Enter: a sensible step, within its limits. */
static bool step_number(struct app *app, uint32_t key)
{
    struct unit_reading reading;
    struct text made = {0};
    double step;

    if (app->filling || app->row.kind != ROW_FIELD || app->row.field->type != FIELD_NUMBER ||
        (key != PRESS_LEFT && key != PRESS_RIGHT))
        return false;
    step = step_of(&app->row, app_units(app)) * (key == PRESS_LEFT ? -1 : 1);
    if (app->editor.length == 0)
        field_write(&made, &app->job, app->row.id, app_units(app));
    else
        text_add(&made, app->editor.bytes);
    reading = unit_read(text_string(&made), made.length, app->row.field->quantity, NULL);
    text_clear(&made);
    if (reading.problem == NULL && step != 0) {
        double value = round((reading.si + step) / fabs(step)) * fabs(step);
        value = fmax(app->row.field->least, fmin(app->row.field->most, value));
        unit_write(&made, value, app->row.field->quantity, app_units(app));
        editor_open(&app->editor, text_string(&made));
        app->editor.touched = true;
    }
    text_free(&made);
    return true;
}

static void choose(struct app *app, uint32_t key)
{
    int count = choice_count(app->row.field);
    char word[CHOICE_MOST];

    if (key == PRESS_LEFT)
        app->choice = (app->choice + count - 1) % count;
    else if (key == PRESS_RIGHT)
        app->choice = (app->choice + 1) % count;
    else
        for (int i = 1; i <= count; i++) { /* the next one that begins so */
            field_choice_word(app->row.field, (app->choice + i) % count, word, sizeof word);
            if ((unsigned char)word[0] == key) {
                app->choice = (app->choice + i) % count;
                break;
            }
        }
}

void row_key(struct app *app, uint32_t key)
{
    if (key == PRESS_BACK) {
        app->open = OPEN_NOT;
        app->trouble[0] = '\0';
    } else if (key == PRESS_ENTER || key == PRESS_DOWN || key == PRESS_UP || key == PRESS_TAB) {
        if (keep_row(app) && key != PRESS_ENTER)
            app_move(app, key == PRESS_UP ? -1 : 1);
    } else if (app->open == OPEN_CHOICE) {
        choose(app, key);
    } else if (key == PRESS_RUB && app->filling && app->editor.length == 0) {
        app->open = OPEN_NOT;
    } else if (!step_number(app, key)) {
        app->trouble[0] = '\0';
        app->filling = app->filling || key < KEY_NONE_PRESSED;
        editor_key(&app->editor, key);
    }
}
