#include "plan/why.h"
#include "plan/why_step.h"
#include <stdio.h>
#include <string.h>

enum status why_result(const struct plan *plan, const char *path, struct why *why)
{
    const struct result *result = result_find(path);
    const struct why_row *row = why_row_find(plan, path);
    struct text value = {0};

    if (result == NULL || row == NULL)
        return STATUS_REFUSED;
    *why = (struct why){0};
    result_show(&value, result, plan, why_units(plan));
    snprintf(why->question, sizeof why->question, "%s: %s", result->label, text_string(&value));
    snprintf(why->formula, sizeof why->formula, "%s", row->formula);
    snprintf(why->source, sizeof why->source, "%s", row->source);
    snprintf(why->valid, sizeof why->valid, "%s", row->valid);
    why_add_symbols(plan, NULL, row, why);
    why_step(why, "=", "", "", "%s", result->label);
    why_set_sum(why, "", text_string(&value));
    text_free(&value);
    return STATUS_OK;
}

enum status why_make(const struct plan *plan, const char *path, struct why *why)
{
    enum status status;

    if (strcmp(path, "seal.width_m") == 0 || strcmp(path, "seal.extension") == 0)
        return why_width(plan, path, why);
    status = why_result(plan, path, why);
    return status == STATUS_OK ? status : why_list(plan, path, why);
}
