/* Trial cuts as typed: "14:50 ravels, 15:20 clean". */
#ifndef SLABGAP_JOB_TRIAL_H
#define SLABGAP_JOB_TRIAL_H

#include <stdbool.h>
#include <stddef.h>

enum { TRIALS_MOST = 16 };
struct trial {
    int minutes; /* clock, since midnight */
    bool clean;  /* the edge stayed sharp; else it ravelled */
};
struct trials {
    struct trial items[TRIALS_MOST];
    size_t count;
};
/* False when the words are no such list: `wrong` (may be NULL) then points to where. */
bool trials_parse(const char *words, struct trials *trials, const char **wrong);

#endif
