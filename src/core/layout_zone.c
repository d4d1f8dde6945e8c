/* Zones: where lines common to the whole slab break a rule, construction joints close parts of it
 * and each part is laid out alone (design, "Zone at construction/isolation joints"). */
#include "core/layout_zone.h"
#include "core/layout_partition.h"
#include "core/layout_place.h"
#include "core/layout_region.h"
#include <math.h>
#include <stdlib.h>
#include <string.h>

static enum status split(struct search *s, const struct zone *z, struct cut cut, struct parts *p)
{
    *p = (struct parts){.cut = cut};
    enum status status = STATUS_OK;
    for (int high = 0; !status && high < 2; high++) {
        struct outline_edges half = {0};
        status = region_clip(&z->edges, cut.axis, cut.u, high, &half);
        if (!status)
            status = parts_add(s, p, &half, RECT_QUICK);
        edges_free(&half);
    }
    p->cost += cut_cost(z, cut);
    if (status)
        parts_free(p);
    return status;
}

enum { DEEPEST = 12 };

bool zone_go_on(struct work *w)
{
    const struct layout_input *in = w->input;
    const double share = (double)w->slab.evaluations / (double)w->slab.allowed;
    if (!w->stopped && in->go_on && !in->go_on(in->context, fmin(share, 1)))
        w->stopped = true;
    return !w->stopped;
}

/* A zone of so many panels that trying every cut would take too long: the first two do. */
static bool is_vast(const struct zone *z)
{
    return zone_panels(z) > 1500;
}

static bool is_broken(const struct parts *p)
{
    size_t broken = 0;
    for (size_t i = 0; i < p->count; i++)
        broken += p->zones[i].slab.broken;
    return broken > 0;
}

static enum status best_split(struct search *s, const struct zone *z, struct parts *best)
{
    struct cuts c = {0};
    enum status status = cuts_find(s, z, &c);
    if (c.count)
        cuts_rank(s, z, &c);
    c.count = is_vast(z) && c.count > 2 ? 2 : c.count;
    for (size_t i = 0; !status && i < c.count && s->used < s->allowed; i++) {
        if (!zone_go_on(s->w))
            break;
        struct parts p;
        status = split(s, z, c.list[i], &p);
        if (status)
            break;
        const double limit = best->count ? best->cost : z->slab.cost;
        if (p.count > 1 && p.cost < limit - 1e-6) {
            parts_free(best);
            *best = p;
            if (s->trying && !is_broken(best))
                break; /* good enough among many */
        } else {
            parts_free(&p);
        }
    }
    free(c.list);
    return status;
}

/* What a split costs when each part that breaks a rule is split once more. */
static enum status cost_of_pair(struct search *s, const struct parts *p, double *cost)
{
    enum status status = STATUS_OK;
    *cost = p->cost;
    for (size_t i = 0; !status && i < p->count; i++) {
        struct parts more = {0};
        if (!p->zones[i].slab.broken)
            continue;
        status = best_split(s, &p->zones[i], &more);
        if (more.count)
            *cost += more.cost - p->zones[i].slab.cost;
        parts_free(&more);
    }
    return status;
}

/* No single split helps: the first of two that do together. */
static enum status best_pair(struct search *s, const struct zone *z, struct parts *best)
{
    struct cuts c = {0};
    double least = z->slab.cost;
    enum status status = cuts_find(s, z, &c);
    if (c.count)
        cuts_rank(s, z, &c);
    for (size_t i = 0; !status && i < c.count && s->used < s->allowed && zone_go_on(s->w); i++) {
        struct parts p;
        double cost = INFINITY;
        status = split(s, z, c.list[i], &p);
        if (status)
            break;
        if (p.count > 1)
            status = cost_of_pair(s, &p, &cost);
        if (!status && cost < least - 1e-6) {
            least = cost;
            parts_free(best);
            *best = p;
        } else {
            parts_free(&p);
        }
    }
    free(c.list);
    return status;
}

static enum status solve_zone(struct search *s, struct zone *z, int depth)
{
    struct parts best = {0};
    enum status status = STATUS_OK;
    if (z->slab.broken && depth < DEEPEST && s->used < s->allowed)
        status = best_split(s, z, &best);
    if (!status && !best.count && z->slab.broken && depth < DEEPEST && s->used < s->allowed)
        status = best_pair(s, z, &best);
    if (!status && !best.count && z->slab.broken && zone_go_on(s->w)) {
        status = zone_lay_out(s, z, RECT_FINE);
    }
    if (!status && !best.count) {
        s->w->cost += z->slab.cost;
        s->w->broken += z->slab.broken;
        status = zone_take(s, z);
    }
    if (!status && best.count) {
        s->w->cost += cut_cost(z, best.cut);
        status = cut_take(s, z, best.cut);
    }
    for (size_t i = 0; !status && i < best.count; i++) {
        struct zone *part = &best.zones[i];
        if (part->slab.broken)
            status = zone_lay_out(s, part, RECT_FULL);
        if (!status)
            status = solve_zone(s, part, depth + 1);
    }
    parts_free(&best);
    return status;
}

/* Panels if none is smaller than it must be. */
static double least_panels(const struct work *w)
{
    const struct work_ring *r = &w->rings[0];
    double area = 0;
    for (size_t i = 0; i < r->count; i++) {
        const size_t k = (i + 1) % r->count;
        area += ((double)r->x[i] * (double)r->y[k] - (double)r->x[k] * (double)r->y[i]) / 2;
    }
    return fabs(area) / w->slab.rules.side[0] / w->slab.rules.side[1];
}

bool zone_is_many(const struct work *w, struct rect_edge *const edges[2], const size_t count[2])
{
    (void)edges;
    return w->box_count + (count[0] + count[1]) / 4 > 7 && least_panels(w) > 150;
}

bool zone_is_vast(const struct work *w)
{
    return least_panels(w) > 1500;
}

enum status zone_search(struct search *s, struct zone *z)
{
    return solve_zone(s, z, 0);
}

enum status zone_solve(struct work *w, struct rect_edge *const edges[2], const size_t count[2],
                       bool parted)
{
    struct search s = {.w = w, .allowed = w->slab.allowed / 2};
    const uint64_t left =
        w->slab.evaluations < w->slab.allowed ? w->slab.allowed - w->slab.evaluations : 0;
    struct outline_edges whole = {{edges[0], edges[1]}, {count[0], count[1]}};
    struct parts p = {0};
    s.allowed = s.allowed < left ? s.allowed : left;
    w->cost = 0;
    w->broken = w->cut_count = 0;
    free(w->chords);
    free(w->panels);
    w->chords = NULL;
    w->panels = NULL;
    w->chord_count = w->panel_count = 0;
    enum status status = place_index_boxes(w) ? STATUS_OK : STATUS_NO_MEMORY;
    if (!status)
        status = parted ? parts_build(&s, &p, &whole) : parts_add(&s, &p, &whole, RECT_FULL);
    if (!status && parted)
        status = partition_solve(&s, &p);
    for (size_t i = 0; !status && !parted && i < p.count; i++)
        status = solve_zone(&s, &p.zones[i], 0);
    w->slab.evaluations += s.used;
    parts_free(&p);
    if (!status && parted && !place_index_boxes(w))
        status = STATUS_NO_MEMORY;
    if (!status) {
        zone_relabel_cuts(w);
        w->broken += zone_mark_faults(w);
    }
    return status;
}
