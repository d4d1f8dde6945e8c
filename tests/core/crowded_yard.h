/* Large yards for the tests and the bench: a rectangle with openings and columns that stand in a
 * grid, near a grid, or anywhere. Repeatable. */
#ifndef SLABGAP_TESTS_CORE_CROWDED_YARD_H
#define SLABGAP_TESTS_CORE_CROWDED_YARD_H

#include "core/layout.h"
#include "core/random_box.h"
#include <math.h>
#include <stdio.h>
#include <stdlib.h>

enum yard_order { YARD_GRID, YARD_NEAR_GRID, YARD_ANYWHERE };
enum { YARD_COLUMNS = 1000, YARD_OPENINGS = 32 };
struct yard {
    struct layout_corner outline[4], corners[YARD_OPENINGS][4];
    struct layout_ring openings[YARD_OPENINGS];
    struct layout_object columns[YARD_COLUMNS];
    char ids[YARD_COLUMNS][16];
    struct layout_input input;
};

static inline void yard_ring(struct layout_corner c[4], double x, double y, double w, double h)
{
    c[0] = (struct layout_corner){.x = x, .y = y};
    c[1] = (struct layout_corner){.x = x + w, .y = y};
    c[2] = (struct layout_corner){.x = x + w, .y = y + h};
    c[3] = (struct layout_corner){.x = x, .y = y + h};
}

static inline double yard_pick(uint64_t *seed, double least, double most, double step)
{
    return floor(random_between(seed, least, most) / step) * step;
}

/* 4 m from the edge, 12 m from each other. */
static inline void yard_opening(struct yard *y, uint64_t *seed)
{
    const struct layout_corner far = y->outline[2];
    const double w = yard_pick(seed, 2, 5, 0.5), h = yard_pick(seed, 2, 5, 0.5);
    for (int attempt = 0; attempt < 100; attempt++) {
        const double x = yard_pick(seed, 4, far.x - 12, 0.1),
                     v = yard_pick(seed, 4, far.y - 12, 0.1);
        size_t k = 0;
        while (k < y->input.opening_count &&
               (fabs(y->corners[k][0].x - x) >= 12 || fabs(y->corners[k][0].y - v) >= 12))
            k++;
        if (k < y->input.opening_count)
            continue;
        yard_ring(y->corners[k], x, v, w, h);
        y->openings[k] = (struct layout_ring){y->corners[k], 4};
        y->input.opening_count++;
        return;
    }
}

/* 2 m from the edge, 2.5 m from an opening, 4 m from each other. */
static inline bool yard_has_room(const struct yard *y, double x, double v)
{
    const struct layout_corner far = y->outline[2];
    bool room = x > 2 && v > 2 && x < far.x - 2 && v < far.y - 2;
    for (size_t k = 0; k < y->input.opening_count; k++) {
        const struct layout_corner *c = y->corners[k];
        room &= x < c[0].x - 2.5 || x > c[2].x + 2.5 || v < c[0].y - 2.5 || v > c[2].y + 2.5;
    }
    for (size_t k = 0; k < y->input.object_count; k++)
        room &= fabs(y->columns[k].x - x) > 4 || fabs(y->columns[k].y - v) > 4;
    return room;
}

/* free() it. */
static inline struct yard *yard_make(double w, double h, int columns, int openings,
                                     enum yard_order order, uint64_t seed)
{
    struct yard *y = calloc(1, sizeof *y);
    if (!y)
        return NULL;
    yard_ring(y->outline, 0, 0, w, h);
    y->input = (struct layout_input){.outline = {y->outline, 4},
                                     .openings = y->openings,
                                     .objects = y->columns,
                                     .max_side_x = 4.5,
                                     .max_side_y = 4.5,
                                     .max_aspect = 1.5,
                                     .min_side = 0.6,
                                     .min_angle_deg = 60,
                                     .effort = 1};
    for (int i = 0; i < openings; i++)
        yard_opening(y, &seed);
    const int nx = (int)ceil(sqrt(columns * w / h)), ny = (columns + nx - 1) / nx;
    for (int i = 0; i < columns; i++) {
        double x = 0, v = 0;
        for (int attempt = 0; attempt < (order == YARD_ANYWHERE ? 100 : 1); attempt++) {
            const double off = order == YARD_NEAR_GRID ? 0.5 : 0;
            x = w * (1 + i % nx) / (nx + 1) + random_between(&seed, -off, off);
            v = h * (1 + i / nx) / (ny + 1) + random_between(&seed, -off, off);
            if (order == YARD_ANYWHERE) {
                x = random_between(&seed, 2, w - 2);
                v = random_between(&seed, 2, h - 2);
            }
            if (yard_has_room(y, x, v))
                break;
        }
        if (!yard_has_room(y, x, v))
            continue;
        const size_t n = y->input.object_count++;
        snprintf(y->ids[n], sizeof y->ids[n], "C%d", i + 1);
        y->columns[n] = (struct layout_object){.id = y->ids[n],
                                               .kind = "column",
                                               .isolate = true,
                                               .x = floor(x * 100) / 100,
                                               .y = floor(v * 100) / 100,
                                               .w = 0.4,
                                               .d = 0.4};
    }
    return y;
}

#endif
