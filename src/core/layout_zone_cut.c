/* Where a zone may be cut by a construction joint, best first. */
#include "core/layout_region.h"
#include "core/layout_sort.h"
#include <math.h>
#include <stdlib.h>

/* Own weight (design, "Invented weights"): a metre of construction joint beside one of contraction.
 */
static const double construction_weight = 2.5;

double cut_cost(const struct zone *z, struct cut cut)
{
    return cut_length(z, cut.axis, cut.u) * (cut.given ? 1 : construction_weight);
}

/* A cut keeps clear of the boxes it does not halve. */
bool cut_is_clear(const struct zone *z, int axis, int64_t u)
{
    for (size_t i = 0; i < z->slab.box_count; i++) {
        const struct rect_box *b = &z->slab.boxes[i];
        const int64_t at = axis ? b->y : b->x;
        const int64_t low = b->tip[axis ? 2 : 0], high = b->tip[axis ? 3 : 1];
        const int64_t least = (int64_t)z->slab.rules.least;
        if (u != at && u > at - low - least && u < at + high + least)
            return false;
    }
    return true;
}

/* A joint of contraction the user drew stays one: no zone ends there. */
bool cut_is_kept(const struct work *w, int axis, int64_t u)
{
    for (size_t i = 0; i < w->line_count; i++)
        if (w->lines[i].labels && w->lines[i].axis == axis && w->lines[i].u == u &&
            w->lines[i].kind == LAYOUT_CONTRACTION)
            return true;
    return false;
}

static void add_cut(const struct search *s, const struct zone *z, struct cuts *c, struct cut cut)
{
    if (cut_is_kept(s->w, cut.axis, cut.u))
        return;
    if (cut_length(z, cut.axis, cut.u) <= 0 || !cut_is_clear(z, cut.axis, cut.u))
        return;
    for (size_t i = 0; i < c->count; i++)
        if (c->list[i].axis == cut.axis && c->list[i].u == cut.u)
            return;
    c->list[c->count++] = cut;
}

static bool runs_across(const struct zone *z, const struct work_line *l)
{
    const struct rect_family *f = &z->slab.family[l->axis];
    for (size_t i = 0; i < f->arc_count; i++)
        if (f->arcs[i].u0 < l->u && l->u < f->arcs[i].u1 &&
            (l->v0 > f->arcs[i].v0 || l->v1 < f->arcs[i].v1))
            return false;
    for (size_t i = 0; i < f->gate_count; i++)
        if (f->gates[i].u == l->u && (l->v0 > f->gates[i].v0 || l->v1 < f->gates[i].v1))
            return false;
    return true;
}

/* The extent of a zone along an axis. */
static void reach_of(const struct rect_family *f, int64_t *low, int64_t *high)
{
    *low = INT64_MAX;
    *high = INT64_MIN;
    for (size_t i = 0; i < f->arc_count; i++) {
        *low = f->arcs[i].u0 < *low ? f->arcs[i].u0 : *low;
        *high = f->arcs[i].u1 > *high ? f->arcs[i].u1 : *high;
    }
}

bool cut_given(const struct search *s, const struct zone *z, struct cut *cut)
{
    double least = INFINITY;
    for (size_t i = 0; i < s->w->line_count; i++) {
        const struct work_line *l = &s->w->lines[i];
        int64_t low, high;
        if (!l->labels || l->kind == LAYOUT_CONTRACTION || !runs_across(z, l) ||
            cut_length(z, l->axis, l->u) <= 0 || !cut_is_clear(z, l->axis, l->u))
            continue;
        reach_of(&z->slab.family[l->axis], &low, &high);
        const double off = fabs((double)(l->u - low) / (double)(high - low) - 0.5);
        if (off >= least)
            continue;
        least = off;
        *cut = (struct cut){.axis = l->axis, .u = l->u, .given = true};
    }
    return isfinite(least);
}

/* Where the zone may be cut: joints that must be there anyhow, lines of boxes and inside corners,
 * and half-way between any two of these. */
enum status cuts_find(const struct search *s, const struct zone *z, struct cuts *c)
{
    const struct work *w = s->w;
    for (int axis = 0; axis < 2; axis++) {
        const struct rect_family *f = &z->slab.family[axis];
        const size_t room = z->slab.box_count + 3 * f->arc_count + f->gate_count + w->line_count;
        int64_t *at = calloc(room + 1, sizeof *at);
        struct cut *more = realloc(c->list, (c->count + 5 * room + 1) * sizeof *more);
        c->list = more ? more : c->list;
        if (!at || !more) {
            free(at);
            return STATUS_NO_MEMORY;
        }
        size_t n = 0;
        for (size_t i = 0; i < w->line_count; i++) {
            const struct work_line *l = &w->lines[i];
            if (l->axis != axis)
                continue;
            if (l->labels && l->kind != LAYOUT_CONTRACTION && runs_across(z, l))
                add_cut(s, z, c, (struct cut){axis, l->u, true, 0});
            at[n++] = l->u;
        }
        for (size_t i = 0; i < z->slab.box_count; i++)
            at[n++] = axis ? z->slab.boxes[i].y : z->slab.boxes[i].x;
        for (size_t i = 0; i < f->arc_count; i++) {
            at[n++] = f->arcs[i].u0;
            at[n++] = f->arcs[i].u1;
        }
        sort_int64(at, n);
        for (size_t i = 0; i < n; i++)
            add_cut(s, z, c, (struct cut){axis, at[i], false, 0});
        for (size_t i = 0; i + 1 < n; i++) {
            const int64_t middle = at[i] + (at[i + 1] - at[i]) / 2 / 80 * 80;
            if ((double)(at[i + 1] - at[i]) > 3 * z->slab.rules.least)
                add_cut(s, z, c, (struct cut){axis, middle, false, 0});
            const int64_t third = (at[i + 1] - at[i]) / 3 / 80 * 80;
            if ((double)(at[i + 1] - at[i]) > 1.2 * z->slab.rules.side[axis]) {
                add_cut(s, z, c, (struct cut){axis, at[i] + third, false, 0});
                add_cut(s, z, c, (struct cut){axis, at[i + 1] - third, false, 0});
            }
        }
        free(at);
    }
    return STATUS_OK;
}

static int compare_cut(const void *a, const void *b)
{
    const struct cut *p = a, *q = b;
    if (p->given != q->given)
        return p->given ? -1 : 1;
    if (p->off < q->off || p->off > q->off)
        return p->off < q->off ? -1 : 1;
    if (p->axis != q->axis)
        return p->axis - q->axis;
    return (p->u > q->u) - (p->u < q->u);
}

/* Joints that are there anyhow first, then those that halve the zone best; no more than the effort
 * that is left allows. */
void cuts_rank(const struct search *s, const struct zone *z, struct cuts *c)
{
    int64_t low[2], high[2];
    reach_of(&z->slab.family[0], &low[0], &high[0]);
    reach_of(&z->slab.family[1], &low[1], &high[1]);
    for (size_t i = 0; i < c->count; i++) {
        struct cut *t = &c->list[i];
        const double size = (double)(high[t->axis] - low[t->axis]);
        t->off = fabs((double)(t->u - low[t->axis]) / size - 0.5);
    }
    qsort(c->list, c->count, sizeof *c->list, compare_cut);
    const uint64_t left = s->used < s->allowed ? s->allowed - s->used : 0;
    const uint64_t most = left / 8 / (z->slab.start_cost + 1) + 4;
    c->count = c->count < most ? c->count : most;
}
