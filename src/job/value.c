#include "job/value.h"
#include "base/utf8.h"
#include "job/table.h"
#include "job/value_list.h"
#include <math.h>
#include <stdarg.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

enum { SHORT_MOST = 64 };

/* The value cut to what fits a message. */
static void shorten(const struct value *value, char out[SHORT_MOST + 8])
{
    size_t length = value->count < SHORT_MOST ? value->count : SHORT_MOST;

    while (length > 0 && utf8_invalid_at(value->bytes, length) < length)
        length--;
    snprintf(out, SHORT_MOST + 8, "%.*s%s", (int)length, value->bytes,
             length < value->count ? "..." : "");
}

static int column_at(const struct value *value, size_t at)
{
    int column = value->column;

    if (value->line == 0)
        return 0;
    for (size_t i = 0; i < at && i < value->count; i++)
        column += ((unsigned char)value->bytes[i] & 0xC0) != 0x80;
    return column;
}

void value_refuse(const struct value *value, size_t at, const char *limit, const char *format, ...)
{
    struct text message = {0};
    char shown[SHORT_MOST + 8];
    va_list arguments;

    shorten(value, shown);
    text_format(&message, "%s: '%s' ", value->path, shown);
    va_start(arguments, format);
    text_vformat(&message, format, arguments);
    va_end(arguments);
    if (message.length > 0 && strchr(".?)", message.bytes[message.length - 1]) == NULL)
        text_add(&message, ".");
    finding_add(value->findings, SEVERITY_ERROR, value->path, shown, limit, value->line,
                column_at(value, at), "%s", text_string(&message));
    text_free(&message);
}

/* ---- numbers with limits ---- */

/* "0,2 m" -> "0.2 m" for the message. */
static void with_dot(const struct value *value, char out[SHORT_MOST + 8])
{
    char *comma;

    shorten(value, out);
    comma = strchr(out, ',');
    if (comma != NULL)
        *comma = '.';
}

void value_refuse_reading(const struct value *value, const struct unit_reading *reading,
                          enum quantity quantity)
{
    char dotted[SHORT_MOST + 8];

    if (strstr(reading->problem, "comma") != NULL) {
        with_dot(value, dotted);
        value_refuse(value, reading->at, unit_list(quantity),
                     "has a comma; a comma separates values. Write %s", dotted);
    } else {
        value_refuse(value, reading->at, unit_list(quantity), "%s; units here: %s",
                     reading->problem, unit_list(quantity));
    }
}

/* A slip of the pen by which the value would fit: " Did you mean 200 mm?". */
static void add_slip(struct text *out, const struct field *field, double si)
{
    static const struct {
        enum quantity quantity;
        double factor, shift; /* meant = (si + shift) * factor */
        const char *unit;     /* in which the meant value is named */
        const char *hint;
    } slips[] = {
        {QUANTITY_SMALL_LENGTH, 25.4, 0, "in", "for inches write in after the number"},
        {QUANTITY_SMALL_LENGTH, 10, 0, "mm", "a zero may be missing"},
        {QUANTITY_SMALL_LENGTH, 0.1, 0, "mm", "there may be a zero too many"},
        {QUANTITY_SMALL_LENGTH, 1e-3, 0, "mm", "write mm after the number"},
        {QUANTITY_LENGTH, 1e-3, 0, "mm", "write mm after the number"},
        {QUANTITY_LENGTH, 0.3048, 0, "ft", "for feet write ft after the number"},
        {QUANTITY_TEMPERATURE, 5.0 / 9, -32, "degF", "for Fahrenheit write degF after the number"},
        {QUANTITY_RATIO, 1e-2, 0, "%", "write % after the number"},
        {QUANTITY_STRAIN, 1e-6, 0, "microstrain", "write millionths as 200e-6"},
        {QUANTITY_PER_KELVIN, 1e-6, 0, "", "write millionths as 10e-6 /K"},
    };

    for (size_t i = 0; i < sizeof slips / sizeof *slips; i++) {
        double meant = (si + slips[i].shift) * slips[i].factor, number;
        if (slips[i].quantity != field->quantity || meant < field->least || meant > field->most)
            continue;
        if (!unit_from_si(meant, slips[i].unit, field->quantity, &number)) {
            text_format(out, " Is the unit right? %s.", slips[i].hint);
            return;
        }
        if (i == 0 && number >= 13) /* inches are typed as small numbers */
            continue;
        text_add(out, " Did you mean ");
        unit_add_number(out, number, 3);
        text_format(out, " %s? (%s)", slips[i].unit, slips[i].hint);
        return;
    }
}

bool value_within(const struct value *value, const struct field *field, double si)
{
    struct text limits = {0}, slip = {0};
    double slack = 1e-12 * fmax(fabs(field->least), fabs(field->most));

    if (si >= field->least - slack && si <= field->most + slack)
        return true;
    unit_show(&limits, field->least, field->quantity, value->units);
    text_add(&limits, " to ");
    unit_show(&limits, field->most, field->quantity, value->units);
    add_slip(&slip, field, si);
    value_refuse(value, 0, text_string(&limits), "is too %s: %s may be %s.%s",
                 si < field->least ? "small" : "large", field->label, text_string(&limits),
                 text_string(&slip));
    text_free(&limits);
    text_free(&slip);
    return false;
}

/* The unit of a number without one; times count in what they are usually said in. */
static const char *default_unit(const struct field *field)
{
    if (field->quantity != QUANTITY_TIME)
        return NULL;
    return field_time_unit(field);
}

size_t value_skip_blanks(const struct value *value, size_t at)
{
    while (at < value->count && (value->bytes[at] == ' ' || value->bytes[at] == '\t'))
        at++;
    return at;
}

static bool read_number(const struct value *value, const struct field *field, double *place)
{
    struct unit_reading reading =
        unit_read(value->bytes, value->count, field->quantity, default_unit(field));

    if (reading.problem != NULL) {
        value_refuse_reading(value, &reading, field->quantity);
        return false;
    }
    if (reading.length != value->count) {
        value_refuse(value, value_skip_blanks(value, reading.length), "",
                     "has something after the value; one value with its "
                     "unit stands here");
        return false;
    }
    if (!value_within(value, field, reading.si))
        return false;
    if (field->quantity == QUANTITY_NONE && field->most <= 1000 && field->initial == 1 &&
        reading.si != floor(reading.si)) {
        value_refuse(value, 0, "whole number", "must be a whole number");
        return false;
    }
    *place = reading.si;
    return true;
}

/* ---- words ---- */

static bool read_choice(const struct value *value, const struct field *field, int *place)
{
    int index = field_choice_index(field, value->bytes, value->count);

    if (index < 0) {
        value_refuse(value, 0, field->choices, "is none of: %s", field->choices);
        return false;
    }
    *place = index;
    return true;
}

static bool read_quoted(const struct value *value, char *out, size_t size)
{
    size_t used = 0, i = 1;

    while (i < value->count && value->bytes[i] != '"') {
        if (value->bytes[i] == '\\' && i + 1 < value->count &&
            (value->bytes[i + 1] == '"' || value->bytes[i + 1] == '\\'))
            i++;
        if (used + 1 < size)
            out[used++] = value->bytes[i];
        i++;
    }
    out[used] = '\0';
    if (i >= value->count) {
        value_refuse(value, 0, "", "opens a quotation mark and does not close it");
        return false;
    }
    if (i + 1 != value->count) {
        value_refuse(value, i + 1, "", "has something after the closing quotation mark");
        return false;
    }
    return true;
}

static bool read_text(const struct value *value, char *place)
{
    char text[TITLE_MOST];

    if (value->count >= TITLE_MOST) {
        value_refuse(value, 0, "1023 bytes", "is too long; at most 1023 bytes");
        return false;
    }
    if (value->bytes[0] == '"') {
        if (!read_quoted(value, text, sizeof text))
            return false;
    } else {
        snprintf(text, sizeof text, "%.*s", (int)value->count, value->bytes);
    }
    for (const char *c = text; *c != '\0'; c++)
        if ((unsigned char)*c < 0x20 && *c != '\t') {
            value_refuse(value, 0, "", "holds a control character; type it again");
            return false;
        }
    memcpy(place, text, sizeof text);
    return true;
}

/* Exactly `digits` digits at *at; moves on. -1: no. */
static int fixed_digits(const struct value *value, size_t *at, size_t digits)
{
    int number = 0;

    for (size_t i = 0; i < digits; i++, (*at)++) {
        if (*at >= value->count || value->bytes[*at] < '0' || value->bytes[*at] > '9')
            return -1;
        number = number * 10 + (value->bytes[*at] - '0');
    }
    return number;
}

static bool take(const struct value *value, size_t *at, char c)
{
    if (*at >= value->count || value->bytes[*at] != c)
        return false;
    (*at)++;
    return true;
}

static bool read_date(const struct value *value, struct date *place)
{
    struct date date;
    size_t at = 0;
    bool form = true;

    date.year = fixed_digits(value, &at, 4);
    form = take(value, &at, '-') && form;
    date.month = fixed_digits(value, &at, 2);
    form = take(value, &at, '-') && form;
    date.day = fixed_digits(value, &at, 2);
    if (!form || at != value->count || date.year < 0 || date.month < 0 || date.day < 0) {
        value_refuse(value, 0, "YYYY-MM-DD",
                     "is no date; write year-month-day, such as 2027-04-12");
        return false;
    }
    if (date.year < 1900 || date.year > 2200 || !date_valid(date)) {
        value_refuse(value, 0, "1900 to 2200",
                     "is a day that does not exist or lies outside 1900 to "
                     "2200");
        return false;
    }
    *place = date;
    return true;
}

static bool read_time(const struct value *value, struct time_of_day *place)
{
    size_t at = 0;
    int hours = fixed_digits(value, &at, 2);
    bool colon = take(value, &at, ':');
    int minutes = fixed_digits(value, &at, 2);

    if (!colon || at != value->count || hours < 0 || hours > 23 || minutes < 0 || minutes > 59) {
        value_refuse(value, 0, "00:00 to 23:59",
                     "is no time of day; write hours and minutes, such "
                     "as 06:00");
        return false;
    }
    place->minutes = hours * 60 + minutes;
    return true;
}

/* ---- forms of their own ---- */

static bool is_word(const struct value *value, const char *word)
{
    return value->count == strlen(word) && memcmp(value->bytes, word, value->count) == 0;
}

static bool read_strength(const struct value *value, struct strength *place)
{
    static const struct field limits = {.type = FIELD_NUMBER,
                                        .label = "Strength",
                                        .quantity = QUANTITY_STRESS,
                                        .least = 8e6,
                                        .most = 120e6};
    struct strength strength = {0};
    char letter = value->bytes[0];
    struct unit_reading number;

    if (letter != 'C' && letter != 'M' && letter != 'N') {
        if (!read_number(value, &limits, &strength.cylinder))
            return false;
        *place = strength;
        return true;
    }
    number = unit_read_number(value->bytes + 1, value->count - 1);
    if (number.problem == NULL && letter == 'C' && 1 + number.length < value->count &&
        value->bytes[1 + number.length] == '/') {
        struct unit_reading cube =
            unit_read_number(value->bytes + number.length + 2, value->count - number.length - 2);
        number.length += cube.problem == NULL ? cube.length + 1 : 0;
    }
    if (number.problem != NULL || 1 + number.length != value->count) {
        value_refuse(value, 0, "", "is no strength; write 32 MPa, C32/40, M40, N32 or 4000 psi");
        return false;
    }
    strength.cylinder = 1e6 * number.si * (letter == 'M' ? 0.8 : 1);
    if (!value_within(value, &limits, strength.cylinder))
        return false;
    if (letter == 'M')
        finding_add(value->findings, SEVERITY_NOTE, value->path, "", "", value->line,
                    column_at(value, 0),
                    "%s: M%g is a cube strength; slabs here use the cylinder: %g MPa.", value->path,
                    number.si, 0.8 * number.si);
    snprintf(strength.typed, sizeof strength.typed, "%.*s", (int)value->count, value->bytes);
    *place = strength;
    return true;
}

static bool read_aggregate(const struct value *value, struct aggregate *place)
{
    struct text names = {0};

    if (is_word(value, "unknown")) {
        place->row = -1;
        return true;
    }
    for (size_t i = 0; i < aggregate_count; i++)
        if (is_word(value, aggregate_table[i].name)) {
            place->row = (int)i;
            return true;
        }
    for (size_t i = 0; i < aggregate_count; i++)
        text_format(&names, " %s", aggregate_table[i].name);
    value_refuse(value, 0, "", "is no stone of the table: unknown%s", text_string(&names));
    text_free(&names);
    return false;
}

/* Cuts the usual words off a class as tins print it: "class 25", "MAF 25", "+-25", "25LM". */
static struct value bare_class(const struct value *value)
{
    static const char *const before[] = {"class ", "Class ", "MAF ", "+-", "+/-", "±"};
    static const char *const after[] = {"LM", "HM", "E", "P"};
    struct value bare = *value;

    for (size_t i = 0; i < sizeof before / sizeof *before; i++) {
        size_t n = strlen(before[i]);
        if (bare.count > n && memcmp(bare.bytes, before[i], n) == 0) {
            bare.bytes += n;
            bare.count -= n;
            break;
        }
    }
    for (size_t i = 0; i < sizeof after / sizeof *after; i++) {
        size_t n = strlen(after[i]);
        if (bare.count > n && memcmp(bare.bytes + bare.count - n, after[i], n) == 0) {
            bare.count -= n;
            break;
        }
    }
    return bare;
}

static bool read_class(const struct value *value, struct movement_class *place)
{
    static const struct {
        const char *word;
        double extension, compression;
    } classes[] = {
        {"12.5", 0.125, 0.125}, {"25", 0.25, 0.25}, {"35", 0.35, 0.35},    {"50", 0.50, 0.50},
        {"100/50", 1.0, 0.5},   {"20", 0.20, 0.20}, {"7.5", 0.075, 0.075},
    };
    struct value bare = bare_class(value);

    for (size_t i = 0; i < sizeof classes / sizeof *classes; i++)
        if (is_word(&bare, classes[i].word)) {
            *place = (struct movement_class){classes[i].extension, classes[i].compression, ""};
            snprintf(place->word, sizeof place->word, "%s", classes[i].word);
            if (bare.count != value->count)
                finding_add(value->findings, SEVERITY_NOTE, value->path, "", "", value->line,
                            column_at(value, 0), "%s: '%.*s' is read as class %s.", value->path,
                            (int)value->count, value->bytes, classes[i].word);
            return true;
        }
    value_refuse(value, 0, "12.5 25 35 50 100/50",
                 "is no movement class: 12.5 25 35 50 100/50; else type sealant.extension and "
                 "sealant.compression");
    return false;
}

/* Room for the value of any single field. */
union scratch {
    double number;
    int choice;
    char text[TITLE_MOST];
    struct date date;
    struct time_of_day time;
    struct bar bar;
    struct strength strength;
    struct aggregate aggregate;
    struct movement_class movement_class;
    struct numbers numbers;
    struct counts counts;
};

bool value_good(const struct value *value, const struct field *field)
{
    union scratch scratch;
    struct row row;
    struct pour_line line;
    double w, d, *items = NULL;
    size_t count;
    bool good;

    switch (field->type) {
    case FIELD_POINT:
        return value_read_point(value, &w, &d);
    case FIELD_ARC:
        return value_read_row(value, true, &row);
    case FIELD_LINE:
        return value_read_line(value, &line);
    case FIELD_SIZE:
        return value_read_size(value, field, &w, &d);
    case FIELD_LIST:
        good = value_read_list(value, field, &items, &count);
        if (good)
            free(items);
        return good;
    default:
        return value_read(value, field, &scratch);
    }
}

bool value_read(const struct value *value, const struct field *field, void *place)
{
    switch (field->type) {
    case FIELD_NUMBER:
        return read_number(value, field, place);
    case FIELD_CHOICE:
        return read_choice(value, field, place);
    case FIELD_TEXT:
        return read_text(value, place);
    case FIELD_DATE:
        return read_date(value, place);
    case FIELD_TIME:
        return read_time(value, place);
    case FIELD_STRENGTH:
        return read_strength(value, place);
    case FIELD_AGGREGATE:
        return read_aggregate(value, place);
    case FIELD_CLASS:
        return read_class(value, place);
    case FIELD_BAR:
        return value_read_bar(value, place);
    case FIELD_NUMBERS:
        return value_read_numbers(value, field, place);
    case FIELD_COUNTS:
        return value_read_counts(value, place);
    default:
        return false;
    }
}
