#include "cmd/cmd.h"
#include "export/saw_text.h"
#include <string.h>

/* What is missing for clock times. */
static int refuse(const struct plan *plan)
{
    if (!plan->has_outline)
        return command_refuse("saw: the job has no outline; draw the slab first.");
    if (plan->job.pour_date.year == 0 || !plan->job.given[FIELD_pour_start] ||
        !plan->job.given[FIELD_pour_rate])
        return command_refuse("saw: type pour.date, pour.start and pour.rate: the date, the clock "
                              "time of the first concrete and how much comes in an hour.");
    return command_refuse("saw: the concrete does not set within three days in that cold; check "
                          "the mix and the weather, warm it, or wait for a warmer day.");
}

static int print_saw(const struct plan *plan, bool csv)
{
    struct saw_band band;
    struct text out = {0};
    enum status status = STATUS_OK;
    int code;

    if (!saw_there(plan))
        return refuse(plan);
    if (csv)
        saw_csv(&out, plan);
    else
        status = saw_band_make(plan, NULL, &band);
    if (status != STATUS_OK)
        return command_refuse("saw: %s.", status_sentence(status));
    if (!csv)
        saw_report(&out, plan, &band);
    code = command_print(&out, plan_exit_status(plan));
    text_free(&out);
    return code;
}

int command_saw(int count, char **words)
{
    const char *file = NULL;
    bool csv = false;
    struct plan plan;
    int code = EXIT_WRONG;

    for (int i = 0; i < count; i++) {
        if (strcmp(words[i], "--csv") == 0)
            csv = true;
        else if (words[i][0] == '-')
            return command_refuse("saw: '%s' is no option; there is --csv.", words[i]);
        else if (file != NULL)
            return command_refuse("saw: one FILE, not '%s' as well.", words[i]);
        else
            file = words[i];
    }
    if (file == NULL)
        return command_refuse("saw: name the job FILE.");
    if (command_plan(file, &plan))
        code = print_saw(&plan, csv);
    plan_free(&plan);
    return code;
}
