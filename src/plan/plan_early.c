/* The first three days: mix, weather and cover from the job; the slab's temperature at set. */
#include "plan/plan_early.h"
#include "core/climate.h"
#include "core/sun.h"
#include "plan/plan_steps.h"
#include <math.h>
#include <stdio.h>
#include <stdlib.h>

bool plan_has_early(const struct plan *plan)
{
    return plan->job.pour_date.year != 0 && plan->job.given[FIELD_pour_start];
}

static struct hydration_binder binder_of(const struct job *job)
{
    return (struct hydration_binder){.c3s = job->concrete_c3s,
                                     .c2s = job->concrete_c2s,
                                     .c3a = job->concrete_c3a,
                                     .c4af = job->concrete_c4af,
                                     .so3 = job->concrete_so3,
                                     .free_lime = job->concrete_free_lime,
                                     .magnesia = job->concrete_magnesia,
                                     .fineness_m2_kg = job->concrete_fineness,
                                     .slag = job->concrete_slag,
                                     .ash = fmin(job->concrete_fly_ash, 1 - job->concrete_slag),
                                     .ash_lime = job->concrete_ash_lime,
                                     .water = job->concrete_water_cement,
                                     .content_kg_m3 = job->concrete_cement_content};
}

/* ---- weather ---- */

/* What is typed of the day's forecast stands for the weather of the year, hour by hour. */
static void put_forecast(const struct plan *plan, int day, struct plan_early *early)
{
    const struct job *job = &plan->job;
    const double pi = 3.14159265358979323846, low = job->pour_air_low, high = job->pour_air_high;
    const bool air = isfinite(low) && isfinite(high);

    for (int h = 0; h < 24 * EARLY_DAYS; h++) {
        struct climate_hour *hour = &early->hours[h];
        if (air)
            hour->air_c = (low + high) / 2 + (high - low) / 2 * cos(2 * pi * (h - 15) / 24);
        if (isfinite(job->pour_wind))
            hour->wind_m_s = job->pour_wind;
        if (isfinite(job->pour_cloud) && hour->cloud < 1) {
            hour->sun_w_m2 *= sun_cloud_share(job->pour_cloud) / sun_cloud_share(hour->cloud);
            hour->cloud = job->pour_cloud;
        }
        if (isfinite(job->pour_humidity) || air) {
            const double share =
                isfinite(job->pour_humidity) ? job->pour_humidity : job->climate_humidity;
            const double warm = air ? high : plan_air_mean(plan, day);
            hour->dew_c = fmin(climate_dew_point(warm, share), hour->air_c);
        }
    }
}

static double mean_air(const struct plan_early *early)
{
    double sum = 0;

    for (int h = 0; h < 24; h++)
        sum += early->hours[h].air_c / 24;
    return sum;
}

/* A cover's resistance to heat: sheet and its air gap, wet cloth, blanket; from memory. */
static double resistance_of(int cover)
{
    static const double m2k_w[] = {0, 0.04, 0.02, 0.5};

    return m2k_w[cover];
}

enum status plan_early_make(const struct plan *plan, struct plan_early *early)
{
    enum { COVER_WET = 2 };
    const struct job *job = &plan->job;
    const struct hydration_binder binder = binder_of(job);
    const int day = date_day_of_year(job->pour_date);
    struct climate_range unused;
    enum status status;

    *early = (struct plan_early){.mix = {.hydration = hydration_of(&binder),
                                         .maturity = (enum maturity)job->concrete_maturity,
                                         .placing_c = job->pour_placing_temperature,
                                         .mean_strength_pa = plan->concrete.fcm_pa,
                                         .modulus_pa = plan->concrete.modulus_pa},
                                 .resistance_m2k_w = resistance_of(job->pour_cover)};
    if (!plan_climate(plan, &unused, &early->slab)) {
        conduction_slab_default(job->slab_thickness, &early->slab);
        early->slab.absorptivity = 0;
    }
    if (job->pour_cover == COVER_WET)
        early->slab.absorptivity /= 2; /* water takes the rest with it; from memory */
    early_column(&early->slab, &early->column);
    status = plan_hours(plan, day, EARLY_DAYS, early->hours);
    if (status != STATUS_OK)
        return status;
    put_forecast(plan, day, early);
    if (job->weather == NULL && isfinite(job->place_longitude)) /* a made sun keeps solar time */
        early->solar_h = job->place_longitude / 15 - job->place_utc_offset / 3600;
    early->ground_c = mean_air(early);
    early->deep_c = early->ground_c;
    for (int month = 0; month < 12; month++) /* the year's mean under the changing top */
        early->deep_c += (plan_air_mean(plan, 15 + 30 * month) - early->ground_c) / 12;
    return STATUS_OK;
}

void plan_early_weather(const struct plan_early *early, double clock_h, struct early_weather *out)
{
    const double last = 24.0 * EARLY_DAYS - 1 - EARLY_HOURS;

    early_weather_make(&early->slab, early->hours, 24 * EARLY_DAYS,
                       fmin(fmax(clock_h + early->solar_h, 0), last), out);
    out->resistance_m2k_w = early->resistance_m2k_w;
    out->ground_c = early->ground_c;
    out->deep_c = early->deep_c;
}

struct early_strip plan_early_strip(const struct plan *plan, double length_m)
{
    return (struct early_strip){.length_m = length_m,
                                .expansion = plan->concrete.expansion_k,
                                .friction = plan->job.base_friction_high,
                                .slip_m = plan->job.base_slip,
                                .unit_weight = plan->job.concrete_unit_weight,
                                .relaxation = plan->job.sawing_relaxation};
}

void plan_clock(const struct plan *plan, double clock_h, char *out, size_t size)
{
    static const char *const months[] = {"Jan", "Feb", "Mar", "Apr", "May", "Jun",
                                         "Jul", "Aug", "Sep", "Oct", "Nov", "Dec"};
    const long minutes = lround(clock_h * 60), of_day = ((minutes % 1440) + 1440) % 1440;
    const long days = (minutes - of_day) / 1440;
    struct date date;

    if (!isfinite(clock_h)) {
        snprintf(out, size, "none");
        return;
    }
    date = date_from_days(date_days(plan->job.pour_date) + days);
    if (days == 0)
        snprintf(out, size, "%02ld:%02ld", of_day / 60, of_day % 60);
    else
        snprintf(out, size, "%02ld:%02ld %d %s", of_day / 60, of_day % 60, date.day,
                 months[date.month - 1]);
}

/* ---- the run of the first concrete: it also says when and how warm the slab sets ---- */

enum status plan_set_early(struct plan *plan)
{
    const struct early_scatter guess = {0, 1, 1};
    struct plan_early *early;
    struct early_curves *curves;
    struct early_weather *weather;
    struct early_history *first;
    enum status status = STATUS_NO_MEMORY;

    plan->saw.speed = 1;
    if (!plan_has_early(plan))
        return STATUS_OK;
    early = malloc(sizeof *early);
    curves = malloc(sizeof *curves);
    weather = malloc(sizeof *weather);
    plan->saw.histories = calloc(2, sizeof *plan->saw.histories);
    if (early != NULL && curves != NULL && weather != NULL && plan->saw.histories != NULL)
        status = plan_early_make(plan, early);
    if (status == STATUS_OK) {
        first = &plan->saw.histories[0];
        plan->saw.start_h = plan->job.pour_start.minutes / 60.0;
        early_curves_make(&early->mix, curves);
        plan_early_weather(early, plan->saw.start_h, weather);
        early_run(&early->column, &early->mix, curves, weather, &guess, first);
        plan->saw.set_h = first->set_h;
        plan->saw.set_c = first->set_c;
        for (int i = 0; i <= EARLY_STEPS; i++)
            if (i == 0 || first->mean_c[i] > plan->saw.warmest_c) {
                plan->saw.warmest_c = first->mean_c[i];
                plan->saw.warmest_h = i / 12.0;
            }
        if (isfinite(first->set_c) && isnan(plan->job.pour_zero_stress_temperature))
            plan->temperature.zero_stress_c = plan->temperature.crack_zero_c = first->set_c;
    }
    free(early);
    free(curves);
    free(weather);
    return status;
}
