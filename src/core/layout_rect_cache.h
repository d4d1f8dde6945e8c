/* Solves a zone, or recalls what was found for the same one. */
#ifndef SLABGAP_CORE_LAYOUT_RECT_CACHE_H
#define SLABGAP_CORE_LAYOUT_RECT_CACHE_H

#include "core/layout_cache.h"
#include "core/layout_rect.h"

/* As rect_solve; cache NULL: solves. */
enum status rect_solve_cached(struct layout_cache *cache, struct rect_slab *slab,
                              enum rect_depth depth);

#endif
