/* Concrete, slab temperature, shrinkage: what the slab is and what it goes through. */
#include "base/text.h"
#include "core/mix.h"
#include "core/shrinkage.h"
#include "core/slab_temperature.h"
#include "core/spacing.h"
#include "plan/plan_steps.h"
#include <math.h>

static const double second_per_day = 86400, second_per_year = 31557600;

void plan_set_concrete(struct plan *plan)
{
    const struct job *job = &plan->job;
    double fck = job->concrete_strength.cylinder;
    bool us = job->job_practice == PRACTICE_US;

    plan->concrete.fck_pa = fck;
    plan->concrete.fcm_pa = mix_mean_strength(fck);
    plan->concrete.modulus_pa = job->concrete_modulus;
    if (isnan(job->concrete_modulus))
        plan->concrete.modulus_pa = us ? mix_modulus_aci(fck) : mix_modulus(fck);
    plan->concrete.tensile_pa = mix_tensile_strength(fck);
    plan->concrete.rupture_pa =
        us ? mix_rupture_aci(fck) : mix_rupture_en(fck, job->slab_thickness);
    plan->concrete.expansion_k = job->concrete_expansion;
    plan->concrete.stiffness_radius_m = spacing_stiffness_radius(
        plan->concrete.modulus_pa, job->slab_thickness, MIX_POISSON, job->base_subgrade_modulus);
}

/* ---- temperature ---- */

/* coldest mean = coldest air; hottest = Barber at mid-depth; indoor = air. */
static struct slab_extremes estimate(const struct job *job)
{
    struct slab_extremes extremes = {job->climate_air_coldest, job->climate_air_hottest};
    struct slab_day day;

    if (job->climate_exposure == EXPOSURE_INDOOR)
        return extremes;
    day = slab_day_hottest(job->climate_air_hottest, job->climate_swing_hot, job->climate_wind,
                           job->place_latitude, (enum slab_exposure)job->climate_exposure);
    day.absorptivity = job->climate_absorptivity;
    if (isfinite(job->climate_sun)) /* kWh/m2 of a clear day in the open */
        day.radiation_j_m2 = job->climate_sun * 3.6e6 *
                             slab_exposure_share((enum slab_exposure)job->climate_exposure);
    extremes.hottest_c =
        fmax(extremes.hottest_c, slab_temperature_barber_highest(&day, job->slab_thickness / 2));
    return extremes;
}

static void warn_temperature(struct plan *plan, const char *field, double limit_c,
                             const char *words)
{
    struct text value = {0}, limit = {0};
    enum unit_system units = (enum unit_system)plan->job.job_units;

    unit_show(&value, plan->temperature.sealing_c, QUANTITY_TEMPERATURE, units);
    unit_show(&limit, limit_c, QUANTITY_TEMPERATURE, units);
    finding_add(&plan->findings, SEVERITY_WARNING, field, text_string(&value), text_string(&limit),
                0, 0, "%s: %s %s %s.", field, text_string(&value), words, text_string(&limit));
    text_free(&value);
    text_free(&limit);
}

static void check_sealing_temperature(struct plan *plan)
{
    const struct job *job = &plan->job;
    bool both_typed = isfinite(job->climate_slab_coldest) && isfinite(job->climate_slab_hottest);

    if (!job->given[FIELD_sealing_temperature] || job->sealant_kind == SEALANT_NONE)
        return;
    if (!both_typed && plan->temperature.sealing_c >= plan->temperature.hottest_c)
        warn_temperature(plan, "sealing.temperature", plan->temperature.hottest_c,
                         "is as hot as the slab gets: no closing is left and all the opening is "
                         "still to come; seal on a cooler day, below");
    if (plan->temperature.sealing_c < job->sealing_least_temperature)
        warn_temperature(plan, "sealing.temperature", job->sealing_least_temperature,
                         "is too cold for the sealant to stick; wait for a warmer slab, at least");
}

/* Curling: a typed difference counts for day and night alike; else what the simulation gives, with
 * the difference built in at hardening added. */
static void set_gradients(struct plan *plan, double day_k, double night_k)
{
    const struct job *job = &plan->job;
    double built_in = job->slab_built_in_gradient;

    if (job->given[FIELD_slab_gradient] || !plan_simulated(plan))
        day_k = night_k = fabs(job->slab_gradient);
    plan->temperature.day_k = fmax(day_k + built_in, 0);
    plan->temperature.night_k = fmax(night_k - built_in, 0);
}

static void check_order(struct plan *plan)
{
    if (plan->temperature.coldest_c <= plan->temperature.hottest_c)
        return;
    /* one is typed, the other worked out from the air: nothing can be made of the two */
    finding_add(&plan->findings, SEVERITY_ERROR, "climate.slab-coldest", "", "", 0, 0,
                "climate.slab-coldest: the coldest slab (%.1f degC) is above the hottest "
                "(%.1f degC); type both, or put the air temperatures right.",
                plan->temperature.coldest_c, plan->temperature.hottest_c);
}

/* Zero stress for isolation: typed, else the lower of the placing temperature and the mean air of
 * the day of pouring; for cracks: typed, else placing + 10 K (heat of hydration, from memory). */
static void set_zero_stress(struct plan *plan)
{
    const double hydration_k = 10;
    const struct job *job = &plan->job;

    plan->temperature.zero_stress_c = plan->temperature.crack_zero_c =
        job->pour_zero_stress_temperature;
    if (isfinite(job->pour_zero_stress_temperature))
        return;
    plan->temperature.zero_stress_c = job->pour_placing_temperature;
    plan->temperature.crack_zero_c = job->pour_placing_temperature + hydration_k;
    if (job->pour_date.year != 0)
        plan->temperature.zero_stress_c = fmin(
            plan->temperature.zero_stress_c, plan_air_mean(plan, date_day_of_year(job->pour_date)));
}

enum status plan_set_temperature(struct plan *plan, struct plan_cache *cache)
{
    const struct job *job = &plan->job;
    struct slab_extremes guess = estimate(job);
    struct slab_extremes deck =
        slab_temperature_deck(job->climate_air_coldest, job->climate_air_hottest);
    struct plan_cache year = {.coldest_c = guess.coldest_c, .hottest_c = guess.hottest_c};
    bool simulated = plan_simulated(plan);

    if (simulated && plan_simulate(plan, cache, &year) != STATUS_OK)
        return STATUS_NO_MEMORY;
    plan->temperature.coldest_c =
        isfinite(job->climate_slab_coldest) ? job->climate_slab_coldest : year.coldest_c;
    plan->temperature.hottest_c =
        isfinite(job->climate_slab_hottest) ? job->climate_slab_hottest : year.hottest_c;
    plan->temperature.basis =
        simulated                                                                    ? "simulation"
        : isfinite(job->climate_slab_coldest) && isfinite(job->climate_slab_hottest) ? "typed"
                                                                                     : "estimate";
    plan->temperature.deck_coldest_c = deck.coldest_c;
    plan->temperature.deck_hottest_c = deck.hottest_c;
    plan->temperature.estimate_coldest_c = guess.coldest_c;
    plan->temperature.estimate_hottest_c = guess.hottest_c;
    set_gradients(plan, year.day_k, year.night_k);
    check_order(plan);
    plan->temperature.sealing_c = job->sealing_temperature;
    if (isnan(job->sealing_temperature))
        plan->temperature.sealing_c =
            (plan->temperature.coldest_c + plan->temperature.hottest_c) / 2;
    plan->temperature.cut_c = job->given[FIELD_sealing_cut_temperature]
                                  ? job->sealing_cut_temperature
                                  : plan->temperature.sealing_c;
    set_zero_stress(plan);
    check_sealing_temperature(plan);
    return STATUS_OK;
}

/* ---- shrinkage ---- */

static struct shrinkage_slab shrinkage_slab_of(const struct job *job)
{
    struct shrinkage_slab slab = {0};

    shrinkage_mix_default(&slab);
    slab.thickness_m = job->slab_thickness;
    slab.fck_pa = job->concrete_strength.cylinder;
    slab.humidity = job->climate_humidity;
    slab.cement = (enum mix_cement)job->concrete_cement;
    slab.curing_days = job->concrete_curing / second_per_day;
    slab.ultimate =
        isfinite(job->concrete_shrinkage_ultimate) ? job->concrete_shrinkage_ultimate : 0;
    if (isfinite(job->concrete_slump))
        slab.slump_m = job->concrete_slump;
    slab.fines = job->concrete_fines;
    slab.cement_kg_m3 = job->concrete_cement_content;
    slab.air = job->concrete_air;
    return slab;
}

void plan_shrinkage_slab(const struct plan *plan, struct shrinkage_slab *slab)
{
    *slab = shrinkage_slab_of(&plan->job);
}

void plan_set_shrinkage(struct plan *plan)
{
    static const char *const basis[] = {"en1992", "aci209", "mc2010", "typed"};
    const struct job *job = &plan->job;
    int model = job->concrete_shrinkage_model;
    double sealing_d = job_sealing_age_days(job), end_d = job->concrete_horizon / second_per_day;
    struct shrinkage_slab slab = shrinkage_slab_of(job);

    plan->shrinkage.basis = basis[model];
    plan->shrinkage.end_years = job->concrete_horizon / second_per_year;
    if (model == SHRINKAGE_TYPED) { /* used as it is */
        plan->shrinkage.after_sealing = job->concrete_shrinkage;
        plan->shrinkage.before_sealing = NAN;
        return;
    }
    plan->shrinkage.before_sealing = shrinkage_at((enum shrinkage_by)model, &slab, sealing_d).total;
    plan->shrinkage.after_sealing =
        shrinkage_between((enum shrinkage_by)model, &slab, sealing_d, fmax(end_d, sealing_d));
    if (job->sealing_kind == SEALING_RESEAL) { /* an old slab: all of it is in */
        plan->shrinkage.before_sealing += plan->shrinkage.after_sealing;
        plan->shrinkage.after_sealing = 0;
    }
}
