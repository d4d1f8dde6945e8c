/* The JSON and CSV result read back by another program's reader (jansson): every key of
 * docs/format.md "JSON result" and "layout" is there, of its type, finite, and says the same in
 * each place it stands. */
#include "export_help.h"
#include "export/csv.h"
#include "export/json.h"
#include "job/field.h"
#include <jansson.h>
#include <math.h>

/* Types: n number, i whole number, s text, b yes or no, a list, o object; upper case: or null. */
struct key {
    const char *name;
    char type;
};

static const char *sample_name = "";

static bool of_type(const json_t *value, char type)
{
    switch (type) {
    case 'n':
        return json_is_number(value) && isfinite(json_number_value(value));
    case 'i':
        return json_is_integer(value);
    case 's':
        return json_is_string(value) && json_string_length(value) > 0;
    case 't': /* a text that may be empty */
        return json_is_string(value);
    case 'b':
        return json_is_boolean(value);
    case 'a':
        return json_is_array(value);
    case 'o':
        return json_is_object(value);
    default:
        return json_is_null(value) || of_type(value, (char)(type + ('a' - 'A')));
    }
}

static const json_t *need(const json_t *object, const char *name, char type)
{
    const json_t *value = json_object_get(object, name);

    if (value == NULL)
        fail_msg("%s: no key '%s'", sample_name, name);
    else if (!of_type(value, type))
        fail_msg("%s: '%s' is not of type %c", sample_name, name, type);
    return value;
}

static void need_keys(const json_t *object, const struct key *keys, size_t count)
{
    for (size_t i = 0; i < count; i++)
        need(object, keys[i].name, keys[i].type);
}

static void need_rows(const json_t *object, const char *name, const struct key *keys, size_t count)
{
    const json_t *list = need(object, name, 'a');

    for (size_t r = 0; r < json_array_size(list); r++)
        need_keys(json_array_get(list, r), keys, count);
}

static double number(const json_t *object, const char *name)
{
    return json_number_value(need(object, name, 'n'));
}

static const char *word(const json_t *object, const char *name)
{
    return json_string_value(need(object, name, 't'));
}

/* ---- a sample's result ---- */

static json_t *read_back(const struct text *text)
{
    json_error_t error;
    json_t *json = json_loads(text_string(text), JSON_REJECT_DUPLICATES, &error);

    if (json == NULL)
        fail_msg("%s: line %d: %s", sample_name, error.line, error.text);
    return json;
}

static json_t *result_of(const struct plan *plan)
{
    struct text text = {0};
    json_t *json;

    assert_true(json_report(&text, plan, NULL));
    assert_false(text.failed);
    json = read_back(&text);
    text_free(&text);
    return json;
}

static void with_each(void (*check)(const struct plan *plan, const json_t *result))
{
    for (size_t i = 0; i < COUNT(samples); i++) {
        struct plan plan;
        json_t *result;
        sample_name = samples[i].name;
        sample_plan(&samples[i], -1, &plan);
        result = result_of(&plan);
        check(&plan, result);
        json_decref(result);
        plan_free(&plan);
    }
}

/* ---- every key, of its type ---- */

static const struct key program_keys[] = {{"name", 's'}, {"version", 's'}};
static const struct key spacing_keys[] = {
    {"limit_m", 'n'}, {"across_limit_m", 'n'}, {"governed_by", 's'}, {"limits", 'a'}};
static const struct key limit_keys[] = {
    {"rule", 's'}, {"limit_m", 'n'}, {"source", 's'}, {"applies", 's'}};
static const struct key temperature_keys[] = {{"coldest_c", 'n'},
                                              {"hottest_c", 'n'},
                                              {"sealing_c", 'n'},
                                              {"zero_stress_c", 'n'},
                                              {"basis", 's'}};
static const struct key shrinkage_keys[] = {
    {"after_sealing", 'n'}, {"basis", 's'}, {"end_years", 'n'}};
static const struct key movement_keys[] = {
    {"open_m", 'n'}, {"close_m", 'n'}, {"panel_m", 'n'}, {"basis", 's'}};
static const struct key working_keys[] = {
    {"n", 'i'}, {"open_m", 'n'}, {"extension", 'N'}, {"verdict", 'S'}};
static const struct key seal_keys[] = {
    {"width_m", 'N'},  {"least_width_m", 'N'}, {"tolerance_m", 'N'}, {"depth_m", 'N'},
    {"recess_m", 'N'}, {"extension", 'N'},     {"compression", 'N'}, {"bead_strain", 'N'},
    {"rod_m", 'N'},    {"verdict", 'S'},       {"basis", 'S'}};
static const struct key table_keys[] = {
    {"slab_c", 'n'}, {"gap_m", 'n'}, {"extension", 'n'}, {"compression", 'n'}, {"verdict", 's'}};
static const struct key isolation_keys[] = {
    {"where", 's'},    {"run_m", 'n'},     {"from_c", 'n'},      {"expansion_m", 'n'},
    {"filler_m", 'n'}, {"extension", 'N'}, {"compression", 'N'}, {"verdict", 's'}};
static const struct key cut_keys[] = {{"least_m", 'n'}, {"most_m", 'n'}};
static const struct key check_keys[] = {{"id", 's'},       {"label", 's'},  {"demand", 'N'},
                                        {"capacity", 'N'}, {"unit", 't'},   {"binding", 'b'},
                                        {"verdict", 'S'},  {"source", 's'}, {"remedy", 't'}};
static const struct key quantity_keys[] = {{"contraction_m", 'n'},   {"construction_m", 'n'},
                                           {"isolation_m", 'n'},     {"expansion_m", 'n'},
                                           {"saw_m", 'n'},           {"sealant_net_l", 'N'},
                                           {"sealant_cusps_l", 'N'}, {"sealant_order_l", 'N'},
                                           {"packages", 'a'},        {"rod_m", 'a'}};
static const struct key package_keys[] = {{"size_l", 'n'}, {"count", 'i'}};
static const struct key rod_keys[] = {{"diameter_m", 'n'}, {"length_m", 'n'}};
static const struct key joint_keys[] = {
    {"id", 's'},      {"kind", 's'},      {"x1", 'n'},          {"y1", 'n'},     {"x2", 'n'},
    {"y2", 'n'},      {"length_m", 'n'},  {"tied", 'b'},        {"open_m", 'N'}, {"close_m", 'N'},
    {"width_m", 'N'}, {"extension", 'N'}, {"compression", 'N'}, {"verdict", 'S'}};
static const struct key finding_keys[] = {{"severity", 's'}, {"field", 't'},   {"value", 't'},
                                          {"limit", 't'},    {"message", 's'}, {"line", 'i'},
                                          {"column", 'i'}};

#define KEYS(table) table, COUNT(table)

static void check_keys_of(const struct plan *plan, const json_t *result)
{
    static const struct {
        const char *name;
        const struct key *keys;
        size_t count;
    } groups[] = {{"program", KEYS(program_keys)},
                  {"spacing", KEYS(spacing_keys)},
                  {"temperature", KEYS(temperature_keys)},
                  {"shrinkage", KEYS(shrinkage_keys)},
                  {"movement", KEYS(movement_keys)},
                  {"seal", KEYS(seal_keys)},
                  {"cut", KEYS(cut_keys)},
                  {"quantities", KEYS(quantity_keys)}},
      lists[] = {{"working", KEYS(working_keys)},     {"sealing_table", KEYS(table_keys)},
                 {"isolation", KEYS(isolation_keys)}, {"checks", KEYS(check_keys)},
                 {"joints", KEYS(joint_keys)},        {"findings", KEYS(finding_keys)}};
    const json_t *quantities = json_object_get(result, "quantities");

    (void)plan;
    for (size_t i = 0; i < COUNT(groups); i++)
        need_keys(need(result, groups[i].name, 'o'), groups[i].keys, groups[i].count);
    for (size_t i = 0; i < COUNT(lists); i++)
        need_rows(result, lists[i].name, lists[i].keys, lists[i].count);
    need_rows(json_object_get(result, "spacing"), "limits", KEYS(limit_keys));
    need_rows(quantities, "packages", KEYS(package_keys));
    need_rows(quantities, "rod_m", KEYS(rod_keys));
}

static void test_every_key(void **state)
{
    (void)state;
    with_each(check_keys_of);
}

/* ---- the words ---- */

static void one_of(const json_t *object, const char *name, const char *words)
{
    const json_t *value = json_object_get(object, name);
    char padded[64];

    if (json_is_null(value))
        return;
    snprintf(padded, sizeof padded, " %s ", json_string_value(value));
    if (strstr(words, padded) == NULL)
        fail_msg("%s: '%s' is none of%s", sample_name, json_string_value(value), words);
}

static void rows_one_of(const json_t *object, const char *list, const char *name, const char *words)
{
    const json_t *rows = json_object_get(object, list);

    for (size_t i = 0; i < json_array_size(rows); i++)
        one_of(json_array_get(rows, i), name, words);
}

static void check_words(const struct plan *plan, const json_t *result)
{
    static const char verdicts[] = " holds tight fails ";
    static const char rules[] =
        " typed thickness cap table drag stiffness curling interlock sealant ";
    const json_t *spacing = json_object_get(result, "spacing");

    (void)plan;
    one_of(spacing, "governed_by", rules);
    rows_one_of(spacing, "limits", "rule", rules);
    rows_one_of(spacing, "limits", "applies", " governs advice no ");
    one_of(json_object_get(result, "temperature"), "basis", " typed estimate simulation ");
    one_of(json_object_get(result, "shrinkage"), "basis", " typed en1992 aci209 mc2010 ");
    one_of(json_object_get(result, "movement"), "basis", " factor friction ");
    one_of(json_object_get(result, "seal"), "basis", " width width-and-movement ");
    one_of(json_object_get(result, "seal"), "verdict", verdicts);
    rows_one_of(result, "working", "verdict", verdicts);
    rows_one_of(result, "sealing_table", "verdict", verdicts);
    rows_one_of(result, "isolation", "verdict", verdicts);
    rows_one_of(result, "checks", "verdict", verdicts);
    rows_one_of(result, "joints", "verdict", verdicts);
    rows_one_of(result, "joints", "kind", " contraction construction isolation expansion ");
    rows_one_of(result, "findings", "severity", " warning note ");
    assert_string_equal(word(json_object_get(result, "program"), "name"), "slabgap");
}

static void test_words(void **state)
{
    (void)state;
    with_each(check_words);
}

/* Every input is in "job", in SI; what was assumed and typed over a rule are inputs too. */
static void check_job(const struct plan *plan, const json_t *result)
{
    static const char *const lists[] = {"overrides", "assumed"};
    const json_t *job = need(result, "job", 'o');
    const json_t *thickness = json_object_get(job, "slab.thickness");

    for (int id = 0; id < FIELD_COUNT; id++) {
        char key[96];
        snprintf(key, sizeof key, "%s.%s", field_table[id].section, field_table[id].key);
        if (json_object_get(job, key) == NULL)
            fail_msg("%s: job lacks '%s'", sample_name, key);
    }
    assert_true(fabs(json_number_value(thickness) - plan->job.slab_thickness) < 1e-9);
    for (size_t l = 0; l < COUNT(lists); l++) {
        const json_t *list = need(job, lists[l], 'a');
        for (size_t i = 0; i < json_array_size(list); i++)
            assert_non_null(json_object_get(job, json_string_value(json_array_get(list, i))));
    }
}

static void test_job(void **state)
{
    (void)state;
    with_each(check_job);
}

/* ---- the verdicts follow from the numbers, the exit status from the verdicts ---- */

static const char *expected_verdict(double demand, double capacity)
{
    if (demand > capacity * (1 + 1e-9))
        return "fails";
    return demand > 0.9 * capacity ? "tight" : "holds";
}

static void check_verdicts(const struct plan *plan, const json_t *result)
{
    const json_t *checks = json_object_get(result, "checks");
    int status = number(need(result, "layout", 'o'), "violations") > 0 ? 1 : 0;

    assert_true(json_array_size(checks) >= 3);
    for (size_t i = 0; i < json_array_size(checks); i++) {
        const json_t *check = json_array_get(checks, i);
        const json_t *verdict = json_object_get(check, "verdict");
        if (json_is_null(verdict))
            continue;
        if (json_is_true(json_object_get(check, "binding")) &&
            strcmp(json_string_value(verdict), "fails") == 0)
            status = 1;
        if (strcmp(json_string_value(json_object_get(check, "unit")), "degC") != 0)
            assert_string_equal(
                json_string_value(verdict),
                expected_verdict(number(check, "demand"), number(check, "capacity")));
    }
    assert_int_equal(plan_exit_status(plan), status);
}

static void test_verdicts(void **state)
{
    (void)state;
    with_each(check_verdicts);
}

/* Which rows bind is fixed by the contract, by the id before its first dot but one. */
static void check_binding(const struct plan *plan, const json_t *result)
{
    static const char binds[] =
        " panel.side panel.side-least panel.aspect panel.angle panel.corner joint.end "
        "object.isolated edge.isolated edge.match pour.line pour.width seal.width seal.extension "
        "seal.compression ";
    static const char advice[] =
        " seal.bead seal.cold spacing.typed interlock curling contact drag "
        "floor-filler ";
    const json_t *checks = json_object_get(result, "checks");

    for (size_t i = 0; i < json_array_size(checks); i++) {
        const json_t *check = json_array_get(checks, i);
        const char *id = word(check, "id");
        bool binding = json_is_true(json_object_get(check, "binding"));
        char padded[80];
        snprintf(padded, sizeof padded, " %s ", id);
        if (strncmp(id, "filler.", 7) == 0 || strstr(binds, padded) != NULL)
            assert_true(binding);
        else if (strcmp(id, "working") == 0)
            assert_int_equal(binding, plan->job.sealing_working > 1);
        else if (strstr(advice, padded) != NULL)
            assert_false(binding);
        else
            fail_msg("%s: check id '%s' is not in the contract", sample_name, id);
    }
}

static void test_binding(void **state)
{
    (void)state;
    with_each(check_binding);
}

/* ---- layout ---- */

static void no_null(const json_t *value)
{
    const char *name;
    json_t *member;
    size_t i;

    assert_false(json_is_null(value));
    if (json_is_object(value))
        json_object_foreach((json_t *)(uintptr_t)value, name, member) no_null(member);
    else if (json_is_array(value))
        json_array_foreach((json_t *)(uintptr_t)value, i, member) no_null(member);
}

static void need_ring(const json_t *ring, size_t least)
{
    assert_true(json_is_array(ring));
    assert_true(json_array_size(ring) >= least);
    for (size_t i = 0; i < json_array_size(ring); i++) {
        const json_t *point = json_array_get(ring, i);
        assert_int_equal(json_array_size(point), 2);
        assert_true(of_type(json_array_get(point, 0), 'n'));
        assert_true(of_type(json_array_get(point, 1), 'n'));
    }
}

static void check_fixed(const json_t *layout)
{
    static const struct key keys[] = {{"id", 's'}, {"kind", 's'}, {"shape", 's'},
                                      {"x", 'n'},  {"y", 'n'},    {"needs_isolation", 'b'}};
    static const struct key rect[] = {{"w", 'n'}, {"d", 'n'}, {"angle_deg", 'n'}};
    const json_t *fixed = need(layout, "fixed", 'a');

    for (size_t i = 0; i < json_array_size(fixed); i++) {
        const json_t *object = json_array_get(fixed, i);
        need_keys(object, KEYS(keys));
        if (strcmp(word(object, "shape"), "round") == 0)
            need(object, "diameter", 'n');
        else
            need_keys(object, KEYS(rect));
    }
}

static void check_limits(const json_t *layout)
{
    static const struct key keys[] = {
        {"max_side", 'n'}, {"max_aspect", 'n'}, {"min_side", 'n'}, {"min_angle_deg", 'n'}};
    static const struct key axes[] = {{"max_side_x", 'n'}, {"max_side_y", 'n'}, {"axis_deg", 'n'}};
    const json_t *limits = need(layout, "limits", 'o');

    need_keys(limits, KEYS(keys));
    if (json_object_get(limits, "max_side_x") == NULL) {
        assert_int_equal(json_object_size(limits), COUNT(keys)); /* all three or none */
        return;
    }
    need_keys(limits, KEYS(axes));
    assert_true(fmax(number(limits, "max_side_x"), number(limits, "max_side_y")) ==
                number(limits, "max_side"));
}

static void check_edges(const json_t *layout)
{
    static const struct key keys[] = {
        {"index", 'i'}, {"edge", 'i'}, {"kind", 's'}, {"joints", 'a'}, {"treat", 's'}};
    const json_t *edges = need(layout, "edges", 'a');

    need_rows(layout, "edges", KEYS(keys));
    rows_one_of(layout, "edges", "kind", " fixed existing ");
    rows_one_of(layout, "edges", "treat", " match isolate ");
    for (size_t i = 0; i < json_array_size(edges); i++)
        assert_true(number(json_array_get(edges, i), "index") <
                    (double)json_array_size(json_object_get(layout, "outline")));
}

static void check_panels(const json_t *layout)
{
    static const struct key keys[] = {{"id", 's'},      {"ring", 'a'},   {"length_m", 'n'},
                                      {"width_m", 'n'}, {"aspect", 'n'}, {"reasons", 'a'}};
    static const struct key reasons[] = {{"code", 's'},  {"rule", 's'},  {"value", 'n'},
                                         {"limit", 'n'}, {"cause", 's'}, {"remedy", 's'}};
    const json_t *panels = need(layout, "panels", 'a');

    need_rows(layout, "panels", KEYS(keys));
    for (size_t i = 0; i < json_array_size(panels); i++) {
        const json_t *panel = json_array_get(panels, i);
        double length = number(panel, "length_m"), width = number(panel, "width_m");
        char id[32];
        snprintf(id, sizeof id, "P%zu", i + 1);
        assert_string_equal(word(panel, "id"), id);
        need_ring(json_object_get(panel, "ring"), 3);
        need_rows(panel, "reasons", KEYS(reasons));
        assert_true(length >= width && width > 0);
        assert_true(fabs(number(panel, "aspect") - length / width) < 1e-6);
    }
}

static void check_layout(const struct plan *plan, const json_t *result)
{
    static const struct key joint_part[] = {{"id", 's'}, {"kind", 's'}, {"x1", 'n'},
                                            {"y1", 'n'}, {"x2", 'n'},   {"y2", 'n'}};
    const json_t *layout = need(result, "layout", 'o');
    const json_t *outline = need(layout, "outline", 'a');
    const json_t *openings = need(layout, "openings", 'a');

    no_null(layout);
    if (plan->has_outline)
        need_ring(outline, 3);
    else
        assert_int_equal(json_array_size(outline), 0);
    for (size_t i = 0; i < json_array_size(openings); i++)
        need_ring(json_array_get(openings, i), 3);
    assert_int_equal(json_array_size(openings), plan->has_outline ? plan->job.opening_count : 0);
    check_fixed(layout);
    check_limits(layout);
    check_edges(layout);
    need(layout, "pours", 'o');
    need_rows(layout, "joints", KEYS(joint_part));
    rows_one_of(layout, "joints", "kind", " contraction construction isolation ");
    check_panels(layout);
    need(need(layout, "bound", 'o'), "panels", 'i');
    need(json_object_get(layout, "bound"), "joint_m", 'n');
    need(layout, "violations", 'i');
}

static void test_layout(void **state)
{
    (void)state;
    with_each(check_layout);
}

/* ---- one joint, told in two places ---- */

static void check_joint_pair(const json_t *joint, const json_t *drawn)
{
    static const char *const ends[] = {"x1", "y1", "x2", "y2"};
    const char *kind = word(joint, "kind");
    const json_t *purpose = json_object_get(drawn, "purpose");
    double length =
        hypot(number(joint, "x2") - number(joint, "x1"), number(joint, "y2") - number(joint, "y1"));

    assert_string_equal(word(joint, "id"), word(drawn, "id"));
    for (size_t e = 0; e < COUNT(ends); e++)
        assert_true(fabs(number(joint, ends[e]) - number(drawn, ends[e])) < 1e-6);
    assert_true(fabs(number(joint, "length_m") - length) < 2e-6);
    if (strcmp(kind, "expansion") == 0) {
        assert_string_equal(word(drawn, "kind"), "isolation");
        assert_string_equal(json_string_value(purpose), "expansion");
    } else {
        assert_string_equal(word(drawn, "kind"), kind);
        assert_null(purpose);
    }
}

static void check_ids(const struct plan *plan, const json_t *result)
{
    const json_t *joints = json_object_get(result, "joints");
    const json_t *drawn = json_object_get(json_object_get(result, "layout"), "joints");

    (void)plan;
    assert_int_equal(json_array_size(joints), json_array_size(drawn));
    for (size_t i = 0; i < json_array_size(joints); i++) {
        const json_t *joint = json_array_get(joints, i);
        check_joint_pair(joint, json_array_get(drawn, i));
        for (size_t j = 0; j < i; j++)
            assert_string_not_equal(word(joint, "id"), word(json_array_get(joints, j), "id"));
    }
}

static void test_ids(void **state)
{
    (void)state;
    with_each(check_ids);
}

/* The metres of each kind are the sum of its joints. */
static void check_sums(const struct plan *plan, const json_t *result)
{
    static const char *const kinds[] = {"contraction", "construction", "isolation", "expansion"};
    const json_t *joints = json_object_get(result, "joints");
    const json_t *quantities = json_object_get(result, "quantities");

    if (!plan->has_outline || plan->quantities.length_typed)
        return;
    for (size_t k = 0; k < COUNT(kinds); k++) {
        char key[32];
        double sum = 0;
        for (size_t i = 0; i < json_array_size(joints); i++)
            if (strcmp(word(json_array_get(joints, i), "kind"), kinds[k]) == 0)
                sum += number(json_array_get(joints, i), "length_m");
        snprintf(key, sizeof key, "%s_m", kinds[k]);
        if (fabs(sum - number(quantities, key)) > 1e-5)
            fail_msg("%s: %s is %g, its joints have %g", sample_name, key, number(quantities, key),
                     sum);
    }
}

static void test_sums(void **state)
{
    (void)state;
    with_each(check_sums);
}

/* Packs hold what is to be ordered, and no size is left over that one pack less would do. */
static void check_packs(const struct plan *plan, const json_t *result)
{
    const json_t *quantities = json_object_get(result, "quantities");
    const json_t *packs = json_object_get(quantities, "packages");
    double order = json_number_value(json_object_get(quantities, "sealant_order_l"));

    (void)plan;
    for (size_t i = 0; i < json_array_size(packs); i++) {
        double size = number(json_array_get(packs, i), "size_l");
        double count = number(json_array_get(packs, i), "count");
        assert_true(count * size >= order * (1 - 1e-9));
        assert_true((count - 1) * size < order);
    }
}

static void test_packs(void **state)
{
    (void)state;
    with_each(check_packs);
}

/* ---- plan order ---- */

/* Sort key of a J line: parallel to y by x, parallel to x by y, the rest. */
static void line_key(const json_t *joint, double key[2])
{
    double x1 = number(joint, "x1"), y1 = number(joint, "y1");
    double x2 = number(joint, "x2"), y2 = number(joint, "y2");

    key[0] = fabs(x1 - x2) < 1e-9 ? 0 : fabs(y1 - y2) < 1e-9 ? 1 : 2;
    key[1] = key[0] == 0 ? x1 : key[0] == 1 ? y1 : fmin(x1, x2);
}

static void check_order(const struct plan *plan, const json_t *result)
{
    const json_t *joints = json_object_get(result, "joints");
    double last[2] = {-1, 0};
    int line = 0, piece = 0;

    (void)plan;
    for (size_t i = 0; i < json_array_size(joints); i++) {
        const json_t *joint = json_array_get(joints, i);
        int number_of, piece_of = 0;
        double key[2];
        if (sscanf(word(joint, "id"), "J%d.%d", &number_of, &piece_of) < 1)
            continue;
        assert_true(piece_of > 0 && number_of == line ? piece_of == piece + 1
                                                      : number_of == line + 1 && piece_of <= 1);
        line_key(joint, key);
        line = number_of;
        piece = piece_of;
        if (key[0] == 2)
            continue; /* the rest: in order along the slab */
        if (key[0] < last[0] || (key[0] == last[0] && key[1] < last[1] - 1e-9))
            fail_msg("%s: %s stands after a line that comes later", sample_name, word(joint, "id"));
        memcpy(last, key, sizeof last);
    }
}

static void test_joint_order(void **state)
{
    (void)state;
    with_each(check_order);
}

/* Panels by the lowest, then leftmost corner. */
static void panel_corner(const json_t *panel, double corner[2])
{
    const json_t *ring = json_object_get(panel, "ring");

    corner[0] = corner[1] = INFINITY;
    for (size_t i = 0; i < json_array_size(ring); i++) {
        double x = json_number_value(json_array_get(json_array_get(ring, i), 0));
        double y = json_number_value(json_array_get(json_array_get(ring, i), 1));
        if (y < corner[1] || (y == corner[1] && x < corner[0])) {
            corner[0] = x;
            corner[1] = y;
        }
    }
}

static void check_panel_order(const struct plan *plan, const json_t *result)
{
    const json_t *panels = json_object_get(json_object_get(result, "layout"), "panels");
    double last[2] = {-INFINITY, -INFINITY}, corner[2];

    (void)plan;
    for (size_t i = 0; i < json_array_size(panels); i++) {
        panel_corner(json_array_get(panels, i), corner);
        assert_true(corner[1] > last[1] || (corner[1] == last[1] && corner[0] > last[0]));
        memcpy(last, corner, sizeof last);
    }
}

static void test_panel_order(void **state)
{
    (void)state;
    with_each(check_panel_order);
}

/* ---- coordinates ---- */

static bool six_decimals(const char *number_text)
{
    size_t digits;

    number_text += *number_text == '-';
    digits = strspn(number_text, "0123456789");
    return digits > 0 && number_text[digits] == '.' &&
           strspn(number_text + digits + 1, "0123456789") == 6;
}

/* In the text of "layout": members of lists and the keys of places have six decimals. */
static void test_six_decimals(void **state)
{
    (void)state;
    static const char *const keys[] = {"\"x\":",  "\"y\":", "\"x1\":", "\"y1\":",      "\"x2\":",
                                       "\"y2\":", "\"w\":", "\"d\":",  "\"diameter\":"};

    for (size_t s = 0; s < COUNT(samples); s++) {
        struct plan plan;
        struct text text = {0};
        size_t seen = 0;
        sample_plan(&samples[s], -1, &plan);
        assert_true(json_report(&text, &plan, "layout"));
        for (const char *c = text_string(&text); *c != '\0'; c++) {
            bool member = (*c == '[' || *c == ',') && (c[1] == '-' || (c[1] >= '0' && c[1] <= '9'));
            if (member && !six_decimals(c + 1))
                fail_msg("%s: %.40s", samples[s].name, c);
            seen += member;
            for (size_t k = 0; k < COUNT(keys); k++)
                if (strncmp(c, keys[k], strlen(keys[k])) == 0 && !six_decimals(c + strlen(keys[k])))
                    fail_msg("%s: %.40s", samples[s].name, c);
        }
        assert_true(seen > 0 || !plan.has_outline);
        assert_null(strstr(text_string(&text), "-0.000000"));
        text_free(&text);
        plan_free(&plan);
    }
}

/* Two things that share a point print it with the same digits: no two printed points lie closer
 * than 5 micrometres without being one. */
static void check_shared_points(const struct plan *plan, const json_t *result)
{
    const json_t *layout = json_object_get(result, "layout");
    const json_t *panels = json_object_get(layout, "panels");
    const json_t *joints = json_object_get(layout, "joints");
    size_t most = 2 * json_array_size(joints) + 64 * json_array_size(panels) + 1, count = 0;
    double(*points)[2] = calloc(most, sizeof *points);

    (void)plan;
    assert_non_null(points);
    for (size_t i = 0; i < json_array_size(panels); i++) {
        const json_t *ring = json_object_get(json_array_get(panels, i), "ring");
        for (size_t k = 0; k < json_array_size(ring) && count < most; k++, count++)
            for (size_t axis = 0; axis < 2; axis++)
                points[count][axis] =
                    json_number_value(json_array_get(json_array_get(ring, k), axis));
    }
    for (size_t i = 0; i < json_array_size(joints) && count + 2 <= most; i++, count += 2) {
        const json_t *joint = json_array_get(joints, i);
        points[count][0] = number(joint, "x1");
        points[count][1] = number(joint, "y1");
        points[count + 1][0] = number(joint, "x2");
        points[count + 1][1] = number(joint, "y2");
    }
    for (size_t i = 0; i < count; i++)
        for (size_t j = 0; j < i; j++) {
            double dx = fabs(points[i][0] - points[j][0]), dy = fabs(points[i][1] - points[j][1]);
            if (dx < 5e-6 && dy < 5e-6 && (dx > 0 || dy > 0))
                fail_msg("%s: (%.6f, %.6f) is printed as (%.6f, %.6f) too", sample_name,
                         points[i][0], points[i][1], points[j][0], points[j][1]);
        }
    free(points);
}

static void test_shared_points(void **state)
{
    (void)state;
    with_each(check_shared_points);
}

/* ---- what is not there ---- */

static void test_no_sealant_is_null(void **state)
{
    (void)state;
    static const char *const keys[] = {"extension", "compression", "bead_strain", "verdict"};
    static const struct sample none = {"no sealant", F RECTANGLE "[sealant]\nkind = none\n"};
    struct plan plan;
    json_t *result;

    sample_name = none.name;
    sample_plan(&none, -1, &plan);
    result = result_of(&plan);
    for (size_t i = 0; i < COUNT(keys); i++)
        assert_true(json_is_null(json_object_get(json_object_get(result, "seal"), keys[i])));
    assert_int_equal(json_array_size(json_object_get(result, "sealing_table")), 0);
    for (size_t i = 0; i < json_array_size(json_object_get(result, "checks")); i++)
        assert_int_not_equal(
            strncmp(word(json_array_get(json_object_get(result, "checks"), i), "id"), "seal.", 5),
            0);
    json_decref(result);
    plan_free(&plan);
}

/* Without an outline: one joint between two panels of the governing spacing. */
static void test_no_outline(void **state)
{
    (void)state;
    static const char *const lists[] = {"outline", "openings", "fixed",
                                        "edges",   "joints",   "panels"};
    static const struct sample none = {"no outline", F};
    struct plan plan;
    json_t *result;
    const json_t *layout;

    sample_name = none.name;
    sample_plan(&none, -1, &plan);
    result = result_of(&plan);
    layout = need(result, "layout", 'o');
    for (size_t i = 0; i < COUNT(lists); i++)
        assert_int_equal(json_array_size(need(layout, lists[i], 'a')), 0);
    assert_int_equal(json_array_size(need(result, "joints", 'a')), 0);
    assert_true(number(json_object_get(result, "movement"), "panel_m") ==
                number(json_object_get(result, "spacing"), "limit_m"));
    assert_true(number(json_object_get(result, "seal"), "width_m") > 0);
    json_decref(result);
    plan_free(&plan);
}

/* A refused job: the program and its findings, nothing else. */
static void test_refused_job(void **state)
{
    (void)state;
    struct finding_list findings = {0};
    struct text text = {0};
    json_t *json;

    sample_name = "refused";
    finding_add(&findings, SEVERITY_ERROR, "slab.thickness", "8 \"m\"\n\x01", "1 m", 3, 13,
                "slab.thickness: too \\ large.");
    json_findings(&text, &findings);
    json = read_back(&text);
    assert_int_equal(json_object_size(json), 2);
    need_keys(need(json, "program", 'o'), KEYS(program_keys));
    need_rows(json, "findings", KEYS(finding_keys));
    assert_string_equal(word(json_array_get(json_object_get(json, "findings"), 0), "value"),
                        "8 \"m\"\n\x01");
    json_decref(json);
    text_free(&text);
    finding_free(&findings);
}

/* --only prints one value of the whole, the same. */
static void check_only(const struct plan *plan, const json_t *result)
{
    const char *name;
    json_t *value;

    json_object_foreach((json_t *)(uintptr_t)result, name, value)
    {
        struct text text = {0};
        json_t *alone;
        assert_true(json_report(&text, plan, name));
        alone = read_back(&text);
        assert_true(json_equal(alone, value));
        json_decref(alone);
        text_free(&text);
    }
}

static void test_only(void **state)
{
    (void)state;
    struct plan plan;
    struct text text = {0};

    with_each(check_only);
    sample_plan(&samples[0], -1, &plan);
    assert_false(json_report(&text, &plan, "colour"));
    assert_int_equal(text.length, 0);
    text_free(&text);
    plan_free(&plan);
}

/* A plan made twice is the same, byte by byte. */
static void test_twice(void **state)
{
    (void)state;
    for (size_t i = 0; i < COUNT(samples); i++) {
        struct text texts[2] = {{0}, {0}};
        for (size_t t = 0; t < 2; t++) {
            struct plan plan;
            sample_plan(&samples[i], -1, &plan);
            assert_true(json_report(&texts[t], &plan, NULL));
            plan_free(&plan);
        }
        assert_string_equal(text_string(&texts[0]), text_string(&texts[1]));
        text_free(&texts[0]);
        text_free(&texts[1]);
    }
}

/* ---- the field table ---- */

static void test_fields(void **state)
{
    (void)state;
    static const struct key keys[] = {{"key", 's'},  {"label", 's'},   {"quantity", 's'},
                                      {"unit", 't'}, {"unit_us", 't'}, {"min", 'N'},
                                      {"max", 'N'},  {"choices", 'A'}, {"repeat", 'b'},
                                      {"help", 's'}, {"source", 't'}};
    struct text text = {0};
    json_t *json;
    const json_t *fields;

    sample_name = "fields";
    json_fields(&text);
    json = read_back(&text);
    fields = need(json, "fields", 'a');
    assert_int_equal(json_array_size(fields), FIELD_COUNT + repeated_field_count);
    need_rows(json, "fields", KEYS(keys));
    for (size_t i = 0; i < json_array_size(fields); i++) {
        const json_t *field = json_array_get(fields, i);
        const json_t *least = json_object_get(field, "min"), *most = json_object_get(field, "max");
        assert_non_null(json_object_get(field, "default"));
        assert_non_null(strchr(word(field, "key"), '.'));
        assert_int_equal(json_is_null(least), json_is_null(most));
        if (!json_is_null(least))
            assert_true(json_number_value(least) < json_number_value(most));
    }
    json_decref(json);
    text_free(&text);
}

/* ---- CSV ---- */

/* The next cell of a CSV line (RFC 4180), unquoted; *at moves past it. */
static void next_cell(const char **at, char *cell, size_t room)
{
    size_t used = 0;
    bool quoted = **at == '"';

    *at += quoted;
    while (**at != '\0' && (quoted || (**at != ',' && **at != '\r'))) {
        if (quoted && **at == '"') {
            if ((*at)[1] != '"')
                break;
            (*at)++;
        }
        assert_true(used + 1 < room);
        cell[used++] = *(*at)++;
    }
    cell[used] = '\0';
    *at += quoted;
    if (**at == ',')
        (*at)++;
}

static void compare_cell(const char *cell, const json_t *value, const char *key)
{
    char *end;

    if (value == NULL || json_is_null(value)) {
        assert_string_equal(cell, "");
    } else if (json_is_number(value)) {
        assert_true(strtod(cell, &end) == json_number_value(value));
        assert_int_equal(*end, '\0');
    } else if (json_is_boolean(value)) {
        assert_string_equal(cell, json_is_true(value) ? "yes" : "no");
    } else if (strcmp(cell, json_string_value(value)) != 0) {
        fail_msg("%s: %s is '%s' in CSV, '%s' in JSON", sample_name, key, cell,
                 json_string_value(value));
    }
}

/* A CSV of rows against a list of the JSON, by the column's name; columns the list has not are
 * skipped. Returns the number of rows. */
static size_t compare_rows(const char *csv, const json_t *list)
{
    char names[32][48], cell[512];
    size_t columns = 0, rows = 0;
    const char *at = csv;

    while (*at != '\r')
        next_cell(&at, names[columns++], sizeof names[0]);
    for (at += 2; *at != '\0'; at += 2, rows++) {
        const json_t *row = json_array_get(list, rows);
        assert_non_null(row);
        for (size_t c = 0; c < columns; c++) {
            next_cell(&at, cell, sizeof cell);
            if (json_object_get(row, names[c]) != NULL)
                compare_cell(cell, json_object_get(row, names[c]), names[c]);
        }
        assert_true(at[0] == '\r' && at[1] == '\n');
    }
    return rows;
}

static void check_csv_rows(const struct plan *plan, const json_t *result)
{
    const json_t *panels = json_object_get(json_object_get(result, "layout"), "panels");
    const struct {
        const char *name;
        const json_t *list;
    } tables[] = {{"joints", json_object_get(result, "joints")},
                  {"sealing", json_object_get(result, "sealing_table")},
                  {"panels", panels}};

    for (size_t i = 0; i < COUNT(tables); i++) {
        struct text text = {0};
        assert_true(csv_report(&text, plan, tables[i].name));
        assert_int_equal(compare_rows(text_string(&text), tables[i].list),
                         json_array_size(tables[i].list));
        text_free(&text);
    }
}

static void test_csv_rows(void **state)
{
    (void)state;
    with_each(check_csv_rows);
}

static void check_csv_quantities(const struct plan *plan, const json_t *result)
{
    const json_t *quantities = json_object_get(result, "quantities");
    struct text text = {0};
    size_t seen = 0;
    char what[128], value[64];

    assert_true(csv_report(&text, plan, "quantities"));
    for (const char *at = text_string(&text); *at != '\0'; at += 2) {
        next_cell(&at, what, sizeof what);
        next_cell(&at, value, sizeof value);
        if (json_object_get(quantities, what) != NULL) {
            compare_cell(value, json_object_get(quantities, what), what);
            seen++;
        }
        assert_true(at[0] == '\r' && at[1] == '\n');
    }
    assert_true(seen >= 8);
    assert_false(csv_report(&text, plan, "colours"));
    text_free(&text);
}

static void test_csv_quantities(void **state)
{
    (void)state;
    with_each(check_csv_quantities);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(test_every_key),
        cmocka_unit_test(test_words),
        cmocka_unit_test(test_job),
        cmocka_unit_test(test_verdicts),
        cmocka_unit_test(test_binding),
        cmocka_unit_test(test_layout),
        cmocka_unit_test(test_ids),
        cmocka_unit_test(test_sums),
        cmocka_unit_test(test_packs),
        cmocka_unit_test(test_joint_order),
        cmocka_unit_test(test_panel_order),
        cmocka_unit_test(test_six_decimals),
        cmocka_unit_test(test_shared_points),
        cmocka_unit_test(test_no_sealant_is_null),
        cmocka_unit_test(test_no_outline),
        cmocka_unit_test(test_refused_job),
        cmocka_unit_test(test_only),
        cmocka_unit_test(test_twice),
        cmocka_unit_test(test_fields),
        cmocka_unit_test(test_csv_rows),
        cmocka_unit_test(test_csv_quantities),
    };

    return cmocka_run_group_tests_name("JSON and CSV", tests, NULL, NULL);
}
