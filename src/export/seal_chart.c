#include "export/seal_chart.h"
#include "base/utf8.h"
#include <math.h>
#include <string.h>

enum { CELL = 6, LABEL = 9 };

/* A joint measured so wide at that temperature: within 0.9 of the capacity, within it, or not. */
static const char *cell(const struct plan *plan, const struct plan_table_row *row, double width_m)
{
    double tolerance = plan->seal.tolerance_m, least = row->least_m - tolerance;
    double width = width_m - tolerance;

    if (row->too_cold)
        return "cold";
    if (width < least * (1 - 1e-9))
        return "no";
    return width * 0.9 >= least * (1 - 1e-9) ? "yes" : "just";
}

static void add_right(struct text *out, const char *words, int columns)
{
    int used = utf8_columns(words);

    text_add_char(out, ' ', used < columns ? (size_t)(columns - used) : 1);
    text_add(out, words);
}

/* Row of the sealing table for the k-th of `shown` columns. */
static const struct plan_table_row *row_at(const struct plan *plan, int k, int shown)
{
    size_t last = plan->table_count - 1;

    return &plan->table[shown > 1 ? (size_t)lround((double)k * (double)last / (shown - 1)) : 0];
}

void seal_chart_add(struct text *out, const struct plan *plan, int columns)
{
    enum unit_system units = (enum unit_system)plan->job.job_units;
    int shown = (columns - LABEL) / CELL;
    struct text words = {0};

    if (plan->table_count == 0 || shown < 2)
        return;
    if (shown > (int)plan->table_count)
        shown = (int)plan->table_count;
    text_format(out, "%-*s", LABEL, units == UNITS_US ? "slab F" : "slab C");
    for (int k = 0; k < shown; k++) {
        double slab = row_at(plan, k, shown)->slab_c;
        text_clear(&words);
        text_format(&words, "%.0f", units == UNITS_US ? slab * 1.8 + 32 : slab);
        add_right(out, text_string(&words), CELL);
    }
    text_add_char(out, '\n', 1);
    for (size_t w = 0; w < plan->quantities.width_count; w++) {
        double width = plan->quantities.widths[w].width_m;
        text_clear(&words);
        unit_show(&words, width, QUANTITY_SMALL_LENGTH, units);
        add_right(out, text_string(&words), LABEL - 1);
        text_add_char(out, ' ', 1);
        for (int k = 0; k < shown; k++)
            add_right(out, cell(plan, row_at(plan, k, shown), width), CELL);
        text_add_char(out, '\n', 1);
    }
    out->failed = out->failed || words.failed;
    text_free(&words);
}

void seal_choice_words(struct text *out, const struct plan *plan, const struct plan_choice *choice)
{
    enum unit_system units = (enum unit_system)plan->job.job_units;

    if (!choice->fits) {
        text_format(out, "no: %s.", choice->reason);
        return;
    }
    text_add(out, "suits");
    if (isfinite(choice->width_m)) {
        text_add(out, ": ");
        unit_show(out, choice->width_m, QUANTITY_SMALL_LENGTH, units);
        text_add(out, isfinite(choice->depth_m) ? " wide, " : " slot");
        if (isfinite(choice->depth_m)) {
            unit_show(out, choice->depth_m, QUANTITY_SMALL_LENGTH, units);
            text_format(out, " deep; stretches %.1f %%, is squeezed %.1f %%",
                        100 * choice->extension, 100 * choice->compression);
        }
    }
    text_format(out, ".%s%s%s", choice->remark[0] != '\0' ? " Mind: " : "", choice->remark,
                choice->remark[0] != '\0' ? "." : "");
}
