/* A slab strip as an elastic bar on an elastic-plastic base: how far its ends move, how it is
 * stressed. Exact for first loading; with history by Masing's rule. SI; strain + expansion. */
#ifndef SLABGAP_CORE_FRICTION_BAR_H
#define SLABGAP_CORE_FRICTION_BAR_H

#include <stddef.h>

struct friction_bar {
    double length_m, thickness_m;
    double modulus_pa;
    double friction;    /* coefficient mu; 0 = none */
    double unit_weight; /* N/m3 */
    double slip_m;      /* movement at full friction; 0 = rigid-plastic */
};
struct friction_state {
    double end_m;         /* movement of each end, sign of the strain */
    double middle_pa;     /* stress at mid-length, + tension */
    double slip_length_m; /* from each end */
};
/* First loading from the zero-stress state by the free strain. */
struct friction_state friction_bar_load(const struct friction_bar *bar, double strain);
/* Stress at x from the middle (0..L/2), + tension. */
double friction_bar_stress(const struct friction_bar *bar, double strain, double x_m);
/* Movement of the end after a path of free strains counted from the zero-stress state (each the
 * total, not the step), m. */
double friction_bar_history(const struct friction_bar *bar, const double *strains, size_t count);
/* By how much a joint opens (or closes) between two bars of these lengths for a free strain >= 0.
 */
double friction_bar_joint(const struct friction_bar *bar, double length1_m, double length2_m,
                          double strain);

/* Expansion against an end filler, both ends alike. */
struct friction_filler {
    double stiffness_pa_m; /* face stress per shortening of the filler, Pa/m */
    double gap_m;          /* free way before it bears */
};
struct friction_thrust {
    double end_m, end_pa /* compression >= 0 */, middle_pa /* compression >= 0 */;
};
struct friction_thrust friction_bar_against(const struct friction_bar *bar,
                                            const struct friction_filler *filler, double strain);

#endif
