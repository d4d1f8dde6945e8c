/* The hours of a weather record as the slab feels them; what the record does not say is worked out
 * or taken from the usual values. */
#include "core/sun.h"
#include "core/weather.h"
#include <math.h>
#include <stdlib.h>

struct weather *weather_share(struct weather *weather)
{
    if (weather != NULL)
        __atomic_add_fetch(&weather->holders, 1, __ATOMIC_RELAXED);
    return weather;
}

void weather_release(struct weather *weather)
{
    if (weather != NULL && __atomic_sub_fetch(&weather->holders, 1, __ATOMIC_ACQ_REL) == 0)
        free(weather);
}

double weather_day_mean(const struct weather *weather, int day)
{
    double sum = 0;

    for (int y = 0; y < weather->years; y++)
        for (int h = 0; h < 24; h++)
            sum += weather->hours[y * CLIMATE_HOURS + 24 * day + h].air_c;
    return sum / (24 * weather->years);
}

/* ---- sun and clouds of a day ---- */

struct sky {
    double latitude_deg;
    double clear[24];    /* W/m2 of a clear sky */
    double share, cloud; /* of the clear sun, where no hour says; of the sky */
};

/* Rs = 0.16 sqrt(Tmax - Tmin) Ra, at most a clear sky's 0.75 Ra: Hargreaves and Samani as FAO-56
 * (1998) eq. 50, inland; meant for means over some days, so single days are rough. */
static double share_of_range(double range_k)
{
    return fmin(0.16 * sqrt(fmax(range_k, 0)) / 0.75, 1);
}

/* The clouds that let this share through: Kasten and Czeplak turned round. */
static double cloud_of_share(double share)
{
    return pow(fmin(fmax((1 - share) / 0.75, 0), 1), 1 / 3.4);
}

static void look_up(const struct weather_hour *day, int day_of_year, struct sky *sky)
{
    double low = INFINITY, high = -INFINITY, clear = 0, measured = 0;

    for (int h = 0; h < 24; h++) {
        sky->clear[h] = sun_clear(sky->latitude_deg, day_of_year + 1, h);
        low = fmin(low, day[h].air_c);
        high = fmax(high, day[h].air_c);
        if (isfinite(day[h].sun_w_m2)) {
            clear += sky->clear[h];
            measured += day[h].sun_w_m2;
        }
    }
    sky->share = share_of_range(high - low);
    sky->cloud = cloud_of_share(clear > 0 ? fmin(measured / clear, 1) : sky->share);
}

static double mean_air(const struct weather_hour *day)
{
    double sum = 0;

    for (int h = 0; h < 24; h++)
        sum += day[h].air_c;
    return sum / 24;
}

static double sun_of(const struct weather_hour *from, const struct sky *sky, int h)
{
    if (isfinite(from->sun_w_m2))
        return fmax(from->sun_w_m2, 0);
    if (isfinite(from->cloud))
        return sun_cloud_share(from->cloud) * sky->clear[h];
    return sky->share * sky->clear[h];
}

void weather_year(const struct weather *weather, int year, const struct climate_range *usual,
                  struct climate_hour hours[CLIMATE_HOURS])
{
    struct sky sky = {.latitude_deg = isfinite(usual->latitude_deg)     ? usual->latitude_deg
                                      : isfinite(weather->latitude_deg) ? weather->latitude_deg
                                                                        : 45};

    for (int d = 0; d < CLIMATE_DAYS; d++) {
        const struct weather_hour *day = &weather->hours[year * CLIMATE_HOURS + 24 * d];
        double damp = climate_dew_point(mean_air(day), usual->humidity);
        look_up(day, d, &sky);
        for (int h = 0; h < 24; h++) {
            const struct weather_hour *from = &day[h];
            double dew = isfinite(from->dew_c)      ? from->dew_c
                         : isfinite(from->humidity) ? climate_dew_point(from->air_c, from->humidity)
                                                    : damp;
            hours[24 * d + h] = (struct climate_hour){
                .air_c = from->air_c,
                .sun_w_m2 = usual->sun_share * sun_of(from, &sky, h),
                .wind_m_s = isfinite(from->wind_m_s) ? from->wind_m_s : usual->wind_m_s,
                .cloud = isfinite(from->cloud) ? from->cloud : sky.cloud,
                .dew_c = fmin(dew, from->air_c),
            };
        }
    }
}
