/* The dynamic program of one arc, the rounds over all arcs, and the flips of the corners. */
#include "core/layout_rect.h"
#include <math.h>
#include <stdlib.h>
#include <string.h>

/* Own weights, in metres of joint (design, "Invented weights"); a broken rule outweighs any length.
 */
#define BROKEN 1e5
#define SLACK 80.0 /* 1 mm: free lines stand on whole mm */

double rect_penalty(const struct rect_rules *rules, int64_t along, int64_t across, int axis)
{
    const double w = (double)along, h = (double)across, limit = rules->side[axis];
    const double longer = w > h ? w : h, shorter = w > h ? h : w, ratio = longer / shorter;
    const double metres = limit / LAYOUT_UNIT;
    double cost = 0.02 * (ratio - 1) * (ratio - 1);
    if (w > limit + SLACK)
        cost += BROKEN + 60 * metres * (w / limit - 1) * 100;
    if (ratio > rules->aspect * (1 + 1e-3))
        cost += BROKEN + 8 * metres * (ratio - rules->aspect + 1);
    if (shorter < rules->least - SLACK / 2)
        cost += BROKEN + 25 * metres * (2 - shorter / rules->least);
    return cost;
}

struct row {
    int64_t height, before, after; /* nearest cut beyond each end of the arc */
};
struct program {
    struct row *rows;
    size_t row_count;
    int64_t *at; /* candidates, sorted; true in must where forced */
    double *best;
    size_t *from;
    size_t count;
};

static int compare_int64(const void *a, const void *b)
{
    const int64_t p = *(const int64_t *)a, q = *(const int64_t *)b;
    return (p > q) - (p < q);
}

/* The nearest cut from the end `u` of an arc outward along v: a wall, a gate that is on, or the
 * last chord of the next arc; else on through it. */
static int64_t walk(const struct rect_family *f, size_t arc, int64_t v, bool right)
{
    for (;;) {
        const struct rect_arc *a = &f->arcs[arc];
        const int64_t u = right ? a->u1 : a->u0;
        size_t next = SIZE_MAX;
        for (size_t i = 0; i < f->gate_count && next == SIZE_MAX; i++) {
            const struct rect_gate *g = &f->gates[i];
            if ((right ? g->left : g->right) != arc || v < g->v0 || v > g->v1)
                continue;
            if (g->on)
                return u;
            next = right ? g->right : g->left;
        }
        if (next == SIZE_MAX)
            return u;
        a = &f->arcs[next];
        if (a->cut_count)
            return right ? a->cut[0] : a->cut[a->cut_count - 1];
        arc = next;
    }
}

/* The chords of the other family that cross the arc: by the "fact" of the design they span it. */
static size_t crossing(const struct rect_slab *slab, int axis, const struct rect_arc *a,
                       int64_t *list)
{
    const struct rect_family *o = &slab->family[1 - axis];
    size_t n = 0;
    for (size_t i = 0; i < o->arc_count; i++) {
        const struct rect_arc *b = &o->arcs[i];
        if (b->v0 < a->u1 && b->v1 > a->u0 && b->u0 < a->v1 && b->u1 > a->v0)
            for (size_t k = 0; k < b->cut_count; k++)
                if (b->cut[k] > a->v0 && b->cut[k] < a->v1)
                    list[n++] = b->cut[k];
    }
    for (size_t i = 0; i < o->gate_count; i++) {
        const struct rect_gate *g = &o->gates[i];
        if (g->on && g->v0 < a->u1 && g->v1 > a->u0 && g->u > a->v0 && g->u < a->v1)
            list[n++] = g->u;
    }
    qsort(list, n, sizeof *list, compare_int64);
    return n;
}

static size_t all_cuts(const struct rect_family *f)
{
    size_t n = f->gate_count;
    for (size_t i = 0; i < f->arc_count; i++)
        n += f->arcs[i].cut_count;
    return n;
}

/* Rows of the arc; blind: the other family is not placed yet, panels 0.83 of its limit are assumed.
 */
static enum status find_rows(const struct rect_slab *slab, int axis, size_t arc, bool blind,
                             struct program *p)
{
    const struct rect_family *f = &slab->family[axis];
    const struct rect_arc *a = &f->arcs[arc];
    const size_t room = all_cuts(&slab->family[1 - axis]) + 2;
    int64_t *list = calloc(room, sizeof *list);
    p->rows = calloc(room, sizeof *p->rows);
    if (!list || !p->rows) {
        free(list);
        return STATUS_NO_MEMORY;
    }
    size_t n = crossing(slab, axis, a, list);
    int64_t low = a->v0;
    for (size_t i = 0; i <= n; i++) {
        const int64_t high = i < n ? list[i] : a->v1, mid = low + (high - low) / 2;
        int64_t height = high - low;
        if (height <= 0)
            continue;
        const double guess = 0.83 * slab->rules.side[1 - axis];
        if (blind && (double)height > guess)
            height = (int64_t)((double)height / ceil((double)height / slab->rules.side[1 - axis]));
        p->rows[p->row_count++] =
            (struct row){height, walk(f, arc, mid, false), walk(f, arc, mid, true)};
        low = high;
    }
    free(list);
    return STATUS_OK;
}

struct places {
    int64_t *at;
    size_t count, room;
};

static bool place(struct places *list, int64_t u)
{
    if (list->count == list->room) {
        const size_t room = list->room ? 2 * list->room : 64;
        int64_t *more = realloc(list->at, room * sizeof *more);
        if (!more)
            return false;
        list->at = more;
        list->room = room;
    }
    list->at[list->count++] = u;
    return true;
}

static bool divide(struct places *list, const struct rect_slab *slab, const struct rect_arc *a,
                   int axis, int64_t from, int64_t to)
{
    const double span = (double)(to - from), raster = (double)slab->rules.raster;
    const int64_t least = (int64_t)ceil((span - SLACK) / slab->rules.side[axis]);
    for (int64_t n = least < 1 ? 1 : least; n <= least + 2; n++)
        for (int64_t i = 1; i < n; i++) {
            const double at = (double)from + span * (double)i / (double)n;
            const int64_t u = (int64_t)(floor(at / raster + 0.5) * raster);
            if (u > a->u0 && u < a->u1 && u > from && u < to && !place(list, u))
                return false;
        }
    return true;
}

/* Equal divisions between the anchors, the forced lines, and a raster in short arcs. */
static bool find_places(const struct rect_slab *slab, int axis, const struct rect_arc *a,
                        const struct program *p, struct places *list)
{
    const size_t last = a->forced_count;
    for (size_t i = 0; i <= last; i++) {
        const int64_t from = i ? a->forced[i - 1] : a->u0, to = i < last ? a->forced[i] : a->u1;
        if (!divide(list, slab, a, axis, from, to))
            return false;
        for (size_t k = 0; k < p->row_count; k++) {
            const int64_t before = i ? from : p->rows[k].before;
            const int64_t after = i < last ? to : p->rows[k].after;
            const bool new_one =
                !k || before != p->rows[k - 1].before || after != p->rows[k - 1].after;
            if (new_one && (before != from || after != to) &&
                (!divide(list, slab, a, axis, before, after) ||
                 !divide(list, slab, a, axis, from, after) ||
                 !divide(list, slab, a, axis, before, to)))
                return false;
        }
        if (i < last && !place(list, to))
            return false;
    }
    if (slab->fine && (double)(a->u1 - a->u0) < 3 * slab->rules.side[axis])
        for (int64_t u = a->u0 / 8000 * 8000; u < a->u1; u += 8000)
            if (u > a->u0 && !place(list, u))
                return false;
    qsort(list->at, list->count, sizeof *list->at, compare_int64);
    return true;
}

static double gap(const struct rect_slab *slab, int axis, const struct program *p, int64_t from,
                  int64_t to, bool first, bool last)
{
    double cost = 0;
    for (size_t i = 0; i < p->row_count; i++)
        cost += rect_penalty(&slab->rules,
                             (last ? p->rows[i].after : to) - (first ? p->rows[i].before : from),
                             p->rows[i].height, axis);
    return cost;
}

/* best[q] = length + least over p of best[p] + gap(p, q), never over a forced line. */
static void run_program(struct rect_slab *slab, int axis, const struct rect_arc *a,
                        struct program *p)
{
    const double length = (double)(a->v1 - a->v0) / LAYOUT_UNIT;
    size_t forced = 0, barrier = SIZE_MAX;
    for (size_t q = 0; q <= p->count; q++) {
        const bool end = q == p->count;
        const int64_t to = end ? a->u1 : p->at[q];
        p->best[q] = INFINITY;
        p->from[q] = SIZE_MAX;
        if (barrier == SIZE_MAX)
            p->best[q] = gap(slab, axis, p, a->u0, to, true, end);
        for (size_t k = q; k-- > 0;) {
            if (p->best[k] < p->best[q]) {
                const double cost = p->best[k] + gap(slab, axis, p, p->at[k], to, false, end);
                if (cost < p->best[q] - 1e-9) {
                    p->best[q] = cost;
                    p->from[q] = k;
                }
            }
            slab->evaluations++;
            if (k == barrier || (double)(to - p->at[k]) > 2 * slab->rules.side[axis])
                break;
        }
        p->best[q] += end ? 0 : length;
        if (!end && forced < a->forced_count && p->at[q] == a->forced[forced]) {
            barrier = q;
            forced++;
        }
    }
}

static enum status solve_arc(struct rect_slab *slab, int axis, size_t arc, bool blind)
{
    struct rect_arc *a = &slab->family[axis].arcs[arc];
    struct program p = {0};
    struct places list = {0};
    enum status status = find_rows(slab, axis, arc, blind, &p);
    if (!status && !find_places(slab, axis, a, &p, &list))
        status = STATUS_NO_MEMORY;
    if (!status) {
        for (size_t i = 0; i < list.count; i++)
            if (!p.count || list.at[i] != list.at[p.count - 1])
                list.at[p.count++] = list.at[i];
        p.at = list.at;
        p.best = calloc(p.count + 1, sizeof *p.best);
        p.from = calloc(p.count + 1, sizeof *p.from);
        int64_t *cut = calloc(p.count + 1, sizeof *cut);
        status = p.best && p.from && cut ? STATUS_OK : STATUS_NO_MEMORY;
        if (!status) {
            run_program(slab, axis, a, &p);
            size_t n = 0;
            for (size_t q = p.from[p.count]; q != SIZE_MAX; q = p.from[q])
                cut[n++] = p.at[q];
            qsort(cut, n, sizeof *cut, compare_int64);
            free(a->cut);
            a->cut = cut;
            a->cut_count = n;
        } else {
            free(cut);
        }
    }
    free(p.rows);
    free(list.at);
    free(p.best);
    free(p.from);
    return status;
}

static enum status total(struct rect_slab *slab, double *cost)
{
    struct rect_panel *panels = NULL;
    struct rect_chord *chords = NULL;
    size_t n = 0, m = 0;
    enum status status = rect_panels(slab, &panels, &n);
    if (!status)
        status = rect_chords(slab, &chords, &m);
    if (status) {
        free(panels);
        return status;
    }
    double sum = 0;
    slab->evaluations += n + m;
    for (size_t i = 0; i < m; i++)
        sum += (double)(chords[i].v1 - chords[i].v0) / LAYOUT_UNIT;
    for (size_t i = 0; i < n; i++) {
        const int64_t w = panels[i].x1 - panels[i].x0, h = panels[i].y1 - panels[i].y0;
        sum += rect_penalty(&slab->rules, w, h, 0);
        if ((double)h > slab->rules.side[1] + SLACK)
            sum += BROKEN * (double)h / slab->rules.side[1];
    }
    free(panels);
    free(chords);
    *cost = sum;
    return STATUS_OK;
}

static void set_gates(struct rect_slab *slab)
{
    for (int axis = 0; axis < 2; axis++)
        for (size_t i = 0; i < slab->family[axis].gate_count; i++)
            slab->family[axis].gates[i].on = slab->family[axis].gates[i].forced;
    for (size_t i = 0; i < slab->corner_count; i++) {
        const struct rect_corner *c = &slab->corners[i];
        if (c->choice == 2) { /* both */
            for (int k = 0; k < 2; k++)
                if (c->gate[k] != SIZE_MAX)
                    slab->family[k].gates[c->gate[k]].on = true;
            continue;
        }
        const int axis = c->gate[c->choice] == SIZE_MAX ? 1 - c->choice : c->choice;
        const size_t other = c->gate[1 - axis];
        if (other != SIZE_MAX && slab->family[1 - axis].gates[other].forced)
            continue;
        if (c->gate[axis] != SIZE_MAX)
            slab->family[axis].gates[c->gate[axis]].on = true;
    }
}

struct kept { /* the cuts and gates of the best layout so far */
    int64_t **cut[2];
    size_t *count[2];
    bool *on[2];
};

static void kept_free(struct kept *k, const struct rect_slab *slab)
{
    for (int axis = 0; axis < 2; axis++) {
        for (size_t i = 0; k->cut[axis] && i < slab->family[axis].arc_count; i++)
            free(k->cut[axis][i]);
        free(k->cut[axis]);
        free(k->count[axis]);
        free(k->on[axis]);
    }
}

static bool kept_make(struct kept *k, const struct rect_slab *slab)
{
    for (int axis = 0; axis < 2; axis++) {
        k->cut[axis] = calloc(slab->family[axis].arc_count + 1, sizeof *k->cut[axis]);
        k->count[axis] = calloc(slab->family[axis].arc_count + 1, sizeof *k->count[axis]);
        k->on[axis] = calloc(slab->family[axis].gate_count + 1, sizeof *k->on[axis]);
        if (!k->cut[axis] || !k->count[axis] || !k->on[axis])
            return false;
    }
    return true;
}

static bool keep(struct kept *k, const struct rect_slab *slab)
{
    for (int axis = 0; axis < 2; axis++) {
        const struct rect_family *f = &slab->family[axis];
        for (size_t i = 0; i < f->arc_count; i++) {
            int64_t *copy = calloc(f->arcs[i].cut_count + 1, sizeof *copy);
            if (!copy)
                return false;
            if (f->arcs[i].cut_count)
                memcpy(copy, f->arcs[i].cut, f->arcs[i].cut_count * sizeof *copy);
            free(k->cut[axis][i]);
            k->cut[axis][i] = copy;
            k->count[axis][i] = f->arcs[i].cut_count;
        }
        for (size_t i = 0; i < f->gate_count; i++)
            k->on[axis][i] = f->gates[i].on;
    }
    return true;
}

static void give_back(struct kept *k, struct rect_slab *slab)
{
    for (int axis = 0; axis < 2; axis++) {
        struct rect_family *f = &slab->family[axis];
        for (size_t i = 0; i < f->arc_count; i++) {
            free(f->arcs[i].cut);
            f->arcs[i].cut = k->cut[axis][i];
            f->arcs[i].cut_count = k->count[axis][i];
            k->cut[axis][i] = NULL;
        }
        for (size_t i = 0; i < f->gate_count; i++)
            f->gates[i].on = k->on[axis][i];
    }
}

static enum status all_arcs(struct rect_slab *slab, int axis, bool blind)
{
    enum status status = STATUS_OK;
    for (size_t i = 0; !status && i < slab->family[axis].arc_count; i++)
        status = solve_arc(slab, axis, i, blind);
    return status;
}

/* Both families in turn from nothing, until the cost falls no more. */
static enum status descend(struct rect_slab *slab, int first, struct kept *best, double *least)
{
    for (int axis = 0; axis < 2; axis++)
        for (size_t i = 0; i < slab->family[axis].arc_count; i++)
            slab->family[axis].arcs[i].cut_count = 0;
    set_gates(slab);
    double before = INFINITY;
    enum status status = STATUS_OK;
    for (int round = 0; !status && round < 5; round++) {
        status = all_arcs(slab, first, round == 0);
        if (!status)
            status = all_arcs(slab, 1 - first, false);
        double cost = INFINITY;
        if (!status)
            status = total(slab, &cost);
        if (!status && cost < *least - 1e-7) {
            *least = cost;
            status = keep(best, slab) ? STATUS_OK : STATUS_NO_MEMORY;
        }
        if (cost > before - 1e-7)
            break;
        before = cost;
    }
    return status;
}

static enum status flips(struct rect_slab *slab, struct kept *best, double *least)
{
    bool gained = true;
    enum status status = STATUS_OK;
    while (gained && !status) {
        gained = false;
        for (size_t i = 0; !status && i < slab->corner_count; i++) {
            if (slab->evaluations > slab->allowed)
                return STATUS_OK;
            const int old = slab->corners[i].choice;
            for (int step = 1; !status && step < 3; step++) {
                const double before = *least;
                const int was = slab->corners[i].choice;
                slab->corners[i].choice = (old + step) % 3;
                for (int first = 0; !status && first < 2; first++)
                    status = descend(slab, first, best, least);
                if (*least < before - 1e-7)
                    gained = true;
                else
                    slab->corners[i].choice = was;
            }
        }
    }
    return status;
}

static void set_start(struct rect_slab *slab, int start)
{
    for (size_t i = 0; i < slab->corner_count; i++)
        slab->corners[i].choice = start < 3 ? start : (int)((i + (i / 2) + (size_t)start) % 2);
}

/* Starts: every corner by x, by y, by both, and the two pinwheels (by turns). */
static enum status starts(struct rect_slab *slab, struct kept *best, double *least)
{
    enum status status = STATUS_OK;
    int pick = 0;
    const int count = slab->corner_count ? 5 : 1;
    for (int start = 0; !status && start < count; start++) {
        const double before = *least;
        set_start(slab, start);
        for (int first = 0; !status && first < 2; first++)
            status = descend(slab, first, best, least);
        if (*least < before - 1e-7)
            pick = start;
    }
    set_start(slab, pick);
    return status;
}

enum status rect_solve(struct rect_slab *slab)
{
    struct kept best = {0};
    double least = INFINITY;
    enum status status = kept_make(&best, slab) ? STATUS_OK : STATUS_NO_MEMORY;
    if (!status)
        status = starts(slab, &best, &least);
    if (!status)
        status = flips(slab, &best, &least);
    if (!status && least > BROKEN) { /* a rule gives: look closer, at every 0.1 m */
        slab->fine = true;
        slab->allowed = slab->evaluations + 2 * slab->allowed;
        status = starts(slab, &best, &least);
        if (!status)
            status = flips(slab, &best, &least);
    }
    if (!status && isfinite(least))
        give_back(&best, slab);
    kept_free(&best, slab);
    return status;
}
