#include "job/value_list.h"
#include "base/array.h"
#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

enum { UNIT_MOST = 24 };

struct piece {
    size_t at, length; /* in the value, blanks cut */
};
struct pieces {
    struct piece *items;
    size_t count, capacity;
};

static struct piece trim(const struct value *value, size_t from, size_t to)
{
    while (from < to && (value->bytes[from] == ' ' || value->bytes[from] == '\t'))
        from++;
    while (to > from && (value->bytes[to - 1] == ' ' || value->bytes[to - 1] == '\t'))
        to--;
    return (struct piece){from, to - from};
}

static bool add_piece(struct pieces *pieces, struct piece piece)
{
    if (!array_reserve((void **)&pieces->items, &pieces->capacity, pieces->count + 1,
                       sizeof *pieces->items))
        return false;
    pieces->items[pieces->count++] = piece;
    return true;
}

/* Splits at commas; false on no memory, which the findings then say. */
static bool split(const struct value *value, struct pieces *pieces)
{
    size_t from = 0;

    for (size_t i = 0; i <= value->count; i++)
        if (i == value->count || value->bytes[i] == ',') {
            if (!add_piece(pieces, trim(value, from, i))) {
                value->findings->failed = true;
                return false;
            }
            from = i + 1;
        }
    return true;
}

static bool is_number_char(char c)
{
    return (c >= '0' && c <= '9') || c == '.' || c == '+' || c == '-' || c == '/';
}

/* The unit a member was written with: feet for 13'-4", else the word behind the number; "" = none.
 */
static void piece_unit(const struct value *value, struct piece piece, char unit[UNIT_MOST])
{
    const char *bytes = value->bytes + piece.at;
    size_t start = piece.length;

    unit[0] = '\0';
    if (memchr(bytes, '\'', piece.length) != NULL) {
        snprintf(unit, UNIT_MOST, "ft");
        return;
    }
    while (start > 0 && bytes[start - 1] != ' ' && !is_number_char(bytes[start - 1]))
        start--;
    if (piece.length - start < UNIT_MOST)
        snprintf(unit, UNIT_MOST, "%.*s", (int)(piece.length - start), bytes + start);
}

/* A member's value; its unit becomes the one for the members to its left. */
static bool read_piece(const struct value *value, struct piece piece, enum quantity quantity,
                       char unit[UNIT_MOST], double *si)
{
    struct value part = *value;
    char own[UNIT_MOST];
    struct unit_reading reading =
        unit_read(value->bytes + piece.at, piece.length, quantity, unit[0] != '\0' ? unit : NULL);

    part.bytes += piece.at;
    part.count = piece.length;
    for (size_t i = 0; i < piece.at; i++)
        part.column += ((unsigned char)value->bytes[i] & 0xC0) != 0x80;
    if (reading.problem != NULL) {
        value_refuse_reading(&part, &reading, quantity);
        return false;
    }
    if (reading.length != piece.length) {
        value_refuse(&part, value_skip_blanks(&part, reading.length), "",
                     "has something after the value; a comma separates "
                     "values");
        return false;
    }
    piece_unit(value, piece, own);
    if (reading.has_unit && own[0] != '\0')
        memcpy(unit, own, sizeof own);
    *si = reading.si;
    return true;
}

/* Reads pieces from the right, so that a unit serves the members to its left. */
static bool read_pieces(const struct value *value, const struct piece *pieces, size_t count,
                        enum quantity quantity, double *out)
{
    char unit[UNIT_MOST] = "";

    for (size_t i = count; i-- > 0;)
        if (!read_piece(value, pieces[i], quantity, unit, &out[i]))
            return false;
    return true;
}

static const struct field coordinate = {.type = FIELD_NUMBER,
                                        .label = "A coordinate",
                                        .quantity = QUANTITY_LENGTH,
                                        .least = -10000,
                                        .most = 10000};

/* Exactly `count` members of a length, each a coordinate. */
static bool read_coordinates(const struct value *value, size_t count, const char *form, double *out)
{
    struct pieces pieces = {0};
    double members[8];
    bool good = split(value, &pieces);

    if (good && pieces.count != count) {
        value_refuse(value, 0, form, "has %zu values, not %zu; write %s", pieces.count, count,
                     form);
        good = false;
    }
    good = good && read_pieces(value, pieces.items, count, QUANTITY_LENGTH, members);
    for (size_t i = 0; good && i < count; i++)
        good = value_within(value, &coordinate, members[i]);
    if (good)
        memcpy(out, members, count * sizeof *out);
    free(pieces.items);
    return good;
}

bool value_read_point(const struct value *value, double *x, double *y)
{
    double members[2];

    if (!read_coordinates(value, 2, "x, y with a unit, such as 36, 0 m", members))
        return false;
    *x = members[0];
    *y = members[1];
    return true;
}

bool value_read_line(const struct value *value, struct pour_line *line)
{
    double members[4];

    if (!read_coordinates(value, 4, "x1, y1, x2, y2 with a unit, such as 0, 12, 36, 12 m", members))
        return false;
    if (hypot(members[0] - members[2], members[1] - members[3]) < 1e-3) {
        value_refuse(value, 0, "", "has no length; its two ends are one point");
        return false;
    }
    line->x1 = members[0];
    line->y1 = members[1];
    line->x2 = members[2];
    line->y2 = members[3];
    return true;
}

/* ---- arcs: x, y, centre cx, cy, left ---- */

static const char arc_form[] = "end point, centre and side, such as 40, 4 m, centre 36, 4 m, left";

/* Cuts the word `centre` off the third piece and reads left or right from the fifth. */
static bool arc_words(const struct value *value, struct piece *pieces, bool *left)
{
    const char *centre = value->bytes + pieces[2].at, *side = value->bytes + pieces[4].at;

    if (pieces[2].length < 8 || memcmp(centre, "centre", 6) != 0 ||
        (centre[6] != ' ' && centre[6] != '\t'))
        return false;
    pieces[2] = trim(value, pieces[2].at + 6, pieces[2].at + pieces[2].length);
    *left = pieces[4].length == 4 && memcmp(side, "left", 4) == 0;
    return *left || (pieces[4].length == 5 && memcmp(side, "right", 5) == 0);
}

static bool read_arc(const struct value *value, struct row *row)
{
    struct pieces pieces = {0};
    double members[4];
    bool left = false, good = split(value, &pieces);

    if (good && (pieces.count != 5 || !arc_words(value, pieces.items, &left))) {
        value_refuse(value, 0, arc_form, "is no arc; write %s", arc_form);
        good = false;
    }
    good = good && read_pieces(value, pieces.items, 4, QUANTITY_LENGTH, members);
    for (size_t i = 0; good && i < 4; i++)
        good = value_within(value, &coordinate, members[i]);
    if (good) {
        row->arc = true;
        row->left = left;
        row->x = members[0];
        row->y = members[1];
        row->cx = members[2];
        row->cy = members[3];
    }
    free(pieces.items);
    return good;
}

bool value_read_row(const struct value *value, bool arc, struct row *row)
{
    if (arc)
        return read_arc(value, row);
    row->arc = row->left = false;
    row->cx = row->cy = 0;
    return value_read_point(value, &row->x, &row->y);
}

/* ---- a x b ---- */

/* Splits at the first x or multiplication sign; false when there is none. */
static bool split_size(const struct value *value, size_t end, struct piece *first,
                       struct piece *second)
{
    for (size_t i = 0; i < end; i++) {
        bool cross = i + 1 < end && (unsigned char)value->bytes[i] == 0xC3 &&
                     (unsigned char)value->bytes[i + 1] == 0x97;
        if (value->bytes[i] == 'x' || cross) {
            *first = trim(value, 0, i);
            *second = trim(value, i + (cross ? 2 : 1), end);
            return true;
        }
    }
    return false;
}

bool value_read_size(const struct value *value, const struct field *field, double *w, double *d)
{
    struct piece pieces[2];
    double members[2];

    if (!split_size(value, value->count, &pieces[0], &pieces[1])) {
        value_refuse(value, 0, "", "is no size; write two lengths, such as 0.4 x 0.4 m");
        return false;
    }
    if (!read_pieces(value, pieces, 2, field->quantity, members))
        return false;
    for (size_t i = 0; i < 2; i++)
        if (members[i] < field->least || members[i] > field->most) {
            value_refuse(value, 0, "10 mm to 1000 m",
                         "is too small or too large: each side may be "
                         "10 mm to 1000 m");
            return false;
        }
    *w = members[0];
    *d = members[1];
    return true;
}

/* diameter x length at spacing */
bool value_read_bar(const struct value *value, struct bar *place)
{
    static const double least[] = {0.004, 0.1, 0.05}, most[] = {0.1, 3, 3};
    struct piece pieces[3];
    double members[3];
    const char *at = NULL;

    if (value->count == 4 && memcmp(value->bytes, "none", 4) == 0) {
        *place = (struct bar){0};
        return true;
    }
    for (size_t i = 1; i + 4 <= value->count && at == NULL; i++)
        if (memcmp(value->bytes + i, " at ", 4) == 0)
            at = value->bytes + i;
    if (at == NULL || !split_size(value, (size_t)(at - value->bytes), &pieces[0], &pieces[1])) {
        value_refuse(value, 0, "", "is no bar; write none, or 32 x 450 mm at 300 mm");
        return false;
    }
    pieces[2] = trim(value, (size_t)(at - value->bytes) + 4, value->count);
    if (!read_pieces(value, pieces, 3, QUANTITY_SMALL_LENGTH, members))
        return false;
    for (size_t i = 0; i < 3; i++)
        if (members[i] < least[i] || members[i] > most[i]) {
            value_refuse(value, 0, "",
                         "is out of range: diameter 4 to 100 mm, length 0.1 to 3 m, "
                         "spacing 50 mm to 3 m");
            return false;
        }
    *place = (struct bar){members[0], members[1], members[2]};
    return true;
}

bool value_read_numbers(const struct value *value, const struct field *field, struct numbers *place)
{
    struct pieces pieces = {0};
    struct numbers numbers = {0};
    bool good = split(value, &pieces);

    if (good && pieces.count > NUMBERS_MOST) {
        value_refuse(value, 0, "8", "names too many; at most 8");
        good = false;
    }
    good = good && read_pieces(value, pieces.items, pieces.count, field->quantity, numbers.items);
    for (size_t i = 0; good && i < pieces.count; i++)
        good = value_within(value, field, numbers.items[i]);
    numbers.count = pieces.count;
    if (good)
        *place = numbers;
    free(pieces.items);
    return good;
}

bool value_read_counts(const struct value *value, struct counts *place)
{
    static const struct field words = {.type = FIELD_CHOICE, .choices = COUNTS_WORDS};
    struct pieces pieces = {0};
    unsigned bits = 0;
    bool good = split(value, &pieces);

    for (size_t i = 0; good && i < pieces.count; i++) {
        int index =
            field_choice_index(&words, value->bytes + pieces.items[i].at, pieces.items[i].length);
        if (pieces.count == 1 && pieces.items[0].length == 4 &&
            memcmp(value->bytes, "none", 4) == 0)
            break;
        if (index < 0) {
            value_refuse(value, pieces.items[i].at, COUNTS_WORDS,
                         "holds a word that is none of: %s", COUNTS_WORDS);
            good = false;
        } else {
            bits |= 1U << index;
        }
    }
    if (good)
        place->bits = bits;
    free(pieces.items);
    return good;
}

bool value_read_list(const struct value *value, const struct field *field, double **items,
                     size_t *count)
{
    struct pieces pieces = {0};
    double *members = NULL;
    bool good = split(value, &pieces);

    if (good) {
        members = calloc(pieces.count, sizeof *members);
        value->findings->failed = value->findings->failed || members == NULL;
    }
    good = good && members != NULL &&
           read_pieces(value, pieces.items, pieces.count, field->quantity, members);
    for (size_t i = 0; good && i < pieces.count; i++)
        good = value_within(value, field, members[i]);
    if (good) {
        *items = members;
        *count = pieces.count;
    } else {
        free(members);
    }
    free(pieces.items);
    return good;
}
