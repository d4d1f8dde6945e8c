/* The page cut: depth, metres a line, what to do when it is late. */
#include "export/names.h"
#include "ui/app_ask.h"

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
    return page_row_of(cut_fields, CUT_ROWS, index, out);
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
    page_draw_rows(app, canvas, 5, 22, 22);
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
    draw_foot(app, canvas, page_help_words(app, &words));
    text_free(&words);
}

const struct page page_cut = {"cut", cut_count, cut_row, cut_draw, page_no_key};
