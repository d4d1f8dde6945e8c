/* A layout made with what earlier ones remember is the same, bit by bit, as one made without: all
 * invented slabs, and yards in which one column after another is moved. */
#include "core/crowded_yard.h"
#include "layout_file.h"
#include <dirent.h>
#include <setjmp.h>
#include <stdarg.h>
#include <stddef.h>
#include <stdint.h>
#include <string.h>
/* cmocka.h needs the headers above */
#include <cmocka.h>

static void same_reasons(const struct layout_reason *a, const struct layout_reason *b, size_t n)
{
    for (size_t i = 0; i < n; i++) {
        assert_string_equal(a[i].code, b[i].code);
        assert_string_equal(a[i].cause, b[i].cause);
        assert_memory_equal(&a[i].value, &b[i].value, sizeof a[i].value);
    }
}

static void same_layout(const struct layout *a, const struct layout *b)
{
    assert_int_equal(a->panel_count, b->panel_count);
    assert_int_equal(a->joint_count, b->joint_count);
    assert_int_equal(a->box_count, b->box_count);
    assert_int_equal(a->reason_count, b->reason_count);
    assert_int_equal(a->violations, b->violations);
    assert_int_equal(a->evaluations, b->evaluations);
    assert_memory_equal(&a->area, &b->area, sizeof a->area);
    for (size_t i = 0; i < a->joint_count; i++) {
        assert_string_equal(a->joints[i].id, b->joints[i].id);
        assert_int_equal(a->joints[i].kind, b->joints[i].kind);
        assert_memory_equal(&a->joints[i].x1, &b->joints[i].x1, 4 * sizeof(double));
        assert_int_equal(a->joints[i].left_panel, b->joints[i].left_panel);
        assert_int_equal(a->joints[i].right_panel, b->joints[i].right_panel);
    }
    for (size_t i = 0; i < a->panel_count; i++) {
        const struct layout_panel *p = &a->panels[i], *q = &b->panels[i];
        assert_int_equal(p->count, q->count);
        assert_memory_equal(p->ring, q->ring, p->count * sizeof *p->ring);
        assert_int_equal(p->reason_count, q->reason_count);
        same_reasons(p->reasons, q->reasons, p->reason_count);
    }
    same_reasons(a->reasons, b->reasons, a->reason_count);
}

/* Without, with, and with once more: then all is remembered. */
static void check(struct layout_input *in, struct layout_cache *cache)
{
    struct layout plain = {0};
    in->cache = NULL;
    assert_int_equal(layout_solve(in, &plain), STATUS_OK);
    in->cache = cache;
    for (int i = 0; i < 2; i++) {
        struct layout l = {0};
        const size_t misses = cache->misses;
        assert_int_equal(layout_solve(in, &l), STATUS_OK);
        same_layout(&plain, &l);
        layout_free(&l);
        assert_true(i == 0 || cache->misses == misses);
    }
    layout_free(&plain);
}

static void every_file(void **state)
{
    (void)state;
    struct layout_cache cache = {0};
    DIR *dir = opendir("tests/layouts");
    size_t seen = 0;
    assert_non_null(dir);
    for (struct dirent *e = readdir(dir); e; e = readdir(dir)) {
        char path[128];
        if (!strstr(e->d_name, ".txt") || strstr(e->d_name, "thousand"))
            continue;
        snprintf(path, sizeof path, "tests/layouts/%.80s", e->d_name);
        struct layout_file *f = layout_file_read(path);
        assert_non_null(f);
        check(&f->input, &cache);
        free(f);
        seen++;
    }
    closedir(dir);
    assert_true(seen >= 40 && cache.hits > seen);
    layout_cache_free(&cache);
    layout_cache_free(&cache);
}

static void one_column_after_another(void **state)
{
    (void)state;
    for (enum yard_order order = YARD_GRID; order <= YARD_ANYWHERE; order++) {
        struct yard *y = yard_make(150, 130, 30, order == YARD_GRID ? 0 : 2, order, 5);
        struct layout_cache cache = {0};
        assert_non_null(y);
        for (size_t i = 0; i < 8; i++) {
            y->columns[3 * i].x += i % 2 ? 0.13 : -0.4;
            y->columns[3 * i].y += 0.07 * (double)i;
            check(&y->input, &cache);
        }
        assert_true(order == YARD_GRID ? cache.hits > 0 : cache.hits > cache.misses);
        layout_cache_free(&cache);
        free(y);
    }
}

/* So many slabs that the oldest zones are forgotten, and every tenth comes again. */
static void forgets_and_still_agrees(void **state)
{
    (void)state;
    struct layout_cache cache = {0};
    for (int i = 0; i < 5000; i++) {
        const double w = 9 + 0.01 * (i % 10 ? i : i % 100);
        const struct layout_corner corner[] = {
            {.x = 0, .y = 0}, {.x = w, .y = 0}, {.x = w, .y = 7}, {.x = 0, .y = 7}};
        struct layout_input in = {.outline = {corner, 4},
                                  .max_side_x = 4.5,
                                  .max_side_y = 4.5,
                                  .max_aspect = 1.5,
                                  .min_side = 0.6,
                                  .min_angle_deg = 60,
                                  .effort = 1,
                                  .cache = &cache};
        struct layout l = {0};
        assert_int_equal(layout_solve(&in, &l), STATUS_OK);
        layout_free(&l);
        if (i % 100 == 0)
            check(&in, &cache);
    }
    assert_true(cache.count <= 4096);
    layout_cache_free(&cache);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(every_file),
        cmocka_unit_test(one_column_after_another),
        cmocka_unit_test(forgets_and_still_agrees),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
