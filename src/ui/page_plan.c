/* The plan: a cross with the tape readings, things added and taken away by eye. */
#include "export/lines.h"
#include "ui/app_ask.h"
#include <float.h>
#include <math.h>
#include <stdio.h>
#include <string.h>

enum { ADD_HOLE = 5, ADD_WALL, ADD_OLD_JOINT, ADD_CRACK, ADD_LINE, ADD_COUNT = ADD_LINE + 6 };
static const struct {
    const char *word, *kind, *size; /* kind: of an object or joint; size: the usual one */
    const char *us_size;
    char letter;
} things[ADD_COUNT] = {
    {"column", "column", "0.4 x 0.4 m", "16 x 16 in", 'C'},
    {"manhole", "manhole", "0.8 m", "30 in", 'M'},
    {"drain", "drain", "0.4 x 0.4 m", "16 x 16 in", 'D'},
    {"channel", "channel", "6 x 0.3 m", "20 x 1 ft", 'T'},
    {"post", "post", "0.2 m", "8 in", 'P'},
    {"hole", NULL, "1.2 x 1.2 m", "4 x 4 ft", 0},
    {"wall along the side", NULL, NULL, NULL, 0},
    {"old joint beside the side", NULL, NULL, NULL, 0},
    {"crack from here", NULL, NULL, NULL, 0},
    {"cut, south to north", "contraction", NULL, NULL, 0},
    {"cut, west to east", "contraction", NULL, NULL, 0},
    {"pour end, south to north", "construction", NULL, NULL, 0},
    {"pour end, west to east", "construction", NULL, NULL, 0},
    {"expansion joint, south to north", "expansion", NULL, NULL, 0},
    {"expansion joint, west to east", "expansion", NULL, NULL, 0},
};

const char *plan_kind_word(int kind)
{
    return things[kind].word;
}

void plan_next_kind(struct app *app, int step)
{
    app->add_kind = (app->add_kind + step + ADD_COUNT) % ADD_COUNT;
}

/* ---- what lies under the cross ---- */

/* How many metres a character stands for on this page, about. */
static double cell_metres(const struct app *app)
{
    const struct layout *layout = &app->plan.layout;
    double x0 = DBL_MAX, x1 = -DBL_MAX, y0 = DBL_MAX, y1 = -DBL_MAX;
    int columns = app->columns - 24, rows = app->rows - (app_roomy(app) ? 9 : 7);

    if (!app->has_plan || layout->outline_count == 0)
        return 0.5;
    for (size_t i = 0; i < layout->outline_count; i++) {
        x0 = fmin(x0, layout->outline[i].x);
        x1 = fmax(x1, layout->outline[i].x);
        y0 = fmin(y0, layout->outline[i].y);
        y1 = fmax(y1, layout->outline[i].y);
    }
    return fmax((x1 - x0) / (columns > 20 ? columns : 20),
                (y1 - y0) / (2 * (rows > 8 ? rows : 8))) /
           app->zoom;
}

/* The arrows move about one character, by a round step. */
static double cross_step(const struct app *app)
{
    static const double round_steps[] = {10, 5, 2, 1, 0.5, 0.2, 0.1};
    static const double round_feet[] = {30, 10, 5, 2, 1, 0.5};
    bool us = app_units(app) == UNITS_US;
    const double *steps = us ? round_feet : round_steps;
    size_t count =
        us ? sizeof round_feet / sizeof *round_feet : sizeof round_steps / sizeof *round_steps;
    double cell = cell_metres(app) / (us ? 0.3048 : 1), step = steps[count - 1];

    for (size_t i = count; i-- > 0;)
        if (steps[i] <= cell * 1.05)
            step = steps[i];
    return us ? step * 0.3048 : step;
}

static double side_distance(const struct row *a, const struct row *b, double x, double y,
                            double *along)
{
    double dx = b->x - a->x, dy = b->y - a->y, length = hypot(dx, dy);
    double t = length > 0 ? ((x - a->x) * dx + (y - a->y) * dy) / (length * length) : 0;

    t = fmax(0, fmin(1, t));
    *along = t * length;
    return hypot(a->x + t * dx - x, a->y + t * dy - y);
}

/* The nearest side of the outline, from 0; -1 for none. */
static int nearest_side(const struct app *app, double *along, double *distance)
{
    const struct rows *rows = &app->job.outline;
    int best = -1;

    *distance = DBL_MAX;
    for (size_t i = 0; i < rows->count; i++) {
        double here, from = side_distance(&rows->items[i], &rows->items[(i + 1) % rows->count],
                                          app->cross_x, app->cross_y, &here);
        if (from < *distance) {
            *distance = from;
            *along = here;
            best = (int)i;
        }
    }
    return best;
}

const struct object *plan_object_under(const struct app *app)
{
    for (size_t i = 0; i < app->job.object_count; i++) {
        const struct object *object = &app->job.objects[i];
        double half_w = fmax(object->w / 2, 0.26), half_d = fmax(object->d / 2, 0.26);
        if (fabs(app->cross_x - object->x) <= half_w && fabs(app->cross_y - object->y) <= half_d)
            return object;
    }
    return NULL;
}

static bool inside(double x, double y, const struct layout_point *ring, size_t count)
{
    bool in = false;

    for (size_t i = 0, j = count - 1; i < count; j = i++)
        if ((ring[i].y > y) != (ring[j].y > y) &&
            x < (ring[j].x - ring[i].x) * (y - ring[i].y) / (ring[j].y - ring[i].y) + ring[i].x)
            in = !in;
    return in;
}

static const struct opening *opening_under(const struct app *app)
{
    for (size_t i = 0; i < app->job.opening_count; i++) {
        const struct rows *rows = &app->job.openings[i].rows;
        double x0 = DBL_MAX, x1 = -DBL_MAX, y0 = DBL_MAX, y1 = -DBL_MAX;
        for (size_t j = 0; j < rows->count; j++) {
            x0 = fmin(x0, rows->items[j].x);
            x1 = fmax(x1, rows->items[j].x);
            y0 = fmin(y0, rows->items[j].y);
            y1 = fmax(y1, rows->items[j].y);
        }
        if (app->cross_x >= x0 && app->cross_x <= x1 && app->cross_y >= y0 && app->cross_y <= y1)
            return &app->job.openings[i];
    }
    return NULL;
}

static const struct layout_panel *panel_under(const struct app *app)
{
    const struct layout *layout = &app->plan.layout;

    for (size_t i = 0; app->has_plan && i < layout->panel_count; i++)
        if (inside(app->cross_x, app->cross_y, layout->panels[i].ring, layout->panels[i].count))
            return &layout->panels[i];
    return NULL;
}

static void add_size(const struct app *app, struct text *out, double a, double b)
{
    unit_show(out, a, QUANTITY_LENGTH, app_units(app));
    text_add(out, " x ");
    unit_show(out, b, QUANTITY_LENGTH, app_units(app));
}

/* A joint within a quarter of a step is under the cross. */
double plan_reach(const struct app *app)
{
    return cross_step(app) / 4 + 1e-6;
}

int plan_line_under(const struct app *app)
{
    const struct layout *layout = &app->plan.layout;
    double best = plan_reach(app);
    int line = 0;

    for (size_t i = 0; app->has_plan && i < layout->joint_count; i++) {
        const struct layout_joint *joint = &layout->joints[i];
        const struct row a = {.x = joint->x1, .y = joint->y1}, b = {.x = joint->x2, .y = joint->y2};
        double along, distance = side_distance(&a, &b, app->cross_x, app->cross_y, &along);
        if (joint->line > 0 && distance <= best) {
            best = distance;
            line = joint->line;
        }
    }
    return line;
}

bool plan_on_slab(const struct app *app)
{
    const struct layout *layout = &app->plan.layout;

    return inside(app->cross_x, app->cross_y, layout->outline, layout->outline_count);
}

static void under_words(const struct app *app, struct text *out)
{
    const struct object *object = plan_object_under(app);
    const struct opening *opening = opening_under(app);
    const struct layout_panel *panel = panel_under(app);
    char name[2 * LINE_NAME_MOST], kind[CHOICE_MOST];
    struct joint_line line;

    if (plan_crack_words(app, out))
        return;
    if (object != NULL) {
        field_choice_word(field_find("object", "kind"), (int)object->kind, kind, sizeof kind);
        text_format(out, "%s %s, ", kind, object->name);
        add_size(app, out, object->w, object->d);
        text_add(out, object->box_at_given ? "; its box is kept. k lets it go, v moves it."
                                           : "; joints meet its box. k keeps it, v moves it.");
    } else if (opening != NULL) {
        text_format(out, "hole %s. d takes it away.", opening->name);
    } else if (joint_line_find(&app->plan.layout, plan_line_under(app), &line)) {
        joint_line_describe(out, &app->plan, &line);
    } else if (panel != NULL) {
        name_panel(&app->plan.layout, panel, name);
        text_format(out, "panel %s, ", name);
        add_size(app, out, panel->length, panel->width);
        text_format(out, ", long to short %.2f. ", panel->aspect);
        if (panel->reason_count > 0)
            text_format(out, "%s %s", panel->reasons[0].cause, panel->reasons[0].remedy);
        else
            text_add(out, "Keeps every rule.");
    } else {
        text_add(out, "off the slab, or in a box.");
    }
}

/* ---- adding ---- */

static void put_item(struct change_item *item, const char *path, const char *value)
{
    *item = (struct change_item){0};
    snprintf(item->path, sizeof item->path, "%s", path);
    snprintf(item->value, sizeof item->value, "%s", value);
}

void plan_point_words(double x, double y, char *out, size_t size)
{
    struct text words = {0};

    unit_add_number(&words, x, 4);
    text_add(&words, ", ");
    unit_add_number(&words, y, 4);
    text_add(&words, " m");
    snprintf(out, size, "%s", text_string(&words));
    text_free(&words);
}

static void free_name(const struct app *app, char letter, char *out, size_t size)
{
    for (int n = 1; n < 10000; n++) {
        bool taken = false;
        if (letter != 0)
            snprintf(out, size, "%c%d", letter, n);
        else
            snprintf(out, size, "hole%d", n);
        for (size_t i = 0; i < app->job.object_count; i++)
            taken = taken || strcmp(app->job.objects[i].name, out) == 0;
        for (size_t i = 0; i < app->job.opening_count; i++)
            taken = taken || strcmp(app->job.openings[i].name, out) == 0;
        if (!taken)
            return;
    }
}

static void add_object(struct app *app)
{
    struct change_item items[3];
    char name[16], path[64], at[64], words[WORDS_MOST];
    const char *size = app->editor.bytes;

    free_name(app, things[app->add_kind].letter, name, sizeof name);
    plan_point_words(app->cross_x, app->cross_y, at, sizeof at);
    snprintf(path, sizeof path, "object.%s.kind", name);
    put_item(&items[0], path, things[app->add_kind].kind);
    snprintf(path, sizeof path, "object.%s.at", name);
    put_item(&items[1], path, at);
    snprintf(path, sizeof path, "object.%s.%s", name,
             strchr(size, 'x') != NULL ? "size" : "diameter");
    put_item(&items[2], path, size);
    snprintf(words, sizeof words, "%s %s at %s", things[app->add_kind].word, name, at);
    edit_change(app, items, 3, words);
}

/* Both sizes of "1.2 x 1.2 m"; false when they are none. */
static bool read_sizes(const char *string, const char *bare, double *w, double *d)
{
    const char *x = strchr(string, 'x');
    const char *unit = string + strcspn(string, "fimc");
    char first[EDITOR_MOST];
    struct unit_reading a, b;

    if (x == NULL)
        return false;
    snprintf(first, sizeof first, "%.*s%s", (int)(x - string), string, unit < x ? "" : unit);
    x += 1 + strspn(x + 1, " ");
    a = unit_read(first, strlen(first), QUANTITY_LENGTH, bare);
    b = unit_read(x, strlen(x), QUANTITY_LENGTH, bare);
    *w = a.si;
    *d = b.si;
    return a.problem == NULL && b.problem == NULL && a.si > 0 && b.si > 0;
}

static void add_hole(struct app *app)
{
    struct change_item items[4];
    char name[16], path[64], at[64], words[WORDS_MOST];
    double w, d;

    if (!read_sizes(app->editor.bytes, unit_name(QUANTITY_LENGTH, app_units(app)), &w, &d)) {
        app_tell(app, "Type two sizes, such as 1.2 x 1.2 m.");
        return;
    }
    free_name(app, 0, name, sizeof name);
    for (int i = 0; i < 4; i++) {
        plan_point_words(app->cross_x + (i == 1 || i == 2 ? w : -w) / 2,
                         app->cross_y + (i >= 2 ? d : -d) / 2, at, sizeof at);
        snprintf(path, sizeof path, "opening.%s.point.%d", name, i + 1);
        put_item(&items[i], path, at);
    }
    snprintf(words, sizeof words, "hole %s added", name);
    edit_change(app, items, 4, words);
}

static void add_at_side(struct app *app, bool joint)
{
    struct change_item items[2];
    char path[64], value[EDITOR_MOST];
    double along, distance;
    int side = nearest_side(app, &along, &distance);
    const char *written;
    struct text text = {0};

    if (side < 0) {
        app_tell(app, "There is no side yet: open the row Shape.");
        return;
    }
    snprintf(path, sizeof path, "edge.%d.against", side + 1);
    put_item(&items[0], path, joint ? "slab" : "wall");
    snprintf(path, sizeof path, "edge.%d.joints", side + 1);
    written = document_get(app->document, path);
    unit_add_number(&text, along, 3);
    if (written != NULL && written[0] != '\0') {
        size_t digits = strcspn(written, "mfi");
        while (digits > 0 && written[digits - 1] == ' ')
            digits--;
        snprintf(value, sizeof value, "%.*s, %s m", (int)digits, written, text_string(&text));
    } else {
        snprintf(value, sizeof value, "%s m", text_string(&text));
    }
    put_item(&items[1], path, value);
    text_free(&text);
    edit_change(app, items, joint ? 2 : 1, joint ? "old joint added" : "wall along a side");
}

void plan_add_kind(struct app *app)
{
    if (app->add_kind == ADD_CRACK)
        app_ask(app, ASK_CRACK, "");
    else if (app->add_kind >= ADD_LINE)
        plan_draw_line(app, things[app->add_kind].kind, (app->add_kind - ADD_LINE) % 2 == 1);
    else if (app->add_kind == ADD_WALL || app->add_kind == ADD_OLD_JOINT)
        add_at_side(app, app->add_kind == ADD_OLD_JOINT);
    else
        app_ask(app, ASK_ADD_SIZE,
                app_units(app) == UNITS_US ? things[app->add_kind].us_size
                                           : things[app->add_kind].size);
}

void plan_add(struct app *app)
{
    if (app->add_kind == ADD_HOLE)
        add_hole(app);
    else
        add_object(app);
}

/* One number of "10.4 4.9", "10.4 m, 4.9 m", "34 ft 16 ft"; moves behind it. */
bool plan_read_coordinate(const char **string, const char *bare, double *out)
{
    size_t length = strcspn(*string, " ,;");
    struct unit_reading reading;

    length += strspn(*string + length, " ");
    if (strncmp(*string + length, "m", 1) == 0 || strncmp(*string + length, "ft", 2) == 0)
        length += strcspn(*string + length, " ,;");
    reading = unit_read(*string, length, QUANTITY_LENGTH, bare);
    *string += reading.length;
    *string += strspn(*string, " ,;");
    *out = reading.si;
    return reading.problem == NULL && fabs(reading.si) < 1e5;
}

void plan_cross_to(struct app *app)
{
    double x, y;
    const char *string = app->editor.bytes, *bare = unit_name(QUANTITY_LENGTH, app_units(app));

    if (plan_read_coordinate(&string, bare, &x) && plan_read_coordinate(&string, bare, &y)) {
        app->cross_x = x;
        app->cross_y = y;
        return;
    }
    app_tell(app, "Type how far east and north of the corner, such as 10.4 4.9.");
}

/* ---- taking away ---- */

static void take_away(struct app *app)
{
    const struct object *object = plan_object_under(app);
    const struct opening *opening = opening_under(app);
    struct change_item item = {0};
    char path[64], words[WORDS_MOST];
    double along, distance;
    int side = nearest_side(app, &along, &distance);

    if (object != NULL)
        snprintf(path, sizeof path, "object.%.40s", object->name);
    else if (opening != NULL)
        snprintf(path, sizeof path, "opening.%.40s", opening->name);
    else if (plan_take_crack(app) || plan_take_line(app))
        return;
    else if (side >= 0 && distance < 0.6)
        snprintf(path, sizeof path, "edge.%d.against", side + 1);
    else {
        app_tell(app, "Nothing under the cross that was added.");
        return;
    }
    put_item(&item, path, "");
    snprintf(words, sizeof words, "%.60s taken away", path);
    edit_change(app, &item, 1, words);
}

/* ---- the page ---- */

static int count(const struct app *app)
{
    (void)app;
    return 0;
}

static bool row(const struct app *app, int index, struct entry *out)
{
    (void)app;
    (void)index;
    (void)out;
    return false;
}

static void draw(const struct app *app, struct canvas *canvas)
{
    struct text words = {0}, under = {0};
    int rows = app->rows - (app_roomy(app) ? 8 : 5);

    draw_title(app, canvas, false);
    draw_plan(app, canvas, 1, 1, rows, app->columns - 2, true);
    text_add(&words, "PLAN    + ");
    unit_show(&words, app->cross_x, QUANTITY_LENGTH, app_units(app));
    text_add(&words, " east, ");
    unit_show(&words, app->cross_y, QUANTITY_LENGTH, app_units(app));
    text_add(&words, " north.  a add  d take away");
    if (words.length < 60)
        text_add(&words, "  z nearer  x farther");
    canvas_words(canvas, rows + 1, 0, app->columns, STYLE_PLAIN, text_string(&words));
    canvas_mark(canvas, rows + 1, 0, 4, STYLE_BOLD);
    under_words(app, &under);
    canvas_format(canvas, rows + 2, 0, app->columns, STYLE_PLAIN, "UNDER IT %s",
                  text_string(&under));
    canvas_mark(canvas, rows + 2, 0, 8, STYLE_BOLD);
    if (app_roomy(app))
        draw_answers(app, canvas, rows + 3, 0, 0, 2);
    text_clear(&words);
    if (plan_line_under(app) > 0) {
        text_format(&words, "k %s, v moves it, d %s. Arrows move the cross by ",
                    plan_line_kept(app) ? "lets this line go" : "keeps this line",
                    plan_line_kept(app) ? "takes it away" : "forbids it here");
        unit_show(&words, cross_step(app), QUANTITY_LENGTH, app_units(app));
        text_add(&words, ".");
    } else {
        text_add(&words, "Arrows move the cross by ");
        unit_show(&words, cross_step(app), QUANTITY_LENGTH, app_units(app));
        text_add(&words, "; digits type where it stands. Enter says more.");
    }
    draw_foot(app, canvas, text_string(&words));
    text_free(&words);
    text_free(&under);
}

static void say_under(struct app *app)
{
    struct text words = {0};

    under_words(app, &words);
    app_tell(app, "%s", text_string(&words));
    text_free(&words);
}

static bool move_cross(struct app *app, uint32_t pressed)
{
    double step = cross_step(app);

    switch (pressed) {
    case PRESS_LEFT:
        app->cross_x -= step;
        break;
    case PRESS_RIGHT:
        app->cross_x += step;
        break;
    case PRESS_UP:
        app->cross_y += step;
        break;
    case PRESS_DOWN:
        app->cross_y -= step;
        break;
    default:
        return false;
    }
    app->cross_x = fmax(-1e5, fmin(1e5, round(app->cross_x * 10000) / 10000));
    app->cross_y = fmax(-1e5, fmin(1e5, round(app->cross_y * 10000) / 10000));
    app->show_change = false;
    return true;
}

/* A panel needs four columns to be drawn. */
static bool panels_in_sight(const struct app *app)
{
    return cell_metres(app) < app->plan.spacing.limit_m * 0.9 / 4;
}

/* Nearer by two, and at once so near that joints can be seen; farther goes back over the same. */
static void nearer(struct app *app)
{
    do
        app->zoom *= 2;
    while (app->zoom < 4096 && app->has_plan && !panels_in_sight(app));
    app->zoom = fmin(4096, app->zoom);
}

static void farther(struct app *app)
{
    app->zoom /= 2;
    if (app->zoom < 1 || (app->has_plan && !panels_in_sight(app)))
        app->zoom = 1;
}

static bool key(struct app *app, uint32_t pressed)
{
    if (move_cross(app, pressed))
        return true;
    if ((pressed >= '0' && pressed <= '9') || pressed == '-' || pressed == '.') {
        app_ask(app, ASK_CROSS, "");
        editor_key(&app->editor, pressed);
        return true;
    }
    switch (key_action(pressed, PLACE_PLAN)) {
    case ACTION_ADD:
        app_ask(app, ASK_ADD_KIND, "");
        return true;
    case ACTION_TAKE_AWAY:
        take_away(app);
        return true;
    case ACTION_KEEP:
        if (plan_object_under(app) != NULL)
            plan_keep_box(app, plan_object_under(app));
        else
            plan_keep_line(app);
        return true;
    case ACTION_MOVE:
        if (plan_line_under(app) > 0 || plan_object_under(app) != NULL)
            app_ask(app, ASK_MOVE, "");
        else
            app_tell(app, "No joint under the cross: move it onto a line first.");
        return true;
    case ACTION_NEARER:
        nearer(app);
        return true;
    case ACTION_FARTHER:
        farther(app);
        return true;
    case ACTION_ENTER:
        say_under(app);
        return true;
    default:
        return false;
    }
}

const struct page page_plan = {"plan", count, row, draw, key};
