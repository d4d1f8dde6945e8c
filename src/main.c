/* slabgap: commands by their first word, else the form. */
#include "cmd/cmd.h"
#include "ui/ui.h"
#include <locale.h>
#include <signal.h>
#include <stdio.h>
#include <string.h>
#include <unistd.h>

static int print_help(void)
{
    struct text out = {0};
    int code;

    command_help(&out);
    code = command_print(&out, EXIT_HOLDS);
    text_free(&out);
    return code;
}

static int print_version(void)
{
    struct text out = {0};
    int code;

    text_format(&out, "slabgap %s\n", SLABGAP_VERSION);
    code = command_print(&out, EXIT_HOLDS);
    text_free(&out);
    return code;
}

/* A bare word that is no file is a mistyped command, not a new job. */
static bool looks_like_command(const char *word)
{
    return strpbrk(word, "./") == NULL && access(word, F_OK) != 0;
}

static int start_form(const char *path)
{
    if (!isatty(STDIN_FILENO) || !isatty(STDOUT_FILENO))
        return command_refuse("The form needs a terminal; for plain text: slabgap report FILE.");
    return ui_run(path);
}

int main(int count, char **words)
{
    const struct command *command;

    setlocale(LC_CTYPE, "");
    signal(SIGPIPE, SIG_IGN);
    if (count < 2)
        return start_form(NULL);
    for (int i = 1; i < count; i++)
        if (strcmp(words[i], "--help") == 0 || strcmp(words[i], "-h") == 0)
            return print_help();
    if (strcmp(words[1], "--version") == 0)
        return print_version();
    command = command_find(words[1]);
    if (command != NULL)
        return command->run(count - 2, words + 2);
    if (words[1][0] == '-')
        return command_refuse("slabgap: '%s' is no option; see slabgap --help.", words[1]);
    if (looks_like_command(words[1]))
        return command_refuse("slabgap: unknown command '%s'; see slabgap --help.", words[1]);
    if (count > 2)
        return command_refuse("slabgap: the form opens one FILE; '%s' is too much.", words[2]);
    return start_form(words[1]);
}
