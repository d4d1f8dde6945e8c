/* Sorted lists of exact coordinates. */
#ifndef SLABGAP_CORE_LAYOUT_SORT_H
#define SLABGAP_CORE_LAYOUT_SORT_H

#include <stdbool.h>
#include <stddef.h>
#include <stdint.h>

void sort_int64(int64_t *list, size_t count);
/* Sorts, drops what is there twice; how many are left. */
size_t sort_unique(int64_t *list, size_t count);
bool sort_holds(const int64_t *list, size_t count, int64_t value);

#endif
