/* The page seal: the joint as cut at every slab temperature, its section, go or not. */
#include "ui/app_ask.h"
#include <math.h>
#include <stdio.h>

static const enum field_id seal_fields[] = {FIELD_sealing_temperature, FIELD_sealant_width,
                                            FIELD_sealant_depth, FIELD_sealing_least_temperature,
                                            FIELD_sealing_working};
enum { SEAL_ROWS = sizeof seal_fields / sizeof *seal_fields };

static int seal_count(const struct app *app)
{
    (void)app;
    return SEAL_ROWS;
}

static bool seal_row(const struct app *app, int index, struct entry *out)
{
    (void)app;
    return page_row_of(seal_fields, SEAL_ROWS, index, out);
}

static const char *row_word(const struct plan_table_row *row)
{
    return row->too_cold                   ? "too cold"
           : row->verdict == VERDICT_HOLDS ? "holds"
           : row->verdict == VERDICT_TIGHT ? "just holds"
           : row->verdict == VERDICT_FAILS ? "FAILS"
                                           : "-";
}

static void draw_table(const struct app *app, struct canvas *canvas, int top, int column, int rows)
{
    const struct plan *plan = &app->plan;
    size_t count = plan->table_count, shown = 0;

    canvas_format(canvas, top, column, app->columns - column, STYLE_BOLD,
                  "slab %s   width  stretch squeeze  of %.3g %%",
                  app_units(app) == UNITS_US ? "°F" : "°C", 100 * plan->seal.extension_capacity);
    for (size_t i = 0; i < count && shown < (size_t)rows; i++, shown++) {
        const struct plan_table_row *row = &plan->table[count - 1 - i]; /* hottest on top */
        double next = fabs(row->slab_c - plan->temperature.sealing_c);
        int line = top + 1 + (int)shown;
        char slab[16], gap[16];
        if (plan->table[0].slab_c > plan->table[count - 1].slab_c)
            row = &plan->table[i];
        next = fabs(row->slab_c - plan->temperature.sealing_c);
        page_small(app, slab, row->slab_c, QUANTITY_TEMPERATURE);
        if (app_units(app) == UNITS_METRIC)
            snprintf(gap, sizeof gap, "%.1f", 1000 * row->gap_m);
        else
            snprintf(gap, sizeof gap, "%.2f in", row->gap_m / 0.0254);
        canvas_right(canvas, line, column, 7, STYLE_PLAIN, slab);
        canvas_right(canvas, line, column + 8, 7, STYLE_PLAIN, gap);
        canvas_format(canvas, line, column + 17, 16, STYLE_PLAIN, "%6.1f  %6.1f",
                      100 * row->extension, 100 * row->compression);
        canvas_format(canvas, line, column + 34, app->columns - column - 34,
                      next < 0.26 ? STYLE_BOLD : STYLE_PLAIN, "%s%s", row_word(row),
                      next < 0.26 ? " <" : "");
    }
}

static void draw_section(const struct app *app, struct canvas *canvas, int top)
{
    const struct plan *plan = &app->plan;
    char width[16], low[16], depth[16], rod[16], cut[16];

    page_small(app, width, plan->seal.width_m, QUANTITY_SMALL_LENGTH);
    page_small(app, low, plan->seal.recess_m, QUANTITY_SMALL_LENGTH);
    page_small(app, depth, plan->seal.depth_m, QUANTITY_SMALL_LENGTH);
    page_small(app, rod, plan->seal.rod_m, QUANTITY_SMALL_LENGTH);
    page_small(app, cut, plan->seal.cut_depth_m, QUANTITY_SMALL_LENGTH);
    canvas_format(canvas, top, 0, 39, STYLE_PLAIN, "   |<---->|  %s wide", width);
    if (plan->seal.recess_m > 0)
        canvas_format(canvas, top + 1, 0, 39, STYLE_PLAIN, "───┐      ┌───  %s left low", low);
    else
        canvas_words(canvas, top + 1, 0, 39, STYLE_PLAIN, "───┐######┌───  flush");
    if (!isfinite(plan->seal.cut_depth_m)) { /* no rod: the slot is filled, or a seal pressed in */
        bool seal = isfinite(plan->seal.cold_squeeze);
        canvas_format(canvas, top + 2, 0, 39, STYLE_PLAIN, "   │######│     %s %s",
                      seal ? rod : depth, seal ? "seal, pressed in" : "filled");
        canvas_words(canvas, top + 3, 0, 39, STYLE_PLAIN, "   │######│");
        canvas_words(canvas, top + 4, 0, 39, STYLE_PLAIN, "───┘  ┊   └───  crack below");
        return;
    }
    canvas_format(canvas, top + 2, 0, 39, STYLE_PLAIN, "   │######│     %s sealant, waisted",
                  depth);
    canvas_format(canvas, top + 3, 0, 39, STYLE_PLAIN, "   │( OO )│     %s rod, pressed in", rod);
    canvas_format(canvas, top + 4, 0, 39, STYLE_PLAIN, "───┘  ┊   └───  %s wide cut", cut);
}

static void draw_order(const struct app *app, struct canvas *canvas, int top)
{
    static const char *const words[3][5] = {
        {"ORDER OF WORK", "1 blow out    2 finger comes up clean", "3 dry   4 rod, do not stretch",
         "5 gun from the bottom   6 tool it low", "7 same day as cleaned; stop for dew"},
        {"ORDER OF WORK", "1 as late as can be: 90 days", "2 vacuum the slot, full depth   3 dry",
         "4 fill from the bottom, a little proud", "5 shave it flush   6 look in a year"},
        {"ORDER OF WORK", "1 blow out    2 edges whole, no spalls", "3 lubricant on the faces",
         "4 press in, do not stretch or twist", "5 top below the slab all along"}};
    const struct plan *plan = &app->plan;
    int kind = isfinite(plan->seal.cut_depth_m) ? 0 : isfinite(plan->seal.cold_squeeze) ? 2 : 1;

    for (int i = 0; i < 5; i++)
        canvas_words(canvas, top + i, 41, canvas->columns - 41, i == 0 ? STYLE_BOLD : STYLE_PLAIN,
                     words[kind][i]);
}

static void draw_safe(const struct app *app, struct canvas *canvas)
{
    int line = app->rows - (app_roomy(app) ? 4 : 3);

    canvas_words(
        canvas, line, 0, app->columns, STYLE_PLAIN,
        "SAFE    data sheet first: solvents, skin; hot-pour burns; traffic. Tin beats this.");
    canvas_mark(canvas, line, 0, 4, STYLE_BOLD);
}

static void seal_draw(const struct app *app, struct canvas *canvas)
{
    struct text words = {0};
    int body = app->rows - (app_roomy(app) ? 4 : 3) - 10, sketch;

    draw_title(app, canvas, false);
    draw_answers(app, canvas, 1, 2, app->measured[0] != '\0' && !app_roomy(app) ? 2 : 3, 2);
    if (app->ask == ASK_MEASURED)
        canvas_words(
            canvas, 3, 0, app->columns, STYLE_BOLD,
            "Slab, width, air, damp %; rising, falling, dry, wet, clean: 15 10 12 70 ris dry");
    else if (!seal_draw_now(app, canvas, app_roomy(app) ? 3 : 2, app_roomy(app) ? 1 : 2))
        canvas_words(
            canvas, 3, 0, app->columns, STYLE_BOLD,
            "NOW     g: go or not, measured at the joint.   v: widths by temperature, kinds.");
    canvas_rule(canvas, 4);
    if (app->seal_view != SEAL_VIEW_WORK) {
        seal_draw_view(app, canvas, 5, app->rows - 8 - app_roomy(app));
        draw_foot(app, canvas, page_help_words(app, &words));
        text_free(&words);
        return;
    }
    page_draw_rows(app, canvas, 6, 18, 9);
    canvas_words(canvas, 5, 1, 32, STYLE_BOLD, "IN THIS TABLE");
    sketch = 5 + body;
    if (app->has_plan && app->plan.seal.sealed)
        draw_table(app, canvas, 5, 36, body - 1);
    else
        canvas_words(canvas, 5, 36, app->columns - 36, STYLE_PLAIN, "No sealant to judge.");
    canvas_rule(canvas, sketch);
    if (app->has_plan && isfinite(app->plan.seal.width_m) && app->rows >= 22) {
        draw_section(app, canvas, sketch + 1);
        draw_order(app, canvas, sketch + 1);
    }
    if (app->rows > 24)
        draw_safe(app, canvas);
    draw_foot(app, canvas, page_help_words(app, &words));
    text_free(&words);
}

static bool seal_key(struct app *app, uint32_t pressed)
{
    enum action action = key_action(pressed, PLACE_SEAL);

    if (action == ACTION_MEASURED)
        app_ask(app, ASK_MEASURED, app->measured);
    else if (action == ACTION_VIEW)
        app->seal_view = (app->seal_view + 1) % SEAL_VIEWS;
    return action == ACTION_MEASURED || action == ACTION_VIEW;
}

const struct page page_seal = {"seal", seal_count, seal_row, seal_draw, seal_key};
