/* The units of every quantity. Private to src/base. */
#ifndef SLABGAP_BASE_UNIT_TABLE_H
#define SLABGAP_BASE_UNIT_TABLE_H

#include "base/unit.h"

struct unit {
    const char *name;
    /* SI = (number + shift) * scale / divisor: scale and divisor are kept apart so that 200 mm is
     * the double nearest to 0.2 and 3/16 in the one nearest to 0.0047625 */
    double scale, divisor, shift;
    bool alias; /* understood, but not named in lists */
};

/* Units of a quantity, ended by name NULL. */
const struct unit *unit_table_of(enum quantity quantity);
/* NULL when the quantity has no unit of that name. */
const struct unit *unit_table_find(enum quantity quantity, const char *name, size_t length);
bool unit_is_length(enum quantity quantity);
double unit_apply(const struct unit *unit, double number);
double unit_undo(const struct unit *unit, double si);

#endif
