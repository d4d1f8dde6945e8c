/* Reads a slab of tests/layouts: one fact a line (point, arc, opening, rect, round, channel, edge,
 * pourline, pourwidth, expansion, drawn, limit, expect). */
#ifndef TESTS_CORE_LAYOUT_FILE_H
#define TESTS_CORE_LAYOUT_FILE_H

#include "core/layout.h"
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

struct layout_file {
    struct layout_corner corners[256];
    struct layout_ring openings[16];
    bool walls[16];
    struct layout_object objects[128];
    char ids[128][16];
    struct layout_edge edges[16];
    double joints[16][8];
    struct layout_segment lines[8];
    struct layout_drawn drawn[8];
    struct layout_input input;
    int expect;
};

static void file_edge(struct layout_file *f, const char *line)
{
    char kind[16] = "", rest[160] = "", word[16];
    int number = 1, used = 0;
    struct layout_edge *e = &f->edges[f->input.edge_count];
    double *joints = f->joints[f->input.edge_count++];
    sscanf(line, "edge %d %15s %159[^\n]", &number, kind, rest);
    e->side = (size_t)number - 1;
    e->kind = strcmp(kind, "existing") ? LAYOUT_EDGE_FIXED : LAYOUT_EDGE_EXISTING;
    e->isolate = e->kind == LAYOUT_EDGE_FIXED;
    e->joints = joints;
    for (const char *p = rest; sscanf(p, "%15s%n", word, &used) == 1; p += used) {
        if (!strcmp(word, "isolate"))
            e->isolate = true;
        else
            joints[e->joint_count++] = strtod(word, NULL);
    }
}

static void file_object(struct layout_file *f, const char *line)
{
    char word[16] = "";
    struct layout_object *o = &f->objects[f->input.object_count];
    char *id = f->ids[f->input.object_count++];
    *o = (struct layout_object){.id = id, .kind = "column", .isolate = true};
    sscanf(line, "%15s %15s %lf %lf %lf %lf %lf", word, id, &o->x, &o->y, &o->w, &o->d,
           &o->angle_deg);
    o->round = !strcmp(word, "round");
    o->edge_kind_channel = !strcmp(word, "channel");
    if (o->round)
        o->d = o->w;
}

static void file_corner(struct layout_file *f, size_t *used, const char *line)
{
    struct layout_input *in = &f->input;
    struct layout_corner c = {0};
    char turn[16] = "left";
    if (sscanf(line, "arc %lf %lf %lf %lf %15s", &c.x, &c.y, &c.cx, &c.cy, turn) == 5) {
        c.arc = true;
        c.left = !strcmp(turn, "left");
    } else {
        sscanf(line, "point %lf %lf", &c.x, &c.y);
    }
    struct layout_ring *ring =
        in->opening_count ? &f->openings[in->opening_count - 1] : &in->outline;
    struct layout_corner *first = (struct layout_corner *)(void *)&f->corners[*used - ring->count];
    if (c.arc && ring->count && first->x == c.x && first->y == c.y) {
        first->arc = true; /* closes the ring: the side that arrives at its first corner */
        first->left = c.left;
        first->cx = c.cx;
        first->cy = c.cy;
        return;
    }
    f->corners[(*used)++] = c;
    ring->count++;
}

static void file_line(struct layout_file *f, size_t *used, const char *line)
{
    struct layout_input *in = &f->input;
    struct layout_segment *s = &f->lines[in->pour_line_count];
    struct layout_drawn *d = &f->drawn[in->drawn_count];
    char word[16] = "", keep[16] = "";
    sscanf(line, "%15s", word);
    if (!strcmp(word, "limit")) {
        sscanf(line, "limit %lf", &in->max_side_x);
        in->max_side_y = in->max_side_x;
    } else if (!strcmp(word, "point") || !strcmp(word, "arc")) {
        file_corner(f, used, line);
    } else if (!strcmp(word, "opening")) {
        f->walls[in->opening_count] = strstr(line, "wall") != NULL;
        f->openings[in->opening_count++] = (struct layout_ring){&f->corners[*used], 0};
    } else if (!strcmp(word, "edge")) {
        file_edge(f, line);
    } else if (!strcmp(word, "pourline")) {
        in->has_pours = true;
        in->pour_line_count++;
        sscanf(line, "pourline %lf %lf %lf %lf", &s->x1, &s->y1, &s->x2, &s->y2);
    } else if (!strcmp(word, "pourwidth")) {
        in->has_pours = true;
        sscanf(line, "pourwidth %lf %lf", &in->pour_width, &in->pour_direction_deg);
    } else if (!strcmp(word, "expansion")) {
        sscanf(line, "expansion %lf", &in->expansion_every);
    } else if (!strcmp(word, "drawn")) {
        in->drawn_count++;
        sscanf(line, "drawn %lf %lf %lf %lf %15s", &d->at.x1, &d->at.y1, &d->at.x2, &d->at.y2,
               keep);
        d->keep = !strcmp(keep, "yes");
    } else if (!strcmp(word, "expect")) {
        sscanf(line, "expect %d", &f->expect);
    } else if (!strcmp(word, "rect") || !strcmp(word, "round") || !strcmp(word, "channel")) {
        file_object(f, line);
    }
}

/* NULL when the file cannot be read; free() it. */
static inline struct layout_file *layout_file_read(const char *path)
{
    FILE *in = fopen(path, "r");
    struct layout_file *f = in ? calloc(1, sizeof *f) : NULL;
    char line[256];
    size_t used = 0;
    if (!f) {
        if (in)
            fclose(in);
        return NULL;
    }
    f->input = (struct layout_input){.outline = {f->corners, 0},
                                     .openings = f->openings,
                                     .opening_wall = f->walls,
                                     .objects = f->objects,
                                     .edges = f->edges,
                                     .pour_lines = f->lines,
                                     .drawn = f->drawn,
                                     .max_aspect = 1.5,
                                     .min_side = 0.6,
                                     .min_angle_deg = 60,
                                     .effort = 1};
    while (fgets(line, sizeof line, in))
        file_line(f, &used, line);
    fclose(in);
    return f;
}

#endif
