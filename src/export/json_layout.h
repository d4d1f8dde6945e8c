/* `layout` of the JSON result: exactly what docs/format.md says, nothing null inside. */
#ifndef SLABGAP_EXPORT_JSON_LAYOUT_H
#define SLABGAP_EXPORT_JSON_LAYOUT_H

#include "export/json_writer.h"
#include "plan/plan.h"

void json_add_layout(struct json *json, const struct plan *plan);
/* "layout_reasons": what could not be done and belongs to no panel. */
void json_add_slab_reasons(struct json *json, const struct plan *plan);

#endif
