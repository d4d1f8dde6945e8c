/* My own slab: the few questions, ready shapes with sizes a to d, live joints. */
#include "export/answers.h"
#include "ui/app_ask.h"
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

enum { USES = 5, PRACTICES = 6, CORNERS = 4 };

static int count(const struct app *app)
{
    (void)app;
    return 0;
}

static bool row(const struct app *app, int index, struct entry *out)
{
    (void)app;
    (void)index;
    (void)out;
    return false;
}

static bool current(const struct app *app, enum own_question *question)
{
    return own_question(&app->own, app->own.step, question);
}

/* The text a question fills, NULL for a choice. */
static char *text_of(struct own *own, enum own_question question, size_t *size)
{
    if (question >= OWN_A && question <= OWN_D) {
        *size = sizeof own->size[0];
        return own->size[question - OWN_A];
    }
    if (question == OWN_SIDES) {
        *size = sizeof own->sides;
        return own->sides;
    }
    if (question == OWN_THICKNESS) {
        *size = sizeof own->thickness;
        return own->thickness;
    }
    return NULL;
}

/* ---- drawing ---- */

static void question_words(const struct own *own, enum own_question question, char label[48],
                           char value[64])
{
    char word[CHOICE_MOST];
    size_t size;
    struct own copy = *own;
    const char *text = text_of(&copy, question, &size);

    snprintf(value, 64, "%.60s", text != NULL ? text : "");
    switch (question) {
    case OWN_USE:
        snprintf(label, 48, "What is it?");
        field_choice_word(&field_table[FIELD_slab_use], own->use, value, 64);
        break;
    case OWN_PRACTICE:
        snprintf(label, 48, "Whose practice?");
        field_choice_word(&field_table[FIELD_job_practice], own->practice, word, sizeof word);
        snprintf(value, 64, "%s", word);
        break;
    case OWN_SHAPE:
        snprintf(label, 48, "What shape, seen from above, north up?");
        snprintf(value, 64, "%s", own_shape_word(own->shape));
        break;
    case OWN_CORNER:
        snprintf(label, 48, "   which corner is missing");
        snprintf(value, 64, "%s", own_corner_word(own->corner));
        break;
    case OWN_SIDES:
        snprintf(label, 48, "   sides");
        break;
    case OWN_THICKNESS:
        snprintf(label, 48, "   thickness");
        break;
    default:
        snprintf(label, 48, "%c  %s", 'a' + (int)(question - OWN_A),
                 own_size_label(own->shape, (int)(question - OWN_A)));
        break;
    }
}

static void draw_shapes(const struct app *app, struct canvas *canvas, int top)
{
    static const char *const pictures[3] = {
        "┏━━━━━━━┓   ┏━━━┓       ┏━┓   ┏━┓   ┏━━━━━━━┓   ┏━━━━━━━━━━━━━┓   ┏━━━━━━━┓",
        "┃       ┃   ┃   ┗━━━┓   ┃ ┗━━━┛ ┃   ┗━┓   ┏━┛   ┗━━━━━━━━━━━━━┛   ┃  ▒▒▒  ┃",
        "┗━━━━━━━┛   ┗━━━━━━━┛   ┗━━━━━━━┛     ┗━━━┛                       ┗━━━━━━━┛"};
    static const int columns[] = {3, 15, 27, 39, 51, 69, 3, 15};

    for (int i = 0; i < 3; i++)
        canvas_words(canvas, top + i, 3, app->columns - 3, STYLE_PLAIN, pictures[i]);
    for (int i = 0; i < OWN_SHAPES; i++) {
        bool chosen = app->own.shape == i;
        int line = top + (i < OWN_TAPER ? 3 : 4);
        int end = canvas_words(canvas, line, columns[i], 20, chosen ? STYLE_REVERSE : STYLE_PLAIN,
                               own_shape_word(i));
        if (chosen)
            canvas_words(canvas, line, end, 2, STYLE_BOLD, " <");
    }
}

static void draw_question(const struct app *app, struct canvas *canvas, int line,
                          enum own_question question, bool in_hand)
{
    char label[48], value[64];
    bool choice = question == OWN_USE || question == OWN_PRACTICE || question == OWN_CORNER ||
                  question == OWN_SHAPE;
    int column = question == OWN_SHAPE ? 43 : question == OWN_SIDES ? 12 : 40;

    question_words(&app->own, question, label, value);
    if (in_hand)
        canvas_put(canvas, line, 0, '>', STYLE_BOLD);
    canvas_words(canvas, line, 1, column - 2, STYLE_PLAIN, label);
    if (in_hand && !choice) {
        editor_draw(&app->editor, canvas, line, column,
                    question == OWN_SIDES ? app->columns - column - 2 : 18, STYLE_REVERSE);
        return;
    }
    canvas_format(canvas, line, column, app->columns - column,
                  in_hand ? STYLE_REVERSE : STYLE_PLAIN, in_hand ? "< %s >" : "%s", value);
}

/* The joints a finished slab would have, or why there is none yet. */
static void draw_answer(const struct app *app, struct canvas *canvas, int line)
{
    struct plan *plan = calloc(1, sizeof *plan);
    struct document *document = NULL;
    struct finding_list findings = {0};
    struct text out = {0}, trouble = {0};
    struct answers answers;
    struct job job;

    job_init(&job);
    if (plan != NULL && own_write(&app->own, &out, &trouble) &&
        document_parse(text_string(&out), out.length, &document, &findings) == STATUS_OK &&
        document_job(document, &job, &findings) == STATUS_OK) {
        if (plan_make(&job, NULL, NULL, plan) == STATUS_OK) {
            answers_make(plan, &answers);
            canvas_words(canvas, line, 0, 8, STYLE_BOLD, answers.rows[0].word);
            canvas_words(canvas, line, 8, app->columns - 8, STYLE_PLAIN, answers.rows[0].sentence);
        }
        plan_free(plan);
    }
    canvas_words(canvas, line + 1, 0, app->columns, STYLE_PLAIN,
                 "STILL   rows marked guess to look at. Walls, manholes: add on the plan.");
    text_free(&out);
    text_free(&trouble);
    finding_free(&findings);
    document_free(document);
    job_free(&job);
    free(plan);
}

static void draw(const struct app *app, struct canvas *canvas)
{
    enum own_question question;
    int line = 3;
    bool low = app->rows < 24;

    canvas_words(canvas, 0, 0, app->columns, STYLE_BOLD,
                 app->own.reshape ? "A new shape   All other rows stay as they are."
                                  : "My own slab   A few questions. Nothing from the example is "
                                    "kept.");
    line = 2 - low;
    for (int step = 0; own_question(&app->own, step, &question); step++) {
        if (line < app->rows - 4)
            draw_question(app, canvas, line++, question, step == app->own.step);
        if (question == OWN_SHAPE && !low) {
            draw_shapes(app, canvas, line);
            line += 6;
        }
    }
    if (!app->own.reshape)
        draw_answer(app, canvas, app->rows - 4);
    canvas_words(canvas, app->rows - 2, 0, app->columns, app->said[0] ? STYLE_BOLD : STYLE_PLAIN,
                 app->said[0] != '\0' ? app->said
                                      : "Metres and feet both work: 36, 36 m, 118 ft, 118'-1\". "
                                        "Left and right choose.");
    canvas_words(canvas, app->rows - 1, 0, app->columns, STYLE_PLAIN,
                 "Digits fill, Enter goes on, Esc goes one back.  Enter on the last line: finish.");
}

/* ---- keys ---- */

static void open_question(struct app *app)
{
    enum own_question question;
    size_t size;
    char *text;

    if (!current(app, &question))
        return;
    text = text_of(&app->own, question, &size);
    editor_open(&app->editor, text != NULL ? text : "");
}

static void keep_question(struct app *app)
{
    enum own_question question;
    size_t size;
    char *text = current(app, &question) ? text_of(&app->own, question, &size) : NULL;

    if (text != NULL)
        snprintf(text, size, "%.*s", (int)size - 1, app->editor.bytes);
}

/* Only the outline is new: its rows are written over, the surplus ones removed, and so are the
 * sides and what stood in the old shape's sides. */
static bool take_shape(struct app *app)
{
    struct text trouble = {0}, value = {0};
    struct own_outline outline;
    size_t old = app->job.outline.count, count = 0, most;
    struct change_item *items;
    bool done = false;

    if (!own_make_outline(&app->own, &outline, &trouble)) {
        app_tell(app, "%s", text_string(&trouble));
        text_free(&trouble);
        return false;
    }
    most = old + app->job.edge_count + (size_t)outline.count + 4;
    items = calloc(most, sizeof *items);
    for (size_t i = 0; items != NULL && i < (size_t)outline.count; i++, count++) {
        text_clear(&value);
        unit_add_number(&value, outline.x[i], 6);
        text_add(&value, ", ");
        unit_add_number(&value, outline.y[i], 6);
        text_add(&value, " m");
        snprintf(items[count].path, sizeof items[count].path, "outline.point.%zu", i + 1);
        snprintf(items[count].value, sizeof items[count].value, "%s", text_string(&value));
    }
    for (size_t i = old; items != NULL && i > (size_t)outline.count; i--, count++)
        snprintf(items[count].path, sizeof items[count].path, "outline.point.%zu", i);
    for (size_t i = 0; items != NULL && i < app->job.edge_count; i++, count++)
        snprintf(items[count].path, sizeof items[count].path, "edge.%d", app->job.edges[i].number);
    for (int i = 0; items != NULL && i < 4 && outline.hole[2] > outline.hole[0]; i++, count++) {
        snprintf(items[count].path, sizeof items[count].path, "opening.hole.point.%d", i + 1);
        snprintf(items[count].value, sizeof items[count].value, "%.6g, %.6g m",
                 outline.hole[i == 1 || i == 2 ? 2 : 0], outline.hole[i >= 2 ? 3 : 1]);
    }
    if (items != NULL)
        done = edit_change(app, items, count, "a new shape");
    free(items);
    text_free(&value);
    text_free(&trouble);
    return done;
}

static bool take_new(struct app *app)
{
    struct text out = {0}, trouble = {0};
    bool done = own_write(&app->own, &out, &trouble);

    if (done)
        done = edit_replace(app, text_string(&out), out.length, app->new_path, false,
                            "own slab begun");
    else
        app_tell(app, "%s", text_string(&trouble));
    if (done)
        app->saved[0] = '\0';
    text_free(&out);
    text_free(&trouble);
    return done;
}

static void finish(struct app *app)
{
    struct app *at = app;
    bool reshape = app->own.reshape;

    if (!(reshape ? take_shape(at) : take_new(at)))
        return;
    app->cross_x = app->cross_y = 0;
    app_go(app, PAGE_JOB);
    app->at[PAGE_JOB] = reshape ? 1 : 2;
}

static void go_on(struct app *app)
{
    enum own_question question;

    keep_question(app);
    app->own.step++;
    if (!current(app, &question)) {
        app->own.step--;
        finish(app);
        return;
    }
    open_question(app);
}

static void go_back(struct app *app)
{
    keep_question(app);
    if (app->own.step == 0) {
        app_go(app, PAGE_JOB);
        return;
    }
    app->own.step--;
    open_question(app);
}

static void step_choice(struct app *app, enum own_question question, int step)
{
    struct own *own = &app->own;

    if (question == OWN_USE)
        own->use = (own->use + step + USES) % USES;
    else if (question == OWN_PRACTICE)
        own->practice = (own->practice + step + PRACTICES) % PRACTICES;
    else if (question == OWN_SHAPE)
        own->shape = (own->shape + step + OWN_SHAPES) % OWN_SHAPES;
    else
        own->corner = (own->corner + step + CORNERS) % CORNERS;
}

static bool key(struct app *app, uint32_t pressed)
{
    enum own_question question;
    size_t size;

    if (!current(app, &question))
        app->own.step = 0, current(app, &question);
    if (pressed == PRESS_ENTER || pressed == PRESS_DOWN) {
        if (pressed == PRESS_ENTER || own_question(&app->own, app->own.step + 1, &question))
            go_on(app);
    } else if (pressed == PRESS_BACK || pressed == PRESS_UP) {
        if (pressed == PRESS_BACK || app->own.step > 0)
            go_back(app);
    } else if (text_of(&app->own, question, &size) != NULL) {
        editor_key(&app->editor, pressed);
    } else if (pressed == PRESS_LEFT || pressed == PRESS_RIGHT) {
        step_choice(app, question, pressed == PRESS_LEFT ? -1 : 1);
    }
    return true;
}

const struct page page_own = {"own slab", count, row, draw, key};
