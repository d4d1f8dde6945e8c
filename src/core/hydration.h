/* How far the cement has reacted, the heat that gives, and the strength that stands by then. Times
 * hours of equivalent age at 20 degC unless said; temperatures degC; SI otherwise. */
#ifndef SLABGAP_CORE_HYDRATION_H
#define SLABGAP_CORE_HYDRATION_H

#include <stdbool.h>
#include <stddef.h>

struct hydration_binder {
    double c3s, c2s, c3a, c4af, so3, free_lime, magnesia; /* shares of the cement by mass */
    double fineness_m2_kg;                                /* Blaine */
    double slag, ash, ash_lime; /* shares of the binder; share of CaO in the ash */
    double water;               /* water to binder */
    double content_kg_m3;       /* binder in the concrete */
};
/* Portland cement type I or CEM I, 350 kg/m3, water 0.45: from memory. */
void hydration_binder_default(struct hydration_binder *binder);

struct hydration {
    double ultimate; /* degree of hydration it goes to, at most 1 */
    double tau_h, beta;
    double cement_heat_j_kg; /* of the cement alone, all reacted */
    double heat_j_m3;        /* of the concrete, all its binder reacted */
    double set;              /* degree at final set */
};
/* Schindler and Folliard, Heat of hydration models for cementitious materials, ACI Materials
 * Journal 102 (2005) 24-33. The exponent of SO3 in beta is +0.558. Final set at 0.26 water/binder:
 * Schindler, Prediction of concrete setting, RILEM (2004), the number from memory. */
struct hydration hydration_of(const struct hydration_binder *binder);
/* alpha = ultimate exp(-(tau/te)^beta); 0 at te <= 0. */
double hydration_degree(const struct hydration *hydration, double te_h);
/* Equivalent age at which the degree is reached; INFINITY when never. */
double hydration_age(const struct hydration *hydration, double degree);
/* Compressive strength at a degree as a share of that after 28 days at 20 degC: straight from final
 * set, 0 before it. */
double hydration_strength(const struct hydration *hydration, double degree);

/* ---- the clock that runs faster in the warm ---- */
enum maturity { MATURITY_EN1992, MATURITY_ASTM_C1074 };
/* Hours of equivalent age gained in an hour at this temperature. EN 1992-1-1 (B.10):
 * exp(13.65 - 4000/(273 + T)); ASTM C1074: exp(-5000 K (1/T - 1/293.15 K)). */
double maturity_rate(enum maturity maturity, double temperature_c);
/* ASTM C1074, temperature-time factor: sum of (T - datum) hours, none below the datum. degC h. */
double maturity_factor(const double *temperature_c, const double *hours, size_t count,
                       double datum_c);

#endif
