/* Sun, made weather, conduction, rainflow: published cases (source beside each), order of the
 * method, energy balance, and what must hold for every climate. */
#include <setjmp.h>
#include <stdarg.h>
#include <stddef.h>
#include <stdint.h>

#include <cmocka.h>

#include "core/climate.h"
#include "core/conduction.h"
#include "core/rainflow.h"
#include "core/slab_temperature.h"
#include "core/sun.h"
#include <math.h>
#include <stdio.h>
#include <stdlib.h>

static const double PI = 3.14159265358979323846;

#define NEAR(got, want, tolerance) expect_near(#got, (got), (want), (tolerance))

static void expect_near(const char *what, double got, double want, double tolerance)
{
    if (!(fabs(got - want) <= tolerance))
        fail_msg("%s is %.9g, published %.9g within %g", what, got, want, tolerance);
}

/* ---- sun ---- */

/* Reda and Andreas, Solar Position Algorithm (NREL/TP-560-34302, 2008), example A.5: 17 October
 * 2003, 12:30:30 at UTC-7, 39.742476 N, 105.1786 W: azimuth 194.34024; elevation 39.87204 with the
 * geometric parallax of 1830 m left in. */
static void test_sun_position(void **state)
{
    struct sun_position sun = sun_at(2003, 10, 17, 19 + 30.5 / 60, 39.742476, -105.1786);

    (void)state;
    NEAR(sun.elevation_deg, 39.872, 0.02);
    NEAR(sun.azimuth_deg, 194.340, 0.02);
}

/* FAO-56 example 8: 20 degrees south, 3 September: Ra 32.2 MJ/m2; clear day 0.75 of it (eq. 37). */
static void test_clear_day(void **state)
{
    double sum = 0;

    (void)state;
    for (double hour = 0.005; hour < 24; hour += 0.01)
        sum += sun_clear(-20, 246, hour) * 36;
    NEAR(sum / 1e6, 0.75 * 32.2, 0.1);
    NEAR(sum, slab_sun_clear(-20, 246), 0.005e6);
    NEAR(sun_cloud_share(0), 1, 0);
    NEAR(sun_cloud_share(1), 0.25, 1e-12); /* Kasten and Czeplak 1980 */
}

/* Psychrometric chart (ASHRAE): 25 degC at 50 % has its dew point at 13.9 degC. */
static void test_dew_point(void **state)
{
    (void)state;
    NEAR(climate_dew_point(25, 0.5), 13.9, 0.1);
    NEAR(climate_dew_point(10, 1), 10, 1e-9);
}

/* ---- made weather ---- */

static struct climate_range usual_range(void)
{
    return (struct climate_range){.air_coldest_c = -12,
                                  .air_hottest_c = 33,
                                  .swing_cold_k = 8,
                                  .swing_hot_k = 12,
                                  .wind_m_s = 2,
                                  .cloud = 0.5,
                                  .humidity = 0.7,
                                  .latitude_deg = 52,
                                  .sun_share = 1};
}

static void test_extremes_as_typed(void **state)
{
    static struct climate_hour hours[CLIMATE_HOURS];
    const double latitudes[] = {52, -33, 0, 70, NAN};

    (void)state;
    for (size_t i = 0; i < sizeof latitudes / sizeof *latitudes; i++) {
        struct climate_range range = usual_range();
        double coldest = INFINITY, hottest = -INFINITY;
        int cold_days = 0;
        range.latitude_deg = latitudes[i];
        climate_make(&range, hours);
        for (int h = 0; h < CLIMATE_HOURS; h++) {
            coldest = fmin(coldest, hours[h].air_c);
            hottest = fmax(hottest, hours[h].air_c);
            cold_days += hours[h].air_c < -12 + 1e-9;
            assert_true(hours[h].dew_c <= hours[h].air_c && hours[h].sun_w_m2 >= 0);
        }
        NEAR(coldest, -12, 1e-9);
        NEAR(hottest, 33, 1e-9);
        assert_int_equal(cold_days, 5); /* five days in a row */
    }
}

/* ---- conduction ---- */

struct bath { /* air behind a film */
    double film, air_c, amplitude, omega;
    double time_s, step_s;
};

static double bath_flux(const void *context, double part, double surface_c, double *slope)
{
    const struct bath *bath = context;
    double t = bath->time_s + part * bath->step_s;

    *slope = -bath->film;
    return bath->film * (bath->air_c + bath->amplitude * sin(bath->omega * t) - surface_c);
}

static void make_column(double thickness, double base, int cells, double step,
                        struct conduction_material slab, struct conduction_material soil,
                        struct conduction_column *column)
{
    struct conduction_slab made;

    conduction_slab_default(thickness, &made);
    made.base_m = base;
    made.concrete = slab;
    made.base = made.soil = soil;
    conduction_column_make(&made, cells, step, column);
}

static void run(const struct conduction_column *column, struct bath *bath, double seconds,
                double *temperature)
{
    long steps = lround(seconds / column->step_s);

    bath->step_s = column->step_s;
    for (long i = 0; i < steps; i++) {
        bath->time_s = (double)i * column->step_s;
        conduction_step(column, temperature, bath_flux, bath);
    }
}

static void fill(double *temperature, double value)
{
    for (int i = 0; i < CONDUCTION_NODES_MOST; i++)
        temperature[i] = value;
}

/* Sachdeva, Fundamentals of Engineering Heat and Mass Transfer, example 5.9: semi-infinite, 55
 * degC, surface held at 35; at 50 mm 45 degC is reached after 1.55 h (erfc solution). */
static void test_step(void **state)
{
    struct conduction_material soil = {1, 3600 / 1.77e-3};
    struct bath bath = {.film = 1e5, .air_c = 35};
    struct conduction_column column;
    double t[CONDUCTION_NODES_MOST];

    (void)state;
    fill(t, 55);
    make_column(0.3, 0, 24, 60, soil, soil, &column);
    run(&column, &bath, 1.55 * 3600, t);
    NEAR(t[4], 45, 0.08); /* 4 cells of 12.5 mm */
}

/* The same, example 5.21: surface +-10 K daily, k 0.349, 1000 kg/m3, 1970 J/(kg K): at 0.1 m
 * amplitude 2.39 K, lag 5.47 h. */
static void test_daily_wave(void **state)
{
    struct conduction_material soil = {0.349, 1000 * 1970.0};
    struct bath bath = {.film = 1e5, .amplitude = 10, .omega = 2 * PI / 86400, .step_s = 600};
    struct conduction_column column;
    double t[CONDUCTION_NODES_MOST], highest = 0, at = 0;

    (void)state;
    fill(t, 0);
    make_column(0.3, 0, 24, 600, soil, soil, &column);
    for (int i = 0; i < 144 * 10; i++) {
        bath.time_s = 600.0 * i;
        conduction_step(&column, t, bath_flux, &bath);
        if (i >= 144 * 9 && t[8] > highest) {
            highest = t[8];
            at = fmod((i + 1) * 600.0, 86400) / 3600;
        }
    }
    NEAR(highest, 2.39, 0.03);
    NEAR(at - 6, 5.47, 0.17); /* the surface's own highest is at 6 h */
}

/* Geankoplis, Transport Processes and Unit Operations, example 5.3-1: 15.6 degC soil under air of
 * -17.8, h 11.36, k 0.865, alpha 4.65e-7: surface -5.168 degC after 5 h. */
static void test_cold_air(void **state)
{
    struct conduction_material soil = {0.865, 0.865 / 4.65e-7};
    struct bath bath = {.film = 11.36, .air_c = -17.8};
    struct conduction_column column;
    double t[CONDUCTION_NODES_MOST];

    (void)state;
    fill(t, 15.6);
    make_column(0.3, 0, 24, 60, soil, soil, &column);
    run(&column, &bath, 5 * 3600, t);
    NEAR(t[0], -5.168, 0.05);
}

/* Fourier series of a plate with both faces stepped (Carslaw and Jaeger 1959, 3.4): half of it,
 * insulated in the middle. Fo 0.1, 0.2, 0.5: centre .949305, .772312, .370777, mean .643177,
 * .495912, .236050. And with a film, Biot number 1 (Carslaw and Jaeger 3.11): insulated face
 * .77253, exposed .50452 at Fo .5. */
static void test_plate(void **state)
{
    const double fo[] = {0.1, 0.2, 0.5}, centre[] = {0.949305, 0.772312, 0.370777},
                 mean[] = {0.643177, 0.495912, 0.236050};
    struct conduction_material plate = {1, 1e6}, nothing = {1e-9, 1e-6};
    struct conduction_column column;
    double t[CONDUCTION_NODES_MOST];

    (void)state;
    for (int i = 0; i < 3; i++) {
        struct bath bath = {.film = 1e6};
        fill(t, 1);
        make_column(0.1, 0, 24, 10, plate, nothing, &column);
        run(&column, &bath, fo[i] * 0.01 * 1e6, t);
        NEAR(t[24], centre[i], 0.003);
        NEAR(conduction_mean(&column, t), mean[i], 0.003);
    }
    struct bath film = {.film = 10}; /* Bi = 10 x 0.1/1 */
    fill(t, 1);
    make_column(0.1, 0, 24, 10, plate, nothing, &column);
    run(&column, &film, 0.5 * 0.01 * 1e6, t);
    NEAR(t[24], 0.77253, 0.002);
    NEAR(t[0], 0.50452, 0.002);
}

static double wave_error(double step)
{
    struct conduction_material soil = {1.5, 2e6};
    struct bath bath = {.film = 20, .amplitude = 10, .omega = 2 * PI / 86400};
    struct conduction_column column;
    double t[CONDUCTION_NODES_MOST];

    fill(t, 0);
    make_column(0.2, 0, 8, step, soil, soil, &column);
    run(&column, &bath, 2.25 * 86400, t);
    return conduction_mean(&column, t);
}

/* The method is of order 2: halving the step quarters the error at least. */
static void test_order(void **state)
{
    double fine = wave_error(112.5), coarse = wave_error(3600) - fine,
           half = wave_error(1800) - fine;

    (void)state;
    if (!(coarse / half > 3.3 && coarse / half < 8))
        fail_msg("errors %g and %g: ratio %g", coarse, half, coarse / half);
    assert_true(fabs(coarse) < 0.02); /* K, of +-10 K in the air, at hourly steps */
}

/* What flows in is what the column gains, to 1e-9 of the throughput of a year. */
static void test_energy(void **state)
{
    static struct climate_hour hours[CLIMATE_HOURS];
    struct climate_range range = usual_range();
    struct conduction_material soil = {1.5, 2e6};
    struct bath bath = {.film = 18, .step_s = 3600};
    struct conduction_column column;
    double t[CONDUCTION_NODES_MOST], before, gained = 0, through = 0;

    (void)state;
    climate_make(&range, hours);
    fill(t, 10);
    make_column(0.2, 0.15, 8, 3600, soil, soil, &column);
    before = conduction_heat(&column, t);
    for (int h = 0; h < CLIMATE_HOURS; h++) {
        double flux;
        bath.air_c = hours[h].air_c;
        flux = conduction_step(&column, t, bath_flux, &bath);
        gained += 3600 * flux;
        through += 3600 * fabs(flux);
    }
    NEAR((conduction_heat(&column, t) - before - gained) / through, 0, 1e-9);
}

static void make_year(double thickness, const struct climate_range *range,
                      struct conduction_year *year)
{
    static struct climate_hour hours[CLIMATE_HOURS];
    struct conduction_slab slab;

    conduction_slab_default(thickness, &slab);
    climate_make(range, hours);
    assert_int_equal(conduction_year_make(&slab, hours, year), 0);
}

static double swing_of(const struct conduction_year *year, int day)
{
    double low = INFINITY, high = -INFINITY;

    for (int h = 24 * day; h < 24 * day + 24; h++) {
        low = fmin(low, year->mean_c[h]);
        high = fmax(high, year->mean_c[h]);
    }
    return high - low;
}

/* Extremes of slabs of 100 to 300 mm against a separate one-dimensional run with the same
 * properties and week-long spells (wind 1 to 4 m/s): coldest -10.8 to -8.4, hottest 40 to 45 down
 * to 35 to 39 degC. The spells here are five days, so the coldest may be up to 1 K warmer. */
static void test_year(void **state)
{
    static struct conduction_year thin, thick, hotter;
    struct climate_range range = usual_range();

    (void)state;
    make_year(0.1, &range, &thin);
    make_year(0.3, &range, &thick);
    NEAR(thin.coldest_c, -10.8, 1);
    NEAR(thick.coldest_c, -8.4, 1);
    assert_true(thin.hottest_c > 40 && thin.hottest_c < 45);
    assert_true(thick.hottest_c > 35 && thick.hottest_c < 39);
    assert_true(thin.coldest_hour / 24 >= 17 && thin.coldest_hour / 24 <= 22);
    assert_true(thin.hottest_hour / 24 >= 198 && thin.hottest_hour / 24 <= 203);
    for (int day = 0; day < CLIMATE_DAYS; day += 20)
        assert_true(swing_of(&thick, day) < swing_of(&thin, day));
    range.air_hottest_c += 3;
    make_year(0.1, &range, &hotter);
    assert_true(hotter.hottest_c > thin.hottest_c);
    range.sun_share = 0.25;
    make_year(0.1, &range, &hotter);
    assert_true(hotter.hottest_c < thin.hottest_c);
}

/* ---- rainflow ---- */

/* ASTM E1049-85 Figure 6: -2 1 -3 5 -1 3 -4 4 -2: ranges 3 one half, 4 one and a half, 6 one half,
 * 8 one, 9 one half. */
static void test_rainflow(void **state)
{
    const double history[] = {-2, 1, -3, 5, -1, 3, -4, 4, -2};
    const double want[10] = {[3] = 0.5, [4] = 1.5, [6] = 0.5, [8] = 1, [9] = 0.5};
    struct rainflow_cycle cycles[9];
    double got[10] = {0};
    size_t found;

    (void)state;
    assert_int_equal(rainflow_count(history, 9, cycles, &found), 0);
    for (size_t i = 0; i < found; i++)
        got[(int)cycles[i].range] += cycles[i].count;
    for (int r = 0; r < 10; r++)
        NEAR(got[r], want[r], 1e-12);
    assert_int_equal(rainflow_count(history, 1, cycles, &found), 0);
    assert_int_equal(found, 0);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(test_sun_position), cmocka_unit_test(test_clear_day),
        cmocka_unit_test(test_dew_point),    cmocka_unit_test(test_extremes_as_typed),
        cmocka_unit_test(test_step),         cmocka_unit_test(test_daily_wave),
        cmocka_unit_test(test_cold_air),     cmocka_unit_test(test_plate),
        cmocka_unit_test(test_order),        cmocka_unit_test(test_energy),
        cmocka_unit_test(test_year),         cmocka_unit_test(test_rainflow),
    };

    return cmocka_run_group_tests(tests, NULL, NULL);
}
