/* Weather files: what is read, what is filled and said, what is refused with its line. The data of
 * the small files are made here; the record shipped in share/climate has its source in it. */
#include <setjmp.h>
#include <stdarg.h>
#include <stddef.h>
#include <stdint.h>

#include <cmocka.h>

#include "base/text.h"
#include "core/conduction.h"
#include "core/sun.h"
#include "core/weather.h"
#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

#define NEAR(got, want, tolerance) expect_near(#got, (got), (want), (tolerance))

static void expect_near(const char *what, double got, double want, double tolerance)
{
    if (!(fabs(got - want) <= tolerance))
        fail_msg("%s is %.9g, not %.9g within %g", what, got, want, tolerance);
}

static struct climate_range usual(void)
{
    return (struct climate_range){
        .wind_m_s = 2, .cloud = 0.5, .humidity = 0.7, .latitude_deg = 45, .sun_share = 1};
}

/* ---- making files ---- */

static void month_day(int day, int *month, int *of_month)
{
    static const int days[] = {31, 28, 31, 30, 31, 30, 31, 31, 30, 31, 30, 31};

    for (*month = 1; day >= days[*month - 1]; (*month)++)
        day -= days[*month - 1];
    *of_month = day + 1;
}

/* A line a day of `year` from day `first` on, 365 of them; day `skip` to `skip_to` are left out. */
static void add_days(struct text *out, int year, int first, int skip, int skip_to)
{
    for (int i = first; i < first + 365; i++) {
        int month, day, d = i % 365;
        if (i >= skip && i < skip_to)
            continue;
        month_day(d, &month, &day);
        text_format(out, "%d-%02d-%02d,%d,%d\n", year + i / 365, month, day, d % 10, d % 10 + 12);
    }
}

enum { HEAD = 1 };
static const char daily_header[] = "date,tmin_c,tmax_c\n";

static struct weather *parse(const char *bytes, size_t count, struct finding_list *findings)
{
    struct weather *weather;

    *findings = (struct finding_list){0};
    weather_parse(bytes, count, &weather, findings);
    return weather;
}

static struct weather *parse_text(struct text *file, struct finding_list *findings)
{
    struct weather *weather = parse(text_string(file), file->length, findings);

    text_free(file);
    return weather;
}

static bool said(const struct finding_list *findings, enum severity severity, const char *words)
{
    for (size_t i = 0; i < findings->count; i++)
        if (findings->items[i].severity == severity &&
            strstr(findings->items[i].message, words) != NULL)
            return true;
    return false;
}

#define SAID(findings, severity, words)                                                            \
    do {                                                                                           \
        if (!said(findings, severity, words))                                                      \
            fail_msg("nobody says '%s' but '%s'", words,                                           \
                     (findings)->count > 0 ? (findings)->items[0].message : "nothing");            \
    } while (0)

/* ---- daily ---- */

static void test_daily(void **state)
{
    struct climate_hour *hours = malloc(CLIMATE_HOURS * sizeof *hours);
    struct climate_range range = usual();
    struct finding_list findings;
    struct text file = {0};
    struct weather *weather;

    (void)state;
    text_add(&file, "\xef\xbb\xbf# a comment\r\n\r\n");
    text_add(&file, daily_header);
    add_days(&file, 2015, 0, 0, 0);
    weather = parse_text(&file, &findings);
    assert_non_null(weather);
    assert_int_equal(weather->years, 1);
    assert_int_equal(weather->first_year, 2015);
    assert_false(weather->hourly || weather->has_sun || weather->has_wind);
    NEAR(weather->coldest_c, 0, 1e-6);
    NEAR(weather->hottest_c, 21, 1e-6);
    weather_year(weather, 0, &range, hours);
    for (int d = 0; d < CLIMATE_DAYS; d++) { /* both ends of every day are met, at 3 h and 15 h */
        NEAR(hours[24 * d + 3].air_c, d % 10, 1e-5);
        NEAR(hours[24 * d + 15].air_c, d % 10 + 12, 1e-5);
        NEAR(hours[24 * d + 9].air_c, d % 10 + 6, 1e-5);
        NEAR(hours[24 * d].wind_m_s, 2, 0);
    }
    SAID(&findings, SEVERITY_NOTE, "one year of weather");
    weather_release(weather);
    finding_free(&findings);
    free(hours);
}

/* FAO-56 (1998) eq. 50 with its example 15, Lyon in July: 26.6 and 14.8 degC, Ra 40.6 MJ/m2: Rs =
 * 0.16 sqrt(11.8) 40.6 = 22.3 (the example from memory, the equation read): on a day of that range
 * the sun is 0.733 of a clear sky's. */
static void test_sun_of_range(void **state)
{
    struct climate_hour *hours = malloc(CLIMATE_HOURS * sizeof *hours);
    struct climate_range range = usual();
    struct finding_list findings;
    struct text file = {0};
    struct weather *weather;
    double sum = 0, clear = 0;

    (void)state;
    text_add(&file, daily_header);
    for (int d = 0; d < 365; d++) {
        int month, day;
        month_day(d, &month, &day);
        text_format(&file, "2015-%02d-%02d,14.8,26.6\n", month, day);
    }
    weather = parse_text(&file, &findings);
    weather_year(weather, 0, &range, hours);
    for (int h = 24 * 195; h < 24 * 196; h++) {
        sum += hours[h].sun_w_m2;
        clear += sun_clear(45, 196, h % 24);
    }
    NEAR(sum / clear, 0.16 * sqrt(11.8) / 0.75, 1e-6);
    NEAR(sum / clear * 0.75 * 40.6, 22.3, 0.05);
    /* and the clouds are those that let just this share through */
    NEAR(sun_cloud_share(hours[24 * 195].cloud), sum / clear, 1e-6);
    weather_release(weather);
    finding_free(&findings);
    free(hours);
}

static void test_units(void **state)
{
    static const struct {
        const char *header;
        double lowest_c;
    } files[] = {{"Date;TMIN (degrees Fahrenheit);TMAX (F)\n", -16.6667},
                 {"date;temp_min [\xc2\xb0"
                  "C];temp_max [\xc2\xb0"
                  "C]\n",
                  2},
                 {"day date;lowest_degc;highest_degc\n", 2}};

    (void)state;
    for (size_t i = 0; i < sizeof files / sizeof *files; i++) {
        struct finding_list findings;
        struct text file = {0};
        struct weather *weather;
        text_add(&file, files[i].header);
        for (int d = 0; d < 365; d++) {
            int month, day;
            month_day(d, &month, &day);
            text_format(&file, "%02d.%02d.2015;2,0;12,5\n", day, month);
        }
        weather = parse_text(&file, &findings);
        if (weather == NULL)
            fail_msg("%s: %s", files[i].header, findings.items[0].message);
        NEAR(weather->coldest_c, files[i].lowest_c, 1e-3);
        SAID(&findings, SEVERITY_NOTE, "decimal commas");
        weather_release(weather);
        finding_free(&findings);
    }
}

/* ---- several years, gaps ---- */

static void test_years(void **state)
{
    struct finding_list findings;
    struct text file = {0};
    struct weather *weather;

    (void)state;
    text_add(&file, daily_header);
    add_days(&file, 2012, 0, 0, 0);
    text_add(&file, "2012-02-29,-40,1\n"); /* left out */
    add_days(&file, 2013, 0, 100, 103);    /* three days are filled */
    text_add(&file, "2014-01-01,-50,0\n2014-01-02,-50,0\n2014-01-03,-50,0\n");
    weather = parse_text(&file, &findings);
    assert_non_null(weather);
    assert_int_equal(weather->years, 2);
    assert_int_equal(weather->first_year, 2012);
    NEAR(weather->coldest_c, 0, 1e-6);
    SAID(&findings, SEVERITY_NOTE, "29 February");
    SAID(&findings, SEVERITY_NOTE, "3 days are missing");
    SAID(&findings, SEVERITY_NOTE, "2014 has only 3 days");
    /* between day 99 (9, 21) and day 103 (3, 15): straight */
    NEAR(weather->hours[CLIMATE_HOURS + 24 * 101 + 3].air_c, 6, 1e-5);
    NEAR(weather_day_mean(weather, 50), 6, 0.5);
    weather_release(weather);
    finding_free(&findings);

    text_add(&file, daily_header); /* from one spring to the next: one year */
    add_days(&file, 2012, 90, 0, 0);
    weather = parse_text(&file, &findings);
    assert_non_null(weather);
    assert_int_equal(weather->years, 1);
    NEAR(weather->hours[3].air_c, 0, 1e-6);
    weather_release(weather);
    finding_free(&findings);
}

/* The two-line header of typical-year files: station above, clock 01:00 to 24:00, months of several
 * years, -9900 for missing. */
static void test_typical_year(void **state)
{
    struct climate_hour *hours = malloc(CLIMATE_HOURS * sizeof *hours);
    struct climate_range range = usual();
    struct finding_list findings;
    struct text file = {0};
    struct weather *weather;

    (void)state;
    text_add(&file,
             "999999,\"MADE, UP\",XX,-5.0,40.500,-75.000,12\n"
             "Date (MM/DD/YYYY),Time (HH:MM),ETR (W/m^2),GHI (W/m^2),GHI source,GHI uncert (%),"
             "TotCld (tenths),Dry-bulb (C),Dry-bulb source,Dew-point (C),RHum (%),Wdir (degrees),"
             "Wspd (m/s),Alb (unitless)\n");
    for (int d = 0; d < 365; d++)
        for (int h = 1; h <= 24; h++) {
            int month, day;
            month_day(d, &month, &day);
            text_format(&file, "%02d/%02d/%d,%02d:00,0,%d,1,8,%d,%d.5,A,-1,55,270,%d,-9900\n",
                        month, day, 1980 + month, h,
                        h == 12   ? 400
                        : h == 13 ? 600
                                  : 0,
                        month % 10, h, h == 5 ? -9900 : 3);
        }
    weather = parse_text(&file, &findings);
    if (weather == NULL)
        fail_msg("%s", findings.items[0].message);
    assert_int_equal(weather->years, 1);
    assert_int_equal(weather->first_year, 0);
    assert_true(weather->hourly && weather->has_sun && weather->has_wind && weather->has_cloud);
    NEAR(weather->latitude_deg, 40.5, 1e-9);
    weather_year(weather, 0, &range, hours);
    NEAR(hours[24 * 10 + 7].air_c, 7.5, 1e-6);
    NEAR(hours[24 * 11].air_c, 24.5, 1e-6); /* 24:00 is hour 0 of the next day */
    NEAR(hours[0].air_c, 24.5, 1e-6);
    NEAR(hours[24 * 10 + 5].wind_m_s, 2, 0); /* missing: the usual wind */
    NEAR(hours[24 * 10 + 6].wind_m_s, 3, 0);
    NEAR(hours[24 * 10 + 12].sun_w_m2, 500, 1e-3); /* at the full hour */
    NEAR(hours[24 * 40].cloud, 0.2, 1e-6);
    NEAR(hours[24 * 40 + 10].dew_c, -1, 1e-6);
    SAID(&findings, SEVERITY_WARNING, "hides the real extremes");
    weather_release(weather);
    finding_free(&findings);
    free(hours);
}

static void add_hours(struct text *out, int skip, int skip_to, const char *row, int instead)
{
    text_add(out, "date,time,temp_c\n");
    for (int i = 0; i < CLIMATE_HOURS; i++) {
        int month, day;
        month_day(i / 24, &month, &day);
        if (i == instead)
            text_add(out, row);
        else if (i < skip || i >= skip_to)
            text_format(out, "2015-%02d-%02d,%02d:00,%d\n", month, day, i % 24, abs(i % 24 - 12));
    }
}

static void test_hourly_gaps(void **state)
{
    struct finding_list findings;
    struct text file = {0};
    struct weather *weather;

    (void)state;
    add_hours(&file, 1002, 1007, "", -1); /* 18 to 22 h: straight from 17 to 23 */
    weather = parse_text(&file, &findings);
    assert_non_null(weather);
    SAID(&findings, SEVERITY_NOTE, "5 hours are missing");
    NEAR(weather->hours[1004].air_c, 1004 % 24 - 12, 1e-5);
    weather_release(weather);
    finding_free(&findings);

    add_hours(&file, 1002, 1042, "", -1); /* 40 h: the same hours of the days beside */
    weather = parse_text(&file, &findings);
    assert_non_null(weather);
    for (int i = 1002; i < 1042; i++)
        NEAR(weather->hours[i].air_c, abs(i % 24 - 12), 1e-5);
    weather_release(weather);
    finding_free(&findings);

    add_hours(&file, 1002, 1100, "", -1); /* 98 h are too many */
    assert_null(parse_text(&file, &findings));
    SAID(&findings, SEVERITY_ERROR,
         "after line 1003: nothing from 11 February 18:00 to 15 February 19:00");
    finding_free(&findings);

    add_hours(&file, 0, 0, "2015-02-11,18:00,45\n", 1002); /* kept, and said */
    weather = parse_text(&file, &findings);
    assert_non_null(weather);
    SAID(&findings, SEVERITY_WARNING, "line 1004: the air goes from 5 to 45");
    weather_release(weather);
    finding_free(&findings);
}

/* ---- refused ---- */

/* A whole file of days with one row replaced. */
static struct weather *with_row(const char *header, const char *row, struct finding_list *findings)
{
    struct text file = {0};

    text_add(&file, header);
    add_days(&file, 2015, 0, 200, 201);
    text_add(&file, row);
    return parse_text(&file, findings);
}

static void test_refused(void **state)
{
    static const struct {
        const char *row, *words;
    } rows[] = {
        {"2015-07-20,1\n", "line 366: 2 cells under 3 names"},
        {"2015-07-20,1,5,12,5\n", "line 366: 5 cells under 3 names; write 12.5 for 12,5"},
        {"2015-07-20,x1,5\n", "line 366: 'x1' in the column 'tmin_c' is no number"},
        {"2015-07-20,0x10,50\n", "line 366: '0x10' in the column"},
        {"2015-07-20,inf,50\n", "line 366: 'inf' in the column"},
        {"2015-07-20,1,95\n", "line 366: '95' in the column 'tmax_c' cannot be; check"},
        {"2015-07-20,9,5\n", "line 366: the lowest, 9 degC, is above the highest, 5"},
        {"2015-13-20,1,5\n", "line 366: '2015-13-20' is no date"},
        {"2015-02-30,1,5\n", "line 366: '2015-02-30' is no date"},
        {"20/07/2015,1,5\n", "line 366: '20/07/2015' is no date"},
        {"2015-07-20 13:00,1,5\n", "line 366: '2015-07-20 13:00' is no date"},
        {",1,5\n", "line 366: '' is no date"},
        {"2015-03-01,1,5\n", "line 366: this day stands on line 61 already"},
        {"\"2015-07-20,1,5\n", "line 366: 1 cells under 3 names"},
    };

    (void)state;
    for (size_t i = 0; i < sizeof rows / sizeof *rows; i++) {
        struct finding_list findings;
        assert_null(with_row(daily_header, rows[i].row, &findings));
        SAID(&findings, SEVERITY_ERROR, rows[i].words);
        finding_free(&findings);
    }
}

static void test_refused_files(void **state)
{
    static const struct {
        const char *header, *words;
    } files[] = {
        {"date,temp_min,temp_max\n", "line 1: the column 'temp_min' states no unit"},
        {"tmin_c,tmax_c,rain\n", "no header with a date and a temperature"},
        {"date,tmin_c,rain\n", "no header with a date and a temperature"},
        {"", "no header"},
        {"date,temp_c,rain\n", "line 2: '' is no clock time"}, /* by hours: a day has no clock */
    };
    struct finding_list findings;
    struct text file = {0};

    (void)state;
    for (size_t i = 0; i < sizeof files / sizeof *files; i++) {
        assert_null(with_row(files[i].header, "", &findings));
        SAID(&findings, SEVERITY_ERROR, files[i].words);
        finding_free(&findings);
    }
    assert_null(parse("", 0, &findings));
    SAID(&findings, SEVERITY_ERROR, "is empty");
    finding_free(&findings);
    assert_null(parse("\xff\xfe"
                      "d\0a\0",
                      6, &findings));
    SAID(&findings, SEVERITY_ERROR, "UTF-16");
    finding_free(&findings);
    assert_null(parse(daily_header, strlen(daily_header), &findings));
    SAID(&findings, SEVERITY_ERROR, "no year has");
    finding_free(&findings);
    text_add(&file, daily_header); /* too long a gap, at the end of the year: round the corner */
    add_days(&file, 2015, 0, 358, 365);
    assert_null(parse_text(&file, &findings));
    SAID(&findings, SEVERITY_ERROR, "after line 359: nothing from 25 December to 31 December");
    finding_free(&findings);
    text_add(&file, daily_header); /* at most twenty lines are named */
    for (int i = 0; i < 1000; i++)
        text_add(&file, "nonsense,1,2\n");
    assert_null(parse_text(&file, &findings));
    assert_int_equal(findings.count, 20);
    SAID(&findings, SEVERITY_ERROR, "More lines are wrong");
    finding_free(&findings);
}

static void test_humidity(void **state)
{
    struct climate_hour *hours = malloc(CLIMATE_HOURS * sizeof *hours);
    struct climate_range range = usual();
    struct finding_list findings;
    struct text file = {0};
    struct weather *weather;

    (void)state;
    text_add(&file, "date;time;temp_c;rh_%\n");
    for (int i = 0; i < CLIMATE_HOURS; i++) {
        int month, day;
        month_day(i / 24, &month, &day);
        text_format(&file, "2015%02d%02d;%d;20;%d\n", month, day, i % 24, i % 2 ? 100 : 0);
    }
    weather = parse_text(&file, &findings);
    assert_non_null(weather);
    SAID(&findings, SEVERITY_NOTE, "humidity of 0 is taken as 1 %");
    weather_year(weather, 0, &range, hours);
    NEAR(hours[1].dew_c, 20, 1e-9);
    assert_true(isfinite(hours[0].dew_c) && hours[0].dew_c < -35);
    weather_release(weather);
    finding_free(&findings);
    free(hours);
}

/* ---- the shipped record ---- */

/* NOAA's daily record of Seattle, 2015: lowest -3.8 (30 November), highest 35 degC (19 July). The
 * slab's year under it stays within what the surface can do. */
static void test_shipped(void **state)
{
    struct climate_hour *hours = malloc(CLIMATE_HOURS * sizeof *hours);
    struct conduction_year *year = malloc(sizeof *year);
    struct climate_range range = usual();
    struct conduction_slab slab;
    struct finding_list findings;
    struct weather *weather, *shared;
    struct text file = {0};
    char block[4096];
    FILE *in = fopen("share/climate/seattle-2015.csv", "rb");
    size_t got;

    (void)state;
    assert_non_null(in);
    while ((got = fread(block, 1, sizeof block, in)) > 0)
        text_add_bytes(&file, block, got);
    fclose(in);
    assert_non_null(strstr(text_string(&file), "NOAA"));
    weather = parse_text(&file, &findings);
    assert_non_null(weather);
    NEAR(weather->coldest_c, -3.8, 1e-5);
    NEAR(weather->hottest_c, 35, 1e-5);
    NEAR(weather->hours[24 * 333 + 3].air_c, -3.8, 1e-5);
    NEAR(weather->hours[24 * 199 + 15].air_c, 35, 1e-5);
    assert_true(weather->has_wind && !weather->hourly);
    range.latitude_deg = 47.4;
    weather_year(weather, 0, &range, hours);
    conduction_slab_default(0.2, &slab);
    assert_int_equal(conduction_year_make(&slab, hours, year), STATUS_OK);
    assert_true(year->coldest_c > -5 && year->coldest_c < 3);
    assert_true(year->hottest_c > 33 && year->hottest_c < 45);
    shared = weather_share(weather);
    weather_release(weather);
    NEAR(shared->coldest_c, -3.8, 1e-5); /* still there */
    weather_release(shared);
    weather_release(NULL);
    finding_free(&findings);
    free(hours);
    free(year);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(test_daily),        cmocka_unit_test(test_sun_of_range),
        cmocka_unit_test(test_units),        cmocka_unit_test(test_years),
        cmocka_unit_test(test_typical_year), cmocka_unit_test(test_hourly_gaps),
        cmocka_unit_test(test_refused),      cmocka_unit_test(test_refused_files),
        cmocka_unit_test(test_humidity),     cmocka_unit_test(test_shipped),
    };

    return cmocka_run_group_tests(tests, NULL, NULL);
}
