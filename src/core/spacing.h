/* Limits of joint spacing: rules by thickness and practice, agency tables, and limits computed from
 * stiffness, friction, curling, interlock and sealant. m, Pa, ratios. Limits are > 0; a limit that
 * does not bind is SPACING_UNLIMITED. */
#ifndef SLABGAP_CORE_SPACING_H
#define SLABGAP_CORE_SPACING_H

#include <stdbool.h>
#include <stddef.h>

#define SPACING_UNLIMITED 1000.0 /* m */

/* The orders of job.practice, slab.use, base.kind, rules.table. */
enum spacing_practice {
    SPACING_PLAIN,
    SPACING_US,
    SPACING_UK,
    SPACING_GERMANY,
    SPACING_AUSTRALIA,
    SPACING_INDIA
};
enum spacing_use { SPACING_YARD, SPACING_ROAD, SPACING_FOOTWAY, SPACING_FLOOR, SPACING_APRON };
enum spacing_base {
    SPACING_GRANULAR,
    SPACING_STABILISED,
    SPACING_ASPHALT,
    SPACING_SAND,
    SPACING_SOIL
};
enum spacing_agency {
    SPACING_AGENCY_NONE,
    SPACING_UFC,
    SPACING_SUDAS,
    SPACING_ILLINOIS,
    SPACING_IRC
};

struct spacing_slab {
    enum spacing_practice practice;
    enum spacing_use use;
    enum spacing_base base;
    double thickness_m;
    double aggregate_m; /* largest aggregate; 0 = unknown (20 mm) */
    double slump_m;     /* 0 = unknown (over 100 mm) */
};
struct spacing_rule {
    const char *rule; /* "thickness" or "cap" */
    double limit_m;
    bool counts;    /* false: shown beside */
    char words[64]; /* "24 x thickness", "at most 15 ft below 10 in" */
    const char *source;
};
enum { SPACING_RULE_MOST = 4 };
/* The rows of the practice and use; returns how many. */
size_t spacing_rules(const struct spacing_slab *slab, struct spacing_rule rows[SPACING_RULE_MOST]);
/* The least of the rows that count. */
double spacing_rule_limit(const struct spacing_slab *slab);

/* n x h; ACI 302.1R, PCA. */
double spacing_of_thickness(double multiple, double thickness_m);
/* PCA's multiple for floors: 24, 30 or 36. */
double spacing_floor_multiple(double aggregate_m, double slump_m);
/* An agency's table: the longest spacing it allows; 0 = no row for this thickness. `*least_m` (may
 * be NULL): the shortest it recommends, 0 = not said. */
double spacing_agency(enum spacing_agency agency, double thickness_m, double *least_m);
const char *spacing_agency_source(enum spacing_agency agency);

/* Radius of relative stiffness, m (Westergaard). */
double spacing_stiffness_radius(double modulus_pa, double thickness_m, double poisson,
                                double subgrade_pa_m);
/* L/l: 5 on stabilised bases, 6 on granular (from memory; 4 to 6 in use). */
double spacing_stiffness_ratio(enum spacing_base base);
double spacing_by_stiffness(double radius_m, double ratio);
/* Drag of the base: 2 f / (gamma mu). */
double spacing_by_drag(double allowed_pa, double unit_weight, double friction);
/* Night curling plus drag: the length at which edge stress plus drag reaches what is allowed. */
struct spacing_curling {
    double modulus_pa, expansion, radius_m;
    double difference_k; /* top colder than bottom, size only */
    double unit_weight, friction;
    double allowed_pa; /* share of the modulus of rupture */
};
double spacing_by_curling(const struct spacing_curling *c);
/* Stress of that sum at a length. */
double spacing_curling_stress(const struct spacing_curling *c, double length_m);
/* Interlock: spacing at which the crack opening stays within the limit (0.9 mm). `strain`: free
 * shortening from zero stress to coldest, drying included. */
#define SPACING_INTERLOCK_M 0.0009
double spacing_by_interlock(double limit_m, double strain);
/* Sealant: spacing at which the widest reservoir just holds; strains already times the factor. */
double spacing_by_sealant(double width_m, double extension, double compression, double open_strain,
                          double close_strain);

#endif
