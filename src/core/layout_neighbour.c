#include "core/layout_neighbour.h"
#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

static bool is_matched(const struct layout_edge *e)
{
    return e->kind == LAYOUT_EDGE_EXISTING && !e->isolate && e->joint_count > 0;
}

static size_t old_joints(const struct layout_input *input)
{
    size_t n = 0;
    for (size_t i = 0; i < input->edge_count; i++)
        n += is_matched(&input->edges[i]) ? input->edges[i].joint_count : 0;
    return n;
}

static double metres_of(const struct layout *l)
{
    double sum = 0;
    for (size_t i = 0; i < l->joint_count; i++)
        sum += hypot(l->joints[i].x2 - l->joints[i].x1, l->joints[i].y2 - l->joints[i].y1);
    return sum;
}

static size_t not_met(const struct layout *l)
{
    size_t n = 0;
    for (size_t i = 0; i < l->reason_count; i++)
        n += strcmp(l->reasons[i].rule, "edge.match") == 0;
    return n;
}

static enum status solve_isolated(const struct layout_input *input, struct layout *other)
{
    struct layout_edge *edges = calloc(input->edge_count + 1, sizeof *edges);
    struct layout_input in = *input;
    if (!edges)
        return STATUS_NO_MEMORY;
    memcpy(edges, input->edges, input->edge_count * sizeof *edges);
    for (size_t i = 0; i < input->edge_count; i++)
        edges[i].isolate |= is_matched(&edges[i]);
    in.edges = edges;
    const enum status status = layout_solve_once(&in, other);
    free(edges);
    return status;
}

enum status neighbour_choose(const struct layout_input *input, struct layout *layout)
{
    const size_t joints = old_joints(input);
    struct layout other = {0};
    if (!joints)
        return STATUS_OK;
    const enum status status = solve_isolated(input, &other);
    if (status)
        return status;
    const double met = metres_of(layout), isolated = metres_of(&other);
    const size_t missed = not_met(layout);
    const int matched_faults = layout->violations, isolated_faults = other.violations;
    const bool change = isolated_faults < matched_faults;
    struct layout_reason note = {
        .code = "MATCH_GAP", .rule = "note", .value = met, .limit = isolated};
    if (change) {
        layout_free(layout);
        *layout = other;
    } else {
        layout_free(&other);
    }
    if (change)
        snprintf(
            note.cause, sizeof note.cause,
            "The side at the old slab is isolated: meeting its %zu joints would break %d rules.",
            joints, matched_faults - isolated_faults);
    else
        snprintf(note.cause, sizeof note.cause, "%zu of the old slab's %zu joints are met.",
                 joints - missed, joints);
    snprintf(note.remedy, sizeof note.remedy,
             "Meeting them takes %.1f m of joint, isolating the side %.1f m.", met, isolated);
    return layout_reason_add(&layout->reasons, &layout->reason_count, note) ? STATUS_OK
                                                                            : STATUS_NO_MEMORY;
}
