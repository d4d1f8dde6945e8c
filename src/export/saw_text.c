#include "export/saw_text.h"
#include "core/evaporation.h"
#include "export/names.h"
#include "export/wrap.h"
#include <math.h>
#include <stdio.h>
#include <stdlib.h>

enum { WIDE = 78 };

static void clock_words(struct text *out, double clock_h)
{
    const long minutes = lround(clock_h * 60);
    const long of_day = ((minutes % 1440) + 1440) % 1440;

    text_format(out, "%02ld:%02ld", of_day / 60, of_day % 60);
}

static void show(struct text *out, const struct plan *plan, double si, enum quantity quantity)
{
    unit_show(out, si, quantity, (enum unit_system)plan->job.job_units);
}

bool saw_there(const struct plan *plan)
{
    return isfinite(plan->saw.earliest_h);
}

static bool dark_before_end(const struct plan *plan)
{
    return isfinite(plan->saw.sunset_h) && plan->saw.end_h > plan->saw.sunset_h;
}

static int saws(const struct plan *plan)
{
    return (int)lround(plan->job.sawing_saws);
}

void saw_sentence(struct text *out, const struct plan *plan)
{
    const int count = saws(plan);

    if (plan->saw.cut_count == 0)
        text_format(out, "nothing to saw; ");
    else if (plan->saw.late_m > 0 && plan->saw.saws_enough > 0)
        text_format(out, "trial %s; %d saw%s too few, %d would do; ", plan->saw.first_trial, count,
                    count == 1 ? " is" : "s are", plan->saw.saws_enough);
    else if (plan->saw.late_m > 0)
        text_format(out, "trial %s; no number of saws is in time; ", plan->saw.first_trial);
    else
        text_format(out, "trial %s, last cut %s with %d saw%s; ", plan->saw.first_trial,
                    plan->saw.last_cut, count, count == 1 ? "" : "s");
    if (plan->job.job_units == UNITS_METRIC) {
        text_format(out, "%.0f-%.0f mm deep", 1000 * plan->cut.least_m, 1000 * plan->cut.most_m);
    } else {
        show(out, plan, plan->cut.least_m, QUANTITY_SMALL_LENGTH);
        text_add(out, " deep or more");
    }
    if (dark_before_end(plan))
        text_format(out, "; dark %s", plan->saw.sunset);
    text_add(out, ".");
}

void saw_cut_name(const struct plan *plan, const struct plan_cut *cut, char *out, size_t size)
{
    char name[LINE_NAME_MOST];

    name_line(&plan->layout, cut->joint_line, name);
    if (cut->part > 0)
        snprintf(out, size, "%s part %d", name, cut->part);
    else
        snprintf(out, size, "%s", name);
}

/* The names of the lines that would be late: "B, 6 and 4 more". */
static void late_lines(struct text *out, const struct plan *plan, size_t most)
{
    size_t late = 0, said = 0;

    for (size_t i = 0; i < plan->saw.cut_count; i++)
        late += plan->saw.cuts[i].late;
    for (size_t i = 0; i < plan->saw.cut_count && said < most; i++) {
        char name[2 * LINE_NAME_MOST];
        if (!plan->saw.cuts[i].late)
            continue;
        saw_cut_name(plan, &plan->saw.cuts[i], name, sizeof name);
        text_format(out, "%s%s", said++ > 0 ? ", " : "", name);
    }
    if (late > said)
        text_format(out, " and %zu more", late - said);
}

static const struct plan_cut *tightest(const struct plan *plan)
{
    const struct plan_cut *best = NULL;

    for (size_t i = 0; i < plan->saw.cut_count; i++) {
        const struct plan_cut *cut = &plan->saw.cuts[i];
        if (!cut->late && isfinite(cut->spare_h) && (best == NULL || cut->spare_h < best->spare_h))
            best = cut;
    }
    return best;
}

void saw_trouble(struct text *out, const struct plan *plan)
{
    const struct plan_cut *tight = tightest(plan);
    char name[2 * LINE_NAME_MOST];

    if (plan->saw.late_m > 0) {
        text_add(out, "Too late for line ");
        late_lines(out, plan, 6);
        text_add(out, ": ");
        if (plan->saw.saws_enough > 0)
            text_format(out, "%d saws would do.", plan->saw.saws_enough);
        else
            text_add(out, "no number of saws is enough; place less, warmer, or at another hour.");
    } else if (tight != NULL) {
        saw_cut_name(plan, tight, name, sizeof name);
        text_format(out, "Tightest: line %s, %d:%02d to spare.", name, (int)tight->spare_h,
                    (int)(tight->spare_h * 60) % 60);
    }
}

/* ---- the hours as a bar ---- */

struct hours {
    double from_h, hours;
    int columns;
};

enum { LABEL = 10 };

static int column_at(const struct hours *bar, double clock_h)
{
    return (int)floor((clock_h - bar->from_h) / bar->hours * bar->columns + 1e-9);
}

static void bar_line(struct text *out, const struct hours *bar, const char *label, char mark,
                     double from_h, double to_h)
{
    int from = column_at(bar, from_h), to = column_at(bar, to_h);

    from = from < 0 ? 0 : from;
    if (to <= from)
        to = from + 1;
    to = to > bar->columns ? bar->columns : to;
    text_format(out, "%-*s", LABEL, label);
    if (isfinite(from_h) && from < to) {
        text_add_char(out, ' ', (size_t)from);
        text_add_char(out, mark, (size_t)(to - from));
    }
    text_add_char(out, '\n', 1);
}

static void bar_clock(struct text *out, const struct hours *bar)
{
    const int step = bar->hours > 48 ? 6 : bar->hours > 24 ? 4 : 2;
    int used = 0;

    text_format(out, "%-*s", LABEL, "clock");
    for (int h = (int)bar->from_h; h < bar->from_h + bar->hours; h += step) {
        const int at = column_at(bar, h);
        if (at < used || at + 2 > bar->columns)
            continue;
        text_add_char(out, ' ', (size_t)(at - used));
        text_format(out, "%02d", h % 24);
        used = at + 2;
    }
    text_add_char(out, '\n', 1);
}

/* Nights from sunset to sunrise; without a sunrise twelve hours. */
static void bar_dark(struct text *out, const struct plan *plan, const struct hours *bar)
{
    const double night =
        isfinite(plan->saw.sunrise_h) ? 24 - plan->saw.sunset_h + plan->saw.sunrise_h : 12;

    if (!isfinite(plan->saw.sunset_h))
        return;
    text_format(out, "%-*s", LABEL, "dark");
    for (int c = 0; c < bar->columns; c++) {
        const double h = bar->from_h + (c + 0.5) * bar->hours / bar->columns;
        const double since = fmod(h - plan->saw.sunset_h + 48, 24);
        text_add_char(out, since < night ? '.' : ' ', 1);
    }
    while (out->length > 0 && out->bytes[out->length - 1] == ' ')
        out->bytes[--out->length] = '\0';
    text_add_char(out, '\n', 1);
}

void saw_bar(struct text *out, const struct plan *plan, const struct saw_band *band, int columns)
{
    struct hours bar = {
        .from_h = floor(plan->saw.start_h), .hours = 24, .columns = columns - LABEL};
    const double end = fmax(plan->saw.end_h, plan->saw.earliest_h);
    double first = INFINITY;

    if (!saw_there(plan) || bar.columns < 24)
        return;
    while (bar.hours < 72 && end > bar.from_h + bar.hours)
        bar.hours += 12;
    for (size_t i = 0; i < plan->saw.cut_count; i++)
        first = fmin(first, plan->saw.cuts[i].start_h);
    bar_clock(out, &bar);
    bar_line(out, &bar, "pour", '=', plan->saw.start_h, plan->saw.start_h + plan->saw.pour_h);
    bar_line(out, &bar, "trial", '?', band != NULL ? band->earliest_from_h : plan->saw.earliest_h,
             band != NULL ? band->earliest_to_h : plan->saw.earliest_h);
    bar_line(out, &bar, "saw", '#', first, plan->saw.end_h);
    bar_line(out, &bar, "too late", 'x', plan->saw.latest_h, bar.from_h + bar.hours);
    bar_dark(out, plan, &bar);
}

/* ---- the report ---- */

static void sentence(struct text *out, const char *label, const struct text *words)
{
    wrap_add(out, label, 12, text_string(words), WIDE);
}

static void fixed(struct text *out, const char *label, const char *words)
{
    wrap_add(out, label, 12, words, WIDE);
}

static void concrete(struct text *out, const struct plan *plan, double m3)
{
    const double yd3 = 0.764554857984;

    if (plan->job.job_units == UNITS_US)
        text_format(out, "%.1f yd3", m3 / yd3);
    else
        text_format(out, "%.1f m3", m3);
}

static void say_pour(struct text *out, const struct plan *plan)
{
    struct text words = {0};

    text_format(&words, "from %02d:%02d, ", plan->job.pour_start.minutes / 60,
                plan->job.pour_start.minutes % 60);
    concrete(&words, plan, plan->pours[0].volume_m3);
    text_format(&words, " in %d trucks, %.1f h. ", plan->pours[0].trucks, plan->pours[0].hours);
    if (plan->pour_count > 1)
        text_format(&words, "The first of %zu pours; each is a day of its own, cut alike. ",
                    plan->pour_count);
    if (isfinite(plan->saw.set_h)) {
        text_format(&words, "Sets after %.1f h at ", plan->saw.set_h);
        show(&words, plan, plan->saw.set_c, QUANTITY_TEMPERATURE);
        text_format(&words, ", warmest after %.0f h: ", plan->saw.warmest_h);
        show(&words, plan, plan->saw.warmest_c, QUANTITY_TEMPERATURE);
        text_add(&words, ".");
    }
    sentence(out, "POUR", &words);
    text_clear(&words);
    text_format(&words, "the fresh face loses up to %.1f kg of water a m2 and hour; %s",
                plan->saw.evaporation,
                plan->saw.evaporation > EVAPORATION_LIMIT_KG_M2_H
                    ? "more than 1.0: break the wind, fog it, cover it at once."
                    : "above 1.0 it would have to be covered or misted at once.");
    sentence(out, "DRYING", &words);
    text_free(&words);
}

void saw_band_words(struct text *out, double from_h, double to_h)
{
    text_add(out, " (may be ");
    clock_words(out, from_h);
    text_add(out, " to ");
    if (isfinite(to_h))
        clock_words(out, to_h);
    else
        text_add(out, "later than three days");
    text_add(out, ")");
}

static void say_window(struct text *out, const struct plan *plan, const struct saw_band *band)
{
    struct text words = {0};

    text_format(&words, "trial cuts from %s", plan->saw.first_trial);
    if (band != NULL)
        saw_band_words(&words, band->earliest_from_h, band->earliest_to_h);
    text_add(&words, ", every 20 minutes, in the first concrete placed. Edge stays sharp: start "
                     "sawing. Edge crumbles: wait 20 minutes.");
    if (plan->saw.speed < 1 - 1e-9 || plan->saw.speed > 1 + 1e-9)
        text_format(&words, " Your trial cuts moved the forecast to %.0f %% of its hours.",
                    100 * plan->saw.speed);
    sentence(out, "TRIAL", &words);
    text_clear(&words);
    if (isfinite(plan->saw.latest_h)) {
        text_format(&words, "the longest strip, uncut, cracks by itself from %s",
                    plan->saw.no_later);
        if (band != NULL && isfinite(band->latest_from_h))
            saw_band_words(&words, band->latest_from_h, band->latest_to_h);
        text_add(&words, "; every cut gives its halves more time.");
    } else {
        text_add(&words, "by this forecast the slab does not crack by itself within three days; "
                         "saw all the same, forecasts are wrong.");
    }
    sentence(out, "NO LATER", &words);
    text_free(&words);
}

static void say_order(struct text *out, const struct plan *plan)
{
    struct text words = {0};
    const int count = saws(plan);
    double hours = 0;

    for (size_t i = 0; i < plan->saw.cut_count; i++)
        hours += plan->saw.cuts[i].end_h - plan->saw.cuts[i].start_h;
    text_format(&words, "%d saw%s at ", count, count == 1 ? "" : "s");
    show(&words, plan, plan->job.sawing_pace, QUANTITY_PACE);
    text_format(&words, ", %.1f h of sawing, done %s", hours, plan->saw.last_cut);
    if (dark_before_end(plan))
        text_format(&words, "; dark from %s: lamps, not headlights", plan->saw.sunset);
    text_format(&words, ". Order: %s. ", plan->saw.policy != NULL ? plan->saw.policy : "none");
    if (hours * 3600 / count > plan->job.sawing_shift)
        text_format(&words, "More than a shift: %.0f crews. ",
                    ceil(hours * 3600 / count / plan->job.sawing_shift));
    saw_trouble(&words, plan);
    sentence(out, "SAWS", &words);
    text_free(&words);
}

void saw_spare_words(const struct plan_cut *cut, char out[16])
{
    if (cut->late)
        snprintf(out, 16, "TOO LATE");
    else if (isnan(cut->spare_h))
        snprintf(out, 16, "-");
    else
        snprintf(out, 16, "%d:%02d", (int)cut->spare_h, (int)(cut->spare_h * 60) % 60);
}

static void say_lines(struct text *out, const struct plan *plan)
{
    enum { MOST = 60 };

    text_format(out, "\n%4s %-10s %8s %4s %3s  %-12s %-12s %s\n", "no.", "line", "length", "pour",
                "saw", "start", "not after", "to spare");
    for (size_t i = 0; i < plan->saw.cut_count && i < MOST; i++) {
        const struct plan_cut *cut = &plan->saw.cuts[i];
        char name[2 * LINE_NAME_MOST], spare[16];
        struct text length = {0};
        saw_cut_name(plan, cut, name, sizeof name);
        saw_spare_words(cut, spare);
        show(&length, plan, cut->length_m, QUANTITY_LENGTH);
        text_format(out, "%4d %-10s %8s %4d %3d  %-12s %-12s %s\n", cut->order, name,
                    text_string(&length), cut->pour, cut->saw, cut->start, cut->not_after, spare);
        text_free(&length);
    }
    if (plan->saw.cut_count > MOST)
        text_format(out, "     and %zu more: saw --csv\n", plan->saw.cut_count - MOST);
}

static void say_stops(struct text *out, const struct plan *plan)
{
    enum { MOST = 30 };
    const size_t count = plan->saw.stop_count, step = count > MOST ? (count + MOST - 1) / MOST : 1;

    if (count == 0)
        return;
    text_add(out, "\nIF THE PLANT STOPS (first pour): the front then, where to stop\n");
    for (size_t i = step - 1; i < count; i += step) {
        const struct plan_stop *stop = &plan->saw.stops[i];
        struct text front = {0}, joint = {0};
        char name[LINE_NAME_MOST] = "none";
        show(&front, plan, stop->front_m, QUANTITY_LENGTH);
        if (stop->joint[0] != '\0') {
            name_line(&plan->layout, stop->joint_line, name);
            show(&joint, plan, stop->joint_m, QUANTITY_LENGTH);
        }
        text_format(out, "  after truck %-3d front %-11s line %-4s at %-11s ", stop->truck,
                    text_string(&front), name, text_string(&joint));
        if (isfinite(stop->more_m3)) {
            concrete(out, plan, fabs(stop->more_m3));
            text_add(out, stop->more_m3 >= 0 ? " more" : " too much");
        }
        text_add_char(out, '\n', 1);
        text_free(&front);
        text_free(&joint);
    }
}

void saw_report(struct text *out, const struct plan *plan, const struct saw_band *band)
{
    say_pour(out, plan);
    say_window(out, plan, band);
    say_order(out, plan);
    text_add_char(out, '\n', 1);
    saw_bar(out, plan, band, WIDE);
    say_lines(out, plan);
    say_stops(out, plan);
    text_add_char(out, '\n', 1);
    fixed(out, "LATE",
          "leave the order: the line nearest the middle first, then halve what is left. What "
          "cannot be cut in time is looked at on days 1, 3 and 7. Never beside a crack.");
    fixed(out, "STOP",
          "if a crack runs ahead of the blade: lift out, mark it on the plan, look again.");
    fixed(out, "TRADE",
          "about 4 h after placing in hot weather to three days in cold (concrete trade "
          "press); 6 to 18 h (CSA A23.1-94). The forecast knows no better: trial cuts decide.");
    fixed(out, "SAFE",
          "wet cutting or extraction (silica), ears, eyes; slurry out of the drain; slots are "
          "open to heels and wheels until sealed.");
}

void saw_csv(struct text *out, const struct plan *plan)
{
    text_add(out, "order,line,pour,length_m,saw,start,end_h,not_before,not_after,spare_h,late\n");
    for (size_t i = 0; i < plan->saw.cut_count; i++) {
        const struct plan_cut *cut = &plan->saw.cuts[i];
        char name[2 * LINE_NAME_MOST];
        saw_cut_name(plan, cut, name, sizeof name);
        text_format(out, "%d,%s,%d,%.3f,%d,%s,%.3f,%s,%s,", cut->order, name, cut->pour,
                    cut->length_m, cut->saw, cut->start, cut->end_h, cut->not_before,
                    cut->not_after);
        if (isfinite(cut->spare_h))
            text_format(out, "%.3f", cut->spare_h);
        text_format(out, ",%s\n", cut->late ? "yes" : "no");
    }
}
