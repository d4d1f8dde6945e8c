/* Random outlines, rectilinear or not, with an opening and objects: no crash, no leak, and the
 * panels never cover more than the outline's own area (with objects, which the job refuses off the
 * slab, only the first two). */
#include "core/layout.h"
#include <math.h>
#include <stdlib.h>

int LLVMFuzzerTestOneInput(const uint8_t *data, size_t size);

int LLVMFuzzerTestOneInput(const uint8_t *data, size_t size)
{
    struct layout_corner corner[16] = {{0}};
    struct layout_object object[3] = {{0}};
    if (size < 10)
        return 0;
    const size_t n = 3 + data[0] % 13;
    const bool square = data[1] & 1;
    double x = 0, y = 0, area = 0;
    for (size_t i = 0; i < n; i++) {
        corner[i] = (struct layout_corner){.x = x, .y = y};
        const double step = (double)(int8_t)data[(2 + i) % size] / 5;
        x += square && i % 2 ? 0 : step;
        y += square ? (i % 2 ? step : 0) : (double)(int8_t)data[(7 + 3 * i) % size] / 5;
    }
    if (square && n % 2 == 0)
        corner[n - 1].x = corner[0].x;
    for (size_t i = 0; i < n; i++)
        area += corner[i].x * corner[(i + 1) % n].y - corner[(i + 1) % n].x * corner[i].y;
    for (size_t i = 0; i < 3; i++)
        object[i] = (struct layout_object){.id = "C1",
                                           .kind = "column",
                                           .isolate = true,
                                           .round = data[2] & 1,
                                           .x = (double)data[(3 + i) % size] / 9,
                                           .y = (double)data[(4 + i) % size] / 9,
                                           .w = 0.4,
                                           .d = 0.4};
    const struct layout_input input = {.outline = {corner, n},
                                       .objects = object,
                                       .object_count = data[3] % 4,
                                       .max_side_x = 2 + data[4] % 5,
                                       .max_side_y = 2 + data[4] % 5,
                                       .max_aspect = 1.5,
                                       .min_side = 0.6,
                                       .min_angle_deg = 60,
                                       .effort = 0.02};
    struct layout layout = {0};
    if (layout_solve(&input, &layout) == STATUS_OK && input.object_count == 0 &&
        layout.area > fabs(area) / 2 + 1e-3)
        abort();
    layout_free(&layout);
    return 0;
}
