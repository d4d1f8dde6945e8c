/* Why of a row of a list: LIST.ROW or LIST.ROW.COLUMN. A row goes by its name (its first column
 * without blanks, or the last word of it) or by its number from 1; LIST alone is its first row. */
#include "plan/why_step.h"
#include <math.h>
#include <stdio.h>
#include <string.h>

/* ---- which row, which column ---- */

enum { NAME_MOST_HERE = 96 };

/* The first column of a row, and that without blanks. */
static void name_of(const struct plan *plan, const struct why_cells *cells, char *name,
                    char *closed)
{
    const struct column *column = &cells->list->columns[0];
    struct text text = {0};
    size_t used = 0;

    column_show(&text, column, column_place(cells->list, column, cells->arrays, cells->row),
                why_units(plan));
    snprintf(name, NAME_MOST_HERE, "%s", text_string(&text));
    text_free(&text);
    for (const char *at = name; *at != '\0'; at++)
        if (*at != ' ')
            closed[used++] = *at;
    closed[used] = '\0';
}

/* How many bytes of `path` the key takes when it begins it: 0 when it does not. */
static size_t begins(const char *path, const char *key)
{
    size_t length = strlen(key);

    return length > 0 && strncmp(path, key, length) == 0 &&
                   (path[length] == '.' || path[length] == '\0')
               ? length
               : 0;
}

static bool is_number(const char *word)
{
    return word[0] != '\0' && word[strspn(word, "0123456789")] == '\0';
}

/* The row a path begins with, the longest name first; the bytes it takes in `taken`. SIZE_MAX: no
 * such row. */
static size_t find_row(const struct plan *plan, struct why_cells cells, size_t rows,
                       const char *path, size_t *taken)
{
    size_t found = SIZE_MAX;
    char number[24];

    *taken = 0;
    for (cells.row = 0; cells.row < rows; cells.row++) {
        char name[NAME_MOST_HERE], closed[NAME_MOST_HERE];
        const char *last;
        size_t length;
        name_of(plan, &cells, name, closed);
        length = begins(path, closed);
        last = strrchr(name, ' ');
        if (length == 0 && last != NULL && !is_number(last + 1))
            length = begins(path, last + 1);
        if (length > *taken) {
            *taken = length;
            found = cells.row;
        }
    }
    for (size_t row = 0; found == SIZE_MAX && row < rows && row < 1000000; row++) {
        snprintf(number, sizeof number, "%zu", row + 1);
        *taken = begins(path, number);
        if (*taken > 0)
            found = row;
    }
    return found;
}

static const struct column *find_column(const struct list *list, const char *key)
{
    for (size_t i = 0; i < list->column_count; i++)
        if (strcmp(list->columns[i].key, key) == 0)
            return &list->columns[i];
    return NULL;
}

/* ---- checks and limits: their rows have formulas of their own ---- */

static void set_check_side(struct why *why, const struct plan *plan, double value, const char *unit)
{
    struct text text = {0};

    check_show(&text, value, unit, why_units(plan));
    why_set_sum(why, "", text_string(&text));
    text_free(&text);
}

/* Formula and symbols of a row of checks or limits; `valid` stands in front of the formula's range.
 */
static void explain(const struct plan *plan, const char *path, const char *valid,
                    const char *source, struct why *why)
{
    const struct why_row *row = why_check_find(path);

    snprintf(why->source, sizeof why->source, "%s", source);
    snprintf(why->valid, sizeof why->valid, "%s%s%s", valid,
             row != NULL && row->valid[0] != '\0' ? " " : "", row != NULL ? row->valid : "");
    snprintf(why->formula, sizeof why->formula, "%s",
             row != NULL ? row->formula : "how many panels or joints break the rule: none may");
    if (row != NULL)
        why_add_symbols(plan, NULL, row, why);
}

static void why_check(const struct plan *plan, const struct plan_check *check, struct why *why)
{
    char path[96];

    snprintf(path, sizeof path, "checks.%s",
             strncmp(check->id, "filler.", 7) == 0 ? "filler" : check->id);
    snprintf(why->question, sizeof why->question, "%s: %s", check->label,
             verdict_screen_word(check->verdict));
    if (check->verdict == VERDICT_FAILS)
        snprintf(why->answer, sizeof why->answer, "%s", check->remedy);
    explain(plan, path,
            check->binding ? "This check decides the exit status." : "Advice: it never decides.",
            check->source, why);
    why_step(why, "=", "", "worked out", "what is asked for");
    set_check_side(why, plan, check->demand, check->unit);
    why_step(why, "limit", "", "", "at most");
    set_check_side(why, plan, check->capacity, check->unit);
}

static void why_limit(const struct plan *plan, const struct plan_limit *limit, struct why *why)
{
    char path[96], value[VALUE_MOST];

    snprintf(path, sizeof path, "spacing.limits.%s", limit->rule);
    why_show_number(plan, limit->limit_m, QUANTITY_LENGTH, value, sizeof value);
    snprintf(why->question, sizeof why->question, "Spacing by %s: %s", limit->rule, value);
    snprintf(why->answer, sizeof why->answer, "%s.", limit->words);
    explain(plan, path,
            limit->counts ? "This row counts." : "Advice: it never shortens the spacing.",
            limit->source, why);
    why_step(why, "=", "", "worked out", "limit by this row");
    why_set_sum(why, "", value);
}

/* ---- joints: as the joint that moves most, with their own panels ---- */

static enum status why_joint(const struct plan *plan, size_t index, const char *key,
                             struct why *why)
{
    struct plan one = *plan; /* a shallow view whose governing joint is this one; never freed */
    const struct plan_joint *joint = &plan->joints[index];
    char known[64];

    one.movement.open_m = joint->open_m;
    one.movement.close_m = joint->close_m;
    one.movement.panel_m = joint->run_m;
    one.seal.width_m = joint->width_m;
    one.seal.extension = joint->extension;
    one.seal.compression = joint->compression;
    one.seal.verdict = joint->verdict;
    snprintf(known, sizeof known, "movement.%s", key);
    if (result_find(known) == NULL)
        snprintf(known, sizeof known, "seal.%s", key);
    return why_result(&one, known, why);
}

/* ---- any other row ---- */

static enum status why_cell(const struct plan *plan, const struct why_cells *cells,
                            const struct column *column, struct why *why)
{
    char path[128], name[NAME_MOST_HERE], closed[NAME_MOST_HERE];
    const struct why_row *row;
    const void *place = column_place(cells->list, column, cells->arrays, cells->row);
    struct text value = {0};

    snprintf(path, sizeof path, "%s.%s", cells->list->name, column->key);
    row = why_list_find(plan, path);
    if (row == NULL)
        return STATUS_REFUSED;
    *why = (struct why){0};
    name_of(plan, cells, name, closed);
    if (column->type != RESULT_NUMBER || isfinite(*(const double *)place))
        column_show(&value, column, place, why_units(plan));
    if (text_string(&value)[0] == '\0')
        text_add(&value, "none");
    snprintf(why->question, sizeof why->question, "%s %s, %s: %s", cells->list->columns[0].label,
             name, column->label, text_string(&value));
    snprintf(why->formula, sizeof why->formula, "%s", row->formula);
    snprintf(why->source, sizeof why->source, "%s", row->source);
    snprintf(why->valid, sizeof why->valid, "%s", row->valid);
    why_add_symbols(plan, cells, row, why);
    why_step(why, "=", "", "", "%s", column->label);
    why_set_sum(why, "", text_string(&value));
    text_free(&value);
    return STATUS_OK;
}

/* ---- all lists ---- */

static const struct list *list_of(const char *path)
{
    for (size_t i = 0; i < list_count; i++)
        if (begins(path, list_table[i].name) > 0)
            return &list_table[i];
    return NULL;
}

static enum status why_row_of(const struct plan *plan, const struct why_cells *cells,
                              const char *key, struct why *why)
{
    const char *name = cells->list->name;
    const struct column *column =
        find_column(cells->list, key[0] != '\0' ? key : why_list_principal(cells->list->name));

    if (column == NULL)
        return STATUS_REFUSED;
    if (strcmp(name, "checks") == 0 || strcmp(name, "spacing.limits") == 0) {
        *why = (struct why){0};
        if (name[0] == 'c')
            why_check(plan, &plan->checks[cells->row], why);
        else
            why_limit(plan, &plan->spacing.rows[cells->row], why);
        return STATUS_OK;
    }
    if (strcmp(name, "joints") == 0 && plan->layout.joints[cells->row].kind != LAYOUT_ISOLATION &&
        why_joint(plan, cells->row, column->key, why) == STATUS_OK)
        return STATUS_OK;
    return why_cell(plan, cells, column, why);
}

enum status why_list(const struct plan *plan, const char *path, struct why *why)
{
    struct why_cells cells = {.list = list_of(path)};
    size_t rows, taken = 0;

    if (cells.list == NULL)
        return STATUS_REFUSED;
    rows = cells.list->rows(plan, cells.arrays);
    if (rows == 0)
        return STATUS_REFUSED;
    path += strlen(cells.list->name);
    if (*path == '.')
        cells.row = find_row(plan, cells, rows, ++path, &taken);
    if (cells.row == SIZE_MAX)
        return STATUS_REFUSED;
    path += taken;
    return why_row_of(plan, &cells, *path == '.' ? path + 1 : path, why);
}
