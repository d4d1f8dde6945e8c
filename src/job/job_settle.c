/* Defaults that depend on other fields, and fields that contradict each other (docs/format.md "When
 * a key is missing"; the tables in share/tables hold the values with their sources). */
#include "job/field.h"
#include "job/table.h"
#include <math.h>
#include <string.h>

static bool bound_base(const struct job *job)
{
    return job->base_kind == BASE_STABILISED || job->base_kind == BASE_ASPHALT;
}

static void default_to(double *place, double value)
{
    if (isnan(*place))
        *place = value;
}

__attribute__((format(printf, 5, 6))) static void say(const struct job *job,
                                                      struct finding_list *findings,
                                                      enum severity severity, enum field_id id,
                                                      const char *format, ...)
{
    struct text value = {0}, path = {0}, message = {0};
    va_list arguments;

    if (job->given[id])
        field_show(&value, job, id, job->job_units == 1 ? UNITS_US : UNITS_METRIC);
    text_format(&path, "%s.%s", field_table[id].section, field_table[id].key);
    text_format(&message, "%s: ", text_string(&path));
    va_start(arguments, format);
    text_vformat(&message, format, arguments);
    va_end(arguments);
    finding_add(findings, severity, text_string(&path), text_string(&value), "", 0, 0, "%s",
                text_string(&message));
    text_free(&value);
    text_free(&path);
    text_free(&message);
}

/* ---- base ---- */

static void settle_friction(struct job *job, struct finding_list *findings)
{
    const struct base_row *base = &base_table[job->base_kind];
    double low = base->low, mean = base->mean, high = base->high, slip = base->slip;

    if (job->base_interlayer != INTERLAYER_NONE) {
        const struct interlayer_row *layer = &interlayer_table[job->base_interlayer];
        low = layer->low;
        mean = layer->mean;
        high = layer->high;
        slip = layer->slip;
        if (job->base_kind == BASE_STABILISED && job->base_interlayer != INTERLAYER_SHEET)
            slip = base->slip;
    }
    default_to(&job->base_slip, slip);
    default_to(&job->base_friction, mean);
    /* a typed mean outside the usual range widens the range */
    default_to(&job->base_friction_low, fmin(low, job->base_friction));
    default_to(&job->base_friction_high, fmax(high, job->base_friction));
    if (job->base_friction_low > job->base_friction || job->base_friction > job->base_friction_high)
        say(job, findings, SEVERITY_WARNING, FIELD_base_friction,
            "friction %g is not between the low value %g and the high value %g; check the three",
            job->base_friction, job->base_friction_low, job->base_friction_high);
}

static void settle_factor(struct job *job, struct finding_list *findings)
{
    bool low = bound_base(job) && job->base_interlayer == INTERLAYER_NONE;

    if (job->given[FIELD_sealing_factor] && job->sealing_movement == MOVEMENT_FRICTION)
        say(job, findings, SEVERITY_NOTE, FIELD_sealing_factor,
            "not used; movement is worked out from friction. Write movement = factor to use it.");
    if (job->given[FIELD_sealing_factor] && job->sealing_movement == MOVEMENT_FACTOR &&
        job->base_interlayer == INTERLAYER_SHEET && job->sealing_factor < 0.80)
        say(job, findings, SEVERITY_WARNING, FIELD_sealing_factor,
            "%g is too little over a sheet: it lets the slab slide, so the factor is at least "
            "0.80; the movement from friction stands beside it.",
            job->sealing_factor);
    default_to(&job->sealing_factor, low ? 0.65 : 0.80);
}

/* ---- concrete ---- */

static void settle_expansion(struct job *job, struct finding_list *findings)
{
    int row = job->concrete_aggregate.row;

    if (job->given[FIELD_concrete_expansion] && row >= 0)
        say(job, findings, SEVERITY_NOTE, FIELD_concrete_aggregate,
            "not used; the typed expansion wins over the stone.");
    default_to(&job->concrete_expansion, row >= 0 ? aggregate_table[row].expansion : 10e-6);
}

static void settle_shrinkage(struct job *job, struct finding_list *findings)
{
    bool typed;

    if (!job->given[FIELD_concrete_shrinkage_model])
        job->concrete_shrinkage_model =
            job->job_practice == PRACTICE_US ? SHRINKAGE_ACI209 : SHRINKAGE_EN1992;
    typed = job->concrete_shrinkage_model == SHRINKAGE_TYPED;
    if (typed && !job->given[FIELD_concrete_shrinkage]) {
        if (job->sealing_kind == SEALING_RESEAL)
            job->concrete_shrinkage = 0;
        else
            say(job, findings, SEVERITY_ERROR, FIELD_concrete_shrinkage,
                "missing; with shrinkage-model = typed give the strain still to come after "
                "sealing, such as 200e-6.");
    }
    if (!typed && job->given[FIELD_concrete_shrinkage])
        say(job, findings, SEVERITY_NOTE, FIELD_concrete_shrinkage,
            "not used; it counts only with shrinkage-model = typed. A tested ultimate value is "
            "shrinkage-ultimate.");
    if (typed && job->given[FIELD_concrete_shrinkage_ultimate])
        say(job, findings, SEVERITY_NOTE, FIELD_concrete_shrinkage_ultimate,
            "not used; with shrinkage-model = typed only the strain after sealing counts.");
}

/* ---- climate ---- */

static void check_order(const struct job *job, struct finding_list *findings, enum field_id cold_id,
                        double coldest, double hottest)
{
    struct text cold = {0}, hot = {0};
    enum unit_system units = job->job_units == 1 ? UNITS_US : UNITS_METRIC;

    if (!(coldest > hottest))
        return;
    unit_show(&cold, coldest, QUANTITY_TEMPERATURE, units);
    unit_show(&hot, hottest, QUANTITY_TEMPERATURE, units);
    say(job, findings, SEVERITY_ERROR, cold_id,
        "the coldest, %s, is above the hottest, %s; swap the two.", text_string(&cold),
        text_string(&hot));
    text_free(&cold);
    text_free(&hot);
}

/* Typed, but no answer of this version leans on it: said, never silent. */
static void note_unused(struct job *job, struct finding_list *findings)
{
    if (job->given[FIELD_climate_file] && job->weather == NULL)
        say(job, findings, SEVERITY_WARNING, FIELD_climate_file,
            "the weather file was not read here; the slab's year is made from the coldest and "
            "hottest air.");
}

/* The record's air stands for the typed range. */
static void settle_record(struct job *job, struct finding_list *findings, bool both)
{
    static const enum field_id unused[] = {FIELD_climate_air_coldest, FIELD_climate_air_hottest,
                                           FIELD_climate_swing_cold, FIELD_climate_swing_hot};

    if (both)
        say(job, findings, SEVERITY_NOTE, FIELD_climate_file,
            "gives only the course of the year; the typed slab temperatures win over it.");
    for (size_t i = 0; !both && i < sizeof unused / sizeof *unused; i++)
        if (job->given[unused[i]])
            say(job, findings, SEVERITY_NOTE, unused[i],
                "not used; the air of the weather file wins.");
    if (job->given[FIELD_climate_sun] && job->weather->has_sun)
        say(job, findings, SEVERITY_NOTE, FIELD_climate_sun,
            "not used; the sun of the weather file wins.");
    if (fabs(job->weather->latitude_deg - job->place_latitude) > 2)
        say(job, findings, SEVERITY_WARNING, FIELD_place_latitude,
            "the station of the weather file stands at %.1f deg; check the two.",
            job->weather->latitude_deg);
    job->climate_air_coldest = job->weather->coldest_c;
    job->climate_air_hottest = job->weather->hottest_c;
}

static void settle_climate(struct job *job, struct finding_list *findings)
{
    bool both = job->given[FIELD_climate_slab_coldest] && job->given[FIELD_climate_slab_hottest];
    bool at_set = job->pour_date.year != 0 && isnan(job->pour_zero_stress_temperature);
    const char *words = at_set ? "used for the slab at set only; the typed slab temperatures win "
                                 "over the air."
                               : "not used; the typed slab temperatures win over the air.";

    check_order(job, findings, FIELD_climate_slab_coldest, job->climate_slab_coldest,
                job->climate_slab_hottest);
    check_order(job, findings, FIELD_climate_air_coldest, job->climate_air_coldest,
                job->climate_air_hottest);
    if (both && job->given[FIELD_climate_air_coldest])
        say(job, findings, SEVERITY_NOTE, FIELD_climate_air_coldest, "%s", words);
    if (both && job->given[FIELD_climate_air_hottest])
        say(job, findings, SEVERITY_NOTE, FIELD_climate_air_hottest, "%s", words);
    if (job->weather != NULL)
        settle_record(job, findings, both);
}

/* ---- sealing ---- */

static void settle_sealing_temperature(struct job *job, struct finding_list *findings)
{
    double coldest = job->climate_slab_coldest, hottest = job->climate_slab_hottest;

    if (job->given[FIELD_sealing_temperature] && job->sealing_temperature >= hottest)
        say(job, findings, SEVERITY_WARNING, FIELD_sealing_temperature,
            "as hot as the slab ever gets: no closing is left and all the opening is still to "
            "come; seal on a cooler day.");
    if (job->given[FIELD_sealing_temperature] && job->sealing_temperature < coldest)
        say(job, findings, SEVERITY_WARNING, FIELD_sealing_temperature,
            "colder than the coldest slab typed; check the two.");
    default_to(&job->sealing_temperature, (coldest + hottest) / 2);
    default_to(&job->sealing_cut_temperature, job->sealing_temperature);
    if (job->job_practice == PRACTICE_US && !job->given[FIELD_sealing_least_temperature]) {
        /* 50 F hot-pour, 40 F silicone in US practice [from memory] */
        if (job->sealant_kind == SEALANT_HOT_POUR)
            job->sealing_least_temperature = 10;
        else if (job->sealant_kind == SEALANT_SILICONE)
            job->sealing_least_temperature = 4;
    }
}

static void check_dates(const struct job *job, struct finding_list *findings)
{
    if (job->sealing_date.year == 0)
        return;
    if (job->pour_date.year == 0)
        say(job, findings, SEVERITY_NOTE, FIELD_sealing_date,
            "without pour.date the age at sealing is not known; 28 days are taken.");
    else if (date_days(job->sealing_date) < date_days(job->pour_date))
        say(job, findings, SEVERITY_ERROR, FIELD_sealing_date,
            "before the day of pouring; check pour.date and sealing.date.");
}

static bool class_serves(const struct job *job)
{
    return job->sealant_kind <= SEALANT_HOT_POUR;
}

static void settle_sealant(struct job *job, struct finding_list *findings)
{
    bool extension = job->given[FIELD_sealant_extension];
    bool compression = job->given[FIELD_sealant_compression];

    if (!job->given[FIELD_sealant_class] && job->sealant_kind == SEALANT_HOT_POUR)
        job->sealant_class = (struct movement_class){0.20, 0.20, "20"};
    if (job->given[FIELD_sealant_class] && extension && compression)
        say(job, findings, SEVERITY_NOTE, FIELD_sealant_class,
            "not used; the typed extension and compression win over the class.");
    else if (job->given[FIELD_sealant_class] && !class_serves(job))
        say(job, findings, SEVERITY_NOTE, FIELD_sealant_class,
            "not used; this kind of sealant has no movement class.");
    if (class_serves(job)) {
        default_to(&job->sealant_extension, job->sealant_class.extension);
        default_to(&job->sealant_compression, job->sealant_class.compression);
    }
    if (job->sealant_seal_least >= job->sealant_seal_most)
        say(job, findings, SEVERITY_ERROR, FIELD_sealant_seal_least,
            "the least squeeze must be below the most; swap the two.");
    if (job->given[FIELD_sealant_type] && job->sealant_kind != SEALANT_HOT_POUR)
        say(job, findings, SEVERITY_NOTE, FIELD_sealant_type,
            "not used; it belongs to hot-pour sealants.");
}

static void settle_takeoff(struct job *job, struct finding_list *findings)
{
    /* Metres an hour of one tool: hand guns 25 to 40 from memory; pump 90 to 210, melter 270 to
     * 480: FHWA-RD-99-147 Table 8. */
    static const double usual[] = {32, 150, 375};
    size_t prices = job->takeoff_prices.count, packs = job->takeoff_packages.count;

    if (!job->given[FIELD_takeoff_tool] && job->sealant_kind == SEALANT_HOT_POUR)
        job->takeoff_tool = TOOL_MELTER;
    default_to(&job->takeoff_tool_pace, usual[job->takeoff_tool] / 3600);
    if (prices > 0 && prices != packs)
        say(job, findings, SEVERITY_ERROR, FIELD_takeoff_prices,
            "one price for each pack, in the order of takeoff.packages; the decimal sign is a dot "
            "(4.20).");
    if (job->given[FIELD_sealant_batch] && isnan(job->sealant_pot_life))
        say(job, findings, SEVERITY_NOTE, FIELD_sealant_batch,
            "not used until sealant.pot-life is typed.");
}

/* ---- the rest ---- */

static void settle_rules(struct job *job, struct finding_list *findings)
{
    default_to(&job->rules_stiffness, bound_base(job) ? 5 : 6);
    if (job->job_practice == PRACTICE_INDIA)
        default_to(&job->rules_drag_stress, 80e3);
    if (job->given[FIELD_rules_spacing_across] && !job->given[FIELD_rules_spacing])
        say(job, findings, SEVERITY_NOTE, FIELD_rules_spacing_across,
            "counts across the axis only; along it the spacing comes from the rules.");
    if (job->given[FIELD_rules_spacing] && job->rules_least_side > job->rules_spacing)
        say(job, findings, SEVERITY_ERROR, FIELD_rules_least_side,
            "the narrowest panel is wider than the spacing limit; make it smaller.");
}

static void settle_edges(struct job *job)
{
    for (size_t i = 0; i < job->edge_count; i++)
        if (!job->edges[i].treat_given)
            job->edges[i].treat =
                job->edges[i].against == AGAINST_SLAB ? TREAT_MATCH : TREAT_ISOLATE;
}

void job_settle(struct job *job, struct finding_list *findings)
{
    settle_friction(job, findings);
    settle_factor(job, findings);
    settle_expansion(job, findings);
    settle_shrinkage(job, findings);
    settle_climate(job, findings);
    note_unused(job, findings);
    settle_sealing_temperature(job, findings);
    check_dates(job, findings);
    settle_sealant(job, findings);
    settle_takeoff(job, findings);
    settle_rules(job, findings);
    settle_edges(job);
}
