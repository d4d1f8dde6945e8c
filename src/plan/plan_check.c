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
    *check = (struct plan_check){.unit = "", .at_most = true, .verdict = VERDICT_NONE};
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
    struct plan_check *check =
        add(plan, "seal.width", "least width, tolerance in, against the width");

    if (check == NULL)
        return false;
    check->binding = true;
    set_sides(check, plan->seal.least_width_m, plan->seal.width_m, "m");
    set_words(check, "movement over the movement class (ASTM C1472 form)",
              "Cut wider or take a sealant of a higher class.");
    return true;
}

/* Strains at the width less the tolerance, of the sealed joint that moves most. */
static bool add_strain_checks(struct plan *plan)
{
    double least = plan->job.sealing_tolerance, extension = 0, compression = 0;
    double width = plan_width_at_sealing(plan, plan->seal.width_m) - least;
    struct plan_strains strains =
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

static bool add_bead_checks(struct plan *plan)
{
    static const struct {
        const char *type;
        double c;
    } bond[] = {{"", NAN}, {"I", -18}, {"II", -29}, {"III", -29}, {"IV", -29}};
    struct plan_check *check = add(plan, "seal.bead", "stretch at the curved edge of the bead");
    int type = plan->job.sealant_type;

    if (check == NULL)
        return false;
    check->demand = plan->seal.bead_strain;
    check->capacity = NAN;
    check->unit = "ratio";
    set_words(check, "Tons 1959: it ranks bead shapes and decides nothing", "");
    check = add(plan, "seal.cold", "slab at sealing against the coldest to seal");
    if (check == NULL)
        return false;
    check->at_most = false;
    check->demand = plan->temperature.sealing_c;
    check->capacity = plan->job.sealing_least_temperature;
    check->unit = "degC";
    check->verdict = check->demand >= check->capacity - 1e-9 ? VERDICT_HOLDS : VERDICT_FAILS;
    set_words(check, "your specification; usual values from memory", "Wait for a warmer slab.");
    if (type == 0 || plan->job.sealant_kind != SEALANT_HOT_POUR)
        return true;
    check = add(plan, "seal.bond-test", "coldest slab against the bond test of type %s",
                bond[type].type);
    if (check == NULL)
        return false;
    check->at_most = false;
    check->demand = plan->temperature.coldest_c;
    check->capacity = bond[type].c;
    check->unit = "degC";
    check->verdict = check->demand >= check->capacity - 1e-9 ? VERDICT_HOLDS : VERDICT_FAILS;
    set_words(check, "ASTM D6690: -18 degC for type I, -29 degC for II to IV",
              "Take a type tested colder.");
    return true;
}

static bool add_seal_checks(struct plan *plan)
{
    struct plan_check *check;

    if (isnan(plan->seal.width_m))
        return true;
    if (plan->job.sealant_kind == SEALANT_COMPRESSION_SEAL) {
        check = add(plan, "seal.extension", "squeeze left in the seal, slab at its coldest");
        if (check == NULL)
            return false;
        check->binding = true;
        check->at_most = false;
        check->demand = plan->seal.cold_squeeze;
        check->capacity = plan->job.sealant_seal_least;
        check->unit = "ratio";
        check->verdict = check->demand >= check->capacity - 1e-9 ? VERDICT_HOLDS : VERDICT_FAILS;
        set_words(check, "ASTM D2628; working range from memory", "Take a wider seal or slot.");
        return add_share(plan, "seal.compression", "squeeze of the seal, slab at its hottest",
                         plan->seal.compression, plan->seal.compression_capacity, true);
    }
    if (plan->job.sealant_kind == SEALANT_FLOOR_FILLER) {
        check = add(plan, "floor-filler", "the filler parts by this share of its width");
        if (check == NULL)
            return false;
        check->demand = plan->seal.extension;
        check->capacity = NAN;
        check->unit = "ratio";
        set_words(check, "a semi-rigid filler has no movement class: common practice",
                  "Fill as late as can be (90 days), refill later.");
        return true;
    }
    if (isnan(plan->movement.open_m))
        return true;
    return add_width_check(plan) && add_strain_checks(plan) && add_bead_checks(plan);
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
        return true;
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

/* One joint in n: a warning line at n = 3; a typed n above 1 decides. */
static bool add_working_check(struct plan *plan)
{
    int typed = (int)lround(plan->job.sealing_working), shown = typed > 1 ? typed : 3;

    for (size_t i = 0; i < plan->working_count && plan->seal.sealed; i++) {
        const struct plan_working *row = &plan->working[i];
        struct plan_check *check;
        bool stretch = row->extension / plan->seal.extension_capacity >=
                       row->compression / plan->seal.compression_capacity;
        if (row->n != shown)
            continue;
        check = add(plan, "working", "sealant, if only 1 cut in %d works", shown);
        if (check == NULL)
            return false;
        check->binding = typed > 1;
        set_sides(check, stretch ? row->extension : row->compression,
                  stretch ? plan->seal.extension_capacity : plan->seal.compression_capacity,
                  "ratio");
        check->verdict = row->verdict;
        set_words(check, "measured openings are uneven (LTPP): one joint takes the panels' sum",
                  "Saw earlier, measure each joint before sealing, seal the wide ones wider.");
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
