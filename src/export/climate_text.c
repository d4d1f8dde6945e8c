#include "export/climate_text.h"
#include <string.h>

static const char *name_of(const struct job *job)
{
    const char *slash = strrchr(job->climate_file, '/');

    return slash != NULL ? slash + 1 : job->climate_file;
}

static void add_years(struct text *out, const struct weather *weather)
{
    if (weather->first_year == 0)
        text_add(out, "one typical year");
    else if (weather->years == 1)
        text_format(out, "%d", weather->first_year);
    else
        text_format(out, "%d years from %d", weather->years, weather->first_year);
}

/* What the file does not say and where it comes from. */
static void add_rest(struct text *out, const struct weather *weather)
{
    const char *sign = "; ";

    if (!weather->has_wind && !weather->has_damp)
        text_format(out, "%swind and damp as typed", sign), sign = ", ";
    else if (!weather->has_wind || !weather->has_damp)
        text_format(out, "%s%s as typed", sign, weather->has_wind ? "damp" : "wind"), sign = ", ";
    if (!weather->has_sun)
        text_format(out, "%ssun from %s", sign,
                    weather->has_cloud ? "latitude and clouds" : "the day's range of the air");
}

void climate_words(struct text *out, const struct job *job)
{
    if (job->weather == NULL) {
        text_add(out, "a made year: five clear days in a row at each extreme of the air");
        return;
    }
    text_format(out, "the weather file %s, ", name_of(job));
    add_years(out, job->weather);
    text_format(out, ", a line %s", job->weather->hourly ? "an hour" : "a day");
    add_rest(out, job->weather);
}

void climate_short_words(struct text *out, const struct job *job)
{
    if (job->weather == NULL) {
        text_add(out, "made year");
        return;
    }
    text_add(out, "weather file, ");
    add_years(out, job->weather);
}
