#include "ui/own.h"
#include "base/unit.h"
#include "job/field.h"
#include <math.h>
#include <stdio.h>
#include <string.h>

static const char *const shape_words[] = {"rectangle", "L",          "U",     "T",
                                          "strip",     "hole in it", "taper", "sides typed in"};
static const char *const corner_words[] = {"north-east", "north-west", "south-east", "south-west"};

/* Sizes asked for each shape. */
static const char *const size_labels[OWN_SHAPES][4] = {
    {"whole length, west to east", "whole width, south to north", NULL, NULL},
    {"whole length, west to east", "whole width, south to north", "missing corner, west to east",
     "missing corner, south to north"},
    {"whole length, west to east", "whole width, south to north", "bay in it, west to east",
     "bay, how deep from the north"},
    {"whole length, west to east", "whole width, south to north", "stem, west to east",
     "bar at the north, how wide"},
    {"whole length, west to east", "whole width, south to north", NULL, NULL},
    {"whole length, west to east", "whole width, south to north", "hole, west to east",
     "hole, south to north"},
    {"whole length, west to east", "width at the west end", "width at the east end", NULL},
    {NULL, NULL, NULL, NULL}};

const char *own_shape_word(int shape)
{
    return shape_words[shape];
}

const char *own_size_label(int shape, int size)
{
    return size_labels[shape][size];
}

const char *own_corner_word(int corner)
{
    return corner_words[corner];
}

static bool asked(const struct own *own, enum own_question question)
{
    switch (question) {
    case OWN_USE:
    case OWN_PRACTICE:
    case OWN_THICKNESS:
        return !own->reshape;
    case OWN_SHAPE:
        return true;
    case OWN_CORNER:
        return own->shape == OWN_L;
    case OWN_SIDES:
        return own->shape == OWN_CORNERS;
    default:
        return size_labels[own->shape][question - OWN_A] != NULL;
    }
}

bool own_question(const struct own *own, int step, enum own_question *question)
{
    for (int i = OWN_USE; i <= OWN_THICKNESS; i++)
        if (asked(own, (enum own_question)i) && step-- == 0) {
            *question = (enum own_question)i;
            return true;
        }
    return false;
}

/* A size as people type it: "36", "36,5 m", "118'-1\"". */
static const char *length_unit(const struct own *own)
{
    return own->practice == PRACTICE_US ? "ft" : "m";
}

static bool read_size(const char *string, const char *unit, double *metres, struct text *trouble,
                      const char *what)
{
    char plain[OWN_SIZE_MOST];
    struct unit_reading reading;

    snprintf(plain, sizeof plain, "%s", string);
    for (char *c = plain; *c != '\0'; c++)
        if (*c == ',')
            *c = '.';
    reading = unit_read(plain, strlen(plain), QUANTITY_LENGTH, unit);
    if (plain[0] == '\0' || reading.problem != NULL || reading.length != strlen(plain)) {
        text_format(trouble, "%s: type a length, such as 36, 36.5 m or 118 ft.", what);
        return false;
    }
    if (reading.si < 0.3 || reading.si > 2000) {
        text_format(trouble, "%s: from 0.3 m to 2000 m.", what);
        return false;
    }
    *metres = reading.si;
    return true;
}

static void corner(struct own_outline *outline, double x, double y)
{
    outline->x[outline->count] = x;
    outline->y[outline->count++] = y;
}

static void rectangle(struct own_outline *outline, double a, double b)
{
    corner(outline, 0, 0);
    corner(outline, a, 0);
    corner(outline, a, b);
    corner(outline, 0, b);
}

/* The missing corner at the north-east, turned over for the others. */
static void make_l(struct own_outline *outline, const double *size, int which)
{
    double a = size[0], b = size[1], c = size[2], d = size[3];
    bool west = which == 1 || which == 3, south = which >= 2;

    corner(outline, 0, 0);
    corner(outline, a, 0);
    corner(outline, a, b - d);
    corner(outline, a - c, b - d);
    corner(outline, a - c, b);
    corner(outline, 0, b);
    for (int i = 0; i < outline->count; i++) {
        outline->x[i] = west ? a - outline->x[i] : outline->x[i];
        outline->y[i] = south ? b - outline->y[i] : outline->y[i];
    }
    if (west != south) /* one mirror turns the ring round */
        for (int i = 0; i < outline->count / 2; i++) {
            int j = outline->count - 1 - i;
            double x = outline->x[i], y = outline->y[i];
            outline->x[i] = outline->x[j], outline->y[i] = outline->y[j];
            outline->x[j] = x, outline->y[j] = y;
        }
}

static void make_u(struct own_outline *outline, const double *s)
{
    double west = (s[0] - s[2]) / 2;

    corner(outline, 0, 0);
    corner(outline, s[0], 0);
    corner(outline, s[0], s[1]);
    corner(outline, west + s[2], s[1]);
    corner(outline, west + s[2], s[1] - s[3]);
    corner(outline, west, s[1] - s[3]);
    corner(outline, west, s[1]);
    corner(outline, 0, s[1]);
}

static void make_t(struct own_outline *outline, const double *s)
{
    double west = (s[0] - s[2]) / 2;

    corner(outline, west, 0);
    corner(outline, west + s[2], 0);
    corner(outline, west + s[2], s[1] - s[3]);
    corner(outline, s[0], s[1] - s[3]);
    corner(outline, s[0], s[1]);
    corner(outline, 0, s[1]);
    corner(outline, 0, s[1] - s[3]);
    corner(outline, west, s[1] - s[3]);
}

static bool inner_fits(const struct own *own, const double *s, struct text *trouble)
{
    bool inside =
        own->shape == OWN_L || own->shape == OWN_U || own->shape == OWN_T || own->shape == OWN_HOLE;

    if (inside && (s[2] >= s[0] || s[3] >= s[1])) {
        text_format(trouble, "%s: c must be less than a, and d less than b.",
                    own_shape_word(own->shape));
        return false;
    }
    return true;
}

bool own_make_outline(const struct own *own, struct own_outline *outline, struct text *trouble)
{
    double size[4] = {0};

    *outline = (struct own_outline){0};
    if (own->shape == OWN_CORNERS)
        return own_read_sides(own->sides, length_unit(own), outline, trouble);
    for (int i = 0; i < 4; i++)
        if (size_labels[own->shape][i] != NULL &&
            !read_size(own->size[i], length_unit(own), &size[i], trouble,
                       size_labels[own->shape][i]))
            return false;
    if (!inner_fits(own, size, trouble))
        return false;
    if (own->shape == OWN_L) {
        make_l(outline, size, own->corner);
    } else if (own->shape == OWN_U) {
        make_u(outline, size);
    } else if (own->shape == OWN_T) {
        make_t(outline, size);
    } else if (own->shape == OWN_TAPER) {
        corner(outline, 0, 0);
        corner(outline, size[0], 0);
        corner(outline, size[0], size[2]);
        corner(outline, 0, size[1]);
    } else {
        rectangle(outline, size[0], size[1]);
    }
    if (own->shape == OWN_HOLE) {
        outline->hole[0] = (size[0] - size[2]) / 2;
        outline->hole[1] = (size[1] - size[3]) / 2;
        outline->hole[2] = (size[0] + size[2]) / 2;
        outline->hole[3] = (size[1] + size[3]) / 2;
    }
    return true;
}

/* One side: "12.5 north". Returns false at anything else. */
static bool read_side(const char *piece, size_t length, const char *unit, double *x, double *y)
{
    static const struct {
        const char *word;
        int x, y;
    } ways[] = {{"east", 1, 0}, {"north", 0, 1}, {"west", -1, 0}, {"south", 0, -1}};
    struct unit_reading reading = unit_read_number(piece, length);
    const char *rest;

    if (reading.problem == NULL) {
        struct unit_reading with = unit_read(piece, length, QUANTITY_LENGTH, unit);
        if (with.problem == NULL && with.length >= reading.length)
            reading = with;
    }
    if (reading.problem != NULL || !(reading.si > 0))
        return false;
    rest = piece + reading.length;
    rest += strspn(rest, " ");
    for (size_t i = 0; i < 4; i++) {
        size_t n = strlen(ways[i].word), left = (size_t)(piece + length - rest);
        if (left >= 1 && left <= n && strncmp(rest, ways[i].word, left) == 0) {
            *x += ways[i].x * reading.si;
            *y += ways[i].y * reading.si;
            return true;
        }
    }
    return false;
}

static bool check_closed(struct own_outline *outline, double x, double y, struct text *trouble)
{
    if (fabs(x) < 0.0005 && fabs(y) < 0.0005) {
        outline->count--; /* the last corner is the first */
    } else if (fabs(x) > 0.0005 && fabs(y) > 0.0005) {
        text_format(trouble, "These sides end %.2f m %s and %.2f m %s of the start.", fabs(x),
                    x > 0 ? "east" : "west", fabs(y), y > 0 ? "north" : "south");
        return false;
    }
    if (outline->count < 4) {
        text_add(trouble, "Type at least four sides, such as 36 east, 24 north, 36 west, close.");
        return false;
    }
    return true;
}

bool own_read_sides(const char *string, const char *unit, struct own_outline *outline,
                    struct text *trouble)
{
    double x = 0, y = 0;

    *outline = (struct own_outline){0};
    corner(outline, 0, 0);
    while (*string != '\0') {
        size_t length = strcspn(string, ",;"), end;
        const char *piece = string + strspn(string, " ");
        string += length + (string[length] != '\0');
        end = (size_t)(string - piece);
        while (end > 0 && strchr(" ,;", piece[end - 1]) != NULL)
            end--;
        if (end == 0 || (end >= 1 && strncmp(piece, "close", end < 5 ? end : 5) == 0))
            continue;
        if (!read_side(piece, end, unit, &x, &y) || outline->count >= OWN_CORNERS_MOST - 1) {
            text_format(trouble, "'%.*s': write sides like 36 east, 12 north, 12 west, close.",
                        (int)(end < 40 ? end : 40), piece);
            return false;
        }
        corner(outline, x, y);
    }
    return check_closed(outline, x, y, trouble);
}

static void add_point(struct text *out, double x, double y)
{
    text_add(out, "point = ");
    unit_add_number(out, x, 6);
    text_add(out, ", ");
    unit_add_number(out, y, 6);
    text_add(out, " m\n");
}

bool own_write(const struct own *own, struct text *out, struct text *trouble)
{
    struct own_outline outline;
    struct unit_reading thickness;
    char word[CHOICE_MOST];

    if (!own_make_outline(own, &outline, trouble))
        return false;
    thickness = unit_read(own->thickness, strlen(own->thickness), QUANTITY_SMALL_LENGTH,
                          own->practice == PRACTICE_US ? "in" : "mm");
    if (own->thickness[0] == '\0' || thickness.problem != NULL ||
        thickness.length != strlen(own->thickness)) {
        text_add(trouble, "Thickness: read it from the drawing, such as 150 mm or 6 in.");
        return false;
    }
    text_add(out, "format = 1\n[job]\n");
    field_choice_word(&field_table[FIELD_job_practice], own->practice, word, sizeof word);
    text_format(out, "practice = %s\n", word);
    if (own->practice == PRACTICE_US)
        text_add(out, "units = us\n");
    field_choice_word(&field_table[FIELD_slab_use], own->use, word, sizeof word);
    text_format(out, "[slab]\nuse = %s\n", word);
    text_add(out, "thickness = ");
    unit_write(out, thickness.si, QUANTITY_SMALL_LENGTH,
               own->practice == PRACTICE_US ? UNITS_US : UNITS_METRIC);
    text_add(out, "\n");
    text_add(out, "[outline]\n");
    for (int i = 0; i < outline.count; i++)
        add_point(out, outline.x[i], outline.y[i]);
    if (outline.hole[2] > outline.hole[0]) {
        const double *h = outline.hole;
        text_add(out, "[opening hole]\n");
        add_point(out, h[0], h[1]);
        add_point(out, h[2], h[1]);
        add_point(out, h[2], h[3]);
        add_point(out, h[0], h[3]);
    }
    return !out->failed;
}
