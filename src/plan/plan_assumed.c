/* Which defaults an answer leans on, and which typed values rule over a rule. */
#include "job/field.h"
#include "plan/plan_steps.h"
#include <math.h>
#include <string.h>

/* ---- when a field has any say ---- */

static bool from_air(const struct job *job)
{
    return isnan(job->climate_slab_coldest) || isnan(job->climate_slab_hottest);
}

/* The slab's temperatures or, on a known day, the slab at set lean on the air. */
static bool uses_air(const struct job *job)
{
    return from_air(job) || (job->pour_date.year != 0 && isnan(job->pour_zero_stress_temperature));
}

static bool simulated(const struct job *job)
{
    return from_air(job) && job->climate_exposure != EXPOSURE_INDOOR;
}

static bool not_simulated(const struct job *job)
{
    return !simulated(job);
}

static bool dries_by_model(const struct job *job)
{
    return job->concrete_shrinkage_model != SHRINKAGE_TYPED;
}

static bool uses_humidity(const struct job *job)
{
    return dries_by_model(job) || simulated(job);
}

static bool dries_by_aci(const struct job *job)
{
    return job->concrete_shrinkage_model == SHRINKAGE_ACI209;
}

static bool has_class(const struct job *job)
{
    return job->sealant_kind <= SEALANT_HOT_POUR;
}

static bool moves_with_a_seal(const struct job *job)
{
    return has_class(job) || job->sealant_kind == SEALANT_COMPRESSION_SEAL;
}

static bool has_sealant(const struct job *job)
{
    return job->sealant_kind != SEALANT_NONE;
}

static bool has_pours(const struct job *job)
{
    return job->has_pours;
}

static bool is_hot_pour(const struct job *job)
{
    return job->sealant_kind == SEALANT_HOT_POUR;
}

static bool is_compression_seal(const struct job *job)
{
    return job->sealant_kind == SEALANT_COMPRESSION_SEAL;
}

static bool by_factor(const struct job *job)
{
    return job->sealing_movement == MOVEMENT_FACTOR;
}

static bool has_gradient(const struct job *job)
{
    return simulated(job) || fabs(job->slab_gradient + job->slab_built_in_gradient) > 0;
}

/* The first three days are worked out: they also say how warm the slab sets. */
static bool hardens(const struct job *job)
{
    return job->pour_date.year != 0 && job->given[FIELD_pour_start];
}

static bool is_sawn(const struct job *job)
{
    return hardens(job) && job->given[FIELD_pour_rate];
}

static bool has_ash(const struct job *job)
{
    return hardens(job) && job->concrete_fly_ash > 0;
}

static bool heats_or_dries(const struct job *job);

static bool without_zero_stress(const struct job *job)
{
    return isnan(job->pour_zero_stress_temperature);
}

static bool has_outline(const struct job *job)
{
    return job->outline.count >= 3;
}

static bool without_expansion(const struct job *job)
{
    return !job->given[FIELD_concrete_expansion];
}

static bool has_isolation(const struct job *job)
{
    return job->object_count + job->edge_count + job->opening_count > 0 ||
           isfinite(job->rules_expansion_every);
}

static bool never(const struct job *job)
{
    (void)job;
    return false;
}

/* Fields that have a say only at times; the others always have. `never`: no answer of this version
 * leans on them. */
static bool heats_or_dries(const struct job *job)
{
    return hardens(job) || dries_by_aci(job);
}

static const struct {
    enum field_id id;
    bool (*used)(const struct job *job);
} conditions[] = {
    {FIELD_place_utc_offset, never},
    {FIELD_slab_reinforced, never},
    {FIELD_slab_ties, never},
    {FIELD_slab_wheels, has_sealant},
    {FIELD_slab_slope, has_sealant},
    {FIELD_sealant_fuel, has_sealant},
    {FIELD_concrete_creep, never},
    {FIELD_climate_swing_cold, simulated},
    {FIELD_climate_cloud, simulated},
    {FIELD_slab_gradient, not_simulated},
    {FIELD_sawing_saws, never},
    {FIELD_sawing_pace, never},
    {FIELD_sealing_dew_margin, never},
    {FIELD_takeoff_loss_per_day, never}, /* none lost */
    {FIELD_takeoff_tool, has_sealant},
    {FIELD_takeoff_tools, has_sealant},
    {FIELD_takeoff_clean_pace, has_sealant},
    {FIELD_takeoff_rod_pace, has_class},
    {FIELD_takeoff_day, has_sealant},
    {FIELD_takeoff_rods, never}, /* the usual sizes */
    {FIELD_takeoff_blades, never},
    {FIELD_takeoff_prices, never},
    {FIELD_sealant_backing, has_class},
    {FIELD_rules_column_box, never},
    {FIELD_rules_table, never},
    {FIELD_rules_effort, never},
    {FIELD_rules_round_to, never},
    {FIELD_slab_built_in_gradient, has_gradient},
    {FIELD_rules_curling_share, has_gradient},
    {FIELD_concrete_aggregate, without_expansion},
    {FIELD_concrete_cement, dries_by_model},
    {FIELD_concrete_curing, dries_by_model},
    {FIELD_concrete_horizon, dries_by_model},
    {FIELD_climate_humidity, uses_humidity},
    {FIELD_concrete_cement_content, heats_or_dries},
    {FIELD_concrete_water_cement, hardens},
    {FIELD_concrete_slag, hardens},
    {FIELD_concrete_fly_ash, hardens},
    {FIELD_concrete_ash_lime, has_ash},
    {FIELD_concrete_c3s, hardens},
    {FIELD_concrete_c2s, hardens},
    {FIELD_concrete_c3a, hardens},
    {FIELD_concrete_c4af, hardens},
    {FIELD_concrete_so3, hardens},
    {FIELD_concrete_free_lime, hardens},
    {FIELD_concrete_magnesia, hardens},
    {FIELD_concrete_fineness, hardens},
    {FIELD_concrete_maturity, hardens},
    {FIELD_pour_placing_least, never},
    {FIELD_pour_placing_most, never},
    {FIELD_pour_cover, hardens},
    {FIELD_pour_truck, is_sawn},
    {FIELD_sawing_saws, is_sawn},
    {FIELD_sawing_pace, is_sawn},
    {FIELD_sawing_kind, is_sawn},
    {FIELD_sawing_ravel_strength, is_sawn},
    {FIELD_sawing_stress_share, is_sawn},
    {FIELD_sawing_relaxation, is_sawn},
    {FIELD_sawing_scatter_temperature, is_sawn},
    {FIELD_sawing_scatter_strength, is_sawn},
    {FIELD_sawing_shift, is_sawn},
    {FIELD_concrete_fines, dries_by_aci},
    {FIELD_concrete_air, dries_by_aci},
    {FIELD_climate_air_coldest, uses_air},
    {FIELD_climate_air_hottest, uses_air},
    {FIELD_climate_exposure, from_air},
    {FIELD_climate_swing_hot, simulated},
    {FIELD_climate_wind, simulated},
    {FIELD_climate_absorptivity, simulated},
    {FIELD_pour_placing_temperature, without_zero_stress},
    {FIELD_sealing_cut_temperature, never},
    {FIELD_sealing_factor, by_factor},
    {FIELD_sealing_working, moves_with_a_seal},
    {FIELD_sealing_tolerance, moves_with_a_seal},
    {FIELD_sealing_basis, has_class},
    {FIELD_sealing_least_temperature, has_sealant},
    {FIELD_sealant_extension, never}, /* by the class, which is named */
    {FIELD_sealant_compression, never},
    {FIELD_sealant_class, has_class},
    {FIELD_sealant_recess, has_sealant},
    {FIELD_sealant_type, is_hot_pour},
    {FIELD_sealant_seal_least, is_compression_seal},
    {FIELD_sealant_seal_most, is_compression_seal},
    {FIELD_isolation_share, has_isolation},
    {FIELD_rules_axis, has_outline},
    {FIELD_rules_aspect, has_outline},
    {FIELD_rules_least_side, has_outline},
    {FIELD_rules_least_angle, has_outline},
    {FIELD_takeoff_packages, has_sealant},
    {FIELD_takeoff_box, never},
    {FIELD_takeoff_waste, has_sealant},
    {FIELD_takeoff_rod_cusps, has_class},
    {FIELD_pours_direction, has_pours},
    {FIELD_pours_along, has_pours},
    {FIELD_pours_across, has_pours},
};

static bool has_a_say(const struct job *job, enum field_id id)
{
    for (size_t i = 0; i < sizeof conditions / sizeof *conditions; i++)
        if (conditions[i].id == id)
            return conditions[i].used(job);
    return true;
}

/* Texts, dates and numbers without a value are no defaults. */
static bool has_default(const struct job *job, enum field_id id)
{
    const struct field *field = &field_table[id];
    double number;

    switch (field->type) {
    case FIELD_TEXT:
    case FIELD_DATE:
    case FIELD_TIME:
    case FIELD_COUNTS:
        return false;
    case FIELD_NUMBER:
        memcpy(&number, (const char *)job + field->offset, sizeof number);
        return isfinite(number);
    default:
        return true;
    }
}

void plan_list_assumed(struct plan *plan)
{
    static const enum field_id overriding[] = {
        FIELD_rules_spacing,
        FIELD_rules_spacing_across,
        FIELD_climate_slab_coldest,
        FIELD_climate_slab_hottest,
        FIELD_sealing_factor,
        FIELD_base_friction,
        FIELD_concrete_modulus,
        FIELD_sealant_extension,
        FIELD_sealant_compression,
        FIELD_takeoff_length,
        FIELD_sealant_rod,
        FIELD_isolation_filler,
        FIELD_concrete_shrinkage_ultimate,
        FIELD_pour_zero_stress_temperature,
        FIELD_sawing_depth,
    };
    const struct job *job = &plan->job;

    for (int id = 0; id < FIELD_COUNT; id++)
        if (!job->given[id] && has_default(job, (enum field_id)id) &&
            has_a_say(job, (enum field_id)id))
            plan->assumed[plan->assumed_count++] = (enum field_id)id;
    for (size_t i = 0; i < sizeof overriding / sizeof *overriding; i++)
        if (job->given[overriding[i]])
            plan->overrides[plan->override_count++] = overriding[i];
}
