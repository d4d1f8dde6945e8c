/* A job file as text: its lines, what they say, and changes to single values that leave everything
 * else as it was (comments, blanks, line ends, unknown keys). The document is the one truth; the
 * job is read from it. Reading and writing are docs/format.md's grammar. */
#ifndef SLABGAP_JOB_DOCUMENT_H
#define SLABGAP_JOB_DOCUMENT_H

#include "job/job.h"
#include "base/text.h"

struct document; /* lines and pairs; opaque */

/* Reads bytes (at most 16 MiB, lines at most 4096 bytes). Errors and notes go to findings; a
 * document is made whenever there was memory (with the good lines in), so that a form can show it.
 * Returns STATUS_REFUSED when a finding is an error, STATUS_NO_MEMORY with *out NULL. */
enum status document_parse(const char *bytes, size_t count, struct document **out,
                           struct finding_list *findings);
/* A new document of one line, `format = 1`. */
enum status document_new(struct document **out);
enum status document_copy(const struct document *from, struct document **out);
void document_free(struct document *document);
/* The whole file. */
void document_write(const struct document *document, struct text *out);
/* Reads every value into a job (job_init first). Findings carry line and column. STATUS_REFUSED on
 * an error; the job then holds what was good. */
enum status document_job(const struct document *document, struct job *job,
                         struct finding_list *findings);
/* PATH = VALUE by docs/format.md ("What set can address"). VALUE follows the file's grammar; ""
 * removes the key, row or section. All or nothing: on STATUS_REFUSED the document is as it was and
 * the findings say why (field, value, limit, what to do). */
enum status document_set(struct document *document, const char *path, const char *value,
                         struct finding_list *findings);
/* The value at a path as written, without blanks and comment; NULL when it is not there. The string
 * lives until the document changes. */
const char *document_get(const struct document *document, const char *path);

/* Fills in line and column of findings that name a field of the document and have no place yet. */
void document_place(const struct document *document, struct finding_list *findings);

#endif
