/* Units. Oracle: the program GNU units (its own definitions of every unit), through popen; the
 * grammar cases are docs/format.md's own ("quantity", "feet", "inches"). */
#include "base/unit.h"
#include <math.h>
#include <setjmp.h>
#include <stdarg.h>
#include <stdint.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>
#include <cmocka.h>

#define COUNT(a) (sizeof(a) / sizeof *(a))

static bool near(double a, double b, double relative)
{
    return fabs(a - b) <= relative * fmax(fabs(a), fabs(b)) + 1e-300;
}

/* ---- the oracle ---- */

static bool ask_units(const char *from, const char *to, double *answer)
{
    char command[256], reply[256] = "";
    FILE *pipe;
    bool good;

    snprintf(command, sizeof command, "units -t -o '%%.17g' '%s' '%s' 2>/dev/null", from, to);
    pipe = popen(command, "r");
    if (pipe == NULL)
        return false;
    good = fgets(reply, sizeof reply, pipe) != NULL;
    return pclose(pipe) == 0 && good && sscanf(reply, "%lf", answer) == 1;
}

struct oracle {
    enum quantity quantity;
    const char *unit, *theirs, *si;
};

static const struct oracle oracles[] = {
    {QUANTITY_LENGTH, "mm", "mm", "m"},
    {QUANTITY_LENGTH, "cm", "cm", "m"},
    {QUANTITY_LENGTH, "km", "km", "m"},
    {QUANTITY_LENGTH, "in", "inch", "m"},
    {QUANTITY_LENGTH, "ft", "foot", "m"},
    {QUANTITY_STRESS, "kPa", "kPa", "Pa"},
    {QUANTITY_STRESS, "MPa", "MPa", "Pa"},
    {QUANTITY_STRESS, "GPa", "GPa", "Pa"},
    {QUANTITY_STRESS, "N/mm2", "N/mm^2", "Pa"},
    {QUANTITY_STRESS, "psi", "psi", "Pa"},
    {QUANTITY_STRESS, "ksi", "1000 psi", "Pa"},
    {QUANTITY_SUBGRADE, "MPa/m", "MPa/m", "Pa/m"},
    {QUANTITY_SUBGRADE, "kN/m3", "kN/m^3", "Pa/m"},
    {QUANTITY_SUBGRADE, "pci", "lbf/inch^3", "Pa/m"},
    {QUANTITY_UNIT_WEIGHT, "kN/m3", "kN/m^3", "N/m^3"},
    {QUANTITY_UNIT_WEIGHT, "pcf", "lbf/foot^3", "N/m^3"},
    {QUANTITY_DIFFERENCE, "degF", "degF", "K"},
    {QUANTITY_GRADIENT, "degF/in", "degF/inch", "K/m"},
    {QUANTITY_PER_KELVIN, "/degF", "1/degF", "1/K"},
    {QUANTITY_STRAIN, "microstrain", "micro", "1"},
    {QUANTITY_RATIO, "%", "percent", "1"},
    {QUANTITY_VOLUME, "ml", "ml", "m^3"},
    {QUANTITY_VOLUME, "l", "liter", "m^3"},
    {QUANTITY_VOLUME, "floz", "usfloz", "m^3"},
    {QUANTITY_VOLUME, "gal", "usgallon", "m^3"},
    {QUANTITY_DENSITY, "pcf", "lb/foot^3", "kg/m^3"},
    {QUANTITY_SPEED, "km/h", "km/hour", "m/s"},
    {QUANTITY_SPEED, "mph", "mile/hour", "m/s"},
    {QUANTITY_PACE, "m/h", "m/hour", "m/s"},
    {QUANTITY_PACE, "ft/h", "foot/hour", "m/s"},
    {QUANTITY_PACE, "m/min", "m/min", "m/s"},
    {QUANTITY_VOLUME_RATE, "m3/h", "m^3/hour", "m^3/s"},
    {QUANTITY_VOLUME_RATE, "yd3/h", "yard^3/hour", "m^3/s"},
    {QUANTITY_TIME, "min", "min", "s"},
    {QUANTITY_TIME, "h", "hour", "s"},
    {QUANTITY_TIME, "d", "day", "s"},
    {QUANTITY_TIME, "a", "365.25 day", "s"},
};

static void test_factors_against_units_program(void **state)
{
    double probe;

    (void)state;
    if (!ask_units("1 foot", "m", &probe)) {
        print_message("SKIPPED: the program `units` is not installed; install it to run this.\n");
        skip();
    }
    for (size_t i = 0; i < COUNT(oracles); i++) {
        double theirs = NAN, ours = NAN, back = NAN;
        char from[64];

        snprintf(from, sizeof from, "7.25 %s", oracles[i].theirs);
        assert_true(ask_units(from, oracles[i].si, &theirs));
        assert_true(unit_to_si(7.25, oracles[i].unit, oracles[i].quantity, &ours));
        if (!near(ours, theirs, 1e-12))
            fail_msg("%s: %.17g, not %.17g", oracles[i].unit, ours, theirs);
        assert_true(unit_from_si(ours, oracles[i].unit, oracles[i].quantity, &back));
        assert_true(near(back, 7.25, 1e-14));
    }
}

static void test_temperatures_against_units_program(void **state)
{
    static const double degrees[] = {-40, 0, 32, 50, 59, 104, 212};
    double probe;

    (void)state;
    if (!ask_units("1 foot", "m", &probe)) {
        print_message("SKIPPED: the program `units` is not installed; install it to run this.\n");
        skip();
    }
    for (size_t i = 0; i < COUNT(degrees); i++) {
        double theirs = NAN, ours = NAN;
        char from[64];

        snprintf(from, sizeof from, "tempF(%g)", degrees[i]);
        assert_true(ask_units(from, "tempC", &theirs));
        assert_true(unit_to_si(degrees[i], "degF", QUANTITY_TEMPERATURE, &ours));
        assert_true(fabs(ours - theirs) < 1e-11);
        snprintf(from, sizeof from, "tempK(%g)", degrees[i] + 300);
        assert_true(ask_units(from, "tempC", &theirs));
        assert_true(unit_to_si(degrees[i] + 300, "K", QUANTITY_TEMPERATURE, &ours));
        assert_true(fabs(ours - theirs) < 1e-11);
    }
}

/* ---- reading ---- */

struct good {
    const char *text;
    enum quantity quantity;
    double si;
};

/* expected values by the definition 1 in = 25.4 mm, 1 ft = 12 in */
static const struct good good[] = {
    {"200 mm", QUANTITY_SMALL_LENGTH, 0.2},
    {"200mm", QUANTITY_SMALL_LENGTH, 0.2},
    {"200", QUANTITY_SMALL_LENGTH, 0.2},
    {"36", QUANTITY_LENGTH, 36},
    {"20 cm", QUANTITY_LENGTH, 0.2},
    {"13'-4\"", QUANTITY_LENGTH, 160 * 0.0254},
    {"13' 4 1/2\"", QUANTITY_LENGTH, 160.5 * 0.0254},
    {"13'-4 1/2\"", QUANTITY_LENGTH, 160.5 * 0.0254},
    {"13' - 4\"", QUANTITY_LENGTH, 160 * 0.0254},
    {"13 ft 4 in", QUANTITY_LENGTH, 160 * 0.0254},
    {"13ft4in", QUANTITY_LENGTH, 160 * 0.0254},
    {"13.5 ft", QUANTITY_LENGTH, 162 * 0.0254},
    {"13'", QUANTITY_LENGTH, 156 * 0.0254},
    {"-13'-4\"", QUANTITY_LENGTH, -160 * 0.0254},
    {"3/8 in", QUANTITY_SMALL_LENGTH, 0.375 * 0.0254},
    {"3/8\"", QUANTITY_SMALL_LENGTH, 0.375 * 0.0254},
    {"1-1/2\"", QUANTITY_SMALL_LENGTH, 1.5 * 0.0254},
    {"1 1/2 in", QUANTITY_SMALL_LENGTH, 1.5 * 0.0254},
    {"5'6\"", QUANTITY_LENGTH, 66 * 0.0254},
    {"5'-6 3/4\"", QUANTITY_LENGTH, 66.75 * 0.0254},
    {"0.5 in", QUANTITY_SMALL_LENGTH, 0.0127},
    {"6\"", QUANTITY_SMALL_LENGTH, 0.1524},
    {"15 degC", QUANTITY_TEMPERATURE, 15},
    {"15 \xC2\xB0"
     "C",
     QUANTITY_TEMPERATURE, 15},
    {"15C", QUANTITY_TEMPERATURE, 15},
    {"50 degF", QUANTITY_TEMPERATURE, 10},
    {"50F", QUANTITY_TEMPERATURE, 10},
    {"-40 F", QUANTITY_TEMPERATURE, -40},
    {"273.15 K", QUANTITY_TEMPERATURE, 0},
    {"9 degF", QUANTITY_DIFFERENCE, 5},
    {"10e-6 /K", QUANTITY_PER_KELVIN, 10e-6},
    {"10E-6 1/K", QUANTITY_PER_KELVIN, 10e-6},
    {"5e-6/degF", QUANTITY_PER_KELVIN, 9e-6},
    {"200 microstrain", QUANTITY_STRAIN, 200e-6},
    {"200 \xC2\xB5\xCE\xB5", QUANTITY_STRAIN, 200e-6},
    {"200 \xCE\xBC\xCE\xB5", QUANTITY_STRAIN, 200e-6},
    {"200e-6", QUANTITY_STRAIN, 200e-6},
    {"70 %", QUANTITY_RATIO, 0.7},
    {"70%", QUANTITY_RATIO, 0.7},
    {"0.7", QUANTITY_RATIO, 0.7},
    {".5", QUANTITY_NONE, 0.5},
    {"+4", QUANTITY_NONE, 4},
    {"32", QUANTITY_STRESS, 32e6},
    {"55", QUANTITY_SUBGRADE, 55e6},
    {"1e2 m", QUANTITY_LENGTH, 100},
    {"600 ml", QUANTITY_VOLUME, 600e-6},
    {"52.1 deg", QUANTITY_ANGLE, 52.1},
};

static void test_reads_what_the_grammar_allows(void **state)
{
    (void)state;
    for (size_t i = 0; i < COUNT(good); i++) {
        struct unit_reading r =
            unit_read(good[i].text, strlen(good[i].text), good[i].quantity, NULL);
        if (r.problem != NULL || r.length != strlen(good[i].text) || !near(r.si, good[i].si, 1e-15))
            fail_msg("'%s': %s, %zu bytes, %.17g not %.17g", good[i].text,
                     r.problem ? r.problem : "read", r.length, r.si, good[i].si);
    }
}

struct bad {
    const char *text;
    enum quantity quantity;
};

static const struct bad bad[] = {
    {"", QUANTITY_LENGTH},        {"nan", QUANTITY_LENGTH},   {"inf m", QUANTITY_LENGTH},
    {"0x10 mm", QUANTITY_LENGTH}, {"1e400", QUANTITY_NONE},   {"1e400 m", QUANTITY_LENGTH},
    {"0,2 m", QUANTITY_LENGTH},   {"1,000", QUANTITY_NONE},   {"mm", QUANTITY_LENGTH},
    {"3/8", QUANTITY_LENGTH},     {"20 kg", QUANTITY_LENGTH}, {"20 m", QUANTITY_TEMPERATURE},
    {"20 K/m", QUANTITY_STRESS},  {"-", QUANTITY_NONE},       {".", QUANTITY_NONE},
    {"1/0 in", QUANTITY_LENGTH},  {"abc", QUANTITY_RATIO},    {"10 C", QUANTITY_LENGTH},
    {"1'000 m", QUANTITY_LENGTH}, {"5 %", QUANTITY_LENGTH},   {"infinity", QUANTITY_NONE},
    {"4 inch", QUANTITY_LENGTH},  {"0x0.4", QUANTITY_NONE},   {"+-3 m", QUANTITY_LENGTH},
};

static void test_refuses_what_it_does_not(void **state)
{
    (void)state;
    for (size_t i = 0; i < COUNT(bad); i++) {
        struct unit_reading r = unit_read(bad[i].text, strlen(bad[i].text), bad[i].quantity, NULL);
        if (r.problem == NULL && r.length == strlen(bad[i].text))
            fail_msg("'%s' was read as %.17g", bad[i].text, r.si);
    }
}

static void test_default_unit(void **state)
{
    struct unit_reading r = unit_read("12", 2, QUANTITY_LENGTH, "ft");

    (void)state;
    assert_null(r.problem);
    assert_false(r.has_unit);
    assert_true(near(r.si, 3.6576, 1e-15)); /* 12 ft */
    assert_non_null(strstr(unit_read("0,2 m", 5, QUANTITY_LENGTH, NULL).problem, "comma"));
}

/* Every millimetre and every sixteenth of an inch is exact in 1/80 mm (80 and 127 of them). */
static void test_exact_in_eightieths(void **state)
{
    char text[64];

    (void)state;
    for (long mm = 1; mm < 200000; mm += 37) {
        struct unit_reading r;
        snprintf(text, sizeof text, "%ld mm", mm);
        r = unit_read(text, strlen(text), QUANTITY_LENGTH, NULL);
        assert_int_equal(llround(r.si * 80000), mm * 80);
        snprintf(text, sizeof text, "%ld.%03ld", mm / 1000, mm % 1000);
        r = unit_read(text, strlen(text), QUANTITY_LENGTH, NULL);
        assert_int_equal(llround(r.si * 80000), mm * 80);
    }
    for (long n = 1; n < 100000; n += 13) {
        struct unit_reading r;
        snprintf(text, sizeof text, "%ld'-%ld %ld/16\"", n / 192, n % 192 / 16, n % 16);
        r = unit_read(text, strlen(text), QUANTITY_LENGTH, NULL);
        assert_null(r.problem);
        assert_int_equal(llround(r.si * 80000), n * 127);
    }
}

/* ---- writing and showing ---- */

static void test_written_values_read_back(void **state)
{
    uint64_t seed = 12345;

    (void)state;
    for (int i = 0; i < 20000; i++) {
        enum quantity quantity = (enum quantity)(i % QUANTITY_COUNT_OF_QUANTITIES);
        enum unit_system system = i % 2 ? UNITS_US : UNITS_METRIC;
        struct text out = {0};
        struct unit_reading r;
        double si;

        seed = seed * 6364136223846793005U + 1442695040888963407U;
        si = ((double)(seed >> 11) / 9007199254740992.0 - 0.5) * pow(10, (double)(seed % 13) - 6);
        unit_write(&out, si, quantity, system);
        r = unit_read(text_string(&out), out.length, quantity, NULL);
        if (r.problem != NULL || r.length != out.length ||
            fabs(r.si - si) > 1e-12 * fmax(fabs(si), quantity == QUANTITY_TEMPERATURE ? 100 : 0))
            fail_msg("%.17g was written '%s' and read %.17g", si, text_string(&out), r.si);
        text_free(&out);
    }
}

static const struct {
    double si;
    enum quantity quantity;
    enum unit_system system;
    const char *shown;
} shows[] = {
    {0.2, QUANTITY_SMALL_LENGTH, UNITS_METRIC, "200 mm"},
    {0.001376, QUANTITY_SMALL_LENGTH, UNITS_METRIC, "1.38 mm"},
    {4.064, QUANTITY_LENGTH, UNITS_US, "13'-4\""},
    {0.009525, QUANTITY_SMALL_LENGTH, UNITS_US, "3/8 in"},
    {0.1524, QUANTITY_SMALL_LENGTH, UNITS_US, "6 in"},
    {15, QUANTITY_TEMPERATURE, UNITS_METRIC,
     "15 \xC2\xB0"
     "C"},
    {15, QUANTITY_TEMPERATURE, UNITS_US,
     "59 \xC2\xB0"
     "F"},
    {0.25, QUANTITY_RATIO, UNITS_METRIC, "25 %"},
    {10e-6, QUANTITY_PER_KELVIN, UNITS_METRIC, "10e-6 /K"},
    {NAN, QUANTITY_LENGTH, UNITS_METRIC, "none"},
    {INFINITY, QUANTITY_STRESS, UNITS_US, "none"},
    {-0.00001, QUANTITY_LENGTH, UNITS_METRIC, "0.0 m"},
};

static void test_shown_as_the_trade_writes(void **state)
{
    (void)state;
    for (size_t i = 0; i < COUNT(shows); i++) {
        struct text out = {0};
        unit_show(&out, shows[i].si, shows[i].quantity, shows[i].system);
        assert_string_equal(text_string(&out), shows[i].shown);
        text_free(&out);
    }
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(test_factors_against_units_program),
        cmocka_unit_test(test_temperatures_against_units_program),
        cmocka_unit_test(test_reads_what_the_grammar_allows),
        cmocka_unit_test(test_refuses_what_it_does_not),
        cmocka_unit_test(test_default_unit),
        cmocka_unit_test(test_exact_in_eightieths),
        cmocka_unit_test(test_written_values_read_back),
        cmocka_unit_test(test_shown_as_the_trade_writes),
    };

    return cmocka_run_group_tests(tests, NULL, NULL);
}
