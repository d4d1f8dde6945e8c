/* Checks of the drawing that need no plan. One finding each, with what to do. */
#include "job/job.h"
#include "job/ring.h"
#include "job/trial.h"
#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

/* What is being checked. */
struct check {
    const struct job *job;
    struct finding_list *findings;
    enum unit_system units;
    struct ring outline, *openings; /* openings[i].count = 0: not good */
    bool slab;                      /* the outline is good */
};

__attribute__((format(printf, 5, 6))) static void
say(struct check *c, enum severity severity, const char *field, int line, const char *format, ...)
{
    struct text message = {0};
    va_list arguments;

    text_format(&message, "%s: ", field);
    va_start(arguments, format);
    text_vformat(&message, format, arguments);
    va_end(arguments);
    finding_add(c->findings, severity, field, "", "", line, line > 0, "%s", text_string(&message));
    text_free(&message);
}

/* A length for a sentence. */
static const char *shown(const struct check *c, double metres, struct text *out)
{
    text_clear(out);
    unit_show(out, metres, QUANTITY_LENGTH, c->units);
    return text_string(out);
}

/* ---- rings ---- */

/* centre equally far (1 mm) from both ends, and the ends apart */
static bool arc_good(struct check *c, const char *field, const struct row *from,
                     const struct row *to)
{
    double begin = hypot(from->x - to->cx, from->y - to->cy);
    double end = hypot(to->x - to->cx, to->y - to->cy);

    if (ring_units(from->x) == ring_units(to->x) && ring_units(from->y) == ring_units(to->y)) {
        say(c, SEVERITY_ERROR, field, to->line,
            "the arc ends where it begins; a full circle is two arcs.");
        return false;
    }
    if (fabs(begin - end) > 1e-3 + 1e-12 * end) {
        say(c, SEVERITY_ERROR, field, to->line,
            "the centre of the arc is %.4f m from where it begins and %.4f m from where it ends; "
            "both must be the same to 1 mm.",
            begin, end);
        return false;
    }
    if (end < 1e-3) {
        say(c, SEVERITY_ERROR, field, to->line, "the arc has no radius; check its centre.");
        return false;
    }
    return true;
}

static bool sides_good(struct check *c, const char *field, const struct rows *rows)
{
    size_t sides = ring_corner_count(rows);
    bool good = true;

    for (size_t side = 1; side <= sides && c->findings->count < 1000; side++) {
        const struct row *from = ring_side_begin(rows, side), *to = ring_side_end(rows, side);
        if (to->arc) {
            good = arc_good(c, field, from, to) && good;
        } else if (ring_units(from->x) == ring_units(to->x) &&
                   ring_units(from->y) == ring_units(to->y)) {
            if (side < rows->count)
                say(c, SEVERITY_ERROR, field, to->line,
                    "rows %zu and %zu are one point; take one out.", side, side + 1);
            else
                say(c, SEVERITY_ERROR, field, from->line,
                    "row %zu is the first point again; the outline closes by itself, take row "
                    "%zu out.",
                    side, side);
            good = false;
        }
    }
    return good;
}

/* Makes the ring of good rows; false after a finding. */
static bool ring_good(struct check *c, const char *field, const struct rows *rows, int line,
                      struct ring *ring)
{
    size_t corners = ring_corner_count(rows), arcs = 0;
    int first = 0, second = 0;

    for (size_t i = 0; i < rows->count; i++)
        arcs += rows->items[i].arc;
    if (corners < 2 || (corners < 3 && arcs == 0)) {
        say(c, SEVERITY_ERROR, field, rows->count > 0 ? rows->items[0].line : line,
            "it has %zu corners; at least three are needed.", corners);
        return false;
    }
    if (!sides_good(c, field, rows))
        return false;
    if (ring_make(rows, ring) != STATUS_OK) {
        c->findings->failed = true;
        return false;
    }
    if (ring_crosses_itself(ring, &first, &second)) {
        say(c, SEVERITY_ERROR, field, ring_side_begin(rows, (size_t)first)->line,
            "side %d and side %d cross or touch; give the corners in order round the edge.", first,
            second);
        ring_free(ring);
        return false;
    }
    return true;
}

/* ---- openings ---- */

static struct ring_point a_point(const struct ring *ring)
{
    return ring->chords[0].a;
}

static void check_opening_place(struct check *c, size_t index, const char *field)
{
    const struct opening *opening = &c->job->openings[index];
    struct ring *ring = &c->openings[index];
    bool outside;

    if (!c->slab)
        return;
    outside = ring_place(&c->outline, a_point(ring)) < 0;
    if (!rings_touch(&c->outline, ring) && !outside)
        return;
    say(c, SEVERITY_ERROR, field, opening->line,
        outside && !rings_touch(&c->outline, ring)
            ? "the opening lies outside the slab; check its corners."
            : "the opening cuts or touches the edge of the slab; make it part of the outline.");
    ring_free(ring);
}

static void check_opening_pairs(struct check *c, size_t index, const char *field)
{
    struct ring *ring = &c->openings[index];

    for (size_t j = 0; j < index && ring->count > 0; j++) {
        const struct ring *other = &c->openings[j];
        if (other->count == 0)
            continue;
        if (rings_touch(ring, other) || ring_place(other, a_point(ring)) > 0 ||
            ring_place(ring, a_point(other)) > 0) {
            say(c, SEVERITY_ERROR, field, c->job->openings[index].line,
                "it overlaps or touches the opening %s; make them one.", c->job->openings[j].name);
            ring_free(ring);
        }
    }
}

static void check_openings(struct check *c)
{
    for (size_t i = 0; i < c->job->opening_count; i++) {
        const struct opening *opening = &c->job->openings[i];
        char field[NAME_MOST + 16];

        snprintf(field, sizeof field, "opening.%s", opening->name);
        if (ring_good(c, field, &opening->rows, opening->line, &c->openings[i]))
            check_opening_place(c, i, field);
        if (c->openings[i].count > 0)
            check_opening_pairs(c, i, field);
    }
}

/* ---- objects ---- */

static void check_object_place(struct check *c, const struct object *object, const char *field)
{
    struct ring_point centre = ring_point_at(object->x, object->y);
    double reach = hypot(object->w, object->d) / 2;

    if (ring_place(&c->outline, centre) < 0) {
        double away = ring_distance(&c->outline, object->x, object->y);
        if (away > reach)
            say(c, SEVERITY_ERROR, field, object->line,
                "the object stands off the slab; check its place.");
        else
            say(c, SEVERITY_WARNING, field, object->line,
                "the middle of the object is off the slab; check its place.");
        return;
    }
    for (size_t i = 0; i < c->job->opening_count; i++)
        if (c->openings[i].count > 0 && ring_place(&c->openings[i], centre) > 0) {
            say(c, SEVERITY_ERROR, field, object->line,
                "the object stands in the opening %s, not on the slab; check its place.",
                c->job->openings[i].name);
            return;
        }
}

static void check_objects(struct check *c)
{
    for (size_t i = 0; i < c->job->object_count && c->findings->count < 1000; i++) {
        const struct object *object = &c->job->objects[i];
        char field[NAME_MOST + 16];

        snprintf(field, sizeof field, "object.%s", object->name);
        if (!(object->w > 0) || !(object->d > 0)) {
            say(c, SEVERITY_ERROR, field, object->line,
                "it has no size; write size = 0.4 x 0.4 m, or diameter = 0.8 m.");
            continue;
        }
        if (c->slab)
            check_object_place(c, object, field);
        for (size_t j = 0; j < i; j++)
            if (ring_units(c->job->objects[j].x) == ring_units(object->x) &&
                ring_units(c->job->objects[j].y) == ring_units(object->y))
                say(c, SEVERITY_WARNING, field, object->line,
                    "it stands on the same point as %s; check its place.", c->job->objects[j].name);
    }
}

/* ---- edges ---- */

static void check_edge_joints(struct check *c, const struct edge *edge, const char *field)
{
    double length = ring_side_length(&c->job->outline, (size_t)edge->number);
    struct text one = {0}, two = {0};

    for (size_t i = 0; i < edge->joint_count; i++)
        if (edge->joints[i] > length + 1e-6) {
            say(c, SEVERITY_ERROR, field, edge->line,
                "a joint at %s lies beyond the side, which is %s long; check the list.",
                shown(c, edge->joints[i], &one), shown(c, length, &two));
            break;
        }
    text_free(&one);
    text_free(&two);
    if (edge->joint_count > 0 && edge->against != AGAINST_SLAB && edge->against != AGAINST_KERB)
        say(c, SEVERITY_NOTE, field, edge->line,
            "its joints are not used; only a slab or a kerb beside it has joints to match.");
    if (edge->treat_given && edge->treat == TREAT_MATCH && edge->against != AGAINST_SLAB &&
        edge->against != AGAINST_KERB)
        say(c, SEVERITY_WARNING, field, edge->line,
            "nothing to match here; only a slab or a kerb has joints. It is isolated.");
}

static void check_edges(struct check *c)
{
    size_t sides = ring_corner_count(&c->job->outline);

    for (size_t i = 0; i < c->job->edge_count && c->findings->count < 1000; i++) {
        const struct edge *edge = &c->job->edges[i];
        char field[32];

        snprintf(field, sizeof field, "edge.%d", edge->number);
        if ((size_t)edge->number > sides)
            say(c, SEVERITY_ERROR, field, edge->line, "there is no such side; the outline has %zu.",
                sides);
        else if (c->slab)
            check_edge_joints(c, edge, field);
    }
}

/* ---- the rest ---- */

static void check_joints(struct check *c)
{
    for (size_t i = 0; i < c->job->joint_count && c->findings->count < 1000; i++) {
        const struct drawn_joint *joint = &c->job->joints[i];
        struct ring_point middle =
            ring_point_at((joint->x1 + joint->x2) / 2, (joint->y1 + joint->y2) / 2);
        char field[32];

        snprintf(field, sizeof field, "joint.%zu", i + 1);
        if (hypot(joint->x1 - joint->x2, joint->y1 - joint->y2) < 1e-3)
            say(c, SEVERITY_ERROR, field, joint->line,
                "it ends where it begins; check from and to.");
        else if (c->slab && ring_place(&c->outline, middle) < 0)
            say(c, SEVERITY_WARNING, field, joint->line,
                "the middle of the joint is off the slab; check from and to.");
    }
}

static void check_pours(struct check *c)
{
    const struct job *job = c->job;

    if (job->has_pours && job->pour_line_count == 0 && !(job->pours_width > 0))
        say(c, SEVERITY_NOTE, "pours", 0,
            "neither a line nor a width is given, so there are no strips; write width = 6 m or "
            "line = 0, 12, 36, 12 m.");
}

static void check_cracks(struct check *c)
{
    for (size_t i = 0; i < c->job->crack_count; i++)
        if (c->job->cracks[i].rows.count < 2) {
            char field[32];
            snprintf(field, sizeof field, "crack.%zu", i + 1);
            say(c, SEVERITY_NOTE, field, c->job->cracks[i].line,
                "it has fewer than two points and is not used.");
        }
}

static bool has_drawing(const struct job *job)
{
    return job->opening_count + job->object_count + job->joint_count + job->pour_line_count > 0;
}

static void check_trials(struct check *c)
{
    struct trials trials;
    const char *wrong = "";

    if (!trials_parse(c->job->sawing_trials, &trials, &wrong))
        say(c, SEVERITY_ERROR, "sawing.trials", 0,
            "'%.24s' is no trial cut; write up to %d clock times with what was seen, such as "
            "14:50 ravels, 15:20 clean.",
            wrong, TRIALS_MOST);
}

/* Fresh concrete outside the specification's temperatures, and a day typed the wrong way round. */
static void check_pour_day(struct check *c)
{
    const struct job *job = c->job;
    struct text shown_words = {0}, limit = {0};

    unit_show(&shown_words, job->pour_placing_temperature, QUANTITY_TEMPERATURE, c->units);
    if (job->pour_placing_temperature < job->pour_placing_least) {
        unit_show(&limit, job->pour_placing_least, QUANTITY_TEMPERATURE, c->units);
        say(c, SEVERITY_WARNING, "pour.placing-temperature", 0,
            "%s is colder than the specification allows (%s): it sets late, and fresh concrete "
            "must not freeze; warm the mix or wait.",
            text_string(&shown_words), text_string(&limit));
    } else if (job->pour_placing_temperature > job->pour_placing_most) {
        unit_show(&limit, job->pour_placing_most, QUANTITY_TEMPERATURE, c->units);
        say(c, SEVERITY_WARNING, "pour.placing-temperature", 0,
            "%s is hotter than the specification allows (%s): it sets fast, dries and cracks; cool "
            "the mix or place at night.",
            text_string(&shown_words), text_string(&limit));
    }
    if (job->pour_air_low > job->pour_air_high)
        say(c, SEVERITY_ERROR, "pour.air-low", 0,
            "the coldest air of the day is above the warmest; exchange them.");
    text_free(&shown_words);
    text_free(&limit);
}

void job_check(const struct job *job, struct finding_list *findings)
{
    struct check c = {
        .job = job, .findings = findings, .units = job->job_units == 1 ? UNITS_US : UNITS_METRIC};

    c.openings = calloc(job->opening_count + 1, sizeof *c.openings);
    if (c.openings == NULL) {
        findings->failed = true;
        return;
    }
    if (job->outline.count > 0)
        c.slab = ring_good(&c, "outline", &job->outline, 0, &c.outline);
    else if (has_drawing(job))
        say(&c, SEVERITY_WARNING, "outline", 0,
            "there is none, so openings, objects and drawn joints are not used; write the corners "
            "as point = 0, 0 m.");
    check_openings(&c);
    check_objects(&c);
    check_edges(&c);
    check_joints(&c);
    check_pours(&c);
    check_cracks(&c);
    check_trials(&c);
    check_pour_day(&c);
    for (size_t i = 0; i < job->opening_count; i++)
        ring_free(&c.openings[i]);
    free(c.openings);
    ring_free(&c.outline);
}
