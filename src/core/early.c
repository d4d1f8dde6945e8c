#include "core/early.h"
#include "core/curling.h"
#include "core/mix.h"
#include <math.h>

static const double step_h = 1.0 / 12;
static const double curling_c = 1.08; /* Bradbury's C at L/l = 8, its largest about */

/* ---- weather ---- */

static double between(double a, double b, double part)
{
    return a + part * (b - a);
}

enum status early_weather_make(const struct conduction_slab *slab, const struct climate_hour *hours,
                               size_t count, double from_hour, struct early_weather *out)
{
    if (!(from_hour >= 0) || from_hour + EARLY_HOURS > (double)count - 1)
        return STATUS_REFUSED;
    for (int i = 0; i <= EARLY_STEPS; i++) {
        const double at = from_hour + i * step_h, whole = floor(at), part = at - whole;
        const struct climate_hour *a = &hours[(size_t)whole];
        const struct climate_hour *b = part > 0 ? a + 1 : a;
        out->taken[i] = between(conduction_taken(slab, a), conduction_taken(slab, b), part);
        out->film[i] = between(conduction_film(a->wind_m_s), conduction_film(b->wind_m_s), part);
        out->air_c[i] = between(a->air_c, b->air_c, part);
    }
    out->radiation = conduction_radiation(slab);
    return STATUS_OK;
}

/* ---- tables ---- */

static const double age_most_h = 512, rate_least_c = -30, rate_cell_k = 0.4;

void early_curves_make(const struct early_mix *mix, struct early_curves *curves)
{
    for (int i = 0; i <= EARLY_AGE_CELLS + 1; i++) {
        const double root = i * sqrt(age_most_h) / EARLY_AGE_CELLS;
        curves->degree[i] = hydration_degree(&mix->hydration, root * root);
    }
    for (int i = 0; i <= EARLY_RATE_CELLS + 1; i++)
        curves->rate[i] = maturity_rate(mix->maturity, rate_least_c + i * rate_cell_k);
}

static double look_up(const double *table, int cells, double at)
{
    const double held = fmin(fmax(at, 0), cells);
    const int cell = (int)held;

    return between(table[cell], table[cell + 1], held - cell);
}

static double degree_at(const struct early_curves *curves, double te_h)
{
    return look_up(curves->degree, EARLY_AGE_CELLS,
                   sqrt(te_h) * (EARLY_AGE_CELLS / sqrt(age_most_h)));
}

static double rate_at(const struct early_curves *curves, double celsius)
{
    return look_up(curves->rate, EARLY_RATE_CELLS, (celsius - rate_least_c) / rate_cell_k);
}

/* ---- a run ---- */

struct moment { /* the face during one step */
    double taken[2], film[2];
    double radiation, resistance, warmer;
};

/* What the weather gives the face, less what the face gives back; a cover stands in series with
 * both, its resistance against that of film and radiation together. */
static double flux(const void *context, double part, double surface_c, double *slope)
{
    const struct moment *m = context;
    const double film = between(m->film[0], m->film[1], part);
    const double kelvin = surface_c + CONDUCTION_ZERO_K, cube = kelvin * kelvin * kelvin;
    const double loss = film + 4 * m->radiation * cube; /* W/(m2 K) */
    const double held = 1 / (1 + m->resistance * loss);
    const double taken = between(m->taken[0], m->taken[1], part) + m->warmer * loss;

    *slope = -loss * held;
    return held * (taken - film * surface_c - m->radiation * cube * kelvin);
}

void early_column(const struct conduction_slab *slab, struct conduction_column *column)
{
    enum { CELLS = 6 };

    conduction_column_make(slab, CELLS, 3600 * step_h, column);
}

static void begin(const struct conduction_column *column, const struct early_mix *mix,
                  const struct early_weather *weather, double warmer_k, double *temperature)
{
    const double top = column->depth_m[column->slab_nodes - 1];
    const double bottom = column->depth_m[column->count - 1];

    for (int i = 0; i < column->count; i++)
        temperature[i] = i < column->slab_nodes
                             ? mix->placing_c + warmer_k
                             : between(weather->ground_c + warmer_k, weather->deep_c,
                                       (column->depth_m[i] - top) / (bottom - top));
}

struct concrete { /* node by node */
    double age_h[CONDUCTION_SLAB_CELLS + 1], degree[CONDUCTION_SLAB_CELLS + 1];
};

/* Half a step of hydration: the heat goes into each node's share of concrete. */
static void react(const struct conduction_column *column, const struct early_curves *curves,
                  double heat_j_m3, double hours, struct concrete *c, double *temperature)
{
    const double thickness = column->depth_m[column->slab_nodes - 1];

    for (int i = 0; i < column->slab_nodes; i++) {
        c->age_h[i] += hours * rate_at(curves, temperature[i]);
        const double degree = degree_at(curves, c->age_h[i]);
        temperature[i] +=
            heat_j_m3 * (degree - c->degree[i]) * thickness * column->weight[i] / column->heat[i];
        c->degree[i] = degree;
    }
}

static void note(const struct conduction_column *column, const double *temperature,
                 const struct concrete *c, int step, struct early_history *out)
{
    double degree = 0;

    for (int i = 0; i < column->slab_nodes; i++)
        degree += column->weight[i] * c->degree[i];
    out->mean_c[step] = (float)conduction_mean(column, temperature);
    out->difference_k[step] = (float)conduction_difference(column, temperature);
    out->degree[step] = (float)degree;
    out->top_degree[step] = (float)c->degree[0];
}

static void find_set(const struct early_mix *mix, struct early_history *out)
{
    out->set_h = INFINITY;
    out->set_c = out->set_difference_k = NAN;
    for (int i = 1; i <= EARLY_STEPS; i++) {
        if (out->degree[i] < mix->hydration.set)
            continue;
        const double rise = out->degree[i] - out->degree[i - 1];
        const double part = rise > 0 ? (mix->hydration.set - out->degree[i - 1]) / rise : 1;
        out->set_h = (i - 1 + part) * step_h;
        out->set_c = between(out->mean_c[i - 1], out->mean_c[i], part);
        out->set_difference_k = between(out->difference_k[i - 1], out->difference_k[i], part);
        return;
    }
}

void early_run(const struct conduction_column *column, const struct early_mix *mix,
               const struct early_curves *curves, const struct early_weather *weather,
               const struct early_scatter *scatter, struct early_history *out)
{
    const double heat = mix->hydration.heat_j_m3 * scatter->heat;
    double temperature[CONDUCTION_NODES_MOST];
    struct moment moment = {.radiation = weather->radiation,
                            .resistance = weather->resistance_m2k_w,
                            .warmer = scatter->warmer_k};
    struct concrete concrete = {{0}, {0}};

    begin(column, mix, weather, scatter->warmer_k, temperature);
    out->strength = scatter->strength;
    note(column, temperature, &concrete, 0, out);
    for (int i = 0; i < EARLY_STEPS; i++) {
        react(column, curves, heat, step_h / 2, &concrete, temperature);
        moment.taken[0] = weather->taken[i];
        moment.taken[1] = weather->taken[i + 1];
        moment.film[0] = weather->film[i];
        moment.film[1] = weather->film[i + 1];
        conduction_step(column, temperature, flux, &moment);
        react(column, curves, heat, step_h / 2, &concrete, temperature);
        note(column, temperature, &concrete, i + 1, out);
    }
    find_set(mix, out);
}

/* ---- strength and stress ---- */

static double strength_of(const struct early_mix *mix, const struct early_history *history,
                          double degree)
{
    return mix->mean_strength_pa * history->strength * hydration_strength(&mix->hydration, degree);
}

double early_strength(const struct early_mix *mix, const struct early_history *history, int step)
{
    return strength_of(mix, history, history->degree[step]);
}

double early_tensile(double strength_pa)
{
    return 0.30e6 * cbrt(strength_pa * 1e-6 * strength_pa * 1e-6);
}

double early_modulus(const struct early_mix *mix, double strength_pa)
{
    return strength_pa > 0 ? mix->modulus_pa * pow(strength_pa / mix->mean_strength_pa, 0.3) : 0;
}

/* Tension of the bar never exceeds that of a slab held altogether, nor what friction can hold. */
static double most_stress(const struct early_strip *strip, double modulus, double cooled,
                          double colder)
{
    const double held = modulus * strip->expansion * fmax(0, cooled);
    const double drag = strip->friction * strip->unit_weight * strip->length_m / 2;

    return (fmin(held, drag) + modulus * strip->expansion * fmax(0, colder)) /
           (1 + strip->relaxation);
}

double early_stress(const struct early_mix *mix, double thickness_m,
                    const struct early_strip *strip, const struct early_history *history, int step)
{
    const double modulus = early_modulus(mix, early_strength(mix, history, step));
    const double cooled = history->set_c - history->mean_c[step];
    const double colder = history->set_difference_k - history->difference_k[step];
    const struct friction_bar bar = {.length_m = strip->length_m,
                                     .thickness_m = thickness_m,
                                     .modulus_pa = modulus,
                                     .friction = strip->friction,
                                     .unit_weight = strip->unit_weight,
                                     .slip_m = strip->slip_m};
    const struct curling_slab curl = {.modulus_pa = modulus,
                                      .expansion = strip->expansion,
                                      .poisson = MIX_POISSON,
                                      .thickness_m = thickness_m,
                                      .difference_k = fmax(0, colder)};
    double stress;

    if (!(modulus > 0) || !isfinite(history->set_h))
        return 0;
    /* shortening is a negative strain for the bar, tension a positive stress; the compression of a
     * slab warmer than at set creeps away while it is young and is no help */
    stress = fmax(0, friction_bar_load(&bar, -strip->expansion * cooled).middle_pa);
    return fmax(0, (stress + curling_edge_stress(&curl, curling_c)) / (1 + strip->relaxation));
}

/* ---- the window ---- */

double early_earliest(const struct early_mix *mix, const struct early_history *history,
                      double strength_pa)
{
    double before = 0;

    for (int i = 1; i <= EARLY_STEPS; i++) {
        const double now = strength_of(mix, history, history->top_degree[i]);
        if (now >= strength_pa)
            return (i - 1 + (now > before ? (strength_pa - before) / (now - before) : 1)) * step_h;
        before = now;
    }
    return INFINITY;
}

/* Stress less the share of the strength; below 0 the slab holds. */
static double over(const struct early_mix *mix, double thickness_m, const struct early_strip *strip,
                   const struct early_history *history, double share, int step)
{
    return early_stress(mix, thickness_m, strip, history, step) -
           share * early_tensile(early_strength(mix, history, step));
}

double early_latest(const struct early_mix *mix, double thickness_m,
                    const struct early_strip *strip, const struct early_history *history,
                    double share)
{
    if (!isfinite(history->set_h))
        return INFINITY;
    for (int i = (int)ceil(history->set_h / step_h); i <= EARLY_STEPS; i++) {
        const double strength = early_strength(mix, history, i);
        double now, before;
        if (!(strength > 0) ||
            most_stress(strip, early_modulus(mix, strength), history->set_c - history->mean_c[i],
                        history->set_difference_k - history->difference_k[i]) <
                share * early_tensile(strength))
            continue; /* the exact stress cannot be more */
        now = over(mix, thickness_m, strip, history, share, i);
        if (now < 0)
            continue;
        before = i > 0 ? over(mix, thickness_m, strip, history, share, i - 1) : now;
        return fmax(history->set_h, (before < 0 ? i - now / (now - before) : i) * step_h);
    }
    return INFINITY;
}
