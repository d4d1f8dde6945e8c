#include "plan/contact.h"
#include "base/array.h"
#include "core/layout_index.h"
#include <float.h>
#include <math.h>
#include <stdlib.h>

/* Two lines closer than this are one: output coordinates carry six decimals. */
static const double near_m = 2e-4;
static const double least_overlap_m = 1e-3;

struct frame { /* of a joint: origin, direction u, normal n = u turned left */
    double x, y, ux, uy, length;
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

static struct layout_extent panel_extent(const struct layout_panel *panel)
{
    struct layout_extent extent = {DBL_MAX, DBL_MAX, -DBL_MAX, -DBL_MAX};

    for (size_t i = 0; i < panel->count; i++) {
        extent.x0 = fmin(extent.x0, panel->ring[i].x);
        extent.y0 = fmin(extent.y0, panel->ring[i].y);
        extent.x1 = fmax(extent.x1, panel->ring[i].x);
        extent.y1 = fmax(extent.y1, panel->ring[i].y);
    }
    return extent;
}

static bool far_apart(const struct layout_joint *joint, const struct layout_extent *extent)
{
    return fmax(joint->x1, joint->x2) < extent->x0 - near_m ||
           fmin(joint->x1, joint->x2) > extent->x1 + near_m ||
           fmax(joint->y1, joint->y2) < extent->y0 - near_m ||
           fmin(joint->y1, joint->y2) > extent->y1 + near_m;
}

/* ---- which panels can touch a joint ---- */

struct search {
    const struct layout *layout;
    struct layout_extent *extents; /* of the panels */
    struct layout_index index;
    size_t *seen; /* the last joint (from 1) that looked at a panel */
    size_t *near; /* panels found for one joint */
    size_t near_count;
};

static void search_free(struct search *search)
{
    layout_index_free(&search->index);
    free(search->extents);
    free(search->seen);
    free(search->near);
}

static bool search_make(const struct layout *layout, struct search *search)
{
    size_t count = layout->panel_count;

    *search = (struct search){.layout = layout};
    search->extents = calloc(count + 1, sizeof *search->extents);
    search->seen = calloc(count + 1, sizeof *search->seen);
    search->near = calloc(count + 1, sizeof *search->near);
    if (search->extents == NULL || search->seen == NULL || search->near == NULL)
        return false;
    for (size_t p = 0; p < count; p++)
        search->extents[p] = panel_extent(&layout->panels[p]);
    return layout_index_make(&search->index, search->extents, count);
}

static int lower_number(const void *a, const void *b)
{
    size_t p = *(const size_t *)a, q = *(const size_t *)b;

    return p < q ? -1 : p > q;
}

/* Panels whose extent meets that of the joint, by number. */
static void find_near(struct search *search, size_t joint)
{
    const struct layout_joint *at = &search->layout->joints[joint];
    double x0 = fmin(at->x1, at->x2) - near_m, x1 = fmax(at->x1, at->x2) + near_m;
    double y0 = fmin(at->y1, at->y2) - near_m, y1 = fmax(at->y1, at->y2) + near_m;
    double step = search->index.cell;

    search->near_count = 0;
    for (double y = y0; y < y1 + step; y += step)
        for (double x = x0; x < x1 + step; x += step) {
            const size_t *cell;
            size_t count = layout_index_at(&search->index, fmin(x, x1), fmin(y, y1), &cell);
            for (size_t i = 0; i < count; i++) {
                if (search->seen[cell[i]] == joint + 1)
                    continue;
                search->seen[cell[i]] = joint + 1;
                if (!far_apart(at, &search->extents[cell[i]]))
                    search->near[search->near_count++] = cell[i];
            }
        }
    if (search->near_count > 1)
        qsort(search->near, search->near_count, sizeof *search->near, lower_number);
}

static bool add_joint(struct search *search, size_t joint, struct contact_list *list)
{
    struct frame frame = frame_of(&search->layout->joints[joint]);

    find_near(search, joint);
    for (size_t i = 0; i < search->near_count; i++) {
        const struct layout_panel *panel = &search->layout->panels[search->near[i]];
        struct contact contact = {.joint = joint, .panel = search->near[i]};
        if (!overlap(&frame, panel, &contact.from, &contact.to))
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
    struct search search;
    bool good = search_make(layout, &search);

    *list = (struct contact_list){0};
    list->first = calloc(layout->joint_count + 1, sizeof *list->first);
    good = good && list->first != NULL;
    for (size_t j = 0; good && j < layout->joint_count; j++) {
        list->first[j] = list->count;
        good = add_joint(&search, j, list);
    }
    search_free(&search);
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
