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
enum { CONDUCTION_NODES_MOST = 64 };
struct conduction_column {
    int count, slab_nodes; /* nodes; those in the slab, top and bottom face in */
    double depth_m[CONDUCTION_NODES_MOST];
    double heat[CONDUCTION_NODES_MOST];   /* J/(m2 K) of each node's share */
    double link[CONDUCTION_NODES_MOST];   /* W/(m2 K) from node i to i + 1 */
    double weight[CONDUCTION_NODES_MOST]; /* of the slab's nodes in its mean; sums to 1 */
    double lower[CONDUCTION_NODES_MOST], inverse[CONDUCTION_NODES_MOST]; /* the factored matrix */
    double step_s, surface; /* s; W/(m2 K) taken into the matrix at the top */
};
/* Slab, base and soil to 5 m; `slab_cells` in the slab (2 to 24). */
void conduction_column_make(const struct conduction_slab *slab, int slab_cells, double step_s,
                            double surface, struct conduction_column *column);
/* Heat into the top face, W/m2, at this part of the step (0 to 1) and this surface temperature. */
typedef double conduction_flux(const void *context, double part, double surface_c);
/* One step by the two-stage, stiffly accurate SDIRK method of order 2 (g = 1 - 1/sqrt 2). The flux
 * is taken at a first guess and once more at the stage's own answer. Returns the mean flux that
 * entered: times step_s it is exactly the heat gained. */
double conduction_step(const struct conduction_column *column, double *temperature,
                       conduction_flux *flux, const void *context);
double conduction_mean(const struct conduction_column *column, const double *temperature);
/* Top less bottom of the straight line through the slab's temperatures (least squares). */
double conduction_difference(const struct conduction_column *column, const double *temperature);
/* Heat above 0 degC in the column, J/m2. */
double conduction_heat(const struct conduction_column *column, const double *temperature);

/* Heat into a surface at `surface_c` under that hour's weather. */
double conduction_surface_flux(const struct conduction_slab *slab, const struct climate_hour *hour,
                               double surface_c);

/* ---- the year ---- */
struct conduction_year {
    float mean_c[CLIMATE_HOURS], top_c[CLIMATE_HOURS], bottom_c[CLIMATE_HOURS];
    float difference_k[CLIMATE_HOURS]; /* top less bottom, straight line */
    double coldest_c, hottest_c;       /* of the mean */
    int coldest_hour, hottest_hour;
    double day_k, night_k; /* largest and smallest difference */
    int spin_up_years;
};
/* The steady year: run until two years agree within 0.01 K. STATUS_NO_MEMORY. */
enum status conduction_year_make(const struct conduction_slab *slab,
                                 const struct climate_hour hours[CLIMATE_HOURS],
                                 struct conduction_year *year);

#endif
