/* The slab beside every joint as bars: a panel, or panels tied together, from the joint to the next
 * joint that moves. Private to src/plan. */
#ifndef SLABGAP_PLAN_BARS_H
#define SLABGAP_PLAN_BARS_H

#include "plan/contact.h"
#include "plan/plan.h"

struct bars {
    const struct layout *layout;
    struct contact_list contacts;
    size_t *of_panel;    /* contacts ordered by panel */
    size_t *panel_first; /* of_panel[panel_first[p]] .. of_panel[panel_first[p + 1] - 1] */
    bool *tied;          /* per joint */
};

enum status bars_make(const struct plan *plan, struct bars *bars);
void bars_free(struct bars *bars);
/* The longest bar that ends at the joint on this side (+1 left of its direction, -1 right), m; 0
 * where no panel lies there. */
double bars_length(const struct bars *bars, size_t joint, int side);

#endif
