#include "core/sealant.h"

#include <math.h>

static const double SHUT_STRAIN = 10; /* of a joint that is shut: more than any class */
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

struct sealant_strain sealant_strains(double open_m, double close_m, double width_m)
{
    double width = fmax(width_m, LEAST);
    return (struct sealant_strain){fmax(open_m, 0) / width, fmax(close_m, 0) / width};
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
 * between cut and sealing is neglected. Sealed at T: extension = move(a (T - Tmin) + eps)/gap,
 * compression = move(a (Tmax - T))/gap: strains of the width at sealing (ASTM C920, C1472). */
struct sealant_moment sealant_row_at(const struct sealant_joint *joint, double slab_c)
{
    double colder = joint->cut_c - slab_c;
    double opened = colder >= 0 ? move(joint, joint->expansion * colder)
                                : -move(joint, joint->expansion * -colder);
    struct sealant_moment row = {.slab_c = slab_c, .gap_m = joint->width_m + opened};
    double open = move(joint, joint->expansion * (slab_c - joint->coldest_c) + joint->shrinkage);
    double close = move(joint, joint->expansion * (joint->hottest_c - slab_c));
    row.open_gap = row.gap_m > LEAST;
    row.gap_m = fmax(row.gap_m, 0);
    row.extension = row.open_gap ? fmin(open / row.gap_m, SHUT_STRAIN) : SHUT_STRAIN;
    row.compression = row.open_gap ? fmin(close / row.gap_m, SHUT_STRAIN) : SHUT_STRAIN;
    return row;
}

static bool extension_holds(const struct sealant_joint *joint, double slab_c)
{
    struct sealant_moment row = sealant_row_at(joint, slab_c);
    return row.extension <= joint->capacity.extension * (1 + 1e-9);
}

static bool compression_holds(const struct sealant_joint *joint, double slab_c)
{
    struct sealant_moment row = sealant_row_at(joint, slab_c);
    return row.compression <= joint->capacity.compression * (1 + 1e-9);
}

/* The place between a temperature where it holds and one where it does not. */
static double edge_of(const struct sealant_joint *joint,
                      bool (*holds)(const struct sealant_joint *, double), double good, double bad)
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

/* Extension grows and compression falls with the temperature of sealing (while the gap is open at
 * the hottest), so each has one edge. */
bool sealant_window(const struct sealant_joint *joint, double *coldest_c, double *hottest_c)
{
    double low = joint->coldest_c, high = joint->hottest_c;
    if (!(low <= high) || !extension_holds(joint, low) || !compression_holds(joint, high))
        return false;
    double top = extension_holds(joint, high) ? high : edge_of(joint, extension_holds, low, high);
    double bottom =
        compression_holds(joint, low) ? low : edge_of(joint, compression_holds, high, low);
    if (bottom > top)
        return false;
    *coldest_c = bottom;
    *hottest_c = top;
    return true;
}

int sealant_choose_width(const double *widths_m, size_t count, double least_m, double most_m,
                         double open_m, double close_m, struct sealant_capacity capacity,
                         double tolerance_m)
{
    int best = -1;
    for (size_t i = 0; i < count; i++) {
        double width = widths_m[i] - fmax(tolerance_m, 0);
        if (width <= 0 || widths_m[i] < least_m * (1 - 1e-9) || widths_m[i] > most_m * (1 + 1e-9))
            continue;
        double demand = sealant_demand(sealant_strains(open_m, close_m, width), capacity);
        if (demand <= SEALANT_TIGHT * (1 + 1e-9) && (best < 0 || widths_m[i] < widths_m[best]))
            best = (int)i;
    }
    return best;
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
