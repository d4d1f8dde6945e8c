/* Lines of any direction on an outline of any shape: the faces between them are the panels. */
#ifndef SLABGAP_CORE_LAYOUT_PLANE_H
#define SLABGAP_CORE_LAYOUT_PLANE_H

#include "core/layout_work.h"

struct plane_line { /* a straight piece; pieces of one joint line share its number */
    struct layout_segment at;
    int line;
    enum layout_joint_kind kind;
    bool expansion, along_pour;
};
struct plane_box { /* four tips, anticlockwise; tips outside the slab are cut off by its edge */
    int object;
    struct layout_point centre, tip[4];
    double half;
};
struct plane {
    struct plane_line *lines;
    size_t line_count, line_room;
    struct plane_box *boxes;
    size_t box_count;
};

bool plane_add(struct plane *plane, struct plane_line line);
void plane_free(struct plane *plane);
/* Panels, joints and boxes of the result, from the slab's rings, the lines and the boxes. */
enum status plane_emit(struct work *w, const struct plane *plane);
bool plane_holds(const struct layout_point *ring, size_t count, struct layout_point p);

#endif
