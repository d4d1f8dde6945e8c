#include "cmd/cmd.h"
#include "export/report.h"
#include "file/file.h"
#include "file/weather_file.h"
#include "job/document.h"
#include <stdarg.h>
#include <stdio.h>
#include <string.h>

static const struct command commands[] = {
    {"report", "report FILE [--json | --csv joints|panels|quantities|sealing] [--only NAME]",
     "the whole answer as text, JSON or CSV", command_report},
    {"draw", "draw FILE [-o OUT.txt] [--size 120x40] [--ascii] [--force]",
     "the plan of the joints in characters", command_draw},
    {"check", "check FILE", "the verdicts only", command_check},
    {"set", "set FILE PATH=VALUE... [--dry-run]", "change values in a job file", command_set},
    {"fields", "fields [--json]", "every input: key, label, unit, limits, default, source",
     command_fields},
    {"why", "why FILE PATH", "how a result comes about: seal.width_m, joints.J4.1.open_m",
     command_why},
    {"year", "year FILE [--csv]",
     "slab temperature, width and strain of the joint through the year", command_year},
    {"saw", "saw FILE [--csv]",
     "when to saw, in what order, with how many saws; where the pour may stop", command_saw},
    {"seal",
     "seal FILE --slab T [--surface T --hour H] [--width W] [--air T --humidity H]\n"
     "          [--trend rising|steady|falling] [--dry yes|no] [--clean yes|no] [--date D]",
     "go or not now, for a joint measured now", command_seal},
    {"buy",
     "buy FILE | buy --length 300m --width 10mm --depth 10mm\n"
     "          [--pack 600ml] [--waste 10%] [--box 20] [--sealant silicone]",
     "what to order", command_buy},
};
enum { COMMANDS = sizeof commands / sizeof *commands };

const struct command *command_find(const char *name)
{
    for (size_t i = 0; i < COMMANDS; i++)
        if (strcmp(commands[i].name, name) == 0)
            return &commands[i];
    return NULL;
}

void command_help(struct text *out)
{
    text_add(out, "slabgap: where every joint of a concrete slab goes, how wide it must be at "
                  "today's slab\ntemperature, and whether the sealant lives through the coming "
                  "years.\n\n  slabgap [FILE]\n      the form\n");
    for (size_t i = 0; i < COMMANDS; i++)
        text_format(out, "  slabgap %s\n      %s\n", commands[i].usage, commands[i].help);
    text_add(out, "\nExit status: 0 every binding check holds, 1 one fails, 2 something is wrong "
                  "with the input.\n");
    text_format(out, "%s\n", report_caution(0));
}

int command_refuse(const char *format, ...)
{
    va_list arguments;

    va_start(arguments, format);
    vfprintf(stderr, format, arguments);
    va_end(arguments);
    fputc('\n', stderr);
    return EXIT_WRONG;
}

int command_print(const struct text *out, int code)
{
    if (out->failed)
        return command_refuse("slabgap: %s.", status_sentence(STATUS_NO_MEMORY));
    if (fwrite(text_string(out), 1, out->length, stdout) != out->length || fflush(stdout) != 0)
        return command_refuse("slabgap: the output could not be written; check the disk or pipe.");
    return code;
}

int command_write(const char *path, const struct text *out, bool force)
{
    enum status status;
    struct text words = {0};

    if (out->failed)
        return command_refuse("slabgap: %s.", status_sentence(STATUS_NO_MEMORY));
    if (!force && !file_is_ours(path))
        return command_refuse("%s exists and was not written by this program; add --force to "
                              "replace it, or name another file.",
                              path);
    status = file_replace(path, text_string(out), out->length);
    if (status == STATUS_OK)
        return EXIT_HOLDS;
    file_explain(&words, path, status);
    command_refuse("%s", text_string(&words));
    text_free(&words);
    return EXIT_WRONG;
}

/* *document is NULL when the file cannot be read. */
static enum status read_job(const char *path, struct document **document, struct job *job,
                            struct finding_list *findings)
{
    struct text bytes = {0}, words = {0};
    enum status status = file_read(path, &bytes);

    job_init(job);
    if (status != STATUS_OK) {
        file_explain(&words, path, status);
        finding_add(findings, SEVERITY_ERROR, "", path, "", 0, 0, "%s", text_string(&words));
        text_free(&words);
        return status;
    }
    status = document_parse(text_string(&bytes), bytes.length, document, findings);
    if (*document != NULL) {
        enum status read = document_job(*document, job, findings);
        status = status == STATUS_OK ? read : status;
        if (status == STATUS_OK)
            status = command_weather(path, job, findings);
    }
    text_free(&bytes);
    return status;
}

enum status command_weather(const char *path, struct job *job, struct finding_list *findings)
{
    if (!job_given(job, FIELD_climate_file))
        return STATUS_OK;
    return weather_file_read(path, job->climate_file, &job->weather, findings);
}

bool command_plan(const char *path, struct plan *plan)
{
    struct job job;
    struct finding_list findings = {0};
    struct text words = {0};
    struct document *document = NULL;
    enum status status = read_job(path, &document, &job, &findings);
    bool place = status == STATUS_OK || status == STATUS_REFUSED;

    *plan = (struct plan){0};
    if (status == STATUS_OK)
        status = plan_make(&job, NULL, NULL, plan);
    finding_append(&findings, &plan->findings);
    finding_free(&plan->findings);
    if (document != NULL)
        document_place(document, &findings);
    plan->findings = findings;
    document_free(document);
    job_free(&job);
    if (status != STATUS_OK && !finding_has_error(&plan->findings))
        finding_add(&plan->findings, SEVERITY_ERROR, "", "", "", 0, 0, "%s: %s.", path,
                    status_sentence(status));
    report_findings(&words, &plan->findings, place ? path : NULL);
    fputs(text_string(&words), stderr);
    text_free(&words);
    return status == STATUS_OK && !finding_has_error(&plan->findings);
}
