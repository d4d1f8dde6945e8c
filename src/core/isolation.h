/* Isolation and expansion joints: what pushes, how thick the filler. m, degC, ratios. */
#ifndef SLABGAP_CORE_ISOLATION_H
#define SLABGAP_CORE_ISOLATION_H

#include <stdbool.h>
#include <stddef.h>

/* Compression a filler board stands, of its thickness: ASTM D1751 loads to 50 %. */
#define ISOLATION_SHARE 0.5

/* Expansion that reaches the joint from the zero-stress temperature to the hottest: factor 1, no
 * credit for shrinkage, creep or friction. >= 0. */
double isolation_demand(double expansion, double zero_stress_c, double hottest_c, double run_m);
/* Least filler: demand / share. */
double isolation_filler(double demand_m, double share);
/* Thinnest stock board not thinner than that; -1: none. Boards in any order. */
int isolation_choose_filler(const double *boards_m, size_t count, double least_m);
/* Run that fills a gap: share x gap / (a dT). 0 expansion: ISOLATION_RUN_MOST. */
#define ISOLATION_RUN_MOST 1e6
double isolation_run_to_closure(double gap_m, double share, double expansion, double rise_k);

#endif
