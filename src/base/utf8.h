/* UTF-8: validity, code points, columns on a terminal. */
#ifndef SLABGAP_BASE_UTF8_H
#define SLABGAP_BASE_UTF8_H

#include <stdbool.h>
#include <stddef.h>
#include <stdint.h>

/* Decodes one code point at bytes (at most `count` bytes). Returns its length 1..4, or 0 when it is
 * not valid UTF-8 (overlong, surrogate, > U+10FFFF, cut off). */
size_t utf8_decode(const char *bytes, size_t count, uint32_t *code);
/* Encodes a code point into out[4]; returns the length, 0 for no code point. */
size_t utf8_encode(uint32_t code, char *out);
/* The offset of the first invalid byte, or `count` when all is valid. */
size_t utf8_invalid_at(const char *bytes, size_t count);
/* Columns a code point takes on a terminal: 0 (combining, control), 1 or 2 (wide East Asian). */
int utf8_width(uint32_t code);
/* Columns of a whole string. */
int utf8_columns(const char *string);

#endif
