/* The field table: one row for every input, single ones and those of named or repeated sections.
 * Form, file, command line, validation, manual and JSON read it. */
#ifndef SLABGAP_JOB_FIELD_H
#define SLABGAP_JOB_FIELD_H

#include "job/job.h"

enum field_type {
    FIELD_NUMBER,
    FIELD_CHOICE,
    FIELD_TEXT,
    FIELD_DATE,
    FIELD_TIME,
    FIELD_BAR,
    FIELD_STRENGTH,
    FIELD_AGGREGATE,
    FIELD_CLASS,
    FIELD_NUMBERS,
    FIELD_COUNTS,
    FIELD_POINT,
    FIELD_SIZE,
    FIELD_ARC,
    FIELD_LIST,
    FIELD_LINE /* only in repeated sections */
};
enum field_group {
    GROUP_DRAWING,
    GROUP_TICKET,
    GROUP_WEATHER,
    GROUP_POUR,
    GROUP_SEALING,
    GROUP_TIN,
    GROUP_REST,
    GROUP_COUNT
};

struct field {
    enum field_type type;
    const char *section, *key; /* "slab", "thickness" */
    enum quantity quantity;
    double least, most, initial; /* SI; initial NAN = none or by rule */
    const char *choices;         /* words separated by a blank, or NULL */
    const char *words;           /* what happens when left out; "" = initial */
    enum field_group group;
    const char *label, *help, *source;
    size_t offset; /* in struct job, or in the section's struct when repeated */
    bool repeat;   /* in opening, object, edge, joint, crack, pours.line */
};

/* Single fields, index = enum field_id. */
extern const struct field field_table[FIELD_COUNT];
/* Fields of repeated sections and row keys (outline.point, object.kind ...). */
extern const struct field repeated_field_table[];
extern const size_t repeated_field_count;

/* NULL / FIELD_COUNT when there is none. */
const struct field *field_find(const char *section, const char *key);
enum field_id field_id_of(const char *section, const char *key);
/* The n-th word of a choice field into out[size]; "" outside. */
enum { CHOICE_MOST = 24 };
void field_choice_word(const struct field *field, int index, char *out, size_t size);
int field_choice_index(const struct field *field, const char *word, size_t length); /* -1: none */
/* The unit in which a time is written and read without one: "h", "d" or "a" by its limits. */
const char *field_time_unit(const struct field *field);
const char *field_group_word(enum field_group group); /* "drawing", "ticket", ... "the rest" */

/* The value of a single field for people ("200 mm", "granular", "C32/40", "25 %") in the job's or
 * the given units; "none" words for a NAN. */
void field_show(struct text *out, const struct job *job, enum field_id id, enum unit_system units);
/* The value as the file's grammar writes it ("200 mm"); reads back to the same value. */
void field_write(struct text *out, const struct job *job, enum field_id id, enum unit_system units);

#endif
