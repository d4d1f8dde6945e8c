/* The ruled block (design 4): two chains of sides with a common parameter. Joints across join equal
 * parameters, rows are equal shares between the chains; the places of the cross joints come from a
 * dynamic program over the true measures of the panels. */
#include "core/layout_shape.h"
#include <math.h>
#include <stdlib.h>
#include <string.h>

enum { MOST_KNOTS = 400, MOST_PLACES = 1200, MOST_FIXED = 64 };
struct knot {
    double t; /* mean length along the two chains, m */
    struct layout_point a, b;
    bool corner; /* the sides turn here: a cross joint must stand here */
};
struct fixed { /* an object on a row, or a pour line that is one */
    double t, f;
    int object; /* -1: a line */
    struct layout_segment line;
    int row;
};
struct strip {
    struct trials *trials;
    struct fixed fixed[MOST_FIXED];
    size_t fixed_count;
    double expansion; /* between expansion joints, 0 = none */
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

/* The share of the way from a to b where the line crosses. */
static double share_of_line(const struct layout_segment *l, struct layout_point a,
                            struct layout_point b)
{
    const double dx = l->x2 - l->x1, dy = l->y2 - l->y1;
    const double p = (a.x - l->x1) * dy - (a.y - l->y1) * dx;
    const double q = (b.x - l->x1) * dy - (b.y - l->y1) * dx;
    return p < q || p > q ? p / (p - q) : 0.5;
}

/* The share at t of a row that a line or objects hold: straight between the objects. */
static bool held_share(const struct strip *s, int row, double t, double *share)
{
    const struct fixed *before = NULL, *after = NULL;
    for (size_t i = 0; i < s->fixed_count; i++) {
        const struct fixed *f = &s->fixed[i];
        if (f->row != row)
            continue;
        if (f->object < 0) {
            struct layout_point a, b;
            at_t(s, t, &a, &b);
            *share = share_of_line(&f->line, a, b);
            return true;
        }
        if (f->t <= t && (!before || f->t > before->t))
            before = f;
        if (f->t >= t && (!after || f->t < after->t))
            after = f;
    }
    if (!before && !after)
        return false;
    *share = !before ? after->f : before->f;
    if (before && after && after->t > before->t + 1e-9)
        *share += (after->f - before->f) * (t - before->t) / (after->t - before->t);
    return true;
}

/* Where row line `row` stands at t: between the nearest held rows in equal parts. */
static double share_of(const struct strip *s, int row, double t)
{
    int low = row, high = row;
    double a = 0, b = 1;
    while (low > 0 && !held_share(s, low, t, &a))
        low--;
    while (high < s->rows && !held_share(s, high, t, &b))
        high++;
    a = low == 0 ? 0 : a;
    b = high == s->rows ? 1 : b;
    return low == high ? a : a + (b - a) * (row - low) / (high - low);
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
        const struct layout_point quad[4] = {
            between(a0, b0, share_of(s, j, from)), between(a1, b1, share_of(s, j, to)),
            between(a1, b1, share_of(s, j + 1, to)), between(a0, b0, share_of(s, j + 1, from))};
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

static bool is_expansion(const struct strip *s, double t)
{
    const double end = s->knot[s->count - 1].t;
    const int joints = s->expansion > 0 ? (int)ceil(end / s->expansion - 1e-6) : 0;
    for (int i = 1; i < joints; i++)
        if (fabs(end * i / joints - t) < 2e-3)
            return true;
    return false;
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
    for (size_t i = 0; i < s->fixed_count; i++)
        if (s->fixed[i].object >= 0 && n + 2 < MOST_PLACES)
            s->place[n++] = s->fixed[i].t;
    const int joints = s->expansion > 0 ? (int)ceil(end / s->expansion - 1e-6) : 0;
    for (int i = 1; i < joints && n + 2 < MOST_PLACES; i++)
        s->place[n++] = end * i / joints;
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
        for (size_t k = 0; k < s->fixed_count; k++)
            s->must[i] |= s->fixed[k].object >= 0 && fabs(s->fixed[k].t - s->place[i]) < 2e-3;
        s->must[i] |= is_expansion(s, s->place[i]);
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

static bool add_across(struct plane *plane, struct plane_line line, struct layout_point a,
                       struct layout_point b)
{
    line.at = (struct layout_segment){a.x, a.y, b.x, b.y};
    return plane_add(plane, line);
}

static bool is_pour_row(const struct strip *s, int row)
{
    for (size_t i = 0; i < s->fixed_count; i++)
        if (s->fixed[i].row == row && s->fixed[i].object < 0)
            return true;
    return false;
}

static struct layout_point row_point(const struct strip *s, int row, double t)
{
    struct layout_point a, b;
    at_t(s, t, &a, &b);
    return between(a, b, share_of(s, row, t));
}

static struct layout_point towards(struct layout_point from, struct layout_point to, double length)
{
    const double l = far(from, to);
    return between(from, to, l > 0 ? length / l : 0);
}

/* The tips of a box lie on the four joints that meet at its middle. */
static bool add_boxes(const struct strip *s, struct plane *plane, const double *at, size_t count)
{
    plane->boxes = calloc(s->fixed_count + 1, sizeof *plane->boxes);
    for (size_t i = 0; plane->boxes && i < s->fixed_count; i++) {
        const struct fixed *f = &s->fixed[i];
        size_t k = 1;
        if (f->object < 0)
            continue;
        while (k + 1 < count && fabs(at[k] - f->t) > 2e-3)
            k++;
        if (k + 1 >= count)
            continue;
        const struct layout_object *o = &s->trials->w->input->objects[f->object];
        struct layout_point a, b;
        at_t(s, at[k], &a, &b);
        const struct layout_point c = row_point(s, f->row, at[k]),
                                  next = row_point(s, f->row, at[k + 1]),
                                  last = row_point(s, f->row, at[k - 1]);
        const double square = fabs((next.x - c.x) * (b.y - a.y) - (next.y - c.y) * (b.x - a.x)) /
                              (far(c, next) * far(a, b));
        double half = o->round ? o->w / sqrt(2) + 0.15 : hypot(o->w, o->d) / sqrt(2) + 0.1;
        half = o->box_half_given ? o->box_half : half / fmax(square, 0.5);
        struct plane_box *box = &plane->boxes[plane->box_count++];
        *box = (struct plane_box){.object = f->object, .centre = c, .half = half};
        box->tip[0] = towards(c, last, half);
        box->tip[1] = towards(c, a, half);
        box->tip[2] = towards(c, next, half);
        box->tip[3] = towards(c, b, half);
    }
    return plane->boxes != NULL;
}

static enum status emit_strip(const struct strip *s, const size_t *from)
{
    struct plane plane = {0};
    double *at = calloc(s->place_count + 1, sizeof *at);
    size_t count = 0;
    bool fine = at != NULL;
    for (size_t q = s->place_count - 1; fine; q = from[q]) {
        at[count++] = s->place[q];
        if (q == 0)
            break;
    }
    for (size_t i = 0; fine && i < count / 2; i++) {
        const double t = at[i];
        at[i] = at[count - 1 - i];
        at[count - 1 - i] = t;
    }
    for (size_t i = 0; fine && i + 1 < count; i++) {
        for (int j = 1; fine && j < s->rows; j++) {
            const bool pour = is_pour_row(s, j);
            const struct plane_line line = {.line = j,
                                            .kind = pour ? LAYOUT_CONSTRUCTION : LAYOUT_CONTRACTION,
                                            .along_pour = pour};
            fine = add_across(&plane, line, row_point(s, j, at[i]), row_point(s, j, at[i + 1]));
        }
        if (i == 0 && !s->closed)
            continue;
        struct layout_point a, b;
        at_t(s, at[i], &a, &b);
        const bool expansion = is_expansion(s, at[i]);
        const struct plane_line line = {.line = s->rows + (int)i,
                                        .kind = expansion ? LAYOUT_ISOLATION : LAYOUT_CONTRACTION,
                                        .expansion = expansion};
        fine = fine && add_across(&plane, line, a, b);
    }
    fine = fine && add_boxes(s, &plane, at, count);
    const enum status status = fine ? trials_run(s->trials, &plane) : STATUS_NO_MEMORY;
    plane_free(&plane);
    free(at);
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

/* The parameter of the ruling through p, and p's share of it. */
static bool locate(const struct strip *s, struct layout_point p, double *t, double *f)
{
    struct layout_point a, b;
    for (size_t i = 0; i + 1 < s->count; i++) {
        double low = s->knot[i].t, high = s->knot[i + 1].t, side[2];
        for (int k = 0; k < 2; k++) {
            const struct knot *n = &s->knot[i + (size_t)k];
            side[k] = (n->b.x - n->a.x) * (p.y - n->a.y) - (n->b.y - n->a.y) * (p.x - n->a.x);
        }
        if (side[0] * side[1] > 0)
            continue;
        for (int k = 0; k < 60; k++) {
            const double mid = (low + high) / 2;
            at_t(s, mid, &a, &b);
            const double here = (b.x - a.x) * (p.y - a.y) - (b.y - a.y) * (p.x - a.x);
            if ((here < 0) == (side[0] < 0))
                low = mid;
            else
                high = mid;
        }
        at_t(s, low, &a, &b);
        *t = low;
        *f = ((p.x - a.x) * (b.x - a.x) + (p.y - a.y) * (b.y - a.y)) / (far(a, b) * far(a, b));
        if (*f > 0 && *f < 1)
            return true;
    }
    return false;
}

/* Objects and pour lines on the strip; false: one of them does not suit it. */
static bool find_fixed(struct strip *s)
{
    const struct layout_input *in = s->trials->w->input;
    const size_t pours = in->has_pours ? in->pour_line_count : 0;
    s->fixed_count = 0;
    s->expansion = in->expansion_every;
    if (in->object_count + pours > MOST_FIXED)
        return false;
    for (size_t i = 0; i < in->object_count; i++) {
        const struct layout_object *o = &in->objects[i];
        struct fixed f = {.object = (int)i};
        if (!o->isolate)
            continue;
        const struct layout_point p = {o->box_at_given ? o->box_x : o->x,
                                       o->box_at_given ? o->box_y : o->y};
        if (!locate(s, p, &f.t, &f.f))
            return false;
        s->fixed[s->fixed_count++] = f;
    }
    for (size_t i = 0; i < pours; i++) {
        struct fixed f = {.object = -1, .line = in->pour_lines[i]};
        const double first = share_of_line(&f.line, s->knot[0].a, s->knot[0].b);
        const double last =
            share_of_line(&f.line, s->knot[s->count - 1].a, s->knot[s->count - 1].b);
        f.f = (first + last) / 2;
        if (first < 0.02 || first > 0.98 || last < 0.02 || last > 0.98)
            return false;
        s->fixed[s->fixed_count++] = f;
    }
    return true;
}

/* Each object and line takes the row line nearest to it. */
static void assign_rows(struct strip *s)
{
    for (size_t i = 0; i < s->fixed_count; i++) {
        const int row = (int)floor(s->fixed[i].f * s->rows + 0.5);
        s->fixed[i].row = row < 1 ? 1 : row > s->rows - 1 ? s->rows - 1 : row;
    }
}

static enum status try_strip(struct strip *s)
{
    const struct layout_input *in = s->trials->w->input;
    const double limit = fmin(in->max_side_x, in->max_side_y);
    const int least = (int)ceil(widest(s) / limit - 1e-3);
    size_t *from = calloc(MOST_PLACES, sizeof *from);
    enum status status = from ? STATUS_OK : STATUS_NO_MEMORY;
    double best = INFINITY;
    if (!find_fixed(s)) {
        free(from);
        return status;
    }
    find_places(s);
    const int first = least < 1 ? 1 : least;
    for (int rows = s->fixed_count && first < 2 ? 2 : first; !status && rows <= least + 2; rows++) {
        if (!trials_go_on(s->trials))
            break;
        s->rows = rows;
        assign_rows(s);
        const double cost = best_places(s, from);
        if (cost >= best && !s->fixed_count)
            break;
        best = fmin(best, cost);
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
    return !(in->has_pours && in->pour_width > 0) && w->out->outline_count < MOST_KNOTS;
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
