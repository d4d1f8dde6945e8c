/* The governing joint through a year: slab temperature, width and strain of the sealant, day by
 * day. */
#ifndef SLABGAP_PLAN_YEAR_H
#define SLABGAP_PLAN_YEAR_H

#include "plan/plan.h"

struct year_day {
    int day_of_year;                /* from 0 */
    double slab_low_c, slab_high_c; /* of the mean over the depth */
    double gap_low_m, gap_high_m;   /* narrowest and widest width */
    double extension, compression;  /* of the width at sealing, largest of the day */
};
struct year {
    struct year_day days[CLIMATE_DAYS]; /* from the day of sealing on, else from 1 January */
    int widest, narrowest;              /* index into days */
    bool dated;        /* begins at sealing.date: the first year, drying by its model */
    bool scaled;       /* typed slab temperatures: the simulated year stretched to reach them */
    bool drying_known; /* false: drying was typed; low without any of it, high with all */
    double cycles[4];  /* rainflow cycles of the strain: range up to 2, 5, 10 % and more */
};

/* STATUS_REFUSED: indoors, or no joint moves. */
enum status year_make(const struct plan *plan, struct year *year);
/* "12 January" of a day of the year. */
const char *year_month_word(int day_of_year, int *day_of_month);

#endif
