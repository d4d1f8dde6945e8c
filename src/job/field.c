#include "job/field.h"
#include "job/table.h"
#include <math.h>
#include <stdio.h>
#include <string.h>

#define NONE NAN
#define DRAWING GROUP_DRAWING
#define TICKET GROUP_TICKET
#define WEATHER GROUP_WEATHER
#define POUR GROUP_POUR
#define SEALING GROUP_SEALING
#define TIN GROUP_TIN
#define REST GROUP_REST

#define ROW(type, section, key, quantity, least, most, initial, choices, words, group, label,      \
            help, source, id)                                                                      \
    {type,    section, key,   quantity, least, most,   initial,                                    \
     choices, words,   group, label,    help,  source, offsetof(struct job, id),                   \
     false},
#define NUMBER(id, section, key, quantity, least, most, initial, words, group, label, help,        \
               source)                                                                             \
    ROW(FIELD_NUMBER, section, key, quantity, least, most, initial, NULL, words, group, label,     \
        help, source, id)
#define CHOICE(id, section, key, choices, initial, words, group, label, help, source)              \
    ROW(FIELD_CHOICE, section, key, QUANTITY_NONE, 0, 0, initial, choices, words, group, label,    \
        help, source, id)
#define TEXT(id, section, key, words, group, label, help, source)                                  \
    ROW(FIELD_TEXT, section, key, QUANTITY_NONE, 0, 0, NAN, NULL, words, group, label, help,       \
        source, id)
#define DATE(id, section, key, words, group, label, help, source)                                  \
    ROW(FIELD_DATE, section, key, QUANTITY_NONE, 0, 0, NAN, NULL, words, group, label, help,       \
        source, id)
#define TIME(id, section, key, words, group, label, help, source)                                  \
    ROW(FIELD_TIME, section, key, QUANTITY_NONE, 0, 0, NAN, NULL, words, group, label, help,       \
        source, id)
#define NUMBERS(id, section, key, quantity, least, most, initial, words, group, label, help,       \
                source)                                                                            \
    ROW(FIELD_NUMBERS, section, key, quantity, least, most, initial, NULL, words, group, label,    \
        help, source, id)
#define SPECIAL(id, type, section, key, words, group, label, help, source)                         \
    ROW(FIELD_##type, section, key, QUANTITY_NONE, 0, 0, NAN, NULL, words, group, label, help,     \
        source, id)

const struct field field_table[FIELD_COUNT] = {
#include "job/fields.def"
};

#define REPEATED(type, section, key, quantity, least, most, choices, words, label, help)           \
    {                                                                                              \
        type, section, key, quantity, least, most, NAN, choices, words, GROUP_DRAWING, label,      \
            help, "", 0, true                                                                      \
    }
#define FAR 10000.0 /* m: geometry is kept within 10 km, exact in 1/80 mm */

const struct field repeated_field_table[] = {
    REPEATED(FIELD_POINT, "outline", "point", QUANTITY_LENGTH, -FAR, FAR, NULL, "none", "Corner",
             "x, y of a corner, in order round the slab."),
    REPEATED(FIELD_ARC, "outline", "arc", QUANTITY_LENGTH, -FAR, FAR, NULL, "none", "Arc",
             "End point, centre and left or right: 40, 4 m, centre 36, 4 m, left."),
    REPEATED(FIELD_CHOICE, "opening", "against", QUANTITY_NONE, 0, 0, OPENING_AGAINST_WORDS, "free",
             "Stands against", "free, or wall: soft board all round."),
    REPEATED(FIELD_POINT, "opening", "point", QUANTITY_LENGTH, -FAR, FAR, NULL, "none", "Corner",
             "x, y of a corner of the hole."),
    REPEATED(FIELD_ARC, "opening", "arc", QUANTITY_LENGTH, -FAR, FAR, NULL, "none", "Arc",
             "End point, centre and left or right."),
    REPEATED(FIELD_CHOICE, "object", "kind", QUANTITY_NONE, 0, 0, OBJECT_WORDS, "other", "Kind",
             "What stands in the slab."),
    REPEATED(FIELD_POINT, "object", "at", QUANTITY_LENGTH, -FAR, FAR, NULL, "must be given",
             "Centre", "x, y of its centre."),
    REPEATED(FIELD_SIZE, "object", "size", QUANTITY_LENGTH, 0.01, 1000, NULL,
             "this or diameter must be given", "Size", "Along its own x, along its own y."),
    REPEATED(FIELD_NUMBER, "object", "diameter", QUANTITY_LENGTH, 0.01, 1000, NULL,
             "this or size must be given", "Diameter", "Of a round object."),
    REPEATED(FIELD_NUMBER, "object", "angle", QUANTITY_ANGLE, -360, 360, NULL, "0 deg", "Angle",
             "Turned by so much, anticlockwise."),
    REPEATED(FIELD_CHOICE, "object", "isolate", QUANTITY_NONE, 0, 0, "no yes", "yes", "Soft board",
             "Whether soft board goes round it."),
    REPEATED(FIELD_POINT, "object", "box-at", QUANTITY_LENGTH, -FAR, FAR, NULL, "by the program",
             "Box centre", "A box moved by hand."),
    REPEATED(FIELD_NUMBER, "object", "box-half", QUANTITY_LENGTH, 0.05, 100, NULL, "by the program",
             "Box half diagonal", "A box resized by hand."),
    REPEATED(FIELD_CHOICE, "edge", "against", QUANTITY_NONE, 0, 0, EDGE_AGAINST_WORDS, "free",
             "Touches", "What the side of the slab touches."),
    REPEATED(FIELD_CHOICE, "edge", "treat", QUANTITY_NONE, 0, 0, TREAT_WORDS,
             "match for slab, else isolate", "Treat", "Match its joints, or soft board."),
    REPEATED(FIELD_LIST, "edge", "joints", QUANTITY_LENGTH, 0, FAR, NULL, "none",
             "Neighbour's joints", "Along the side from its first point."),
    REPEATED(FIELD_LINE, "pours", "line", QUANTITY_LENGTH, -FAR, FAR, NULL, "none", "Pour line",
             "x1, y1, x2, y2 of a line between two pours."),
    REPEATED(FIELD_CHOICE, "joint", "kind", QUANTITY_NONE, 0, 0, JOINT_KIND_WORDS, "contraction",
             "Kind", "Kind of the joint you draw."),
    REPEATED(FIELD_POINT, "joint", "from", QUANTITY_LENGTH, -FAR, FAR, NULL, "must be given",
             "From", "Where it begins."),
    REPEATED(FIELD_POINT, "joint", "to", QUANTITY_LENGTH, -FAR, FAR, NULL, "must be given", "To",
             "Where it ends."),
    REPEATED(FIELD_CHOICE, "joint", "keep", QUANTITY_NONE, 0, 0, "no yes", "yes", "Keep",
             "yes: fixed; no: the program draws no joint here."),
    REPEATED(FIELD_POINT, "crack", "point", QUANTITY_LENGTH, -FAR, FAR, NULL, "none", "Crack",
             "x, y along a crack."),
};
const size_t repeated_field_count = sizeof repeated_field_table / sizeof *repeated_field_table;

enum field_id field_id_of(const char *section, const char *key)
{
    for (int id = 0; id < FIELD_COUNT; id++)
        if (strcmp(field_table[id].key, key) == 0 && strcmp(field_table[id].section, section) == 0)
            return (enum field_id)id;
    return FIELD_COUNT;
}

const struct field *field_find(const char *section, const char *key)
{
    enum field_id id = field_id_of(section, key);

    if (id != FIELD_COUNT)
        return &field_table[id];
    for (size_t i = 0; i < repeated_field_count; i++)
        if (strcmp(repeated_field_table[i].key, key) == 0 &&
            strcmp(repeated_field_table[i].section, section) == 0)
            return &repeated_field_table[i];
    return NULL;
}

/* The n-th word of `choices`, not ended by NUL; length 0 outside. */
static const char *word_at(const char *choices, int index, size_t *length)
{
    while (choices != NULL && *choices != '\0') {
        size_t n = strcspn(choices, " ");
        if (index-- == 0) {
            *length = n;
            return choices;
        }
        choices += n;
        choices += strspn(choices, " ");
    }
    *length = 0;
    return "";
}

void field_choice_word(const struct field *field, int index, char *out, size_t size)
{
    size_t length;
    const char *word = index >= 0 ? word_at(field->choices, index, &length) : (length = 0, "");

    snprintf(out, size, "%.*s", (int)length, word);
}

int field_choice_index(const struct field *field, const char *word, size_t length)
{
    for (int i = 0;; i++) {
        size_t n;
        const char *at = word_at(field->choices, i, &n);
        if (n == 0)
            return -1;
        if (n == length && memcmp(at, word, n) == 0)
            return i;
    }
}

const char *field_time_unit(const struct field *field)
{
    if (field->most <= 86400)
        return "h";
    return field->most <= 366 * 86400.0 ? "d" : "a";
}

const char *field_group_word(enum field_group group)
{
    static const char *const words[GROUP_COUNT] = {"drawing", "ticket", "weather", "pour",
                                                   "sealing", "tin",    "the rest"};

    return words[group];
}

static void add_bar(struct text *out, const struct bar *bar, enum unit_system units, bool write)
{
    void (*add)(struct text *, double, enum quantity, enum unit_system) =
        write ? unit_write : unit_show;

    if (!(bar->diameter > 0)) {
        text_add(out, "none");
        return;
    }
    add(out, bar->diameter, QUANTITY_SMALL_LENGTH, units);
    text_add(out, " x ");
    add(out, bar->length, QUANTITY_SMALL_LENGTH, units);
    text_add(out, " at ");
    add(out, bar->spacing, QUANTITY_SMALL_LENGTH, units);
}

/* Volumes are packs and stay in millilitres, as they are sold. */
static void add_numbers(struct text *out, const struct field *field, const struct numbers *numbers,
                        enum unit_system units, bool write)
{
    bool pack = field->quantity == QUANTITY_VOLUME;

    if (numbers->count == 0)
        text_add(out, write ? "" : field->words);
    for (size_t i = 0; i < numbers->count; i++) {
        text_add(out, i > 0 ? ", " : "");
        if (write && pack)
            unit_write_as(out, numbers->items[i], field->quantity, "ml");
        else if (write)
            unit_write(out, numbers->items[i], field->quantity, units);
        else
            unit_show(out, numbers->items[i], field->quantity, pack ? UNITS_METRIC : units);
    }
}

static void add_counts(struct text *out, unsigned bits)
{
    bool first = true;

    for (int i = 0; i < 6; i++) {
        size_t length;
        const char *word = word_at(COUNTS_WORDS, i, &length);
        if ((bits & (1U << i)) == 0)
            continue;
        text_add(out, first ? "" : ", ");
        text_add_bytes(out, word, length);
        first = false;
    }
    if (first)
        text_add(out, "none");
}

static void add_strength(struct text *out, const struct strength *strength, enum unit_system units,
                         bool write)
{
    if (strength->typed[0] != '\0')
        text_add(out, strength->typed);
    else if (write)
        unit_write(out, strength->cylinder, QUANTITY_STRESS, units);
    else
        unit_show(out, strength->cylinder, QUANTITY_STRESS, units);
}

static void add_number(struct text *out, const struct field *field, double value,
                       enum unit_system units, bool write)
{
    if (!isfinite(value))
        text_add(out, write ? "" : field->words[0] != '\0' ? field->words : "none");
    else if (write && field->quantity == QUANTITY_TIME)
        unit_write_as(out, value, QUANTITY_TIME, field_time_unit(field));
    else if (write)
        unit_write(out, value, field->quantity, units);
    else
        unit_show(out, value, field->quantity, units);
}

static void add_choice(struct text *out, const struct field *field, int index)
{
    size_t length;
    const char *word = word_at(field->choices, index, &length);

    text_add_bytes(out, word, length);
}

static void add_value(struct text *out, const struct job *job, enum field_id id,
                      enum unit_system units, bool write)
{
    const struct field *field = &field_table[id];
    const void *place = (const char *)job + field->offset;

    switch (field->type) {
    case FIELD_NUMBER:
        add_number(out, field, *(const double *)place, units, write);
        break;
    case FIELD_CHOICE:
        add_choice(out, field, *(const int *)place);
        break;
    case FIELD_TEXT:
        text_add(out, place);
        break;
    case FIELD_DATE: {
        const struct date *date = place;
        if (date->year != 0)
            text_format(out, "%04d-%02d-%02d", date->year, date->month, date->day);
        else if (!write)
            text_add(out, field->words);
        break;
    }
    case FIELD_TIME: {
        const struct time_of_day *time = place;
        if (job->given[id])
            text_format(out, "%02d:%02d", time->minutes / 60, time->minutes % 60);
        else if (!write)
            text_add(out, field->words);
        break;
    }
    case FIELD_BAR:
        add_bar(out, place, units, write);
        break;
    case FIELD_STRENGTH:
        add_strength(out, place, units, write);
        break;
    case FIELD_AGGREGATE: {
        int row = ((const struct aggregate *)place)->row;
        text_add(out, row < 0 ? "unknown" : aggregate_table[row].name);
        break;
    }
    case FIELD_CLASS:
        text_add(out, ((const struct movement_class *)place)->word);
        break;
    case FIELD_NUMBERS:
        add_numbers(out, field, place, units, write);
        break;
    case FIELD_COUNTS:
        add_counts(out, ((const struct counts *)place)->bits);
        break;
    default:
        break;
    }
}

void field_show(struct text *out, const struct job *job, enum field_id id, enum unit_system units)
{
    add_value(out, job, id, units, false);
}

void field_write(struct text *out, const struct job *job, enum field_id id, enum unit_system units)
{
    add_value(out, job, id, units, true);
}
