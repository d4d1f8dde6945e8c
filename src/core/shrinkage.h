/* Shrinkage of a slab that dries from its top, by three published models. Strains are positive
 * ratios (shortening); thickness m, strength Pa, age and curing in days, humidity a ratio 0..1. */
#ifndef SLABGAP_CORE_SHRINKAGE_H
#define SLABGAP_CORE_SHRINKAGE_H

#include "core/mix.h"

struct shrinkage_slab {
    double thickness_m; /* dries from one face: h0 = 2 h, V/S = h */
    double fck_pa;
    double humidity; /* yearly mean of the drying air */
    enum mix_cement cement;
    double curing_days; /* drying starts */
    double ultimate;    /* tested ultimate drying shrinkage; 0 or less = the model's own */
    /* ACI 209R-92 only */
    double slump_m, fines /* ratio of all aggregate */, cement_kg_m3, air /* ratio */;
};
struct shrinkage {
    double drying, autogenous, total;
    double ultimate_drying; /* value drying goes to, all size and humidity factors in */
};

/* Mix values when nothing is known: slump 75 mm, fines 40 %, 350 kg/m3 cement, air 5 %. From
 * memory. */
void shrinkage_mix_default(struct shrinkage_slab *slab);

struct shrinkage shrinkage_en1992(const struct shrinkage_slab *slab, double age_days);
struct shrinkage shrinkage_aci209(const struct shrinkage_slab *slab, double age_days);
struct shrinkage shrinkage_mc2010(const struct shrinkage_slab *slab, double age_days);

/* The order of concrete.shrinkage-model without `typed`. */
enum shrinkage_by { SHRINKAGE_BY_EN1992, SHRINKAGE_BY_ACI209, SHRINKAGE_BY_MC2010 };
struct shrinkage shrinkage_at(enum shrinkage_by model, const struct shrinkage_slab *slab,
                              double age_days);
/* What is still to come between two ages, never below 0. */
double shrinkage_between(enum shrinkage_by model, const struct shrinkage_slab *slab,
                         double from_days, double to_days);

/* ---- parts, for the derivations and the published checks ---- */
/* ACI 209R-92: half-time f in days of a slab dried from one face (f = 26 exp(0.0142 V/S mm)). */
double shrinkage_aci209_half_time(double volume_to_surface_m);
/* EN 1992-1-1 beta_RH, eps_cd0, kh. */
double shrinkage_en1992_humidity_factor(double humidity);
double shrinkage_en1992_basic_drying(double fck_pa, enum mix_cement cement, double humidity);
double shrinkage_en1992_size_factor(double notional_m);
/* fib Model Code 2010 eps_cds0 (before beta_RH) and beta_ds. fcm as the code prints it. */
double shrinkage_mc2010_basic_drying(double fcm_pa, enum mix_cement cement);
double shrinkage_mc2010_time_factor(double notional_m, double drying_days);

#endif
