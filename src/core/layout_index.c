#include "core/layout_index.h"
#include <math.h>
#include <stdlib.h>

static size_t cell_of(double at, double from, double cell, size_t n)
{
    const double k = floor((at - from) / cell);
    return k < 0 ? 0 : k >= (double)n ? n - 1 : (size_t)k;
}

static void extents_all(struct layout_index *index, const struct layout_extent *e, size_t count)
{
    double x1 = -INFINITY, y1 = -INFINITY;
    index->x = index->y = INFINITY;
    for (size_t i = 0; i < count; i++) {
        index->x = fmin(index->x, e[i].x0);
        index->y = fmin(index->y, e[i].y0);
        x1 = fmax(x1, e[i].x1);
        y1 = fmax(y1, e[i].y1);
    }
    const double w = x1 - index->x, h = y1 - index->y;
    index->cell = fmax(sqrt(w * h / (double)(count + 1)), fmax(w, h) / 2000);
    if (!(index->cell > 0) || !isfinite(index->cell))
        index->cell = 1;
    index->nx = count ? (size_t)(w / index->cell) + 1 : 1;
    index->ny = count ? (size_t)(h / index->cell) + 1 : 1;
}

/* Counts (list NULL) or enters each extent in the cells it touches. */
static void enter(struct layout_index *index, const struct layout_extent *e, size_t count)
{
    for (size_t i = 0; i < count; i++) {
        const size_t xa = cell_of(e[i].x0, index->x, index->cell, index->nx);
        const size_t xb = cell_of(e[i].x1, index->x, index->cell, index->nx);
        const size_t ya = cell_of(e[i].y0, index->y, index->cell, index->ny);
        const size_t yb = cell_of(e[i].y1, index->y, index->cell, index->ny);
        for (size_t y = ya; y <= yb; y++)
            for (size_t x = xa; x <= xb; x++) {
                const size_t cell = y * index->nx + x;
                if (index->list)
                    index->list[index->first[cell + 1]++] = i;
                else
                    index->first[cell + 2]++;
            }
    }
}

bool layout_index_make(struct layout_index *index, const struct layout_extent *extents,
                       size_t count)
{
    *index = (struct layout_index){0};
    extents_all(index, extents, count);
    const size_t cells = index->nx * index->ny;
    index->first = calloc(cells + 2, sizeof *index->first);
    if (!index->first)
        return false;
    enter(index, extents, count);
    for (size_t i = 2; i < cells + 2; i++)
        index->first[i] += index->first[i - 1];
    index->list = calloc(index->first[cells + 1] + 1, sizeof *index->list);
    if (!index->list) {
        layout_index_free(index);
        return false;
    }
    enter(index, extents, count);
    return true;
}

size_t layout_index_at(const struct layout_index *index, double x, double y, const size_t **list)
{
    if (!index->first)
        return 0;
    const size_t cell = cell_of(y, index->y, index->cell, index->ny) * index->nx +
                        cell_of(x, index->x, index->cell, index->nx);
    *list = index->list + index->first[cell];
    return index->first[cell + 1] - index->first[cell];
}

void layout_index_free(struct layout_index *index)
{
    free(index->first);
    free(index->list);
    *index = (struct layout_index){0};
}
