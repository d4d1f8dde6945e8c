/* Reads the published cases of tests/cases: blocks of `word text` lines, parted by blank lines.
 *   id, source, function, given NAME = VALUE [UNIT], expect NAME = VALUE [UNIT], tolerance VALUE
 * [UNIT] A tolerance goes with the expect above it. The units are this file's own, apart from the
 * program's. */
#ifndef SLABGAP_TESTS_CORE_CASE_FILE_H
#define SLABGAP_TESTS_CORE_CASE_FILE_H

#include <math.h>
#include <stdbool.h>
#include <stddef.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

enum { CASE_VALUES = 24, CASE_TEXT = 320 };

struct case_value {
    char name[40], text[64];
    double value, tolerance; /* SI */
    bool number, used, toleranced;
};
struct published_case {
    char id[24], source[CASE_TEXT], function[48];
    struct case_value given[CASE_VALUES], expect[CASE_VALUES], answer[CASE_VALUES];
    size_t given_count, expect_count, answer_count;
    char trouble[CASE_TEXT]; /* "" = fine */
};
struct case_unit {
    const char *name;
    double scale, offset; /* SI = value x scale + offset */
};

static const struct case_unit case_units[] = {
    {"", 1, 0},
    {"m", 1, 0},
    {"mm", 1e-3, 0},
    {"cm", 1e-2, 0},
    {"in", 0.0254, 0},
    {"ft", 0.3048, 0},
    {"Pa", 1, 0},
    {"kPa", 1e3, 0},
    {"MPa", 1e6, 0},
    {"GPa", 1e9, 0},
    {"psi", 6894.757293168361, 0},
    {"ksi", 6894757.293168361, 0},
    {"psf", 47.88025898033584, 0},
    {"kgf/cm2", 98066.5, 0},
    {"kgf/cm3", 9806650.0, 0},
    {"kgf/m3", 9.80665, 0},
    {"N/m3", 1, 0},
    {"kN/m3", 1e3, 0},
    {"kN/m", 1e3, 0},
    {"kN/m2", 1e3, 0},
    {"MPa/m", 1e6, 0},
    {"MPa/mm", 1e9, 0},
    {"pci", 271447.1375263134, 0},
    {"degC", 1, 0},
    {"degF", 5.0 / 9, -160.0 / 9},
    {"K", 1, 0},
    {"degF-difference", 5.0 / 9, 0},
    {"/K", 1, 0},
    {"/degF", 1.8, 0},
    {"%", 1e-2, 0},
    {"microstrain", 1e-6, 0},
    {"d", 1, 0},
    {"h", 1, 0},
    {"deg", 1, 0},
    {"l", 1e-3, 0},
    {"ml", 1e-6, 0},
    {"gal", 3.785411784e-3, 0},
    {"mm2", 1e-6, 0},
    {"in2/ft", 6.4516e-4 / 0.3048, 0},
    {"MJ/m2", 1e6, 0},
    {"langley", 41840, 0},
    {"kg/m3", 1, 0},
    {"pcf", 16.018463373960142, 0},
    {"m/s", 1, 0},
    {"mph", 0.44704, 0},
    {"BTU/(h ft degF)", 1.730734666371391, 0},
    {"BTU/(lb degF)", 4186.8, 0},
};

static inline void case_trouble(struct published_case *c, const char *what, const char *name)
{
    if (!c->trouble[0])
        snprintf(c->trouble, sizeof c->trouble, "%s: %s", what, name);
}

/* "1 1/4 in", "0.5", "-8 degC" -> SI; false: a word. `difference`: offsets left out. */
static inline bool case_read_number(const char *text, bool difference, double *value)
{
    char *end;
    double number = strtod(text, &end);
    if (end == text)
        return false;
    int above, below, used = 0;
    if (sscanf(end, "/%d%n", &below, &used) == 1 && used > 0) {
        number /= below; /* 3/4 */
        end += used;
    } else if (sscanf(end, " %d/%d%n", &above, &below, &used) == 2 && used > 0) {
        number += (double)above / below;
        end += used;
    }
    while (*end == ' ')
        end++;
    for (size_t i = 0; i < sizeof case_units / sizeof case_units[0]; i++) {
        if (strcmp(end, case_units[i].name) == 0) {
            *value = number * case_units[i].scale + (difference ? 0 : case_units[i].offset);
            return true;
        }
    }
    return false;
}

static inline void case_add_value(struct published_case *c, struct case_value *list, size_t *count,
                                  const char *text)
{
    if (*count >= CASE_VALUES) {
        case_trouble(c, "too many values", text);
        return;
    }
    struct case_value *v = &list[(*count)++];
    const char *equals = strchr(text, '=');
    if (!equals || sscanf(text, "%39s", v->name) != 1) {
        case_trouble(c, "no = in", text);
        return;
    }
    const char *value = equals + 1 + strspn(equals + 1, " ");
    snprintf(v->text, sizeof v->text, "%s", value);
    v->number = case_read_number(value, false, &v->value);
}

static inline void case_add_tolerance(struct published_case *c, const char *text)
{
    if (c->expect_count == 0) {
        case_trouble(c, "tolerance without expect", text);
        return;
    }
    struct case_value *v = &c->expect[c->expect_count - 1];
    v->toleranced = case_read_number(text, true, &v->tolerance) && v->tolerance > 0;
    if (!v->toleranced)
        case_trouble(c, "bad tolerance", text);
}

/* One line of a block. */
static inline void case_add_line(struct published_case *c, const char *line)
{
    char word[16];
    int used = 0;
    if (sscanf(line, "%15s %n", word, &used) != 1)
        return;
    const char *rest = line + used;
    if (strcmp(word, "id") == 0)
        snprintf(c->id, sizeof c->id, "%s", rest);
    else if (strcmp(word, "source") == 0)
        snprintf(c->source, sizeof c->source, "%s", rest);
    else if (strcmp(word, "function") == 0)
        snprintf(c->function, sizeof c->function, "%s", rest);
    else if (strcmp(word, "given") == 0)
        case_add_value(c, c->given, &c->given_count, rest);
    else if (strcmp(word, "expect") == 0)
        case_add_value(c, c->expect, &c->expect_count, rest);
    else if (strcmp(word, "tolerance") == 0)
        case_add_tolerance(c, rest);
    else
        case_trouble(c, "unknown line", line);
}

/* The next block of the file; false at its end. */
static inline bool case_read(FILE *file, struct published_case *c)
{
    char line[512];
    bool any = false;
    memset(c, 0, sizeof *c);
    while (fgets(line, sizeof line, file)) {
        line[strcspn(line, "\r\n")] = 0;
        for (size_t n = strlen(line); n > 0 && line[n - 1] == ' '; n--)
            line[n - 1] = 0;
        if (line[0] == '#')
            continue;
        if (line[0] == 0 && any)
            return true;
        if (line[0] == 0)
            continue;
        any = true;
        case_add_line(c, line);
    }
    return any;
}

/* ---- what an adapter reads and writes ---- */

static inline struct case_value *case_given(struct published_case *c, const char *name)
{
    for (size_t i = 0; i < c->given_count; i++) {
        if (strcmp(c->given[i].name, name) == 0) {
            c->given[i].used = true;
            return &c->given[i];
        }
    }
    return NULL;
}

static inline double case_number(struct published_case *c, const char *name)
{
    struct case_value *v = case_given(c, name);
    if (!v || !v->number)
        case_trouble(c, "no number given for", name);
    return v ? v->value : 0;
}

static inline double case_number_or(struct published_case *c, const char *name, double otherwise)
{
    struct case_value *v = case_given(c, name);
    return v && v->number ? v->value : otherwise;
}

static inline const char *case_word(struct published_case *c, const char *name)
{
    struct case_value *v = case_given(c, name);
    if (!v)
        case_trouble(c, "no word given for", name);
    return v ? v->text : "";
}

/* Place of a word in a list of words; trouble when it is not there. */
static inline int case_choice(struct published_case *c, const char *name, const char *const *words)
{
    const char *word = case_word(c, name);
    for (int i = 0; words[i]; i++) {
        if (strcmp(words[i], word) == 0)
            return i;
    }
    case_trouble(c, "unknown word for", name);
    return 0;
}

static inline void case_answer(struct published_case *c, const char *name, double value)
{
    if (c->answer_count >= CASE_VALUES)
        return;
    struct case_value *v = &c->answer[c->answer_count++];
    snprintf(v->name, sizeof v->name, "%s", name);
    v->value = value;
}

/* Compares expects with answers; writes what is wrong into c->trouble. */
static inline void case_compare(struct published_case *c)
{
    if (c->expect_count == 0 || !c->id[0] || !c->source[0])
        case_trouble(c, "a case needs id, source and expect", c->function);
    for (size_t i = 0; i < c->given_count; i++) {
        if (!c->given[i].used)
            case_trouble(c, "given but not used by the function", c->given[i].name);
    }
    for (size_t i = 0; i < c->expect_count; i++) {
        const struct case_value *want = &c->expect[i], *got = NULL;
        for (size_t k = 0; k < c->answer_count; k++) {
            if (strcmp(c->answer[k].name, want->name) == 0)
                got = &c->answer[k];
        }
        if (!got || !want->number || !want->toleranced) {
            case_trouble(c, "no answer, no number or no tolerance", want->name);
        } else if (!(fabs(got->value - want->value) <= want->tolerance * (1 + 1e-9))) {
            char words[200];
            snprintf(words, sizeof words, "%s = %.9g, expected %.9g within %.3g (SI)", want->name,
                     got->value, want->value, want->tolerance);
            case_trouble(c, "differs", words);
        }
    }
}

#endif
