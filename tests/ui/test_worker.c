/* The worker: the same plan as without it, newer jobs replace older ones, stopping and ending at
 * any moment. */
#include <setjmp.h>
#include <stdarg.h>
#include <stddef.h>
#include <stdint.h>

#include <cmocka.h>

#include "job/document.h"
#include "ui/worker.h"
#include <poll.h>
#include <stdio.h>
#include <string.h>

enum { PATIENCE_MS = 60000 };

/* A yard of so many metres each way. */
static void make_job(double side_m, struct job *job)
{
    struct document *document;
    struct finding_list findings = {0};
    char text[256];

    snprintf(text, sizeof text,
             "format = 1\n[outline]\npoint = 0, 0 m\npoint = %g, 0 m\npoint = %g, %g m\npoint = 0, "
             "%g m\n",
             side_m, side_m, side_m, side_m);
    assert_int_equal(document_parse(text, strlen(text), &document, &findings), STATUS_OK);
    job_init(job);
    assert_int_equal(document_job(document, job, &findings), STATUS_OK);
    document_free(document);
    finding_free(&findings);
}

static void test_same_plan(void **state)
{
    struct worker *worker = worker_make();
    struct plan direct, made;
    struct job job;
    enum status status = STATUS_REFUSED;

    (void)state;
    assert_non_null(worker);
    make_job(18, &job);
    assert_int_equal(plan_make(&job, NULL, NULL, &direct), STATUS_OK);
    assert_true(worker_begin(worker, &job, PATIENCE_MS, &status));
    assert_true(worker_take(worker, &made, &status));
    assert_int_equal(status, STATUS_OK);
    assert_false(worker_take(worker, &made, &status)); /* once */
    assert_int_equal(made.layout.panel_count, direct.layout.panel_count);
    assert_true(made.movement.open_m >= direct.movement.open_m &&
                made.movement.open_m <= direct.movement.open_m);
    plan_free(&direct);
    plan_free(&made);
    job_free(&job);
    worker_free(worker);
}

/* Asked for a large slab, then at once for a small one: only the small one comes. */
static void test_newer_replaces(void **state)
{
    struct worker *worker = worker_make();
    struct plan made;
    struct job large, small;
    enum status status;

    (void)state;
    make_job(400, &large);
    make_job(7, &small);
    for (int i = 0; i < 20; i++) {
        worker_begin(worker, &large, 0, &status);
        assert_int_equal(status, STATUS_OK);
        assert_true(worker_begin(worker, &small, PATIENCE_MS, &status));
        assert_true(worker_take(worker, &made, &status));
        assert_int_equal(made.layout.panel_count, 4);
        plan_free(&made);
    }
    job_free(&large);
    job_free(&small);
    worker_free(worker);
}

static void test_comes_later(void **state)
{
    struct worker *worker = worker_make();
    struct pollfd ready = {.fd = worker_descriptor(worker), .events = POLLIN};
    struct plan made;
    struct job job;
    enum status status;

    (void)state;
    make_job(300, &job);
    if (!worker_begin(worker, &job, 0, &status))
        assert_int_equal(poll(&ready, 1, PATIENCE_MS), 1);
    assert_true(worker_take(worker, &made, &status));
    assert_int_equal(status, STATUS_OK);
    assert_int_equal(poll(&ready, 1, 0), 0); /* taken: not readable any more */
    plan_free(&made);
    job_free(&job);
    worker_free(worker);
}

static void test_stop_and_end(void **state)
{
    struct plan made;
    struct job job;
    enum status status;

    (void)state;
    make_job(300, &job);
    for (int i = 0; i < 20; i++) {
        struct worker *worker = worker_make();
        worker_begin(worker, &job, i % 3, &status);
        if (i % 2 == 0) {
            worker_stop(worker);
            assert_false(worker_take(worker, &made, &status));
        }
        worker_free(worker); /* at whatever moment */
    }
    worker_free(NULL);
    job_free(&job);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(test_same_plan),
        cmocka_unit_test(test_newer_replaces),
        cmocka_unit_test(test_comes_later),
        cmocka_unit_test(test_stop_and_end),
    };

    return cmocka_run_group_tests(tests, NULL, NULL);
}
