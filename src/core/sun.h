/* Where the sun stands and how much of it a clear or clouded sky lets through. Angles degrees,
 * times hours, W/m2. */
#ifndef SLABGAP_CORE_SUN_H
#define SLABGAP_CORE_SUN_H

struct sun_position {
    double elevation_deg; /* geometric: no refraction */
    double azimuth_deg;   /* from north, clockwise */
};
/* At a moment of Universal Time (hour may be below 0 or above 24), longitude east positive. Good to
 * about 0.01 degree in 1950 to 2050. */
struct sun_position sun_at(int year, int month, int day, double hour_utc, double latitude_deg,
                           double longitude_deg);
/* Rise and set of the upper limb in clock hours of a day whose clock is `utc_offset_h` ahead of
 * Universal Time (-0.833 degrees: refraction and half the disc). */
enum sun_day { SUN_DAY_USUAL, SUN_DAY_NEVER_SETS, SUN_DAY_NEVER_RISES };
enum sun_day sun_rise_set(int year, int month, int day, double latitude_deg, double longitude_deg,
                          double utc_offset_h, double *rise_h, double *set_h);
/* Sine of the elevation at a solar hour (12 = the sun in the meridian) of a day of the year. */
double sun_sine(double latitude_deg, int day_of_year, double solar_hour);
/* Clear sky on the level: 0.75 of what arrives outside the air. */
double sun_clear(double latitude_deg, int day_of_year, double solar_hour);
/* Share let through by a sky covered to `cloud` (0 to 1). */
double sun_cloud_share(double cloud);

#endif
