#include "export/seal_text.h"
#include "export/report.h"
#include "export/wrap.h"
#include <math.h>

static enum unit_system units_of(const struct plan *plan)
{
    return (enum unit_system)plan->job.job_units;
}

void seal_now_headline(struct text *out, const struct plan *plan, const struct seal_now *now)
{
    if (now->go) {
        text_add(out, now->unknown_count > 0 ? "YES, AS FAR AS MEASURED. " : "YES, NOW. ");
        text_format(out, "It will stretch %.1f %%, be squeezed %.1f %%: %s, good for %.3g %%.",
                    100 * now->extension, 100 * now->compression,
                    now->verdict == VERDICT_TIGHT ? "just holds" : "holds",
                    100 * plan->seal.extension_capacity);
        return;
    }
    text_add(out, now->verdict == VERDICT_FAILS ? "NOT THIS JOINT: " : "NOT YET: ");
    text_add(out, now->against[0]);
    if (isfinite(now->turns_hour))
        text_format(out, " Expected from about %02.0f:00.", now->turns_hour);
}

static void add_width(struct text *out, const struct plan *plan, const struct seal_now *now)
{
    double wide = now->width_m * (1 + now->extension);
    double narrow = now->width_m * (1 - now->compression);

    unit_show(out, now->width_m, QUANTITY_SMALL_LENGTH, units_of(plan));
    text_add(out, " now; coldest and dry ");
    unit_show(out, wide, QUANTITY_SMALL_LENGTH, units_of(plan));
    text_format(out, ": stretch %.1f %%; hottest ", 100 * now->extension);
    unit_show(out, narrow, QUANTITY_SMALL_LENGTH, units_of(plan));
    text_format(out, ": squeeze %.1f %%.", 100 * now->compression);
}

static void add_conditions(struct text *out, const struct plan *plan, const struct seal_now *now)
{
    text_add(out, "mean ");
    unit_show(out, now->slab_c, QUANTITY_TEMPERATURE, units_of(plan));
    if (now->slab_least_c < now->slab_c) {
        text_add(out, " down to ");
        unit_show(out, now->slab_least_c, QUANTITY_TEMPERATURE, units_of(plan));
    }
    if (isfinite(now->dew_c)) {
        text_add(out, "; dew point ");
        unit_show(out, now->dew_c, QUANTITY_TEMPERATURE, units_of(plan));
    }
    if (isfinite(now->age_days))
        text_format(out, "; concrete %.0f days old", now->age_days);
    text_format(out, "; drying to come %.0fe-6.", 1e6 * now->drying_left);
}

static const char *const order[] = {
    "1 sawn faces dry, no slurry; 2 blow out with oil-free air; 3 a finger comes up clean;",
    "4 faces dry all along; 5 rod dry, not stretched, at its depth;",
    "6 gun from the bottom, no gaps; 7 tool it low, concave; 8 strip tape at once;",
    "9 no traffic until it has skinned; 10 pull test every 30 m for the first 300 m, then every "
    "300 m: "
    "write it down.",
};

void seal_now_report(struct text *out, const struct plan *plan, const struct seal_now *now)
{
    struct text words = {0};

    seal_now_headline(&words, plan, now);
    wrap_add(out, "SEAL", 8, text_string(&words), REPORT_COLUMNS);
    for (size_t i = now->go ? 0 : 1; i < now->against_count; i++)
        wrap_add(out, "ALSO", 8, now->against[i], REPORT_COLUMNS);
    text_clear(&words);
    add_width(&words, plan, now);
    wrap_add(out, "WIDTH", 8, text_string(&words), REPORT_COLUMNS);
    text_clear(&words);
    add_conditions(&words, plan, now);
    wrap_add(out, "SLAB", 8, text_string(&words), REPORT_COLUMNS);
    text_clear(&words);
    for (size_t i = 0; i < now->unknown_count; i++)
        text_format(&words, "%s%s", i > 0 ? ", " : "", now->unknown[i]);
    if (now->unknown_count > 0) {
        text_add(&words, ".");
        wrap_add(out, "UNKNOWN", 8, text_string(&words), REPORT_COLUMNS);
    }
    for (size_t i = 0; i < sizeof order / sizeof *order; i++)
        wrap_add(out, i == 0 ? "ORDER" : "", 8, order[i], REPORT_COLUMNS);
    wrap_add(out, "SAFE", 8, report_caution(4), REPORT_COLUMNS);
    text_free(&words);
}
