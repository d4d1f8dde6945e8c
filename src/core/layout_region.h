/* Regions of a rectilinear slab: their sides, the parts they fall into, where they may be cut. */
#ifndef SLABGAP_CORE_LAYOUT_REGION_H
#define SLABGAP_CORE_LAYOUT_REGION_H

#include "core/layout_work.h"

struct outline_edges {
    struct rect_edge *list[2];
    size_t count[2];
};
struct zone {
    struct outline_edges edges;
    struct rect_slab slab;
};
struct cut {
    int axis;
    int64_t u;
    bool given; /* a construction or isolation joint runs there anyhow */
    double off; /* from the middle of the zone, as a share of its size */
};
struct cuts {
    struct cut *list;
    size_t count;
};
struct parts {
    struct zone *zones;
    size_t count;
    double cost;
    struct cut cut;
};
struct search {
    struct work *w;
    uint64_t used, allowed;
    size_t chord_room;
    bool trying; /* a part is parted in several ways */
};

void edges_free(struct outline_edges *e);
void parts_free(struct parts *p);
/* The parts of a region that hang together, with what is forced in them. */
enum status parts_build(struct search *s, struct parts *p, const struct outline_edges *edges);
enum status zone_lay_out(struct search *s, struct zone *z, enum rect_depth deep);
/* Both. */
enum status parts_add(struct search *s, struct parts *p, const struct outline_edges *edges,
                      enum rect_depth deep);
/* Panels if none is smaller than it must be. */
double zone_panels(const struct zone *z);
/* Evaluations one region may use: a part of what is left. */
uint64_t search_share(const struct search *s);
/* The region on one side of the line at u: its sides cut off there, and the line itself. */
enum status region_clip(const struct outline_edges *edges, int axis, int64_t u, bool high,
                        struct outline_edges *out);
/* Metres of a joint at u right across the zone; its cost. */
double cut_length(const struct zone *z, int axis, int64_t u);
double cut_cost(const struct zone *z, struct cut cut);
/* A cut keeps clear of the boxes it does not halve. */
bool cut_is_clear(const struct zone *z, int axis, int64_t u);
/* A joint of contraction the user drew stays one: no zone ends there. */
bool cut_is_kept(const struct work *w, int axis, int64_t u);
/* The joint that must be there anyhow and halves the zone best; false: none. */
bool cut_given(const struct search *s, const struct zone *z, struct cut *cut);
/* Where the zone may be cut: joints that must be there anyhow, lines of boxes and inside corners,
 * and half-way between any two of these. */
enum status cuts_find(const struct search *s, const struct zone *z, struct cuts *c);
/* Joints that are there anyhow first, then those that halve the zone best; no more than the effort
 * that is left allows. */
void cuts_rank(const struct search *s, const struct zone *z, struct cuts *c);
/* The zone as it is, or the cut, becomes part of the plan. */
enum status zone_take(struct search *s, const struct zone *z);
enum status cut_take(struct search *s, const struct zone *z, struct cut cut);
/* A zone that is laid out, or parts of it where that breaks a rule, become part of the plan. */
enum status zone_search(struct search *s, struct zone *z);

#endif
