/* What an opened row starts with, and the change that a typed text means. */
#include "ui/app_state.h"
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

/* ---- opening and keeping ---- */

bool row_is_choice(const struct entry *row)
{
    return row->kind == ROW_FIELD && row->field != NULL && row->field->choices != NULL;
}

static void add_written(const struct app *app, enum field_id id, struct text *out)
{
    if (!app->job.given[id])
        return;
    if (out->length > 0)
        text_add(out, " ");
    field_write(out, &app->job, id, app_units(app));
}

void row_text(const struct app *app, const struct entry *row, struct text *out)
{
    const char *written;

    if (row->kind == ROW_YEAR) {
        if (row_given(app, row))
            row_show_year(app, row, out);
    } else if (row->kind == ROW_DRYING) {
        if (row_given(app, row))
            text_format(out, "%g", 1000 * app->job.concrete_shrinkage);
    } else if (row->kind == ROW_STARTS) {
        add_written(app, FIELD_pour_date, out);
        add_written(app, FIELD_pour_start, out);
    } else if (row->kind == ROW_SLAB_THEN || row->kind == ROW_GOOD_FOR) {
        add_written(app, row->id, out);
        add_written(app, row->second, out);
    } else if (row->id != FIELD_COUNT && row->field->type != FIELD_TEXT) {
        add_written(app, row->id, out);
    } else {
        written = document_get(app->document, row->path);
        text_add(out, written != NULL ? written : "");
    }
}

/* "1,5 m": the comma between digits is a point, in the form only. */
static void decimal_comma(char *string)
{
    for (char *c = string; *c != '\0'; c++)
        if (*c == ',' && c > string && c[-1] >= '0' && c[-1] <= '9' && c[1] >= '0' && c[1] <= '9')
            *c = '.';
}

static const struct field *field_at_path(const char *path)
{
    char section[64];
    const char *dot = strchr(path, '.');
    enum field_id id;

    if (dot == NULL || (size_t)(dot - path) >= sizeof section)
        return NULL;
    snprintf(section, sizeof section, "%.*s", (int)(dot - path), path);
    id = field_id_of(section, dot + 1);
    return id < FIELD_COUNT ? &field_table[id] : NULL;
}

static void item(struct change_item *out, enum field_id id, const char *value)
{
    *out = (struct change_item){0};
    row_path_of(&field_table[id], out->path);
    snprintf(out->value, sizeof out->value, "%s", value);
}

/* "-8 to 40 °C", "-8 40", "5F to 90F". */
static size_t read_year(const struct entry *row, const char *string, struct change_item *items)
{
    const char *unit = strpbrk(string, "FCfcK°"), *to = strstr(string, " to ");
    char first[EDITOR_MOST], second[EDITOR_MOST] = "";
    size_t cut = to != NULL ? (size_t)(to - string) : strcspn(string, " ");

    snprintf(first, sizeof first, "%.*s", (int)cut, string);
    snprintf(second, sizeof second, "%s", to != NULL ? to + 4 : string + cut);
    if (second[strspn(second, " ")] == '\0') {
        item(&items[0], row->id, first);
        return 1;
    }
    if (unit != NULL && strpbrk(first, "FCfcK°") == NULL) {
        size_t n = strlen(first);
        const char *word = second + strcspn(second, "FCfcK°");
        snprintf(first + n, sizeof first - n, " %s", word);
    }
    item(&items[0], row->id, first);
    item(&items[1], row->second, second + strspn(second, " "));
    return 2;
}

/* Words into the two fields of a pair by what they look like. */
static size_t read_pair(const struct entry *row, const char *string, struct change_item *items)
{
    char first[EDITOR_MOST] = "", second[EDITOR_MOST] = "";
    size_t count = 0;

    while (*string != '\0') {
        size_t n = strcspn(string, " ");
        bool date = n >= 8 && string[4] == '-';
        bool clock = memchr(string, ':', n) != NULL;
        bool word = strchr("cfhpsn", string[0]) != NULL && n > 3;
        bool to_second = row->kind == ROW_STARTS      ? date || !clock
                         : row->kind == ROW_SLAB_THEN ? date
                                                      : word;
        char *into = to_second ? second : first;
        size_t used = strlen(into);
        snprintf(into + used, EDITOR_MOST - used, "%s%.*s", used > 0 ? " " : "", (int)n, string);
        string += n;
        string += strspn(string, " ");
    }
    if (first[0] != '\0')
        item(&items[count++], row->id, first);
    if (second[0] != '\0')
        item(&items[count++], row->second, second);
    return count;
}

/* mm a metre; a tested strain such as 200e-6 is taken as it is. */
static size_t read_drying(const char *string, struct change_item *items)
{
    char value[64], *end;
    double number = strtod(string, &end);

    if (*string != '\0' && end != string && number >= 0.003)
        snprintf(value, sizeof value, "%.9g", number / 1000);
    else
        snprintf(value, sizeof value, "%.60s", string);
    item(&items[0], FIELD_concrete_shrinkage, value);
    item(&items[1], FIELD_concrete_shrinkage_model, value[0] != '\0' ? "typed" : "");
    return 2;
}

static size_t read_row(const struct entry *row, const char *string, struct change_item *items)
{
    bool empty = string[0] == '\0';

    if (row->kind == ROW_DRYING)
        return read_drying(string, items);
    if (empty && row->second < FIELD_COUNT) {
        item(&items[0], row->id, "");
        item(&items[1], row->second, "");
        return 2;
    }
    if (row->kind == ROW_YEAR)
        return read_year(row, string, items);
    if (row->second < FIELD_COUNT)
        return read_pair(row, string, items);
    *items = (struct change_item){0};
    snprintf(items->path, sizeof items->path, "%s", row->path);
    snprintf(items->value, sizeof items->value, "%s", string);
    return 1;
}

/* A bare number counts in the unit the form shows; the file gets it written out. A bare share of 1
 * and more is per cent. */
static void add_unit(const struct app *app, struct change_item *changed)
{
    const struct field *field = field_at_path(changed->path);
    size_t length = strlen(changed->value);
    struct unit_reading reading;
    const char *unit;

    if (field == NULL || field->type != FIELD_NUMBER || length == 0)
        return;
    reading = unit_read_number(changed->value, length);
    if (reading.problem != NULL || reading.length != length)
        return;
    unit = field->quantity == QUANTITY_TIME ? field_time_unit(field)
                                            : unit_name(field->quantity, app_units(app));
    if (unit[0] == '\0' || (field->quantity == QUANTITY_RATIO && reading.si < 1))
        return;
    snprintf(changed->value + length, sizeof changed->value - length, " %s", unit);
}

bool row_apply(struct app *app, const struct entry *row, const char *string)
{
    struct change_item items[2];
    char typed[EDITOR_MOST], words[WORDS_MOST];
    struct text old = {0}, now = {0};
    size_t count, length;
    bool done;

    snprintf(typed, sizeof typed, "%s", string + strspn(string, " "));
    length = strlen(typed);
    while (length > 0 && typed[length - 1] == ' ')
        typed[--length] = '\0';
    if (row->field != NULL && row->field->type == FIELD_NUMBER)
        decimal_comma(typed);
    count = read_row(row, typed, items);
    for (size_t i = 0; i < count; i++)
        add_unit(app, &items[i]);
    row_show(app, row, &old);
    done = edit_change(app, items, count, row->label);
    if (done) {
        row_show(app, row, &now);
        snprintf(words, sizeof words, "%s %.60s to %.60s", row->label, text_string(&old),
                 text_string(&now));
        snprintf(app->change, sizeof app->change, "%s", words);
        free(app->history.steps[app->history.now].words);
        app->history.steps[app->history.now].words = strdup(words);
        if (app->history.steps[app->history.now].words == NULL)
            app->history.steps[app->history.now].words = strdup("");
        app->opened |= row_bit(row);
    }
    text_free(&old);
    text_free(&now);
    return done;
}
