/* The joint layout: where every joint goes, for a slab given as rings in metres.
 * Rules R1-R10 and algorithm: design "Laying out joints on a slab". Knows nothing of jobs or files.
 * Inside: integers of 1/80 mm (80 = 1 mm, 127 = 1/16 in, both exact), nodes owned once. */
#ifndef SLABGAP_CORE_LAYOUT_H
#define SLABGAP_CORE_LAYOUT_H

#include "base/status.h"
#include "core/layout_cache.h"
#include <stdbool.h>
#include <stddef.h>
#include <stdint.h>

struct layout_point {
    double x, y;
};
/* A corner of a ring; arc: the side arriving here turns about (cx, cy). */
struct layout_corner {
    double x, y;
    bool arc, left;
    double cx, cy;
};
struct layout_ring {
    const struct layout_corner *corners;
    size_t count;
};

enum layout_joint_kind { LAYOUT_CONTRACTION, LAYOUT_CONSTRUCTION, LAYOUT_ISOLATION };
enum layout_edge_kind { LAYOUT_EDGE_FREE, LAYOUT_EDGE_FIXED, LAYOUT_EDGE_EXISTING };

struct layout_object {
    const char *id;   /* "C1" */
    const char *kind; /* "column" */
    bool round, isolate;
    bool edge_kind_channel;       /* channel or wall: long thin things get pointed ends */
    double x, y, w, d, angle_deg; /* round: w = d = diameter */
    bool box_at_given, box_half_given;
    double box_x, box_y, box_half;
};
struct layout_edge { /* side `side` (from 0) of the outline's corners */
    size_t side;
    enum layout_edge_kind kind;
    bool isolate;         /* treat = isolate */
    const double *joints; /* m along the side from its first point */
    size_t joint_count;
};
struct layout_segment {
    double x1, y1, x2, y2;
};
struct layout_drawn {
    enum layout_joint_kind kind;
    bool expansion;
    bool keep;
    struct layout_segment at;
};

struct layout_input {
    struct layout_ring outline;
    const struct layout_ring *openings;
    size_t opening_count;
    const bool *opening_wall; /* isolation all round, per opening */
    const struct layout_object *objects;
    size_t object_count;
    const struct layout_edge *edges;
    size_t edge_count;
    double max_side_x, max_side_y, axis_deg; /* along the axis, square to it */
    double max_aspect, min_side, min_angle_deg;
    double round_to;        /* 0 = equal panels */
    double expansion_every; /* 0 = none */
    bool has_pours;
    const struct layout_segment *pour_lines;
    size_t pour_line_count;
    double pour_width; /* 0 = none */
    double pour_direction_deg;
    const struct layout_drawn *drawn;
    size_t drawn_count;
    bool us_units;              /* free lines on 1/16 in, else whole mm */
    double effort;              /* 1 = usual number of evaluations */
    struct layout_cache *cache; /* what earlier layouts remember; NULL: none */
    bool (*go_on)(void *context, double share);
    void *context; /* NULL, or false = stop with the best so far */
};

struct layout_joint {
    char id[48]; /* "J4.1", "C1.2" */
    int line;    /* number of the line (J4 -> 4), 0 for box sides and edge isolation */
    enum layout_joint_kind kind;
    bool expansion;  /* isolation with purpose expansion */
    bool along_pour; /* construction between strips (pours.along), else across */
    int object;      /* index of the object whose box side this is, -1 = none */
    int edge;        /* outline side it isolates, -1 = none */
    int opening;     /* opening it isolates, -1 = none */
    double x1, y1, x2, y2;
    int left_panel, right_panel; /* -1 = none: slab edge or box */
};
struct layout_reason {
    const char *code; /* "FORCED_PAIR", static */
    const char *rule; /* "panel.aspect", static */
    double value, limit;
    char cause[160], remedy[160]; /* sentences for people */
};
struct layout_panel {
    int number; /* P1 = 1, plan order */
    struct layout_point *ring;
    size_t count;
    double length, width, aspect, area; /* smallest-area bounding rectangle; length >= width */
    double mean_width;                  /* area / length: printed beside for tapers */
    struct layout_reason *reasons;
    size_t reason_count;
};
struct layout_edge_out {
    size_t index, edge;
    enum layout_edge_kind kind;
    double *joints;
    size_t joint_count;
    bool isolate;
};
struct layout_box {
    int object;
    double x, y, half;
    double moved_x, moved_y;
    char words[96];
};

struct layout {
    struct layout_point *outline;
    size_t outline_count;
    struct layout_ring_out {
        struct layout_point *points;
        size_t count;
    } * openings;
    size_t opening_count;
    struct layout_edge_out *edges;
    size_t edge_count;
    struct layout_joint *joints;
    size_t joint_count; /* plan order */
    struct layout_panel *panels;
    size_t panel_count; /* plan order */
    struct layout_box *boxes;
    size_t box_count;
    /* reasons that belong to no panel (a box that cannot be made, a joint not matched, ...) */
    struct layout_reason *reasons;
    size_t reason_count;
    int bound_panels;
    double bound_joint_m; /* proven lower bounds, 0 = none */
    int violations;       /* by this program's own check of all rules */
    double area;          /* m2 of slab without openings and boxes */
    uint64_t evaluations; /* effort used */
};

/* Lays out the slab. STATUS_REFUSED only for a slab that is none (fewer than 3 corners,
 * self-crossing); what cannot be done well is in the reasons. Same input, same result, bit by bit.
 */
enum status layout_solve(const struct layout_input *input, struct layout *layout);
/* Frees it; safe on {0} and twice. */
void layout_free(struct layout *layout);

#endif
