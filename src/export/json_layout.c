#include "export/json_layout.h"
#include <stdio.h>
#include <math.h>
#include <string.h>

static void add_point(struct json *json, double x, double y)
{
    json_open(json, NULL, '[');
    json_coordinate(json, NULL, x);
    json_coordinate(json, NULL, y);
    json_close(json, ']');
}

static void add_ring(struct json *json, const char *key, const struct layout_point *points,
                     size_t count)
{
    json_open(json, key, '[');
    for (size_t i = 0; i < count; i++)
        add_point(json, points[i].x, points[i].y);
    json_close(json, ']');
}

static void add_openings(struct json *json, const struct layout *layout)
{
    json_open(json, "openings", '[');
    for (size_t i = 0; i < layout->opening_count; i++)
        add_ring(json, NULL, layout->openings[i].points, layout->openings[i].count);
    json_close(json, ']');
}

static const char *object_kind_word(enum object_kind kind)
{
    static const char *const words[] = {"column", "manhole", "drain", "channel",
                                        "post",   "wall",    "other"};

    return words[kind];
}

static void add_fixed(struct json *json, const struct job *job)
{
    json_open(json, "fixed", '[');
    for (size_t i = 0; i < job->object_count; i++) {
        const struct object *object = &job->objects[i];
        json_open(json, NULL, '{');
        json_string(json, "id", object->name);
        json_string(json, "kind", object_kind_word(object->kind));
        json_string(json, "shape", object->shape == SHAPE_ROUND ? "round" : "rect");
        json_coordinate(json, "x", object->x);
        json_coordinate(json, "y", object->y);
        if (object->shape == SHAPE_ROUND) {
            json_coordinate(json, "diameter", object->w);
        } else {
            json_coordinate(json, "w", object->w);
            json_coordinate(json, "d", object->d);
            json_number(json, "angle_deg", object->angle_deg);
        }
        json_bool(json, "needs_isolation", object->isolate);
        json_close(json, '}');
    }
    json_close(json, ']');
}

static void add_limits(struct json *json, const struct plan *plan)
{
    const struct job *job = &plan->job;
    double along = plan->spacing.limit_m, across = plan->spacing.across_limit_m;

    json_open(json, "limits", '{');
    json_number(json, "max_side", across != along ? fmax(along, across) : along);
    json_number(json, "max_aspect", job->rules_aspect);
    json_number(json, "min_side", job->rules_least_side);
    json_number(json, "min_angle_deg", job->rules_least_angle);
    if (across != along) {
        json_number(json, "max_side_x", along);
        json_number(json, "max_side_y", across);
        json_number(json, "axis_deg", job->rules_axis);
    }
    json_close(json, '}');
}

static void add_edges(struct json *json, const struct layout *layout)
{
    json_open(json, "edges", '[');
    for (size_t i = 0; i < layout->edge_count; i++) {
        const struct layout_edge_out *edge = &layout->edges[i];
        if (edge->kind == LAYOUT_EDGE_FREE)
            continue;
        json_open(json, NULL, '{');
        json_integer(json, "index", (long long)edge->index);
        json_integer(json, "edge", (long long)edge->edge);
        json_string(json, "kind", edge->kind == LAYOUT_EDGE_FIXED ? "fixed" : "existing");
        json_open(json, "joints", '[');
        for (size_t j = 0; j < edge->joint_count; j++)
            json_coordinate(json, NULL, edge->joints[j]);
        json_close(json, ']');
        json_string(json, "treat", edge->isolate ? "isolate" : "match");
        json_close(json, '}');
    }
    json_close(json, ']');
}

static void add_segment(struct json *json, double x1, double y1, double x2, double y2)
{
    json_coordinate(json, "x1", x1);
    json_coordinate(json, "y1", y1);
    json_coordinate(json, "x2", x2);
    json_coordinate(json, "y2", y2);
}

static void add_pours(struct json *json, const struct job *job)
{
    json_open(json, "pours", '{');
    if (job->has_pours) {
        json_open(json, "lines", '[');
        for (size_t i = 0; i < job->pour_line_count; i++) {
            const struct pour_line *line = &job->pour_lines[i];
            json_open(json, NULL, '{');
            add_segment(json, line->x1, line->y1, line->x2, line->y2);
            json_close(json, '}');
        }
        json_close(json, ']');
        if (job->given[FIELD_pours_width])
            json_number(json, "max_width", job->pours_width);
        json_number(json, "direction_deg", job->pours_direction);
    }
    json_close(json, '}');
}

static void add_joints(struct json *json, const struct layout *layout)
{
    static const char *const words[] = {"contraction", "construction", "isolation"};

    json_open(json, "joints", '[');
    for (size_t i = 0; i < layout->joint_count; i++) {
        const struct layout_joint *joint = &layout->joints[i];
        json_open(json, NULL, '{');
        json_string(json, "id", joint->id);
        json_string(json, "kind", words[joint->kind]);
        add_segment(json, joint->x1, joint->y1, joint->x2, joint->y2);
        if (joint->expansion)
            json_string(json, "purpose", "expansion");
        json_close(json, '}');
    }
    json_close(json, ']');
}

static void add_reasons(struct json *json, const char *key, const struct layout_reason *reasons,
                        size_t count)
{
    json_open(json, key, '[');
    for (size_t i = 0; i < count; i++) {
        json_open(json, NULL, '{');
        json_string(json, "code", reasons[i].code);
        json_string(json, "rule", reasons[i].rule);
        json_number(json, "value", isfinite(reasons[i].value) ? reasons[i].value : 0);
        json_number(json, "limit", isfinite(reasons[i].limit) ? reasons[i].limit : 0);
        json_string(json, "cause", reasons[i].cause);
        json_string(json, "remedy", reasons[i].remedy);
        json_close(json, '}');
    }
    json_close(json, ']');
}

static void add_panels(struct json *json, const struct layout *layout)
{
    json_open(json, "panels", '[');
    for (size_t i = 0; i < layout->panel_count; i++) {
        const struct layout_panel *panel = &layout->panels[i];
        char id[32];

        snprintf(id, sizeof id, "P%d", panel->number);
        json_open(json, NULL, '{');
        json_string(json, "id", id);
        add_ring(json, "ring", panel->ring, panel->count);
        json_number(json, "length_m", panel->length);
        json_number(json, "width_m", panel->width);
        json_number(json, "aspect", panel->aspect);
        add_reasons(json, "reasons", panel->reasons, panel->reason_count);
        json_close(json, '}');
    }
    json_close(json, ']');
}

void json_add_layout(struct json *json, const struct plan *plan)
{
    const struct layout *layout = &plan->layout;
    int compact = json->compact;

    json_open(json, "layout", '{');
    json->compact = json->depth + 2;
    add_ring(json, "outline", layout->outline, layout->outline_count);
    add_openings(json, layout);
    add_fixed(json, &plan->job);
    add_limits(json, plan);
    add_edges(json, layout);
    add_pours(json, &plan->job);
    add_joints(json, layout);
    add_panels(json, layout);
    json_open(json, "bound", '{');
    json_integer(json, "panels", layout->bound_panels);
    json_number(json, "joint_m", layout->bound_joint_m);
    json_close(json, '}');
    json_integer(json, "violations", layout->violations);
    json->compact = compact;
    json_close(json, '}');
}

void json_add_slab_reasons(struct json *json, const struct plan *plan)
{
    add_reasons(json, "layout_reasons", plan->layout.reasons, plan->layout.reason_count);
}
