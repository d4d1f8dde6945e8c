/* The inside of a document: lines and sections. Private to src/job. */
#ifndef SLABGAP_JOB_DOCUMENT_LINES_H
#define SLABGAP_JOB_DOCUMENT_LINES_H

#include "job/document.h"
#include "job/field.h"

enum { LINE_MOST = 4096, FILE_MOST = 16 * 1024 * 1024, FINDINGS_MOST = 100, KEYS_MOST = 500 };

enum line_kind { LINE_EMPTY, LINE_HEADER, LINE_PAIR, LINE_BAD };

enum section_kind {
    SECTION_UNKNOWN,
    SECTION_ONCE,    /* [slab]: parts joined */
    SECTION_OUTLINE, /* once, with rows */
    SECTION_POURS,   /* once, with rows and keys */
    SECTION_OPENING, /* named */
    SECTION_OBJECT,
    SECTION_EDGE,  /* named by a whole number */
    SECTION_JOINT, /* each header a new one */
    SECTION_CRACK
};

/* A part of a line, in bytes of the document. */
struct span {
    size_t at, length;
};

struct line {
    struct span whole; /* without its end */
    size_t end_length; /* 0, 1 = LF, 2 = CR LF */
    enum line_kind kind;
    int section; /* index into sections; -1 before the first header */
    struct span key, value;
    size_t text_at;   /* of the value as a C string in document.values */
    int previous_key; /* the pair before it in the same section, -1 none */
};

struct section {
    enum section_kind kind;
    struct span word, name;
    int number;      /* edge: its number; joint, crack: counted from 1 */
    int header_line; /* index of its first header */
    int last_key;    /* index of its last pair that is no row, -1 none */
    size_t key_count, row_count;
};

struct document {
    char *bytes; /* the whole file */
    size_t count;
    struct line *lines;
    size_t line_count, line_capacity;
    struct section *sections;
    size_t section_count, section_capacity;
    struct text values; /* every value as a C string */
    size_t counts[SECTION_CRACK + 1];
};

/* Cuts the bytes into lines and reads their grammar (document_parse.c). */
enum status document_read_lines(struct document *document, struct finding_list *findings);
enum section_kind section_kind_of(const char *word, size_t length);
/* The most sections of a kind a file may hold; 0 = one. */
size_t section_most(enum section_kind kind);
bool section_is_single(enum section_kind kind);
bool section_is_named(enum section_kind kind);
/* point, arc or line in a section that holds rows. */
bool section_has_row(enum section_kind kind, const char *key, size_t length);
/* 1 to 32 bytes of letters, digits, "_" and "-". */
bool section_name_good(const char *name, size_t length);
/* A whole number from 1 to 999999, else 0. */
int section_number(const char *name, size_t length);
bool span_is(const struct document *document, struct span span, const char *word);
/* Index of the section of that kind and name (edges by number), or -1. */
int document_find_section(const struct document *document, enum section_kind kind, const char *word,
                          size_t word_length, const char *name, size_t name_length);
/* Column in characters, from 1, of byte `at` of a line. */
int document_column(const struct document *document, const struct line *line, size_t at);
const struct field *document_field(const struct document *document, const struct line *line);
/* "slab.thickness", "object.C1.at", "outline.point.3" of a pair. */
void document_pair_path(const struct document *document, const struct line *line, struct text *out);

#endif
