#include "cmd/cmd.h"
#include "export/seal_text.h"
#include "job/field.h"
#include <math.h>
#include <stdio.h>
#include <string.h>

/* Options as typed; read when the job's units are known. */
struct options {
    const char *file, *slab, *surface, *hour, *width, *air, *humidity, *trend, *date, *dry, *clean;
};

static bool read_options(int count, char **words, struct options *options)
{
    const struct {
        const char *name;
        const char **into;
    } table[] = {{"--slab", &options->slab},   {"--surface", &options->surface},
                 {"--hour", &options->hour},   {"--width", &options->width},
                 {"--air", &options->air},     {"--humidity", &options->humidity},
                 {"--trend", &options->trend}, {"--date", &options->date},
                 {"--dry", &options->dry},     {"--clean", &options->clean}};

    for (int i = 0; i < count; i++) {
        const char **into = NULL;
        for (size_t t = 0; t < sizeof table / sizeof *table; t++)
            if (strcmp(words[i], table[t].name) == 0)
                into = table[t].into;
        if (into == NULL && words[i][0] == '-')
            return command_refuse("seal: '%s' is no option; see slabgap --help.", words[i]) ==
                   EXIT_HOLDS;
        if (into != NULL && i + 1 >= count)
            return command_refuse("seal: %s needs a value after it.", words[i]) == EXIT_HOLDS;
        if (into != NULL)
            *into = words[++i];
        else if (options->file == NULL)
            options->file = words[i];
        else
            return command_refuse("seal: one FILE, not '%s' as well.", words[i]) == EXIT_HOLDS;
    }
    return true;
}

/* A quantity of an option: bare numbers in the job's units, within its limits. */
static bool read_quantity(const struct plan *plan, const char *name, const char *typed,
                          enum quantity quantity, double least, double most, double *out)
{
    enum unit_system units = (enum unit_system)plan->job.job_units;
    struct unit_reading reading;
    struct text low = {0}, high = {0};
    bool good;

    if (typed == NULL)
        return true;
    reading = unit_read(typed, strlen(typed), quantity, unit_name(quantity, units));
    if (quantity == QUANTITY_RATIO && !reading.has_unit && reading.problem == NULL &&
        strchr(typed, '%') == NULL)
        reading = unit_read(typed, strlen(typed), QUANTITY_NONE, NULL); /* 0.7, not 0.7 % */
    if (reading.problem != NULL || typed[reading.length] != '\0')
        return command_refuse("seal: %s: '%s' is no value for it; units: %s.", name, typed,
                              unit_list(quantity)) == EXIT_HOLDS;
    good = reading.si >= least && reading.si <= most;
    if (!good) {
        unit_show(&low, least, quantity, units);
        unit_show(&high, most, quantity, units);
        command_refuse("seal: %s: '%s' may be %s to %s.", name, typed, text_string(&low),
                       text_string(&high));
    }
    text_free(&low);
    text_free(&high);
    *out = reading.si;
    return good;
}

static bool read_hour(const char *typed, double *out)
{
    int hour, minute, used = 0;

    if (typed == NULL)
        return true;
    if (sscanf(typed, "%2d:%2d%n", &hour, &minute, &used) == 2 && typed[used] == '\0' &&
        hour >= 0 && hour < 24 && minute >= 0 && minute < 60) {
        *out = hour + minute / 60.0;
        return true;
    }
    if (sscanf(typed, "%2d%n", &hour, &used) == 1 && typed[used] == '\0' && hour >= 0 &&
        hour < 24) {
        *out = hour;
        return true;
    }
    return command_refuse("seal: --hour: '%s' is no clock time; write 14:30 or 14.", typed) ==
           EXIT_HOLDS;
}

static bool read_date(const char *typed, struct date *out)
{
    int used = 0;

    if (typed == NULL)
        return true;
    if (sscanf(typed, "%4d-%2d-%2d%n", &out->year, &out->month, &out->day, &used) == 3 &&
        typed[used] == '\0' && date_valid(*out))
        return true;
    return command_refuse("seal: --date: '%s' is no date; write 2027-05-20.", typed) == EXIT_HOLDS;
}

static bool read_word(const char *name, const char *typed, const char *const *words, int *out)
{
    if (typed == NULL)
        return true;
    for (int i = 0; words[i] != NULL; i++)
        if (strcmp(typed, words[i]) == 0) {
            *out = i;
            return true;
        }
    return command_refuse("seal: %s: '%s' is none of its words: %s, %s%s%s.", name, typed, words[0],
                          words[1], words[2] != NULL ? ", " : "",
                          words[2] != NULL ? words[2] : "") == EXIT_HOLDS;
}

static bool read_input(const struct plan *plan, const struct options *options,
                       struct seal_now_input *input)
{
    static const char *const trends[] = {"rising", "steady", "falling", NULL};
    static const char *const yes_no[] = {"no", "yes", NULL};
    int trend = -1;
    bool good;

    seal_now_input_clear(input);
    good =
        read_quantity(plan, "--slab", options->slab, QUANTITY_TEMPERATURE, -40, 72,
                      &input->slab_c) &&
        read_quantity(plan, "--surface", options->surface, QUANTITY_TEMPERATURE, -40, 80,
                      &input->surface_c) &&
        read_quantity(plan, "--width", options->width, QUANTITY_SMALL_LENGTH, 0.001, 0.1,
                      &input->width_m) &&
        read_quantity(plan, "--air", options->air, QUANTITY_TEMPERATURE, -40, 55, &input->air_c) &&
        read_quantity(plan, "--humidity", options->humidity, QUANTITY_RATIO, 0.01, 1,
                      &input->humidity) &&
        read_hour(options->hour, &input->hour) && read_date(options->date, &input->date) &&
        read_word("--trend", options->trend, trends, &trend) &&
        read_word("--dry", options->dry, yes_no, &input->dry) &&
        read_word("--clean", options->clean, yes_no, &input->clean);
    if (trend >= 0)
        input->trend = (enum trend)(TREND_RISING + trend);
    return good;
}

static int judge(const struct plan *plan, const struct options *options)
{
    struct seal_now_input input;
    struct seal_now now;
    struct text out = {0};
    int code;

    if (!read_input(plan, options, &input))
        return EXIT_WRONG;
    if (seal_now_judge(plan, &input, &now) != STATUS_OK)
        return command_refuse(
            "seal: this job has no sealant with a movement class, or no joint that "
            "moves.");
    seal_now_report(&out, plan, &now);
    code = command_print(&out, now.go ? EXIT_HOLDS : EXIT_FAILS);
    text_free(&out);
    return code;
}

int command_seal(int count, char **words)
{
    struct options options = {0};
    struct plan plan;
    int code = EXIT_WRONG;

    if (!read_options(count, words, &options))
        return EXIT_WRONG;
    if (options.file == NULL || (options.slab == NULL && options.surface == NULL))
        return command_refuse(
            "seal: name the job FILE and the slab's temperature: --slab 15C (mean "
            "over the depth) or --surface 18C --hour 14:00.");
    if (command_plan(options.file, &plan))
        code = judge(&plan, &options);
    plan_free(&plan);
    return code;
}
