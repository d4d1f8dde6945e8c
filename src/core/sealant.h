/* A sealed joint: least width, strains, bead shape, gap against slab temperature, sealing window,
 * compression seals. m, degC, ratios of the width at sealing. */
#ifndef SLABGAP_CORE_SEALANT_H
#define SLABGAP_CORE_SEALANT_H

#include <stdbool.h>
#include <stddef.h>

struct sealant_capacity {
    double extension, compression; /* each way, of the width at sealing (ASTM C920, C719) */
};
struct sealant_strain {
    double extension, compression; /* >= 0 */
};

/* max(open/S_ext, close/S_comp) + tolerance. */
double sealant_least_width(double open_m, double close_m, struct sealant_capacity capacity,
                           double tolerance_m);
/* Basis of the mean width (movement accommodation factor, BS 6093 from memory). */
double sealant_least_mean_width(double open_m, double close_m, double factor);
/* What the strains are ratios of: the width at sealing (ASTM C920, C719), or, for a sealant given
 * by a movement accommodation factor, the whole movement on the width less the movement (BS 6093,
 * from memory). */
enum sealant_basis { SEALANT_OF_WIDTH, SEALANT_OF_REST };
/* Strains of a joint this wide at sealing, at most SEALANT_SHUT: a joint of no width. */
#define SEALANT_SHUT 10.0
struct sealant_strain sealant_strains(enum sealant_basis basis, double open_m, double close_m,
                                      double width_m);
/* The worse of both as a share of the capacity. */
double sealant_demand(struct sealant_strain strain, struct sealant_capacity capacity);

/* Edge strain of the bead's face (Tons 1959): width at rest, depth, width opened to. Information.
 */
double sealant_bead_strain(double width_m, double depth_m, double opened_m);
/* How far the bead's face stands above (closing) or sags below (opening) the edge line, m. */
double sealant_bulge(double width_m, double depth_m, double width_now_m);
/* Bead depth: ratio x width, clamped. */
double sealant_depth(double width_m, double ratio, double least_m, double most_m);
/* Depth of silicone beads: width / 2, 6 to 13 mm (Allen, Architectural Detailing). */
#define SEALANT_DEPTH_RATIO 0.5
#define SEALANT_DEPTH_LEAST 0.006
#define SEALANT_DEPTH_MOST 0.013

/* A joint at its place, for the sealing table and the window. `move` gives the movement of the
 * joint for a free strain >= 0; NULL: length_m x strain. */
struct sealant_joint {
    enum sealant_basis basis;
    double tolerance_m;    /* demand is at the gap less this, strains at the gap itself */
    double width_m, cut_c; /* cut to this width at this slab temperature */
    double coldest_c, hottest_c;
    double expansion; /* 1/K */
    double shrinkage; /* still to come after sealing */
    double length_m;  /* factor x mean panel length; used when move is NULL */
    double (*move)(const void *context, double strain);
    const void *context;
    struct sealant_capacity capacity;
};
struct sealant_moment {
    double slab_c, gap_m, open_m, close_m; /* to the coldest, to the hottest */
    double extension, compression;
    double demand; /* worse share of the capacity, tolerance in; above 1 it fails */
};
struct sealant_moment sealant_row_at(const struct sealant_joint *joint, double slab_c);
/* Slab temperatures between coldest and hottest at which the joint may be sealed (demand at most 1,
 * within 1e-6 K): the longest unbroken stretch. False: none as long as a step, (hottest - coldest)
 * / SEALANT_STEPS. */
enum { SEALANT_STEPS = 128 };
bool sealant_window(const struct sealant_joint *joint, double *coldest_c, double *hottest_c);

/* Preformed compression seal (ASTM D2628; FHWA). Compressions are ratios of the seal's own width.
 */
struct sealant_seal {
    double seal_m;      /* uncompressed width */
    double least, most; /* working compression, usual 0.20 to 0.50 */
};
/* Least uncompressed width for a movement. */
double sealant_seal_least(double movement_m, double least, double most);
/* Compression at setting by the linear published formula, and the slot it asks for. */
double sealant_seal_setting(const struct sealant_seal *seal, double slab_c, double coldest_c,
                            double hottest_c);
double sealant_seal_slot(const struct sealant_seal *seal, double setting);
/* Both ends with the slot as cut: compression at the coldest and at the hottest. */
struct sealant_seal_ends {
    double cold, hot;
    bool holds;
};
struct sealant_seal_ends sealant_seal_check(const struct sealant_seal *seal, double slot_m,
                                            double open_m, double close_m);
/* How far the seal can follow from a slot that may be wider or narrower by the tolerance, m; below
 * 0: it is out of its range before anything moves. */
struct sealant_follow {
    double open_m, close_m;
};
struct sealant_follow sealant_seal_follow(const struct sealant_seal *seal, double slot_m,
                                          double tolerance_m);
/* Worse share of what it can follow; above 1 it fails, SEALANT_SHUT when it can follow nothing. */
double sealant_seal_demand(struct sealant_follow follow, double open_m, double close_m);
/* Slots that hold; false when there are none. */
bool sealant_seal_slots(const struct sealant_seal *seal, double open_m, double close_m,
                        double *least_m, double *most_m);

#endif
