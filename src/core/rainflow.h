/* Rainflow cycle counting: ASTM E1049-85. */
#ifndef SLABGAP_CORE_RAINFLOW_H
#define SLABGAP_CORE_RAINFLOW_H

#include "base/status.h"
#include <stddef.h>

struct rainflow_cycle {
    double range, mean;
    double count; /* 1 or 0.5 */
};
/* Counts the cycles of a history (peaks and valleys are found first). cycles[] needs room for
 * `count`; returns through *found how many there are. STATUS_NO_MEMORY. */
enum status rainflow_count(const double *history, size_t count, struct rainflow_cycle *cycles,
                           size_t *found);

#endif
