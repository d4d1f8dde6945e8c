/* The night of sawing as text: sentences, the hours as a bar, the order of the lines, where the
 * pour may stop. */
#ifndef SLABGAP_EXPORT_SAW_TEXT_H
#define SLABGAP_EXPORT_SAW_TEXT_H

#include "base/text.h"
#include "plan/saw_band.h"

/* Whether the plan has clock times. */
bool saw_there(const struct plan *plan);
/* "trial 13:11, last cut 17:45 with 1 saw; 50-67 mm deep; dark from 19:55." */
void saw_sentence(struct text *out, const struct plan *plan);
/* What does not fit, or the tightest line; "" when nothing is to be said. */
void saw_trouble(struct text *out, const struct plan *plan);
/* Lines "clock", "pour", "trial", "saw", "too late", "dark", each of at most `columns`. `band` may
 * be NULL. */
void saw_bar(struct text *out, const struct plan *plan, const struct saw_band *band, int columns);
/* " (may be 12:26 to 14:02)" */
void saw_band_words(struct text *out, double from_h, double to_h);
/* "3", or "B part 2" of a line that is cut in parts. */
void saw_cut_name(const struct plan *plan, const struct plan_cut *cut, char *out, size_t size);
/* "1:49", "TOO LATE", "-" */
void saw_spare_words(const struct plan_cut *cut, char out[16]);
/* Everything of the command `saw`, at most 78 columns. */
void saw_report(struct text *out, const struct plan *plan, const struct saw_band *band);
/* order,line,pour,length_m,saw,start,end,not_before,not_after,spare_h,late */
void saw_csv(struct text *out, const struct plan *plan);

#endif
