/* What a layout remembers for the next one: the zones it solved, each by the exact value of all
 * that enters it. A layout made with a cache equals one made without, bit by bit. */
#ifndef SLABGAP_CORE_LAYOUT_CACHE_H
#define SLABGAP_CORE_LAYOUT_CACHE_H

#include <stddef.h>

struct layout_cache_entry;
/* Starts as {0}; belongs to the caller and to one layout at a time. */
struct layout_cache {
    struct layout_cache_entry *entries;
    size_t count, next, bytes;
    size_t hits, misses; /* since it was begun */
};

/* Safe on {0} and twice. */
void layout_cache_free(struct layout_cache *cache);

#endif
