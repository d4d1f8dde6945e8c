/* Quantities for people and for the job file. */
#include "base/unit_table.h"
#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

/* Fixed decimals with trailing zeros cut, but `least` decimals kept. */
static void add_fixed(struct text *out, double number, int decimals, int least)
{
    char digits[400];
    size_t length;
    char *dot;

    snprintf(digits, sizeof digits, "%.*f", decimals, number);
    dot = strchr(digits, '.');
    length = strlen(digits);
    while (dot != NULL && digits[length - 1] == '0' &&
           length - (size_t)(dot - digits) - 1 > (size_t)least)
        digits[--length] = '\0';
    if (dot != NULL && digits[length - 1] == '.')
        digits[--length] = '\0';
    if (strcmp(digits, "-0") == 0 || strcmp(digits, "-0.0") == 0)
        memmove(digits, digits + 1, strlen(digits));
    text_add(out, digits);
}

void unit_add_number(struct text *out, double number, int decimals)
{
    if (isfinite(number))
        add_fixed(out, number, decimals, 0);
    else
        text_add(out, "none");
}

/* Inches as the trade writes them: 3/16, 1 1/2, else decimals. */
static void add_inches(struct text *out, double inches, bool always_sixteenths)
{
    double sixteenths = round(fabs(inches) * 16);
    long whole = (long)(sixteenths / 16), rest = (long)sixteenths % 16, bottom = 16;
    bool fits = fabs(fabs(inches) - sixteenths / 16) < 0.0015 && sixteenths > 0;

    if (!always_sixteenths && !fits) {
        add_fixed(out, inches, fabs(inches) < 0.01 ? 4 : 3, 0);
        return;
    }
    while (rest > 0 && rest % 2 == 0) {
        rest /= 2;
        bottom /= 2;
    }
    if (inches < 0 && sixteenths > 0)
        text_add(out, "-");
    if (rest == 0)
        text_format(out, "%ld", whole);
    else if (whole == 0)
        text_format(out, "%ld/%ld", rest, bottom);
    else
        text_format(out, "%ld %ld/%ld", whole, rest, bottom);
}

static void add_feet_inches(struct text *out, double metres)
{
    double sixteenths = round(fabs(metres) / 0.0254 * 16);
    double feet = floor(sixteenths / 192), inches = (sixteenths - 192 * feet) / 16;

    if (metres < 0 && sixteenths > 0)
        text_add(out, "-");
    text_format(out, "%.0f'-", feet);
    add_inches(out, inches, true);
    text_add(out, "\"");
}

static void show_feet(struct text *out, double metres)
{
    if (fabs(metres) < 100 * 0.3048) {
        add_feet_inches(out, metres);
        return;
    }
    add_fixed(out, metres / 0.3048, fabs(metres) >= 1000 * 0.3048 ? 0 : 1, 0);
    text_add(out, " ft");
}

void unit_show_tape(struct text *out, double metres, enum unit_system system)
{
    if (!isfinite(metres))
        text_add(out, "none");
    else if (system == UNITS_US)
        add_feet_inches(out, metres);
    else
        text_format(out, "%.3f m", fabs(metres) < 0.0005 ? 0.0 : metres);
}

static void show_length(struct text *out, double si, enum unit_system system)
{
    double size = fabs(si);

    if (system == UNITS_US) {
        show_feet(out, si);
        return;
    }
    if (size < 99.995)
        add_fixed(out, si, 2, 1);
    else
        add_fixed(out, si, size < 999.95 ? 1 : 0, 0);
    text_add(out, " m");
}

static void show_small(struct text *out, double si, enum unit_system system)
{
    double mm = si * 1000;

    if (system == UNITS_US) {
        add_inches(out, si / 0.0254, false);
        text_add(out, " in");
        return;
    }
    add_fixed(out, mm, fabs(mm) < 9.995 ? 2 : 1, 0);
    text_add(out, " mm");
}

static void show_volume(struct text *out, double si, enum unit_system system)
{
    const double size = fabs(si);
    const char *unit = system == UNITS_US ? (size < 0.5 * 3.785411784e-3 ? "floz"
                                             : size < 2 * 0.764554857984 ? "gal"
                                                                         : "yd3")
                                          : (size < 1e-3 ? "ml"
                                             : size < 2  ? "l"
                                                         : "m3");
    double number = si;

    unit_from_si(si, unit, QUANTITY_VOLUME, &number);
    add_fixed(out, number, 1, 0);
    text_format(out, " %s", unit);
}

static void show_time(struct text *out, double seconds)
{
    static const struct {
        double least, size;
        const char *word;
    } scales[] = {{2 * 365.25 * 86400, 365.25 * 86400, "years"},
                  {2 * 86400.0, 86400, "days"},
                  {3600, 3600, "h"},
                  {0, 60, "min"}};

    for (size_t i = 0; i < sizeof scales / sizeof *scales; i++)
        if (fabs(seconds) >= scales[i].least) {
            add_fixed(out, seconds / scales[i].size, 1, 0);
            text_format(out, " %s", scales[i].word);
            return;
        }
}

/* Millionths: 10e-6, 200e-6. */
static void show_millionths(struct text *out, double number)
{
    add_fixed(out, number * 1e6, 2, 0);
    text_add(out, "e-6");
}

static const struct {
    const char *metric, *us; /* the unit it is shown in */
    int decimals, decimals_us;
    const char *sign, *sign_us; /* printed after a blank */
} plain[QUANTITY_COUNT_OF_QUANTITIES] = {
    [QUANTITY_NONE] = {"", "", 3, 3, "", ""},
    [QUANTITY_STRESS] = {"MPa", "psi", 2, 0, "MPa", "psi"},
    [QUANTITY_SUBGRADE] = {"MPa/m", "pci", 1, 0, "MPa/m", "pci"},
    [QUANTITY_UNIT_WEIGHT] = {"kN/m3", "pcf", 1, 1, "kN/m3", "pcf"},
    [QUANTITY_TEMPERATURE] = {"degC", "degF", 1, 1, "°C", "°F"},
    [QUANTITY_DIFFERENCE] = {"K", "degF", 1, 1, "K", "°F"},
    [QUANTITY_GRADIENT] = {"K/m", "degF/in", 1, 2, "K/m", "°F/in"},
    [QUANTITY_RATIO] = {"%", "%", 1, 1, "%", "%"},
    [QUANTITY_DENSITY] = {"kg/m3", "pcf", 0, 1, "kg/m3", "pcf"},
    [QUANTITY_SPEED] = {"m/s", "mph", 1, 1, "m/s", "mph"},
    [QUANTITY_PACE] = {"m/h", "ft/h", 1, 0, "m/h", "ft/h"},
    [QUANTITY_VOLUME_RATE] = {"m3/h", "yd3/h", 1, 1, "m3/h", "yd3/h"},
    [QUANTITY_ANGLE] = {"deg", "deg", 2, 2, "deg", "deg"},
};

static void show_plain(struct text *out, double si, enum quantity quantity, enum unit_system system)
{
    bool us = system == UNITS_US;
    const char *sign = us ? plain[quantity].sign_us : plain[quantity].sign;
    double number = si;

    int decimals = us ? plain[quantity].decimals_us : plain[quantity].decimals;

    unit_from_si(si, us ? plain[quantity].us : plain[quantity].metric, quantity, &number);
    if (quantity == QUANTITY_STRESS && fabs(number) >= 100)
        decimals = 0; /* a modulus */
    add_fixed(out, number, decimals, 0);
    if (sign[0] != '\0')
        text_format(out, " %s", sign);
}

void unit_show(struct text *out, double si, enum quantity quantity, enum unit_system system)
{
    if (!isfinite(si)) {
        text_add(out, "none");
        return;
    }
    switch (quantity) {
    case QUANTITY_LENGTH:
        show_length(out, si, system);
        break;
    case QUANTITY_SMALL_LENGTH:
        show_small(out, si, system);
        break;
    case QUANTITY_VOLUME:
        show_volume(out, si, system);
        break;
    case QUANTITY_TIME:
        show_time(out, si);
        break;
    case QUANTITY_STRAIN:
        show_millionths(out, si);
        break;
    case QUANTITY_PER_KELVIN:
        show_millionths(out, system == UNITS_US ? si / 1.8 : si);
        text_add(out, system == UNITS_US ? " /°F" : " /K");
        break;
    default:
        show_plain(out, si, quantity, system);
    }
}

void unit_write_as(struct text *out, double si, enum quantity quantity, const char *unit)
{
    char digits[40];
    double number = si, back = NAN;
    bool millionths;

    if (!isfinite(si) || !unit_from_si(si, unit, quantity, &number))
        return;
    /* 10e-6 /K reads better than 1e-05; above 0.01 plain */
    millionths = (quantity == QUANTITY_STRAIN || quantity == QUANTITY_PER_KELVIN) &&
                 fabs(number) >= 1e-9 && fabs(number) < 0.01;
    for (int precision = 6; precision <= 17; precision++) {
        if (millionths)
            snprintf(digits, sizeof digits, "%.*ge-6", precision, number * 1e6);
        else
            snprintf(digits, sizeof digits, "%.*g", precision, number);
        unit_to_si(strtod(digits, NULL), unit, quantity, &back);
        if (back == si)
            break;
    }
    text_add(out, digits);
    if (unit[0] != '\0')
        text_format(out, " %s", unit);
}

void unit_write(struct text *out, double si, enum quantity quantity, enum unit_system system)
{
    unit_write_as(out, si, quantity, unit_name(quantity, system));
}
