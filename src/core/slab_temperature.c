#include "core/slab_temperature.h"

#include <math.h>

static const double PI = 3.14159265358979323846;
static const double UNKNOWN_LATITUDE_DEG = 45; /* from memory: between the tropics and the pole */

static double clamp(double value, double least, double most)
{
    return fmin(fmax(value, least), most);
}

/* ---- sun ---- */

/* Ra = (24 60/pi) Gsc dr [ws sin(phi) sin(d) + cos(phi) cos(d) sin(ws)], MJ/m2 d; Gsc 0.0820 MJ/m2
 * min, dr = 1 + 0.033 cos(2 pi J/365), d = 0.409 sin(2 pi J/365 - 1.39), ws = arccos(-tan(phi)
 * tan(d)), phi latitude, J day of the year. FAO Irrigation and Drainage Paper 56 (1998) eq. 21
 * to 25. In the polar day ws = pi, in the polar night 0. */
double slab_sun_extraterrestrial(double latitude_deg, int day_of_year)
{
    double phi = clamp(latitude_deg, -90, 90) * PI / 180;
    double turn = 2 * PI * day_of_year / 365;
    double d = 0.409 * sin(turn - 1.39);
    double dr = 1 + 0.033 * cos(turn);
    double ws = acos(clamp(-tan(phi) * tan(d), -1, 1));
    double ra = 24 * 60 / PI * 0.0820 * dr * (ws * sin(phi) * sin(d) + cos(phi) * cos(d) * sin(ws));
    return fmax(ra, 0) * 1e6;
}

/* Rso = 0.75 Ra at sea level (FAO-56 eq. 37, z = 0: 2e-5 Ra per metre of altitude left out). */
double slab_sun_clear(double latitude_deg, int day_of_year)
{
    return 0.75 * slab_sun_extraterrestrial(latitude_deg, day_of_year);
}

double slab_sun_clear_most(double latitude_deg)
{
    double latitude = isfinite(latitude_deg) ? latitude_deg : UNKNOWN_LATITUDE_DEG;
    double most = 0;
    for (int day = 1; day <= 365; day++)
        most = fmax(most, slab_sun_clear(latitude, day));
    return most;
}

double slab_exposure_share(enum slab_exposure exposure)
{
    static const double share[] = {1.0, 0.5, 0.25, 0.0};
    return exposure <= SLAB_INDOOR ? share[exposure] : 1.0;
}

struct slab_day slab_day_hottest(double air_hottest_c, double swing_k, double wind_m_s,
                                 double latitude_deg, enum slab_exposure exposure)
{
    struct slab_day day = {.air_mean_c = air_hottest_c - swing_k / 2,
                           .air_swing_k = swing_k,
                           .wind_m_s = wind_m_s,
                           .absorptivity = 0.65,
                           .conductivity = 1.7,
                           .density = 2300,
                           .heat_capacity = 870};
    day.radiation_j_m2 = slab_sun_clear_most(latitude_deg) * slab_exposure_share(exposure);
    return day;
}

/* ---- Barber ---- */

/* Everything of Barber's formula that does not depend on the hour, in his units (ft, h, BTU, degF,
 * mph). */
struct barber {
    double c, h;        /* C = sqrt(0.131/c) per ft; H = h/k per ft */
    double mean, swing; /* TM and Tv, degF */
    double night_swing; /* 0.5 TR */
};

static struct barber barber_make(const struct slab_day *day)
{
    const double ft = 0.3048, btu = 1055.05585262, lb = 0.45359237;
    double k = fmax(day->conductivity, 0.01) * ft * 3600 / (1.8 * btu); /* BTU/(ft h degF) */
    double w = fmax(day->density, 1) * ft * ft * ft / lb;               /* lb/ft3 */
    double s = fmax(day->heat_capacity, 1) * lb / (1.8 * btu);          /* BTU/(lb degF) */
    double mph = fmax(day->wind_m_s, 0) * 3600 / 1609.344;
    double h = 1.3 + 0.62 * pow(mph, 0.75);                /* BTU/(ft2 h degF) */
    double langley = fmax(day->radiation_j_m2, 0) / 41840; /* cal/cm2 in the day */
    double rise = 2.0 / 3.0 * fmax(day->absorptivity, 0) * (3.69 * langley / 24) / h;
    double range = 1.8 * day->air_swing_k;
    return (struct barber){.c = sqrt(0.131 * s * w / k),
                           .h = h / k,
                           .mean = 1.8 * day->air_mean_c + 32 + rise,
                           .swing = 0.5 * range + 3 * rise,
                           .night_swing = 0.5 * range};
}

static double barber_damping(const struct barber *b, double depth_ft)
{
    return exp(-depth_ft * b->c) * b->h / hypot(b->h + b->c, b->c);
}

/* T = TM + Tv exp(-x C) H/sqrt[(H + C)^2 + C^2] sin(0.262 t - x C - arctan[C/(H + C)]), with
 * C = sqrt(0.131/c), c = k/(s w), H = h/k, h = 1.3 + 0.62 v^(3/4), x depth, t hours (sin positive
 * by day): Barber, Calculation of maximum pavement temperatures from weather reports, Highway
 * Research Board Bulletin 168 (1957). The effective air, TM = TA + R, Tv = 0.5 TR + 3 R by day and
 * 0.5 TR by night, R = (2/3) b (3.69 L/24)/h with L langley a day and b the absorptivity: from
 * memory of the same paper. Units ft, h, BTU, degF, mph inside; the conversions are exact. For dry,
 * clear summer days; deep slab of one material. */
double slab_temperature_barber(const struct slab_day *day, double depth_m, double hour)
{
    struct barber b = barber_make(day);
    double depth = fmax(depth_m, 0) / 0.3048;
    double wave = sin(0.262 * hour - depth * b.c - atan2(b.c, b.h + b.c));
    double swing = wave >= 0 ? b.swing : b.night_swing;
    double degf = b.mean + swing * barber_damping(&b, depth) * wave;
    return (degf - 32) / 1.8;
}

double slab_temperature_barber_highest(const struct slab_day *day, double depth_m)
{
    struct barber b = barber_make(day);
    double degf = b.mean + b.swing * barber_damping(&b, fmax(depth_m, 0) / 0.3048);
    return (degf - 32) / 1.8;
}

/* ---- extremes ---- */

/* Coldest mean: the coldest air (no addition); hottest mean: Barber at mid-depth; indoor: the air.
 * Checked by simulation as cautious for slabs of 100 to 300 mm on the ground. Never below the
 * hottest air. */
struct slab_extremes slab_temperature_estimate(double air_coldest_c, double air_hottest_c,
                                               double swing_hot_k, double wind_m_s,
                                               double latitude_deg, enum slab_exposure exposure,
                                               double thickness_m)
{
    struct slab_extremes extremes = {air_coldest_c, air_hottest_c};
    if (exposure == SLAB_INDOOR)
        return extremes;
    struct slab_day day =
        slab_day_hottest(air_hottest_c, swing_hot_k, wind_m_s, latitude_deg, exposure);
    extremes.hottest_c =
        fmax(air_hottest_c, slab_temperature_barber_highest(&day, thickness_m / 2));
    return extremes;
}

/* EN 1991-1-5:2003 Figure 6.1, deck type 3 (concrete): Te,min = Tmin + 8, Te,max = Tmax + 2 (1.5 in
 * some editions). Bridge decks with air below; 30 <= Tmax <= 50, -50 <= Tmin <= 0. */
struct slab_extremes slab_temperature_deck(double air_coldest_c, double air_hottest_c)
{
    return (struct slab_extremes){air_coldest_c + 8, air_hottest_c + 2};
}
