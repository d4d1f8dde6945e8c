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

struct climate_range plan_climate_range(const struct job *job)
{
    double share = slab_exposure_share((enum slab_exposure)job->climate_exposure);

    if (isfinite(job->climate_sun)) /* kWh/m2 of the hottest clear day, typed */
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
    *range = plan_climate_range(job);
    conduction_slab_default(job->slab_thickness, slab);
    slab->absorptivity = job->climate_absorptivity;
    return true;
}

/* The slab's steady year, remembered for as long as nothing that enters it changes. */
enum status plan_simulate(const struct plan *plan, struct plan_cache *cache, struct plan_cache *out)
{
    struct climate_hour *hours;
    struct conduction_year *year;
    enum status status = STATUS_NO_MEMORY;

    *out = (struct plan_cache){.has_year = true};
    plan_climate(plan, &out->range, &out->slab);
    if (cache != NULL && cache->has_year &&
        memcmp(&cache->range, &out->range, sizeof out->range) == 0 &&
        memcmp(&cache->slab, &out->slab, sizeof out->slab) == 0) {
        *out = *cache;
        return STATUS_OK;
    }
    hours = malloc(CLIMATE_HOURS * sizeof *hours);
    year = malloc(sizeof *year);
    if (hours != NULL && year != NULL) {
        climate_make(&out->range, hours);
        status = conduction_year_make(&out->slab, hours, year);
        out->coldest_c = year->coldest_c;
        out->hottest_c = year->hottest_c;
        out->day_k = year->day_k;
        out->night_k = -year->night_k;
        if (status == STATUS_OK && cache != NULL)
            *cache = *out;
    }
    free(hours);
    free(year);
    return status;
}
