/* Reading numbers and quantities by the grammar of the job file. */
#include "base/unit_table.h"
#include <math.h>
#include <stdlib.h>
#include <string.h>

/* A place in the text that is being read. */
struct cursor {
    const char *text;
    size_t count, at;
};

static char peek(const struct cursor *c)
{
    return c->at < c->count ? c->text[c->at] : '\0';
}

static bool is_digit(char c)
{
    return c >= '0' && c <= '9';
}

static void skip_blanks(struct cursor *c)
{
    while (peek(c) == ' ' || peek(c) == '\t')
        c->at++;
}

static size_t skip_digits(struct cursor *c)
{
    size_t start = c->at;

    while (is_digit(peek(c)))
        c->at++;
    return c->at - start;
}

static struct unit_reading failure(const char *problem, size_t at)
{
    return (struct unit_reading){.problem = problem, .at = at, .si = NAN};
}

/* [sign] digits [. digits] | . digits, then [e [sign] digits]; an exponent without digits is none.
 */
static bool scan_number(struct cursor *c)
{
    size_t digits, mark;

    if (peek(c) == '+' || peek(c) == '-')
        c->at++;
    digits = skip_digits(c);
    if (peek(c) == '.') {
        mark = c->at++;
        if (skip_digits(c) + digits == 0) {
            c->at = mark;
            return false;
        }
        digits++;
    }
    if (digits == 0)
        return false;
    if (peek(c) == 'e' || peek(c) == 'E') {
        mark = c->at++;
        if (peek(c) == '+' || peek(c) == '-')
            c->at++;
        if (skip_digits(c) == 0)
            c->at = mark;
    }
    return true;
}

enum { NUMBER_MOST = 400 };

/* strtod on a copy of just the scanned digits: it can meet neither hex nor nan, and the C numeric
 * locale is never set. */
static double convert(const char *text, size_t length)
{
    char copy[NUMBER_MOST];

    if (length >= sizeof copy)
        return NAN;
    memcpy(copy, text, length);
    copy[length] = '\0';
    return strtod(copy, NULL);
}

struct unit_reading unit_read_number(const char *text, size_t count)
{
    struct cursor c = {text, count, 0};
    struct unit_reading reading = {0};

    if (!scan_number(&c))
        return failure("is not a number", 0);
    reading.si = convert(text, c.at);
    reading.length = c.at;
    if (!isfinite(reading.si))
        return failure("is too large a number", 0);
    return reading;
}

/* digits "/" digits as a value; false leaves the cursor where it was. */
static bool read_fraction(struct cursor *c, double *value)
{
    struct cursor start = *c;
    double top, bottom;
    size_t from = c->at;

    if (skip_digits(c) == 0 || peek(c) != '/') {
        *c = start;
        return false;
    }
    top = convert(c->text + from, c->at - from);
    c->at++;
    from = c->at;
    if (skip_digits(c) == 0) {
        *c = start;
        return false;
    }
    bottom = convert(c->text + from, c->at - from);
    if (!(bottom > 0) || !isfinite(top) || !isfinite(bottom)) {
        *c = start;
        return false;
    }
    *value = top / bottom;
    return true;
}

/* number | [digits (blank | "-")] digits "/" digits, without its mark. Never signed. */
static bool read_inch_number(struct cursor *c, double *value)
{
    struct cursor start = *c;
    size_t from = c->at, whole_end;
    double fraction;

    if (read_fraction(c, value))
        return true;
    if (!is_digit(peek(c)) && peek(c) != '.')
        return false;
    if (skip_digits(c) > 0 && (peek(c) == ' ' || peek(c) == '-' || peek(c) == '\t')) {
        whole_end = c->at;
        if (peek(c) == '-')
            c->at++;
        else
            skip_blanks(c);
        if (read_fraction(c, &fraction)) {
            *value = convert(c->text + from, whole_end - from) + fraction;
            return true;
        }
    }
    *c = start;
    if (!scan_number(c))
        return false;
    *value = convert(c->text + from, c->at - from);
    return isfinite(*value);
}

/* The mark after feet or inches; a word like "inch" is none. */
static bool take_mark(struct cursor *c, char mark, const char *word)
{
    if (peek(c) == mark) {
        c->at++;
        return true;
    }
    if (c->count - c->at >= 2 && memcmp(c->text + c->at, word, 2) == 0) {
        char next = c->at + 2 < c->count ? c->text[c->at + 2] : '\0';
        if ((next >= 'a' && next <= 'z') || (next >= 'A' && next <= 'Z') || next == '/')
            return false;
        c->at += 2;
        return true;
    }
    return false;
}

/* Inches with their mark; false leaves the cursor. */
static bool read_inches(struct cursor *c, double *result)
{
    struct cursor start = *c;
    double inches;

    if (read_inch_number(c, &inches)) {
        skip_blanks(c);
        if (take_mark(c, '"', "in")) {
            *result = inches;
            return true;
        }
    }
    *c = start;
    return false;
}

/* feet [ - ] inches | feet | inches, in inches, with an optional sign before; false leaves the
 * cursor. */
static bool read_feet_inches(struct cursor *c, double *result)
{
    struct cursor start = *c;
    double sign = 1, feet, inches = 0;
    size_t from;

    if (peek(c) == '-' || peek(c) == '+')
        sign = c->text[c->at++] == '-' ? -1 : 1;
    if (read_inches(c, result)) {
        *result *= sign;
        return true;
    }
    from = c->at;
    if (is_digit(peek(c)) || peek(c) == '.') {
        if (scan_number(c)) {
            feet = convert(c->text + from, c->at - from);
            skip_blanks(c);
            if (isfinite(feet) && take_mark(c, '\'', "ft")) {
                struct cursor end = *c;
                skip_blanks(c);
                if (peek(c) == '-')
                    c->at++;
                skip_blanks(c);
                if (!read_inches(c, &inches))
                    *c = end;
                *result = sign * (feet * 12 + inches);
                return true;
            }
        }
    }
    *c = start;
    return false;
}

/* A unit's word reaches to the next blank, comma or the end. */
static size_t word_length(const struct cursor *c)
{
    size_t at = c->at;

    while (at < c->count && c->text[at] != ' ' && c->text[at] != '\t' && c->text[at] != ',')
        at++;
    return at - c->at;
}

static struct unit_reading read_with_unit(struct cursor c, enum quantity quantity,
                                          const char *default_unit)
{
    struct unit_reading reading = {0};
    const struct unit *unit;
    double number;
    size_t length;

    if (!scan_number(&c))
        return failure("is not a number", 0);
    number = convert(c.text, c.at);
    if (!isfinite(number))
        return failure("is too large a number", 0);
    reading.length = c.at;
    if (peek(&c) == ',' && c.at + 1 < c.count && is_digit(c.text[c.at + 1]))
        return failure("has a comma; a comma separates values, write a dot for decimals", c.at);
    if (unit_is_length(quantity) && peek(&c) == '/')
        return failure("is a fraction without its unit; write for example 3/8 in", c.at);
    skip_blanks(&c);
    length = word_length(&c);
    if (length > 0) {
        unit = unit_table_find(quantity, c.text + c.at, length);
        if (unit == NULL)
            return failure("has a unit that is none of this quantity", c.at);
        reading.has_unit = true;
        reading.length = c.at + length;
    } else {
        unit = unit_table_find(quantity, default_unit, strlen(default_unit));
        if (unit == NULL)
            unit = unit_table_of(quantity);
    }
    reading.si = unit_apply(unit, number);
    return isfinite(reading.si) ? reading : failure("is too large a number", 0);
}

struct unit_reading unit_read(const char *text, size_t count, enum quantity quantity,
                              const char *default_unit)
{
    struct cursor c = {text, count, 0};
    struct unit_reading reading = {0};
    double inches;

    if (count == 0)
        return failure("is empty", 0);
    if (unit_is_length(quantity) && read_feet_inches(&c, &inches)) {
        if (!isfinite(inches))
            return failure("is too large a number", 0);
        reading.si = inches * 254 / 10000;
        reading.has_unit = true;
        reading.length = c.at;
        return reading;
    }
    if (default_unit == NULL)
        default_unit = unit_name(quantity, UNITS_METRIC);
    /* plain numbers without a unit mean the number itself: 0.7 is a ratio of 0.7, not 0.7 % */
    if (quantity == QUANTITY_RATIO && strcmp(default_unit, "%") == 0)
        default_unit = "";
    return read_with_unit(c, quantity, default_unit);
}
