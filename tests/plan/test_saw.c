/* The night of sawing of whole jobs: every metre cut once, in its time; what moves the window; the
 * sentences of wrong input. Run from the root of the project. */
#include <setjmp.h>
#include <stdarg.h>
#include <stddef.h>
#include <stdint.h>

#include <cmocka.h>

#include "job/document.h"
#include "job/trial.h"
#include "plan/saw_band.h"
#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

struct change {
    const char *path, *value;
};

static enum status make(const char *path, const struct change *changes, struct plan *plan)
{
    static char bytes[1 << 16];
    struct document *document;
    struct finding_list findings = {0};
    struct job job;
    FILE *file = fopen(path, "rb");
    size_t count;
    enum status status;

    assert_non_null(file);
    count = fread(bytes, 1, sizeof bytes, file);
    fclose(file);
    assert_int_equal(document_parse(bytes, count, &document, &findings), STATUS_OK);
    for (size_t i = 0; changes != NULL && changes[i].path != NULL; i++)
        if (document_set(document, changes[i].path, changes[i].value, &findings) != STATUS_OK)
            fail_msg("%s = %s refused", changes[i].path, changes[i].value);
    job_init(&job);
    document_job(document, &job, &findings);
    status = plan_make(&job, NULL, NULL, plan);
    job_free(&job);
    document_free(document);
    finding_free(&findings);
    return status;
}

#define E1 "share/examples/e1-service-yard.slab"
#define WITH(...) ((const struct change[]){__VA_ARGS__, {NULL, NULL}})

static bool says(const struct plan *plan, const char *field, const char *words)
{
    for (size_t i = 0; i < plan->findings.count; i++)
        if (strcmp(plan->findings.items[i].field, field) == 0 &&
            strstr(plan->findings.items[i].message, words) != NULL)
            return true;
    return false;
}

/* Every metre of contraction joint once; no cut before its edge is sharp; saws one line at a time.
 */
static void check_night(const struct plan *plan)
{
    double metres = 0, busy[64] = {0};

    for (size_t i = 0; i < plan->saw.cut_count; i++) {
        const struct plan_cut *cut = &plan->saw.cuts[i];
        metres += cut->length_m;
        assert_true(cut->start_h >= cut->ready_h - 1e-9);
        assert_true(cut->end_h > cut->start_h);
        assert_true(cut->saw >= 1 && cut->saw <= lround(plan->job.sawing_saws));
        if (cut->order == 1)
            memset(busy, 0, sizeof busy); /* another pour, another day */
        assert_true(cut->start_h >= busy[cut->saw] - 1e-9);
        busy[cut->saw] = cut->end_h;
        assert_true(cut->late == (cut->end_h > cut->deadline_h));
    }
    if (!(fabs(metres - plan->quantities.saw_m) < 1e-6 * (1 + metres)))
        fail_msg("the order has %.3f m, the plan %.3f m", metres, plan->quantities.saw_m);
}

static void test_every_metre(void **state)
{
    struct plan plan;

    (void)state;
    assert_int_equal(make(E1, NULL, &plan), STATUS_OK);
    check_night(&plan);
    assert_true(plan.saw.cut_count >= 13);
    assert_true(plan.saw.set_h < plan.saw.earliest_h - plan.saw.start_h);
    /* the slab's set temperature is its zero stress */
    assert_true(fabs(plan.temperature.crack_zero_c - plan.saw.set_c) < 1e-12);
    plan_free(&plan);
    assert_int_equal(
        make(E1, WITH({"sawing.saws", "3"}, {"pours.width", "6 m"}, {"pours.direction", "90 deg"}),
             &plan),
        STATUS_OK);
    assert_true(plan.pour_count > 1);
    check_night(&plan);
    plan_free(&plan);
    assert_int_equal(make(E1, WITH({"sawing.pace", "10 m/h"}), &plan), STATUS_OK);
    check_night(&plan);
    assert_true(plan.saw.late_m > 0); /* 300 m at 10 m/h take 30 hours */
    assert_true(plan.saw.saws_enough > 1);
    plan_free(&plan);
}

/* Trial cuts move the window: where it was clean, it has begun; where it ravelled, it has not. */
static void test_trials(void **state)
{
    struct plan plan, moved;

    (void)state;
    assert_int_equal(make(E1, NULL, &plan), STATUS_OK);
    assert_true(fabs(plan.saw.speed - 1) < 1e-12);
    assert_int_equal(make(E1, WITH({"sawing.trials", "11:30 ravels, 12:00 clean"}), &moved),
                     STATUS_OK);
    assert_true(fabs(moved.saw.earliest_h - 12) < 1e-9);
    assert_true(moved.saw.latest_h < plan.saw.latest_h);
    plan_free(&moved);
    assert_int_equal(make(E1, WITH({"sawing.trials", "14:00 ravels"}), &moved), STATUS_OK);
    assert_true(fabs(moved.saw.earliest_h - (14 + 1.0 / 3)) < 1e-9);
    assert_true(moved.saw.latest_h > plan.saw.latest_h);
    plan_free(&moved);
    assert_int_equal(make(E1, WITH({"sawing.trials", "12:00 ravels, 15:00 clean"}), &moved),
                     STATUS_OK);
    assert_true(fabs(moved.saw.earliest_h - plan.saw.earliest_h) < 1e-9); /* agrees already */
    plan_free(&moved);
    assert_int_equal(make(E1, WITH({"sawing.trials", "15:00 ravels, 14:00 clean"}), &moved),
                     STATUS_OK);
    assert_true(says(&moved, "sawing.trials", "came after a clean one"));
    plan_free(&moved);
    plan_free(&plan);
}

static void test_trial_words(void **state)
{
    static const char *const wrong[] = {"14:50",       "14:50 maybe",   "25:00 clean",
                                        "14:60 clean", "14:50 ravels;", "clean 14:50",
                                        "1450 clean",  "14:5 clean"};
    struct trials trials;

    (void)state;
    assert_true(trials_parse("", &trials, NULL));
    assert_int_equal(trials.count, 0);
    assert_true(trials_parse(" 6:05 ravels ,  14:50 clean ", &trials, NULL));
    assert_int_equal(trials.count, 2);
    assert_int_equal(trials.items[0].minutes, 365);
    assert_false(trials.items[0].clean);
    assert_int_equal(trials.items[1].minutes, 890);
    assert_true(trials.items[1].clean);
    for (size_t i = 0; i < sizeof wrong / sizeof *wrong; i++)
        if (trials_parse(wrong[i], &trials, NULL))
            fail_msg("'%s' was taken", wrong[i]);
}

/* The spread holds the guess, and no scatter is no spread. */
static void test_band(void **state)
{
    struct plan plan;
    struct saw_band band, again;

    (void)state;
    assert_int_equal(make(E1, NULL, &plan), STATUS_OK);
    assert_int_equal(saw_band_make(&plan, NULL, &band), STATUS_OK);
    assert_true(band.earliest_from_h < plan.saw.earliest_h - 0.1);
    assert_true(band.earliest_to_h > plan.saw.earliest_h + 0.1);
    assert_true(band.latest_from_h < plan.saw.latest_h + 0.5);
    assert_true(band.latest_to_h > plan.saw.latest_h);
    assert_int_equal(saw_band_make(&plan, NULL, &again), STATUS_OK);
    assert_memory_equal(&band, &again, sizeof band);
    plan_free(&plan);
    assert_int_equal(
        make(E1, WITH({"sawing.scatter-temperature", "0 K"}, {"sawing.scatter-strength", "0"}),
             &plan),
        STATUS_OK);
    assert_int_equal(saw_band_make(&plan, NULL, &band), STATUS_OK);
    assert_true(fabs(band.earliest_from_h - plan.saw.earliest_h) < 1e-9);
    assert_true(fabs(band.earliest_to_h - plan.saw.earliest_h) < 1e-9);
    plan_free(&plan);
}

static bool stop_at_once(void *context, double share)
{
    (void)context;
    (void)share;
    return false;
}

static void test_band_stops(void **state)
{
    struct plan plan;
    struct saw_band band;
    const struct plan_progress progress = {stop_at_once, NULL};

    (void)state;
    assert_int_equal(make(E1, NULL, &plan), STATUS_OK);
    assert_int_equal(saw_band_make(&plan, &progress, &band), STATUS_STOPPED);
    plan_free(&plan);
    assert_int_equal(make(E1, WITH({"pour.start", ""}), &plan), STATUS_OK);
    assert_int_equal(saw_band_make(&plan, NULL, &band), STATUS_REFUSED);
    assert_int_equal(plan.saw.cut_count, 0);
    plan_free(&plan);
}

/* Warmer concrete or weather never opens the window later; a rougher base never closes it later. */
static void test_properties(void **state)
{
    static const char *const warmer[] = {"5 degC",  "10 degC", "15 degC",
                                         "20 degC", "25 degC", "30 degC"};
    static const char *const rougher[] = {"0.5", "1", "2", "4", "8"};
    double earliest = INFINITY, latest = INFINITY;

    (void)state;
    for (size_t i = 0; i < sizeof warmer / sizeof *warmer; i++) {
        struct plan plan;
        assert_int_equal(make(E1, WITH({"pour.placing-temperature", warmer[i]}), &plan), STATUS_OK);
        assert_true(plan.saw.earliest_h <= earliest + 1e-9);
        earliest = plan.saw.earliest_h;
        plan_free(&plan);
    }
    for (size_t i = 0; i < sizeof rougher / sizeof *rougher; i++) {
        struct plan plan;
        assert_int_equal(make(E1,
                              WITH({"base.friction-low", "0.4"}, {"base.friction", "0.45"},
                                   {"base.friction-high", rougher[i]}),
                              &plan),
                         STATUS_OK);
        assert_true(plan.saw.latest_h <= latest + 1e-9);
        latest = plan.saw.latest_h;
        plan_free(&plan);
    }
}

static void test_wrong_input(void **state)
{
    struct plan plan;

    (void)state;
    assert_int_equal(make(E1, WITH({"pour.placing-temperature", "-10 degC"}), &plan), STATUS_OK);
    assert_true(says(&plan, "pour.placing-temperature", "must not freeze"));
    plan_free(&plan);
    assert_int_equal(make(E1, WITH({"pour.placing-temperature", "50 degC"}), &plan), STATUS_OK);
    assert_true(says(&plan, "pour.placing-temperature", "hotter than the specification"));
    plan_free(&plan);
    assert_int_equal(make(E1, WITH({"pour.rate", "1 m3/h"}), &plan), STATUS_OK);
    assert_true(says(&plan, "pour.rate", "more than 30")); /* 144 m3 take 144 hours */
    assert_int_equal(plan.saw.cut_count, 0);
    plan_free(&plan);
    assert_int_equal(make(E1, WITH({"sawing.trials", "soon"}), &plan), STATUS_REFUSED);
    assert_true(says(&plan, "sawing.trials", "'soon'"));
    plan_free(&plan);
    assert_int_equal(
        make(E1, WITH({"pour.air-low", "20 degC"}, {"pour.air-high", "10 degC"}), &plan),
        STATUS_REFUSED);
    assert_true(says(&plan, "pour.air-low", "exchange"));
    plan_free(&plan);
    /* never sets within three days: no clock times, no crash */
    assert_int_equal(make(E1,
                          WITH({"pour.air-low", "-30 degC"}, {"pour.air-high", "-25 degC"},
                               {"pour.placing-temperature", "0 degC"}),
                          &plan),
                     STATUS_OK);
    assert_true(isnan(plan.saw.earliest_h) || isfinite(plan.saw.earliest_h));
    plan_free(&plan);
    /* polar day and night: no sunset, said by leaving it out */
    assert_int_equal(make(E1,
                          WITH({"place.latitude", "78 deg"}, {"pour.date", "2027-06-21"},
                               {"sealing.date", "2027-08-20"}, {"sawing.sunset", ""}),
                          &plan),
                     STATUS_OK);
    assert_true(isnan(plan.saw.sunset_h));
    plan_free(&plan);
}

/* Where the plant may stop: volumes add up, the joint is a planned one across the way. */
static void test_stops(void **state)
{
    struct plan plan;

    (void)state;
    assert_int_equal(make(E1, NULL, &plan), STATUS_OK);
    assert_int_equal(plan.pours[0].trucks, 24); /* 144 m3, 6 m3 each */
    assert_int_equal(plan.saw.stop_count, 23);
    for (size_t i = 0; i < plan.saw.stop_count; i++) {
        const struct plan_stop *stop = &plan.saw.stops[i];
        assert_true(fabs(stop->volume_m3 - 6.0 * (double)(i + 1)) < 1e-9);
        /* 24 m wide up to 24 m, 12 m wide behind it: 4.8 m3 and 2.4 m3 a metre */
        const double front =
            stop->volume_m3 <= 115.2 ? stop->volume_m3 / 4.8 : 24 + (stop->volume_m3 - 115.2) / 2.4;
        assert_true(fabs(stop->front_m - front) < 1e-9);
        assert_true(fabs(fmod(stop->joint_m + 1e-9, 4)) < 1e-6); /* every 4 m */
        assert_true(fabs(stop->joint_m - front) <= 4 + 1e-9);
    }
    plan_free(&plan);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(test_every_metre), cmocka_unit_test(test_trials),
        cmocka_unit_test(test_trial_words), cmocka_unit_test(test_band),
        cmocka_unit_test(test_band_stops),  cmocka_unit_test(test_properties),
        cmocka_unit_test(test_wrong_input), cmocka_unit_test(test_stops),
    };

    return cmocka_run_group_tests(tests, NULL, NULL);
}
