#include "plan/saw_band.h"
#include "plan/plan_early.h"
#include "plan/plan_steps.h"
#include <math.h>
#include <stdlib.h>

/* Points that fill a cube evenly: x_k = frac(1/2 + n/g^k), g the real root of g^4 = g + 1. Roberts,
 * The unreasonable effectiveness of quasirandom sequences (2018). From -1 to 1. */
static double spread(int run, int dimension)
{
    const double g = 1.22074408460575947536;
    double whole;

    return 2 * modf(0.5 + (run + 1) / pow(g, dimension), &whole) - 1;
}

static int compare(const void *a, const void *b)
{
    const double x = *(const double *)a, y = *(const double *)b;

    return x < y ? -1 : x > y;
}

struct work {
    struct plan_early early;
    struct early_curves curves;
    struct early_weather weather;
    struct early_history history;
    double earliest[SAW_BAND_RUNS], latest[SAW_BAND_RUNS];
};

static void run(const struct plan *plan, const struct early_strip *strip, int index,
                struct work *work)
{
    const struct job *job = &plan->job;
    const struct early_mix *mix = &work->early.mix;
    const struct early_scatter scatter = {
        .warmer_k = job->sawing_scatter_temperature * spread(index, 1),
        .heat = 1 + job->sawing_scatter_strength * spread(index, 2),
        .strength = 1 + job->sawing_scatter_strength * spread(index, 3)};

    early_run(&work->early.column, mix, &work->curves, &work->weather, &scatter, &work->history);
    work->earliest[index] = early_earliest(mix, &work->history, job->sawing_ravel_strength);
    work->latest[index] =
        early_latest(mix, job->slab_thickness, strip, &work->history, job->sawing_stress_share);
}

static void read_off(const struct plan *plan, struct work *work, struct saw_band *band)
{
    enum { LOW = SAW_BAND_RUNS / 20, HIGH = SAW_BAND_RUNS - 1 - LOW };
    const double start = plan->saw.start_h, speed = plan->saw.speed;

    qsort(work->earliest, SAW_BAND_RUNS, sizeof *work->earliest, compare);
    qsort(work->latest, SAW_BAND_RUNS, sizeof *work->latest, compare);
    *band =
        (struct saw_band){start + speed * work->earliest[LOW], start + speed * work->earliest[HIGH],
                          start + speed * work->latest[LOW], start + speed * work->latest[HIGH]};
}

enum status saw_band_make(const struct plan *plan, const struct plan_progress *progress,
                          struct saw_band *band)
{
    struct work *work;
    struct early_strip strip;
    enum status status;

    if (plan->saw.histories == NULL || isnan(plan->saw.earliest_h))
        return STATUS_REFUSED;
    work = malloc(sizeof *work);
    if (work == NULL)
        return STATUS_NO_MEMORY;
    strip = plan_early_strip(plan, plan->saw.strip_m);
    status = plan_early_make(plan, &work->early);
    if (status == STATUS_OK) {
        early_curves_make(&work->early.mix, &work->curves);
        plan_early_weather(&work->early, plan->saw.start_h, &work->weather);
    }
    for (int i = 0; status == STATUS_OK && i < SAW_BAND_RUNS; i++) {
        if (i % 8 == 0 && progress != NULL && progress->go_on != NULL &&
            !progress->go_on(progress->context, (double)i / SAW_BAND_RUNS))
            status = STATUS_STOPPED;
        else
            run(plan, &strip, i, work);
    }
    if (status == STATUS_OK)
        read_off(plan, work, band);
    free(work);
    return status;
}
