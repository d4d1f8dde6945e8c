#include "export/json_job.h"
#include "export/json.h"
#include "job/field.h"
#include "job/table.h"
#include <math.h>
#include <stdio.h>
#include <string.h>

static void add_bar(struct json *json, const char *key, const struct bar *bar)
{
    if (!(bar->diameter > 0)) {
        json_null(json, key);
        return;
    }
    json_open(json, key, '{');
    json_number(json, "diameter", bar->diameter);
    json_number(json, "length", bar->length);
    json_number(json, "spacing", bar->spacing);
    json_close(json, '}');
}

static void add_words(struct json *json, const char *key, const char *words, unsigned bits)
{
    json_open(json, key, '[');
    for (unsigned i = 0; *words != '\0'; i++) {
        size_t length = strcspn(words, " ");
        char word[32];

        snprintf(word, sizeof word, "%.*s", (int)length, words);
        if ((bits & (1U << i)) != 0)
            json_string(json, NULL, word);
        words += length;
        words += strspn(words, " ");
    }
    json_close(json, ']');
}

static void add_numbers(struct json *json, const char *key, const struct numbers *numbers)
{
    json_open(json, key, '[');
    for (size_t i = 0; i < numbers->count; i++)
        json_number(json, NULL, numbers->items[i]);
    json_close(json, ']');
}

static void add_date(struct json *json, const char *key, const struct date *date)
{
    char word[40];

    snprintf(word, sizeof word, "%04d-%02d-%02d", date->year, date->month, date->day);
    json_string(json, key, date->year != 0 ? word : NULL);
}

static void add_time(struct json *json, const char *key, const struct time_of_day *time, bool given)
{
    char word[40];

    snprintf(word, sizeof word, "%02d:%02d", time->minutes / 60, time->minutes % 60);
    json_string(json, key, given ? word : NULL);
}

static void add_aggregate(struct json *json, const char *key, const struct aggregate *aggregate)
{
    json_string(json, key, aggregate->row < 0 ? "unknown" : aggregate_table[aggregate->row].name);
}

static void add_field(struct json *json, const struct job *job, enum field_id id)
{
    const struct field *field = &field_table[id];
    const void *place = (const char *)job + field->offset;
    char key[96], word[CHOICE_MOST];

    snprintf(key, sizeof key, "%s.%s", field->section, field->key);
    switch (field->type) {
    case FIELD_NUMBER:
        json_number(json, key, *(const double *)place);
        break;
    case FIELD_CHOICE:
        field_choice_word(field, *(const int *)place, word, sizeof word);
        json_string(json, key, word);
        break;
    case FIELD_TEXT:
        json_string(json, key, job->given[id] ? (const char *)place : NULL);
        break;
    case FIELD_DATE:
        add_date(json, key, place);
        break;
    case FIELD_TIME:
        add_time(json, key, place, job->given[id]);
        break;
    case FIELD_BAR:
        add_bar(json, key, place);
        break;
    case FIELD_STRENGTH:
        json_number(json, key, ((const struct strength *)place)->cylinder);
        break;
    case FIELD_AGGREGATE:
        add_aggregate(json, key, place);
        break;
    case FIELD_CLASS:
        json_string(json, key, ((const struct movement_class *)place)->word);
        break;
    case FIELD_NUMBERS:
        add_numbers(json, key, place);
        break;
    case FIELD_COUNTS:
        add_words(json, key, COUNTS_WORDS, ((const struct counts *)place)->bits);
        break;
    default:
        break;
    }
}

static void add_keys(struct json *json, const char *key, const enum field_id *ids, size_t count)
{
    json_open(json, key, '[');
    for (size_t i = 0; i < count; i++) {
        char word[96];
        snprintf(word, sizeof word, "%s.%s", field_table[ids[i]].section, field_table[ids[i]].key);
        json_string(json, NULL, word);
    }
    json_close(json, ']');
}

void json_add_job(struct json *json, const struct plan *plan)
{
    json_open(json, "job", '{');
    for (int id = 0; id < FIELD_COUNT; id++)
        add_field(json, &plan->job, (enum field_id)id);
    add_keys(json, "overrides", plan->overrides, plan->override_count);
    add_keys(json, "assumed", plan->assumed, plan->assumed_count);
    json_close(json, '}');
}

static void add_choices(struct json *json, const struct field *field)
{
    char word[CHOICE_MOST];

    if (field->choices == NULL) {
        json_null(json, "choices");
        return;
    }
    json_open(json, "choices", '[');
    for (int i = 0; field_choice_word(field, i, word, sizeof word), word[0] != '\0'; i++)
        json_string(json, NULL, word);
    json_close(json, ']');
}

static const char *quantity_word(const struct field *field)
{
    static const char *const numbers[] = {
        "number",
        "length",
        "length",
        "stress",
        "modulus of subgrade",
        "unit weight",
        "temperature",
        "temperature difference",
        "gradient",
        "per temperature",
        "strain",
        "ratio",
        "volume",
        "density",
        "speed",
        "pace",
        "volume rate",
        "angle",
        "time",
    };
    static const char *const types[] = {
        [FIELD_NUMBER] = "",
        [FIELD_CHOICE] = "choice",
        [FIELD_TEXT] = "text",
        [FIELD_DATE] = "date",
        [FIELD_TIME] = "time of day",
        [FIELD_BAR] = "bars",
        [FIELD_STRENGTH] = "strength",
        [FIELD_AGGREGATE] = "aggregate",
        [FIELD_CLASS] = "movement class",
        [FIELD_NUMBERS] = "",
        [FIELD_COUNTS] = "list of words",
        [FIELD_POINT] = "point",
        [FIELD_SIZE] = "size",
        [FIELD_ARC] = "arc",
        [FIELD_LIST] = "list of lengths",
        [FIELD_LINE] = "line",
    };

    return types[field->type][0] == '\0' ? numbers[field->quantity] : types[field->type];
}

/* The number a limit or default is in the field's own metric unit; null when there is none. */
static void add_in_unit(struct json *json, const char *key, double si, const struct field *field)
{
    double number = NAN;

    if (field->type == FIELD_NUMBER && isfinite(si) &&
        !unit_from_si(si, unit_name(field->quantity, UNITS_METRIC), field->quantity, &number))
        number = si;
    json_number(json, key, number);
}

static void add_default(struct json *json, const struct field *field)
{
    if (field->type == FIELD_CHOICE && field->words[0] == '\0') {
        char word[CHOICE_MOST];
        field_choice_word(field, (int)field->initial, word, sizeof word);
        json_string(json, "default", word);
    } else if (field->words[0] != '\0' || field->type != FIELD_NUMBER)
        json_string(json, "default", field->words);
    else
        add_in_unit(json, "default", field->initial, field);
}

static void add_table_row(struct json *json, const struct field *field)
{
    char key[96];
    bool number = field->type == FIELD_NUMBER;

    snprintf(key, sizeof key, "%s.%s", field->section, field->key);
    json_open(json, NULL, '{');
    json_string(json, "key", key);
    json_string(json, "label", field->label);
    json_string(json, "quantity", quantity_word(field));
    json_string(json, "unit", number ? unit_name(field->quantity, UNITS_METRIC) : "");
    json_string(json, "unit_us", number ? unit_name(field->quantity, UNITS_US) : "");
    add_in_unit(json, "min", field->least, field);
    add_in_unit(json, "max", field->most, field);
    add_default(json, field);
    add_choices(json, field);
    json_bool(json, "repeat", field->repeat);
    json_string(json, "help", field->help);
    json_string(json, "source", field->source);
    json_close(json, '}');
}

void json_fields(struct text *out)
{
    struct json json = {.out = out, .compact = 3};

    json_open(&json, NULL, '{');
    json_open(&json, "fields", '[');
    for (int id = 0; id < FIELD_COUNT; id++)
        add_table_row(&json, &field_table[id]);
    for (size_t i = 0; i < repeated_field_count; i++)
        add_table_row(&json, &repeated_field_table[i]);
    json_close(&json, ']');
    json_close(&json, '}');
}
