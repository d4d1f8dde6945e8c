/* The dynamic programs: one arc with the other family fixed, and the lines common to all arcs. */
#include "core/layout_rect_solve.h"
#include "core/layout_sort.h"
#include <math.h>
#include <stdlib.h>
#include <string.h>

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
    double count;
};
struct program {
    struct row *rows;    /* different ones, with how many */
    struct row *heights; /* the same by height only: between chords of the arc */
    size_t row_count, height_count;
    int64_t *at; /* candidates, sorted; true in must where forced */
    double *best;
    size_t *from;
    size_t count;
};

/* The nearest cut from the end `u` of an arc outward along v: a wall, a gate that is on, or the
 * last chord of the next arc; else on through it. */
static int64_t walk(const struct rect_family *f, size_t arc, int64_t v, bool right)
{
    for (;;) {
        const struct rect_arc *a = &f->arcs[arc];
        const int64_t u = right ? a->u1 : a->u0;
        size_t next = SIZE_MAX;
        for (size_t i = f->beyond_first[right][arc]; i < f->beyond_first[right][arc + 1]; i++) {
            const struct rect_gate *g = &f->gates[f->beyond[right][i]];
            if (v < g->v0 || v > g->v1)
                continue;
            if (g->on)
                return u;
            next = right ? g->right : g->left;
            break;
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
    sort_int64(list, n);
    return n;
}

static size_t all_cuts(const struct rect_family *f)
{
    size_t n = f->gate_count;
    for (size_t i = 0; i < f->arc_count; i++)
        n += f->arcs[i].cut_count;
    return n;
}

static int compare_row(const void *a, const void *b)
{
    const struct row *p = a, *q = b;
    if (p->height != q->height)
        return p->height < q->height ? -1 : 1;
    if (p->before != q->before)
        return p->before < q->before ? -1 : 1;
    return (p->after > q->after) - (p->after < q->after);
}

/* Equal rows become one with their number. */
static enum status group_rows(struct program *p)
{
    p->heights = calloc(p->row_count + 1, sizeof *p->heights);
    if (!p->heights)
        return STATUS_NO_MEMORY;
    qsort(p->rows, p->row_count, sizeof *p->rows, compare_row);
    size_t kept = 0;
    for (size_t i = 0; i < p->row_count; i++) {
        if (p->height_count && p->heights[p->height_count - 1].height == p->rows[i].height)
            p->heights[p->height_count - 1].count += p->rows[i].count;
        else
            p->heights[p->height_count++] = p->rows[i];
        if (kept && !compare_row(&p->rows[kept - 1], &p->rows[i]))
            p->rows[kept - 1].count += p->rows[i].count;
        else
            p->rows[kept++] = p->rows[i];
    }
    p->row_count = kept;
    return STATUS_OK;
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
        double rows = 1;
        if (height <= 0)
            continue;
        if (blind)
            rows = ceil(((double)height - SLACK) / slab->rules.side[1 - axis]);
        rows = rows < 1 ? 1 : rows;
        if (blind && (double)height / (rows + slab->extra) > slab->rules.least)
            rows += slab->extra;
        height = (int64_t)((double)height / rows);
        p->rows[p->row_count++] =
            (struct row){height, walk(f, arc, mid, false), walk(f, arc, mid, true), rows};
        low = high;
    }
    free(list);
    return group_rows(p);
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

static bool is_forced(const struct rect_arc *a, int64_t u)
{
    for (size_t i = 0; i < a->forced_count; i++)
        if (a->forced[i] == u)
            return true;
    return false;
}

static bool is_banned(const struct rect_slab *slab, int axis, const struct rect_arc *a, int64_t u)
{
    for (size_t i = 0; i < slab->ban_count; i++) {
        const struct rect_ban *b = &slab->bans[i];
        if (b->axis == axis && b->u == u && b->v0 < a->v1 && b->v1 > a->v0)
            return true;
    }
    return false;
}

/* Free places the user forbade go; 0.1 m beside them is offered instead. */
static bool lift_bans(const struct rect_slab *slab, int axis, const struct rect_arc *a,
                      struct places *list)
{
    for (size_t i = 0; i < list->count; i++) {
        const int64_t u = list->at[i];
        if (!is_banned(slab, axis, a, u) || is_forced(a, u))
            continue;
        list->at[i] = u - 8000 > a->u0 ? u - 8000 : u + 8000;
        if (u + 8000 < a->u1 && !place(list, u + 8000))
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
        for (int64_t u = a->u0 / 8000 * 8000 - 8000; u < a->u1; u += 8000)
            if (u > a->u0 && !place(list, u))
                return false;
    if (slab->ban_count && !lift_bans(slab, axis, a, list))
        return false;
    sort_int64(list->at, list->count);
    return true;
}

/* What the boxes at both ends of a gap leave of it must be no sliver. */
static double cramped(const struct rect_slab *slab, const struct rect_arc *a, int64_t from,
                      int64_t to, int64_t low, int64_t high)
{
    (void)a;
    const double rest = (double)(to - from) - slab->rules.least + SLACK;
    return (double)low > rest || (double)high > rest ? BROKEN : 0;
}

/* Cost of a panel column between two places; `most`: the sum may stop there, it is not taken. */
static double gap(struct rect_slab *slab, int axis, const struct program *p, int64_t from,
                  int64_t to, bool first, bool last, double most)
{
    double cost = 0;
    size_t i = 0;
    if (!first && !last) {
        for (; i < p->height_count && cost < most; i++)
            cost += p->heights[i].count *
                    rect_penalty(&slab->rules, to - from, p->heights[i].height, axis);
        slab->evaluations += i;
        return cost;
    }
    for (; i < p->row_count && cost < most; i++)
        cost += p->rows[i].count *
                rect_penalty(&slab->rules,
                             (last ? p->rows[i].after : to) - (first ? p->rows[i].before : from),
                             p->rows[i].height, axis);
    slab->evaluations += i;
    return cost;
}

static int64_t room_at(const struct rect_arc *a, int64_t u, bool high)
{
    if (u == a->u0)
        return a->end_room[0];
    if (u == a->u1)
        return a->end_room[1];
    for (size_t i = 0; i < a->forced_count; i++)
        if (a->forced[i] == u)
            return a->room[i][high];
    return 0;
}

/* best[q] = length + least over p of best[p] + gap(p, q), never over a forced line. */
static void run_program(struct rect_slab *slab, int axis, const struct rect_arc *a,
                        struct program *p)
{
    const double length = (double)(a->v1 - a->v0) / LAYOUT_UNIT;
    const double reach = 2 * slab->rules.side[axis];
    size_t forced = 0, barrier = SIZE_MAX;
    for (size_t q = 0; q <= p->count; q++) {
        const bool end = q == p->count;
        const int64_t to = end ? a->u1 : p->at[q], low = room_at(a, to, false);
        p->best[q] = INFINITY;
        p->from[q] = SIZE_MAX;
        if (barrier == SIZE_MAX && ((double)(to - a->u0) <= 2 * reach || q == 0 || end))
            p->best[q] = gap(slab, axis, p, a->u0, to, true, end, INFINITY) +
                         cramped(slab, a, a->u0, to, low, a->end_room[0]);
        for (size_t k = q; k-- > 0;) {
            if (p->best[k] < p->best[q]) {
                const double cost =
                    p->best[k] +
                    gap(slab, axis, p, p->at[k], to, false, end, p->best[q] - p->best[k]) +
                    cramped(slab, a, p->at[k], to, low, room_at(a, p->at[k], true));
                if (cost < p->best[q] - 1e-9) {
                    p->best[q] = cost;
                    p->from[q] = k;
                }
            }
            if (k == barrier || (double)(to - p->at[k]) > reach)
                break;
        }
        p->best[q] += end ? 0 : length;
        if (!end && forced < a->forced_count && p->at[q] == a->forced[forced]) {
            barrier = q;
            forced++;
        }
    }
}

/* Rows met before and the chords found for them: the same question gets the same answer. */
enum { MEMORIES = 12 };
struct rect_memo {
    struct row *rows;
    size_t row_count;
    int64_t *cut;
    size_t cut_count;
    bool fine;
};

void rect_forget(struct rect_arc *arc)
{
    for (size_t i = 0; i < arc->memo_count; i++) {
        free(arc->memo[i].rows);
        free(arc->memo[i].cut);
    }
    free(arc->memo);
    arc->memo = NULL;
    arc->memo_count = arc->memo_next = 0;
}

static bool same_rows(const struct rect_memo *m, const struct program *p)
{
    if (m->row_count != p->row_count)
        return false;
    for (size_t i = 0; i < p->row_count; i++)
        if (compare_row(&m->rows[i], &p->rows[i]) || m->rows[i].count < p->rows[i].count ||
            m->rows[i].count > p->rows[i].count)
            return false;
    return true;
}

static const struct rect_memo *recall(const struct rect_arc *a, const struct program *p, bool fine)
{
    for (size_t i = 0; i < a->memo_count; i++)
        if (a->memo[i].fine == fine && same_rows(&a->memo[i], p))
            return &a->memo[i];
    return NULL;
}

static enum status set_cut(struct rect_arc *a, const int64_t *cut, size_t count)
{
    int64_t *copy = calloc(count + 1, sizeof *copy);
    if (!copy)
        return STATUS_NO_MEMORY;
    if (count)
        memcpy(copy, cut, count * sizeof *copy);
    free(a->cut);
    a->cut = copy;
    a->cut_count = count;
    return STATUS_OK;
}

/* Takes over the rows; forgets the oldest. */
static enum status remember(struct rect_arc *a, struct program *p, bool fine)
{
    if (!a->memo)
        a->memo = calloc(MEMORIES, sizeof *a->memo);
    int64_t *copy = calloc(a->cut_count + 1, sizeof *copy);
    if (!a->memo || !copy) {
        free(copy);
        return STATUS_NO_MEMORY;
    }
    if (a->cut_count)
        memcpy(copy, a->cut, a->cut_count * sizeof *copy);
    struct rect_memo *m = &a->memo[a->memo_next];
    a->memo_next = (a->memo_next + 1) % MEMORIES;
    if (a->memo_count < MEMORIES)
        a->memo_count++;
    free(m->rows);
    free(m->cut);
    *m = (struct rect_memo){p->rows, p->row_count, copy, a->cut_count, fine};
    p->rows = NULL;
    return STATUS_OK;
}

enum status rect_solve_arc(struct rect_slab *slab, int axis, size_t arc, bool blind)
{
    struct rect_arc *a = &slab->family[axis].arcs[arc];
    struct program p = {0};
    struct places list = {0};
    enum status status = find_rows(slab, axis, arc, blind, &p);
    const struct rect_memo *known = status ? NULL : recall(a, &p, slab->fine);
    slab->evaluations += p.row_count;
    if (known) {
        status = set_cut(a, known->cut, known->cut_count);
        free(p.rows);
        free(p.heights);
        return status;
    }
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
            sort_int64(cut, n);
            free(a->cut);
            a->cut = cut;
            a->cut_count = n;
            status = remember(a, &p, slab->fine);
        } else {
            free(cut);
        }
    }
    free(p.rows);
    free(p.heights);
    free(list.at);
    free(p.best);
    free(p.from);
    return status;
}

/* ---- lines common to all arcs of a family: the start of the descent (design, "Block DP") */
struct strip { /* an arc prolonged over the gates that are off, in rows of one height */
    int64_t from, to, height;
    double count;
};

static double strips_cost(const struct rect_slab *slab, int axis, const struct strip *strips,
                          int64_t from, int64_t to)
{
    double cost = 0;
    for (size_t i = 0; i < slab->family[axis].arc_count; i++) {
        const int64_t a = strips[i].from > from ? strips[i].from : from;
        const int64_t b = strips[i].to < to ? strips[i].to : to;
        if (a < b)
            cost += strips[i].count * rect_penalty(&slab->rules, b - a, strips[i].height, axis);
    }
    return cost;
}

static double line_length(const struct rect_family *f, int64_t u)
{
    double length = 0;
    for (size_t i = 0; i < f->arc_count; i++)
        if (f->arcs[i].u0 < u && u < f->arcs[i].u1)
            length += (double)(f->arcs[i].v1 - f->arcs[i].v0) / LAYOUT_UNIT;
    return length;
}

/* Anchors: forced lines, gates that are on, ends of strips; must: the forced ones among them. */
static bool find_anchors(const struct rect_family *f, const struct strip *strips,
                         struct places *anchors, struct places *must)
{
    for (size_t i = 0; i < f->arc_count; i++) {
        if (!place(anchors, strips[i].from) || !place(anchors, strips[i].to))
            return false;
        for (size_t k = 0; k < f->arcs[i].forced_count; k++)
            if (!place(anchors, f->arcs[i].forced[k]) || !place(must, f->arcs[i].forced[k]))
                return false;
    }
    for (size_t i = 0; i < f->gate_count; i++)
        if (f->gates[i].on && (!place(anchors, f->gates[i].u) || !place(must, f->gates[i].u)))
            return false;
    return true;
}

static void sort_places(struct places *list)
{
    list->count = sort_unique(list->at, list->count);
}

/* The common lines: the same program with the cost summed over the strips. Kept in `cut`. */
static enum status common_lines(struct rect_slab *slab, int axis, const struct strip *strips,
                                const struct places *list, const struct places *must,
                                struct places *cut)
{
    const size_t n = list->count;
    double *best = calloc(n + 1, sizeof *best);
    size_t *from = calloc(n + 1, sizeof *from), barrier = 0;
    if (!best || !from) {
        free(best);
        free(from);
        return STATUS_NO_MEMORY;
    }
    for (size_t q = 1; q < n; q++) {
        best[q] = INFINITY;
        for (size_t k = q; k-- > 0;) {
            slab->evaluations += slab->family[axis].arc_count / 2 + 1;
            const double cost = best[k] + strips_cost(slab, axis, strips, list->at[k], list->at[q]);
            if (cost < best[q] - 1e-9) {
                best[q] = cost;
                from[q] = k;
            }
            if (k == barrier || (double)(list->at[q] - list->at[k]) > 2 * slab->rules.side[axis])
                break;
        }
        best[q] += line_length(&slab->family[axis], list->at[q]);
        if (sort_holds(must->at, must->count, list->at[q]))
            barrier = q;
    }
    bool fine = true;
    for (size_t q = n ? from[n - 1] : 0; fine && q > 0; q = from[q])
        fine = place(cut, list->at[q]);
    free(best);
    free(from);
    return fine ? STATUS_OK : STATUS_NO_MEMORY;
}

/* Each arc takes the common lines that cross it and its own forced ones. */
static enum status take_lines(struct rect_slab *slab, int axis, const struct places *cut)
{
    struct rect_family *f = &slab->family[axis];
    for (size_t i = 0; i < f->arc_count; i++) {
        struct rect_arc *a = &f->arcs[i];
        struct places own = {0};
        bool fine = true;
        for (size_t k = 0; fine && k < a->forced_count; k++)
            fine = place(&own, a->forced[k]);
        for (size_t k = 0; fine && k < cut->count; k++)
            if (a->u0 < cut->at[k] && cut->at[k] < a->u1 && !is_banned(slab, axis, a, cut->at[k]))
                fine = place(&own, cut->at[k]);
        if (!fine) {
            free(own.at);
            return STATUS_NO_MEMORY;
        }
        sort_places(&own);
        free(a->cut);
        a->cut = own.at;
        a->cut_count = own.count;
    }
    return STATUS_OK;
}

enum status rect_solve_block(struct rect_slab *slab, int axis)
{
    struct rect_family *f = &slab->family[axis];
    struct strip *strips = calloc(f->arc_count + 1, sizeof *strips);
    struct places anchors = {0}, must = {0}, list = {0}, cut = {0};
    bool fine = strips != NULL;
    for (size_t i = 0; fine && i < f->arc_count; i++) {
        const struct rect_arc *a = &f->arcs[i];
        const int64_t mid = a->v0 + (a->v1 - a->v0) / 2;
        f->arcs[i].cut_count = 0;
        const double rows =
            fmax(1, ceil(((double)(a->v1 - a->v0) - SLACK) / slab->rules.side[1 - axis]));
        strips[i] =
            (struct strip){.height = (int64_t)((double)(a->v1 - a->v0) / rows), .count = rows};
        strips[i].from = walk(f, i, mid, false);
        strips[i].to = walk(f, i, mid, true);
    }
    fine = fine && find_anchors(f, strips, &anchors, &must);
    sort_places(&anchors);
    sort_places(&must);
    for (size_t i = 0; fine && i + 1 < anchors.count; i++) {
        const struct rect_arc whole = {.u0 = anchors.at[0], .u1 = anchors.at[anchors.count - 1]};
        fine = divide(&list, slab, &whole, axis, anchors.at[i], anchors.at[i + 1]);
    }
    for (size_t i = 0; fine && i < anchors.count; i++)
        fine = place(&list, anchors.at[i]);
    sort_places(&list);
    enum status status = fine ? STATUS_OK : STATUS_NO_MEMORY;
    if (!status && list.count > 1)
        status = common_lines(slab, axis, strips, &list, &must, &cut);
    sort_places(&cut);
    if (!status)
        status = take_lines(slab, axis, &cut);
    free(strips);
    free(anchors.at);
    free(must.at);
    free(list.at);
    free(cut.at);
    return status;
}
