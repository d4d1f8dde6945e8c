#include "core/quantity.h"

#include <math.h>
#include <stdint.h>
#include <stdlib.h>

static const double PI = 3.14159265358979323846;

double quantity_bead(double length_m, double width_m, double depth_m)
{
    return fmax(length_m, 0) * fmax(width_m, 0) * fmax(depth_m, 0);
}

/* Sealant in the two corners between the faces and a round rod of diameter W: (1/2 - pi/8) W^2 per
 * length; derived from the half circle. */
double quantity_cusps(double length_m, double width_m)
{
    return fmax(length_m, 0) * (0.5 - PI / 8) * width_m * width_m;
}

double quantity_length(double package_m3, double width_m, double depth_m)
{
    double area = width_m * depth_m;
    return area > 0 ? fmax(package_m3, 0) / area : 0;
}

double quantity_order(double net_m3, double waste)
{
    return fmax(net_m3, 0) * (1 + fmax(waste, 0));
}

/* ---- packages ---- */

enum { PACKAGE_LIMIT = 1000000, TABLE_MOST = 2000000, UNIT_MOST = 200000 };

/* Sizes in whole units, largest first. */
struct sizes {
    long long units[QUANTITY_SIZE_MOST];
    size_t index[QUANTITY_SIZE_MOST]; /* in the caller's list */
    size_t count;
    double unit_m3;
};

/* Greatest common measure by Euclid, 0 when there is none of a useful size. */
static double common_measure(double a, double b, double least)
{
    while (b > 1e-6 * least) {
        double rest = fmod(a, b);
        if (b - rest < 1e-6 * least)
            rest = 0;
        a = b;
        b = rest;
    }
    return a;
}

static double unit_of(const double *sizes_m3, size_t count)
{
    double least = HUGE_VAL, most = 0, measure = 0;
    for (size_t i = 0; i < count; i++) {
        least = fmin(least, sizes_m3[i] > 0 ? sizes_m3[i] : HUGE_VAL);
        most = fmax(most, sizes_m3[i]);
    }
    for (size_t i = 0; i < count; i++) {
        if (sizes_m3[i] > 0)
            measure = common_measure(fmax(sizes_m3[i], measure), fmin(sizes_m3[i], measure), least);
    }
    return fmax(fmax(measure, least / 1000), most / UNIT_MOST);
}

static void sizes_make(struct sizes *sizes, const double *sizes_m3, size_t count)
{
    *sizes = (struct sizes){.unit_m3 = unit_of(sizes_m3, count)};
    for (size_t i = 0; i < count; i++) {
        if (!(sizes_m3[i] > 0))
            continue;
        long long units = (long long)floor(sizes_m3[i] / sizes->unit_m3 + 1e-3);
        if (units < 1) /* less than a 200 000th of the largest */
            continue;
        size_t at = sizes->count++;
        for (; at > 0 && sizes->units[at - 1] < units; at--) {
            sizes->units[at] = sizes->units[at - 1];
            sizes->index[at] = sizes->index[at - 1];
        }
        sizes->units[at] = units;
        sizes->index[at] = i;
    }
}

/* How many of the largest package are certain. Of L packages that are not the largest (L = its
 * units) some have a sum that is a multiple of L (pigeon-hole), so the largest take their place
 * with no more packages: the others never hold more than L - 1 packages. */
static long long bulk_of(const struct sizes *sizes, long long wanted)
{
    long long largest = sizes->units[0];
    long long second = sizes->count > 1 ? sizes->units[1] : 0;
    long long others = largest * second + largest;
    if (others > TABLE_MOST)
        others = TABLE_MOST;
    return wanted > others ? (wanted - others) / largest : 0;
}

/* Fewest packages for every sum of units up to `top`; `last` the size used last, for going back. */
static void fill_table(const struct sizes *sizes, uint32_t *fewest, unsigned char *last,
                       long long top)
{
    fewest[0] = 0;
    for (long long sum = 1; sum <= top; sum++) {
        fewest[sum] = UINT32_MAX;
        for (size_t i = 0; i < sizes->count; i++) {
            long long before = sum - sizes->units[i];
            if (before < 0 || fewest[before] == UINT32_MAX || fewest[before] + 1 >= fewest[sum])
                continue;
            fewest[sum] = fewest[before] + 1;
            last[sum] = (unsigned char)i;
        }
    }
}

static enum status cover(const struct sizes *sizes, long long wanted, int *counts)
{
    long long top = wanted + sizes->units[sizes->count - 1];
    uint32_t *fewest = malloc(((size_t)top + 1) * sizeof *fewest);
    unsigned char *last = malloc((size_t)top + 1);
    if (!fewest || !last) {
        free(fewest);
        free(last);
        return STATUS_NO_MEMORY;
    }
    fill_table(sizes, fewest, last, top);
    long long sum = wanted;
    while (sum < top && fewest[sum] == UINT32_MAX)
        sum++;
    while (sum > 0 && fewest[sum] != UINT32_MAX) {
        counts[sizes->index[last[sum]]]++;
        sum -= sizes->units[last[sum]];
    }
    free(fewest);
    free(last);
    return STATUS_OK;
}

/* Takes out packages that the amount does not need, smallest first (sizes rounded down may leave
 * one), and gives what the packages hold. */
static double drop_idle(const struct sizes *sizes, const double *sizes_m3, double amount_m3,
                        int *counts)
{
    double held = 0;
    for (size_t i = 0; i < sizes->count; i++)
        held += counts[sizes->index[i]] * sizes_m3[sizes->index[i]];
    for (size_t i = sizes->count; i-- > 0;) {
        double size = sizes_m3[sizes->index[i]];
        while (counts[sizes->index[i]] > 0 && held - size >= amount_m3 * (1 - 1e-12)) {
            counts[sizes->index[i]]--;
            held -= size;
        }
    }
    return held;
}

/* Exact: a table of sums in the packages' common measure (10 ml for 310 and 600 ml). Sizes without
 * one count in thousandths of the smallest, rounded down: the amount is always covered, the
 * left-over then least to about a thousandth of a package for each package. */
enum status quantity_packages(const double *sizes_m3, size_t count, double amount_m3, int *counts,
                              double *left_over_m3)
{
    struct sizes sizes;
    int found[QUANTITY_SIZE_MOST] = {0};
    if (count > QUANTITY_SIZE_MOST || !isfinite(amount_m3))
        return STATUS_REFUSED;
    for (size_t i = 0; i < count; i++) {
        if (!isfinite(sizes_m3[i]))
            return STATUS_REFUSED;
    }
    sizes_make(&sizes, sizes_m3, count);
    double units = fmax(amount_m3, 0) / (sizes.count ? sizes.unit_m3 : 1);
    if (sizes.count == 0 || units > (double)sizes.units[0] * PACKAGE_LIMIT)
        return STATUS_REFUSED;
    long long wanted = (long long)ceil(units * (1 - 1e-12) - 1e-6);
    long long bulk = bulk_of(&sizes, wanted);
    enum status status = cover(&sizes, wanted - bulk * sizes.units[0], found);
    if (status != STATUS_OK)
        return status;
    found[sizes.index[0]] += (int)bulk;
    double held = drop_idle(&sizes, sizes_m3, fmax(amount_m3, 0), found);
    for (size_t i = 0; i < count; i++)
        counts[i] = found[i];
    *left_over_m3 = fmax(held - fmax(amount_m3, 0), 0);
    return STATUS_OK;
}

double quantity_hours(double length_m, double pace_m_s, double hands)
{
    double pace = fmax(pace_m_s, 1e-9) * fmax(hands, 1);

    return fmax(length_m, 0) / pace / 3600;
}

double quantity_pot_life(double pot_life_s, double temperature_c)
{
    return fmax(pot_life_s, 0) * exp2((23 - temperature_c) / 10);
}

int quantity_boxes(int packages, int box)
{
    if (packages <= 0)
        return 0;
    return box <= 1 ? packages : packages / box + (packages % box != 0);
}

/* Depth of the crack-inducing cut: h/4 to h/3 (ACI 302.1R h/4; FHWA TechBrief on early-entry
 * sawing: 1/4 to 1/3); h/3 set on stabilised or asphalt bases. Floors of 25 mm and the largest
 * aggregate: from memory. */
struct quantity_cut quantity_cut_depth(double thickness_m, int bound_base, double aggregate_m)
{
    double h = fmax(thickness_m, 0);
    double least = fmax(0.025, aggregate_m > 0 ? aggregate_m : 0);
    struct quantity_cut cut = {h / 4, h / 3, bound_base ? h / 3 : h / 4};
    cut.set_m = fmin(fmax(cut.set_m, least), h / 2);
    return cut;
}
