#include "plan/bars.h"
#include "plan/plan_steps.h"
#include <math.h>
#include <stdlib.h>

struct direction {
    double x, y;
};

static struct direction towards(const struct layout_joint *joint, int side)
{
    double dx = joint->x2 - joint->x1, dy = joint->y2 - joint->y1, length = hypot(dx, dy);

    if (length < 1e-9)
        return (struct direction){0, 0};
    return (struct direction){-side * dy / length, side * dx / length};
}

static void order_by_panel(struct bars *bars)
{
    const struct contact_list *list = &bars->contacts;
    size_t *next = bars->panel_first;

    /* counting sort: panel_first[p + 1] counts, then runs on as the place of the next contact */
    for (size_t i = 0; i < list->count; i++)
        next[list->items[i].panel + 1]++;
    for (size_t p = 0; p < bars->layout->panel_count; p++)
        next[p + 1] += next[p];
    for (size_t i = list->count; i-- > 0;)
        bars->of_panel[--next[list->items[i].panel + 1]] = i;
    /* now next[p + 1] is where panel p begins: shift it back by one place */
    for (size_t p = 0; p < bars->layout->panel_count; p++)
        next[p] = next[p + 1];
    next[bars->layout->panel_count] = list->count;
}

enum status bars_make(const struct plan *plan, struct bars *bars)
{
    const struct layout *layout = &plan->layout;

    *bars = (struct bars){.layout = layout};
    if (contact_list_make(layout, &bars->contacts) != STATUS_OK)
        return STATUS_NO_MEMORY;
    bars->of_panel = calloc(bars->contacts.count + 1, sizeof *bars->of_panel);
    bars->panel_first = calloc(layout->panel_count + 2, sizeof *bars->panel_first);
    bars->tied = calloc(layout->joint_count + 1, sizeof *bars->tied);
    if (bars->of_panel == NULL || bars->panel_first == NULL || bars->tied == NULL) {
        bars_free(bars);
        return STATUS_NO_MEMORY;
    }
    order_by_panel(bars);
    for (size_t j = 0; j < layout->joint_count; j++)
        bars->tied[j] = plan_joint_tied(plan, &layout->joints[j]);
    return STATUS_OK;
}

void bars_free(struct bars *bars)
{
    contact_list_free(&bars->contacts);
    free(bars->of_panel);
    free(bars->panel_first);
    free(bars->tied);
    *bars = (struct bars){0};
}

/* The contact of the panel with a tied joint square to `to`, at the panel's far end; NULL: none. */
static const struct contact *tied_end(const struct bars *bars, size_t panel, struct direction to)
{
    for (size_t i = bars->panel_first[panel]; i < bars->panel_first[panel + 1]; i++) {
        const struct contact *contact = &bars->contacts.items[bars->of_panel[i]];
        struct direction back = towards(&bars->layout->joints[contact->joint], contact->side);
        if (bars->tied[contact->joint] && back.x * to.x + back.y * to.y < -0.9)
            return contact;
    }
    return NULL;
}

/* The panel across a tied joint from `near`; NULL: none. */
static const struct contact *across(const struct bars *bars, const struct contact *near)
{
    const struct contact *best = NULL;

    for (size_t i = bars->contacts.first[near->joint]; i < bars->contacts.first[near->joint + 1];
         i++) {
        const struct contact *far = &bars->contacts.items[i];
        if (far->side == near->side || fmin(far->to, near->to) - fmax(far->from, near->from) < 1e-3)
            continue;
        if (best == NULL || far->extent > best->extent)
            best = far;
    }
    return best;
}

static double chain(const struct bars *bars, const struct contact *contact)
{
    struct direction to = towards(&bars->layout->joints[contact->joint], contact->side);
    double length = contact->extent;

    for (size_t steps = 0; steps < bars->layout->panel_count; steps++) {
        const struct contact *end = tied_end(bars, contact->panel, to);
        if (end == NULL)
            break;
        contact = across(bars, end);
        if (contact == NULL)
            break;
        length += contact->extent;
    }
    return length;
}

double bars_length(const struct bars *bars, size_t joint, int side)
{
    double longest = 0;

    for (size_t i = bars->contacts.first[joint]; i < bars->contacts.first[joint + 1]; i++)
        if (bars->contacts.items[i].side == side)
            longest = fmax(longest, chain(bars, &bars->contacts.items[i]));
    return longest;
}
