/* The first three days of a slab: heat of hydration in a column of concrete, base and ground under
 * the weather of those days; from it strength, restrained stress, and when the first cut may and
 * must be made. Times h from placing; degC; SI otherwise. */
#ifndef SLABGAP_CORE_EARLY_H
#define SLABGAP_CORE_EARLY_H

#include "base/status.h"
#include "core/conduction.h"
#include "core/friction_bar.h"
#include "core/hydration.h"

enum { EARLY_HOURS = 72, EARLY_STEPS = 12 * EARLY_HOURS }; /* steps of 5 minutes */

struct early_mix {
    struct hydration hydration;
    enum maturity maturity;
    double placing_c;
    double mean_strength_pa; /* fcm at 28 days */
    double modulus_pa;       /* Ecm at 28 days */
};
/* Degree of hydration by equivalent age and rate of ageing by temperature, as tables: a run asks
 * for them ten thousand times. Good to 1e-5. */
enum { EARLY_AGE_CELLS = 1024, EARLY_RATE_CELLS = 300 };
struct early_curves {
    double degree[EARLY_AGE_CELLS + 2]; /* even cells in the root of the age */
    double rate[EARLY_RATE_CELLS + 2];
};
void early_curves_make(const struct early_mix *mix, struct early_curves *curves);
/* What the face takes in at every step. */
struct early_weather {
    double taken[EARLY_STEPS + 1], film[EARLY_STEPS + 1]; /* W/m2, W/(m2 K) */
    double air_c[EARLY_STEPS + 1];
    double radiation;        /* W/(m2 K4) */
    double resistance_m2k_w; /* of a cover on the slab; 0 = none */
    double ground_c, deep_c; /* under the slab at placing, and five metres below */
};
/* Hourly weather from `from_hour` (of hours[0]) on, in between linear. STATUS_REFUSED when the
 * hours end before the third day does. */
enum status early_weather_make(const struct conduction_slab *slab, const struct climate_hour *hours,
                               size_t count, double from_hour, struct early_weather *out);

/* What one run differs in from the best guess. {0, 1, 1} = the guess itself. */
struct early_scatter {
    double warmer_k; /* air, sky and concrete */
    double heat;     /* factor on the heat */
    double strength; /* factor on strength and stiffness gained */
};
struct early_history {
    float mean_c[EARLY_STEPS + 1], difference_k[EARLY_STEPS + 1]; /* top less bottom */
    float degree[EARLY_STEPS + 1];         /* of hydration, mean over the depth */
    float top_degree[EARLY_STEPS + 1];     /* at the face */
    double strength;                       /* the factor of the run */
    double set_h, set_c, set_difference_k; /* final set of the mean; INFINITY, NAN when not yet */
};
void early_run(const struct conduction_column *column, const struct early_mix *mix,
               const struct early_curves *curves, const struct early_weather *weather,
               const struct early_scatter *scatter, struct early_history *out);
/* Column for early_run: thickness, base and ground of `slab`, steps of 5 minutes. */
void early_column(const struct conduction_slab *slab, struct conduction_column *column);

/* ---- strength and stress at a step ---- */
double early_strength(const struct early_mix *mix, const struct early_history *history, int step);
/* ft = 0.30 fc^(2/3), MPa: form of EN 1992-1-1 Table 3.1 on the strength of the hour. */
double early_tensile(double strength_pa);
/* E = Ecm (fc/fcm)^0.3: EN 1992-1-1 (3.5) on the strength of the hour. */
double early_modulus(const struct early_mix *mix, double strength_pa);

struct early_strip {
    double length_m;  /* not cut so far */
    double expansion; /* 1/K */
    double friction;  /* high */
    double slip_m, unit_weight;
    double relaxation; /* stresses are divided by 1 + this */
};
/* Tension at the top of the strip's middle: the bar on friction cooled from set (no credit while it
 * is warmer), and curling of a gradient colder at the top than at set with Bradbury's C = 1.08,
 * both relaxed. Pa, 0 before set. */
double early_stress(const struct early_mix *mix, double thickness_m,
                    const struct early_strip *strip, const struct early_history *history, int step);

/* ---- the window ---- */
/* First moment at which the face reaches this strength; INFINITY when not within three days. */
double early_earliest(const struct early_mix *mix, const struct early_history *history,
                      double strength_pa);
/* First moment after set at which the stress reaches `share` of the tensile strength; INFINITY when
 * not within three days. */
double early_latest(const struct early_mix *mix, double thickness_m,
                    const struct early_strip *strip, const struct early_history *history,
                    double share);

#endif
