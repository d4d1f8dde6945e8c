/* What a solved slab's zones leave to be marked: ends that are no ends, boxes that cannot be. */
#include "core/layout_zone.h"
#include <math.h>
#include <stdlib.h>

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
void zone_relabel_cuts(struct work *w)
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
