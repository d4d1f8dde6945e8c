/* Sunrise and sunset against libnova (a general astronomy library of the distribution), all over
 * the world and the year; polar day and night. */
#include <setjmp.h>
#include <stdarg.h>
#include <stddef.h>
#include <stdint.h>

#include <cmocka.h>

#include "core/sun.h"
#include <libnova/julian_day.h>
#include <libnova/precession.h>
#include <libnova/solar.h>
#include <libnova/transform.h>
#include <math.h>

/* Elevation by libnova at a clock hour of the day, Universal Time. */
static double elevation(double midnight, double hour, double latitude, double longitude)
{
    struct ln_lnlat_posn place = {.lng = longitude, .lat = latitude};
    struct ln_equ_posn sun2000, sun;
    struct ln_hrz_posn seen;

    ln_get_solar_equ_coords(midnight + hour / 24, &sun2000);
    ln_get_equ_prec(&sun2000, midnight + hour / 24, &sun); /* to the equinox of the day */
    ln_get_hrz_from_equ(&sun, &place, midnight + hour / 24, &seen);
    return seen.alt;
}

/* At our rise and set libnova's sun stands at -0.833 degrees, rising and setting. */
static void test_against_libnova(void **state)
{
    int compared = 0;

    (void)state;
    for (int month = 1; month <= 12; month++)
        for (double latitude = -60; latitude <= 60; latitude += 15)
            for (double longitude = -180; longitude < 180; longitude += 45) {
                struct ln_date date = {2027, month, 12, 0, 0, 0};
                const double midnight = ln_get_julian_day(&date);
                double rise, set;
                assert_int_equal(sun_rise_set(2027, month, 12, latitude, longitude, 0, &rise, &set),
                                 SUN_DAY_USUAL);
                assert_true(rise < set && set < rise + 24);
                for (int i = 0; i < 2; i++) {
                    const double at = i == 0 ? rise : set;
                    const double high = elevation(midnight, at, latitude, longitude);
                    const double later = elevation(midnight, at + 0.1, latitude, longitude);
                    if (!(fabs(high + 0.833) < 0.03) || (later > high) != (i == 0))
                        fail_msg("month %d at %g, %g: libnova has the sun at %.3f degrees", month,
                                 latitude, longitude, high);
                    compared++;
                }
            }
    assert_int_equal(compared, 2 * 12 * 9 * 8);
}

static void test_poles(void **state)
{
    double rise = -1, set = -1;

    (void)state;
    assert_int_equal(sun_rise_set(2027, 6, 21, 78, 15, 1, &rise, &set), SUN_DAY_NEVER_SETS);
    assert_int_equal(sun_rise_set(2027, 12, 21, 78, 15, 1, &rise, &set), SUN_DAY_NEVER_RISES);
    assert_true(rise < 0 && set < 0); /* untouched */
    assert_int_equal(sun_rise_set(2027, 12, 21, -78, 15, 1, &rise, &set), SUN_DAY_NEVER_SETS);
}

/* A clock three hours ahead shows three hours more. */
static void test_clock(void **state)
{
    double rise, set, rise3, set3;

    (void)state;
    sun_rise_set(2027, 4, 12, 52.1, -1.3, 0, &rise, &set);
    sun_rise_set(2027, 4, 12, 52.1, -1.3, 3, &rise3, &set3);
    assert_true(fabs(rise3 - rise - 3) < 1e-3 && fabs(set3 - set - 3) < 1e-3);
    assert_true(set > 18.9 && set < 19.1); /* about 19:00 Universal Time */
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(test_against_libnova),
        cmocka_unit_test(test_poles),
        cmocka_unit_test(test_clock),
    };

    return cmocka_run_group_tests(tests, NULL, NULL);
}
