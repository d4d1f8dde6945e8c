/* A finding: one thing to say about the input: field, value, limit, sentence, place.
 * The list owns its strings. `message` is a whole sentence that also says what to do. */
#ifndef SLABGAP_BASE_FINDING_H
#define SLABGAP_BASE_FINDING_H

#include "base/status.h"
#include <stdbool.h>
#include <stddef.h>

enum severity { SEVERITY_NOTE, SEVERITY_WARNING, SEVERITY_ERROR };

struct finding {
    enum severity severity;
    char *field;   /* "slab.thickness", "object.C1.at" or "" */
    char *value;   /* as typed, or "" */
    char *limit;   /* "75 mm to 1 m", or "" */
    char *message; /* the sentence */
    int line;      /* from 1; 0 = no place */
    int column;    /* from 1, in characters; 0 = no place */
};

struct finding_list {
    struct finding *items;
    size_t count, capacity;
    bool failed; /* an allocation failed: the list is incomplete */
};

/* Adds one finding. Strings are copied; NULL counts as "". On no memory: list->failed. */
__attribute__((format(printf, 8, 9))) void
finding_add(struct finding_list *list, enum severity severity, const char *field, const char *value,
            const char *limit, int line, int column, const char *format, ...);
/* Copies all findings of `from` to the end of `to`. */
void finding_append(struct finding_list *to, const struct finding_list *from);
/* True when one of them is an error (or the list failed). */
bool finding_has_error(const struct finding_list *list);
/* "error", "warning", "note" */
const char *severity_word(enum severity severity);
/* Frees everything; safe on {0} and twice. */
void finding_free(struct finding_list *list);

#endif
