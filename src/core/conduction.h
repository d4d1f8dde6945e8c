/* Heat in a slab on its base and the ground: one dimension, implicit in time, hourly weather on
 * top, no flux at the bottom. Temperatures degC, depth m, W/(m K), J/(m3 K), W/m2. */
#ifndef SLABGAP_CORE_CONDUCTION_H
#define SLABGAP_CORE_CONDUCTION_H

#include "base/status.h"
#include "core/climate.h"
#include <stdbool.h>

struct conduction_material {
    double conductivity; /* W/(m K) */
    double heat_m3;      /* J/(m3 K): density times specific heat */
};
struct conduction_slab {
    double thickness_m, base_m;
    struct conduction_material concrete, base, soil;
    double absorptivity, emissivity;
};
/* Concrete 1.7 W/(m K), 2300 kg/m3, 870 J/(kg K); base and soil: from memory. */
void conduction_slab_default(double thickness_m, struct conduction_slab *slab);

/* ---- the column of nodes ---- */
enum { CONDUCTION_NODES_MOST = 64, CONDUCTION_SLAB_CELLS = 8 };
#define CONDUCTION_GAMMA 0.29289321881345254 /* 1 - 1/sqrt(2) */
struct conduction_column {
    int count, slab_nodes; /* nodes; those in the slab, top and bottom face in */
    double depth_m[CONDUCTION_NODES_MOST];
    double heat[CONDUCTION_NODES_MOST];   /* J/(m2 K) of each node's share */
    double link[CONDUCTION_NODES_MOST];   /* W/(m2 K) from node i to i + 1 */
    double weight[CONDUCTION_NODES_MOST]; /* of the slab's nodes in its mean; sums to 1 */
    double slope[CONDUCTION_NODES_MOST];  /* of the slab's nodes in top less bottom */
    /* the matrix of a stage, eliminated from the bottom up: x[i] = inverse[i] r[i] + up[i] x[i-1];
     * stored[i] = heat[i]/(gamma step) */
    double inverse[CONDUCTION_NODES_MOST], up[CONDUCTION_NODES_MOST], stored[CONDUCTION_NODES_MOST];
    double step_s;
};
/* Slab, base and soil to 5 m below; `slab_cells` in the slab (2 to 24). */
void conduction_column_make(const struct conduction_slab *slab, int slab_cells, double step_s,
                            struct conduction_column *column);
/* Heat into the top face, W/m2, at this part of the step (0 to 1) and this surface temperature;
 * *slope: its change per K. */
typedef double conduction_flux(const void *context, double part, double surface_c, double *slope);
/* One step by the two-stage, stiffly accurate SDIRK method of order 2. Eliminated from below, a
 * stage leaves one equation for the surface: it is solved for the real flux, with no linearised
 * surface. Returns the mean flux that entered: times step_s it is exactly the heat gained. */
double conduction_step(const struct conduction_column *column, double *temperature,
                       conduction_flux *flux, const void *context);
double conduction_mean(const struct conduction_column *column, const double *temperature);
/* Top less bottom of the straight line through the slab's temperatures (least squares). */
double conduction_difference(const struct conduction_column *column, const double *temperature);
/* Heat above 0 degC in the column, J/m2. */
double conduction_heat(const struct conduction_column *column, const double *temperature);

/* ---- the surface ---- */
/* Film coefficient of wind, W/(m2 K). */
double conduction_film(double wind_m_s);
/* Heat into a surface at `surface_c` under that hour's weather. */
double conduction_surface_flux(const struct conduction_slab *slab, const struct climate_hour *hour,
                               double surface_c);
/* What the surface takes in before it gives any back: sun, sky, film times air; W/m2. */
double conduction_taken(const struct conduction_slab *slab, const struct climate_hour *hour);
/* emissivity times the Stefan-Boltzmann constant, W/(m2 K4), and 0 degC in K. */
double conduction_radiation(const struct conduction_slab *slab);
#define CONDUCTION_ZERO_K 273.15

/* ---- years (conduction_year.c) ---- */
struct conduction_year {
    float mean_c[CLIMATE_HOURS], top_c[CLIMATE_HOURS], bottom_c[CLIMATE_HOURS];
    float difference_k[CLIMATE_HOURS]; /* top less bottom, straight line */
    double coldest_c, hottest_c;       /* of the mean */
    int coldest_hour, hottest_hour;
    double day_k, night_k; /* largest and smallest difference */
    int day_hour, night_hour;
    int spin_up_years;
};
/* The steady year: run until two years agree within 0.01 K. STATUS_NO_MEMORY. */
enum status conduction_year_make(const struct conduction_slab *slab,
                                 const struct climate_hour hours[CLIMATE_HOURS],
                                 struct conduction_year *year);
/* Temperatures that one year hands to the next. */
struct conduction_state {
    double temperature[CONDUCTION_NODES_MOST];
};
/* The same, keeping where it ended. */
enum status conduction_year_steady(const struct conduction_slab *slab,
                                   const struct climate_hour hours[CLIMATE_HOURS],
                                   struct conduction_state *state, struct conduction_year *year);
/* The year that comes after the state; the state moves on. */
enum status conduction_year_next(const struct conduction_slab *slab,
                                 const struct climate_hour hours[CLIMATE_HOURS],
                                 struct conduction_state *state, struct conduction_year *year);
/* Mean temperature below which this share (0 to 1) of the year's hours lies. STATUS_NO_MEMORY. */
enum status conduction_year_percentiles(const struct conduction_year *year, const double *shares,
                                        int count, double *out);

/* ---- eight at once (conduction_batch.c) ---- */
enum { CONDUCTION_LANES = 8 };
struct conduction_extremes {
    double coldest_c, hottest_c, day_k, night_k;
    int coldest_hour, hottest_hour; /* from the first hour of the first year */
};
/* Eight slabs, each under its own weather: `years` times the same year after a warm-up year; what
 * each comes to. weather[lane] points to CLIMATE_HOURS hours and may be shared. Gives the same
 * numbers as one at a time. STATUS_NO_MEMORY. */
enum status conduction_batch(const struct conduction_slab slabs[CONDUCTION_LANES],
                             const struct climate_hour *const weather[CONDUCTION_LANES], int years,
                             struct conduction_extremes out[CONDUCTION_LANES]);

#endif
