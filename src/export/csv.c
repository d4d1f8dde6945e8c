#include "export/csv.h"
#include "export/names.h"
#include "plan/result.h"
#include <math.h>
#include <string.h>

static void add_text(struct text *out, const char *value)
{
    if (strpbrk(value, ",\"\r\n") == NULL) {
        text_add(out, value);
        return;
    }
    text_add_char(out, '"', 1);
    for (; *value != '\0'; value++)
        text_add_char(out, *value, *value == '"' ? 2 : 1);
    text_add_char(out, '"', 1);
}

static void add_number(struct text *out, double value)
{
    if (isfinite(value))
        text_format(out, "%.9g", value + 0.0);
}

static void add_cell(struct text *out, enum result_type type, double scale, const void *place)
{
    struct text shown = {0};

    switch (type) {
    case RESULT_NUMBER:
        add_number(out, *(const double *)place * scale);
        break;
    case RESULT_VERDICT:
        add_text(out, verdict_word(*(const enum verdict *)place));
        break;
    default: {
        struct column column = {.type = type, .quantity = QUANTITY_NONE};
        column_show(&shown, &column, place, UNITS_METRIC);
        add_text(out, text_string(&shown));
        out->failed = out->failed || shown.failed;
        text_free(&shown);
    }
    }
}

static void add_list(struct text *out, const struct plan *plan, const struct list *list)
{
    const void *arrays[2];
    size_t rows = list->rows(plan, arrays);

    for (size_t c = 0; c < list->column_count; c++)
        text_format(out, "%s%s", c > 0 ? "," : "", list->columns[c].key);
    text_add(out, "\r\n");
    for (size_t r = 0; r < rows; r++) {
        for (size_t c = 0; c < list->column_count; c++) {
            const struct column *column = &list->columns[c];
            if (c > 0)
                text_add_char(out, ',', 1);
            add_cell(out, column->type, column->json_scale, column_place(list, column, arrays, r));
        }
        text_add(out, "\r\n");
    }
}

static void add_panels(struct text *out, const struct plan *plan)
{
    text_add(out, "id,name,length_m,width_m,aspect,area_m2,broken_rules\r\n");
    for (size_t i = 0; i < plan->layout.panel_count; i++) {
        const struct layout_panel *panel = &plan->layout.panels[i];
        char name[2 * LINE_NAME_MOST];
        name_panel(&plan->layout, panel, name);
        text_format(out, "P%d,%s,%.9g,%.9g,%.9g,%.9g,%zu\r\n", panel->number, name, panel->length,
                    panel->width, panel->aspect, panel->area, panel->reason_count);
    }
}

static void add_quantities(struct text *out, const struct plan *plan)
{
    text_add(out, "what,value\r\n");
    for (size_t i = 0; i < result_count; i++) {
        const struct result *result = &result_table[i];
        if (strncmp(result->path, "quantities.", 11) != 0 || result->type != RESULT_NUMBER)
            continue;
        text_format(out, "%s,", result->path + 11);
        add_number(out, result_number(result, plan) * result->json_scale);
        text_add(out, "\r\n");
    }
    for (size_t i = 0; i < plan->quantities.package_count; i++)
        text_format(out, "packages of %.9g l,%d\r\n", 1000 * plan->quantities.packages[i].size_m3,
                    plan->quantities.packages[i].count);
    for (size_t i = 0; i < plan->quantities.board_count; i++)
        text_format(out, "board_m of thickness %.9g m,%.9g\r\n",
                    plan->quantities.boards[i].thickness_m, plan->quantities.boards[i].length_m);
    for (size_t i = 0; i < plan->quantities.rod_count; i++)
        text_format(out, "rod_m of diameter %.9g m,%.9g\r\n", plan->quantities.rods[i].diameter_m,
                    plan->quantities.rods[i].length_m);
}

bool csv_report(struct text *out, const struct plan *plan, const char *name)
{
    if (strcmp(name, "joints") == 0)
        add_list(out, plan, list_find("joints"));
    else if (strcmp(name, "sealing") == 0)
        add_list(out, plan, list_find("sealing_table"));
    else if (strcmp(name, "panels") == 0)
        add_panels(out, plan);
    else if (strcmp(name, "quantities") == 0)
        add_quantities(out, plan);
    else
        return false;
    return true;
}
