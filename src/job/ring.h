/* A ring of corners as exact integer chords, for the checks of the job. Private to src/job.
 * Units of 1/80 mm: 80 = 1 mm, 127 = 1/16 in; within 10 km cross products fit 64 bits. */
#ifndef SLABGAP_JOB_RING_H
#define SLABGAP_JOB_RING_H

#include "job/job.h"
#include <stdint.h>

struct ring_point {
    int64_t x, y;
};
struct ring_chord {
    struct ring_point a, b;
    int side; /* from 1: the side it belongs to */
};
struct ring {
    struct ring_chord *chords;
    size_t count, capacity;
    size_t sides; /* corners: rows without a closing arc's */
};

int64_t ring_units(double metres);
struct ring_point ring_point_at(double x, double y);
/* Corners of the rows: one less when the last row is an arc that ends at the first point. */
size_t ring_corner_count(const struct rows *rows);
/* The row where side `side` (from 1) ends, and the one where it begins. */
const struct row *ring_side_end(const struct rows *rows, size_t side);
const struct row *ring_side_begin(const struct rows *rows, size_t side);
/* Length of a side, along the arc where it is one; m. */
double ring_side_length(const struct rows *rows, size_t side);
/* Turn of an arc in radians, 0 to 2 pi, from its begin to its end. */
double ring_arc_turn(const struct row *from, const struct row *to);
/* The ring as chords, arcs cut so that no vertex turns more than 5 degrees. */
enum status ring_make(const struct rows *rows, struct ring *ring);
void ring_free(struct ring *ring);
/* -1 outside, 0 on the edge, 1 inside. */
int ring_place(const struct ring *ring, struct ring_point point);
/* Two sides of the ring that cross or touch where they should not; false when there are none. */
bool ring_crosses_itself(const struct ring *ring, int *first, int *second);
/* Whether two rings have a point of their edges in common. */
bool rings_touch(const struct ring *one, const struct ring *two);
/* Distance of a point from the ring's edge, m. */
double ring_distance(const struct ring *ring, double x, double y);

#endif
