/* The formulas behind the rows of the lists, column by column. */
#include "plan/why_table.h"
#include <string.h>

static bool by_factor(const struct plan *plan)
{
    return plan->job.sealing_movement == MOVEMENT_FACTOR;
}

static bool board_typed(const struct plan *plan)
{
    return plan->job.given[FIELD_isolation_filler];
}

#define EXPANSION                                                                                  \
    {                                                                                              \
        "a", "thermal expansion", "concrete.expansion_k"                                           \
    }
#define SEALING                                                                                    \
    {                                                                                              \
        "Ts", "slab at sealing", "temperature.sealing_c"                                           \
    }
#define COLDEST                                                                                    \
    {                                                                                              \
        "Tmin", "slab coldest", "temperature.coldest_c"                                            \
    }
#define HOTTEST                                                                                    \
    {                                                                                              \
        "Tmax", "slab hottest", "temperature.hottest_c"                                            \
    }
#define AT_SET                                                                                     \
    {                                                                                              \
        "T0", "slab at set", "temperature.zero_stress_c"                                           \
    }
#define THICKNESS                                                                                  \
    {                                                                                              \
        "h", "thickness", "slab.thickness"                                                         \
    }
#define TOLERANCE                                                                                  \
    {                                                                                              \
        "tolerance", "width tolerance", "sealing.tolerance"                                        \
    }

static const struct why_row rows[] = {
    /* one joint in n works */
    {"working.n working.open_m working.close_m",
     by_factor,
     "open(n) = n x open, close(n) = n x close",
     "the joint that works takes n panels; free between them [derived]",
     "Joints between two that work have not cracked, or rusted dowels lock them.",
     {{"n", "one cut works in", ".n"},
      {"open", "when every cut works", "movement.open_m"},
      {"close", "when every cut works", "movement.close_m"}}},
    {"working.n working.open_m working.close_m",
     NULL,
     "open(n) = n L [a (Ts - Tmin) + e], close(n) = n L a (Tmax - Ts)",
     "the joint that works takes n panels; free between them [derived]",
     "For n = 1 the base holds some back; longer bars are taken to move freely.",
     {{"n", "one cut works in", ".n"},
      {"L", "mean length of the two panels", "movement.panel_m"},
      EXPANSION,
      SEALING,
      COLDEST,
      HOTTEST,
      {"e", "drying to come", "shrinkage.after_sealing"}}},
    {"working.extension working.compression working.verdict",
     NULL,
     "stretch = open(n)/W, squeeze = close(n)/W; the verdict takes W - tolerance",
     "ASTM C920: change of width, each way, from the width at sealing",
     "Look after the first cold spell: count the cuts that have cracked.",
     {{"open", "opens by", ".open_m"},
      {"close", "closes by", ".close_m"},
      {"W", "width at sealing", "seal.width_m"},
      TOLERANCE,
      {"good for", "the sealant, stretch", "seal.extension_capacity"},
      {"good for", "the sealant, squeeze", "seal.compression_capacity"}}},
    /* sealing table */
    {"sealing_table.slab_c sealing_table.gap_m sealing_table.too_cold",
     NULL,
     "gap(T) = W + K a (Tc - T)",
     "width of the joint as cut when the slab is at T [derived]",
     "Too cold: below the specification's least temperature.",
     {{"T", "slab then", ".slab_c"},
      {"W", "width as cut", "seal.width_m"},
      {"Tc", "slab at the wide cut", "temperature.cut_c"},
      {"K", "mean panel, held back by the base", "movement.panel_m"},
      EXPANSION,
      {"least", "to seal at", "sealing.least-temperature"}}},
    {"sealing_table.least_m",
     NULL,
     "least(T) = max(K [a (T - Tmin) + e]/stretch, K a (Tmax - T)/squeeze) + tolerance",
     "ASTM C1472 form: movement over the movement class",
     "Measured when the slab is at T.",
     {{"T", "slab then", ".slab_c"},
      {"K", "mean panel, held back by the base", "movement.panel_m"},
      EXPANSION,
      COLDEST,
      HOTTEST,
      {"e", "drying to come", "shrinkage.after_sealing"},
      {"stretch", "good for", "seal.extension_capacity"},
      TOLERANCE}},
    {"sealing_table.extension sealing_table.compression sealing_table.verdict",
     NULL,
     "stretch = K [a (T - Tmin) + e]/gap(T), squeeze = K a (Tmax - T)/gap(T)",
     "ASTM C920: change of width, each way, from the width at sealing",
     "The verdict takes the gap less the tolerance.",
     {{"T", "slab then", ".slab_c"},
      {"gap", "width then", ".gap_m"},
      {"K", "mean panel, held back by the base", "movement.panel_m"},
      EXPANSION,
      COLDEST,
      HOTTEST,
      {"e", "drying to come", "shrinkage.after_sealing"},
      TOLERANCE}},
    /* choice of the sealant */
    {"choice.kind choice.fits choice.reason choice.remark",
     NULL,
     "fits = a blade in its widths holds with room, the slot is deep enough, place and day suit it",
     "common practice, from memory; the tin's data sheet wins",
     "With the kind's usual class; the job's own kind with its own.",
     {{"width", "narrowest that holds", ".width_m"},
      {"depth", "bead then", ".depth_m"},
      {"not", "because", ".reason"},
      {"mind", "all the same", ".remark"},
      SEALING,
      {"slot", "first cut at most", "cut.most_m"}}},
    {"choice.width_m choice.depth_m choice.extension choice.compression",
     NULL,
     "W = narrowest blade of the kind with open/W <= 0.9 stretch, close/W <= 0.9 squeeze; D by "
     "kind",
     "ASTM C920 classes; widths and depths of kinds: common practice, from memory",
     "The wider of the movements that count: all cuts working, or one in n as typed.",
     {{"open", "opens by", "movement.open_m"},
      {"close", "closes by", "movement.close_m"},
      {"W", "width", ".width_m"},
      {"D", "depth", ".depth_m"},
      TOLERANCE}},
    /* soft board */
    {"isolation.where isolation.length_m",
     NULL,
     "length = sum of the pieces of joint that lie there",
     "geometry",
     "For the plan as drawn.",
     {{"pushed by", "slab behind it", ".run_m"}}},
    {"isolation.run_m",
     NULL,
     "run = half of the longest stretch of slab behind it; all of it when its far end is fixed or "
     "tied",
     "a slab free at both ends grows from its middle [derived]",
     "No credit for friction. Construction and sawn joints pass the push on.",
     {{"length", "of board here", ".length_m"}}},
    {"isolation.from_c",
     NULL,
     "T0 = slab at set",
     "cautious: no heat of hydration; from memory",
     "Above it the slab pushes.",
     {AT_SET, {"typed", "set at", "pour.zero-stress-temperature"}}},
    {"isolation.expansion_m",
     NULL,
     "expansion = a (Tmax - T0) x run",
     "free thermal strain, factor 1 [derived]",
     "No credit for drying, creep or friction.",
     {EXPANSION, HOTTEST, AT_SET, {"run", "pushed by", ".run_m"}}},
    {"isolation.least_filler_m",
     NULL,
     "board at least = expansion/share it gives",
     "ACI 302.1R form: board wider than the movement over what it gives",
     "The share is the maker's: typed wins.",
     {{"expansion", "takes up", ".expansion_m"}, {"share", "board gives", "isolation.share"}}},
    {"isolation.filler_m",
     board_typed,
     "board = what you typed",
     "your own number",
     "Judged like any other.",
     {{"typed", "board", "isolation.filler"}, {"least", "board at least", ".least_filler_m"}}},
    {"isolation.filler_m",
     NULL,
     "board = thinnest in stock from 10 mm whose room and whose seal are used to 0.9 at most",
     "stock sizes and 10 mm: common practice, from memory",
     "The thickest in stock when none is enough; then it fails.",
     {{"least", "board at least", ".least_filler_m"},
      {"stretch", "of its seal", ".extension"},
      {"squeeze", "of its seal", ".compression"},
      TOLERANCE}},
    {"isolation.extension isolation.compression isolation.verdict",
     NULL,
     "W = board - a (Ts - T0) x run; squeeze = a (Tmax - Ts) x run/W; stretch = open/W of the slab "
     "beside it",
     "ASTM C920: change of width, each way, from the width at sealing",
     "The verdict takes the worse of board and seal, tolerance in.",
     {{"board", "board", ".filler_m"},
      {"run", "pushed by", ".run_m"},
      EXPANSION,
      SEALING,
      HOTTEST,
      AT_SET,
      {"e", "drying to come", "shrinkage.after_sealing"},
      TOLERANCE}},
    /* pours and cracks */
    {"pours.number pours.panels pours.area_m2 pours.volume_m3",
     NULL,
     "a pour = the panels no construction or isolation joint parts; volume = area x h",
     "geometry",
     "For the plan as drawn; no waste in it.",
     {{"area", "m2", ".area_m2"}, THICKNESS, {"panels", "in it", ".panels"}}},
    {"pours.turn",
     NULL,
     "every other strip first, the ones between them after",
     "common practice",
     "So that every strip has a firm form beside it.",
     {{"pour", "number", ".number"}, {"along", "direction", "pours.direction"}}},
    {"pours.trucks pours.hours",
     NULL,
     "trucks = volume/what one carries; hours = volume/rate",
     "geometry",
     "No waste in it.",
     {{"volume", "m3", ".volume_m3"},
      {"truck", "carries", "pour.truck"},
      {"rate", "concrete comes", "pour.rate"}}},
    {"saw.order.order saw.order.line saw.order.part saw.order.pour saw.order.saw "
     "saw.order.length_m saw.order.start saw.order.not_before saw.order.not_after "
     "saw.order.spare_h saw.order.late",
     NULL,
     "not before: its concrete's edge is sharp; not after: the stretch it stands in then cracks by "
     "itself; start: when a saw is free",
     "early-age model (why saw.first_trial, saw.no_later); the stretch by the cuts made before",
     "Lines along the way the concrete comes are cut in parts of two hours of placing.",
     {{"length", "to saw", ".length_m"},
      {"not before", "", ".not_before"},
      {"not after", "", ".not_after"},
      {"start", "", ".start"},
      {"spare", "hours", ".spare_h"},
      {"pace", "of one saw", "sawing.pace"}}},
    {"saw.stops.truck saw.stops.pour saw.stops.volume_m3 saw.stops.front_m saw.stops.joint "
     "saw.stops.joint_m saw.stops.more_m3",
     NULL,
     "front = where the area behind it x h is the volume placed; joint = planned line nearest to "
     "it",
     "geometry; stop ends at planned joints: common practice",
     "The front stands square to the way the concrete comes.",
     {{"volume", "placed, m3", ".volume_m3"},
      {"front", "at", ".front_m"},
      {"joint", "at", ".joint_m"},
      {"more", "to get there, m3", ".more_m3"},
      THICKNESS}},
    {"cracks.number cracks.length_m cracks.panels",
     NULL,
     "length and panels crossed of the line you drew",
     "geometry, a sample each 50 mm",
     "Each panel crossed counts as two from now on.",
     {{"length", "of the crack", ".length_m"}, {"panels", "crossed", ".panels"}}},
    {"cracks.beside cracks.distance_m",
     NULL,
     "beside = nearest sawn joint within 1/4 of the spacing and 20 degrees",
     "common practice: no sawing beside a crack; the bounds are from memory",
     "The crack does that joint's work.",
     {{"joint", "beside", ".beside"},
      {"away", "mean distance", ".distance_m"},
      {"spacing", "limit", "spacing.limit_m"}}},
    /* take-off */
    {"quantities.packages.size_l quantities.packages.count",
     NULL,
     "of all mixes that cover the order: least left over, then fewest packs",
     "exact search over whole packs",
     "The first size in whole boxes when a box is typed.",
     {{"order", "sealant", "quantities.sealant_order_l"},
      {"sizes", "packs", "takeoff.packages"},
      {"box", "packs in it", "takeoff.box"}}},
    {"quantities.rod_m.diameter_m quantities.rod_m.length_m",
     NULL,
     "rod = next stock size from 1.25 W; length = 1.05 x sealed",
     "common practice: a quarter wider than the joint, 5 % spare",
     "Pressed in, not stretched.",
     {{"W", "width at sealing", "seal.width_m"},
      {"typed", "rod", "sealant.rod"},
      {"sealed", "sealed", "quantities.sealed_m"}}},
    {"quantities.boards.thickness_m quantities.boards.length_m quantities.boards.area_m2",
     NULL,
     "length = sum of the joints with this board; area = length x h",
     "geometry",
     "No waste in it.",
     {{"length", "of it", ".length_m"}, THICKNESS}},
    {"quantities.work.name quantities.work.length_m quantities.work.pace_m_s quantities.work.tools "
     "quantities.work.hours quantities.work.slowest",
     NULL,
     "hours = length/(pace of one x tools); the slowest sets the crew's",
     "FHWA-RD-99-147 Table 8; gun from memory",
     "The operations follow each other along the joint.",
     {{"length", "sealed", ".length_m"}, {"pace", "of one", ".pace_m_s"}, {"tools", "", ".tools"}}},
    {"quantities.other_widths.width_m quantities.other_widths.depth_m "
     "quantities.other_widths.extension quantities.other_widths.compression "
     "quantities.other_widths.verdict quantities.other_widths.when_n3 "
     "quantities.other_widths.order_l quantities.other_widths.packs quantities.other_widths.rod_m "
     "quantities.other_widths.now",
     NULL,
     "stretch = open/W, squeeze = close/W; order = (W D + beside the rod) x sealed x (1 + waste)",
     "as for the job's own width, with the kind's depth",
     "From the blade below the first that holds to the first that takes 1 cut in 3.",
     {{"W", "width", ".width_m"},
      {"D", "depth", ".depth_m"},
      {"open", "opens by", "movement.open_m"},
      {"close", "closes by", "movement.close_m"},
      {"sealed", "sealed", "quantities.sealed_m"},
      {"waste", "waste", "takeoff.waste"}}},
    /* joints */
    {"joints.tied",
     NULL,
     "tied = ties across it, or a strip joint typed as tied",
     "the job: slab.ties, pours.along",
     "A tied joint does not open.",
     {{"ties", "bars", "slab.ties"}, {"strips", "along", "pours.along"}}},
    {"joints.open_m joints.close_m joints.width_m joints.extension joints.compression "
     "joints.verdict",
     NULL,
     "over soft board: as the board's row (isolation), opened by the slab beside it",
     "ASTM C920; free thermal strain, factor 1",
     "Tied joints have none.",
     {{"W", "board", ".width_m"},
      {"open", "opens by", ".open_m"},
      {"close", "closes by", ".close_m"},
      EXPANSION,
      AT_SET}},
    {"joints.id joints.kind joints.x1 joints.y1 joints.x2 joints.y2 joints.length_m",
     NULL,
     "place and kind by the layout: fewest metres of joint that break no rule",
     "rules of the layout (report, LAYOUT)",
     "Named from the left to the right, then from the bottom up.",
     {{"limit", "spacing limit", "spacing.limit_m"},
      {"shape", "most long to wide", "rules.aspect"},
      {"side", "least side", "rules.least-side"},
      {"length", "of this piece", ".length_m"}}},
};

/* What a row of a list is asked about when no column is named. */
static const struct {
    const char *list, *column;
} principals[] = {
    {"working", "extension"},
    {"sealing_table", "gap_m"},
    {"choice", "fits"},
    {"isolation", "filler_m"},
    {"checks", "demand"},
    {"spacing.limits", "limit_m"},
    {"pours", "volume_m3"},
    {"saw.order", "start"},
    {"saw.stops", "joint"},
    {"cracks", "beside"},
    {"quantities.packages", "count"},
    {"quantities.rod_m", "length_m"},
    {"quantities.boards", "length_m"},
    {"quantities.work", "hours"},
    {"quantities.other_widths", "extension"},
    {"joints", "open_m"},
};

const struct why_row *why_list_find(const struct plan *plan, const char *path)
{
    return why_row_in(rows, sizeof rows / sizeof *rows, plan, path);
}

const char *why_list_principal(const char *list)
{
    for (size_t i = 0; i < sizeof principals / sizeof *principals; i++)
        if (strcmp(principals[i].list, list) == 0)
            return principals[i].column;
    return "";
}
