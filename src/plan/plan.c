#include "plan/plan.h"
#include "plan/plan_steps.h"
#include <math.h>
#include <stdlib.h>
#include <string.h>

const char *verdict_word(enum verdict verdict)
{
    static const char *const words[] = {"holds", "tight", "fails", ""};

    return words[verdict];
}

const char *verdict_screen_word(enum verdict verdict)
{
    static const char *const words[] = {"HOLDS", "JUST HOLDS", "FAILS", "-"};

    return words[verdict];
}

enum verdict verdict_of(double demand, double capacity)
{
    if (!isfinite(demand) || !isfinite(capacity))
        return VERDICT_NONE;
    if (demand > capacity * (1 + 1e-9))
        return VERDICT_FAILS;
    return demand > 0.9 * capacity ? VERDICT_TIGHT : VERDICT_HOLDS;
}

/* Every double of the results that no step sets stays "none". */
static void clear_results(struct plan *plan)
{
    plan->spacing.limit_m = plan->spacing.across_limit_m = plan->spacing.rule_limit_m = NAN;
    plan->movement.open_m = plan->movement.close_m = plan->movement.panel_m = NAN;
    plan->movement.factor_open_m = plan->movement.factor_close_m = NAN;
    plan->movement.friction_open_m = plan->movement.friction_close_m = NAN;
    plan->movement.factor = NAN;
    plan->seal.width_m = plan->seal.least_width_m = plan->seal.depth_m = NAN;
    plan->seal.recess_m = plan->seal.tolerance_m = NAN;
    plan->seal.extension = plan->seal.compression = plan->seal.bead_strain = NAN;
    plan->seal.extension_capacity = plan->seal.compression_capacity = NAN;
    plan->seal.cold_squeeze = plan->seal.follow_open_m = plan->seal.follow_close_m = NAN;
    plan->seal.rod_m = plan->seal.bulge_m = plan->seal.cut_depth_m = NAN;
    plan->seal.next_down_m = plan->seal.next_down_extension = NAN;
    plan->seal.next_down_compression = plan->seal.next_up_compression = NAN;
    plan->seal.next_up_m = plan->seal.next_up_extension = plan->seal.holds_when_n3_m = NAN;
    plan->seal.window_coldest_c = plan->seal.window_hottest_c = NAN;
    plan->seal.verdict = VERDICT_NONE;
    plan->steel.dowel_diameter_m = plan->steel.dowel_length_m = plan->steel.dowel_spacing_m = NAN;
    plan->steel.tie_diameter_m = plan->steel.tie_length_m = plan->steel.tie_spacing_m = NAN;
    plan->steel.drag_steel_m2_per_m = NAN;
    plan->restraint.edge_pa = plan->restraint.interior_pa = plan->restraint.lift_m = NAN;
    plan->restraint.bradbury_x = plan->restraint.bradbury_y = plan->restraint.settlement_m = NAN;
    plan->restraint.rise_left_k = NAN;
    plan->quantities.sealant_net_m3 = plan->quantities.sealant_cusps_m3 = NAN;
    plan->quantities.sealant_order_m3 = plan->quantities.filler_m2 = NAN;
    plan->quantities.board_order_m3 = plan->quantities.strip_m = NAN;
    plan->quantities.tape_m = plan->quantities.primer_m2 = plan->quantities.hours = NAN;
    plan->quantities.wide_cut_m = plan->quantities.days = plan->quantities.cost = NAN;
    plan->quantities.pot_life_s = plan->quantities.batch_most_m3 = plan->quantities.batch_m = NAN;
    plan->quantities.area_m2 = plan->quantities.volume_m3 = NAN;
    plan->saw.start_h = plan->saw.pour_h = plan->saw.set_h = plan->saw.set_c = NAN;
    plan->saw.warmest_c = plan->saw.warmest_h = plan->saw.earliest_h = plan->saw.latest_h = NAN;
    plan->saw.end_h = plan->saw.late_m = plan->saw.least_spare_h = plan->saw.evaporation = NAN;
    plan->saw.sunrise_h = plan->saw.sunset_h = NAN;
    plan->governing_joint = SIZE_MAX;
}

static enum status run_chain(struct plan *plan, struct plan_cache *cache,
                             const struct plan_progress *progress)
{
    enum status status;

    plan_set_concrete(plan);
    status = plan_set_temperature(plan, cache);
    if (status != STATUS_OK)
        return status;
    if (finding_has_error(&plan->findings))
        return STATUS_REFUSED;
    status = plan_set_early(plan);
    if (status != STATUS_OK)
        return status;
    plan_set_shrinkage(plan);
    plan_set_spacing(plan);
    if (plan->has_outline)
        status = plan_set_layout(plan, cache, progress);
    if (status == STATUS_OK)
        status = plan_set_movement(plan);
    if (status != STATUS_OK)
        return status;
    plan_set_seal(plan);
    plan_set_joint_seals(plan);
    plan_set_choice(plan);
    status = plan_set_isolation(plan);
    if (status != STATUS_OK)
        return status;
    plan_set_restraint(plan);
    plan_set_steel(plan);
    plan_set_quantities(plan);
    status = plan->has_outline ? plan_set_pours(plan) : STATUS_OK;
    if (status == STATUS_OK)
        status = plan_set_cracks(plan);
    if (status == STATUS_OK)
        status = plan_set_saw(plan);
    if (status != STATUS_OK)
        return status;
    return plan_set_checks(plan);
}

enum status plan_make(const struct job *job, struct plan_cache *cache,
                      const struct plan_progress *progress, struct plan *plan)
{
    enum status status;

    memset(plan, 0, sizeof *plan);
    clear_results(plan);
    status = job_copy(&plan->job, job);
    if (status != STATUS_OK)
        return status;
    job_settle(&plan->job, &plan->findings);
    job_check(&plan->job, &plan->findings);
    plan->has_outline = plan->job.outline.count >= 3;
    if (plan->findings.failed)
        return STATUS_NO_MEMORY;
    if (finding_has_error(&plan->findings))
        return STATUS_REFUSED;
    plan_list_assumed(plan);
    status = run_chain(plan, cache, progress);
    if (status == STATUS_OK && plan->findings.failed)
        status = STATUS_NO_MEMORY;
    if (status == STATUS_OK && finding_has_error(&plan->findings))
        status = STATUS_REFUSED;
    return status;
}

void plan_cache_free(struct plan_cache *cache)
{
    layout_cache_free(&cache->layout);
    *cache = (struct plan_cache){0};
}

void plan_free(struct plan *plan)
{
    job_free(&plan->job);
    finding_free(&plan->findings);
    layout_free(&plan->layout);
    free(plan->isolation);
    free(plan->panel_pour);
    free(plan->saw.histories);
    free(plan->saw.cuts);
    free(plan->saw.stops);
    free(plan->checks);
    free(plan->joints);
    free(plan->cracks);
    free(plan->pours);
    plan->pours = NULL;
    plan->pour_count = 0;
    plan->panel_pour = NULL;
    memset(&plan->saw, 0, sizeof plan->saw);
    plan->cracks = NULL;
    plan->crack_count = 0;
    plan->isolation = NULL;
    plan->checks = NULL;
    plan->joints = NULL;
    plan->isolation_count = plan->check_count = plan->check_capacity = 0;
}

int plan_exit_status(const struct plan *plan)
{
    if (finding_has_error(&plan->findings))
        return 2;
    if (plan->layout.violations > 0)
        return 1;
    for (size_t i = 0; i < plan->check_count; i++)
        if (plan->checks[i].binding && plan->checks[i].verdict == VERDICT_FAILS)
            return 1;
    return 0;
}
