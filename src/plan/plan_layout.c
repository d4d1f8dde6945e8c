/* Job -> layout: hands the slab's geometry and rules to the layout engine. */
#include "plan/plan_steps.h"
#include <math.h>
#include <stdlib.h>
#include <string.h>

/* Everything the layout input points to; freed at the end. */
struct geometry {
    struct layout_corner *corners; /* outline, then the openings one after the other */
    struct layout_ring *openings;
    bool *opening_wall;
    struct layout_object *objects;
    struct layout_edge *edges;
    struct layout_segment *lines;
    struct layout_drawn *drawn;
};

static const char *const object_words[] = {"column", "manhole", "drain", "channel",
                                           "post",   "wall",    "other"};

static void free_geometry(struct geometry *geometry)
{
    free(geometry->corners);
    free(geometry->openings);
    free(geometry->opening_wall);
    free(geometry->objects);
    free(geometry->edges);
    free(geometry->lines);
    free(geometry->drawn);
}

static size_t corner_count(const struct job *job)
{
    size_t count = job->outline.count;

    for (size_t i = 0; i < job->opening_count; i++)
        count += job->openings[i].rows.count;
    return count;
}

static bool allocate(struct geometry *geometry, const struct job *job)
{
    geometry->corners = calloc(corner_count(job) + 1, sizeof *geometry->corners);
    geometry->openings = calloc(job->opening_count + 1, sizeof *geometry->openings);
    geometry->opening_wall = calloc(job->opening_count + 1, sizeof *geometry->opening_wall);
    geometry->objects = calloc(job->object_count + 1, sizeof *geometry->objects);
    geometry->edges = calloc(job->edge_count + 1, sizeof *geometry->edges);
    geometry->lines = calloc(job->pour_line_count + 1, sizeof *geometry->lines);
    geometry->drawn = calloc(job->joint_count + 1, sizeof *geometry->drawn);
    return geometry->corners != NULL && geometry->openings != NULL &&
           geometry->opening_wall != NULL && geometry->objects != NULL && geometry->edges != NULL &&
           geometry->lines != NULL && geometry->drawn != NULL;
}

/* Copies rows to `at`. An arc that closes the outline on its first point adds no point: its shape
 * moves to the first corner, the side that arrives there. */
static struct layout_ring copy_ring(const struct rows *rows, struct layout_corner *at)
{
    size_t count = rows->count;
    const struct row *last = count > 0 ? &rows->items[count - 1] : NULL;

    for (size_t i = 0; i < count; i++) {
        const struct row *row = &rows->items[i];
        at[i] = (struct layout_corner){row->x, row->y, row->arc, row->left, row->cx, row->cy};
    }
    if (count > 1 && last->arc && fabs(last->x - at[0].x) < 1e-6 &&
        fabs(last->y - at[0].y) < 1e-6) {
        at[0].arc = true;
        at[0].left = last->left;
        at[0].cx = last->cx;
        at[0].cy = last->cy;
        count--;
    }
    return (struct layout_ring){at, count};
}

static void copy_rings(struct geometry *geometry, const struct job *job, struct layout_input *input)
{
    struct layout_corner *at = geometry->corners;

    input->outline = copy_ring(&job->outline, at);
    at += job->outline.count;
    for (size_t i = 0; i < job->opening_count; i++) {
        geometry->openings[i] = copy_ring(&job->openings[i].rows, at);
        geometry->opening_wall[i] = job->openings[i].against == AGAINST_WALL;
        at += job->openings[i].rows.count;
    }
    input->openings = geometry->openings;
    input->opening_wall = geometry->opening_wall;
    input->opening_count = job->opening_count;
}

static void copy_objects(struct geometry *geometry, const struct job *job,
                         struct layout_input *input)
{
    for (size_t i = 0; i < job->object_count; i++) {
        const struct object *object = &job->objects[i];
        geometry->objects[i] = (struct layout_object){
            .id = object->name,
            .kind = object_words[object->kind],
            .round = object->shape == SHAPE_ROUND,
            .isolate = object->isolate,
            .edge_kind_channel = object->kind == OBJECT_CHANNEL || object->kind == OBJECT_WALL,
            .x = object->x,
            .y = object->y,
            .w = object->w,
            .d = object->d,
            .angle_deg = object->angle_deg,
            .box_at_given = object->box_at_given,
            .box_half_given = object->box_half_given,
            .box_x = object->box_x,
            .box_y = object->box_y,
            .box_half = object->box_half,
        };
    }
    input->objects = geometry->objects;
    input->object_count = job->object_count;
}

static enum layout_edge_kind edge_kind(const struct edge *edge)
{
    switch (edge->against) {
    case AGAINST_WALL:
    case AGAINST_ASPHALT:
        return LAYOUT_EDGE_FIXED;
    case AGAINST_SLAB:
        return LAYOUT_EDGE_EXISTING;
    case AGAINST_KERB:
        return edge->treat == TREAT_MATCH ? LAYOUT_EDGE_EXISTING : LAYOUT_EDGE_FIXED;
    default:
        return LAYOUT_EDGE_FREE;
    }
}

static void copy_edges(struct geometry *geometry, const struct job *job, struct layout_input *input)
{
    for (size_t i = 0; i < job->edge_count; i++) {
        const struct edge *edge = &job->edges[i];
        geometry->edges[i] = (struct layout_edge){
            .side = (size_t)(edge->number - 1),
            .kind = edge_kind(edge),
            .isolate = edge->treat == TREAT_ISOLATE,
            .joints = edge->joints,
            .joint_count = edge->joint_count,
        };
    }
    input->edges = geometry->edges;
    input->edge_count = job->edge_count;
}

static void copy_lines(struct geometry *geometry, const struct job *job, struct layout_input *input)
{
    for (size_t i = 0; i < job->pour_line_count; i++) {
        const struct pour_line *line = &job->pour_lines[i];
        geometry->lines[i] = (struct layout_segment){line->x1, line->y1, line->x2, line->y2};
    }
    for (size_t i = 0; i < job->joint_count; i++) {
        const struct drawn_joint *joint = &job->joints[i];
        geometry->drawn[i] = (struct layout_drawn){
            .kind = joint->kind == JOINT_CONTRACTION    ? LAYOUT_CONTRACTION
                    : joint->kind == JOINT_CONSTRUCTION ? LAYOUT_CONSTRUCTION
                                                        : LAYOUT_ISOLATION,
            .expansion = joint->kind == JOINT_EXPANSION,
            .keep = joint->keep,
            .at = {joint->x1, joint->y1, joint->x2, joint->y2},
        };
    }
    input->has_pours = job->has_pours;
    input->pour_lines = geometry->lines;
    input->pour_line_count = job->pour_line_count;
    input->drawn = geometry->drawn;
    input->drawn_count = job->joint_count;
}

static double or_zero(double value)
{
    return isfinite(value) ? value : 0;
}

enum status plan_set_layout(struct plan *plan, struct plan_cache *cache,
                            const struct plan_progress *progress)
{
    const struct job *job = &plan->job;
    struct geometry geometry = {0};
    struct layout_input input = {
        .max_side_x = plan->spacing.limit_m,
        .max_side_y = plan->spacing.across_limit_m,
        .axis_deg = job->rules_axis,
        .max_aspect = job->rules_aspect,
        .min_side = job->rules_least_side,
        .min_angle_deg = job->rules_least_angle,
        .round_to = job->rules_round_to,
        .expansion_every = or_zero(job->rules_expansion_every),
        .pour_width = or_zero(job->pours_width),
        .pour_direction_deg = job->pours_direction,
        .us_units = job->job_units == UNITS_US,
        .effort = job->rules_effort,
        .cache = cache != NULL ? &cache->layout : NULL,
        .go_on = progress != NULL ? progress->go_on : NULL,
        .context = progress != NULL ? progress->context : NULL,
    };
    enum status status = STATUS_NO_MEMORY;

    if (allocate(&geometry, job)) {
        copy_rings(&geometry, job, &input);
        copy_objects(&geometry, job, &input);
        copy_edges(&geometry, job, &input);
        copy_lines(&geometry, job, &input);
        status = layout_solve(&input, &plan->layout);
        if (status == STATUS_REFUSED)
            finding_add(&plan->findings, SEVERITY_ERROR, "outline", "", "",
                        job->outline.items[0].line, 1,
                        "The outline is no slab: its sides cross or it has no area. Give the "
                        "corners in order round the slab.");
    }
    free_geometry(&geometry);
    return status;
}
