#include "job/ring.h"
#include "base/array.h"
#include <math.h>
#include <stdlib.h>
#include <string.h>

#define TWO_PI 6.283185307179586
#define FIVE_DEGREES (TWO_PI / 72)
#define UNITS_PER_METRE 80000.0

int64_t ring_units(double metres)
{
    return llround(metres * UNITS_PER_METRE);
}

struct ring_point ring_point_at(double x, double y)
{
    return (struct ring_point){ring_units(x), ring_units(y)};
}

static bool same_point(struct ring_point a, struct ring_point b)
{
    return a.x == b.x && a.y == b.y;
}

static bool rows_meet(const struct row *a, const struct row *b)
{
    return same_point(ring_point_at(a->x, a->y), ring_point_at(b->x, b->y));
}

size_t ring_corner_count(const struct rows *rows)
{
    if (rows->count >= 2 && rows->items[rows->count - 1].arc &&
        rows_meet(&rows->items[rows->count - 1], &rows->items[0]))
        return rows->count - 1;
    return rows->count;
}

const struct row *ring_side_begin(const struct rows *rows, size_t side)
{
    return &rows->items[side - 1];
}

const struct row *ring_side_end(const struct rows *rows, size_t side)
{
    /* the row behind the last corner is the closing arc's, else the first */
    return side < rows->count ? &rows->items[side] : &rows->items[0];
}

double ring_arc_turn(const struct row *from, const struct row *to)
{
    double begin = atan2(from->y - to->cy, from->x - to->cx);
    double end = atan2(to->y - to->cy, to->x - to->cx);
    double turn = to->left ? end - begin : begin - end;

    if (turn <= 0)
        turn += TWO_PI;
    return turn;
}

double ring_side_length(const struct rows *rows, size_t side)
{
    const struct row *from = ring_side_begin(rows, side), *to = ring_side_end(rows, side);

    if (to->arc)
        return hypot(to->x - to->cx, to->y - to->cy) * ring_arc_turn(from, to);
    return hypot(to->x - from->x, to->y - from->y);
}

static bool add_chord(struct ring *ring, struct ring_point a, struct ring_point b, int side)
{
    if (same_point(a, b))
        return true;
    if (!array_reserve((void **)&ring->chords, &ring->capacity, ring->count + 1,
                       sizeof *ring->chords))
        return false;
    ring->chords[ring->count++] = (struct ring_chord){a, b, side};
    return true;
}

static bool add_arc(struct ring *ring, const struct row *from, const struct row *to, int side)
{
    double turn = ring_arc_turn(from, to), radius = hypot(from->x - to->cx, from->y - to->cy);
    double begin = atan2(from->y - to->cy, from->x - to->cx);
    int steps = (int)ceil(turn / FIVE_DEGREES);
    struct ring_point last = ring_point_at(from->x, from->y);

    for (int i = 1; i < steps; i++) {
        double angle = begin + (to->left ? turn : -turn) * i / steps;
        struct ring_point next =
            ring_point_at(to->cx + radius * cos(angle), to->cy + radius * sin(angle));
        if (!add_chord(ring, last, next, side))
            return false;
        last = next;
    }
    return add_chord(ring, last, ring_point_at(to->x, to->y), side);
}

enum status ring_make(const struct rows *rows, struct ring *ring)
{
    struct ring made = {.sides = ring_corner_count(rows)};

    for (size_t side = 1; side <= made.sides; side++) {
        const struct row *from = ring_side_begin(rows, side), *to = ring_side_end(rows, side);
        bool good = to->arc ? add_arc(&made, from, to, (int)side)
                            : add_chord(&made, ring_point_at(from->x, from->y),
                                        ring_point_at(to->x, to->y), (int)side);
        if (!good) {
            ring_free(&made);
            return STATUS_NO_MEMORY;
        }
    }
    *ring = made;
    return STATUS_OK;
}

void ring_free(struct ring *ring)
{
    free(ring->chords);
    *ring = (struct ring){0};
}

/* Sign of the turn a -> b -> c; exact. */
static int turn_of(struct ring_point a, struct ring_point b, struct ring_point c)
{
    int64_t left = (b.x - a.x) * (c.y - a.y), right = (b.y - a.y) * (c.x - a.x);

    return left > right ? 1 : left < right ? -1 : 0;
}

static bool between(int64_t a, int64_t b, int64_t value)
{
    return a <= b ? a <= value && value <= b : b <= value && value <= a;
}

static bool on_chord(const struct ring_chord *chord, struct ring_point p)
{
    return turn_of(chord->a, chord->b, p) == 0 && between(chord->a.x, chord->b.x, p.x) &&
           between(chord->a.y, chord->b.y, p.y);
}

int ring_place(const struct ring *ring, struct ring_point point)
{
    bool inside = false;

    for (size_t i = 0; i < ring->count; i++) {
        const struct ring_chord *chord = &ring->chords[i];
        if (on_chord(chord, point))
            return 0;
        if ((chord->a.y > point.y) != (chord->b.y > point.y)) {
            int turn = turn_of(chord->a, chord->b, point);
            if ((chord->b.y > chord->a.y) == (turn > 0))
                inside = !inside;
        }
    }
    return inside ? 1 : -1;
}

/* Whether two closed chords have a point in common. */
static bool chords_meet(const struct ring_chord *p, const struct ring_chord *q)
{
    int a, b, c, d;

    if (!(between(p->a.x, p->b.x, q->a.x) || between(p->a.x, p->b.x, q->b.x) ||
          between(q->a.x, q->b.x, p->a.x)) ||
        !(between(p->a.y, p->b.y, q->a.y) || between(p->a.y, p->b.y, q->b.y) ||
          between(q->a.y, q->b.y, p->a.y)))
        return false;
    a = turn_of(p->a, p->b, q->a);
    b = turn_of(p->a, p->b, q->b);
    c = turn_of(q->a, q->b, p->a);
    d = turn_of(q->a, q->b, p->b);
    if (a != b && c != d && a * b <= 0 && c * d <= 0)
        return true;
    return on_chord(p, q->a) || on_chord(p, q->b) || on_chord(q, p->a) || on_chord(q, p->b);
}

/* Neighbours share one end; they are wrong only when one folds back onto the other. */
static bool neighbours_fold(const struct ring_chord *p, const struct ring_chord *next)
{
    return turn_of(p->a, p->b, next->b) == 0 && (on_chord(p, next->b) || on_chord(next, p->a));
}

static int64_t chord_left(const struct ring_chord *chord)
{
    return chord->a.x < chord->b.x ? chord->a.x : chord->b.x;
}

struct order {
    int64_t left;
    size_t index;
};

static int by_left(const void *a, const void *b)
{
    const struct order *p = a, *q = b;

    if (p->left != q->left)
        return p->left < q->left ? -1 : 1;
    return p->index < q->index ? -1 : p->index > q->index;
}

static bool pair_is_wrong(const struct ring *ring, size_t i, size_t j)
{
    const struct ring_chord *p = &ring->chords[i], *q = &ring->chords[j];

    if (ring->count > 2 && (i + 1) % ring->count == j)
        return neighbours_fold(p, q);
    if (ring->count > 2 && (j + 1) % ring->count == i)
        return neighbours_fold(q, p);
    return chords_meet(p, q);
}

/* Chords in the order of their left ends; each is compared only with those that begin before it
 * ends. */
bool ring_crosses_itself(const struct ring *ring, int *first, int *second)
{
    struct order *order = calloc(ring->count + 1, sizeof *order);
    bool found = false;

    if (order == NULL)
        return false;
    for (size_t i = 0; i < ring->count; i++)
        order[i] = (struct order){chord_left(&ring->chords[i]), i};
    qsort(order, ring->count, sizeof *order, by_left);
    for (size_t i = 0; i < ring->count && !found; i++) {
        const struct ring_chord *p = &ring->chords[order[i].index];
        int64_t right = p->a.x > p->b.x ? p->a.x : p->b.x;
        for (size_t j = i + 1; j < ring->count && order[j].left <= right && !found; j++)
            if (pair_is_wrong(ring, order[i].index, order[j].index)) {
                int a = p->side, b = ring->chords[order[j].index].side;
                *first = a < b ? a : b;
                *second = a < b ? b : a;
                found = true;
            }
    }
    free(order);
    return found;
}

bool rings_touch(const struct ring *one, const struct ring *two)
{
    for (size_t i = 0; i < one->count; i++)
        for (size_t j = 0; j < two->count; j++)
            if (chords_meet(&one->chords[i], &two->chords[j]))
                return true;
    return false;
}

double ring_distance(const struct ring *ring, double x, double y)
{
    double best = INFINITY;

    for (size_t i = 0; i < ring->count; i++) {
        double ax = (double)ring->chords[i].a.x / UNITS_PER_METRE;
        double ay = (double)ring->chords[i].a.y / UNITS_PER_METRE;
        double dx = (double)ring->chords[i].b.x / UNITS_PER_METRE - ax;
        double dy = (double)ring->chords[i].b.y / UNITS_PER_METRE - ay;
        double t = ((x - ax) * dx + (y - ay) * dy) / (dx * dx + dy * dy);
        t = fmax(0, fmin(1, t));
        best = fmin(best, hypot(x - ax - t * dx, y - ay - t * dy));
    }
    return best;
}
