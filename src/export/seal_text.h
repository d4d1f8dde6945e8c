/* Go or not, in words. */
#ifndef SLABGAP_EXPORT_SEAL_TEXT_H
#define SLABGAP_EXPORT_SEAL_TEXT_H

#include "base/text.h"
#include "plan/seal_now.h"

/* One line: "YES, NOW." or "NOT YET." / "NOT THIS JOINT." with the first reason. */
void seal_now_headline(struct text *out, const struct plan *plan, const struct seal_now *now);
/* Everything of the command `seal`, at most 78 columns. */
void seal_now_report(struct text *out, const struct plan *plan, const struct seal_now *now);

#endif
