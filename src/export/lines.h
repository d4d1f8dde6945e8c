/* Joint lines with tape readings: how far from the slab's west (or south) end a line begins and
 * ends, for whoever snaps the chalk line. */
#ifndef SLABGAP_EXPORT_LINES_H
#define SLABGAP_EXPORT_LINES_H

#include "base/text.h"
#include "export/names.h"
#include "plan/plan.h"

struct joint_line {
    int line; /* layout_joint.line */
    char name[LINE_NAME_MOST];
    enum layout_joint_kind kind;
    bool expansion;
    double x1, y1, x2, y2; /* its ends: the southern (western) one first */
    double length_m;       /* without boxes and gaps */
};

/* The line with this number; false when there is none. */
bool joint_line_find(const struct layout *layout, int line, struct joint_line *out);
/* The last line's number; lines are numbered from 1. */
int joint_line_last(const struct layout *layout);
/* "cut 4, 24.0 m; tape from the west 16.000 m at both ends." */
void joint_line_describe(struct text *out, const struct plan *plan, const struct joint_line *line);
/* The first `most` lines, a row each, under a heading. */
void joint_lines_print(struct text *out, const struct plan *plan, int most);

#endif
