/* The lists as CSV (RFC 4180), units in the header's keys: _m metres, _c degC, _l litres. */
#ifndef SLABGAP_EXPORT_CSV_H
#define SLABGAP_EXPORT_CSV_H

#include "base/text.h"
#include "plan/plan.h"

/* `name`: joints, panels, quantities, sealing. False when there is no such list. */
bool csv_report(struct text *out, const struct plan *plan, const char *name);

#endif
