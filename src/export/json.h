/* The JSON of docs/format.md: the whole result, one of its parts, the findings alone, the field
 * table. */
#ifndef SLABGAP_EXPORT_JSON_H
#define SLABGAP_EXPORT_JSON_H

#include "base/text.h"
#include "plan/plan.h"

/* `report --json`. With `only` (a top-level key) that value alone; false when there is no such key.
 * A plan without results (an error among the findings) gives {"program","findings"}. */
bool json_report(struct text *out, const struct plan *plan, const char *only);
/* {"program","findings"} */
void json_findings(struct text *out, const struct finding_list *findings);
/* `fields --json` */
void json_fields(struct text *out);
/* The top-level keys, for messages: "program, job, ...". */
void json_key_list(struct text *out);

#endif
