#include "export/report.h"
#include "export/climate_text.h"
#include "export/answers.h"
#include "export/lines.h"
#include "base/utf8.h"
#include "export/names.h"
#include "export/saw_text.h"
#include "export/seal_chart.h"
#include "export/wrap.h"
#include "job/field.h"
#include "plan/result.h"
#include <math.h>
#include <stdio.h>
#include <string.h>

enum { LABEL_COLUMNS = 42, JOINTS_MOST = 60 };
/* Below this rise left a run has no margin: common practice. */
static const double RESTRAINT_LITTLE_K = 10;

static enum unit_system units_of(const struct plan *plan)
{
    return (enum unit_system)plan->job.job_units;
}

static void heading(struct text *out, const char *words)
{
    text_format(out, "\n%s\n", words);
}

/* Pads from `start` to `columns` columns, with at least one blank. */
static void pad(struct text *out, size_t start, int columns)
{
    int used = utf8_columns(text_string(out) + start);

    text_add_char(out, ' ', used < columns ? (size_t)(columns - used) : 1);
}

/* All single results of a group ("seal"), a line each; those without a value are left out. */
static void add_results(struct text *out, const struct plan *plan, const char *group)
{
    size_t length = strlen(group);

    for (size_t i = 0; i < result_count; i++) {
        const struct result *result = &result_table[i];
        size_t start = out->length;
        if (strncmp(result->path, group, length) != 0 || result->path[length] != '.')
            continue;
        if (!result_there(result, plan))
            continue;
        text_format(out, "  %s", result->label);
        pad(out, start, LABEL_COLUMNS);
        result_show(out, result, plan, units_of(plan));
        text_add_char(out, '\n', 1);
    }
}

static void add_answers(struct text *out, const struct plan *plan)
{
    struct answers answers;

    wrap_add(out, "", 0,
             plan->job.given[FIELD_job_title] ? plan->job.job_title : "A job without a title",
             REPORT_COLUMNS);
    text_add_char(out, '\n', 1);
    answers_make(plan, &answers);
    for (size_t i = 0; i < answers.count; i++) {
        wrap_add(out, answers.rows[i].word, 12, answers.rows[i].sentence, REPORT_COLUMNS);
        if (answers.rows[i].more[0] != '\0')
            wrap_add(out, "", 12, answers.rows[i].more, REPORT_COLUMNS);
    }
}

static void add_fields(struct text *out, const struct plan *plan, const char *title,
                       const enum field_id *ids, size_t count)
{
    if (count == 0)
        return;
    heading(out, title);
    for (size_t i = 0; i < count; i++) {
        const struct field *field = &field_table[ids[i]];
        size_t start = out->length;
        text_format(out, "  %s", field->label);
        pad(out, start, 28);
        field_show(out, &plan->job, ids[i], units_of(plan));
        pad(out, start, 50);
        text_format(out, "%s.%s\n", field->section, field->key);
    }
}

static void add_job(struct text *out, const struct plan *plan)
{
    add_fields(out, plan, "TYPED BY YOU, NOT WORKED OUT", plan->overrides, plan->override_count);
    add_fields(out, plan, "ASSUMED (nothing was typed)", plan->assumed, plan->assumed_count);
}

enum { COLUMNS_MOST = 12 };

/* One cell of a list as text. */
static void cell(struct text *out, const struct list *list, const char *key,
                 const void *const arrays[2], size_t row, enum unit_system units)
{
    for (size_t c = 0; c < list->column_count; c++)
        if (strcmp(list->columns[c].key, key) == 0)
            column_show(out, &list->columns[c], column_place(list, &list->columns[c], arrays, row),
                        units);
}

static const char *column_label(const struct list *list, const char *key)
{
    for (size_t c = 0; c < list->column_count; c++)
        if (strcmp(list->columns[c].key, key) == 0)
            return list->columns[c].label;
    return "";
}

/* A list as it is printed: the columns named in `keys`. */
struct table {
    const struct list *list;
    const char *const *keys;
    size_t columns, rows;
    const void *arrays[2];
    enum unit_system units;
    int widths[COLUMNS_MOST];
    bool first_alone; /* too wide for one line: the first cell has its own */
    bool failed;      /* no memory to measure */
};

/* Row 0 is the labels. */
static void table_cell(struct text *out, const struct table *table, size_t column, size_t row)
{
    if (row == 0)
        text_add(out, column_label(table->list, table->keys[column]));
    else
        cell(out, table->list, table->keys[column], table->arrays, row - 1, table->units);
}

/* Widest cell of a column, its label included. */
static int column_width(struct table *table, size_t column)
{
    int width = 0;
    struct text text = {0};

    for (size_t r = 0; r <= table->rows; r++) {
        int columns;
        text_clear(&text);
        table_cell(&text, table, column, r);
        columns = utf8_columns(text_string(&text));
        width = columns > width ? columns : width;
    }
    table->failed = table->failed || text.failed;
    text_free(&text);
    return width;
}

static void set_widths(struct table *table)
{
    enum { WORDS = 24 }; /* a last column wider than this holds words and is wrapped */
    int total = 0;

    for (size_t k = 0; k < table->columns; k++) {
        table->widths[k] = column_width(table, k);
        total += table->widths[k] + 2;
    }
    table->first_alone = total > REPORT_COLUMNS && table->widths[table->columns - 1] <= WORDS;
}

static void add_row(struct text *out, const struct table *table, size_t row)
{
    size_t last = table->columns - 1;
    struct text line = {0}, words = {0};
    int column = 2;

    text_add(&line, "  ");
    for (size_t k = 0; k < last; k++) {
        table_cell(&line, table, k, row);
        column += table->widths[k] + 2;
        if (k == 0 && table->first_alone) {
            text_format(out, "%s\n", text_string(&line));
            text_clear(&line);
            column = 4;
        }
        pad(&line, 0, column);
    }
    table_cell(&words, table, last, row);
    wrap_add(out, text_string(&line), column, text_string(&words), REPORT_COLUMNS);
    out->failed = out->failed || line.failed || words.failed;
    text_free(&line);
    text_free(&words);
}

/* A list as a table: the columns named in `keys` (ended by NULL), at most `most` rows. */
static void add_list(struct text *out, const struct plan *plan, const char *name,
                     const char *const *keys, size_t most)
{
    struct table table = {.list = list_find(name), .keys = keys, .units = units_of(plan)};
    size_t rows = table.list->rows(plan, table.arrays);

    while (keys[table.columns] != NULL)
        table.columns++;
    table.rows = rows < most ? rows : most;
    set_widths(&table);
    out->failed = out->failed || table.failed;
    for (size_t r = 0; r <= table.rows; r++)
        add_row(out, &table, r);
    if (table.rows < rows)
        text_format(out, "  + %zu more (--csv %s or --json)\n", rows - table.rows, name);
}

static void add_spacing(struct text *out, const struct plan *plan)
{
    static const char *const keys[] = {"rule", "limit_m", "applies", "words", NULL};

    heading(out, "SPACING");
    add_results(out, plan, "spacing");
    text_add_char(out, '\n', 1);
    add_list(out, plan, "spacing.limits", keys, LIMIT_MOST);
    text_add(out, "  Advice never shortens the spacing unless rules.counts says so.\n");
}

static void add_climate(struct text *out, const struct plan *plan)
{
    struct text words = {0};

    text_add(&words, "Simulated from ");
    climate_words(&words, &plan->job);
    text_add(&words, ". Estimate and deck rule are for comparison, no bound.");
    wrap_add(out, "  ", 2, text_string(&words), 78);
    out->failed = out->failed || words.failed;
    text_free(&words);
}

static void add_temperature(struct text *out, const struct plan *plan)
{
    heading(out, "TEMPERATURE AND MOVEMENT");
    add_results(out, plan, "temperature");
    if (strcmp(plan->temperature.basis, "estimate") == 0)
        text_add(out,
                 "  Indoors: the air itself. The deck rule is for comparison, no bound here.\n");
    else if (strcmp(plan->temperature.basis, "simulation") == 0)
        add_climate(out, plan);
    add_results(out, plan, "shrinkage");
    add_results(out, plan, "movement");
    add_results(out, plan, "concrete");
}

static void add_working(struct text *out, const struct plan *plan)
{
    static const char *const keys[] = {"n", "open_m", "extension", "compression", "verdict", NULL};

    if (plan->working_count == 0)
        return;
    heading(out, "IF ONLY SOME CUTS CRACK THROUGH");
    add_list(out, plan, "working", keys, WORKING_MOST);
}

static void add_seal(struct text *out, const struct plan *plan)
{
    heading(out, "SEAL");
    add_results(out, plan, "seal");
    add_results(out, plan, "cut");
    add_working(out, plan);
}

static void add_table(struct text *out, const struct plan *plan)
{
    static const char *const keys[] = {"slab_c",  "gap_m",    "extension", "compression",
                                       "verdict", "too_cold", NULL};

    if (plan->table_count == 0)
        return;
    heading(out, "SEALING TABLE (the joint as cut, sealed at another slab temperature)");
    add_list(out, plan, "sealing_table", keys, TABLE_MOST);
    text_add(out, "\n  Which width may be sealed at which slab temperature, both measured then:\n");
    seal_chart_add(out, plan, REPORT_COLUMNS);
}

static void add_choice(struct text *out, const struct plan *plan)
{
    struct text words = {0};

    if (plan->choice_count == 0)
        return;
    heading(out, "WHICH SEALANT (usual classes; the tin wins; common practice and memory)");
    for (size_t i = 0; i < plan->choice_count; i++) {
        char first[32];
        snprintf(first, sizeof first, "%c %s", plan->choices[i].now ? '*' : ' ',
                 plan->choices[i].kind);
        text_clear(&words);
        seal_choice_words(&words, plan, &plan->choices[i]);
        wrap_add(out, first, 20, text_string(&words), REPORT_COLUMNS);
    }
    out->failed = out->failed || words.failed;
    text_free(&words);
}

static void add_isolation(struct text *out, const struct plan *plan)
{
    static const char *const keys[] = {"where",       "run_m",   "expansion_m", "filler_m",
                                       "compression", "verdict", NULL};

    if (plan->isolation_count == 0)
        return;
    heading(out, "ISOLATION (soft board, from the slab temperature at set to the hottest)");
    add_list(out, plan, "isolation", keys, JOINTS_MOST);
}

/* "stretch of the sealant: 13.8 %, limit 25 %. ASTM C920 ..." and, where it fails, what to do. */
static void check_words(struct text *out, const struct plan *plan, const struct plan_check *check)
{
    text_add(out, check->label);
    if (isfinite(check->demand)) {
        text_add(out, ": ");
        check_show(out, check->demand, check->unit, units_of(plan));
    }
    if (isfinite(check->capacity)) {
        text_add(out, ", at most ");
        check_show(out, check->capacity, check->unit, units_of(plan));
    }
    text_format(out, " (%s).", check->source);
    if (check->verdict == VERDICT_FAILS)
        text_format(out, " %s", check->remedy);
}

/* Rules of the layout that no panel breaks share one line. */
static bool is_unbroken_rule(const struct plan_check *check)
{
    return check->unit[0] == '\0' && check->demand <= 0;
}

static void add_checks(struct text *out, const struct plan *plan)
{
    size_t unbroken = 0;
    struct text words = {0};

    heading(out, "CHECKS (* = decides)");
    for (size_t i = 0; i < plan->check_count; i++) {
        const struct plan_check *check = &plan->checks[i];
        char first[32];
        if (is_unbroken_rule(check)) {
            unbroken++;
            continue;
        }
        snprintf(first, sizeof first, "%c %s", check->binding ? '*' : ' ',
                 check->verdict == VERDICT_NONE ? "NOTE" : verdict_screen_word(check->verdict));
        text_clear(&words);
        check_words(&words, plan, check);
        wrap_add(out, first, 14, text_string(&words), REPORT_COLUMNS);
    }
    text_clear(&words);
    text_format(&words, "%zu rules of panels, joint ends, boxes, edges and pours: none is broken.",
                unbroken);
    if (unbroken > 0)
        wrap_add(out, "* HOLDS", 14, text_string(&words), REPORT_COLUMNS);
    out->failed = out->failed || words.failed;
    text_free(&words);
}

/* The lift-off figure is no safety: say what it is (never "safe"). */
static void add_restraint(struct text *out, const struct plan *plan)
{
    heading(out, "IF THE SLAB MAY NOT MOVE");
    add_results(out, plan, "restraint");
    if (plan->restraint.rise_left_k < RESTRAINT_LITTLE_K)
        text_add(out, "  A long run whose joints have closed has no blow-up margin.\n");
    text_add(out, "  Lift-off limit of a clean, straight, sound slab; worn joint faces, a wet\n"
                  "  base, swelling and grit lower it.\n");
}

static void add_other_widths(struct text *out, const struct plan *plan)
{
    static const char *const keys[] = {"width_m", "depth_m", "extension", "compression", "verdict",
                                       "when_n3", "order_l", "packs",     "rod_m",       NULL};

    if (plan->quantities.width_count < 2)
        return;
    text_add(out, "  The same joints at other widths (depth by the kind of sealant):\n");
    add_list(out, plan, "quantities.other_widths", keys, WIDTH_MOST);
}

static void add_quantities(struct text *out, const struct plan *plan)
{
    static const char *const packs[] = {"size_l", "count", NULL};
    static const char *const rods[] = {"diameter_m", "length_m", NULL};
    static const char *const boards[] = {"thickness_m", "length_m", "area_m2", NULL};
    static const char *const work[] = {"name", "pace_m_s", "tools", "hours", "slowest", NULL};

    heading(out, "QUANTITIES");
    add_results(out, plan, "quantities");
    if (plan->quantities.package_count > 0)
        add_list(out, plan, "quantities.packages", packs, PACKAGE_KINDS);
    if (plan->quantities.boxes > 0)
        text_format(out, "  Sold in boxes of %g: %d boxes.\n", plan->job.takeoff_box,
                    plan->quantities.boxes);
    if (plan->quantities.rod_count > 0)
        add_list(out, plan, "quantities.rod_m", rods, PACKAGE_KINDS);
    if (plan->quantities.board_count > 0)
        add_list(out, plan, "quantities.boards", boards, BOARD_MOST);
    if (plan->quantities.work_count > 0)
        add_list(out, plan, "quantities.work", work, WORK_MOST);
    if (plan->quantities.isolation_m + plan->quantities.expansion_m > 0)
        text_add(out, "  The order and its packs are for cut joints and pour ends; what goes over\n"
                      "  the soft board comes on top.\n");
    add_other_widths(out, plan);
    add_results(out, plan, "steel");
    add_restraint(out, plan);
}

static void add_joints(struct text *out, const struct plan *plan)
{
    static const char *const keys[] = {"id",        "kind",    "length_m", "open_m",
                                       "extension", "verdict", "tied",     NULL};

    if (plan->layout.joint_count == 0)
        return;
    if (joint_line_last(&plan->layout) > 0) {
        heading(out, "LINES (tape from the slab's west end, or its south end)");
        joint_lines_print(out, plan, JOINTS_MOST);
    }
    heading(out, "JOINTS");
    add_list(out, plan, "joints", keys, JOINTS_MOST);
}

static void add_pours(struct text *out, const struct plan *plan)
{
    static const char *const keys[] = {"number", "panels", "area_m2", "volume_m3", "turn", NULL};

    if (plan->pour_count < 2)
        return;
    heading(out, "POURS (turn 1 first, turn 2 between them when those have hardened)");
    add_list(out, plan, "pours", keys, JOINTS_MOST);
}

static void add_cracks(struct text *out, const struct plan *plan)
{
    static const char *const keys[] = {"number", "length_m",   "panels",
                                       "beside", "distance_m", NULL};

    if (plan->crack_count == 0)
        return;
    heading(out, "CRACKS");
    add_list(out, plan, "cracks", keys, JOINTS_MOST);
}

/* ---- reasons, those of one cause together ---- */

enum { REASONS_MOST = 40, NAMES_MOST = 6 };

static bool same_cause(const struct layout_reason *a, const struct layout_reason *b)
{
    return strcmp(a->cause, b->cause) == 0 && strcmp(a->remedy, b->remedy) == 0;
}

/* Whether a panel before this one, or this one before reason `index`, has said it already. */
static bool said_before(const struct layout *layout, size_t panel, size_t index)
{
    const struct layout_reason *reason = &layout->panels[panel].reasons[index];

    for (size_t p = 0; p <= panel; p++) {
        size_t count = p < panel ? layout->panels[p].reason_count : index;
        for (size_t i = 0; i < count; i++)
            if (same_cause(&layout->panels[p].reasons[i], reason))
                return true;
    }
    return false;
}

/* "6A, 7A: " of all panels with this cause. */
static void add_names(struct text *out, const struct layout *layout, size_t from,
                      const struct layout_reason *reason)
{
    size_t count = 0;

    for (size_t p = from; p < layout->panel_count; p++) {
        char name[2 * LINE_NAME_MOST];
        bool has = false;
        for (size_t i = 0; i < layout->panels[p].reason_count; i++)
            has = has || same_cause(&layout->panels[p].reasons[i], reason);
        if (!has || ++count > NAMES_MOST)
            continue;
        name_panel(layout, &layout->panels[p], name);
        text_format(out, "%s%s", count > 1 ? ", " : "", name);
    }
    if (count > NAMES_MOST)
        text_format(out, " and %zu more", count - NAMES_MOST);
}

/* "panel.aspect 6.67, limit 1.5" of every rule that this cause breaks in the panel. */
static void add_rules(struct text *out, const struct layout_panel *panel,
                      const struct layout_reason *reason)
{
    bool first = true;

    for (size_t i = 0; i < panel->reason_count; i++) {
        const struct layout_reason *other = &panel->reasons[i];
        if (!same_cause(other, reason))
            continue;
        text_format(out, "%s%s", first ? "" : "; ", other->rule);
        if (isfinite(other->value) && isfinite(other->limit))
            text_format(out, " %.3g, limit %.3g", other->value, other->limit);
        first = false;
    }
}

static void add_panel_reasons(struct text *out, const struct layout *layout)
{
    size_t printed = 0, left = 0;
    struct text words = {0};

    for (size_t p = 0; p < layout->panel_count; p++)
        for (size_t i = 0; i < layout->panels[p].reason_count; i++) {
            const struct layout_reason *reason = &layout->panels[p].reasons[i];
            if (printed >= REASONS_MOST) {
                left++;
                continue;
            }
            if (said_before(layout, p, i))
                continue;
            printed++;
            text_clear(&words);
            add_names(&words, layout, p, reason);
            text_add(&words, ": ");
            add_rules(&words, &layout->panels[p], reason);
            text_format(&words, ". %s %s", reason->cause, reason->remedy);
            wrap_add(out, "  !", 4, text_string(&words), REPORT_COLUMNS);
        }
    if (left > 0)
        text_format(out, "  + %zu more (--json)\n", left);
    out->failed = out->failed || words.failed;
    text_free(&words);
}

static void add_layout(struct text *out, const struct plan *plan)
{
    const struct layout *layout = &plan->layout;

    if (!plan->has_outline)
        return;
    heading(out, "LAYOUT");
    text_format(out, "  %zu panels", layout->panel_count);
    if (layout->bound_panels > 0)
        text_format(out, " (at least %d are needed)", layout->bound_panels);
    text_format(out, ", %zu pieces of joint, %d broken rule%s\n", layout->joint_count,
                layout->violations, layout->violations == 1 ? "" : "s");
    for (size_t i = 0; i < layout->box_count; i++)
        if (layout->boxes[i].words[0] != '\0')
            text_format(out, "  %s\n", layout->boxes[i].words);
    for (size_t i = 0; i < layout->reason_count; i++) {
        char words[400];
        snprintf(words, sizeof words, "the slab: %s %s", layout->reasons[i].cause,
                 layout->reasons[i].remedy);
        wrap_add(out, "  !", 4, words, REPORT_COLUMNS);
    }
    add_panel_reasons(out, layout);
}

const char *report_caution(size_t index)
{
    static const char *const cautions[] = {
        "A planning aid. Local code, the contract and a licensed engineer decide.",
        "Predictions of cracking and sawing time: trial cuts decide.",
        "Sawing makes silica dust: water feed or extraction; dry-cutting saws are not covered by "
        "the usual water-fed rule: extraction and respirator by local rule.",
        "Hot-pour: burns; no water in the kettle; the container's heating limit.",
        "Solvents and isocyanates: read the data sheet first. The data sheet beats this table.",
        "Abrasive blasting only with a low-silica medium, never quartz sand; local law.",
        "Traffic control first; real lamps at night.",
        "A figure of thrust or stress is no check of a building: show it to the structural "
        "engineer.",
    };

    return index < sizeof cautions / sizeof *cautions ? cautions[index] : NULL;
}

static void add_cautions(struct text *out, const struct plan *plan)
{
    (void)plan;
    heading(out, "CAUTIONS");
    for (size_t i = 0; report_caution(i) != NULL; i++)
        wrap_add(out, "  -", 4, report_caution(i), REPORT_COLUMNS);
}

void report_findings(struct text *out, const struct finding_list *findings, const char *path)
{
    for (size_t i = 0; i < findings->count; i++) {
        const struct finding *finding = &findings->items[i];
        if (path != NULL)
            text_format(out, "%s:", path);
        if (finding->line > 0)
            text_format(out, "%d:%d:", finding->line, finding->column);
        if (path != NULL || finding->line > 0)
            text_add_char(out, ' ', 1);
        text_format(out, "%s: %s\n", severity_word(finding->severity), finding->message);
    }
}

static void add_findings(struct text *out, const struct plan *plan)
{
    if (plan->findings.count == 0)
        return;
    heading(out, "TO PUT RIGHT, AND NOTES");
    for (size_t i = 0; i < plan->findings.count; i++) {
        const struct finding *finding = &plan->findings.items[i];
        char first[16];
        snprintf(first, sizeof first, "  %s", severity_word(finding->severity));
        wrap_add(out, first, 11, finding->message, REPORT_COLUMNS);
    }
}

static void add_saw(struct text *out, const struct plan *plan)
{
    if (!saw_there(plan))
        return;
    heading(out, "SAWING (a forecast; trial cuts decide)");
    saw_report(out, plan, NULL);
}

/* The parts in their order; `key` is the top-level key of the JSON they stand for. */
static const struct part {
    const char *key;
    void (*add)(struct text *out, const struct plan *plan);
} parts[] = {
    {"answers", add_answers},
    {"job", add_job},
    {"findings", add_findings},
    {"spacing", add_spacing},
    {"temperature", add_temperature},
    {"seal", add_seal},
    {"sealing_table", add_table},
    {"choice", add_choice},
    {"isolation", add_isolation},
    {"checks", add_checks},
    {"quantities", add_quantities},
    {"joints", add_joints},
    {"layout", add_layout},
    {"pours", add_pours},
    {"saw", add_saw},
    {"cracks", add_cracks},
    {"cautions", add_cautions},
};
/* Keys of the JSON that stand inside another part of the text. */
static const char *const inside[][2] = {
    {"shrinkage", "temperature"},
    {"movement", "temperature"},
    {"concrete", "temperature"},
    {"working", "seal"},
    {"cut", "seal"},
    {"steel", "quantities"},
    {"restraint", "quantities"},
    {"layout_reasons", "layout"},
    {"program", "answers"},
};

bool report_text(struct text *out, const struct plan *plan, const char *only)
{
    bool found = only == NULL;

    for (size_t i = 0; only != NULL && i < sizeof inside / sizeof *inside; i++)
        if (strcmp(only, inside[i][0]) == 0) {
            only = inside[i][1];
            break;
        }
    for (size_t i = 0; i < sizeof parts / sizeof *parts; i++)
        if (only == NULL || strcmp(only, parts[i].key) == 0) {
            parts[i].add(out, plan);
            found = true;
        }
    return found;
}

void report_checks(struct text *out, const struct plan *plan)
{
    struct answers answers;

    answers_make(plan, &answers);
    wrap_add(out, answers.rows[3].word, 12, answers.rows[3].sentence, REPORT_COLUMNS);
    add_checks(out, plan);
    add_layout(out, plan);
}
