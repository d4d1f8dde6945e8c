/* Every check of the plan: what decides (binding) and what is advice. */
#include "base/array.h"
#include "core/spacing.h"
#include "job/table.h"
#include "plan/plan_steps.h"
#include <math.h>
#include <stdarg.h>
#include <stdio.h>
#include <string.h>

/* A new check; NULL when there is no memory. */
__attribute__((format(printf, 3, 4))) static struct plan_check *
add(struct plan *plan, const char *id, const char *label, ...)
{
    struct plan_check *check;
    va_list arguments;

    if (!array_reserve((void **)&plan->checks, &plan->check_capacity, plan->check_count + 1,
                       sizeof *plan->checks))
        return NULL;
    check = &plan->checks[plan->check_count++];
    *check = (struct plan_check){.unit = "", .verdict = VERDICT_NONE};
    snprintf(check->id, sizeof check->id, "%s", id);
    va_start(arguments, label);
    vsnprintf(check->label, sizeof check->label, label, arguments);
    va_end(arguments);
    return check;
}

static void set_sides(struct plan_check *check, double demand, double capacity, const char *unit)
{
    check->demand = demand;
    check->capacity = capacity;
    check->unit = unit;
    check->verdict = verdict_of(demand, capacity);
}

/* Temperatures: no share of them makes sense, so it holds or it does not. */
static void set_degrees(struct plan_check *check, double least_c, double slab_c)
{
    check->demand = least_c;
    check->capacity = slab_c;
    check->unit = "degC";
    check->verdict = least_c <= slab_c + 1e-9 ? VERDICT_HOLDS : VERDICT_FAILS;
}

static void set_words(struct plan_check *check, const char *source, const char *remedy)
{
    snprintf(check->source, sizeof check->source, "%s", source);
    snprintf(check->remedy, sizeof check->remedy, "%s", remedy);
}

/* ---- panels and joints: how many break each rule ---- */

static const struct layout_rule {
    const char *id, *label, *source, *remedy;
} layout_rules[] = {
    {"panel.side", "panels longer than the limit", "the spacing limit of this job",
     "Add a joint, or type a longer rules.spacing if the designer agrees."},
    {"panel.side-least", "panels narrower than the least", "Highway Engineering Handbook: 2 ft",
     "Move or drop a joint; see the panel's own line."},
    {"panel.aspect", "panels too long for their width", "ACI 302.1R; SUDAS Design Manual 5G-2",
     "Shorten those panels or reinforce them."},
    {"panel.angle", "panel corners too sharp", "common practice: 60 degrees",
     "Let the joint meet the edge squarely; see the panel's own line."},
    {"panel.corner", "inside corners without a joint", "common practice: avoid L-shaped panels",
     "Run a joint from the corner, or reinforce across it."},
    {"joint.end", "joints that end in the middle of a panel", "ACI 360R-06 5.1.3: joints run on",
     "Carry the joint on to an edge, or reinforce ahead of it."},
    {"object.isolated", "fixed things that are not cut free", "NRMCA CIP 6; common practice",
     "Put a box or soft board round it, with joints to its corners."},
    {"edge.isolated", "held edges that are not cut free", "common practice",
     "Put soft board along the edge."},
    {"edge.match", "neighbour's joints that are not carried on", "common practice",
     "Saw a joint there, or isolate the edge."},
    {"pour.line", "pour lines without a joint", "common practice",
     "Every pour end is a construction joint."},
    {"pour.width", "strips wider than you can pour", "the strip width of this job",
     "Add a pour line."},
};

static int broken(const struct plan *plan, const char *rule)
{
    int count = 0;

    for (size_t i = 0; i < plan->layout.reason_count; i++)
        count += strcmp(plan->layout.reasons[i].rule, rule) == 0;
    for (size_t p = 0; p < plan->layout.panel_count; p++)
        for (size_t i = 0; i < plan->layout.panels[p].reason_count; i++)
            count += strcmp(plan->layout.panels[p].reasons[i].rule, rule) == 0;
    return count;
}

static bool add_layout_checks(struct plan *plan)
{
    for (size_t i = 0; i < sizeof layout_rules / sizeof *layout_rules; i++) {
        const struct layout_rule *rule = &layout_rules[i];
        struct plan_check *check = add(plan, rule->id, "%s", rule->label);
        if (check == NULL)
            return false;
        check->binding = true;
        set_sides(check, broken(plan, rule->id), 0, "");
        set_words(check, rule->source, rule->remedy);
    }
    return true;
}

/* ---- the seal ---- */

static bool add_share(struct plan *plan, const char *id, const char *label, double demand,
                      double capacity, bool binding)
{
    struct plan_check *check = add(plan, id, "%s", label);

    if (check == NULL)
        return false;
    check->binding = binding;
    set_sides(check, demand, capacity, "ratio");
    set_words(check, "ASTM C920: change of width from the width at sealing",
              "Cut wider, take a sealant of a higher class, or seal at a slab temperature nearer "
              "the middle of the year.");
    return true;
}

static bool add_width_check(struct plan *plan)
{
    double since_cut = plan_width_at_sealing(plan, plan->seal.width_m) - plan->seal.width_m;
    struct plan_check *check =
        add(plan, "seal.width", "least width, tolerance in, against the width at sealing");

    if (check == NULL)
        return false;
    check->binding = true;
    set_sides(check, plan->seal.least_width_m + since_cut, plan->seal.width_m + since_cut, "m");
    set_words(check, "movement over the movement class (ASTM C1472 form)",
              "Cut wider or take a sealant of a higher class.");
    return true;
}

/* Strains at the width less the tolerance, of the sealed joint that moves most. */
static bool add_strain_checks(struct plan *plan)
{
    double least = plan->job.sealing_tolerance, extension = 0, compression = 0;
    double width = plan_width_at_sealing(plan, plan->seal.width_m) - least;
    struct sealant_strain strains =
        plan_strains(plan, plan->movement.open_m, plan->movement.close_m, width);

    extension = strains.extension;
    compression = strains.compression;
    for (size_t j = 0; plan->joints != NULL && j < plan->layout.joint_count; j++) {
        if (plan->layout.joints[j].kind == LAYOUT_ISOLATION)
            continue;
        strains = plan_strains(plan, plan->joints[j].open_m, plan->joints[j].close_m, width);
        extension = fmax(extension, strains.extension);
        compression = fmax(compression, strains.compression);
    }
    return add_share(plan, "seal.extension", "stretch of the sealant, slab at its coldest",
                     extension, plan->seal.extension_capacity, true) &&
           add_share(plan, "seal.compression", "squeeze of the sealant, slab at its hottest",
                     compression, plan->seal.compression_capacity, true);
}

static bool add_bead_check(struct plan *plan)
{
    struct plan_check *check = add(plan, "seal.bead", "stretch at the curved edge of the bead");

    if (check == NULL)
        return false;
    check->demand = plan->seal.bead_strain;
    check->capacity = NAN;
    check->unit = "ratio";
    set_words(check, "Tons 1959: it ranks bead shapes and decides nothing", "");
    return true;
}

static bool add_cold_checks(struct plan *plan)
{
    struct plan_check *check =
        add(plan, "seal.cold", "coldest slab the specification seals, against the slab then");
    double tested_c;

    if (check == NULL)
        return false;
    set_degrees(check, plan->job.sealing_least_temperature, plan->temperature.sealing_c);
    set_words(check, "your specification; usual values from memory", "Wait for a warmer slab.");
    if (!plan_bond_test(plan, &tested_c))
        return true;
    check = add(plan, "seal.bond-test", "bond test of the sealant, against the coldest slab");
    if (check == NULL)
        return false;
    check->binding = true;
    set_degrees(check, tested_c, plan->temperature.coldest_c);
    set_words(check, "ASTM D6690: -18 degC for type I, -29 degC for II to IV",
              "Take a type tested colder.");
    return true;
}

static bool add_follow_check(struct plan *plan, const char *id, const char *label, double moves_m,
                             double follow_m)
{
    struct plan_check *check = add(plan, id, "%s", label);

    if (check == NULL)
        return false;
    check->binding = true;
    set_sides(check, moves_m, fmax(follow_m, 0), "m");
    set_words(check, "ASTM D2628 seals; working squeeze 20 to 50 % from memory",
              "Take a wider seal, or another slot.");
    return true;
}

static bool add_compression_checks(struct plan *plan)
{
    struct plan_worst worst = plan_worst_movement(plan);

    return add_follow_check(plan, "seal.extension",
                            "joint opens, against what the seal can follow; slab at its coldest",
                            worst.open, plan->seal.follow_open_m) &&
           add_follow_check(plan, "seal.compression",
                            "joint closes, against what the seal can follow; slab at its hottest",
                            worst.close, plan->seal.follow_close_m);
}

static bool add_floor_filler_check(struct plan *plan)
{
    struct plan_check *check =
        add(plan, "floor-filler", "the filler parts by this share of its width");

    if (check == NULL)
        return false;
    check->demand = plan->seal.extension;
    check->capacity = NAN;
    check->unit = "ratio";
    set_words(check, "a semi-rigid filler has no movement class: common practice",
              "Fill as late as can be (90 days), refill later.");
    return true;
}

static bool add_seal_checks(struct plan *plan)
{
    if (isnan(plan->seal.width_m))
        return true;
    if (plan->job.sealant_kind == SEALANT_COMPRESSION_SEAL)
        return add_compression_checks(plan);
    if (plan->job.sealant_kind == SEALANT_FLOOR_FILLER)
        return add_floor_filler_check(plan);
    if (isnan(plan->movement.open_m))
        return true;
    return add_width_check(plan) && add_strain_checks(plan) && add_bead_check(plan) &&
           add_cold_checks(plan);
}

/* ---- boards ---- */

static bool add_filler_checks(struct plan *plan)
{
    for (size_t i = 0; i < plan->isolation_count; i++) {
        const struct plan_isolation *row = &plan->isolation[i];
        char id[sizeof(((struct plan_check *)0)->id)];
        const char *last = strrchr(row->where, ' ');
        struct plan_check *check;
        bool seal = false;
        /* filler.edge3, filler.C1, filler.pit, filler.J3 */
        if (strncmp(row->where, "edge ", 5) == 0)
            snprintf(id, sizeof id, "filler.edge%.30s", last + 1);
        else
            snprintf(id, sizeof id, "filler.%.40s", last != NULL ? last + 1 : row->where);
        check = add(plan, id, "soft board at %.60s", row->where);
        if (check == NULL)
            return false;
        check->binding = true;
        set_sides(check, row->least_filler_m, row->filler_m, "m");
        set_words(check, "ASTM D1751 loads to half the thickness; run from set to hottest",
                  "Thicker board, or a nearer expansion joint.");
        if (row->verdict > check->verdict) { /* the seal on it is what is worse */
            seal = true;
            if (row->extension / plan->job.sealant_extension >
                row->compression / plan->job.sealant_compression)
                set_sides(check, row->extension, plan->job.sealant_extension, "ratio");
            else
                set_sides(check, row->compression, plan->job.sealant_compression, "ratio");
        }
        if (seal)
            set_words(check, "ASTM C920: the seal over the board",
                      "Thicker board, a nearer expansion joint or a sealant of a higher class.");
        check->verdict = row->verdict;
    }
    return true;
}

/* ---- advice ---- */

static double longest_panel(const struct plan *plan)
{
    double longest = 0;

    for (size_t i = 0; i < plan->layout.panel_count; i++)
        longest = fmax(longest, plan->layout.panels[i].length);
    return plan->layout.panel_count > 0 ? longest : plan->spacing.limit_m;
}

static bool add_spacing_advice(struct plan *plan)
{
    struct plan_check *check;

    if (isfinite(plan->job.rules_spacing)) {
        check = add(plan, "spacing.typed", "your spacing against the rule");
        if (check == NULL)
            return false;
        set_sides(check, plan->job.rules_spacing, plan->spacing.rule_limit_m, "m");
        set_words(check, plan->spacing.rule_words, "Shorten it, or expect cracks between joints.");
    }
    if (plan->job.slab_dowels.diameter > 0)
        return true;
    check = add(plan, "interlock", "crack opening in winter: do the stones still carry across");
    if (check == NULL)
        return false;
    set_sides(check, longest_panel(plan) * plan_crack_strain(plan), plan->job.rules_interlock, "m");
    set_words(check, "Colley and Humphrey (1967), for slabs of about 9 in",
              "Under heavy wheels: dowels, or shorter panels.");
    return true;
}

/* Slab temperatures are typed, so no year was simulated and nothing says how top and bottom differ.
 */
static bool add_curling_note(struct plan *plan)
{
    struct plan_check *check = add(plan, "curling", "curling is not worked out");

    if (check == NULL)
        return false;
    check->demand = check->capacity = NAN;
    check->unit = "Pa";
    set_words(check, "no difference of top and bottom: type slab.gradient", "");
    return true;
}

static bool add_stress_advice(struct plan *plan)
{
    const struct job *job = &plan->job;
    double drag = job->concrete_unit_weight * job->base_friction_high * longest_panel(plan) / 2;
    struct plan_check *check = add(plan, "drag", "stress from the drag of the base");

    if (check == NULL)
        return false;
    set_sides(check, drag, plan_drag_stress_allowed(plan), "Pa");
    set_words(check, "gamma mu L/2: subgrade drag theory", "Shorter panels or a sheet.");
    if (isnan(plan->restraint.edge_pa))
        return add_curling_note(plan);
    check = add(plan, "curling", "curling and drag against its share of the bending strength");
    if (check == NULL)
        return false;
    /* by night the drag adds to the curling; by day it is compression and does not */
    set_sides(check, fmax(plan->restraint.edge_pa, plan->restraint.night_edge_pa + drag),
              job->rules_curling_share * plan->concrete.rupture_pa, "Pa");
    set_words(check, "Westergaard 1927, Bradbury 1938; sum: derived", "Shorter panels.");
    check = add(plan, "contact", "edge lift against the slab's own weight");
    if (check == NULL)
        return false;
    set_sides(check, plan->restraint.lift_m, plan->restraint.settlement_m, "m");
    set_words(check, "Westergaard 1927", "Outside it the curling stress is out of range.");
    return true;
}

/* One joint in n: a warning line at n = 3; a typed n above 1 decides. A compression seal: by what
 * it can follow. */
static void set_working_sides(const struct plan *plan, const struct plan_working *row,
                              struct plan_check *check)
{
    double stretch = row->extension / plan->seal.extension_capacity;
    double squeeze = row->compression / plan->seal.compression_capacity;
    double opens = row->open_m / fmax(plan->seal.follow_open_m, 1e-9);
    double closes = row->close_m / fmax(plan->seal.follow_close_m, 1e-9);

    if (plan->seal.sealed && stretch >= squeeze)
        set_sides(check, row->extension, plan->seal.extension_capacity, "ratio");
    else if (plan->seal.sealed)
        set_sides(check, row->compression, plan->seal.compression_capacity, "ratio");
    else if (opens >= closes)
        set_sides(check, row->open_m, fmax(plan->seal.follow_open_m, 0), "m");
    else
        set_sides(check, row->close_m, fmax(plan->seal.follow_close_m, 0), "m");
    check->verdict = row->verdict;
}

static void set_working_words(const struct plan *plan, const struct plan_working *row,
                              struct plan_check *check)
{
    double blade = plan->seal.sealed ? plan_narrowest(plan, row->open_m, row->close_m) : NAN;
    struct text width = {0};

    set_words(check, "measured openings are uneven (LTPP): one joint takes the panels' sum",
              "Saw earlier, measure each joint before sealing, seal the wide ones wider.");
    if (isnan(blade))
        return;
    unit_show(&width, blade, QUANTITY_SMALL_LENGTH, (enum unit_system)plan->job.job_units);
    snprintf(check->remedy, sizeof check->remedy,
             "%s would hold; or saw earlier, measure each joint, seal the wide ones wider.",
             text_string(&width));
    text_free(&width);
}

static bool add_working_check(struct plan *plan)
{
    int typed = (int)lround(plan->job.sealing_working), shown = typed > 1 ? typed : 3;

    for (size_t i = 0; i < plan->working_count; i++) {
        const struct plan_working *row = &plan->working[i];
        struct plan_check *check;
        if (row->n != shown || row->verdict == VERDICT_NONE)
            continue;
        check = add(plan, "working", "sealant, if only 1 cut in %d works", shown);
        if (check == NULL)
            return false;
        check->binding = typed > 1;
        set_working_sides(plan, row, check);
        set_working_words(plan, row, check);
    }
    return true;
}

enum status plan_set_checks(struct plan *plan)
{
    bool good = (!plan->has_outline || add_layout_checks(plan)) && add_seal_checks(plan) &&
                add_filler_checks(plan) && add_spacing_advice(plan) && add_stress_advice(plan) &&
                add_working_check(plan);

    return good ? STATUS_OK : STATUS_NO_MEMORY;
}
