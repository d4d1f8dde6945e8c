/* Large slabs: the layout alone and the whole chain, beside GEOS polygonising the same joints. */
#ifndef SLABGAP_TESTS_BENCH_LAYOUT_H
#define SLABGAP_TESTS_BENCH_LAYOUT_H

#include "bench/bench_help.h"
#include "core/crowded_yard.h"
#include "job/document.h"
#include "plan/plan.h"
#include <string.h>
#include <sys/resource.h>
#include <sys/wait.h>
#include <unistd.h>

enum { LARGE_RUNS = 5 };
static const char *const order_words[] = {"in a grid", "near a grid", "anywhere"};

/* A yard as a job file. */
static char *yard_job(const struct yard *y)
{
    const size_t room = 4096 + 128 * (YARD_COLUMNS + YARD_OPENINGS);
    char *text = malloc(room);
    const struct layout_corner far = y->outline[2];
    size_t used = (size_t)snprintf(
        text, room,
        "format = 1\n[slab]\nthickness = 200 mm\n[rules]\nspacing = 4.5 m\n[outline]\n"
        "point = 0, 0 m\npoint = %g, 0 m\npoint = %g, %g m\npoint = 0, %g m\n",
        far.x, far.x, far.y, far.y);
    for (size_t i = 0; i < y->input.opening_count; i++) {
        const struct layout_corner *c = y->corners[i];
        used += (size_t)snprintf(text + used, room - used, "[opening P%zu]\n", i + 1);
        for (size_t k = 0; k < 4; k++)
            used += (size_t)snprintf(text + used, room - used, "point = %.6g, %.6g m\n", c[k].x,
                                     c[k].y);
    }
    for (size_t i = 0; i < y->input.object_count; i++)
        used +=
            (size_t)snprintf(text + used, room - used,
                             "[object %s]\nkind = column\nat = %.8g, %.8g m\nsize = 0.4 x 0.4 m\n",
                             y->ids[i], y->columns[i].x, y->columns[i].y);
    return text;
}

static void read_text(const char *text, struct job *job)
{
    struct document *document = NULL;
    struct finding_list findings = {0};

    job_init(job);
    document_parse(text, strlen(text), &document, &findings);
    document_job(document, job, &findings);
    document_free(document);
    finding_free(&findings);
}

static double chain_ms(const struct yard *y, struct plan_cache *cache)
{
    char *text = yard_job(y);
    struct job job;
    struct plan plan;

    read_text(text, &job);
    free(text);
    const double begin = now_ms();
    plan_make(&job, cache, NULL, &plan);
    const double end = now_ms();
    plan_free(&plan);
    job_free(&job);
    return end - begin;
}

/* The layout of a yard as it comes; how long one takes (median), for the growth. */
static double bench_yard(double w, double h, int columns, int openings, enum yard_order order,
                         double *panels)
{
    GEOSContextHandle_t geos = GEOS_init_r();
    double own[LARGE_RUNS], chain[LARGE_RUNS], reference[LARGE_RUNS], most = 0;
    int polygons = 0, broken = 0;
    char what[64];

    *panels = 0;
    for (int i = 0; i < LARGE_RUNS; i++) {
        struct yard *y = yard_make(w, h, columns, openings, order, (uint64_t)i + 1);
        struct layout l = {0};
        const double begin = now_ms();
        layout_solve(&y->input, &l);
        own[i] = now_ms() - begin;
        most = own[i] > most ? own[i] : most;
        chain[i] = chain_ms(y, NULL);
        reference[i] = polygonise_ms(geos, &l, &polygons);
        *panels += (double)l.panel_count / LARGE_RUNS;
        broken += l.violations;
        layout_free(&l);
        free(y);
    }
    const double ms = median(own, LARGE_RUNS), geos_ms = median(reference, LARGE_RUNS);
    snprintf(what, sizeof what, "%.0f panels, %d objects %s", *panels, columns + openings,
             order_words[order]);
    row(what, ms, "GEOS polygonise", geos_ms);
    printf("    slowest of %d %.1f ms, whole chain %.1f ms, rules broken in all %d\n", LARGE_RUNS,
           most, median(chain, LARGE_RUNS), broken);
    GEOS_finish_r(geos);
    return ms;
}

/* One column moved on a yard of 1 000 panels, with what the layout before remembers. */
static void bench_edit(enum yard_order order)
{
    enum { EDITS = 9 };
    GEOSContextHandle_t geos = GEOS_init_r();
    struct yard *y = yard_make(150, 130, 30, 2, order, 1);
    struct layout_cache cache = {0};
    struct plan_cache plans = {0};
    double own[EDITS], plain[EDITS], chain[EDITS], reference[EDITS], most = 0;
    int polygons = 0;
    char what[64];

    chain_ms(y, &plans);
    for (int i = -1; i < EDITS; i++) {
        struct layout l = {0};
        if (i >= 0)
            y->columns[3 * i].x += i % 2 ? 0.13 : -0.37;
        y->input.cache = &cache;
        double begin = now_ms();
        layout_solve(&y->input, &l);
        double end = now_ms();
        if (i >= 0) {
            own[i] = end - begin;
            most = own[i] > most ? own[i] : most;
            chain[i] = chain_ms(y, &plans);
            reference[i] = polygonise_ms(geos, &l, &polygons);
        }
        layout_free(&l);
        y->input.cache = NULL;
        begin = now_ms();
        layout_solve(&y->input, &l);
        if (i >= 0)
            plain[i] = now_ms() - begin;
        layout_free(&l);
    }
    snprintf(what, sizeof what, "one object moved of 32, %s", order_words[order]);
    row(what, median(own, EDITS), "GEOS polygonise", median(reference, EDITS));
    printf("    slowest of %d %.1f ms, without the cache %.1f ms, whole chain %.1f ms\n", EDITS,
           most, median(plain, EDITS), median(chain, EDITS));
    layout_cache_free(&cache);
    plan_cache_free(&plans);
    free(y);
    GEOS_finish_r(geos);
}

/* Memory of the largest one alone, in a process of its own. */
static void bench_memory(void)
{
    struct rusage usage = {0};
    const pid_t pid = fork();
    if (pid == 0) {
        struct yard *y = yard_make(1050, 900, 900, 20, YARD_ANYWHERE, 1);
        struct layout l = {0};
        layout_solve(&y->input, &l);
        layout_free(&l);
        free(y);
        _exit(0);
    }
    if (pid > 0 && wait4(pid, NULL, 0, &usage) == pid)
        printf("    a process that lays out 1050 x 900 m with 920 objects: %.1f MB\n",
               (double)usage.ru_maxrss / 1024);
}

static void bench_layouts(void)
{
    bench_memory(); /* first: a child shares what its parent has used */
    for (enum yard_order order = YARD_GRID; order <= YARD_ANYWHERE; order++) {
        double few = 0, many = 0, panels = 0;
        const double small = bench_yard(150, 130, 30, 0, order, &few);
        bench_yard(150, 130, 28, 2, order, &panels);
        bench_yard(480, 400, 100, 5, order, &panels);
        const double large = bench_yard(1050, 900, 900, 20, order, &many);
        printf("    from %.0f to %.0f panels (%.0f times): %.0f times the time\n", few, many,
               many / few, large / small);
        bench_edit(order);
    }
}

#endif
