/* The weather file of the job in hand. */
#include "ui/app_state.h"
#include <stdio.h>
#include <string.h>

void app_set_weather(struct app *app, const struct weather_source *source)
{
    app->source = *source;
}

void weather_drop(struct app *app)
{
    weather_release(app->weather.record);
    app->weather.record = NULL;
    finding_free(&app->weather.findings);
    app->weather.name[0] = app->weather.job_path[0] = '\0';
}

enum status weather_attach(struct app *app, struct job *job)
{
    const char *name = job->climate_file;

    if (!job->given[FIELD_climate_file] || app->source.read == NULL)
        return STATUS_OK;
    if (strcmp(name, app->weather.name) != 0 || strcmp(app->path, app->weather.job_path) != 0) {
        enum status status;
        weather_drop(app);
        status = app->source.read(app->path[0] != '\0' ? app->path : NULL, name,
                                  &app->weather.record, &app->weather.findings);
        if (status == STATUS_NO_MEMORY)
            return status;
        snprintf(app->weather.name, sizeof app->weather.name, "%s", name);
        snprintf(app->weather.job_path, sizeof app->weather.job_path, "%s", app->path);
    }
    job->weather = weather_share(app->weather.record);
    finding_append(&app->findings, &app->weather.findings);
    return finding_has_error(&app->weather.findings) ? STATUS_REFUSED : STATUS_OK;
}
