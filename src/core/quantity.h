/* Take-off: sealant volume, packages, saw cuts, concrete. SI: m, m2, m3. */
#ifndef SLABGAP_CORE_QUANTITY_H
#define SLABGAP_CORE_QUANTITY_H

#include "base/status.h"
#include <stddef.h>

/* length x width x depth. */
double quantity_bead(double length_m, double width_m, double depth_m);
/* Sealant hidden beside a round rod: (1/2 - pi/8) W^2 per length. */
double quantity_cusps(double length_m, double width_m);
/* Length that one package fills; 0 for a bead of no size. */
double quantity_length(double package_m3, double width_m, double depth_m);
/* (1 + waste) x net. */
double quantity_order(double net_m3, double waste);

enum { QUANTITY_SIZE_MOST = 8 };
/* The mix of package sizes that covers the amount with the least left over; of several the fewest
 * packages. counts[i] goes with sizes[i]. STATUS_REFUSED: no size > 0, more than
 * QUANTITY_SIZE_MOST sizes or more than a million packages. */
enum status quantity_packages(const double *sizes_m3, size_t count, double amount_m3, int *counts,
                              double *left_over_m3);
/* Hours for so many metres with so many hands or tools at a pace of one, m/s. */
double quantity_hours(double length_m, double pace_m_s, double hands);
/* Time to use a mixed batch at another temperature, s: half for every 10 K above 23 degC, double
 * for every 10 K below. A rule of thumb for curing resins, from memory. */
double quantity_pot_life(double pot_life_s, double temperature_c);
/* Whole boxes of so many packages; box 1 or less: the packages. */
int quantity_boxes(int packages, int box);
/* Saw cut depth: h/4 on unbound bases, h/3 on stabilised or asphalt ones; `range`: h/4, h/3. Not
 * less than 25 mm nor the largest aggregate, never more than h/2. */
struct quantity_cut {
    double least_m, most_m, set_m;
};
struct quantity_cut quantity_cut_depth(double thickness_m, int bound_base, double aggregate_m);

#endif
