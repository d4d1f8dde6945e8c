/* Repeatable random numbers in a box, for the property tests (SplitMix64). */
#ifndef SLABGAP_TESTS_CORE_RANDOM_BOX_H
#define SLABGAP_TESTS_CORE_RANDOM_BOX_H

#include <stdint.h>

static inline double random_share(uint64_t *seed)
{
    uint64_t z = (*seed += 0x9e3779b97f4a7c15u);
    z = (z ^ (z >> 30)) * 0xbf58476d1ce4e5b9u;
    z = (z ^ (z >> 27)) * 0x94d049bb133111ebu;
    z ^= z >> 31;
    return (double)(z >> 11) / 9007199254740992.0;
}

static inline double random_between(uint64_t *seed, double least, double most)
{
    return least + (most - least) * random_share(seed);
}

/* One time in eight exactly 0. */
static inline double random_or_zero(uint64_t *seed, double least, double most)
{
    return random_share(seed) < 0.125 ? 0 : random_between(seed, least, most);
}

#endif
