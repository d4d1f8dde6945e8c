#include "core/isolation.h"

#include <math.h>

/* a (Tmax - T0) L: EN 1991-1-5's and every textbook's free expansion; T0 is the zero-stress
 * temperature (final set), never the sealing temperature. */
double isolation_demand(double expansion, double zero_stress_c, double hottest_c, double run_m)
{
    return fmax(expansion * (hottest_c - zero_stress_c) * run_m, 0);
}

/* Filler = demand / share; ASTM D1751 loads a board to 50 % of its thickness. */
double isolation_filler(double demand_m, double share)
{
    return fmax(demand_m, 0) / fmin(fmax(share, 0.01), 1);
}

int isolation_choose_filler(const double *boards_m, size_t count, double least_m)
{
    int best = -1;
    for (size_t i = 0; i < count; i++) {
        if (boards_m[i] >= least_m * (1 - 1e-9) && (best < 0 || boards_m[i] < boards_m[best]))
            best = (int)i;
    }
    return best;
}

double isolation_run_to_closure(double gap_m, double share, double expansion, double rise_k)
{
    double strain = expansion * rise_k;
    double way = fmax(gap_m, 0) * fmin(fmax(share, 0), 1);
    if (!(strain > way / ISOLATION_RUN_MOST))
        return ISOLATION_RUN_MOST;
    return way / strain;
}
