#include "core/friction_bar.h"

#include <math.h>
#include <stdbool.h>

/* What the formulas share. H half length, Eh axial stiffness per width, tau friction stress at full
 * slip, lam = sqrt(ks/(E h)) with ks = tau/u_y; lam 0: rigid-plastic (u_y 0) or no friction. */
struct base_law {
    double half, stiffness, tau, slip, lam;
    bool free; /* no friction to speak of */
};

static struct base_law law_of(const struct friction_bar *bar)
{
    struct base_law law = {.half = fmax(bar->length_m, 0) / 2,
                           .stiffness = fmax(bar->modulus_pa, 1) * fmax(bar->thickness_m, 1e-6),
                           .slip = fmax(bar->slip_m, 0)};
    law.tau = fmax(bar->friction, 0) * fmax(bar->unit_weight, 0) * fmax(bar->thickness_m, 1e-6);
    if (law.slip > 0)
        law.lam = sqrt(law.tau / (law.slip * law.stiffness));
    law.free = !(law.tau > 0) || (law.slip > 0 && !(law.lam * law.half > 1e-12)) || law.half <= 0;
    return law;
}

/* cosh(a)/cosh(b) and cosh(a)/sinh(b) for 0 <= a <= b, without overflow. */
static double cosh_over_cosh(double a, double b)
{
    return exp(a - b) * (1 + exp(-2 * a)) / (1 + exp(-2 * b));
}

static double cosh_over_sinh(double a, double b)
{
    return exp(a - b) * (1 + exp(-2 * a)) / -expm1(-2 * b);
}

/* Root of a falling function on (0, most). */
static double falling_root(double (*f)(double x, const void *context), const void *context,
                           double most)
{
    double low = 0, high = most;
    for (int i = 0; i < 400; i++) {
        double middle = low + (high - low) / 2;
        if (middle <= low || middle >= high)
            break;
        if (f(middle, context) > 0)
            low = middle;
        else
            high = middle;
    }
    return high;
}

struct load_problem {
    const struct base_law *law;
    double wanted;
};

static double load_balance(double x, const void *context)
{
    const struct load_problem *p = context;
    double lam = p->law->lam;
    return 1 / tanh(lam * x) + lam * (p->law->half - x) - p->wanted;
}

/* Half-length xs that does not slip, for e > 0; half when nothing slips. coth(lam xs) + lam (H -
 * xs) = e E h lam/tau_f. */
static double stuck_length(const struct base_law *law, double e)
{
    if (e * tanh(law->lam * law->half) / law->lam <= law->slip)
        return law->half;
    struct load_problem p = {law, e * law->stiffness * law->lam / law->tau};
    return falling_root(load_balance, &p, law->half);
}

/* Rigid-plastic interface (u_y = 0): active length La = e E h/tau_f; u = e S - tau_f S^2/(2 E h)
 * with S = min(H, La). */
static struct friction_state load_rigid(const struct base_law *law, double e, double h)
{
    double s = fmin(law->half, e * law->stiffness / law->tau);
    return (struct friction_state){.end_m = e * s - law->tau * s * s / (2 * law->stiffness),
                                   .middle_pa = -law->tau * s / h,
                                   .slip_length_m = s};
}

/* Elastic interface. No slip: u = e tanh(lam H)/lam, s = -E e (1 - 1/cosh(lam H)). Slip over S = H
 * - xs: u = u_y + e S - tau_f S^2/(2 E h), s = -E (e - u_y lam/sinh(lam xs)). */
static struct friction_state load_elastic(const struct base_law *law, double e, double modulus)
{
    double xs = stuck_length(law, e);
    double s = law->half - xs;
    struct friction_state state = {.slip_length_m = s};
    if (s <= 0) {
        state.end_m = e * tanh(law->lam * law->half) / law->lam;
        state.middle_pa = -modulus * e * (1 - cosh_over_cosh(0, law->lam * law->half));
        return state;
    }
    state.end_m = law->slip + e * s - law->tau * s * s / (2 * law->stiffness);
    state.middle_pa = -modulus * (e - law->slip * law->lam * cosh_over_sinh(0, law->lam * xs));
    return state;
}

/* First loading of a bar of length 2H on an elastic-plastic base, E h u'' = tau(u): exact, derived
 * from equilibrium and checked by finite elements (4 000 elements). Valid for plane, uniform strain
 * from the stress-free state, no creep. */
struct friction_state friction_bar_load(const struct friction_bar *bar, double strain)
{
    struct base_law law = law_of(bar);
    double e = fabs(strain), sign = strain < 0 ? -1 : 1;
    struct friction_state state = {.end_m = e * law.half, .slip_length_m = law.half};
    if (e > 0 && !law.free)
        state = law.slip > 0 ? load_elastic(&law, e, fmax(bar->modulus_pa, 1))
                             : load_rigid(&law, e, fmax(bar->thickness_m, 1e-6));
    else if (e <= 0)
        state.slip_length_m = 0;
    state.end_m *= sign;
    state.middle_pa *= sign;
    return state;
}

/* Stress at x from the point at rest: no slip -E e (1 - cosh(lam x)/cosh(lam H)); with slip -E (e -
 * u_y lam cosh(lam x)/sinh(lam xs)) for x <= xs, -sign(e) tau_f (H - x)/h beyond. Derived as above.
 */
double friction_bar_stress(const struct friction_bar *bar, double strain, double x_m)
{
    struct base_law law = law_of(bar);
    double e = fabs(strain), sign = strain < 0 ? 1 : -1;
    double x = fmin(fabs(x_m), law.half), h = fmax(bar->thickness_m, 1e-6);
    double modulus = fmax(bar->modulus_pa, 1);
    if (law.free || e <= 0)
        return 0;
    double beyond = law.tau * (law.half - x) / h;
    if (!(law.slip > 0))
        return sign * fmin(beyond, modulus * e);
    double xs = stuck_length(&law, e);
    if (xs >= law.half)
        return sign * modulus * e * (1 - cosh_over_cosh(law.lam * x, law.lam * law.half));
    if (x > xs)
        return sign * beyond;
    return sign * modulus * (e - law.slip * law.lam * cosh_over_sinh(law.lam * x, law.lam * xs));
}

/* Index of the last largest value of sign x strain from `from` on. */
static size_t last_extreme(const double *strains, size_t from, size_t count, double sign)
{
    size_t best = from;
    for (size_t i = from; i < count; i++) {
        if (sign * strains[i] >= sign * strains[best])
            best = i;
    }
    return best;
}

static size_t last_largest(const double *strains, size_t count)
{
    size_t best = 0;
    for (size_t i = 0; i < count; i++) {
        if (fabs(strains[i]) >= fabs(strains[best]))
            best = i;
    }
    return best;
}

/* Masing's rule, exact for this model: after turning at strain e1 the increment is 2 U(|e - e1|/2),
 * until a former extreme is passed. So only the nested extremes count: the largest strain so far,
 * the furthest turn back after it, the furthest turn after that, and so on. */
double friction_bar_history(const struct friction_bar *bar, const double *strains, size_t count)
{
    if (count == 0)
        return 0;
    size_t at = last_largest(strains, count);
    double u = friction_bar_load(bar, strains[at]).end_m;
    double sign = strains[at] < 0 ? 1 : -1; /* the way back */
    while (at + 1 < count) {
        size_t next = last_extreme(strains, at + 1, count, sign);
        double half_way = fabs(strains[next] - strains[at]) / 2;
        u += sign * 2 * friction_bar_load(bar, half_way).end_m;
        at = next;
        sign = -sign;
    }
    return u;
}

double friction_bar_joint(const struct friction_bar *bar, double length1_m, double length2_m,
                          double strain)
{
    struct friction_bar one = *bar, two = *bar;
    one.length_m = length1_m;
    two.length_m = length2_m;
    double e = fmax(strain, 0);
    return friction_bar_load(&one, e).end_m + friction_bar_load(&two, e).end_m;
}

/* ---- against a filler ---- */

struct filler_problem {
    const struct base_law *law;
    double e, ke, gap; /* ke: filler stiffness over E, 1/m */
};

/* End movement when the part up to xs sticks: u = u_y + c S + tau_f S^2/(2 E h), c = u_y lam
 * coth(lam xs), S = H - xs. */
static double filler_end(const struct filler_problem *p, double xs, double *c)
{
    const struct base_law *law = p->law;
    double s = law->half - xs;
    *c = law->slip > 0 ? law->slip * law->lam / tanh(law->lam * xs) : 0;
    return law->slip + *c * s + law->tau * s * s / (2 * law->stiffness);
}

static double filler_balance(double xs, const void *context)
{
    const struct filler_problem *p = context;
    double c, end = filler_end(p, xs, &c);
    return c + p->law->tau * (p->law->half - xs) / p->law->stiffness - p->e +
           p->ke * (end - p->gap);
}

/* Slab slips all over: u = (e H - tau_f H^2/(2 E h) + Ke g H/E)/(1 + Ke H/E). */
static double filler_full_slip(const struct filler_problem *p)
{
    double h = p->law->half;
    double drag = p->law->tau * h * h / (2 * p->law->stiffness);
    return (p->e * h - drag + p->ke * p->gap * h) / (1 + p->ke * h);
}

static struct friction_thrust filler_elastic(const struct filler_problem *p, double modulus)
{
    const struct base_law *law = p->law;
    double t = tanh(law->lam * law->half);
    struct friction_thrust thrust = {0};
    thrust.end_m = (p->e + p->ke * p->gap) * t / (law->lam + p->ke * t);
    double strain = thrust.end_m * law->lam * cosh_over_sinh(0, law->lam * law->half);
    if (thrust.end_m > law->slip) {
        double c, xs = falling_root(filler_balance, p, law->half);
        thrust.end_m = filler_end(p, xs, &c);
        strain = law->slip * law->lam * cosh_over_sinh(0, law->lam * xs);
    }
    thrust.middle_pa = modulus * (p->e - strain);
    return thrust;
}

static struct friction_thrust filler_rigid(const struct filler_problem *p, double modulus)
{
    struct friction_thrust thrust = {0};
    /* falling in xs: at xs = 0 the whole slab slips */
    if (p->law->tau <= 0 || filler_balance(0, p) < 0) {
        thrust.end_m = fmax(filler_full_slip(p), 0);
        thrust.middle_pa = modulus * (p->ke * fmax(thrust.end_m - p->gap, 0) +
                                      p->law->tau * p->law->half / p->law->stiffness);
        return thrust;
    }
    double c, xs = falling_root(filler_balance, p, p->law->half);
    thrust.end_m = filler_end(p, xs, &c);
    thrust.middle_pa = modulus * p->e;
    return thrust;
}

/* Expansion e > 0 against a filler of stiffness Ke after a gap g, both ends alike: first the free
 * end (u_f <= g: no contact), then no slip u = (e + Ke g/E) t/(lam + (Ke/E) t), t = tanh(lam H),
 * valid up to u_y, then slip with xs by bisection. Derived from equilibrium, checked by finite
 * elements to 1e-9. A figure of thrust is no check of the structure it bears on. */
struct friction_thrust friction_bar_against(const struct friction_bar *bar,
                                            const struct friction_filler *filler, double strain)
{
    struct base_law law = law_of(bar);
    double modulus = fmax(bar->modulus_pa, 1), gap = fmax(filler->gap_m, 0);
    struct friction_state open = friction_bar_load(bar, fmax(strain, 0));
    struct friction_thrust thrust = {.end_m = open.end_m, .middle_pa = fmax(-open.middle_pa, 0)};
    double ke = fmax(filler->stiffness_pa_m, 0) / modulus;
    if (open.end_m <= gap || ke <= 0)
        return thrust;
    struct filler_problem p = {&law, fmax(strain, 0), ke, gap};
    if (law.free) {
        law.tau = law.slip = law.lam = 0;
        thrust = filler_rigid(&p, modulus);
    } else {
        thrust = law.slip > 0 ? filler_elastic(&p, modulus) : filler_rigid(&p, modulus);
    }
    thrust.end_pa = ke * modulus * fmax(thrust.end_m - gap, 0);
    thrust.middle_pa = fmax(thrust.middle_pa, thrust.end_pa);
    return thrust;
}
