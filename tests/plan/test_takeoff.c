/* The crew, prices, batches and other widths, worked out by hand from the yard of the examples: 300
 * m of joint 10 x 10 mm. Paces: FHWA-RD-99-147 Table 8 (75 and 200 m/h within 60 to 90 and 150 to
 * 270); hand gun 32 m/h from memory. */
#include "plan/plan_help.h"

static void assert_near(double value, double wanted, double tolerance)
{
    if (!(fabs(value - wanted) <= tolerance))
        fail_msg("%.9g, wanted %.9g within %.3g", value, wanted, tolerance);
}

/* The yard with more in its take-off section. */
static void make_yard(const char *more, struct plan *plan)
{
    struct text text = {0};

    read_example("e1-service-yard", &text);
    text_add(&text, more);
    make_plan(text_string(&text), plan);
    text_free(&text);
}

static bool found(const struct plan *plan, const char *field)
{
    for (size_t i = 0; i < plan->findings.count; i++)
        if (strcmp(plan->findings.items[i].field, field) == 0)
            return true;
    return false;
}

/* 300/32 = 9.375 h: the gun is slowest; two guns 4.6875 h, one day. A melter is no slower than the
 * cleaning: 300/75 = 4 h. */
static void test_hours(void **state)
{
    static const struct {
        const char *more, *slowest;
        double hours, days;
    } cases[] = {{"", "gun", 9.375, 2},
                 {"[takeoff]\ntools = 2\n", "gun", 4.6875, 1},
                 {"[takeoff]\ntool = melter\n", "cleaning", 4, 1},
                 {"[takeoff]\ntool = pump\nday = 1 h\n", "cleaning", 4, 4}};

    (void)state;
    for (size_t i = 0; i < COUNT(cases); i++) {
        struct plan plan;
        make_yard(cases[i].more, &plan);
        assert_near(plan.quantities.hours, cases[i].hours, 1e-9);
        assert_near(plan.quantities.days, cases[i].days, 0);
        for (size_t w = 0; w < plan.quantities.work_count; w++)
            assert_true(plan.quantities.works[w].slowest ==
                        (strcmp(plan.quantities.works[w].name, cases[i].slowest) == 0));
        plan_free(&plan);
    }
}

/* 30 l + (1/2 - pi/8) x 0.01^2 x 300 m, 10 % waste, and 0.4 l on each of two days. */
static void test_loss(void **state)
{
    struct plan plan;

    (void)state;
    make_yard("[takeoff]\nloss-per-day = 400 ml\n", &plan);
    assert_near(plan.quantities.sealant_order_m3,
                1.1 * (0.030 + 0.1073009183 * 1e-4 * 300) + 0.0008, 1e-9);
    plan_free(&plan);
}

/* 61 packs come in 4 boxes of 20: 80 x 6.20 + 315 m x 0.40 + 9.375 h x 100. */
static void test_cost(void **state)
{
    struct plan plan;

    (void)state;
    make_yard("", &plan);
    assert_true(isnan(plan.quantities.cost));
    plan_free(&plan);
    make_yard("[takeoff]\nprices = 6.20\nrod-price = 0.40\nhour-price = 100\n", &plan);
    assert_near(plan.quantities.cost, 80 * 6.20 + 315 * 0.40 + 937.5, 1e-9);
    plan_free(&plan);
}

/* A comma parts two prices, so 4,20 is refused and the sentence says how to write it. */
static void test_price_with_a_comma(void **state)
{
    static const char text[] = F "[takeoff]\nprices = 4,20\n";
    struct plan plan;

    (void)state;
    assert_int_equal(try_plan(text, strlen(text), &plan), STATUS_REFUSED);
    assert_true(found(&plan, "takeoff.prices"));
    plan_free(&plan);
}

/* 40 minutes at 23 degC are 40 x 2^0.8 = 69.6 at 15; one gun puts 32 m/h x 36.54 l/300 m into the
 * joint in that time: 4.52 l. */
static void test_batch(void **state)
{
    struct plan plan;
    double per_metre;

    (void)state;
    make_yard("[sealant]\npot-life = 40 min\nbatch = 4.6 l\n", &plan);
    per_metre = plan.quantities.sealant_order_m3 / 300;
    assert_near(plan.quantities.pot_life_s, 4178.8, 0.5);
    assert_near(plan.quantities.batch_most_m3, 4178.8 / 3600 * 32 * per_metre, 1e-6);
    assert_near(plan.quantities.batch_m, 0.0046 / per_metre, 1e-9);
    assert_true(found(&plan, "sealant.batch"));
    plan_free(&plan);
    make_yard("[sealant]\npot-life = 40 min\nbatch = 4.5 l\n", &plan);
    assert_false(found(&plan, "sealant.batch"));
    plan_free(&plan);
}

/* Open 1.376, close 0.8 mm; depth = width up to 13 mm (the kind's); 600 ml packs. */
static void test_other_widths(void **state)
{
    static const struct {
        double mm, extension, litres;
        int packs;
        enum verdict verdict;
    } wanted[] = {{6, 0.2293, 13.2, 22, VERDICT_TIGHT},
                  {8, 0.172, 23.4, 39, VERDICT_HOLDS},
                  {10, 0.1376, 36.5, 61, VERDICT_HOLDS},
                  {12, 0.1147, 52.6, 88, VERDICT_HOLDS}};
    struct plan plan;

    (void)state;
    make_yard("", &plan);
    assert_true(plan.quantities.width_count >= COUNT(wanted));
    for (size_t i = 0; i < COUNT(wanted); i++) {
        const struct plan_width *row = &plan.quantities.widths[i];
        assert_near(row->width_m, wanted[i].mm / 1000, 1e-9);
        assert_near(row->extension, wanted[i].extension, 1e-4);
        assert_near(1000 * row->order_m3, wanted[i].litres, 0.05);
        assert_int_equal(row->packs, wanted[i].packs);
        assert_int_equal(row->verdict, wanted[i].verdict);
        assert_true(row->now == (wanted[i].mm == 10));
    }
    plan_free(&plan);
    /* 10 mm is no blade there is: the job's own stands at its place all the same */
    make_yard("[takeoff]\nblades = 9, 20 mm\n", &plan);
    assert_int_equal(plan.quantities.width_count, 3);
    assert_true(plan.quantities.widths[1].now);
    plan_free(&plan);
}

/* The truck's rods only; a slot that is too shallow; tape; nothing under the bead. */
static void test_under_the_bead(void **state)
{
    struct plan plan;

    (void)state;
    make_yard("[takeoff]\nrods = 8, 20 mm\n", &plan);
    assert_near(plan.seal.rod_m, 0.020, 1e-9);
    plan_free(&plan);
    make_yard("[takeoff]\nrods = 8 mm\n", &plan);
    assert_true(found(&plan, "sealant.rod")); /* falls through a 10 mm joint */
    plan_free(&plan);
    make_yard("[sealing]\nslot-depth = 25 mm\n", &plan); /* 4 + 10 + 13 = 27 mm */
    assert_true(found(&plan, "sealing.slot-depth"));
    plan_free(&plan);
    make_yard("[sealing]\nslot-depth = 25 mm\n[sealant]\nbacking = tape\n", &plan); /* 14 mm */
    assert_false(found(&plan, "sealing.slot-depth"));
    assert_near(plan.quantities.tape_m, 315, 1e-9);
    assert_int_equal(plan.quantities.rod_count, 0);
    assert_near(plan.quantities.sealant_order_m3, 0.033, 1e-9); /* nothing beside a rod */
    plan_free(&plan);
    make_yard("[sealant]\nbacking = none\n", &plan);
    assert_true(found(&plan, "sealant.backing"));
    plan_free(&plan);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(test_hours),          cmocka_unit_test(test_loss),
        cmocka_unit_test(test_cost),           cmocka_unit_test(test_price_with_a_comma),
        cmocka_unit_test(test_batch),          cmocka_unit_test(test_other_widths),
        cmocka_unit_test(test_under_the_bead),
    };

    return cmocka_run_group_tests(tests, NULL, NULL);
}
