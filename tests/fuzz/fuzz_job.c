/* libFuzzer target of the job file: parse, read, settle, check, change, write. The input is a file;
 * what follows a line "%%" is pairs of lines, a path and a value, that are set one by one.
 *   clang -fsanitize=fuzzer,address,undefined ... tests/fuzz/fuzz_job.c */
#include "job/document.h"
#include "job/field.h"
#include <stdint.h>
#include <stdlib.h>
#include <string.h>

int LLVMFuzzerTestOneInput(const uint8_t *data, size_t size);

static void stop_unless(int good)
{
    if (!good)
        abort();
}

/* The document is byte for byte the same when written and parsed again. */
static void check_round_trip(const struct document *document)
{
    struct text one = {0}, two = {0};
    struct document *again;
    struct finding_list findings = {0};

    document_write(document, &one);
    document_parse(text_string(&one), one.length, &again, &findings);
    document_write(again, &two);
    stop_unless(one.length == two.length &&
                memcmp(text_string(&one), text_string(&two), one.length) == 0);
    text_free(&one);
    text_free(&two);
    document_free(again);
    finding_free(&findings);
}

static void read_all(const struct document *document)
{
    struct job job, copy;
    struct finding_list findings = {0};
    struct text out = {0};

    job_init(&job);
    document_job(document, &job, &findings);
    job_settle(&job, &findings);
    job_check(&job, &findings);
    stop_unless(job_copy(&copy, &job) == STATUS_OK);
    for (int id = 0; id < FIELD_COUNT; id++) {
        field_show(&out, &copy, (enum field_id)id, UNITS_US);
        field_write(&out, &copy, (enum field_id)id, UNITS_METRIC);
    }
    for (size_t i = 0; i < findings.count; i++)
        stop_unless(findings.items[i].line >= 0 && findings.items[i].column >= 0 &&
                    findings.items[i].message[0] != '\0');
    text_free(&out);
    job_free(&job);
    job_free(&copy);
    finding_free(&findings);
}

/* One line off the front; NULL at the end. */
static char *take_line(char **rest)
{
    char *line = *rest, *end;

    if (line == NULL)
        return NULL;
    end = strchr(line, '\n');
    *rest = end != NULL ? end + 1 : NULL;
    if (end != NULL)
        *end = '\0';
    return line;
}

static void change(struct document *document, char *rest)
{
    char *path, *value;

    while ((path = take_line(&rest)) != NULL && (value = take_line(&rest)) != NULL) {
        struct finding_list findings = {0};
        struct text before = {0}, after = {0};
        enum status status;

        document_write(document, &before);
        status = document_set(document, path, value, &findings);
        document_write(document, &after);
        stop_unless(status == STATUS_OK ||
                    (finding_has_error(&findings) && before.length == after.length &&
                     memcmp(text_string(&before), text_string(&after), before.length) == 0));
        document_get(document, path);
        text_free(&before);
        text_free(&after);
        finding_free(&findings);
    }
}

int LLVMFuzzerTestOneInput(const uint8_t *data, size_t size)
{
    static const char mark[] = "\n%%\n";
    struct document *document;
    struct finding_list findings = {0};
    const char *cut = size > 0 ? memmem(data, size, mark, sizeof mark - 1) : NULL;
    size_t count = cut != NULL ? (size_t)(cut - (const char *)data) + 1 : size;

    document_parse((const char *)data, count, &document, &findings);
    finding_free(&findings);
    stop_unless(document != NULL);
    check_round_trip(document);
    read_all(document);
    if (cut != NULL) {
        size_t left = size - count - 3;
        char *rest = malloc(left + 1);
        stop_unless(rest != NULL);
        memcpy(rest, cut + 4, left);
        rest[left] = '\0';
        change(document, rest);
        free(rest);
        check_round_trip(document);
        read_all(document);
    }
    document_free(document);
    return 0;
}
