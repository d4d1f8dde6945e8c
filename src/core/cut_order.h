/* In which order to saw, with so many saws, so that every cut comes after the edge stays sharp and
 * before the slab cracks by itself. Every cut halves what pulls on its neighbours. Times h, m. */
#ifndef SLABGAP_CORE_CUT_ORDER_H
#define SLABGAP_CORE_CUT_ORDER_H

#include "base/status.h"
#include <stdbool.h>
#include <stddef.h>

struct cut_line {
    int id;
    double at_m;     /* where it divides its family */
    double length_m; /* to saw */
    double ready_h;  /* not before */
    double placed_h; /* when the oldest concrete beside it was placed */
};
/* Parallel lines that divide one pour from one end to the other, by at_m. */
struct cut_family {
    double from_m, to_m; /* the ends */
    struct cut_line *lines;
    size_t count;
};
struct cut_task {
    struct cut_family *families;
    size_t family_count;
    int saws;
    double pace_m_h; /* of one saw */
    /* When a stretch of this length, placed then, cracks by itself; INFINITY: never. Never later
     * for a longer stretch. */
    double (*cracks)(const void *context, double length_m, double placed_h);
    const void *context;
};
enum cut_policy {
    CUT_AS_PLACED, /* as the concrete came */
    CUT_BY_DEADLINE,
    CUT_RELIEF, /* the stretch that cracks first, at its middle: then its halves */
    CUT_POLICIES,
    CUT_SEARCHED = CUT_POLICIES /* the best of these, made better line by line */
};
struct cut_step {
    size_t family, line;                        /* index in families, in lines */
    int saw;                                    /* from 1 */
    double start_h, end_h, ready_h, deadline_h; /* deadline of the stretch it stands in then */
    bool late;
};
struct cut_order {
    struct cut_step *steps; /* in the order of their start */
    size_t count;
    enum cut_policy policy;
    double end_h, late_m;
    double lateness_h;    /* of all late cuts together */
    double least_spare_h; /* of the cuts in time; INFINITY: none has a deadline */
};

/* One policy (not CUT_SEARCHED). Lines that would be late anyhow wait for those that can still be
 * in time, but as placed. STATUS_NO_MEMORY. */
enum status cut_order_by(const struct cut_task *task, enum cut_policy policy,
                         struct cut_order *order);
/* The fewest metres late: as placed when that is as good as any; else the best policy, made better
 * by moving one line at a time while that helps and a count of trials lasts. More saws never cut
 * more metres late. */
enum status cut_order_make(const struct cut_task *task, struct cut_order *order);
/* Fewest saws, up to `most`, with which nothing is late; 0: not even so. */
enum status cut_order_saws(const struct cut_task *task, int most, int *saws);
void cut_order_free(struct cut_order *order);

#endif
