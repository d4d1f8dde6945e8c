/* Defaults, contradictions and the checks of the drawing. Defaults: docs/format.md "When a key is
 * missing". Friction, slip and factor by base: the same table. */
#include "job_help.h"
#include <math.h>
#include <time.h>

#define F "format = 1\n"
#define SQUARE "[outline]\npoint = 0, 0 m\npoint = 12, 0 m\npoint = 12, 8 m\npoint = 0, 8 m\n"

static void settle(struct loaded *loaded, const char *text)
{
    load(loaded, text);
    job_settle(&loaded->job, &loaded->findings);
    job_check(&loaded->job, &loaded->findings);
}

static bool is(double a, double b)
{
    return fabs(a - b) <= 1e-12 * fmax(fabs(a), fabs(b));
}

/* ---- defaults ---- */

static void test_fixed_defaults(void **state)
{
    struct loaded l;
    const struct job *j = &l.job;

    (void)state;
    settle(&l, F);
    assert_int_equal(l.findings.count, 0); /* a job with no outline at all is legal */
    assert_int_equal(j->job_practice, PRACTICE_PLAIN);
    assert_int_equal(j->job_units, 0);
    assert_true(isnan(j->place_latitude) && isnan(j->place_longitude) && j->place_utc_offset == 0);
    assert_int_equal(j->slab_use, USE_YARD);
    assert_true(is(j->slab_thickness, 0.150) && j->slab_reinforced == 0 && j->slab_gradient == 0);
    assert_true(is(j->base_slip, 0.0005) && is(j->base_subgrade_modulus, 55e6));
    assert_true(is(j->concrete_strength.cylinder, 32e6) && is(j->concrete_expansion, 10e-6));
    assert_int_equal(j->concrete_shrinkage_model, SHRINKAGE_EN1992);
    assert_int_equal(j->concrete_cement, CEMENT_N);
    assert_true(is(j->concrete_curing, 7 * 86400.0));
    assert_true(is(j->concrete_horizon, 50 * 365.25 * 86400));
    assert_true(j->climate_air_coldest == -10 && j->climate_air_hottest == 32);
    assert_true(is(j->climate_humidity, 0.7));
    assert_true(isnan(j->climate_slab_coldest) && isnan(j->climate_slab_hottest));
    assert_true(j->pour_date.year == 0 && j->pour_placing_temperature == 15);
    assert_true(j->sealing_date.year == 0 && isnan(j->sealing_temperature));
    assert_true(job_sealing_age_days(j) == 28);
    assert_int_equal(j->sealing_movement, MOVEMENT_FRICTION);
    assert_true(is(j->sealing_factor, 0.80) && j->sealing_working == 1);
    assert_true(j->sealing_tolerance == 0 && j->sealing_least_temperature == 5);
    assert_int_equal(j->sealant_kind, SEALANT_SILICONE);
    assert_true(is(j->sealant_extension, 0.25) && is(j->sealant_compression, 0.25));
    assert_true(isnan(j->sealant_width) && isnan(j->sealant_depth) && isnan(j->sealant_rod));
    assert_true(is(j->sealant_recess, 0.004));
    assert_true(isnan(j->rules_spacing) && isnan(j->rules_spacing_across));
    assert_true(j->rules_axis == 0 && j->rules_aspect == 1.5 && is(j->rules_least_side, 0.6));
    assert_true(j->rules_least_angle == 60 && j->rules_round_to == 0);
    assert_true(isnan(j->rules_expansion_every));
    assert_true(is(j->takeoff_waste, 0.1) && j->takeoff_rod_cusps == 1 && j->takeoff_box == 1);
    assert_true(j->takeoff_packages.count == 1 && is(j->takeoff_packages.items[0], 600e-6));
    assert_true(isnan(j->takeoff_length));
    assert_true(j->sawing_saws == 1 && is(j->sawing_pace, 75.0 / 3600));
    assert_true(!j->given[FIELD_sawing_sunset] && j->pours_direction == 0);
    unload(&l);
}

static const struct {
    const char *kind, *layer;
    double friction, slip, factor, stiffness;
} bases[] = {
    {"granular", "none", 1.5, 0.0005, 0.80, 6},     {"stabilised", "none", 1.8, 0.00025, 0.65, 5},
    {"asphalt", "none", 5, 0.0005, 0.65, 5},        {"sand", "none", 0.8, 0.0005, 0.80, 6},
    {"soil", "none", 0.9, 0.0005, 0.80, 6},         {"granular", "sheet", 0.75, 0.0002, 0.80, 6},
    {"stabilised", "sheet", 0.75, 0.0002, 0.80, 5},
};

static void test_defaults_by_base(void **state)
{
    (void)state;
    for (size_t i = 0; i < COUNT(bases); i++) {
        struct loaded l;
        char text[128];

        snprintf(text, sizeof text, F "[base]\nkind = %s\ninterlayer = %s\n", bases[i].kind,
                 bases[i].layer);
        settle(&l, text);
        assert_true(is(l.job.base_friction, bases[i].friction));
        assert_true(is(l.job.base_slip, bases[i].slip));
        assert_true(is(l.job.sealing_factor, bases[i].factor));
        assert_true(is(l.job.rules_stiffness, bases[i].stiffness));
        assert_true(l.job.base_friction_low <= l.job.base_friction &&
                    l.job.base_friction <= l.job.base_friction_high);
        unload(&l);
    }
}

static void test_defaults_by_practice_and_kind(void **state)
{
    struct loaded l;

    (void)state;
    settle(&l, F "[job]\npractice = us\n[sealant]\nkind = hot-pour\n");
    assert_int_equal(l.job.concrete_shrinkage_model, SHRINKAGE_ACI209);
    assert_true(is(l.job.sealant_extension, 0.2) && is(l.job.sealant_compression, 0.2));
    assert_string_equal(l.job.sealant_class.word, "20");
    assert_true(l.job.sealing_least_temperature == 10);
    unload(&l);
    settle(&l, F "[job]\npractice = india\n");
    assert_true(is(l.job.rules_drag_stress, 80e3));
    unload(&l);
    settle(&l, F "[sealant]\nclass = 100/50\nextension = 40 %\n");
    assert_true(is(l.job.sealant_extension, 0.4) && is(l.job.sealant_compression, 0.5));
    unload(&l);
    settle(&l, F "[climate]\nslab-coldest = -8 degC\nslab-hottest = 40 degC\n");
    assert_true(l.job.sealing_temperature == 16 && l.job.sealing_cut_temperature == 16);
    assert_false(l.job.given[FIELD_sealing_temperature]);
    unload(&l);
    settle(&l, F "[pour]\ndate = 2027-04-12\n[sealing]\ndate = 2027-05-20\n");
    assert_true(job_sealing_age_days(&l.job) == 38); /* 18 days of April, 20 of May */
    unload(&l);
    /* FHWA-HRT-12-030 Table 47, recommended: limestone 5.25e-6 per degF = 9.45e-6 per degC */
    settle(&l, F "[concrete]\naggregate = limestone\n");
    assert_true(is(l.job.concrete_expansion, 9.45e-6));
    unload(&l);
    settle(&l, F "[edge 1]\nagainst = slab\n[edge 2]\nagainst = kerb\n" SQUARE);
    assert_int_equal(l.job.edges[0].treat, TREAT_MATCH);
    assert_int_equal(l.job.edges[1].treat, TREAT_ISOLATE);
    unload(&l);
}

static void test_settling_twice_changes_nothing(void **state)
{
    struct loaded l;
    struct job once;

    (void)state;
    settle(&l, F "[base]\nkind = asphalt\n[concrete]\naggregate = granite\n");
    assert_int_equal(job_copy(&once, &l.job), STATUS_OK);
    job_settle(&l.job, &l.findings);
    for (int id = 0; id < FIELD_COUNT; id++) {
        struct text one = {0}, two = {0};
        field_write(&one, &once, (enum field_id)id, UNITS_METRIC);
        field_write(&two, &l.job, (enum field_id)id, UNITS_METRIC);
        assert_string_equal(text_string(&one), text_string(&two));
        text_free(&one);
        text_free(&two);
    }
    job_free(&once);
    unload(&l);
}

/* ---- contradictions ---- */

static const struct {
    const char *text;
    enum severity severity;
    const char *field, *part;
} contradictions[] = {
    {"[climate]\nslab-coldest = 40 degC\nslab-hottest = -8 degC\n", SEVERITY_ERROR,
     "climate.slab-coldest", "swap the two"},
    {"[climate]\nair-coldest = 33 degC\n", SEVERITY_ERROR, "climate.air-coldest", "swap the two"},
    {"[base]\ninterlayer = sheet\n[sealing]\nmovement = factor\nfactor = 0.65\n", SEVERITY_WARNING,
     "sealing.factor", "at least 0.80"},
    {"[concrete]\nshrinkage = 200e-6\n", SEVERITY_NOTE, "concrete.shrinkage", "not used"},
    {"[concrete]\nshrinkage-model = typed\n", SEVERITY_ERROR, "concrete.shrinkage", "missing"},
    {"[concrete]\nshrinkage-model = typed\nshrinkage = 0\nshrinkage-ultimate = 500e-6\n",
     SEVERITY_NOTE, "concrete.shrinkage-ultimate", "not used"},
    {"[concrete]\naggregate = granite\nexpansion = 10e-6 /K\n", SEVERITY_NOTE, "concrete.aggregate",
     "not used"},
    {"[sealing]\nfactor = 0.8\n", SEVERITY_NOTE, "sealing.factor", "not used"},
    {"[climate]\nslab-coldest = -8 degC\nslab-hottest = 40 degC\nair-coldest = -12 degC\n",
     SEVERITY_NOTE, "climate.air-coldest", "not used"},
    {"[climate]\nslab-coldest = -8 degC\nslab-hottest = 40 degC\n[sealing]\ntemperature = 40 "
     "degC\n",
     SEVERITY_WARNING, "sealing.temperature", "no closing is left"},
    {"[pour]\ndate = 2027-05-20\n[sealing]\ndate = 2027-04-12\n", SEVERITY_ERROR, "sealing.date",
     "before the day of pouring"},
    {"[base]\nfriction = 1\nfriction-low = 2\n", SEVERITY_WARNING, "base.friction", "not between"},
    {"[rules]\nspacing = 0.5 m\n", SEVERITY_ERROR, "rules.least-side", "wider than the spacing"},
    {"[sealant]\nseal-least = 60 %\n", SEVERITY_ERROR, "sealant.seal-least", "swap"},
};

static void test_contradictions(void **state)
{
    (void)state;
    for (size_t i = 0; i < COUNT(contradictions); i++) {
        struct loaded l;
        char text[512];
        const struct finding *finding;

        snprintf(text, sizeof text, F "%s", contradictions[i].text);
        settle(&l, text);
        finding = said(&l.findings, contradictions[i].severity, contradictions[i].part);
        if (finding == NULL || strcmp(finding->field, contradictions[i].field) != 0) {
            print_findings(&l.findings);
            fail_msg("case %zu: %s", i, text);
        }
        assert_int_equal(l.findings.count, 1);
        unload(&l);
    }
}

/* ---- the drawing ---- */

static const struct {
    const char *text;
    enum severity severity;
    int line;
    const char *part;
} drawings[] = {
    {"[outline]\npoint = 0, 0 m\npoint = 1, 0 m\n", SEVERITY_ERROR, 3, "2 corners"},
    {"[outline]\npoint = 0, 0 m\n", SEVERITY_ERROR, 3, "1 corners"},
    {"[outline]\npoint = 0, 0 m\npoint = 4, 4 m\npoint = 4, 0 m\npoint = 0, 4 m\n", SEVERITY_ERROR,
     3, "side 1 and side 3 cross"},
    {"[outline]\npoint = 0, 0 m\npoint = 4, 0 m\npoint = 2, 0 m\n", SEVERITY_ERROR, 3, "cross"},
    {"[outline]\npoint = 0, 0 m\npoint = 4, 0 m\npoint = 4, 0 m\npoint = 0, 4 m\n", SEVERITY_ERROR,
     5, "rows 2 and 3 are one point"},
    {"[outline]\npoint = 0, 0 m\npoint = 4, 0 m\npoint = 4, 4 m\npoint = 0, 0 m\n", SEVERITY_ERROR,
     6, "closes by itself"},
    {"[outline]\npoint = 0, 0 m\npoint = 36, 0 m\narc = 40, 4 m, centre 36, 4.01 m, left\n"
     "point = 0, 4 m\n",
     SEVERITY_ERROR, 5, "same to 1 mm"},
    {"[outline]\npoint = 0, 0 m\npoint = 4, 0 m\narc = 4, 0 m, centre 4, 1 m, left\npoint = 0, 4 "
     "m\n",
     SEVERITY_ERROR, 5, "two arcs"},
    {SQUARE "[opening p]\npoint = 20, 1 m\npoint = 21, 1 m\npoint = 21, 2 m\n", SEVERITY_ERROR, 7,
     "outside the slab"},
    {SQUARE "[opening p]\npoint = 11, 1 m\npoint = 14, 1 m\npoint = 14, 2 m\n", SEVERITY_ERROR, 7,
     "cuts or touches"},
    {SQUARE "[opening p]\npoint = 1, 1 m\npoint = 2, 1 m\n", SEVERITY_ERROR, 8, "2 corners"},
    {SQUARE "[opening p]\npoint = 1, 1 m\npoint = 3, 1 m\npoint = 3, 3 m\n"
            "[opening q]\npoint = 2, 0.5 m\npoint = 4, 1 m\npoint = 2.5, 2 m\n",
     SEVERITY_ERROR, 11, "overlaps or touches the opening p"},
    {SQUARE "[opening p]\npoint = 1, 1 m\npoint = 5, 1 m\npoint = 5, 5 m\npoint = 1, 5 m\n"
            "[opening q]\npoint = 2, 2 m\npoint = 3, 2 m\npoint = 3, 3 m\n",
     SEVERITY_ERROR, 12, "overlaps or touches the opening p"},
    {SQUARE "[object C1]\nat = 20, 1 m\nsize = 1 x 1 m\n", SEVERITY_ERROR, 7, "off the slab"},
    {SQUARE "[object C1]\nat = 12.1, 1 m\nsize = 1 x 1 m\n", SEVERITY_WARNING, 7,
     "middle of the object"},
    {SQUARE "[opening p]\npoint = 1, 1 m\npoint = 3, 1 m\npoint = 3, 3 m\n"
            "[object C1]\nat = 2.5, 1.5 m\nsize = 0.1 x 0.1 m\n",
     SEVERITY_ERROR, 11, "stands in the opening p"},
    {SQUARE "[edge 5]\nagainst = wall\n", SEVERITY_ERROR, 7, "no such side; the outline has 4"},
    {SQUARE "[edge 1]\nagainst = slab\njoints = 4, 12.5 m\n", SEVERITY_ERROR, 7, "beyond the side"},
    {SQUARE "[edge 1]\nagainst = wall\njoints = 4 m\n", SEVERITY_NOTE, 7, "not used"},
    {SQUARE "[joint]\nfrom = 1, 1 m\nto = 1, 1 m\n", SEVERITY_ERROR, 7, "ends where it begins"},
    {SQUARE "[joint]\nfrom = 20, 1 m\nto = 30, 1 m\n", SEVERITY_WARNING, 7, "off the slab"},
    {SQUARE "[pours]\ndirection = 0 deg\n", SEVERITY_NOTE, 0, "no strips"},
    {"[object C1]\nat = 1, 1 m\nsize = 1 x 1 m\n", SEVERITY_WARNING, 0, "there is none"},
};

static void test_impossible_drawings(void **state)
{
    (void)state;
    for (size_t i = 0; i < COUNT(drawings); i++) {
        struct loaded l;
        char text[1024];
        const struct finding *finding;

        snprintf(text, sizeof text, F "%s", drawings[i].text);
        settle(&l, text);
        finding = said(&l.findings, drawings[i].severity, drawings[i].part);
        if (finding == NULL || finding->line != drawings[i].line) {
            print_findings(&l.findings);
            fail_msg("case %zu: %s", i, text);
        }
        unload(&l);
    }
}

static const char *const sound[] = {
    SQUARE,
    /* the wrong way round */
    "[outline]\npoint = 0, 8 m\npoint = 12, 8 m\npoint = 12, 0 m\npoint = 0, 0 m\n",
    /* a rounded corner */
    "[outline]\npoint = 0, 0 m\npoint = 36, 0 m\narc = 40, 4 m, centre 36, 4 m, left\n"
    "point = 40, 20 m\npoint = 0, 20 m\n[edge 2]\nagainst = slab\njoints = 3.1, 6.28 m\n",
    /* a circle of two arcs, the last of which closes it and adds no corner */
    "[outline]\npoint = 5, 0 m\narc = -5, 0 m, centre 0, 0 m, left\n"
    "arc = 5, 0 m, centre 0, 0 m, left\n[edge 2]\nagainst = wall\n[object M]\nat = 0, 4.9 m\n"
    "diameter = 0.1 m\n",
    /* half a disc */
    "[outline]\npoint = 0, 0 m\narc = 4, 0 m, centre 2, 0 m, right\n",
    /* a corner that lies on a straight side is no fault */
    "[outline]\npoint = 0, 0 m\npoint = 2, 0 m\npoint = 4, 0 m\npoint = 4, 4 m\n",
    SQUARE "[opening p]\npoint = 1, 1 m\npoint = 3, 1 m\npoint = 3, 3 m\n[opening q]\n"
           "point = 5, 1 m\npoint = 7, 1 m\npoint = 7, 3 m\n[object C1]\nat = 12, 4 m\n"
           "size = 0.4 x 0.4 m\n[edge 1]\nagainst = slab\njoints = 4, 12 m\n",
};

static void test_sound_drawings_say_nothing(void **state)
{
    (void)state;
    for (size_t i = 0; i < COUNT(sound); i++) {
        struct loaded l;
        char text[1024];

        snprintf(text, sizeof text, F "%s", sound[i]);
        settle(&l, text);
        print_findings(&l.findings);
        assert_int_equal(l.findings.count, 0);
        unload(&l);
    }
}

/* An arc's length is radius times turn: a quarter of a circle of 4 m is 2 pi = 6.2832 m. */
static void test_joints_along_an_arc(void **state)
{
    static const char arc[] = "[outline]\npoint = 0, 0 m\npoint = 36, 0 m\n"
                              "arc = 40, 4 m, centre 36, 4 m, left\npoint = 40, 20 m\n"
                              "point = 0, 20 m\n[edge 2]\nagainst = slab\njoints = %s m\n";
    struct loaded l;
    char text[512];

    (void)state;
    snprintf(text, sizeof text, "%s", F);
    snprintf(text + sizeof F - 1, sizeof text - sizeof F, arc, "6.2831");
    settle(&l, text);
    assert_int_equal(l.findings.count, 0);
    unload(&l);
    snprintf(text + sizeof F - 1, sizeof text - sizeof F, arc, "6.2833");
    settle(&l, text);
    assert_non_null(said(&l.findings, SEVERITY_ERROR, "beyond the side"));
    unload(&l);
}

/* ---- copies and dates ---- */

static void test_copy_is_deep(void **state)
{
    struct loaded l;
    struct job copy;

    (void)state;
    load(&l, F SQUARE "[opening p]\npoint = 1, 1 m\n[edge 1]\njoints = 1, 2 m\n[object C]\n"
                      "at = 1, 1 m\nsize = 1 x 1 m\n[joint]\nfrom = 1, 1 m\nto = 2, 2 m\n"
                      "[pours]\nline = 0, 0, 1, 1 m\n[crack]\npoint = 1, 1 m\n");
    assert_int_equal(job_copy(&copy, &l.job), STATUS_OK);
    l.job.openings[0].rows.items[0].x = 99;
    l.job.edges[0].joints[1] = 99;
    l.job.outline.items[0].x = 99;
    assert_true(copy.openings[0].rows.items[0].x == 1 && copy.edges[0].joints[1] == 2);
    assert_true(copy.outline.items[0].x == 0 && copy.outline.count == 4);
    assert_int_equal(copy.object_count + copy.joint_count + copy.pour_line_count + copy.crack_count,
                     4);
    job_free(&copy);
    job_free(&copy);
    unload(&l);
}

/* The Gregorian calendar of the C library (timegm) is the oracle. */
static void test_dates_against_the_library(void **state)
{
    (void)state;
    for (long days = -25000; days < 85000; days += 7) {
        time_t seconds = (time_t)days * 86400;
        struct tm tm;
        struct date date = date_from_days(days);

        assert_non_null(gmtime_r(&seconds, &tm));
        assert_int_equal(date.year, tm.tm_year + 1900);
        assert_int_equal(date.month, tm.tm_mon + 1);
        assert_int_equal(date.day, tm.tm_mday);
        assert_int_equal(date_days(date), days);
        assert_true(date_valid(date));
    }
    assert_true(date_valid((struct date){2028, 2, 29}));
    assert_false(date_valid((struct date){2027, 2, 29}));
    assert_false(date_valid((struct date){2100, 2, 29}));
    assert_false(date_valid((struct date){2027, 13, 1}));
    assert_false(date_valid((struct date){2027, 0, 1}));
    assert_false(date_valid((struct date){2027, 4, 31}));
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(test_fixed_defaults),
        cmocka_unit_test(test_defaults_by_base),
        cmocka_unit_test(test_defaults_by_practice_and_kind),
        cmocka_unit_test(test_settling_twice_changes_nothing),
        cmocka_unit_test(test_contradictions),
        cmocka_unit_test(test_impossible_drawings),
        cmocka_unit_test(test_sound_drawings_say_nothing),
        cmocka_unit_test(test_joints_along_an_arc),
        cmocka_unit_test(test_copy_is_deep),
        cmocka_unit_test(test_dates_against_the_library),
    };

    return cmocka_run_group_tests(tests, NULL, NULL);
}
