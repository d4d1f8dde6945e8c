#include "cmd/cmd.h"
#include "export/drawing.h"
#include "export/report.h"
#include <stdio.h>
#include <string.h>

enum {
    DRAW_COLUMNS = 100,
    DRAW_ROWS = 40,
    DRAW_LEAST_COLUMNS = 20,
    DRAW_LEAST_ROWS = 8,
    DRAW_MOST = 2000
};

struct options {
    const char *path, *out;
    int columns, rows;
    bool ascii, force;
};

static bool read_size(const char *words, struct options *options)
{
    int used = 0;

    return sscanf(words, "%4dx%4d%n", &options->columns, &options->rows, &used) == 2 &&
           words[used] == '\0' && options->columns >= DRAW_LEAST_COLUMNS &&
           options->rows >= DRAW_LEAST_ROWS && options->columns <= DRAW_MOST &&
           options->rows <= DRAW_MOST;
}

static bool refuse_size(const char *words)
{
    return command_refuse("draw: --size %s: say columns x rows, such as 120x40, from %dx%d to "
                          "%dx%d.",
                          words, DRAW_LEAST_COLUMNS, DRAW_LEAST_ROWS, DRAW_MOST,
                          DRAW_MOST) == EXIT_HOLDS;
}

static bool read_options(int count, char **words, struct options *options)
{
    for (int i = 0; i < count; i++) {
        if (strcmp(words[i], "-o") == 0 && i + 1 < count) {
            options->out = words[++i];
        } else if (strcmp(words[i], "--size") == 0 && i + 1 < count) {
            if (!read_size(words[++i], options))
                return refuse_size(words[i]);
        } else if (strcmp(words[i], "--ascii") == 0) {
            options->ascii = true;
        } else if (strcmp(words[i], "--force") == 0) {
            options->force = true;
        } else if (strcmp(words[i], "-o") == 0 || strcmp(words[i], "--size") == 0) {
            return command_refuse("draw: %s needs a word after it; see slabgap --help.",
                                  words[i]) == EXIT_HOLDS;
        } else if (words[i][0] == '-' && words[i][1] != '\0') {
            return command_refuse("draw: '%s' is no option here; see slabgap --help.", words[i]) ==
                   EXIT_HOLDS;
        } else if (options->path == NULL) {
            options->path = words[i];
        } else {
            return command_refuse("draw: one FILE, not '%s' as well.", words[i]) == EXIT_HOLDS;
        }
    }
    return options->path != NULL || command_refuse("draw: name the job FILE.") == EXIT_HOLDS;
}

static bool suffix_known(const char *path)
{
    const char *dot = strrchr(path, '.');

    return dot != NULL && strcmp(dot, ".txt") == 0;
}

static enum status draw_text(const struct plan *plan, const struct options *options,
                             struct text *out)
{
    struct drawing_options wanted = {.columns = options->columns,
                                     .rows = options->rows,
                                     .ascii = options->ascii,
                                     .names = true,
                                     .tape = true,
                                     .tape_up = true,
                                     .legend = true};
    struct drawing drawing = {0};
    enum status status = drawing_make(plan, &wanted, &drawing);

    if (status == STATUS_OK) {
        text_format(out, "%s\n\n",
                    plan->job.given[FIELD_job_title] ? plan->job.job_title
                                                     : "A job without a title");
        drawing_print(out, &drawing);
        text_format(out, "\n%s\n", report_caution(0));
        if (options->out != NULL)
            text_format(out, "Drawn by slabgap %s.\n", SLABGAP_VERSION);
    }
    drawing_free(&drawing);
    return status;
}

int command_draw(int count, char **words)
{
    struct options options = {.columns = DRAW_COLUMNS, .rows = DRAW_ROWS};
    struct plan plan;
    struct text out = {0};
    int code = EXIT_WRONG;

    if (!read_options(count, words, &options))
        return EXIT_WRONG;
    if (options.out != NULL && !suffix_known(options.out))
        return command_refuse("draw: '%s': the file's suffix says how to draw; it can be .txt.",
                              options.out);
    if (command_plan(options.path, &plan)) {
        enum status status = draw_text(&plan, &options, &out);
        if (!plan.has_outline)
            code =
                command_refuse("%s: there is no [outline] to draw; add its corners.", options.path);
        else if (status != STATUS_OK)
            code = command_refuse("draw: %s.", status_sentence(status));
        else
            code = options.out != NULL ? command_write(options.out, &out, options.force)
                                       : command_print(&out, EXIT_HOLDS);
    }
    text_free(&out);
    plan_free(&plan);
    return code;
}
