#include "export/json.h"
#include "export/json_job.h"
#include "export/json_layout.h"
#include "export/json_writer.h"
#include "plan/result.h"
#include <math.h>
#include <string.h>

/* A group of single results ("seal") or a list; both may share a name ("spacing" holds "limits").
 */
static size_t group_length(const char *path)
{
    const char *dot = strchr(path, '.');

    return dot != NULL ? (size_t)(dot - path) : strlen(path);
}

static bool in_group(const char *path, const char *group)
{
    return group_length(path) == strlen(group) && strncmp(path, group, strlen(group)) == 0;
}

static const char *nonempty(const char *word)
{
    return word != NULL && word[0] != '\0' ? word : NULL;
}

static void add_cell(struct json *json, const char *key, enum result_type type, double scale,
                     const void *place)
{
    switch (type) {
    case RESULT_NUMBER:
        json_number(json, key, *(const double *)place * scale);
        break;
    case RESULT_INT:
        json_integer(json, key, *(const int *)place);
        break;
    case RESULT_WORD:
        json_string(json, key, *(const char *const *)place);
        break;
    case RESULT_TEXT:
        json_string(json, key, (const char *)place);
        break;
    case RESULT_BOOL:
        json_bool(json, key, *(const bool *)place);
        break;
    case RESULT_VERDICT:
        json_string(json, key, nonempty(verdict_word(*(const enum verdict *)place)));
        break;
    case RESULT_APPLIES:
        json_string(json, key, applies_word(*(const enum applies *)place));
        break;
    case RESULT_KIND:
        json_string(json, key, joint_kind_word((const struct layout_joint *)place));
        break;
    }
}

static void add_list(struct json *json, const char *key, const struct list *list,
                     const struct plan *plan)
{
    const void *arrays[2];
    size_t rows = list->rows(plan, arrays);
    int compact = json->compact;

    json_open(json, key, '[');
    for (size_t r = 0; r < rows; r++) {
        json->compact = 0;
        json_open(json, NULL, '{');
        json->compact = json->depth;
        for (size_t c = 0; c < list->column_count; c++) {
            const struct column *column = &list->columns[c];
            add_cell(json, column->key, column->type, column->json_scale,
                     column_place(list, column, arrays, r));
        }
        json_close(json, '}');
    }
    json->compact = compact;
    json_close(json, ']');
}

static void add_group(struct json *json, const char *group, const struct plan *plan)
{
    json_open(json, group, '{');
    for (size_t i = 0; i < result_count; i++) {
        const struct result *result = &result_table[i];
        const char *key = result->path + group_length(result->path) + 1;
        if (!in_group(result->path, group))
            continue;
        if (result->type == RESULT_TEXT && !result_there(result, plan))
            json_string(json, key, NULL);
        else
            add_cell(json, key, result->type, result->json_scale,
                     (const char *)plan + result->offset);
    }
    for (size_t i = 0; i < list_count; i++)
        if (strchr(list_table[i].name, '.') != NULL && in_group(list_table[i].name, group))
            add_list(json, list_table[i].name + strlen(group) + 1, &list_table[i], plan);
    json_close(json, '}');
}

static void add_program(struct json *json)
{
    json_open(json, "program", '{');
    json_string(json, "name", "slabgap");
    json_string(json, "version", SLABGAP_VERSION);
    json_close(json, '}');
}

static void add_findings(struct json *json, const struct finding_list *findings)
{
    json_open(json, "findings", '[');
    for (size_t i = 0; i < findings->count; i++) {
        const struct finding *finding = &findings->items[i];
        json_open(json, NULL, '{');
        json_string(json, "severity", severity_word(finding->severity));
        json_string(json, "field", finding->field);
        json_string(json, "value", finding->value);
        json_string(json, "limit", finding->limit);
        json_string(json, "message", finding->message);
        json_integer(json, "line", finding->line);
        json_integer(json, "column", finding->column);
        json_close(json, '}');
    }
    json_close(json, ']');
}

/* The top-level keys, in the order of docs/format.md. */
static const char *const keys[] = {
    "program",        "job",        "spacing",  "temperature",
    "shrinkage",      "movement",   "working",  "seal",
    "sealing_table",  "isolation",  "cut",      "saw",
    "checks",         "quantities", "joints",   "layout",
    "layout_reasons", "findings",   "concrete", "steel",
    "restraint",      "pours",      "cracks",   "choice",
};
enum { KEY_COUNT = sizeof keys / sizeof *keys };

static void add_key(struct json *json, const char *key, const struct plan *plan)
{
    if (strcmp(key, "program") == 0)
        add_program(json);
    else if (strcmp(key, "job") == 0)
        json_add_job(json, plan);
    else if (strcmp(key, "layout") == 0)
        json_add_layout(json, plan);
    else if (strcmp(key, "layout_reasons") == 0)
        json_add_slab_reasons(json, plan);
    else if (strcmp(key, "findings") == 0)
        add_findings(json, &plan->findings);
    else if (list_find(key) != NULL)
        add_list(json, key, list_find(key), plan);
    else
        add_group(json, key, plan);
}

void json_findings(struct text *out, const struct finding_list *findings)
{
    struct json json = {.out = out};

    json_open(&json, NULL, '{');
    add_program(&json);
    add_findings(&json, findings);
    json_close(&json, '}');
}

/* Writes one key's value alone: what stands after `{ "key":` of an object with only that key. */
static void add_value_alone(struct text *out, const char *key, const struct plan *plan)
{
    struct text whole = {0};
    struct json json = {.out = &whole};
    const char *start, *end;

    json_open(&json, NULL, '{');
    add_key(&json, key, plan);
    json_close(&json, '}');
    start = strchr(text_string(&whole), ':');
    end = strrchr(text_string(&whole), '}');
    if (start != NULL && end != NULL) {
        while (end > start && (end[-1] == '\n' || end[-1] == ' '))
            end--;
        text_add_bytes(out, start + 1, (size_t)(end - start - 1));
    }
    out->failed = out->failed || whole.failed;
    text_add_char(out, '\n', 1);
    text_free(&whole);
}

bool json_report(struct text *out, const struct plan *plan, const char *only)
{
    struct json json = {.out = out};

    if (finding_has_error(&plan->findings)) {
        json_findings(out, &plan->findings);
        return true;
    }
    if (only != NULL) {
        for (size_t i = 0; i < KEY_COUNT; i++)
            if (strcmp(keys[i], only) == 0) {
                add_value_alone(out, only, plan);
                return true;
            }
        return false;
    }
    json_open(&json, NULL, '{');
    for (size_t i = 0; i < KEY_COUNT; i++)
        add_key(&json, keys[i], plan);
    json_close(&json, '}');
    return true;
}

void json_key_list(struct text *out)
{
    for (size_t i = 0; i < KEY_COUNT; i++)
        text_format(out, "%s%s", i > 0 ? ", " : "", keys[i]);
}
