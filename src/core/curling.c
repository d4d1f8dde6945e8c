#include "core/curling.h"

#include "core/spacing.h"
#include <math.h>

static double radius(const struct curling_slab *slab)
{
    return spacing_stiffness_radius(slab->modulus_pa, slab->thickness_m, slab->poisson,
                                    slab->subgrade_pa_m);
}

/* C = 1 - 2 (sin q cosh q + cos q sinh q)/(sin 2q + sinh 2q), q = L/(l sqrt8). Westergaard (1927)
 * and Bradbury (1938); this closed form has no poles and is their tan form simplified. C(0) = 0, 1
 * at L/l 6.689, at most 1.0863 at 8.886, 1 for long slabs. */
double curling_coefficient(double length_to_radius)
{
    double q = length_to_radius / sqrt(8);
    if (!(length_to_radius >= 0.05))
        return 0;
    if (q > 40)
        return 1;
    return 1 - 2 * (sin(q) * cosh(q) + cos(q) * sinh(q)) / (sin(2 * q) + sinh(2 * q));
}

/* s = C E a dT/2. Westergaard/Bradbury; linear gradient, free edges, full contact. */
double curling_edge_stress(const struct curling_slab *slab, double coefficient)
{
    return coefficient * slab->modulus_pa * slab->expansion * fabs(slab->difference_k) / 2;
}

/* s = E a dT (Cx + nu Cy)/(2 (1 - nu^2)). Westergaard/Bradbury. */
double curling_interior_stress(const struct curling_slab *slab, double coefficient_along,
                               double coefficient_across)
{
    double nu = fmin(fmax(slab->poisson, 0), 0.49);
    return slab->modulus_pa * slab->expansion * fabs(slab->difference_k) *
           (coefficient_along + nu * coefficient_across) / (2 * (1 - nu * nu));
}

/* s = E a dT sqrt(r/l)/(3 (1 - nu)), r radius of the load circle. Bradbury (1938). */
double curling_corner_stress(const struct curling_slab *slab, double load_radius_m)
{
    double nu = fmin(fmax(slab->poisson, 0), 0.49);
    return slab->modulus_pa * slab->expansion * fabs(slab->difference_k) *
           sqrt(fmax(load_radius_m, 0) / radius(slab)) / (3 * (1 - nu));
}

/* w0 = (1 + nu) a dT l^2/h: edge of a long slab held to its base. Westergaard (1927). */
double curling_lift(const struct curling_slab *slab)
{
    double l = radius(slab);
    return (1 + slab->poisson) * slab->expansion * fabs(slab->difference_k) * l * l /
           fmax(slab->thickness_m, 1e-6);
}

/* gamma h/k. */
double curling_settlement(const struct curling_slab *slab)
{
    return slab->unit_weight * slab->thickness_m / fmax(slab->subgrade_pa_m, 1);
}

/* The formulas hold the edge down by the base; beyond the slab's own settlement it lifts off and
 * they are out of range (Ioannides, Davis and Weber, TRR 1684, 1999). */
bool curling_in_contact(const struct curling_slab *slab)
{
    return curling_lift(slab) <= curling_settlement(slab);
}
