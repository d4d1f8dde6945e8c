#include "cmd/cmd.h"
#include "plan/result.h"
#include "plan/why.h"
#include <string.h>

/* Whether `path` is in the group before its dot: "seal.width_m" in "seal". */
static bool in_group(const char *path, const char *group, size_t length)
{
    return strncmp(path, group, length) == 0 && path[length] == '.';
}

/* The results of the group asked for; when there is no such group, the groups. Lists that have rows
 * in this plan. */
static void say_what_there_is(const struct plan *plan, const char *path, struct text *out)
{
    const void *arrays[2];
    size_t length = strcspn(path, "."), said = 0;
    const char *last = "";

    for (size_t i = 0; i < result_count; i++)
        if (in_group(result_table[i].path, path, length))
            text_format(out, "%s%s", said++ > 0 ? " " : "", result_table[i].path);
    for (size_t i = 0; said == 0 && i < result_count; i++) {
        const char *next = result_table[i].path;
        size_t group = strcspn(next, ".");
        if (!in_group(next, last, strcspn(last, ".")) || last[0] == '\0')
            text_format(out, "%s%.*s.", i > 0 ? " " : "", (int)group, next);
        last = next;
    }
    text_add(out, "; and rows of lists, by name or number:");
    for (size_t i = 0; i < list_count; i++)
        if (list_table[i].rows(plan, arrays) > 0)
            text_format(out, " %s.1", list_table[i].name);
}

static int no_such_result(const struct plan *plan, const char *path)
{
    struct text words = {0};

    say_what_there_is(plan, path, &words);
    command_refuse("why: there is no result '%s'. There are: %s.", path, text_string(&words));
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
            code = no_such_result(&plan, words[1]);
        }
        text_free(&out);
    }
    plan_free(&plan);
    return code;
}
