/* Reading every value of a document into a job. */
#include "job/document_lines.h"
#include "base/array.h"
#include "job/value.h"
#include <math.h>
#include <stdlib.h>
#include <string.h>

/* What is being read: one section's place in the job, and what was seen of it. */
struct place {
    size_t index; /* into openings, objects ... */
    bool at, size, diameter, from, to, joints_typed;
};

struct reader {
    const struct document *document;
    struct job *job;
    struct finding_list *findings;
    struct place *places; /* one per section */
    enum unit_system units;
    bool no_memory;
};

/* ---- a new thing for each header ---- */

#define GROW(list)                                                                                 \
    array_reserve((void **)&job->list##s, &job->list##_capacity, job->list##_count + 1,            \
                  sizeof *job->list##s)

static void copy_name(const struct document *document, const struct section *section,
                      char name[NAME_MOST + 1])
{
    size_t length = section->name.length < NAME_MOST ? section->name.length : NAME_MOST;

    memcpy(name, document->bytes + section->name.at, length);
    name[length] = '\0';
}

static bool add_opening(struct job *job, const struct document *document,
                        const struct section *section)
{
    struct opening opening = {.line = section->header_line + 1};

    if (!GROW(opening))
        return false;
    copy_name(document, section, opening.name);
    job->openings[job->opening_count++] = opening;
    return true;
}

static bool add_object(struct job *job, const struct document *document,
                       const struct section *section)
{
    struct object object = {
        .kind = OBJECT_OTHER, .isolate = true, .line = section->header_line + 1};

    if (!GROW(object))
        return false;
    copy_name(document, section, object.name);
    job->objects[job->object_count++] = object;
    return true;
}

static bool add_edge(struct job *job, const struct section *section)
{
    struct edge edge = {
        .number = section->number, .treat = TREAT_ISOLATE, .line = section->header_line + 1};

    if (!GROW(edge))
        return false;
    job->edges[job->edge_count++] = edge;
    return true;
}

static bool add_joint(struct job *job, const struct section *section)
{
    struct drawn_joint joint = {.keep = true, .line = section->header_line + 1};

    if (!GROW(joint))
        return false;
    job->joints[job->joint_count++] = joint;
    return true;
}

static bool add_crack(struct job *job, const struct section *section)
{
    struct crack crack = {.line = section->header_line + 1};

    if (!GROW(crack))
        return false;
    job->cracks[job->crack_count++] = crack;
    return true;
}

/* Makes the thing of a section and remembers where it is. */
static bool add_thing(struct reader *r, size_t index)
{
    const struct section *section = &r->document->sections[index];
    struct job *job = r->job;
    size_t *at = &r->places[index].index;

    switch (section->kind) {
    case SECTION_POURS:
        job->has_pours = true;
        return true;
    case SECTION_OPENING:
        *at = job->opening_count;
        return add_opening(job, r->document, section);
    case SECTION_OBJECT:
        *at = job->object_count;
        return add_object(job, r->document, section);
    case SECTION_EDGE:
        *at = job->edge_count;
        return add_edge(job, section);
    case SECTION_JOINT:
        *at = job->joint_count;
        return add_joint(job, section);
    case SECTION_CRACK:
        *at = job->crack_count;
        return add_crack(job, section);
    default:
        return true;
    }
}

/* ---- values ---- */

static void read_single(struct reader *r, const struct value *value, const struct field *field)
{
    if (value_read(value, field, (char *)r->job + field->offset))
        r->job->given[field - field_table] = true;
}

static void read_row(struct reader *r, const struct value *value, struct rows *rows, bool arc)
{
    struct row row = {.line = value->line};

    if (rows->count >= 20000 || !value_read_row(value, arc, &row))
        return;
    if (array_reserve((void **)&rows->items, &rows->capacity, rows->count + 1, sizeof row))
        rows->items[rows->count++] = row;
    else
        r->no_memory = true;
}

static void read_pour_line(struct reader *r, const struct value *value)
{
    struct job *job = r->job;
    struct pour_line line = {.line = value->line};

    if (job->pour_line_count >= 20000 || !value_read_line(value, &line))
        return;
    if (GROW(pour_line))
        job->pour_lines[job->pour_line_count++] = line;
    else
        r->no_memory = true;
}

static bool key_is(const struct field *field, const char *key)
{
    return strcmp(field->key, key) == 0;
}

static void read_opening(struct reader *r, const struct value *value, const struct field *field,
                         struct opening *opening)
{
    int against;

    if (key_is(field, "against")) {
        if (value_read(value, field, &against))
            opening->against = (enum against)against;
    } else {
        read_row(r, value, &opening->rows, field->type == FIELD_ARC);
    }
}

static void read_object_shape(const struct value *value, const struct field *field,
                              struct object *object, struct place *place)
{
    double diameter;

    if (field->type == FIELD_SIZE) {
        double w, d;
        place->size = true;
        if (value_read_size(value, field, &w, &d)) {
            object->shape = SHAPE_RECT;
            object->w = w;
            object->d = d;
        }
        return;
    }
    if (value_read(value, field, &diameter) && !place->size) {
        object->shape = SHAPE_ROUND;
        object->w = object->d = diameter;
    }
    place->diameter = true;
}

static void read_object(const struct value *value, const struct field *field, struct object *object,
                        struct place *place)
{
    int choice;

    if (key_is(field, "kind")) {
        if (value_read(value, field, &choice))
            object->kind = (enum object_kind)choice;
    } else if (key_is(field, "isolate")) {
        if (value_read(value, field, &choice))
            object->isolate = choice == 1;
    } else if (key_is(field, "at")) {
        place->at = true;
        value_read_point(value, &object->x, &object->y);
    } else if (key_is(field, "angle")) {
        value_read(value, field, &object->angle_deg);
    } else if (key_is(field, "box-at")) {
        object->box_at_given = value_read_point(value, &object->box_x, &object->box_y);
    } else if (key_is(field, "box-half")) {
        object->box_half_given = value_read(value, field, &object->box_half);
    } else {
        read_object_shape(value, field, object, place);
    }
}

static void read_edge(const struct value *value, const struct field *field, struct edge *edge)
{
    int choice;

    if (key_is(field, "against")) {
        if (value_read(value, field, &choice))
            edge->against = (enum against)choice;
    } else if (key_is(field, "treat")) {
        if (value_read(value, field, &choice)) {
            edge->treat = (enum treat)choice;
            edge->treat_given = true;
        }
    } else {
        value_read_list(value, field, &edge->joints, &edge->joint_count);
    }
}

static void read_joint(const struct value *value, const struct field *field,
                       struct drawn_joint *joint, struct place *place)
{
    int choice;

    if (key_is(field, "kind")) {
        if (value_read(value, field, &choice))
            joint->kind = (enum joint_kind)choice;
    } else if (key_is(field, "keep")) {
        if (value_read(value, field, &choice))
            joint->keep = choice == 1;
    } else if (key_is(field, "from")) {
        place->from = true;
        value_read_point(value, &joint->x1, &joint->y1);
    } else {
        place->to = true;
        value_read_point(value, &joint->x2, &joint->y2);
    }
}

static void read_value(struct reader *r, const struct value *value, const struct field *field,
                       int section)
{
    struct place *place = &r->places[section];
    struct job *job = r->job;

    if (!field->repeat) {
        read_single(r, value, field);
        return;
    }
    switch (r->document->sections[section].kind) {
    case SECTION_OUTLINE:
        read_row(r, value, &job->outline, field->type == FIELD_ARC);
        break;
    case SECTION_POURS:
        read_pour_line(r, value);
        break;
    case SECTION_OPENING:
        read_opening(r, value, field, &job->openings[place->index]);
        break;
    case SECTION_OBJECT:
        read_object(value, field, &job->objects[place->index], place);
        break;
    case SECTION_EDGE:
        read_edge(value, field, &job->edges[place->index]);
        break;
    case SECTION_JOINT:
        read_joint(value, field, &job->joints[place->index], place);
        break;
    case SECTION_CRACK:
        read_row(r, value, &job->cracks[place->index].rows, field->type == FIELD_ARC);
        break;
    default:
        break;
    }
}

static void read_pair(struct reader *r, size_t index)
{
    const struct line *line = &r->document->lines[index];
    const struct field *field;
    struct text path = {0};
    struct value value = {.bytes = r->document->bytes + line->value.at,
                          .count = line->value.length,
                          .line = (int)index + 1,
                          .units = r->units,
                          .findings = r->findings};

    if (line->section < 0 || line->value.length == 0)
        return;
    field = document_field(r->document, line);
    if (field == NULL || r->findings->count > 1000)
        return;
    document_pair_path(r->document, line, &path);
    value.path = text_string(&path);
    value.column = document_column(r->document, line, line->value.at);
    read_value(r, &value, field, line->section);
    r->no_memory = r->no_memory || path.failed;
    text_free(&path);
}

/* ---- what must be there ---- */

static void missing(struct reader *r, const struct section *section, const char *key,
                    const char *words)
{
    const struct document *document = r->document;
    struct text path = {0};

    text_add_bytes(&path, document->bytes + section->word.at, section->word.length);
    if (section->kind == SECTION_JOINT)
        text_format(&path, ".%d.%s", section->number, key);
    else
        text_format(&path, ".%.*s.%s", (int)section->name.length,
                    document->bytes + section->name.at, key);
    finding_add(r->findings, SEVERITY_ERROR, text_string(&path), "", "", section->header_line + 1,
                1, "%s: missing; %s", text_string(&path), words);
    text_free(&path);
}

static void check_section(struct reader *r, size_t index)
{
    const struct section *section = &r->document->sections[index];
    const struct place *place = &r->places[index];

    if (section->kind == SECTION_OBJECT) {
        if (!place->at)
            missing(r, section, "at", "write its centre, such as at = 12, 8 m.");
        if (!place->size && !place->diameter)
            missing(r, section, "size", "write size = 0.4 x 0.4 m, or diameter = 0.8 m.");
        if (place->size && place->diameter) {
            const struct object *object = &r->job->objects[place->index];
            finding_add(r->findings, SEVERITY_WARNING, "object.diameter", "", "", object->line, 1,
                        "object.%s.diameter: not used, the size beside it counts; take one out.",
                        object->name);
        }
    }
    if (section->kind == SECTION_JOINT) {
        if (!place->from)
            missing(r, section, "from", "write where the joint begins, such as from = 4, 0 m.");
        if (!place->to)
            missing(r, section, "to", "write where the joint ends, such as to = 4, 12 m.");
    }
}

/* job.units, needed to say limits in the file's own units. */
static enum unit_system units_of(const struct document *document)
{
    const char *word = document_get(document, "job.units");

    return word != NULL && strcmp(word, "us") == 0 ? UNITS_US : UNITS_METRIC;
}

enum status document_job(const struct document *document, struct job *job,
                         struct finding_list *findings)
{
    struct finding_list own = {0};
    struct reader r = {.document = document, .job = job, .findings = &own};
    enum status status;

    r.places = calloc(document->section_count + 1, sizeof *r.places);
    if (r.places == NULL)
        return STATUS_NO_MEMORY;
    r.units = units_of(document);
    for (size_t i = 0; i < document->section_count && !r.no_memory; i++)
        r.no_memory = !add_thing(&r, i);
    for (size_t i = 0; i < document->line_count && !r.no_memory; i++)
        if (document->lines[i].kind == LINE_PAIR)
            read_pair(&r, i);
    for (size_t i = 0; i < document->section_count && !r.no_memory; i++)
        check_section(&r, i);
    free(r.places);
    finding_append(findings, &own);
    status = r.no_memory || own.failed || findings->failed ? STATUS_NO_MEMORY
             : finding_has_error(&own)                     ? STATUS_REFUSED
                                                           : STATUS_OK;
    finding_free(&own);
    return status;
}
