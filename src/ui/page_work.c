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
        canvas_words(canvas, 3, 0, app->columns, STYLE_BOLD,
                     "NOW     g: go or not, from slab, width, air and damp measured at the joint.");
    canvas_rule(canvas, 4);
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
    if (key_action(pressed, PLACE_SEAL) != ACTION_MEASURED)
        return false;
    app_ask(app, ASK_MEASURED, app->measured);
    return true;
}

const struct page page_seal = {"seal", seal_count, seal_row, seal_draw, seal_key};

/* ---- buy ---- */

static const enum field_id buy_fields[] = {
    FIELD_takeoff_length,    FIELD_sealant_width,    FIELD_sealant_depth, FIELD_takeoff_waste,
    FIELD_takeoff_rod_cusps, FIELD_takeoff_packages, FIELD_takeoff_box};
enum { BUY_ROWS = sizeof buy_fields / sizeof *buy_fields };

static int buy_count(const struct app *app)
{
    (void)app;
    return BUY_ROWS;
}

static bool buy_row(const struct app *app, int index, struct entry *out)
{
    (void)app;
    return sized_row(buy_fields, BUY_ROWS, index, out);
}

/* A large slab is not laid out anew for every width: its metres and its governing panel serve. */
static void without_layout(const struct app *app, struct job *job)
{
    enum { LARGE = 500 };

    if (app->plan.layout.panel_count < LARGE || !isfinite(app->plan.movement.panel_m))
        return;
    job->outline.count = 0;
    job->object_count = job->opening_count = job->edge_count = 0;
    job->pour_line_count = job->joint_count = job->crack_count = 0;
    job->rules_spacing = app->plan.movement.panel_m;
    job->given[FIELD_rules_spacing] = true;
    job->takeoff_length = app->plan.quantities.sealed_m;
    job->given[FIELD_takeoff_length] = true;
}

/* One other width by a plan of its own; false when it gives none. */
static bool fill_row(struct app *app, double width, struct buy_row *row)
{
    struct plan *plan = calloc(1, sizeof *plan);
    struct job job;
    struct finding_list findings = {0};
    bool good = false;

    job_init(&job);
    if (plan != NULL && document_job(app->document, &job, &findings) == STATUS_OK) {
        job.weather = weather_share(app->weather.record);
        job.sealant_width = width;
        job.given[FIELD_sealant_width] = true;
        job.sealant_depth = NAN; /* by kind: a depth typed for one width does not suit another */
        job.given[FIELD_sealant_depth] = false;
        without_layout(app, &job);
        good = plan_make(&job, &app->cache, NULL, plan) == STATUS_OK && plan->seal.sealed;
        if (good)
            *row = (struct buy_row){
                plan->seal.width_m,
                plan->seal.depth_m,
                plan->seal.extension,
                plan->seal.compression,
                plan->seal.extension_capacity,
                1000 * plan->quantities.sealant_order_m3,
                plan->seal.rod_m,
                plan->quantities.package_count > 0 ? plan->quantities.packages[0].count : 0,
                plan->seal.verdict,
                false};
        plan_free(plan);
    }
    finding_free(&findings);
    job_free(&job);
    free(plan);
    return good;
}

void buy_fill(struct app *app)
{
    const struct plan *plan = &app->plan;
    double widths[] = {plan->seal.next_down_m, plan->seal.next_up_m, plan->seal.holds_when_n3_m};
    size_t count = 0;

    if (!plan->seal.sealed || app->stale)
        return;
    for (size_t i = 0; i < 3; i++) {
        bool again = fabs(widths[i] - plan->seal.width_m) < 1e-6 ||
                     (i == 2 && fabs(widths[2] - widths[1]) < 1e-6);
        if (i == 1)
            app->buy[count++] = (struct buy_row){
                plan->seal.width_m,
                plan->seal.depth_m,
                plan->seal.extension,
                plan->seal.compression,
                plan->seal.extension_capacity,
                1000 * plan->quantities.sealant_order_m3,
                plan->seal.rod_m,
                plan->quantities.package_count > 0 ? plan->quantities.packages[0].count : 0,
                plan->seal.verdict,
                true};
        if (isfinite(widths[i]) && !again && fill_row(app, widths[i], &app->buy[count]))
            count++;
    }
    app->buy_count = count;
}

static void buy_line(const struct app *app, struct canvas *canvas, int line, const char *label,
                     double si, enum quantity quantity)
{
    char value[16];

    small(app, value, si, quantity);
    canvas_words(canvas, line, 42, 22, STYLE_PLAIN, label);
    canvas_right(canvas, line, 63, 12, STYLE_PLAIN, value);
}

static void draw_sums(const struct app *app, struct canvas *canvas, int top)
{
    const struct plan *plan = &app->plan;
    double order = plan->quantities.sealant_order_m3, net = plan->quantities.sealant_net_m3;
    double cusps = plan->job.takeoff_rod_cusps ? plan->quantities.sealant_cusps_m3 : 0;

    buy_line(app, canvas, top, "Joint to seal", plan->quantities.sealed_m, QUANTITY_LENGTH);
    buy_line(app, canvas, top + 1, "Fill", net, QUANTITY_VOLUME);
    buy_line(app, canvas, top + 2, "beside the round rod", cusps, QUANTITY_VOLUME);
    buy_line(app, canvas, top + 3, "waste", order - net - cusps, QUANTITY_VOLUME);
    buy_line(app, canvas, top + 4, "to order", order, QUANTITY_VOLUME);
    if (plan->quantities.rod_count > 0) {
        buy_line(app, canvas, top + 5, "Rod", plan->quantities.rods[0].length_m, QUANTITY_LENGTH);
        buy_line(app, canvas, top + 6, "  its diameter", plan->quantities.rods[0].diameter_m,
                 QUANTITY_SMALL_LENGTH);
    }
    if (plan->quantities.boxes > 0 && plan->job.takeoff_box > 1)
        canvas_format(canvas, top + 7, 42, app->columns - 42, STYLE_PLAIN,
                      "Sold in boxes of %.0f: %d boxes", plan->job.takeoff_box,
                      plan->quantities.boxes);
}

static void draw_others(const struct app *app, struct canvas *canvas, int top)
{
    canvas_words(canvas, top, 0, app->columns, STYLE_BOLD,
                 "OR      width      depth   stretch squeeze         litres  packs  rod");
    for (size_t i = 0; i < app->buy_count; i++) {
        const struct buy_row *row = &app->buy[i];
        char width[16], depth[16], rod[16];
        small(app, width, row->width_m, QUANTITY_SMALL_LENGTH);
        small(app, depth, row->depth_m, QUANTITY_SMALL_LENGTH);
        small(app, rod, row->rod_m, QUANTITY_SMALL_LENGTH);
        canvas_words(canvas, top + 1 + (int)i, 0, 6, STYLE_BOLD, row->now ? "now" : "");
        canvas_right(canvas, top + 1 + (int)i, 6, 9, STYLE_PLAIN, width);
        canvas_right(canvas, top + 1 + (int)i, 16, 9, STYLE_PLAIN, depth);
        canvas_format(canvas, top + 1 + (int)i, 27, 16, STYLE_PLAIN, "%6.1f  %6.1f",
                      100 * row->extension, 100 * row->compression);
        canvas_words(canvas, top + 1 + (int)i, 43, 10, verdict_style(row->verdict),
                     row->verdict == VERDICT_HOLDS   ? "holds"
                     : row->verdict == VERDICT_TIGHT ? "just holds"
                                                     : "FAILS");
        canvas_format(canvas, top + 1 + (int)i, 53, 16, STYLE_PLAIN, "%6.1f %6d", row->litres,
                      row->packs);
        canvas_words(canvas, top + 1 + (int)i, 68, 12, STYLE_PLAIN, rod);
    }
    if (app->buy_count > 1)
        canvas_words(canvas, top + 1 + (int)app->buy_count, 8, app->columns - 8, STYLE_PLAIN,
                     "Depth of the other widths: by the kind of sealant.");
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
        canvas_rule(canvas, 12);
        draw_others(app, canvas, 13);
        canvas_words(canvas, app->rows - 4 - app_roomy(app), 0, app->columns, STYLE_PLAIN,
                     "NOT IN IT  primer, board and sealant at walls. The maker's data sheet "
                     "wins.");
        canvas_mark(canvas, app->rows - 4 - app_roomy(app), 0, 9, STYLE_BOLD);
    }
    draw_foot(app, canvas, help_of(app, &words));
    text_free(&words);
}

const struct page page_buy = {"buy", buy_count, buy_row, buy_draw, no_key};
