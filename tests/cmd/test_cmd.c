/* The command line as a user meets it: exit status, what goes where, wrong arguments, files that
 * are none. What is expected is docs/format.md: "Commands", "Exit status, checks, findings". */
#include "cmd_help.h"

#define E1 "share/examples/e1-service-yard.slab"
#define E2 "share/examples/e2-store-floor.slab"
#define E5 "share/examples/e5-turn-taper.slab"

struct command_case {
    const char *words[WORDS_MOST];
    int status;
    const char *out, *err; /* a part of each; NULL: not looked at, "": must be empty */
};

static void expect_output(const char *name, const char *what, const char *text, const char *part)
{
    if (part != NULL && part[0] == '\0' && text[0] != '\0')
        fail_msg("%s: %s is not empty:\n%s", name, what, text);
    expect_part(name, what, text, part);
}

static void run_cases(const struct command_case *cases, size_t count)
{
    for (size_t i = 0; i < count; i++) {
        char name[600] = "";
        struct run run;
        for (size_t w = 0; w < WORDS_MOST && cases[i].words[w] != NULL; w++) {
            size_t used = strlen(name);
            snprintf(name + used, sizeof name - used, "%s ", cases[i].words[w]);
        }
        run_words(&run, cases[i].words);
        expect_status(name, &run, cases[i].status);
        expect_output(name, "standard output", run.out, cases[i].out);
        expect_output(name, "standard error", run.err, cases[i].err);
        if (cases[i].status == 2)
            expect_sentences(name, run.err);
        run_free(&run);
    }
}

/* ---- exit status ---- */

static void test_examples_end_as_they_should(void **state)
{
    (void)state;
    /* E1 to E4 hold; E5 as first drawn has four panels too long for their width */
    static const struct command_case cases[] = {
        {{"report", E1}, 0, "45 panels", ""},
        {{"report", E2}, 0, "floor", NULL},
        {{"report", "share/examples/e3-two-lane-road.slab"}, 0, "446 panels", "sealing.factor"},
        {{"report", "share/examples/e4-footway.slab"}, 0, "ISOLATION", NULL},
        {{"report", E5}, 1, "too long for their width: 4", NULL},
        {{"check", E1}, 0, "HOLDS", ""},
        {{"check", E5}, 1, "FAILS", NULL},
        {{"draw", E1}, 0, "Depot yard, north bay", ""},
        {{"draw", E5}, 0, "East gate", NULL}, /* 1 is for judging commands only */
        {{"saw", E1}, 0, "Edge stays sharp", ""},
        {{"saw", E1, "--csv"}, 0, "order,line,pour", ""},
        {{"why", E1, "seal.width_m"}, 0, "10 mm", ""},
        {{"why", E5, "seal.extension"}, 0, "WHY", NULL},
        {{"fields"}, 0, "slab.thickness", ""},
        {{"fields", "--json"}, 0, "\"key\":\"slab.thickness\"", ""},
        {{"set", E1, "slab.thickness=6 in", "--dry-run"}, 0, "thickness = 6 in\n", ""},
        {{"--version"}, 0, "slabgap ", ""},
        {{"--help"}, 0, "slabgap report FILE", ""},
        {{"report", "--help"}, 0, "slabgap report FILE", ""},
        {{"set", "x", "-h"}, 0, "slabgap set FILE", ""},
    };

    run_cases(cases, COUNT(cases));
}

/* 1 when a binding check fails; advice, in the same words, never changes it. */
static void test_only_what_binds_decides(void **state)
{
    (void)state;
    static const struct {
        const char *job, *part;
        int status;
    } jobs[] = {
        {F RECTANGLE, "HOLDS", 0},
        {F, "HOLDS", 0},
        /* a blade too narrow for the movement: seal.width binds */
        {F RECTANGLE "[sealant]\nwidth = 4 mm\n", "* FAILS", 1},
        /* one joint in three works: typed, it decides */
        {F RECTANGLE "[sealing]\nworking = 3\n[sealant]\nwidth = 8 mm\n", "* FAILS", 1},
        /* 3 m on 100 mm where 24 x thickness is 2.4 m: typed, advice */
        {F RECTANGLE "[slab]\nthickness = 100 mm\n[rules]\nspacing = 3 m\n", "  FAILS", 0},
        /* a panel narrower than least-side */
        {F RECTANGLE "[joint]\nfrom = 0.5, 0 m\nto = 0.5, 8 m\n", "* FAILS", 1},
        {F RECTANGLE "[sealant]\nkind = none\n", NULL, 0},
    };

    for (size_t i = 0; i < COUNT(jobs); i++) {
        static const char *const commands[] = {"report", "check"};
        write_text("job.slab", jobs[i].job);
        for (size_t c = 0; c < COUNT(commands); c++) {
            struct run run;
            RUN(&run, commands[c], "@");
            expect_status(jobs[i].job, &run, jobs[i].status);
            expect_part(jobs[i].job, commands[c], run.out, jobs[i].part);
            run_free(&run);
        }
    }
}

/* ---- wrong arguments ---- */

static void test_wrong_arguments(void **state)
{
    (void)state;
    static const struct command_case cases[] = {
        {{NULL}, 2, "", "terminal"},
        {{E1}, 2, "", "terminal"},
        {{"measure"}, 2, "", "unknown command 'measure'"},
        {{"seal", E1}, 2, "", "slab's temperature"},
        {{"seal", E1, "--slab", "15", "--trend", "up"}, 2, "", "rising, steady, falling"},
        {{"seal", E1, "--slab", "abc"}, 2, "", "is no value"},
        {{"seal", E1, "--slab", "15", "--hour", "25"}, 2, "", "no clock time"},
        {{"seal", E1, "--slab", "15", "--date", "2027-02-30"}, 2, "", "no date"},
        {{"seal", E1, "--slab"}, 2, "", "needs a value"},
        {{"buy"}, 2, "", "--length 300m"},
        {{"buy", "--length"}, 2, "", "needs a value"},
        {{"buy", "--length", "300m", "--pack", "0 ml"}, 2, "", "takeoff.packages"},
        {{"buy", "--price", "3"}, 2, "", "no option"},
        {{"paper", E1}, 2, "", "unknown command 'paper'"}, /* not built yet: no stub */
        {{"--loud"}, 2, "", "'--loud'"},
        {{"report"}, 2, "", "FILE"},
        {{"report", "--json"}, 2, "", "FILE"},
        {{"report", E1, E2}, 2, "", E2},
        {{"report", E1, "--loud"}, 2, "", "'--loud'"},
        {{"report", E1, "--only"}, 2, "", "--only"},
        {{"report", E1, "--only", "colour"}, 2, "", "'colour'"},
        {{"report", E1, "--only", "colour"}, 2, "", "spacing"}, /* says which there are */
        {{"report", E1, "--csv"}, 2, "", "--csv"},
        {{"report", E1, "--csv", "panel"}, 2, "", "joints, panels, quantities or sealing"},
        {{"report", E1, "--json", "--csv", "joints"}, 2, "", "not both"},
        {{"check"}, 2, "", "FILE"},
        {{"check", E1, E2}, 2, "", "one job FILE"},
        {{"draw"}, 2, "", "FILE"},
        {{"draw", E1, E2}, 2, "", E2},
        {{"draw", E1, "-o"}, 2, "", "-o"},
        {{"draw", E1, "-o", "@/plan.svg"}, 2, "", ".txt"},
        {{"draw", E1, "-o", "@/plan"}, 2, "", ".txt"},
        {{"draw", E1, "--size", "wide"}, 2, "", "120x40"},
        {{"draw", E1, "--size", "120x40x3"}, 2, "", "120x40"},
        {{"draw", E1, "--size", "-120x40"}, 2, "", "120x40"},
        {{"draw", E1, "--size", "3x3"}, 2, "", "20x8"},
        {{"draw", E1, "--size", "9999x9999"}, 2, "", "2000x2000"},
        {{"set"}, 2, "", "PATH=VALUE"},
        {{"set", E1}, 2, "", "PATH=VALUE"},
        {{"set", E1, "--dry-run"}, 2, "", "PATH=VALUE"},
        {{"set", E1, "slab.thickness", "--dry-run"}, 2, "", "slab.thickness='200 mm'"},
        {{"set", E1, "=3", "--dry-run"}, 2, "", "=3"},
        {{"set", E1, "--loud", "slab.thickness=1 m", "--dry-run"}, 2, "", "--loud"},
        {{"fields", "--csv"}, 2, "", "--json"},
        {{"fields", "--json", "--json"}, 2, "", "--json"},
        {{"saw"}, 2, "", "FILE"},
        {{"saw", E1, "--json"}, 2, "", "'--json'"},
        {{"saw", E1, E1}, 2, "", "as well"},
        {{"saw", E5}, 2, "", "pour.start"}, /* says what to type */
        {{"why"}, 2, "", "PATH"},
        {{"why", E1}, 2, "", "PATH"},
        {{"why", E1, "seal.width_m", "cut"}, 2, "", "PATH"},
        {{"why", E1, "seal.colour"}, 2, "", "'seal.colour'"},
        {{"why", E1, "seal.colour"}, 2, "", "seal.width_m"}, /* says which there are */
        {{"why", E1, "joints.J99.open_m"}, 2, "", "'joints.J99.open_m'"},
        {{"why", E1, "sealing"}, 2, "", "seal. cut."}, /* the groups there are */
        {{"why", E1, "isolation.1"}, 2, "", "working.1"},
        {{"why", E1, ""}, 2, "", "''"},
    };

    run_cases(cases, COUNT(cases));
}

/* ---- files that are none ---- */

static void test_files_that_cannot_be_read(void **state)
{
    (void)state;
    static const char *const commands[][4] = {
        {"report"}, {"check"}, {"draw"}, {"why", "seal.width_m"}, {"set", "slab.use=road"}};
    static const struct {
        const char *path, *part;
    } files[] = {{"@/none.slab", "no such file"},         {"@/none/job.slab", "no such file"},
                 {"@/job.slab/job.slab", "no such file"}, {"", "no such file"},
                 {"@/.", "not a regular file"},           {"/dev/null", "not a regular file"},
                 {"@/closed.slab", "no permission"}};

    write_text("job.slab", F);
    write_text("closed.slab", F);
    chmod(inside("closed.slab"), 0);
    for (size_t c = 0; c < COUNT(commands); c++)
        for (size_t f = 0; f < COUNT(files); f++) {
            struct run run;
            if (f + 1 == COUNT(files) && geteuid() == 0)
                continue; /* nothing is closed to root */
            RUN(&run, commands[c][0], files[f].path, commands[c][1]);
            expect_status(files[f].path, &run, 2);
            expect_part(files[f].path, "standard error", run.err, files[f].part);
            expect_part(files[f].path, "standard error", run.err, ";"); /* and what to do */
            expect_sentences(files[f].path, run.err);
            assert_string_equal(run.out, "");
            run_free(&run);
        }
}

static void test_too_large_a_file(void **state)
{
    (void)state;
    struct run run;

    write_text("large.slab", F);
    assert_int_equal(truncate(inside("large.slab"), 16 * 1024 * 1024 + 1), 0);
    RUN(&run, "check", "@/large.slab");
    expect_status("17 MB", &run, 2);
    expect_part("17 MB", "standard error", run.err, "16 MiB");
    run_free(&run);
}

static void test_a_missing_file_in_json(void **state)
{
    (void)state;
    struct run run;

    RUN(&run, "report", "@/none.slab", "--json");
    expect_status("none.slab", &run, 2);
    expect_part("none.slab", "standard output", run.out, "\"program\":");
    expect_part("none.slab", "standard output", run.out, "\"severity\":\"error\"");
    assert_null(strstr(run.out, "\"seal\""));
    run_free(&run);
}

/* ---- output that cannot be written ---- */

static void test_full_disk(void **state)
{
    (void)state;
    static const char *const lines[][6] = {
        {"report", E1},
        {"report", E1, "--json"},
        {"report", E1, "--csv", "joints"},
        {"report", "none.slab", "--json"},
        {"check", E1},
        {"draw", E1},
        {"why", E1, "seal.width_m"},
        {"fields"},
        {"fields", "--json"},
        {"set", E1, "slab.use=road", "--dry-run"},
        {"--help"},
        {"--version"},
    };

    for (size_t i = 0; i < COUNT(lines); i++) {
        struct run run;
        run_words_to(&run, lines[i], "/dev/full");
        expect_status(lines[i][0], &run, 2);
        expect_part(lines[i][0], "standard error", run.err, "could not be written");
        run_free(&run);
    }
}

static void test_output_files(void **state)
{
    (void)state;
    struct run run;
    char *first, *second;

    RUN(&run, "draw", E1, "-o", "@/plan.txt");
    expect_status("a new file", &run, 0);
    assert_string_equal(run.out, "");
    run_free(&run);
    first = read_whole(inside("plan.txt"));
    expect_part("plan.txt", "the file", first, "Depot yard, north bay");

    RUN(&run, "draw", E2, "-o", "@/plan.txt");
    expect_status("our own file again", &run, 0);
    run_free(&run);
    second = read_whole(inside("plan.txt"));
    assert_string_not_equal(first, second);

    write_text("letter.txt", "Dear neighbour,\n");
    RUN(&run, "draw", E1, "-o", "@/letter.txt");
    expect_status("somebody's file", &run, 2);
    expect_part("letter.txt", "standard error", run.err, "--force");
    assert_file("letter.txt", "Dear neighbour,\n");
    run_free(&run);
    RUN(&run, "draw", E1, "--force", "-o", "@/letter.txt");
    expect_status("forced", &run, 0);
    run_free(&run);
    free(first);
    first = read_whole(inside("letter.txt"));
    expect_part("letter.txt", "the file", first, "Depot yard, north bay");

    RUN(&run, "draw", E1, "-o", "@/none/plan.txt");
    expect_status("no such folder", &run, 2);
    expect_part("no such folder", "standard error", run.err, "folder");
    run_free(&run);
    mkdir(inside("folder.txt"), 0700);
    RUN(&run, "draw", E1, "--force", "-o", "@/folder.txt");
    expect_status("a folder", &run, 2);
    run_free(&run);
    free(first);
    free(second);
}

/* The drawing keeps to the size asked for. */
static void test_draw_size(void **state)
{
    (void)state;
    struct run run;
    size_t lines = 0, widest = 0;

    RUN(&run, "draw", E1, "--size", "60x20", "--ascii");
    expect_status("60x20", &run, 0);
    for (char *line = run.out, *end; (end = strchr(line, '\n')) != NULL; line = end + 1, lines++)
        widest = (size_t)(end - line) > widest ? (size_t)(end - line) : widest;
    assert_in_range(lines, 16, 20 + 4); /* the title above, the caution below */
    assert_in_range(widest, 50, 78);
    for (const char *c = run.out; *c != '\0'; c++)
        assert_true(*c == '\n' || (*c >= ' ' && *c <= '~'));
    run_free(&run);
}

/* The same job gives the same bytes, whatever the clock and the folder say. */
static void test_twice_the_same(void **state)
{
    (void)state;
    static const char *const tails[][3] = {{"--json"}, {NULL}, {"--csv", "joints"}};

    for (size_t i = 0; i < COUNT(tails); i++) {
        struct run one, two;
        RUN(&one, "report", E2, tails[i][0], tails[i][1]);
        setenv("TZ", "Pacific/Auckland", 1);
        setenv("LC_ALL", "C", 1);
        RUN(&two, "report", E2, tails[i][0], tails[i][1]);
        unsetenv("TZ");
        unsetenv("LC_ALL");
        assert_string_equal(one.out, two.out);
        assert_true(strlen(one.out) > 1000);
        run_free(&one);
        run_free(&two);
    }
}

/* --help names what is built and nothing else; every one of these answers. */
static void test_help_lists_what_there_is(void **state)
{
    (void)state;
    static const char *const built[] = {"report", "draw", "check", "set", "fields",
                                        "why",    "year", "seal",  "buy"};
    static const char *const later[] = {"paper", "compare", "study", "fit"};
    struct run run;
    char line[32];

    RUN(&run, "--help");
    for (size_t i = 0; i < COUNT(built); i++) {
        snprintf(line, sizeof line, "\n  slabgap %s", built[i]);
        expect_part("--help", "standard output", run.out, line);
    }
    for (size_t i = 0; i < COUNT(later); i++) {
        snprintf(line, sizeof line, "\n  slabgap %s ", later[i]);
        assert_null(strstr(run.out, line));
    }
    expect_part("--help", "standard output", run.out, "Exit status: 0");
    run_free(&run);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(test_examples_end_as_they_should),
        cmocka_unit_test(test_only_what_binds_decides),
        cmocka_unit_test(test_wrong_arguments),
        cmocka_unit_test(test_files_that_cannot_be_read),
        cmocka_unit_test(test_too_large_a_file),
        cmocka_unit_test(test_a_missing_file_in_json),
        cmocka_unit_test(test_full_disk),
        cmocka_unit_test(test_output_files),
        cmocka_unit_test(test_draw_size),
        cmocka_unit_test(test_twice_the_same),
        cmocka_unit_test(test_help_lists_what_there_is),
    };

    return cmocka_run_group_tests_name("cmd", tests, make_folder, remove_folder);
}
