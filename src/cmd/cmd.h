/* The commands of the command line. Each is a row of one table; help, usage and dispatch read it.
 */
#ifndef SLABGAP_CMD_CMD_H
#define SLABGAP_CMD_CMD_H

#include "base/text.h"
#include "plan/plan.h"

enum exit_code { EXIT_HOLDS = 0, EXIT_FAILS = 1, EXIT_WRONG = 2 };

struct command {
    const char *name, *usage, *help;
    int (*run)(int count, char **words); /* words after the command's name; returns an exit code */
};

/* NULL when there is none of that name. */
const struct command *command_find(const char *name);
/* What --help prints. */
void command_help(struct text *out);

/* ---- for the commands themselves ---- */
/* Reads the weather file the job names, if it names one. */
enum status command_weather(const char *path, struct job *job, struct finding_list *findings);
/* Reads and plans a job. Findings go to standard error as FILE:line:column. Returns false when the
 * file cannot be read or a finding is an error (plan->findings then holds them). */
bool command_plan(const char *path, struct plan *plan);
/* Prints the buffer to standard output; EXIT_WRONG with a sentence when that fails. */
int command_print(const struct text *out, int code);
/* One sentence on standard error; returns EXIT_WRONG. */
__attribute__((format(printf, 1, 2))) int command_refuse(const char *format, ...);
/* Writes an output file, refusing one that this program did not write unless `force`. */
int command_write(const char *path, const struct text *out, bool force);

int command_report(int count, char **words);
int command_draw(int count, char **words);
int command_check(int count, char **words);
int command_set(int count, char **words);
int command_fields(int count, char **words);
int command_why(int count, char **words);
int command_year(int count, char **words);
int command_saw(int count, char **words);
int command_seal(int count, char **words);
int command_buy(int count, char **words);

#endif
