/* How far apart joints may be: a row per rule, which rows count, which one governs. */
#include "core/curling.h"
#include "core/mix.h"
#include "core/spacing.h"
#include "job/table.h"
#include "plan/plan_steps.h"
#include <math.h>
#include <stdio.h>
#include <string.h>

static struct spacing_slab spacing_slab_of(const struct job *job)
{
    return (struct spacing_slab){
        .practice = (enum spacing_practice)job->job_practice,
        .use = (enum spacing_use)job->slab_use,
        .base = (enum spacing_base)job->base_kind,
        .thickness_m = job->slab_thickness,
        .aggregate_m = job->given[FIELD_concrete_aggregate_size] ? job->concrete_aggregate_size : 0,
        .slump_m = isfinite(job->concrete_slump) ? job->concrete_slump : 0,
    };
}

__attribute__((format(printf, 6, 7))) static void add_row(struct plan *plan, const char *rule,
                                                          double limit_m, bool counts,
                                                          const char *source, const char *words,
                                                          ...)
{
    struct plan_limit *row;
    va_list arguments;

    if (plan->spacing.count >= LIMIT_MOST || !(limit_m < SPACING_UNLIMITED))
        return; /* no limit: no row */
    row = &plan->spacing.rows[plan->spacing.count++];
    *row =
        (struct plan_limit){.rule = rule, .limit_m = limit_m, .source = source, .counts = counts};
    va_start(arguments, words);
    vsnprintf(row->words, sizeof row->words, words, arguments);
    va_end(arguments);
}

static bool counts(const struct plan *plan, unsigned bit)
{
    return (plan->job.rules_counts.bits & bit) != 0;
}

static void add_practice_rows(struct plan *plan)
{
    struct spacing_slab slab = spacing_slab_of(&plan->job);
    struct spacing_rule rules[SPACING_RULE_MOST];
    size_t count = spacing_rules(&slab, rules);

    for (size_t i = 0; i < count; i++)
        add_row(plan, rules[i].rule, rules[i].limit_m, rules[i].counts, rules[i].source, "%s",
                rules[i].words);
}

static void add_agency_row(struct plan *plan)
{
    enum spacing_agency agency = (enum spacing_agency)plan->job.rules_table;
    double limit = spacing_agency(agency, plan->job.slab_thickness, NULL);

    if (plan->job.rules_table == AGENCY_NONE)
        return;
    if (limit > 0)
        add_row(plan, "table", limit, true, spacing_agency_source(agency), "the agency's table");
    else
        finding_add(&plan->findings, SEVERITY_WARNING, "rules.table", "", "", 0, 0,
                    "rules.table: the table has no row for this thickness; the other rules are "
                    "used. Type rules.spacing if you know the agency's value.");
}

double plan_drag_stress_allowed(const struct plan *plan)
{
    if (isfinite(plan->job.rules_drag_stress))
        return plan->job.rules_drag_stress;
    return plan->concrete.tensile_pa / 2; /* common practice */
}

double plan_crack_strain(const struct plan *plan)
{
    double before = plan->shrinkage.before_sealing;
    double fall = fmax(plan->temperature.crack_zero_c - plan->temperature.coldest_c, 0);

    return plan->concrete.expansion_k * fall + (isfinite(before) ? before : 0) +
           plan->shrinkage.after_sealing;
}

static void add_curling_row(struct plan *plan)
{
    const struct job *job = &plan->job;
    struct spacing_curling curling = {
        .modulus_pa = plan->concrete.modulus_pa,
        .expansion = plan->concrete.expansion_k,
        .radius_m = plan->concrete.stiffness_radius_m,
        .difference_k = plan->temperature.night_k,
        .unit_weight = job->concrete_unit_weight,
        .friction = job->base_friction_high,
        .allowed_pa = job->rules_curling_share * plan->concrete.rupture_pa,
    };

    if (!(curling.difference_k > 0))
        return; /* no gradient typed: nothing to say */
    add_row(plan, "curling", spacing_by_curling(&curling), counts(plan, COUNT_CURLING),
            "Westergaard 1927, Bradbury 1938; sum with the drag: derived",
            "curling and drag at %.0f %% of the bending strength", 100 * job->rules_curling_share);
}

/* The widest blade of the kind. */
static double widest_blade(const struct plan *plan)
{
    const struct sealant_row *kind = &sealant_table[plan->job.sealant_kind];
    double widths[PLAN_BLADES_MOST];
    size_t count = plan_blades(plan, widths);
    double widest = 0;

    if (isfinite(plan->job.sealant_width))
        return plan->job.sealant_width;
    for (size_t i = 0; i < count; i++)
        if (widths[i] <= kind->width_most + 1e-9)
            widest = fmax(widest, widths[i]);
    return widest;
}

static void add_sealant_row(struct plan *plan)
{
    double extension, compression,
        share = plan->job.sealing_movement == MOVEMENT_FACTOR ? plan->job.sealing_factor : 1;

    if (!plan_capacity(plan, &extension, &compression))
        return;
    add_row(plan, "sealant",
            spacing_by_sealant(widest_blade(plan) - plan->job.sealing_tolerance, extension,
                               compression, share * plan_open_strain(plan),
                               share * plan_close_strain(plan)),
            counts(plan, COUNT_SEALANT), "ASTM C920: change of width from the width at sealing",
            isfinite(plan->job.sealant_width) ? "your joint width still takes the movement"
                                              : "the widest joint still takes the movement");
}

static void add_advice_rows(struct plan *plan)
{
    const struct job *job = &plan->job;

    add_row(plan, "stiffness",
            spacing_by_stiffness(plan->concrete.stiffness_radius_m, job->rules_stiffness),
            counts(plan, COUNT_STIFFNESS), "FHWA T 5040.30 (1990); the ratio from memory",
            "%g x radius of relative stiffness", job->rules_stiffness);
    add_row(plan, "drag",
            spacing_by_drag(plan_drag_stress_allowed(plan), job->concrete_unit_weight,
                            job->base_friction_high),
            counts(plan, COUNT_DRAG), "L = 2 f/(gamma mu): subgrade drag theory",
            "drag of the base");
    add_curling_row(plan);
    if (!(job->slab_dowels.diameter > 0))
        add_row(plan, "interlock",
                spacing_by_interlock(job->rules_interlock, plan_crack_strain(plan)),
                counts(plan, COUNT_INTERLOCK),
                "Colley and Humphrey (1967): 0.9 mm, for slabs of about 9 in",
                isfinite(plan->shrinkage.before_sealing)
                    ? "stones still carry across the crack in winter"
                    : "stones still carry across; drying before sealing is not known");
    add_sealant_row(plan);
}

/* The least row that counts; NULL: none. */
static const struct plan_limit *least_row(const struct plan *plan)
{
    const struct plan_limit *least = NULL;

    for (size_t i = 0; i < plan->spacing.count; i++) {
        const struct plan_limit *row = &plan->spacing.rows[i];
        if (row->counts && (least == NULL || row->limit_m < least->limit_m))
            least = row;
    }
    return least;
}

static void set_applies(struct plan *plan, const struct plan_limit *governs)
{
    for (size_t i = 0; i < plan->spacing.count; i++) {
        struct plan_limit *row = &plan->spacing.rows[i];
        row->applies = row->limit_m < plan->spacing.limit_m - 1e-9 ? APPLIES_ADVICE : APPLIES_NO;
        if (row == governs)
            row->applies = APPLIES_GOVERNS;
    }
}

static void note_typed_over_rule(struct plan *plan)
{
    struct text typed = {0}, rule = {0};
    enum unit_system units = (enum unit_system)plan->job.job_units;

    if (plan->job.rules_spacing <= plan->spacing.rule_limit_m + 1e-9)
        return;
    unit_show(&typed, plan->job.rules_spacing, QUANTITY_LENGTH, units);
    unit_show(&rule, plan->spacing.rule_limit_m, QUANTITY_LENGTH, units);
    finding_add(&plan->findings, SEVERITY_WARNING, "rules.spacing", text_string(&typed),
                text_string(&rule), 0, 0,
                "rules.spacing: %s is more than %s (%s); your number is used. Expect cracks "
                "between the joints, or shorten it.",
                text_string(&typed), text_string(&rule), plan->spacing.rule_words);
    text_free(&typed);
    text_free(&rule);
}

void plan_set_spacing(struct plan *plan)
{
    const struct job *job = &plan->job;
    const struct plan_limit *governs;

    add_practice_rows(plan);
    add_agency_row(plan);
    add_advice_rows(plan);
    governs = least_row(plan);
    plan->spacing.rule_limit_m = governs != NULL ? governs->limit_m : SPACING_UNLIMITED;
    snprintf(plan->spacing.rule_words, sizeof plan->spacing.rule_words, "%s",
             governs != NULL ? governs->words : "no rule");
    plan->spacing.limit_m = plan->spacing.rule_limit_m;
    plan->spacing.governed_by = governs != NULL ? governs->rule : NULL;
    if (isfinite(job->rules_spacing)) {
        plan->spacing.limit_m = job->rules_spacing;
        plan->spacing.governed_by = "typed";
        note_typed_over_rule(plan);
        add_row(plan, "typed", job->rules_spacing, true, "typed by you", "typed by you");
        governs = &plan->spacing.rows[plan->spacing.count - 1];
    }
    plan->spacing.across_limit_m =
        isfinite(job->rules_spacing_across) ? job->rules_spacing_across : plan->spacing.limit_m;
    set_applies(plan, governs);
}
