/* Families of arcs and gates, forced positions, chords, panels. */
#include "core/layout_rect_solve.h"
#include "core/layout_sort.h"
#include <stdlib.h>
#include <string.h>

/* The cross-section at u = mid/2: pairs of v, even-odd, empty ones dropped. */
static size_t cross_section(const struct rect_edge *across, size_t count, int64_t twice_u,
                            int64_t *v)
{
    size_t n = 0, kept = 0;
    for (size_t i = 0; i < count; i++)
        if (2 * across[i].v0 < twice_u && twice_u < 2 * across[i].v1)
            v[n++] = across[i].u;
    sort_int64(v, n);
    for (size_t i = 0; i + 1 < n; i += 2)
        if (v[i] < v[i + 1]) {
            if (kept && v[kept - 1] == v[i]) {
                v[kept - 1] = v[i + 1];
                continue;
            }
            v[kept] = v[i];
            v[kept + 1] = v[i + 1];
            kept += 2;
        }
    return kept;
}

struct sweep {
    struct rect_family *family;
    size_t arc_room, gate_room;
    size_t *live, *next; /* arcs of the last and of this cross-section */
    size_t live_count;
};

static bool add_arc(struct sweep *s, int64_t u0, int64_t u1, int64_t v0, int64_t v1)
{
    struct rect_family *f = s->family;
    if (f->arc_count == s->arc_room) {
        const size_t room = s->arc_room ? 2 * s->arc_room : 16;
        struct rect_arc *more = realloc(f->arcs, room * sizeof *more);
        if (!more)
            return false;
        f->arcs = more;
        s->arc_room = room;
    }
    f->arcs[f->arc_count++] = (struct rect_arc){.u0 = u0, .u1 = u1, .v0 = v0, .v1 = v1};
    return true;
}

static bool add_gate(struct sweep *s, size_t left, size_t right, int64_t u)
{
    struct rect_family *f = s->family;
    const struct rect_arc *a = &f->arcs[left], *b = &f->arcs[right];
    const int64_t v0 = a->v0 > b->v0 ? a->v0 : b->v0, v1 = a->v1 < b->v1 ? a->v1 : b->v1;
    if (v0 >= v1)
        return true;
    if (f->gate_count == s->gate_room) {
        const size_t room = s->gate_room ? 2 * s->gate_room : 16;
        struct rect_gate *more = realloc(f->gates, room * sizeof *more);
        if (!more)
            return false;
        f->gates = more;
        s->gate_room = room;
    }
    f->gates[f->gate_count++] =
        (struct rect_gate){.u = u, .v0 = v0, .v1 = v1, .left = left, .right = right};
    return true;
}

/* One strip of the sweep: intervals that go on extend their arc, the others begin new ones. */
static bool sweep_strip(struct sweep *s, int64_t u0, int64_t u1, const int64_t *v, size_t n)
{
    size_t count = 0;
    for (size_t i = 0; i < n; i += 2) {
        size_t same = SIZE_MAX;
        for (size_t k = 0; k < s->live_count; k++) {
            const struct rect_arc *a = &s->family->arcs[s->live[k]];
            if (a->u1 == u0 && a->v0 == v[i] && a->v1 == v[i + 1])
                same = s->live[k];
        }
        if (same != SIZE_MAX) {
            s->family->arcs[same].u1 = u1;
        } else {
            if (!add_arc(s, u0, u1, v[i], v[i + 1]))
                return false;
            same = s->family->arc_count - 1;
            for (size_t k = 0; k < s->live_count; k++)
                if (s->family->arcs[s->live[k]].u1 == u0 && !add_gate(s, s->live[k], same, u0))
                    return false;
        }
        s->next[count++] = same;
    }
    memcpy(s->live, s->next, count * sizeof *s->live);
    s->live_count = count;
    return true;
}

static enum status build_family(struct rect_family *family, const struct rect_edge *own,
                                size_t own_count, const struct rect_edge *across,
                                size_t across_count)
{
    int64_t *events = calloc(own_count + 1, sizeof *events);
    int64_t *v = calloc(across_count + 2, sizeof *v);
    size_t *live = calloc(2 * across_count + 4, sizeof *live);
    struct sweep s = {.family = family, .live = live};
    bool fine = events && v && live;
    if (fine) {
        s.next = live + across_count + 2;
        for (size_t i = 0; i < own_count; i++)
            events[i] = own[i].u;
        const size_t n = sort_unique(events, own_count);
        for (size_t i = 0; fine && i + 1 < n; i++)
            fine = sweep_strip(&s, events[i], events[i + 1], v,
                               cross_section(across, across_count, events[i] + events[i + 1], v));
    }
    free(events);
    free(v);
    free(live);
    return fine ? STATUS_OK : STATUS_NO_MEMORY;
}

static size_t gate_at(const struct rect_family *f, int64_t u, int64_t v)
{
    for (size_t i = 0; i < f->gate_count; i++)
        if (f->gates[i].u == u && (f->gates[i].v0 == v || f->gates[i].v1 == v))
            return i;
    return SIZE_MAX;
}

static bool end_corners(const struct rect_slab *slab, int axis, size_t gate, size_t ends[2])
{
    size_t n = 0;
    for (size_t i = 0; i < slab->corner_count && n < 2; i++)
        if (slab->corners[i].gate[axis] == gate)
            ends[n++] = i;
    return n > 0;
}

static void join_groups(struct rect_slab *slab, size_t a, size_t b)
{
    const size_t from = slab->corners[a].group, to = slab->corners[b].group;
    for (size_t i = 0; i < slab->corner_count; i++)
        if (slab->corners[i].group == from)
            slab->corners[i].group = to;
}

/* Two gates at one coordinate beside one arc have a wall between them: its ends are one group. */
static void group_corners(struct rect_slab *slab)
{
    for (int axis = 0; axis < 2; axis++) {
        const struct rect_family *f = &slab->family[axis];
        for (size_t i = 0; i < f->gate_count; i++)
            for (size_t k = i + 1; k < f->gate_count && f->gates[k].u == f->gates[i].u; k++) {
                const struct rect_gate *g = &f->gates[i], *h = &f->gates[k];
                size_t a[2] = {0, 0}, b[2] = {0, 0};
                if ((g->left != h->left && g->right != h->right) ||
                    !end_corners(slab, axis, i, a) || !end_corners(slab, axis, k, b))
                    continue;
                for (int m = 0; m < 4; m++) {
                    const struct rect_corner *p = &slab->corners[a[m / 2]],
                                             *q = &slab->corners[b[m % 2]];
                    const int64_t pv = axis ? p->x : p->y, qv = axis ? q->x : q->y;
                    if ((pv == g->v1 && qv == h->v0) || (pv == g->v0 && qv == h->v1))
                        join_groups(slab, a[m / 2], b[m % 2]);
                }
            }
    }
    slab->group_count = 0;
    for (size_t i = 0; i < slab->corner_count; i++)
        if (slab->corners[i].group == i)
            slab->group_count++;
}

/* A gate's end where the two cross-sections differ is a re-entrant corner. */
static enum status find_corners(struct rect_slab *slab)
{
    const struct rect_family *f = &slab->family[0];
    slab->corners = calloc(2 * f->gate_count + 1, sizeof *slab->corners);
    if (!slab->corners)
        return STATUS_NO_MEMORY;
    for (size_t i = 0; i < 2 * f->gate_count; i++) {
        const struct rect_gate *g = &f->gates[i / 2];
        const struct rect_arc *a = &f->arcs[g->left], *b = &f->arcs[g->right];
        const int64_t y = i % 2 ? g->v1 : g->v0;
        if (i % 2 ? a->v1 == b->v1 : a->v0 == b->v0)
            continue;
        const bool left = i % 2 ? a->v1 == y : a->v0 == y; /* the wall is on the left of u */
        slab->corners[slab->corner_count] = (struct rect_corner){
            .x = g->u, .y = y, .gate = {i / 2, gate_at(&slab->family[1], y, g->u)}};
        slab->corners[slab->corner_count].type = i % 2 ? left : left ? 2 : 3;
        slab->corners[slab->corner_count].group = slab->corner_count;
        slab->corner_count++;
    }
    group_corners(slab);
    return STATUS_OK;
}

/* Gates by the arc they bound, on its low side (0) and its high side (1). */
static enum status index_gates(struct rect_family *f)
{
    for (int side = 0; side < 2; side++) {
        size_t *first = calloc(f->arc_count + 2, sizeof *first);
        size_t *list = calloc(f->gate_count + 1, sizeof *list);
        f->beyond_first[side] = first;
        f->beyond[side] = list;
        if (!first || !list)
            return STATUS_NO_MEMORY;
        for (size_t i = 0; i < f->gate_count; i++)
            first[(side ? f->gates[i].left : f->gates[i].right) + 2]++;
        for (size_t i = 2; i < f->arc_count + 2; i++)
            first[i] += first[i - 1];
        for (size_t i = 0; i < f->gate_count; i++)
            list[first[(side ? f->gates[i].left : f->gates[i].right) + 1]++] = i;
    }
    return STATUS_OK;
}

enum status rect_build(struct rect_slab *slab, struct rect_edge *const edges[2],
                       const size_t count[2])
{
    for (int axis = 0; axis < 2; axis++) {
        enum status status = build_family(&slab->family[axis], edges[axis], count[axis],
                                          edges[1 - axis], count[1 - axis]);
        if (!status)
            status = index_gates(&slab->family[axis]);
        if (status)
            return status;
        slab->family[axis].limit = (int64_t)(slab->rules.side[axis] + 0.5);
    }
    return find_corners(slab);
}

/* Makes room for u among the forced places of an arc, in order. */
static bool force_in_arc(struct rect_arc *a, int64_t u, int64_t low, int64_t high)
{
    size_t at = 0;
    while (at < a->forced_count && a->forced[at] < u)
        at++;
    if (at == a->forced_count || a->forced[at] != u) {
        int64_t *more = realloc(a->forced, (a->forced_count + 1) * sizeof *more);
        if (!more)
            return false;
        a->forced = more;
        int64_t(*room)[2] = realloc(a->room, (a->forced_count + 1) * sizeof *room);
        if (!room)
            return false;
        a->room = room;
        memmove(more + at + 1, more + at, (a->forced_count - at) * sizeof *more);
        memmove(room + at + 1, room + at, (a->forced_count - at) * sizeof *room);
        more[at] = u;
        room[at][0] = room[at][1] = 0;
        a->forced_count++;
    }
    a->room[at][0] = low > a->room[at][0] ? low : a->room[at][0];
    a->room[at][1] = high > a->room[at][1] ? high : a->room[at][1];
    return true;
}

static bool force_room(struct rect_slab *slab, int axis, int64_t u, int64_t v, int64_t low,
                       int64_t high)
{
    struct rect_family *f = &slab->family[axis];
    for (size_t i = 0; i < f->arc_count; i++) {
        struct rect_arc *a = &f->arcs[i];
        if (v < a->v0 || v > a->v1)
            continue;
        if (a->u0 == u && high > a->end_room[0])
            a->end_room[0] = high;
        if (a->u1 == u && low > a->end_room[1])
            a->end_room[1] = low;
    }
    for (size_t i = 0; i < f->gate_count; i++)
        if (f->gates[i].u == u && f->gates[i].v0 <= v && v <= f->gates[i].v1) {
            f->gates[i].forced = f->gates[i].on = true;
            return true;
        }
    for (size_t i = 0; i < f->arc_count; i++) {
        struct rect_arc *a = &f->arcs[i];
        if (a->u0 < u && u < a->u1 && a->v0 <= v && v <= a->v1)
            return force_in_arc(a, u, low, high);
    }
    return false;
}

bool rect_force(struct rect_slab *slab, int axis, int64_t u, int64_t v)
{
    return force_room(slab, axis, u, v, 0, 0);
}

static int compare_box(const void *a, const void *b)
{
    const struct rect_box *p = a, *q = b;
    if (p->x != q->x)
        return p->x < q->x ? -1 : 1;
    return (p->y > q->y) - (p->y < q->y);
}

void rect_sort_boxes(struct rect_box *boxes, size_t count)
{
    if (count)
        qsort(boxes, count, sizeof *boxes, compare_box);
}

enum status rect_add_box(struct rect_slab *slab, const struct rect_box *box)
{
    struct rect_box *more = realloc(slab->boxes, (slab->box_count + 1) * sizeof *more);
    if (!more)
        return STATUS_NO_MEMORY;
    slab->boxes = more;
    size_t at = slab->box_count++;
    for (; at > 0 && compare_box(&more[at - 1], box) > 0; at--)
        more[at] = more[at - 1];
    more[at] = *box;
    for (int k = 0; k < 4; k++)
        slab->longest_tip = box->tip[k] > slab->longest_tip ? box->tip[k] : slab->longest_tip;
    force_room(slab, 0, box->x, box->y, box->tip[0], box->tip[1]);
    force_room(slab, 1, box->y, box->x, box->tip[2], box->tip[3]);
    return STATUS_OK;
}

const struct rect_box *rect_box_at(const struct rect_slab *slab, int64_t x, int64_t y)
{
    const struct rect_box key = {.x = x, .y = y};
    if (!slab->box_count)
        return NULL;
    return bsearch(&key, slab->boxes, slab->box_count, sizeof key, compare_box);
}

static int compare_chord(const void *a, const void *b)
{
    const struct rect_chord *p = a, *q = b;
    if (p->axis != q->axis)
        return p->axis - q->axis;
    if (p->u != q->u)
        return p->u < q->u ? -1 : 1;
    return (p->v0 > q->v0) - (p->v0 < q->v0);
}

void rect_sort_chords(struct rect_chord *chords, size_t count)
{
    if (count)
        qsort(chords, count, sizeof *chords, compare_chord);
}

const struct rect_chord *rect_chord_from(const struct rect_chord *chords, size_t count,
                                         const struct rect_chord *key)
{
    size_t low = 0, high = count;
    while (low < high) {
        const size_t mid = (low + high) / 2;
        if (compare_chord(&chords[mid], key) < 0)
            low = mid + 1;
        else
            high = mid;
    }
    return chords + low;
}

enum status rect_chords(const struct rect_slab *slab, struct rect_chord **chords, size_t *count)
{
    size_t n = 0;
    for (int axis = 0; axis < 2; axis++) {
        const struct rect_family *f = &slab->family[axis];
        n += f->gate_count;
        for (size_t i = 0; i < f->arc_count; i++)
            n += f->arcs[i].cut_count;
    }
    struct rect_chord *list = calloc(n + 1, sizeof *list);
    if (!list)
        return STATUS_NO_MEMORY;
    n = 0;
    for (int axis = 0; axis < 2; axis++) {
        const struct rect_family *f = &slab->family[axis];
        for (size_t i = 0; i < f->gate_count; i++)
            if (f->gates[i].on)
                list[n++] =
                    (struct rect_chord){axis, f->gates[i].u, f->gates[i].v0, f->gates[i].v1};
        for (size_t i = 0; i < f->arc_count; i++)
            for (size_t k = 0; k < f->arcs[i].cut_count; k++)
                list[n++] =
                    (struct rect_chord){axis, f->arcs[i].cut[k], f->arcs[i].v0, f->arcs[i].v1};
    }
    *chords = list;
    *count = n;
    return STATUS_OK;
}

struct raster {
    int64_t *at[2];
    size_t n[2];
    unsigned char *wall[2]; /* wall[0][x * ny + y]: a line on the low-x side of the cell */
    unsigned char *inside;
};

static size_t index_of(const int64_t *list, size_t count, int64_t value)
{
    size_t lo = 0, hi = count;
    while (lo < hi) {
        const size_t mid = (lo + hi) / 2;
        if (list[mid] < value)
            lo = mid + 1;
        else
            hi = mid;
    }
    return lo;
}

static bool raster_lines(struct raster *r, const struct rect_slab *slab,
                         const struct rect_chord *chords, size_t count)
{
    for (int axis = 0; axis < 2; axis++) {
        const struct rect_family *f = &slab->family[axis];
        r->at[axis] = calloc(count + 2 * f->arc_count + 1, sizeof *r->at[axis]);
        if (!r->at[axis])
            return false;
        size_t n = 0;
        for (size_t i = 0; i < f->arc_count; i++) {
            r->at[axis][n++] = f->arcs[i].u0;
            r->at[axis][n++] = f->arcs[i].u1;
        }
        for (size_t i = 0; i < count; i++)
            if (chords[i].axis == axis)
                r->at[axis][n++] = chords[i].u;
        r->n[axis] = sort_unique(r->at[axis], n);
    }
    const size_t cells = r->n[0] * r->n[1];
    r->wall[0] = calloc(cells, 1);
    r->wall[1] = calloc(cells, 1);
    r->inside = calloc(cells, 1);
    return r->wall[0] && r->wall[1] && r->inside;
}

static void raster_mark(struct raster *r, const struct rect_slab *slab,
                        const struct rect_chord *chords, size_t count)
{
    const size_t ny = r->n[1];
    for (size_t i = 0; i < slab->family[0].arc_count; i++) {
        const struct rect_arc *a = &slab->family[0].arcs[i];
        const size_t x0 = index_of(r->at[0], r->n[0], a->u0),
                     x1 = index_of(r->at[0], r->n[0], a->u1);
        const size_t y0 = index_of(r->at[1], ny, a->v0), y1 = index_of(r->at[1], ny, a->v1);
        for (size_t x = x0; x < x1; x++)
            memset(r->inside + x * ny + y0, 1, y1 - y0);
    }
    for (size_t i = 0; i < count; i++) {
        const int axis = chords[i].axis, o = 1 - axis;
        const size_t u = index_of(r->at[axis], r->n[axis], chords[i].u);
        const size_t a = index_of(r->at[o], r->n[o], chords[i].v0);
        const size_t b = index_of(r->at[o], r->n[o], chords[i].v1);
        for (size_t k = a; k < b; k++)
            r->wall[axis][axis ? k * ny + u : u * ny + k] = 1;
    }
}

/* Grows a rectangle from its lowest, leftmost cell; the faces are rectangles. */
static struct rect_panel raster_take(struct raster *r, size_t x, size_t y)
{
    const size_t ny = r->n[1];
    size_t x1 = x + 1, y1 = y + 1;
    while (x1 + 1 < r->n[0] && r->inside[x1 * ny + y] == 1 && !r->wall[0][x1 * ny + y])
        x1++;
    while (y1 + 1 < ny && r->inside[x * ny + y1] == 1 && !r->wall[1][x * ny + y1])
        y1++;
    for (size_t i = x; i < x1; i++)
        memset(r->inside + i * ny + y, 2, y1 - y);
    return (struct rect_panel){r->at[0][x], r->at[1][y], r->at[0][x1], r->at[1][y1]};
}

static enum status raster_panels(struct raster *r, struct rect_panel **panels, size_t *count)
{
    size_t n = 0, room = 64;
    struct rect_panel *list = calloc(room, sizeof *list);
    for (size_t y = 0; list && y + 1 < r->n[1]; y++)
        for (size_t x = 0; list && x + 1 < r->n[0]; x++) {
            if (r->inside[x * r->n[1] + y] != 1)
                continue;
            if (n == room) {
                struct rect_panel *more = realloc(list, 2 * room * sizeof *list);
                if (!more) {
                    free(list);
                    return STATUS_NO_MEMORY;
                }
                list = more;
                room *= 2;
            }
            list[n++] = raster_take(r, x, y);
        }
    if (!list)
        return STATUS_NO_MEMORY;
    *panels = list;
    *count = n;
    return STATUS_OK;
}

enum status rect_panels(const struct rect_slab *slab, struct rect_panel **panels, size_t *count)
{
    struct rect_chord *chords = NULL;
    size_t n = 0;
    enum status status = rect_chords(slab, &chords, &n);
    if (status)
        return status;
    struct raster r = {0};
    status = STATUS_NO_MEMORY;
    if (raster_lines(&r, slab, chords, n)) {
        raster_mark(&r, slab, chords, n);
        status = raster_panels(&r, panels, count);
    }
    for (int i = 0; i < 2; i++) {
        free(r.at[i]);
        free(r.wall[i]);
    }
    free(r.inside);
    free(chords);
    return status;
}

void rect_free(struct rect_slab *slab)
{
    for (int axis = 0; axis < 2; axis++) {
        for (size_t i = 0; i < slab->family[axis].arc_count; i++) {
            free(slab->family[axis].arcs[i].cut);
            free(slab->family[axis].arcs[i].forced);
            free(slab->family[axis].arcs[i].room);
            rect_forget(&slab->family[axis].arcs[i]);
        }
        for (int side = 0; side < 2; side++) {
            free(slab->family[axis].beyond[side]);
            free(slab->family[axis].beyond_first[side]);
        }
        free(slab->family[axis].arcs);
        free(slab->family[axis].gates);
    }
    free(slab->corners);
    free(slab->boxes);
    *slab = (struct rect_slab){0};
}
