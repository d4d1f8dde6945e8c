#include "cmd/cmd.h"
#include "export/buy_text.h"
#include "export/report.h"
#include "file/file.h"
#include "job/document.h"
#include <math.h>
#include <stdio.h>
#include <string.h>

struct option {
    const char *name, *path;
};
static const struct option options[] = {
    {"--length", "takeoff.length"}, {"--width", "sealant.width"}, {"--depth", "sealant.depth"},
    {"--pack", "takeoff.packages"}, {"--waste", "takeoff.waste"}, {"--box", "takeoff.box"},
    {"--sealant", "sealant.kind"},
};
enum { OPTIONS = sizeof options / sizeof *options };

static const struct option *option_named(const char *name)
{
    for (size_t i = 0; i < OPTIONS; i++)
        if (strcmp(options[i].name, name) == 0)
            return &options[i];
    return NULL;
}

/* The job's file, or an empty job when only metres and sizes are given. */
static bool open_document(const char *file, struct document **document,
                          struct finding_list *findings)
{
    struct text bytes = {0}, words = {0};
    enum status status;

    if (file == NULL)
        return document_new(document) == STATUS_OK;
    status = file_read(file, &bytes);
    if (status == STATUS_OK) {
        status = document_parse(text_string(&bytes), bytes.length, document, findings);
    } else {
        file_explain(&words, file, status);
        command_refuse("%s", text_string(&words));
    }
    text_free(&bytes);
    text_free(&words);
    return status == STATUS_OK;
}

/* Every option is a value of the job, told in the same words when it is refused. */
static bool set_options(int count, char **words, struct document *document,
                        struct finding_list *findings)
{
    for (int i = 0; i < count; i++) {
        const struct option *option = option_named(words[i]);
        if (option == NULL)
            continue;
        if (document_set(document, option->path, words[++i], findings) != STATUS_OK)
            return false;
    }
    return true;
}

static int print_plan(const struct plan *plan)
{
    struct text out = {0};
    int code;

    if (plan->quantities.package_count == 0 && isnan(plan->quantities.strip_m))
        return command_refuse("buy: nothing to order: there is no sealant, or no joint. Type "
                              "--length 300m, or draw the slab.");
    buy_report(&out, plan);
    code = command_print(&out, plan_exit_status(plan));
    text_free(&out);
    return code;
}

static int buy(const char *file, const struct document *document, struct finding_list *findings)
{
    struct job job;
    struct plan plan = {0};
    int code = EXIT_WRONG;

    job_init(&job);
    if (document_job(document, &job, findings) == STATUS_OK &&
        command_weather(file, &job, findings) == STATUS_OK) {
        enum status status = plan_make(&job, NULL, NULL, &plan);
        finding_append(findings, &plan.findings);
        if (status == STATUS_OK)
            code = print_plan(&plan);
    }
    plan_free(&plan);
    job_free(&job);
    return code;
}

/* One FILE at most, every option with a value, no other option. */
static bool read_words(int count, char **words, const char **file, bool *length)
{
    for (int i = 0; i < count; i++) {
        const struct option *option = option_named(words[i]);
        if (option != NULL && i + 1 >= count)
            return command_refuse("buy: %s needs a value after it.", words[i]) == EXIT_HOLDS;
        if (option != NULL) {
            *length = *length || strcmp(option->name, "--length") == 0;
            i++;
        } else if (words[i][0] == '-') {
            return command_refuse("buy: '%s' is no option; there are --length --width --depth "
                                  "--pack --waste --box --sealant.",
                                  words[i]) == EXIT_HOLDS;
        } else if (*file != NULL) {
            return command_refuse("buy: one FILE, not '%s' as well.", words[i]) == EXIT_HOLDS;
        } else {
            *file = words[i];
        }
    }
    return true;
}

int command_buy(int count, char **words)
{
    const char *file = NULL;
    bool length = false;
    struct document *document = NULL;
    struct finding_list findings = {0};
    struct text said = {0};
    int code = EXIT_WRONG;

    if (!read_words(count, words, &file, &length))
        return EXIT_WRONG;
    if (file == NULL && !length)
        return command_refuse("buy: name the job FILE, or type --length 300m --width 10mm --depth "
                              "10mm.");
    if (open_document(file, &document, &findings) && set_options(count, words, document, &findings))
        code = buy(file, document, &findings);
    report_findings(&said, &findings, file);
    fputs(text_string(&said), stderr);
    text_free(&said);
    finding_free(&findings);
    document_free(document);
    return code;
}
