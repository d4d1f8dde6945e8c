/* The formulas behind the rows of the spacing rules and behind the checks. */
#include "plan/why_table.h"

#define EXPANSION                                                                                  \
    {                                                                                              \
        "a", "thermal expansion", "concrete.expansion_k"                                           \
    }
#define MODULUS                                                                                    \
    {                                                                                              \
        "E", "modulus", "concrete.modulus_pa"                                                      \
    }
#define THICKNESS                                                                                  \
    {                                                                                              \
        "h", "thickness", "slab.thickness"                                                         \
    }
#define WEIGHT                                                                                     \
    {                                                                                              \
        "gamma", "unit weight", "concrete.unit-weight"                                             \
    }
#define DRAG                                                                                       \
    {                                                                                              \
        "mu", "friction, high", "base.friction-high"                                               \
    }
#define WIDTH                                                                                      \
    {                                                                                              \
        "W", "width at sealing", "seal.width_m"                                                    \
    }
#define OPENS                                                                                      \
    {                                                                                              \
        "open", "opens by", "movement.open_m"                                                      \
    }
#define CLOSES                                                                                     \
    {                                                                                              \
        "close", "closes by", "movement.close_m"                                                   \
    }

static const struct why_row rows[] = {
    {"spacing.limits.typed",
     NULL,
     "limit = what you typed",
     "your own limit",
     "",
     {{"typed", "spacing limit", "rules.spacing"}}},
    {"spacing.limits.thickness",
     NULL,
     "L = multiple x h",
     "",
     "Plain slabs on ground with joints cut in time.",
     {THICKNESS, {"use", "used as", "slab.use"}, {"base", "lies on", "base.kind"}}},
    {"spacing.limits.cap",
     NULL,
     "L = longest the practice allows, whatever the thickness",
     "",
     "",
     {{"practice", "whose practice", "job.practice"}, THICKNESS}},
    {"spacing.limits.table",
     NULL,
     "L = row of the agency's table for this thickness",
     "",
     "The table of the agency you picked.",
     {{"table", "agency", "rules.table"}, THICKNESS}},
    {"spacing.limits.stiffness",
     NULL,
     "L = n l, l = [E h^3/(12 (1 - 0.15^2) k)]^(1/4)",
     "",
     "k is known to about half only.",
     {{"n", "length to stiffness", "rules.stiffness"},
      MODULUS,
      THICKNESS,
      {"k", "subgrade modulus", "base.subgrade-modulus"},
      {"l", "radius of relative stiffness", "concrete.stiffness_radius_m"}}},
    {"spacing.limits.drag checks.drag",
     NULL,
     "stress = gamma mu L/2; L = 2 f/(gamma mu), f typed, else half the tensile strength",
     "",
     "Whole length slides; independent of thickness and width.",
     {{"f", "stress allowed", "rules.drag-stress"},
      {"ft", "tensile strength", "concrete.tensile_pa"},
      WEIGHT,
      DRAG}},
    {"spacing.limits.curling checks.curling",
     NULL,
     "C E a dT/2 + gamma mu L/2 <= share x fr, C by Bradbury from L/l",
     "",
     "Night: top colder than bottom; slab in contact.",
     {MODULUS,
      EXPANSION,
      {"dT", "top against bottom, night", "temperature.night_k"},
      {"l", "radius of relative stiffness", "concrete.stiffness_radius_m"},
      {"fr", "bending strength", "concrete.rupture_pa"},
      {"share", "that may be used", "rules.curling-share"},
      {"edge", "curling stress, edge", "restraint.edge_pa"}}},
    {"spacing.limits.interlock checks.interlock",
     NULL,
     "w = L [a (T0 - Tmin) + drying] <= limit",
     "",
     "Free shortening from set to coldest; undowelled joints.",
     {{"limit", "crack opening", "rules.interlock"},
      EXPANSION,
      {"T0", "slab at set, for cracks", "temperature.crack_zero_c"},
      {"Tmin", "slab coldest", "temperature.coldest_c"},
      {"before", "dried before sealing", "shrinkage.before_sealing"},
      {"after", "drying to come", "shrinkage.after_sealing"}}},
    {"spacing.limits.sealant",
     NULL,
     "L = min(stretch W/(C [a (Ts - Tmin) + e]), squeeze W/(C a (Tmax - Ts)))",
     "",
     "W: your width, else the widest the kind takes; C = 1 with friction.",
     {WIDTH,
      {"stretch", "good for", "seal.extension_capacity"},
      {"squeeze", "good for", "seal.compression_capacity"},
      EXPANSION,
      {"Ts", "slab at sealing", "temperature.sealing_c"},
      {"Tmin", "slab coldest", "temperature.coldest_c"},
      {"Tmax", "slab hottest", "temperature.hottest_c"},
      {"e", "drying to come", "shrinkage.after_sealing"}}},
    {"checks.spacing.typed",
     NULL,
     "typed spacing <= limit by the rules",
     "",
     "",
     {{"typed", "spacing limit", "rules.spacing"},
      {"rules", "limit by the rules", "spacing.rule_limit_m"}}},
    {"checks.seal.width",
     NULL,
     "max(open/stretch, close/squeeze) + tolerance <= W",
     "",
     "",
     {OPENS,
      CLOSES,
      {"stretch", "good for", "seal.extension_capacity"},
      {"squeeze", "good for", "seal.compression_capacity"},
      {"tolerance", "width tolerance", "sealing.tolerance"},
      WIDTH}},
    {"checks.seal.extension",
     NULL,
     "stretch = open/(W - tolerance), of the sealed joint that opens most",
     "",
     "",
     {OPENS, WIDTH, {"tolerance", "width tolerance", "sealing.tolerance"}}},
    {"checks.seal.compression",
     NULL,
     "squeeze = close/(W - tolerance), of the sealed joint that closes most",
     "",
     "",
     {CLOSES, WIDTH, {"tolerance", "width tolerance", "sealing.tolerance"}}},
    {"checks.seal.bead",
     NULL,
     "y = 3 D (W' - W)/(4 W'), strain = arc(W', y)/W - 1 at W' = W + open",
     "",
     "",
     {WIDTH, {"D", "bead depth", "seal.depth_m"}, OPENS}},
    {"checks.seal.cold",
     NULL,
     "slab at sealing >= coldest to seal",
     "",
     "",
     {{"Ts", "slab at sealing", "temperature.sealing_c"},
      {"least", "coldest to seal", "sealing.least-temperature"}}},
    {"checks.seal.bond-test",
     NULL,
     "coldest slab >= temperature of the bond test",
     "",
     "",
     {{"Tmin", "slab coldest", "temperature.coldest_c"}, {"type", "type", "sealant.type"}}},
    {"checks.floor-filler", NULL, "parts by = open/W", "", "", {OPENS, WIDTH}},
    {"checks.working",
     NULL,
     "the joint that works takes n panels: n open/(W - tolerance), n close/(W - tolerance)",
     "",
     "",
     {OPENS, CLOSES, WIDTH, {"n", "one cut works in", "sealing.working"}}},
    {"checks.contact",
     NULL,
     "lift = (1 + 0.15) a dT l^2/h <= gamma h/k",
     "",
     "",
     {EXPANSION,
      {"dT", "top against bottom, night", "temperature.night_k"},
      {"l", "radius of relative stiffness", "concrete.stiffness_radius_m"},
      THICKNESS,
      WEIGHT,
      {"k", "subgrade modulus", "base.subgrade-modulus"}}},
    {"checks.filler",
     NULL,
     "board >= a (Tmax - T0) x run/share; its seal: squeeze a (Tmax - Ts) x run, stretch by the "
     "panel beside it",
     "",
     "Factor 1, no credit for drying, creep or friction.",
     {EXPANSION,
      {"Tmax", "slab hottest", "temperature.hottest_c"},
      {"T0", "slab at set", "temperature.zero_stress_c"},
      {"share", "board gives", "isolation.share"},
      {"Ts", "slab at sealing", "temperature.sealing_c"}}},
};

const struct why_row *why_check_find(const char *path)
{
    return why_row_in(rows, sizeof rows / sizeof *rows, NULL, path);
}
