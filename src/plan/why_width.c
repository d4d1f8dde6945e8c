/* The ladder of the joint's width: from the panel to the blade, with what another width, winter or
 * panel would do. */
#include "plan/plan_steps.h"
#include "plan/why_step.h"
#include <math.h>
#include <stdarg.h>
#include <stdio.h>
#include <stdlib.h>

struct ladder { /* the numbers of the job's seal, for short formulas below */
    double a, ts, tmin, tmax, e, length, open, close;
};

static struct ladder ladder_of(const struct plan *plan)
{
    return (struct ladder){
        .a = plan->concrete.expansion_k,
        .ts = plan->temperature.sealing_c,
        .tmin = plan->temperature.coldest_c,
        .tmax = plan->temperature.hottest_c,
        .e = plan->shrinkage.after_sealing,
        .length = plan->movement.panel_m,
        .open = plan->movement.open_m,
        .close = plan->movement.close_m,
    };
}

__attribute__((format(printf, 4, 5))) static void
set_sum_format(struct why *why, double si, const struct plan *plan, const char *sum, ...)
{
    struct why_line *line = &why->lines[why->line_count - 1];
    va_list arguments;

    va_start(arguments, sum);
    vsnprintf(line->sum, sizeof line->sum, sum, arguments);
    va_end(arguments);
    why_show_number(plan, si, QUANTITY_SMALL_LENGTH, line->value, sizeof line->value);
}

/* Movements in full: they are too small for the trade's rounding. */
static void set_movement(struct why *why, double metres, const struct plan *plan)
{
    struct why_line *line = &why->lines[why->line_count - 1];

    if (why_units(plan) == UNITS_US)
        snprintf(line->value, sizeof line->value, "%.4f in", metres / 0.0254);
    else
        snprintf(line->value, sizeof line->value, "%.2f mm", metres * 1000);
}

static void ladder_open(const struct plan *plan, const struct ladder *l, struct why *why)
{
    const char *temperatures = why_whose(plan, FIELD_climate_slab_coldest);
    double cooling = l->ts - l->tmin;

    why_step(why, "1", "rules.spacing", "plan", "A joint takes up one panel length");
    set_sum_format(why, l->length, plan, "half of the panel on each side");
    why_show_number(plan, l->length, QUANTITY_LENGTH, why->lines[why->line_count - 1].value,
                    sizeof why->lines->value);
    why_step(why, "2", "climate.slab-coldest", temperatures, "Slab cools from sealing to coldest");
    snprintf(why->lines[why->line_count - 1].sum, sizeof why->lines->sum, "%.4g - (%.4g)", l->ts,
             l->tmin);
    why_show_number(plan, cooling, QUANTITY_DIFFERENCE, why->lines[why->line_count - 1].value,
                    sizeof why->lines->value);
    why_step(why, "", "concrete.expansion", why_whose(plan, FIELD_concrete_expansion),
             "and shortens by the expansion of its stone");
    set_sum_format(why, 0, plan, "%.0f x %.3ge-6 x %.4g", l->length * 1000, l->a * 1e6, cooling);
    set_movement(why, l->length * l->a * cooling, plan);
    why_step(why, "3", "concrete.shrinkage", plan->shrinkage.basis, "and dries a little more");
    set_sum_format(why, 0, plan, "%.0f x %.4ge-6", l->length * 1000, l->e * 1e6);
    set_movement(why, l->length * l->e, plan);
}

static void ladder_held_back(const struct plan *plan, const struct ladder *l, struct why *why)
{
    double free_open = l->length * plan_open_strain(plan);

    if (plan->job.sealing_movement == MOVEMENT_FACTOR)
        why_step(why, "4", "sealing.factor", why_whose(plan, FIELD_sealing_factor),
                 "The base holds some back: %.2f gets through", plan->movement.factor);
    else
        why_step(why, "4", "base.friction", why_whose(plan, FIELD_base_friction),
                 "The base holds back %.1f %% by friction",
                 free_open > 0 ? 100 * (1 - l->open / free_open) : 0.0);
    set_sum_format(why, 0, plan, "the joint opens by");
    set_movement(why, l->open, plan);
    why_step(why, "5", "climate.slab-hottest", why_whose(plan, FIELD_climate_slab_hottest),
             "Slab warms from sealing to hottest");
    set_sum_format(why, 0, plan, "%.4g - (%.4g): it closes by", l->tmax, l->ts);
    set_movement(why, l->close, plan);
}

static void ladder_width(const struct plan *plan, const struct ladder *l, struct why *why)
{
    double stretch = plan->seal.extension_capacity, squeeze = plan->seal.compression_capacity;
    struct why_line *line;

    why_step(why, "6", "sealant.class", why_whose(plan, FIELD_sealant_class),
             "Sealant may be stretched %.3g %%, squeezed %.3g %%", 100 * stretch, 100 * squeeze);
    set_sum_format(why, plan->seal.least_width_m, plan, "%.3f/%.3g, %.3f/%.3g: at least",
                   l->open * 1000, stretch, l->close * 1000, squeeze);
    set_movement(why, plan->seal.least_width_m, plan);
    why_step(why, "7", "sealant.width", why_whose(plan, FIELD_sealant_width),
             plan->seal.chosen ? "The narrowest blade that holds: it stretches"
                               : "You cut this wide: it stretches");
    line = &why->lines[why->line_count - 1];
    snprintf(line->sum, sizeof line->sum, "%.3f / %.4g", l->open * 1000, plan->seal.width_m * 1000);
    snprintf(line->value, sizeof line->value, "%.1f %%", 100 * plan->seal.extension);
    why_step(why, "", "", verdict_screen_word(plan->seal.verdict), "and is squeezed");
    line = &why->lines[why->line_count - 1];
    snprintf(line->sum, sizeof line->sum, "%.3f / %.4g", l->close * 1000,
             plan->seal.width_m * 1000);
    snprintf(line->value, sizeof line->value, "%.1f %%", 100 * plan->seal.compression);
}

__attribute__((format(printf, 3, 4))) static void try_it(struct why *why, double ratio,
                                                         const char *words, ...)
{
    va_list arguments;
    size_t n = why->try_count;

    if (n >= sizeof why->tries / sizeof *why->tries || !isfinite(ratio))
        return;
    va_start(arguments, words);
    vsnprintf(why->tries[n].words, sizeof why->tries[n].words, words, arguments);
    va_end(arguments);
    snprintf(why->tries[n].value, sizeof why->tries[n].value, "%.1f %%", 100 * ratio);
    why->try_count++;
}

static void try_width(const struct plan *plan, const struct ladder *l, double width_m,
                      struct why *why)
{
    char words[VALUE_MOST];

    why_show_number(plan, width_m, QUANTITY_SMALL_LENGTH, words, sizeof words);
    try_it(why, l->open / width_m, "%s wide", words);
}

/* What the stretch would be with another width, temperature, drying or panel (same hold-back). */
static void add_tries(const struct plan *plan, const struct ladder *l, struct why *why)
{
    double free_open = l->length * plan_open_strain(plan);
    double share = free_open > 0 ? l->open / free_open : 1, w = plan->seal.width_m;
    double cap = plan->seal.extension_capacity;

    try_it(why, share * l->length * (l->a * (l->ts - l->tmin + 5) + l->e) / w, "winter 5 K colder");
    try_it(why, share * l->length * (l->a * (l->ts - l->tmin) + l->e * 1.5) / w,
           "drying half more");
    try_it(why, l->open * 1.2 / w, "panels 1/5 longer");
    try_it(why, free_open / w, "base holds nothing");
    try_width(plan, l, plan->seal.next_down_m, why);
    try_width(plan, l, plan->seal.next_up_m, why);
    for (size_t i = 0; i < plan->working_count; i++)
        if (plan->working[i].n == 3)
            try_it(why, plan->working[i].extension, "1 cut in 3 works");
    for (size_t i = 0; i < why->try_count; i++)
        snprintf(why->tries[i].verdict, sizeof why->tries[i].verdict, "%s",
                 verdict_screen_word(verdict_of(atof(why->tries[i].value) / 100, cap)));
}

enum status why_width(const struct plan *plan, const char *path, struct why *why)
{
    struct ladder l = ladder_of(plan);
    char width[VALUE_MOST], least[VALUE_MOST];
    const struct why_row *row = why_row_find(plan, path);

    if (!plan->seal.sealed || !isfinite(plan->seal.width_m) || !isfinite(l.open) || row == NULL)
        return why_result(plan, path, why);
    *why = (struct why){0};
    why_show_number(plan, plan->seal.width_m, QUANTITY_SMALL_LENGTH, width, sizeof width);
    why_show_number(plan, plan->seal.least_width_m, QUANTITY_SMALL_LENGTH, least, sizeof least);
    snprintf(why->question, sizeof why->question, "is the joint %s wide?", width);
    if (plan->seal.chosen)
        snprintf(why->answer, sizeof why->answer,
                 "Because it is the narrowest blade that holds with room. It must be at least %s.",
                 least);
    else
        snprintf(why->answer, sizeof why->answer, "Because you typed %s. It must be at least %s.",
                 width, least);
    ladder_open(plan, &l, why);
    ladder_held_back(plan, &l, why);
    ladder_width(plan, &l, why);
    add_tries(plan, &l, why);
    snprintf(why->formula, sizeof why->formula, "%s",
             "open = C L (a (Ts - Tmin) + e), close = C L a (Tmax - Ts), "
             "width >= open/stretch, width >= close/squeeze");
    snprintf(why->source, sizeof why->source, "%s; steps 2 to 5: %s", row->source,
             why_row_find(plan, "movement.open_m")->source);
    snprintf(why->valid, sizeof why->valid,
             "Slab that slides on its base, every cut cracked, panels alike. %s", row->valid);
    return STATUS_OK;
}
