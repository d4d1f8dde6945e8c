/* The slab's year: hourly weather on the column until two years agree. */
#include "core/conduction.h"
#include <math.h>
#include <stdlib.h>
#include <string.h>

static const double SAME_YEAR_K = 0.01;
enum { YEARS_MOST = 20 };

/* ---- the surface under the weather ---- */

/* What a step needs of the weather, worked out once a year: the flux is then cheap. Means over a
 * span of hours; [count] is the first again. */
struct terms {
    int count;
    double taken[CLIMATE_HOURS + 1], film[CLIMATE_HOURS + 1];
};
struct run {
    struct terms hourly, coarse;
};
struct moment {
    double taken[2], film[2]; /* at both ends of the step */
    double radiation;
};

static double flux(const void *context, double part, double surface_c, double *slope)
{
    const struct moment *moment = context;
    double taken = moment->taken[0] + part * (moment->taken[1] - moment->taken[0]);
    double film = moment->film[0] + part * (moment->film[1] - moment->film[0]);
    double kelvin = surface_c + CONDUCTION_ZERO_K, cube = kelvin * kelvin * kelvin;

    *slope = -film - 4 * moment->radiation * cube;
    return taken - film * surface_c - moment->radiation * cube * kelvin;
}

static void set_hourly(const struct conduction_slab *slab,
                       const struct climate_hour hours[CLIMATE_HOURS], struct terms *terms)
{
    terms->count = CLIMATE_HOURS;
    for (int h = 0; h < CLIMATE_HOURS; h++) {
        terms->taken[h] = conduction_taken(slab, &hours[h]);
        terms->film[h] = conduction_film(hours[h].wind_m_s);
    }
    terms->taken[CLIMATE_HOURS] = terms->taken[0];
    terms->film[CLIMATE_HOURS] = terms->film[0];
}

static void set_coarse(const struct terms *hourly, int span, struct terms *coarse)
{
    *coarse = (struct terms){.count = CLIMATE_HOURS / span};
    for (int h = 0; h < CLIMATE_HOURS; h++) {
        coarse->taken[h / span] += hourly->taken[h] / span;
        coarse->film[h / span] += hourly->film[h] / span;
    }
    coarse->taken[coarse->count] = coarse->taken[0];
    coarse->film[coarse->count] = coarse->film[0];
}

/* ---- one year ---- */

static void note_hour(const struct conduction_column *column, const double *temperature, int hour,
                      struct conduction_year *year)
{
    year->mean_c[hour] = (float)conduction_mean(column, temperature);
    year->top_c[hour] = (float)temperature[0];
    year->bottom_c[hour] = (float)temperature[column->slab_nodes - 1];
    year->difference_k[hour] = (float)conduction_difference(column, temperature);
}

/* Node means over the year go to `means` (NULL: not wanted). `year` NULL: nothing is noted. */
static void run_year(const struct conduction_column *column, double radiation,
                     const struct terms *terms, double *temperature, double *means,
                     struct conduction_year *year)
{
    struct moment moment = {.radiation = radiation};

    for (int i = 0; means != NULL && i < column->count; i++)
        means[i] = 0;
    for (int h = 0; h < terms->count; h++) {
        if (year != NULL)
            note_hour(column, temperature, h, year);
        memcpy(moment.taken, &terms->taken[h], sizeof moment.taken);
        memcpy(moment.film, &terms->film[h], sizeof moment.film);
        conduction_step(column, temperature, flux, &moment);
        for (int i = 0; means != NULL && i < column->count; i++)
            means[i] += temperature[i] / terms->count;
    }
}

static void find_extremes(struct conduction_year *year)
{
    year->coldest_c = year->night_k = INFINITY;
    year->hottest_c = year->day_k = -INFINITY;
    for (int h = 0; h < CLIMATE_HOURS; h++) {
        if (year->mean_c[h] < year->coldest_c) {
            year->coldest_c = year->mean_c[h];
            year->coldest_hour = h;
        }
        if (year->mean_c[h] > year->hottest_c) {
            year->hottest_c = year->mean_c[h];
            year->hottest_hour = h;
        }
        if (year->difference_k[h] > year->day_k) {
            year->day_k = year->difference_k[h];
            year->day_hour = h;
        }
        if (year->difference_k[h] < year->night_k) {
            year->night_k = year->difference_k[h];
            year->night_hour = h;
        }
    }
}

/* ---- towards the steady year ---- */

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
static void warm_up(const struct conduction_slab *slab, struct run *run, double start_c,
                    double *temperature)
{
    enum { SPAN = 6, YEARS = 4 };
    double means[CONDUCTION_NODES_MOST];
    struct conduction_column column;

    conduction_column_make(slab, CONDUCTION_SLAB_CELLS, 3600.0 * SPAN, &column);
    set_coarse(&run->hourly, SPAN, &run->coarse);
    for (int i = 0; i < column.count; i++)
        temperature[i] = start_c;
    for (int y = 0; y < YEARS; y++) {
        run_year(&column, conduction_radiation(slab), &run->coarse, temperature, means, NULL);
        if (y + 1 < YEARS)
            settle_ground(&column, means, temperature);
    }
}

static void run_steady(const struct conduction_slab *slab, struct run *run, double start_c,
                       double *temperature, struct conduction_year *year)
{
    double start[CONDUCTION_NODES_MOST], means[CONDUCTION_NODES_MOST];
    struct conduction_column column;
    bool same = false;

    conduction_column_make(slab, CONDUCTION_SLAB_CELLS, 3600, &column);
    warm_up(slab, run, start_c, temperature);
    for (year->spin_up_years = 0; !same && year->spin_up_years < YEARS_MOST;
         year->spin_up_years++) {
        double worst = 0;
        memcpy(start, temperature, sizeof start);
        run_year(&column, conduction_radiation(slab), &run->hourly, temperature, means, year);
        for (int i = 0; i < column.count; i++)
            worst = fmax(worst, fabs(temperature[i] - start[i]));
        same = worst < SAME_YEAR_K;
        if (!same)
            settle_ground(&column, means, temperature);
    }
    find_extremes(year);
}

enum status conduction_year_steady(const struct conduction_slab *slab,
                                   const struct climate_hour hours[CLIMATE_HOURS],
                                   struct conduction_state *state, struct conduction_year *year)
{
    struct run *run = malloc(sizeof *run);

    if (run == NULL)
        return STATUS_NO_MEMORY;
    memset(state, 0, sizeof *state);
    set_hourly(slab, hours, &run->hourly);
    run_steady(slab, run, mean_air(hours), state->temperature, year);
    free(run);
    return STATUS_OK;
}

enum status conduction_year_next(const struct conduction_slab *slab,
                                 const struct climate_hour hours[CLIMATE_HOURS],
                                 struct conduction_state *state, struct conduction_year *year)
{
    struct terms *terms = malloc(sizeof *terms);
    struct conduction_column column;

    if (terms == NULL)
        return STATUS_NO_MEMORY;
    conduction_column_make(slab, CONDUCTION_SLAB_CELLS, 3600, &column);
    set_hourly(slab, hours, terms);
    terms->taken[CLIMATE_HOURS] = terms->taken[CLIMATE_HOURS - 1]; /* the next year is not known */
    terms->film[CLIMATE_HOURS] = terms->film[CLIMATE_HOURS - 1];
    run_year(&column, conduction_radiation(slab), terms, state->temperature, NULL, year);
    year->spin_up_years = 0;
    find_extremes(year);
    free(terms);
    return STATUS_OK;
}

enum status conduction_year_make(const struct conduction_slab *slab,
                                 const struct climate_hour hours[CLIMATE_HOURS],
                                 struct conduction_year *year)
{
    struct conduction_state state;

    return conduction_year_steady(slab, hours, &state, year);
}

/* ---- percentiles ---- */

static int colder(const void *a, const void *b)
{
    float x = *(const float *)a, y = *(const float *)b;

    return (x > y) - (x < y);
}

enum status conduction_year_percentiles(const struct conduction_year *year, const double *shares,
                                        int count, double *out)
{
    float *sorted = malloc(sizeof year->mean_c);

    if (sorted == NULL)
        return STATUS_NO_MEMORY;
    memcpy(sorted, year->mean_c, sizeof year->mean_c);
    qsort(sorted, CLIMATE_HOURS, sizeof *sorted, colder);
    for (int i = 0; i < count; i++)
        out[i] = sorted[(int)lround(fmin(fmax(shares[i], 0), 1) * (CLIMATE_HOURS - 1))];
    free(sorted);
    return STATUS_OK;
}
