/* Why: the ladder behind an answer; Enter goes to the field of a line. */
#include "base/utf8.h"
#include "plan/why.h"
#include "ui/app_ask.h"
#include <stdlib.h>
#include <string.h>

static const char *const questions[] = {"seal.width_m",
                                        "spacing.limit_m",
                                        "movement.open_m",
                                        "seal.extension",
                                        "seal.compression",
                                        "seal.depth_m",
                                        "seal.rod_m",
                                        "shrinkage.after_sealing",
                                        "temperature.hottest_c",
                                        "quantities.sealant_order_l"};
enum { QUESTIONS = sizeof questions / sizeof *questions };

/* The derivation in force; NULL when there is none. Freed by the caller. */
static struct why *make(const struct app *app)
{
    struct why *why = calloc(1, sizeof *why);

    if (why == NULL || !app->has_plan)
        goto none;
    if (why_make(&app->plan, questions[app->why_question], why) == STATUS_OK)
        return why;
none:
    free(why);
    return NULL;
}

static int count(const struct app *app)
{
    struct why *why = make(app);
    int lines = why != NULL ? (int)why->line_count : 0;

    free(why);
    return lines;
}

static bool row(const struct app *app, int index, struct entry *out)
{
    (void)app;
    (void)index;
    (void)out;
    return false;
}

/* Column where the words begin: behind the longest step number or symbol. */
static int words_column(const struct why *why)
{
    int longest = 1;

    for (size_t i = 0; i < why->line_count; i++)
        longest =
            longest > utf8_columns(why->lines[i].step) ? longest : utf8_columns(why->lines[i].step);
    return longest + 3;
}

static void draw_line(const struct app *app, struct canvas *canvas, const struct why *why,
                      int index, int at)
{
    bool wide = app->columns >= 110, in_hand = index == app->at[PAGE_WHY];
    const struct why_line *line = &why->lines[index];
    int begin = words_column(why), words = wide ? 58 : 50, value = wide ? 92 : 61;

    canvas_format(canvas, at, 0, begin, STYLE_PLAIN, "%c%s", in_hand ? '>' : ' ', line->step);
    canvas_words(canvas, at, begin, words - begin, STYLE_PLAIN, line->words);
    if (wide)
        canvas_words(canvas, at, words + 2, 30, STYLE_PLAIN, line->sum);
    canvas_right(canvas, at, words + (wide ? 32 : 1), value - words - (wide ? 32 : 1), STYLE_PLAIN,
                 line->value);
    canvas_words(canvas, at, value + 2, app->columns - value - 2, STYLE_PLAIN, line->from);
    if (in_hand)
        canvas_mark(canvas, at, 0, app->columns, STYLE_REVERSE);
}

static int draw_words(const struct app *app, struct canvas *canvas, int row_at, const char *word,
                      const char *sentence, int lines)
{
    int used;

    if (sentence[0] == '\0' || lines < 1)
        return 0;
    canvas_words(canvas, row_at, 0, 8, STYLE_BOLD, word);
    used = canvas_wrap(canvas, row_at, 8, app->columns - 8, lines, STYLE_PLAIN, sentence);
    return used;
}

/* One short word: the columns are narrow. */
static const char *try_word(const char *verdict)
{
    if (strcmp(verdict, "FAILS") == 0)
        return "fails";
    return strcmp(verdict, "JUST HOLDS") == 0 ? "just" : "";
}

static int draw_tries(const struct app *app, struct canvas *canvas, const struct why *why, int at)
{
    int half = app->columns >= 110 ? 56 : 36, used = 0;

    if (why->try_count == 0)
        return 0;
    canvas_words(canvas, at, 0, 8, STYLE_BOLD, "TRY");
    for (size_t i = 0; i < why->try_count && i < 8; i++) {
        int column = 8 + (i % 2 ? half : 0);
        used = (int)i / 2;
        canvas_format(canvas, at + used, column, half - 1, STYLE_PLAIN, "%-18s%8s  %s",
                      why->tries[i].words, why->tries[i].value, try_word(why->tries[i].verdict));
    }
    return used + 1;
}

static void draw_why(const struct app *app, struct canvas *canvas, const struct why *why)
{
    int end = app->rows - (app_roomy(app) ? 3 : 2), at, ladder, first;

    canvas_words(canvas, 1, 0, 8, STYLE_BOLD, "WHY");
    at = 1 + canvas_wrap(canvas, 1, 8, app->columns - 8, 1, STYLE_BOLD, why->question);
    at += canvas_wrap(canvas, at, 8, app->columns - 8, 2, STYLE_PLAIN, why->answer);
    canvas_rule(canvas, at++);
    ladder = end - at - 9;
    ladder = ladder < 3 ? 3 : ladder;
    ladder = (int)why->line_count < ladder ? (int)why->line_count : ladder;
    first = draw_scroll((int)why->line_count, ladder, app->at[PAGE_WHY]);
    for (int i = 0; i < ladder; i++)
        draw_line(app, canvas, why, first + i, at++);
    canvas_rule(canvas, at++);
    at += draw_tries(app, canvas, why, at);
    at += draw_words(app, canvas, at, "FORMULA", why->formula, end - at < 2 ? end - at : 2);
    at += draw_words(app, canvas, at, "VALID", why->valid, end - at < 2 ? end - at : 2);
    draw_words(app, canvas, at, "SOURCE", why->source, end - at < 3 ? end - at : 3);
}

static void draw(const struct app *app, struct canvas *canvas)
{
    struct why *why = make(app);

    draw_title(app, canvas, false);
    if (why != NULL)
        draw_why(app, canvas, why);
    else
        canvas_words(canvas, 2, 8, app->columns - 8, STYLE_PLAIN,
                     "There is no such result in this job. Left and right ask the next one.");
    free(why);
    draw_foot(app, canvas,
              "Enter goes to the field behind the line, Esc back. Left, right: others.");
}

static void go_behind(struct app *app)
{
    struct why *why = make(app);

    if (why != NULL && app->at[PAGE_WHY] < (int)why->line_count) {
        const char *field = why->lines[app->at[PAGE_WHY]].field;
        if (field[0] != '\0')
            app_goto_field(app, field);
        else
            app_tell(app, "This line is worked out from the lines above it.");
    }
    free(why);
}

static bool key(struct app *app, uint32_t pressed)
{
    if (pressed == PRESS_LEFT || pressed == PRESS_RIGHT) {
        app->why_question =
            (app->why_question + (pressed == PRESS_LEFT ? QUESTIONS - 1 : 1)) % QUESTIONS;
        app->at[PAGE_WHY] = 0;
        return true;
    }
    if (pressed == PRESS_ENTER) {
        go_behind(app);
        return true;
    }
    return false;
}

const struct page page_why = {"why", count, row, draw, key};
