/* Concrete as a material: expansion, strength, stiffness. SI: Pa, m, 1/K; age in days. */
#ifndef SLABGAP_CORE_MIX_H
#define SLABGAP_CORE_MIX_H

/* Speed of hardening; the order is that of concrete.cement: N normal, S slow, R rapid. */
enum mix_cement { MIX_CEMENT_N, MIX_CEMENT_S, MIX_CEMENT_R };

/* Expansion of concrete whose aggregate is not known, 1/K: EN 1992-1-1:2004 3.1.3(5). */
#define MIX_EXPANSION_UNKNOWN 10e-6
/* Poisson's ratio of uncracked concrete: common practice in slab formulas (0.15). */
#define MIX_POISSON 0.15

/* 1/degF to 1/K: one K is 1.8 degF. */
double mix_expansion_per_k(double per_degf);
/* Mean strength fcm from the characteristic cylinder strength fck. */
double mix_mean_strength(double fck_pa);
/* Mean axial tensile strength fctm at 28 d. */
double mix_tensile_strength(double fck_pa);
/* Secant modulus Ecm at 28 d. */
double mix_modulus(double fck_pa);
/* Ec and modulus of rupture fr of ACI 318. */
double mix_modulus_aci(double fc_pa);
double mix_rupture_aci(double fc_pa);
/* Flexural strength fctm,fl by EN 1992-1-1 (3.23) for a slab of this thickness. */
double mix_rupture_en(double fck_pa, double thickness_m);
/* beta_cc(t): mean strength at this age as a share of that at 28 d. Meant from 1 d on. */
double mix_strength_gain(enum mix_cement cement, double age_days);
double mix_tensile_strength_at(double fck_pa, enum mix_cement cement, double age_days);
double mix_modulus_at(double fck_pa, enum mix_cement cement, double age_days);

#endif
