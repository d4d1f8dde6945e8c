#include "core/conduction.h"

#include <math.h>
#include <stdlib.h>

static const double ZERO_K = 273.15;
static const double STEFAN_BOLTZMANN = 5.670374419e-8; /* W/(m2 K4) */
static const double SOIL_DEPTH_M = 5; /* zero flux there: deeper changes < 0.15 K */
static const double SAME_YEAR_K = 0.01;
enum { YEARS_MOST = 20, SLAB_CELLS = 8, BASE_CELLS = 3 };
#define GAMMA 0.29289321881345254 /* 1 - 1/sqrt(2) */

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

/* The matrix H/(g dt) + conduction + surface is the same in every stage: Thomas' elimination is
 * done once. */
static void factor(struct conduction_column *column)
{
    double above = 0;

    for (int i = 0; i < column->count; i++) {
        double diagonal = column->heat[i] / (GAMMA * column->step_s) +
                          (i + 1 < column->count ? column->link[i] : 0) +
                          (i > 0 ? column->link[i - 1] : column->surface);
        column->lower[i] = i > 0 ? column->link[i - 1] * above : 0;
        above = 1 / (diagonal - (i > 0 ? column->link[i - 1] * column->lower[i] : 0));
        column->inverse[i] = above;
    }
}

void conduction_column_make(const struct conduction_slab *slab, int slab_cells, double step_s,
                            double surface, struct conduction_column *column)
{
    int at;

    *column = (struct conduction_column){.step_s = step_s, .surface = surface};
    at = add_layer(column, 0, slab->thickness_m, slab_cells, &slab->concrete);
    column->slab_nodes = at + 1;
    for (int i = 0; i <= at; i++)
        column->weight[i] = (i == 0 || i == at ? 0.5 : 1.0) / slab_cells;
    if (slab->base_m > 0)
        at = add_layer(column, at, slab->base_m, BASE_CELLS, &slab->base);
    at = add_soil(column, at, column->depth_m[at], &slab->soil);
    column->count = at + 1;
    factor(column);
}

/* Solves the factored system in place. */
static void solve(const struct conduction_column *column, double *x)
{
    for (int i = 1; i < column->count; i++)
        x[i] += column->lower[i] * x[i - 1];
    x[column->count - 1] *= column->inverse[column->count - 1];
    for (int i = column->count - 2; i >= 0; i--)
        x[i] = (x[i] + column->link[i] * x[i + 1]) * column->inverse[i];
}

/* One stage from `base`: `guess` is the surface temperature tried first. Returns the flux taken. */
static double stage(const struct conduction_column *column, const double *base, double part,
                    double guess, conduction_flux *flux, const void *context, double *out)
{
    double taken = 0;

    for (int pass = 0; pass < 2; pass++) {
        double at_guess = flux(context, part, guess) + column->surface * guess;
        for (int i = 0; i < column->count; i++)
            out[i] = column->heat[i] / (GAMMA * column->step_s) * base[i];
        out[0] += at_guess;
        solve(column, out);
        taken = at_guess - column->surface * out[0];
        guess = out[0];
    }
    return taken;
}

/* T1 = T0 + g dt K1; T = T0 + (1 - g) dt K1 + g dt K2: Alexander (1977), Diagonally implicit
 * Runge-Kutta methods for stiff ODEs, SIAM J. Numer. Anal. 14, order 2, L-stable. */
double conduction_step(const struct conduction_column *column, double *temperature,
                       conduction_flux *flux, const void *context)
{
    double first[CONDUCTION_NODES_MOST], base[CONDUCTION_NODES_MOST];
    double q1 = stage(column, temperature, GAMMA, temperature[0], flux, context, first), q2;

    for (int i = 0; i < column->count; i++)
        base[i] = temperature[i] + (1 - GAMMA) / GAMMA * (first[i] - temperature[i]);
    q2 = stage(column, base, 1, first[0], flux, context, temperature);
    return (1 - GAMMA) * q1 + GAMMA * q2;
}

double conduction_mean(const struct conduction_column *column, const double *temperature)
{
    double sum = 0;

    for (int i = 0; i < column->slab_nodes; i++)
        sum += column->weight[i] * temperature[i];
    return sum;
}

double conduction_difference(const struct conduction_column *column, const double *temperature)
{
    double thickness = column->depth_m[column->slab_nodes - 1], middle = thickness / 2;
    double moment = 0, square = 0;

    for (int i = 0; i < column->slab_nodes; i++) {
        double arm = middle - column->depth_m[i];
        moment += column->weight[i] * arm * temperature[i];
        square += column->weight[i] * arm * arm;
    }
    return moment / square * thickness;
}

double conduction_heat(const struct conduction_column *column, const double *temperature)
{
    double sum = 0;

    for (int i = 0; i < column->count; i++)
        sum += column->heat[i] * temperature[i];
    return sum;
}

/* ---- the surface ---- */

/* hc = 5.6 + 3.95 v below 5 m/s, 7.6 v^0.78 above: McAdams as used for pavements (Barber
 * follow-ups; read in a retrieved text). */
static double convection(double wind_m_s)
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
    double kelvin = celsius + ZERO_K;

    return kelvin * kelvin * kelvin * kelvin;
}

/* q = a Q + e s (Tsky^4 - Ts^4) + hc (Ta - Ts), Tsky^4 = e_sky Ta^4. */
double conduction_surface_flux(const struct conduction_slab *slab, const struct climate_hour *hour,
                               double surface_c)
{
    double sky = sky_emissivity(hour->dew_c, hour->cloud) * fourth(hour->air_c);

    return slab->absorptivity * hour->sun_w_m2 +
           slab->emissivity * STEFAN_BOLTZMANN * (sky - fourth(surface_c)) +
           convection(hour->wind_m_s) * (hour->air_c - surface_c);
}

/* ---- the year ---- */

/* What a step needs of the weather, worked out once an hour: the flux is then cheap. */
struct weather {
    const struct conduction_slab *slab;
    double taken[2];  /* absorbed sun + long wave from the sky + hc Ta, at both ends of the step */
    double wind_w[2]; /* hc */
};

static void weather_end(const struct conduction_slab *slab, const struct climate_hour *hour,
                        double *taken, double *wind_w)
{
    *wind_w = convection(hour->wind_m_s);
    *taken = slab->absorptivity * hour->sun_w_m2 +
             slab->emissivity * STEFAN_BOLTZMANN * sky_emissivity(hour->dew_c, hour->cloud) *
                 fourth(hour->air_c) +
             *wind_w * hour->air_c;
}

static double weather_flux(const void *context, double part, double surface_c)
{
    const struct weather *weather = context;
    double taken = weather->taken[0] + part * (weather->taken[1] - weather->taken[0]);
    double wind = weather->wind_w[0] + part * (weather->wind_w[1] - weather->wind_w[0]);

    return taken - wind * surface_c -
           weather->slab->emissivity * STEFAN_BOLTZMANN * fourth(surface_c);
}

static void note_hour(const struct conduction_column *column, const double *temperature, int hour,
                      struct conduction_year *year)
{
    year->mean_c[hour] = (float)conduction_mean(column, temperature);
    year->top_c[hour] = (float)temperature[0];
    year->bottom_c[hour] = (float)temperature[column->slab_nodes - 1];
    year->difference_k[hour] = (float)conduction_difference(column, temperature);
}

/* Mean of the weather's terms over the `span` hours that begin at `hour`. */
static void weather_mean(const struct conduction_slab *slab,
                         const struct climate_hour hours[CLIMATE_HOURS], int hour, int span,
                         double *taken, double *wind_w)
{
    *taken = *wind_w = 0;
    for (int i = 0; i < span; i++) {
        double t, w;
        weather_end(slab, &hours[(hour + i) % CLIMATE_HOURS], &t, &w);
        *taken += t / span;
        *wind_w += w / span;
    }
}

/* One year from hour 0 in steps of `span` hours; node means over the year go to `means`. `year`
 * NULL: nothing is noted. */
static void run_year(const struct conduction_column *column, int span,
                     const struct conduction_slab *slab,
                     const struct climate_hour hours[CLIMATE_HOURS], double *temperature,
                     double *means, struct conduction_year *year)
{
    struct weather weather = {.slab = slab};

    for (int i = 0; i < column->count; i++)
        means[i] = 0;
    weather_mean(slab, hours, 0, span, &weather.taken[1], &weather.wind_w[1]);
    for (int h = 0; h < CLIMATE_HOURS; h += span) {
        if (year != NULL)
            note_hour(column, temperature, h, year);
        weather.taken[0] = weather.taken[1];
        weather.wind_w[0] = weather.wind_w[1];
        weather_mean(slab, hours, h + span, span, &weather.taken[1], &weather.wind_w[1]);
        conduction_step(column, temperature, weather_flux, &weather);
        for (int i = 0; i < column->count; i++)
            means[i] += temperature[i] * span / CLIMATE_HOURS;
    }
}

static void find_extremes(struct conduction_year *year)
{
    year->coldest_c = year->day_k = -INFINITY;
    year->hottest_c = year->night_k = -INFINITY;
    year->coldest_c = INFINITY;
    year->night_k = INFINITY;
    for (int h = 0; h < CLIMATE_HOURS; h++) {
        if (year->mean_c[h] < year->coldest_c) {
            year->coldest_c = year->mean_c[h];
            year->coldest_hour = h;
        }
        if (year->mean_c[h] > year->hottest_c) {
            year->hottest_c = year->mean_c[h];
            year->hottest_hour = h;
        }
        year->day_k = fmax(year->day_k, year->difference_k[h]);
        year->night_k = fmin(year->night_k, year->difference_k[h]);
    }
}

static double mean_air(const struct climate_hour hours[CLIMATE_HOURS])
{
    double sum = 0;

    for (int h = 0; h < CLIMATE_HOURS; h++)
        sum += hours[h].air_c;
    return sum / CLIMATE_HOURS;
}

/* In the steady year nothing flows down on average, so the yearly means of all nodes are that of
 * the surface: between two years each node is moved there, which the ground alone would take years
 * for. */
static void settle_ground(const struct conduction_column *column, const double *means,
                          double *temperature)
{
    for (int i = column->slab_nodes; i < column->count; i++)
        temperature[i] += means[0] - means[i];
}

/* Years in steps of six hours bring the ground near its steady year at a sixth of the cost. */
static void warm_up(const struct conduction_slab *slab,
                    const struct climate_hour hours[CLIMATE_HOURS], double surface,
                    double *temperature)
{
    enum { SPAN = 6, YEARS = 4 };
    double means[CONDUCTION_NODES_MOST];
    struct conduction_column column;

    conduction_column_make(slab, SLAB_CELLS, 3600.0 * SPAN, surface, &column);
    for (int i = 0; i < column.count; i++)
        temperature[i] = mean_air(hours);
    for (int y = 0; y < YEARS; y++) {
        run_year(&column, SPAN, slab, hours, temperature, means, NULL);
        if (y + 1 < YEARS)
            settle_ground(&column, means, temperature);
    }
}

enum status conduction_year_make(const struct conduction_slab *slab,
                                 const struct climate_hour hours[CLIMATE_HOURS],
                                 struct conduction_year *year)
{
    const double usual_radiation = 4 * 0.9 * 5.670374419e-8 * 288.15 * 288.15 * 288.15;
    double surface = convection(hours[0].wind_m_s) + usual_radiation;
    double temperature[CONDUCTION_NODES_MOST], start[CONDUCTION_NODES_MOST];
    double means[CONDUCTION_NODES_MOST];
    struct conduction_column column;
    bool same = false;

    conduction_column_make(slab, SLAB_CELLS, 3600, surface, &column);
    warm_up(slab, hours, surface, temperature);
    for (year->spin_up_years = 0; !same && year->spin_up_years < YEARS_MOST;
         year->spin_up_years++) {
        double worst = 0;
        for (int i = 0; i < column.count; i++)
            start[i] = temperature[i];
        run_year(&column, 1, slab, hours, temperature, means, year);
        for (int i = 0; i < column.count; i++)
            worst = fmax(worst, fabs(temperature[i] - start[i]));
        same = worst < SAME_YEAR_K;
        if (!same)
            settle_ground(&column, means, temperature);
    }
    find_extremes(year);
    return STATUS_OK;
}
