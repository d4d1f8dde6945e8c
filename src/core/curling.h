/* Curling (warping) of a slab with a linear temperature gradient, in full contact. SI. Stresses are
 * sizes (>= 0 for difference_k >= 0): top hot = tension at the bottom, top cold = at the top. */
#ifndef SLABGAP_CORE_CURLING_H
#define SLABGAP_CORE_CURLING_H

#include <stdbool.h>

struct curling_slab {
    double modulus_pa, expansion, poisson, thickness_m;
    double subgrade_pa_m; /* modulus of subgrade reaction */
    double unit_weight;   /* N/m3 */
    double difference_k;  /* top less bottom */
};
/* Bradbury's C for L/l. 0 for a ratio below 0.05. */
double curling_coefficient(double length_to_radius);
double curling_edge_stress(const struct curling_slab *slab, double coefficient);
double curling_interior_stress(const struct curling_slab *slab, double coefficient_along,
                               double coefficient_across);
double curling_corner_stress(const struct curling_slab *slab, double load_radius_m);
/* Lift of the edge if the base could pull it down, and sinking under its own weight. */
double curling_lift(const struct curling_slab *slab);
double curling_settlement(const struct curling_slab *slab);
/* Whether the stress formulas are in range: lift <= settlement. */
bool curling_in_contact(const struct curling_slab *slab);

#endif
