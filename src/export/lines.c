#include "export/lines.h"
#include "base/utf8.h"
#include <float.h>
#include <math.h>
#include <string.h>

int joint_line_last(const struct layout *layout)
{
    int last = 0;

    for (size_t i = 0; i < layout->joint_count; i++)
        last = layout->joints[i].line > last ? layout->joints[i].line : last;
    return last;
}

/* Which end comes first: the southern one, of two alike the western one. */
static bool before(double x1, double y1, double x2, double y2)
{
    return fabs(y1 - y2) > 1e-6 ? y1 < y2 : x1 < x2;
}

static void take_end(struct joint_line *line, double x, double y)
{
    if (before(x, y, line->x1, line->y1))
        line->x1 = x, line->y1 = y;
    if (before(line->x2, line->y2, x, y))
        line->x2 = x, line->y2 = y;
}

bool joint_line_find(const struct layout *layout, int number, struct joint_line *out)
{
    struct joint_line line = {.line = number};
    bool found = false;

    for (size_t i = 0; number > 0 && i < layout->joint_count; i++) {
        const struct layout_joint *joint = &layout->joints[i];
        if (joint->line != number)
            continue;
        if (!found) {
            line.kind = joint->kind;
            line.expansion = joint->expansion;
            line.x1 = line.x2 = joint->x1;
            line.y1 = line.y2 = joint->y1;
            found = true;
        }
        take_end(&line, joint->x1, joint->y1);
        take_end(&line, joint->x2, joint->y2);
        line.length_m += hypot(joint->x2 - joint->x1, joint->y2 - joint->y1);
    }
    if (!found)
        return false;
    name_line(layout, number, line.name);
    *out = line;
    return true;
}

static const char *kind_word(const struct joint_line *line)
{
    if (line->expansion)
        return "expansion";
    return line->kind == LAYOUT_CONTRACTION    ? "cut"
           : line->kind == LAYOUT_CONSTRUCTION ? "pour end"
                                               : "soft board";
}

struct corner {
    double x, y; /* the south-west of everything */
};

static struct corner corner_of(const struct layout *layout)
{
    struct corner corner = {DBL_MAX, DBL_MAX};

    for (size_t i = 0; i < layout->outline_count; i++) {
        corner.x = fmin(corner.x, layout->outline[i].x);
        corner.y = fmin(corner.y, layout->outline[i].y);
    }
    return corner;
}

static bool along_x(const struct joint_line *line)
{
    return fabs(line->y2 - line->y1) < fabs(line->x2 - line->x1);
}

/* Tape at the first and the last end: from the west for lines that run north, else from the south.
 */
static void ends(const struct plan *plan, const struct joint_line *line, double at[2])
{
    struct corner corner = corner_of(&plan->layout);
    bool level = along_x(line);

    at[0] = level ? line->y1 - corner.y : line->x1 - corner.x;
    at[1] = level ? line->y2 - corner.y : line->x2 - corner.x;
    if (level && line->x1 > line->x2) { /* a line that falls: the western end first */
        double swap = at[0];
        at[0] = at[1];
        at[1] = swap;
    }
}

void joint_line_describe(struct text *out, const struct plan *plan, const struct joint_line *line)
{
    enum unit_system units = (enum unit_system)plan->job.job_units;
    bool level = along_x(line);
    double at[2];

    ends(plan, line, at);
    text_format(out, "%s %s, ", kind_word(line), line->name);
    unit_show(out, line->length_m, QUANTITY_LENGTH, units);
    text_format(out, "; tape from the %s ", level ? "south" : "west");
    unit_show_tape(out, at[0], units);
    if (fabs(at[1] - at[0]) < 0.0005) {
        text_add(out, " at both ends.");
        return;
    }
    text_format(out, " at its %s end, ", level ? "west" : "south");
    unit_show_tape(out, at[1], units);
    text_format(out, " at its %s.", level ? "east" : "north");
}

static void pad(struct text *out, size_t start, int columns)
{
    int used = utf8_columns(text_string(out) + start);

    text_add_char(out, ' ', used < columns ? (size_t)(columns - used) : 1);
}

static void print_line(struct text *out, const struct plan *plan, const struct joint_line *line)
{
    enum unit_system units = (enum unit_system)plan->job.job_units;
    size_t start = out->length;
    double at[2];

    ends(plan, line, at);
    text_format(out, "  %s", line->name);
    pad(out, start, 8);
    text_add(out, kind_word(line));
    pad(out, start, 20);
    unit_show(out, line->length_m, QUANTITY_LENGTH, units);
    pad(out, start, 34);
    text_add(out, along_x(line) ? "south" : "west");
    pad(out, start, 42);
    unit_show_tape(out, at[0], units);
    pad(out, start, 57);
    unit_show_tape(out, at[1], units);
    text_add_char(out, '\n', 1);
}

void joint_lines_print(struct text *out, const struct plan *plan, int most)
{
    int last = joint_line_last(&plan->layout);
    struct joint_line line;

    text_add(out, "  line  kind        length        tape    at its south   at its north\n"
                  "                                  from    or west end    or east end\n");
    for (int number = 1; number <= last && number <= most; number++)
        if (joint_line_find(&plan->layout, number, &line))
            print_line(out, plan, &line);
    if (last > most)
        text_format(out, "  + %d more (--csv joints or --json)\n", last - most);
}
