/* The rest: every field that can be typed, in folds; and the sides of the slab. */
#include "ui/app_ask.h"
#include <math.h>
#include <stdio.h>
#include <string.h>

/* Sections by fold; a field goes into the first that names its section or section.key. */
static const struct {
    const char *heading, *members;
} folds[] = {
    {"BASE: friction, modulus, slip", " base. "},
    {"DRYING: model, humidity, cement, relaxation", " concrete. climate.humidity "},
    {"RULES: spacing, narrowest panel, box, steel, soft board", " rules. slab. isolation. "},
    {"SEALING: least temperature, dew, waiting, base holds back", " sealing. sealant. "},
    {"STOCK AND SITE: packs, saws, weather, strips", " takeoff. sawing. pour. pours. climate. "},
    {"PAPER: names, revision, place", " job. place. "},
};
enum { FOLD_COUNT = sizeof folds / sizeof *folds };

static bool named(const char *members, const char *words)
{
    char wanted[80];

    snprintf(wanted, sizeof wanted, " %s ", words);
    return strstr(members, wanted) != NULL;
}

static int fold_of(const struct field *field)
{
    char section[40], path[72];

    snprintf(section, sizeof section, "%s.", field->section);
    snprintf(path, sizeof path, "%s.%s", field->section, field->key);
    for (int i = 0; i < FOLD_COUNT; i++)
        if (named(folds[i].members, path) || named(folds[i].members, section))
            return i;
    return FOLD_COUNT - 1;
}

static int rest_count(const struct app *app)
{
    (void)app;
    return FIELD_COUNT + FOLD_COUNT;
}

static bool rest_row(const struct app *app, int index, struct entry *row)
{
    (void)app;
    for (int fold = 0; fold < FOLD_COUNT; fold++) {
        if (index-- == 0) {
            *row = (struct entry){.kind = ROW_HEADING, .id = FIELD_COUNT, .second = FIELD_COUNT};
            snprintf(row->path, sizeof row->path, "%s", folds[fold].heading);
            return true;
        }
        for (int id = 0; id < FIELD_COUNT; id++)
            if (fold_of(&field_table[id]) == fold && index-- == 0) {
                row_of_field((enum field_id)id, row);
                return true;
            }
    }
    return false;
}

static void draw_list(const struct app *app, struct canvas *canvas, const struct page *page)
{
    int window = app->rows - 6, count = page->count(app), at = app->at[app->page];
    int first = draw_scroll(count, window, at);
    bool wide = app->columns >= 100;
    struct entry row;

    for (int i = first; i < count && i < first + window; i++) {
        if (!page->row(app, i, &row))
            continue;
        if (row.kind == ROW_HEADING)
            canvas_words(canvas, 3 + i - first, 0, app->columns, STYLE_BOLD, row.path);
        else
            draw_row(app, canvas, &row, i == at,
                     (struct row_place){3 + i - first, 3, 24, wide ? 50 : 24, 8});
    }
    if (count > window)
        canvas_format(canvas, 2, app->columns - 14, 14, STYLE_PLAIN, "%d of %d", at + 1, count);
}

static void draw_list_page(const struct app *app, struct canvas *canvas, const char *first,
                           const char *second)
{
    struct text words = {0};
    struct entry row;

    draw_title(app, canvas, false);
    canvas_words(canvas, 1, 0, app->columns, STYLE_BOLD, first);
    canvas_words(canvas, 2, 0, app->columns - 15, STYLE_PLAIN, second);
    draw_list(app, canvas, page_of(app->page));
    if (page_of(app->page)->row(app, app->at[app->page], &row) && row.kind != ROW_HEADING)
        row_help(app, &row, &words);
    draw_foot(app, canvas, text_string(&words));
    text_free(&words);
}

static void rest_draw(const struct app *app, struct canvas *canvas)
{
    draw_list_page(app, canvas, "THE REST    every row that can be typed; f finds one by its name.",
                   "Cleared rows go back to the usual value.");
}

static bool no_key(struct app *app, uint32_t pressed)
{
    (void)app;
    (void)pressed;
    return false;
}

const struct page page_rest = {"the rest", rest_count, rest_row, rest_draw, no_key};

/* ---- sides ---- */

static bool has_joints(const struct app *app, size_t side)
{
    for (size_t i = 0; i < app->job.edge_count; i++)
        if (app->job.edges[i].number == (int)side + 1)
            return app->job.edges[i].against == AGAINST_SLAB ||
                   app->job.edges[i].against == AGAINST_KERB;
    return false;
}

static int sides_count(const struct app *app)
{
    int count = 0;

    for (size_t i = 0; i < app->job.outline.count; i++)
        count += has_joints(app, i) ? 2 : 1;
    return count;
}

static double area2(const struct rows *rows)
{
    double sum = 0;

    for (size_t i = 0; i < rows->count; i++) {
        const struct row *a = &rows->items[i], *b = &rows->items[(i + 1) % rows->count];
        sum += a->x * b->y - b->x * a->y;
    }
    return sum;
}

/* "north side, 24 m": by where the side looks, not by its number. */
static void side_words(const struct app *app, size_t side, struct text *out)
{
    const struct rows *rows = &app->job.outline;
    const struct row *a = &rows->items[side], *b = &rows->items[(side + 1) % rows->count];
    double dx = b->x - a->x, dy = b->y - a->y, turn = area2(rows) < 0 ? -1 : 1;
    double east = turn * dy, north = -turn * dx;
    const char *word = fabs(north) >= fabs(east) ? north > 0 ? "north" : "south"
                       : east > 0                ? "east"
                                                 : "west";

    text_format(out, "%s side, ", word);
    unit_show(out, hypot(dx, dy), QUANTITY_LENGTH, app_units(app));
}

static bool sides_row(const struct app *app, int index, struct entry *row)
{
    struct text words = {0};

    for (size_t i = 0; i < app->job.outline.count; i++) {
        bool joints = has_joints(app, i), second = joints && index == 1;
        if (index == 0 || second) {
            *row = (struct entry){.kind = ROW_FIELD, .id = FIELD_COUNT, .second = FIELD_COUNT};
            row->field = field_find("edge", second ? "joints" : "against");
            side_words(app, i, &words);
            snprintf(row->label, sizeof row->label, "%s",
                     second ? "  its old joints" : text_string(&words));
            snprintf(row->path, sizeof row->path, "edge.%zu.%s", i + 1,
                     second ? "joints" : "against");
            row->help = second ? "Metres along the side from its first point: 4.6, 9.1 m."
                               : "What lies against this side: free, wall, kerb, slab or asphalt.";
            text_free(&words);
            return true;
        }
        index -= joints ? 2 : 1;
    }
    return false;
}

static void sides_draw(const struct app *app, struct canvas *canvas)
{
    draw_list_page(app, canvas, "TOUCHES IT  walls, kerbs, old slabs along the sides.",
                   "Enter opens a side, left and right choose, Enter keeps.");
}

const struct page page_sides = {"sides", sides_count, sides_row, sides_draw, no_key};
