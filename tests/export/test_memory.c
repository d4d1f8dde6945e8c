/* Memory that runs out while an answer is written: the buffer or the status says so, or the text
 * is the same as ever. Run under a sanitizer, nothing may leak. */
#include "memory_fail.h"
#include "export_help.h"
#include "export/answers.h"
#include "export/csv.h"
#include "export/drawing.h"
#include "export/json.h"
#include "export/report.h"

enum { EVERY_ONE = 150, RUNS_MOST = 400 };

/* Ways to write a plan; each returns false when it says that it could not. */
static bool write_part(struct text *out, const struct plan *plan, const char *part)
{
    report_text(out, plan, part);
    return !out->failed;
}

#define PART(name)                                                                                 \
    static bool write_##name(struct text *out, const struct plan *plan)                            \
    {                                                                                              \
        return write_part(out, plan, #name);                                                       \
    }
PART(job)
PART(findings)
PART(spacing)
PART(temperature)
PART(seal)
PART(sealing_table)
PART(isolation)
PART(checks)
PART(quantities)
PART(joints)
PART(layout)
PART(cautions)

static bool write_json(struct text *out, const struct plan *plan)
{
    json_report(out, plan, NULL);
    return !out->failed;
}

static bool write_rings(struct text *out, const struct plan *plan)
{
    json_report(out, plan, "layout");
    return !out->failed;
}

static bool write_csv(struct text *out, const struct plan *plan)
{
    csv_report(out, plan, "joints");
    return !out->failed;
}

static bool write_fields(struct text *out, const struct plan *plan)
{
    (void)plan;
    json_fields(out);
    return !out->failed;
}

static bool write_drawing(struct text *out, const struct plan *plan)
{
    static const struct drawing_options options = {
        .columns = 100, .rows = 40, .names = true, .tape = true, .legend = true};
    struct drawing drawing = {0};
    enum status status = drawing_make(plan, &options, &drawing);

    if (status != STATUS_OK) {
        assert_int_equal(status, STATUS_NO_MEMORY);
        assert_null(drawing.cells);
        return false;
    }
    drawing_print(out, &drawing);
    drawing_free(&drawing);
    return !out->failed;
}

static const struct {
    const char *name;
    bool (*write)(struct text *out, const struct plan *plan);
} writers[] = {
    {"job", write_job},
    {"findings", write_findings},
    {"spacing", write_spacing},
    {"temperature", write_temperature},
    {"seal", write_seal},
    {"sealing table", write_sealing_table},
    {"isolation", write_isolation},
    {"checks", write_checks},
    {"quantities", write_quantities},
    {"joints", write_joints},
    {"layout", write_layout},
    {"cautions", write_cautions},
    {"JSON", write_json},
    {"JSON of the layout", write_rings},
    {"CSV", write_csv},
    {"fields", write_fields},
    {"drawing", write_drawing},
};

/* Fails the n-th request; false when that was past the last one. */
static bool check_one(size_t w, const struct plan *plan, const struct text *expected, long n)
{
    for (int all = 0; all < 2; all++) {
        struct text text = {0};
        bool good;
        memory_arm(n, all);
        good = writers[w].write(&text, plan);
        memory_disarm();
        if (good && strcmp(text_string(&text), text_string(expected)) != 0)
            fail_msg("%s: request %ld fails and the text is another", writers[w].name, n);
        assert_true(good || memory.failures > 0);
        text_free(&text);
    }
    return memory.failures > 0;
}

static void check_sample(const struct sample *sample)
{
    struct plan plan;

    sample_plan(sample, -1, &plan);
    for (size_t w = 0; w < COUNT(writers); w++) {
        struct text expected = {0};
        long step, n = 1;
        if (!plan.has_outline && writers[w].write == write_drawing)
            continue;
        memory_arm(0, false);
        assert_true(writers[w].write(&expected, &plan));
        memory_disarm();
        step = memory.calls > RUNS_MOST ? memory.calls / (RUNS_MOST - EVERY_ONE) : 1;
        while (check_one(w, &plan, &expected, n))
            n += n < EVERY_ONE ? 1 : step;
        assert_true(n > 1 || expected.length == 0);
        text_free(&expected);
    }
    plan_free(&plan);
}

static void test_every_writer(void **state)
{
    (void)state;
    for (size_t i = 0; i < COUNT(samples); i++)
        if (strcmp(samples[i].name, "e3-two-lane-road") != 0) /* long, and nothing new in it */
            check_sample(&samples[i]);
}

/* The sentences have room of their own: a number that found none says so, and none is cut off. */
static void test_answers(void **state)
{
    (void)state;
    struct plan plan;
    struct answers expected;
    size_t told = 0;

    sample_plan(&samples[0], -1, &plan);
    answers_make(&plan, &expected);
    for (long n = 1; n < 200; n++) {
        struct answers answers;
        memory_arm(n, true);
        answers_make(&plan, &answers);
        memory_disarm();
        assert_int_equal(answers.count, expected.count);
        for (size_t i = 0; i < answers.count; i++) {
            const char *sentence = answers.rows[i].sentence;
            told += strstr(sentence, "(no memory)") != NULL;
            assert_int_equal(sentence[strlen(sentence) - 1], '.');
            if (memory.failures == 0)
                assert_string_equal(sentence, expected.rows[i].sentence);
        }
    }
    assert_true(told > 0);
    plan_free(&plan);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(test_every_writer),
        cmocka_unit_test(test_answers),
    };

    return cmocka_run_group_tests_name("memory of the writers", tests, NULL, NULL);
}
