/* Which kinds of sealant suit this job, and why the others do not. Each kind is judged with its
 * usual class, its own widths and depths; what the tin says wins. */
#include "core/sealant.h"
#include "job/table.h"
#include "plan/plan_steps.h"
#include <math.h>
#include <stdarg.h>
#include <stdio.h>
#include <string.h>

__attribute__((format(printf, 2, 3))) static void against(struct plan_choice *choice,
                                                          const char *words, ...)
{
    size_t used = strlen(choice->reason);
    va_list arguments;

    choice->fits = false;
    va_start(arguments, words);
    if (used > 0 && used + 3 < sizeof choice->reason)
        used += (size_t)snprintf(choice->reason + used, sizeof choice->reason - used, "; ");
    vsnprintf(choice->reason + used, sizeof choice->reason - used, words, arguments);
    va_end(arguments);
}

static void but(struct plan_choice *choice, const char *words)
{
    size_t used = strlen(choice->remark);

    snprintf(choice->remark + used, sizeof choice->remark - used, "%s%s", used > 0 ? "; " : "",
             words);
}

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

static bool is_soft(int kind)
{
    return kind <= SEALANT_COMPRESSION_SEAL;
}

/* ---- movement ---- */

/* The job's own kind with its own class, the others with their usual one. */
static struct sealant_capacity capacity_of(const struct plan *plan, int kind)
{
    const struct sealant_row *row = &sealant_table[kind];

    if (kind == plan->job.sealant_kind)
        return (struct sealant_capacity){plan->job.sealant_extension,
                                         plan->job.sealant_compression};
    return (struct sealant_capacity){row->extension, row->compression};
}

/* Narrowest blade within the kind's widths that holds with room. */
static void judge_movement(const struct plan *plan, struct plan_choice *choice)
{
    const struct sealant_row *row = &sealant_table[choice->kind_index];
    struct sealant_capacity capacity = capacity_of(plan, choice->kind_index);
    struct plan_worst worst = plan_worst_movement(plan);
    double widths[PLAN_BLADES_MOST];
    size_t count = plan_blades(plan, widths);

    for (size_t i = 0; i < count; i++) {
        double width = plan_width_at_sealing(plan, widths[i]);
        struct sealant_strain strains =
            plan_strains(plan, worst.open, worst.close, width - plan->job.sealing_tolerance);
        if (widths[i] < row->width_least - 1e-9 || widths[i] > row->width_most + 1e-9 ||
            sealant_demand(strains, capacity) > 0.9)
            continue;
        choice->width_m = widths[i];
        strains = plan_strains(plan, worst.open, worst.close, width);
        choice->extension = strains.extension;
        choice->compression = strains.compression;
        choice->depth_m =
            sealant_depth(widths[i], row->depth_ratio, row->depth_least, row->depth_most);
        return;
    }
    against(choice, "no blade up to %s takes the movement with %.3g %%",
            show(plan, row->width_most, QUANTITY_SMALL_LENGTH).words, 100 * capacity.extension);
}

/* Rod, bead and recess in the slot there is, else within a third of the slab. */
static void judge_depth(const struct plan *plan, struct plan_choice *choice)
{
    double rods[PLAN_BLADES_MOST], there = plan->job.sealing_slot_depth, need;
    size_t count = plan_rods(plan, rods);

    if (isnan(choice->width_m))
        return;
    need = plan->job.sealant_recess + choice->depth_m;
    if (isnan(there))
        there = plan->cut.most_m;
    if (need > there + 1e-9)
        against(choice, "bead and recess need a slot %s deep, there are %s",
                show(plan, need, QUANTITY_SMALL_LENGTH).words,
                show(plan, there, QUANTITY_SMALL_LENGTH).words);
    else if (need + plan_next_size(rods, count, 1.25 * choice->width_m) > there + 1e-9)
        but(choice, "bond-breaker tape: the slot is too shallow for a rod");
}

/* ---- the place: common practice, from memory; the tin wins ---- */

static bool beside_asphalt(const struct job *job)
{
    for (size_t i = 0; i < job->edge_count; i++)
        if (job->edges[i].against == AGAINST_ASPHALT)
            return true;
    return false;
}

static void judge_place(const struct plan *plan, struct plan_choice *choice)
{
    const struct job *job = &plan->job;
    int kind = choice->kind_index;
    bool indoor = job->climate_exposure == EXPOSURE_INDOOR;

    if (job->slab_wheels == WHEELS_HARD && is_soft(kind))
        against(choice, "hard wheels break the edges beside anything soft: floor filler");
    if (kind == SEALANT_FLOOR_FILLER && !indoor)
        against(choice, "it has no movement: for floors inside");
    if (job->sealant_fuel == 1 && (kind == SEALANT_SILICONE || kind == SEALANT_HOT_POUR))
        against(choice, "fuel softens it");
    if (job->sealant_fuel == 1 && kind == SEALANT_POLYURETHANE)
        but(choice, "fuel: only a grade made for it");
    if (job->sealant_fuel == 1 && kind == SEALANT_NONE)
        against(choice, "fuel runs into the ground");
    if (job->slab_slope > 0.05 && kind == SEALANT_HOT_POUR)
        against(choice, "it runs downhill on more than 5 %%");
    else if (job->slab_slope > 0.02 && kind <= SEALANT_POLYSULFIDE)
        but(choice, "slope: the non-sag grade, not the self-levelling one");
    if (beside_asphalt(job) && kind <= SEALANT_POLYSULFIDE)
        but(choice, "not at the asphalt edge: hot-pour there");
    if (kind == SEALANT_HOT_POUR && indoor)
        against(choice, "a melter's fumes and burns: not inside");
    if (kind == SEALANT_COMPRESSION_SEAL && job->sealing_kind == SEALING_RESEAL)
        against(choice, "old slots are not even enough: saw them anew, or take a poured kind");
    if (kind == SEALANT_NONE && job->slab_wheels == WHEELS_HARD)
        against(choice, "hard wheels break open edges");
    if (kind == SEALANT_NONE)
        but(choice, "first cut only, 3 mm; where water, grit and heels may come in, and the base "
                    "drains");
}

/* ---- the day ---- */

static void judge_day(const struct plan *plan, struct plan_choice *choice)
{
    const struct sealant_row *row = &sealant_table[choice->kind_index];
    double least = choice->kind_index == plan->job.sealant_kind
                       ? plan->job.sealing_least_temperature
                       : row->temperature_least;
    double age = job_sealing_age_days(&plan->job);

    if (choice->kind_index == SEALANT_NONE)
        return;
    if (plan->temperature.sealing_c < least)
        against(choice, "slab %s, it wants %s and up",
                show(plan, plan->temperature.sealing_c, QUANTITY_TEMPERATURE).words,
                show(plan, least, QUANTITY_TEMPERATURE).words);
    if (plan->job.sealing_kind == SEALING_NEW && age < row->cure_wait_d)
        against(choice, "the concrete is %.0f days old, it usually waits %.0f", age,
                row->cure_wait_d);
}

static void judge_compression(const struct plan *plan, struct plan_choice *choice)
{
    struct plan_worst worst = plan_worst_movement(plan);
    double seal_m, slot_m;

    if (!plan_compression_fit(plan, worst, &seal_m, &slot_m)) {
        against(choice, "no seal in stock follows the movement");
        return;
    }
    choice->width_m = slot_m;
}

void plan_set_choice(struct plan *plan)
{
    if (isnan(plan->movement.open_m))
        return;
    for (int kind = 0; kind <= SEALANT_NONE; kind++) {
        struct plan_choice *choice = &plan->choices[plan->choice_count++];
        *choice = (struct plan_choice){.kind_index = kind,
                                       .kind = sealant_table[kind].name,
                                       .fits = true,
                                       .width_m = NAN,
                                       .depth_m = NAN,
                                       .extension = NAN,
                                       .compression = NAN,
                                       .now = kind == plan->job.sealant_kind};
        if (kind <= SEALANT_HOT_POUR) {
            judge_movement(plan, choice);
            judge_depth(plan, choice);
        } else if (kind == SEALANT_COMPRESSION_SEAL) {
            judge_compression(plan, choice);
        }
        judge_place(plan, choice);
        judge_day(plan, choice);
    }
}
