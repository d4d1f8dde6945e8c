/* The form. */
#ifndef SLABGAP_UI_UI_H
#define SLABGAP_UI_UI_H

/* Runs the form on a job file, or on the example when `path` is NULL. Standard input and output are
 * terminals. Returns the exit status: 0, or 2 with one sentence on standard error. */
int ui_run(const char *path);

#endif
