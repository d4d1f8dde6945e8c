/* Many objects on no common lines: the slab is parted by construction joints before anything is
 * laid out, so that each part has few lines to keep. Where to part it is judged by a guess that
 * looks at the gaps between forced lines only: every gap in equal panels, all of them between a
 * least size and the aspect limit times it. The parts are then laid out exactly. */
#include "core/layout_partition.h"
#include "core/layout_place.h"
#include "core/layout_sort.h"
#include "core/layout_zone.h"
#include <math.h>
#include <stdlib.h>
#include <string.h>

/* Own choices: bands of panel sizes tried, more objects than CROWD are parted near the middle only,
 * how often a part is parted again, and objects that may be looked at in earnest at once. */
enum { BANDS = 8, FEW = 2, CROWD = 40, NEAREST = 24, DEEP = 40, GLANCE_ITEMS = 60 };
static const int64_t reach = 24000; /* 0.3 m: design, "Snapping" */

struct frame { /* from, to along x and along y */
    int64_t low[2], high[2];
};
struct item { /* what forces a line at its x and its y */
    int64_t at[2];
    bool corner;
};
struct items {
    struct item *list;
    size_t count, corners;
    int64_t *places; /* room for the places of both axes */
};
struct guess {
    double bad, cost;
};

static struct frame frame_of(const struct zone *z)
{
    struct frame f = {{INT64_MAX, INT64_MAX}, {INT64_MIN, INT64_MIN}};
    for (int axis = 0; axis < 2; axis++)
        for (size_t i = 0; i < z->slab.family[axis].arc_count; i++) {
            const struct rect_arc *a = &z->slab.family[axis].arcs[i];
            f.low[axis] = a->u0 < f.low[axis] ? a->u0 : f.low[axis];
            f.high[axis] = a->u1 > f.high[axis] ? a->u1 : f.high[axis];
        }
    return f;
}

static bool items_of(const struct zone *z, struct items *items)
{
    const size_t n = z->slab.box_count + z->slab.corner_count;
    *items = (struct items){.list = calloc(n + 1, sizeof *items->list),
                            .places = calloc(n + 4, sizeof *items->places)};
    for (size_t i = 0; items->list && i < z->slab.box_count; i++)
        items->list[items->count++] =
            (struct item){{z->slab.boxes[i].x, z->slab.boxes[i].y}, false};
    for (size_t i = 0; items->list && i < z->slab.corner_count; i++)
        items->list[items->count++] =
            (struct item){{z->slab.corners[i].x, z->slab.corners[i].y}, true};
    items->corners = z->slab.corner_count;
    return items->list && items->places;
}

static void items_free(struct items *items)
{
    free(items->list);
    free(items->places);
}

/* Places forced along an axis in a frame, ends too; corners force them along `by` (2 = both).
 * Places nearer than a box may be moved count once. */
static size_t places_of(const struct items *items, const struct frame *f, int axis, int by)
{
    const int o = 1 - axis;
    int64_t *list = items->places;
    size_t n = 0, kept = 1;
    list[n++] = f->low[axis];
    for (size_t i = 0; i < items->count; i++) {
        const struct item *t = &items->list[i];
        if (t->at[axis] <= f->low[axis] || t->at[axis] >= f->high[axis] ||
            (t->corner ? by == o || t->at[o] <= f->low[o] || t->at[o] >= f->high[o]
                       : t->at[o] < f->low[o] || t->at[o] > f->high[o]))
            continue;
        list[n++] = t->at[axis];
    }
    list[n++] = f->high[axis];
    sort_int64(list, n);
    for (size_t i = 1; i + 1 < n; i++)
        if (list[i] - list[kept - 1] > 2 * reach || kept == 1)
            list[kept++] = list[i];
    list[kept++] = list[n - 1];
    return kept;
}

struct band { /* of one axis: panels across, and gaps that no number of equal ones fits */
    double panels[BANDS], bad[BANDS];
};

/* Every attempt weighs a construction joint and steps through the bands in its own way. */
static const double weights[PARTITION_ATTEMPTS] = {2.5, 1, 6, 3};
static const double steps[PARTITION_ATTEMPTS] = {0.06, 0.05, 0.06, 0.045};

static void fill_bands(const struct rect_rules *rules, const int64_t *list, size_t n, int axis,
                       double step, struct band *b)
{
    const double most = fmin(rules->side[0], rules->side[1]);
    for (int k = 0; k < BANDS; k++) {
        const double least = most / rules->aspect * (1 - step * k);
        const double limit = fmin(rules->side[axis], rules->aspect * least);
        b->panels[k] = b->bad[k] = 0;
        for (size_t i = 0; i + 1 < n; i++) {
            const double gap = (double)(list[i + 1] - list[i]);
            const double across = fmax(1, ceil((gap - 80) / limit));
            b->panels[k] += across;
            b->bad[k] += gap / across < least - 80;
        }
    }
}

/* The best band: the fewest panels that would break a rule, then the least metres. */
static struct guess guess_frame(const struct rect_rules *rules, const struct items *items,
                                const struct frame *f, int attempt)
{
    struct guess best = {INFINITY, INFINITY};
    const double w = (double)(f->high[0] - f->low[0]) / LAYOUT_UNIT,
                 h = (double)(f->high[1] - f->low[1]) / LAYOUT_UNIT;
    for (int by = 0; by < (items->corners ? 2 : 1); by++) {
        struct band x, y;
        size_t n = places_of(items, f, 0, by);
        fill_bands(rules, items->places, n, 0, steps[attempt], &x);
        n = places_of(items, f, 1, by);
        fill_bands(rules, items->places, n, 1, steps[attempt], &y);
        for (int k = 0; k < BANDS; k++) {
            const double bad = x.bad[k] * y.panels[k] + y.bad[k] * x.panels[k];
            const double cost = (x.panels[k] - 1) * h + (y.panels[k] - 1) * w;
            if (bad < best.bad - 0.5 || (bad < best.bad + 0.5 && cost < best.cost - 1e-9))
                best = (struct guess){bad, cost};
        }
    }
    return best;
}

/* Boxes that the cut would move onto itself. */
static bool goes_along(const struct work_box *b, const struct layout_object *o, int axis, int64_t u)
{
    const int64_t at = axis ? b->y : b->x;
    if (at == u)
        return true;
    return llabs(at - u) <= reach && !b->held[axis] && !b->on_x && !b->on_y && !o->box_at_given;
}

static bool clear_of_boxes(const struct work *w, const struct zone *z, int axis, int64_t u)
{
    for (size_t i = 0; i < z->slab.box_count; i++) {
        const struct work_box *b = &w->boxes[z->slab.boxes[i].number];
        const int64_t at = axis ? b->y : b->x, least = (int64_t)z->slab.rules.least;
        if (!goes_along(b, &w->input->objects[b->object], axis, u) &&
            u > at - b->tip[2 * axis] - least && u < at + b->tip[2 * axis + 1] + least)
            return false;
    }
    return true;
}

/* A strip beside an edge of the slab would be no panel: half a panel at least, or on the edge. */
static bool clear_of_edges(const struct zone *z, int axis, int64_t u)
{
    const struct rect_family *f = &z->slab.family[axis];
    const int64_t least = (int64_t)(z->slab.rules.side[axis] / 2);
    for (size_t i = 0; i < f->arc_count; i++) {
        const struct rect_arc *a = &f->arcs[i];
        if ((u != a->u0 && llabs(u - a->u0) < least) || (u != a->u1 && llabs(u - a->u1) < least))
            return false;
    }
    return true;
}

struct choice {
    const struct search *s;
    const struct zone *z;
    struct items items;
    struct frame frame;
    struct cut best;
    struct guess guess;
    bool found;
};

static void try_cut(struct choice *c, int axis, int64_t u)
{
    const int attempt = c->s->w->attempt;
    if (u <= c->frame.low[axis] || u >= c->frame.high[axis] || cut_is_kept(c->s->w, axis, u) ||
        !clear_of_edges(c->z, axis, u) || !clear_of_boxes(c->s->w, c->z, axis, u) ||
        cut_length(c->z, axis, u) <= 0)
        return;
    struct frame low = c->frame, high = c->frame;
    low.high[axis] = high.low[axis] = u;
    const struct guess a = guess_frame(&c->z->slab.rules, &c->items, &low, attempt);
    const struct guess b = guess_frame(&c->z->slab.rules, &c->items, &high, attempt);
    const struct guess g = {a.bad + b.bad,
                            a.cost + b.cost + weights[attempt] * cut_length(c->z, axis, u)};
    if (c->found && (g.bad > c->guess.bad + 0.5 ||
                     (g.bad > c->guess.bad - 0.5 && g.cost > c->guess.cost - 1e-9)))
        return;
    c->found = true;
    c->guess = g;
    c->best = (struct cut){.axis = axis, .u = u};
}

/* On every forced line, on the middle of those that come together, and half-way to the next. */
static bool try_axis(struct choice *c, int axis)
{
    const size_t n = places_of(&c->items, &c->frame, axis, 2);
    int64_t *list = calloc(n, sizeof *list);
    if (!list)
        return false;
    for (size_t i = 0; i < n; i++)
        list[i] = c->items.places[i];
    const int64_t mid = c->frame.low[axis] + (c->frame.high[axis] - c->frame.low[axis]) / 2;
    size_t from = 0, to = n - 1;
    while (to - from > NEAREST)
        if (mid - list[from] > list[to] - mid)
            from++;
        else
            to--;
    for (size_t i = from; i < to; i++) {
        const int64_t gap = list[i + 1] - list[i];
        try_cut(c, axis, list[i]);
        try_cut(c, axis, list[i] + gap / 2 / 80 * 80);
        if ((double)gap > 3 * c->z->slab.rules.side[axis]) {
            try_cut(c, axis, list[i] + gap / 4 / 80 * 80);
            try_cut(c, axis, list[i] + gap / 4 * 3 / 80 * 80);
        }
    }
    try_cut(c, axis, list[to]);
    free(list);
    return true;
}

/* A joint that is there anyhow and runs right across; else the cut with the best guess. */
static enum status choose_cut(struct choice *c)
{
    bool fine = true;
    c->frame = frame_of(c->z);
    c->found = cut_given(c->s, c->z, &c->best);
    if (!c->found) {
        fine = items_of(c->z, &c->items);
        const int longer =
            c->frame.high[1] - c->frame.low[1] > c->frame.high[0] - c->frame.low[0] ? 1 : 0;
        fine = fine && try_axis(c, longer);
        if (fine && (c->items.count <= CROWD || !c->found))
            fine = try_axis(c, 1 - longer);
        items_free(&c->items);
    }
    return fine ? STATUS_OK : STATUS_NO_MEMORY;
}

/* Boxes near the cut go onto it and stay there. */
static void move_to_cut(struct work *w, const struct zone *z, struct cut cut)
{
    for (size_t i = 0; i < z->slab.box_count; i++) {
        struct work_box *b = &w->boxes[z->slab.boxes[i].number];
        if (!goes_along(b, &w->input->objects[b->object], cut.axis, cut.u))
            continue;
        if ((cut.axis ? b->y : b->x) != cut.u)
            place_move_box(w, b, cut.axis, cut.u);
        b->held[cut.axis] = true;
    }
}

struct box_place {
    int64_t at;
    struct work_box *box;
};

static int compare_place(const void *a, const void *b)
{
    const struct box_place *p = a, *q = b;
    if (p->at != q->at)
        return p->at < q->at ? -1 : 1;
    return (p->box > q->box) - (p->box < q->box);
}

/* Where the boxes of a cluster meet: a line that one of them holds, a wall's, else the middle. */
static int64_t common_place(const struct rect_slab *slab, int axis, const struct box_place *list,
                            size_t n)
{
    const int64_t low = list[0].at, high = list[n - 1].at;
    for (size_t i = 0; i < n; i++)
        if (list[i].box->held[axis] || (axis ? list[i].box->on_y : list[i].box->on_x))
            return list[i].at;
    for (size_t i = 0; i < slab->corner_count; i++) {
        const int64_t u = axis ? slab->corners[i].y : slab->corners[i].x;
        if (llabs(u - low) <= reach && llabs(u - high) <= reach)
            return u;
    }
    return low == high ? low : low + (high - low) / 2 / 80 * 80;
}

static bool share_line(struct work *w, const struct rect_slab *slab, int axis,
                       const struct box_place *list, size_t n)
{
    const int64_t to = common_place(slab, axis, list, n);
    bool moved = false;
    for (size_t i = 0; i < n; i++) {
        struct work_box *b = list[i].box;
        const bool fixed = w->input->objects[b->object].box_at_given || b->held[axis] ||
                           (axis ? b->on_y : b->on_x);
        if (fixed || list[i].at == to || llabs(list[i].at - to) > 2 * reach)
            continue;
        place_move_box(w, b, axis, to);
        moved = true;
    }
    return moved;
}

/* Boxes of one part whose lines come together share one; from now on they stay. True: some moved.
 */
static bool settle_boxes(struct work *w, const struct zone *z, struct box_place *list)
{
    const size_t n = z->slab.box_count;
    bool moved = false;
    for (int axis = 0; axis < 2; axis++) {
        for (size_t i = 0; i < n; i++) {
            struct work_box *b = &w->boxes[z->slab.boxes[i].number];
            list[i] = (struct box_place){axis ? b->y : b->x, b};
        }
        if (n)
            qsort(list, n, sizeof *list, compare_place);
        for (size_t i = 0, k; i < n; i = k) {
            for (k = i + 1; k < n && list[k].at - list[i].at <= 2 * reach;)
                k++;
            moved |= share_line(w, &z->slab, axis, list + i, k - i);
        }
    }
    for (size_t i = 0; i < n; i++)
        list[i].box->held[0] = list[i].box->held[1] = true;
    return moved;
}

static enum status build_again(struct search *s, struct zone *z)
{
    rect_free(&z->slab);
    return zone_build(s->w, z->edges.list, z->edges.count, &z->slab);
}

/* The boxes of a part as they were before they moved. */
static void put_back(struct work *w, const struct zone *z, const struct work_box *before)
{
    for (size_t i = 0; i < z->slab.box_count; i++) {
        const size_t n = z->slab.boxes[i].number;
        w->boxes[n] = before[n];
    }
}

/* Few panels and corners: all starts take little. */
static bool is_light(const struct zone *z)
{
    return zone_panels(z) * (double)(z->slab.corner_count + 1) < 1500;
}

/* Lays the part out, its boxes on common lines; when a rule gives and it is not the last attempt,
 * they go back to where they were. */
static enum status lay_out(struct search *s, struct zone *z, bool last)
{
    struct work *w = s->w;
    struct work_box *before = calloc(w->box_count + 1, sizeof *before);
    struct box_place *list = calloc(z->slab.box_count + 1, sizeof *list);
    enum status status = before && list ? STATUS_OK : STATUS_NO_MEMORY;
    if (!status && w->box_count)
        memcpy(before, w->boxes, w->box_count * sizeof *before);
    const bool moved = !status && settle_boxes(w, z, list);
    if (moved)
        status = build_again(s, z);
    if (!status)
        status = zone_lay_out(s, z, last ? RECT_QUICK : RECT_GLANCE);
    if (!status && !last && !z->slab.broken && is_light(z))
        status = zone_lay_out(s, z, RECT_QUICK);
    if (!status && !last && z->slab.broken) {
        put_back(w, z, before);
        z->slab.solved = false;
        status = moved ? build_again(s, z) : STATUS_OK;
        z->slab.broken = 1;
    }
    free(list);
    free(before);
    return status;
}

static enum status part_any(struct search *s, struct zone *z, int depth);

static enum status part_halves(struct search *s, struct zone *z, struct cut cut, int depth)
{
    enum status status = cut_take(s, z, cut);
    move_to_cut(s->w, z, cut);
    s->w->cost += cut_cost(z, cut);
    for (int high = 0; !status && high < 2; high++) {
        struct outline_edges half = {0};
        struct parts p = {0};
        status = region_clip(&z->edges, cut.axis, cut.u, high, &half);
        if (!status)
            status = parts_build(s, &p, &half);
        edges_free(&half);
        for (size_t i = 0; !status && i < p.count; i++)
            status = part_any(s, &p.zones[i], depth + 1);
        parts_free(&p);
    }
    return status;
}

static enum status guess_zone(const struct search *s, const struct zone *z, struct guess *guess)
{
    struct items items;
    const struct frame f = frame_of(z);
    const bool fine = items_of(z, &items);
    if (fine)
        *guess = guess_frame(&z->slab.rules, &items, &f, s->w->attempt);
    items_free(&items);
    return fine ? STATUS_OK : STATUS_NO_MEMORY;
}

/* A part that the guess calls hard is looked at in earnest when that takes little. */
static bool is_small(const struct zone *z)
{
    return z->slab.box_count + z->slab.corner_count / 2 <= GLANCE_ITEMS && zone_panels(z) < 2000;
}

static enum status part_zone(struct search *s, struct zone *z, int depth)
{
    struct guess guess = {0};
    struct choice c = {.s = s, .z = z};
    const bool whole = depth >= DEEP || !zone_go_on(s->w);
    enum status status = guess_zone(s, z, &guess);
    z->slab.broken = 1;
    if (!status && !whole && (guess.bad < 0.5 || (is_small(z) && guess.bad < 0.2 * zone_panels(z))))
        status = lay_out(s, z, false);
    if (!status && !whole && z->slab.broken)
        status = choose_cut(&c);
    const bool helps = c.best.given || c.guess.bad < guess.bad - 0.5 ||
                       z->slab.box_count + z->slab.corner_count / 2 > FEW;
    if (!status && c.found && helps)
        return part_halves(s, z, c.best, depth);
    if (!status && z->slab.broken)
        status = lay_out(s, z, true);
    return status ? status : zone_search(s, z);
}

struct state { /* of the plan before an attempt */
    size_t chords, panels, lines, cuts, broken;
    double cost;
    struct work_box *boxes;
};

static void go_back(struct work *w, const struct state *b)
{
    w->chord_count = b->chords;
    w->panel_count = b->panels;
    w->line_count = b->lines;
    w->cut_count = b->cuts;
    w->broken = b->broken;
    w->cost = b->cost;
    if (w->box_count)
        memcpy(w->boxes, b->boxes, w->box_count * sizeof *w->boxes);
}

/* A part small enough is parted in each way until no rule is broken; else in the best of them. */
static enum status attempts(struct search *s, struct zone *z, int depth)
{
    struct work *w = s->w;
    const struct state before = {w->chord_count,
                                 w->panel_count,
                                 w->line_count,
                                 w->cut_count,
                                 w->broken,
                                 w->cost,
                                 calloc(w->box_count + 1, sizeof *w->boxes)};
    enum status status = before.boxes ? STATUS_OK : STATUS_NO_MEMORY;
    size_t least = SIZE_MAX;
    int best = 0;
    if (!status && w->box_count)
        memcpy(before.boxes, w->boxes, w->box_count * sizeof *w->boxes);
    s->trying = true;
    for (int k = 0; !status && k <= PARTITION_ATTEMPTS; k++) {
        const bool last = k == PARTITION_ATTEMPTS || !zone_go_on(w);
        w->attempt = last ? best : k;
        if (k) {
            go_back(w, &before);
            status = build_again(s, z);
        }
        if (!status)
            status = part_zone(s, z, depth);
        if (last || w->broken == before.broken)
            break;
        if (w->broken < least) {
            least = w->broken;
            best = k;
        }
    }
    s->trying = false;
    w->attempt = 0;
    free(before.boxes);
    return status;
}

static enum status part_any(struct search *s, struct zone *z, int depth)
{
    return !s->trying && is_small(z) ? attempts(s, z, depth) : part_zone(s, z, depth);
}

enum status partition_solve(struct search *s, struct parts *p)
{
    enum status status = STATUS_OK;
    for (size_t i = 0; !status && i < p->count; i++)
        status = part_any(s, &p->zones[i], 0);
    return status;
}
