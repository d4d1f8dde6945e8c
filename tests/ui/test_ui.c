/* The form without a terminal: canvas, editor, keys, undo, example, own slab, golden screens,
 * random keys. Run in the project's folder. SLABGAP_REWRITE_GOLDEN=1 writes tests/golden anew. */
#include <setjmp.h>
#include <stdarg.h>
#include <stddef.h>
#include <stdint.h>
#include <cmocka.h>

#include "base/utf8.h"
#include "ui/app_state.h"
#include "ui/ui_help.h"
#include <math.h>

/* ---- canvas ---- */

static void test_canvas_clips(void **state)
{
    struct canvas canvas = {0};
    struct text out = {0};

    (void)state;
    assert_true(canvas_make(&canvas, 5, 2, false));
    canvas_words(&canvas, 0, 3, 99, STYLE_PLAIN, "abcdef");
    canvas_words(&canvas, 1, -2, 99, STYLE_PLAIN, "xyz");
    canvas_words(&canvas, 7, 0, 99, STYLE_PLAIN, "no");
    canvas_print(&canvas, &out);
    assert_string_equal(text_string(&out), "   ab\nz\n");
    assert_null(canvas_cell(&canvas, 2, 0));
    assert_false(canvas_make(&canvas, 0, 5, false));
    text_free(&out);
    canvas_free(&canvas);
    canvas_free(&canvas);
}

static void test_canvas_wide_and_ascii(void **state)
{
    struct canvas canvas = {0};
    struct text out = {0};

    (void)state;
    assert_true(canvas_make(&canvas, 6, 1, false));
    canvas_words(&canvas, 0, 0, 6, STYLE_PLAIN,
                 "\xE6\xB7\xB7\xE6\xB7\xB7"
                 "a"); /* two wide, one narrow */
    assert_int_equal(canvas_cell(&canvas, 0, 1)->code, 0);
    canvas_put(&canvas, 0, 1, 'x', STYLE_PLAIN); /* half of the first is gone: so is the other */
    canvas_print(&canvas, &out);
    assert_string_equal(text_string(&out), " x\xE6\xB7\xB7"
                                           "a\n");
    canvas_free(&canvas);
    text_clear(&out);
    assert_true(canvas_make(&canvas, 9, 1, true));
    canvas_words(&canvas, 0, 0, 9, STYLE_PLAIN,
                 "15 \xC2\xB0"
                 "C \xE2\x94\x83\xE2\x94\x8A");
    canvas_print(&canvas, &out);
    assert_string_equal(text_string(&out), "15  C #:\n");
    text_free(&out);
    canvas_free(&canvas);
}

static void test_canvas_wraps(void **state)
{
    struct canvas canvas = {0};
    struct text out = {0};

    (void)state;
    assert_true(canvas_make(&canvas, 10, 3, false));
    assert_int_equal(canvas_wrap(&canvas, 0, 0, 10, 3, STYLE_PLAIN, "one two three four"), 2);
    canvas_print(&canvas, &out);
    assert_string_equal(text_string(&out), "one two\nthree four\n\n");
    text_free(&out);
    canvas_free(&canvas);
}

/* ---- editor ---- */

static void test_editor(void **state)
{
    struct editor editor;

    (void)state;
    editor_open(&editor, "a\xC2\xB0"
                         "c");
    assert_true(editor_key(&editor, PRESS_LEFT));
    assert_true(editor_key(&editor, PRESS_RUB)); /* the degree sign: two bytes, one key */
    assert_string_equal(editor.bytes, "ac");
    assert_true(editor_key(&editor, 0xB0));
    assert_string_equal(editor.bytes, "a\xC2\xB0"
                                      "c");
    assert_true(editor_key(&editor, PRESS_HOME));
    assert_true(editor_key(&editor, PRESS_RUB));
    assert_true(editor_key(&editor, PRESS_DELETE));
    assert_string_equal(editor.bytes, "\xC2\xB0"
                                      "c");
    assert_false(editor_key(&editor, PRESS_ENTER));
    assert_false(editor_key(&editor, 7));
    for (int i = 0; i < 2 * EDITOR_MOST; i++)
        editor_key(&editor, 'x');
    assert_true(editor.length < EDITOR_MOST);
}

static void test_keys(void **state)
{
    (void)state;
    assert_int_equal(key_action('j', PLACE_EVERYWHERE), ACTION_JOB);
    assert_int_equal(key_action('J', PLACE_EVERYWHERE), ACTION_JOB);
    assert_int_equal(key_action('a', PLACE_EVERYWHERE), ACTION_NONE);
    assert_int_equal(key_action('a', PLACE_PLAN), ACTION_ADD);
    for (size_t i = 0; i < key_count; i++) {
        assert_true(strlen(key_table[i].help) > 5);
        if (key_table[i].word != NULL)
            assert_int_equal(key_table[i].key, key_table[i].word[0]);
    }
}

/* ---- own slab ---- */

static double ring_area(const struct own_outline *outline)
{
    double twice = 0;

    for (int i = 0; i < outline->count; i++) {
        int j = (i + 1) % outline->count;
        twice += outline->x[i] * outline->y[j] - outline->x[j] * outline->y[i];
    }
    return twice / 2;
}

/* Areas by plain arithmetic: whole less what is missing; positive = anticlockwise. */
static void test_shapes(void **state)
{
    static const struct {
        int shape, corner;
        double area;
    } cases[] = {{OWN_RECTANGLE, 0, 36 * 24},   {OWN_L, 0, 36 * 24 - 12 * 10},
                 {OWN_L, 1, 36 * 24 - 12 * 10}, {OWN_L, 2, 36 * 24 - 12 * 10},
                 {OWN_L, 3, 36 * 24 - 12 * 10}, {OWN_U, 0, 36 * 24 - 12 * 10},
                 {OWN_T, 0, 36 * 10 + 12 * 14}, {OWN_STRIP, 0, 36 * 24},
                 {OWN_HOLE, 0, 36 * 24},        {OWN_TAPER, 0, 36 * (24 + 12) / 2}};

    (void)state;
    for (size_t i = 0; i < sizeof cases / sizeof *cases; i++) {
        struct own own = {.shape = cases[i].shape, .corner = cases[i].corner};
        struct own_outline outline;
        struct text trouble = {0};
        strcpy(own.size[0], "36");
        strcpy(own.size[1], "24 m");
        strcpy(own.size[2], "12,0");
        strcpy(own.size[3], "1000 cm");
        assert_true(own_make_outline(&own, &outline, &trouble));
        assert_true(fabs(ring_area(&outline) - cases[i].area) < 1e-9);
        text_free(&trouble);
    }
}

static void test_sides(void **state)
{
    struct own_outline outline;
    struct text trouble = {0};

    (void)state;
    assert_true(own_read_sides("36 east, 12 north, 12 west, 12 north, 24 west, close", "m",
                               &outline, &trouble));
    assert_int_equal(outline.count, 6);
    assert_true(fabs(ring_area(&outline) - (36 * 12 + 24 * 12)) < 1e-9);
    assert_false(own_read_sides("36 east, 12 north, 12.4 west", "m", &outline, &trouble));
    assert_non_null(strstr(text_string(&trouble), "23.60 m east"));
    assert_false(own_read_sides("36 up", "m", &outline, &trouble));
    assert_false(own_read_sides("", "m", &outline, &trouble));
    text_free(&trouble);
}

/* ---- sessions ---- */

static void test_edit_and_undo(void **state)
{
    struct app *app = open_example(false);

    (void)state;
    assert_true(shows(app, "24 x thickness would be 4.8 m"));
    press(app, "18");
    assert_true(shows(app, "~JOINTS")); /* the standing answers are for the old value */
    press(app, "0~");
    assert_true(shows(app, "Thickness 200 mm to 180 mm"));
    assert_true(shows(app, "24 x thickness: 4.32 m")); /* 24 x 0.18 */
    press(app, "u");
    assert_true(shows(app, "24 x thickness would be 4.8 m"));
    press(app, "r");
    assert_true(shows(app, "24 x thickness: 4.32 m"));
    app_free(app);
}

static void test_refused_keeps_everything(void **state)
{
    struct app *app = open_example(false);
    struct text bytes = {0};

    (void)state;
    press(app, "2~");
    assert_true(shows(app, "2")); /* what was typed is still there to be mended */
    assert_true(shows(app, "too small"));
    assert_true(shows(app, "HOLDS"));
    press(app, "00~"); /* 2 -> 200 */
    app_write(app, &bytes);
    assert_non_null(strstr(text_string(&bytes), "thickness = 200"));
    press(app, "9^"); /* Esc gives the old value back */
    assert_true(shows(app, "200 mm"));
    text_free(&bytes);
    app_free(app);
}

/* A value good in itself that makes the job impossible: kept, marked, mended. */
static void test_impossible_job(void **state)
{
    struct app *app = open_example(false);
    struct text bytes = {0};

    (void)state;
    app_goto_field(app, "climate.slab-coldest");
    press(app, "45 to 40~");
    app_write(app, &bytes);
    assert_non_null(strstr(text_string(&bytes), "slab-coldest = 45"));
    assert_true(app->stale);
    press(app, "(");
    assert_true(shows(app, "~HOLDS"));
    assert_true(shows(app, "swap the two"));
    press(app, "u");
    assert_false(app->stale);
    assert_true(shows(app, "-8 to 40"));
    text_free(&bytes);
    app_free(app);
}

static void test_arrows_change_nothing(void **state)
{
    struct app *app = open_example(false);
    struct text before = {0}, after = {0};

    (void)state;
    app_write(app, &before);
    press(app, "><)><)><)(((((<>");
    app_write(app, &after);
    assert_string_equal(text_string(&before), text_string(&after));
    press(app, "j))))(((((((((((");
    press(app, ")))~>>~"); /* opened: right steps; 180 is not reached without Enter */
    text_free(&before);
    text_free(&after);
    app_free(app);
}

static void test_choice(void **state)
{
    struct app *app = open_example(false);
    struct text bytes = {0};

    (void)state;
    press(app, ")~>~"); /* base: granular to stabilised */
    app_write(app, &bytes);
    assert_non_null(strstr(text_string(&bytes), "kind = stabilised"));
    text_free(&bytes);
    app_free(app);
}

/* F1: nothing of the example can come into a real job. */
static void test_example_never_leaks(void **state)
{
    struct app *app = open_example(true);
    struct text bytes = {0};

    (void)state;
    for (int page = 0; page < 7; page++) {
        app_key(app, (uint32_t) "jpcsbwm"[page]);
        assert_true(shows(app, "EXAMPLE"));
    }
    press(app, "j150~");
    assert_true(shows(app, "This is the example."));
    press(app, "~"); /* yes: my own slab, the 150 goes with it */
    assert_true(shows(app, "My own slab"));
    press(app, "~~~20~10~");
    press(app, "~");
    app_write(app, &bytes);
    assert_string_equal(text_string(&bytes), "format = 1\n[job]\npractice = plain\n[slab]\nuse = "
                                             "yard\nthickness = 150 mm\n[outline]\npoint = 0, 0 m\n"
                                             "point = 20, 0 m\npoint = 20, 10 m\npoint = 0, 10 "
                                             "m\n");
    text_free(&bytes);
    app_free(app);
}

/* In US units a bare number is inches, feet, degF: never silently metric. */
static void test_bare_numbers_us(void **state)
{
    struct app *app = app_make(test_day);
    struct text bytes = {0};
    static const char job[] = "format = 1\n[job]\npractice = us\nunits = us\n[slab]\nthickness = "
                              "6 in\n[outline]\npoint = 0, 0 ft\npoint = 60, 0 ft\npoint = 60, 30 "
                              "ft\npoint = 0, 30 ft\n";

    (void)state;
    app_load(app, job, sizeof job - 1, "floor.slab", false);
    press(app, "8~");
    assert_true(shows(app, "8 in"));
    app_write(app, &bytes);
    assert_non_null(strstr(text_string(&bytes), "thickness = 8 in"));
    press(app, "p30 15~a~~"); /* a column 30 ft east, 15 ft north */
    text_clear(&bytes);
    app_write(app, &bytes);
    assert_non_null(strstr(text_string(&bytes), "at = 9.144, 4.572 m"));
    text_free(&bytes);
    app_free(app);
}

/* Go or not, from one typed line. */
static void test_measured(void **state)
{
    struct app *app = open_example(false);

    (void)state;
    press(app, "sg15 10 12 70 rising dry clean~");
    assert_true(shows(app, "YES, NOW. It will stretch 13.8 %"));
    press(app, "g");
    for (int i = 0; i < 40; i++)
        press(app, "\b");
    press(app, "15 5.1 12 70 rising~");
    assert_true(shows(app, "NOT THIS JOINT: this joint is 5.1 mm"));
    press(app, "g nonsense~");
    assert_true(shows(app, "the words are rising, steady"));
    app_free(app);
}

/* Keep a line, move it, let it go; draw a cut where the solver had none; forbid one. */
static void test_hand_on_lines(void **state)
{
    struct app *app = open_example(false);
    struct text bytes = {0};

    (void)state;
    press(app, "p8 6~"); /* on line 2 of the yard, 8 m from the west */
    assert_true(shows(app, "cut 2, 24.0 m; tape from the west 8.000 m"));
    press(app, "k");
    app_write(app, &bytes);
    assert_non_null(strstr(text_string(&bytes),
                           "[joint]\nkind = contraction\nfrom = 8, 0 m\nto = 8, "
                           "24 m\nkeep = yes\n"));
    press(app, "v0.5~");
    text_clear(&bytes);
    app_write(app, &bytes);
    assert_non_null(strstr(text_string(&bytes), "from = 8.5, 0 m\nto = 8.5, 24 m"));
    press(app, "8.5 6~k"); /* lets it go: all joints are the program's again */
    text_clear(&bytes);
    app_write(app, &bytes);
    assert_null(strstr(text_string(&bytes), "[joint]"));
    assert_true(shows(app, "45 panels"));
    press(app, "6 6~a");
    for (int i = 0; i < 9; i++)
        press(app, ">");
    press(app, "~"); /* a cut from south to north through 6 m */
    assert_true(shows(app, "6.000 m at both ends"));
    press(app, "50 50~a~"); /* off the slab: said, nothing changed */
    assert_true(shows(app, "not on the slab"));
    text_free(&bytes);
    app_free(app);
}

/* A file that is not there yet: the questions begin it and saving goes there at once. */
static void test_new_file(void **state)
{
    struct app *app = open_example(true);
    struct request request;

    (void)state;
    app_start_new(app, "fresh.slab");
    assert_true(shows(app, "not there yet"));
    press(app, "~~~20~12~180~");
    assert_true(shows(app, "180 mm"));
    press(app, "m~");
    assert_true(app_take_request(app, &request));
    assert_int_equal(request.kind, REQUEST_SAVE);
    assert_string_equal(request.path, "fresh.slab");
    app_free(app);
}

/* A user's whole path: L-shaped slab, thickness, column on the plan, why, save. */
static void test_new_user(void **state)
{
    struct app *app = open_example(true);
    struct request request;
    struct text bytes = {0};

    (void)state;
    press(app, "n~~>~36~24~12~12~~200 mm~");
    assert_false(app->example);
    assert_true(shows(app, "L 36 x 24 m"));
    assert_true(shows(app, "24 x thickness"));
    press(app, "150~p");
    press(app, "12 9~a~~");
    assert_true(shows(app, "column C1"));
    app_write(app, &bytes);
    assert_non_null(strstr(text_string(&bytes), "[object C1]\nkind = column\nat = 12, 9 m\n"));
    press(app, "w");
    assert_true(shows(app, "WHY"));
    press(app, "m~mine~");
    assert_true(app_take_request(app, &request));
    assert_int_equal(request.kind, REQUEST_SAVE);
    assert_string_equal(request.path, "mine.slab");
    app_saved(app, request.path, "17:42");
    assert_false(edit_unsaved(app));
    press(app, "jpd"); /* the cross stands on the column */
    assert_true(shows(app, "taken away"));
    text_free(&bytes);
    app_free(app);
}

static void test_leave_asks(void **state)
{
    struct app *app = open_example(false);
    struct request request;

    (void)state;
    press(app, "190~m(((((((((())))))))))))~");
    assert_true(shows(app, "Not saved"));
    press(app, "^");
    assert_false(app_take_request(app, &request));
    press(app, "~)~");
    assert_true(app_take_request(app, &request));
    assert_int_equal(request.kind, REQUEST_LEAVE);
    app_free(app);
}

/* Every field of the table is on the page of the rest, once. */
static void test_every_field_reachable(void **state)
{
    struct app *app = open_example(false);
    int seen[FIELD_COUNT] = {0};

    (void)state;
    for (int i = 0; i < page_rest.count(app); i++) {
        struct entry entry;
        assert_true(page_rest.row(app, i, &entry));
        if (entry.kind == ROW_FIELD)
            seen[entry.id]++;
    }
    for (int id = 0; id < FIELD_COUNT; id++)
        assert_int_equal(seen[id], 1);
    app_free(app);
}

static void test_decimal_comma(void **state)
{
    struct app *app = open_example(false);
    struct text bytes = {0};

    (void)state;
    app_goto_field(app, "rules.aspect");
    press(app, "1,4~");
    app_write(app, &bytes);
    assert_non_null(strstr(text_string(&bytes), "aspect = 1.4"));
    text_free(&bytes);
    app_free(app);
}

/* ---- golden screens ---- */

static void check_golden(const struct app *app, const char *name, int columns, int rows, bool ascii)
{
    char path[128];
    struct text now = screen(app, columns, rows, ascii);
    size_t count;
    char *kept;

    snprintf(path, sizeof path, "tests/golden/%s-%dx%d%s.txt", name, columns, rows,
             ascii ? "-ascii" : "");
    if (getenv("SLABGAP_REWRITE_GOLDEN") != NULL) {
        FILE *file = fopen(path, "wb");
        assert_non_null(file);
        fputs(text_string(&now), file);
        fclose(file);
    }
    kept = read_whole(path, &count);
    if (strcmp(kept, text_string(&now)) != 0)
        fprintf(stderr, "%s differs; now:\n%s", path, text_string(&now));
    assert_string_equal(kept, text_string(&now));
    free(kept);
    text_free(&now);
}

static void test_golden(void **state)
{
    static const struct {
        const char *name, *keys;
    } pages[] = {{"job", "j"}, {"plan", "p"}, {"cut", "c"},  {"seal", "s"},
                 {"buy", "b"}, {"why", "jw"}, {"more", "m"}, {"own", "n~~>~36~24~12~12~~200 mm"}};

    (void)state;
    for (size_t i = 0; i < sizeof pages / sizeof *pages; i++)
        for (int size = 0; size < 4; size++) {
            struct app *app = open_example(true);
            bool roomy = size / 2 == 1;
            app_resize(app, roomy ? 120 : 80, roomy ? 40 : 24);
            press(app, pages[i].keys);
            check_golden(app, pages[i].name, app->columns, app->rows, size % 2 == 1);
            app_free(app);
        }
}

/* No screen in ASCII holds anything else. */
static void test_ascii_is_ascii(void **state)
{
    struct app *app = open_example(true);

    (void)state;
    for (int page = 0; page < PAGE_COUNT; page++) {
        struct text out;
        app_go(app, (enum page_id)page);
        out = screen(app, 80, 24, true);
        for (size_t i = 0; i < out.length; i++)
            assert_true((unsigned char)out.bytes[i] < 0x80);
        text_free(&out);
    }
    app_free(app);
}

/* ---- random keys ---- */

/* xorshift64*, Vigna (2016) */
static uint64_t next(uint64_t *seed)
{
    *seed ^= *seed >> 12;
    *seed ^= *seed << 25;
    *seed ^= *seed >> 27;
    return *seed * 2685821657736338717u;
}

static void random_session(uint64_t seed)
{
    static const char *const letters = "jpcsbwmufnroh0123456789.,-adzx xy/'\"";
    struct app *app = open_example(seed % 2 == 0);

    for (int i = 0; i < 250; i++) {
        uint64_t die = next(&seed) % 100;
        struct request request;
        if (die < 50)
            app_key(app, PRESS_UP + (uint32_t)(next(&seed) % 14));
        else if (die < 95)
            app_key(app, (uint32_t)letters[next(&seed) % strlen(letters)]);
        else
            app_key(app, (uint32_t)(next(&seed) % 0x3000));
        app_take_request(app, &request);
        if (die % 20 == 0)
            app_resize(app, 1 + (int)(next(&seed) % 150), 1 + (int)(next(&seed) % 50));
        if (die % 4 == 0) {
            struct canvas canvas = {0};
            assert_true(canvas_make(&canvas, app->columns, app->rows, die % 8 == 0));
            app_draw(app, &canvas);
            assert_true(canvas.cursor_row < canvas.rows);
            canvas_free(&canvas);
        }
    }
    app_free(app);
}

static void test_random_keys(void **state)
{
    (void)state;
    for (uint64_t seed = 1; seed <= 60; seed++)
        random_session(seed);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(test_canvas_clips),
        cmocka_unit_test(test_canvas_wide_and_ascii),
        cmocka_unit_test(test_canvas_wraps),
        cmocka_unit_test(test_editor),
        cmocka_unit_test(test_keys),
        cmocka_unit_test(test_shapes),
        cmocka_unit_test(test_sides),
        cmocka_unit_test(test_edit_and_undo),
        cmocka_unit_test(test_refused_keeps_everything),
        cmocka_unit_test(test_impossible_job),
        cmocka_unit_test(test_arrows_change_nothing),
        cmocka_unit_test(test_choice),
        cmocka_unit_test(test_example_never_leaks),
        cmocka_unit_test(test_bare_numbers_us),
        cmocka_unit_test(test_measured),
        cmocka_unit_test(test_hand_on_lines),
        cmocka_unit_test(test_new_file),
        cmocka_unit_test(test_new_user),
        cmocka_unit_test(test_leave_asks),
        cmocka_unit_test(test_every_field_reachable),
        cmocka_unit_test(test_decimal_comma),
        cmocka_unit_test(test_golden),
        cmocka_unit_test(test_ascii_is_ascii),
        cmocka_unit_test(test_random_keys),
    };

    return cmocka_run_group_tests(tests, NULL, NULL);
}
