/* The units of every quantity. Private to src/base. */
#ifndef SLABGAP_BASE_UNIT_TABLE_H
#define SLABGAP_BASE_UNIT_TABLE_H

#include "base/unit.h"

struct unit {
    const char *name;
    double scale, offset; /* SI = number * scale + offset */
    bool alias;           /* understood, but not named in lists */
};

/* Units of a quantity, ended by name NULL. */
const struct unit *unit_table_of(enum quantity quantity);
/* NULL when the quantity has no unit of that name. */
const struct unit *unit_table_find(enum quantity quantity, const char *name, size_t length);
bool unit_is_length(enum quantity quantity);

#endif
