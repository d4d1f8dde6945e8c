/* The page seal's other views: widths by slab temperature, and which sealant suits. */
#include "export/seal_chart.h"
#include "ui/app_ask.h"
#include "ui/app_state.h"
#include <string.h>

static void draw_lines(struct canvas *canvas, int top, int rows, const char *lines)
{
    for (int i = 0; i < rows && *lines != '\0'; i++) {
        size_t length = strcspn(lines, "\n");
        canvas_format(canvas, top + i, 1, canvas->columns - 1, i == 0 ? STYLE_BOLD : STYLE_PLAIN,
                      "%.*s", (int)length, lines);
        lines += length + (lines[length] == '\n');
    }
}

static void draw_widths(const struct app *app, struct canvas *canvas, int top, int rows)
{
    struct text words = {0};

    canvas_words(canvas, top, 1, app->columns - 1, STYLE_BOLD,
                 "WHICH WIDTH MAY BE SEALED AT WHICH SLAB TEMPERATURE (both measured then)");
    seal_chart_add(&words, &app->plan, app->columns - 2);
    if (words.length == 0)
        canvas_words(canvas, top + 1, 1, app->columns - 1, STYLE_PLAIN, "No sealant to judge.");
    draw_lines(canvas, top + 2, rows - 4, text_string(&words));
    canvas_words(canvas, top + rows - 1, 1, app->columns - 1, STYLE_PLAIN,
                 "yes: to 90 % of what it is good for; just: to all of it; cold: below the least.");
    text_free(&words);
}

static void draw_kinds(const struct app *app, struct canvas *canvas, int top, int rows)
{
    int line = top + 1;

    canvas_words(canvas, top, 1, app->columns - 1, STYLE_BOLD,
                 "WHICH SEALANT (usual classes; the tin wins; common practice and memory)");
    for (size_t i = 0; i < app->plan.choice_count && line < top + rows; i++) {
        const struct plan_choice *choice = &app->plan.choices[i];
        struct text words = {0};
        seal_choice_words(&words, &app->plan, choice);
        canvas_format(canvas, line, 0, 18, choice->fits ? STYLE_BOLD : STYLE_PLAIN, "%c%s",
                      choice->now ? '>' : ' ', choice->kind);
        line += canvas_wrap(canvas, line, 18, app->columns - 18, top + rows - line, STYLE_PLAIN,
                            text_string(&words));
        text_free(&words);
    }
}

void seal_draw_view(const struct app *app, struct canvas *canvas, int top, int rows)
{
    if (!app->has_plan)
        return;
    if (app->seal_view == SEAL_VIEW_WIDTHS)
        draw_widths(app, canvas, top, rows);
    else
        draw_kinds(app, canvas, top, rows);
}
