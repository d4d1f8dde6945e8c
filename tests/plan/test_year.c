/* The slab's year in the plan: simulated when nothing is typed, remembered without any change, and
 * the joint's year against the ends that the sealant check uses. */
#include "plan/plan_help.h"

#include "plan/year.h"

#define YARD                                                                                       \
    "[slab]\nthickness = 200 mm\n[rules]\nspacing = 4 m\n[outline]\npoint = 0, 0 m\npoint = 12, "  \
    "0 "                                                                                           \
    "m\npoint = 12, 12 m\npoint = 0, 12 m\n"

static bool near(double a, double b, double tolerance)
{
    return fabs(a - b) <= tolerance;
}

static void test_basis(void **state)
{
    struct plan plan;

    (void)state;
    make_plan(F YARD, &plan);
    assert_string_equal(plan.temperature.basis, "simulation");
    assert_true(plan.temperature.coldest_c > plan.temperature.estimate_coldest_c);
    assert_true(plan.temperature.hottest_c < plan.temperature.estimate_hottest_c);
    plan_free(&plan);
    make_plan(F "[climate]\nexposure = indoor\nair-coldest = 10 degC\nair-hottest = 30 degC\n" YARD,
              &plan);
    assert_string_equal(plan.temperature.basis, "estimate");
    assert_true(near(plan.temperature.coldest_c, 10, 0) && near(plan.temperature.hottest_c, 30, 0));
    plan_free(&plan);
    make_plan(F "[climate]\nslab-coldest = -8 degC\nslab-hottest = 40 degC\n" YARD, &plan);
    assert_string_equal(plan.temperature.basis, "typed");
    plan_free(&plan);
    make_plan(F "[climate]\nslab-coldest = -8 degC\n" YARD, &plan); /* the other is simulated */
    assert_string_equal(plan.temperature.basis, "simulation");
    assert_true(near(plan.temperature.coldest_c, -8, 0));
    plan_free(&plan);
}

static enum status cached_plan(const char *text, struct plan_cache *cache, struct plan *plan)
{
    struct document *document = NULL;
    struct finding_list findings = {0};
    struct job job;
    enum status status;

    document_parse(text, strlen(text), &document, &findings);
    job_init(&job);
    document_job(document, &job, &findings);
    status = plan_make(&job, cache, NULL, plan);
    job_free(&job);
    document_free(document);
    finding_free(&findings);
    return status;
}

/* The same numbers bit by bit with a cache, also when the climate changed in between. */
static void test_cache(void **state)
{
    static const char *const texts[] = {F YARD, F "[climate]\nair-hottest = 36 degC\n" YARD, F YARD,
                                        F "[climate]\nwind = 4 m/s\n" YARD, F YARD};
    struct plan_cache cache = {0};

    (void)state;
    for (size_t i = 0; i < COUNT(texts); i++) {
        struct plan plain, cached;
        assert_int_equal(cached_plan(texts[i], NULL, &plain), STATUS_OK);
        assert_int_equal(cached_plan(texts[i], &cache, &cached), STATUS_OK);
        assert_memory_equal(&plain.temperature, &cached.temperature, sizeof plain.temperature);
        assert_memory_equal(&plain.movement.open_m, &cached.movement.open_m, sizeof(double));
        plan_free(&plain);
        plan_free(&cached);
    }
    plan_cache_free(&cache);
}

/* The yard of the examples: open = 1.376 mm, close = 0.8 mm on 10 mm, so 11.4 mm in the cold
 * and 9.2 mm in the heat; widest in January, narrowest in July. */
static void test_ends(void **state)
{
    struct text text = {0};
    struct plan plan;
    struct year *year = malloc(sizeof *year);
    double cycles = 0;

    (void)state;
    assert_non_null(year);
    read_example("e1-service-yard", &text);
    make_plan(text_string(&text), &plan);
    assert_int_equal(year_make(&plan, year), STATUS_OK);
    assert_true(near(year->days[year->widest].gap_high_m, 0.011376, 2e-6));
    assert_true(near(year->days[year->narrowest].gap_low_m, 0.0092, 2e-6));
    assert_true(near(year->days[year->widest].extension, plan.seal.extension, 2e-4));
    assert_true(near(year->days[year->narrowest].compression, plan.seal.compression, 2e-4));
    assert_in_range(year->days[year->widest].day_of_year, 15, 25);
    assert_in_range(year->days[year->narrowest].day_of_year, 195, 206);
    assert_int_equal(year->days[0].day_of_year, 139); /* 20 May: the day of sealing */
    for (int i = 0; i < 4; i++)
        cycles += year->cycles[i];
    assert_true(cycles > 300 && cycles < 800); /* about one a day */
    plan_free(&plan);
    text_free(&text);
    free(year);
}

/* Drying by a model from a date: the narrowest of the first summer has some drying in it already,
 * so it is not narrower than the check's end, which takes none. */
static void test_first_year(void **state)
{
    struct plan plan;
    struct year *year = malloc(sizeof *year);

    (void)state;
    assert_non_null(year);
    make_plan(F "[pour]\ndate = 2027-04-12\n[sealing]\ndate = 2027-05-20\n" YARD, &plan);
    assert_int_equal(year_make(&plan, year), STATUS_OK);
    assert_true(year->dated && year->drying_known && !year->scaled);
    assert_true(year->days[year->narrowest].compression <= plan.seal.compression + 1e-6);
    assert_true(year->days[year->widest].extension < plan.seal.extension);
    plan_free(&plan);
    make_plan(F "[climate]\nexposure = indoor\n" YARD, &plan);
    assert_int_equal(year_make(&plan, year), STATUS_REFUSED);
    plan_free(&plan);
    free(year);
}

static void test_months(void **state)
{
    int day;

    (void)state;
    assert_string_equal(year_month_word(0, &day), "January");
    assert_int_equal(day, 1);
    assert_string_equal(year_month_word(58, &day), "February");
    assert_int_equal(day, 28);
    assert_string_equal(year_month_word(364, &day), "December");
    assert_int_equal(day, 31);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(test_basis),  cmocka_unit_test(test_cache),
        cmocka_unit_test(test_ends),   cmocka_unit_test(test_first_year),
        cmocka_unit_test(test_months),
    };

    return cmocka_run_group_tests(tests, NULL, NULL);
}
