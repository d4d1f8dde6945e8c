#include "core/sun.h"

#include <math.h>

static const double PI = 3.14159265358979323846;

static double rad(double degrees)
{
    return degrees * PI / 180;
}

static double deg(double radians)
{
    return radians * 180 / PI;
}

/* Julian day at 0 h UT of a Gregorian date: Meeus, Astronomical Algorithms (1991), eq. 7.1. */
static double julian_day(int year, int month, int day)
{
    double century;

    if (month <= 2) {
        year--;
        month += 12;
    }
    century = floor(year / 100.0);
    return floor(365.25 * (year + 4716)) + floor(30.6001 * (month + 1)) + day + 2 - century +
           floor(century / 4) - 1524.5;
}

struct orbit {
    double declination;  /* rad */
    double equation_min; /* equation of time, minutes */
};

/* Low-accuracy solar coordinates: Meeus (1991) chapter 25 and eq. 28.3 (Smart): L0 mean longitude,
 * M mean anomaly, e eccentricity, C equation of the centre, apparent longitude, obliquity. */
static struct orbit orbit_at(double julian)
{
    double t = (julian - 2451545.0) / 36525;
    double l0 = rad(fmod(280.46646 + t * (36000.76983 + 0.0003032 * t), 360));
    double m = rad(357.52911 + t * (35999.05029 - 0.0001537 * t));
    double e = 0.016708634 - t * (0.000042037 + 0.0000001267 * t);
    double c = sin(m) * (1.914602 - t * (0.004817 + 0.000014 * t)) +
               sin(2 * m) * (0.019993 - 0.000101 * t) + sin(3 * m) * 0.000289;
    double node = rad(125.04 - 1934.136 * t);
    double longitude = l0 + rad(c - 0.00569 - 0.00478 * sin(node));
    double obliquity = rad(23.439291 - 0.0130042 * t + 0.00256 * cos(node));
    double y = pow(tan(obliquity / 2), 2);
    struct orbit orbit;

    orbit.declination = asin(sin(obliquity) * sin(longitude));
    orbit.equation_min =
        4 * deg(y * sin(2 * l0) - 2 * e * sin(m) + 4 * e * y * sin(m) * cos(2 * l0) -
                0.5 * y * y * sin(4 * l0) - 1.25 * e * e * sin(2 * m));
    return orbit;
}

/* sin h = sin(phi) sin(d) + cos(phi) cos(d) cos(H); tan A = sin H/(cos H sin(phi) - tan(d)
 * cos(phi)) from the south (Meeus eq. 13.5, 13.6); phi latitude, d declination, H hour angle. */
struct sun_position sun_at(int year, int month, int day, double hour_utc, double latitude_deg,
                           double longitude_deg)
{
    struct orbit orbit = orbit_at(julian_day(year, month, day) + hour_utc / 24);
    double minutes = hour_utc * 60 + orbit.equation_min + 4 * longitude_deg;
    double hour_angle = rad(minutes / 4 - 180), phi = rad(latitude_deg), d = orbit.declination;
    struct sun_position position;

    position.elevation_deg = deg(asin(sin(phi) * sin(d) + cos(phi) * cos(d) * cos(hour_angle)));
    position.azimuth_deg = fmod(
        deg(atan2(sin(hour_angle), cos(hour_angle) * sin(phi) - tan(d) * cos(phi))) + 180 + 360,
        360);
    return position;
}

struct sun_place {
    int year, month, day;
    double latitude_deg, longitude_deg, utc_offset_h;
};

static double elevation(const struct sun_place *place, double clock_h)
{
    return sun_at(place->year, place->month, place->day, clock_h - place->utc_offset_h,
                  place->latitude_deg, place->longitude_deg)
        .elevation_deg;
}

/* Where the upper limb crosses the horizon between two clock hours, to a second. */
static double crossing(const struct sun_place *place, double below_h, double above_h)
{
    const double limb_deg = -0.833;

    while (fabs(above_h - below_h) > 1.0 / 3600) {
        const double middle = (below_h + above_h) / 2;
        if (elevation(place, middle) < limb_deg)
            below_h = middle;
        else
            above_h = middle;
    }
    return (below_h + above_h) / 2;
}

enum sun_day sun_rise_set(int year, int month, int day, double latitude_deg, double longitude_deg,
                          double utc_offset_h, double *rise_h, double *set_h)
{
    const struct sun_place place = {year, month, day, latitude_deg, longitude_deg, utc_offset_h};
    const double limb_deg = -0.833;
    const double midday = 12 - longitude_deg / 15 + utc_offset_h; /* to a quarter of an hour */
    double noon = midday, midnight = midday - 12;

    for (double h = midday - 0.5; h <= midday + 0.5; h += 1.0 / 60) /* the highest and the lowest */
        if (elevation(&place, h) > elevation(&place, noon))
            noon = h;
    midnight = noon - 12;
    if (elevation(&place, noon) < limb_deg)
        return SUN_DAY_NEVER_RISES;
    if (elevation(&place, midnight) >= limb_deg && elevation(&place, noon + 12) >= limb_deg)
        return SUN_DAY_NEVER_SETS;
    *rise_h = crossing(&place, midnight, noon);
    *set_h = crossing(&place, noon + 12, noon);
    return SUN_DAY_USUAL;
}

/* d = 0.409 sin(2 pi J/365 - 1.39): FAO Irrigation and Drainage Paper 56 (1998) eq. 24. */
double sun_sine(double latitude_deg, int day_of_year, double solar_hour)
{
    double d = 0.409 * sin(2 * PI * day_of_year / 365 - 1.39), phi = rad(latitude_deg);

    return sin(phi) * sin(d) + cos(phi) * cos(d) * cos(PI / 12 * (solar_hour - 12));
}

/* Rso = 0.75 Gsc dr sin h at sea level: FAO-56 eq. 28 for an instant, eq. 23 and 37; Gsc 1367 W/m2
 * (0.0820 MJ/m2 min). */
double sun_clear(double latitude_deg, int day_of_year, double solar_hour)
{
    double dr = 1 + 0.033 * cos(2 * PI * day_of_year / 365);
    double sine = sun_sine(latitude_deg, day_of_year, solar_hour);

    return 0.75 * 0.0820e6 / 60 * dr * fmax(sine, 0);
}

/* 1 - 0.75 C^3.4: Kasten and Czeplak (1980). */
double sun_cloud_share(double cloud)
{
    return 1 - 0.75 * pow(fmin(fmax(cloud, 0), 1), 3.4);
}
