/* Reading one value of the job file's grammar. Private to src/job. */
#ifndef SLABGAP_JOB_VALUE_H
#define SLABGAP_JOB_VALUE_H

#include "job/field.h"

/* What is being read and where complaints go. */
struct value {
    const char *path;  /* "slab.thickness" */
    const char *bytes; /* without blanks round it and without the comment */
    size_t count;
    int line, column;       /* of the first byte; columns count characters; line 0 = no place */
    enum unit_system units; /* in which limits are said */
    struct finding_list *findings;
};

/* Reads a value of `field` into `place` (the member's type by the field's type). False after an
 * error finding; place is then untouched. Row values have readers of their own below. */
bool value_read(const struct value *value, const struct field *field, void *place);
bool value_read_row(const struct value *value, bool arc, struct row *row);
bool value_read_point(const struct value *value, double *x, double *y);
bool value_read_size(const struct value *value, const struct field *field, double *w, double *d);
bool value_read_line(const struct value *value, struct pour_line *line);
/* *items is allocated; freed by the caller. */
bool value_read_list(const struct value *value, const struct field *field, double **items,
                     size_t *count);
/* Reads the value and throws it away: whether it is good for the field. */
bool value_good(const struct value *value, const struct field *field);
size_t value_skip_blanks(const struct value *value, size_t at);
/* Adds an error finding about the value, its column moved by `at` bytes. */
__attribute__((format(printf, 4, 5))) void value_refuse(const struct value *value, size_t at,
                                                        const char *limit, const char *format, ...);

#endif
