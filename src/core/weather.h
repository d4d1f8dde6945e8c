/* Weather from a file's text: daily (lowest and highest) or hourly CSV, one year or several.
 * Columns are found by their names, units by what stands in the names. Temperatures degC, W/m2,
 * m/s, ratios; NAN = the file does not say. */
#ifndef SLABGAP_CORE_WEATHER_H
#define SLABGAP_CORE_WEATHER_H

#include "base/finding.h"
#include "core/climate.h"
#include <stdint.h>

enum { WEATHER_YEARS_MOST = 60 };

struct weather_hour {
    float air_c, sun_w_m2 /* on the level */, wind_m_s, humidity /* ratio */, dew_c, cloud;
};
struct weather {
    int years;      /* each of 365 days; 29 February is left out */
    int first_year; /* calendar year of the first; 0: put together from months of several years */
    bool hourly, has_sun, has_wind, has_damp, has_cloud;
    double latitude_deg; /* of the station, where a header names it; else NAN */
    double coldest_c, hottest_c;
    uint64_t mark; /* differs where the content differs */
    int holders;
    struct weather_hour hours[]; /* years times CLIMATE_HOURS */
};

/* Reads the text of a file. What is wrong goes to findings as errors of climate.file that name the
 * line, what was assumed as notes. STATUS_REFUSED (*weather NULL) after an error, _NO_MEMORY.
 * Beside others it gives weather_release(). */
enum status weather_parse(const char *bytes, size_t count, struct weather **weather,
                          struct finding_list *findings);
/* One more holder of the same record, from any thread; NULL stays NULL. */
struct weather *weather_share(struct weather *weather);
/* The last holder frees it; NULL is fine. */
void weather_release(struct weather *weather);
/* The hours of one of its years (from 0). What the file does not say comes from `usual`: wind,
 * humidity; the sun from clouds and latitude, without clouds from the day's range of the air. */
void weather_year(const struct weather *weather, int year, const struct climate_range *usual,
                  struct climate_hour hours[CLIMATE_HOURS]);
/* Mean air of a day of the year (0 to 364) over all years. */
double weather_day_mean(const struct weather *weather, int day);

#endif
