/* The slab's year: the weather and the column it is worked out from, and what it comes to. */
#include "core/slab_temperature.h"
#include "plan/plan_steps.h"
#include <math.h>
#include <stdlib.h>
#include <string.h>

bool plan_simulated(const struct plan *plan)
{
    const struct job *job = &plan->job;

    return job->climate_exposure != EXPOSURE_INDOOR &&
           (isnan(job->climate_slab_coldest) || isnan(job->climate_slab_hottest));
}

static struct climate_range range_of(const struct job *job)
{
    double share = slab_exposure_share((enum slab_exposure)job->climate_exposure);

    if (isfinite(job->climate_sun) && (job->weather == NULL || !job->weather->has_sun))
        /* kWh/m2 of the hottest clear day, typed */
        share *= job->climate_sun * 3.6e6 / slab_sun_clear_most(job->place_latitude);
    return (struct climate_range){
        .air_coldest_c = job->climate_air_coldest,
        .air_hottest_c = job->climate_air_hottest,
        .swing_cold_k = job->climate_swing_cold,
        .swing_hot_k = job->climate_swing_hot,
        .wind_m_s = job->climate_wind,
        .cloud = job->climate_cloud,
        .humidity = job->climate_humidity,
        .latitude_deg = job->place_latitude,
        .sun_share = share,
    };
}

bool plan_climate(const struct plan *plan, struct climate_range *range,
                  struct conduction_slab *slab)
{
    const struct job *job = &plan->job;

    if (job->climate_exposure == EXPOSURE_INDOOR)
        return false;
    *range = range_of(job);
    conduction_slab_default(job->slab_thickness, slab);
    slab->absorptivity = job->climate_absorptivity;
    return true;
}

/* Indoors: neither sun nor cold sky, the air of the range's day. */
static void shelter(struct climate_hour *hours, int count)
{
    for (int i = 0; i < count; i++) {
        hours[i].sun_w_m2 = 0;
        hours[i].cloud = 1;
        hours[i].dew_c = hours[i].air_c;
        hours[i].wind_m_s = 0;
    }
}

enum status plan_hours(const struct plan *plan, int first_day, int days, struct climate_hour *hours)
{
    const struct job *job = &plan->job;
    struct climate_range range = range_of(job);
    struct climate_hour *year;

    if (job->weather == NULL) {
        climate_make_days(&range, first_day, days, hours);
        if (job->climate_exposure == EXPOSURE_INDOOR)
            shelter(hours, 24 * days);
        return STATUS_OK;
    }
    year = malloc(CLIMATE_HOURS * sizeof *year);
    if (year == NULL)
        return STATUS_NO_MEMORY;
    weather_year(job->weather, 0, &range, year);
    for (int i = 0; i < 24 * days; i++)
        hours[i] = year[(24 * first_day + i) % CLIMATE_HOURS];
    free(year);
    return STATUS_OK;
}

/* ---- the years of the weather ---- */

static int count_years(const struct plan *plan)
{
    return plan->job.weather != NULL ? plan->job.weather->years : 1;
}

static void fill_hours(const struct plan *plan, const struct climate_range *range, int year,
                       struct climate_hour hours[CLIMATE_HOURS])
{
    if (plan->job.weather != NULL)
        weather_year(plan->job.weather, year, range, hours);
    else
        climate_make(range, hours);
}

double plan_air_mean(const struct plan *plan, int day)
{
    struct climate_range range = range_of(&plan->job);

    return plan->job.weather != NULL ? weather_day_mean(plan->job.weather, day)
                                     : climate_day_mean(&range, day);
}

/* Takes a year's extremes into those of all. */
static void note_year(const struct conduction_year *year, int index, struct plan_cache *out)
{
    if (index == 0 || year->coldest_c < out->coldest_c) {
        out->coldest_c = year->coldest_c;
        out->coldest_hour = year->coldest_hour;
        out->coldest_year = index;
    }
    if (index == 0 || year->hottest_c > out->hottest_c) {
        out->hottest_c = year->hottest_c;
        out->hottest_hour = year->hottest_hour;
        out->hottest_year = index;
    }
    out->day_k = index == 0 ? year->day_k : fmax(out->day_k, year->day_k);
    out->night_k = index == 0 ? -year->night_k : fmax(out->night_k, -year->night_k);
}

/* Every year of the weather one after the other, the first as if it had always been. `shown` (may
 * be NULL) gets the year of the widest range. */
static enum status run_years(const struct plan *plan, struct plan_cache *out,
                             struct climate_hour hours[CLIMATE_HOURS], struct conduction_year *year,
                             struct conduction_year *shown)
{
    struct conduction_state state;
    double widest = -INFINITY;
    enum status status = STATUS_OK;

    for (int y = 0; status == STATUS_OK && y < count_years(plan); y++) {
        fill_hours(plan, &out->range, y, hours);
        status = y == 0 ? conduction_year_steady(&out->slab, hours, &state, year)
                        : conduction_year_next(&out->slab, hours, &state, year);
        if (status != STATUS_OK)
            break;
        note_year(year, y, out);
        if (shown != NULL && year->hottest_c - year->coldest_c > widest) {
            widest = year->hottest_c - year->coldest_c;
            *shown = *year;
        }
    }
    return status;
}

static enum status run_all(const struct plan *plan, struct plan_cache *out,
                           struct conduction_year *shown)
{
    struct climate_hour *hours = malloc(CLIMATE_HOURS * sizeof *hours);
    struct conduction_year *year = malloc(sizeof *year);
    enum status status = STATUS_NO_MEMORY;

    if (hours != NULL && year != NULL)
        status = run_years(plan, out, hours, year, shown);
    free(hours);
    free(year);
    return status;
}

/* ---- for the steps ---- */

static bool same_input(const struct plan_cache *a, const struct plan_cache *b)
{
    return a->has_year && a->weather_mark == b->weather_mark &&
           memcmp(&a->range, &b->range, sizeof a->range) == 0 &&
           memcmp(&a->slab, &b->slab, sizeof a->slab) == 0;
}

enum status plan_simulate(const struct plan *plan, struct plan_cache *cache, struct plan_cache *out)
{
    enum status status;

    *out = (struct plan_cache){.has_year = true};
    out->weather_mark = plan->job.weather != NULL ? plan->job.weather->mark : 0;
    plan_climate(plan, &out->range, &out->slab);
    if (cache != NULL && same_input(cache, out)) {
        *out = *cache;
        out->layout = (struct layout_cache){0};
        return STATUS_OK;
    }
    status = run_all(plan, out, NULL);
    if (status == STATUS_OK && cache != NULL) {
        const struct layout_cache layout = cache->layout;
        *cache = *out;
        cache->layout = layout;
    }
    return status;
}

enum status plan_slab_year(const struct plan *plan, struct conduction_year *year)
{
    struct plan_cache scratch = {0};

    if (!plan_climate(plan, &scratch.range, &scratch.slab))
        return STATUS_REFUSED;
    return run_all(plan, &scratch, year);
}
