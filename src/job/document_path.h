/* Paths into a document: section.key, object.C1.at, outline.point.2, joint.1.from. Private to
 * src/job. */
#ifndef SLABGAP_JOB_DOCUMENT_PATH_H
#define SLABGAP_JOB_DOCUMENT_PATH_H

#include "job/document_lines.h"

/* A path cut up: section[.name][.key[.n]]. */
struct path {
    const char *text;
    enum section_kind kind;
    struct {
        const char *at;
        size_t length;
    } word, name, key;
    int number; /* of the joint, crack or edge */
    size_t row; /* 0 = none */
    bool has_row;
    const struct field *field;
};

/* Where a path is in the document; -1 = not there. */
struct target {
    int section;
    int line;         /* the pair */
    size_t row_count; /* rows of the section */
};

/* False when the text is no path. */
bool path_read(const char *text, struct path *path);
struct target path_find(const struct document *document, const struct path *path);

#endif
