#include "job/job.h"
#include "job/field.h"
#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

static void set_initial(struct job *job, const struct field *field)
{
    void *place = (char *)job + field->offset;

    switch (field->type) {
    case FIELD_NUMBER:
        *(double *)place = field->initial;
        break;
    case FIELD_CHOICE:
        *(int *)place = (int)field->initial;
        break;
    case FIELD_STRENGTH:
        ((struct strength *)place)->cylinder = 32e6;
        break;
    case FIELD_AGGREGATE:
        ((struct aggregate *)place)->row = -1;
        break;
    case FIELD_CLASS:
        *(struct movement_class *)place = (struct movement_class){0.25, 0.25, "25"};
        break;
    case FIELD_NUMBERS:
        if (isfinite(field->initial))
            *(struct numbers *)place = (struct numbers){{field->initial}, 1};
        break;
    default:
        break; /* nothing given is all zero */
    }
}

void job_init(struct job *job)
{
    memset(job, 0, sizeof *job);
    for (int id = 0; id < FIELD_COUNT; id++)
        set_initial(job, &field_table[id]);
}

/* A copy of `count` items; NULL for none. False on no memory. */
static bool duplicate(void **to, const void *from, size_t count, size_t size)
{
    *to = NULL;
    if (count == 0)
        return true;
    *to = malloc(count * size);
    if (*to == NULL)
        return false;
    memcpy(*to, from, count * size);
    return true;
}

static bool copy_rows(struct rows *to, const struct rows *from)
{
    void *items;

    *to = (struct rows){0};
    if (!duplicate(&items, from->items, from->count, sizeof *from->items))
        return false;
    to->items = items;
    to->count = to->capacity = from->count;
    return true;
}

static bool copy_openings(struct job *to, const struct job *from)
{
    void *items;

    if (!duplicate(&items, from->openings, from->opening_count, sizeof *from->openings))
        return false;
    to->openings = items;
    to->opening_capacity = from->opening_count;
    for (size_t i = 0; i < from->opening_count; i++, to->opening_count++)
        if (!copy_rows(&to->openings[i].rows, &from->openings[i].rows))
            return false;
    return true;
}

static bool copy_cracks(struct job *to, const struct job *from)
{
    void *items;

    if (!duplicate(&items, from->cracks, from->crack_count, sizeof *from->cracks))
        return false;
    to->cracks = items;
    to->crack_capacity = from->crack_count;
    for (size_t i = 0; i < from->crack_count; i++, to->crack_count++)
        if (!copy_rows(&to->cracks[i].rows, &from->cracks[i].rows))
            return false;
    return true;
}

static bool copy_edges(struct job *to, const struct job *from)
{
    void *items;

    if (!duplicate(&items, from->edges, from->edge_count, sizeof *from->edges))
        return false;
    to->edges = items;
    to->edge_capacity = from->edge_count;
    for (size_t i = 0; i < from->edge_count; i++, to->edge_count++) {
        if (!duplicate(&items, from->edges[i].joints, from->edges[i].joint_count, sizeof(double)))
            return false;
        to->edges[i].joints = items;
    }
    return true;
}

static bool copy_plain_lists(struct job *to, const struct job *from)
{
    void *objects, *lines, *joints;

    if (!duplicate(&objects, from->objects, from->object_count, sizeof *from->objects))
        return false;
    to->objects = objects;
    to->object_count = to->object_capacity = from->object_count;
    if (!duplicate(&lines, from->pour_lines, from->pour_line_count, sizeof *from->pour_lines))
        return false;
    to->pour_lines = lines;
    to->pour_line_count = to->pour_line_capacity = from->pour_line_count;
    if (!duplicate(&joints, from->joints, from->joint_count, sizeof *from->joints))
        return false;
    to->joints = joints;
    to->joint_count = to->joint_capacity = from->joint_count;
    return true;
}

/* Takes over the single fields and leaves every list empty. */
static void copy_fields(struct job *to, const struct job *from)
{
    *to = *from;
    to->outline = (struct rows){0};
    to->openings = NULL;
    to->objects = NULL;
    to->edges = NULL;
    to->pour_lines = NULL;
    to->joints = NULL;
    to->cracks = NULL;
    to->weather = NULL;
    to->opening_count = to->opening_capacity = to->object_count = to->object_capacity = 0;
    to->edge_count = to->edge_capacity = to->pour_line_count = to->pour_line_capacity = 0;
    to->joint_count = to->joint_capacity = to->crack_count = to->crack_capacity = 0;
}

enum status job_copy(struct job *to, const struct job *from)
{
    copy_fields(to, from);
    if (copy_rows(&to->outline, &from->outline) && copy_openings(to, from) &&
        copy_cracks(to, from) && copy_edges(to, from) && copy_plain_lists(to, from)) {
        to->weather = weather_share(from->weather);
        return STATUS_OK;
    }
    job_free(to);
    job_init(to);
    return STATUS_NO_MEMORY;
}

void job_free(struct job *job)
{
    for (size_t i = 0; i < job->opening_count; i++)
        free(job->openings[i].rows.items);
    for (size_t i = 0; i < job->crack_count; i++)
        free(job->cracks[i].rows.items);
    for (size_t i = 0; i < job->edge_count; i++)
        free(job->edges[i].joints);
    free(job->outline.items);
    free(job->openings);
    free(job->objects);
    free(job->edges);
    free(job->pour_lines);
    free(job->joints);
    free(job->cracks);
    weather_release(job->weather);
    copy_fields(job, job);
    job->has_pours = false;
}

/* Days from civil: the proleptic Gregorian calendar counted in eras of 400 years = 146 097 days,
 * years beginning on 1 March so that the leap day is the last. */
long date_days(struct date date)
{
    long year = date.year - (date.month <= 2), era = (year >= 0 ? year : year - 399) / 400;
    long of_era = year - era * 400;
    long of_year = (153 * (date.month + (date.month > 2 ? -3 : 9)) + 2) / 5 + date.day - 1;

    return era * 146097 + of_era * 365 + of_era / 4 - of_era / 100 + of_year - 719468;
}

struct date date_from_days(long days)
{
    long z = days + 719468, era = (z >= 0 ? z : z - 146096) / 146097, of_era = z - era * 146097;
    long year = (of_era - of_era / 1460 + of_era / 36524 - of_era / 146096) / 365;
    long of_year = of_era - (365 * year + year / 4 - year / 100), month = (5 * of_year + 2) / 153;
    struct date date;

    date.day = (int)(of_year - (153 * month + 2) / 5 + 1);
    date.month = (int)(month < 10 ? month + 3 : month - 9);
    date.year = (int)(year + era * 400 + (date.month <= 2));
    return date;
}

bool date_valid(struct date date)
{
    struct date again;

    if (date.month < 1 || date.month > 12 || date.day < 1 || date.day > 31)
        return false;
    again = date_from_days(date_days(date));
    return again.year == date.year && again.month == date.month && again.day == date.day;
}

int date_day_of_year(struct date date)
{
    static const int before[] = {0, 31, 59, 90, 120, 151, 181, 212, 243, 273, 304, 334};
    bool leap_day = date.month == 2 && date.day == 29;

    return before[(date.month - 1) % 12] + (leap_day ? 28 : date.day) - 1;
}

double job_sealing_age_days(const struct job *job)
{
    if (job->pour_date.year != 0 && job->sealing_date.year != 0)
        return (double)(date_days(job->sealing_date) - date_days(job->pour_date));
    return 28;
}
