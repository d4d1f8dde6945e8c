/* Which panels lie beside which joint, and how far each reaches square to it: what the movement of
 * every joint is made of. Private to src/plan. */
#ifndef SLABGAP_PLAN_CONTACT_H
#define SLABGAP_PLAN_CONTACT_H

#include "core/layout.h"

struct contact {
    size_t joint, panel;
    int side;        /* +1: left of the joint's direction, -1: right */
    double from, to; /* along the joint, m from its first point */
    double extent;   /* of the panel square to the joint, m */
};
struct contact_list {
    struct contact *items; /* ordered by joint */
    size_t count, capacity;
    size_t *first; /* first[j] .. first[j + 1]: those of joint j */
};

enum status contact_list_make(const struct layout *layout, struct contact_list *list);
void contact_list_free(struct contact_list *list);

#endif
