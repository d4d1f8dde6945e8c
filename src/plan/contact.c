#include "plan/contact.h"
#include "base/array.h"
#include <float.h>
#include <math.h>
#include <stdlib.h>

/* Two lines closer than this are one: output coordinates carry six decimals. */
static const double near_m = 2e-4;
static const double least_overlap_m = 1e-3;

struct frame { /* of a joint: origin, direction u, normal n = u turned left */
    double x, y, ux, uy, length;
};

struct extent {
    double x0, y0, x1, y1;
};

static struct frame frame_of(const struct layout_joint *joint)
{
    double dx = joint->x2 - joint->x1, dy = joint->y2 - joint->y1, length = hypot(dx, dy);

    if (length < 1e-9)
        return (struct frame){joint->x1, joint->y1, 1, 0, 0};
    return (struct frame){joint->x1, joint->y1, dx / length, dy / length, length};
}

static double along(const struct frame *frame, const struct layout_point *point)
{
    return (point->x - frame->x) * frame->ux + (point->y - frame->y) * frame->uy;
}

static double square_to(const struct frame *frame, const struct layout_point *point)
{
    return -(point->x - frame->x) * frame->uy + (point->y - frame->y) * frame->ux;
}

/* Side on which the panel's body lies, and how far it reaches square to the joint. */
static int body_side(const struct frame *frame, const struct layout_panel *panel, double *extent)
{
    double least = DBL_MAX, most = -DBL_MAX;

    for (size_t i = 0; i < panel->count; i++) {
        double d = square_to(frame, &panel->ring[i]);
        least = fmin(least, d);
        most = fmax(most, d);
    }
    *extent = most - least;
    return most > -least ? 1 : -1;
}

/* The part of the joint that a panel's sides cover; false when they do not touch. */
static bool overlap(const struct frame *frame, const struct layout_panel *panel, double *from,
                    double *to)
{
    bool found = false;

    *from = DBL_MAX;
    *to = -DBL_MAX;
    for (size_t i = 0; i < panel->count; i++) {
        const struct layout_point *a = &panel->ring[i], *b = &panel->ring[(i + 1) % panel->count];
        double low, high;
        if (fabs(square_to(frame, a)) > near_m || fabs(square_to(frame, b)) > near_m)
            continue;
        low = fmax(0, fmin(along(frame, a), along(frame, b)));
        high = fmin(frame->length, fmax(along(frame, a), along(frame, b)));
        if (high - low < least_overlap_m)
            continue;
        *from = fmin(*from, low);
        *to = fmax(*to, high);
        found = true;
    }
    return found;
}

static struct extent panel_extent(const struct layout_panel *panel)
{
    struct extent extent = {DBL_MAX, DBL_MAX, -DBL_MAX, -DBL_MAX};

    for (size_t i = 0; i < panel->count; i++) {
        extent.x0 = fmin(extent.x0, panel->ring[i].x);
        extent.y0 = fmin(extent.y0, panel->ring[i].y);
        extent.x1 = fmax(extent.x1, panel->ring[i].x);
        extent.y1 = fmax(extent.y1, panel->ring[i].y);
    }
    return extent;
}

static bool far_apart(const struct layout_joint *joint, const struct extent *extent)
{
    return fmax(joint->x1, joint->x2) < extent->x0 - near_m ||
           fmin(joint->x1, joint->x2) > extent->x1 + near_m ||
           fmax(joint->y1, joint->y2) < extent->y0 - near_m ||
           fmin(joint->y1, joint->y2) > extent->y1 + near_m;
}

/* Panels by their western side: a joint looks only at those that can reach it. */
struct panel_place {
    struct extent extent;
    size_t panel;
};

static int more_to_the_west(const void *a, const void *b)
{
    const struct panel_place *p = a, *q = b;

    if (p->extent.x0 < q->extent.x0 || p->extent.x0 > q->extent.x0)
        return p->extent.x0 < q->extent.x0 ? -1 : 1;
    return p->panel < q->panel ? -1 : p->panel > q->panel;
}

/* The first place whose western side is not west of `x`. */
static size_t first_from(const struct panel_place *places, size_t count, double x)
{
    size_t low = 0, high = count;

    while (low < high) {
        size_t middle = low + (high - low) / 2;
        if (places[middle].extent.x0 < x)
            low = middle + 1;
        else
            high = middle;
    }
    return low;
}

static bool add_joint(const struct layout *layout, const struct panel_place *places, double widest,
                      size_t joint, struct contact_list *list)
{
    const struct layout_joint *at = &layout->joints[joint];
    struct frame frame = frame_of(at);
    double west = fmin(at->x1, at->x2) - near_m, east = fmax(at->x1, at->x2) + near_m;

    for (size_t i = first_from(places, layout->panel_count, west - widest);
         i < layout->panel_count && places[i].extent.x0 <= east; i++) {
        const struct layout_panel *panel = &layout->panels[places[i].panel];
        struct contact contact = {.joint = joint, .panel = places[i].panel};
        if (far_apart(at, &places[i].extent) || !overlap(&frame, panel, &contact.from, &contact.to))
            continue;
        contact.side = body_side(&frame, panel, &contact.extent);
        if (!array_reserve((void **)&list->items, &list->capacity, list->count + 1,
                           sizeof *list->items))
            return false;
        list->items[list->count++] = contact;
    }
    return true;
}

enum status contact_list_make(const struct layout *layout, struct contact_list *list)
{
    struct panel_place *places = calloc(layout->panel_count + 1, sizeof *places);
    double widest = 0;
    bool good;

    *list = (struct contact_list){0};
    list->first = calloc(layout->joint_count + 1, sizeof *list->first);
    good = places != NULL && list->first != NULL;
    for (size_t p = 0; good && p < layout->panel_count; p++) {
        places[p] = (struct panel_place){panel_extent(&layout->panels[p]), p};
        widest = fmax(widest, places[p].extent.x1 - places[p].extent.x0);
    }
    if (good)
        qsort(places, layout->panel_count, sizeof *places, more_to_the_west);
    for (size_t j = 0; good && j < layout->joint_count; j++) {
        list->first[j] = list->count;
        good = add_joint(layout, places, widest, j, list);
    }
    free(places);
    if (!good) {
        contact_list_free(list);
        return STATUS_NO_MEMORY;
    }
    list->first[layout->joint_count] = list->count;
    return STATUS_OK;
}

void contact_list_free(struct contact_list *list)
{
    free(list->items);
    free(list->first);
    *list = (struct contact_list){0};
}
