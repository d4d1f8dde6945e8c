#include "core/sealant.h"

#include <math.h>

static const double LEAST = 1e-9;

static double share_of(double value, double capacity)
{
    return fmax(value, 0) / fmax(capacity, 1e-6);
}

/* W = max(open/S_ext, close/S_comp) + tolerance; S each way in per cent of the width at sealing:
 * ASTM C920 classes, tested by ASTM C719; width by ASTM C1472. */
double sealant_least_width(double open_m, double close_m, struct sealant_capacity capacity,
                           double tolerance_m)
{
    return fmax(share_of(open_m, capacity.extension), share_of(close_m, capacity.compression)) +
           fmax(tolerance_m, 0);
}

/* W = 100 TRM/MAF + TRM with TRM = open + close and the movement accommodation factor MAF in per
 * cent of the least width; W is the mean width. BS 6093, from memory. `factor`: MAF as a ratio. */
double sealant_least_mean_width(double open_m, double close_m, double factor)
{
    double total = fmax(open_m, 0) + fmax(close_m, 0);
    return total / fmax(factor, 1e-6) + total;
}

static double strain_of(double movement_m, double width_m)
{
    double movement = fmax(movement_m, 0);

    if (movement <= 0)
        return 0;
    return width_m > movement / SEALANT_SHUT ? movement / width_m : SEALANT_SHUT;
}

struct sealant_strain sealant_strains(enum sealant_basis basis, double open_m, double close_m,
                                      double width_m)
{
    double open = fmax(open_m, 0), close = fmax(close_m, 0), both;

    if (basis == SEALANT_OF_WIDTH)
        return (struct sealant_strain){strain_of(open, width_m), strain_of(close, width_m)};
    both = strain_of(open + close, width_m - open - close);
    return (struct sealant_strain){both, both};
}

double sealant_demand(struct sealant_strain strain, struct sealant_capacity capacity)
{
    return fmax(share_of(strain.extension, capacity.extension),
                share_of(strain.compression, capacity.compression));
}

/* y = 3 D (W' - W)/(4 W'): sag of a parabolic face of a bead of constant volume; + inward. Tons, A
 * theoretical approach to design of a road joint seal (Highway Research Board Bulletin 229, 1959).
 */
static double sag(double width_m, double depth_m, double now_m)
{
    return 3 * fmax(depth_m, 0) * (now_m - width_m) / (4 * now_m);
}

/* Strain = arc/W - 1 with the exact arc of the parabola: r/2 + W'^2/(8 y) ln((4 y + r)/W'), r =
 * sqrt(W'^2 + 16 y^2); the logarithm is asinh(4 y/W'). Tons (1959). It ranks bead shapes and never
 * decides a verdict. */
double sealant_bead_strain(double width_m, double depth_m, double opened_m)
{
    double width = fmax(width_m, LEAST), now = fmax(opened_m, LEAST);
    double y = fabs(sag(width, depth_m, now));
    double arc = now;
    if (y > 1e-9 * now)
        arc = hypot(now, 4 * y) / 2 + now * now / (8 * y) * asinh(4 * y / now);
    return arc / width - 1;
}

double sealant_bulge(double width_m, double depth_m, double width_now_m)
{
    return -sag(fmax(width_m, LEAST), depth_m, fmax(width_now_m, LEAST));
}

/* Depth = ratio x width, clamped. Silicone: width/2, 6 to 13 mm (Allen, Architectural Detailing).
 */
double sealant_depth(double width_m, double ratio, double least_m, double most_m)
{
    return fmin(fmax(ratio * width_m, least_m), fmax(most_m, least_m));
}

/* ---- table and window ---- */

static double move(const struct sealant_joint *joint, double strain)
{
    double e = fmax(strain, 0);
    return joint->move ? joint->move(joint->context, e) : joint->length_m * e;
}

/* The reservoir is cut to W at Tc; at slab temperature T its gap is W + move(a (Tc - T)); shrinkage
 * between cut and sealing is neglected. Sealed at T it opens by move(a (T - Tmin) + eps) and closes
 * by move(a (Tmax - T)): strains of the gap (ASTM C920, C1472). */
struct sealant_moment sealant_row_at(const struct sealant_joint *joint, double slab_c)
{
    double colder = joint->cut_c - slab_c;
    double opened = colder >= 0 ? move(joint, joint->expansion * colder)
                                : -move(joint, joint->expansion * -colder);
    struct sealant_moment row = {.slab_c = slab_c, .gap_m = fmax(joint->width_m + opened, 0)};
    struct sealant_strain strain;

    row.open_m = move(joint, joint->expansion * (slab_c - joint->coldest_c) + joint->shrinkage);
    row.close_m = move(joint, joint->expansion * (joint->hottest_c - slab_c));
    strain = sealant_strains(joint->basis, row.open_m, row.close_m, row.gap_m);
    row.extension = strain.extension;
    row.compression = strain.compression;
    strain = sealant_strains(joint->basis, row.open_m, row.close_m, row.gap_m - joint->tolerance_m);
    row.demand = sealant_demand(strain, joint->capacity);
    if (row.gap_m - joint->tolerance_m <= LEAST) /* shut: nothing can be put in */
        row.demand = fmax(row.demand, SEALANT_SHUT);
    return row;
}

static bool holds(const struct sealant_joint *joint, double slab_c)
{
    return sealant_row_at(joint, slab_c).demand <= 1 + 1e-9;
}

/* The last temperature, from `good` on towards `bad`, at which it holds. */
static double edge_of(const struct sealant_joint *joint, double good, double bad)
{
    for (int i = 0; i < 60 && fabs(bad - good) > 1e-7; i++) {
        double middle = (good + bad) / 2;
        if (holds(joint, middle))
            good = middle;
        else
            bad = middle;
    }
    return good;
}

bool sealant_window(const struct sealant_joint *joint, double *coldest_c, double *hottest_c)
{
    double low = joint->coldest_c, step = (joint->hottest_c - low) / SEALANT_STEPS;
    int longest = 0, run = 0, first = 0;

    if (!(step >= 0))
        return false;
    for (int k = 0; k <= SEALANT_STEPS; k++) {
        run = holds(joint, low + k * step) ? run + 1 : 0;
        if (run > longest) {
            longest = run;
            first = k - run + 1;
        }
    }
    if (longest == 0)
        return false;
    *coldest_c = low + first * step;
    *hottest_c = low + (first + longest - 1) * step;
    if (first > 0)
        *coldest_c = edge_of(joint, *coldest_c, *coldest_c - step);
    if (first + longest <= SEALANT_STEPS)
        *hottest_c = edge_of(joint, *hottest_c, *hottest_c + step);
    else
        *hottest_c = joint->hottest_c;
    return true;
}

/* ---- compression seals ---- */

/* W_u >= dL/(Cmax - Cmin). FHWA pavement notebook, chapter 3, preformed compression seals. */
double sealant_seal_least(double movement_m, double least, double most)
{
    return fmax(movement_m, 0) / fmax(most - least, 1e-6);
}

/* PC = Cmin + (T - Tmin)/(Tmax - Tmin) (Cmax - Cmin). FHWA pavement notebook, chapter 3. It leaves
 * the shrinkage still to come out of the setting: check both ends. */
double sealant_seal_setting(const struct sealant_seal *seal, double slab_c, double coldest_c,
                            double hottest_c)
{
    double range = hottest_c - coldest_c;
    double share = range > 0 ? fmin(fmax((slab_c - coldest_c) / range, 0), 1) : 0;
    return seal->least + share * (seal->most - seal->least);
}

/* Slot = (1 - PC) W_u. FHWA pavement notebook, chapter 3. */
double sealant_seal_slot(const struct sealant_seal *seal, double setting)
{
    return (1 - setting) * seal->seal_m;
}

/* (W_u - slot - open)/W_u >= Cmin and (W_u - slot + close)/W_u <= Cmax: definition of the working
 * range (ASTM D2628 seals), derived. */
struct sealant_seal_ends sealant_seal_check(const struct sealant_seal *seal, double slot_m,
                                            double open_m, double close_m)
{
    double own = fmax(seal->seal_m, LEAST);
    struct sealant_seal_ends ends = {.cold = (own - slot_m - open_m) / own,
                                     .hot = (own - slot_m + close_m) / own};
    ends.holds = ends.cold >= seal->least - 1e-9 && ends.hot <= seal->most + 1e-9;
    return ends;
}

struct sealant_follow sealant_seal_follow(const struct sealant_seal *seal, double slot_m,
                                          double tolerance_m)
{
    double tolerance = fmax(tolerance_m, 0);

    return (struct sealant_follow){
        .open_m = (1 - seal->least) * seal->seal_m - slot_m - tolerance,
        .close_m = slot_m - tolerance - (1 - seal->most) * seal->seal_m,
    };
}

double sealant_seal_demand(struct sealant_follow follow, double open_m, double close_m)
{
    if (follow.open_m < 0 || follow.close_m < 0)
        return SEALANT_SHUT;
    return fmax(strain_of(open_m, follow.open_m), strain_of(close_m, follow.close_m));
}

bool sealant_seal_slots(const struct sealant_seal *seal, double open_m, double close_m,
                        double *least_m, double *most_m)
{
    double least = (1 - seal->most) * seal->seal_m + close_m;
    double most = (1 - seal->least) * seal->seal_m - open_m;
    if (!(least <= most))
        return false;
    *least_m = least;
    *most_m = most;
    return true;
}
