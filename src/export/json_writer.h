/* Writes JSON into a growing buffer: commas and indentation kept by the writer. Numbers %.9g,
 * coordinates %.6f; nan and inf become null. */
#ifndef SLABGAP_EXPORT_JSON_WRITER_H
#define SLABGAP_EXPORT_JSON_WRITER_H

#include "base/text.h"
#include <stdbool.h>

struct json {
    struct text *out;
    int depth;
    bool first;  /* nothing yet in the innermost object or array */
    int compact; /* depth from which on everything stands on one line; 0 = never */
};

/* Every value: `key` inside an object, NULL inside an array or at the top. */
void json_open(struct json *json, const char *key, char bracket);        /* '{' or '[' */
void json_close(struct json *json, char bracket);                        /* '}' or ']' */
void json_string(struct json *json, const char *key, const char *value); /* NULL = null */
void json_number(struct json *json, const char *key, double value);
void json_coordinate(struct json *json, const char *key, double metres);
void json_integer(struct json *json, const char *key, long long value);
void json_bool(struct json *json, const char *key, bool value);
void json_null(struct json *json, const char *key);

#endif
