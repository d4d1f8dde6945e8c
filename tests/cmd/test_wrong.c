/* Wrong input in words: every sentence names the field, the value, the limit and what to do, and no
 * input ends the program any other way than by 0, 1 or 2. The list is that of what goes wrong on
 * sites: swapped numbers, another unit system, a drawing that closes on itself. */
#include "cmd_help.h"

#define ROUND(at, across) "[object M1]\nkind = manhole\nat = " at "\ndiameter = " across "\n"

struct wrong {
    const char *name, *job;
    int status;
    const char *parts[4]; /* in standard error */
    const char *out;      /* in the verdicts; NULL: not looked at */
};

static const struct wrong refused[] = {
    {"coldest above hottest",
     F "[climate]\nslab-coldest = 40 degC\nslab-hottest = 10 degC\n",
     2,
     {"climate.slab-coldest", "40 °C", "10 °C", "swap"},
     NULL},
    {"coldest air above hottest",
     F "[climate]\nair-coldest = 35 degC\nair-hottest = -5 degC\n",
     2,
     {"climate.air-coldest", "35 °C", "-5 °C", "swap"},
     NULL},
    {"only the coldest typed, above the computed hottest",
     F "[climate]\nslab-coldest = 50 degC\nair-hottest = 20 degC\n",
     2,
     {"climate.slab-coldest", "50", "above the hottest", "put"},
     NULL},
    {"Fahrenheit in a Celsius job, hottest slab",
     F "[climate]\nslab-hottest = 75\n",
     2,
     {"climate.slab-hottest", "'75'", "-40 °C to 72 °C", "75 degF"},
     NULL},
    {"Fahrenheit in a Celsius job, sealing",
     F "[sealing]\ntemperature = 75\n",
     2,
     {"sealing.temperature", "'75'", "-20 °C to 70 °C", "75 degF"},
     NULL},
    {"Fahrenheit in a Celsius job, air",
     F "[climate]\nair-hottest = 95 degC\n",
     2,
     {"climate.air-hottest", "'95 degC'", "-30 °C to 60 °C", NULL},
     NULL},
    {"no thickness",
     F "[slab]\nthickness = 0 mm\n",
     2,
     {"slab.thickness", "'0 mm'", "50 mm"},
     NULL},
    {"feet for millimetres",
     F "[slab]\nthickness = 200 ft\n",
     2,
     {"slab.thickness", "'200 ft'", "50 mm to 1000 mm", NULL},
     NULL},
    {"huge", F "[slab]\nthickness = 1e300 mm\n", 2, {"slab.thickness", "'1e300 mm'"}, NULL},
    {"past any number", F "[slab]\nthickness = 1e999 mm\n", 2, {"slab.thickness", "1e999"}, NULL},
    {"nan", F "[slab]\nthickness = nan\n", 2, {"slab.thickness", "'nan'", "not a number"}, NULL},
    {"inf", F "[slab]\nthickness = inf mm\n", 2, {"slab.thickness", "'inf mm'"}, NULL},
    {"hexadecimal", F "[slab]\nthickness = 0x0.4 m\n", 2, {"slab.thickness", "0x0.4"}, NULL},
    {"a decimal comma",
     F "[slab]\nthickness = 0,2 m\n",
     2,
     {"slab.thickness", "'0,2 m'", "Write 0.2 m"},
     NULL},
    {"another quantity",
     F "[slab]\nthickness = 20 degC\n",
     2,
     {"slab.thickness", "'20 degC'", "mm cm m km in ft"},
     NULL},
    {"negative measured width",
     F "[sealant]\nwidth = -8 mm\n",
     2,
     {"sealant.width", "'-8 mm'", "1 mm to 100 mm", NULL},
     NULL},
    {"a day that is none",
     F "[pour]\ndate = 2027-02-30\n",
     2,
     {"pour.date", "2027-02-30", "does not exist"},
     NULL},
    {"sealed before poured",
     F "[pour]\ndate = 2027-06-01\n[sealing]\ndate = 2027-05-01\n",
     2,
     {"sealing.date", "before the day of pouring", "check"},
     NULL},
    {"typed shrinkage left out",
     F "[concrete]\nshrinkage-model = typed\n",
     2,
     {"concrete.shrinkage", "missing", "200e-6"},
     NULL},
    {"a word that is none",
     F "[slab]\nuse = runway\n",
     2,
     {"slab.use", "'runway'", "yard road footway floor apron"},
     NULL},
    /* drawings */
    {"two corners",
     F "[outline]\npoint = 0, 0 m\npoint = 9, 0 m\n",
     2,
     {"outline", "2 corners", "at least three"},
     NULL},
    {"a bow tie",
     F "[outline]\npoint = 0, 0 m\npoint = 9, 9 m\npoint = 9, 0 m\npoint = 0, 9 m\n",
     2,
     {"outline", "side 1 and side 3", "cross", "in order"},
     NULL},
    {"three corners on a line",
     F "[outline]\npoint = 0, 0 m\npoint = 5, 0 m\npoint = 9, 0 m\n",
     2,
     {"outline", "cross or touch"},
     NULL},
    {"one corner twice",
     F "[outline]\npoint = 0, 0 m\npoint = 9, 0 m\npoint = 9, 0 m\npoint = 0, 9 m\n",
     2,
     {"outline", "rows 2 and 3", "one point", "take one out"},
     NULL},
    {"the first corner again",
     F RECTANGLE "point = 0, 0 m\n",
     2,
     {"outline", "row 5", "closes by itself"},
     NULL},
    {"an arc about nothing",
     F "[outline]\npoint = 0, 0 m\narc = 4, 0 m, centre 1, 0 m, left\npoint = 0, 9 m\n",
     2,
     {"outline", "centre of the arc", "1.0000 m", "3.0000 m"},
     NULL},
    {"opening outside",
     F RECTANGLE "[opening pit]\npoint = 20, 20 m\npoint = 21, 20 m\npoint = 21, 21 m\n",
     2,
     {"opening.pit", "outside the slab", "check its corners"},
     NULL},
    {"opening over the edge",
     F RECTANGLE "[opening pit]\npoint = 11, 1 m\npoint = 13, 1 m\npoint = 13, 2 m\n",
     2,
     {"opening.pit", "edge of the slab", "part of the outline"},
     NULL},
    {"opening of two corners",
     F RECTANGLE "[opening pit]\npoint = 1, 1 m\npoint = 3, 1 m\n",
     2,
     {"opening.pit", "2 corners", "at least three"},
     NULL},
    {"manhole off the slab",
     F RECTANGLE ROUND("30, 3 m", "0.8 m"),
     2,
     {"object.M1", "off the slab", "check its place"},
     NULL},
    {"column in the opening",
     F RECTANGLE "[opening pit]\npoint = 1, 1 m\npoint = 5, 1 m\npoint = 5, 5 m\n"
                 "[object C1]\nat = 4, 2 m\nsize = 0.3 x 0.3 m\n",
     2,
     {"object.C1", "in the opening pit", "check its place"},
     NULL},
    {"column of no size",
     F RECTANGLE "[object C1]\nat = 4, 2 m\n",
     2,
     {"object.C1.size", "missing", "size = 0.4 x 0.4 m"},
     NULL},
    {"column of no place",
     F RECTANGLE "[object C1]\nsize = 0.3 x 0.3 m\n",
     2,
     {"object.C1.at", "missing", "at = 12, 8 m"},
     NULL},
    {"a side that is not there",
     F RECTANGLE "[edge 9]\nagainst = wall\n",
     2,
     {"edge.9", "no such side", "4"},
     NULL},
    {"neighbour's joint past the side",
     F RECTANGLE "[edge 2]\nagainst = slab\njoints = 3, 6, 9 m\n",
     2,
     {"edge.2", "9.0 m", "8.0 m", "check the list"},
     NULL},
    {"a joint without an end",
     F RECTANGLE "[joint]\nfrom = 3, 0 m\n",
     2,
     {"joint.1.to", "missing", "to = 4, 12 m"},
     NULL},
    {"a joint of no length",
     F RECTANGLE "[joint]\nfrom = 3, 1 m\nto = 3, 1 m\n",
     2,
     {"joint.1", "ends where it begins", "check from and to"},
     NULL},
    {"the narrowest panel wider than the spacing",
     F "[rules]\nspacing = 0.4 m\n",
     2,
     {"rules.least-side", "wider than the spacing limit", "smaller"},
     NULL},
};

/* Allowed, but said. */
static const struct wrong warned[] = {
    {"3 m spacing on 100 mm",
     F RECTANGLE "[slab]\nthickness = 100 mm\n[rules]\nspacing = 3 m\n",
     0,
     {"rules.spacing", "3.0 m", "2.4 m", "shorten"},
     "your spacing against the rule"},
    {"a panel 0.5 m wide",
     F RECTANGLE "[joint]\nfrom = 0.5, 0 m\nto = 0.5, 8 m\n",
     1,
     {NULL},
     "0.50 m"},
    {"rod larger than the slot is deep",
     F "[sealant]\nwidth = 10 mm\nrod = 100 mm\n",
     0,
     {"sealant.rod", "100 mm", "deep", "smaller rod"},
     NULL},
    {"rod that falls through",
     F "[sealant]\nwidth = 10 mm\nrod = 8 mm\n",
     0,
     {"sealant.rod", "8 mm", "falls through", "quarter wider than"},
     NULL},
    {"sealing on the hottest day",
     F "[climate]\nslab-coldest = 0 degC\nslab-hottest = 40 degC\n[sealing]\ntemperature = 40 "
       "degC\n",
     0,
     {"sealing.temperature", "hot", "no closing is left", "cooler day"},
     NULL},
    {"sealing below the coldest",
     F "[climate]\nslab-coldest = 10 degC\nslab-hottest = 40 degC\n[sealing]\ntemperature = 6 "
       "degC\n",
     0,
     {"sealing.temperature", "colder than the coldest", "check"},
     NULL},
    {"half a column on the slab",
     F RECTANGLE "[object C1]\nat = 12.1, 4 m\nsize = 0.4 x 0.4 m\n",
     0,
     {"object.C1", "off the slab", "check its place"},
     NULL},
    {"too little factor over a sheet",
     F "[base]\ninterlayer = sheet\n[sealing]\nmovement = factor\nfactor = 0.65\n",
     0,
     {"sealing.factor", "0.65", "0.80", "friction"},
     NULL},
    {"tolerance as large as the width",
     F RECTANGLE "[sealing]\ntolerance = 10 mm\n[sealant]\nwidth = 10 mm\n",
     1,
     {NULL},
     "wide."},
    {"taper to nothing",
     F "[outline]\npoint = 0, 0 m\npoint = 30, 0 m\npoint = 0, 3.5 m\n",
     1,
     {NULL},
     "too long for their width"},
    {"a key that is none",
     F "[slab]\nthicknes = 200 mm\n",
     0,
     {"slab.thicknes", "no such key", "not used"},
     NULL},
    {"a section that is none",
     F "[slap]\nthickness = 200 mm\n",
     0,
     {"slap", "no such section", "not used"},
     NULL},
    {"shrinkage without typed",
     F "[concrete]\nshrinkage = 200e-6\n",
     0,
     {"concrete.shrinkage", "not used", "typed"},
     NULL},
};

/* By bytes, as some hold a NUL. */
#define BYTES(string) string, sizeof string - 1
static const struct {
    const char *name, *bytes;
    size_t count;
    const char *part;
} broken[] = {
    {"empty", BYTES(""), "format = 1"},
    {"no format", BYTES("[slab]\nuse = yard\n"), "format = 1"},
    {"format in a section", BYTES("[job]\nformat = 1\n"), "format = 1"},
    {"another format", BYTES("format = 2\n"), "'2'"},
    {"format twice", BYTES(F F), "take one out"},
    {"neither header nor pair", BYTES(F "rubbish\n"), ":2:1: error:"},
    {"a key twice", BYTES(F "[slab]\nuse = yard\nuse = road\n"), "line 3 and again on line 4"},
    {"bad UTF-8", BYTES(F "[slab]\nuse = yar\xff\n"), "byte FF"},
    {"half a character", BYTES(F "[job]\ntitle = caf\xc3"), "UTF-8"},
    {"an overlong slash", BYTES(F "[job]\ntitle = \xc0\xaf\n"), "UTF-8"},
    {"a surrogate", BYTES(F "[job]\ntitle = \xed\xa0\x80\n"), "UTF-8"},
    {"NUL", BYTES(F "[slab]\nuse = ya\0rd\n"), "NUL"},
    {"a program",
     BYTES("\x7f"
           "ELF\2\1\1\0\0\0\0\0"),
     "NUL"},
    {"UTF-16",
     BYTES("\xff\xfe"
           "f\0o\0r\0m\0a\0t\0"),
     "NUL"},
};

static void check_wrong(const struct wrong *wrong)
{
    struct run run;

    write_text("job.slab", wrong->job);
    RUN(&run, "check", "@");
    expect_status(wrong->name, &run, wrong->status);
    for (size_t p = 0; p < COUNT(wrong->parts); p++)
        expect_part(wrong->name, "standard error", run.err, wrong->parts[p]);
    expect_part(wrong->name, "the verdicts", run.out, wrong->out);
    expect_sentences(wrong->name, run.err);
    if (wrong->status == 2)
        assert_string_equal(run.out, "");
    else
        assert_int_not_equal(run.out[0], '\0');
    run_free(&run);
}

static void test_refused(void **state)
{
    (void)state;
    for (size_t i = 0; i < COUNT(refused); i++)
        check_wrong(&refused[i]);
}

static void test_warned(void **state)
{
    (void)state;
    for (size_t i = 0; i < COUNT(warned); i++)
        check_wrong(&warned[i]);
}

/* The same findings stand in the JSON, with what was typed and where. */
static void test_findings_in_json(void **state)
{
    (void)state;
    struct run run;

    write_text("job.slab", F "[slab]\nthickness = 8 m\n");
    RUN(&run, "report", "@", "--json");
    expect_status("8 m", &run, 2);
    expect_part("8 m", "JSON", run.out, "\"field\":\"slab.thickness\"");
    expect_part("8 m", "JSON", run.out, "\"value\":\"8 m\"");
    expect_part("8 m", "JSON", run.out, "\"limit\":\"50 mm to 1000 mm\"");
    expect_part("8 m", "JSON", run.out, "\"line\":3");
    expect_part("8 m", "JSON", run.out, "\"column\":13");
    run_free(&run);
}

static void test_files_that_are_no_jobs(void **state)
{
    (void)state;
    static const char *const commands[][4] = {
        {"check"}, {"report"}, {"draw"}, {"why", "seal.width_m"}, {"set", "slab.use=road"}};

    for (size_t i = 0; i < COUNT(broken); i++)
        for (size_t c = 0; c < COUNT(commands); c++) {
            struct run run;
            write_bytes("job.slab", broken[i].bytes, broken[i].count);
            RUN(&run, commands[c][0], "@", commands[c][1]);
            expect_status(broken[i].name, &run, 2);
            expect_part(broken[i].name, "standard error", run.err, broken[i].part);
            expect_part(broken[i].name, "standard error", run.err, "job.slab:");
            expect_sentences(broken[i].name, run.err);
            assert_string_equal(run.out, "");
            run_free(&run);
        }
}

/* A manhole in the middle of a panel gets a box that the joints meet, or the failing rule is
 * named. */
static void test_manhole_in_the_middle(void **state)
{
    (void)state;
    struct run run;

    write_text("job.slab", F RECTANGLE ROUND("1.5, 1.5 m", "0.8 m"));
    RUN(&run, "report", "@", "--json", "--only", "layout");
    assert_true(run.status == 0 || run.status == 1);
    expect_part("manhole", "layout", run.out, "\"id\":\"M1.1\",\"kind\":\"isolation\"");
    expect_part("manhole", "layout", run.out, "\"needs_isolation\":true");
    if (run.status == 1)
        assert_null(strstr(run.out, "\"violations\":0"));
    run_free(&run);
}

/* Neighbour's joints at 3 m against ours at 4.5 m: ours meet them. */
static void test_neighbour_at_another_spacing(void **state)
{
    (void)state;
    static const char *const ends[] = {"\"x1\":3.000000,\"y1\":0.000000",
                                       "\"x1\":6.000000,\"y1\":0.000000",
                                       "\"x1\":9.000000,\"y1\":0.000000"};
    struct run run;

    write_text("job.slab", F RECTANGLE "[rules]\nspacing = 4.5 m\n[edge 1]\nagainst = slab\n"
                                       "joints = 3, 6, 9 m\n");
    RUN(&run, "report", "@", "--json", "--only", "layout");
    expect_status("neighbour", &run, 0);
    for (size_t i = 0; i < COUNT(ends); i++)
        expect_part("neighbour", "layout", run.out, ends[i]);
    expect_part("neighbour", "layout", run.out, "\"violations\":0");
    run_free(&run);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(test_refused),
        cmocka_unit_test(test_warned),
        cmocka_unit_test(test_findings_in_json),
        cmocka_unit_test(test_files_that_are_no_jobs),
        cmocka_unit_test(test_manhole_in_the_middle),
        cmocka_unit_test(test_neighbour_at_another_spacing),
    };

    return cmocka_run_group_tests_name("wrong input", tests, make_folder, remove_folder);
}
