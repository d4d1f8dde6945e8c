/* What is placed at once: panels that no construction or isolation joint parts, with area, volume
 * and the turn in which to place them. */
#include "plan/contact.h"
#include "plan/plan_steps.h"
#include <float.h>
#include <math.h>
#include <stdlib.h>

/* ---- groups of panels (union-find) ---- */

static size_t root_of(size_t *group, size_t panel)
{
    while (group[panel] != panel) {
        group[panel] = group[group[panel]];
        panel = group[panel];
    }
    return panel;
}

static void join(size_t *group, size_t a, size_t b)
{
    size_t x = root_of(group, a), y = root_of(group, b);

    if (x < y)
        group[y] = x;
    else
        group[x] = y;
}

/* Two panels face each other across a stretch of the joint. */
static bool opposite(const struct contact *a, const struct contact *b)
{
    return a->side != b->side && fmin(a->to, b->to) - fmax(a->from, b->from) > 1e-3;
}

static int nearer_the_start(const void *a, const void *b)
{
    const struct contact *p = a, *q = b;

    return p->from < q->from ? -1 : p->from > q->from;
}

/* Panels on both sides of a sawn joint are one pour. Sorts the contacts of each joint along it. */
static void join_across(const struct layout *layout, struct contact_list *list, size_t *group)
{
    for (size_t j = 0; j < layout->joint_count; j++) {
        struct contact *items = list->items + list->first[j];
        size_t count = list->first[j + 1] - list->first[j];
        if (layout->joints[j].kind != LAYOUT_CONTRACTION || count < 2)
            continue;
        qsort(items, count, sizeof *items, nearer_the_start);
        for (size_t i = 0; i < count; i++)
            for (size_t k = i + 1; k < count && items[k].from < items[i].to; k++)
                if (opposite(&items[i], &items[k]))
                    join(group, items[i].panel, items[k].panel);
    }
}

/* ---- one row a pour ---- */

enum { POURS_MOST = 500 }; /* more are no plan for placing */

struct centre {
    double x, y;
};

static struct centre centre_of(const struct layout_panel *panel)
{
    struct centre centre = {0, 0};

    for (size_t i = 0; i < panel->count; i++) {
        centre.x += panel->ring[i].x / (double)panel->count;
        centre.y += panel->ring[i].y / (double)panel->count;
    }
    return centre;
}

static void add_panel(struct plan_pour *pour, const struct layout_panel *panel)
{
    struct centre centre = centre_of(panel);

    pour->area_m2 += panel->area;
    pour->panels++;
    pour->x += (centre.x - pour->x) / pour->panels;
    pour->y += (centre.y - pour->y) / pour->panels;
}

/* Strips side by side are placed every other one first: turn 1, then the ones between; a strip's
 * place is counted square to the strips. */
static void set_turns(struct plan *plan)
{
    double angle = plan->job.pours_direction * 3.14159265358979323846 / 180, place[POURS_MOST];
    bool first_of_row[POURS_MOST];

    for (size_t i = 0; i < plan->pour_count; i++) {
        place[i] = -plan->pours[i].x * sin(angle) + plan->pours[i].y * cos(angle);
        first_of_row[i] = true;
        for (size_t k = 0; k < i; k++)
            first_of_row[i] = first_of_row[i] && fabs(place[k] - place[i]) > 0.05;
    }
    for (size_t i = 0; i < plan->pour_count; i++) {
        int below = 0;
        for (size_t k = 0; k < plan->pour_count; k++)
            below += first_of_row[k] && place[k] < place[i] - 0.05;
        plan->pours[i].turn = 1 + below % 2;
    }
}

enum status plan_set_pours(struct plan *plan)
{
    const struct layout *layout = &plan->layout;
    struct contact_list list = {0};
    size_t *group = calloc(layout->panel_count + 1, sizeof *group);
    size_t *row = calloc(layout->panel_count + 1, sizeof *row);
    enum status status = STATUS_NO_MEMORY;

    plan->pours = calloc(POURS_MOST, sizeof *plan->pours);
    plan->panel_pour = calloc(layout->panel_count + 1, sizeof *plan->panel_pour);
    if (plan->panel_pour != NULL && group != NULL && row != NULL && plan->pours != NULL)
        status = contact_list_make(layout, &list);
    for (size_t p = 0; status == STATUS_OK && p < layout->panel_count; p++)
        group[p] = p;
    if (status == STATUS_OK)
        join_across(layout, &list, group);
    for (size_t p = 0; status == STATUS_OK && p < layout->panel_count; p++) {
        size_t root = root_of(group, p);
        if (root == p) {
            if (plan->pour_count >= POURS_MOST) {
                for (; p < layout->panel_count; p++)
                    plan->panel_pour[p] = -1;
                break;
            }
            row[p] = plan->pour_count;
            plan->pours[plan->pour_count++] = (struct plan_pour){.number = (int)row[p] + 1};
        }
        plan->panel_pour[p] = (int)row[root];
        add_panel(&plan->pours[row[root]], &layout->panels[p]);
    }
    for (size_t i = 0; i < plan->pour_count; i++) {
        struct plan_pour *pour = &plan->pours[i];
        pour->volume_m3 = pour->area_m2 * plan->job.slab_thickness;
        pour->trucks = (int)ceil(pour->volume_m3 / plan->job.pour_truck - 1e-9);
        pour->hours = pour->volume_m3 / plan->job.pour_rate / 3600;
    }
    if (status == STATUS_OK)
        set_turns(plan);
    contact_list_free(&list);
    free(group);
    free(row);
    return status;
}
