#include "plan/why.h"
#include "base/utf8.h"
#include "job/field.h"
#include "plan/plan_steps.h"
#include "plan/result.h"
#include "plan/why_table.h"
#include <math.h>
#include <stdarg.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

enum { VALUE_MOST = 48 };

static enum unit_system units_of(const struct plan *plan)
{
    return (enum unit_system)plan->job.job_units;
}

static void show_number(const struct plan *plan, double si, enum quantity quantity, char *out,
                        size_t size)
{
    struct text text = {0};

    unit_show(&text, si, quantity, units_of(plan));
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

/* The value behind a path (result or field) and whose it is. False when there is none. */
static bool value_of(const struct plan *plan, const char *path, char *value, size_t value_size,
                     char *from, size_t from_size)
{
    const struct result *result = result_find(path);
    enum field_id id = field_of(path);
    struct text text = {0};

    if (result != NULL) {
        if (result->type == RESULT_NUMBER && !isfinite(result_number(result, plan)))
            return false;
        result_show(&text, result, plan, units_of(plan));
        snprintf(from, from_size, "worked out");
    } else if (id < FIELD_COUNT && has_value(plan, id)) {
        field_show(&text, &plan->job, id, units_of(plan));
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

/* A line of the ladder: "2  Slab cools from 15 to -8   15 - -8   23 K   you". */
__attribute__((format(printf, 5, 6))) static void step(struct why *why, const char *number,
                                                       const char *field, const char *from,
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

static void set_sum(struct why *why, const char *sum, const char *value)
{
    struct why_line *line = &why->lines[why->line_count - 1];

    snprintf(line->sum, sizeof line->sum, "%s", sum);
    snprintf(line->value, sizeof line->value, "%s", value);
}

static const char *whose(const struct plan *plan, enum field_id id)
{
    return plan->job.given[id] ? "you" : "usual";
}

/* ---- a result by the table ---- */

static void add_symbols(const struct plan *plan, const struct why_row *row, struct why *why)
{
    for (size_t i = 0; i < WHY_SYMBOLS && row->symbols[i].symbol != NULL; i++) {
        char value[VALUE_MOST], from[64];
        const struct why_symbol *symbol = &row->symbols[i];
        bool field = field_of(symbol->path) < FIELD_COUNT;
        if (!value_of(plan, symbol->path, value, sizeof value, from, sizeof from))
            continue;
        step(why, symbol->symbol, field ? symbol->path : "", from, "%s", symbol->words);
        set_sum(why, "", value);
    }
}

static enum status why_result(const struct plan *plan, const char *path, struct why *why)
{
    const struct result *result = result_find(path);
    const struct why_row *row = why_row_find(plan, path);
    struct text value = {0};

    if (result == NULL || row == NULL)
        return STATUS_REFUSED;
    *why = (struct why){0};
    result_show(&value, result, plan, units_of(plan));
    snprintf(why->question, sizeof why->question, "%s: %s", result->label, text_string(&value));
    snprintf(why->formula, sizeof why->formula, "%s", row->formula);
    snprintf(why->source, sizeof why->source, "%s", row->source);
    snprintf(why->valid, sizeof why->valid, "%s", row->valid);
    add_symbols(plan, row, why);
    step(why, "=", "", "", "%s", result->label);
    set_sum(why, "", text_string(&value));
    text_free(&value);
    return STATUS_OK;
}

/* ---- the ladder of the joint's width ---- */

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
    show_number(plan, si, QUANTITY_SMALL_LENGTH, line->value, sizeof line->value);
}

/* Movements in full: they are too small for the trade's rounding. */
static void set_movement(struct why *why, double metres, const struct plan *plan)
{
    struct why_line *line = &why->lines[why->line_count - 1];

    if (units_of(plan) == UNITS_US)
        snprintf(line->value, sizeof line->value, "%.4f in", metres / 0.0254);
    else
        snprintf(line->value, sizeof line->value, "%.2f mm", metres * 1000);
}

static void ladder_open(const struct plan *plan, const struct ladder *l, struct why *why)
{
    const char *temperatures = whose(plan, FIELD_climate_slab_coldest);
    double cooling = l->ts - l->tmin;

    step(why, "1", "rules.spacing", "plan", "A joint takes up one panel length");
    set_sum_format(why, l->length, plan, "half of the panel on each side");
    show_number(plan, l->length, QUANTITY_LENGTH, why->lines[why->line_count - 1].value,
                sizeof why->lines->value);
    step(why, "2", "climate.slab-coldest", temperatures, "Slab cools from sealing to coldest");
    snprintf(why->lines[why->line_count - 1].sum, sizeof why->lines->sum, "%.4g - (%.4g)", l->ts,
             l->tmin);
    show_number(plan, cooling, QUANTITY_DIFFERENCE, why->lines[why->line_count - 1].value,
                sizeof why->lines->value);
    step(why, "", "concrete.expansion", whose(plan, FIELD_concrete_expansion),
         "and shortens by the expansion of its stone");
    set_sum_format(why, 0, plan, "%.0f x %.3ge-6 x %.4g", l->length * 1000, l->a * 1e6, cooling);
    set_movement(why, l->length * l->a * cooling, plan);
    step(why, "3", "concrete.shrinkage", plan->shrinkage.basis, "and dries a little more");
    set_sum_format(why, 0, plan, "%.0f x %.4ge-6", l->length * 1000, l->e * 1e6);
    set_movement(why, l->length * l->e, plan);
}

static void ladder_held_back(const struct plan *plan, const struct ladder *l, struct why *why)
{
    double free_open = l->length * plan_open_strain(plan);

    if (plan->job.sealing_movement == MOVEMENT_FACTOR)
        step(why, "4", "sealing.factor", whose(plan, FIELD_sealing_factor),
             "The base holds some back: %.2f gets through", plan->movement.factor);
    else
        step(why, "4", "base.friction", whose(plan, FIELD_base_friction),
             "The base holds back %.1f %% by friction",
             free_open > 0 ? 100 * (1 - l->open / free_open) : 0.0);
    set_sum_format(why, 0, plan, "the joint opens by");
    set_movement(why, l->open, plan);
    step(why, "5", "climate.slab-hottest", whose(plan, FIELD_climate_slab_hottest),
         "Slab warms from sealing to hottest");
    set_sum_format(why, 0, plan, "%.4g - (%.4g): it closes by", l->tmax, l->ts);
    set_movement(why, l->close, plan);
}

static void ladder_width(const struct plan *plan, const struct ladder *l, struct why *why)
{
    double stretch = plan->seal.extension_capacity, squeeze = plan->seal.compression_capacity;
    struct why_line *line;

    step(why, "6", "sealant.class", whose(plan, FIELD_sealant_class),
         "Sealant may be stretched %.3g %%, squeezed %.3g %%", 100 * stretch, 100 * squeeze);
    set_sum_format(why, plan->seal.least_width_m, plan, "%.3f/%.3g, %.3f/%.3g: at least",
                   l->open * 1000, stretch, l->close * 1000, squeeze);
    set_movement(why, plan->seal.least_width_m, plan);
    step(why, "7", "sealant.width", whose(plan, FIELD_sealant_width),
         plan->seal.chosen ? "The narrowest blade that holds: it stretches"
                           : "You cut this wide: it stretches");
    line = &why->lines[why->line_count - 1];
    snprintf(line->sum, sizeof line->sum, "%.3f / %.4g", l->open * 1000, plan->seal.width_m * 1000);
    snprintf(line->value, sizeof line->value, "%.1f %%", 100 * plan->seal.extension);
    step(why, "", "", verdict_screen_word(plan->seal.verdict), "and is squeezed");
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

    show_number(plan, width_m, QUANTITY_SMALL_LENGTH, words, sizeof words);
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

static enum status why_width(const struct plan *plan, const char *path, struct why *why)
{
    struct ladder l = ladder_of(plan);
    char width[VALUE_MOST], least[VALUE_MOST];
    const struct why_row *row = why_row_find(plan, path);

    if (!plan->seal.sealed || !isfinite(plan->seal.width_m) || !isfinite(l.open) || row == NULL)
        return why_result(plan, path, why);
    *why = (struct why){0};
    show_number(plan, plan->seal.width_m, QUANTITY_SMALL_LENGTH, width, sizeof width);
    show_number(plan, plan->seal.least_width_m, QUANTITY_SMALL_LENGTH, least, sizeof least);
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

/* ---- list rows: joints.ID.key, checks.ID, spacing.limits.RULE ---- */

static enum status why_joint(const struct plan *plan, const char *path, struct why *why)
{
    char id[48];
    const char *dot = strrchr(path, '.');
    char known[64];

    if (dot == NULL || (size_t)(dot - path) >= sizeof id)
        return STATUS_REFUSED;
    snprintf(id, sizeof id, "%.*s", (int)(dot - path), path);
    for (size_t i = 0; i < plan->layout.joint_count && plan->joints != NULL; i++) {
        struct plan one = *plan; /* a shallow view whose governing joint is this one; never freed */
        const struct plan_joint *joint = &plan->joints[i];
        if (strcmp(plan->layout.joints[i].id, id) != 0)
            continue;
        one.movement.open_m = joint->open_m;
        one.movement.close_m = joint->close_m;
        one.movement.panel_m = joint->run_m;
        one.seal.width_m = joint->width_m;
        one.seal.extension = joint->extension;
        one.seal.compression = joint->compression;
        one.seal.verdict = joint->verdict;
        snprintf(known, sizeof known, "%s%s",
                 strstr(dot, "open") || strstr(dot, "close") || strstr(dot, "panel") ? "movement"
                                                                                     : "seal",
                 dot);
        return result_find(known) != NULL ? why_result(&one, known, why) : STATUS_REFUSED;
    }
    return STATUS_REFUSED;
}

static void set_check_side(struct why *why, const struct plan *plan, double value, const char *unit)
{
    struct text text = {0};

    check_show(&text, value, unit, units_of(plan));
    set_sum(why, "", text_string(&text));
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
        add_symbols(plan, row, why);
}

static enum status why_check(const struct plan *plan, const char *id, struct why *why)
{
    char path[96];

    snprintf(path, sizeof path, "checks.%s", strncmp(id, "filler.", 7) == 0 ? "filler" : id);
    for (size_t i = 0; i < plan->check_count; i++) {
        const struct plan_check *check = &plan->checks[i];
        if (strcmp(check->id, id) != 0)
            continue;
        *why = (struct why){0};
        snprintf(why->question, sizeof why->question, "%s: %s", check->label,
                 verdict_screen_word(check->verdict));
        if (check->verdict == VERDICT_FAILS)
            snprintf(why->answer, sizeof why->answer, "%s", check->remedy);
        explain(plan, path,
                check->binding ? "This check decides the exit status."
                               : "Advice: it never decides.",
                check->source, why);
        step(why, "=", "", "worked out", "what is asked for");
        set_check_side(why, plan, check->demand, check->unit);
        step(why, "limit", "", "", "at most");
        set_check_side(why, plan, check->capacity, check->unit);
        return STATUS_OK;
    }
    return STATUS_REFUSED;
}

static enum status why_limit(const struct plan *plan, const char *rule, struct why *why)
{
    char path[96];

    snprintf(path, sizeof path, "spacing.limits.%s", rule);
    for (size_t i = 0; i < plan->spacing.count; i++) {
        const struct plan_limit *row = &plan->spacing.rows[i];
        char value[VALUE_MOST];
        if (strcmp(row->rule, rule) != 0)
            continue;
        *why = (struct why){0};
        show_number(plan, row->limit_m, QUANTITY_LENGTH, value, sizeof value);
        snprintf(why->question, sizeof why->question, "Spacing by %s: %s", row->rule, value);
        snprintf(why->answer, sizeof why->answer, "%s.", row->words);
        explain(plan, path,
                row->counts ? "This row counts." : "Advice: it never shortens the spacing.",
                row->source, why);
        step(why, "=", "", "worked out", "limit by this row");
        set_sum(why, "", value);
        return STATUS_OK;
    }
    return STATUS_REFUSED;
}

/* Lists whose rows share one derivation. */
static const struct {
    const char *prefix, *as;
} lists[] = {
    {"working", "checks.working"},
    {"sealing_table", "seal.window_coldest_c"},
    {"quantities.packages", "quantities.sealant_order_l"},
    {"quantities.rod_m", "seal.rod_m"},
};

enum status why_make(const struct plan *plan, const char *path, struct why *why)
{
    char id[128];

    for (size_t i = 0; i < sizeof lists / sizeof *lists; i++) {
        size_t length = strlen(lists[i].prefix);
        if (strncmp(path, lists[i].prefix, length) == 0 &&
            (path[length] == '.' || path[length] == '\0'))
            return why_make(plan, lists[i].as, why);
    }
    if (strncmp(path, "joints.", 7) == 0)
        return why_joint(plan, path + 7, why);
    if (strncmp(path, "checks.", 7) == 0)
        return why_check(plan, path + 7, why);
    if (strncmp(path, "isolation.", 10) == 0) { /* isolation.edge3, isolation.C1 */
        snprintf(id, sizeof id, "filler.%.100s", path + 10);
        return why_check(plan, id, why);
    }
    if (strncmp(path, "spacing.limits.", 15) == 0)
        return why_limit(plan, path + 15, why);
    if (strcmp(path, "seal.width_m") == 0 || strcmp(path, "seal.extension") == 0)
        return why_width(plan, path, why);
    return why_result(plan, path, why);
}
