/* What to order, as a slip. */
#ifndef SLABGAP_EXPORT_BUY_TEXT_H
#define SLABGAP_EXPORT_BUY_TEXT_H

#include "base/text.h"
#include "plan/plan.h"

/* At most 78 columns. */
void buy_report(struct text *out, const struct plan *plan);

#endif
