#include "base/array.h"
#include <stdint.h>
#include <stdlib.h>

bool array_reserve(void **items, size_t *capacity, size_t count, size_t size)
{
    size_t wanted = *capacity > 0 ? *capacity : 8;
    void *larger;

    if (count <= *capacity)
        return true;
    while (wanted < count) {
        if (wanted > SIZE_MAX / 2)
            return false;
        wanted *= 2;
    }
    if (size > 0 && wanted > SIZE_MAX / size)
        return false;
    larger = realloc(*items, wanted * size);
    if (larger == NULL)
        return false;
    *items = larger;
    *capacity = wanted;
    return true;
}
