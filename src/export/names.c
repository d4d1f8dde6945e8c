#include "export/names.h"
#include <math.h>
#include <stdio.h>
#include <string.h>

enum direction { ACROSS, ALONG, SKEW };

static enum direction direction_of(const struct layout_joint *joint)
{
    if (fabs(joint->x1 - joint->x2) < 1e-6)
        return ACROSS;
    return fabs(joint->y1 - joint->y2) < 1e-6 ? ALONG : SKEW;
}

/* Lines of one direction among those numbered 1 to `up_to`. Pieces of a line stand together. */
static int count_lines(const struct layout *layout, enum direction direction, int up_to)
{
    int count = 0, last = 0;

    for (size_t i = 0; i < layout->joint_count; i++) {
        const struct layout_joint *joint = &layout->joints[i];
        if (joint->line > 0 && joint->line <= up_to && joint->line != last &&
            direction_of(joint) == direction) {
            last = joint->line;
            count++;
        }
    }
    return count;
}

int name_lines_across(const struct layout *layout)
{
    return count_lines(layout, ACROSS, 1 << 30);
}

int name_lines_along(const struct layout *layout)
{
    return count_lines(layout, ALONG, 1 << 30);
}

/* 1 -> A, 26 -> Z, 27 -> AA */
static void letters(int number, char out[LINE_NAME_MOST])
{
    char reversed[LINE_NAME_MOST];
    int n = 0;

    while (number > 0 && n < LINE_NAME_MOST - 1) {
        number--;
        reversed[n++] = (char)('A' + number % 26);
        number /= 26;
    }
    for (int i = 0; i < n; i++)
        out[i] = reversed[n - 1 - i];
    out[n] = '\0';
}

void name_line(const struct layout *layout, int line, char out[LINE_NAME_MOST])
{
    enum direction direction = SKEW;

    for (size_t i = 0; i < layout->joint_count; i++)
        if (layout->joints[i].line == line) {
            direction = direction_of(&layout->joints[i]);
            break;
        }
    if (direction == ALONG)
        letters(count_lines(layout, ALONG, line), out);
    else if (direction == ACROSS)
        snprintf(out, LINE_NAME_MOST, "%d", count_lines(layout, ACROSS, line));
    else
        snprintf(out, LINE_NAME_MOST, "%d",
                 name_lines_across(layout) + count_lines(layout, SKEW, line));
}

/* Lines of a direction that lie left of (below) a point. */
static int lines_before(const struct layout *layout, enum direction direction, double at)
{
    int count = 0, last = 0;

    for (size_t i = 0; i < layout->joint_count; i++) {
        const struct layout_joint *joint = &layout->joints[i];
        double place = direction == ACROSS ? joint->x1 : joint->y1;
        if (joint->line > 0 && joint->line != last && direction_of(joint) == direction) {
            last = joint->line;
            count += place < at;
        }
    }
    return count;
}

void name_panel(const struct layout *layout, const struct layout_panel *panel,
                char out[2 * LINE_NAME_MOST])
{
    double x = 0, y = 0;
    char row[LINE_NAME_MOST];

    for (size_t i = 0; i < panel->count; i++) {
        x += panel->ring[i].x / (double)panel->count;
        y += panel->ring[i].y / (double)panel->count;
    }
    letters(lines_before(layout, ALONG, y) + 1, row);
    snprintf(out, 2 * LINE_NAME_MOST, "%d%s", lines_before(layout, ACROSS, x) + 1, row);
}
