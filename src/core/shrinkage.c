#include "core/shrinkage.h"

#include <math.h>

static const double MICRO = 1e-6;

static double clamp(double value, double least, double most)
{
    return fmin(fmax(value, least), most);
}

static double drying_time(const struct shrinkage_slab *slab, double age_days)
{
    return fmax(age_days - fmax(slab->curing_days, 0), 0);
}

/* A slab on the ground dries from its top only: h0 = 2 Ac/u = 2 h, V/S = h. */
static double notional_size(const struct shrinkage_slab *slab)
{
    return 2 * fmax(slab->thickness_m, 0.001);
}

/* The concrete of ACI 209R-92's standard conditions, near enough that each factor is about 1: slump
 * 75 mm, fines 40 % , 350 kg/m3 cement, air 5 %. From memory. */
void shrinkage_mix_default(struct shrinkage_slab *slab)
{
    slab->slump_m = 0.075;
    slab->fines = 0.40;
    slab->cement_kg_m3 = 350;
    slab->air = 0.05;
}

/* ---- EN 1992-1-1:2004, 3.1.4 and Annex B.2 ---- */

/* beta_RH = 1.55 [1 - (RH/100)^3]. (B.12) */
double shrinkage_en1992_humidity_factor(double humidity)
{
    return 1.55 * (1 - pow(clamp(humidity, 0, 1), 3));
}

/* eps_cd0 = 0.85 [(220 + 110 a1) exp(-a2 fcm/10)] 1e-6 beta_RH, fcm MPa; (a1, a2) S (3, 0.13),
 * N (4, 0.12), R (6, 0.11). (B.11). Coefficient of variation about 30 %. */
double shrinkage_en1992_basic_drying(double fck_pa, enum mix_cement cement, double humidity)
{
    double a1 = cement == MIX_CEMENT_S ? 3 : cement == MIX_CEMENT_R ? 6 : 4;
    double a2 = cement == MIX_CEMENT_S ? 0.13 : cement == MIX_CEMENT_R ? 0.11 : 0.12;
    double fcm = mix_mean_strength(fck_pa) / 1e6;
    return 0.85 * (220 + 110 * a1) * exp(-a2 * fcm / 10) * MICRO *
           shrinkage_en1992_humidity_factor(humidity);
}

/* kh: Table 3.3, h0 100 1.00, 200 0.85, 300 0.75, 500 mm and more 0.70; linear between. */
double shrinkage_en1992_size_factor(double notional_m)
{
    static const double size[] = {0.1, 0.2, 0.3, 0.5};
    static const double factor[] = {1.00, 0.85, 0.75, 0.70};
    if (!(notional_m > size[0]))
        return factor[0];
    for (int i = 1; i < 4; i++) {
        if (notional_m < size[i])
            return factor[i - 1] + (factor[i] - factor[i - 1]) * (notional_m - size[i - 1]) /
                                       (size[i] - size[i - 1]);
    }
    return factor[3];
}

/* beta_ds = (t - ts)/[(t - ts) + 0.04 sqrt(h0^3)], h0 mm, days. (3.10) */
static double en1992_time_factor(double notional_m, double drying_days)
{
    return drying_days / (drying_days + 0.04 * pow(notional_m * 1000, 1.5));
}

/* eps_ca(t) = [1 - exp(-0.2 sqrt t)] 2.5 (fck - 10) 1e-6, fck MPa, t days. (3.11) to (3.13) */
static double en1992_autogenous(double fck_pa, double age_days)
{
    double final = 2.5 * fmax(fck_pa / 1e6 - 10, 0) * MICRO;
    return final * -expm1(-0.2 * sqrt(fmax(age_days, 0)));
}

struct shrinkage shrinkage_en1992(const struct shrinkage_slab *slab, double age_days)
{
    double notional = notional_size(slab);
    struct shrinkage s;
    s.ultimate_drying =
        slab->ultimate > 0
            ? slab->ultimate
            : shrinkage_en1992_basic_drying(slab->fck_pa, slab->cement, slab->humidity) *
                  shrinkage_en1992_size_factor(notional);
    s.drying = s.ultimate_drying * en1992_time_factor(notional, drying_time(slab, age_days));
    s.autogenous = en1992_autogenous(slab->fck_pa, age_days);
    s.total = s.drying + s.autogenous;
    return s;
}

/* ---- ACI 209R-92, 2.3 to 2.5; SI forms of ACI 209.2R-08 Appendix A ---- */

/* f = 26 exp(0.0142 V/S), V/S mm, days. V/S above 2 m counts as 2 m, so that f stays finite. */
double shrinkage_aci209_half_time(double volume_to_surface_m)
{
    return 26 * exp(0.0142 * clamp(volume_to_surface_m, 0, 2) * 1000);
}

/* Humidity: 1.40 - 0.0102 RH for RH 40 to 80 %, 3.00 - 0.030 RH above; below 40 % as 40 %. */
static double aci209_humidity(double humidity)
{
    double rh = 100 * clamp(humidity, 0.40, 1);
    return rh <= 80 ? 1.40 - 0.0102 * rh : 3.00 - 0.030 * rh;
}

/* Moist curing: 1, 3, 7, 14, 28, 90 d: 1.2, 1.1, 1.0, 0.93, 0.86, 0.75; linear between. */
static double aci209_curing(double days)
{
    static const double at[] = {1, 3, 7, 14, 28, 90};
    static const double factor[] = {1.2, 1.1, 1.0, 0.93, 0.86, 0.75};
    if (!(days > at[0]))
        return factor[0];
    for (int i = 1; i < 6; i++) {
        if (days < at[i])
            return factor[i - 1] +
                   (factor[i] - factor[i - 1]) * (days - at[i - 1]) / (at[i] - at[i - 1]);
    }
    return factor[5];
}

/* Mix: slump 0.89 + 0.00161 s (mm), fines 0.30 + 0.014 p up to 50 %, 0.90 + 0.002 p above, cement
 * 0.75 + 0.00061 c (kg/m3), air 0.95 + 0.008 a (%), not below 1. */
static double aci209_mix(const struct shrinkage_slab *slab)
{
    double fines = 100 * clamp(slab->fines, 0, 1);
    double slump = 0.89 + 0.00161 * fmax(slab->slump_m, 0) * 1000;
    double sand = fines <= 50 ? 0.30 + 0.014 * fines : 0.90 + 0.002 * fines;
    double cement = 0.75 + 0.00061 * fmax(slab->cement_kg_m3, 0);
    double air = fmax(0.95 + 0.008 * 100 * clamp(slab->air, 0, 1), 1);
    return slump * sand * cement * air;
}

/* Size: 1.2 exp(-0.00472 V/S), V/S mm. */
static double aci209_size(double volume_to_surface_m)
{
    return 1.2 * exp(-0.00472 * fmax(volume_to_surface_m, 0) * 1000);
}

/* eps = eps_u (t - tc)/(f + t - tc), eps_u = 780e-6 x factors. The size-dependent f is used: the
 * f = 35 d of small specimens would be far too fast for a slab that dries from one face. */
struct shrinkage shrinkage_aci209(const struct shrinkage_slab *slab, double age_days)
{
    double v_s = fmax(slab->thickness_m, 0);
    double days = drying_time(slab, age_days);
    struct shrinkage s;
    s.ultimate_drying = slab->ultimate > 0
                            ? slab->ultimate
                            : 780 * MICRO * aci209_humidity(slab->humidity) * aci209_size(v_s) *
                                  aci209_curing(slab->curing_days) * aci209_mix(slab);
    s.drying = s.ultimate_drying * days / (shrinkage_aci209_half_time(v_s) + days);
    s.autogenous = 0;
    s.total = s.drying;
    return s;
}

/* ---- fib Model Code 2010, 5.1.9.4.4 ---- */

/* eps_cds0 = (220 + 110 a1) exp(-a2 fcm) 1e-6, fcm MPa; (a1, a2) 32.5 N (3, .013), 32.5 R and 42.5
 * N (4, .012), 42.5 R and up (6, .012). (5.1-80). Here S, N, R. */
double shrinkage_mc2010_basic_drying(double fcm_pa, enum mix_cement cement)
{
    double a1 = cement == MIX_CEMENT_S ? 3 : cement == MIX_CEMENT_R ? 6 : 4;
    double a2 = cement == MIX_CEMENT_S ? 0.013 : 0.012;
    return (220 + 110 * a1) * exp(-a2 * fmax(fcm_pa, 0) / 1e6) * MICRO;
}

/* beta_ds = sqrt[(t - ts)/(0.035 h^2 + t - ts)], h mm, days. (5.1-82) */
double shrinkage_mc2010_time_factor(double notional_m, double drying_days)
{
    double days = fmax(drying_days, 0);
    double h = fmax(notional_m, 0.001) * 1000;
    return sqrt(days / (0.035 * h * h + days));
}

/* beta_RH = 1.55 (1 - RH^3) below 99 % x beta_s1, else -0.25 (swelling); beta_s1 = (35/fcm)^0.1, at
 * most 1. (5.1-81). Valid from RH 40 %; lower counts as 40 %. Shortening positive here. */
static double mc2010_humidity(double humidity, double fcm_mpa)
{
    double limit = 0.99 * fmin(pow(35 / fcm_mpa, 0.1), 1);
    double rh = clamp(humidity, 0.40, 1);
    return rh < limit ? 1.55 * (1 - pow(rh, 3)) : -0.25;
}

/* eps_cbs0 = alpha_bs [0.1 fcm/(6 + 0.1 fcm)]^2.5 1e-6, alpha_bs 800, 700, 600 for S, N, R; times
 * 1 - exp(-0.2 sqrt t). (5.1-77) to (5.1-79) */
static double mc2010_autogenous(double fcm_mpa, enum mix_cement cement, double age_days)
{
    double alpha = cement == MIX_CEMENT_S ? 800 : cement == MIX_CEMENT_R ? 600 : 700;
    double part = 0.1 * fcm_mpa / (6 + 0.1 * fcm_mpa);
    return alpha * pow(part, 2.5) * MICRO * -expm1(-0.2 * sqrt(fmax(age_days, 0)));
}

struct shrinkage shrinkage_mc2010(const struct shrinkage_slab *slab, double age_days)
{
    double fcm = mix_mean_strength(slab->fck_pa);
    struct shrinkage s;
    s.ultimate_drying = slab->ultimate > 0 ? slab->ultimate
                                           : shrinkage_mc2010_basic_drying(fcm, slab->cement) *
                                                 mc2010_humidity(slab->humidity, fcm / 1e6);
    s.drying = s.ultimate_drying *
               shrinkage_mc2010_time_factor(notional_size(slab), drying_time(slab, age_days));
    s.autogenous = mc2010_autogenous(fcm / 1e6, slab->cement, age_days);
    s.total = s.drying + s.autogenous;
    return s;
}

/* ---- any model ---- */

struct shrinkage shrinkage_at(enum shrinkage_by model, const struct shrinkage_slab *slab,
                              double age_days)
{
    if (model == SHRINKAGE_BY_ACI209)
        return shrinkage_aci209(slab, age_days);
    if (model == SHRINKAGE_BY_MC2010)
        return shrinkage_mc2010(slab, age_days);
    return shrinkage_en1992(slab, age_days);
}

double shrinkage_between(enum shrinkage_by model, const struct shrinkage_slab *slab,
                         double from_days, double to_days)
{
    double from = shrinkage_at(model, slab, from_days).total;
    double to = shrinkage_at(model, slab, to_days).total;
    return fmax(to - from, 0);
}
