/* The joint's year as text: a sentence, a chart of its width, a table by month, CSV by day. */
#ifndef SLABGAP_EXPORT_YEAR_TEXT_H
#define SLABGAP_EXPORT_YEAR_TEXT_H

#include "base/text.h"
#include "plan/year.h"

/* "Widest about 20 January, 11.4 mm; narrowest about 20 July, 9.2 mm." */
void year_sentence(struct text *out, const struct plan *plan, const struct year *year);
/* One day: "20 January: slab -8 to -1 degC, joint 11.1 to 11.4 mm, +13.8 %". */
void year_day_words(struct text *out, const struct plan *plan, const struct year_day *day);
/* The weather it is made from: one sentence. */
void year_basis(struct text *out, const struct plan *plan, const struct year *year);
/* `rows` lines of at most `columns` characters: the width over the year, the band of what the
 * sealant stands as ====, months below. `mark`: a day of the series to point at, -1 = none. */
void year_chart(struct text *out, const struct plan *plan, const struct year *year, int columns,
                int rows, bool ascii, int mark);
/* Everything of the command `year`. */
void year_report(struct text *out, const struct plan *plan, const struct year *year);
void year_csv(struct text *out, const struct year *year);

#endif
