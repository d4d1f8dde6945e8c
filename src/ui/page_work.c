/* The pages of the work: cut, seal, buy. Each is complete on one screen or says what is not there.
 */
#include "base/utf8.h"
#include "export/names.h"
#include "ui/app_ask.h"
#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

static bool no_key(struct app *app, uint32_t pressed)
{
    (void)app;
    (void)pressed;
    return false;
}

static bool sized_row(const enum field_id *ids, int count, int index, struct entry *out)
{
    if (index < 0 || index >= count)
        return false;
    row_of_field(ids[index], out);
    return true;
}

static const char *help_of(const struct app *app, struct text *words)
{
    struct entry entry;

    if (page_of(app->page)->row(app, app->at[app->page], &entry))
        row_help(app, &entry, words);
    return text_string(words);
}

static void draw_rows(const struct app *app, struct canvas *canvas, int line, int label, int value)
{
    struct entry entry;

    for (int i = 0; i < page_of(app->page)->count(app); i++)
        if (page_of(app->page)->row(app, i, &entry) && line + i < app->rows - 3)
            draw_row(app, canvas, &entry, app->at[app->page] == i,
                     (struct row_place){line + i, 1, label, value, 6});
}

/* ---- cut ---- */

static const enum field_id cut_fields[] = {FIELD_sawing_depth, FIELD_sawing_saws, FIELD_sawing_pace,
                                           FIELD_pour_start, FIELD_sawing_sunset};
enum { CUT_ROWS = sizeof cut_fields / sizeof *cut_fields };

static int cut_count(const struct app *app)
{
    (void)app;
    return CUT_ROWS;
}

static bool cut_row(const struct app *app, int index, struct entry *out)
{
    (void)app;
    return sized_row(cut_fields, CUT_ROWS, index, out);
}

/* Line names and metres in plan order (from the west, then from the south); returns how many lines
 * there are. */
static int draw_lines(const struct app *app, struct canvas *canvas, int top, int window)
{
    const struct layout *layout = &app->plan.layout;
    int last = 0, shown = 0, columns = (app->columns + 1) / 26;

    canvas_words(canvas, top, 0, app->columns, STYLE_BOLD,
                 "no.  line        m        no.  line        m        no.  line        m");
    for (size_t i = 0; i < layout->joint_count; i++) {
        double metres = 0;
        char name[LINE_NAME_MOST];
        int line = layout->joints[i].line, place = shown / (window > 0 ? window : 1);
        if (line <= last || layout->joints[i].kind != LAYOUT_CONTRACTION)
            continue;
        last = line;
        for (size_t j = i; j < layout->joint_count; j++)
            if (layout->joints[j].line == line)
                metres += app->plan.joints[j].length_m;
        name_line(layout, line, name);
        if (place < columns)
            canvas_format(canvas, top + 1 + shown % window, place * 26, 25, STYLE_PLAIN,
                          "%3d  line %-6s %6.1f", shown + 1, name, metres);
        shown++;
    }
    if (shown > window * columns)
        canvas_format(canvas, top + window, app->columns - 20, 20, STYLE_BOLD, " + %d more",
                      shown - window * columns);
    return shown;
}

static void cut_draw(const struct app *app, struct canvas *canvas)
{
    struct text words = {0};
    int foot = app->rows - (app_roomy(app) ? 8 : 6);

    draw_title(app, canvas, false);
    draw_answers(app, canvas, 1, 1, 1, 1);
    canvas_words(canvas, 2, 8, app->columns - 8, STYLE_PLAIN,
                 "Trial cuts every 20 min in the first concrete. Edge stays sharp: start");
    canvas_words(canvas, 3, 8, app->columns - 8, STYLE_PLAIN,
                 "sawing. Edge crumbles: wait 20 minutes. No clock times are worked out.");
    canvas_rule(canvas, 4);
    draw_rows(app, canvas, 5, 22, 22);
    canvas_rule(canvas, 5 + CUT_ROWS);
    if (app->has_plan && app->plan.has_outline && foot - 7 - CUT_ROWS > 0)
        draw_lines(app, canvas, 6 + CUT_ROWS, foot - 8 - CUT_ROWS);
    canvas_words(
        canvas, foot - 1, 0, app->columns, STYLE_PLAIN,
        "LATE    the line nearest the middle first, then halve what is left. Never beside");
    canvas_words(canvas, foot, 0, app->columns, STYLE_PLAIN,
                 "        a crack. Order above: from the west, then from the south.");
    canvas_words(canvas, foot + 1, 0, app->columns, STYLE_PLAIN,
                 "STOP    if a crack runs ahead of the blade: lift out, mark it, look again.");
    canvas_words(
        canvas, foot + 2, 0, app->columns, STYLE_PLAIN,
        "SAFE    wet cutting or extraction (silica), ears, eyes; slurry out of the drain.");
    for (int i = -1; i <= 2; i++)
        canvas_mark(canvas, foot + i, 0, i == 0 ? 0 : 5, STYLE_BOLD);
    draw_foot(app, canvas, help_of(app, &words));
    text_free(&words);
}

const struct page page_cut = {"cut", cut_count, cut_row, cut_draw, no_key};

/* ---- seal ---- */

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
    return sized_row(seal_fields, SEAL_ROWS, index, out);
}

static void small(const struct app *app, char out[16], double si, enum quantity quantity)
{
    struct text words = {0};

    draw_size(app, &words, si, quantity);
    snprintf(out, 16, "%.15s", text_string(&words));
    text_free(&words);
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
        small(app, slab, row->slab_c, QUANTITY_TEMPERATURE);
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

    small(app, width, plan->seal.width_m, QUANTITY_SMALL_LENGTH);
    small(app, low, plan->seal.recess_m, QUANTITY_SMALL_LENGTH);
    small(app, depth, plan->seal.depth_m, QUANTITY_SMALL_LENGTH);
    small(app, rod, plan->seal.rod_m, QUANTITY_SMALL_LENGTH);
    small(app, cut, plan->seal.cut_depth_m, QUANTITY_SMALL_LENGTH);
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
        draw_foot(app, canvas, help_of(app, &words));
        text_free(&words);
        return;
    }
    draw_rows(app, canvas, 6, 18, 9);
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
    draw_foot(app, canvas, help_of(app, &words));
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

/* ---- buy ---- */

/* The first eight fit a small screen; the others are on the page of the rest too. */
static const enum field_id buy_fields[] = {
    FIELD_takeoff_length,     FIELD_sealant_width,      FIELD_sealant_depth,
    FIELD_takeoff_waste,      FIELD_takeoff_rod_cusps,  FIELD_takeoff_packages,
    FIELD_takeoff_box,        FIELD_takeoff_tools,      FIELD_takeoff_tool,
    FIELD_takeoff_tool_pace,  FIELD_takeoff_clean_pace, FIELD_takeoff_rod_pace,
    FIELD_takeoff_rods,       FIELD_takeoff_prices,     FIELD_takeoff_rod_price,
    FIELD_takeoff_hour_price,
};
enum { BUY_FEW = 8, BUY_ALL = sizeof buy_fields / sizeof *buy_fields };

static int buy_count(const struct app *app)
{
    return app->rows >= 36 ? BUY_ALL : BUY_FEW;
}

static bool buy_row(const struct app *app, int index, struct entry *out)
{
    return sized_row(buy_fields, buy_count(app), index, out);
}

static void buy_line(const struct app *app, struct canvas *canvas, int line, const char *label,
                     double si, enum quantity quantity)
{
    char value[16];

    small(app, value, si, quantity);
    canvas_words(canvas, line, 42, 22, STYLE_PLAIN, label);
    canvas_right(canvas, line, 63, 12, STYLE_PLAIN, value);
}

static void draw_hours(const struct app *app, struct canvas *canvas, int line, bool every)
{
    const struct plan *plan = &app->plan;

    for (size_t i = 0; i < plan->quantities.work_count; i++) {
        const struct plan_work *work = &plan->quantities.works[i];
        if (!every && !work->slowest)
            continue;
        canvas_format(canvas, line++, 42, app->columns - 42, STYLE_PLAIN,
                      work->slowest ? "%.0f x %s: %.1f h, the slowest; %.0f day%s"
                                    : "%.0f x %s: %.1f h",
                      work->tools, work->name, work->hours, plan->quantities.days,
                      plan->quantities.days > 1 ? "s" : "");
    }
}

static void draw_sums(const struct app *app, struct canvas *canvas, int top)
{
    const struct plan *plan = &app->plan;
    double order = plan->quantities.sealant_order_m3, net = plan->quantities.sealant_net_m3;
    double cusps = plan->job.takeoff_rod_cusps ? plan->quantities.sealant_cusps_m3 : 0;
    char label[32] = "Rod", rod[16];
    int line = top + 5;

    buy_line(app, canvas, top, "Joint to seal", plan->quantities.sealed_m, QUANTITY_LENGTH);
    buy_line(app, canvas, top + 1, "Fill", net, QUANTITY_VOLUME);
    buy_line(app, canvas, top + 2, "beside the round rod", cusps, QUANTITY_VOLUME);
    buy_line(app, canvas, top + 3, "waste and loss", order - net - cusps, QUANTITY_VOLUME);
    buy_line(app, canvas, top + 4, "to order", order, QUANTITY_VOLUME);
    if (plan->quantities.rod_count > 0) {
        small(app, rod, plan->quantities.rods[0].diameter_m, QUANTITY_SMALL_LENGTH);
        snprintf(label, sizeof label, "Rod %s", rod);
        buy_line(app, canvas, line++, label, plan->quantities.rods[0].length_m, QUANTITY_LENGTH);
    } else if (isfinite(plan->quantities.tape_m)) {
        buy_line(app, canvas, line++, "Tape", plan->quantities.tape_m, QUANTITY_LENGTH);
    }
    if (plan->quantities.boxes > 0 && plan->job.takeoff_box > 1)
        canvas_format(canvas, line++, 42, app->columns - 42, STYLE_PLAIN,
                      "Sold in boxes of %.0f: %d boxes", plan->job.takeoff_box,
                      plan->quantities.boxes);
    draw_hours(app, canvas, line, buy_count(app) == BUY_ALL);
    line += buy_count(app) == BUY_ALL ? (int)plan->quantities.work_count : 1;
    if (buy_count(app) == BUY_ALL && isfinite(plan->quantities.cost))
        canvas_format(canvas, line, 42, app->columns - 42, STYLE_BOLD,
                      "Cost of what has a price: %.2f", plan->quantities.cost);
}

static const char *verdict_small_word(enum verdict verdict)
{
    return verdict == VERDICT_HOLDS ? "holds" : verdict == VERDICT_TIGHT ? "just holds" : "FAILS";
}

static void draw_other(const struct app *app, struct canvas *canvas, int line,
                       const struct plan_width *row)
{
    char width[16], depth[16], rod[16];

    small(app, width, row->width_m, QUANTITY_SMALL_LENGTH);
    small(app, depth, row->depth_m, QUANTITY_SMALL_LENGTH);
    small(app, rod, row->rod_m, QUANTITY_SMALL_LENGTH);
    canvas_words(canvas, line, 0, 4, STYLE_BOLD, row->now ? "now" : "");
    canvas_right(canvas, line, 4, 9, STYLE_PLAIN, width);
    canvas_right(canvas, line, 14, 9, STYLE_PLAIN, depth);
    canvas_format(canvas, line, 24, 16, STYLE_PLAIN, "%6.1f  %6.1f", 100 * row->extension,
                  100 * row->compression);
    canvas_words(canvas, line, 40, 10, verdict_style(row->verdict),
                 verdict_small_word(row->verdict));
    canvas_words(canvas, line, 51, 5, STYLE_PLAIN, row->when_n3 == VERDICT_FAILS ? "fails" : "yes");
    canvas_format(canvas, line, 56, 16, STYLE_PLAIN, "%7.1f %6d", 1000 * row->order_m3, row->packs);
    canvas_words(canvas, line, 71, 9, STYLE_PLAIN, rod);
}

/* As many as there is room for, the job's own among them. */
static void draw_others(const struct app *app, struct canvas *canvas, int top, int room)
{
    const struct plan *plan = &app->plan;
    int count = (int)plan->quantities.width_count, first = 0, now = 0;

    canvas_words(canvas, top, 0, app->columns, STYLE_BOLD,
                 "OR      width      depth   stretch squeeze       1 in 3   litres  packs  rod");
    while (now < count && !plan->quantities.widths[now].now)
        now++;
    if (count > room)
        first = now - room / 2 < 0              ? 0
                : now - room / 2 > count - room ? count - room
                                                : now - room / 2;
    for (int i = first; i < count && i - first < room; i++)
        draw_other(app, canvas, top + 1 + i - first, &plan->quantities.widths[i]);
}

static void buy_draw(const struct app *app, struct canvas *canvas)
{
    struct text words = {0};

    draw_title(app, canvas, false);
    draw_answers(app, canvas, 1, 5, 5, 1);
    canvas_rule(canvas, 2);
    canvas_words(canvas, 3, 1, 40, STYLE_BOLD, "TYPED OR USUAL");
    canvas_words(canvas, 3, 42, 38, STYLE_BOLD, "HOW MUCH");
    draw_rows(app, canvas, 4, 17, 13);
    if (app->has_plan)
        draw_sums(app, canvas, 4);
    if (app->rows >= 22) {
        canvas_rule(canvas, 4 + buy_count(app));
        draw_others(app, canvas, 5 + buy_count(app),
                    app->rows - 4 - app_roomy(app) - 6 - buy_count(app));
        canvas_words(
            canvas, app->rows - 4 - app_roomy(app), 0, app->columns, STYLE_PLAIN,
            "NOT IN IT  primer, and what goes over the soft board. Other depths: by kind.");
        canvas_mark(canvas, app->rows - 4 - app_roomy(app), 0, 9, STYLE_BOLD);
    }
    draw_foot(app, canvas, help_of(app, &words));
    text_free(&words);
}

const struct page page_buy = {"buy", buy_count, buy_row, buy_draw, no_key};
