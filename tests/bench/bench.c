/* How fast: medians of several runs, beside a general-purpose reference in the same run. Prints,
 * never judges: these machines are noisy. Run from the root of the project.
 *   first screen   program start to the last byte of the first full screen, in a pty, against
 *                  starting /bin/true
 *   keystroke      the whole chain (plan_make) on an example, against GEOS polygonising the same
 *                  joints and edges (only to name the panels, no rule, no movement)
 *   large slabs    the layout on slabs of 1 000 to 50 000 panels, with columns on and off common
 *                  lines, and one object moved, against GEOS polygonising the same joints */
#include "bench/bench_help.h"
#include "bench/bench_layout.h"
#include "job/document.h"
#include "plan/plan.h"
#include <pty.h>
#include <signal.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>
#include <sys/resource.h>
#include <sys/wait.h>
#include <unistd.h>

enum { RUNS = 9 };

/* ---- start to first screen ---- */

/* Starts a program in a pty of 80x24 and reads until `last` has come (NULL: until it ends). */
static double start_ms(const char *path, const char *argument, const char *last)
{
    struct winsize size = {.ws_row = 24, .ws_col = 80};
    char bytes[65536];
    size_t count = 0;
    double begin = now_ms(), end;
    int master;
    pid_t pid = forkpty(&master, NULL, NULL, &size);

    if (pid == 0) {
        setenv("TERM", "xterm", 1);
        setenv("LC_ALL", "C.UTF-8", 1);
        execl(path, path, argument, (char *)NULL);
        _exit(127);
    }
    for (;;) {
        ssize_t got = read(master, bytes + count, sizeof bytes - count - 1);
        if (got <= 0)
            break;
        count += (size_t)got;
        bytes[count] = '\0';
        if (last != NULL && strstr(bytes, last) != NULL)
            break;
    }
    end = now_ms();
    kill(pid, SIGHUP);
    close(master);
    waitpid(pid, NULL, 0);
    return end - begin;
}

static void bench_start(void)
{
    double ours[RUNS], reference[RUNS];

    for (int i = 0; i < RUNS; i++) {
        ours[i] = start_ms(SLABGAP_BINARY, "share/examples/e1-service-yard.slab", "Esc");
        reference[i] = start_ms("/bin/true", NULL, NULL);
    }
    row("start to first screen, E1", median(ours, RUNS), "start of /bin/true",
        median(reference, RUNS));
}

/* ---- one keystroke ---- */

static bool load(const char *path, struct job *job)
{
    struct finding_list findings = {0};
    struct document *document = NULL;
    static char bytes[1 << 20];
    FILE *file = fopen(path, "rb");
    size_t count;

    if (file == NULL)
        return false;
    count = fread(bytes, 1, sizeof bytes, file);
    fclose(file);
    job_init(job);
    document_parse(bytes, count, &document, &findings);
    document_job(document, job, &findings);
    document_free(document);
    finding_free(&findings);
    return true;
}

static void bench_keystroke(const char *name, const char *path)
{
    GEOSContextHandle_t geos = GEOS_init_r();
    double chain[RUNS], reference[RUNS];
    struct job job;
    struct plan_cache cache = {0}; /* as the form keeps it */
    int panels = 0;
    char what[64];

    if (!load(path, &job))
        return;
    for (int i = 0; i < RUNS; i++) {
        enum { REPEATS = 10 };
        double begin = now_ms();
        struct plan plan;
        for (int k = 0; k < REPEATS; k++) {
            plan_make(&job, &cache, NULL, &plan);
            if (k + 1 < REPEATS)
                plan_free(&plan);
        }
        chain[i] = (now_ms() - begin) / REPEATS;
        reference[i] = polygonise_ms(geos, &plan.layout, &panels);
        plan_free(&plan);
    }
    plan_cache_free(&cache);
    snprintf(what, sizeof what, "one keystroke, %s (whole chain)", name);
    row(what, median(chain, RUNS), "GEOS polygonise", median(reference, RUNS));
    job_free(&job);
    GEOS_finish_r(geos);
}

/* ---- the slab's year ---- */

/* The simulated year with its warm-up, against a general tridiagonal solver doing the same number
 * of solves of the same size (LAPACK is not wanted for one figure: the reference factors anew each
 * time, as a library call does). */
static double general_solves_ms(int nodes, long solves)
{
    double lower[64], diagonal[64], upper[64], x[64], sum = 0, begin = now_ms();

    for (long s = 0; s < solves; s++) {
        for (int i = 0; i < nodes; i++) {
            lower[i] = upper[i] = -1 - 1e-9 * (double)s;
            diagonal[i] = 3;
            x[i] = 1;
        }
        for (int i = 1; i < nodes; i++) {
            double m = lower[i] / diagonal[i - 1];
            diagonal[i] -= m * upper[i - 1];
            x[i] -= m * x[i - 1];
        }
        x[nodes - 1] /= diagonal[nodes - 1];
        for (int i = nodes - 2; i >= 0; i--)
            x[i] = (x[i] - upper[i] * x[i + 1]) / diagonal[i];
        sum += x[0];
    }
    return sum > 0 ? now_ms() - begin : 0;
}

static void bench_year(void)
{
    struct climate_range range = {-12, 33, 8, 12, 2, 0.5, 0.7, 52, 1};
    struct climate_hour *hours = malloc(CLIMATE_HOURS * sizeof *hours);
    struct conduction_year *year = malloc(sizeof *year);
    struct conduction_slab slab;
    struct conduction_column column;
    double ours[RUNS], reference[RUNS];

    conduction_slab_default(0.2, &slab);
    conduction_column_make(&slab, 8, 3600, &column);
    for (int i = 0; i < RUNS; i++) {
        double begin = now_ms();
        climate_make(&range, hours);
        conduction_year_make(&slab, hours, year);
        ours[i] = now_ms() - begin;
        reference[i] = general_solves_ms(column.count, 4L * CLIMATE_HOURS);
    }
    row("the slab's year, warm-up and all", median(ours, RUNS), "solves of one year",
        median(reference, RUNS));
    free(hours);
    free(year);
}

int main(void)
{
    struct rusage usage;

    bench_start();
    bench_keystroke("E1", "share/examples/e1-service-yard.slab");
    bench_keystroke("E2", "share/examples/e2-store-floor.slab");
    bench_keystroke("E3", "share/examples/e3-two-lane-road.slab");
    bench_year();
    bench_layouts();
    getrusage(RUSAGE_SELF, &usage);
    printf("%-38s %9.1f MB\n", "largest memory of this run, with GEOS",
           (double)usage.ru_maxrss / 1024);
    return 0;
}
