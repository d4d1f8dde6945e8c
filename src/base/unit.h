/* Quantities and units. SI inside: m, Pa, K, s, m3, kg; temperatures in degC, angles in degrees.
 * A unit has a scale AND an offset; a temperature difference is a quantity of its own.
 * All factors are exact by definition (inch 25.4 mm, lbf 4.4482216152605 N, US gal 231 in3). */
#ifndef SLABGAP_BASE_UNIT_H
#define SLABGAP_BASE_UNIT_H

#include <stdbool.h>
#include <stddef.h>
#include "base/text.h"

enum quantity {
    QUANTITY_NONE,         /* plain number: counts, steps */
    QUANTITY_LENGTH,       /* m; shown in m or ft-in */
    QUANTITY_SMALL_LENGTH, /* m; shown in mm or inches (thickness, width, depth) */
    QUANTITY_STRESS,       /* Pa */
    QUANTITY_SUBGRADE,     /* Pa/m: MPa/m kN/m3 pci */
    QUANTITY_UNIT_WEIGHT,  /* N/m3: kN/m3 pcf(lbf/ft3) */
    QUANTITY_TEMPERATURE,  /* degC */
    QUANTITY_DIFFERENCE,   /* K */
    QUANTITY_GRADIENT,     /* K/m: K/m degF/in */
    QUANTITY_PER_KELVIN,   /* 1/K: /K /degC /degF 1/K */
    QUANTITY_STRAIN,       /* none or microstrain */
    QUANTITY_RATIO,        /* none or % */
    QUANTITY_VOLUME,       /* m3: ml l m3 floz gal */
    QUANTITY_DENSITY,      /* kg/m3: kg/m3 pcf */
    QUANTITY_SPEED,        /* m/s: m/s km/h mph */
    QUANTITY_PACE,         /* m/s: m/h ft/h m/min */
    QUANTITY_VOLUME_RATE,  /* m3/s: m3/h yd3/h */
    QUANTITY_ANGLE,        /* degrees */
    QUANTITY_TIME,         /* s: s min h d a (a = 365.25 d) */
    QUANTITY_COUNT_OF_QUANTITIES
};

enum unit_system { UNITS_METRIC, UNITS_US };

/* Result of reading a quantity. `problem` is NULL on success, else a sentence that begins small and
 * says what to do ("a comma separates values; write 0.2"); `at` is the byte offset of the trouble.
 */
struct unit_reading {
    double si;
    bool has_unit;
    size_t length;       /* bytes consumed, trailing blanks not included */
    const char *problem; /* static text */
    size_t at;
};

/* Reads `number [unit]`, feet and inches (13'-4", 3/8 in) from the start of `text` (docs/format.md,
 * grammar). `default_scale_unit` names the unit used when none is written (NULL: the quantity's
 * metric file unit). Never reads nan, inf, hex, thousands signs. */
struct unit_reading unit_read(const char *text, size_t count, enum quantity quantity,
                              const char *default_unit);
/* Reads only a number by the grammar; same rules. */
struct unit_reading unit_read_number(const char *text, size_t count);
/* value in SI of `number` in the named unit of that quantity; false for no such unit. */
bool unit_to_si(double number, const char *unit, enum quantity quantity, double *si);
bool unit_from_si(double si, const char *unit, enum quantity quantity, double *number);
/* The unit a value is written or shown with, e.g. "mm"; "" for plain numbers. */
const char *unit_name(enum quantity quantity, enum unit_system system);
/* Lists the units of a quantity for a message: "mm cm m km in ft". */
const char *unit_list(enum quantity quantity);
/* What a tape shows: millimetres (4.000 m) or feet, inches and sixteenths, however long. */
void unit_show_tape(struct text *out, double metres, enum unit_system system);
/* Adds a value for people: 200 mm, 13'-4", 3/8 in, 15 °C, 59 °F, 25 %. Decimals as the trade
 * writes; a length in US units to the nearest 1/16 in as feet-inches. Never nan or inf: prints
 * "none". */
void unit_show(struct text *out, double si, enum quantity quantity, enum unit_system system);
/* Adds a value that reads back to the same double to 1e-12 relative, for the job file. */
void unit_write(struct text *out, double si, enum quantity quantity, enum unit_system system);
/* The same in a unit of your choice; adds nothing for nan, inf or an unknown unit. */
void unit_write_as(struct text *out, double si, enum quantity quantity, const char *unit);
/* Shortest exact-enough decimal: at most `decimals`, trailing zeros cut. */
void unit_add_number(struct text *out, double number, int decimals);

#endif
