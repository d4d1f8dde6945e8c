/* Names that never shift: lines across are 1, 2, 3 from the west, lines along A, B, C from the
 * south, panels by the line to their right and the line above them: 2B = left of line 2, below line
 * B. */
#ifndef SLABGAP_EXPORT_NAMES_H
#define SLABGAP_EXPORT_NAMES_H

#include "core/layout.h"

enum { LINE_NAME_MOST = 16 };

/* The name of line `line` (layout_joint.line): "3", "B", "AA"; a skew line is numbered on. */
void name_line(const struct layout *layout, int line, char out[LINE_NAME_MOST]);
/* The name of a panel: "2B". */
void name_panel(const struct layout *layout, const struct layout_panel *panel,
                char out[2 * LINE_NAME_MOST]);
/* Number of lines parallel to y and to x. */
int name_lines_across(const struct layout *layout);
int name_lines_along(const struct layout *layout);

#endif
