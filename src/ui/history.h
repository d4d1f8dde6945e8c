/* Undo and redo: a row of whole document texts, one step a change. */
#ifndef SLABGAP_UI_HISTORY_H
#define SLABGAP_UI_HISTORY_H

#include <stdbool.h>
#include <stddef.h>

enum { HISTORY_MOST = 500 };

struct history_step {
    char *bytes;
    size_t count;
    char *path; /* "" : none */
    bool example;
    char *words; /* what changed to get here */
};
struct history {
    struct history_step *steps;
    size_t count, capacity, now; /* now: the step in force, when count > 0 */
    size_t saved;                /* the step that is on disk; SIZE_MAX: none */
};

/* Cuts what could be redone and adds a step; false without memory, all as before. */
bool history_add(struct history *history, const char *bytes, size_t count, const char *path,
                 bool example, const char *words);
void history_free(struct history *history);

#endif
