/* The search: both families in turn, from several starts, and the flips of the corners. */
#include "core/layout_rect_solve.h"
#include <math.h>
#include <stdlib.h>
#include <string.h>

/* What the boxes at the corners of a panel leave of its sides must be no sliver. */
static size_t count_cramped(const struct rect_slab *slab, const struct rect_panel *p)
{
    static const int along[4][2] = {{1, 3}, {0, 3}, {0, 2}, {1, 2}}; /* tip into the panel: x, y */
    const int64_t x[4] = {p->x0, p->x1, p->x1, p->x0}, y[4] = {p->y0, p->y0, p->y1, p->y1};
    const double w = (double)(p->x1 - p->x0), h = (double)(p->y1 - p->y0);
    size_t n = 0;
    if (!slab->box_count ||
        (w < h ? w : h) - (double)slab->longest_tip >= slab->rules.least - SLACK)
        return 0;
    for (int k = 0; k < 4; k++) {
        const struct rect_box *b = rect_box_at(slab, x[k], y[k]);
        n += b && (w - (double)b->tip[along[k][0]] < slab->rules.least - SLACK ||
                   h - (double)b->tip[along[k][1]] < slab->rules.least - SLACK);
    }
    return n;
}

static double panel_cost(struct rect_slab *slab, const struct rect_panel *p, size_t *broken)
{
    const int64_t w = p->x1 - p->x0, h = p->y1 - p->y0;
    double cost = rect_penalty(&slab->rules, w, h, 0);
    if ((double)h > slab->rules.side[1] + SLACK)
        cost += BROKEN * (double)h / slab->rules.side[1];
    const size_t cramped = count_cramped(slab, p);
    *broken += (cost >= BROKEN) + cramped;
    return cost + BROKEN * (double)cramped;
}

static double chord_metres(struct rect_slab *slab)
{
    double sum = 0;
    for (int axis = 0; axis < 2; axis++) {
        const struct rect_family *f = &slab->family[axis];
        for (size_t i = 0; i < f->gate_count; i++)
            sum += f->gates[i].on ? (double)(f->gates[i].v1 - f->gates[i].v0) / LAYOUT_UNIT : 0;
        for (size_t i = 0; i < f->arc_count; i++)
            sum += (double)f->arcs[i].cut_count * (double)(f->arcs[i].v1 - f->arcs[i].v0) /
                   LAYOUT_UNIT;
        slab->evaluations += 4 * (f->gate_count + f->arc_count);
    }
    return sum;
}

static enum status total(struct rect_slab *slab, double *cost, size_t *broken)
{
    struct rect_panel *panels = NULL;
    size_t n = 0;
    const enum status status = rect_panels(slab, &panels, &n);
    if (status)
        return status;
    double sum = chord_metres(slab);
    *broken = 0;
    slab->evaluations += 8 * n;
    for (size_t i = 0; i < n; i++)
        sum += panel_cost(slab, &panels[i], broken);
    free(panels);
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
        status = rect_solve_arc(slab, axis, i, blind);
    return status;
}

/* Both families in turn, until the cost falls no more; block: from lines common to all arcs. */
static enum status descend(struct rect_slab *slab, int first, bool block, struct kept *best)
{
    for (int axis = 0; axis < 2; axis++)
        for (size_t i = 0; i < slab->family[axis].arc_count; i++)
            slab->family[axis].arcs[i].cut_count = 0;
    set_gates(slab);
    double before = INFINITY;
    enum status status = STATUS_OK;
    if (block)
        status = rect_solve_block(slab, first);
    for (int round = 0; !status && round < 5; round++) {
        if (round || !block)
            status = all_arcs(slab, first, round == 0);
        if (!status)
            status = all_arcs(slab, 1 - first, false);
        double cost = INFINITY;
        size_t broken = 0;
        if (!status)
            status = total(slab, &cost, &broken);
        if (!status && cost < slab->cost - 1e-7) {
            slab->cost = cost;
            slab->broken = broken;
            status = keep(best, slab) ? STATUS_OK : STATUS_NO_MEMORY;
        }
        if (cost > before - 1e-7)
            break;
        before = cost;
    }
    return status;
}

static enum status descend_all(struct rect_slab *slab, bool block, struct kept *best)
{
    enum status status = descend(slab, 0, false, best);
    if (!status)
        status = descend(slab, 1, false, best);
    if (!status && block)
        status = descend(slab, 0, true, best);
    if (!status && block)
        status = descend(slab, 1, true, best);
    return status;
}

/* Corners one by one to the other direction, or both. */
static enum status flips(struct rect_slab *slab, struct kept *best)
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
                const double before = slab->cost;
                const int was = slab->corners[i].choice;
                slab->corners[i].choice = (old + step) % 3;
                status = descend_all(slab, false, best);
                if (slab->cost < before - 1e-7)
                    gained = true;
                else
                    slab->corners[i].choice = was;
            }
        }
    }
    return status;
}

/* Every corner by x (0), by y (1), by both (2), and the two pinwheels (3, 4). */
static int pattern(int start, const struct rect_corner *c)
{
    return start < 3 ? start : (c->type + start) % 2;
}

static void set_start(struct rect_slab *slab, int start)
{
    for (size_t i = 0; i < slab->corner_count; i++)
        slab->corners[i].choice = pattern(start, &slab->corners[i]);
}

/* All corners of one opening at once, in each pattern. */
static enum status flip_groups(struct rect_slab *slab, struct kept *best)
{
    int *was = calloc(slab->corner_count + 1, sizeof *was);
    enum status status = was ? STATUS_OK : STATUS_NO_MEMORY;
    for (size_t g = 0; !status && g < slab->corner_count && slab->broken; g++) {
        if (slab->corners[g].group != g)
            continue;
        for (int start = 0; !status && start < 5; start++) {
            const double before = slab->cost;
            if (slab->evaluations > slab->allowed)
                break;
            for (size_t i = 0; i < slab->corner_count; i++) {
                was[i] = slab->corners[i].choice;
                if (slab->corners[i].group == g)
                    slab->corners[i].choice = pattern(start, &slab->corners[i]);
            }
            status = descend_all(slab, false, best);
            for (size_t i = 0; slab->cost > before - 1e-7 && i < slab->corner_count; i++)
                slab->corners[i].choice = was[i];
        }
    }
    free(was);
    return status;
}

/* Starts: every corner by x, by y, by both, and the two pinwheels (by turns). */
static enum status starts(struct rect_slab *slab, struct kept *best)
{
    enum status status = STATUS_OK;
    int pick = 0;
    const int count = slab->corner_count ? 5 : 1;
    for (int start = 0; !status && start < count; start++) {
        const double before = slab->cost;
        set_start(slab, start);
        status = descend_all(slab, slab->corner_count > 0, best);
        if (slab->cost < before - 1e-7)
            pick = start;
        if (slab->evaluations > slab->allowed)
            break;
    }
    set_start(slab, pick);
    for (int extra = 1; !status && extra < 4 && slab->broken; extra++) { /* closer rows first */
        slab->extra = extra;
        status = descend_all(slab, false, best);
    }
    slab->extra = 0;
    return status;
}

/* Every corner by x, then every one by y: is there a plan without a breach near at hand? */
static enum status glance(struct rect_slab *slab, struct kept *best)
{
    enum status status = STATUS_OK;
    slab->broken = 1;
    for (int start = 0; !status && slab->broken && start < (slab->corner_count ? 2 : 1); start++) {
        set_start(slab, start);
        status = descend(slab, 0, false, best);
        if (!status && slab->broken)
            status = descend(slab, 1, false, best);
    }
    return status;
}

enum status rect_solve(struct rect_slab *slab, enum rect_depth depth)
{
    struct kept best = {0};
    enum status status = kept_make(&best, slab) ? STATUS_OK : STATUS_NO_MEMORY;
    for (int axis = 0; axis < 2; axis++) /* the answer depends on nothing met before */
        for (size_t i = 0; i < slab->family[axis].arc_count; i++)
            rect_forget(&slab->family[axis].arcs[i]);
    if (!slab->solved)
        slab->cost = INFINITY;
    else if (!status && !keep(&best, slab))
        status = STATUS_NO_MEMORY;
    if (!status)
        status = depth == RECT_GLANCE ? glance(slab, &best) : starts(slab, &best);
    slab->start_cost = slab->evaluations;
    if (depth <= RECT_QUICK && slab->allowed > 3 * slab->start_cost)
        slab->allowed = 3 * slab->start_cost;
    if (!status && depth > RECT_GLANCE && slab->broken && slab->group_count > 1)
        status = flip_groups(slab, &best);
    if (!status && depth > RECT_QUICK)
        status = flips(slab, &best);
    if (!status && depth == RECT_FINE &&
        slab->broken) { /* a rule gives: look closer, at every 0.1 m */
        slab->fine = true;
        slab->allowed += slab->allowed / 2;
        status = starts(slab, &best);
        if (!status)
            status = flips(slab, &best);
        slab->fine = false;
    }
    if (!status && isfinite(slab->cost)) {
        give_back(&best, slab);
        slab->solved = true;
    }
    kept_free(&best, slab);
    return status;
}
