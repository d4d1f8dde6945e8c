/* The grammar of the job file. Every case is a rule of docs/format.md "Grammar" (the contract of
 * the file format); the sample is the complete job that the page prints. */
#include "job_help.h"
#include <math.h>

#define F "format = 1\n"

/* ---- what is refused, and where ---- */

struct refusal {
    const char *text;
    size_t count; /* 0 = strlen */
    int line, column;
    const char *part;
};

static const struct refusal refusals[] = {
    {"", 0, 1, 1, "format = 1"},
    {"# only a comment\n", 0, 1, 1, "format = 1"},
    {"[slab]\nthickness = 200 mm\n", 0, 2, 1, "format = 1"},
    {"[slab]\nformat = 1\n", 0, 2, 1, "format = 1"},
    {"title = x\nformat = 1\n", 0, 1, 1, "format = 1"},
    {"format = 2\n", 0, 1, 10, "'2' is not known"},
    {"format =\n", 0, 1, 9, "not known"},
    {F "format = 1\n", 0, 2, 1, "format"},
    {F "[slab]\nthickness 200 mm\n", 0, 3, 1, "neither"},
    {F "[slab]\n  Thickness = 200 mm\n", 0, 3, 3, "neither"},
    {F "[slab]\nthickness = 200 mm\nuse = yard\nthickness = 150 mm\n", 0, 5, 1,
     "line 3 and again on line 5"},
    {F "[slab]\nthickness = 200 mm\n[base]\n[slab]\nthickness = 150 mm\n", 0, 6, 1,
     "line 3 and again on line 6"},
    {F "[slab\n", 0, 2, 1, "no header"},
    {F "[]\n", 0, 2, 1, "no header"},
    {F "[slab] x\n", 0, 2, 1, "no header"},
    {F "[slab]# x\n", 0, 2, 1, "no header"},
    {F "[slab two]\n", 0, 2, 7, "takes no name"},
    {F "[object]\n", 0, 2, 2, "needs a name"},
    {F "[object C.1]\n", 0, 2, 9, "not good"},
    {F "[object C 1]\n", 0, 2, 1, "no header"},
    {F "[object abcdefghijklmnopqrstuvwxyz0123456]\n", 0, 2, 9, "not good"},
    {F "[joint 3]\n", 0, 2, 8, "takes no name"},
    {F "[edge x]\n", 0, 2, 7, "number of a side"},
    {F "[edge 0]\n", 0, 2, 7, "number of a side"},
    {F "[edge]\n", 0, 2, 2, "number of a side"},
    {F "[edge 3]\n[edge 4]\n[edge 03]\n", 0, 4, 7, "already on line 2"},
    {F "[object C1]\nat = 0, 0 m\nsize = 1 x 1 m\n[object C1]\n", 0, 5, 9, "already on line 2"},
    {F "[job]\ntitle = \xFF\n", 0, 3, 9, "not UTF-8"},
    {F "[job]\n# caf\xC3\xA9 \xC3(\n", 0, 3, 8, "not UTF-8"},
    {"format = 1\n[job]\ntitle = a\0b\n", 28, 3, 10, "NUL"},
    {F "[slab]\nthickness = 0,2 m\n", 0, 3, 14, "0.2 m"},
    {F "[slab]\nthickness = 0x20 mm\n", 0, 3, 14, "unit"},
    {F "[slab]\nthickness = nan\n", 0, 3, 13, "not a number"},
    {F "[slab]\nthickness = 1e400 mm\n", 0, 3, 13, "too large"},
    {F "[slab]\nthickness = 200 kg\n", 0, 3, 17, "mm cm m km in ft"},
    {F "[slab]\nthickness = 200 mm 3\n", 0, 3, 20, "something after"},
    {F "[slab]\nthickness = 20 mm\n", 0, 3, 13, "Did you mean 200 mm?"},
    {F "[slab]\nthickness = 6 mm\n", 0, 3, 13, "Did you mean 6 in?"},
    {F "[slab]\nthickness = 2000 mm\n", 0, 3, 13, "Did you mean 200 mm?"},
    {F "[slab]\nthickness = 0 mm\n", 0, 3, 13, "too small"},
    {F "[slab]\nthickness = -200 mm\n", 0, 3, 13, "too small"},
    {F "[climate]\nslab-coldest = 75 degC\n", 0, 3, 16, "Did you mean 75 degF?"},
    {F "[climate]\nhumidity = 70\n", 0, 3, 12, "Did you mean 70 %?"},
    {F "[slab]\nuse = Yard\n", 0, 3, 7, "none of: yard road footway floor apron"},
    {F "[slab]\nreinforced = maybe\n", 0, 3, 14, "no yes"},
    {F "[pour]\ndate = 2027-02-29\n", 0, 3, 8, "does not exist"},
    {F "[pour]\ndate = 27-02-01\n", 0, 3, 8, "no date"},
    {F "[pour]\nstart = 24:00\n", 0, 3, 9, "no time"},
    {F "[pour]\nstart = 6:00\n", 0, 3, 9, "no time"},
    {F "[job]\ntitle = \"open\n", 0, 3, 9, "does not close"},
    {F "[job]\ntitle = \"a\" b\n", 0, 3, 12, "after the closing"},
    {F "[concrete]\nstrength = C\n", 0, 3, 12, "no strength"},
    {F "[concrete]\nstrength = 4000\n", 0, 3, 12, "too large"},
    {F "[concrete]\naggregate = cheese\n", 0, 3, 13, "no stone"},
    {F "[sealant]\nclass = 26\n", 0, 3, 9, "12.5 25 35 50 100/50"},
    {F "[sawing]\nsaws = 1.5\n", 0, 3, 8, "whole number"},
    {F "[slab]\ndowels = 32 mm\n", 0, 3, 10, "no bar"},
    {F "[rules]\ncounts = drag, wind\n", 0, 3, 16, "none of"},
    {F "[takeoff]\npackages = 600 mm\n", 0, 3, 16, "ml l m3"},
    {F "[outline]\npoint = 1 m\n", 0, 3, 9, "1 values, not 2"},
    {F "[outline]\npoint = 1, 2, 3 m\n", 0, 3, 9, "3 values, not 2"},
    {F "[outline]\npoint = 1; 2 m\n", 0, 3, 9, "1 values"},
    {F "[outline]\npoint = 1, 20 km\n", 0, 3, 9, "too large"},
    {F "[outline]\narc = 1, 2 m, centre 3, 4 m, up\n", 0, 3, 7, "no arc"},
    {F "[outline]\narc = 1, 2 m, 3, 4 m, left\n", 0, 3, 7, "no arc"},
    {F "[pours]\nline = 0, 12, 0, 12 m\n", 0, 3, 8, "no length"},
    {F "[object C1]\nsize = 1 x 1 m\n", 0, 2, 1, "missing; write its centre"},
    {F "[object C1]\nat = 1, 1 m\n", 0, 2, 1, "missing; write size"},
    {F "[object C1]\nat = 1, 1 m\nsize = 0.4 m\n", 0, 4, 8, "no size"},
    {F "[joint]\nfrom = 1, 1 m\n", 0, 2, 1, "missing; write where the joint ends"},
};

static void test_refusals_name_the_place(void **state)
{
    (void)state;
    for (size_t i = 0; i < COUNT(refusals); i++) {
        const struct refusal *r = &refusals[i];
        struct loaded loaded;
        const struct finding *finding;

        load_bytes(&loaded, r->text, r->count > 0 ? r->count : strlen(r->text));
        finding = said(&loaded.findings, SEVERITY_ERROR, r->part);
        if (finding == NULL || finding->line != r->line || finding->column != r->column) {
            print_findings(&loaded.findings);
            fail_msg("case %zu: %s", i, r->text);
        }
        assert_true(loaded.parsed == STATUS_REFUSED || loaded.read == STATUS_REFUSED);
        unload(&loaded);
    }
}

/* ---- what is a note ---- */

static void test_unknown_things_are_notes(void **state)
{
    static const char text[] = F "[slab]\ncolour = red   # kept\nthickness = 200 mm\n"
                                 "[future thing.x]\nkey = 1\nkey = 1\n[paint]\ntone = grey\n";
    struct loaded loaded;
    const struct finding *finding;

    (void)state;
    load(&loaded, text);
    finding = said(&loaded.findings, SEVERITY_NOTE, "slab.colour: no such key");
    assert_non_null(finding);
    assert_int_equal(finding->line, 3);
    assert_non_null(said(&loaded.findings, SEVERITY_NOTE, "paint: no such section"));
    assert_document(loaded.document, text);
    assert_true(loaded.job.slab_thickness == 0.2);
    unload(&loaded);
}

/* ---- what is read ---- */

static void test_comments_blanks_and_ends(void **state)
{
    static const char text[] = "\xEF\xBB\xBF# first\r\nformat=1\r\n\t[ slab ]  # a slab\r\n"
                               "\tthickness\t=\t200 mm\t# thick\r\nuse=road\r\n\r\n"
                               "[job]\r\ntitle = \"Bay #3 and # 4\" # said so\r\n"
                               "reason = Bay#3\r\nrevision =   # none yet";
    struct loaded loaded;

    (void)state;
    load(&loaded, text);
    assert_int_equal(loaded.parsed, STATUS_OK);
    assert_int_equal(loaded.read, STATUS_OK);
    assert_true(loaded.job.slab_thickness == 0.2);
    assert_int_equal(loaded.job.slab_use, USE_ROAD);
    assert_string_equal(loaded.job.job_title, "Bay #3 and # 4");
    assert_string_equal(loaded.job.job_reason, "Bay#3");
    assert_false(loaded.job.given[FIELD_job_revision]);
    assert_document(loaded.document, text);
    unload(&loaded);
}

static void test_rows_members_and_arcs(void **state)
{
    static const char text[] =
        F "[outline]\npoint = 0, 0 m\npoint = 36, 0 m\narc = 40, 4 m, centre 36, 4 m, left\n"
          "point = 40000 mm, 20 m\npoint=0,20\n"
          "[opening pit]\nagainst = wall\npoint = 5.1 , 4.6 m\npoint = 6300, 4600 mm\n"
          "point = 6.3, 5.8 m\n[edge 3]\nagainst = slab\njoints = 4.6, 9.1, 13.9 m\n"
          "[object C1]\nkind = column\nat = 12.0, 8.0 m\nsize = 0.4 x 0.4 m\n"
          "[object C2]\nat = 12, 9 m\nsize = 12\xC3\x97"
          "16in\n[object M1]\nat = 20' , 10'-6\"\ndiameter = 0.8 m\nisolate = no\nangle = 45 deg\n"
          "[pours]\nline = 0, 12, 24, 12 m\nwidth = 12 m\n"
          "[joint]\nfrom = 4.0, 12 m\nto = 4.0, 24 m\nkeep = no\n[joint]\nkind = expansion\n"
          "from = 1, 1 m\nto = 2, 1 m\n[crack]\npoint = 3.2, 0 m\npoint = 4.0, 4.1 m\n";
    struct loaded l;

    (void)state;
    load(&l, text);
    print_findings(&l.findings);
    assert_int_equal(l.parsed, STATUS_OK);
    assert_int_equal(l.read, STATUS_OK);
    assert_int_equal(l.job.outline.count, 5);
    assert_true(l.job.outline.items[2].arc && l.job.outline.items[2].left);
    assert_true(l.job.outline.items[2].x == 40 && l.job.outline.items[2].cx == 36);
    assert_true(l.job.outline.items[3].x == 40 && l.job.outline.items[3].y == 20);
    assert_true(l.job.outline.items[4].y == 20);
    assert_int_equal(l.job.outline.items[4].line, 7);
    assert_int_equal(l.job.opening_count, 1);
    assert_int_equal(l.job.openings[0].against, AGAINST_WALL);
    assert_true(l.job.openings[0].rows.items[1].x == 6.3);
    assert_int_equal(l.job.edges[0].joint_count, 3);
    assert_true(l.job.edges[0].joints[2] == 13.9);
    assert_int_equal(l.job.object_count, 3);
    assert_true(l.job.objects[0].w == 0.4 && l.job.objects[0].shape == SHAPE_RECT);
    assert_true(fabs(l.job.objects[1].w - 0.3048) < 1e-15);
    assert_true(fabs(l.job.objects[1].d - 0.4064) < 1e-15);
    assert_int_equal(l.job.objects[2].shape, SHAPE_ROUND);
    assert_true(fabs(l.job.objects[2].y - 10.5 * 0.3048) < 1e-15);
    assert_false(l.job.objects[2].isolate);
    assert_true(l.job.objects[0].isolate);
    assert_true(l.job.has_pours && l.job.pour_line_count == 1 && l.job.pours_width == 12);
    assert_int_equal(l.job.joint_count, 2);
    assert_true(!l.job.joints[0].keep && l.job.joints[1].keep);
    assert_int_equal(l.job.joints[1].kind, JOINT_EXPANSION);
    assert_int_equal(l.job.crack_count, 1);
    assert_document(l.document, text);
    unload(&l);
}

/* what tickets and tins print */
static void test_tickets_and_tins(void **state)
{
    static const struct {
        const char *strength;
        double mpa;
    } strengths[] = {{"32 MPa", 32},
                     {"C32/40", 32},
                     {"M40", 32},
                     {"N32", 32},
                     {"C12.5", 12.5},
                     {"32", 32},
                     {"4000 psi", 27.579029172673},
                     {"32 N/mm2", 32}};
    static const struct {
        const char *word;
        double extension, compression;
    } classes[] = {{"25", .25, .25},   {"100/50", 1, .5},    {"12.5", .125, .125},
                   {"25LM", .25, .25}, {"MAF 25", .25, .25}, {"50E", .5, .5}};
    char text[128];
    struct loaded l;

    (void)state;
    for (size_t i = 0; i < COUNT(strengths); i++) {
        snprintf(text, sizeof text, F "[concrete]\nstrength = %s\n", strengths[i].strength);
        load(&l, text);
        assert_int_equal(l.read, STATUS_OK);
        assert_true(fabs(l.job.concrete_strength.cylinder / 1e6 - strengths[i].mpa) < 1e-9);
        if (strengths[i].strength[0] == 'M')
            assert_non_null(said(&l.findings, SEVERITY_NOTE, "cube strength"));
        unload(&l);
    }
    for (size_t i = 0; i < COUNT(classes); i++) {
        snprintf(text, sizeof text, F "[sealant]\nclass = %s\n", classes[i].word);
        load(&l, text);
        assert_int_equal(l.read, STATUS_OK);
        assert_true(l.job.sealant_class.extension == classes[i].extension &&
                    l.job.sealant_class.compression == classes[i].compression);
        unload(&l);
    }
}

/* ---- caps ---- */

static void test_caps(void **state)
{
    struct text text = {0};
    struct loaded l;

    (void)state;
    text_add(&text, F "[job]\ntitle = ");
    text_add_char(&text, 'x', 5000);
    load_bytes(&l, text.bytes, text.length);
    assert_non_null(said(&l.findings, SEVERITY_ERROR, "4096"));
    unload(&l);

    text_clear(&text);
    text_add(&text, F);
    for (int i = 0; i < 5001; i++)
        text_format(&text, "[object o%d]\nat = 0, %d mm\ndiameter = 20 mm\n", i, i);
    load_bytes(&l, text.bytes, text.length);
    assert_non_null(said(&l.findings, SEVERITY_ERROR, "more than 5000"));
    assert_int_equal(l.job.object_count, 5000);
    unload(&l);

    text_clear(&text);
    text_add(&text, F "[outline]\n");
    for (int i = 0; i < 20002; i++)
        text_format(&text, "point = %d, 0 mm\n", i);
    load_bytes(&l, text.bytes, text.length);
    assert_non_null(said(&l.findings, SEVERITY_ERROR, "20000 rows"));
    assert_int_equal(l.job.outline.count, 20000);
    unload(&l);

    text_clear(&text);
    text_add_char(&text, '\n', 16 * 1024 * 1024 + 1);
    load_bytes(&l, text.bytes, text.length);
    assert_non_null(said(&l.findings, SEVERITY_ERROR, "16 MiB"));
    unload(&l);

    text_clear(&text);
    for (int i = 0; i < 100000; i++)
        text_add(&text, "rubbish\n");
    load_bytes(&l, text.bytes, text.length);
    assert_non_null(said(&l.findings, SEVERITY_ERROR, "more errors"));
    assert_true(l.findings.count < 200);
    unload(&l);
    text_free(&text);
}

/* ---- the sample of docs/format.md ---- */

static char *read_whole(const char *path, size_t *count)
{
    FILE *file = fopen(path, "rb");
    char *bytes = malloc(1 << 16);

    assert_non_null(file);
    assert_non_null(bytes);
    *count = fread(bytes, 1, 1 << 16, file);
    fclose(file);
    return bytes;
}

static void test_complete_sample(void **state)
{
    size_t count;
    char *bytes = read_whole("tests/cases/complete.slab", &count);
    struct loaded l;
    struct text out = {0};

    (void)state;
    load_bytes(&l, bytes, count);
    assert_int_equal(l.parsed, STATUS_OK);
    assert_int_equal(l.read, STATUS_OK);
    assert_int_equal(l.findings.count, 0);
    assert_true(l.job.slab_thickness == 0.2 && l.job.base_slip == 0.0005);
    assert_int_equal(l.job.outline.count, 6);
    assert_int_equal(l.job.takeoff_packages.count, 2);
    assert_int_equal(l.job.sawing_sunset.minutes, 19 * 60 + 55);
    document_write(l.document, &out);
    assert_int_equal(out.length, count);
    assert_memory_equal(out.bytes, bytes, count);
    text_free(&out);
    unload(&l);
    free(bytes);
}

/* ---- properties over made-up files ---- */

static uint64_t next(uint64_t *seed)
{
    *seed = *seed * 6364136223846793005U + 1442695040888963407U;
    return *seed >> 33;
}

static const char *pick(uint64_t *seed, const char *const *words, size_t count)
{
    return words[next(seed) % count];
}

/* A file of odd but likely pieces. */
static void make_file(uint64_t *seed, struct text *out)
{
    static const char *const pieces[] = {"[slab]",
                                         "thickness = 200 mm",
                                         "thickness=8 in # c",
                                         "[outline]",
                                         "point = 1, 2 m",
                                         "arc = 4, 4 m, centre 4, 0 m, left",
                                         "[object C1]",
                                         "at = 1, 1 m",
                                         "[joint]",
                                         "# comment",
                                         "",
                                         "\t",
                                         "junk",
                                         "[future]",
                                         "key = \"a # b\" # c",
                                         "use = road",
                                         "[edge 2]",
                                         "[opening \xC3\xA9]",
                                         "title = \xE6\xBC\xA2",
                                         "[job]",
                                         "units = us",
                                         "= 3",
                                         "x =",
                                         "[pours]",
                                         "line = 0, 1, 2, 3 m",
                                         "size = 1 x 2 ft",
                                         "\xFF",
                                         "format = 1"};
    static const char *const ends[] = {"\n", "\r\n", "\n", " \n", "\t# x\n"};

    text_clear(out);
    if (next(seed) % 4 == 0)
        text_add(out, "\xEF\xBB\xBF");
    text_add(out, next(seed) % 8 ? "format = 1\n" : "");
    for (uint64_t n = next(seed) % 30; n > 0; n--) {
        text_add(out, pick(seed, pieces, COUNT(pieces)));
        text_add(out, pick(seed, ends, COUNT(ends)));
    }
    if (next(seed) % 3 == 0)
        text_add(out, "[slab]");
}

static void test_write_gives_back_every_byte(void **state)
{
    uint64_t seed = 7;
    struct text file = {0}, out = {0};

    (void)state;
    for (int i = 0; i < 3000; i++) {
        struct document *document, *copy;
        struct finding_list findings = {0};
        enum status status;

        make_file(&seed, &file);
        status = document_parse(text_string(&file), file.length, &document, &findings);
        assert_true(status == (finding_has_error(&findings) ? STATUS_REFUSED : STATUS_OK));
        text_clear(&out);
        document_write(document, &out);
        assert_int_equal(out.length, file.length);
        assert_int_equal(document_copy(document, &copy), STATUS_OK);
        document_free(document);
        text_clear(&out);
        document_write(copy, &out);
        assert_string_equal(text_string(&out), text_string(&file));
        document_free(copy);
        finding_free(&findings);
    }
    text_free(&file);
    text_free(&out);
}

static void test_new_document(void **state)
{
    struct document *document;

    (void)state;
    assert_int_equal(document_new(&document), STATUS_OK);
    assert_document(document, "format = 1\n");
    document_free(document);
    document_free(NULL);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(test_refusals_name_the_place),
        cmocka_unit_test(test_unknown_things_are_notes),
        cmocka_unit_test(test_comments_blanks_and_ends),
        cmocka_unit_test(test_rows_members_and_arcs),
        cmocka_unit_test(test_tickets_and_tins),
        cmocka_unit_test(test_caps),
        cmocka_unit_test(test_complete_sample),
        cmocka_unit_test(test_write_gives_back_every_byte),
        cmocka_unit_test(test_new_document),
    };

    return cmocka_run_group_tests(tests, NULL, NULL);
}
