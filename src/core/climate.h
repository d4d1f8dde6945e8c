/* Hourly weather of a year: made from the range a person types, its extremes exactly those typed.
 * Temperatures degC, differences K, W/m2, m/s; hour 0 = midnight of 1 January, 365 days. */
#ifndef SLABGAP_CORE_CLIMATE_H
#define SLABGAP_CORE_CLIMATE_H

enum { CLIMATE_DAYS = 365, CLIMATE_HOURS = 8760 };

struct climate_range {
    double air_coldest_c, air_hottest_c;
    double swing_cold_k, swing_hot_k; /* warmest less coldest of a winter and of a summer day */
    double wind_m_s;
    double cloud;        /* mean cover of the usual day, 0 to 1 */
    double humidity;     /* ratio; the dew point follows the daily mean */
    double latitude_deg; /* below 0: seasons turned; NAN: 45 */
    double sun_share;    /* share of the sun that reaches the slab */
};
struct climate_hour {
    double air_c, sun_w_m2 /* on the level */, wind_m_s, cloud, dew_c;
};
/* Five clear days in a row at each extreme; the rest a cosine through the middle of the range. */
void climate_make(const struct climate_range *range, struct climate_hour hours[CLIMATE_HOURS]);
/* The same for `days` days from a day of the year (0 to 364) on, round the year's end. */
void climate_make_days(const struct climate_range *range, int first_day, int days,
                       struct climate_hour *hours);
/* Mean air of a day of the year (0 to 364). */
double climate_day_mean(const struct climate_range *range, int day);
/* Day of the year (0 to 364) in the middle of the coldest and the hottest spell. */
int climate_coldest_day(double latitude_deg);
int climate_hottest_day(double latitude_deg);
/* Dew point by Magnus (Sonntag 1990 constants), degC. humidity a ratio above 0. */
double climate_dew_point(double air_c, double humidity);

#endif
