/* Short ways to parse, read and look for findings in the tests of src/job. */
#ifndef SLABGAP_TESTS_JOB_HELP_H
#define SLABGAP_TESTS_JOB_HELP_H

#include "job/document.h"
#include "job/field.h"
#include <setjmp.h>
#include <stdarg.h>
#include <stdint.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>
#include <cmocka.h>

#define COUNT(a) (sizeof(a) / sizeof *(a))

/* A document, its job and everything that was said. */
struct loaded {
    struct document *document;
    struct job job;
    struct finding_list findings;
    enum status parsed, read;
};

static inline void load_bytes(struct loaded *loaded, const char *bytes, size_t count)
{
    *loaded = (struct loaded){0};
    job_init(&loaded->job);
    loaded->parsed = document_parse(bytes, count, &loaded->document, &loaded->findings);
    loaded->read = document_job(loaded->document, &loaded->job, &loaded->findings);
}

static inline void load(struct loaded *loaded, const char *text)
{
    load_bytes(loaded, text, strlen(text));
}

static inline void unload(struct loaded *loaded)
{
    document_free(loaded->document);
    job_free(&loaded->job);
    finding_free(&loaded->findings);
}

/* The first finding of that severity whose message holds `part`; NULL = none. */
static inline const struct finding *said(const struct finding_list *list, enum severity severity,
                                         const char *part)
{
    for (size_t i = 0; i < list->count; i++)
        if (list->items[i].severity == severity && strstr(list->items[i].message, part) != NULL)
            return &list->items[i];
    return NULL;
}

static inline void print_findings(const struct finding_list *list)
{
    for (size_t i = 0; i < list->count; i++)
        print_message("%s %d:%d %s\n", severity_word(list->items[i].severity), list->items[i].line,
                      list->items[i].column, list->items[i].message);
}

/* The whole document equals `text`. */
static inline void assert_document(const struct document *document, const char *text)
{
    struct text out = {0};

    document_write(document, &out);
    assert_string_equal(text_string(&out), text);
    text_free(&out);
}

#endif
