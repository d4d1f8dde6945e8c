#include "core/spacing.h"

#include "core/curling.h"
#include <math.h>
#include <stdio.h>

static const double FOOT = 0.3048;
static const double INCH = 0.0254;
static const double SAME = 1e-9; /* thicknesses this near a row's edge belong to it */

static double limit(double value)
{
    return value < SPACING_UNLIMITED ? fmax(value, 0) : SPACING_UNLIMITED;
}

/* n h. ACI 302.1R: 24 to 36 h for floors; PCA: 24, 30, 36 h. */
double spacing_of_thickness(double multiple, double thickness_m)
{
    return limit(multiple * thickness_m);
}

/* PCA as tabulated in Masonry and Concrete (McGraw-Hill) Fig. 2-15: aggregate below 3/4 in 24 h,
 * 3/4 in and more 30 h, slump below 4 in 36 h. The program never rounds a limit up. */
double spacing_floor_multiple(double aggregate_m, double slump_m)
{
    if (slump_m > 0 && slump_m < 0.100)
        return 36;
    return aggregate_m > 0 && aggregate_m < 0.019 ? 24 : 30;
}

/* ---- rules by practice and use ---- */

static bool bound_base(enum spacing_base base)
{
    return base == SPACING_STABILISED || base == SPACING_ASPHALT;
}

static void add_multiple(struct spacing_rule *rows, size_t *count, double multiple, bool counts,
                         double thickness_m, const char *source)
{
    struct spacing_rule *row = &rows[(*count)++];
    *row = (struct spacing_rule){.rule = "thickness",
                                 .limit_m = spacing_of_thickness(multiple, thickness_m),
                                 .counts = counts,
                                 .source = source};
    snprintf(row->words, sizeof row->words, "%.0f x thickness", multiple);
}

static void add_cap(struct spacing_rule *rows, size_t *count, double limit_m, const char *words,
                    const char *source)
{
    struct spacing_rule *row = &rows[(*count)++];
    *row =
        (struct spacing_rule){.rule = "cap", .limit_m = limit_m, .counts = true, .source = source};
    snprintf(row->words, sizeof row->words, "%s", words);
}

static bool paved(enum spacing_use use)
{
    return use == SPACING_YARD || use == SPACING_ROAD || use == SPACING_APRON;
}

static double pavement_multiple(enum spacing_base base)
{
    return bound_base(base) ? 21 : 24;
}

static size_t rules_plain(const struct spacing_slab *slab, struct spacing_rule *rows)
{
    size_t count = 0;
    double multiple = paved(slab->use) ? pavement_multiple(slab->base) : 24;
    add_multiple(rows, &count, multiple, true, slab->thickness_m,
                 "SUDAS 5G-2; ACI 302.1R lower bound");
    return count;
}

static size_t rules_us(const struct spacing_slab *slab, struct spacing_rule *rows)
{
    size_t count = 0;
    if (slab->use == SPACING_FLOOR) {
        double own = spacing_floor_multiple(slab->aggregate_m, slab->slump_m);
        const double beside[] = {24, 30, 36};
        add_multiple(rows, &count, own, true, slab->thickness_m, "PCA; ACI 302.1R");
        for (size_t i = 0; i < 3; i++) {
            if (beside[i] < own || beside[i] > own)
                add_multiple(rows, &count, beside[i], false, slab->thickness_m, "PCA; ACI 302.1R");
        }
        return count;
    }
    double multiple = paved(slab->use) ? pavement_multiple(slab->base) : 24;
    add_multiple(rows, &count, multiple, true, slab->thickness_m, "SUDAS 5G-2");
    if (paved(slab->use) && slab->thickness_m < 10 * INCH - SAME)
        add_cap(rows, &count, 15 * FOOT, "at most 15 ft below 10 in",
                "FHWA T 5040.30 (1990); pavement association notes");
    return count;
}

static size_t rules_uk(const struct spacing_slab *slab, struct spacing_rule *rows)
{
    size_t count = 0;
    if (slab->use != SPACING_ROAD)
        add_multiple(rows, &count, 30, true, slab->thickness_m, "paving practice; from memory");
    else if (slab->thickness_m < 0.230 - SAME)
        add_cap(rows, &count, 4, "at most 4 m below 230 mm", "HD 26, from memory");
    else
        add_cap(rows, &count, 5, "at most 5 m from 230 mm", "HD 26, from memory");
    return count;
}

static size_t rules_germany(const struct spacing_slab *slab, struct spacing_rule *rows)
{
    size_t count = 0;
    add_multiple(rows, &count, 25, true, slab->thickness_m, "from memory");
    add_cap(rows, &count, 5, "at most 5 m", "from memory");
    return count;
}

static size_t rules_australia(const struct spacing_slab *slab, struct spacing_rule *rows)
{
    size_t count = 0;
    if (slab->use == SPACING_ROAD)
        add_cap(rows, &count, 4.2, "at most 4.2 m", "from memory");
    else
        add_multiple(rows, &count, 24, true, slab->thickness_m, "from memory");
    return count;
}

static size_t rules_india(const struct spacing_slab *slab, struct spacing_rule *rows)
{
    size_t count = 0;
    if (paved(slab->use))
        add_multiple(rows, &count, pavement_multiple(slab->base), true, slab->thickness_m,
                     "SUDAS 5G-2");
    add_cap(rows, &count, 4.5, "at most 4.5 m", "IRC:15-2017, IRC:58-2015");
    return count;
}

size_t spacing_rules(const struct spacing_slab *slab, struct spacing_rule rows[SPACING_RULE_MOST])
{
    static size_t (*const by_practice[])(const struct spacing_slab *, struct spacing_rule *) = {
        rules_plain, rules_us, rules_uk, rules_germany, rules_australia, rules_india};
    return by_practice[slab->practice <= SPACING_INDIA ? slab->practice : SPACING_PLAIN](slab,
                                                                                         rows);
}

double spacing_rule_limit(const struct spacing_slab *slab)
{
    struct spacing_rule rows[SPACING_RULE_MOST];
    size_t count = spacing_rules(slab, rows);
    double least = SPACING_UNLIMITED;
    for (size_t i = 0; i < count; i++) {
        if (rows[i].counts)
            least = fmin(least, rows[i].limit_m);
    }
    return least;
}

/* ---- agency tables ---- */

struct agency_row {
    double from_m; /* thickness */
    double least_m, most_m;
};

/* The last row whose thickness is not above; 0 when the slab is thinner than the first. */
static double agency_find(const struct agency_row *rows, size_t count, double thickness_m,
                          double *least_m)
{
    double found = 0;
    *least_m = 0;
    for (size_t i = 0; i < count; i++) {
        if (thickness_m >= rows[i].from_m - SAME) {
            *least_m = rows[i].least_m;
            found = rows[i].most_m;
        }
    }
    return found;
}

/* UFC 3-260-02 (2001) Table 12-7: < 9 in 12.5-15 ft, 9-12 in 15-20 ft, > 12 in 20 ft. SUDAS Design
 * Manual Table 5G-2.01: 6 in 12 ft, 7 to 9 in 15 ft, 10 in and over 20 ft. Illinois ready-mix guide
 * for parking lots: 4, 5, 6 in 10, 12, 15 ft. IRC:15-2017, IRC:58-2015: 4.5 m. */
double spacing_agency(enum spacing_agency agency, double thickness_m, double *least_m)
{
    static const struct agency_row ufc[] = {{0, 3.81, 4.572}, {0.2286, 4.572, 6.096}};
    static const struct agency_row sudas[] = {
        {0.1524, 0, 3.6576}, {0.1778, 0, 4.572}, {0.254, 0, 6.096}};
    static const struct agency_row illinois[] = {
        {0.1016, 0, 3.048}, {0.127, 0, 3.6576}, {0.1524, 0, 4.572}};
    static const struct agency_row irc[] = {{0, 0, 4.5}};
    double least = 0, most = 0;
    if (agency == SPACING_UFC)
        most = agency_find(ufc, 2, thickness_m, &least);
    else if (agency == SPACING_SUDAS)
        most = agency_find(sudas, 3, thickness_m, &least);
    else if (agency == SPACING_ILLINOIS)
        most = agency_find(illinois, 3, thickness_m, &least);
    else if (agency == SPACING_IRC)
        most = agency_find(irc, 1, thickness_m, &least);
    if (agency == SPACING_UFC && thickness_m > 12 * INCH + SAME)
        least = 0;
    if (least_m)
        *least_m = least;
    return most;
}

const char *spacing_agency_source(enum spacing_agency agency)
{
    static const char *const source[] = {
        "", "UFC 3-260-02 (2001) Table 12-7", "SUDAS Design Manual 5G-2, Table 5G-2.01",
        "Illinois ready-mix guide for parking lots", "IRC:15-2017, IRC:58-2015"};
    return agency <= SPACING_IRC ? source[agency] : "";
}

/* ---- computed limits ---- */

/* l = [E h^3/(12 (1 - nu^2) k)]^(1/4). Westergaard (1926). k is known to about half only; l goes
 * with its fourth root. */
double spacing_stiffness_radius(double modulus_pa, double thickness_m, double poisson,
                                double subgrade_pa_m)
{
    double h = fmax(thickness_m, 1e-6), nu = fmin(fmax(poisson, 0), 0.49);
    double stiffness = fmax(modulus_pa, 1) * h * h * h / (12 * (1 - nu * nu));
    return pow(stiffness / fmax(subgrade_pa_m, 1), 0.25);
}

/* FHWA T 5040.30 (1990): cracking rises above L/l = 5; 5 on stabilised bases, 6 on granular ones
 * from memory. */
double spacing_stiffness_ratio(enum spacing_base base)
{
    return bound_base(base) ? 5 : 6;
}

double spacing_by_stiffness(double radius_m, double ratio)
{
    return limit(ratio * radius_m);
}

/* L = 2 f/(gamma mu): the slab slides as a whole, tension gamma mu L/2 at its middle; independent
 * of width and thickness. Indian practice (IRC) with f = 80 kPa. */
double spacing_by_drag(double allowed_pa, double unit_weight, double friction)
{
    double drag = fmax(unit_weight, 0) * fmax(friction, 0);
    double twice = 2 * fmax(allowed_pa, 0);
    return drag * SPACING_UNLIMITED > twice ? twice / drag : SPACING_UNLIMITED;
}

/* Night: curling tension at the top (edge stress C E a dT/2, Bradbury 1938) and the drag of the
 * contracting slab gamma mu L/2 add up. */
double spacing_curling_stress(const struct spacing_curling *c, double length_m)
{
    double curl = curling_coefficient(length_m / fmax(c->radius_m, 1e-6)) * c->modulus_pa *
                  c->expansion * fabs(c->difference_k) / 2;
    return curl + fmax(c->unit_weight, 0) * fmax(c->friction, 0) * length_m / 2;
}

static double curling_crossing(const struct spacing_curling *c, double good, double bad)
{
    for (int i = 0; i < 60; i++) {
        double middle = (good + bad) / 2;
        if (spacing_curling_stress(c, middle) <= c->allowed_pa)
            good = middle;
        else
            bad = middle;
    }
    return good;
}

/* The first length at which the sum passes what is allowed. C rises to 1.0863 at L/l = 8.886 and
 * then falls a little, so the steps are small up to 20 l; beyond, C is 1 and only the drag grows.
 */
double spacing_by_curling(const struct spacing_curling *c)
{
    double step = fmax(c->radius_m, 1e-6) / 20, at = 0;
    if (!(c->allowed_pa > 0))
        return 0;
    for (int i = 1; i <= 400 && at < SPACING_UNLIMITED; i++) {
        double next = i * step;
        if (spacing_curling_stress(c, next) > c->allowed_pa)
            return limit(curling_crossing(c, at, next));
        at = next;
    }
    if (spacing_curling_stress(c, SPACING_UNLIMITED) <= c->allowed_pa)
        return SPACING_UNLIMITED;
    return limit(curling_crossing(c, at, fmax(SPACING_UNLIMITED, at)));
}

/* Interlock: opening = strain x L stays within 0.9 mm; about 15 % of the load passes at 1.5 mm
 * (after Colley and Humphrey, Highway Research Record 189, 1967; for slabs of about 9 in). */
double spacing_by_interlock(double limit_m, double strain)
{
    double opening = fmax(limit_m, 0);
    return strain * SPACING_UNLIMITED > opening ? opening / strain : SPACING_UNLIMITED;
}

/* L x strain = S W for both ways (ASTM C920 class of the width at sealing). */
double spacing_by_sealant(double width_m, double extension, double compression, double open_strain,
                          double close_strain)
{
    double width = fmax(width_m, 0);
    return fmin(spacing_by_interlock(width * extension, open_strain),
                spacing_by_interlock(width * compression, close_strain));
}
