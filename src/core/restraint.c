#include "core/restraint.h"

#include <math.h>

/* s = E a dT. Hooke's law with the ends held. */
double restraint_locked_stress(double modulus_pa, double expansion, double rise_k)
{
    return modulus_pa * expansion * rise_k;
}

/* s = E a dT/(1 - nu), held along and across. */
double restraint_locked_stress_both(double modulus_pa, double expansion, double rise_k,
                                    double poisson)
{
    return restraint_locked_stress(modulus_pa, expansion, rise_k) /
           (1 - fmin(fmax(poisson, 0), 0.49));
}

/* Buckled shape E I w'''' + N w'' = -q with w = w' = w'' = 0 at lift-off: beta = b sqrt(N/EI) and
 * the shortening S = k q^2 b^7/EI^2 by the slope. Continuous: tan beta = beta; joint as a hinge at
 * the crest: tan(beta/2) = beta. Constants derived by integration, checked by Runge-Kutta to 1e-13.
 */
struct mode {
    double beta, shortening;
};

static struct mode mode_of(enum restraint_crest crest)
{
    return crest == RESTRAINT_HINGE ? (struct mode){2.33112237041442, 0.01264074}
                                    : (struct mode){4.49340945790906, 0.00204416};
}

static double positive(double value)
{
    return fmax(value, 1e-12);
}

/* The rise for a lifted half-length b: N = EI (beta/b)^2; friction r0 = mu q holds the rest, which
 * gives dN = r0 (-b + sqrt(b^2 + E h S/r0)), written without cancellation; dT = (N + dN)/(E h a).
 */
static struct restraint_lift lift_at(const struct restraint_slab *slab, struct mode mode, double b)
{
    double h = positive(slab->thickness_m), modulus = fmax(slab->modulus_pa, 1);
    double axial = modulus * h, bending = modulus * h * h * h / 12;
    double q = fmax(slab->unit_weight, 0) * h, r0 = fmax(slab->friction, 0) * q;
    double force = bending * (mode.beta / b) * (mode.beta / b);
    double shortening = mode.shortening * q * q * pow(b, 7) / (bending * bending);
    double more = r0 > 0 ? axial * shortening / (b + sqrt(b * b + axial * shortening / r0)) : 0;
    double rise = (force + more) / (axial * positive(slab->expansion));
    return (struct restraint_lift){fmin(rise, RESTRAINT_RISE_MOST), b, force, force + more};
}

/* Least rise over b by golden section on log b: the heavy slab lifts over the length that needs the
 * smallest rise (safe temperature increase: Kerr and Dallis 1985, Kerr and Shade 1984, Kerr 1997,
 * J. Transp. Eng. 123(2); the equations here are derived anew and not checked against their
 * charts). Elastic, straight, sound slab; base does not follow it up. */
struct restraint_lift restraint_lift_off(const struct restraint_slab *slab,
                                         enum restraint_crest crest)
{
    const double golden = 0.6180339887498949;
    struct mode mode = mode_of(crest);
    double low = log(0.01), high = log(1e4);
    double x1 = high - golden * (high - low), x2 = low + golden * (high - low);
    double f1 = lift_at(slab, mode, exp(x1)).far_force_n_m;
    double f2 = lift_at(slab, mode, exp(x2)).far_force_n_m;
    for (int i = 0; i < 100; i++) {
        if (f1 <= f2) {
            high = x2;
            x2 = x1;
            f2 = f1;
            x1 = high - golden * (high - low);
            f1 = lift_at(slab, mode, exp(x1)).far_force_n_m;
        } else {
            low = x1;
            x1 = x2;
            f1 = f2;
            x2 = low + golden * (high - low);
            f2 = lift_at(slab, mode, exp(x2)).far_force_n_m;
        }
    }
    return lift_at(slab, mode, exp((low + high) / 2));
}

static double rise_of(double strain, double expansion)
{
    double rise = strain / positive(expansion);
    return fmin(fmax(rise, -RESTRAINT_RISE_MOST), RESTRAINT_RISE_MOST);
}

double restraint_closure_rise(double gaps_m, double run_m, double grit_share, double expansion)
{
    double open = fmax(gaps_m, 0) * (1 - fmin(fmax(grit_share, 0), 1));
    return rise_of(open / fmax(run_m, 1e-3), expansion);
}

double restraint_rise_left(double lift_off_k, double closure_k, double swelling, double expansion,
                           double zero_stress_c, double hottest_c)
{
    return lift_off_k + closure_k - rise_of(fmax(swelling, 0), expansion) -
           (hottest_c - zero_stress_c);
}
