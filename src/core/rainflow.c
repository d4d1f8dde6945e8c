#include "core/rainflow.h"

#include <math.h>
#include <stdlib.h>

/* Turning points of the history: first, last and every change of direction. */
static size_t turning_points(const double *history, size_t count, double *points)
{
    size_t n = 0;

    for (size_t i = 0; i < count; i++) {
        if (n > 0 && fabs(history[i] - points[n - 1]) <= 0)
            continue; /* a level stretch is no turn */
        if (n >= 2 && (history[i] - points[n - 1]) * (points[n - 1] - points[n - 2]) > 0)
            points[n - 1] = history[i]; /* goes on the same way */
        else
            points[n++] = history[i];
    }
    return n;
}

static void add(struct rainflow_cycle *cycles, size_t *found, double a, double b, double count)
{
    cycles[(*found)++] = (struct rainflow_cycle){fabs(b - a), (a + b) / 2, count};
}

/* ASTM E1049-85 (2017) 5.4.4: X the range under consideration, Y the one before it. X < Y: read on.
 * Else Y counts one cycle and its points go; half a cycle, and only its first point goes, when Y
 * holds the start. What is left counts as half cycles. */
enum status rainflow_count(const double *history, size_t count, struct rainflow_cycle *cycles,
                           size_t *found)
{
    double *points = malloc((count + 1) * sizeof *points), *stack;
    size_t n, depth = 0;

    *found = 0;
    if (points == NULL)
        return STATUS_NO_MEMORY;
    n = turning_points(history, count, points);
    stack = points; /* never overtakes the reading */
    for (size_t i = 0; i < n; i++) {
        stack[depth++] = points[i];
        while (depth >= 3) {
            double x = fabs(stack[depth - 1] - stack[depth - 2]);
            double y = fabs(stack[depth - 2] - stack[depth - 3]);
            if (x < y)
                break;
            if (depth == 3) {
                add(cycles, found, stack[0], stack[1], 0.5);
                stack[0] = stack[1];
                stack[1] = stack[2];
                depth = 2;
            } else {
                add(cycles, found, stack[depth - 3], stack[depth - 2], 1);
                stack[depth - 3] = stack[depth - 1];
                depth -= 2;
            }
        }
    }
    for (size_t i = 0; i + 1 < depth; i++)
        add(cycles, found, stack[i], stack[i + 1], 0.5);
    free(points);
    return STATUS_OK;
}
