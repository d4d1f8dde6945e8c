/* A growing byte buffer. Failure is sticky: after one failed allocation nothing is added and
 * `failed` stays set, so a writer checks once at the end. `bytes` is always NUL-terminated once
 * something was added; text_string() is safe on an empty one. */
#ifndef SLABGAP_BASE_TEXT_H
#define SLABGAP_BASE_TEXT_H

#include <stdarg.h>
#include <stdbool.h>
#include <stddef.h>

struct text {
    char *bytes;
    size_t length, capacity;
    bool failed;
};

void text_add(struct text *text, const char *string);
void text_add_bytes(struct text *text, const char *bytes, size_t count);
void text_add_char(struct text *text, char c, size_t times);
__attribute__((format(printf, 2, 3))) void text_format(struct text *text, const char *format, ...);
void text_vformat(struct text *text, const char *format, va_list arguments);
/* The content as a C string; "" when empty. */
const char *text_string(const struct text *text);
/* Empties it, keeping the memory. */
void text_clear(struct text *text);
/* Frees it; safe on {0} and twice. */
void text_free(struct text *text);

#endif
