/* A slab that cannot move: locked stress and blow-up by lift-off. Not a safety: the lift-off limit
 * of a clean, straight, sound slab. SI; short-term modulus. */
#ifndef SLABGAP_CORE_RESTRAINT_H
#define SLABGAP_CORE_RESTRAINT_H

/* E a dT, and E a dT/(1 - nu) held both ways. Compression > 0. */
double restraint_locked_stress(double modulus_pa, double expansion, double rise_k);
double restraint_locked_stress_both(double modulus_pa, double expansion, double rise_k,
                                    double poisson);

enum restraint_crest { RESTRAINT_HINGE /* a joint at the crest */, RESTRAINT_CONTINUOUS };
struct restraint_slab {
    double thickness_m, modulus_pa, expansion, unit_weight;
    double friction; /* the lowest of the range */
};
struct restraint_lift {
    double rise_k;        /* temperature rise in a closed run at which the slab can lift off */
    double half_length_m; /* lifted half-length */
    double force_n_m, far_force_n_m; /* in the lifted part and far away, per metre width */
};
/* Least rise over the lifted length (mechanism after Kerr). Rise is at most RESTRAINT_RISE_MOST. */
#define RESTRAINT_RISE_MOST 1e6
struct restraint_lift restraint_lift_off(const struct restraint_slab *slab,
                                         enum restraint_crest crest);

/* Rise that the joint gaps take up before the run is closed: gaps x (1 - grit)/(a L). */
double restraint_closure_rise(double gaps_m, double run_m, double grit_share, double expansion);
/* Rise left before lift-off is possible: lift-off + closure - swelling/a - (hottest - T0). May be
 * below 0. Lift-off is taken with a modulus RESTRAINT_STIFFER times the short-term one. */
#define RESTRAINT_STIFFER 1.2
#define RESTRAINT_SWELLING 100e-6 /* outdoors, from memory */
#define RESTRAINT_NO_MARGIN_K 10.0
double restraint_rise_left(double lift_off_k, double closure_k, double swelling, double expansion,
                           double zero_stress_c, double hottest_c);

#endif
