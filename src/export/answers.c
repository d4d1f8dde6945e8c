#include "export/answers.h"
#include "export/names.h"
#include "export/saw_text.h"
#include "job/field.h"
#include "job/table.h"
#include "plan/result.h"
#include <math.h>
#include <stdio.h>
#include <string.h>

enum { SHOW_MOST = 48 };

/* A value for people in the job's units, in a small buffer of its own. */
struct shown {
    char words[SHOW_MOST];
};

static struct shown show(const struct plan *plan, double si, enum quantity quantity)
{
    struct shown shown;
    struct text text = {0};

    unit_show(&text, si, quantity, (enum unit_system)plan->job.job_units);
    snprintf(shown.words, sizeof shown.words, "%s",
             text.failed ? "(no memory)" : text_string(&text));
    text_free(&text);
    return shown;
}

#define LENGTH(si) show(plan, (si), QUANTITY_LENGTH).words
#define SMALL(si) show(plan, (si), QUANTITY_SMALL_LENGTH).words
#define TEMP(si) show(plan, (si), QUANTITY_TEMPERATURE).words

static struct shown percent(double ratio)
{
    struct shown shown;

    snprintf(shown.words, sizeof shown.words, "%.1f %%", 100 * ratio);
    return shown;
}
#define PERCENT(ratio) percent(ratio).words

/* A whole per cent without a decimal: "25 %". */
static struct shown whole_percent(double ratio)
{
    struct shown shown;

    snprintf(shown.words, sizeof shown.words, "%.3g %%", 100 * ratio);
    return shown;
}

/* `room`: columns left on a line of 80 behind what stands there already. */
static void limit_sentence(const struct plan *plan, size_t room, char *out, size_t size)
{
    const char *rule = plan->spacing.governed_by;
    bool typed = rule != NULL && strcmp(rule, "typed") == 0;

    if (typed) {
        snprintf(out, size, "Your limit; %s would be %s.", plan->spacing.rule_words,
                 LENGTH(plan->spacing.rule_limit_m));
        if (strlen(out) > room)
            snprintf(out, size, "Your limit; %s: %s.", plan->spacing.rule_words,
                     LENGTH(plan->spacing.rule_limit_m));
    } else if (strncmp(plan->spacing.rule_words, "at most", 7) == 0) {
        snprintf(out, size, "Limit: %s.", plan->spacing.rule_words);
    } else {
        snprintf(out, size, "Limit set by %s.", plan->spacing.rule_words);
    }
}

static double joint_total(const struct plan *plan)
{
    return plan->quantities.contraction_m + plan->quantities.construction_m;
}

/* The names of the first few panels that break a rule: "7B, 8B". */
static size_t broken_panels(const struct plan *plan, char *names, size_t size)
{
    size_t count = 0, used = 0;

    names[0] = '\0';
    for (size_t i = 0; i < plan->layout.panel_count; i++) {
        char name[2 * LINE_NAME_MOST];
        if (plan->layout.panels[i].reason_count == 0)
            continue;
        if (count++ < 4 && used < size) {
            name_panel(&plan->layout, &plan->layout.panels[i], name);
            used += (size_t)snprintf(names + used, size - used, "%s%s", used > 0 ? ", " : "", name);
        }
    }
    return count;
}

/* Sizes of the panels along x and y: the largest, and whether all are alike. */
struct sizes {
    double along, across;
    bool alike;
};

static struct sizes panel_sizes(const struct plan *plan)
{
    struct sizes sizes = {.alike = true};

    for (size_t i = 0; i < plan->layout.panel_count; i++) {
        const struct layout_panel *panel = &plan->layout.panels[i];
        double x0 = panel->ring[0].x, x1 = x0, y0 = panel->ring[0].y, y1 = y0;
        for (size_t j = 1; j < panel->count; j++) {
            x0 = fmin(x0, panel->ring[j].x);
            x1 = fmax(x1, panel->ring[j].x);
            y0 = fmin(y0, panel->ring[j].y);
            y1 = fmax(y1, panel->ring[j].y);
        }
        if (i > 0 &&
            (fabs(x1 - x0 - sizes.along) > 0.0015 || fabs(y1 - y0 - sizes.across) > 0.0015))
            sizes.alike = false;
        sizes.along = fmax(sizes.along, x1 - x0);
        sizes.across = fmax(sizes.across, y1 - y0);
    }
    return sizes;
}

static void joints_sentence(const struct plan *plan, const struct sizes *sizes, char *out,
                            size_t size)
{
    enum { LINE = 72 };
    const char *every = sizes->alike ? "every" : "up to";
    char apart[4 * SHOW_MOST], limit[208];
    size_t used;

    if (plan->layout.panel_count <= 1)
        snprintf(apart, sizeof apart, "none: one panel.");
    else if (fabs(sizes->along - sizes->across) < 0.0005)
        snprintf(apart, sizeof apart, "%s %s both ways, %s.", every, LENGTH(sizes->along),
                 LENGTH(joint_total(plan)));
    else
        snprintf(apart, sizeof apart, "%s %s along, %s across, %s.", every, LENGTH(sizes->along),
                 LENGTH(sizes->across), LENGTH(joint_total(plan)));
    used = strlen(apart);
    limit_sentence(plan, used < LINE ? LINE - used - 1 : 0, limit, sizeof limit);
    snprintf(out, size, "%s %s", apart, limit);
}

static void broken_sentence(const struct plan *plan, char *out, size_t size)
{
    char names[64];
    size_t broken = broken_panels(plan, names, sizeof names);

    if (broken > 0)
        snprintf(out, size, "%zu panel%s break%s a rule: %s%s (plan). %s of joint.", broken,
                 broken == 1 ? "" : "s", broken == 1 ? "s" : "", names, broken > 4 ? " ..." : "",
                 LENGTH(joint_total(plan)));
}

static void answer_joints(const struct plan *plan, char *sentence, size_t size, char *more,
                          size_t more_size)
{
    struct sizes sizes = panel_sizes(plan);
    char limit[208];

    if (!plan->has_outline) {
        limit_sentence(plan, 48, limit, sizeof limit);
        snprintf(sentence, size, "at most %s apart. %s", LENGTH(plan->spacing.limit_m), limit);
        return;
    }
    joints_sentence(plan, &sizes, sentence, size);
    broken_sentence(plan, sentence, size);
    snprintf(more, more_size, "%zu panels, largest %s x %s; at least %d panels are needed.",
             plan->layout.panel_count, LENGTH(sizes.along), LENGTH(sizes.across),
             plan->layout.bound_panels);
    if (plan->layout.bound_panels < 1)
        snprintf(more, more_size, "%zu panels, largest %s x %s.", plan->layout.panel_count,
                 LENGTH(sizes.along), LENGTH(sizes.across));
}

static void answer_cut(const struct plan *plan, char *sentence, size_t size, char *more,
                       size_t more_size)
{
    char depth[2 * SHOW_MOST + 8];
    struct text words = {0};

    if (saw_there(plan)) {
        saw_sentence(&words, plan);
        snprintf(sentence, size, "%s", words.failed ? "(no memory)." : text_string(&words));
        text_clear(&words);
        saw_trouble(&words, plan);
        snprintf(more, more_size, "%s%sA forecast: trial cuts decide. Set the saw to %s.",
                 text_string(&words), words.length > 0 ? " " : "", SMALL(plan->cut.set_m));
        text_free(&words);
        return;
    }
    snprintf(depth, sizeof depth, "%s to %s deep", SMALL(plan->cut.least_m),
             SMALL(plan->cut.most_m));
    if (plan->job.given[FIELD_pour_start] && plan->job.pour_date.year != 0 &&
        plan->job.given[FIELD_pour_rate])
        snprintf(sentence, size, "%s; when: trial cuts (4 h in heat to 3 days in cold).", depth);
    else
        snprintf(sentence, size, "%s. For clock times: date, start, rate of the pour.", depth);
    snprintf(more, more_size,
             "Start when the edge stays sharp; trial cuts decide. Set the saw to %s.",
             SMALL(plan->cut.set_m));
}

/* The cut width holds in the window; the specification wants the slab no colder than its own limit.
 */
static void window_sentence(const struct plan *plan, char *out, size_t size)
{
    double least = plan->job.sealing_least_temperature, from = plan->seal.window_coldest_c;
    double to = plan->seal.window_hottest_c;
    bool cold = isfinite(least) && least > from;

    if (isnan(from))
        snprintf(out, size, "As cut there is no slab temperature at which it may be sealed.");
    else if (cold && least > to)
        snprintf(out, size, "As cut it holds only when sealed below %s; %s is the least allowed.",
                 TEMP(to), TEMP(least));
    else
        snprintf(out, size, "As cut it may be sealed with the slab from %s%s to %s.",
                 TEMP(cold ? least : from), cold ? " (the least allowed)" : "", TEMP(to));
}

static void answer_seal(const struct plan *plan, char *sentence, size_t size, char *more,
                        size_t more_size)
{
    int kind = plan->job.sealant_kind;

    if (kind == SEALANT_NONE) {
        snprintf(sentence, size, "joints stay open: first cut only.");
        return;
    }
    if (!isfinite(plan->seal.width_m)) {
        snprintf(sentence, size, "nothing to seal: no joint moves.");
        return;
    }
    if (kind == SEALANT_FLOOR_FILLER) {
        snprintf(sentence, size, "fill %s wide; it will part %s, refill at 90 days.",
                 SMALL(plan->seal.width_m), whole_percent(plan->seal.extension).words);
        return;
    }
    if (kind == SEALANT_COMPRESSION_SEAL) {
        snprintf(sentence, size, "at slab %s: %s slot for a %s seal, top %s low.",
                 TEMP(plan->temperature.sealing_c), SMALL(plan->seal.width_m),
                 SMALL(plan->seal.rod_m), SMALL(plan->seal.recess_m));
        return;
    }
    snprintf(sentence, size, "at slab %s: %s wide, %s deep, %s rod, top %s low.",
             TEMP(plan->temperature.sealing_c), SMALL(plan->seal.width_m),
             SMALL(plan->seal.depth_m), SMALL(plan->seal.rod_m), SMALL(plan->seal.recess_m));
    window_sentence(plan, more, more_size);
}

/* What would make a failing seal hold: wider, or a better sealant. */
static void seal_remedy(const struct plan *plan, char *out, size_t size)
{
    double least = plan->seal.width_m - plan->seal.tolerance_m;
    double need = fmax(plan->movement.open_m, plan->movement.close_m) / least;

    if (!(least > 0)) /* the tolerance takes the whole width: no sealant helps */
        snprintf(out, size, " Needs %s wide.", SMALL(plan->seal.least_width_m));
    else
        snprintf(out, size, " Needs %s wide or %s sealant.", SMALL(plan->seal.least_width_m),
                 whole_percent(ceil(100 * need - 1e-9) / 100).words);
}

/* What is wrong at a board: it has no room, or the seal over it is strained too far. */
static void board_sentence(const struct plan *plan, const struct plan_isolation *row, char *out,
                           size_t size)
{
    if (row->least_filler_m > row->filler_m * (1 + 1e-9) || isnan(row->compression))
        snprintf(out, size, "no room at %s: the slab wants %s more on a %s day; it shoves.",
                 row->where, SMALL(row->expansion_m), TEMP(plan->temperature.hottest_c));
    else if (row->compression / plan->job.sealant_compression >
             row->extension / plan->job.sealant_extension)
        snprintf(out, size, "the seal at %s is squeezed %s of %s; take a thicker board.",
                 row->where, PERCENT(row->compression),
                 whole_percent(plan->job.sealant_compression).words);
    else
        snprintf(out, size, "the seal at %s stretches %s of %s: take a thicker board.", row->where,
                 PERCENT(row->extension), whole_percent(plan->job.sealant_extension).words);
}

/* One joint in n typed above 1 decides: say so instead of the uniform value. */
static bool working_fails(const struct plan *plan, char *word, size_t word_size, char *sentence,
                          size_t size)
{
    int typed = (int)lround(plan->job.sealing_working);

    for (size_t i = 0; typed > 1 && i < plan->working_count; i++) {
        const struct plan_working *row = &plan->working[i];
        if (row->n != typed || row->verdict != VERDICT_FAILS)
            continue;
        snprintf(word, word_size, "FAILS");
        if (!plan->seal.sealed) {
            snprintf(sentence, size, "with 1 cut in %d working it opens %s, closes %s: too far.",
                     typed, SMALL(row->open_m), SMALL(row->close_m));
            return true;
        }
        snprintf(sentence, size,
                 "with 1 cut in %d working: stretches %s, squeezed %s; good for %s.", typed,
                 PERCENT(row->extension), PERCENT(row->compression),
                 whole_percent(plan->seal.extension_capacity).words);
        return true;
    }
    return false;
}

/* The cold of the bond test, not the movement, decides. */
static bool bond_fails(const struct plan *plan, char *sentence, size_t size)
{
    for (size_t i = 0; i < plan->check_count; i++) {
        const struct plan_check *check = &plan->checks[i];
        if (strcmp(check->id, "seal.bond-test") != 0 || check->verdict != VERDICT_FAILS)
            continue;
        snprintf(sentence, size,
                 "the slab gets to %s, this type is tested to %s: take a colder "
                 "type.",
                 TEMP(check->capacity), TEMP(check->demand));
        return true;
    }
    return false;
}

static void answer_holds(const struct plan *plan, char *word, size_t word_size, char *sentence,
                         size_t size, char *more, size_t more_size)
{
    const struct plan_isolation *worst = NULL;
    char remedy[128] = "";

    for (size_t i = 0; i < plan->isolation_count; i++)
        if (plan->isolation[i].verdict == VERDICT_FAILS &&
            (worst == NULL || plan->isolation[i].compression > worst->compression))
            worst = &plan->isolation[i];
    if (worst != NULL) {
        snprintf(word, word_size, "FAILS");
        board_sentence(plan, worst, sentence, size);
        return;
    }
    if (working_fails(plan, word, word_size, sentence, size))
        return;
    if (isfinite(plan->seal.cold_squeeze)) {
        snprintf(word, word_size, "%s", verdict_screen_word(plan->seal.verdict));
        snprintf(sentence, size, "opens %s, the seal follows %s; closes %s, it follows %s.",
                 SMALL(plan->movement.open_m), SMALL(fmax(plan->seal.follow_open_m, 0)),
                 SMALL(plan->movement.close_m), SMALL(fmax(plan->seal.follow_close_m, 0)));
        snprintf(more, more_size, "Squeezed %s in winter, %s in summer; it works from %s to %s.",
                 PERCENT(plan->seal.cold_squeeze), PERCENT(plan->seal.compression),
                 whole_percent(plan->job.sealant_seal_least).words,
                 whole_percent(plan->job.sealant_seal_most).words);
        return;
    }
    if (!plan->seal.sealed || plan->seal.verdict == VERDICT_NONE) {
        snprintf(word, word_size, "NOTE");
        snprintf(sentence, size, "%s",
                 plan->job.sealant_kind == SEALANT_FLOOR_FILLER
                     ? "a floor filler parts as the floor dries; that is no failure."
                     : "no sealant to judge.");
        return;
    }
    snprintf(word, word_size, "%s", verdict_screen_word(plan->seal.verdict));
    if (bond_fails(plan, sentence, size))
        return;
    if (plan->seal.verdict == VERDICT_FAILS)
        seal_remedy(plan, remedy, sizeof remedy);
    snprintf(sentence, size, "stretches %s, is squeezed %s; the sealant is good for %s.%s",
             PERCENT(plan->seal.extension), PERCENT(plan->seal.compression),
             whole_percent(plan->seal.extension_capacity).words, remedy);
    snprintf(more, more_size, "At the curved edge of the bead the stretch is %s.",
             PERCENT(plan->seal.bead_strain));
}

/* What breaks it: stretched too far it tears, squeezed too far it is pushed out. */
struct breaking {
    double share, ratio; /* of what it is good for; of the width */
    double good_for;
    const char *words;
};

static struct breaking breaking_of(const struct plan *plan, const struct plan_working *row)
{
    double stretch = row->extension / plan->seal.extension_capacity;
    double squeeze = row->compression / plan->seal.compression_capacity;

    if (stretch >= squeeze)
        return (struct breaking){stretch, row->extension, plan->seal.extension_capacity,
                                 "it tears"};
    return (struct breaking){squeeze, row->compression, plan->seal.compression_capacity,
                             "squeezed out"};
}

/* One cut in three is the usual warning; else the first row that breaks it. */
static const struct plan_working *first_to_break(const struct plan *plan)
{
    const struct plan_working *first = NULL;

    for (size_t i = 0; i < plan->working_count; i++) {
        const struct plan_working *row = &plan->working[i];
        if (row->n == 3 && row->verdict == VERDICT_FAILS)
            return row;
        if (first == NULL && row->n > 1 && row->verdict == VERDICT_FAILS)
            first = row;
    }
    return first;
}

static void answer_but(const struct plan *plan, char *sentence, size_t size, char *more,
                       size_t more_size)
{
    const struct plan_working *breaks = first_to_break(plan), *last;
    struct breaking breaking;

    if (plan->working_count == 0 || !plan->seal.sealed) {
        snprintf(sentence, size, "look after the first cold spell: how many cuts have cracked?");
        return;
    }
    last = &plan->working[plan->working_count - 1];
    breaking = breaking_of(plan, breaks != NULL ? breaks : last);
    if (breaks == NULL) {
        snprintf(sentence, size, "even with 1 cut in %d working it holds: %s of %s.", last->n,
                 PERCENT(breaking.ratio), whole_percent(breaking.good_for).words);
        return;
    }
    if (breaks->n == 3 && isfinite(plan->seal.holds_when_n3_m))
        snprintf(sentence, size, "if only 1 cut in %d cracks through: %s, %s. %s holds.", breaks->n,
                 whole_percent(round(100 * breaking.ratio) / 100).words, breaking.words,
                 SMALL(plan->seal.holds_when_n3_m));
    else
        snprintf(sentence, size, "if only 1 cut in %d cracks through: %s, %s. Measure each.",
                 breaks->n, whole_percent(round(100 * breaking.ratio) / 100).words, breaking.words);
    snprintf(more, more_size, "That joint opens by %s and closes by %s%s.", SMALL(breaks->open_m),
             SMALL(breaks->close_m),
             plan->job.sealing_working > 1 ? "" : "; a warning, it decides nothing");
}

/* The inputs whose likely error changes the answer most, skipping those the user typed: as many as
 * fit into `columns`. */
static void check_first(const struct plan *plan, size_t columns, char *out, size_t size)
{
    const struct job *job = &plan->job;
    const struct {
        bool open;
        const char *words;
    } doubts[] = {
        {true, "cracks"},
        {!job->given[FIELD_climate_slab_coldest], "slab year"},
        {!job->given[FIELD_concrete_shrinkage], "drying"},
        {plan->has_outline && job->edge_count == 0, "walls"},
        {!job->given[FIELD_concrete_expansion] && job->concrete_aggregate.row < 0, "stone"},
    };
    size_t used = 0, most = columns < size ? columns : size - 1;

    out[0] = '\0';
    for (size_t i = 0; i < sizeof doubts / sizeof *doubts; i++)
        if (doubts[i].open && used + strlen(doubts[i].words) + 2 < most)
            used += (size_t)snprintf(out + used, size - used, "%s%s", used > 0 ? ", " : "",
                                     doubts[i].words);
}

/* What to buy, in a few words. */
static void purchase(const struct plan *plan, char *out, size_t size)
{
    size_t used = 0;

    out[0] = '\0';
    for (size_t i = 0; i < plan->quantities.package_count && used < size; i++) {
        const struct plan_package *package = &plan->quantities.packages[i];
        if (package->count > 0)
            used += (size_t)snprintf(out + used, size - used, "%s%d x %s", used > 0 ? " + " : "",
                                     package->count,
                                     show(plan, package->size_m3, QUANTITY_VOLUME).words);
    }
    if (isfinite(plan->quantities.strip_m))
        snprintf(out, size, "%s of %s seal, and its lubricant.", LENGTH(plan->quantities.strip_m),
                 SMALL(plan->seal.rod_m));
    else if (used == 0 && !plan->has_outline)
        snprintf(out, size, "draw the slab or type the metres.");
    else if (used == 0)
        snprintf(out, size, "no sealant; sawing %s.", LENGTH(plan->quantities.saw_m));
    else if (plan->quantities.rod_count > 0 && used < size)
        snprintf(out + used, size - used, ", %s of rod.",
                 LENGTH(plan->quantities.rods[0].length_m));
    else if (used < size)
        snprintf(out + used, size - used, ".");
}

/* By how much the order is short with one of the smallest packs less. */
static double short_by(const struct plan *plan)
{
    double total = 0, smallest = INFINITY;

    for (size_t i = 0; i < plan->quantities.package_count; i++) {
        const struct plan_package *package = &plan->quantities.packages[i];
        total += package->count * package->size_m3;
        if (package->count > 0)
            smallest = fmin(smallest, package->size_m3);
    }
    return plan->quantities.sealant_order_m3 - (total - smallest);
}

static void answer_buy(const struct plan *plan, char *sentence, size_t size, char *more,
                       size_t more_size)
{
    enum { LINE = 71 }; /* what fits behind the word on 80 columns */
    static const char lead[] = "  Check first: ";
    char buy[200], check[96];
    size_t taken;

    purchase(plan, buy, sizeof buy);
    taken = strlen(buy) + sizeof lead;
    check_first(plan, taken < LINE ? LINE - taken : 8, check, sizeof check);
    snprintf(sentence, size, "%s%s%s.", buy, lead, check);
    if (plan->quantities.package_count > 0)
        snprintf(more, more_size, "%s with %s waste%s; one pack less is %s short.",
                 show(plan, plan->quantities.sealant_order_m3, QUANTITY_VOLUME).words,
                 whole_percent(plan->job.takeoff_waste).words,
                 plan->quantities.length_typed ? ", for the metres you typed" : "",
                 show(plan, short_by(plan), QUANTITY_VOLUME).words);
}

void answers_make(const struct plan *plan, struct answers *answers)
{
    static const char *const words[ANSWER_MOST] = {"JOINTS", "CUT", "SEAL", "HOLDS", "BUT", "BUY"};

    *answers = (struct answers){.count = ANSWER_MOST};
    for (size_t i = 0; i < ANSWER_MOST; i++)
        snprintf(answers->rows[i].word, sizeof answers->rows[i].word, "%s", words[i]);
#define ROW(i)                                                                                     \
    answers->rows[i].sentence, sizeof answers->rows[i].sentence, answers->rows[i].more,            \
        sizeof answers->rows[i].more
    answer_joints(plan, ROW(0));
    answer_cut(plan, ROW(1));
    answer_seal(plan, ROW(2));
    answer_holds(plan, answers->rows[3].word, sizeof answers->rows[3].word, ROW(3));
    answer_but(plan, ROW(4));
    answer_buy(plan, ROW(5));
#undef ROW
}
