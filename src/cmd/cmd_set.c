#include "cmd/cmd.h"
#include "export/report.h"
#include "file/file.h"
#include "job/document.h"
#include <stdio.h>
#include <string.h>

static void print_findings(const struct finding_list *findings, const char *path)
{
    struct text words = {0};

    report_findings(&words, findings, path);
    fputs(text_string(&words), stderr);
    text_free(&words);
}

/* PATH=VALUE: splits at the first '='. */
static enum status set_one(struct document *document, const char *word,
                           struct finding_list *findings)
{
    char path[256];
    const char *equals = strchr(word, '=');
    size_t length = equals != NULL ? (size_t)(equals - word) : 0;

    if (equals == NULL || length == 0 || length >= sizeof path) {
        finding_add(findings, SEVERITY_ERROR, "", word, "", 0, 0,
                    "'%s' is no PATH=VALUE; write for example slab.thickness='200 mm'.", word);
        return STATUS_REFUSED;
    }
    snprintf(path, sizeof path, "%.*s", (int)length, word);
    return document_set(document, path, equals + 1, findings);
}

/* After all changes the job must still read without an error. */
static enum status check_whole(const struct document *document, struct finding_list *findings)
{
    struct job job;
    enum status status;

    job_init(&job);
    status = document_job(document, &job, findings);
    if (status == STATUS_OK) {
        job_settle(&job, findings);
        job_check(&job, findings);
        if (finding_has_error(findings))
            status = STATUS_REFUSED;
    }
    job_free(&job);
    return status;
}

static enum status set_all(struct document *document, int count, char **words,
                           struct finding_list *findings)
{
    enum status status = STATUS_OK;

    for (int i = 0; i < count && status == STATUS_OK; i++)
        status = set_one(document, words[i], findings);
    return status == STATUS_OK ? check_whole(document, findings) : status;
}

static int finish(const struct document *document, const char *path, bool dry_run)
{
    struct text out = {0};
    int code;

    document_write(document, &out);
    code = dry_run ? command_print(&out, EXIT_HOLDS) : command_write(path, &out, true);
    text_free(&out);
    return code;
}

/* The FILE is the first word that is not --dry-run; the rest are PATH=VALUE. */
static const char *take_file(int *count, char **words, bool *dry_run)
{
    const char *file = NULL;
    int kept = 0;

    for (int i = 0; i < *count; i++) {
        if (strcmp(words[i], "--dry-run") == 0)
            *dry_run = true;
        else if (file == NULL)
            file = words[i];
        else
            words[kept++] = words[i];
    }
    *count = kept;
    return file;
}

int command_set(int count, char **words)
{
    struct text bytes = {0}, sentence = {0};
    struct document *document = NULL;
    struct finding_list findings = {0};
    bool dry_run = false;
    const char *file = take_file(&count, words, &dry_run);
    int code = EXIT_WRONG;
    enum status status;

    if (file == NULL || count == 0)
        return command_refuse("set: name the FILE and at least one PATH=VALUE.");
    status = file_read(file, &bytes);
    if (status != STATUS_OK) {
        file_explain(&sentence, file, status);
        command_refuse("%s", text_string(&sentence));
        text_free(&sentence);
        return EXIT_WRONG;
    }
    status = document_parse(text_string(&bytes), bytes.length, &document, &findings);
    if (status == STATUS_OK)
        status = set_all(document, count, words, &findings);
    print_findings(&findings, file);
    if (status == STATUS_OK)
        code = finish(document, file, dry_run);
    else if (status != STATUS_REFUSED)
        command_refuse("set: %s.", status_sentence(status));
    finding_free(&findings);
    document_free(document);
    text_free(&bytes);
    return code;
}
