#include "plan/saw_law.h"
#include "job/trial.h"
#include <math.h>
#include <stdlib.h>

/* Strips whose latest moment is worked out, each a quarter longer than the last: any strip takes
 * that of the next longer one. */
static double strip_m(int length)
{
    return 0.5 * pow(1.25, length);
}

static int strip_of(double length_m)
{
    const int length = (int)ceil(log(fmax(length_m, 0.5) / 0.5) / log(1.25) - 1e-9);

    return length < LAW_LENGTHS ? length : LAW_LENGTHS - 1;
}

static double latest_of(const struct saw_law *law, int history, int length)
{
    double *known = &law->latest[history][length];

    if (isnan(*known)) {
        const struct early_strip strip = plan_early_strip(law->plan, strip_m(length));
        *known =
            law->plan->saw.speed * early_latest(&law->early->mix, law->plan->job.slab_thickness,
                                                &strip, &law->plan->saw.histories[history],
                                                law->plan->job.sawing_stress_share);
    }
    return *known;
}

/* Between the first and the last concrete; when one of them never comes to it, as the other. */
static double blend(const struct saw_law *law, double first, double last, double placed_h)
{
    const double part = law->pour_h > 0 ? fmin(fmax(placed_h / law->pour_h, 0), 1) : 0;

    if (isfinite(first) && isfinite(last))
        return first + part * (last - first);
    return isfinite(first) ? first : last;
}

double saw_law_cracks(const void *context, double length_m, double placed_h)
{
    const struct saw_law *law = context;
    const int length = strip_of(length_m);

    return placed_h + blend(law, latest_of(law, 0, length), latest_of(law, 1, length), placed_h);
}

double saw_law_ready(const struct saw_law *law, double placed_h)
{
    return placed_h + blend(law, law->earliest[0], law->earliest[1], placed_h);
}

/* ---- trial cuts ---- */

/* Age of the first concrete at a trial; a clock time before the start is the next day's. */
static double trial_age(const struct plan *plan, const struct trial *trial)
{
    const double at = trial->minutes / 60.0;

    return (at < plan->saw.start_h ? at + 24 : at) - plan->saw.start_h;
}

/* All ages are stretched alike so that the edge is sharp at the first clean trial and not yet at
 * the last that ravelled; without a clean one it is 20 minutes behind that. */
static void take_trials(struct plan *plan, double earliest_age)
{
    struct trials trials;
    double clean = INFINITY, ravels = 0;

    if (!isfinite(earliest_age) || !trials_parse(plan->job.sawing_trials, &trials, NULL))
        return;
    for (size_t i = 0; i < trials.count; i++) {
        const double age = trial_age(plan, &trials.items[i]);
        if (trials.items[i].clean)
            clean = fmin(clean, age);
        else
            ravels = fmax(ravels, age);
    }
    if (ravels > 0 && clean <= ravels) {
        finding_add(&plan->findings, SEVERITY_WARNING, "sawing.trials", plan->job.sawing_trials, "",
                    0, 0,
                    "sawing.trials: an edge that ravels came after a clean one; look again. The "
                    "clean one counts.");
        ravels = 0;
    }
    if (clean < earliest_age)
        plan->saw.speed = fmax(clean, 0.25) / earliest_age;
    else if (ravels >= earliest_age)
        plan->saw.speed =
            (isfinite(clean) ? (ravels + clean) / 2 : ravels + 1.0 / 3) / earliest_age;
}

/* ---- the law ---- */

static enum status run_last(struct plan *plan, const struct plan_early *early)
{
    const struct early_scatter guess = {0, 1, 1};
    struct early_curves *curves = malloc(sizeof *curves);
    struct early_weather *weather = malloc(sizeof *weather);
    const bool good = curves != NULL && weather != NULL;

    if (good) {
        early_curves_make(&early->mix, curves);
        plan_early_weather(early, plan->saw.start_h + plan->saw.pour_h, weather);
        early_run(&early->column, &early->mix, curves, weather, &guess, &plan->saw.histories[1]);
    }
    free(curves);
    free(weather);
    return good ? STATUS_OK : STATUS_NO_MEMORY;
}

enum status saw_law_make(struct plan *plan, const struct plan_early *early,
                         double (*latest)[LAW_LENGTHS], struct saw_law *law)
{
    *law = (struct saw_law){
        .plan = plan, .early = early, .pour_h = plan->saw.pour_h, .latest = latest};
    for (int h = 0; h < 2; h++)
        for (int i = 0; i < LAW_LENGTHS; i++)
            latest[h][i] = NAN;
    if (run_last(plan, early) != STATUS_OK)
        return STATUS_NO_MEMORY;
    for (int h = 0; h < 2; h++)
        law->earliest[h] =
            early_earliest(&early->mix, &plan->saw.histories[h], plan->job.sawing_ravel_strength);
    take_trials(plan, law->earliest[0]);
    for (int h = 0; h < 2; h++)
        law->earliest[h] *= plan->saw.speed;
    return STATUS_OK;
}
