#include "export/buy_text.h"
#include "base/utf8.h"
#include "export/wrap.h"
#include "job/field.h"
#include "job/table.h"
#include <math.h>
#include <stdio.h>

enum { LABEL = 30, VALUE = 16 };

static enum unit_system units_of(const struct plan *plan)
{
    return (enum unit_system)plan->job.job_units;
}

/* A line of the slip: label, value right-bound, a remark. */
static void line(struct text *out, const struct plan *plan, const char *label, double si,
                 enum quantity quantity, const char *remark)
{
    struct text value = {0};
    int used;

    unit_show(&value, si, quantity, units_of(plan));
    used = utf8_columns(text_string(&value));
    text_format(out, "  %-*s", LABEL, label);
    text_add_char(out, ' ', used < VALUE ? (size_t)(VALUE - used) : 1);
    text_format(out, "%s%s%s\n", text_string(&value), remark[0] != '\0' ? "   " : "", remark);
    text_free(&value);
}

static void add_amounts(struct text *out, const struct plan *plan)
{
    const struct job *job = &plan->job;
    double counted = plan->quantities.sealant_net_m3 +
                     (job->takeoff_rod_cusps ? plan->quantities.sealant_cusps_m3 : 0);

    line(out, plan, "joint to seal", plan->quantities.sealed_m, QUANTITY_LENGTH,
         plan->quantities.length_typed ? "typed" : "from the plan");
    line(out, plan, "width", plan->seal.width_m, QUANTITY_SMALL_LENGTH,
         plan->seal.chosen ? "chosen" : "typed");
    line(out, plan, "bead depth", plan->seal.depth_m, QUANTITY_SMALL_LENGTH,
         job->given[FIELD_sealant_depth] ? "typed" : "by the kind");
    line(out, plan, "fill", plan->quantities.sealant_net_m3, QUANTITY_VOLUME, "");
    if (plan->quantities.sealant_cusps_m3 > 0)
        line(out, plan, "beside the round rod", plan->quantities.sealant_cusps_m3, QUANTITY_VOLUME,
             job->takeoff_rod_cusps ? "counted" : "not counted");
    line(out, plan, "waste", plan->quantities.sealant_order_m3 - plan->quantities.loss_m3 - counted,
         QUANTITY_VOLUME, "");
    if (plan->quantities.loss_m3 > 0)
        line(out, plan, "lost with the days", plan->quantities.loss_m3, QUANTITY_VOLUME, "");
    line(out, plan, "to order", plan->quantities.sealant_order_m3, QUANTITY_VOLUME, "");
}

static void add_size(struct text *out, const struct plan *plan, const char *what, double size_m,
                     double length_m, const char *remark)
{
    struct text words = {0};

    text_format(&words, "%s ", what);
    unit_show(&words, size_m, QUANTITY_SMALL_LENGTH, units_of(plan));
    line(out, plan, text_string(&words), length_m, QUANTITY_LENGTH, remark);
    text_free(&words);
}

static void add_packages(struct text *out, const struct plan *plan)
{
    double total = 0;

    for (size_t i = 0; i < plan->quantities.package_count; i++) {
        const struct plan_package *package = &plan->quantities.packages[i];
        struct text size = {0};
        if (package->count == 0)
            continue;
        total += package->count * package->size_m3;
        unit_show(&size, package->size_m3, QUANTITY_VOLUME, units_of(plan));
        text_format(out, "  %-*s%*d\n", LABEL, text_string(&size), VALUE, package->count);
        text_free(&size);
    }
    line(out, plan, "left over if all is wasted", total - plan->quantities.sealant_order_m3,
         QUANTITY_VOLUME, "");
    line(out, plan, "left over if nothing is",
         total - (plan->quantities.sealant_order_m3 - plan->quantities.loss_m3) /
                     (1 + plan->job.takeoff_waste),
         QUANTITY_VOLUME, "");
    if (plan->quantities.boxes > 0)
        text_format(out, "  %-*s%*d\n", LABEL, "boxes", VALUE, plan->quantities.boxes);
    for (size_t i = 0; i < plan->quantities.rod_count; i++)
        add_size(out, plan, "rod", plan->quantities.rods[i].diameter_m,
                 plan->quantities.rods[i].length_m, "5 % more than the joint");
    if (isfinite(plan->quantities.tape_m))
        line(out, plan, "bond-breaker tape", plan->quantities.tape_m, QUANTITY_LENGTH,
             "as wide as the joint, never up the sides");
}

/* What goes over the soft board is no part of the order above: it may be another colour or kind. */
static void add_boards(struct text *out, const struct plan *plan)
{
    for (size_t i = 0; i < plan->quantities.board_count; i++)
        add_size(out, plan, "soft board", plan->quantities.boards[i].thickness_m,
                 plan->quantities.boards[i].length_m, "as deep as the slab");
    if (isfinite(plan->quantities.board_order_m3))
        line(out, plan, "sealant over the board", plan->quantities.board_order_m3, QUANTITY_VOLUME,
             "besides, not in the packs above");
}

static void add_count(struct text *out, const char *label, double count, int decimals,
                      const char *remark)
{
    text_format(out, "  %-*s%*.*f%s%s\n", LABEL, label, VALUE, decimals, count,
                remark[0] != '\0' ? "   " : "", remark);
}

static void add_hours(struct text *out, const struct plan *plan)
{
    for (size_t i = 0; i < plan->quantities.work_count; i++) {
        const struct plan_work *work = &plan->quantities.works[i];
        char label[40];
        snprintf(label, sizeof label, "hours, %.0f x %s", work->tools, work->name);
        add_count(out, label, work->hours, 1, work->slowest ? "the slowest" : "");
    }
    add_count(out, "working days", plan->quantities.days, 0, "");
    if (isfinite(plan->quantities.batch_most_m3))
        line(out, plan, "mix at once, at most", plan->quantities.batch_most_m3, QUANTITY_VOLUME,
             "by the pot life at the slab's temperature then");
    if (isfinite(plan->quantities.cost))
        add_count(out, "cost of what has a price", plan->quantities.cost, 2, "");
}

static void add_strip(struct text *out, const struct plan *plan)
{
    line(out, plan, "slot", plan->seal.width_m, QUANTITY_SMALL_LENGTH,
         plan->seal.chosen ? "chosen" : "typed");
    line(out, plan, "seal, its own width", plan->seal.rod_m, QUANTITY_SMALL_LENGTH, "");
    line(out, plan, "joint to seal", plan->quantities.sealed_m, QUANTITY_LENGTH,
         plan->quantities.length_typed ? "typed" : "from the plan");
    line(out, plan, "seal to order", plan->quantities.strip_m, QUANTITY_LENGTH,
         "5 % more than the joint");
    text_add_char(out, '\n', 1);
    wrap_add(out, "NOT IN", 8,
             "it: the lubricant-adhesive of the seal's maker, board. The maker's data sheet wins.",
             78);
}

void buy_report(struct text *out, const struct plan *plan)
{
    text_format(out, "BUY     %s\n\n", sealant_table[plan->job.sealant_kind].words);
    if (isfinite(plan->quantities.strip_m)) {
        add_strip(out, plan);
        return;
    }
    add_amounts(out, plan);
    text_add_char(out, '\n', 1);
    add_packages(out, plan);
    add_boards(out, plan);
    text_add_char(out, '\n', 1);
    add_hours(out, plan);
    text_add_char(out, '\n', 1);
    wrap_add(out, "NOT IN", 8, "it: primer, if the maker asks for one. The data sheet wins.", 78);
}
