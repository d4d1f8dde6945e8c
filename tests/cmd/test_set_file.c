/* `slabgap set` on a real file: what it writes, what it leaves alone, and that a refused value
 * writes nothing. What is expected is docs/format.md: "What set can address" and its rule on
 * saving. */
#include "cmd_help.h"

static const char before[] =
    F "# a yard\n"
      "[slab]\n"
      "use = yard       # as it is used\n"
      "thickness=200 mm\t# from the drawing\n"
      "colour = grey    # an unknown key is kept\n" RECTANGLE "[object C1]\n"
      "kind = column\n"
      "at = 4, 4 m\n"
      "size = 0.4 x 0.4 m\n"
      "[edge 1]\n"
      "against = wall\n"
      "[joint]\n"
      "from = 3, 0 m\n"
      "to = 3, 8 m\n";

/* `before` with one piece of text in place of another. */
static char *with(const char *from, const char *to)
{
    const char *at = strstr(before, from);
    char *text = malloc(sizeof before + strlen(to) + 1);

    assert_non_null(at);
    assert_non_null(text);
    memcpy(text, before, (size_t)(at - before));
    strcpy(text + (at - before), to);
    strcat(text, at + strlen(from));
    return text;
}

static void test_only_what_was_asked_changes(void **state)
{
    (void)state;
    static const struct {
        const char *change, *from, *to;
    } cases[] = {
        {"slab.thickness=6 in", "thickness=200 mm\t#", "thickness=6 in\t#"},
        {"slab.use=road", "use = yard       #", "use = road       #"},
        {"slab.thickness=", "thickness=200 mm\t# from the drawing\n", ""},
        {"slab.reinforced=yes", "is kept\n", "is kept\nreinforced = yes\n"},
        {"outline.point.2=14, 0 m", "point = 12, 0 m", "point = 14, 0 m"},
        {"outline.point.5=0, 4 m", "point = 0, 8 m\n", "point = 0, 8 m\npoint = 0, 4 m\n"},
        {"outline.point.2=", "point = 12, 0 m\n", ""},
        {"object.C1.at=4, 5 m", "at = 4, 4 m", "at = 4, 5 m"},
        {"object.C1=", "[object C1]\nkind = column\nat = 4, 4 m\nsize = 0.4 x 0.4 m\n", ""},
        {"edge.1.against=free", "against = wall", "against = free"},
        {"joint.1.from=3, 1 m", "from = 3, 0 m", "from = 3, 1 m"},
        {"job.title=Bay #3 and # 4", "to = 3, 8 m\n",
         "to = 3, 8 m\n[job]\ntitle = \"Bay #3 and # 4\"\n"},
        {"base.kind=sand", "to = 3, 8 m\n", "to = 3, 8 m\n[base]\nkind = sand\n"},
    };

    for (size_t i = 0; i < COUNT(cases); i++) {
        char *after = with(cases[i].from, cases[i].to);
        struct run run;
        write_text("job.slab", before);
        RUN(&run, "set", "@", cases[i].change, "--dry-run");
        expect_status(cases[i].change, &run, 0);
        assert_string_equal(run.out, after);
        assert_file("job.slab", before); /* a dry run writes nothing */
        run_free(&run);
        RUN(&run, "set", "@", cases[i].change);
        expect_status(cases[i].change, &run, 0);
        assert_string_equal(run.out, "");
        assert_file("job.slab", after);
        run_free(&run);
        free(after);
    }
}

static void test_many_at_once(void **state)
{
    (void)state;
    struct run run;
    char *content;

    write_text("job.slab", F);
    RUN(&run, "set", "@", "outline.point.1=0, 0 m", "outline.point.2=9, 0 m",
        "outline.point.3=0, 9 m", "object.C1.at=2, 2 m", "object.C1.size=0.3 x 0.3 m",
        "joint.1.from=0, 3 m", "joint.1.to=6, 3 m", "edge.2.against=wall");
    expect_status("many", &run, 0);
    run_free(&run);
    content = read_whole(inside("job.slab"));
    assert_string_equal(content, F "[outline]\npoint = 0, 0 m\npoint = 9, 0 m\npoint = 0, 9 m\n"
                                   "[object C1]\nat = 2, 2 m\nsize = 0.3 x 0.3 m\n"
                                   "[joint]\nfrom = 0, 3 m\nto = 6, 3 m\n"
                                   "[edge 2]\nagainst = wall\n");
    free(content);
    RUN(&run, "check", "@");
    assert_true(run.status == 0 || run.status == 1); /* it reads */
    run_free(&run);
}

/* All or nothing: the good one before the refused one is not written either. */
static void test_one_refused_value_writes_nothing(void **state)
{
    (void)state;
    static const struct {
        const char *change, *parts[3];
    } refused[] = {
        {"slab.thickness=0 mm", {"slab.thickness", "'0 mm'", "50 mm to 1000 mm"}},
        {"slab.thickness=8 m", {"slab.thickness", "'8 m'", "50 mm to 1000 mm"}},
        {"slab.thickness=0,2 m", {"slab.thickness", "comma", "0.2"}},
        {"slab.thickness=thick", {"slab.thickness", "'thick'", "mm cm m km in ft"}},
        {"slab.thickness=20 degC", {"slab.thickness", "'20 degC'", "mm cm m km in ft"}},
        {"slab.thickness=0x10 mm", {"slab.thickness", "0x10", NULL}},
        {"slab.thickness=nan", {"slab.thickness", "'nan'", NULL}},
        {"slab.use=runway", {"slab.use", "'runway'", "yard road footway floor apron"}},
        {"slab.colour=red", {"slab.colour", "no such key", NULL}},
        {"slap.use=road", {"slap", "no section", NULL}},
        {"outline.point.9=1, 1 m", {"outline.point.9", NULL, NULL}},
        {"outline.point.2=1 m", {"outline.point", "'1 m'", NULL}},
        {"outline.point.2=0, 8 m", {"outline", NULL, NULL}}, /* two corners on one point */
        {"object.C1.at=40, 40 m", {"object.C1", "off the slab", "check its place"}},
        {"object.C1.size=", {"object.C1.size", "missing", "0.4 x 0.4 m"}},
        {"edge.9.against=wall", {"edge.9", "no such side", "4"}},
        {"object.C.1.at=1, 1 m", {"object.C.1.at", NULL, NULL}},
        {"climate.slab-hottest=-20 degC", {"climate.slab-coldest", "above the hottest", "swap"}},
        {"sealing.temperature=75", {"sealing.temperature", "'75'", "degF"}},
        {"pour.date=2027-02-30", {"pour.date", "2027-02-30", "not exist"}},
        {"slab.use=ro\xffwd", {"slab.use", NULL, NULL}},
        {"job.title=two\nlines", {"job.title", NULL, NULL}},
    };

    for (size_t i = 0; i < COUNT(refused); i++) {
        struct run run;
        write_text("job.slab", before);
        RUN(&run, "set", "@", "climate.slab-coldest=0 degC", "slab.use=road", refused[i].change,
            "base.kind=sand");
        expect_status(refused[i].change, &run, 2);
        for (size_t p = 0; p < COUNT(refused[i].parts); p++)
            expect_part(refused[i].change, "standard error", run.err, refused[i].parts[p]);
        expect_sentences(refused[i].change, run.err);
        assert_string_equal(run.out, "");
        assert_file("job.slab", before);
        run_free(&run);
    }
}

/* Lines ends, a missing last line end and a mark at the start stay as they are. */
static void test_ends_and_marks_stay(void **state)
{
    (void)state;
    struct run run;

    write_text("job.slab", "\xef\xbb\xbf" F "[slab]\r\nthickness = 200 mm\r\nuse = yard");
    RUN(&run, "set", "@", "slab.thickness=8 in");
    expect_status("CR LF", &run, 0);
    run_free(&run);
    assert_file("job.slab", "\xef\xbb\xbf" F "[slab]\r\nthickness = 8 in\r\nuse = yard");
}

/* Saving keeps who may read the file, goes through links and leaves nothing behind. */
static void test_the_file_itself(void **state)
{
    (void)state;
    struct run run;
    struct stat about;

    write_text("real.slab", F "[slab]\nuse = yard\n");
    assert_int_equal(chmod(inside("real.slab"), 0640), 0);
    unlink(inside("link.slab"));
    assert_int_equal(symlink("real.slab", inside("link.slab")), 0);
    RUN(&run, "set", "@/link.slab", "slab.use=road");
    expect_status("a link", &run, 0);
    run_free(&run);
    assert_file("real.slab", F "[slab]\nuse = road\n");
    assert_int_equal(lstat(inside("link.slab"), &about), 0);
    assert_true(S_ISLNK(about.st_mode));
    assert_int_equal(stat(inside("real.slab"), &about), 0);
    assert_int_equal(about.st_mode & 07777, 0640);
    assert_int_not_equal(access(inside("real.slab.slabgap-new"), F_OK), 0);
}

static void test_a_broken_job_is_not_touched(void **state)
{
    (void)state;
    struct run run;

    write_text("job.slab", F "[slab]\nrubbish\n");
    RUN(&run, "set", "@", "slab.use=road");
    expect_status("rubbish", &run, 2);
    expect_part("rubbish", "standard error", run.err, "job.slab:3:1: error:");
    assert_file("job.slab", F "[slab]\nrubbish\n");
    run_free(&run);
}

/* A job with one wrong value is put right by setting that value. */
static void test_set_mends_a_wrong_value(void **state)
{
    (void)state;
    struct run run;

    write_text("job.slab", F "[slab]\nthickness = 20 m # typed in a hurry\n");
    RUN(&run, "check", "@");
    expect_status("20 m thick", &run, 2);
    run_free(&run);
    RUN(&run, "set", "@", "slab.thickness=0.20 m");
    expect_status("mended", &run, 0);
    run_free(&run);
    assert_file("job.slab", F "[slab]\nthickness = 0.20 m # typed in a hurry\n");
    RUN(&run, "check", "@");
    expect_status("mended", &run, 0);
    run_free(&run);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(test_only_what_was_asked_changes),
        cmocka_unit_test(test_many_at_once),
        cmocka_unit_test(test_one_refused_value_writes_nothing),
        cmocka_unit_test(test_ends_and_marks_stay),
        cmocka_unit_test(test_the_file_itself),
        cmocka_unit_test(test_a_broken_job_is_not_touched),
        cmocka_unit_test(test_set_mends_a_wrong_value),
    };

    return cmocka_run_group_tests_name("set on files", tests, make_folder, remove_folder);
}
