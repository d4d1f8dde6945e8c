#include "base/unit_table.h"
#include <string.h>

/* Exact by definition (international yard and pound 1959, US gallon 231 in3, standard gravity
 * 9.80665 m/s2). */
#define INCH 0.0254
#define FOOT 0.3048
#define LBF 4.4482216152605
#define LB 0.45359237
#define PSI (LBF / (INCH * INCH))
#define GALLON 3.785411784e-3
#define YARD3 (0.9144 * 0.9144 * 0.9144)
#define DAY 86400.0
#define YEAR (365.25 * DAY)

#define UNIT(name, scale, divisor)                                                                 \
    {                                                                                              \
        name, scale, divisor, 0, false                                                             \
    }
#define ALIAS(name, scale, divisor)                                                                \
    {                                                                                              \
        name, scale, divisor, 0, true                                                              \
    }
#define SHIFTED(name, scale, divisor, shift)                                                       \
    {                                                                                              \
        name, scale, divisor, shift, false                                                         \
    }
#define END                                                                                        \
    {                                                                                              \
        NULL, 1, 1, 0, false                                                                       \
    }

static const struct unit none[] = {UNIT("", 1, 1), END};
static const struct unit lengths[] = {
    UNIT("mm", 1, 1000),     UNIT("cm", 1, 100),      UNIT("m", 1, 1),
    UNIT("km", 1000, 1),     UNIT("in", 254, 10000),  UNIT("ft", 3048, 10000),
    ALIAS("\"", 254, 10000), ALIAS("'", 3048, 10000), END};
static const struct unit stresses[] = {
    UNIT("Pa", 1, 1),          UNIT("kPa", 1e3, 1),    UNIT("MPa", 1e6, 1),
    UNIT("GPa", 1e9, 1),       UNIT("N/mm2", 1e6, 1),  UNIT("psi", PSI, 1),
    UNIT("ksi", 1e3 * PSI, 1), ALIAS("N/mm²", 1e6, 1), END};
static const struct unit subgrades[] = {UNIT("MPa/m", 1e6, 1), UNIT("kN/m3", 1e3, 1),
                                        UNIT("pci", PSI / INCH, 1), ALIAS("kN/m³", 1e3, 1), END};
static const struct unit unit_weights[] = {UNIT("kN/m3", 1e3, 1),
                                           UNIT("pcf", LBF / (FOOT * FOOT * FOOT), 1),
                                           ALIAS("N/m3", 1, 1), ALIAS("kN/m³", 1e3, 1), END};
static const struct unit temperatures[] = {UNIT("degC", 1, 1),
                                           UNIT("C", 1, 1),
                                           UNIT("°C", 1, 1),
                                           SHIFTED("degF", 5, 9, -32),
                                           SHIFTED("F", 5, 9, -32),
                                           SHIFTED("°F", 5, 9, -32),
                                           SHIFTED("K", 1, 1, -273.15),
                                           END};
static const struct unit differences[] = {
    UNIT("K", 1, 1),   UNIT("degC", 1, 1), UNIT("degF", 5, 9), ALIAS("C", 1, 1),
    ALIAS("°C", 1, 1), ALIAS("F", 5, 9),   ALIAS("°F", 5, 9),  END};
static const struct unit gradients[] = {UNIT("K/m", 1, 1), UNIT("degF/in", 5, 9 * INCH), END};
static const struct unit per_kelvins[] = {UNIT("/K", 1, 1),
                                          UNIT("/degC", 1, 1),
                                          UNIT("/degF", 9, 5),
                                          ALIAS("1/K", 1, 1),
                                          ALIAS("1/degC", 1, 1),
                                          ALIAS("1/degF", 9, 5),
                                          ALIAS("/C", 1, 1),
                                          ALIAS("/F", 9, 5),
                                          ALIAS("/°C", 1, 1),
                                          ALIAS("/°F", 9, 5),
                                          END};
/* micro sign U+00B5 and Greek mu U+03BC both occur on keyboards */
static const struct unit strains[] = {
    UNIT("", 1, 1),        UNIT("microstrain", 1, 1e6), ALIAS("mm/m", 1, 1000),
    ALIAS("µε", 1, 1e6),   ALIAS("με", 1, 1e6),         ALIAS("µm/m", 1, 1e6),
    ALIAS("μm/m", 1, 1e6), ALIAS("um/m", 1, 1e6),       END};
static const struct unit ratios[] = {UNIT("", 1, 1), UNIT("%", 1, 100), END};
static const struct unit volumes[] = {UNIT("ml", 1, 1e6),     UNIT("l", 1, 1000),
                                      UNIT("m3", 1, 1),       UNIT("floz", GALLON, 128),
                                      UNIT("gal", GALLON, 1), ALIAS("mL", 1, 1e6),
                                      ALIAS("L", 1, 1000),    ALIAS("m³", 1, 1),
                                      UNIT("yd3", YARD3, 1),  END};
static const struct unit densities[] = {
    UNIT("kg/m3", 1, 1), UNIT("pcf", LB / (FOOT * FOOT * FOOT), 1), ALIAS("kg/m³", 1, 1), END};
static const struct unit speeds[] = {UNIT("m/s", 1, 1), UNIT("km/h", 1, 3.6),
                                     UNIT("mph", 0.44704, 1), END};
static const struct unit paces[] = {UNIT("m/h", 1, 3600), UNIT("ft/h", FOOT, 3600),
                                    UNIT("m/min", 1, 60), ALIAS("ft/min", FOOT, 60),
                                    ALIAS("m/s", 1, 1),   END};
static const struct unit volume_rates[] = {UNIT("m3/h", 1, 3600), UNIT("yd3/h", YARD3, 3600),
                                           ALIAS("m³/h", 1, 3600), END};
static const struct unit angles[] = {UNIT("deg", 1, 1), ALIAS("°", 1, 1), END};
static const struct unit times[] = {UNIT("min", 60, 1), UNIT("h", 3600, 1), UNIT("d", DAY, 1),
                                    UNIT("a", YEAR, 1), ALIAS("s", 1, 1),   END};

double unit_apply(const struct unit *unit, double number)
{
    return (number + unit->shift) * unit->scale / unit->divisor;
}

double unit_undo(const struct unit *unit, double si)
{
    return si * unit->divisor / unit->scale - unit->shift;
}

const struct unit *unit_table_of(enum quantity quantity)
{
    static const struct unit *const tables[QUANTITY_COUNT_OF_QUANTITIES] = {
        [QUANTITY_NONE] = none,
        [QUANTITY_LENGTH] = lengths,
        [QUANTITY_SMALL_LENGTH] = lengths,
        [QUANTITY_STRESS] = stresses,
        [QUANTITY_SUBGRADE] = subgrades,
        [QUANTITY_UNIT_WEIGHT] = unit_weights,
        [QUANTITY_TEMPERATURE] = temperatures,
        [QUANTITY_DIFFERENCE] = differences,
        [QUANTITY_GRADIENT] = gradients,
        [QUANTITY_PER_KELVIN] = per_kelvins,
        [QUANTITY_STRAIN] = strains,
        [QUANTITY_RATIO] = ratios,
        [QUANTITY_VOLUME] = volumes,
        [QUANTITY_DENSITY] = densities,
        [QUANTITY_SPEED] = speeds,
        [QUANTITY_PACE] = paces,
        [QUANTITY_VOLUME_RATE] = volume_rates,
        [QUANTITY_ANGLE] = angles,
        [QUANTITY_TIME] = times,
    };

    return tables[quantity];
}

const struct unit *unit_table_find(enum quantity quantity, const char *name, size_t length)
{
    for (const struct unit *unit = unit_table_of(quantity); unit->name != NULL; unit++)
        if (strlen(unit->name) == length && memcmp(unit->name, name, length) == 0)
            return unit;
    return NULL;
}

bool unit_is_length(enum quantity quantity)
{
    return quantity == QUANTITY_LENGTH || quantity == QUANTITY_SMALL_LENGTH;
}

bool unit_to_si(double number, const char *unit, enum quantity quantity, double *si)
{
    const struct unit *found = unit_table_find(quantity, unit, strlen(unit));

    if (found == NULL)
        return false;
    *si = unit_apply(found, number);
    return true;
}

bool unit_from_si(double si, const char *unit, enum quantity quantity, double *number)
{
    const struct unit *found = unit_table_find(quantity, unit, strlen(unit));

    if (found == NULL)
        return false;
    *number = unit_undo(found, si);
    return true;
}

const char *unit_name(enum quantity quantity, enum unit_system system)
{
    static const char *const names[QUANTITY_COUNT_OF_QUANTITIES][2] = {
        [QUANTITY_NONE] = {"", ""},
        [QUANTITY_LENGTH] = {"m", "ft"},
        [QUANTITY_SMALL_LENGTH] = {"mm", "in"},
        [QUANTITY_STRESS] = {"MPa", "psi"},
        [QUANTITY_SUBGRADE] = {"MPa/m", "pci"},
        [QUANTITY_UNIT_WEIGHT] = {"kN/m3", "pcf"},
        [QUANTITY_TEMPERATURE] = {"degC", "degF"},
        [QUANTITY_DIFFERENCE] = {"K", "degF"},
        [QUANTITY_GRADIENT] = {"K/m", "degF/in"},
        [QUANTITY_PER_KELVIN] = {"/K", "/degF"},
        [QUANTITY_STRAIN] = {"", ""},
        [QUANTITY_RATIO] = {"%", "%"},
        [QUANTITY_VOLUME] = {"l", "gal"},
        [QUANTITY_DENSITY] = {"kg/m3", "pcf"},
        [QUANTITY_SPEED] = {"m/s", "mph"},
        [QUANTITY_PACE] = {"m/h", "ft/h"},
        [QUANTITY_VOLUME_RATE] = {"m3/h", "yd3/h"},
        [QUANTITY_ANGLE] = {"deg", "deg"},
        [QUANTITY_TIME] = {"d", "d"},
    };

    return names[quantity][system];
}

const char *unit_list(enum quantity quantity)
{
    static const char *const lists[QUANTITY_COUNT_OF_QUANTITIES] = {
        [QUANTITY_NONE] = "no unit",
        [QUANTITY_LENGTH] = "mm cm m km in ft",
        [QUANTITY_SMALL_LENGTH] = "mm cm m km in ft",
        [QUANTITY_STRESS] = "Pa kPa MPa GPa N/mm2 psi ksi",
        [QUANTITY_SUBGRADE] = "MPa/m kN/m3 pci",
        [QUANTITY_UNIT_WEIGHT] = "kN/m3 pcf",
        [QUANTITY_TEMPERATURE] = "degC degF K",
        [QUANTITY_DIFFERENCE] = "K degC degF",
        [QUANTITY_GRADIENT] = "K/m degF/in",
        [QUANTITY_PER_KELVIN] = "/K /degC /degF",
        [QUANTITY_STRAIN] = "no unit or microstrain",
        [QUANTITY_RATIO] = "no unit or %",
        [QUANTITY_VOLUME] = "ml l m3 floz gal yd3",
        [QUANTITY_DENSITY] = "kg/m3 pcf",
        [QUANTITY_SPEED] = "m/s km/h mph",
        [QUANTITY_PACE] = "m/h ft/h m/min",
        [QUANTITY_VOLUME_RATE] = "m3/h yd3/h",
        [QUANTITY_ANGLE] = "deg",
        [QUANTITY_TIME] = "min h d a",
    };

    return lists[quantity];
}
