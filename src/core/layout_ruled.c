/* The ruled block (design 4): two chains of sides with a common parameter. Joints across join equal
 * parameters, rows are equal shares between the chains; the places of the cross joints come from a
 * dynamic program over the true measures of the panels. */
#include "core/layout_shape.h"
#include <math.h>
#include <stdlib.h>
#include <string.h>

enum { MOST_KNOTS = 400, MOST_PLACES = 1200 };
struct knot {
    double t; /* mean length along the two chains, m */
    struct layout_point a, b;
    bool corner; /* the sides turn here: a cross joint must stand here */
};
struct strip {
    struct trials *trials;
    struct knot knot[MOST_KNOTS];
    size_t count;
    int rows;
    bool closed; /* a ring: the end is the beginning */
    double place[MOST_PLACES];
    size_t place_count;
    bool must[MOST_PLACES];
};

static struct layout_point between(struct layout_point a, struct layout_point b, double f)
{
    return (struct layout_point){a.x + f * (b.x - a.x), a.y + f * (b.y - a.y)};
}

static double far(struct layout_point a, struct layout_point b)
{
    return hypot(b.x - a.x, b.y - a.y);
}

static void at_t(const struct strip *s, double t, struct layout_point *a, struct layout_point *b)
{
    size_t i = 1;
    while (i + 1 < s->count && s->knot[i].t < t)
        i++;
    const struct knot *p = &s->knot[i - 1], *q = &s->knot[i];
    const double f = q->t > p->t ? (t - p->t) / (q->t - p->t) : 0;
    *a = between(p->a, q->a, f < 0 ? 0 : f > 1 ? 1 : f);
    *b = between(p->b, q->b, f < 0 ? 0 : f > 1 ? 1 : f);
}

/* Longer side, shorter side of the smallest rectangle, and what is wrong with a panel. */
static double panel_fault(const struct layout_input *in, const struct layout_point *p, size_t n)
{
    double best = INFINITY, length = 0, width = 0, least = INFINITY, fault = 0;
    for (size_t i = 0; i < n; i++) {
        const double l = far(p[i], p[(i + 1) % n]);
        if (l < 1e-9)
            continue;
        const double ux = (p[(i + 1) % n].x - p[i].x) / l, uy = (p[(i + 1) % n].y - p[i].y) / l;
        double s0 = INFINITY, s1 = -INFINITY, t0 = INFINITY, t1 = -INFINITY;
        for (size_t k = 0; k < n; k++) {
            s0 = fmin(s0, p[k].x * ux + p[k].y * uy);
            s1 = fmax(s1, p[k].x * ux + p[k].y * uy);
            t0 = fmin(t0, p[k].y * ux - p[k].x * uy);
            t1 = fmax(t1, p[k].y * ux - p[k].x * uy);
        }
        least = fmin(least, t1 - t0);
        if ((s1 - s0) * (t1 - t0) < best) {
            best = (s1 - s0) * (t1 - t0);
            length = fmax(s1 - s0, t1 - t0);
            width = fmin(s1 - s0, t1 - t0);
        }
    }
    const double limit = fmin(in->max_side_x, in->max_side_y);
    if (!(width > 1e-6))
        return 1e6;
    if (length > limit * 1.001)
        fault += 1e3 + 60 * limit * (length / limit - 1);
    if (length / width > in->max_aspect * 1.001)
        fault += 1e3 + 8 * limit * (length / width - in->max_aspect);
    if (least < in->min_side * 0.999)
        fault += 1e3 + 25 * limit * (1 - least / in->min_side);
    return fault + 0.02 * (length / width - 1) * (length / width - 1);
}

/* The angles at the four corners of the panel: those at the strip's own ends are given. */
static double angle_fault(const struct layout_input *in, const struct layout_point q[4], bool first,
                          bool last, bool given)
{
    double fault = 0;
    for (int i = 0; i < 4; i++) {
        const struct layout_point a = q[(i + 3) % 4], b = q[i], c = q[(i + 1) % 4];
        if (given && ((first && (i == 0 || i == 3)) || (last && (i == 1 || i == 2))))
            continue;
        const double turn = atan2((b.x - a.x) * (c.y - b.y) - (b.y - a.y) * (c.x - b.x),
                                  (b.x - a.x) * (c.x - b.x) + (b.y - a.y) * (c.y - b.y));
        const double angle = 180 - fabs(turn) * 180 / 3.14159265358979323846;
        if (angle < in->min_angle_deg - 0.4)
            fault += 1e3 + in->min_angle_deg - angle;
    }
    return fault;
}

/* Rows of panels between the cross joints at from and to. */
static double cost_between(const struct strip *s, double from, double to, bool first, bool last)
{
    struct layout_point a0, b0, a1, b1, ring[MOST_KNOTS + 8];
    double cost = 0;
    at_t(s, from, &a0, &b0);
    at_t(s, to, &a1, &b1);
    s->trials->w->slab.evaluations += 4;
    for (int j = 0; j < s->rows; j++) {
        const double f = (double)j / s->rows, g = (double)(j + 1) / s->rows;
        const struct layout_point quad[4] = {between(a0, b0, f), between(a1, b1, f),
                                             between(a1, b1, g), between(a0, b0, g)};
        size_t n = 0;
        ring[n++] = quad[0];
        for (size_t k = 0; j == 0 && k < s->count; k++)
            if (s->knot[k].t > from + 1e-6 && s->knot[k].t < to - 1e-6)
                ring[n++] = s->knot[k].a;
        ring[n++] = quad[1];
        ring[n++] = quad[2];
        for (size_t k = s->count; j == s->rows - 1 && k-- > 0;)
            if (s->knot[k].t > from + 1e-6 && s->knot[k].t < to - 1e-6)
                ring[n++] = s->knot[k].b;
        ring[n++] = quad[3];
        cost += panel_fault(s->trials->w->input, ring, n) +
                angle_fault(s->trials->w->input, quad, first, last, !s->closed) +
                (j ? far(quad[0], quad[1]) : 0);
    }
    return cost + (last ? 0 : far(a1, b1));
}

static int compare_double(const void *a, const void *b)
{
    const double p = *(const double *)a, q = *(const double *)b;
    return (p > q) - (p < q);
}

/* Equal divisions between corners, a raster of a quarter metre, and the corners themselves. */
static void find_places(struct strip *s)
{
    const struct layout_input *in = s->trials->w->input;
    const double limit = fmin(in->max_side_x, in->max_side_y), end = s->knot[s->count - 1].t;
    size_t n = 0, from = 0;
    s->place[n++] = 0;
    for (size_t k = 1; k < s->count; k++) {
        if (!s->knot[k].corner && k + 1 < s->count)
            continue;
        const double a = s->knot[from].t, b = s->knot[k].t;
        const int least = (int)ceil((b - a) / limit - 1e-6);
        for (int d = least < 2 ? 2 : least; d <= least + 4; d++)
            for (int i = 1; i < d && n + 2 < MOST_PLACES; i++)
                s->place[n++] = a + (b - a) * i / d;
        if (n + 2 < MOST_PLACES)
            s->place[n++] = b;
        from = k;
    }
    const double step = fmax(0.25, end / 400);
    for (double t = step; t < end - step / 2 && n + 1 < MOST_PLACES; t += step)
        s->place[n++] = t;
    qsort(s->place, n, sizeof *s->place, compare_double);
    s->place_count = 0;
    for (size_t i = 0; i < n; i++)
        if (!s->place_count || s->place[i] > s->place[s->place_count - 1] + 1e-3)
            s->place[s->place_count++] = s->place[i];
    s->place[s->place_count - 1] = end;
    for (size_t i = 0; i < s->place_count; i++) {
        s->must[i] = false;
        for (size_t k = 1; k + 1 < s->count; k++)
            s->must[i] |= s->knot[k].corner && fabs(s->knot[k].t - s->place[i]) < 2e-3;
    }
}

/* best[q] = least over p of best[p] + cost(p, q); a corner is never jumped. */
static double best_places(const struct strip *s, size_t *from)
{
    const struct layout_input *in = s->trials->w->input;
    const double reach = 1.3 * fmin(in->max_side_x, in->max_side_y);
    double best[MOST_PLACES] = {0};
    for (size_t q = 1; q < s->place_count; q++) {
        best[q] = INFINITY;
        for (size_t p = q; p-- > 0;) {
            if (isfinite(best[p]) && best[p] < best[q]) {
                const double cost = best[p] + cost_between(s, s->place[p], s->place[q], p == 0,
                                                           q + 1 == s->place_count);
                if (cost < best[q] - 1e-9) {
                    best[q] = cost;
                    from[q] = p;
                }
            }
            if (s->must[p] || (s->place[q] - s->place[p] > reach && isfinite(best[q])))
                break;
        }
    }
    return best[s->place_count - 1];
}

static bool add_across(struct plane *plane, int line, struct layout_point a, struct layout_point b)
{
    return plane_add(plane, (struct plane_line){.at = {a.x, a.y, b.x, b.y}, .line = line});
}

static enum status emit_strip(const struct strip *s, const size_t *from)
{
    struct plane plane = {0};
    bool fine = true;
    int line = 0;
    double last_t = s->knot[s->count - 1].t;
    for (size_t q = s->place_count - 1; fine && q > 0; q = from[q]) {
        struct layout_point a0, b0, a1, b1;
        const double t = s->place[from[q]];
        at_t(s, t, &a0, &b0);
        at_t(s, last_t, &a1, &b1);
        for (int j = 1; fine && j < s->rows; j++) {
            const double f = (double)j / s->rows;
            fine = add_across(&plane, j, between(a0, b0, f), between(a1, b1, f));
        }
        line++;
        if (from[q] > 0 || s->closed)
            fine = fine && add_across(&plane, s->rows + line, a0, b0);
        last_t = t;
    }
    const enum status status = fine ? trials_run(s->trials, &plane) : STATUS_NO_MEMORY;
    plane_free(&plane);
    return status;
}

struct chain {
    struct layout_point at[MOST_KNOTS];
    double length[MOST_KNOTS]; /* from the beginning */
    size_t count;
};

static void chain_make(struct chain *c, const struct layout *out, size_t from, size_t to, bool back)
{
    c->count = 0;
    for (size_t i = from; c->count < MOST_KNOTS; i = (i + 1) % out->outline_count) {
        c->at[c->count++] = out->outline[i];
        if (i == to)
            break;
    }
    for (size_t i = 0; back && i < c->count / 2; i++) {
        const struct layout_point p = c->at[i];
        c->at[i] = c->at[c->count - 1 - i];
        c->at[c->count - 1 - i] = p;
    }
    c->length[0] = 0;
    for (size_t i = 1; i < c->count; i++)
        c->length[i] = c->length[i - 1] + far(c->at[i - 1], c->at[i]);
}

static struct layout_point chain_at(const struct chain *c, double share)
{
    const double want = share * c->length[c->count - 1];
    size_t i = 1;
    while (i + 1 < c->count && c->length[i] < want)
        i++;
    const double l = c->length[i] - c->length[i - 1];
    return between(c->at[i - 1], c->at[i], l > 0 ? (want - c->length[i - 1]) / l : 0);
}

static double turn_at(const struct chain *c, size_t i)
{
    if (i == 0 || i + 1 >= c->count)
        return 0;
    const struct layout_point a = c->at[i - 1], b = c->at[i], d = c->at[i + 1];
    return fabs(atan2((b.x - a.x) * (d.y - b.y) - (b.y - a.y) * (d.x - b.x),
                      (b.x - a.x) * (d.x - b.x) + (b.y - a.y) * (d.y - b.y))) *
           180 / 3.14159265358979323846;
}

/* The share along the other, straight chain of the foot of the square from p. */
static double foot(const struct chain *line, struct layout_point p)
{
    const struct layout_point a = line->at[0], b = line->at[line->count - 1];
    const double l = far(a, b);
    const double t = ((p.x - a.x) * (b.x - a.x) + (p.y - a.y) * (b.y - a.y)) / l / l;
    return t < 0 ? 0 : t > 1 ? 1 : t;
}

static void add_knot(struct strip *s, struct layout_point a, struct layout_point b, double turn)
{
    struct knot k = {0, a, b, turn > 7.6};
    if (s->count) {
        const struct knot *last = &s->knot[s->count - 1];
        k.t = last->t + (far(last->a, a) + far(last->b, b)) / 2;
        if (k.t < last->t + 1e-6)
            return;
    }
    if (s->count < MOST_KNOTS)
        s->knot[s->count++] = k;
}

struct share {
    double at, turn;
};

static int compare_share(const void *a, const void *b)
{
    const struct share *p = a, *q = b;
    return (p->at > q->at) - (p->at < q->at);
}

/* Chains of as many corners are joined corner by corner; a straight one by squares from the other;
 * else by equal shares of their lengths. */
static void match_chains(struct strip *s, const struct chain *a, const struct chain *b, int way)
{
    s->count = 0;
    if (way == 0 && a->count == b->count) {
        for (size_t i = 0; i < a->count; i++)
            add_knot(s, a->at[i], b->at[i], fmax(turn_at(a, i), turn_at(b, i)));
        return;
    }
    if (way == 1 && (a->count == 2 || b->count == 2)) {
        const struct chain *line = a->count == 2 ? a : b, *other = a->count == 2 ? b : a;
        for (size_t i = 0; i < other->count; i++) {
            const double f = i == 0 ? 0 : i + 1 == other->count ? 1 : foot(line, other->at[i]);
            const struct layout_point p = chain_at(line, f);
            add_knot(s, a == line ? p : other->at[i], a == line ? other->at[i] : p,
                     turn_at(other, i));
        }
        return;
    }
    if (way != 2)
        return;
    struct share list[2 * MOST_KNOTS];
    size_t n = 0;
    for (size_t i = 0; i < a->count; i++)
        list[n++] = (struct share){a->length[i] / a->length[a->count - 1], turn_at(a, i)};
    for (size_t i = 0; i < b->count; i++)
        list[n++] = (struct share){b->length[i] / b->length[b->count - 1], turn_at(b, i)};
    qsort(list, n, sizeof *list, compare_share);
    for (size_t i = 0; i < n; i++)
        if (!i || list[i].at > list[i - 1].at + 1e-9)
            add_knot(s, chain_at(a, list[i].at), chain_at(b, list[i].at), list[i].turn);
}

static bool is_cap(const struct layout *out, size_t i)
{
    const size_t n = out->outline_count;
    struct chain c = {.count = 4};
    for (size_t k = 0; k < 4; k++)
        c.at[k] = out->outline[(i + n - 1 + k) % n];
    return turn_at(&c, 1) > 15.1 && turn_at(&c, 2) > 15.1;
}

static double widest(const struct strip *s)
{
    double wide = 0;
    for (size_t i = 0; i < s->count; i++)
        wide = fmax(wide, far(s->knot[i].a, s->knot[i].b));
    return wide;
}

static enum status try_strip(struct strip *s)
{
    const struct layout_input *in = s->trials->w->input;
    const double limit = fmin(in->max_side_x, in->max_side_y);
    const int least = (int)ceil(widest(s) / limit - 1e-3);
    size_t *from = calloc(MOST_PLACES, sizeof *from);
    enum status status = from ? STATUS_OK : STATUS_NO_MEMORY;
    double best = INFINITY;
    find_places(s);
    for (int rows = least < 1 ? 1 : least; !status && rows <= least + 2; rows++) {
        if (!trials_go_on(s->trials))
            break;
        s->rows = rows;
        const double cost = best_places(s, from);
        if (cost >= best)
            break;
        best = cost;
        status = emit_strip(s, from);
        if (cost < 1e3)
            break;
    }
    free(from);
    return status;
}

/* Nothing stands on the slab or crosses it that a strip would have to heed. */
static bool is_free(const struct work *w)
{
    const struct layout_input *in = w->input;
    for (size_t i = 0; i < in->drawn_count; i++)
        if (in->drawn[i].keep)
            return false;
    for (size_t i = 0; i < in->edge_count; i++)
        if (in->edges[i].kind == LAYOUT_EDGE_EXISTING && !in->edges[i].isolate &&
            in->edges[i].joint_count)
            return false;
    return !in->object_count && !in->has_pours && in->expansion_every <= 0 &&
           w->out->outline_count < MOST_KNOTS;
}

/* A closed chain from the point nearest to `start`, anticlockwise. */
static void ring_make(struct chain *c, const struct layout_point *ring, size_t n,
                      struct layout_point start)
{
    double area = 0, least = INFINITY;
    size_t from = 0;
    for (size_t i = 0; i < n; i++) {
        area += ring[i].x * ring[(i + 1) % n].y - ring[(i + 1) % n].x * ring[i].y;
        if (far(ring[i], start) < least - 1e-9) {
            least = far(ring[i], start);
            from = i;
        }
    }
    c->count = 0;
    for (size_t i = 0; i <= n; i++) {
        const size_t k = i % n;
        c->at[c->count++] = ring[area < 0 ? (from + n - k) % n : (from + k) % n];
    }
    c->length[0] = 0;
    for (size_t i = 1; i < c->count; i++)
        c->length[i] = c->length[i - 1] + far(c->at[i - 1], c->at[i]);
}

/* Round one opening: circles of joints and radii, if neither ring has sharp corners. */
static enum status ring_solve(struct trials *t, struct strip *s, struct chain *a, struct chain *b)
{
    const struct layout *out = t->w->out;
    if (out->openings[0].count + 2 > MOST_KNOTS || out->outline_count + 2 > MOST_KNOTS)
        return STATUS_OK;
    ring_make(a, out->outline, out->outline_count, out->outline[0]);
    ring_make(b, out->openings[0].points, out->openings[0].count, out->outline[0]);
    s->trials = t;
    s->closed = true;
    match_chains(s, a, b, a->count == b->count ? 0 : 2);
    for (size_t i = 0; i < s->count; i++)
        if (s->knot[i].corner)
            return STATUS_OK;
    return s->count > 2 ? try_strip(s) : STATUS_OK;
}

struct pair { /* two ends of a strip and how the chains between them are matched */
    size_t first, second;
    int way;
    double wide;
};

static int compare_pair(const void *a, const void *b)
{
    const struct pair *p = a, *q = b;
    if (p->wide < q->wide - 1e-9 || p->wide > q->wide + 1e-9)
        return p->wide < q->wide ? -1 : 1;
    if (p->first != q->first)
        return p->first < q->first ? -1 : 1;
    if (p->second != q->second)
        return p->second < q->second ? -1 : 1;
    return p->way - q->way;
}

static void match_pair(struct trials *t, struct strip *s, struct chain *a, struct chain *b,
                       const struct pair *p)
{
    const struct layout *out = t->w->out;
    const size_t n = out->outline_count;
    s->trials = t;
    chain_make(a, out, (p->first + 1) % n, p->second, false);
    chain_make(b, out, (p->second + 1) % n, p->first, true);
    match_chains(s, a, b, p->way);
}

/* All pairs of ends, the narrowest strip first: it is the one that runs along the slab. */
static size_t find_pairs(struct trials *t, struct strip *s, struct chain *a, struct chain *b,
                         struct pair *pairs)
{
    const struct layout *out = t->w->out;
    const size_t n = out->outline_count;
    size_t count = 0;
    for (size_t i = 0; i < n; i++)
        for (size_t k = i + 2; k < n; k++)
            for (int way = 0; way < 3; way++) {
                if (!is_cap(out, i) || !is_cap(out, k) || (i == 0 && k == n - 1))
                    break;
                pairs[count] = (struct pair){i, k, way, 0};
                match_pair(t, s, a, b, &pairs[count]);
                pairs[count].wide = widest(s);
                count += s->count >= 2 && s->knot[s->count - 1].t > 0.5 * pairs[count].wide;
            }
    qsort(pairs, count, sizeof *pairs, compare_pair);
    return count;
}

enum status shape_ruled(struct trials *t)
{
    const struct layout *out = t->w->out;
    const size_t n = out->outline_count;
    if (!is_free(t->w) || out->opening_count > 1)
        return STATUS_OK;
    struct strip *s = calloc(1, sizeof *s);
    struct chain *a = calloc(1, sizeof *a), *b = calloc(1, sizeof *b);
    enum status status = s && a && b ? STATUS_OK : STATUS_NO_MEMORY;
    if (!status && out->opening_count)
        status = ring_solve(t, s, a, b);
    struct pair *pairs = calloc(3 * n * n + 1, sizeof *pairs);
    size_t count = 0;
    if (!pairs)
        status = STATUS_NO_MEMORY;
    else if (!status && !out->opening_count)
        count = find_pairs(t, s, a, b, pairs);
    for (size_t i = 0; !status && i < count && trials_go_on(t); i++) {
        if (t->any && !t->best.violations)
            break;
        match_pair(t, s, a, b, &pairs[i]);
        status = try_strip(s);
    }
    free(pairs);
    free(s);
    free(a);
    free(b);
    return status;
}
