#include "core/steel.h"

#include <limits.h>
#include <math.h>

static const double PI = 3.14159265358979323846;
static const double STEP = 0.010;

/* As = b gamma h mu/fs per metre; spacing = A_bar/As, rounded down to 10 mm; length = 2 fs
 * A_bar/(bond x perimeter) + 150 mm. IRC:58, tie bars (its printed rows are the same, rounded to
 * the nearest 10 mm; constants fs and bond from memory, verified by fit). Plain slabs, one layer at
 * mid-depth. */
struct steel_tie_result steel_ties(const struct steel_ties *ties)
{
    double bar = fmax(ties->bar_m, 0), fs = fmax(ties->steel_pa, 1);
    double area = PI * bar * bar / 4;
    double drag = fmax(ties->free_width_m, 0) * fmax(ties->unit_weight, 0) *
                  fmax(ties->thickness_m, 0) * fmax(ties->friction, 0);
    struct steel_tie_result result = {.area_m2_m = drag / fs};
    double exact = result.area_m2_m * STEEL_TIE_SPACING_MOST > area ? area / result.area_m2_m
                                                                    : STEEL_TIE_SPACING_MOST;
    result.exact_spacing_m = exact;
    result.spacing_m = fmax(floor(exact / STEP + 1e-9) * STEP, STEP);
    result.length_m = 2 * fs * bar / (4 * fmax(ties->bond_pa, 1)) + STEEL_TIE_EXTRA;
    return result;
}

/* d = h/8: FHWA T 5040.30 (1990). */
double steel_dowel_diameter(double thickness_m)
{
    return fmax(thickness_m, 0) / 8;
}

bool steel_dowels_fit(double thickness_m)
{
    return thickness_m >= STEEL_DOWEL_LEAST_THICKNESS;
}

/* As = mu L w/(2 fs): subgrade drag, CRSI. It holds cracks shut, it does not allow wider joints. */
double steel_drag(double friction, double length_m, double weight_pa, double steel_pa)
{
    return fmax(friction * length_m * weight_pa, 0) / (2 * fmax(steel_pa, 1));
}

int steel_bar_count(double joint_m, double spacing_m, double clear_m)
{
    double room = joint_m - 2 * clear_m;
    if (!(spacing_m > 0) || !(room > -1e-9))
        return 0;
    double count = floor(room / spacing_m + 1e-9) + 1;
    return count > INT_MAX ? INT_MAX : (int)count;
}
