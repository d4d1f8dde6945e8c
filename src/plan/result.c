#include "plan/result.h"
#include <math.h>
#include <string.h>

#define AT(member) offsetof(struct plan, member)
#define NUM(path, label, quantity, member)                                                         \
    {                                                                                              \
        path, label, RESULT_NUMBER, quantity, 1.0, AT(member)                                      \
    }
#define LITRES(path, label, member)                                                                \
    {                                                                                              \
        path, label, RESULT_NUMBER, QUANTITY_VOLUME, 1000.0, AT(member)                            \
    }
#define WORD(path, label, member)                                                                  \
    {                                                                                              \
        path, label, RESULT_WORD, QUANTITY_NONE, 1.0, AT(member)                                   \
    }
#define TEXTED(path, label, member)                                                                \
    {                                                                                              \
        path, label, RESULT_TEXT, QUANTITY_NONE, 1.0, AT(member)                                   \
    }
#define MM QUANTITY_SMALL_LENGTH
#define METRES QUANTITY_LENGTH
#define DEGC QUANTITY_TEMPERATURE
#define SHARE QUANTITY_RATIO

/* Order = order of the JSON. Results of one group stand together. */
const struct result result_table[] = {
    NUM("spacing.limit_m", "Spacing limit", METRES, spacing.limit_m),
    NUM("spacing.across_limit_m", "Spacing limit across", METRES, spacing.across_limit_m),
    WORD("spacing.governed_by", "Limit set by", spacing.governed_by),
    NUM("spacing.rule_limit_m", "Limit by the rules alone", METRES, spacing.rule_limit_m),
    NUM("concrete.strength_pa", "Cylinder strength", QUANTITY_STRESS, concrete.fck_pa),
    NUM("concrete.modulus_pa", "Modulus of elasticity", QUANTITY_STRESS, concrete.modulus_pa),
    NUM("concrete.tensile_pa", "Tensile strength", QUANTITY_STRESS, concrete.tensile_pa),
    NUM("concrete.rupture_pa", "Modulus of rupture", QUANTITY_STRESS, concrete.rupture_pa),
    NUM("concrete.expansion_k", "Thermal expansion", QUANTITY_PER_KELVIN, concrete.expansion_k),
    NUM("concrete.stiffness_radius_m", "Radius of relative stiffness", METRES,
        concrete.stiffness_radius_m),
    NUM("temperature.coldest_c", "Slab coldest", DEGC, temperature.coldest_c),
    NUM("temperature.hottest_c", "Slab hottest", DEGC, temperature.hottest_c),
    NUM("temperature.sealing_c", "Slab at sealing", DEGC, temperature.sealing_c),
    NUM("temperature.cut_c", "Slab at the wide cut", DEGC, temperature.cut_c),
    NUM("temperature.zero_stress_c", "Slab at set, for isolation", DEGC, temperature.zero_stress_c),
    NUM("temperature.crack_zero_c", "Slab at set, for cracks", DEGC, temperature.crack_zero_c),
    NUM("temperature.deck_coldest_c", "Deck rule coldest, to compare", DEGC,
        temperature.deck_coldest_c),
    NUM("temperature.deck_hottest_c", "Deck rule hottest, to compare", DEGC,
        temperature.deck_hottest_c),
    NUM("temperature.estimate_coldest_c", "Estimate coldest, to compare", DEGC,
        temperature.estimate_coldest_c),
    NUM("temperature.estimate_hottest_c", "Estimate hottest, to compare", DEGC,
        temperature.estimate_hottest_c),
    NUM("temperature.day_k", "Top hotter than bottom, day", QUANTITY_DIFFERENCE, temperature.day_k),
    NUM("temperature.night_k", "Top colder than bottom, night", QUANTITY_DIFFERENCE,
        temperature.night_k),
    WORD("temperature.basis", "Temperatures are", temperature.basis),
    NUM("shrinkage.after_sealing", "Drying to come after sealing", QUANTITY_STRAIN,
        shrinkage.after_sealing),
    NUM("shrinkage.before_sealing", "Dried before sealing", QUANTITY_STRAIN,
        shrinkage.before_sealing),
    WORD("shrinkage.basis", "Drying by", shrinkage.basis),
    NUM("shrinkage.end_years", "Looked at for, years", QUANTITY_NONE, shrinkage.end_years),
    NUM("movement.open_m", "The widest joint opens by", MM, movement.open_m),
    NUM("movement.close_m", "and closes by", MM, movement.close_m),
    NUM("movement.panel_m", "Panel length of that joint", METRES, movement.panel_m),
    WORD("movement.basis", "Base holds back by", movement.basis),
    NUM("movement.factor", "Factor", QUANTITY_NONE, movement.factor),
    NUM("movement.factor_open_m", "Opens by, with the factor", MM, movement.factor_open_m),
    NUM("movement.factor_close_m", "Closes by, with the factor", MM, movement.factor_close_m),
    NUM("movement.friction_open_m", "Opens by, with friction", MM, movement.friction_open_m),
    NUM("movement.friction_close_m", "Closes by, with friction", MM, movement.friction_close_m),
    NUM("seal.width_m", "Joint width at sealing", MM, seal.width_m),
    NUM("seal.least_width_m", "Least width", MM, seal.least_width_m),
    NUM("seal.tolerance_m", "Width tolerance", MM, seal.tolerance_m),
    NUM("seal.depth_m", "Bead depth", MM, seal.depth_m),
    NUM("seal.recess_m", "Left low", MM, seal.recess_m),
    NUM("seal.extension", "Stretches", SHARE, seal.extension),
    NUM("seal.compression", "Is squeezed", SHARE, seal.compression),
    NUM("seal.cold_squeeze", "Squeeze left at the coldest", SHARE, seal.cold_squeeze),
    NUM("seal.follow_open_m", "Opening the seal can follow", MM, seal.follow_open_m),
    NUM("seal.follow_close_m", "Closing the seal can follow", MM, seal.follow_close_m),
    NUM("seal.extension_capacity", "Good for, stretch", SHARE, seal.extension_capacity),
    NUM("seal.compression_capacity", "Good for, squeeze", SHARE, seal.compression_capacity),
    NUM("seal.bead_strain", "Stretch at the curved edge of the bead", SHARE, seal.bead_strain),
    NUM("seal.rod_m", "Rod", MM, seal.rod_m),
    NUM("seal.bulge_m", "Bulge when closed", MM, seal.bulge_m),
    NUM("seal.cut_depth_m", "Depth of the wide cut", MM, seal.cut_depth_m),
    NUM("seal.next_down_m", "Next narrower blade", MM, seal.next_down_m),
    NUM("seal.next_down_extension", "stretches there", SHARE, seal.next_down_extension),
    NUM("seal.next_up_m", "Next wider blade", MM, seal.next_up_m),
    NUM("seal.next_up_extension", "stretches there", SHARE, seal.next_up_extension),
    NUM("seal.window_coldest_c", "May be sealed from", DEGC, seal.window_coldest_c),
    NUM("seal.window_hottest_c", "May be sealed up to", DEGC, seal.window_hottest_c),
    {"seal.verdict", "The seal", RESULT_VERDICT, QUANTITY_NONE, 1.0, AT(seal.verdict)},
    WORD("seal.basis", "Judged by", seal.basis),
    NUM("cut.least_m", "First cut at least", MM, cut.least_m),
    NUM("cut.most_m", "First cut at most", MM, cut.most_m),
    NUM("cut.set_m", "Set the saw to", MM, cut.set_m),
    TEXTED("saw.first_trial", "First trial cut", saw.first_trial),
    TEXTED("saw.no_later", "Longest strip cracks by itself", saw.no_later),
    TEXTED("saw.last_cut", "Last cut done", saw.last_cut),
    WORD("saw.policy", "Order of cuts", saw.policy),
    NUM("saw.set_h", "Sets after, hours", QUANTITY_NONE, saw.set_h),
    NUM("saw.set_c", "Slab then", DEGC, saw.set_c),
    NUM("saw.warmest_h", "Warmest after, hours", QUANTITY_NONE, saw.warmest_h),
    NUM("saw.warmest_c", "Slab then", DEGC, saw.warmest_c),
    NUM("saw.evaporation_kg_m2_h", "Drying of the fresh face, kg a m2 and hour", QUANTITY_NONE,
        saw.evaporation),
    NUM("saw.trial_factor", "Hours by your trial cuts", QUANTITY_NONE, saw.speed),
    NUM("saw.least_spare_h", "Tightest line to spare, hours", QUANTITY_NONE, saw.least_spare_h),
    NUM("saw.late_m", "Cut too late", METRES, saw.late_m),
    {"saw.saws_enough", "Saws that would do", RESULT_INT, QUANTITY_NONE, 1.0, AT(saw.saws_enough)},
    NUM("quantities.contraction_m", "Cut joints", METRES, quantities.contraction_m),
    NUM("quantities.construction_m", "Pour ends", METRES, quantities.construction_m),
    NUM("quantities.isolation_m", "Soft board", METRES, quantities.isolation_m),
    NUM("quantities.expansion_m", "Expansion joints", METRES, quantities.expansion_m),
    NUM("quantities.saw_m", "Sawing", METRES, quantities.saw_m),
    NUM("quantities.sealed_m", "Sealed", METRES, quantities.sealed_m),
    LITRES("quantities.sealant_net_l", "Sealant, net", quantities.sealant_net_m3),
    LITRES("quantities.sealant_cusps_l", "Beside the round rod", quantities.sealant_cusps_m3),
    LITRES("quantities.sealant_order_l", "Sealant to order", quantities.sealant_order_m3),
    LITRES("quantities.loss_l", "of it lost with the days", quantities.loss_m3),
    NUM("quantities.wide_cut_m", "Wide cut", METRES, quantities.wide_cut_m),
    NUM("quantities.tape_m", "Bond-breaker tape", METRES, quantities.tape_m),
    NUM("quantities.primer_m2", "Faces, if primed, m2", QUANTITY_NONE, quantities.primer_m2),
    NUM("quantities.pot_life_s", "Pot life then", QUANTITY_TIME, quantities.pot_life_s),
    LITRES("quantities.batch_most_l", "Batch at most", quantities.batch_most_m3),
    NUM("quantities.batch_m", "A batch fills", METRES, quantities.batch_m),
    NUM("quantities.hours", "Hours, slowest operation", QUANTITY_NONE, quantities.hours),
    NUM("quantities.days", "Days", QUANTITY_NONE, quantities.days),
    NUM("quantities.cost", "Cost, as far as priced", QUANTITY_NONE, quantities.cost),
    LITRES("quantities.board_order_l", "and over the soft board", quantities.board_order_m3),
    NUM("quantities.seal_m", "Compression seal to order", METRES, quantities.strip_m),
    NUM("quantities.filler_m2", "Board area, m2", QUANTITY_NONE, quantities.filler_m2),
    NUM("quantities.slab_m2", "Slab area, m2", QUANTITY_NONE, quantities.area_m2),
    NUM("quantities.concrete_m3", "Concrete, m3", QUANTITY_NONE, quantities.volume_m3),
    NUM("steel.dowel_diameter_m", "Dowel", MM, steel.dowel_diameter_m),
    NUM("steel.dowel_length_m", "Dowel length", MM, steel.dowel_length_m),
    NUM("steel.dowel_spacing_m", "Dowel spacing", MM, steel.dowel_spacing_m),
    {"steel.dowel_count", "Dowels", RESULT_INT, QUANTITY_NONE, 1.0, AT(steel.dowel_count)},
    NUM("steel.tie_diameter_m", "Tie bar", MM, steel.tie_diameter_m),
    NUM("steel.tie_spacing_m", "Tie bar spacing", MM, steel.tie_spacing_m),
    NUM("steel.tie_length_m", "Tie bar length", MM, steel.tie_length_m),
    NUM("steel.drag_steel_m2_per_m", "Mesh, m2 a metre", QUANTITY_NONE, steel.drag_steel_m2_per_m),
    NUM("restraint.edge_pa", "Curling stress, edge", QUANTITY_STRESS, restraint.edge_pa),
    NUM("restraint.interior_pa", "Curling stress, inside", QUANTITY_STRESS, restraint.interior_pa),
    NUM("restraint.lift_m", "Edge would lift", MM, restraint.lift_m),
    NUM("restraint.settlement_m", "Own weight presses down", MM, restraint.settlement_m),
    NUM("restraint.locked_pa", "Stress if locked, one way", QUANTITY_STRESS, restraint.locked_pa),
    NUM("restraint.locked_both_pa", "Stress if locked, both ways", QUANTITY_STRESS,
        restraint.locked_both_pa),
    NUM("restraint.lift_off_hinge_k", "Lift-off limit at a joint", QUANTITY_DIFFERENCE,
        restraint.lift_off_hinge_k),
    NUM("restraint.lift_off_continuous_k", "Lift-off limit between joints", QUANTITY_DIFFERENCE,
        restraint.lift_off_continuous_k),
    NUM("restraint.rise_left_k", "Rise left before lift-off is possible", QUANTITY_DIFFERENCE,
        restraint.rise_left_k),
};
const size_t result_count = sizeof result_table / sizeof *result_table;

#define COLUMN(key, label, type, quantity, scale, struct_name, member)                             \
    {                                                                                              \
        key, label, type, quantity, scale, offsetof(struct struct_name, member), 0                 \
    }
#define CNUM(s, key, label, quantity, member)                                                      \
    COLUMN(key, label, RESULT_NUMBER, quantity, 1.0, s, member)
#define CWORD(s, key, label, member) COLUMN(key, label, RESULT_WORD, QUANTITY_NONE, 1.0, s, member)
#define CTEXT(s, key, label, member) COLUMN(key, label, RESULT_TEXT, QUANTITY_NONE, 1.0, s, member)
#define CINT(s, key, label, member) COLUMN(key, label, RESULT_INT, QUANTITY_NONE, 1.0, s, member)
#define CVERDICT(s, member)                                                                        \
    COLUMN("verdict", "verdict", RESULT_VERDICT, QUANTITY_NONE, 1.0, s, member)
#define COUNT(table) (sizeof(table) / sizeof *(table))

static const struct column limit_columns[] = {
    CWORD(plan_limit, "rule", "rule", rule),
    CNUM(plan_limit, "limit_m", "limit", METRES, limit_m),
    CTEXT(plan_limit, "words", "in words", words),
    CWORD(plan_limit, "source", "source", source),
    COLUMN("applies", "applies", RESULT_APPLIES, QUANTITY_NONE, 1.0, plan_limit, applies),
};
static const struct column working_columns[] = {
    CINT(plan_working, "n", "1 in", n),
    CNUM(plan_working, "open_m", "opens by", MM, open_m),
    CNUM(plan_working, "close_m", "closes by", MM, close_m),
    CNUM(plan_working, "extension", "stretch", SHARE, extension),
    CNUM(plan_working, "compression", "squeeze", SHARE, compression),
    CVERDICT(plan_working, verdict),
};
static const struct column table_columns[] = {
    CNUM(plan_table_row, "slab_c", "slab", DEGC, slab_c),
    CNUM(plan_table_row, "gap_m", "width", MM, gap_m),
    CNUM(plan_table_row, "least_m", "least width", MM, least_m),
    CNUM(plan_table_row, "extension", "stretch", SHARE, extension),
    CNUM(plan_table_row, "compression", "squeeze", SHARE, compression),
    COLUMN("too_cold", "too cold", RESULT_BOOL, QUANTITY_NONE, 1.0, plan_table_row, too_cold),
    CVERDICT(plan_table_row, verdict),
};
static const struct column choice_columns[] = {
    CWORD(plan_choice, "kind", "kind", kind),
    COLUMN("fits", "fits", RESULT_BOOL, QUANTITY_NONE, 1.0, plan_choice, fits),
    CNUM(plan_choice, "width_m", "width", MM, width_m),
    CNUM(plan_choice, "depth_m", "depth", MM, depth_m),
    CNUM(plan_choice, "extension", "stretch", SHARE, extension),
    CNUM(plan_choice, "compression", "squeeze", SHARE, compression),
    CTEXT(plan_choice, "reason", "why not", reason),
    CTEXT(plan_choice, "remark", "mind", remark),
};
static const struct column isolation_columns[] = {
    CTEXT(plan_isolation, "where", "where", where),
    CNUM(plan_isolation, "length_m", "length", METRES, length_m),
    CNUM(plan_isolation, "run_m", "pushed by", METRES, run_m),
    CNUM(plan_isolation, "from_c", "from", DEGC, from_c),
    CNUM(plan_isolation, "expansion_m", "takes up", MM, expansion_m),
    CNUM(plan_isolation, "filler_m", "board", MM, filler_m),
    CNUM(plan_isolation, "least_filler_m", "board at least", MM, least_filler_m),
    CNUM(plan_isolation, "extension", "stretch", SHARE, extension),
    CNUM(plan_isolation, "compression", "squeeze", SHARE, compression),
    CVERDICT(plan_isolation, verdict),
};
static const struct column check_columns[] = {
    CTEXT(plan_check, "id", "check", id),
    CTEXT(plan_check, "label", "what", label),
    CNUM(plan_check, "demand", "is", QUANTITY_NONE, demand),
    CNUM(plan_check, "capacity", "limit", QUANTITY_NONE, capacity),
    CWORD(plan_check, "unit", "unit", unit),
    COLUMN("binding", "binding", RESULT_BOOL, QUANTITY_NONE, 1.0, plan_check, binding),
    CVERDICT(plan_check, verdict),
    CTEXT(plan_check, "source", "source", source),
    CTEXT(plan_check, "remedy", "what to do", remedy),
};
static const struct column pour_columns[] = {
    CINT(plan_pour, "number", "pour", number),
    CINT(plan_pour, "panels", "panels", panels),
    CNUM(plan_pour, "area_m2", "area, m2", QUANTITY_NONE, area_m2),
    CNUM(plan_pour, "volume_m3", "concrete, m3", QUANTITY_NONE, volume_m3),
    CINT(plan_pour, "turn", "turn", turn),
    CINT(plan_pour, "trucks", "trucks", trucks),
    CNUM(plan_pour, "hours", "hours", QUANTITY_NONE, hours),
};
static const struct column cut_columns[] = {
    CINT(plan_cut, "order", "no.", order),
    CTEXT(plan_cut, "line", "line", line),
    CINT(plan_cut, "part", "part", part),
    CINT(plan_cut, "pour", "pour", pour),
    CINT(plan_cut, "saw", "saw", saw),
    CNUM(plan_cut, "length_m", "length", METRES, length_m),
    CTEXT(plan_cut, "start", "start", start),
    CTEXT(plan_cut, "not_before", "not before", not_before),
    CTEXT(plan_cut, "not_after", "not after", not_after),
    CNUM(plan_cut, "spare_h", "to spare, hours", QUANTITY_NONE, spare_h),
    COLUMN("late", "too late", RESULT_BOOL, QUANTITY_NONE, 1.0, plan_cut, late),
};
static const struct column stop_columns[] = {
    CINT(plan_stop, "truck", "after truck", truck),
    CINT(plan_stop, "pour", "pour", pour),
    CNUM(plan_stop, "volume_m3", "concrete, m3", QUANTITY_NONE, volume_m3),
    CNUM(plan_stop, "front_m", "front at", METRES, front_m),
    CTEXT(plan_stop, "joint", "stop at line", joint),
    CNUM(plan_stop, "joint_m", "there", METRES, joint_m),
    CNUM(plan_stop, "more_m3", "still to place, m3", QUANTITY_NONE, more_m3),
};
static const struct column crack_columns[] = {
    CINT(plan_crack, "number", "crack", number),
    CNUM(plan_crack, "length_m", "length", METRES, length_m),
    CINT(plan_crack, "panels", "panels crossed", panels_crossed),
    CTEXT(plan_crack, "beside", "beside joint", beside),
    CNUM(plan_crack, "distance_m", "away by", MM, distance_m),
};
static const struct column package_columns[] = {
    COLUMN("size_l", "size", RESULT_NUMBER, QUANTITY_VOLUME, 1000.0, plan_package, size_m3),
    CINT(plan_package, "count", "packs", count),
};
static const struct column work_columns[] = {
    CWORD(plan_work, "name", "work", name),
    CNUM(plan_work, "length_m", "length", METRES, length_m),
    CNUM(plan_work, "pace_m_s", "pace of one", QUANTITY_PACE, pace_m_s),
    CNUM(plan_work, "tools", "of them", QUANTITY_NONE, tools),
    CNUM(plan_work, "hours", "hours", QUANTITY_NONE, hours),
    COLUMN("slowest", "slowest", RESULT_BOOL, QUANTITY_NONE, 1.0, plan_work, slowest),
};
static const struct column width_columns[] = {
    CNUM(plan_width, "width_m", "width", MM, width_m),
    CNUM(plan_width, "depth_m", "depth", MM, depth_m),
    CNUM(plan_width, "extension", "stretch", SHARE, extension),
    CNUM(plan_width, "compression", "squeeze", SHARE, compression),
    CVERDICT(plan_width, verdict),
    COLUMN("when_n3", "if 1 in 3", RESULT_VERDICT, QUANTITY_NONE, 1.0, plan_width, when_n3),
    COLUMN("order_l", "order", RESULT_NUMBER, QUANTITY_VOLUME, 1000.0, plan_width, order_m3),
    CINT(plan_width, "packs", "packs", packs),
    CNUM(plan_width, "rod_m", "rod", MM, rod_m),
    COLUMN("now", "now", RESULT_BOOL, QUANTITY_NONE, 1.0, plan_width, now),
};
static const struct column board_columns[] = {
    CNUM(plan_board, "thickness_m", "board", MM, thickness_m),
    CNUM(plan_board, "length_m", "length", METRES, length_m),
    CNUM(plan_board, "area_m2", "area, m2", QUANTITY_NONE, area_m2),
};
static const struct column rod_columns[] = {
    CNUM(plan_rod, "diameter_m", "rod", MM, diameter_m),
    CNUM(plan_rod, "length_m", "length", METRES, length_m),
};
#define JNUM(key, label, quantity, member)                                                         \
    {                                                                                              \
        key, label, RESULT_NUMBER, quantity, 1.0, offsetof(struct plan_joint, member), 1           \
    }
static const struct column joint_columns[] = {
    CTEXT(layout_joint, "id", "joint", id),
    {"kind", "kind", RESULT_KIND, QUANTITY_NONE, 1.0, 0, 0},
    CNUM(layout_joint, "x1", "x1", METRES, x1),
    CNUM(layout_joint, "y1", "y1", METRES, y1),
    CNUM(layout_joint, "x2", "x2", METRES, x2),
    CNUM(layout_joint, "y2", "y2", METRES, y2),
    JNUM("length_m", "length", METRES, length_m),
    {"tied", "tied", RESULT_BOOL, QUANTITY_NONE, 1.0, offsetof(struct plan_joint, tied), 1},
    JNUM("open_m", "opens by", MM, open_m),
    JNUM("close_m", "closes by", MM, close_m),
    JNUM("width_m", "width", MM, width_m),
    JNUM("extension", "stretch", SHARE, extension),
    JNUM("compression", "squeeze", SHARE, compression),
    {"verdict", "verdict", RESULT_VERDICT, QUANTITY_NONE, 1.0, offsetof(struct plan_joint, verdict),
     1},
};

#define ROWS(name, array, count)                                                                   \
    static size_t name(const struct plan *plan, const void *arrays[2])                             \
    {                                                                                              \
        arrays[0] = plan->array;                                                                   \
        arrays[1] = NULL;                                                                          \
        return plan->count;                                                                        \
    }
ROWS(limit_rows, spacing.rows, spacing.count)
ROWS(working_rows, working, working_count)
ROWS(table_rows, table, table_count)
ROWS(choice_rows, choices, choice_count)
ROWS(isolation_rows, isolation, isolation_count)
ROWS(check_rows, checks, check_count)
ROWS(pour_rows, pours, pour_count)
ROWS(cut_rows, saw.cuts, saw.cut_count)
ROWS(stop_rows, saw.stops, saw.stop_count)
ROWS(crack_rows, cracks, crack_count)
ROWS(package_rows, quantities.packages, quantities.package_count)
ROWS(work_rows, quantities.works, quantities.work_count)
ROWS(width_rows, quantities.widths, quantities.width_count)
ROWS(board_rows, quantities.boards, quantities.board_count)
ROWS(rod_rows, quantities.rods, quantities.rod_count)

static size_t joint_rows(const struct plan *plan, const void *arrays[2])
{
    arrays[0] = plan->layout.joints;
    arrays[1] = plan->joints;
    return plan->joints != NULL ? plan->layout.joint_count : 0;
}

#define LIST(name, columns, type, rows)                                                            \
    {                                                                                              \
        name, columns, COUNT(columns), {sizeof(struct type), 0}, rows                              \
    }
const struct list list_table[] = {
    LIST("spacing.limits", limit_columns, plan_limit, limit_rows),
    LIST("working", working_columns, plan_working, working_rows),
    LIST("sealing_table", table_columns, plan_table_row, table_rows),
    LIST("choice", choice_columns, plan_choice, choice_rows),
    LIST("isolation", isolation_columns, plan_isolation, isolation_rows),
    LIST("checks", check_columns, plan_check, check_rows),
    LIST("pours", pour_columns, plan_pour, pour_rows),
    LIST("saw.order", cut_columns, plan_cut, cut_rows),
    LIST("saw.stops", stop_columns, plan_stop, stop_rows),
    LIST("cracks", crack_columns, plan_crack, crack_rows),
    LIST("quantities.packages", package_columns, plan_package, package_rows),
    LIST("quantities.rod_m", rod_columns, plan_rod, rod_rows),
    LIST("quantities.boards", board_columns, plan_board, board_rows),
    LIST("quantities.work", work_columns, plan_work, work_rows),
    LIST("quantities.other_widths", width_columns, plan_width, width_rows),
    {"joints",
     joint_columns,
     COUNT(joint_columns),
     {sizeof(struct layout_joint), sizeof(struct plan_joint)},
     joint_rows},
};
const size_t list_count = COUNT(list_table);

const struct result *result_find(const char *path)
{
    for (size_t i = 0; i < result_count; i++)
        if (strcmp(result_table[i].path, path) == 0)
            return &result_table[i];
    return NULL;
}

const struct list *list_find(const char *name)
{
    for (size_t i = 0; i < list_count; i++)
        if (strcmp(list_table[i].name, name) == 0)
            return &list_table[i];
    return NULL;
}

double result_number(const struct result *result, const struct plan *plan)
{
    double value;

    if (result->type != RESULT_NUMBER)
        return NAN;
    memcpy(&value, (const char *)plan + result->offset, sizeof value);
    return value;
}

bool result_there(const struct result *result, const struct plan *plan)
{
    const char *place = (const char *)plan + result->offset;

    switch (result->type) {
    case RESULT_NUMBER:
        return isfinite(result_number(result, plan));
    case RESULT_WORD:
        return *(const char *const *)(const void *)place != NULL;
    case RESULT_TEXT:
        return place[0] != '\0';
    case RESULT_INT:
        return *(const int *)(const void *)place != 0;
    case RESULT_VERDICT:
        return *(const enum verdict *)(const void *)place != VERDICT_NONE;
    default:
        return true;
    }
}

void check_show(struct text *out, double value, const char *unit, enum unit_system system)
{
    enum quantity quantity = QUANTITY_NONE;

    if (strcmp(unit, "ratio") == 0)
        quantity = QUANTITY_RATIO;
    else if (strcmp(unit, "m") == 0)
        quantity = fabs(value) < 0.3 ? QUANTITY_SMALL_LENGTH : QUANTITY_LENGTH;
    else if (strcmp(unit, "Pa") == 0)
        quantity = QUANTITY_STRESS;
    else if (strcmp(unit, "degC") == 0)
        quantity = QUANTITY_TEMPERATURE;
    if (isfinite(value))
        unit_show(out, value, quantity, system);
    else
        text_add(out, "-");
}

const char *applies_word(enum applies applies)
{
    static const char *const words[] = {"governs", "advice", "no"};

    return words[applies];
}

const char *joint_kind_word(const struct layout_joint *joint)
{
    static const char *const words[] = {"contraction", "construction", "isolation"};

    return joint->expansion ? "expansion" : words[joint->kind];
}

static void show(struct text *out, enum result_type type, enum quantity quantity, const void *place,
                 enum unit_system units)
{
    switch (type) {
    case RESULT_NUMBER:
        unit_show(out, *(const double *)place, quantity, units);
        break;
    case RESULT_INT:
        text_format(out, "%d", *(const int *)place);
        break;
    case RESULT_WORD:
        text_add(out, *(const char *const *)place ? *(const char *const *)place : "none");
        break;
    case RESULT_TEXT:
        text_add(out, (const char *)place);
        break;
    case RESULT_BOOL:
        text_add(out, *(const bool *)place ? "yes" : "no");
        break;
    case RESULT_VERDICT:
        text_add(out, verdict_screen_word(*(const enum verdict *)place));
        break;
    case RESULT_APPLIES:
        text_add(out, applies_word(*(const enum applies *)place));
        break;
    case RESULT_KIND:
        text_add(out, joint_kind_word((const struct layout_joint *)place));
        break;
    }
}

void result_show(struct text *out, const struct result *result, const struct plan *plan,
                 enum unit_system units)
{
    if (result->type == RESULT_TEXT && !result_there(result, plan))
        text_add(out, "none");
    else
        show(out, result->type, result->quantity, (const char *)plan + result->offset, units);
}

void column_show(struct text *out, const struct column *column, const void *place,
                 enum unit_system units)
{
    show(out, column->type, column->quantity, place, units);
}

const void *column_place(const struct list *list, const struct column *column,
                         const void *const arrays[2], size_t row)
{
    return (const char *)arrays[column->part] + row * list->size[column->part] + column->offset;
}
