#include "plan/why_step.h"
#include "job/field.h"
#include <math.h>
#include <stdarg.h>
#include <stdio.h>
#include <string.h>

enum unit_system why_units(const struct plan *plan)
{
    return (enum unit_system)plan->job.job_units;
}

void why_show_number(const struct plan *plan, double si, enum quantity quantity, char *out,
                     size_t size)
{
    struct text text = {0};

    unit_show(&text, si, quantity, why_units(plan));
    snprintf(out, size, "%s", text_string(&text));
    text_free(&text);
}

static enum field_id field_of(const char *path)
{
    char section[32];
    const char *dot = strchr(path, '.');

    if (dot == NULL || (size_t)(dot - path) >= sizeof section)
        return FIELD_COUNT;
    snprintf(section, sizeof section, "%.*s", (int)(dot - path), path);
    return field_id_of(section, dot + 1);
}

/* A number left out that has no default of its own says nothing. */
static bool has_value(const struct plan *plan, enum field_id id)
{
    double number;

    if (field_table[id].type != FIELD_NUMBER)
        return true;
    memcpy(&number, (const char *)&plan->job + field_table[id].offset, sizeof number);
    return isfinite(number);
}

/* A cell of the row asked about. False when it is empty. */
static bool cell_of(const struct plan *plan, const struct why_cells *cells, const char *key,
                    struct text *out)
{
    for (size_t i = 0; cells != NULL && i < cells->list->column_count; i++) {
        const struct column *column = &cells->list->columns[i];
        const void *place;
        if (strcmp(column->key, key) != 0)
            continue;
        place = column_place(cells->list, column, cells->arrays, cells->row);
        if (column->type == RESULT_NUMBER && !isfinite(*(const double *)place))
            return false;
        column_show(out, column, place, why_units(plan));
        return text_string(out)[0] != '\0';
    }
    return false;
}

/* The value behind a path (result, field or cell of the row) and whose it is. False when there is
 * none. */
static bool value_of(const struct plan *plan, const struct why_cells *cells, const char *path,
                     char *value, size_t value_size, char *from, size_t from_size)
{
    const struct result *result = result_find(path);
    enum field_id id = field_of(path);
    struct text text = {0};

    if (path[0] == '.') {
        snprintf(from, from_size, "worked out");
        if (!cell_of(plan, cells, path + 1, &text)) {
            text_free(&text);
            return false;
        }
    } else if (result != NULL) {
        if (result->type == RESULT_NUMBER && !isfinite(result_number(result, plan)))
            return false;
        result_show(&text, result, plan, why_units(plan));
        snprintf(from, from_size, "worked out");
    } else if (id < FIELD_COUNT && has_value(plan, id)) {
        field_show(&text, &plan->job, id, why_units(plan));
        snprintf(from, from_size, "%s", plan->job.given[id] ? "you" : "usual");
    } else {
        return false;
    }
    snprintf(value, value_size, "%s", text_string(&text));
    text_free(&text);
    return true;
}

static struct why_line *add_line(struct why *why)
{
    if (why->line_count >= sizeof why->lines / sizeof *why->lines)
        return NULL;
    return &why->lines[why->line_count++];
}

void why_step(struct why *why, const char *number, const char *field, const char *from,
              const char *words, ...)
{
    struct why_line *line = add_line(why);
    va_list arguments;

    if (line == NULL)
        return;
    snprintf(line->step, sizeof line->step, "%s", number);
    snprintf(line->from, sizeof line->from, "%s", from);
    snprintf(line->field, sizeof line->field, "%s", field);
    va_start(arguments, words);
    vsnprintf(line->words, sizeof line->words, words, arguments);
    va_end(arguments);
}

void why_set_sum(struct why *why, const char *sum, const char *value)
{
    struct why_line *line = &why->lines[why->line_count - 1];

    snprintf(line->sum, sizeof line->sum, "%s", sum);
    snprintf(line->value, sizeof line->value, "%s", value);
}

const char *why_whose(const struct plan *plan, enum field_id id)
{
    return plan->job.given[id] ? "you" : "usual";
}

void why_add_symbols(const struct plan *plan, const struct why_cells *cells,
                     const struct why_row *row, struct why *why)
{
    for (size_t i = 0; i < WHY_SYMBOLS && row->symbols[i].symbol != NULL; i++) {
        char value[VALUE_MOST], from[64];
        const struct why_symbol *symbol = &row->symbols[i];
        bool field = field_of(symbol->path) < FIELD_COUNT;
        if (!value_of(plan, cells, symbol->path, value, sizeof value, from, sizeof from))
            continue;
        why_step(why, symbol->symbol, field ? symbol->path : "", from, "%s", symbol->words);
        why_set_sum(why, "", value);
    }
}
