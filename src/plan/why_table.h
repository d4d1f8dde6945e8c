/* The formula behind every result: words, symbols, source, range. Private to src/plan. */
#ifndef SLABGAP_PLAN_WHY_TABLE_H
#define SLABGAP_PLAN_WHY_TABLE_H

#include "plan/plan.h"

struct why_symbol {
    const char *symbol; /* as in the formula */
    const char *words;
    const char *path; /* a result ("movement.panel_m") or a field ("sealant.width") */
};
enum { WHY_SYMBOLS = 8 };
struct why_row {
    const char *paths;                        /* the results it explains, separated by blanks */
    bool (*applies)(const struct plan *plan); /* NULL = always; the first that applies is taken */
    const char *formula, *source, *valid;
    struct why_symbol symbols[WHY_SYMBOLS]; /* ended by symbol NULL */
};

/* NULL when there is none for that path. */
const struct why_row *why_row_find(const struct plan *plan, const char *path);
/* The same for "spacing.limits.RULE" and "checks.ID" (every board: "checks.filler"). Source and
 * range of the row itself count where these are empty. */
const struct why_row *why_check_find(const char *path);
/* The same for "LIST.COLUMN", and the column a row of a list is asked about when none is named (""
 * when there is no such list). Symbols of the form ".key" are cells of the row. */
const struct why_row *why_list_find(const struct plan *plan, const char *path);
const char *why_list_principal(const char *list);
/* The first row for that path that applies (plan NULL: rows that always apply). */
const struct why_row *why_row_in(const struct why_row *rows, size_t count, const struct plan *plan,
                                 const char *path);

#endif
