/* What forces joints beside boxes: pour lines, neighbours, expansion, the user's own lines. */
#include "core/layout_place.h"
#include "core/layout_sort.h"
#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

#define UNITS(m) llround((m)*LAYOUT_UNIT)

bool work_line_add(struct work *w, struct work_line line)
{
    if (w->line_count == w->line_room) {
        const size_t room = w->line_room ? 2 * w->line_room : 32;
        struct work_line *more = realloc(w->lines, room * sizeof *more);
        if (!more)
            return false;
        w->lines = more;
        w->line_room = room;
    }
    w->lines[w->line_count++] = line;
    return true;
}

static void span(const struct work *w, int axis, int64_t *low, int64_t *high)
{
    *low = INT64_MAX;
    *high = INT64_MIN;
    for (size_t i = 0; i < w->rings[0].count; i++) {
        const int64_t u = axis ? w->rings[0].y[i] : w->rings[0].x[i];
        *low = u < *low ? u : *low;
        *high = u > *high ? u : *high;
    }
}

/* Forces every chord that a line from v0 to v1 at u crosses. */
static void force_along(struct rect_slab *slab, int axis, int64_t u, int64_t v0, int64_t v1)
{
    const struct rect_family *f = &slab->family[axis];
    for (size_t i = 0; i < f->gate_count; i++)
        if (f->gates[i].u == u && f->gates[i].v0 < v1 && f->gates[i].v1 > v0)
            rect_force(slab, axis, u, f->gates[i].v0 + (f->gates[i].v1 - f->gates[i].v0) / 2);
    for (size_t i = 0; i < f->arc_count; i++) {
        const struct rect_arc *a = &f->arcs[i];
        if (a->u0 < u && u < a->u1 && a->v0 < v1 && a->v1 > v0)
            rect_force(slab, axis, u, a->v0 + (a->v1 - a->v0) / 2);
    }
}

void place_force_lines(const struct work *w, struct rect_slab *slab)
{
    for (size_t i = 0; i < w->line_count; i++) {
        const struct work_line *l = &w->lines[i];
        if (l->labels)
            force_along(slab, l->axis, l->u, l->v0, l->v1);
        else if (l->at_point)
            rect_force(slab, l->axis, l->u, l->point);
    }
}

/* An axis-parallel line of the plan in the slab's frame; false: it is slanted. */
static bool to_line(const struct work *w, const struct layout_segment *s, struct work_line *line)
{
    int64_t x1, y1, x2, y2;
    work_frame(w, s->x1, s->y1, &x1, &y1);
    work_frame(w, s->x2, s->y2, &x2, &y2);
    const bool up = llabs(x1 - x2) <= 8, flat = llabs(y1 - y2) <= 8;
    if (up == flat)
        return false;
    line->axis = up ? 0 : 1;
    line->u = up ? x1 : y1;
    line->v0 = up ? (y1 < y2 ? y1 : y2) : (x1 < x2 ? x1 : x2);
    line->v1 = up ? (y1 < y2 ? y2 : y1) : (x1 < x2 ? x2 : x1);
    return true;
}

static bool add_forced(struct work *w, struct work_line line)
{
    line.labels = true;
    return work_line_add(w, line);
}

/* Strips no wider than asked between the typed lines and the ends, each gap in equal ones. */
static bool pour_strips(struct work *w, int axis)
{
    int64_t low, high;
    span(w, axis, &low, &high);
    int64_t *at = calloc(w->line_count + 2, sizeof *at);
    if (!at)
        return false;
    size_t n = 0;
    at[n++] = low;
    for (size_t i = 0; i < w->line_count; i++)
        if (w->lines[i].axis == axis && w->lines[i].u > low && w->lines[i].u < high)
            at[n++] = w->lines[i].u;
    at[n++] = high;
    sort_int64(at, n);
    bool fine = true;
    for (size_t i = 0; fine && i + 1 < n; i++) {
        const double gap = (double)(at[i + 1] - at[i]);
        const int64_t strips = (int64_t)ceil((gap - 80) / (w->input->pour_width * LAYOUT_UNIT));
        for (int64_t k = 1; fine && k < strips; k++) {
            const int64_t u = at[i] + llround(gap * (double)k / (double)strips / 80) * 80;
            fine = add_forced(w, (struct work_line){.axis = axis,
                                                    .u = u,
                                                    .v0 = INT64_MIN,
                                                    .v1 = INT64_MAX,
                                                    .kind = LAYOUT_CONSTRUCTION,
                                                    .along_pour = true,
                                                    .name = "a construction joint between strips"});
        }
    }
    free(at);
    return fine;
}

static bool unplaced(struct work *w, const char *rule, const char *cause)
{
    struct layout_reason reason = {.code = "GIVEN_ANGLE", .rule = rule};
    snprintf(reason.cause, sizeof reason.cause, "%s", cause);
    snprintf(reason.remedy, sizeof reason.remedy,
             "Draw it along the slab's main directions, or move it onto the slab.");
    w->out->violations++;
    return layout_reason_add(&w->out->reasons, &w->out->reason_count, reason);
}

bool place_lines(struct work *w)
{
    const struct layout_input *in = w->input;
    const double turn = in->pour_direction_deg * 3.14159265358979323846 / 180;
    const double along = fabs(cos(turn) * w->cosine + sin(turn) * w->sine);
    const int strip_axis = along > 0.7 ? 1 : 0;
    for (size_t i = 0; in->has_pours && i < in->pour_line_count; i++) {
        struct work_line line = {.kind = LAYOUT_CONSTRUCTION, .name = "a construction joint"};
        if (!to_line(w, &in->pour_lines[i], &line)) {
            if (!unplaced(w, "pour.line", "A pour line runs aslant to the slab and was left out."))
                return false;
            continue;
        }
        line.along_pour = line.axis == strip_axis;
        if (!add_forced(w, line))
            return false;
    }
    if (in->has_pours && in->pour_width > 0 && !pour_strips(w, strip_axis))
        return false;
    for (size_t i = 0; i < in->drawn_count; i++) {
        struct work_line line = {.kind = in->drawn[i].kind,
                                 .expansion = in->drawn[i].expansion,
                                 .name = "a joint you drew"};
        if (!in->drawn[i].keep)
            continue;
        if (to_line(w, &in->drawn[i].at, &line)
                ? !add_forced(w, line)
                : !unplaced(w, "joint.end",
                            "A joint you drew runs aslant to the slab and was left out."))
            return false;
    }
    return true;
}

bool place_bans(struct work *w)
{
    const struct layout_input *in = w->input;
    w->bans = calloc(in->drawn_count + 1, sizeof *w->bans);
    for (size_t i = 0; w->bans && i < in->drawn_count; i++) {
        struct work_line l = {0};
        if (!in->drawn[i].keep && to_line(w, &in->drawn[i].at, &l))
            w->bans[w->ban_count++] = (struct rect_ban){l.axis, l.u, l.v0, l.v1};
    }
    return w->bans != NULL;
}

/* Expansion joints across the long direction, equally far apart, none further than asked. */
bool place_expansion(struct work *w)
{
    if (w->input->expansion_every <= 0)
        return true;
    int64_t low, high, low_y, high_y;
    span(w, 0, &low, &high);
    span(w, 1, &low_y, &high_y);
    const int axis = high_y - low_y > high - low;
    if (axis) {
        low = low_y;
        high = high_y;
    }
    const double gap = (double)(high - low);
    const int64_t n = (int64_t)ceil((gap - 80) / (w->input->expansion_every * LAYOUT_UNIT));
    for (int64_t k = 1; k < n; k++) {
        const struct work_line line = {.axis = axis,
                                       .u = low + llround(gap * (double)k / (double)n / 80) * 80,
                                       .v0 = INT64_MIN,
                                       .v1 = INT64_MAX,
                                       .kind = LAYOUT_ISOLATION,
                                       .expansion = true,
                                       .name = "an expansion joint"};
        if (!add_forced(w, line))
            return false;
    }
    return true;
}

/* The neighbour's joints along a side: a chord ends at each. */
bool place_matches(struct work *w)
{
    for (size_t i = 0; i < w->input->edge_count; i++) {
        const struct layout_edge *e = &w->input->edges[i];
        const struct work_ring *r = &w->rings[0];
        if (e->kind != LAYOUT_EDGE_EXISTING || e->isolate || e->side >= r->count)
            continue;
        const size_t k = (e->side + 1) % r->count;
        const int axis = r->x[e->side] == r->x[k] ? 1 : 0;
        const int64_t from = axis ? r->y[e->side] : r->x[e->side], to = axis ? r->y[k] : r->x[k];
        for (size_t j = 0; j < e->joint_count; j++) {
            const int64_t d = UNITS(e->joints[j]);
            struct work_line line = {.axis = axis, .u = from + (to > from ? d : -d)};
            line.v0 = INT64_MIN;
            line.v1 = INT64_MAX;
            snprintf(line.name, sizeof line.name, "the neighbour's joint at %.3f m", e->joints[j]);
            if (llabs(line.u - from) < 8 || llabs(line.u - to) < 8)
                continue;
            line.at_point = true;
            line.point = axis ? r->x[k] : r->y[k];
            if (d > llabs(to - from) &&
                !unplaced(w, "edge.match", "A neighbour's joint lies beyond the end of its side."))
                return false;
            if (!work_line_add(w, line))
                return false;
        }
    }
    return true;
}
