/* The rows of the first screen, in the order of what decides the answer, and what every row to fill
 * in shows, starts with and changes. */
#include "base/utf8.h"
#include "job/table.h"
#include "ui/app_state.h"
#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

struct sheet_entry {
    enum row_kind kind;
    enum field_id id, second;
    const char *label; /* NULL: the field's */
    bool guess, roomy_only;
    const char *help; /* NULL: the field's */
    enum field_group group;
};
#define NO_SECOND FIELD_COUNT
static const struct sheet_entry sheet[] = {
    {ROW_FIELD, FIELD_slab_use, NO_SECOND, NULL, false, false, NULL, GROUP_DRAWING},
    {ROW_SHAPE, FIELD_COUNT, NO_SECOND, "Shape", false, false,
     "Enter chooses a shape and its sizes; the plan shows it.", GROUP_DRAWING},
    {ROW_FIELD, FIELD_slab_thickness, NO_SECOND, NULL, false, false, NULL, GROUP_DRAWING},
    {ROW_FIELD, FIELD_base_kind, NO_SECOND, NULL, false, false, NULL, GROUP_DRAWING},
    {ROW_STANDS, FIELD_COUNT, NO_SECOND, "Stands in it", true, false,
     "Columns, manholes, drains, holes: Enter goes to the plan, a adds one.", GROUP_DRAWING},
    {ROW_TOUCHES, FIELD_COUNT, NO_SECOND, "Touches it", true, false,
     "Walls, kerbs and old slabs along the sides. Enter lists the sides.", GROUP_DRAWING},
    {ROW_FIELD, FIELD_rules_spacing, NO_SECOND, NULL, false, true, NULL, GROUP_DRAWING},
    {ROW_FIELD, FIELD_concrete_strength, NO_SECOND, NULL, false, false, NULL, GROUP_TICKET},
    {ROW_FIELD, FIELD_concrete_aggregate, NO_SECOND, NULL, false, false, NULL, GROUP_TICKET},
    {ROW_YEAR, FIELD_climate_air_coldest, FIELD_climate_air_hottest, "Air year", true, true,
     "The coldest and hottest of a usual ten years, from any weather service.", GROUP_WEATHER},
    {ROW_YEAR, FIELD_climate_slab_coldest, FIELD_climate_slab_hottest, "Slab year", true, false,
     "Coldest to hottest, mean over the depth. Cleared: worked out from the air.", GROUP_WEATHER},
    {ROW_STARTS, FIELD_pour_start, FIELD_pour_date, "Starts", true, false,
     "Day and clock time of the pour: 2027-04-12 06:00, or one of the two.", GROUP_POUR},
    {ROW_FIELD, FIELD_pour_rate, NO_SECOND, NULL, true, true, NULL, GROUP_POUR},
    {ROW_FIELD, FIELD_sawing_saws, NO_SECOND, NULL, true, true, NULL, GROUP_POUR},
    {ROW_SLAB_THEN, FIELD_sealing_temperature, FIELD_sealing_date, "Slab then", true, false,
     "Slab temperature at sealing, then the day: 15 2027-05-20, or one of the two.", GROUP_SEALING},
    {ROW_DRYING, FIELD_concrete_shrinkage, FIELD_concrete_shrinkage_model, "Drying to come", false,
     true, "mm a metre still to come after sealing. Cleared: from strength and damp.",
     GROUP_SEALING},
    {ROW_GOOD_FOR, FIELD_sealant_class, FIELD_sealant_kind, "Good for", true, false,
     "Movement class and kind from the tin: 25 silicone, 35 polyurethane, 100/50.", GROUP_TIN},
    {ROW_FIELD, FIELD_sealant_width, NO_SECOND, NULL, false, false, NULL, GROUP_TIN},
    {ROW_FIELD, FIELD_sealant_depth, NO_SECOND, NULL, false, true, NULL, GROUP_TIN},
    {ROW_REST, FIELD_COUNT, NO_SECOND, "The rest", false, false,
     "Everything else that can be typed, with its usual value. Enter opens the list.", GROUP_REST},
};
enum { SHEET_COUNT = sizeof sheet / sizeof *sheet };

int sheet_count(void)
{
    return SHEET_COUNT;
}

void row_path_of(const struct field *field, char out[64])
{
    snprintf(out, 64, "%s.%s", field->section, field->key);
}

void row_of_field(enum field_id id, struct entry *row)
{
    const struct field *field = &field_table[id];

    *row = (struct entry){.kind = ROW_FIELD,
                          .field = field,
                          .id = id,
                          .second = FIELD_COUNT,
                          .group = field_group_word(field->group),
                          .help = field->help};
    snprintf(row->label, sizeof row->label, "%s", field->label);
    row_path_of(field, row->path);
}

void sheet_row(int index, struct entry *row)
{
    const struct sheet_entry *entry = &sheet[index];

    *row = (struct entry){.id = FIELD_COUNT};
    if (entry->id != FIELD_COUNT)
        row_of_field(entry->id, row);
    row->kind = entry->kind;
    row->second = entry->second;
    row->guess = entry->guess;
    row->roomy_only = entry->roomy_only;
    row->group = field_group_word(entry->group);
    if (entry->label != NULL)
        snprintf(row->label, sizeof row->label, "%s", entry->label);
    if (entry->help != NULL)
        row->help = entry->help;
}

/* ---- what stands in a row ---- */

static bool whole_feet(double metres)
{
    double feet = metres / 0.3048;

    return fabs(feet - round(feet)) < 0.005;
}

static void show_shape(const struct app *app, struct text *out)
{
    const struct rows *rows = &app->job.outline;
    double x0 = 0, x1 = 0, y0 = 0, y1 = 0;

    if (rows->count < 3) {
        text_add(out, "none yet");
        return;
    }
    x0 = x1 = rows->items[0].x;
    y0 = y1 = rows->items[0].y;
    for (size_t i = 1; i < rows->count; i++) {
        x0 = fmin(x0, rows->items[i].x);
        x1 = fmax(x1, rows->items[i].x);
        y0 = fmin(y0, rows->items[i].y);
        y1 = fmax(y1, rows->items[i].y);
    }
    text_add(out, rows->count == 4 ? "" : rows->count == 6 ? "L " : "corners ");
    if (app_units(app) == UNITS_US && whole_feet(x1 - x0) && whole_feet(y1 - y0)) {
        text_format(out, "%.0f x %.0f ft", (x1 - x0) / 0.3048, (y1 - y0) / 0.3048);
        return;
    }
    if (app_units(app) == UNITS_US) {
        unit_show(out, x1 - x0, QUANTITY_LENGTH, UNITS_US);
        text_add(out, " x ");
        unit_show(out, y1 - y0, QUANTITY_LENGTH, UNITS_US);
        return;
    }
    unit_add_number(out, x1 - x0, 2);
    text_add(out, " x ");
    unit_add_number(out, y1 - y0, 2);
    text_add(out, " m");
}

static void show_stands(const struct app *app, struct text *out)
{
    size_t kinds[OBJECT_OTHER + 1] = {0};
    const struct field *field = field_find("object", "kind");
    char word[CHOICE_MOST];

    if (app->job.object_count + app->job.opening_count == 0) {
        text_add(out, "nothing");
        return;
    }
    for (size_t i = 0; i < app->job.object_count; i++)
        kinds[app->job.objects[i].kind]++;
    for (int kind = 0; kind <= OBJECT_OTHER; kind++)
        if (kinds[kind] > 0 && field != NULL) {
            field_choice_word(field, kind, word, sizeof word);
            text_format(out, "%s%zu %s%s", out->length > 0 ? ", " : "", kinds[kind], word,
                        kinds[kind] > 1 ? "s" : "");
        }
    if (app->job.opening_count > 0)
        text_format(out, "%s%zu hole%s", out->length > 0 ? ", " : "", app->job.opening_count,
                    app->job.opening_count > 1 ? "s" : "");
}

static void show_touches(const struct app *app, struct text *out)
{
    static const char *const words[] = {"free", "wall", "kerb", "slab", "asphalt"};
    size_t kinds[5] = {0};

    for (size_t i = 0; i < app->job.edge_count; i++)
        kinds[app->job.edges[i].against]++;
    for (size_t kind = 1; kind < 5; kind++)
        if (kinds[kind] > 0)
            text_format(out, "%s%s %zu side%s", out->length > 0 ? ", " : "", words[kind],
                        kinds[kind], kinds[kind] > 1 ? "s" : "");
    if (out->length == 0)
        text_add(out, "nothing");
}

const char *month_word(int month)
{
    static const char *const months[] = {"Jan", "Feb", "Mar", "Apr", "May", "Jun",
                                         "Jul", "Aug", "Sep", "Oct", "Nov", "Dec"};

    return month >= 1 && month <= 12 ? months[month - 1] : "";
}

static void add_day(struct text *out, struct date date)
{
    if (date.year != 0 && date.month >= 1 && date.month <= 12)
        text_format(out, "%d %s", date.day, month_word(date.month));
}

/* Both slab temperatures; when none is typed the plan's own. */
void row_show_year(const struct app *app, const struct entry *row, struct text *out)
{
    double cold, hot;
    bool slab = row->id == FIELD_climate_slab_coldest;

    memcpy(&cold, (const char *)&app->job + field_table[row->id].offset, sizeof cold);
    memcpy(&hot, (const char *)&app->job + field_table[row->second].offset, sizeof hot);
    if (slab && !isfinite(cold) && app->has_plan)
        cold = app->plan.temperature.coldest_c;
    if (slab && !isfinite(hot) && app->has_plan)
        hot = app->plan.temperature.hottest_c;
    if (!slab && app->job.weather != NULL)
        text_add(out, "file ");
    if (!isfinite(cold) || !isfinite(hot)) {
        text_add(out, "from the air");
        return;
    }
    if (app_units(app) == UNITS_US)
        cold = cold * 1.8 + 32, hot = hot * 1.8 + 32;
    /* an estimate is good to a degree at best */
    unit_add_number(out, cold, row_given(app, row) ? 1 : 0);
    text_add(out, " to ");
    unit_add_number(out, hot, row_given(app, row) ? 1 : 0);
    text_add(out, app_units(app) == UNITS_US ? " °F" : " °C");
}

static void show_pair(const struct app *app, const struct entry *row, struct text *out)
{
    const struct job *job = &app->job;

    if (row->kind == ROW_STARTS) {
        add_day(out, job->pour_date);
        if (job->given[FIELD_pour_start])
            text_format(out, "%s%02d:%02d", out->length > 0 ? " " : "",
                        job->pour_start.minutes / 60, job->pour_start.minutes % 60);
        if (out->length == 0)
            text_add(out, "not typed");
        return;
    }
    if (row->kind == ROW_SLAB_THEN) {
        double then = isfinite(job->sealing_temperature) ? job->sealing_temperature
                      : app->has_plan                    ? app->plan.temperature.sealing_c
                                                         : NAN;
        if (isfinite(then))
            unit_show(out, then, QUANTITY_TEMPERATURE, app_units(app));
        text_add(out, job->sealing_date.year != 0 ? "  " : "");
        add_day(out, job->sealing_date);
        return;
    }
    if (job->sealant_kind < SEALANT_COMPRESSION_SEAL) { /* the kinds that have a class */
        unit_add_number(out, 100 * job->sealant_class.extension, 1);
        text_add(out, " % ");
    }
    field_show(out, job, FIELD_sealant_kind, app_units(app));
}

static void show_drying(const struct app *app, struct text *out)
{
    double strain = app->has_plan ? app->plan.shrinkage.after_sealing : NAN;

    if (app->job.given[FIELD_concrete_shrinkage])
        strain = app->job.concrete_shrinkage;
    if (isfinite(strain))
        text_format(out, "%.2f mm a metre", 1000 * strain);
    else
        text_add(out, "from the model");
}

/* A typed number whose result stands in the plan: what the program chose in its place. */
static double chosen(const struct app *app, enum field_id id)
{
    if (!app->has_plan)
        return NAN;
    if (id == FIELD_sealant_width)
        return app->plan.seal.width_m;
    if (id == FIELD_sealant_depth)
        return app->plan.seal.depth_m;
    if (id == FIELD_sealant_rod)
        return app->plan.seal.rod_m;
    if (id == FIELD_rules_spacing)
        return app->plan.spacing.limit_m;
    if (id == FIELD_takeoff_length)
        return app->plan.quantities.sealed_m;
    return NAN;
}

static void show_field(const struct app *app, const struct entry *row, struct text *out)
{
    double value;

    if (row->id == FIELD_COUNT) {
        const char *written = document_get(app->document, row->path);
        if (written != NULL)
            text_add(out, written);
        else if (row_is_choice(row)) /* left out: the first word */
            text_add_bytes(out, row->field->choices, strcspn(row->field->choices, " "));
        else
            text_add(out, "-");
        return;
    }
    value = app->job.given[row->id] ? NAN : chosen(app, row->id);
    if (isfinite(value))
        unit_show(out, value, row->field->quantity, app_units(app));
    else if (row->id == FIELD_concrete_aggregate && app->job.concrete_aggregate.row < 0)
        text_add(out, "not known");
    else
        field_show(out, &app->job, row->id, app_units(app));
}

void row_show(const struct app *app, const struct entry *row, struct text *out)
{
    switch (row->kind) {
    case ROW_SHAPE:
        show_shape(app, out);
        break;
    case ROW_STANDS:
        show_stands(app, out);
        break;
    case ROW_TOUCHES:
        show_touches(app, out);
        break;
    case ROW_YEAR:
        row_show_year(app, row, out);
        break;
    case ROW_STARTS:
    case ROW_SLAB_THEN:
    case ROW_GOOD_FOR:
        show_pair(app, row, out);
        break;
    case ROW_DRYING:
        show_drying(app, out);
        break;
    case ROW_REST: {
        size_t yours = 0, all = 0;
        for (int id = 0; id < FIELD_COUNT; id++)
            all++, yours += app->job.given[id];
        text_format(out, "%zu; %zu yours", all - (size_t)SHEET_COUNT, yours);
        break;
    }
    case ROW_FIELD:
        show_field(app, row, out);
        break;
    case ROW_HEADING:
        break;
    }
}

/* ---- whose number it is ---- */

static bool overruled(const struct app *app, const struct entry *row)
{
    for (size_t i = 0; i < app->findings.count; i++) {
        const struct finding *finding = &app->findings.items[i];
        if (finding->severity == SEVERITY_NOTE && strcmp(finding->field, row->path) == 0 &&
            strstr(finding->message, "not used") != NULL)
            return true;
    }
    return false;
}

bool row_given(const struct app *app, const struct entry *row)
{
    const struct job *job = &app->job;

    switch (row->kind) {
    case ROW_SHAPE:
        return job->outline.count >= 3;
    case ROW_STANDS:
        return job->object_count + job->opening_count > 0;
    case ROW_TOUCHES:
        return job->edge_count > 0;
    case ROW_REST:
    case ROW_HEADING:
        return false;
    default:
        if (row->id == FIELD_COUNT)
            return document_get(app->document, row->path) != NULL;
        return job->given[row->id] || (row->second < FIELD_COUNT && job->given[row->second]);
    }
}

unsigned row_bit(const struct entry *row)
{
    for (int i = 0; i < SHEET_COUNT; i++)
        if (sheet[i].kind == row->kind && sheet[i].id == row->id)
            return 1u << i;
    return 0;
}

const char *row_whose(const struct app *app, const struct entry *row)
{

    if (row->kind == ROW_HEADING || row->kind == ROW_REST)
        return "";
    if (row_given(app, row))
        return overruled(app, row) ? "not used" : "you";
    return row->guess && (app->opened & row_bit(row)) == 0 ? "guess" : "usual";
}

/* ---- the help row ---- */

static void add_other_system(const struct app *app, const struct entry *row, struct text *out)
{
    enum unit_system units = app_units(app), other = units == UNITS_US ? UNITS_METRIC : UNITS_US;
    struct text here = {0}, there = {0};

    if (row->kind != ROW_FIELD || row->id == FIELD_COUNT || row->field->type != FIELD_NUMBER ||
        row->field->quantity == QUANTITY_NONE)
        return;
    field_show(&here, &app->job, row->id, units);
    field_show(&there, &app->job, row->id, other);
    if (strcmp(text_string(&here), text_string(&there)) != 0)
        text_format(out, " %s = %s.", text_string(&here), text_string(&there));
    text_free(&here);
    text_free(&there);
}

void row_help(const struct app *app, const struct entry *row, struct text *out)
{
    const char *whose = row_whose(app, row);

    text_format(out, "%s: %s", row->label, row->help != NULL ? row->help : "");
    add_other_system(app, row, out);
    if (strcmp(whose, "you") == 0)
        text_add(out, row->kind == ROW_FIELD ? " Typed by you." : "");
    else if (strcmp(whose, "not used") == 0)
        text_add(out, " Not used: another row wins.");
    else if (strcmp(whose, "guess") == 0)
        text_add(out, " A guess: look at it.");
    else if (row->kind == ROW_FIELD && row->field->words != NULL && row->field->words[0] != '\0')
        text_format(out, " Left out: %s.", row->field->words);
}
