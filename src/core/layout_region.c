/* Regions of a rectilinear slab and the parts they fall into when they are cut. */
#include "core/layout_region.h"
#include "core/layout_place.h"
#include "core/layout_rect_cache.h"
#include "core/layout_sort.h"
#include "core/layout_zone.h"
#include <stdlib.h>
#include <string.h>

void edges_free(struct outline_edges *e)
{
    free(e->list[0]);
    free(e->list[1]);
    *e = (struct outline_edges){0};
}

void parts_free(struct parts *p)
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
        struct rect_box box = {.x = b->x, .y = b->y, .number = i};
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

/* Evaluations one region may use: a part of what is left, in steps, so that a zone is most often
 * asked the same question when another has changed. */
uint64_t search_share(const struct search *s)
{
    const uint64_t left = s->used < s->allowed ? s->allowed - s->used : 0;
    uint64_t share = 1;
    while (share <= left / 16)
        share *= 2;
    return left ? share : 0;
}

static enum status add_zone(struct search *s, struct parts *p, const struct rect_family *f,
                            const size_t *part, size_t number)
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
    return zone_build(s->w, z->edges.list, z->edges.count, &z->slab);
}

double zone_panels(const struct zone *z)
{
    const struct rect_family *f = &z->slab.family[0];
    double area = 0;
    for (size_t i = 0; i < f->arc_count; i++)
        area += (double)(f->arcs[i].u1 - f->arcs[i].u0) * (double)(f->arcs[i].v1 - f->arcs[i].v0);
    return area / z->slab.rules.side[0] / z->slab.rules.side[1];
}

enum status zone_lay_out(struct search *s, struct zone *z, enum rect_depth deep)
{
    z->slab.evaluations = 0;
    z->slab.allowed = search_share(s);
    const enum status status = rect_solve_cached(s->w->input->cache, &z->slab, deep);
    s->used += z->slab.evaluations;
    return status;
}

enum status parts_build(struct search *s, struct parts *p, const struct outline_edges *edges)
{
    struct rect_slab whole = {.rules = s->w->slab.rules};
    enum status status = rect_build(&whole, edges->list, edges->count);
    size_t *part = calloc(whole.family[0].arc_count + 1, sizeof *part);
    if (!status && !part)
        status = STATUS_NO_MEMORY;
    const size_t n = status ? 0 : find_parts(&whole.family[0], part);
    for (size_t i = 0; !status && i < n; i++)
        status = add_zone(s, p, &whole.family[0], part, i);
    free(part);
    rect_free(&whole);
    return status;
}

enum status parts_add(struct search *s, struct parts *p, const struct outline_edges *edges,
                      enum rect_depth deep)
{
    const size_t first = p->count;
    enum status status = parts_build(s, p, edges);
    for (size_t i = first; !status && i < p->count; i++) {
        status = zone_lay_out(s, &p->zones[i], deep);
        p->cost += p->zones[i].slab.cost;
    }
    return status;
}

/* The region on one side of the line at u: its sides cut off there, and the line itself. */
enum status region_clip(const struct outline_edges *edges, int axis, int64_t u, bool high,
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
    sort_int64(v, n);
    for (size_t i = 0; i + 1 < n; i += 2)
        add_edge(out, axis, u, v[i], v[i + 1]);
    free(v);
    return STATUS_OK;
}

double cut_length(const struct zone *z, int axis, int64_t u)
{
    const struct rect_family *f = &z->slab.family[axis];
    double length = 0;
    for (size_t i = 0; i < f->arc_count; i++)
        if (f->arcs[i].u0 < u && u < f->arcs[i].u1)
            length += (double)(f->arcs[i].v1 - f->arcs[i].v0);
    for (size_t i = 0; i < f->gate_count; i++)
        if (f->gates[i].u == u)
            length += (double)(f->gates[i].v1 - f->gates[i].v0);
    return length / LAYOUT_UNIT;
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
enum status zone_take(struct search *s, const struct zone *z)
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

enum status cut_take(struct search *s, const struct zone *z, struct cut cut)
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
