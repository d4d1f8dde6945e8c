/* Words and charts about the seal, for report and form. */
#ifndef SLABGAP_EXPORT_SEAL_CHART_H
#define SLABGAP_EXPORT_SEAL_CHART_H

#include "base/text.h"
#include "plan/plan.h"

/* Which width may be sealed at which slab temperature, both measured then: one line of temperatures
 * and one for each width; cells cold, no, just, yes. Empty without a sealing table. `columns`: as
 * many temperatures as fit; the coldest and hottest always. */
void seal_chart_add(struct text *out, const struct plan *plan, int columns);
/* "fits: 8 mm wide, 6 mm deep, stretches 17 %. Mind: ..." or "no: ...". */
void seal_choice_words(struct text *out, const struct plan *plan, const struct plan_choice *choice);

#endif
