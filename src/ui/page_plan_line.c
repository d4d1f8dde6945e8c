/* The user's hand on joint lines: draw one through the cross, keep one as it stands, move it,
 * forbid it. What is drawn or kept is a [joint] of the job; the rest of the plan is laid out around
 * it. */
#include "export/lines.h"
#include "ui/app_ask.h"
#include <float.h>
#include <math.h>
#include <stdio.h>
#include <string.h>

struct segment {
    double x1, y1, x2, y2;
};

/* ---- what is under the cross ---- */

static double distance_to(const struct segment *s, double x, double y)
{
    double dx = s->x2 - s->x1, dy = s->y2 - s->y1, length = hypot(dx, dy);
    double t = length > 0 ? ((x - s->x1) * dx + (y - s->y1) * dy) / (length * length) : 0;

    t = fmax(0, fmin(1, t));
    return hypot(s->x1 + t * dx - x, s->y1 + t * dy - y);
}

/* The [joint] under the cross, from 1; 0: none. */
static size_t drawn_under(const struct app *app)
{
    double best = plan_reach(app);
    size_t found = 0;

    for (size_t i = 0; i < app->job.joint_count; i++) {
        const struct drawn_joint *joint = &app->job.joints[i];
        const struct segment s = {joint->x1, joint->y1, joint->x2, joint->y2};
        double distance = distance_to(&s, app->cross_x, app->cross_y);
        if (distance <= best) {
            best = distance;
            found = i + 1;
        }
    }
    return found;
}

bool plan_line_kept(const struct app *app)
{
    return drawn_under(app) > 0;
}

/* ---- the slab's edge on both sides of the cross ---- */

/* Where a ring crosses the line through the cross along x (level) or y: the nearest before and
 * after the cross. */
static void cross_ring(const struct layout_point *points, size_t count, double at, double from,
                       bool level, double *before, double *after)
{
    for (size_t i = 0; i < count; i++) {
        const struct layout_point *a = &points[i], *b = &points[(i + 1) % count];
        double a_at = level ? a->y : a->x, b_at = level ? b->y : b->x, along, t;
        if ((a_at > at) == (b_at > at))
            continue;
        t = (at - a_at) / (b_at - a_at);
        along = level ? a->x + t * (b->x - a->x) : a->y + t * (b->y - a->y);
        if (along <= from)
            *before = fmax(*before, along);
        else
            *after = fmin(*after, along);
    }
}

/* The line through the cross from edge to edge; false when the cross is off the slab. */
static bool chord(const struct app *app, bool level, struct segment *out)
{
    const struct layout *layout = &app->plan.layout;
    double at = level ? app->cross_y : app->cross_x, from = level ? app->cross_x : app->cross_y;
    double before = -DBL_MAX, after = DBL_MAX;

    if (!app->has_plan || !plan_on_slab(app))
        return false;
    cross_ring(layout->outline, layout->outline_count, at, from, level, &before, &after);
    for (size_t i = 0; i < layout->opening_count; i++)
        cross_ring(layout->openings[i].points, layout->openings[i].count, at, from, level, &before,
                   &after);
    if (before <= -DBL_MAX || after >= DBL_MAX)
        return false;
    *out =
        level ? (struct segment){before, at, after, at} : (struct segment){at, before, at, after};
    return true;
}

/* ---- changes ---- */

static void put(struct change_item *item, size_t number, const char *key, const char *value)
{
    *item = (struct change_item){0};
    if (key[0] == '\0')
        snprintf(item->path, sizeof item->path, "joint.%zu", number);
    else
        snprintf(item->path, sizeof item->path, "joint.%zu.%s", number, key);
    snprintf(item->value, sizeof item->value, "%s", value);
}

static void put_point(struct change_item *item, size_t number, const char *key, double x, double y)
{
    char words[64];

    plan_point_words(x, y, words, sizeof words);
    put(item, number, key, words);
}

/* A new [joint] at the end of the file. */
static bool add_joint(struct app *app, const char *kind, const struct segment *at, bool keep,
                      const char *words)
{
    struct change_item items[4];
    size_t number = app->job.joint_count + 1;

    put(&items[0], number, "kind", kind);
    put_point(&items[1], number, "from", at->x1, at->y1);
    put_point(&items[2], number, "to", at->x2, at->y2);
    put(&items[3], number, "keep", keep ? "yes" : "no");
    return edit_change(app, items, 4, words);
}

static const char *kind_of(const struct joint_line *line)
{
    if (line->expansion)
        return "expansion";
    return line->kind == LAYOUT_CONTRACTION    ? "contraction"
           : line->kind == LAYOUT_CONSTRUCTION ? "construction"
                                               : "isolation";
}

void plan_draw_line(struct app *app, const char *kind, bool level)
{
    struct segment at;
    char words[WORDS_MOST];

    if (!chord(app, level, &at)) {
        app_tell(app, "The cross is not on the slab: move it where the joint shall go.");
        return;
    }
    snprintf(words, sizeof words, "%s joint drawn", kind);
    add_joint(app, kind, &at, true, words);
}

void plan_keep_line(struct app *app)
{
    size_t drawn = drawn_under(app);
    struct joint_line line;
    struct change_item item;
    char words[WORDS_MOST];

    if (drawn > 0) {
        put(&item, drawn, "", "");
        edit_change(app, &item, 1, "joint let go");
        return;
    }
    if (!joint_line_find(&app->plan.layout, plan_line_under(app), &line)) {
        app_tell(app, "No joint under the cross: move it onto a line, then k keeps that line.");
        return;
    }
    snprintf(words, sizeof words, "line %s kept as it stands", line.name);
    add_joint(app, kind_of(&line), &(struct segment){line.x1, line.y1, line.x2, line.y2}, true,
              words);
}

bool plan_take_line(struct app *app)
{
    size_t drawn = drawn_under(app);
    struct joint_line line;
    struct change_item item;
    char words[WORDS_MOST];

    if (drawn > 0) {
        put(&item, drawn, "", "");
        edit_change(app, &item, 1, "drawn joint taken away");
        return true;
    }
    if (!joint_line_find(&app->plan.layout, plan_line_under(app), &line))
        return false;
    snprintf(words, sizeof words, "line %s forbidden there", line.name);
    add_joint(app, kind_of(&line), &(struct segment){line.x1, line.y1, line.x2, line.y2}, false,
              words);
    return true;
}

/* ---- moving ---- */

bool plan_move_words(const struct app *app, struct text *out)
{
    struct joint_line line;
    bool level;

    if (plan_object_under(app) != NULL) {
        text_format(out, "Move the box of %s by (east north): ", plan_object_under(app)->name);
        return true;
    }
    if (!joint_line_find(&app->plan.layout, plan_line_under(app), &line))
        return false;
    level = fabs(line.y2 - line.y1) < fabs(line.x2 - line.x1);
    text_format(out, "Move line %s %s by (%s): ", line.name, level ? "north" : "east",
                unit_name(QUANTITY_LENGTH, app_units(app)));
    return true;
}

void plan_move_line(struct app *app)
{
    const char *typed = app->editor.bytes;
    struct unit_reading by = unit_read(typed, strlen(typed), QUANTITY_LENGTH,
                                       unit_name(QUANTITY_LENGTH, app_units(app)));
    size_t drawn = drawn_under(app);
    struct joint_line line;
    struct segment at;
    struct change_item items[2];
    bool level;

    if (plan_object_under(app) != NULL) {
        plan_move_box(app, plan_object_under(app));
        return;
    }
    if (by.problem != NULL || fabs(by.si) > 1e4 ||
        !joint_line_find(&app->plan.layout, plan_line_under(app), &line)) {
        app_tell(app, "Type a length, such as 0.3 or -0.3 m.");
        return;
    }
    at = (struct segment){line.x1, line.y1, line.x2, line.y2};
    if (drawn > 0) {
        const struct drawn_joint *joint = &app->job.joints[drawn - 1];
        at = (struct segment){joint->x1, joint->y1, joint->x2, joint->y2};
    }
    level = fabs(at.y2 - at.y1) < fabs(at.x2 - at.x1);
    *(level ? &at.y1 : &at.x1) += by.si;
    *(level ? &at.y2 : &at.x2) += by.si;
    if (drawn == 0) {
        add_joint(app, kind_of(&line), &at, true, "line moved");
        return;
    }
    put_point(&items[0], drawn, "from", at.x1, at.y1);
    put_point(&items[1], drawn, "to", at.x2, at.y2);
    edit_change(app, items, 2, "line moved");
}

/* ---- cracks ---- */

enum { CRACK_POINTS = 12 };

static void put_crack_point(struct change_item *item, size_t number, int point, double x, double y)
{
    *item = (struct change_item){0};
    snprintf(item->path, sizeof item->path, "crack.%zu.point.%d", number, point);
    plan_point_words(x, y, item->value, sizeof item->value);
}

void plan_add_crack(struct app *app)
{
    struct change_item items[CRACK_POINTS];
    const char *typed = app->editor.bytes, *bare = unit_name(QUANTITY_LENGTH, app_units(app));
    size_t number = app->job.crack_count + 1;
    int points = 1;

    put_crack_point(&items[0], number, 1, app->cross_x, app->cross_y);
    while (*typed != '\0' && points < CRACK_POINTS) {
        double x, y;
        if (!plan_read_coordinate(&typed, bare, &x) || !plan_read_coordinate(&typed, bare, &y)) {
            app_tell(app, "Type pairs, how far east and north: 8.5 4, 8.2 9.");
            return;
        }
        points++;
        put_crack_point(&items[points - 1], number, points, x, y);
    }
    if (points < 2)
        app_tell(app, "A crack needs a second point: 8.5 4.");
    else
        edit_change(app, items, (size_t)points, "crack entered");
}

/* The crack under the cross, from 1; 0: none. */
static size_t crack_under(const struct app *app)
{
    for (size_t i = 0; i < app->job.crack_count; i++) {
        const struct rows *rows = &app->job.cracks[i].rows;
        for (size_t j = 0; j + 1 < rows->count; j++) {
            const struct row *a = &rows->items[j], *b = &rows->items[j + 1];
            const struct segment s = {a->x, a->y, b->x, b->y};
            if (distance_to(&s, app->cross_x, app->cross_y) <= plan_reach(app))
                return i + 1;
        }
    }
    return 0;
}

bool plan_crack_words(const struct app *app, struct text *out)
{
    char field[32];
    size_t number = crack_under(app);

    snprintf(field, sizeof field, "crack.%zu", number);
    for (size_t i = 0; number > 0 && i < app->findings.count; i++)
        if (strcmp(app->findings.items[i].field, field) == 0) {
            text_add(out, app->findings.items[i].message);
            return true;
        }
    return false;
}

bool plan_take_crack(struct app *app)
{
    struct change_item item = {0};
    size_t number = crack_under(app);

    if (number == 0)
        return false;
    snprintf(item.path, sizeof item.path, "crack.%zu", number);
    edit_change(app, &item, 1, "crack taken away");
    return true;
}

/* ---- boxes ---- */

static const struct layout_box *box_of(const struct app *app, const struct object *object)
{
    size_t index = (size_t)(object - app->job.objects);

    for (size_t i = 0; i < app->plan.layout.box_count; i++)
        if ((size_t)app->plan.layout.boxes[i].object == index)
            return &app->plan.layout.boxes[i];
    return NULL;
}

static void put_box(struct change_item *item, const struct object *object, const char *key,
                    const char *value)
{
    *item = (struct change_item){0};
    snprintf(item->path, sizeof item->path, "object.%.40s.%s", object->name, key);
    snprintf(item->value, sizeof item->value, "%s", value);
}

void plan_keep_box(struct app *app, const struct object *object)
{
    const struct layout_box *box = box_of(app, object);
    struct change_item items[2];
    char words[WORDS_MOST], at[64];
    struct text half = {0};

    if (box == NULL) {
        app_tell(app, "%s has no box of its own.", object->name);
        return;
    }
    plan_point_words(box->x, box->y, at, sizeof at);
    unit_write(&half, box->half, QUANTITY_LENGTH, UNITS_METRIC);
    put_box(&items[0], object, "box-at", object->box_at_given ? "" : at);
    put_box(&items[1], object, "box-half", object->box_at_given ? "" : text_string(&half));
    snprintf(words, sizeof words,
             object->box_at_given ? "box of %.40s let go" : "box of %.40s kept", object->name);
    edit_change(app, items, 2, words);
    text_free(&half);
}

void plan_move_box(struct app *app, const struct object *object)
{
    const char *typed = app->editor.bytes, *bare = unit_name(QUANTITY_LENGTH, app_units(app));
    const struct layout_box *box = box_of(app, object);
    struct change_item item;
    char words[WORDS_MOST], at[64];
    double x, y;

    if (box == NULL || !plan_read_coordinate(&typed, bare, &x) ||
        !plan_read_coordinate(&typed, bare, &y)) {
        app_tell(app, "Type how far east and north, such as 0.1 -0.1.");
        return;
    }
    plan_point_words(box->x + x, box->y + y, at, sizeof at);
    put_box(&item, object, "box-at", at);
    snprintf(words, sizeof words, "box of %.40s moved", object->name);
    edit_change(app, &item, 1, words);
}
