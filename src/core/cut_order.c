#include "core/cut_order.h"
#include <math.h>
#include <stdint.h>
#include <stdlib.h>

enum { SAWS_MOST = 50 };

struct place { /* a line still to cut */
    size_t family, line;
    double left_m, right_m; /* the stretch it stands in */
    double deadline_h;
    bool done;
};

static const struct cut_line *line_of(const struct cut_task *task, const struct place *place)
{
    return &task->families[place->family].lines[place->line];
}

/* The stretch cracks as its oldest concrete does. */
static void set_deadline(const struct cut_task *task, struct place *place, double placed_h)
{
    place->deadline_h = task->cracks(task->context, place->right_m - place->left_m, placed_h);
}

/* Deadlines of the lines of a family from `first` to before `last`, all in one stretch. */
static void set_stretch(const struct cut_task *task, struct place *places, size_t first,
                        size_t last, double left_m, double right_m)
{
    double placed_h = INFINITY;

    for (size_t i = first; i < last; i++)
        placed_h = fmin(placed_h, line_of(task, &places[i])->placed_h);
    for (size_t i = first; i < last; i++) {
        places[i].left_m = left_m;
        places[i].right_m = right_m;
        set_deadline(task, &places[i], placed_h);
    }
}

static size_t count_lines(const struct cut_task *task)
{
    size_t count = 0;

    for (size_t f = 0; f < task->family_count; f++)
        count += task->families[f].count;
    return count;
}

static struct place *make_places(const struct cut_task *task, size_t count)
{
    struct place *places = calloc(count + 1, sizeof *places);
    size_t used = 0;

    for (size_t f = 0; places != NULL && f < task->family_count; f++) {
        const struct cut_family *family = &task->families[f];
        for (size_t i = 0; i < family->count; i++)
            places[used + i] = (struct place){.family = f, .line = i};
        set_stretch(task, places, used, used + family->count, family->from_m, family->to_m);
        used += family->count;
    }
    return places;
}

/* The lines beside a cut get shorter stretches. */
static void cut(const struct cut_task *task, struct place *places, size_t count, size_t at)
{
    const double cut_m = line_of(task, &places[at])->at_m;
    size_t first = at, last = at + 1;

    places[at].done = true;
    while (first > 0 && places[first - 1].family == places[at].family && !places[first - 1].done)
        first--;
    while (last < count && places[last].family == places[at].family && !places[last].done)
        last++;
    if (first < at)
        set_stretch(task, places, first, at, places[at].left_m, cut_m);
    if (last > at + 1)
        set_stretch(task, places, at + 1, last, cut_m, places[at].right_m);
}

/* ---- which next ---- */

struct rule {
    enum cut_policy policy;
    const size_t *rank; /* CUT_SEARCHED: of each place */
};

static double off_middle(const struct cut_task *task, const struct place *place)
{
    return fabs(line_of(task, place)->at_m - (place->left_m + place->right_m) / 2);
}

/* Whether a is to be cut before b; both ready. */
static bool goes_first(const struct cut_task *task, enum cut_policy policy, const struct place *a,
                       const struct place *b, double now)
{
    const double near_h = 1e-9;

    if (policy != CUT_AS_PLACED) {
        const bool in_time_a = now + line_of(task, a)->length_m / task->pace_m_h <= a->deadline_h;
        const bool in_time_b = now + line_of(task, b)->length_m / task->pace_m_h <= b->deadline_h;
        if (in_time_a != in_time_b)
            return in_time_a;
        if (fabs(a->deadline_h - b->deadline_h) > near_h &&
            (isfinite(a->deadline_h) || isfinite(b->deadline_h)))
            return a->deadline_h < b->deadline_h;
    }
    if (policy == CUT_RELIEF && fabs(off_middle(task, a) - off_middle(task, b)) > 1e-6)
        return off_middle(task, a) < off_middle(task, b);
    return line_of(task, a)->ready_h < line_of(task, b)->ready_h - near_h; /* else as they stand */
}

/* The line of the least rank, ready or not: a saw may wait for it. */
static size_t next_ranked(const size_t *rank, const struct place *places, size_t count)
{
    size_t best = SIZE_MAX;

    for (size_t i = 0; i < count; i++)
        if (!places[i].done && (best == SIZE_MAX || rank[i] < rank[best]))
            best = i;
    return best;
}

/* The next of those ready at `now`; when none is, of those that get ready first. */
static size_t choose(const struct cut_task *task, const struct rule *rule,
                     const struct place *places, size_t count, double now)
{
    double ready = INFINITY;
    size_t best = SIZE_MAX;

    if (rule->policy == CUT_SEARCHED)
        return next_ranked(rule->rank, places, count);
    for (size_t i = 0; i < count; i++)
        if (!places[i].done)
            ready = fmin(ready, line_of(task, &places[i])->ready_h);
    ready = fmax(ready, now) + 1e-9;
    for (size_t i = 0; i < count; i++) {
        if (places[i].done || line_of(task, &places[i])->ready_h > ready)
            continue;
        if (best == SIZE_MAX || goes_first(task, rule->policy, &places[i], &places[best], ready))
            best = i;
    }
    return best;
}

/* ---- the night ---- */

static int first_free(const double *free_h, int saws)
{
    int best = 0;

    for (int i = 1; i < saws; i++)
        if (free_h[i] < free_h[best])
            best = i;
    return best;
}

static void note(const struct cut_task *task, const struct cut_step *step, struct cut_order *order)
{
    const double spare = step->deadline_h - step->end_h;

    order->end_h = fmax(order->end_h, step->end_h);
    if (step->late) {
        order->late_m += task->families[step->family].lines[step->line].length_m;
        order->lateness_h -= spare;
    } else {
        order->least_spare_h = fmin(order->least_spare_h, spare);
    }
    order->steps[order->count++] = *step;
}

static int earlier(const void *a, const void *b)
{
    const struct cut_step *p = a, *q = b;

    if (p->start_h < q->start_h || p->start_h > q->start_h)
        return p->start_h < q->start_h ? -1 : 1;
    return p->saw - q->saw;
}

static enum status run_night(const struct cut_task *task, const struct rule *rule,
                             struct cut_order *order)
{
    const size_t count = count_lines(task);
    const int saws = task->saws < 1 ? 1 : task->saws > SAWS_MOST ? SAWS_MOST : task->saws;
    struct place *places = make_places(task, count);
    double free_h[SAWS_MOST] = {0};

    *order =
        (struct cut_order){.policy = rule->policy, .end_h = -INFINITY, .least_spare_h = INFINITY};
    order->steps = calloc(count + 1, sizeof *order->steps);
    if (places == NULL || order->steps == NULL) {
        free(places);
        cut_order_free(order);
        return STATUS_NO_MEMORY;
    }
    for (int i = 0; i < saws; i++)
        free_h[i] = -INFINITY;
    while (order->count < count) {
        const int saw = first_free(free_h, saws);
        const size_t at = choose(task, rule, places, count, free_h[saw]);
        const struct cut_line *line = line_of(task, &places[at]);
        struct cut_step step = {.family = places[at].family,
                                .line = places[at].line,
                                .saw = saw + 1,
                                .ready_h = line->ready_h,
                                .deadline_h = places[at].deadline_h,
                                .start_h = fmax(free_h[saw], line->ready_h)};
        step.end_h = step.start_h + line->length_m / task->pace_m_h;
        step.late = step.end_h > step.deadline_h;
        free_h[saw] = step.end_h;
        cut(task, places, count, at);
        note(task, &step, order);
    }
    if (count > 1)
        qsort(order->steps, order->count, sizeof *order->steps, earlier);
    free(places);
    return STATUS_OK;
}

enum status cut_order_by(const struct cut_task *task, enum cut_policy policy,
                         struct cut_order *order)
{
    return run_night(task, &(struct rule){.policy = policy}, order);
}

/* ---- the best of all ---- */

/* Takes the other order when fewer metres are late, or as many by fewer hours. */
static bool take_better(struct cut_order *order, struct cut_order *other)
{
    const bool better =
        other->late_m < order->late_m - 1e-6 ||
        (other->late_m < order->late_m + 1e-6 && other->lateness_h < order->lateness_h - 1e-6);

    if (better) {
        struct cut_order worse = *order;
        *order = *other;
        *other = worse;
    }
    cut_order_free(other);
    return better;
}

/* Numbers the places by the order in which they were cut. */
static void rank_by(const struct cut_task *task, const struct cut_order *order, size_t *rank)
{
    for (size_t i = 0; i < order->count; i++) {
        size_t place = order->steps[i].line;
        for (size_t f = 0; f < order->steps[i].family; f++)
            place += task->families[f].count;
        rank[place] = i;
    }
}

/* The line ranked `from` goes to rank `to`, those between make room. */
static void move_rank(size_t *rank, size_t count, size_t from, size_t to)
{
    for (size_t i = 0; i < count; i++) {
        if (rank[i] == from)
            rank[i] = to;
        else if (from < to && rank[i] > from && rank[i] <= to)
            rank[i]--;
        else if (to < from && rank[i] >= to && rank[i] < from)
            rank[i]++;
    }
}

/* Lines ranked a and b change places. */
static void swap_ranks(size_t *rank, size_t count, size_t a, size_t b)
{
    for (size_t i = 0; i < count; i++)
        rank[i] = rank[i] == a ? b : rank[i] == b ? a : rank[i];
}

/* Moves every line to every place, then swaps every two, as long as that saves metres. */
static enum status search(const struct cut_task *task, struct cut_order *order)
{
    const size_t count = order->count;
    size_t trials = count > 0 ? 30000 / (count * count) : 0;
    size_t *rank = calloc(count + 1, sizeof *rank);
    const struct rule rule = {CUT_SEARCHED, rank};
    enum status status = rank != NULL ? STATUS_OK : STATUS_NO_MEMORY;
    bool moved = true;

    if (status == STATUS_OK)
        rank_by(task, order, rank);
    while (status == STATUS_OK && moved && order->late_m > 0) {
        moved = false;
        for (size_t n = 0; n < 2 * count * count && trials > 0 && status == STATUS_OK && !moved;
             n++) {
            const size_t from = n / count % count, to = n % count;
            const bool swap = n >= count * count;
            struct cut_order other;
            if (from == to || (swap && from < to + 2))
                continue;
            trials--;
            (swap ? swap_ranks : move_rank)(rank, count, from, to);
            status = run_night(task, &rule, &other);
            if (status == STATUS_OK)
                moved = take_better(order, &other);
            if (!moved)
                (swap ? swap_ranks : move_rank)(rank, count, to, from);
        }
        if (moved)
            rank_by(task, order, rank);
    }
    free(rank);
    return status;
}

static enum status make_with(const struct cut_task *task, bool searching, struct cut_order *order)
{
    enum status status = cut_order_by(task, CUT_AS_PLACED, order);

    for (int policy = CUT_AS_PLACED;
         status == STATUS_OK && order->late_m > 0 && policy < CUT_POLICIES; policy++) {
        struct cut_order other;
        status = cut_order_by(task, (enum cut_policy)policy, &other);
        if (status == STATUS_OK && searching && other.late_m > 0)
            status = search(task, &other);
        if (status == STATUS_OK)
            take_better(order, &other);
    }
    if (status != STATUS_OK)
        cut_order_free(order);
    return status;
}

enum status cut_order_make(const struct cut_task *task, struct cut_order *order)
{
    struct cut_task fewer = *task;
    enum status status = make_with(task, true, order);

    /* a saw may stand idle: what fewer can do, these can */
    while (status == STATUS_OK && order->late_m > 0 && --fewer.saws >= 1) {
        struct cut_order other;
        status = make_with(&fewer, true, &other);
        if (status == STATUS_OK)
            take_better(order, &other);
    }
    if (status != STATUS_OK)
        cut_order_free(order);
    return status;
}

enum status cut_order_saws(const struct cut_task *task, int most, int *saws)
{
    struct cut_task more = *task;

    *saws = 0;
    for (more.saws = 1; more.saws <= most; more.saws++) {
        struct cut_order order;
        const enum status status = make_with(&more, false, &order);
        if (status != STATUS_OK)
            return status;
        const bool enough = !(order.late_m > 0);
        cut_order_free(&order);
        if (enough) {
            *saws = more.saws;
            return STATUS_OK;
        }
    }
    return STATUS_OK;
}

void cut_order_free(struct cut_order *order)
{
    free(order->steps);
    *order = (struct cut_order){0};
}
