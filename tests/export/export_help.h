/* Example jobs and small texts as plans, for the tests of src/export. Run from the root of the
 * project. */
#ifndef SLABGAP_TESTS_EXPORT_HELP_H
#define SLABGAP_TESTS_EXPORT_HELP_H

#include "base/utf8.h"
#include "job/document.h"
#include "plan/plan.h"
#include <setjmp.h>
#include <stdarg.h>
#include <stdint.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>
#include <cmocka.h>

#define COUNT(a) (sizeof(a) / sizeof *(a))
#define F "format = 1\n"
#define RECTANGLE "[outline]\npoint = 0, 0 m\npoint = 12, 0 m\npoint = 12, 8 m\npoint = 0, 8 m\n"
#define TRIANGLE "[outline]\npoint = 0, 0 m\npoint = 9, 0 m\npoint = 0, 6 m\n"

/* A job by its file or its text. */
struct sample {
    const char *name, *text; /* text NULL: the file share/examples/NAME.slab */
};

static const struct sample samples[] = {
    {"e1-service-yard", NULL},
    {"e2-store-floor", NULL},
    {"e3-two-lane-road", NULL},
    {"e4-footway", NULL},
    {"e5-turn-taper", NULL},
    {"smallest", F TRIANGLE},
    {"no outline", F},
    {"no sealant", F RECTANGLE "[sealant]\nkind = none\n"},
    {"compression seal", F RECTANGLE "[sealant]\nkind = compression-seal\n"},
    {"all kinds", F RECTANGLE
     "[job]\ntitle = \"Yard \\\"north\\\", bay #3 \xe2\x80\x94 \xc3\xbc\"\n[opening pit]\nagainst "
     "= "
     "wall\npoint = 5, 3 m\npoint = 7, 3 m\npoint = 7, 5 m\npoint = 5, 5 m\n[object M1]\nkind = "
     "manhole\nat = 2.2, 2 m\ndiameter = 0.8 m\n[object C1]\nkind = column\nat = 9.8, 6 m\nsize = "
     "0.4 x 0.3 m\nangle = 30 deg\n[edge 1]\nagainst = slab\njoints = 3, 6, 9 m\n[edge 2]\nagainst "
     "= wall\n[edge 3]\nagainst = kerb\n[pours]\nline = 0, 4, 12, 4 m\nwidth = 6 m\n[rules]\n"
     "spacing = 3.5 m\nspacing-across = 3 m\n"},
};

static inline void sample_text(const struct sample *sample, struct text *out)
{
    char path[128], block[4096];
    size_t got;
    FILE *file;

    if (sample->text != NULL) {
        text_add(out, sample->text);
        return;
    }
    snprintf(path, sizeof path, "share/examples/%s.slab", sample->name);
    file = fopen(path, "rb");
    assert_non_null(file);
    while ((got = fread(block, 1, sizeof block, file)) > 0)
        text_add_bytes(out, block, got);
    fclose(file);
}

/* units: 0 metric, 1 us, -1 as the job says. */
static inline void sample_plan(const struct sample *sample, int units, struct plan *plan)
{
    struct text text = {0};
    struct document *document;
    struct finding_list findings = {0};
    struct job job;

    sample_text(sample, &text);
    job_init(&job);
    assert_int_equal(document_parse(text_string(&text), text.length, &document, &findings), 0);
    assert_int_equal(document_job(document, &job, &findings), 0);
    if (units >= 0)
        job.job_units = units;
    if (plan_make(&job, NULL, NULL, plan) != STATUS_OK)
        fail_msg("%s gives no plan", sample->name);
    job_free(&job);
    document_free(document);
    text_free(&text);
    finding_free(&findings);
}

#endif
