/* Which weather the slab's year is made from, in words. */
#ifndef SLABGAP_EXPORT_CLIMATE_TEXT_H
#define SLABGAP_EXPORT_CLIMATE_TEXT_H

#include "base/text.h"
#include "job/job.h"

/* "a made year: five clear days in a row at each extreme of the air", or "the weather file
 * seattle.csv, 2015, a line a day; damp from the form, sun from the day's range of the air". No
 * capital, no stop. The job settled. */
void climate_words(struct text *out, const struct job *job);
/* The same short, for a row: "weather file, 2015" or "made year". */
void climate_short_words(struct text *out, const struct job *job);

#endif
