/* Plans from small texts and from the example jobs, and ways to compare two of them. Run from the
 * root of the project. */
#ifndef SLABGAP_TESTS_PLAN_HELP_H
#define SLABGAP_TESTS_PLAN_HELP_H

#include "job/document.h"
#include "plan/plan.h"
#include "plan/result.h"
#include <math.h>
#include <setjmp.h>
#include <stdarg.h>
#include <stdint.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>
#include <cmocka.h>

#define COUNT(a) (sizeof(a) / sizeof *(a))
#define F "format = 1\n"

static const char *const examples[] = {"e1-service-yard", "e2-store-floor", "e3-two-lane-road",
                                       "e4-footway", "e5-turn-taper"};

static inline void read_example(const char *name, struct text *out)
{
    char path[128], block[4096];
    size_t got;
    FILE *file;

    snprintf(path, sizeof path, "share/examples/%s.slab", name);
    file = fopen(path, "rb");
    assert_non_null(file);
    while ((got = fread(block, 1, sizeof block, file)) > 0)
        text_add_bytes(out, block, got);
    fclose(file);
}

/* The whole way from text to plan; any status but OK is its own. */
static inline enum status try_plan(const char *text, size_t count, struct plan *plan)
{
    struct document *document = NULL;
    struct finding_list findings = {0};
    struct job job;
    enum status status = document_parse(text, count, &document, &findings);

    *plan = (struct plan){0};
    job_init(&job);
    if (status == STATUS_OK)
        status = document_job(document, &job, &findings);
    if (status == STATUS_OK)
        status = plan_make(&job, NULL, NULL, plan);
    job_free(&job);
    document_free(document);
    finding_free(&findings);
    return status;
}

static inline void make_plan(const char *text, struct plan *plan)
{
    if (try_plan(text, strlen(text), plan) != STATUS_OK)
        fail_msg("no plan from:\n%s%s", text,
                 plan->findings.count > 0 ? plan->findings.items[0].message : "");
}

/* ---- two plans are one ---- */

static inline bool same_number(double a, double b, double relative)
{
    if (isnan(a) || isnan(b))
        return isnan(a) && isnan(b);
    return a == b || fabs(a - b) <= relative * fmax(fabs(a), fabs(b)) + (relative > 0 ? 1e-12 : 0);
}

/* Every single result and every cell of every list: numbers to `relative` (0: bit by bit), words
 * and verdicts the same. `skip`: a list not looked at. */
static inline bool same_cell(enum result_type type, const void *a, const void *b, double relative)
{
    switch (type) {
    case RESULT_NUMBER:
        return same_number(*(const double *)a, *(const double *)b, relative);
    case RESULT_INT:
        return *(const int *)a == *(const int *)b;
    case RESULT_WORD: {
        const char *x = *(const char *const *)a, *y = *(const char *const *)b;
        return x == y || (x != NULL && y != NULL && strcmp(x, y) == 0);
    }
    case RESULT_TEXT:
        return strcmp(a, b) == 0;
    case RESULT_BOOL:
        return *(const bool *)a == *(const bool *)b;
    case RESULT_VERDICT:
        return *(const enum verdict *)a == *(const enum verdict *)b;
    case RESULT_APPLIES:
        return *(const enum applies *)a == *(const enum applies *)b;
    default:
        return strcmp(joint_kind_word(a), joint_kind_word(b)) == 0;
    }
}

static inline bool same_list(const struct list *list, const struct plan *a, const struct plan *b,
                             double relative)
{
    const void *x[2], *y[2];
    size_t rows = list->rows(a, x);

    if (rows != list->rows(b, y))
        return false;
    for (size_t r = 0; r < rows; r++)
        for (size_t c = 0; c < list->column_count; c++)
            if (!same_cell(list->columns[c].type, column_place(list, &list->columns[c], x, r),
                           column_place(list, &list->columns[c], y, r), relative))
                return false;
    return true;
}

static inline bool same_panels(const struct layout *a, const struct layout *b, double relative)
{
    if (a->panel_count != b->panel_count || a->violations != b->violations)
        return false;
    for (size_t i = 0; i < a->panel_count; i++) {
        const struct layout_panel *p = &a->panels[i], *q = &b->panels[i];
        if (p->count != q->count || p->reason_count != q->reason_count)
            return false;
        for (size_t k = 0; k < p->count; k++)
            if (!same_number(p->ring[k].x, q->ring[k].x, relative) ||
                !same_number(p->ring[k].y, q->ring[k].y, relative))
                return false;
    }
    return true;
}

/* The name of the first thing that differs, NULL when nothing does. */
static inline const char *first_difference(const struct plan *a, const struct plan *b,
                                           double relative)
{
    for (size_t i = 0; i < result_count; i++)
        if (!same_cell(result_table[i].type, (const char *)a + result_table[i].offset,
                       (const char *)b + result_table[i].offset, relative))
            return result_table[i].path;
    for (size_t i = 0; i < list_count; i++)
        if (!same_list(&list_table[i], a, b, relative))
            return list_table[i].name;
    if (!same_panels(&a->layout, &b->layout, relative))
        return "layout.panels";
    return plan_exit_status(a) != plan_exit_status(b) ? "exit status" : NULL;
}

static inline void expect_same(const char *name, const struct plan *a, const struct plan *b,
                               double relative)
{
    const char *what = first_difference(a, b, relative);

    if (what != NULL)
        fail_msg("%s: %s differs", name, what);
}

#endif
