#include "plan/seal_now.h"
#include "core/shrinkage.h"
#include "job/table.h"
#include "plan/plan_steps.h"
#include <math.h>
#include <stdarg.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

/* A surface without a simulation may be this much hotter than the mean, K per m of thickness: half
 * of the usual day gradient of 65 K/m; from memory. */
static const double surface_k_per_m = 35;

void seal_now_input_clear(struct seal_now_input *input)
{
    *input = (struct seal_now_input){.slab_c = NAN,
                                     .surface_c = NAN,
                                     .hour = NAN,
                                     .width_m = NAN,
                                     .air_c = NAN,
                                     .humidity = NAN,
                                     .dry = -1,
                                     .clean = -1};
}

__attribute__((format(printf, 2, 3))) static void against(struct seal_now *now, const char *words,
                                                          ...)
{
    va_list arguments;

    if (now->against_count >= NOW_REASONS)
        return;
    va_start(arguments, words);
    vsnprintf(now->against[now->against_count++], sizeof now->against[0], words, arguments);
    va_end(arguments);
}

static void unknown(struct seal_now *now, const char *words)
{
    if (now->unknown_count < NOW_REASONS)
        snprintf(now->unknown[now->unknown_count++], sizeof now->unknown[0], "%s", words);
}

/* A temperature or length in the job's units. */
struct shown {
    char words[40];
};

static struct shown show(const struct plan *plan, double si, enum quantity quantity)
{
    struct shown shown;
    struct text text = {0};

    unit_show(&text, si, quantity, (enum unit_system)plan->job.job_units);
    snprintf(shown.words, sizeof shown.words, "%s", text_string(&text));
    text_free(&text);
    return shown;
}

/* ---- the slab's mean now ---- */

static int hour_of_year(const struct plan *plan, const struct seal_now_input *input)
{
    struct date date = input->date.year != 0 ? input->date : plan->job.sealing_date;

    if (date.year == 0 || isnan(input->hour))
        return -1;
    return 24 * date_day_of_year(date) + (int)fmin(fmax(floor(input->hour), 0), 23);
}

/* The simulated year for this job, or NULL. */
static struct conduction_year *simulate(const struct plan *plan)
{
    struct conduction_year *year = malloc(sizeof *year);

    if (year != NULL && plan_slab_year(plan, year) != STATUS_OK) {
        free(year);
        year = NULL;
    }
    return year;
}

/* Mean from a surface reading: less the simulated surface minus mean of that hour; else the range
 * down to the reading less 35 K per m of thickness. */
static bool set_slab(const struct plan *plan, const struct seal_now_input *input,
                     const struct conduction_year *year, struct seal_now *now)
{
    int hour = hour_of_year(plan, input);

    if (isfinite(input->slab_c)) {
        now->slab_c = now->slab_least_c = input->slab_c;
        return true;
    }
    if (isnan(input->surface_c))
        return false;
    if (year != NULL && hour >= 0) {
        now->slab_c = input->surface_c - ((double)year->top_c[hour] - (double)year->mean_c[hour]);
        now->slab_least_c = now->slab_c;
        return true;
    }
    now->slab_c = input->surface_c;
    now->slab_least_c = input->surface_c - surface_k_per_m * plan->job.slab_thickness;
    unknown(now, "slab mean (surface read; both ends judged)");
    return true;
}

/* The next hours of the simulated day, moved to what is measured now: when is it warm enough? */
static void set_turn(const struct plan *plan, const struct seal_now_input *input,
                     const struct conduction_year *year, struct seal_now *now)
{
    int hour = hour_of_year(plan, input);
    double least = plan->job.sealing_least_temperature;

    if (year == NULL || hour < 0 || now->slab_c >= least)
        return;
    for (int later = 1; later <= 16 && (hour % 24) + later < 24; later++) {
        double moved = now->slab_c + (double)year->mean_c[(hour + later) % CLIMATE_HOURS] -
                       (double)year->mean_c[hour];
        if (moved >= least) {
            now->turns_hour = (hour % 24) + later;
            return;
        }
    }
}

/* ---- drying and age ---- */

static void set_age(const struct plan *plan, const struct seal_now_input *input,
                    struct seal_now *now)
{
    const struct job *job = &plan->job;
    struct date date = input->date.year != 0 ? input->date : job->sealing_date;
    const double day_s = 86400;

    now->age_days = NAN;
    now->drying_left = plan->shrinkage.after_sealing;
    if (date.year == 0 || job->pour_date.year == 0)
        return;
    now->age_days = (double)(date_days(date) - date_days(job->pour_date));
    if (job->concrete_shrinkage_model != SHRINKAGE_TYPED && job->sealing_kind != SEALING_RESEAL &&
        now->age_days > 0) {
        struct shrinkage_slab slab;
        plan_shrinkage_slab(plan, &slab);
        now->drying_left =
            shrinkage_between((enum shrinkage_by)job->concrete_shrinkage_model, &slab,
                              now->age_days, fmax(job->concrete_horizon / day_s, now->age_days));
    }
}

/* ---- the joint ---- */

/* The joint as measured; without a width what the job's cut is at this slab temperature, with its
 * tolerance. */
static struct sealant_moment at_slab(const struct plan *plan, const struct seal_now *now,
                                     double slab_c, double width_m)
{
    struct sealant_joint joint = plan_sealant_joint(plan);

    joint.shrinkage = now->drying_left;
    if (isfinite(width_m)) {
        joint.width_m = width_m;
        joint.cut_c = slab_c;
        joint.tolerance_m = 0;
    }
    return sealant_row_at(&joint, slab_c);
}

/* Worse of both ends when the slab's mean is only known to lie between two values. */
static double demand_at(const struct plan *plan, const struct seal_now *now, double width_m)
{
    return fmax(at_slab(plan, now, now->slab_c, width_m).demand,
                at_slab(plan, now, now->slab_least_c, width_m).demand);
}

static void set_strains(const struct plan *plan, const struct seal_now_input *input,
                        struct seal_now *now)
{
    struct sealant_moment warm = at_slab(plan, now, now->slab_c, input->width_m);
    struct sealant_moment cool = at_slab(plan, now, now->slab_least_c, input->width_m);
    double widths[PLAN_BLADES_MOST];
    size_t count = plan_blades(plan, widths);
    const struct sealant_row *kind = &sealant_table[plan->job.sealant_kind];

    now->width_m = warm.gap_m;
    now->extension = fmax(warm.extension, cool.extension);
    now->compression = fmax(warm.compression, cool.compression);
    now->verdict = verdict_of(fmax(warm.demand, cool.demand), 1);
    now->needed_m = NAN;
    for (size_t i = 0; i < count && isnan(now->needed_m); i++)
        if (widths[i] >= kind->width_least - 1e-9 && widths[i] <= kind->width_most + 1e-9 &&
            demand_at(plan, now, widths[i]) <= 0.9)
            now->needed_m = widths[i];
}

/* ---- reasons ---- */

static void judge_joint(const struct plan *plan, struct seal_now *now)
{
    if (now->verdict != VERDICT_FAILS)
        return;
    if (isfinite(now->needed_m))
        against(now,
                "this joint is %s: it would stretch %.1f %% and be squeezed %.1f %%, good for %.3g "
                "%%. Saw it to %s.",
                show(plan, now->width_m, QUANTITY_SMALL_LENGTH).words, 100 * now->extension,
                100 * now->compression, 100 * plan->seal.extension_capacity,
                show(plan, now->needed_m, QUANTITY_SMALL_LENGTH).words);
    else
        against(now,
                "this joint is %s: it would stretch %.1f %% and be squeezed %.1f %%; no width of "
                "this sealant holds now.",
                show(plan, now->width_m, QUANTITY_SMALL_LENGTH).words, 100 * now->extension,
                100 * now->compression);
}

static void judge_cold(const struct plan *plan, struct seal_now *now)
{
    if (now->slab_least_c >= plan->job.sealing_least_temperature)
        return;
    against(now, "slab %s, the specification says %s and up.",
            show(plan, now->slab_least_c, QUANTITY_TEMPERATURE).words,
            show(plan, plan->job.sealing_least_temperature, QUANTITY_TEMPERATURE).words);
}

static void judge_dew(const struct plan *plan, const struct seal_now_input *input,
                      struct seal_now *now)
{
    double surface = isfinite(input->surface_c) ? input->surface_c : now->slab_least_c;

    now->dew_c = NAN;
    if (isnan(input->air_c) || isnan(input->humidity)) {
        unknown(now, "dew point (air and damp)");
        return;
    }
    now->dew_c = climate_dew_point(input->air_c, input->humidity);
    if (surface - now->dew_c < plan->job.sealing_dew_margin)
        against(now, "dew point %s, only %s below the slab (%s wanted): the faces may be wet.",
                show(plan, now->dew_c, QUANTITY_TEMPERATURE).words,
                show(plan, fmax(surface - now->dew_c, 0), QUANTITY_DIFFERENCE).words,
                show(plan, plan->job.sealing_dew_margin, QUANTITY_DIFFERENCE).words);
}

static void judge_rest(const struct plan *plan, const struct seal_now_input *input,
                       struct seal_now *now)
{
    double wait = sealant_table[plan->job.sealant_kind].cure_wait_d;

    if (input->trend == TREND_FALLING)
        against(now,
                "the slab is falling: dew comes and the joint opens on fresh sealant; wait for "
                "a rising slab.");
    else if (input->trend == TREND_UNKNOWN)
        unknown(now, "rising or falling");
    if (input->dry == 0)
        against(now, "the faces are wet: dry them, or wait.");
    else if (input->dry < 0)
        unknown(now, "dry");
    if (input->clean == 0)
        against(now, "a finger along the face comes up dirty: clean again.");
    else if (input->clean < 0)
        unknown(now, "clean");
    if (isnan(now->age_days))
        unknown(now, "age of the concrete");
    else if (now->age_days < wait)
        against(now,
                "the concrete is %.0f days old; this kind of sealant usually waits %.0f (the "
                "data sheet decides).",
                now->age_days, wait);
}

enum status seal_now_judge(const struct plan *plan, const struct seal_now_input *input,
                           struct seal_now *now)
{
    struct conduction_year *year;
    bool given;

    *now = (struct seal_now){.turns_hour = NAN};
    if (!plan->seal.sealed || isnan(plan->movement.open_m) || isnan(plan->seal.width_m))
        return STATUS_REFUSED;
    if (isnan(input->width_m))
        unknown(now, "width (the job's cut at this slab temperature is taken)");
    year = hour_of_year(plan, input) >= 0 ? simulate(plan) : NULL;
    given = set_slab(plan, input, year, now);
    if (given) {
        set_age(plan, input, now);
        set_strains(plan, input, now);
        set_turn(plan, input, year, now);
        judge_joint(plan, now);
        judge_cold(plan, now);
        judge_dew(plan, input, now);
        judge_rest(plan, input, now);
        now->go = now->against_count == 0;
    }
    free(year);
    return given ? STATUS_OK : STATUS_REFUSED;
}
