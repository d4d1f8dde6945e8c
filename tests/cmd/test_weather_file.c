/* A job that names a weather file, run as a user does: found beside the job, used, and every way it
 * can be unreadable is one sentence and exit 2. */
#include "cmd_help.h"

static char record[64 * 366];

/* A record of one year made here: 0 to 10 degC, one day of -20. */
static void make_record(void)
{
    static const int days[] = {31, 28, 31, 30, 31, 30, 31, 31, 30, 31, 30, 31};
    size_t used = (size_t)sprintf(record, "date,tmin_c,tmax_c\r\n");

    for (int m = 1; m <= 12; m++)
        for (int d = 1; d <= days[m - 1]; d++)
            used += (size_t)sprintf(record + used, "2020-%02d-%02d,%d,10\r\n", m, d,
                                    m == 2 && d == 3 ? -20 : 0);
}

static void test_used(void **state)
{
    struct run run;

    (void)state;
    make_record();
    write_text("air.csv", record);
    write_text("job.slab", F "[climate]\nfile = air.csv\n" RECTANGLE);
    RUN(&run, "report", "@", "--only", "temperature");
    assert_int_equal(run.status, 0);
    assert_non_null(strstr(run.out, "Simulated from the weather file air.csv, 2020, a line a day"));
    assert_non_null(strstr(run.out, "Estimate coldest, to compare            -20 °C"));
    assert_non_null(strstr(run.err, "one year of weather"));
    run_free(&run);
    RUN(&run, "year", "@");
    assert_int_equal(run.status, 0);
    assert_non_null(strstr(run.out, "Widest about 3 February"));
    run_free(&run);
    RUN(&run, "buy", "@");
    assert_int_equal(run.status, 0);
    run_free(&run);
    write_text("job.slab", F "[climate]\nfile = air.csv\nair-coldest = -30 degC\n" RECTANGLE);
    RUN(&run, "check", "@");
    assert_non_null(strstr(run.err, "climate.air-coldest: not used; the air of the weather file"));
    run_free(&run);
}

static void refused(const char *file, const char *words)
{
    struct run run;
    char job[512];

    snprintf(job, sizeof job, F "[climate]\nfile = %s\n" RECTANGLE, file);
    write_text("job.slab", job);
    RUN(&run, "report", "@");
    assert_int_equal(run.status, 2);
    assert_string_equal(run.out, "");
    if (strstr(run.err, words) == NULL || strstr(run.err, "climate.file") == NULL)
        fail_msg("'%s' does not say '%s'", run.err, words);
    run_free(&run);
}

static void test_refused(void **state)
{
    struct run run;

    (void)state;
    refused("nowhere.csv", "nowhere.csv: there is no such file");
    refused("/nowhere/at/all.csv", "/nowhere/at/all.csv: there is no such file");
    assert_int_equal(mkdir(inside("folder"), 0700), 0);
    refused("folder", "not a regular file");
    assert_int_equal(mkfifo(inside("pipe"), 0600), 0);
    refused("pipe", "not a regular file");
    write_text("huge.csv", "date,tmin_c,tmax_c\n");
    assert_int_equal(truncate(inside("huge.csv"), 10L << 30), 0); /* 10 GB, nothing on the disk */
    refused("huge.csv", "larger than 16 MiB");
    write_text("huge.csv", "");
    refused("huge.csv", "is empty");
    write_text("cut.csv", "date,tmin_c,tmax_c\n2020-01-01,1,2\n2020-01-02,1\n");
    refused("cut.csv", "line 3: 2 cells under 3 names");
    RUN(&run, "report", "@", "--json");
    assert_int_equal(run.status, 2);
    assert_non_null(strstr(run.out, "line 3: 2 cells"));
    run_free(&run);
    RUN(&run, "set", "@", "climate.file=other.csv"); /* the text may be changed all the same */
    assert_int_equal(run.status, 0);
    run_free(&run);
}

int main(void)
{
    const struct CMUnitTest tests[] = {cmocka_unit_test(test_used), cmocka_unit_test(test_refused)};

    return cmocka_run_group_tests(tests, make_folder, remove_folder);
}
