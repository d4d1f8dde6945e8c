#include "plan/year.h"
#include "core/rainflow.h"
#include "core/shrinkage.h"
#include "plan/plan_steps.h"
#include <math.h>
#include <stdlib.h>

const char *year_month_word(int day_of_year, int *day_of_month)
{
    static const struct {
        const char *word;
        int days;
    } months[] = {{"January", 31},   {"February", 28}, {"March", 31},    {"April", 30},
                  {"May", 31},       {"June", 30},     {"July", 31},     {"August", 31},
                  {"September", 30}, {"October", 31},  {"November", 30}, {"December", 31}};
    int left = day_of_year;

    for (size_t i = 0; i < 12; i++) {
        if (left < months[i].days) {
            *day_of_month = left + 1;
            return months[i].word;
        }
        left -= months[i].days;
    }
    *day_of_month = 31;
    return "December";
}

/* ---- the slab's temperature ---- */

struct slab_year {
    struct conduction_year year;
    double strain[CLIMATE_HOURS];
    struct rainflow_cycle cycles[CLIMATE_HOURS];
};

/* Typed extremes: the simulated year, stretched and shifted so that it reaches just them. */
static void stretch(const struct plan *plan, struct conduction_year *year)
{
    double range = year->hottest_c - year->coldest_c;
    double times =
        range > 0 ? (plan->temperature.hottest_c - plan->temperature.coldest_c) / range : 0;

    for (int h = 0; h < CLIMATE_HOURS; h++)
        year->mean_c[h] = (float)(plan->temperature.coldest_c +
                                  times * ((double)year->mean_c[h] - year->coldest_c));
}

/* ---- drying ---- */

/* Drying since sealing at an age, low and high estimate. */
struct drying {
    const struct plan *plan;
    struct shrinkage_slab slab;
    double sealing_d;
    bool known;
};

static struct drying drying_of(const struct plan *plan)
{
    struct drying drying = {.plan = plan, .sealing_d = job_sealing_age_days(&plan->job)};

    drying.known = plan->job.concrete_shrinkage_model != SHRINKAGE_TYPED;
    if (drying.known)
        plan_shrinkage_slab(plan, &drying.slab);
    return drying;
}

static void drying_after(const struct drying *drying, int days, bool dated, double *low,
                         double *high)
{
    *low = 0;
    *high = drying->plan->shrinkage.after_sealing;
    if (drying->known && dated)
        *low = *high = fmin(
            *high, shrinkage_between((enum shrinkage_by)drying->plan->job.concrete_shrinkage_model,
                                     &drying->slab, drying->sealing_d, drying->sealing_d + days));
}

/* ---- the joint ---- */

static double width_at(const struct plan *plan, double width_m, double strain)
{
    double moved = plan_joint_movement(plan, plan_by_factor(plan), plan->movement.left_m,
                                       plan->movement.right_m, fabs(strain));

    return width_m + copysign(moved, strain);
}

static void fill_day(const struct plan *plan, const struct slab_year *slab, double dry_low,
                     double dry_high, double width_m, struct year_day *day)
{
    double a = plan->concrete.expansion_k, ts = plan->temperature.sealing_c;

    day->slab_low_c = INFINITY;
    day->slab_high_c = -INFINITY;
    for (int h = 24 * day->day_of_year; h < 24 * day->day_of_year + 24; h++) {
        day->slab_low_c = fmin(day->slab_low_c, slab->year.mean_c[h]);
        day->slab_high_c = fmax(day->slab_high_c, slab->year.mean_c[h]);
    }
    day->gap_high_m = width_at(plan, width_m, a * (ts - day->slab_low_c) + dry_high);
    day->gap_low_m = width_at(plan, width_m, a * (ts - day->slab_high_c) + dry_low);
    day->extension = fmax(day->gap_high_m - width_m, 0) / width_m;
    day->compression = fmax(width_m - day->gap_low_m, 0) / width_m;
}

static void find_extremes(struct year *year)
{
    for (int i = 1; i < CLIMATE_DAYS; i++) {
        if (year->days[i].gap_high_m > year->days[year->widest].gap_high_m)
            year->widest = i;
        if (year->days[i].gap_low_m < year->days[year->narrowest].gap_low_m)
            year->narrowest = i;
    }
}

/* Cycles of the hourly strain from temperature alone. */
static enum status count_cycles(const struct plan *plan, struct slab_year *slab, double width_m,
                                struct year *year)
{
    static const double up_to[] = {0.02, 0.05, 0.10};
    size_t found;
    enum status status;

    for (int h = 0; h < CLIMATE_HOURS; h++)
        slab->strain[h] = width_at(plan, 0,
                                   plan->concrete.expansion_k * (plan->temperature.sealing_c -
                                                                 (double)slab->year.mean_c[h])) /
                          width_m;
    status = rainflow_count(slab->strain, CLIMATE_HOURS, slab->cycles, &found);
    for (size_t i = 0; status == STATUS_OK && i < found; i++) {
        int bin = 0;
        while (bin < 3 && slab->cycles[i].range > up_to[bin])
            bin++;
        year->cycles[bin] += slab->cycles[i].count;
    }
    return status;
}

static enum status fill(const struct plan *plan, struct slab_year *slab, struct year *year)
{
    double width = plan_width_at_sealing(plan, plan->seal.width_m);
    struct drying drying = drying_of(plan);
    int first = 0;

    year->dated = plan->job.sealing_date.year != 0;
    year->drying_known = drying.known && year->dated;
    if (year->dated)
        first = date_day_of_year(plan->job.sealing_date);
    for (int i = 0; i < CLIMATE_DAYS; i++) {
        double low, high;
        year->days[i].day_of_year = (first + i) % CLIMATE_DAYS;
        drying_after(&drying, i, year->dated, &low, &high);
        fill_day(plan, slab, low, high, width, &year->days[i]);
    }
    find_extremes(year);
    return count_cycles(plan, slab, width, year);
}

enum status year_make(const struct plan *plan, struct year *year)
{
    struct slab_year *slab;
    enum status status;

    *year = (struct year){0};
    if (isnan(plan->movement.open_m) || isnan(plan->seal.width_m))
        return STATUS_REFUSED;
    slab = malloc(sizeof *slab);
    if (slab == NULL)
        return STATUS_NO_MEMORY;
    status = plan_slab_year(plan, &slab->year);
    year->scaled = !plan_simulated(plan) || isfinite(plan->job.climate_slab_coldest) ||
                   isfinite(plan->job.climate_slab_hottest);
    if (status == STATUS_OK && year->scaled)
        stretch(plan, &slab->year);
    if (status == STATUS_OK)
        status = fill(plan, slab, year);
    free(slab);
    return status;
}
