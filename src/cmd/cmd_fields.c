#include "base/utf8.h"
#include "cmd/cmd.h"
#include "export/json.h"
#include "export/wrap.h"
#include "job/field.h"
#include <math.h>
#include <stdio.h>
#include <string.h>

enum { FIELDS_COLUMNS = 78, KEY_COLUMNS = 28 };

static void add_limits(struct text *out, const struct field *field)
{
    if (field->type == FIELD_CHOICE) {
        text_format(out, "%s.", field->choices);
        return;
    }
    if (field->type != FIELD_NUMBER)
        return;
    unit_show(out, field->least, field->quantity, UNITS_METRIC);
    text_add(out, " to ");
    unit_show(out, field->most, field->quantity, UNITS_METRIC);
    text_add(out, ".");
}

static void add_default(struct text *out, const struct field *field)
{
    char word[CHOICE_MOST];

    text_add(out, " Left out: ");
    word[0] = '\0';
    if (field->type == FIELD_CHOICE && isfinite(field->initial))
        field_choice_word(field, (int)field->initial, word, sizeof word);
    if (field->words[0] != '\0')
        text_add(out, field->words);
    else if (field->type == FIELD_CHOICE)
        text_add(out, word);
    else if (field->type == FIELD_NUMBER && isfinite(field->initial))
        unit_show(out, field->initial, field->quantity, UNITS_METRIC);
    else
        text_add(out, "none");
    text_add(out, ".");
}

static void add_row(struct text *out, const struct field *field)
{
    char first[96];
    struct text words = {0};

    snprintf(first, sizeof first, "%s.%s ", field->section, field->key);
    text_format(&words, "%s. %s ", field->label, field->help);
    add_limits(&words, field);
    add_default(&words, field);
    if (field->source[0] != '\0')
        text_format(&words, " Source: %s.", field->source);
    wrap_add(out, first, KEY_COLUMNS, text_string(&words), FIELDS_COLUMNS);
    out->failed = out->failed || words.failed;
    text_free(&words);
}

int command_fields(int count, char **words)
{
    struct text out = {0};
    int code;

    if (count > 1 || (count == 1 && strcmp(words[0], "--json") != 0))
        return command_refuse("fields: only --json may follow.");
    if (count == 1) {
        json_fields(&out);
    } else {
        for (int id = 0; id < FIELD_COUNT; id++)
            add_row(&out, &field_table[id]);
        for (size_t i = 0; i < repeated_field_count; i++)
            add_row(&out, &repeated_field_table[i]);
    }
    code = command_print(&out, EXIT_HOLDS);
    text_free(&out);
    return code;
}
