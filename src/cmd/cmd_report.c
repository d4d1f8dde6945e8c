#include "cmd/cmd.h"
#include "export/csv.h"
#include "export/json.h"
#include "export/report.h"
#include <string.h>

struct options {
    const char *path, *only, *csv;
    bool json;
};

static bool read_options(int count, char **words, struct options *options)
{
    for (int i = 0; i < count; i++) {
        if (strcmp(words[i], "--json") == 0)
            options->json = true;
        else if (strcmp(words[i], "--only") == 0 && i + 1 < count)
            options->only = words[++i];
        else if (strcmp(words[i], "--csv") == 0 && i + 1 < count)
            options->csv = words[++i];
        else if (strcmp(words[i], "--only") == 0 || strcmp(words[i], "--csv") == 0)
            return command_refuse("report: %s needs a word after it; see slabgap --help.",
                                  words[i]) == EXIT_HOLDS;
        else if (words[i][0] == '-' && words[i][1] != '\0')
            return command_refuse("report: '%s' is no option here; see slabgap --help.",
                                  words[i]) == EXIT_HOLDS;
        else if (options->path == NULL)
            options->path = words[i];
        else
            return command_refuse("report: one FILE, not '%s' as well.", words[i]) == EXIT_HOLDS;
    }
    if (options->path == NULL)
        return command_refuse("report: name the job FILE.") == EXIT_HOLDS;
    if (options->json && options->csv != NULL)
        return command_refuse("report: --json or --csv, not both.") == EXIT_HOLDS;
    return true;
}

static int no_such_part(const char *only)
{
    struct text keys = {0};

    json_key_list(&keys);
    command_refuse("report: there is no part '%s'; the parts are %s.", only, text_string(&keys));
    text_free(&keys);
    return EXIT_WRONG;
}

static int print_plan(const struct plan *plan, const struct options *options)
{
    struct text out = {0};
    int code = plan_exit_status(plan);
    bool found;

    if (options->csv != NULL)
        found = csv_report(&out, plan, options->csv);
    else if (options->json)
        found = json_report(&out, plan, options->only);
    else
        found = report_text(&out, plan, options->only);
    if (found)
        code = command_print(&out, code);
    else if (options->csv != NULL)
        code = command_refuse("report: there is no CSV '%s'; take joints, panels, quantities or "
                              "sealing.",
                              options->csv);
    else
        code = no_such_part(options->only);
    text_free(&out);
    return code;
}

int command_report(int count, char **words)
{
    struct options options = {0};
    struct plan plan;
    struct text out = {0};
    int code = EXIT_WRONG;

    if (!read_options(count, words, &options))
        return EXIT_WRONG;
    if (command_plan(options.path, &plan)) {
        code = print_plan(&plan, &options);
    } else if (options.json) {
        json_findings(&out, &plan.findings);
        command_print(&out, EXIT_WRONG);
        text_free(&out);
    }
    plan_free(&plan);
    return code;
}

int command_check(int count, char **words)
{
    struct plan plan;
    struct text out = {0};
    int code = EXIT_WRONG;

    if (count != 1)
        return command_refuse("check: name one job FILE.");
    if (command_plan(words[0], &plan)) {
        report_checks(&out, &plan);
        code = command_print(&out, plan_exit_status(&plan));
        text_free(&out);
    }
    plan_free(&plan);
    return code;
}
