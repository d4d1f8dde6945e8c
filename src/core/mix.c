#include "core/mix.h"

#include <math.h>

enum { STANDARD_AGE_DAYS = 28 };
static const double MPA = 1e6;
static const double LEAST_PA = 0.1e6; /* below it nothing is concrete: keeps every power finite */

static double in_mpa(double pa)
{
    return fmax(pa, LEAST_PA) / MPA;
}

/* 1 K = 1.8 degF, so a strain per K is 1.8 times that per degF (definition of the scales). */
double mix_expansion_per_k(double per_degf)
{
    return 1.8 * per_degf;
}

/* fcm = fck + 8 MPa. EN 1992-1-1:2004 Table 3.1. Valid C12 to C90. */
double mix_mean_strength(double fck_pa)
{
    return fmax(fck_pa, 0) + 8 * MPA;
}

/* fctm = 0.30 fck^(2/3) up to C50, 2.12 ln(1 + fcm/10) above, MPa. EN 1992-1-1:2004 Table 3.1.
 * Valid C12 to C90. */
double mix_tensile_strength(double fck_pa)
{
    double fck = in_mpa(fck_pa);
    if (fck <= 50)
        return 0.30 * pow(fck, 2.0 / 3.0) * MPA;
    return 2.12 * log(1 + (fck + 8) / 10) * MPA;
}

/* Ecm = 22 (fcm/10)^0.3 GPa, fcm in MPa. EN 1992-1-1:2004 Table 3.1; quartzite aggregate (10 % less
 * for limestone, 30 % less for sandstone, 20 % more for basalt: 3.1.3(2)). Valid C12 to C90. */
double mix_modulus(double fck_pa)
{
    return 22e9 * pow(in_mpa(mix_mean_strength(fck_pa)) / 10, 0.3);
}

/* Ec = 4700 sqrt(f'c), MPa. ACI 318-19, 19.2.2.1(b). Normal weight concrete. */
double mix_modulus_aci(double fc_pa)
{
    return 4700 * sqrt(in_mpa(fc_pa)) * MPA;
}

/* fr = 0.62 sqrt(f'c), MPa. ACI 318-19, 19.2.3.1, normal weight concrete. */
double mix_rupture_aci(double fc_pa)
{
    return 0.62 * sqrt(in_mpa(fc_pa)) * MPA;
}

/* fctm,fl = max((1.6 - h/1000) fctm, fctm), h in mm. EN 1992-1-1:2004 (3.23). */
double mix_rupture_en(double fck_pa, double thickness_m)
{
    return fmax(1.6 - fmax(thickness_m, 0), 1) * mix_tensile_strength(fck_pa);
}

/* beta_cc = exp{s [1 - sqrt(28/t)]}, t days, s 0.20 (R), 0.25 (N), 0.38 (S). EN 1992-1-1:2004
 * (3.2). For concrete kept at 20 degC; not meant below about a day. */
double mix_strength_gain(enum mix_cement cement, double age_days)
{
    double s = cement == MIX_CEMENT_R ? 0.20 : cement == MIX_CEMENT_S ? 0.38 : 0.25;
    if (!(age_days > 0))
        return 0;
    return exp(s * (1 - sqrt(STANDARD_AGE_DAYS / age_days)));
}

/* fctm(t) = beta_cc^a fctm, a = 1 below 28 d, 2/3 from then on. EN 1992-1-1:2004 (3.4). */
double mix_tensile_strength_at(double fck_pa, enum mix_cement cement, double age_days)
{
    double power = age_days < STANDARD_AGE_DAYS ? 1 : 2.0 / 3.0;
    return pow(mix_strength_gain(cement, age_days), power) * mix_tensile_strength(fck_pa);
}

/* Ecm(t) = (fcm(t)/fcm)^0.3 Ecm, fcm(t)/fcm = beta_cc. EN 1992-1-1:2004 (3.5). */
double mix_modulus_at(double fck_pa, enum mix_cement cement, double age_days)
{
    return pow(mix_strength_gain(cement, age_days), 0.3) * mix_modulus(fck_pa);
}
