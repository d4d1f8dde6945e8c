#include "core/conduction.h"

#include <math.h>

static const double STEFAN_BOLTZMANN = 5.670374419e-8; /* W/(m2 K4) */
static const double SOIL_DEPTH_M = 5; /* zero flux there: deeper changes < 0.15 K */
enum { BASE_CELLS = 3 };

void conduction_slab_default(double thickness_m, struct conduction_slab *slab)
{
    *slab = (struct conduction_slab){
        .thickness_m = thickness_m,
        .base_m = 0.15,
        .concrete = {1.7, 2300 * 870.0},
        .base = {1.5, 2000 * 900.0},  /* granular, damp; from memory */
        .soil = {1.5, 1900 * 1300.0}, /* damp soil; from memory */
        .absorptivity = 0.65,
        .emissivity = 0.90,
    };
}

/* ---- the column ---- */

/* One layer of `cells` equal cells below node `at`; each cell gives half its heat to either end. */
static int add_layer(struct conduction_column *column, int at, double thickness, int cells,
                     const struct conduction_material *material)
{
    double cell = thickness / cells;

    for (int i = 0; i < cells; i++, at++) {
        column->depth_m[at + 1] = column->depth_m[at] + cell;
        column->heat[at] += material->heat_m3 * cell / 2;
        column->heat[at + 1] = material->heat_m3 * cell / 2;
        column->link[at] = material->conductivity / cell;
    }
    return at;
}

/* Soil cells grow by a half from one to the next. */
static int add_soil(struct conduction_column *column, int at, double from_m,
                    const struct conduction_material *material)
{
    double cell = 0.06;

    while (column->depth_m[at] < from_m + SOIL_DEPTH_M - 1e-9 && at < CONDUCTION_NODES_MOST - 1) {
        double left = from_m + SOIL_DEPTH_M - column->depth_m[at];
        double take = left < 1.6 * cell ? left : cell;
        at = add_layer(column, at, take, 1, material);
        cell *= 1.5;
    }
    return at;
}

/* Weights of the slab's nodes in its mean (trapezium) and in top less bottom of the least-squares
 * line. */
static void set_weights(struct conduction_column *column, int cells)
{
    double thickness = column->depth_m[cells], square = 0;

    for (int i = 0; i <= cells; i++) {
        double arm = thickness / 2 - column->depth_m[i];
        column->weight[i] = (i == 0 || i == cells ? 0.5 : 1.0) / cells;
        square += column->weight[i] * arm * arm;
    }
    for (int i = 0; i <= cells; i++)
        column->slope[i] =
            column->weight[i] * (thickness / 2 - column->depth_m[i]) / square * thickness;
}

/* The matrix heat/(gamma step) + conduction is the same in every stage: Thomas' elimination is done
 * once, from the bottom up, so that the surface is the last equation left. */
static void factor(struct conduction_column *column)
{
    for (int i = column->count - 1; i >= 0; i--) {
        double diagonal;
        column->stored[i] = column->heat[i] / (CONDUCTION_GAMMA * column->step_s);
        diagonal = column->stored[i];
        if (i + 1 < column->count)
            diagonal += column->link[i] - column->link[i] * column->up[i + 1];
        if (i > 0)
            diagonal += column->link[i - 1];
        column->inverse[i] = 1 / diagonal;
        column->up[i] = i > 0 ? column->link[i - 1] * column->inverse[i] : 0;
    }
}

void conduction_column_make(const struct conduction_slab *slab, int slab_cells, double step_s,
                            struct conduction_column *column)
{
    int at;

    *column = (struct conduction_column){.step_s = step_s};
    at = add_layer(column, 0, slab->thickness_m, slab_cells, &slab->concrete);
    column->slab_nodes = at + 1;
    if (slab->base_m > 0)
        at = add_layer(column, at, slab->base_m, BASE_CELLS, &slab->base);
    at = add_soil(column, at, column->depth_m[at], &slab->soil);
    column->count = at + 1;
    set_weights(column, slab_cells);
    factor(column);
}

/* ---- a step ---- */

/* One stage from `base`, the surface sought from `guess` on: top diagonal x T = rest + q(T) by two
 * Newton steps (the first is exact for a linear flux, the second leaves less than 1e-6 K of the
 * fourth power). Returns the flux taken, from the equation itself: the heat closes to rounding. */
static double stage(const struct conduction_column *column, const double *base, double part,
                    double guess, conduction_flux *flux, const void *context, double *out)
{
    double diagonal = 1 / column->inverse[0], t = guess, slope;

    for (int i = column->count - 1; i >= 0; i--)
        out[i] = column->stored[i] * base[i] +
                 (i + 1 < column->count ? column->up[i + 1] * out[i + 1] : 0);
    for (int pass = 0; pass < 2; pass++) {
        double q = flux(context, part, t, &slope);
        t -= (diagonal * t - out[0] - q) / (diagonal - slope);
    }
    slope = diagonal * t - out[0];
    out[0] = t;
    for (int i = 1; i < column->count; i++)
        out[i] = column->inverse[i] * out[i] + column->up[i] * out[i - 1];
    return slope;
}

/* T1 = T0 + g dt K1; T = T0 + (1 - g) dt K1 + g dt K2, g = 1 - 1/sqrt 2: Alexander (1977),
 * Diagonally implicit Runge-Kutta methods for stiff ODEs, SIAM J. Numer. Anal. 14, order 2,
 * L-stable. */
double conduction_step(const struct conduction_column *column, double *temperature,
                       conduction_flux *flux, const void *context)
{
    const double g = CONDUCTION_GAMMA;
    double first[CONDUCTION_NODES_MOST], base[CONDUCTION_NODES_MOST];
    double q1 = stage(column, temperature, g, temperature[0], flux, context, first), q2;

    for (int i = 0; i < column->count; i++)
        base[i] = temperature[i] + (1 - g) / g * (first[i] - temperature[i]);
    q2 = stage(column, base, 1, first[0], flux, context, temperature);
    return (1 - g) * q1 + g * q2;
}

/* ---- what is read off ---- */

static double weighed(const double *weights, int count, const double *temperature)
{
    double sum = 0;

    for (int i = 0; i < count; i++)
        sum += weights[i] * temperature[i];
    return sum;
}

double conduction_mean(const struct conduction_column *column, const double *temperature)
{
    return weighed(column->weight, column->slab_nodes, temperature);
}

double conduction_difference(const struct conduction_column *column, const double *temperature)
{
    return weighed(column->slope, column->slab_nodes, temperature);
}

double conduction_heat(const struct conduction_column *column, const double *temperature)
{
    return weighed(column->heat, column->count, temperature);
}

/* ---- the surface ---- */

/* hc = 5.6 + 3.95 v below 5 m/s, 7.6 v^0.78 above: McAdams as used for pavements (read in a
 * retrieved text). */
double conduction_film(double wind_m_s)
{
    return wind_m_s < 5 ? 5.6 + 3.95 * wind_m_s : 7.6 * pow(wind_m_s, 0.78);
}

/* Sky emissivity of Clark and Allen (1978): 0.787 + 0.764 ln(Tdp/273), Tdp = degC + 273, times 1 +
 * 0.0224 N - 0.0035 N^2 + 0.00028 N^3, N tenths of cloud; at most 1. */
static double sky_emissivity(double dew_c, double cloud)
{
    double n = 10 * cloud;
    double clear = 0.787 + 0.764 * log((dew_c + 273) / 273);

    return fmin(clear * (1 + 0.0224 * n - 0.0035 * n * n + 0.00028 * n * n * n), 1);
}

static double fourth(double celsius)
{
    double kelvin = celsius + CONDUCTION_ZERO_K;

    return kelvin * kelvin * (kelvin * kelvin);
}

double conduction_radiation(const struct conduction_slab *slab)
{
    return slab->emissivity * STEFAN_BOLTZMANN;
}

/* a Q + e s e_sky Ta^4 + hc Ta. */
double conduction_taken(const struct conduction_slab *slab, const struct climate_hour *hour)
{
    return slab->absorptivity * hour->sun_w_m2 +
           conduction_radiation(slab) * sky_emissivity(hour->dew_c, hour->cloud) *
               fourth(hour->air_c) +
           conduction_film(hour->wind_m_s) * hour->air_c;
}

/* q = a Q + e s (Tsky^4 - Ts^4) + hc (Ta - Ts), Tsky^4 = e_sky Ta^4. */
double conduction_surface_flux(const struct conduction_slab *slab, const struct climate_hour *hour,
                               double surface_c)
{
    return conduction_taken(slab, hour) - conduction_radiation(slab) * fourth(surface_c) -
           conduction_film(hour->wind_m_s) * surface_c;
}
