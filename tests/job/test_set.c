/* PATH = VALUE. Every case is a sentence of docs/format.md "What set can address" or of its rule on
 * saving: only the value of a changed line changes. */
#include "job_help.h"

#define F "format = 1\n"

struct change {
    const char *before, *path, *value, *after; /* after NULL = refused */
    const char *part;                          /* of the finding when refused */
};

static const struct change changes[] = {
    /* single keys */
    {F "[slab]\nthickness = 200 mm # t\nuse = yard\n", "slab.thickness", "6 in",
     F "[slab]\nthickness = 6 in # t\nuse = yard\n", NULL},
    {F "[slab]\n\tthickness\t=\t200 mm\t# t\r\n", "slab.thickness", "150 mm",
     F "[slab]\n\tthickness\t=\t150 mm\t# t\r\n", NULL},
    {F "[slab]\nthickness = 200 mm # t\nuse = yard\n", "slab.thickness", "",
     F "[slab]\nuse = yard\n", NULL},
    {F "[slab]\nuse = yard\n\n# about the base\n[base]\n", "slab.thickness", "150 mm",
     F "[slab]\nuse = yard\nthickness = 150 mm\n\n# about the base\n[base]\n", NULL},
    {F "[slab]\n[base]\nkind = sand\n[slab]\nuse = yard\n", "slab.thickness", "150 mm",
     F "[slab]\n[base]\nkind = sand\n[slab]\nuse = yard\nthickness = 150 mm\n", NULL},
    {F "[slab]\n# nothing yet\n", "slab.use", "road", F "[slab]\nuse = road\n# nothing yet\n",
     NULL},
    {F, "slab.use", "road", F "[slab]\nuse = road\n", NULL},
    {"format = 1", "slab.use", "road", F "[slab]\nuse = road\n", NULL},
    {"format = 1\r\n", "slab.use", "road", "format = 1\r\n[slab]\r\nuse = road\r\n", NULL},
    {F "[slab]\nuse = yard", "slab.thickness", "8 in", F "[slab]\nuse = yard\nthickness = 8 in\n",
     NULL},
    {F "[slab]\nthickness =\n", "slab.thickness", "8 in", F "[slab]\nthickness = 8 in\n", NULL},
    {F "[slab]\nthickness = # later\n", "slab.thickness", "8 in",
     F "[slab]\nthickness = 8 in # later\n", NULL},
    {F "[slab]\nuse = yard\n", "slab.thickness", "", F "[slab]\nuse = yard\n", NULL},
    {F "[slab]\ncolour = red\n", "slab.colour", "", F "[slab]\n", NULL},
    /* texts */
    {F, "job.title", "Bay 3", F "[job]\ntitle = Bay 3\n", NULL},
    {F, "job.title", "Bay #3 and # 4", F "[job]\ntitle = \"Bay #3 and # 4\"\n", NULL},
    {F, "job.title", "#3", F "[job]\ntitle = \"#3\"\n", NULL},
    {F, "job.title", "Bay#3", F "[job]\ntitle = Bay#3\n", NULL},
    {F, "job.title", " x", F "[job]\ntitle = \" x\"\n", NULL},
    {F, "job.title", "\"a\\b", F "[job]\ntitle = \"\\\"a\\\\b\"\n", NULL},
    {F, "job.title", "\"as it is\"", F "[job]\ntitle = \"as it is\"\n", NULL},
    {F "[job]\ntitle = \"a # b\" # c\n", "job.title", "d", F "[job]\ntitle = d # c\n", NULL},
    /* named sections */
    {F, "object.C1.at", "12, 9 m", F "[object C1]\nat = 12, 9 m\n", NULL},
    {F "[object C1]\nat = 1, 1 m\nsize = 1 x 1 m\n", "object.C1.at", "12, 9 m",
     F "[object C1]\nat = 12, 9 m\nsize = 1 x 1 m\n", NULL},
    {F "[object C1]\n# c\nat = 1, 1 m\nsize = 1 x 1 m # s\n\n# next\n[edge 1]\nagainst = wall\n",
     "object.C1", "", F "\n# next\n[edge 1]\nagainst = wall\n", NULL},
    {F "[object C1]\nat = 1, 1 m\n", "object.C2", "", F "[object C1]\nat = 1, 1 m\n", NULL},
    {F, "edge.3.against", "wall", F "[edge 3]\nagainst = wall\n", NULL},
    {F "[edge 03]\nagainst = wall\n", "edge.3.against", "slab", F "[edge 03]\nagainst = slab\n",
     NULL},
    {F "[edge 1]\nagainst = wall\n[edge 2]\nagainst = wall\n", "edge.1", "",
     F "[edge 2]\nagainst = wall\n", NULL},
    {F, "edge.3.joints", "4.6, 9.1 m", F "[edge 3]\njoints = 4.6, 9.1 m\n", NULL},
    /* rows */
    {F "[outline]\npoint = 0, 0 m\npoint = 1, 0 m # b\n", "outline.point.2", "36, 0 m",
     F "[outline]\npoint = 0, 0 m\npoint = 36, 0 m # b\n", NULL},
    {F "[outline]\npoint = 0, 0 m\npoint = 1, 0 m\n[slab]\n", "outline.point.3", "36, 0 m",
     F "[outline]\npoint = 0, 0 m\npoint = 1, 0 m\npoint = 36, 0 m\n[slab]\n", NULL},
    {F "[outline]\npoint = 0, 0 m\npoint = 1, 0 m\npoint = 2, 2 m\n", "outline.point.2", "",
     F "[outline]\npoint = 0, 0 m\npoint = 2, 2 m\n", NULL},
    {F "[outline]\npoint = 0, 0 m\narc = 4, 4 m, centre 4, 0 m, left\n", "outline.point.2",
     "4, 4 m", F "[outline]\npoint = 0, 0 m\npoint = 4, 4 m\n", NULL},
    {F "[outline]\npoint = 0, 0 m\n", "outline.arc.2", "4, 4 m, centre 4, 0 m, left",
     F "[outline]\npoint = 0, 0 m\narc = 4, 4 m, centre 4, 0 m, left\n", NULL},
    {F, "opening.pit.point.1", "9, 1 m", F "[opening pit]\npoint = 9, 1 m\n", NULL},
    {F "[opening pit]\nagainst = wall\npoint = 1, 1 m\npoint = 2, 1 m\n", "opening.pit.point.2",
     "9, 1 m", F "[opening pit]\nagainst = wall\npoint = 1, 1 m\npoint = 9, 1 m\n", NULL},
    {F "[pours]\nwidth = 6 m\n", "pours.line.1", "0, 12, 42, 12 m",
     F "[pours]\nwidth = 6 m\nline = 0, 12, 42, 12 m\n", NULL},
    /* joints and cracks */
    {F "[joint]\nfrom = 1, 0 m\nto = 1, 2 m\n[joint]\nfrom = 2, 0 m\nto = 2, 2 m\n", "joint.2.from",
     "10.4, 0 m", F "[joint]\nfrom = 1, 0 m\nto = 1, 2 m\n[joint]\nfrom = 10.4, 0 m\nto = 2, 2 m\n",
     NULL},
    {F "[joint]\nfrom = 1, 0 m\nto = 1, 2 m\n", "joint.2.from", "3, 0 m",
     F "[joint]\nfrom = 1, 0 m\nto = 1, 2 m\n[joint]\nfrom = 3, 0 m\n", NULL},
    {F "[joint]\nfrom = 1, 0 m\n[joint]\nfrom = 2, 0 m\n", "joint.1", "",
     F "[joint]\nfrom = 2, 0 m\n", NULL},
    {F, "crack.1.point.1", "3, 0 m", F "[crack]\npoint = 3, 0 m\n", NULL},
    /* refused: the document stays as it was */
    {F "[slab]\nuse = yard\n", "slab.thickness", "20 mm", NULL, "Did you mean 200 mm?"},
    {F "[slab]\nuse = yard\n", "slab.thickness", "0,2 m", NULL, "0.2 m"},
    {F, "slab.thicknes", "200 mm", NULL, "no such key"},
    {F, "slap.thickness", "200 mm", NULL, "no section"},
    {F, "slab", "200 mm", NULL, "name a key"},
    {F, "", "x", NULL, "no path"},
    {F, "slap", "", NULL, "no section"},
    {F, "a.b.c.d.e", "x", NULL, "no path"},
    {F, "object", "", NULL, "no path"},
    {F, "object.bad name.at", "1, 1 m", NULL, "not good"},
    {F, "object.C1.at", "1 m", NULL, "1 values"},
    {F, "edge.x.against", "wall", NULL, "number"},
    {F "[outline]\npoint = 0, 0 m\n", "outline.point.3", "1, 1 m", NULL, "from 1 to 2"},
    {F "[outline]\npoint = 0, 0 m\n", "outline.point.2", "", NULL, "from 1 to 1"},
    {F "[outline]\npoint = 0, 0 m\n", "outline.point", "1, 1 m", NULL, "name the row"},
    {F, "outline.point.0", "1, 1 m", NULL, "no path"},
    {F, "slab.thickness.1", "200 mm", NULL, "no rows"},
    {F, "joint.2.from", "1, 1 m", NULL, "from 1 to 1"},
    {F, "job.title", "two\nlines", NULL, "one line"},
    {F, "job.title", "bad \xFF", NULL, "UTF-8"},
    {F, "slab.use", "road # x", NULL, "none of"},
    {F, "format", "2", NULL, "no section"},
};

static void test_every_case(void **state)
{
    (void)state;
    for (size_t i = 0; i < COUNT(changes); i++) {
        const struct change *c = &changes[i];
        struct document *document;
        struct finding_list findings = {0};
        struct text out = {0};
        enum status status;

        document_parse(c->before, strlen(c->before), &document, &findings);
        finding_free(&findings);
        status = document_set(document, c->path, c->value, &findings);
        document_write(document, &out);
        if (strcmp(text_string(&out), c->after != NULL ? c->after : c->before) != 0 ||
            status != (c->after != NULL ? STATUS_OK : STATUS_REFUSED) ||
            (c->after == NULL && said(&findings, SEVERITY_ERROR, c->part) == NULL)) {
            print_findings(&findings);
            fail_msg("case %zu %s=%s: status %d\n%s", i, c->path, c->value, status,
                     text_string(&out));
        }
        text_free(&out);
        finding_free(&findings);
        document_free(document);
    }
}

static void test_too_long_a_line_is_refused(void **state)
{
    static char longest[5000];
    struct document *document;
    struct finding_list findings = {0};

    (void)state;
    memset(longest, 'x', 1000);
    document_new(&document);
    assert_int_equal(document_set(document, "job.title", longest, &findings), STATUS_OK);
    memset(longest, 'x', sizeof longest - 1);
    assert_int_equal(document_set(document, "job.title", longest, &findings), STATUS_REFUSED);
    assert_non_null(said(&findings, SEVERITY_ERROR, "too long"));
    finding_free(&findings);
    document_free(document);
}

static void test_get(void **state)
{
    static const char text[] =
        F "[job]\ntitle = \"a # b\" # c\n[outline]\npoint = 0, 0 m\narc = 1, 1 m, centre 0, 1 m, "
          "left\n[object C1]\nat = 1, 2 m\n[slab]\nuse =\n[joint]\nfrom = 1, 1 m\n";
    struct document *document;
    struct finding_list findings = {0};

    (void)state;
    document_parse(text, strlen(text), &document, &findings);
    assert_string_equal(document_get(document, "job.title"), "\"a # b\"");
    assert_string_equal(document_get(document, "outline.point.1"), "0, 0 m");
    assert_string_equal(document_get(document, "outline.arc.2"), "1, 1 m, centre 0, 1 m, left");
    assert_null(document_get(document, "outline.point.2"));
    assert_null(document_get(document, "outline.point.3"));
    assert_string_equal(document_get(document, "object.C1.at"), "1, 2 m");
    assert_null(document_get(document, "object.C2.at"));
    assert_null(document_get(document, "slab.use"));
    assert_string_equal(document_get(document, "joint.1.from"), "1, 1 m");
    assert_null(document_get(document, "nonsense"));
    assert_null(document_get(document, ""));
    finding_free(&findings);
    document_free(document);
}

/* ---- every single field can be written, set and read back to the same value ---- */

static void fill(struct job *job, enum field_id id, uint64_t *seed)
{
    const struct field *field = &field_table[id];
    void *place = (char *)job + field->offset;
    double share;

    *seed = *seed * 6364136223846793005U + 1442695040888963407U;
    share = (double)(*seed >> 11) / 9007199254740992.0;
    switch (field->type) {
    case FIELD_NUMBER:
        *(double *)place = field->least + share * (field->most - field->least);
        if (field->initial == 1 && field->quantity == QUANTITY_NONE)
            *(double *)place = (double)(long)*(double *)place;
        break;
    case FIELD_CHOICE: {
        char word[CHOICE_MOST];
        *(int *)place = (int)(share * 8);
        field_choice_word(field, *(int *)place, word, sizeof word);
        if (word[0] == '\0')
            *(int *)place = 0;
        break;
    }
    case FIELD_TEXT:
        snprintf(place, TITLE_MOST, " #%d \"x\" \\", (int)(share * 100));
        break;
    case FIELD_DATE:
        *(struct date *)place = date_from_days(20000 + (long)(share * 3000));
        break;
    case FIELD_TIME:
        ((struct time_of_day *)place)->minutes = (int)(share * 1440);
        break;
    case FIELD_BAR:
        *(struct bar *)place = (struct bar){0.02 + share / 100, 0.45, 0.3};
        break;
    case FIELD_STRENGTH:
        ((struct strength *)place)->cylinder = 20e6 + share * 30e6;
        break;
    case FIELD_AGGREGATE:
        ((struct aggregate *)place)->row = (int)(share * 12) - 1;
        break;
    case FIELD_NUMBERS: {
        double span = field_table[id].most - field_table[id].least;
        *(struct numbers *)place =
            (struct numbers){{field_table[id].least + share * span, field_table[id].most}, 2};
        break;
    }
    case FIELD_COUNTS:
        ((struct counts *)place)->bits = 1 + (unsigned)(share * 62);
        break;
    default:
        break;
    }
    job->given[id] = true;
}

static void test_written_fields_read_back(void **state)
{
    uint64_t seed = 3;

    (void)state;
    for (int round = 0; round < 40; round++) {
        struct job job, again;
        struct document *document;
        struct finding_list findings = {0};

        job_init(&job);
        job_init(&again);
        document_new(&document);
        for (int id = 0; id < FIELD_COUNT; id++) {
            struct text value = {0};
            char path[96];

            fill(&job, (enum field_id)id, &seed);
            field_write(&value, &job, (enum field_id)id, round % 2 ? UNITS_US : UNITS_METRIC);
            snprintf(path, sizeof path, "%s.%s", field_table[id].section, field_table[id].key);
            if (document_set(document, path, text_string(&value), &findings) != STATUS_OK) {
                print_findings(&findings);
                fail_msg("%s = %s", path, text_string(&value));
            }
            text_free(&value);
        }
        assert_int_equal(document_job(document, &again, &findings), STATUS_OK);
        for (int id = 0; id < FIELD_COUNT; id++) {
            struct text one = {0}, two = {0};

            assert_true(again.given[id]);
            field_write(&one, &job, (enum field_id)id, UNITS_METRIC);
            field_write(&two, &again, (enum field_id)id, UNITS_METRIC);
            if (field_table[id].type == FIELD_NUMBER) {
                double a = *(double *)((char *)&job + field_table[id].offset);
                double b = *(double *)((char *)&again + field_table[id].offset);
                double scale = field_table[id].quantity == QUANTITY_TEMPERATURE ? 100 : 0;
                if (!(a - b <= 1e-12 * (scale + (a < 0 ? -a : a)) &&
                      b - a <= 1e-12 * (scale + (a < 0 ? -a : a))))
                    fail_msg("%s: %s, %s", field_table[id].key, text_string(&one),
                             text_string(&two));
            } else if (field_table[id].type != FIELD_STRENGTH &&
                       field_table[id].type != FIELD_BAR && field_table[id].type != FIELD_NUMBERS) {
                assert_string_equal(text_string(&one), text_string(&two));
            }
            text_free(&one);
            text_free(&two);
        }
        job_free(&job);
        job_free(&again);
        document_free(document);
        finding_free(&findings);
    }
}

/* A set followed by a get gives the value; everything else stays byte for byte. */
static void test_only_the_value_changes(void **state)
{
    static const char before[] = F "# a\n[slab] # s\n thickness = 200 mm  # t\n use=yard\n";
    static const char *const values[] = {"150 mm", "8 in", "0.3 m", "100 mm"};
    struct document *document;
    struct finding_list findings = {0};

    (void)state;
    document_parse(before, strlen(before), &document, &findings);
    for (size_t i = 0; i < COUNT(values); i++) {
        assert_int_equal(document_set(document, "slab.thickness", values[i], &findings), STATUS_OK);
        assert_string_equal(document_get(document, "slab.thickness"), values[i]);
    }
    assert_int_equal(document_set(document, "slab.thickness", "200 mm", &findings), STATUS_OK);
    assert_document(document, before);
    finding_free(&findings);
    document_free(document);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(test_every_case),
        cmocka_unit_test(test_too_long_a_line_is_refused),
        cmocka_unit_test(test_get),
        cmocka_unit_test(test_written_fields_read_back),
        cmocka_unit_test(test_only_the_value_changes),
    };

    return cmocka_run_group_tests(tests, NULL, NULL);
}
