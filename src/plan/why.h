/* Why a result is what it is: for any JSON path the formula, every symbol with number and unit, the
 * result, the source and the range of validity, in a form a trainee can follow. */
#ifndef SLABGAP_PLAN_WHY_H
#define SLABGAP_PLAN_WHY_H

#include "plan/plan.h"

struct why_line {
    char step[16];
    char words[128];
    char sum[96];
    char value[48];
    char from[64];
    char field[48]; /* input path behind it, "" */
};
struct why {
    char question[128], answer[256];
    struct why_line lines[24];
    size_t line_count;
    char formula[256], source[256], valid[256];
    struct {
        char words[96];
        char value[48];
        char verdict[16];
    } tries[8];
    size_t try_count;
};
/* STATUS_REFUSED: no such result; `why` untouched. */
enum status why_make(const struct plan *plan, const char *path, struct why *why);
/* Plain text, at most 78 columns. */
void why_print(struct text *out, const struct why *why);

#endif
