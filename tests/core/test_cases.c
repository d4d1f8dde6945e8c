/* Runs every published case of tests/cases. A case with an unknown function, a value the function
 * does not read, an answer it does not give, or an id of the list below without a case fails. Run
 * from the root of the project. */
#include <setjmp.h>
#include <stdarg.h>
#include <stddef.h>
#include <stdint.h>

#include <cmocka.h>

#include "core/case_file.h"

#include "core/curling.h"
#include "core/friction_bar.h"
#include "core/isolation.h"
#include "core/mix.h"
#include "core/movement.h"
#include "core/quantity.h"
#include "core/restraint.h"
#include "core/sealant.h"
#include "core/shrinkage.h"
#include "core/slab_temperature.h"
#include "core/spacing.h"
#include "core/steel.h"

static const char *const files[] = {"tests/cases/spacing.txt",     "tests/cases/movement.txt",
                                    "tests/cases/sealant.txt",     "tests/cases/concrete.txt",
                                    "tests/cases/temperature.txt", "tests/cases/mechanics.txt",
                                    "tests/cases/quantity.txt"};

/* Every one of these has at least one case; "S1" is met by "S1" and by "S1.a". */
static const char *const wanted[] = {
    "S1",  "S2",  "S3",  "S4", "S5",  "S6",  "S7",  "S8",  "M1",  "M2",  "M3",  "M5",
    "M6",  "M7",  "M8",  "M9", "M11", "M12", "M13", "M14", "M15", "M16", "M17", "M18",
    "M19", "M20", "A1",  "A2", "A3",  "A4",  "F1",  "Q1",  "Q2",  "Q3",  "Q4",  "Q5",
    "Q8",  "Q9",  "Q10", "C1", "C2",  "C3",  "C4",  "C5",  "C6",  "C7",  "C11", "T6",
    "K1",  "K2",  "K3",  "K4", "K5",  "K6",  "K7",  "K8",  "K9",  "K10", "K11", "B1"};

static const char *const cement_words[] = {"N", "S", "R", NULL};

/* ---- adapters: read the given, call, answer ---- */

static void run_table31(struct published_case *c)
{
    double fck = case_number(c, "fck");
    case_answer(c, "fctm", mix_tensile_strength(fck));
    case_answer(c, "Ecm", mix_modulus(fck));
}

static void run_gain(struct published_case *c)
{
    int cement = case_choice(c, "cement", cement_words);
    case_answer(c, "beta_cc", mix_strength_gain((enum mix_cement)cement, case_number(c, "age")));
}

/* A row of a table of share/tables: cells parted by |. */
static bool table_row(FILE *file, char line[512], char *cells[8], size_t *count)
{
    while (fgets(line, 512, file)) {
        line[strcspn(line, "\r\n")] = 0;
        if (line[0] == '#' || line[0] == 0)
            continue;
        *count = 0;
        char *rest = line;
        for (char *cell; *count < 8 && (cell = strsep(&rest, "|"));) {
            cell += strspn(cell, " ");
            for (size_t n = strlen(cell); n > 0 && cell[n - 1] == ' '; n--)
                cell[n - 1] = 0;
            cells[(*count)++] = cell;
        }
        return true;
    }
    return false;
}

static double cell_number(struct published_case *c, const char *cell)
{
    double value = 0;
    if (!case_read_number(cell, false, &value))
        case_trouble(c, "no number in the table", cell);
    return value;
}

static void run_aggregate(struct published_case *c)
{
    const char *name = case_word(c, "aggregate");
    FILE *file = fopen("share/tables/aggregates.txt", "r");
    char line[512], *cells[8];
    size_t count;
    while (file && table_row(file, line, cells, &count)) {
        if (count >= 2 && strcmp(cells[0], name) == 0)
            case_answer(c, "expansion",
                        mix_expansion_per_k(cell_number(c, cells[1]) / 1.8)); /* /degF -> /K */
    }
    if (file)
        fclose(file);
}

static void run_dowel_table(struct published_case *c)
{
    const char *practice = case_word(c, "practice");
    double thickness = case_number(c, "thickness");
    FILE *file = fopen("share/tables/dowels.txt", "r");
    char line[512], *cells[8];
    size_t count;
    while (file && table_row(file, line, cells, &count)) {
        if (count < 6 || strcmp(cells[0], practice) != 0)
            continue;
        double least = cell_number(c, cells[1]);
        double most = strcmp(cells[2], "-") == 0 ? HUGE_VAL : cell_number(c, cells[2]);
        if (thickness < least - 1e-9 || thickness >= most - 1e-9)
            continue;
        case_answer(c, "diameter", cell_number(c, cells[3]));
        case_answer(c, "length", cell_number(c, cells[4]));
        case_answer(c, "spacing", cell_number(c, cells[5]));
    }
    if (file)
        fclose(file);
}

static struct shrinkage_slab read_slab(struct published_case *c)
{
    struct shrinkage_slab slab = {.thickness_m = case_number(c, "notional-size") / 2, /* h0 = 2 h */
                                  .fck_pa = case_number(c, "fcm") - 8e6,
                                  .humidity = case_number(c, "humidity"),
                                  .curing_days = case_number(c, "curing"),
                                  .cement =
                                      (enum mix_cement)case_choice(c, "cement", cement_words)};
    return slab;
}

static void run_en1992(struct published_case *c)
{
    struct shrinkage_slab slab = read_slab(c);
    double age = case_number(c, "age");
    struct shrinkage s = shrinkage_en1992(&slab, age);
    case_answer(c, "beta_RH", shrinkage_en1992_humidity_factor(slab.humidity));
    case_answer(c, "eps_cd0",
                shrinkage_en1992_basic_drying(slab.fck_pa, slab.cement, slab.humidity));
    case_answer(c, "kh", shrinkage_en1992_size_factor(2 * slab.thickness_m));
    case_answer(c, "eps_cd", s.drying);
    case_answer(c, "beta_as", s.autogenous / (2.5e-12 * (slab.fck_pa - 10e6)));
    case_answer(c, "total", s.total);
}

static void run_mc2010_basic(struct published_case *c)
{
    int cement = case_choice(c, "cement", cement_words);
    case_answer(c, "eps_cds0",
                shrinkage_mc2010_basic_drying(case_number(c, "fcm"), (enum mix_cement)cement));
}

static void run_mc2010_time(struct published_case *c)
{
    double drying = case_number(c, "age") - case_number(c, "curing");
    case_answer(c, "beta_ds",
                shrinkage_mc2010_time_factor(case_number(c, "notional-size"), drying));
}

static void run_aci_half_time(struct published_case *c)
{
    case_answer(c, "f", shrinkage_aci209_half_time(case_number(c, "volume-to-surface")));
}

static void run_aci_share(struct published_case *c)
{
    struct shrinkage_slab slab = {.thickness_m = case_number(c, "thickness"),
                                  .humidity = case_number(c, "humidity"),
                                  .curing_days = 7,
                                  .ultimate = 0};
    shrinkage_mix_default(&slab);
    struct shrinkage s = shrinkage_aci209(&slab, 7 + case_number(c, "drying"));
    case_answer(c, "share", s.drying / s.ultimate_drying);
}

static void run_deck(struct published_case *c)
{
    struct slab_extremes deck =
        slab_temperature_deck(case_number(c, "air-coldest"), case_number(c, "air-hottest"));
    case_answer(c, "coldest", deck.coldest_c);
    case_answer(c, "hottest", deck.hottest_c);
}

static void run_sun(struct published_case *c)
{
    double latitude = case_number(c, "latitude");
    int day = (int)case_number(c, "day");
    case_answer(c, "extraterrestrial", slab_sun_extraterrestrial(latitude, day));
    case_answer(c, "clear", slab_sun_clear(latitude, day));
}

static void run_barber(struct published_case *c)
{
    struct slab_day day = {.air_mean_c = case_number(c, "air-mean"),
                           .air_swing_k = case_number(c, "swing"),
                           .wind_m_s = case_number(c, "wind"),
                           .radiation_j_m2 = case_number(c, "sun"),
                           .absorptivity = case_number(c, "absorptivity"),
                           .conductivity = case_number(c, "conductivity"),
                           .density = case_number(c, "density"),
                           .heat_capacity = case_number(c, "heat-capacity")};
    case_answer(c, "highest", slab_temperature_barber_highest(&day, case_number(c, "depth")));
}

/* ---- spacing ---- */

static void run_agency(struct published_case *c)
{
    static const char *const words[] = {"none", "ufc", "sudas", "illinois", "irc", NULL};
    int agency = case_choice(c, "table", words);
    double least;
    case_answer(c, "most",
                spacing_agency((enum spacing_agency)agency, case_number(c, "thickness"), &least));
    case_answer(c, "least", least);
}

static void run_floor(struct published_case *c)
{
    double multiple = spacing_floor_multiple(case_number(c, "aggregate"), case_number(c, "slump"));
    case_answer(c, "limit", spacing_of_thickness(multiple, case_number(c, "thickness")));
}

static void run_multiple(struct published_case *c)
{
    case_answer(c, "limit",
                spacing_of_thickness(case_number(c, "multiple"), case_number(c, "thickness")));
}

static void run_drag(struct published_case *c)
{
    case_answer(c, "limit",
                spacing_by_drag(case_number(c, "allowed"), case_number(c, "unit-weight"),
                                case_number(c, "friction")));
}

static void run_radius(struct published_case *c)
{
    case_answer(c, "radius",
                spacing_stiffness_radius(case_number(c, "modulus"), case_number(c, "thickness"),
                                         case_number(c, "poisson"), case_number(c, "subgrade")));
}

/* ---- movement ---- */

static void run_movement(struct published_case *c)
{
    double difference = case_number_or(c, "rise", 0);
    if (case_given(c, "coldest"))
        difference = case_number(c, "hottest") - case_number(c, "coldest");
    case_answer(c, "movement",
                movement_joint(case_number(c, "factor"), case_number(c, "length"),
                               case_number(c, "expansion"), difference,
                               case_number_or(c, "shrinkage", 0)));
}

/* Width of a joint that must take the movement within a class, one way. */
static void run_movement_width(struct published_case *c)
{
    double movement = movement_joint(1, case_number(c, "length"), case_number(c, "expansion"),
                                     case_number(c, "rise"), 0);
    double class = case_number(c, "class");
    case_answer(c, "movement", movement);
    case_answer(c, "width",
                sealant_least_width(movement, 0, (struct sealant_capacity){class, class}, 0));
}

/* Gap at setting that just closes at the hottest, and its width at the coldest. */
static void run_gap(struct published_case *c)
{
    double length = case_number(c, "length"), a = case_number(c, "expansion");
    double set = case_number(c, "set"), hot = case_number(c, "hottest");
    double gap = movement_joint(1, length, a, hot - set, 0);
    struct sealant_joint joint = {.width_m = gap,
                                  .cut_c = set,
                                  .coldest_c = case_number(c, "coldest"),
                                  .hottest_c = hot,
                                  .expansion = a,
                                  .length_m = length,
                                  .capacity = {1, 1}};
    case_answer(c, "gap", gap);
    case_answer(c, "gap-at-coldest", sealant_row_at(&joint, joint.coldest_c).gap_m);
}

static void run_closure(struct published_case *c)
{
    case_answer(c, "run",
                isolation_run_to_closure(case_number(c, "gap"), case_number(c, "share"),
                                         case_number(c, "expansion"), case_number(c, "rise")));
}

static void run_locked(struct published_case *c)
{
    case_answer(c, "stress",
                restraint_locked_stress(case_number(c, "modulus"), case_number(c, "expansion"),
                                        case_number(c, "rise")));
}

static struct friction_bar read_bar(struct published_case *c)
{
    struct friction_bar bar = {.length_m = case_number(c, "length"),
                               .thickness_m = case_number(c, "thickness"),
                               .modulus_pa = case_number(c, "modulus"),
                               .unit_weight = 24e3,
                               .slip_m = case_number(c, "slip")};
    bar.friction = case_number(c, "friction-stress") / (bar.unit_weight * bar.thickness_m);
    return bar;
}

static void run_bar(struct published_case *c)
{
    struct friction_bar bar = read_bar(c);
    double strain = case_number(c, "strain");
    struct friction_state state = friction_bar_load(&bar, strain);
    case_answer(c, "end", state.end_m);
    case_answer(c, "middle", state.middle_pa);
    case_answer(c, "slip-length", state.slip_length_m);
    case_answer(c, "middle-by-profile", friction_bar_stress(&bar, strain, 0));
}

static void run_history(struct published_case *c)
{
    struct friction_bar bar = read_bar(c);
    double path[4];
    for (size_t i = 0; i < 4; i++) {
        char name[16];
        snprintf(name, sizeof name, "strain%zu", i + 1);
        path[i] = case_number(c, name);
        snprintf(name, sizeof name, "end%zu", i + 1);
        case_answer(c, name, friction_bar_history(&bar, path, i + 1));
    }
}

static void run_filler(struct published_case *c)
{
    struct friction_bar bar = read_bar(c);
    struct friction_filler filler = {case_number(c, "stiffness"), case_number(c, "gap")};
    struct friction_thrust thrust = friction_bar_against(&bar, &filler, case_number(c, "strain"));
    case_answer(c, "end", thrust.end_m);
    case_answer(c, "end-stress", thrust.end_pa);
    case_answer(c, "middle-stress", thrust.middle_pa);
}

/* ---- sealant ---- */

static void run_seal_least(struct published_case *c)
{
    case_answer(c, "width",
                sealant_seal_least(case_number(c, "movement"), case_number(c, "least"),
                                   case_number(c, "most")));
}

static void run_seal_setting(struct published_case *c)
{
    struct sealant_seal seal = {case_number(c, "seal"), case_number(c, "least"),
                                case_number(c, "most")};
    double setting = sealant_seal_setting(&seal, case_number(c, "slab"), case_number(c, "coldest"),
                                          case_number(c, "hottest"));
    double slot = sealant_seal_slot(&seal, setting);
    double open = case_number_or(c, "open", 0), close = case_number_or(c, "close", 0);
    struct sealant_seal_ends ends = sealant_seal_check(&seal, slot, open, close);
    case_answer(c, "setting", setting);
    case_answer(c, "slot", slot);
    case_answer(c, "winter", ends.cold);
    case_answer(c, "summer", ends.hot);
    case_answer(c, "holds", ends.holds);
}

static void run_bead(struct published_case *c)
{
    double width = case_number(c, "width");
    case_answer(c, "strain",
                sealant_bead_strain(width, case_number(c, "depth"),
                                    width * (1 + case_number(c, "opening"))));
}

static void run_least_width(struct published_case *c)
{
    double class = case_number(c, "class");
    case_answer(c, "width",
                sealant_least_width(case_number(c, "open"), case_number(c, "close"),
                                    (struct sealant_capacity){class, class}, 0));
}

static void run_depth(struct published_case *c)
{
    case_answer(c, "depth",
                sealant_depth(case_number(c, "width"), SEALANT_DEPTH_RATIO, SEALANT_DEPTH_LEAST,
                              SEALANT_DEPTH_MOST));
}

static struct sealant_joint read_joint(struct published_case *c)
{
    double class = case_number(c, "class");
    return (struct sealant_joint){.width_m = case_number(c, "width"),
                                  .cut_c = case_number(c, "cut"),
                                  .coldest_c = case_number(c, "coldest"),
                                  .hottest_c = case_number(c, "hottest"),
                                  .expansion = case_number(c, "expansion"),
                                  .shrinkage = case_number(c, "shrinkage"),
                                  .length_m = case_number(c, "factor") * case_number(c, "panel"),
                                  .capacity = {class, class}};
}

static void run_sealing(struct published_case *c)
{
    struct sealant_joint joint = read_joint(c);
    struct sealant_moment row = sealant_row_at(&joint, case_number(c, "slab"));
    double coldest = NAN, hottest = NAN;
    sealant_window(&joint, &coldest, &hottest);
    case_answer(c, "gap", row.gap_m);
    case_answer(c, "extension", row.extension);
    case_answer(c, "compression", row.compression);
    case_answer(c, "window-coldest", coldest);
    case_answer(c, "window-hottest", hottest);
}

static void run_bulge(struct published_case *c)
{
    case_answer(
        c, "bulge",
        sealant_bulge(case_number(c, "width"), case_number(c, "depth"), case_number(c, "closed")));
}

static void run_package_length(struct published_case *c)
{
    case_answer(c, "length",
                quantity_length(case_number(c, "package"), case_number(c, "width"),
                                case_number(c, "depth")));
}

/* ---- mechanics ---- */

static void run_bradbury(struct published_case *c)
{
    case_answer(c, "C", curling_coefficient(case_number(c, "ratio")));
}

static struct curling_slab read_curling(struct published_case *c)
{
    return (struct curling_slab){.modulus_pa = case_number(c, "modulus"),
                                 .expansion = case_number(c, "expansion"),
                                 .poisson = case_number(c, "poisson"),
                                 .thickness_m = case_number(c, "thickness"),
                                 .subgrade_pa_m = case_number(c, "subgrade"),
                                 .unit_weight = case_number_or(c, "unit-weight", 24e3),
                                 .difference_k = case_number(c, "difference")};
}

static void run_curl_with(struct published_case *c)
{
    struct curling_slab slab = read_curling(c);
    double cx = case_number(c, "Cx"), cy = case_number(c, "Cy");
    case_answer(c, "edge", curling_edge_stress(&slab, cx));
    case_answer(c, "interior", curling_interior_stress(&slab, cx, cy));
}

static void run_curl_slab(struct published_case *c)
{
    struct curling_slab slab = read_curling(c);
    double l = spacing_stiffness_radius(slab.modulus_pa, slab.thickness_m, slab.poisson,
                                        slab.subgrade_pa_m);
    double cx = curling_coefficient(case_number(c, "slab-length") / l);
    double cy = curling_coefficient(case_number(c, "slab-width") / l);
    case_answer(c, "Cx", cx);
    case_answer(c, "Cy", cy);
    case_answer(c, "edge", curling_edge_stress(&slab, cx));
    case_answer(c, "interior", curling_interior_stress(&slab, cx, cy));
}

static void run_curl_corner(struct published_case *c)
{
    struct curling_slab slab = read_curling(c);
    case_answer(c, "corner", curling_corner_stress(&slab, case_number(c, "load-radius")));
}

static void run_curl_lift(struct published_case *c)
{
    struct curling_slab slab = read_curling(c);
    case_answer(c, "radius",
                spacing_stiffness_radius(slab.modulus_pa, slab.thickness_m, slab.poisson,
                                         slab.subgrade_pa_m));
    case_answer(c, "lift", curling_lift(&slab));
    case_answer(c, "settlement", curling_settlement(&slab));
    case_answer(c, "contact", curling_in_contact(&slab));
}

static void run_lift_off(struct published_case *c)
{
    struct restraint_slab slab = {.thickness_m = case_number(c, "thickness"),
                                  .modulus_pa = case_number(c, "modulus"),
                                  .expansion = case_number(c, "expansion"),
                                  .unit_weight = case_number(c, "unit-weight"),
                                  .friction = case_number(c, "friction")};
    struct restraint_lift hinge = restraint_lift_off(&slab, RESTRAINT_HINGE);
    case_answer(c, "hinge", hinge.rise_k);
    case_answer(c, "half-length", hinge.half_length_m);
    case_answer(c, "force", hinge.force_n_m);
    case_answer(c, "continuous", restraint_lift_off(&slab, RESTRAINT_CONTINUOUS).rise_k);
}

static void run_steel_drag(struct published_case *c)
{
    case_answer(c, "steel",
                steel_drag(case_number(c, "friction"), case_number(c, "length"),
                           case_number(c, "weight"), case_number(c, "stress")));
}

static void run_ties(struct published_case *c)
{
    struct steel_ties ties = {.free_width_m = case_number(c, "free-width"),
                              .thickness_m = case_number(c, "thickness"),
                              .unit_weight = case_number(c, "unit-weight"),
                              .friction = case_number(c, "friction"),
                              .bar_m = case_number(c, "bar"),
                              .steel_pa = STEEL_PLAIN_PA,
                              .bond_pa = STEEL_PLAIN_BOND_PA};
    struct steel_tie_result result = steel_ties(&ties);
    case_answer(c, "spacing", result.exact_spacing_m);
    case_answer(c, "length", result.length_m);
}

/* ---- the runner ---- */

static const struct {
    const char *name;
    void (*run)(struct published_case *c);
} functions[] = {{"mix_tensile_strength, mix_modulus", run_table31},
                 {"mix_strength_gain", run_gain},
                 {"aggregate table", run_aggregate},
                 {"dowel table", run_dowel_table},
                 {"shrinkage_en1992", run_en1992},
                 {"shrinkage_mc2010_basic_drying", run_mc2010_basic},
                 {"shrinkage_mc2010_time_factor", run_mc2010_time},
                 {"shrinkage_aci209_half_time", run_aci_half_time},
                 {"shrinkage_aci209", run_aci_share},
                 {"slab_temperature_deck", run_deck},
                 {"slab_sun", run_sun},
                 {"slab_temperature_barber_highest", run_barber},
                 {"spacing_agency", run_agency},
                 {"spacing_floor_multiple", run_floor},
                 {"spacing_of_thickness", run_multiple},
                 {"spacing_by_drag", run_drag},
                 {"spacing_stiffness_radius", run_radius},
                 {"movement_joint", run_movement},
                 {"movement_joint, sealant_least_width", run_movement_width},
                 {"movement_joint, sealant_row_at", run_gap},
                 {"isolation_run_to_closure", run_closure},
                 {"restraint_locked_stress", run_locked},
                 {"friction_bar_load", run_bar},
                 {"friction_bar_history", run_history},
                 {"friction_bar_against", run_filler},
                 {"sealant_seal_least", run_seal_least},
                 {"sealant_seal_setting", run_seal_setting},
                 {"sealant_bead_strain", run_bead},
                 {"sealant_least_width", run_least_width},
                 {"sealant_depth", run_depth},
                 {"sealant_row_at", run_sealing},
                 {"sealant_bulge", run_bulge},
                 {"quantity_length", run_package_length},
                 {"curling_coefficient", run_bradbury},
                 {"curling_stress of C", run_curl_with},
                 {"curling_stress of a slab", run_curl_slab},
                 {"curling_corner_stress", run_curl_corner},
                 {"curling_lift", run_curl_lift},
                 {"restraint_lift_off", run_lift_off},
                 {"steel_drag", run_steel_drag},
                 {"steel_ties", run_ties}};

static void run_case(struct published_case *c)
{
    for (size_t i = 0; i < sizeof functions / sizeof functions[0]; i++) {
        if (strcmp(functions[i].name, c->function) == 0) {
            functions[i].run(c);
            case_compare(c);
            return;
        }
    }
    case_trouble(c, "unknown function", c->function);
}

enum { WANTED_COUNT = sizeof wanted / sizeof wanted[0] };

static void note_seen(bool *seen, const char *id)
{
    size_t stem = strcspn(id, ".");
    for (size_t i = 0; i < WANTED_COUNT; i++) {
        if (strlen(wanted[i]) == stem && strncmp(wanted[i], id, stem) == 0)
            seen[i] = true;
    }
}

static int run_file(const char *path, bool *seen, int *cases)
{
    FILE *file = fopen(path, "r");
    struct published_case c;
    int failed = 0;
    assert_non_null(file);
    while (case_read(file, &c)) {
        run_case(&c);
        note_seen(seen, c.id);
        ++*cases;
        if (c.trouble[0]) {
            print_error("%s: case %s: %s\n", path, c.id, c.trouble);
            failed++;
        }
    }
    fclose(file);
    return failed;
}

static void test_published_cases(void **state)
{
    bool seen[WANTED_COUNT] = {false};
    int cases = 0, failed = 0;
    (void)state;
    for (size_t i = 0; i < sizeof files / sizeof files[0]; i++)
        failed += run_file(files[i], seen, &cases);
    for (size_t i = 0; i < WANTED_COUNT; i++) {
        if (!seen[i]) {
            print_error("no case for %s\n", wanted[i]);
            failed++;
        }
    }
    print_message("%d published cases\n", cases);
    assert_int_equal(failed, 0);
}

/* The runner itself: what is wrong in a case must be seen. */
static void check_trouble(const char *text, const char *trouble)
{
    struct published_case c;
    FILE *file = fmemopen((void *)(uintptr_t)text, strlen(text), "r");
    assert_non_null(file);
    assert_true(case_read(file, &c));
    fclose(file);
    run_case(&c);
    if (!strstr(c.trouble, trouble))
        print_error("wanted \"%s\", got \"%s\"\n", trouble, c.trouble);
    assert_non_null(strstr(c.trouble, trouble));
}

static void test_runner_refuses(void **state)
{
    (void)state;
    check_trouble("id x\nsource y\nfunction no_such\nexpect a = 1\ntolerance 1\n",
                  "unknown function");
    check_trouble("id x\nsource y\nfunction curling_coefficient\ngiven ratio = 5\n"
                  "expect C = 0.9\ntolerance 0.0001\n",
                  "differs");
    check_trouble("id x\nsource y\nfunction curling_coefficient\ngiven ratio = 5\n", "needs");
    check_trouble("id x\nsource y\nfunction curling_coefficient\ngiven ratio = 5\n"
                  "given more = 1\nexpect C = 0.7136\ntolerance 0.0001\n",
                  "not used");
    check_trouble("id x\nsource y\nfunction curling_coefficient\ngiven ratio = 5\n"
                  "expect D = 0.7136\ntolerance 0.0001\n",
                  "no answer");
    check_trouble("id x\nsource y\nfunction curling_coefficient\nexpect C = 0\ntolerance 1\n",
                  "no number given");
}

int main(void)
{
    const struct CMUnitTest tests[] = {cmocka_unit_test(test_published_cases),
                                       cmocka_unit_test(test_runner_refuses)};
    return cmocka_run_group_tests(tests, NULL, NULL);
}
