/* Tie bars, dowels, distributed steel. SI: m, m2, Pa, N/m3. */
#ifndef SLABGAP_CORE_STEEL_H
#define SLABGAP_CORE_STEEL_H

#include <stdbool.h>

struct steel_ties {
    double free_width_m; /* from the tied joint to the nearest untied joint or free edge */
    double thickness_m, unit_weight, friction;
    double bar_m;    /* diameter */
    double steel_pa; /* allowed stress */
    double bond_pa;  /* allowed bond */
};
struct steel_tie_result {
    double area_m2_m; /* steel per metre of joint */
    double spacing_m; /* rounded down to 10 mm, at most STEEL_TIE_SPACING_MOST */
    double length_m;  /* bar length, not rounded */
    double exact_spacing_m;
};
#define STEEL_TIE_SPACING_MOST 1.2 /* common practice */
#define STEEL_TIE_EXTRA 0.150      /* for placing; IRC:58 */
#define STEEL_TIE_CLEAR 0.375      /* none nearer to a cross joint; from memory */
/* Allowed stress and bond, Pa (from memory, verified by fit to IRC:58). */
#define STEEL_PLAIN_PA 122.583125e6        /* 1250 kgf/cm2 */
#define STEEL_DEFORMED_PA 196.133e6        /* 2000 kgf/cm2 */
#define STEEL_PLAIN_BOND_PA 1.71616375e6   /* 17.5 kgf/cm2 */
#define STEEL_DEFORMED_BOND_PA 2.4124359e6 /* 24.6 kgf/cm2 */
struct steel_tie_result steel_ties(const struct steel_ties *ties);

/* h/8, and whether a slab this thin gets dowels at all (none below 180 mm). */
double steel_dowel_diameter(double thickness_m);
bool steel_dowels_fit(double thickness_m);
#define STEEL_DOWEL_LEAST_THICKNESS 0.175 /* 7 in = 177.8 mm counts as 180 mm */
/* Distributed (drag) steel across a joint-to-joint length: mu L w / (2 fs), m2 per metre width.
 * weight: of the slab per area, N/m2. */
double steel_drag(double friction, double length_m, double weight_pa, double steel_pa);
/* How many bars stand in a joint of this length, the first and the last `clear` from its ends
 * (dowels: half a spacing). */
int steel_bar_count(double joint_m, double spacing_m, double clear_m);

#endif
