/* Values of several members. Private to src/job. */
#ifndef SLABGAP_JOB_VALUE_LIST_H
#define SLABGAP_JOB_VALUE_LIST_H

#include "job/value.h"

bool value_read_bar(const struct value *value, struct bar *place);
/* One to eight numbers, each within the field's limits. */
bool value_read_numbers(const struct value *value, const struct field *field,
                        struct numbers *place);
bool value_read_counts(const struct value *value, struct counts *place);
/* Whether a number lies within the field's limits; else an error finding. */
bool value_within(const struct value *value, const struct field *field, double si);
void value_refuse_reading(const struct value *value, const struct unit_reading *reading,
                          enum quantity quantity);

#endif
