/* What all pages share: title row, rows to fill in, answers, plan, foot. */
#include "base/utf8.h"
#include "export/answers.h"
#include "export/drawing.h"
#include "ui/app_ask.h"
#include <math.h>
#include <stdio.h>
#include <string.h>

void draw_size(const struct app *app, struct text *out, double si, enum quantity quantity)
{
    if (isfinite(si))
        unit_show(out, si, quantity, app_units(app));
    else
        text_add(out, "-");
}

int verdict_style(enum verdict verdict)
{
    return STYLE_BOLD | (verdict == VERDICT_HOLDS   ? STYLE_GOOD
                         : verdict == VERDICT_TIGHT ? STYLE_CARE
                         : verdict == VERDICT_FAILS ? STYLE_BAD
                                                    : 0);
}

int draw_scroll(int count, int window, int at)
{
    int first = at - window / 2;

    if (first > count - window)
        first = count - window;
    return first < 0 ? 0 : first;
}

/* ---- title ---- */

static void add_practice(const struct app *app, struct text *out)
{
    static const char *const names[] = {"plain", "US", "UK", "German", "Australian", "Indian"};

    text_format(out, "%s usual", names[app->job.job_practice]);
}

static void add_saved(const struct app *app, struct text *out)
{
    if (app->working)
        text_format(out, "working %.0f %%  ", 100 * app->maker.share(app->maker.context));
    if (app->example)
        return;
    if (app->job.job_revision[0] != '\0')
        text_format(out, "rev %.8s, ", app->job.job_revision);
    if (app->history.saved == app->history.now)
        text_format(out, "saved%s%s", app->saved[0] != '\0' ? " " : "", app->saved);
    else
        text_add(out, "not saved");
}

void draw_title(const struct app *app, struct canvas *canvas, bool in_hand)
{
    struct text right = {0};
    bool wide = app->columns >= 110;
    const char *title = app->job.job_title[0] != '\0' ? app->job.job_title : "Slab without a title";
    int width, room;

    if (app->example)
        text_add(&right, wide ? "EXAMPLE, not a job for site" : "EXAMPLE");
    add_saved(app, &right);
    text_add(&right, wide ? "      " : "   ");
    add_practice(app, &right);
    if (app->columns >= 72)
        text_add(&right, app_units(app) == UNITS_US ? "   ft, in, °F" : "   m, mm, °C");
    if (app->today.year != 0 && app->columns >= 72)
        text_format(&right, "   %d %s", app->today.day, month_word(app->today.month));
    width = utf8_columns(text_string(&right));
    room = app->columns - width - 3;
    canvas_words(canvas, 0, 0, room > 8 ? room : 8, in_hand ? STYLE_REVERSE : STYLE_BOLD, title);
    canvas_words(canvas, 0, app->columns - width - 1, width, STYLE_PLAIN, text_string(&right));
    if (in_hand && app->open == OPEN_TEXT)
        editor_draw(&app->editor, canvas, 0, 0, room > 8 ? room : 8, STYLE_REVERSE);
    text_free(&right);
}

/* ---- one row to fill in ---- */

static void draw_value(const struct app *app, struct canvas *canvas, const struct entry *row,
                       bool in_hand, struct row_place place)
{
    struct text words = {0};
    char choice[CHOICE_MOST];

    if (in_hand && app->open == OPEN_TEXT) {
        editor_draw(&app->editor, canvas, place.row, place.column + place.label, place.value,
                    STYLE_REVERSE);
        return;
    }
    if (in_hand && app->open == OPEN_CHOICE) {
        field_choice_word(row->field, app->choice, choice, sizeof choice);
        text_format(&words, "< %s >", choice);
    } else {
        row_show(app, row, &words);
    }
    canvas_words(canvas, place.row, place.column + place.label, place.value - 1,
                 in_hand && app->open == OPEN_CHOICE ? STYLE_BOLD : STYLE_PLAIN,
                 text_string(&words));
    text_free(&words);
}

void draw_row(const struct app *app, struct canvas *canvas, const struct entry *row, bool in_hand,
              struct row_place place)
{
    const char *whose = in_hand && app->trouble[0] != '\0' ? app->trouble : row_whose(app, row);
    int width = place.label + place.value + place.whose, length = utf8_columns(whose);

    if (in_hand)
        canvas_put(canvas, place.row, place.column - 1, '>', STYLE_BOLD);
    canvas_words(canvas, place.row, place.column, place.label - 1, STYLE_PLAIN, row->label);
    draw_value(app, canvas, row, in_hand, place);
    if (length > place.whose)
        canvas_format(canvas, place.row, place.column + width - length - 1, length + 1, STYLE_PLAIN,
                      " %s", whose);
    else
        canvas_words(canvas, place.row, place.column + place.label + place.value, place.whose,
                     STYLE_PLAIN, whose);
    if (in_hand)
        canvas_mark(canvas, place.row, place.column, width, STYLE_REVERSE);
}

/* ---- answers ---- */

static int word_style(const struct app *app, const char *word)
{
    if (strcmp(word, "FAILS") == 0)
        return STYLE_BOLD | STYLE_BAD;
    if (strcmp(word, "HOLDS") == 0 || strcmp(word, "JUST HOLDS") == 0)
        return verdict_style(app->plan.seal.verdict);
    return STYLE_BOLD;
}

int draw_answers(const struct app *app, struct canvas *canvas, int row, size_t first, size_t last,
                 int lines)
{
    struct answers answers;
    bool half = app->open == OPEN_TEXT && app->editor.touched;
    int used = 0, spare = lines - (int)(last - first + 1);

    if (!app->has_plan) {
        canvas_wrap(canvas, row, 0, app->columns, lines, STYLE_PLAIN,
                    "No answers yet: the job has something to put right; see the line below.");
        return lines;
    }
    answers_make(&app->plan, &answers);
    for (size_t i = first; i <= last && i < answers.count; i++) {
        struct text sentence = {0};
        int word = strcmp(answers.rows[i].word, "JUST HOLDS") == 0 ? 12 : 8, took;
        text_add(&sentence, answers.rows[i].sentence);
        if (app->columns >= 110 && answers.rows[i].more[0] != '\0' &&
            (spare > 0 || utf8_columns(answers.rows[i].sentence) +
                                  utf8_columns(answers.rows[i].more) + word + 1 <=
                              app->columns))
            text_format(&sentence, " %s", answers.rows[i].more);
        canvas_format(canvas, row + used, 0, word, word_style(app, answers.rows[i].word), "%s%s",
                      half || app->stale || app->working ? "~" : "", answers.rows[i].word);
        if (spare > 0)
            took = canvas_wrap(canvas, row + used, word, app->columns - word, 2, STYLE_PLAIN,
                               text_string(&sentence));
        else
            took = canvas_words(canvas, row + used, word, app->columns - word, STYLE_PLAIN,
                                text_string(&sentence)) > 0;
        spare -= took > 1;
        used += took > 0 ? took : 1;
        text_free(&sentence);
    }
    return used;
}

/* ---- plan ---- */

static int ink_style(unsigned char ink)
{
    switch (ink) {
    case INK_EDGE:
        return STYLE_BOLD;
    case INK_BROKEN:
        return STYLE_BOLD | STYLE_BAD;
    case INK_OBJECT:
    case INK_NAME:
        return STYLE_BOLD;
    default:
        return STYLE_PLAIN;
    }
}

static void put_cross(const struct app *app, struct canvas *canvas, const struct drawing *drawing,
                      int row, int column)
{
    int c = (int)lround((app->cross_x - drawing->x0) * drawing->columns_per_m);
    int r = (int)lround((drawing->y1 - app->cross_y) * drawing->rows_per_m);

    if (c < 0 || r < 0 || c >= drawing->columns || r >= drawing->rows)
        return;
    canvas_put(canvas, row + r, column + c, '+', STYLE_REVERSE | STYLE_BOLD);
    canvas->cursor_row = row + r;
    canvas->cursor_column = column + c;
}

void draw_plan(const struct app *app, struct canvas *canvas, int row, int column, int rows,
               int columns, bool cross)
{
    struct drawing_options options = {.columns = columns,
                                      .rows = rows,
                                      .ascii = canvas->ascii,
                                      .names = true,
                                      .tape = true,
                                      .tape_up = cross,
                                      .legend = true,
                                      .zoom = cross && app->zoom > 1 ? app->zoom : 0,
                                      .centre_x = app->cross_x,
                                      .centre_y = app->cross_y};
    struct drawing drawing = {0};

    if (!app->has_plan || !app->plan.has_outline ||
        drawing_make(&app->plan, &options, &drawing) != STATUS_OK) {
        canvas_words(canvas, row + 1, column + 2, columns - 2, STYLE_PLAIN,
                     "No slab to draw: open the row Shape.");
        return;
    }
    for (int r = 0; r < drawing.rows; r++)
        for (int c = 0; c < drawing.columns; c++) {
            const struct drawing_cell *cell = &drawing.cells[r * drawing.columns + c];
            if (cell->code != ' ' && cell->code != 0)
                canvas_put(canvas, row + r, column + c, cell->code, ink_style(cell->ink));
        }
    if (cross)
        put_cross(app, canvas, &drawing, row, column);
    drawing_free(&drawing);
}

/* ---- foot ---- */

static void draw_keys(const struct app *app, struct canvas *canvas, int row)
{
    bool wide = app->columns >= 110;
    int column = canvas_words(canvas, row, 0, 26, STYLE_PLAIN, "Digits fill, letters go:");

    for (size_t i = 0; i < key_count; i++) {
        if (key_table[i].word == NULL)
            continue;
        if (column + 7 > app->columns)
            return;
        column += wide ? 3 : column < 26 ? 2 : app->columns < 80 ? 1 : 2;
        canvas_words(canvas, row, column, 8, STYLE_PLAIN, key_table[i].word);
        canvas_mark(canvas, row, column, 1, STYLE_UNDERLINE | STYLE_BOLD);
        column += (int)strlen(key_table[i].word);
    }
    if (wide)
        canvas_words(canvas, row, app->columns - 28, 28, STYLE_PLAIN,
                     "Enter opens   Esc goes back");
    else if (app->columns >= 80)
        canvas_words(canvas, row, app->columns - 4, 3, STYLE_PLAIN, "Esc");
}

static bool draw_question(const struct app *app, struct canvas *canvas, int row)
{
    struct text words = {0};
    int column;

    if (app->ask == ASK_NONE)
        return false;
    ask_words(app, &words);
    column = canvas_words(canvas, row, 0, app->columns, STYLE_BOLD, text_string(&words));
    if (ask_has_text(app->ask))
        editor_draw(&app->editor, canvas, row, column, app->columns - column - 1, STYLE_REVERSE);
    text_free(&words);
    return true;
}

/* While a row is being filled in: whose answers are standing. */
static void draw_old(const struct app *app, struct canvas *canvas, int row)
{
    struct text old = {0};

    row_show(app, &app->row, &old);
    canvas_format(canvas, row, 0, app->columns, STYLE_PLAIN,
                  "%s: Enter keeps, Esc gives back. ~ marks answers for the old %s.",
                  app->row.label, text_string(&old));
    text_free(&old);
}

void draw_foot(const struct app *app, struct canvas *canvas, const char *help)
{
    int keys = app->rows - 1, row = keys - (app_roomy(app) ? 2 : 1);
    bool done = draw_question(app, canvas, row);

    draw_keys(app, canvas, keys);
    if (app_roomy(app)) {
        if (app->change[0] != '\0')
            canvas_format(canvas, row + 1, 0, app->columns, STYLE_PLAIN,
                          "Last change: %.60s (undo takes it back). Local code, contract and a "
                          "licensed engineer decide.",
                          app->change);
        else
            canvas_words(
                canvas, row + 1, 0, app->columns, STYLE_PLAIN,
                "A planning aid. Local code, the contract and a licensed engineer decide.");
    }
    if (done)
        return;
    if (app->open == OPEN_TEXT && app->editor.touched && app->said[0] == '\0') {
        draw_old(app, canvas, row);
        return;
    }
    if (app->said[0] != '\0')
        canvas_words(canvas, row, 0, app->columns, STYLE_BOLD, app->said);
    else if (app->working)
        canvas_words(
            canvas, row, 0, app->columns, STYLE_BOLD,
            "Working: the answers (~) are those of the job before. Go on, or Esc stops it.");
    else if (app->stale)
        canvas_wrap(canvas, row, 0, app->columns, 1, STYLE_BOLD, edit_first_error(&app->findings));
    else if (app->show_change && app->change[0] != '\0')
        canvas_format(canvas, row, 0, app->columns, STYLE_PLAIN,
                      "Last change: %.120s (undo takes it back).", app->change);
    else
        canvas_wrap(canvas, row, 0, app->columns, 1, STYLE_PLAIN, help);
}

void app_draw(const struct app *app, struct canvas *canvas)
{
    canvas_clear(canvas);
    if (canvas->columns < CANVAS_LEAST_COLUMNS || canvas->rows < CANVAS_LEAST_ROWS) {
        canvas_format(canvas, 0, 0, canvas->columns, STYLE_PLAIN, "Too small: %dx%d needed.",
                      CANVAS_LEAST_COLUMNS, CANVAS_LEAST_ROWS);
        return;
    }
    page_of(app->page)->draw(app, canvas);
}
