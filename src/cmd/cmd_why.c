#include "cmd/cmd.h"
#include "plan/result.h"
#include "plan/why.h"

static int no_such_result(const char *path)
{
    struct text words = {0};

    for (size_t i = 0; i < result_count; i++)
        text_format(&words, "%s%s", i > 0 ? " " : "", result_table[i].path);
    command_refuse("why: there is no result '%s'. There are: %s; and joints.ID.open_m, "
                   "checks.ID, spacing.limits.RULE.",
                   path, text_string(&words));
    text_free(&words);
    return EXIT_WRONG;
}

int command_why(int count, char **words)
{
    struct plan plan;
    struct why why;
    struct text out = {0};
    int code = EXIT_WRONG;

    if (count != 2)
        return command_refuse("why: name the job FILE and the PATH of a result, such as "
                              "seal.width_m.");
    if (command_plan(words[0], &plan)) {
        if (why_make(&plan, words[1], &why) == STATUS_OK) {
            why_print(&out, &why);
            code = command_print(&out, EXIT_HOLDS);
        } else {
            code = no_such_result(words[1]);
        }
        text_free(&out);
    }
    plan_free(&plan);
    return code;
}
