/* The report in plain text, at most 78 columns, no colour: answers, assumed values, spacing,
 * temperature and movement, seal, sealing table, isolation, checks, quantities, joints, layout,
 * cautions. */
#ifndef SLABGAP_EXPORT_REPORT_H
#define SLABGAP_EXPORT_REPORT_H

#include "base/text.h"
#include "plan/plan.h"

enum { REPORT_COLUMNS = 78 };

/* `only`: a top-level key of the JSON, NULL = all. False when there is no such part. */
bool report_text(struct text *out, const struct plan *plan, const char *only);
/* The verdicts only (`check`). */
void report_checks(struct text *out, const struct plan *plan);
/* One line a finding: "error: ...". `path` may be NULL. */
void report_findings(struct text *out, const struct finding_list *findings, const char *path);
/* The usual cautions, one sentence each; NULL past the last. */
const char *report_caution(size_t index);

#endif
