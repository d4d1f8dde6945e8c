/* The six answers, one sentence each, as on the first screen, the report and every paper. */
#ifndef SLABGAP_EXPORT_ANSWERS_H
#define SLABGAP_EXPORT_ANSWERS_H

#include "plan/plan.h"
#include "base/text.h"

enum { ANSWER_MOST = 6 };
struct answers {
    struct {
        char word[16];
        char sentence[400];
        char more[320];
    } rows[ANSWER_MOST]; /* more: second line at 120 columns */
    size_t count;
};
void answers_make(const struct plan *plan, struct answers *answers);

#endif
