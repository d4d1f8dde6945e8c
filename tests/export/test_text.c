/* The report and the drawing as text: width, order, and that nothing leaves its page. What is
 * expected is docs/format.md: "report FILE: plain text, at most 78 columns, no colour, in this
 * order", "draw --size in characters". */
#include "export_help.h"
#include "export/drawing.h"
#include "export/report.h"
#include "export/wrap.h"
#include "plan/result.h"
#include "plan/why.h"

/* Names and titles as long as they may be, a title that is one word. */
#define LONG_NAME "Abcdefghijklmnopqrstuvwxyz012345"
static const struct sample odd[] = {
    {"long names", F RECTANGLE
     "[job]\ntitle = Store floor of the long hall behind the second gate, northern half, placed "
     "in spring after the walls stand, sealed before the racks\n[object " LONG_NAME "]\nkind = "
     "column\nat = 3.5, 4 m\nsize = 0.4 x 0.4 m\n[edge 1]\nagainst = wall\n"},
    {"one long word", F RECTANGLE
     "[job]\ntitle = "
     "ThisTitleIsOneWordOfMoreThanAHundredLettersAndHasNoBlankAnywhereSoThatNothingCan"
     "BeWrappedAtABlankAnywhereInIt\n[object " LONG_NAME "]\nkind = column\nat = 3.5, 4 m\nsize = "
     "0.4 x 0.4 m\n[edge 1]\nagainst = wall\n"},
    {"wide letters", F RECTANGLE
     "[job]\ntitle = \xe5\x80\x89\xe5\xba\xab\xe3\x81\xae\xe5\xba\x8a \xe5\x8c\x97\xe5\x81\xb4\n"
     "[object \xd0\x9a\xd0\xbe\xd0\xbb\xd0\xbe\xd0\xbd\xd0\xbd\xd0\xb0]\nkind = column\nat = 3.5, "
     "4 "
     "m\nsize = 0.4 x 0.4 m\n"},
    {"bars",
     F RECTANGLE "[slab]\ndowels = 1 1/4 in x 18 in at 12 in\nties = 5/8 in x 30 in at 36 in\n"
                 "reinforced = yes\n[place]\nlatitude = 52.123456 deg\n"},
};

/* Every line of at most `most` columns; no tab, no escape, no blank at its end. */
static void expect_page(const char *name, const char *text, int most)
{
    char line[2048];

    for (const char *at = text, *end; *at != '\0'; at = end + 1) {
        end = strchr(at, '\n');
        assert_non_null(end); /* the last line is ended too */
        assert_true((size_t)(end - at) < sizeof line);
        memcpy(line, at, (size_t)(end - at));
        line[end - at] = '\0';
        if (utf8_columns(line) > most)
            fail_msg("%s: %d columns: %s", name, utf8_columns(line), line);
        for (const char *c = line; *c != '\0'; c++)
            if ((unsigned char)*c < 0x20 || *c == 0x7f)
                fail_msg("%s: a control character in: %s", name, line);
    }
}

static void check_report(const struct sample *sample, int units)
{
    struct plan plan;
    struct text text = {0};

    sample_plan(sample, units, &plan);
    assert_true(report_text(&text, &plan, NULL));
    assert_false(text.failed);
    expect_page(sample->name, text_string(&text), REPORT_COLUMNS);
    text_clear(&text);
    report_checks(&text, &plan);
    expect_page(sample->name, text_string(&text), REPORT_COLUMNS);
    text_free(&text);
    plan_free(&plan);
}

static void test_report_width(void **state)
{
    (void)state;
    for (int units = 0; units < 2; units++) {
        for (size_t i = 0; i < COUNT(samples); i++)
            check_report(&samples[i], units);
        for (size_t i = 0; i < COUNT(odd); i++)
            check_report(&odd[i], units);
    }
}

/* The derivation of every result, too. */
static void test_why_width(void **state)
{
    (void)state;
    for (size_t i = 0; i < COUNT(samples); i++)
        for (int units = 0; units < 2; units++) {
            struct plan plan;
            sample_plan(&samples[i], units, &plan);
            for (size_t r = 0; r < result_count; r++) {
                struct why why;
                struct text text = {0};
                if (why_make(&plan, result_table[r].path, &why) != STATUS_OK)
                    fail_msg("%s: no derivation of %s", samples[i].name, result_table[r].path);
                why_print(&text, &why);
                assert_true(text.length > 0);
                expect_page(result_table[r].path, text_string(&text), REPORT_COLUMNS);
                text_free(&text);
            }
            plan_free(&plan);
        }
}

/* ---- order ---- */

/* Parts in the order of the contract; those that a job has not are left out. */
static void expect_order(const struct sample *sample)
{
    static const char *const headings[] = {
        "\nJOINTS  ",     "\nASSUMED",       "\nSPACING\n", "\nTEMPERATURE AND MOVEMENT\n",
        "\nSEAL\n",       "\nSEALING TABLE", "\nISOLATION", "\nCHECKS",
        "\nQUANTITIES\n", "\nJOINTS\n",      "\nLAYOUT\n",  "\nCAUTIONS\n"};
    struct plan plan;
    struct text text = {0};
    const char *last;
    size_t found = 0;

    sample_plan(sample, -1, &plan);
    report_text(&text, &plan, NULL);
    last = text_string(&text);
    for (size_t i = 0; i < COUNT(headings); i++) {
        const char *at = strstr(text_string(&text), headings[i]);
        if (at == NULL)
            continue;
        found++;
        if (at < last)
            fail_msg("%s: '%s' is out of order", sample->name, headings[i] + 1);
        last = at;
    }
    assert_true(found >= (plan.has_outline ? 9 : 7));
    for (size_t i = 0; report_caution(i) != NULL; i++) /* every caution, whole */
        assert_non_null(strstr(text_string(&text), "\n  - "));
    text_free(&text);
    plan_free(&plan);
}

static void test_report_order(void **state)
{
    (void)state;
    for (size_t i = 0; i < COUNT(samples); i++)
        expect_order(&samples[i]);
}

/* --only takes a top-level key of the JSON and prints that part alone. */
static void test_report_only(void **state)
{
    (void)state;
    static const char *const keys[] = {"spacing",   "temperature", "seal",   "sealing_table",
                                       "isolation", "checks",      "joints", "quantities",
                                       "layout",    "movement",    "cut",    "shrinkage"};
    struct plan plan;
    struct text whole = {0};

    sample_plan(&samples[3], -1, &plan);
    report_text(&whole, &plan, NULL);
    for (size_t i = 0; i < COUNT(keys); i++) {
        struct text part = {0};
        assert_true(report_text(&part, &plan, keys[i]));
        assert_true(part.length > 20 && part.length < whole.length / 2);
        assert_non_null(strstr(text_string(&whole), text_string(&part)));
        text_free(&part);
    }
    assert_false(report_text(&whole, &plan, "colour"));
    text_free(&whole);
    plan_free(&plan);
}

/* ---- the drawing ---- */

static void expect_drawing(const char *name, const struct plan *plan,
                           const struct drawing_options *options)
{
    struct drawing drawing = {0};
    struct text text = {0};
    int rows = 0;

    assert_int_equal(drawing_make(plan, options, &drawing), STATUS_OK);
    assert_true(drawing.columns <= options->columns && drawing.rows <= options->rows);
    drawing_print(&text, &drawing);
    expect_page(name, text_string(&text), options->columns);
    for (const char *c = text_string(&text); *c != '\0'; c++) {
        rows += *c == '\n';
        if (options->ascii)
            assert_true(*c == '\n' || (*c >= ' ' && *c <= '~'));
    }
    assert_in_range(rows, 1, options->rows);
    text_free(&text);
    drawing_free(&drawing);
    drawing_free(&drawing);
}

static void test_drawing_sizes(void **state)
{
    (void)state;
    for (size_t i = 0; i < COUNT(samples); i++) {
        struct plan plan;
        sample_plan(&samples[i], -1, &plan);
        for (int columns = 20; columns <= 200 && plan.has_outline; columns += 9)
            for (int rows = 8; rows <= 60; rows += 4)
                for (int ascii = 0; ascii < 2; ascii++) {
                    struct drawing_options options = {.columns = columns,
                                                      .rows = rows,
                                                      .ascii = ascii,
                                                      .names = rows % 8 == 0,
                                                      .tape = columns % 2 == 0,
                                                      .legend = true};
                    expect_drawing(samples[i].name, &plan, &options);
                }
        plan_free(&plan);
    }
}

/* A part of the slab, near and far, on it and beside it. */
static void test_drawing_zoom(void **state)
{
    (void)state;
    for (size_t i = 0; i < COUNT(samples); i++) {
        struct plan plan;
        sample_plan(&samples[i], -1, &plan);
        for (double zoom = 0.25; zoom < 100 && plan.has_outline; zoom *= 4) {
            struct drawing_options options = {.columns = 80,
                                              .rows = 24,
                                              .names = true,
                                              .tape = true,
                                              .legend = true,
                                              .zoom = zoom,
                                              .centre_x = 5,
                                              .centre_y = 3};
            expect_drawing(samples[i].name, &plan, &options);
            options.centre_x = -1000;
            expect_drawing(samples[i].name, &plan, &options);
        }
        plan_free(&plan);
    }
}

/* E1 by hand: an L whose 45 panels are seen. Eight joints across stand between its left and right
 * edge in the lowest rows, five in the upper arm. */
static void test_drawing_shows_the_joints(void **state)
{
    (void)state;
    struct plan plan;
    struct drawing drawing = {0};
    struct drawing_options options = {.columns = 100, .rows = 40, .ascii = true};
    int lower = 0, upper = 0;

    sample_plan(&samples[0], -1, &plan);
    assert_int_equal(drawing_make(&plan, &options, &drawing), STATUS_OK);
    assert_true(drawing.joints_drawn);
    for (int c = 0; c < drawing.columns; c++) {
        int low = (int)((drawing.y1 - 2.0) * drawing.rows_per_m);
        int high = (int)((drawing.y1 - 22.0) * drawing.rows_per_m);
        lower += drawing.cells[low * drawing.columns + c].ink == INK_CUT;
        upper += drawing.cells[high * drawing.columns + c].ink == INK_CUT;
    }
    assert_int_equal(lower, 8);
    assert_int_equal(upper, 5);
    drawing_free(&drawing);
    plan_free(&plan);
}

/* ---- wrapping ---- */

static void expect_wrapped(const char *first, int indent, const char *words, int columns,
                           const char *expected)
{
    struct text text = {0};

    wrap_add(&text, first, indent, words, columns);
    assert_string_equal(text_string(&text), expected);
    text_free(&text);
}

static void test_wrap(void **state)
{
    (void)state;
    expect_wrapped("", 0, "one two three", 9, "one two\nthree\n");
    expect_wrapped("ab", 4, "one two three", 11, "ab  one two\n    three\n");
    expect_wrapped("abcdef", 4, "one", 20, "abcdef one\n");
    expect_wrapped("abcdef ", 4, "one", 20, "abcdef one\n");
    expect_wrapped("", 0, "abcdefghij kl", 4, "abcd\nefgh\nij\nkl\n");
    expect_wrapped("", 2, "abcdefghij", 6, "  abcd\n  efgh\n  ij\n");
    expect_wrapped("", 0, "\xc3\xa4\xc3\xb6\xc3\xbc x", 3, "\xc3\xa4\xc3\xb6\xc3\xbc\nx\n");
    expect_wrapped("", 0, "", 9, "\n");
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(test_report_width),
        cmocka_unit_test(test_why_width),
        cmocka_unit_test(test_report_order),
        cmocka_unit_test(test_report_only),
        cmocka_unit_test(test_drawing_sizes),
        cmocka_unit_test(test_drawing_zoom),
        cmocka_unit_test(test_drawing_shows_the_joints),
        cmocka_unit_test(test_wrap),
    };

    return cmocka_run_group_tests_name("report and drawing", tests, NULL, NULL);
}
