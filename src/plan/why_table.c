#include "plan/why_table.h"
#include <math.h>
#include <string.h>

static bool by_factor(const struct plan *plan)
{
    return plan->job.sealing_movement == MOVEMENT_FACTOR;
}

static bool by_shrinkage_aci(const struct plan *plan)
{
    return plan->job.concrete_shrinkage_model == SHRINKAGE_ACI209;
}

static bool by_shrinkage_mc(const struct plan *plan)
{
    return plan->job.concrete_shrinkage_model == SHRINKAGE_MC2010;
}

static bool by_shrinkage_en(const struct plan *plan)
{
    return plan->job.concrete_shrinkage_model == SHRINKAGE_EN1992;
}

static bool practice_us(const struct plan *plan)
{
    return plan->job.job_practice == PRACTICE_US;
}

static bool temperature_estimated(const struct plan *plan)
{
    return plan->temperature.basis != NULL && strcmp(plan->temperature.basis, "estimate") == 0;
}

static bool spacing_typed(const struct plan *plan)
{
    return plan->job.given[FIELD_rules_spacing];
}

static bool length_typed(const struct plan *plan)
{
    return plan->quantities.length_typed;
}

static const struct why_row rows[] = {
    {"spacing.limit_m spacing.across_limit_m", spacing_typed, "limit = what you typed",
     "your own limit; the rule stands beside it", "Any spacing you answer for.",
     {{"typed", "spacing limit", "rules.spacing"},
      {"rule", "the rules alone", "spacing.rule_limit_m"}}},
    {"spacing.limit_m spacing.across_limit_m spacing.rule_limit_m spacing.governed_by", NULL,
     "limit = least of the rows that count (report, SPACING)",
     "row by row in the report; methods of the chosen practice",
     "Plain slabs on ground; local experience and the drawing overrule it.",
     {{"practice", "whose usual values", "job.practice"},
      {"use", "used as", "slab.use"},
      {"h", "thickness", "slab.thickness"},
      {"base", "lies on", "base.kind"}}},
    {"concrete.strength_pa", NULL, "fck = characteristic cylinder strength",
     "EN 1992-1-1 3.1.2; a cube class counts by its cylinder figure", "12 to 90 MPa.",
     {{"typed", "strength", "concrete.strength"}}},
    {"concrete.modulus_pa", practice_us, "E = 4700 sqrt(f'c) MPa", "ACI 318-19 19.2.2.1",
     "Normal weight concrete at 28 days.",
     {{"f'c", "cylinder strength", "concrete.strength_pa"}}},
    {"concrete.modulus_pa", NULL, "E = 22 (fcm/10)^0.3 GPa, fcm = fck + 8 MPa",
     "EN 1992-1-1 Table 3.1", "Normal weight concrete at 28 days.",
     {{"fck", "cylinder strength", "concrete.strength_pa"}}},
    {"concrete.tensile_pa", NULL,
     "fctm = 0.30 fck^(2/3) up to C50/60, above 2.12 ln(1 + fcm/10) MPa", "EN 1992-1-1 Table 3.1",
     "At 28 days.", {{"fck", "cylinder strength", "concrete.strength_pa"}}},
    {"concrete.rupture_pa", practice_us, "fr = 0.62 sqrt(f'c) MPa", "ACI 318-19 19.2.3.1",
     "Normal weight concrete.", {{"f'c", "cylinder strength", "concrete.strength_pa"}}},
    {"concrete.rupture_pa", NULL, "fr = fctm (1.6 - h/1000 mm), at least fctm",
     "EN 1992-1-1 (3.23)", "Depth in mm.",
     {{"fctm", "tensile strength", "concrete.tensile_pa"}, {"h", "thickness", "slab.thickness"}}},
    {"concrete.expansion_k", NULL, "a = typed, else by the stone, else 10e-6 /K",
     "FHWA-HRT-12-030 (2012) Table 47; EN 1992-1-1 3.1.3(5)",
     "Values from the older AASHTO TP 60 test read about 0.83e-6 /degF too high.",
     {{"typed", "expansion", "concrete.expansion"}, {"stone", "aggregate", "concrete.aggregate"}}},
    {"concrete.stiffness_radius_m", NULL, "l = [E h^3/(12 (1 - 0.15^2) k)]^(1/4)",
     "Westergaard (1926)", "k is known to about half: l then to a fifth.",
     {{"E", "modulus of elasticity", "concrete.modulus_pa"},
      {"h", "thickness", "slab.thickness"},
      {"k", "modulus of subgrade", "base.subgrade-modulus"}}},
    {"temperature.coldest_c", temperature_estimated,
     "coldest = typed, else the coldest air temperature", "cautious estimate, no publication",
     "Thin slabs on ground stay near the air of a cold week.",
     {{"air", "air coldest", "climate.air-coldest"}}},
    {"temperature.hottest_c", temperature_estimated,
     "hottest = typed, else the air of the hottest day and the sun, at mid-depth",
     "Barber, Calculation of maximum pavement temperatures, HRB Bulletin 168 (1957)",
     "Clear day, steady daily wave; indoors the air itself.",
     {{"air", "air hottest", "climate.air-hottest"},
      {"swing", "daily swing", "climate.swing-hot"},
      {"wind", "wind", "climate.wind"},
      {"b", "sun taken in", "climate.absorptivity"},
      {"h", "thickness", "slab.thickness"}}},
    {"temperature.coldest_c temperature.hottest_c temperature.basis", NULL,
     "typed, or an estimate from the air; mean over the depth of the slab", "typed by you",
     "Mean over the depth, not the surface.",
     {{"coldest", "typed", "climate.slab-coldest"}, {"hottest", "typed", "climate.slab-hottest"}}},
    {"temperature.sealing_c", NULL, "sealing = typed, else mean of coldest and hottest",
     "measure it: mid-depth, or a surface shaded for two hours",
     "Mean over the depth of the slab.",
     {{"typed", "slab then", "sealing.temperature"},
      {"coldest", "slab coldest", "temperature.coldest_c"},
      {"hottest", "slab hottest", "temperature.hottest_c"}}},
    {"temperature.zero_stress_c", NULL, "T0 = typed, else the placing temperature",
     "cautious: no heat of hydration; from memory",
     "For isolation and runs between fixed ends.",
     {{"typed", "set at", "pour.zero-stress-temperature"},
      {"placing", "concrete then", "pour.placing-temperature"}}},
    {"temperature.crack_zero_c", NULL, "T0 = typed, else the placing temperature + 10 K",
     "heat of hydration, from memory", "For the opening of cracks.",
     {{"typed", "set at", "pour.zero-stress-temperature"},
      {"placing", "concrete then", "pour.placing-temperature"}}},
    {"temperature.deck_coldest_c temperature.deck_hottest_c", NULL,
     "deck coldest = air coldest + 8, deck hottest = air hottest + 2",
     "EN 1991-1-5 Figure 6.1, concrete deck",
     "For thick decks with air below; no bound for a slab on ground, shown to compare only.",
     {{"air", "air coldest", "climate.air-coldest"}, {"air", "air hottest", "climate.air-hottest"}}},
    {"shrinkage.after_sealing shrinkage.before_sealing shrinkage.basis shrinkage.end_years",
     by_shrinkage_en,
     "e = [eps_cd + eps_ca](end) - [eps_cd + eps_ca](at sealing), h0 = 2 h",
     "EN 1992-1-1 3.1.4 and Annex B.2", "Scatter about 30 %; drying from the top face only.",
     {{"fck", "cylinder strength", "concrete.strength_pa"},
      {"RH", "damp in the air", "climate.humidity"},
      {"h", "thickness", "slab.thickness"},
      {"ts", "curing", "concrete.curing"},
      {"end", "looked at for", "concrete.horizon"}}},
    {"shrinkage.after_sealing shrinkage.before_sealing shrinkage.basis shrinkage.end_years",
     by_shrinkage_aci,
     "eps(t) = eps_u (t - tc)/(f + t - tc), f = 26 exp(0.0142 V/S), V/S = h in mm",
     "ACI 209R-92 and ACI 209.2R-08; some factors from memory",
     "f = 35 days is not for slabs that dry from one face.",
     {{"RH", "damp in the air", "climate.humidity"},
      {"h", "thickness", "slab.thickness"},
      {"tc", "curing", "concrete.curing"},
      {"end", "looked at for", "concrete.horizon"}}},
    {"shrinkage.after_sealing shrinkage.before_sealing shrinkage.basis shrinkage.end_years",
     by_shrinkage_mc, "e = [eps_cbs + eps_cds](end) - [eps_cbs + eps_cds](at sealing), h0 = 2 h",
     "fib Model Code 2010 5.1.9.4.4", "20 to 130 MPa, 40 to 100 % humidity.",
     {{"fck", "cylinder strength", "concrete.strength_pa"},
      {"RH", "damp in the air", "climate.humidity"},
      {"h", "thickness", "slab.thickness"},
      {"end", "looked at for", "concrete.horizon"}}},
    {"shrinkage.after_sealing shrinkage.before_sealing shrinkage.basis shrinkage.end_years", NULL,
     "e = what you typed: the strain still to come after sealing", "typed by you",
     "Before sealing nothing is known then.",
     {{"typed", "drying to come", "concrete.shrinkage"}}},
    {"movement.open_m movement.factor_open_m", by_factor,
     "open = C L [a (Ts - Tmin) + e]",
     "AASHTO Guide for Design of Pavement Structures (1993); Darter and Barenberg",
     "An average for ordinary pavements, no bound; every cut cracked, panels alike.",
     {{"C", "share that gets through", "movement.factor"},
      {"L", "mean length of the two panels", "movement.panel_m"},
      {"a", "thermal expansion", "concrete.expansion_k"},
      {"Ts", "slab at sealing", "temperature.sealing_c"},
      {"Tmin", "slab coldest", "temperature.coldest_c"},
      {"e", "drying to come", "shrinkage.after_sealing"}}},
    {"movement.close_m movement.factor_close_m", by_factor, "close = C L a (Tmax - Ts)",
     "AASHTO Guide for Design of Pavement Structures (1993); Darter and Barenberg",
     "No credit for drying or creep.",
     {{"C", "share that gets through", "movement.factor"},
      {"L", "mean length of the two panels", "movement.panel_m"},
      {"a", "thermal expansion", "concrete.expansion_k"},
      {"Tmax", "slab hottest", "temperature.hottest_c"},
      {"Ts", "slab at sealing", "temperature.sealing_c"}}},
    {"movement.open_m movement.friction_open_m movement.factor_open_m", NULL,
     "open = u(L1) + u(L2), u from E h u'' = tau(u), free strain a (Ts - Tmin) + e",
     "bar on elastic-plastic friction, exact; derived, checked by finite elements",
     "First loading; panels over 15 m take the free movement.",
     {{"L", "mean length of the two panels", "movement.panel_m"},
      {"a", "thermal expansion", "concrete.expansion_k"},
      {"Ts", "slab at sealing", "temperature.sealing_c"},
      {"Tmin", "slab coldest", "temperature.coldest_c"},
      {"e", "drying to come", "shrinkage.after_sealing"},
      {"mu", "friction, low", "base.friction-low"},
      {"u_y", "slip", "base.slip"}}},
    {"movement.close_m movement.friction_close_m movement.factor_close_m", NULL,
     "close = u(L1) + u(L2), free strain a (Tmax - Ts)",
     "bar on elastic-plastic friction, exact; derived, checked by finite elements",
     "No credit for drying or creep.",
     {{"L", "mean length of the two panels", "movement.panel_m"},
      {"a", "thermal expansion", "concrete.expansion_k"},
      {"Tmax", "slab hottest", "temperature.hottest_c"},
      {"Ts", "slab at sealing", "temperature.sealing_c"},
      {"mu", "friction, low", "base.friction-low"}}},
    {"movement.panel_m", NULL, "L = mean length of the two panels beside the joint, square to it",
     "geometry", "The contraction joint that moves most.",
     {{"limit", "spacing limit", "spacing.limit_m"}}},
    {"movement.factor movement.basis", NULL, "C = typed, else 0.65 on stabilised and asphalt, 0.80",
     "AASHTO; Darter and Barenberg (0.80; 0.65 from memory)",
     "0.65 only for a base without a sheet.",
     {{"typed", "factor", "sealing.factor"}, {"base", "lies on", "base.kind"}}},
    {"seal.width_m", NULL,
     "W = typed, else the narrowest blade with open/W <= 0.9 stretch, close/W <= 0.9 squeeze",
     "ASTM C920 classes; blades: common practice", "Per cent of the width at sealing.",
     {{"open", "opens by", "movement.open_m"},
      {"close", "closes by", "movement.close_m"},
      {"stretch", "good for", "seal.extension_capacity"},
      {"squeeze", "good for", "seal.compression_capacity"},
      {"least", "least width", "seal.least_width_m"}}},
    {"seal.least_width_m seal.tolerance_m seal.next_down_m seal.next_up_m", NULL,
     "W_least = max(open/stretch, close/squeeze) + tolerance",
     "ASTM C1472 form: movement over the movement class", "Before rounding to a blade.",
     {{"open", "opens by", "movement.open_m"},
      {"close", "closes by", "movement.close_m"},
      {"stretch", "good for", "seal.extension_capacity"},
      {"squeeze", "good for", "seal.compression_capacity"},
      {"tolerance", "width tolerance", "sealing.tolerance"}}},
    {"seal.extension seal.verdict seal.basis seal.next_down_extension seal.next_up_extension", NULL,
     "stretch = open/W; HOLDS to 0.9 of what the sealant is good for, JUST HOLDS to 1",
     "ASTM C920: change of width, each way, from the width at sealing",
     "The verdict takes the width less the tolerance.",
     {{"open", "opens by", "movement.open_m"},
      {"W", "width at sealing", "seal.width_m"},
      {"good for", "the sealant", "seal.extension_capacity"}}},
    {"seal.compression", NULL, "squeeze = close/W",
     "ASTM C920: change of width, each way, from the width at sealing",
     "The verdict takes the width less the tolerance.",
     {{"close", "closes by", "movement.close_m"},
      {"W", "width at sealing", "seal.width_m"},
      {"good for", "the sealant", "seal.compression_capacity"}}},
    {"seal.extension_capacity seal.compression_capacity", NULL,
     "capacity = typed stretch and squeeze, else the class",
     "ASTM C920; hot-pour 20 % from memory when nothing is typed",
     "A bond-test extension of ASTM D6690 is never a capacity.",
     {{"class", "good for", "sealant.class"},
      {"stretch", "typed", "sealant.extension"},
      {"squeeze", "typed", "sealant.compression"}}},
    {"seal.depth_m", NULL, "D = typed, else by kind: a share of the width, within its limits",
     "makers differ; from memory, editable", "Depth over the crown of the rod.",
     {{"typed", "bead depth", "sealant.depth"},
      {"kind", "sealant", "sealant.kind"},
      {"W", "width at sealing", "seal.width_m"}}},
    {"seal.recess_m", NULL, "left low = typed, else 4 mm", "common practice: 3 to 6 mm",
     "So that wheels do not pull it out.", {{"typed", "left low", "sealant.recess"}}},
    {"seal.bead_strain seal.bulge_m", NULL,
     "y = 3 D (W' - W)/(4 W'), strain = arc(W', y)/W - 1 at W' = W + open",
     "Tons (1959), parabolic faces of constant volume",
     "Ranks bead shapes; it never decides a verdict.",
     {{"W", "width at sealing", "seal.width_m"},
      {"D", "bead depth", "seal.depth_m"},
      {"open", "opens by", "movement.open_m"}}},
    {"seal.rod_m seal.cut_depth_m", NULL,
     "rod = next stock size from 1.25 W; wide cut = left low + D + rod",
     "common practice: a rod about a quarter wider than the joint",
     "Pressed in, not stretched.",
     {{"W", "width at sealing", "seal.width_m"},
      {"typed", "rod", "sealant.rod"},
      {"D", "bead depth", "seal.depth_m"},
      {"low", "left low", "seal.recess_m"}}},
    {"seal.window_coldest_c seal.window_hottest_c", NULL,
     "all T with K [a (T - Tmin) + e]/g(T) and K a (Tmax - T)/g(T) within what it is good for",
     "width at the moment of sealing: g(T) = W + K a (Tc - T)",
     "Specification and data sheet may set a higher lowest temperature.",
     {{"W", "width as cut", "seal.width_m"},
      {"Tmin", "slab coldest", "temperature.coldest_c"},
      {"Tmax", "slab hottest", "temperature.hottest_c"}}},
    {"cut.least_m cut.most_m cut.set_m", NULL,
     "h/4 to h/3; set h/4 on loose bases, h/3 on stabilised or asphalt; at least 25 mm",
     "ACI 302.1R; concrete trade press: a quarter to a third",
     "Conventional wet sawing; never within 25 mm of dowels or bars.",
     {{"h", "thickness", "slab.thickness"}, {"base", "lies on", "base.kind"}}},
    {"quantities.sealant_net_l quantities.sealed_m", length_typed,
     "net = W x D x typed length", "geometry", "",
     {{"W", "width", "seal.width_m"},
      {"D", "depth", "seal.depth_m"},
      {"length", "typed", "takeoff.length"}}},
    {"quantities.sealant_net_l quantities.sealed_m", NULL,
     "net = W x D x (cut joints + pour ends)", "geometry",
     "What goes over soft board is not in it.",
     {{"W", "width", "seal.width_m"},
      {"D", "depth", "seal.depth_m"},
      {"length", "sealed", "quantities.sealed_m"}}},
    {"quantities.sealant_cusps_l", NULL, "beside the rod = (1/2 - pi/8) W^2 x length",
     "geometry of a round rod in a slot [derived]", "Upper bound: a squeezed rod is flatter.",
     {{"W", "width", "seal.width_m"}, {"length", "sealed", "quantities.sealed_m"}}},
    {"quantities.sealant_order_l", NULL, "order = (net + beside the rod if counted) (1 + waste)",
     "common practice: 5 to 15 % waste", "Packs cover this amount.",
     {{"net", "net", "quantities.sealant_net_l"},
      {"beside", "beside the rod", "quantities.sealant_cusps_l"},
      {"waste", "waste", "takeoff.waste"}}},
    {"quantities.contraction_m quantities.construction_m quantities.isolation_m "
     "quantities.expansion_m quantities.saw_m quantities.filler_m2 quantities.slab_m2 "
     "quantities.concrete_m3",
     NULL, "sum over the joints and panels of the plan", "geometry", "For the plan as drawn.",
     {{"limit", "spacing limit", "spacing.limit_m"}, {"h", "thickness", "slab.thickness"}}},
    {"steel.dowel_diameter_m steel.dowel_length_m steel.dowel_spacing_m", NULL,
     "typed, else the practice's table by thickness; none below 180 mm",
     "UFC 3-260-02 Table 12-8; IRC:58 for india", "Smooth, parallel, one end free.",
     {{"typed", "dowels", "slab.dowels"}, {"h", "thickness", "slab.thickness"}}},
    {"steel.tie_diameter_m steel.tie_spacing_m steel.tie_length_m", NULL,
     "As = b gamma h mu/fs a metre; spacing = A_bar/As; length = 2 fs A_bar/(bond x perimeter) + "
     "150 mm",
     "IRC:58; constants from memory", "Not more than three lanes tied together.",
     {{"h", "thickness", "slab.thickness"}, {"mu", "friction", "base.friction"}}},
    {"restraint.edge_pa restraint.interior_pa", NULL,
     "edge = C E a dT/2, inside = E a dT (Cx + 0.15 Cy)/(2 (1 - 0.15^2))",
     "Westergaard (1927), Bradbury (1938)", "Linear gradient, slab in full contact.",
     {{"E", "modulus", "concrete.modulus_pa"},
      {"a", "thermal expansion", "concrete.expansion_k"},
      {"dT", "top minus bottom", "slab.gradient"},
      {"l", "radius of relative stiffness", "concrete.stiffness_radius_m"}}},
    {"restraint.lift_m restraint.settlement_m", NULL,
     "lift = (1 + 0.15) a dT l^2/h; out of contact when above gamma h/k", "Westergaard (1927)",
     "Outside it the curling stress is out of range.",
     {{"a", "thermal expansion", "concrete.expansion_k"},
      {"dT", "top minus bottom", "slab.gradient"},
      {"l", "radius of relative stiffness", "concrete.stiffness_radius_m"}}},
    {"restraint.locked_pa restraint.locked_both_pa", NULL,
     "locked = E a (Tmax - T0), both ways / (1 - 0.15)", "Hooke's law",
     "Nothing gives; no check of a building.",
     {{"E", "modulus", "concrete.modulus_pa"},
      {"a", "thermal expansion", "concrete.expansion_k"},
      {"Tmax", "slab hottest", "temperature.hottest_c"},
      {"T0", "slab at set", "temperature.zero_stress_c"}}},
    {"restraint.lift_off_hinge_k restraint.lift_off_continuous_k restraint.rise_left_k", NULL,
     "least rise over the lifted length: EI w'''' + N w'' = -gamma h, ends held by friction",
     "mechanism after Kerr and Dallis (1985); derived here",
     "Lift-off limit of a clean, straight, sound slab. Grit, worn faces, wet base and swelling "
     "lower it.",
     {{"h", "thickness", "slab.thickness"},
      {"E", "modulus", "concrete.modulus_pa"},
      {"mu", "friction, low", "base.friction-low"}}},
};

/* Whether `path` is one of the words of `paths`. */
static bool contains(const char *paths, const char *path)
{
    size_t length = strlen(path);

    for (const char *at = strstr(paths, path); at != NULL; at = strstr(at + 1, path)) {
        bool begins = at == paths || at[-1] == ' ';
        if (begins && (at[length] == ' ' || at[length] == '\0'))
            return true;
    }
    return false;
}

const struct why_row *why_row_find(const struct plan *plan, const char *path)
{
    for (size_t i = 0; i < sizeof rows / sizeof *rows; i++)
        if (contains(rows[i].paths, path) && (rows[i].applies == NULL || rows[i].applies(plan)))
            return &rows[i];
    return NULL;
}
