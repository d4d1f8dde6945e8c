#include "core/climate.h"
#include "core/sun.h"

#include <math.h>

static const double PI = 3.14159265358979323846;

/* Middle of the coldest and of the hottest spell of the north, days from 0: 20 January, 20 July,
 * about a month after the solstices; common practice. */
enum { COLDEST_DAY = 19, HOTTEST_DAY = 200, SPELL_HALF = 2, RAMP_DAYS = 3, HALF_YEAR = 182 };
/* Hour of the day's warmest air; the coldest is 12 h from it. */
static const double warmest_hour = 15;
/* Share of the half range that the seasons of an average year take: monthly means against the
 * extremes of ten years, 0.35 to 0.5 in temperate climates; from memory. */
static const double season_share = 0.45;

static double latitude_of(double latitude_deg)
{
    return isfinite(latitude_deg) ? latitude_deg : 45;
}

int climate_coldest_day(double latitude_deg)
{
    return latitude_of(latitude_deg) < 0 ? (COLDEST_DAY + HALF_YEAR) % CLIMATE_DAYS : COLDEST_DAY;
}

int climate_hottest_day(double latitude_deg)
{
    return latitude_of(latitude_deg) < 0 ? (HOTTEST_DAY + HALF_YEAR) % CLIMATE_DAYS : HOTTEST_DAY;
}

/* Days between, round the year. */
static int days_apart(int a, int b)
{
    int d = a > b ? a - b : b - a;

    return d > CLIMATE_DAYS - d ? CLIMATE_DAYS - d : d;
}

/* 1 in the spell, falling to 0 over the days of the ramp. */
static double spell_share(int day, int middle)
{
    int apart = days_apart(day, middle);

    if (apart <= SPELL_HALF)
        return 1;
    return fmax(0, 1 - (double)(apart - SPELL_HALF) / (RAMP_DAYS + 1));
}

struct day {
    double mean_c, swing_k, cloud;
};

static struct day day_of(const struct climate_range *range, int day)
{
    double coldest = range->air_coldest_c + range->swing_cold_k / 2;
    double hottest = range->air_hottest_c - range->swing_hot_k / 2;
    double middle = (coldest + hottest) / 2, half = (hottest - coldest) / 2;
    int cold_day = climate_coldest_day(range->latitude_deg);
    int hot_day = climate_hottest_day(range->latitude_deg);
    double season = cos(2 * PI * (day - hot_day) / CLIMATE_DAYS);
    double cold = spell_share(day, cold_day), hot = spell_share(day, hot_day);
    struct day made = {.mean_c = middle + season_share * half * season,
                       .swing_k = (range->swing_cold_k + range->swing_hot_k) / 2 +
                                  (range->swing_hot_k - range->swing_cold_k) / 2 * season,
                       .cloud = range->cloud};

    made.mean_c += cold * (coldest - made.mean_c) + hot * (hottest - made.mean_c);
    made.swing_k +=
        cold * (range->swing_cold_k - made.swing_k) + hot * (range->swing_hot_k - made.swing_k);
    made.cloud *= 1 - fmax(cold, hot);
    return made;
}

double climate_day_mean(const struct climate_range *range, int day)
{
    return day_of(range, day).mean_c;
}

void climate_make_days(const struct climate_range *range, int first_day, int days,
                       struct climate_hour *hours)
{
    double latitude = latitude_of(range->latitude_deg);

    for (int i = 0; i < days; i++) {
        int d = (first_day + i) % CLIMATE_DAYS;
        struct day today = day_of(range, d);
        double dew = climate_dew_point(today.mean_c, range->humidity);
        for (int h = 0; h < 24; h++) {
            struct climate_hour *hour = &hours[24 * i + h];
            double wave = cos(2 * PI * (h - warmest_hour) / 24);
            hour->air_c = today.mean_c + today.swing_k / 2 * wave;
            hour->sun_w_m2 =
                range->sun_share * sun_cloud_share(today.cloud) * sun_clear(latitude, d + 1, h);
            hour->wind_m_s = range->wind_m_s;
            hour->cloud = today.cloud;
            hour->dew_c = fmin(dew, hour->air_c);
        }
    }
}

void climate_make(const struct climate_range *range, struct climate_hour hours[CLIMATE_HOURS])
{
    climate_make_days(range, 0, CLIMATE_DAYS, hours);
}

/* T = 243.12 g/(17.62 - g), g = ln(RH) + 17.62 t/(243.12 + t): Magnus form with the constants of
 * Sonntag (1990), over water, -45 to 60 degC. */
double climate_dew_point(double air_c, double humidity)
{
    double g = log(fmin(fmax(humidity, 1e-4), 1)) + 17.62 * air_c / (243.12 + air_c);

    return 243.12 * g / (17.62 - g);
}
