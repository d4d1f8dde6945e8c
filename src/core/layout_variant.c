/* Variants of the boxes: moved onto a common line or not, on the slab edge or off it. The first
 * plan that breaks no rule is kept; else the one with the fewest breaches, then the least cost. */
#include "core/layout_variant.h"
#include "core/layout_place.h"
#include "core/layout_zone.h"
#include <math.h>
#include <stdlib.h>
#include <string.h>

struct kept { /* the best plan so far */
    struct work_box *boxes;
    struct rect_box *box_index;
    struct work_line *lines;
    struct rect_chord *chords;
    struct rect_panel *panels;
    size_t line_count, chord_count, panel_count, cut_count;
};
struct variants {
    struct work *w;
    struct rect_edge *const *edges;
    const size_t *count;
    struct work_box *origin; /* the boxes as the objects stand */
    size_t line_count;       /* lines that no box makes */
    uint64_t allowed;
    /* the best so far */
    bool *keep_off, *stay;
    struct work_box *placed; /* the boxes as they were solved last */
    bool placed_once, same;
    size_t broken;
    double cost;
    struct kept kept;
};

static void kept_free(struct kept *k)
{
    free(k->boxes);
    free(k->box_index);
    free(k->lines);
    free(k->chords);
    free(k->panels);
    *k = (struct kept){0};
}

static void *copy_of(const void *list, size_t count, size_t size)
{
    void *copy = calloc(count + 1, size);
    if (copy && count)
        memcpy(copy, list, count * size);
    return copy;
}

static bool keep(struct variants *v)
{
    const struct work *w = v->w;
    kept_free(&v->kept);
    v->kept = (struct kept){.boxes = copy_of(w->boxes, w->box_count, sizeof *w->boxes),
                            .box_index = copy_of(w->box_index, w->box_count, sizeof *w->box_index),
                            .lines = copy_of(w->lines, w->line_count, sizeof *w->lines),
                            .chords = copy_of(w->chords, w->chord_count, sizeof *w->chords),
                            .panels = copy_of(w->panels, w->panel_count, sizeof *w->panels),
                            .line_count = w->line_count,
                            .chord_count = w->chord_count,
                            .panel_count = w->panel_count,
                            .cut_count = w->cut_count};
    return v->kept.boxes && v->kept.box_index && v->kept.lines && v->kept.chords && v->kept.panels;
}

/* The best plan goes back into the work. */
static void give_back(struct variants *v)
{
    struct work *w = v->w;
    struct kept *k = &v->kept;
    free(w->boxes);
    free(w->box_index);
    free(w->lines);
    free(w->chords);
    free(w->panels);
    w->boxes = k->boxes;
    w->box_index = k->box_index;
    w->lines = k->lines;
    w->line_count = k->line_count;
    w->line_room = k->line_count + 1;
    w->chords = k->chords;
    w->chord_count = k->chord_count;
    w->panels = k->panels;
    w->panel_count = k->panel_count;
    w->cut_count = k->cut_count;
    w->broken = v->broken;
    w->cost = v->cost;
    *k = (struct kept){0};
}

static bool same_places(const struct variants *v)
{
    for (size_t i = 0; i < v->w->box_count; i++) {
        const struct work_box *a = &v->w->boxes[i], *b = &v->placed[i];
        if (a->x != b->x || a->y != b->y || memcmp(a->tip, b->tip, sizeof a->tip))
            return false;
    }
    return true;
}

static enum status try_variant(struct variants *v, const bool *keep_off, const bool *stay,
                               bool parted)
{
    struct work *w = v->w;
    if (w->box_count)
        memcpy(w->boxes, v->origin, w->box_count * sizeof *w->boxes);
    for (size_t i = 0; i < w->box_count; i++) {
        w->boxes[i].keep_off = keep_off[i];
        w->boxes[i].stay = stay[i];
    }
    place_on_edges(w);
    v->same = false;
    if (parted) {
        w->line_count = v->line_count;
        const enum status status = zone_solve(w, v->edges, v->count, true);
        return status || place_name_boxes(w) ? status : STATUS_NO_MEMORY;
    }
    if (!place_snap(w))
        return STATUS_NO_MEMORY;
    v->same = v->placed_once && same_places(v);
    if (v->same)
        return STATUS_OK;
    w->line_count = v->line_count;
    if (!place_name_boxes(w))
        return STATUS_NO_MEMORY;
    v->placed_once = true;
    if (w->box_count)
        memcpy(v->placed, w->boxes, w->box_count * sizeof *w->boxes);
    return zone_solve(w, v->edges, v->count, false);
}

/* Solves it; true in *last when it is the best so far, *gained too; not solved again: as it was. */
static enum status compare(struct variants *v, const bool *keep_off, const bool *stay, bool parted,
                           bool *last, bool *gained)
{
    const enum status status = try_variant(v, keep_off, stay, parted);
    if (v->same)
        return status;
    *last = !status && (v->w->broken < v->broken ||
                        (v->w->broken == v->broken && v->w->cost < v->cost - 1e-6));
    if (*last) {
        memmove(v->keep_off, keep_off, v->w->box_count * sizeof *keep_off);
        memmove(v->stay, stay, v->w->box_count * sizeof *stay);
        v->broken = v->w->broken;
        v->cost = v->w->cost;
        *gained = true;
        if (v->w->box_count && !keep(v))
            return STATUS_NO_MEMORY;
    }
    return status;
}

static enum status try_all_alike(struct variants *v, bool *keep_off, bool *stay, bool *last)
{
    enum status status = STATUS_OK;
    bool gained;
    for (int k = 0; !status && k < 4 && v->broken; k++) {
        if (k && (v->w->slab.evaluations > v->allowed || !zone_go_on(v->w)))
            break;
        memset(keep_off, k & 1, v->w->box_count * sizeof *keep_off);
        memset(stay, k >> 1, v->w->box_count * sizeof *stay);
        status = compare(v, keep_off, stay, false, last, &gained);
    }
    return status;
}

/* One box after another, as long as it helps and effort is left. */
static enum status try_one_by_one(struct variants *v, bool *keep_off, bool *stay, bool *last)
{
    enum status status = STATUS_OK;
    for (bool gained = true; !status && gained && v->broken;) {
        gained = false;
        for (size_t i = 0; !status && i < 2 * v->w->box_count && v->broken; i++) {
            if (v->w->slab.evaluations > v->allowed || !zone_go_on(v->w))
                return status;
            memcpy(keep_off, v->keep_off, v->w->box_count * sizeof *keep_off);
            memcpy(stay, v->stay, v->w->box_count * sizeof *stay);
            bool *one = i % 2 ? &stay[i / 2] : &keep_off[i / 2];
            *one = !*one;
            status = compare(v, keep_off, stay, false, last, &gained);
        }
    }
    return status;
}

/* Parted before it is laid out; then with no box on an edge it need not stand on. */
static enum status try_parted(struct variants *v, bool *keep_off, bool *stay, bool *last)
{
    enum status status = STATUS_OK;
    bool gained;
    for (int k = 0; !status && k < 2 && v->broken; k++) {
        if (k && (v->w->slab.evaluations > v->allowed / 4 || !zone_go_on(v->w)))
            break;
        memset(keep_off, k, v->w->box_count * sizeof *keep_off);
        memset(stay, 0, v->w->box_count * sizeof *stay);
        status = compare(v, keep_off, stay, true, last, &gained);
    }
    return status;
}

enum status variant_solve(struct work *w, struct rect_edge *const edges[2], const size_t count[2])
{
    const size_t n = w->box_count;
    struct variants v = {.w = w,
                         .edges = edges,
                         .count = count,
                         .origin = calloc(n + 1, sizeof *v.origin),
                         .placed = calloc(n + 1, sizeof *v.placed),
                         .keep_off = calloc(n + 1, sizeof *v.keep_off),
                         .stay = calloc(n + 1, sizeof *v.stay),
                         .line_count = w->line_count,
                         .allowed = w->slab.allowed / 8 * 7,
                         .broken = SIZE_MAX};
    bool *keep_off = calloc(n + 1, sizeof *keep_off), *stay = calloc(n + 1, sizeof *stay);
    bool last = false, gained = false;
    enum status status = v.origin && v.placed && v.keep_off && v.stay && keep_off && stay
                             ? STATUS_OK
                             : STATUS_NO_MEMORY;
    const bool many = zone_is_many(w, edges, count);
    if (!status)
        memcpy(v.origin, w->boxes, n * sizeof *v.origin);
    if (!status && many)
        status = try_parted(&v, keep_off, stay, &last);
    const bool alike = !many || (v.broken && !zone_is_vast(w));
    if (!status && alike)
        status = n ? try_all_alike(&v, keep_off, stay, &last)
                   : compare(&v, keep_off, stay, false, &last, &gained);
    if (!status && n && alike)
        status = try_one_by_one(&v, keep_off, stay, &last);
    if (!status && !many && v.broken && n > 1)
        status = try_parted(&v, keep_off, stay, &last);
    if (!status && !last && v.kept.boxes)
        give_back(&v);
    kept_free(&v.kept);
    free(v.origin);
    free(v.placed);
    free(v.keep_off);
    free(v.stay);
    free(keep_off);
    free(stay);
    return status;
}
