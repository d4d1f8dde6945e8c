/* The night of sawing: from when to when, in which order, with how many saws; where the pour may
 * stop. */
#include "base/array.h"
#include "core/cut_order.h"
#include "core/evaporation.h"
#include "core/sun.h"
#include "plan/contact.h"
#include "plan/plan_front.h"
#include "plan/plan_steps.h"
#include "plan/saw_law.h"
#include <math.h>
#include <stdio.h>
#include <stdlib.h>

/* ---- one pour ---- */

/* Lines along the way the concrete comes are cut in parts, each of so many hours of placing: the
 * first concrete cannot wait for the last. */
static const double part_h = 2;
enum { PARTS_MOST = 15, PIECES_MOST = 1500 };

struct pour { /* of one day */
    int number;
    const size_t *panels;
    size_t count;
    struct axis axis;
    struct front front;
    double m2_per_h;
};

/* Hours of the pour at which the front stands there. */
static double hours_at(const struct pour *pour, double at_m)
{
    return front_area(&pour->front, at_m) / pour->m2_per_h;
}

static int part_at(double hours)
{
    const int part = (int)floor(hours / part_h + 1e-9);

    return part < PARTS_MOST ? part : PARTS_MOST - 1;
}

/* ---- lines of cuts ---- */

struct piece { /* a line, or the part of one, in one pour */
    int line;
    int family; /* 0: across the way, 1 + part: along it */
    double length_m, at_m, ready_h, placed_h;
};
struct pieces {
    struct piece *items;
    size_t count;
};

/* A line crosses the axis when it runs more square to it than along it. */
static bool runs_across(const struct layout_joint *joint, struct axis axis)
{
    const double dx = joint->x2 - joint->x1, dy = joint->y2 - joint->y1;

    return fabs(dx * axis.x + dy * axis.y) < fabs(dx * axis.y - dy * axis.x);
}

/* A crack does that joint's work: no cut beside it. */
static bool cracked(const struct plan *plan, size_t joint)
{
    for (size_t i = 0; i < plan->crack_count; i++)
        if (plan->cracks[i].joint == (int)joint)
            return true;
    return false;
}

static struct piece *piece_of(struct pieces *pieces, int line, int family)
{
    for (size_t i = pieces->count; i > 0; i--)
        if (pieces->items[i - 1].line == line && pieces->items[i - 1].family == family)
            return &pieces->items[i - 1];
    if (pieces->count == PIECES_MOST)
        return NULL;
    pieces->items[pieces->count] =
        (struct piece){.line = line, .family = family, .placed_h = INFINITY};
    return &pieces->items[pieces->count++];
}

/* The joint where it touches this panel; its length counts once, on its left where a panel is. */
static bool add_contact(const struct plan *plan, const struct saw_law *law, const struct pour *pour,
                        const struct contact *contact, int side, struct pieces *pieces)
{
    const struct layout_joint *joint = &plan->layout.joints[contact->joint];
    const bool across = runs_across(joint, pour->axis);
    const double length = contact->side == side ? contact->to - contact->from : 0;
    const double share =
        (contact->from + contact->to) / 2 / fmax(plan->joints[contact->joint].length_m, 1e-9);
    const struct layout_point middle = {.x = joint->x1 + share * (joint->x2 - joint->x1),
                                        .y = joint->y1 + share * (joint->y2 - joint->y1)};
    double from, to, at;
    struct piece *piece;

    axis_reach(pour->axis, &plan->layout.panels[contact->panel], &from, &to);
    piece = piece_of(pieces, joint->line, across ? 0 : 1 + part_at(hours_at(pour, from)));
    if (piece == NULL)
        return false;
    at = axis_along(across ? pour->axis : axis_square_to(pour->axis), &middle);
    piece->placed_h = fmin(piece->placed_h, hours_at(pour, from));
    piece->ready_h = fmax(piece->ready_h, saw_law_ready(law, hours_at(pour, across ? at : to)));
    if (length > 0)
        piece->at_m = (piece->at_m * piece->length_m + at * length) / (piece->length_m + length);
    piece->length_m += length;
    return true;
}

/* The side of a joint whose panels tell its length: left, else right. */
static int counted_side(const struct plan *plan, const struct contact_list *contacts, size_t joint,
                        int pour)
{
    for (size_t i = contacts->first[joint]; i < contacts->first[joint + 1]; i++)
        if (contacts->items[i].side > 0 && plan->panel_pour[contacts->items[i].panel] == pour)
            return 1;
    return -1;
}

static int by_family(const void *a, const void *b)
{
    const struct piece *p = a, *q = b;

    if (p->family != q->family)
        return p->family - q->family;
    if (p->at_m < q->at_m || p->at_m > q->at_m)
        return p->at_m < q->at_m ? -1 : 1;
    return p->line - q->line;
}

/* ---- one night for each pour ---- */

static void note_cut(struct plan *plan, const struct pour *pour, const struct piece *piece,
                     const struct cut_step *step, int number)
{
    struct plan_cut *cut = &plan->saw.cuts[plan->saw.cut_count++];
    const double start = plan->saw.start_h;

    *cut = (struct plan_cut){.pour = pour->number + 1,
                             .order = number,
                             .saw = step->saw,
                             .joint_line = piece->line,
                             .part = piece->family,
                             .length_m = piece->length_m,
                             .start_h = start + step->start_h,
                             .end_h = start + step->end_h,
                             .ready_h = start + step->ready_h,
                             .deadline_h = start + step->deadline_h,
                             .spare_h =
                                 isfinite(step->deadline_h) ? step->deadline_h - step->end_h : NAN,
                             .late = step->late};
    snprintf(cut->line, sizeof cut->line, "J%d", piece->line);
    plan_clock(plan, cut->start_h, cut->start, sizeof cut->start);
    plan_clock(plan, cut->ready_h, cut->not_before, sizeof cut->not_before);
    plan_clock(plan, cut->deadline_h, cut->not_after, sizeof cut->not_after);
}

static void note_night(struct plan *plan, const struct cut_order *order)
{
    static const char *const words[] = {"as placed", "by deadline", "relief cuts first",
                                        "best found"};

    if (plan->saw.policy == NULL || order->policy > CUT_AS_PLACED)
        plan->saw.policy = words[order->policy];
    plan->saw.end_h = fmax(isnan(plan->saw.end_h) ? -INFINITY : plan->saw.end_h,
                           plan->saw.start_h + order->end_h);
    plan->saw.late_m = (isnan(plan->saw.late_m) ? 0 : plan->saw.late_m) + order->late_m;
    if (isfinite(order->least_spare_h))
        plan->saw.least_spare_h =
            fmin(isnan(plan->saw.least_spare_h) ? INFINITY : plan->saw.least_spare_h,
                 order->least_spare_h);
}

/* Saws with which nothing would be late; looked for only when something is. */
static enum status count_saws(struct plan *plan, const struct cut_task *task,
                              const struct cut_order *order)
{
    enum { SAWS_MOST = 12 };
    int enough = task->saws;
    enum status status = STATUS_OK;

    if (order->late_m > 0)
        status = cut_order_saws(task, SAWS_MOST, &enough);
    if (plan->saw.saws_enough >= 0)
        plan->saw.saws_enough = enough == 0                      ? -1
                                : enough > plan->saw.saws_enough ? enough
                                                                 : plan->saw.saws_enough;
    return status;
}

/* From where to where the panels reach square to the way, in one part of the placing; family 0: the
 * front's own way. */
static void family_ends(const struct plan *plan, const struct pour *pour, int family,
                        struct cut_family *out)
{
    const struct axis way = family == 0 ? pour->axis : axis_square_to(pour->axis);

    out->from_m = INFINITY;
    out->to_m = -INFINITY;
    for (size_t i = 0; i < pour->count; i++) {
        const struct layout_panel *panel = &plan->layout.panels[pour->panels[i]];
        double from, to;
        axis_reach(pour->axis, panel, &from, &to);
        if (family > 0 && part_at(hours_at(pour, from)) != family - 1)
            continue;
        axis_reach(way, panel, &from, &to);
        out->from_m = fmin(out->from_m, from);
        out->to_m = fmax(out->to_m, to);
    }
}

/* The pieces of one pour, sorted by family. */
static enum status plan_night(struct plan *plan, const struct saw_law *law, const struct pour *pour,
                              const struct pieces *pieces)
{
    struct cut_line *lines = calloc(pieces->count + 1, sizeof *lines);
    struct cut_family families[1 + PARTS_MOST] = {{0}};
    struct cut_task task = {.families = families,
                            .family_count = 1 + PARTS_MOST,
                            .saws = (int)lround(plan->job.sawing_saws),
                            .pace_m_h = plan->job.sawing_pace * 3600,
                            .cracks = saw_law_cracks,
                            .context = law};
    struct cut_order order;
    enum status status;

    if (lines == NULL)
        return STATUS_NO_MEMORY;
    for (size_t i = 0; i < pieces->count; i++) {
        const struct piece *piece = &pieces->items[i];
        struct cut_family *family = &families[piece->family];
        lines[i] = (struct cut_line){.id = (int)i,
                                     .at_m = piece->at_m,
                                     .length_m = piece->length_m,
                                     .ready_h = piece->ready_h,
                                     .placed_h = piece->placed_h};
        if (family->count++ == 0) {
            family->lines = &lines[i];
            family_ends(plan, pour, piece->family, family);
        }
    }
    status = cut_order_make(&task, &order);
    for (size_t i = 0; status == STATUS_OK && i < order.count; i++) {
        const struct cut_step *step = &order.steps[i];
        const int id = families[step->family].lines[step->line].id;
        note_cut(plan, pour, &pieces->items[id], step, (int)i + 1);
    }
    if (status == STATUS_OK) {
        note_night(plan, &order);
        status = count_saws(plan, &task, &order);
        cut_order_free(&order);
    }
    free(lines);
    return status;
}

static bool make_room(struct plan *plan, size_t more)
{
    return array_reserve((void **)&plan->saw.cuts, &plan->saw.cut_capacity,
                         plan->saw.cut_count + more, sizeof *plan->saw.cuts);
}

static enum status cut_pour(struct plan *plan, const struct saw_law *law, const struct pour *pour,
                            const struct contact_list *contacts, struct pieces *pieces)
{
    pieces->count = 0;
    for (size_t j = 0; j < plan->layout.joint_count; j++) {
        const int side = counted_side(plan, contacts, j, pour->number);
        if (plan->layout.joints[j].kind != LAYOUT_CONTRACTION || cracked(plan, j))
            continue;
        for (size_t i = contacts->first[j]; i < contacts->first[j + 1]; i++)
            if (plan->panel_pour[contacts->items[i].panel] == pour->number &&
                !add_contact(plan, law, pour, &contacts->items[i], side, pieces))
                return STATUS_REFUSED;
    }
    if (pieces->count > 1)
        qsort(pieces->items, pieces->count, sizeof *pieces->items, by_family);
    if (!make_room(plan, pieces->count))
        return STATUS_NO_MEMORY;
    return plan_night(plan, law, pour, pieces);
}

/* ---- where the pour may stop ---- */

/* The planned joint across the way that is nearest to the front; what it still takes, m3. */
static void nearest_joint(const struct plan *plan, const struct pour *pour,
                          const struct pieces *pieces, struct plan_stop *stop)
{
    const double front = stop->front_m + pour->front.at_m[0];
    double best = INFINITY;

    for (size_t i = 0; i < pieces->count; i++) {
        const struct piece *piece = &pieces->items[i];
        if (piece->family != 0 || fabs(piece->at_m - front) >= best)
            continue;
        best = fabs(piece->at_m - front);
        stop->joint_line = piece->line;
        snprintf(stop->joint, sizeof stop->joint, "J%d", piece->line);
        stop->joint_m = piece->at_m - pour->front.at_m[0];
        stop->more_m3 =
            front_area(&pour->front, piece->at_m) * plan->job.slab_thickness - stop->volume_m3;
    }
}

static enum status set_stops(struct plan *plan, const struct pour *pour,
                             const struct pieces *pieces)
{
    enum { TRUCKS_MOST = 400 }; /* more are no list for a person */
    const int trucks = plan->pours[pour->number].trucks;

    plan->saw.stops =
        calloc((size_t)(trucks < TRUCKS_MOST ? trucks : TRUCKS_MOST) + 1, sizeof *plan->saw.stops);
    if (plan->saw.stops == NULL)
        return STATUS_NO_MEMORY;
    for (int i = 1; i < trucks && i < TRUCKS_MOST; i++) {
        struct plan_stop *stop = &plan->saw.stops[plan->saw.stop_count++];
        *stop = (struct plan_stop){.pour = pour->number + 1,
                                   .truck = i,
                                   .volume_m3 = i * plan->job.pour_truck,
                                   .joint_m = NAN,
                                   .more_m3 = NAN};
        stop->front_m = front_at(&pour->front, stop->volume_m3 / plan->job.slab_thickness) -
                        pour->front.at_m[0];
        nearest_joint(plan, pour, pieces, stop);
    }
    return STATUS_OK;
}

/* ---- every pour ---- */

/* Panels by pour: panels[first[p]] .. panels[first[p + 1] - 1] are those of pour p. */
struct by_pour {
    size_t *panels, *first;
};

static enum status sort_by_pour(const struct plan *plan, struct by_pour *out)
{
    size_t *next = calloc(plan->pour_count + 1, sizeof *next);

    out->panels = calloc(plan->layout.panel_count + 1, sizeof *out->panels);
    out->first = calloc(plan->pour_count + 2, sizeof *out->first);
    if (next == NULL || out->panels == NULL || out->first == NULL) {
        free(next);
        return STATUS_NO_MEMORY;
    }
    for (size_t p = 0; p < plan->layout.panel_count; p++)
        if (plan->panel_pour[p] >= 0)
            out->first[plan->panel_pour[p] + 1]++;
    for (size_t i = 0; i < plan->pour_count; i++) {
        out->first[i + 1] += out->first[i];
        next[i] = out->first[i];
    }
    for (size_t p = 0; p < plan->layout.panel_count; p++)
        if (plan->panel_pour[p] >= 0)
            out->panels[next[plan->panel_pour[p]]++] = p;
    free(next);
    return STATUS_OK;
}

static enum status cut_all(struct plan *plan, const struct saw_law *law,
                           const struct by_pour *panels, const struct contact_list *contacts,
                           struct pieces *pieces)
{
    enum status status = STATUS_OK;

    for (size_t p = 0; status == STATUS_OK && p < plan->pour_count; p++) {
        struct pour pour = {.number = (int)p,
                            .panels = &panels->panels[panels->first[p]],
                            .count = panels->first[p + 1] - panels->first[p],
                            .axis = front_axis(plan),
                            .m2_per_h = plan->job.pour_rate * 3600 / plan->job.slab_thickness};
        status = front_make(plan, pour.panels, pour.count, pour.axis, &pour.front);
        if (status == STATUS_OK)
            status = cut_pour(plan, law, &pour, contacts, pieces);
        if (status == STATUS_OK && p == 0)
            status = set_stops(plan, &pour, pieces);
        front_free(&pour.front);
    }
    return status;
}

static enum status set_cuts(struct plan *plan, const struct saw_law *law)
{
    struct pieces pieces = {calloc(PIECES_MOST, sizeof *pieces.items), 0};
    struct contact_list contacts = {0};
    struct by_pour panels = {0};
    enum status status = pieces.items != NULL ? STATUS_OK : STATUS_NO_MEMORY;

    if (status == STATUS_OK)
        status = contact_list_make(&plan->layout, &contacts);
    if (status == STATUS_OK)
        status = sort_by_pour(plan, &panels);
    if (status == STATUS_OK)
        status = cut_all(plan, law, &panels, &contacts, &pieces);
    contact_list_free(&contacts);
    free(panels.panels);
    free(panels.first);
    free(pieces.items);
    if (status != STATUS_REFUSED)
        return status;
    plan->saw.cut_count = 0;
    finding_add(&plan->findings, SEVERITY_NOTE, "pours", "", "", 0, 0,
                "pours: more than %d cuts in one pour are no plan for a night; divide it into "
                "strips (pours.width) for an order of cuts.",
                PIECES_MOST);
    return STATUS_OK;
}

/* ---- the day ---- */

/* Sunset and sunrise of the pour day; a typed sunset wins. */
static void set_sun(struct plan *plan)
{
    const struct job *job = &plan->job;
    const struct date date = job->pour_date;

    if (isfinite(job->place_latitude) && isfinite(job->place_longitude))
        sun_rise_set(date.year, date.month, date.day, job->place_latitude, job->place_longitude,
                     job->place_utc_offset / 3600, &plan->saw.sunrise_h, &plan->saw.sunset_h);
    if (job->given[FIELD_sawing_sunset])
        plan->saw.sunset_h = job->sawing_sunset.minutes / 60.0;
    if (isfinite(plan->saw.sunset_h))
        plan_clock(plan, plan->saw.sunset_h, plan->saw.sunset, sizeof plan->saw.sunset);
}

/* Worst drying of the fresh face while concrete comes and sets. */
static void set_evaporation(struct plan *plan, const struct plan_early *early)
{
    const double to = plan->saw.start_h + plan->saw.pour_h + 4;

    plan->saw.evaporation = 0;
    for (int h = (int)plan->saw.start_h; h <= to && h < 24 * EARLY_DAYS; h++) {
        const struct climate_hour *hour = &early->hours[h];
        const double damp = exp(17.62 * hour->dew_c / (243.12 + hour->dew_c) -
                                17.62 * hour->air_c / (243.12 + hour->air_c));
        plan->saw.evaporation =
            fmax(plan->saw.evaporation, evaporation_uno(early->mix.placing_c, hour->air_c,
                                                        fmin(damp, 1), hour->wind_m_s * 3.6));
    }
    if (plan->saw.evaporation > EVAPORATION_LIMIT_KG_M2_H)
        finding_add(&plan->findings, SEVERITY_WARNING, "pour.start", "", "", 0, 0,
                    "pour.start: the fresh face loses up to %.1f kg of water a square metre and "
                    "hour, more than 1.0: break the wind, fog it, cover it at once, or place at "
                    "another hour.",
                    plan->saw.evaporation);
}

/* The window of the first concrete in the longest strip. */
static void set_window(struct plan *plan, const struct saw_law *law)
{
    double longest = 0;

    for (int way = 0; way < 2; way++) {
        const struct axis axis = way == 0 ? front_axis(plan) : axis_square_to(front_axis(plan));
        double low = INFINITY, high = -INFINITY;
        for (size_t p = 0; p < plan->layout.panel_count; p++) {
            double from, to;
            if (plan->panel_pour[p] != 0)
                continue;
            axis_reach(axis, &plan->layout.panels[p], &from, &to);
            low = fmin(low, from);
            high = fmax(high, to);
        }
        longest = fmax(longest, high - low);
    }
    plan->saw.strip_m = longest;
    plan->saw.earliest_h = plan->saw.start_h + law->earliest[0];
    plan->saw.latest_h = plan->saw.start_h + saw_law_cracks(law, longest, 0);
    plan_clock(plan, plan->saw.earliest_h, plan->saw.first_trial, sizeof plan->saw.first_trial);
    plan_clock(plan, plan->saw.latest_h, plan->saw.no_later, sizeof plan->saw.no_later);
}

/* Longest pour of all: so long the concrete comes. False when no day is that long. */
static bool set_pour_hours(struct plan *plan)
{
    const double most_h = 2 * PARTS_MOST;
    double hours = 0;

    for (size_t i = 0; i < plan->pour_count; i++)
        hours = fmax(hours, plan->pours[i].hours);
    plan->saw.pour_h = hours;
    if (hours > most_h)
        finding_add(&plan->findings, SEVERITY_WARNING, "pour.rate", "", "", 0, 0,
                    "pour.rate: at that rate one pour takes %.0f hours, more than %.0f; divide the "
                    "slab into pours (pours.width) or bring more concrete, for clock times.",
                    hours, most_h);
    return hours <= most_h;
}

static enum status set_all(struct plan *plan, struct plan_early *early)
{
    double latest[2][LAW_LENGTHS];
    struct saw_law law;
    enum status status = plan_early_make(plan, early);

    if (status == STATUS_OK)
        status = saw_law_make(plan, early, latest, &law);
    if (status != STATUS_OK)
        return status;
    set_sun(plan);
    set_evaporation(plan, early);
    if (!isfinite(law.earliest[0]) || !isfinite(law.earliest[1]))
        return STATUS_OK; /* not within three days: no clock times */
    set_window(plan, &law);
    status = set_cuts(plan, &law);
    plan_clock(plan, plan->saw.end_h, plan->saw.last_cut, sizeof plan->saw.last_cut);
    if (plan->saw.saws_enough < 0)
        plan->saw.saws_enough = 0;
    return status;
}

enum status plan_set_saw(struct plan *plan)
{
    struct plan_early *early;
    enum status status;

    if (plan->saw.histories == NULL || !plan->job.given[FIELD_pour_rate] || plan->pour_count == 0 ||
        !set_pour_hours(plan))
        return STATUS_OK;
    early = malloc(sizeof *early);
    status = early != NULL ? set_all(plan, early) : STATUS_NO_MEMORY;
    free(early);
    return status;
}
