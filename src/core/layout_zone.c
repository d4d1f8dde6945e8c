/* Zones: where lines common to the whole slab break a rule, construction joints close parts of it
 * and each part is laid out alone (design, "Zone at construction/isolation joints"). */
#include "core/layout_zone.h"
#include "core/layout_place.h"
#include <math.h>
#include <stdlib.h>
#include <string.h>

/* Own weight (design, "Invented weights"): a metre of construction joint beside one of contraction.
 */
static const double construction_weight = 2.5;
enum { DEEPEST = 12 };

struct outline_edges {
    struct rect_edge *list[2];
    size_t count[2];
};
struct zone {
    struct outline_edges edges;
    struct rect_slab slab;
};
struct cut {
    int axis;
    int64_t u;
    bool given; /* a construction or isolation joint runs there anyhow */
    double off; /* from the middle of the zone, as a share of its size */
};
struct parts {
    struct zone *zones;
    size_t count;
    double cost;
    struct cut cut;
};
struct search {
    struct work *w;
    uint64_t used, allowed;
    size_t chord_room, panel_room;
};

static void edges_free(struct outline_edges *e)
{
    free(e->list[0]);
    free(e->list[1]);
    *e = (struct outline_edges){0};
}

static void parts_free(struct parts *p)
{
    for (size_t i = 0; i < p->count; i++) {
        edges_free(&p->zones[i].edges);
        rect_free(&p->zones[i].slab);
    }
    free(p->zones);
    *p = (struct parts){0};
}

static bool edges_room(struct outline_edges *e, size_t a, size_t b)
{
    e->list[0] = calloc(a + 1, sizeof *e->list[0]);
    e->list[1] = calloc(b + 1, sizeof *e->list[1]);
    if (e->list[0] && e->list[1])
        return true;
    edges_free(e);
    return false;
}

static void add_edge(struct outline_edges *e, int axis, int64_t u, int64_t v0, int64_t v1)
{
    if (v0 < v1)
        e->list[axis][e->count[axis]++] = (struct rect_edge){u, v0, v1};
}

static bool zone_holds(const struct rect_slab *slab, int64_t x, int64_t y)
{
    for (size_t i = 0; i < slab->family[0].arc_count; i++) {
        const struct rect_arc *a = &slab->family[0].arcs[i];
        if (a->u0 <= x && x <= a->u1 && a->v0 <= y && y <= a->v1)
            return true;
    }
    return false;
}

enum status zone_build(struct work *w, struct rect_edge *const edges[2], const size_t count[2],
                       struct rect_slab *slab)
{
    slab->rules = w->slab.rules;
    slab->allowed = w->slab.allowed;
    slab->bans = w->bans;
    slab->ban_count = w->ban_count;
    enum status status = rect_build(slab, edges, count);
    if (status)
        return status;
    place_force_lines(w, slab);
    for (size_t i = 0; !status && i < w->box_count; i++) {
        const struct work_box *b = &w->boxes[i];
        struct rect_box box = {.x = b->x, .y = b->y};
        memcpy(box.tip, b->tip, sizeof box.tip);
        if (!b->dropped && zone_holds(slab, b->x, b->y))
            status = rect_add_box(slab, &box);
    }
    return status;
}

/* Arcs that hang together over gates: the number of their part for each, and how many parts. */
static size_t find_parts(const struct rect_family *f, size_t *part)
{
    size_t n = 0;
    for (size_t i = 0; i < f->arc_count; i++)
        part[i] = i;
    for (bool again = true; again;) {
        again = false;
        for (size_t i = 0; i < f->gate_count; i++) {
            size_t *a = &part[f->gates[i].left], *b = &part[f->gates[i].right];
            if (*a == *b)
                continue;
            again = true;
            *a = *b = *a < *b ? *a : *b;
        }
    }
    for (size_t i = 0; i < f->arc_count; i++)
        part[i] = part[i] == i ? n++ : part[part[i]];
    return n;
}

/* Evaluations one region may use: a part of what is left. */
static uint64_t share_of(const struct search *s)
{
    const uint64_t left = s->used < s->allowed ? s->allowed - s->used : 0;
    return left / 8;
}

static enum status add_zone(struct search *s, struct parts *p, const struct rect_family *f,
                            const size_t *part, size_t number, enum rect_depth deep)
{
    struct zone *more = realloc(p->zones, (p->count + 1) * sizeof *more);
    if (!more)
        return STATUS_NO_MEMORY;
    p->zones = more;
    struct zone *z = &more[p->count++];
    *z = (struct zone){0};
    if (!edges_room(&z->edges, 2 * f->arc_count, 2 * f->arc_count))
        return STATUS_NO_MEMORY;
    for (size_t i = 0; i < f->arc_count; i++) {
        const struct rect_arc *a = &f->arcs[i];
        if (part[i] != number)
            continue;
        add_edge(&z->edges, 0, a->u0, a->v0, a->v1);
        add_edge(&z->edges, 0, a->u1, a->v0, a->v1);
        add_edge(&z->edges, 1, a->v0, a->u0, a->u1);
        add_edge(&z->edges, 1, a->v1, a->u0, a->u1);
    }
    enum status status = zone_build(s->w, z->edges.list, z->edges.count, &z->slab);
    z->slab.allowed = share_of(s);
    if (!status)
        status = rect_solve(&z->slab, deep);
    s->used += z->slab.evaluations;
    p->cost += z->slab.cost;
    return status;
}

/* The parts of a region that hang together, each laid out. */
static enum status add_zones(struct search *s, struct parts *p, const struct outline_edges *edges,
                             enum rect_depth deep)
{
    struct rect_slab whole = {.rules = s->w->slab.rules};
    enum status status = rect_build(&whole, edges->list, edges->count);
    size_t *part = calloc(whole.family[0].arc_count + 1, sizeof *part);
    if (!status && !part)
        status = STATUS_NO_MEMORY;
    const size_t n = status ? 0 : find_parts(&whole.family[0], part);
    for (size_t i = 0; !status && i < n; i++)
        status = add_zone(s, p, &whole.family[0], part, i, deep);
    free(part);
    rect_free(&whole);
    return status;
}

static int compare_int64(const void *a, const void *b)
{
    const int64_t p = *(const int64_t *)a, q = *(const int64_t *)b;
    return (p > q) - (p < q);
}

/* The region on one side of the line at u: its sides cut off there, and the line itself. */
static enum status clip(const struct outline_edges *edges, int axis, int64_t u, bool high,
                        struct outline_edges *out)
{
    const size_t own = edges->count[axis], across = edges->count[1 - axis];
    int64_t *v = calloc(across + 1, sizeof *v);
    if (!v || !edges_room(out, own + across, own + across)) {
        free(v);
        return STATUS_NO_MEMORY;
    }
    size_t n = 0;
    for (size_t i = 0; i < own; i++) {
        const struct rect_edge e = edges->list[axis][i];
        if (high ? e.u > u : e.u < u)
            add_edge(out, axis, e.u, e.v0, e.v1);
    }
    for (size_t i = 0; i < across; i++) {
        const struct rect_edge e = edges->list[1 - axis][i];
        if (high ? e.v0 <= u && u < e.v1 : e.v0 < u && u <= e.v1)
            v[n++] = e.u;
        add_edge(out, 1 - axis, e.u, high && e.v0 < u ? u : e.v0, !high && e.v1 > u ? u : e.v1);
    }
    qsort(v, n, sizeof *v, compare_int64);
    for (size_t i = 0; i + 1 < n; i += 2)
        add_edge(out, axis, u, v[i], v[i + 1]);
    free(v);
    return STATUS_OK;
}

static double cut_length(const struct rect_family *f, int64_t u)
{
    double length = 0;
    for (size_t i = 0; i < f->arc_count; i++)
        if (f->arcs[i].u0 < u && u < f->arcs[i].u1)
            length += (double)(f->arcs[i].v1 - f->arcs[i].v0);
    for (size_t i = 0; i < f->gate_count; i++)
        if (f->gates[i].u == u)
            length += (double)(f->gates[i].v1 - f->gates[i].v0);
    return length / LAYOUT_UNIT;
}

static double cut_cost(const struct zone *z, struct cut cut)
{
    return cut_length(&z->slab.family[cut.axis], cut.u) * (cut.given ? 1 : construction_weight);
}

static enum status split(struct search *s, const struct zone *z, struct cut cut, struct parts *p)
{
    *p = (struct parts){.cut = cut};
    enum status status = STATUS_OK;
    for (int high = 0; !status && high < 2; high++) {
        struct outline_edges half = {0};
        status = clip(&z->edges, cut.axis, cut.u, high, &half);
        if (!status)
            status = add_zones(s, p, &half, RECT_QUICK);
        edges_free(&half);
    }
    p->cost += cut_cost(z, cut);
    if (status)
        parts_free(p);
    return status;
}

struct cuts {
    struct cut *list;
    size_t count;
};

/* A cut keeps clear of the boxes it does not halve. */
static bool is_clear(const struct zone *z, int axis, int64_t u)
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
static bool is_kept(const struct work *w, struct cut cut)
{
    for (size_t i = 0; i < w->line_count; i++)
        if (w->lines[i].labels && w->lines[i].axis == cut.axis && w->lines[i].u == cut.u &&
            w->lines[i].kind == LAYOUT_CONTRACTION)
            return true;
    return false;
}

static void add_cut(const struct search *s, const struct zone *z, struct cuts *c, struct cut cut)
{
    if (is_kept(s->w, cut))
        return;
    if (cut_length(&z->slab.family[cut.axis], cut.u) <= 0 || !is_clear(z, cut.axis, cut.u))
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

/* Where the zone may be cut: joints that must be there anyhow, lines of boxes and inside corners,
 * and half-way between any two of these. */
static enum status find_cuts(const struct search *s, const struct zone *z, struct cuts *c)
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
        qsort(at, n, sizeof *at, compare_int64);
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

static enum status add_chord(struct search *s, struct rect_chord chord)
{
    struct work *w = s->w;
    if (w->chord_count == s->chord_room) {
        const size_t room = s->chord_room ? 2 * s->chord_room : 64;
        struct rect_chord *more = realloc(w->chords, room * sizeof *more);
        if (!more)
            return STATUS_NO_MEMORY;
        w->chords = more;
        s->chord_room = room;
    }
    w->chords[w->chord_count++] = chord;
    return STATUS_OK;
}

/* The zone as it is becomes part of the plan. */
static enum status take(struct search *s, const struct zone *z)
{
    struct rect_chord *chords = NULL;
    struct rect_panel *panels = NULL;
    size_t n = 0, m = 0;
    enum status status = rect_chords(&z->slab, &chords, &n);
    for (size_t i = 0; !status && i < n; i++)
        status = add_chord(s, chords[i]);
    if (!status)
        status = rect_panels(&z->slab, &panels, &m);
    if (!status && m) {
        struct work *w = s->w;
        struct rect_panel *more = realloc(w->panels, (w->panel_count + m) * sizeof *more);
        status = more ? STATUS_OK : STATUS_NO_MEMORY;
        if (more) {
            memcpy(more + w->panel_count, panels, m * sizeof *more);
            w->panels = more;
            w->panel_count += m;
        }
    }
    free(chords);
    free(panels);
    return status;
}

static enum status take_cut(struct search *s, const struct zone *z, struct cut cut)
{
    const struct rect_family *f = &z->slab.family[cut.axis];
    enum status status = STATUS_OK;
    for (size_t i = 0; !status && i < f->arc_count + f->gate_count; i++) {
        struct rect_chord c = {.axis = cut.axis, .u = cut.u};
        if (i < f->arc_count) {
            if (!(f->arcs[i].u0 < cut.u && cut.u < f->arcs[i].u1))
                continue;
            c.v0 = f->arcs[i].v0;
            c.v1 = f->arcs[i].v1;
        } else {
            const struct rect_gate *g = &f->gates[i - f->arc_count];
            if (g->u != cut.u)
                continue;
            c.v0 = g->v0;
            c.v1 = g->v1;
        }
        status = add_chord(s, c);
        const struct work_line line = {.axis = cut.axis,
                                       .u = cut.u,
                                       .v0 = c.v0,
                                       .v1 = c.v1,
                                       .kind = LAYOUT_CONSTRUCTION,
                                       .labels = true,
                                       .program = true,
                                       .name = "a construction joint the program put in"};
        if (!status && !cut.given)
            status = work_line_add(s->w, line) ? STATUS_OK : STATUS_NO_MEMORY;
        s->w->cut_count += !cut.given;
    }
    return status;
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
static void rank_cuts(const struct search *s, const struct zone *z, struct cuts *c)
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
    const struct rect_family *f = &z->slab.family[0];
    double area = 0;
    for (size_t i = 0; i < f->arc_count; i++)
        area += (double)(f->arcs[i].u1 - f->arcs[i].u0) * (double)(f->arcs[i].v1 - f->arcs[i].v0);
    return area > 1500 * z->slab.rules.side[0] * z->slab.rules.side[1];
}

static enum status best_split(struct search *s, const struct zone *z, struct parts *best)
{
    struct cuts c = {0};
    enum status status = find_cuts(s, z, &c);
    if (c.count)
        rank_cuts(s, z, &c);
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
    enum status status = find_cuts(s, z, &c);
    if (c.count)
        rank_cuts(s, z, &c);
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
        z->slab.evaluations = 0;
        z->slab.allowed = share_of(s);
        status = rect_solve(&z->slab, RECT_FINE);
        s->used += z->slab.evaluations;
    }
    if (!status && !best.count) {
        s->w->cost += z->slab.cost;
        s->w->broken += z->slab.broken;
        status = take(s, z);
    }
    if (!status && best.count) {
        s->w->cost += cut_cost(z, best.cut);
        status = take_cut(s, z, best.cut);
    }
    for (size_t i = 0; !status && i < best.count; i++) {
        struct zone *part = &best.zones[i];
        if (part->slab.broken) {
            part->slab.evaluations = 0;
            part->slab.allowed = share_of(s);
            status = rect_solve(&part->slab, RECT_FULL);
            s->used += part->slab.evaluations;
        }
        if (!status)
            status = solve_zone(s, part, depth + 1);
    }
    parts_free(&best);
    return status;
}

/* Does a chord square to the line end on it at v, coming from the low or from the high side? */
static bool comes_from(const struct work *w, const struct work_line *l, int64_t v, bool low)
{
    const struct rect_chord key = {.axis = 1 - l->axis, .u = v, .v0 = INT64_MIN};
    const struct rect_chord *at = rect_chord_from(w->chords, w->chord_count, &key);
    for (; at < w->chords + w->chord_count && at->axis == key.axis && at->u == v; at++)
        if ((low ? at->v1 : at->v0) == l->u)
            return true;
    return false;
}

/* Where every joint goes on across a zone's end, it may be a joint of contraction as well. */
static void relabel_cuts(struct work *w)
{
    rect_sort_chords(w->chords, w->chord_count);
    for (size_t i = 0; i < w->line_count; i++) {
        struct work_line *l = &w->lines[i];
        bool goes_on = l->program && l->labels;
        for (size_t k = 0; goes_on && k < w->chord_count; k++) {
            const struct rect_chord *c = &w->chords[k];
            if (c->axis == l->axis || c->u <= l->v0 || c->u >= l->v1)
                continue;
            if (c->v1 == l->u)
                goes_on = comes_from(w, l, c->u, false);
            else if (c->v0 == l->u)
                goes_on = comes_from(w, l, c->u, true);
        }
        if (goes_on) {
            l->labels = false;
            w->cut_count--;
        }
    }
}

/* Quadrants of a box that lie in the slab. */
static size_t quadrants_of(const struct work_box *b)
{
    return (b->on_x ? 1u : 2u) * (b->on_y ? 1u : 2u);
}

static bool boxes_touch(const struct work_box *a, const struct work_box *b)
{
    const int64_t dx = b->x - a->x, dy = b->y - a->y;
    const double rx = (double)(dx > 0 ? a->tip[1] + b->tip[0] : a->tip[0] + b->tip[1]);
    const double ry = (double)(dy > 0 ? a->tip[3] + b->tip[2] : a->tip[2] + b->tip[3]);
    return fabs((double)dx) / rx + fabs((double)dy) / ry < 1;
}

/* Boxes that are not at the corners of enough panels large enough, or meet another. */
size_t zone_mark_faults(struct work *w)
{
    const struct rect_slab index = {.boxes = w->box_index, .box_count = w->box_count};
    size_t *found = calloc(w->box_count + 1, sizeof *found), faults = 0;
    for (size_t i = 0; found && i < w->panel_count && w->box_count; i++) {
        const struct rect_panel *p = &w->panels[i];
        const int64_t x[4] = {p->x0, p->x1, p->x1, p->x0}, y[4] = {p->y0, p->y0, p->y1, p->y1};
        for (int k = 0; k < 4; k++) {
            const struct rect_box *b = rect_box_at(&index, x[k], y[k]);
            if (b && p->x1 - p->x0 > b->tip[x[k] == p->x0] &&
                p->y1 - p->y0 > b->tip[2 + (y[k] == p->y0)])
                found[b->number]++;
        }
    }
    for (size_t i = 0; found && i < w->box_count; i++) {
        struct work_box *b = &w->boxes[i];
        b->dropped = found[i] < quadrants_of(b);
        for (size_t k = 0; k < i && !b->dropped; k++)
            b->dropped = !w->boxes[k].dropped && boxes_touch(&w->boxes[k], b);
        faults += b->dropped;
    }
    free(found);
    return faults;
}

enum status zone_solve(struct work *w, struct rect_edge *const edges[2], const size_t count[2])
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
        status = add_zones(&s, &p, &whole, RECT_FULL);
    for (size_t i = 0; !status && i < p.count; i++)
        status = solve_zone(&s, &p.zones[i], 0);
    w->slab.evaluations += s.used;
    parts_free(&p);
    if (!status) {
        relabel_cuts(w);
        w->broken += zone_mark_faults(w);
    }
    return status;
}
