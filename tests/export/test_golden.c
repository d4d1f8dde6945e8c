/* Reports and drawings of the example jobs, letter for letter (tests/golden). Read a change before
 * it is committed: SLABGAP_REWRITE_GOLDEN=1 writes them anew. Run from the root of the project. */
#include "export/export_help.h"

#include "export/drawing.h"
#include "export/report.h"

enum { EXAMPLES = 5 }; /* the first samples */

static void compare(const char *kind, const char *name, const struct text *made)
{
    static char kept[1 << 20];
    char path[128];
    FILE *file;

    snprintf(path, sizeof path, "tests/golden/%s-%s.txt", kind, name);
    if (getenv("SLABGAP_REWRITE_GOLDEN") != NULL) {
        file = fopen(path, "wb");
        assert_non_null(file);
        assert_int_equal(fwrite(text_string(made), 1, made->length, file), made->length);
        fclose(file);
        return;
    }
    file = fopen(path, "rb");
    assert_non_null(file);
    kept[fread(kept, 1, sizeof kept - 1, file)] = '\0';
    fclose(file);
    assert_string_equal(kept, text_string(made));
}

static void test_examples(void **state)
{
    (void)state;
    for (size_t i = 0; i < EXAMPLES; i++) {
        const struct drawing_options options = {
            .columns = 78, .rows = 36, .names = true, .tape = true, .legend = true};
        struct text report = {0}, drawn = {0};
        struct drawing drawing;
        struct plan plan;
        sample_plan(&samples[i], -1, &plan);
        assert_true(report_text(&report, &plan, NULL));
        assert_int_equal(drawing_make(&plan, &options, &drawing), STATUS_OK);
        drawing_print(&drawn, &drawing);
        compare("report", samples[i].name, &report);
        compare("draw", samples[i].name, &drawn);
        drawing_free(&drawing);
        text_free(&report);
        text_free(&drawn);
        plan_free(&plan);
    }
}

int main(void)
{
    const struct CMUnitTest tests[] = {cmocka_unit_test(test_examples)};

    return cmocka_run_group_tests(tests, NULL, NULL);
}
