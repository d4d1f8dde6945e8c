/* Runs tests/scenarios: example jobs with the numbers an engineer gets by hand, read from the JSON
 * result, so that the printed contract is what is tested. Run from the root of the project. */
#include <setjmp.h>
#include <stdarg.h>
#include <stddef.h>
#include <stdint.h>

#include <cmocka.h>

#include <jansson.h>
#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

#include "export/json.h"
#include "job/document.h"

struct scenario {
    const char *file;
    int line;
    struct document *document;
    json_t *result; /* of the job as it stands now */
    int exit;
    int expectations;
};

static struct text read_all(const char *path)
{
    struct text text = {0};
    char bytes[4096];
    size_t count;
    FILE *file = fopen(path, "rb");

    assert_non_null(file);
    while ((count = fread(bytes, 1, sizeof bytes, file)) > 0)
        text_add_bytes(&text, bytes, count);
    fclose(file);
    return text;
}

static void recompute(struct scenario *s)
{
    struct finding_list findings = {0};
    struct job job;
    struct plan plan;
    struct text text = {0};

    json_decref(s->result);
    job_init(&job);
    document_job(s->document, &job, &findings);
    assert_int_equal(plan_make(&job, NULL, NULL, &plan), STATUS_OK);
    s->exit = plan_exit_status(&plan);
    json_report(&text, &plan, NULL);
    s->result = json_loads(text_string(&text), 0, NULL);
    assert_non_null(s->result);
    text_free(&text);
    plan_free(&plan);
    job_free(&job);
    finding_free(&findings);
}

static void open_job(struct scenario *s, const char *path)
{
    struct finding_list findings = {0};
    struct text text = read_all(path);

    document_free(s->document);
    assert_int_equal(document_parse(text_string(&text), text.length, &s->document, &findings),
                     STATUS_OK);
    text_free(&text);
    finding_free(&findings);
    recompute(s);
}

static void set_value(struct scenario *s, char *pair)
{
    struct finding_list findings = {0};
    char *value = strchr(pair, '=');
    size_t length;

    assert_non_null(value);
    *value++ = '\0';
    length = strlen(value);
    if (length > 1 && value[0] == '\'' && value[length - 1] == '\'') {
        value[length - 1] = '\0';
        value++;
    }
    assert_int_equal(document_set(s->document, pair, value, &findings), STATUS_OK);
    finding_free(&findings);
    recompute(s);
}

/* The member of a list whose `key` has this value, as text or number. */
static json_t *member_with(json_t *list, const char *key, const char *value)
{
    size_t i;
    json_t *item;

    json_array_foreach(list, i, item)
    {
        json_t *member = json_object_get(item, key);
        if (json_is_string(member) && strcmp(json_string_value(member), value) == 0)
            return item;
        if (json_is_number(member) && fabs(json_number_value(member) - atof(value)) < 1e-9)
            return item;
    }
    return NULL;
}

/* "working.n=3.extension", "layout.panels.0.aspect"; a value may hold dots up to the last one. */
static json_t *find(struct scenario *s, const char *path)
{
    char copy[256];
    json_t *at = s->result;
    char *part = copy;

    snprintf(copy, sizeof copy, "%s", path);
    while (at != NULL && part != NULL) {
        char *equal = strchr(part, '='), *dot = strchr(part, '.');
        if (equal != NULL && (dot == NULL || equal < dot)) {
            dot = strrchr(equal, '.');
            *equal = '\0';
        }
        if (dot != NULL)
            *dot = '\0';
        if (json_is_array(at) && equal != NULL && *equal == '\0')
            at = member_with(at, part, equal + 1);
        else if (json_is_array(at))
            at = json_array_get(at, (size_t)atoi(part));
        else
            at = json_object_get(at, part);
        part = dot != NULL ? dot + 1 : NULL;
    }
    if (at == NULL)
        fail_msg("%s:%d: no %s", s->file, s->line, path);
    return at;
}

static void expect_number(struct scenario *s, const char *path, double want, double tolerance)
{
    json_t *at = find(s, path);

    if (!json_is_number(at) || !(fabs(json_number_value(at) - want) <= tolerance + 1e-12))
        fail_msg("%s:%d: %s is %.9g, by hand %.9g within %g", s->file, s->line, path,
                 json_number_value(at), want, tolerance);
}

static void expect_finding(struct scenario *s, const char *field, const char *severity)
{
    json_t *findings = json_object_get(s->result, "findings"), *item;
    size_t i;

    json_array_foreach(
        findings, i,
        item) if (strcmp(json_string_value(json_object_get(item, "field")), field) == 0 &&
                  strcmp(json_string_value(json_object_get(item, "severity")), severity) ==
                      0) return;
    fail_msg("%s:%d: no %s for %s", s->file, s->line, severity, field);
}

/* Splits off the last blank-parted word. */
static char *last_word(char *line)
{
    char *blank = strrchr(line, ' ');

    assert_non_null(blank);
    *blank = '\0';
    return blank + 1;
}

static void run_line(struct scenario *s, const char *verb, char *rest)
{
    s->expectations++;
    if (strcmp(verb, "job") == 0) {
        open_job(s, rest);
    } else if (strcmp(verb, "set") == 0) {
        set_value(s, rest);
    } else if (strcmp(verb, "exit") == 0) {
        if (s->exit != atoi(rest))
            fail_msg("%s:%d: exit status %d", s->file, s->line, s->exit);
    } else if (strcmp(verb, "expect") == 0) {
        double tolerance = atof(last_word(rest)), want = atof(last_word(rest));
        expect_number(s, rest, want, tolerance);
    } else if (strcmp(verb, "word") == 0) {
        const char *want = last_word(rest);
        assert_string_equal(json_string_value(find(s, rest)), want);
    } else if (strcmp(verb, "null") == 0) {
        assert_true(json_is_null(find(s, rest)));
    } else if (strcmp(verb, "count") == 0) {
        int want = atoi(last_word(rest));
        if ((int)json_array_size(find(s, rest)) != want)
            fail_msg("%s:%d: %zu %s", s->file, s->line, json_array_size(find(s, rest)), rest);
    } else if (strcmp(verb, "atmost") == 0) {
        int want = atoi(last_word(rest));
        assert_in_range(json_array_size(find(s, rest)), 1, want);
    } else if (strcmp(verb, "finding") == 0) {
        const char *severity = last_word(rest);
        expect_finding(s, rest, severity);
    } else {
        fail_msg("%s:%d: no such word: %s", s->file, s->line, verb);
    }
}

static void run_file(const char *path)
{
    struct scenario s = {.file = path};
    struct text text = read_all(path);
    char *whole = strdup(text_string(&text));

    assert_non_null(whole);
    for (char *line = whole, *end; line != NULL; line = end) {
        char *rest;
        end = strchr(line, '\n');
        if (end != NULL)
            *end++ = '\0';
        s.line++;
        if (line[0] == '#' || line[0] == '\0')
            continue;
        rest = strchr(line, ' ');
        assert_non_null(rest);
        *rest++ = '\0';
        run_line(&s, line, rest);
    }
    assert_true(s.expectations > 5);
    json_decref(s.result);
    document_free(s.document);
    free(whole);
    text_free(&text);
}

#define SCENARIO(n)                                                                                \
    static void test_e##n(void **state)                                                            \
    {                                                                                              \
        (void)state;                                                                               \
        run_file("tests/scenarios/e" #n ".txt");                                                   \
    }
SCENARIO(1)
SCENARIO(2)
SCENARIO(3)
SCENARIO(4)
SCENARIO(5)

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(test_e1), cmocka_unit_test(test_e2), cmocka_unit_test(test_e3),
        cmocka_unit_test(test_e4), cmocka_unit_test(test_e5),
    };

    return cmocka_run_group_tests(tests, NULL, NULL);
}
