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
#define FLOZ (GALLON / 128)
#define YARD3 (0.9144 * 0.9144 * 0.9144)
#define FIVE_NINTHS (5.0 / 9.0)
#define DAY 86400.0
#define YEAR (365.25 * DAY)

static const struct unit none[] = {{"", 1, 0, false}, {NULL, 0, 0, false}};
static const struct unit lengths[] = {
    {"mm", 1e-3, 0, false}, {"cm", 1e-2, 0, false}, {"m", 1, 0, false},
    {"km", 1e3, 0, false},  {"in", INCH, 0, false}, {"ft", FOOT, 0, false},
    {"\"", INCH, 0, true},  {"'", FOOT, 0, true},   {NULL, 0, 0, false}};
static const struct unit stresses[] = {
    {"Pa", 1, 0, false},     {"kPa", 1e3, 0, false}, {"MPa", 1e6, 0, false},
    {"GPa", 1e9, 0, false},  {"N/mm2", 1e6, 0, false}, {"psi", PSI, 0, false},
    {"ksi", 1e3 * PSI, 0, false}, {"N/mm²", 1e6, 0, true}, {NULL, 0, 0, false}};
static const struct unit subgrades[] = {{"MPa/m", 1e6, 0, false},
                                        {"kN/m3", 1e3, 0, false},
                                        {"pci", PSI / INCH, 0, false},
                                        {"kN/m³", 1e3, 0, true},
                                        {NULL, 0, 0, false}};
static const struct unit unit_weights[] = {{"kN/m3", 1e3, 0, false},
                                           {"pcf", LBF / (FOOT * FOOT * FOOT), 0, false},
                                           {"N/m3", 1, 0, true},
                                           {"kN/m³", 1e3, 0, true},
                                           {NULL, 0, 0, false}};
static const struct unit temperatures[] = {
    {"degC", 1, 0, false}, {"C", 1, 0, false},
    {"°C", 1, 0, false},   {"degF", FIVE_NINTHS, -32 * FIVE_NINTHS, false},
    {"F", FIVE_NINTHS, -32 * FIVE_NINTHS, false},
    {"°F", FIVE_NINTHS, -32 * FIVE_NINTHS, false},
    {"K", 1, -273.15, false}, {NULL, 0, 0, false}};
static const struct unit differences[] = {
    {"K", 1, 0, false},   {"degC", 1, 0, false}, {"degF", FIVE_NINTHS, 0, false},
    {"C", 1, 0, true},    {"°C", 1, 0, true},    {"F", FIVE_NINTHS, 0, true},
    {"°F", FIVE_NINTHS, 0, true}, {NULL, 0, 0, false}};
static const struct unit gradients[] = {{"K/m", 1, 0, false},
                                        {"degF/in", FIVE_NINTHS / INCH, 0, false},
                                        {NULL, 0, 0, false}};
static const struct unit per_kelvins[] = {
    {"/K", 1, 0, false},   {"/degC", 1, 0, false}, {"/degF", 1.8, 0, false}, {"1/K", 1, 0, true},
    {"1/degC", 1, 0, true}, {"1/degF", 1.8, 0, true}, {"/C", 1, 0, true},   {"/F", 1.8, 0, true},
    {"/°C", 1, 0, true},   {"/°F", 1.8, 0, true},  {NULL, 0, 0, false}};
static const struct unit strains[] = {{"", 1, 0, false},
                                      {"microstrain", 1e-6, 0, false},
                                      {"mm/m", 1e-3, 0, true},
                                      {NULL, 0, 0, false}};
static const struct unit ratios[] = {{"", 1, 0, false}, {"%", 1e-2, 0, false}, {NULL, 0, 0, false}};
static const struct unit volumes[] = {
    {"ml", 1e-6, 0, false},  {"l", 1e-3, 0, false},   {"m3", 1, 0, false}, {"floz", FLOZ, 0, false},
    {"gal", GALLON, 0, false}, {"mL", 1e-6, 0, true}, {"L", 1e-3, 0, true}, {"m³", 1, 0, true},
    {NULL, 0, 0, false}};
static const struct unit densities[] = {{"kg/m3", 1, 0, false},
                                        {"pcf", LB / (FOOT * FOOT * FOOT), 0, false},
                                        {"kg/m³", 1, 0, true},
                                        {NULL, 0, 0, false}};
static const struct unit speeds[] = {{"m/s", 1, 0, false},
                                     {"km/h", 1 / 3.6, 0, false},
                                     {"mph", 0.44704, 0, false},
                                     {NULL, 0, 0, false}};
static const struct unit paces[] = {{"m/h", 1 / 3600.0, 0, false},
                                    {"ft/h", FOOT / 3600, 0, false},
                                    {"m/min", 1 / 60.0, 0, false},
                                    {"ft/min", FOOT / 60, 0, true},
                                    {"m/s", 1, 0, true},
                                    {NULL, 0, 0, false}};
static const struct unit volume_rates[] = {{"m3/h", 1 / 3600.0, 0, false},
                                           {"yd3/h", YARD3 / 3600, 0, false},
                                           {"m³/h", 1 / 3600.0, 0, true},
                                           {NULL, 0, 0, false}};
static const struct unit angles[] = {{"deg", 1, 0, false}, {"°", 1, 0, true}, {NULL, 0, 0, false}};
static const struct unit times[] = {{"min", 60, 0, false}, {"h", 3600, 0, false},
                                    {"d", DAY, 0, false},  {"a", YEAR, 0, false},
                                    {"s", 1, 0, true},     {NULL, 0, 0, false}};

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
    *si = number * found->scale + found->offset;
    return true;
}

bool unit_from_si(double si, const char *unit, enum quantity quantity, double *number)
{
    const struct unit *found = unit_table_find(quantity, unit, strlen(unit));

    if (found == NULL)
        return false;
    *number = (si - found->offset) / found->scale;
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
        [QUANTITY_VOLUME] = "ml l m3 floz gal",
        [QUANTITY_DENSITY] = "kg/m3 pcf",
        [QUANTITY_SPEED] = "m/s km/h mph",
        [QUANTITY_PACE] = "m/h ft/h m/min",
        [QUANTITY_VOLUME_RATE] = "m3/h yd3/h",
        [QUANTITY_ANGLE] = "deg",
        [QUANTITY_TIME] = "min h d a",
    };

    return lists[quantity];
}
