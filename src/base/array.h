/* Growing arrays of plain structs: one function, no macros that hide control flow. */
#ifndef SLABGAP_BASE_ARRAY_H
#define SLABGAP_BASE_ARRAY_H

#include <stdbool.h>
#include <stddef.h>

/* Makes room for `count` items of `size` bytes in *items (doubling *capacity).
 * Returns false, leaving everything as it was, when memory or size_t runs out.
 *   if (!array_reserve((void **)&a->items, &a->capacity, a->count + 1, sizeof *a->items)) ... */
bool array_reserve(void **items, size_t *capacity, size_t count, size_t size);

#endif
