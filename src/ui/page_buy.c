/* The page buy: what to order, the hours, the same joints at other widths. */
#include "ui/app_ask.h"
#include <math.h>
#include <stdio.h>

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
    return page_row_of(buy_fields, buy_count(app), index, out);
}

static void buy_line(const struct app *app, struct canvas *canvas, int line, const char *label,
                     double si, enum quantity quantity)
{
    char value[16];

    page_small(app, value, si, quantity);
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
        page_small(app, rod, plan->quantities.rods[0].diameter_m, QUANTITY_SMALL_LENGTH);
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

    page_small(app, width, row->width_m, QUANTITY_SMALL_LENGTH);
    page_small(app, depth, row->depth_m, QUANTITY_SMALL_LENGTH);
    page_small(app, rod, row->rod_m, QUANTITY_SMALL_LENGTH);
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
    page_draw_rows(app, canvas, 4, 17, 13);
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
    draw_foot(app, canvas, page_help_words(app, &words));
    text_free(&words);
}

const struct page page_buy = {"buy", buy_count, buy_row, buy_draw, page_no_key};
