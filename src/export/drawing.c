#include "export/drawing.h"
#include "base/utf8.h"
#include "export/drawing_glyph.h"
#include "export/names.h"
#include <float.h>
#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

/* A character cell of a terminal is about twice as high as wide. */
static const double cell_ratio = 2.0;
/* A panel smaller than this many cells is not drawn: its joints would run together. */
enum { PANEL_COLUMNS = 4, PANEL_ROWS = 2, STRIP_ROWS = 6, LEGEND_COLUMNS = 14 };

struct box {
    double x0, y0, x1, y1;
};

static struct box bounds(const struct layout *layout)
{
    struct box box = {DBL_MAX, DBL_MAX, -DBL_MAX, -DBL_MAX};

    for (size_t i = 0; i < layout->outline_count; i++) {
        box.x0 = fmin(box.x0, layout->outline[i].x);
        box.y0 = fmin(box.y0, layout->outline[i].y);
        box.x1 = fmax(box.x1, layout->outline[i].x);
        box.y1 = fmax(box.y1, layout->outline[i].y);
    }
    return box;
}

static int column_of(const struct drawing *drawing, double x)
{
    return (int)lround(fmax(-1e6, fmin(1e6, (x - drawing->x0) * drawing->columns_per_m)));
}

static int row_of(const struct drawing *drawing, double y)
{
    return (int)lround(fmax(-1e6, fmin(1e6, (drawing->y1 - y) * drawing->rows_per_m)));
}

/* Scale so that the slab fits `columns` x `rows`; a long thin one is stretched to STRIP_ROWS. */
static void set_scale(struct drawing *drawing, const struct drawing_options *options, int columns,
                      int rows, struct box box)
{
    double width = fmax(box.x1 - box.x0, 1e-3), height = fmax(box.y1 - box.y0, 1e-3);
    double per_m = fmin(columns / width, cell_ratio * rows / height);
    double zoom = options->zoom > 0 ? options->zoom : 1;

    drawing->columns_per_m = per_m * zoom;
    drawing->rows_per_m = per_m * zoom / cell_ratio;
    if (options->zoom <= 1 && height * drawing->rows_per_m < STRIP_ROWS)
        drawing->rows_per_m = fmin(STRIP_ROWS, rows) / height;
    if (options->zoom <= 1 && width * drawing->columns_per_m < STRIP_ROWS)
        drawing->columns_per_m = fmin(2 * STRIP_ROWS, columns) / width;
    drawing->x0 = box.x0;
    drawing->y1 = box.y1;
    if (options->zoom > 1) {
        drawing->x0 = options->centre_x - columns / (2 * drawing->columns_per_m);
        drawing->y1 = options->centre_y + rows / (2 * drawing->rows_per_m);
    }
}

/* Whether nine in ten panels are large enough on the grid to show their joints. */
static bool panels_fit(const struct drawing *drawing, const struct layout *layout)
{
    const double least = 0.75; /* of a panel's usual cells */
    size_t small = 0;

    for (size_t i = 0; i < layout->panel_count; i++) {
        const struct layout_panel *panel = &layout->panels[i];
        double x0 = DBL_MAX, x1 = -DBL_MAX, y0 = DBL_MAX, y1 = -DBL_MAX;
        for (size_t j = 0; j < panel->count; j++) {
            x0 = fmin(x0, panel->ring[j].x);
            x1 = fmax(x1, panel->ring[j].x);
            y0 = fmin(y0, panel->ring[j].y);
            y1 = fmax(y1, panel->ring[j].y);
        }
        small += (x1 - x0) * drawing->columns_per_m <= least * PANEL_COLUMNS ||
                 (y1 - y0) * drawing->rows_per_m <= least * PANEL_ROWS;
    }
    return small <= layout->panel_count / 10;
}

static void draw_line(struct glyph_grid *grid, const struct drawing *drawing, double x1, double y1,
                      double x2, double y2, enum drawing_ink ink)
{
    glyph_line(grid, column_of(drawing, x1), row_of(drawing, y1), column_of(drawing, x2),
               row_of(drawing, y2), ink);
}

static void draw_ring(struct glyph_grid *grid, const struct drawing *drawing,
                      const struct layout_point *points, size_t count)
{
    for (size_t i = 0; i < count; i++) {
        const struct layout_point *a = &points[i], *b = &points[(i + 1) % count];
        draw_line(grid, drawing, a->x, a->y, b->x, b->y, INK_EDGE);
    }
}

/* A box too small for its own sides is drawn as <■>. */
static bool small_box(const struct drawing *drawing, const struct layout *layout, int object)
{
    for (size_t i = 0; i < layout->box_count; i++) {
        const struct layout_box *box = &layout->boxes[i];
        if (box->object == object)
            return column_of(drawing, box->x + box->half) - column_of(drawing, box->x) <= 3 &&
                   row_of(drawing, box->y) - row_of(drawing, box->y + box->half) <= 1;
    }
    return false;
}

static void draw_joints(struct glyph_grid *grid, const struct drawing *drawing,
                        const struct layout *layout)
{
    for (size_t i = 0; i < layout->joint_count; i++) {
        const struct layout_joint *joint = &layout->joints[i];
        enum drawing_ink ink = joint->kind == LAYOUT_CONTRACTION    ? INK_CUT
                               : joint->kind == LAYOUT_CONSTRUCTION ? INK_POUR_END
                                                                    : INK_BOARD;
        if (joint->object >= 0 &&
            (!drawing->joints_drawn || small_box(drawing, layout, joint->object)))
            continue;
        if (ink == INK_CUT && !drawing->joints_drawn)
            continue;
        draw_line(grid, drawing, joint->x1, joint->y1, joint->x2, joint->y2, ink);
    }
}

static void draw_objects(struct glyph_grid *grid, const struct drawing *drawing,
                         const struct job *job, const struct layout *layout)
{
    for (size_t i = 0; i < job->object_count; i++) {
        const struct object *object = &job->objects[i];
        int left = column_of(drawing, object->x - object->w / 2);
        int right = column_of(drawing, object->x + object->w / 2);
        int top = row_of(drawing, object->y + object->d / 2);
        int bottom = row_of(drawing, object->y - object->d / 2);
        if (right - left <= 1 && bottom - top <= 1)
            left = right = column_of(drawing, object->x), top = bottom = row_of(drawing, object->y);
        for (int row = top; row <= bottom && row < grid->rows; row++)
            for (int column = left; column <= right && column < grid->columns; column++)
                glyph_put(grid, column, row, grid->ascii ? '@' : 0x25A0, INK_OBJECT); /* ■ */
        if (left == right && top == bottom && drawing->joints_drawn &&
            small_box(drawing, layout, (int)i)) {
            glyph_put(grid, left - 1, top, '<', INK_BOARD);
            glyph_put(grid, right + 1, top, '>', INK_BOARD);
        }
    }
}

static void draw_holes(struct glyph_grid *grid, const struct drawing *drawing,
                       const struct layout *layout)
{
    for (size_t i = 0; i < layout->opening_count; i++) {
        double x = 0, y = 0;
        size_t count = layout->openings[i].count;
        draw_ring(grid, drawing, layout->openings[i].points, count);
        for (size_t j = 0; j < count; j++) {
            x += layout->openings[i].points[j].x / (double)count;
            y += layout->openings[i].points[j].y / (double)count;
        }
        glyph_put_free(grid, column_of(drawing, x), row_of(drawing, y), grid->ascii ? '%' : 0x2592,
                       INK_OBJECT);
    }
}

/* The name of a line stands in the slab's edge where the line ends: north or west, else the other.
 */
static void draw_name(struct glyph_grid *grid, const struct drawing *drawing,
                      const struct layout *layout, int line)
{
    const struct layout_joint *first = NULL, *last = NULL;
    char name[LINE_NAME_MOST];
    int column, row;

    for (size_t i = 0; i < layout->joint_count; i++)
        if (layout->joints[i].line == line) {
            first = first ? first : &layout->joints[i];
            last = &layout->joints[i];
        }
    if (first == NULL)
        return;
    name_line(layout, line, name);
    if (fabs(first->y1 - first->y2) < 1e-6) {
        column = column_of(drawing, fmin(first->x1, first->x2));
        row = row_of(drawing, first->y1);
        if (!glyph_name(grid, column, row, name))
            glyph_name(grid, column_of(drawing, fmax(last->x1, last->x2)), row, name);
    } else if (fabs(first->x1 - first->x2) < 1e-6) {
        column = column_of(drawing, first->x1);
        row = row_of(drawing, fmax(last->y1, last->y2));
        if (!glyph_name(grid, column, row, name))
            glyph_name(grid, column, row_of(drawing, fmin(first->y1, first->y2)), name);
    }
}

static void draw_names(struct glyph_grid *grid, const struct drawing *drawing,
                       const struct layout *layout)
{
    int last = 0;

    for (size_t i = 0; i < layout->joint_count; i++)
        if (layout->joints[i].line > last) {
            last = layout->joints[i].line;
            draw_name(grid, drawing, layout, last);
        }
}

static void tape_mark(struct glyph_grid *grid, int column, int row, double metres,
                      enum unit_system units, int *free_from)
{
    struct text words = {0};
    int length;

    if (units == UNITS_US)
        unit_show(&words, metres, QUANTITY_LENGTH, units);
    else
        unit_add_number(&words, metres, 2);
    length = (int)words.length;
    if (column >= *free_from && column + length <= grid->columns) {
        glyph_words(grid, column, row, text_string(&words), INK_TAPE);
        *free_from = column + length + 1;
    }
    grid->failed = grid->failed || words.failed;
    text_free(&words);
}

/* Zoomed in, the slab's own edge may be out of sight: names along the top and the left of the
 * window, readings along its foot. */
static void draw_window_names(struct glyph_grid *grid, const struct drawing *drawing,
                              const struct plan *plan, struct box box)
{
    const struct layout *layout = &plan->layout;
    enum unit_system units = (enum unit_system)plan->job.job_units;
    int last = 0, names_from = 2, tape_from = 0;

    for (size_t i = 0; i < layout->joint_count; i++) {
        const struct layout_joint *joint = &layout->joints[i];
        int column = column_of(drawing, joint->x1), row = row_of(drawing, joint->y1);
        char name[LINE_NAME_MOST];
        if (joint->line <= last)
            continue;
        last = joint->line;
        name_line(layout, joint->line, name);
        if (fabs(joint->x1 - joint->x2) < 1e-6 && column >= names_from && column < grid->columns) {
            glyph_words(grid, column, 0, name, INK_NAME);
            names_from = column + (int)strlen(name) + 1;
            tape_mark(grid, column, grid->rows - 1, joint->x1 - box.x0, units, &tape_from);
        } else if (fabs(joint->y1 - joint->y2) < 1e-6 && row > 0 && row < grid->rows - 1) {
            glyph_words(grid, 0, row, name, INK_NAME);
        }
    }
}

static void draw_cracks(struct glyph_grid *grid, const struct drawing *drawing,
                        const struct job *job)
{
    for (size_t i = 0; i < job->crack_count; i++) {
        const struct rows *rows = &job->cracks[i].rows;
        for (size_t j = 0; j + 1 < rows->count; j++) {
            const struct row *a = &rows->items[j], *b = &rows->items[j + 1];
            int steps = abs(column_of(drawing, b->x) - column_of(drawing, a->x)) +
                        abs(row_of(drawing, b->y) - row_of(drawing, a->y));
            for (int s = 0; s <= steps && steps < 10000; s++) {
                double t = steps > 0 ? (double)s / steps : 0;
                glyph_put(grid, column_of(drawing, a->x + t * (b->x - a->x)),
                          row_of(drawing, a->y + t * (b->y - a->y)), '~', INK_BROKEN);
            }
        }
    }
}

static void draw_broken(struct glyph_grid *grid, const struct drawing *drawing,
                        const struct layout *layout)
{
    for (size_t i = 0; i < layout->panel_count; i++) {
        const struct layout_panel *panel = &layout->panels[i];
        double x = 0, y = 0;
        if (panel->reason_count == 0)
            continue;
        for (size_t j = 0; j < panel->count; j++) {
            x += panel->ring[j].x / (double)panel->count;
            y += panel->ring[j].y / (double)panel->count;
        }
        glyph_put_free(grid, column_of(drawing, x), row_of(drawing, y), '!', INK_BROKEN);
    }
}

/* Too many panels to draw: say how many, in the middle. */
static void draw_counts(struct glyph_grid *grid, const struct drawing *drawing,
                        const struct layout *layout, struct box box)
{
    char words[64];
    size_t across = (size_t)name_lines_across(layout) + 1;
    size_t along = (size_t)name_lines_along(layout) + 1;
    int column, row = row_of(drawing, (box.y0 + box.y1) / 2);

    if (across * along == layout->panel_count)
        snprintf(words, sizeof words, " %zu x %zu panels ", across, along);
    else
        snprintf(words, sizeof words, " %zu panels ", layout->panel_count);
    column = column_of(drawing, (box.x0 + box.x1) / 2) - (int)strlen(words) / 2;
    if (row < 0 || row >= grid->rows || column < 0 || column >= grid->columns)
        row = grid->rows / 2, column = grid->columns / 4;
    glyph_words(grid, column, row, words, INK_NAME);
}

/* Cumulative readings from the west end, below the slab, at the lines across. */
static void draw_tape(struct glyph_grid *grid, const struct drawing *drawing,
                      const struct plan *plan, struct box box)
{
    int row = row_of(drawing, box.y0) + 1, free_from = 0, last = 0;
    enum unit_system units = (enum unit_system)plan->job.job_units;
    const struct layout *layout = &plan->layout;

    tape_mark(grid, column_of(drawing, box.x0), row, 0, units, &free_from);
    for (size_t i = 0; i < layout->joint_count && drawing->joints_drawn; i++) {
        const struct layout_joint *joint = &layout->joints[i];
        if (joint->line > last && fabs(joint->x1 - joint->x2) < 1e-6) {
            last = joint->line;
            tape_mark(grid, column_of(drawing, joint->x1), row, joint->x1 - box.x0, units,
                      &free_from);
        }
    }
    tape_mark(grid, column_of(drawing, box.x1), row, box.x1 - box.x0, units, &free_from);
}

static int tape_up_columns(const struct drawing_options *options, const struct plan *plan)
{
    if (!options->tape_up)
        return 0;
    return plan->job.job_units == UNITS_US ? 9 : 7;
}

/* Cumulative readings from the south end, right of the slab, at the lines along. */
static void draw_tape_up(struct glyph_grid *grid, const struct drawing *drawing,
                         const struct plan *plan, struct box box)
{
    int column = column_of(drawing, box.x1) + 2, last = 0, taken = grid->rows;
    enum unit_system units = (enum unit_system)plan->job.job_units;
    const struct layout *layout = &plan->layout;

    for (size_t i = 0; i < layout->joint_count && drawing->joints_drawn; i++) {
        const struct layout_joint *joint = &layout->joints[i];
        int row = row_of(drawing, joint->y1), free_from = 0;
        if (joint->line <= last || fabs(joint->y1 - joint->y2) > 1e-6 || row >= taken)
            continue;
        last = joint->line;
        taken = row;
        if (glyph_is_free(grid, column, row) && glyph_is_free(grid, column + 2, row))
            tape_mark(grid, column, row, joint->y1 - box.y0, units, &free_from);
    }
}

static bool has_ink(const struct layout *layout, enum layout_joint_kind kind)
{
    for (size_t i = 0; i < layout->joint_count; i++)
        if (layout->joints[i].kind == kind)
            return true;
    return false;
}

static int legend_rows(const struct plan *plan, bool ascii, char rows[8][40])
{
    int n = 0;
    size_t broken = 0;

    for (size_t i = 0; i < plan->layout.panel_count; i++)
        broken += plan->layout.panels[i].reason_count > 0;
    snprintf(rows[n++], 40, "%s cut", ascii ? ":" : "┊");
    snprintf(rows[n++], 40, "%s edge", ascii ? "#" : "┃");
    if (has_ink(&plan->layout, LAYOUT_CONSTRUCTION))
        snprintf(rows[n++], 40, "%s pour end", ascii ? "|" : "│");
    if (has_ink(&plan->layout, LAYOUT_ISOLATION))
        snprintf(rows[n++], 40, "%s soft board", ascii ? "=" : "║");
    snprintf(rows[n++], 40, "N up");
    snprintf(rows[n++], 40, "%zu panels", plan->layout.panel_count);
    if (plan->job.crack_count > 0)
        snprintf(rows[n++], 40, "~ crack");
    if (broken > 0)
        snprintf(rows[n++], 40, "! breaks rule");
    return n;
}

/* Puts the legend at the top right where nothing is drawn; false when there is no room. */
static bool draw_legend(struct glyph_grid *grid, const struct plan *plan)
{
    char rows[8][40];
    int count = legend_rows(plan, grid->ascii, rows), column = grid->columns - LEGEND_COLUMNS;

    if (column < 0 || count > grid->rows)
        return false;
    for (int row = 0; row < count; row++)
        for (int c = column - 1; c < grid->columns; c++)
            if (!glyph_is_free(grid, c, row))
                return false;
    for (int row = 0; row < count; row++)
        glyph_words(grid, column, row, rows[row], INK_NAME);
    return true;
}

static void draw_all(struct glyph_grid *grid, struct drawing *drawing, const struct plan *plan,
                     const struct drawing_options *options, struct box box)
{
    const struct layout *layout = &plan->layout;

    drawing->joints_drawn = panels_fit(drawing, layout);
    draw_joints(grid, drawing, layout);
    draw_ring(grid, drawing, layout->outline, layout->outline_count);
    draw_holes(grid, drawing, layout);
    if (drawing->joints_drawn)
        draw_objects(grid, drawing, &plan->job, layout);
    glyph_resolve(grid);
    if (drawing->joints_drawn) {
        draw_cracks(grid, drawing, &plan->job);
        draw_broken(grid, drawing, layout);
        if (options->names && options->zoom <= 1)
            draw_names(grid, drawing, layout);
    } else {
        draw_counts(grid, drawing, layout, box);
    }
    if (options->zoom > 1 && options->names && drawing->joints_drawn)
        draw_window_names(grid, drawing, plan, box);
    if (options->tape && options->zoom <= 1)
        draw_tape(grid, drawing, plan, box);
    if (options->tape_up && options->zoom <= 1)
        draw_tape_up(grid, drawing, plan, box);
}

static enum status try_draw(const struct plan *plan, const struct drawing_options *options,
                            int reserved, struct drawing *drawing, bool *legend_placed)
{
    struct glyph_grid grid = {0};
    struct box box = bounds(&plan->layout);
    bool failed;

    if (!glyph_grid_make(&grid, options->columns, options->rows, options->ascii))
        return STATUS_NO_MEMORY;
    *drawing = (struct drawing){.columns = options->columns, .rows = options->rows};
    reserved += tape_up_columns(options, plan);
    set_scale(drawing, options, options->columns - 1 - reserved - (options->tape ? 2 : 0),
              options->rows - 1 - (options->tape ? 1 : 0), box);
    draw_all(&grid, drawing, plan, options, box);
    *legend_placed = !options->legend || draw_legend(&grid, plan);
    failed = grid.failed;
    drawing->cells = glyph_take_cells(&grid);
    if (!failed)
        return STATUS_OK;
    drawing_free(drawing);
    return STATUS_NO_MEMORY;
}

enum status drawing_make(const struct plan *plan, const struct drawing_options *options,
                         struct drawing *drawing)
{
    bool placed = false;
    enum status status;

    *drawing = (struct drawing){0};
    if (options->columns < 8 || options->rows < 4 || plan->layout.outline_count < 3)
        return STATUS_REFUSED;
    status = try_draw(plan, options, 0, drawing, &placed);
    if (status == STATUS_OK && !placed && options->columns > 3 * LEGEND_COLUMNS) {
        drawing_free(drawing);
        status = try_draw(plan, options, LEGEND_COLUMNS + 2, drawing, &placed);
    }
    return status;
}

void drawing_print(struct text *out, const struct drawing *drawing)
{
    for (int row = 0; row < drawing->rows; row++) {
        const struct drawing_cell *cells = &drawing->cells[(size_t)row * (size_t)drawing->columns];
        int used = drawing->columns;
        while (used > 0 && cells[used - 1].code == ' ')
            used--;
        for (int column = 0; column < used; column++) {
            char bytes[4];
            text_add_bytes(out, bytes, utf8_encode(cells[column].code, bytes));
        }
        text_add_char(out, '\n', 1);
    }
    while (out->length > 1 && out->bytes[out->length - 2] == '\n')
        out->bytes[--out->length] = '\0'; /* no empty rows at the foot */
}

void drawing_free(struct drawing *drawing)
{
    free(drawing->cells);
    *drawing = (struct drawing){0};
}
