/* `job` of the JSON result (every field in SI, what was overruled, what was assumed) and the field
 * table as JSON. */
#ifndef SLABGAP_EXPORT_JSON_JOB_H
#define SLABGAP_EXPORT_JSON_JOB_H

#include "export/json_writer.h"
#include "plan/plan.h"

void json_add_job(struct json *json, const struct plan *plan);

#endif
