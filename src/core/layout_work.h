/* What the parts of the layout engine share while one slab is solved. */
#ifndef SLABGAP_CORE_LAYOUT_WORK_H
#define SLABGAP_CORE_LAYOUT_WORK_H

#include "core/layout_index.h"
#include "core/layout_rect.h"

struct work_ring { /* points in the slab's own frame, units of 1/80 mm */
    int64_t *x, *y;
    size_t count;
};
struct work_box {
    int object;
    int64_t x, y, half; /* about (x, y) */
    int64_t tip[4];     /* how far it reaches west, east, south, north */
    double spread;      /* on an edge: width of the base in widths at the object */
    int64_t moved_x, moved_y;
    bool dropped;    /* cannot be made: see the reasons */
    bool on_x, on_y; /* on a slab edge parallel to y, to x */
    bool keep_off;   /* variant: no triangle on an edge farther than its half */
    bool stay;       /* variant: not moved onto a common line */
    bool held[2];    /* its x, its y is settled */
};
struct work_line { /* a line with a name: what forces it, and what kind the joint on it is */
    int axis;
    int64_t u, v0, v1;
    enum layout_joint_kind kind;
    bool expansion, along_pour, labels;
    bool program;  /* a zone's end the program put in */
    bool at_point; /* forces only the chord through (u, point) */
    int64_t point;
    char name[64];
};
struct work {
    const struct layout_input *input;
    struct layout *out;
    double cosine, sine;
    struct work_ring *rings; /* outline, openings, rectangular boxes */
    int *ring_object;        /* object of a rectangular box, -1 */
    size_t ring_count;
    bool *merged; /* objects that share a rectangular box */
    struct work_box *boxes;
    struct rect_box *box_index; /* the same, sorted, to find the box at a panel's corner */
    size_t box_count;
    struct work_line *lines;
    size_t line_count, line_room;
    struct rect_ban *bans; /* joints drawn with keep = no */
    size_t ban_count;
    struct rect_slab slab;
    struct rect_chord *chords; /* of all zones */
    size_t chord_count;
    struct rect_panel *panels; /* in plan order after the emit */
    size_t panel_count;
    struct layout_index panel_index; /* of the panels in plan order */
    size_t cut_count;                /* construction joints the program put in */
    int attempt;                     /* way of parting the slab */
    bool stopped;                    /* the caller wants the best so far */
    double cost;                     /* metres and penalties of the zones */
    size_t broken;
};

struct layout_point work_point(const struct work *w, int64_t x, int64_t y);
void work_frame(const struct work *w, double x, double y, int64_t *fx, int64_t *fy);
bool work_line_add(struct work *w, struct work_line line);
/* Adds a reason to a list; false = no memory. */
bool layout_reason_add(struct layout_reason **list, size_t *count, struct layout_reason reason);
/* Panels, joints and boxes of a solved rectilinear slab. */
enum status layout_emit(struct work *w);
/* Sizes, broken rules and their reasons of every panel; counts the violations. */
enum status layout_check_panels(struct work *w);
/* Ends of joints, neighbours, pours, objects, tiling; called by the above. */
enum status layout_check_joints(struct work *w);
/* Lays out once, with the sides as they are given. */
enum status layout_solve_once(const struct layout_input *input, struct layout *layout);
/* A convex outline with slanting sides: lines right across it. */
enum status layout_convex(struct work *w);
/* Copies the rings and the sides into the result. */
enum status layout_copy_rings(struct work *w);
bool layout_joint_add(struct layout *out, size_t *room, const struct layout_joint *joint);

#endif
