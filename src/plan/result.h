/* The tables of results. `result_table`: single values; `list_table`: the lists with their columns.
 * Report, CSV, JSON, why and screens loop over them; a new result appears everywhere at once. */
#ifndef SLABGAP_PLAN_RESULT_H
#define SLABGAP_PLAN_RESULT_H

#include "base/text.h"
#include "base/unit.h"
#include "plan/plan.h"

enum result_type {
    RESULT_NUMBER,  /* double; NAN = none */
    RESULT_INT,     /* int */
    RESULT_WORD,    /* const char *; NULL = none */
    RESULT_TEXT,    /* char[] */
    RESULT_BOOL,    /* bool */
    RESULT_VERDICT, /* enum verdict */
    RESULT_APPLIES, /* enum applies */
    RESULT_KIND     /* a layout joint's kind; the struct begins at the joint */
};

struct result {
    const char *path;  /* "seal.width_m" = the JSON path */
    const char *label; /* for people */
    enum result_type type;
    enum quantity quantity;
    double json_scale; /* SI value x this = the JSON value (litres: 1000) */
    size_t offset;     /* in struct plan */
};
extern const struct result result_table[];
extern const size_t result_count;

struct column {
    const char *key;   /* JSON key and CSV column */
    const char *label; /* for people */
    enum result_type type;
    enum quantity quantity;
    double json_scale;
    size_t offset; /* in the row's struct */
    int part;      /* 0: in the first array, 1: in the second (joints: what the plan adds) */
};
struct list {
    const char *name; /* "checks", "spacing.limits" */
    const struct column *columns;
    size_t column_count;
    size_t size[2]; /* of a row in each array */
    /* the arrays and the number of rows */
    size_t (*rows)(const struct plan *plan, const void *arrays[2]);
};
extern const struct list list_table[];
extern const size_t list_count;

/* NULL when there is none. */
const struct result *result_find(const char *path);
const struct list *list_find(const char *name);
/* The number in SI of a RESULT_NUMBER, NAN of any other or none. */
double result_number(const struct result *result, const struct plan *plan);
/* The value for people in the units given; "none" when there is none. */
void result_show(struct text *out, const struct result *result, const struct plan *plan,
                 enum unit_system units);
/* One cell of a list's row. `place` is the row's struct plus the column's offset. */
void column_show(struct text *out, const struct column *column, const void *place,
                 enum unit_system units);
const void *column_place(const struct list *list, const struct column *column,
                         const void *const arrays[2], size_t row);
/* "governs", "advice", "no" */
/* Whether there is such a result: a finite number, a word, a verdict. */
bool result_there(const struct result *result, const struct plan *plan);
/* One side of a check for people: per cent, mm or in, MPa or psi, a plain count; "-" for none. */
void check_show(struct text *out, double value, const char *unit, enum unit_system system);
const char *applies_word(enum applies applies);
/* "contraction", "construction", "isolation", "expansion" */
const char *joint_kind_word(const struct layout_joint *joint);

#endif
