/* Slab temperature without a simulation: Barber's closed form for the hottest day, the cautious
 * estimate of the extremes, the deck rule for comparison. Temperatures degC, differences K, SI. */
#ifndef SLABGAP_CORE_SLAB_TEMPERATURE_H
#define SLABGAP_CORE_SLAB_TEMPERATURE_H

/* The order of climate.exposure. */
enum slab_exposure { SLAB_OPEN, SLAB_HALF_SHADE, SLAB_SHADE, SLAB_INDOOR };

struct slab_day { /* a design day */
    double air_mean_c;
    double air_swing_k; /* highest less lowest of the day */
    double wind_m_s;
    double radiation_j_m2; /* sun on the level in the day */
    double absorptivity;   /* 0.65 concrete */
    double conductivity;   /* W/(m K) */
    double density;        /* kg/m3 */
    double heat_capacity;  /* J/(kg K) */
};
/* The hottest design day: air hottest at its warmest hour, clear sky at this latitude, exposure's
 * share of the sun; absorptivity 0.65, k 1.7, 2300 kg/m3, 870 J/(kg K). */
struct slab_day slab_day_hottest(double air_hottest_c, double swing_k, double wind_m_s,
                                 double latitude_deg, enum slab_exposure exposure);

/* Barber 1957 at a depth (m) at an hour counted from the start of the sine (0..24), degC. */
double slab_temperature_barber(const struct slab_day *day, double depth_m, double hour);
/* Its highest value at that depth. */
double slab_temperature_barber_highest(const struct slab_day *day, double depth_m);

/* Sun on the level, J/m2 in a day (FAO-56 eq. 21 and 37; altitude 0). Latitude degrees. */
double slab_sun_extraterrestrial(double latitude_deg, int day_of_year);
double slab_sun_clear(double latitude_deg, int day_of_year);
/* The clear day with the most sun. An unknown latitude (NAN): 45 degrees. */
double slab_sun_clear_most(double latitude_deg);
/* Share of the sun that reaches the slab: open 1, half 0.5, shade 0.25, indoor 0. From memory. */
double slab_exposure_share(enum slab_exposure exposure);

struct slab_extremes {
    double coldest_c, hottest_c; /* mean over the depth */
};
/* "estimate, cautious": coldest = coldest air; hottest = Barber at mid-depth; indoor: the air. */
struct slab_extremes slab_temperature_estimate(double air_coldest_c, double air_hottest_c,
                                               double swing_hot_k, double wind_m_s,
                                               double latitude_deg, enum slab_exposure exposure,
                                               double thickness_m);
/* EN 1991-1-5 Figure 6.1, concrete deck, shade air temperatures: for comparison only, no bound. */
struct slab_extremes slab_temperature_deck(double air_coldest_c, double air_hottest_c);

#endif
