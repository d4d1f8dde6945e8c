/* Slabs with many objects are parted before they are laid out. */
#ifndef SLABGAP_CORE_LAYOUT_PARTITION_H
#define SLABGAP_CORE_LAYOUT_PARTITION_H

#include "core/layout_region.h"

/* Ways to choose where a slab is parted: work.attempt is below it. */
enum { PARTITION_ATTEMPTS = 4 };
/* The parts, built but not laid out, are parted further, laid out and taken into the plan. */
enum status partition_solve(struct search *s, struct parts *p);

#endif
