#include "cmd/cmd.h"
#include "export/year_text.h"
#include <stdlib.h>
#include <string.h>

static int refuse(enum status status)
{
    if (status == STATUS_REFUSED)
        return command_refuse(
            "year: indoors, or with no joint that moves, there is no year to show.");
    return command_refuse("year: %s.", status_sentence(status));
}

static int print_year(const struct plan *plan, bool csv)
{
    struct year *year = malloc(sizeof *year);
    struct text out = {0};
    enum status status = year != NULL ? year_make(plan, year) : STATUS_NO_MEMORY;
    int code;

    if (status != STATUS_OK) {
        free(year);
        return refuse(status);
    }
    if (csv)
        year_csv(&out, year);
    else
        year_report(&out, plan, year);
    code = command_print(&out, plan_exit_status(plan));
    text_free(&out);
    free(year);
    return code;
}

int command_year(int count, char **words)
{
    const char *file = NULL;
    bool csv = false;
    struct plan plan;
    int code = EXIT_WRONG;

    for (int i = 0; i < count; i++) {
        if (strcmp(words[i], "--csv") == 0)
            csv = true;
        else if (words[i][0] == '-')
            return command_refuse("year: '%s' is no option; there is --csv.", words[i]);
        else if (file != NULL)
            return command_refuse("year: one FILE, not '%s' as well.", words[i]);
        else
            file = words[i];
    }
    if (file == NULL)
        return command_refuse("year: name the job FILE.");
    if (command_plan(file, &plan))
        code = print_year(&plan, csv);
    plan_free(&plan);
    return code;
}
