#include "core/layout_sort.h"
#include <stdlib.h>

static int compare_int64(const void *a, const void *b)
{
    const int64_t p = *(const int64_t *)a, q = *(const int64_t *)b;
    return (p > q) - (p < q);
}

void sort_int64(int64_t *list, size_t count)
{
    size_t i = 1;
    while (i < count && list[i - 1] <= list[i])
        i++;
    if (i < count)
        qsort(list, count, sizeof *list, compare_int64);
}

size_t sort_unique(int64_t *list, size_t count)
{
    size_t kept = 0;
    sort_int64(list, count);
    for (size_t i = 0; i < count; i++)
        if (!kept || list[i] != list[kept - 1])
            list[kept++] = list[i];
    return kept;
}

bool sort_holds(const int64_t *list, size_t count, int64_t value)
{
    return count && bsearch(&value, list, count, sizeof *list, compare_int64) != NULL;
}
