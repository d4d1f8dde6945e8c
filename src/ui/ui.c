/* Starts the form on a file, or on the example. */
#include "ui/ui.h"
#include "file/file.h"
#include "file/weather_file.h"
#include "ui/terminal.h"
#include <stdio.h>
#include <time.h>

static struct date today(void)
{
    time_t now = time(NULL);
    struct tm parts;

    if (localtime_r(&now, &parts) == NULL)
        return (struct date){0};
    return (struct date){parts.tm_year + 1900, parts.tm_mon + 1, parts.tm_mday};
}

static int complain(const char *path, enum status status)
{
    struct text words = {0};

    file_explain(&words, path, status);
    fprintf(stderr, "slabgap: %s\n", text_string(&words));
    text_free(&words);
    return 2;
}

/* The example that ships; without it the form starts with the own-slab questions. */
static void load_example(struct app *app)
{
    struct text path = {0}, bytes = {0};

    if (file_find_shared("examples/e1-service-yard.slab", &path) &&
        file_read(text_string(&path), &bytes) == STATUS_OK)
        app_load(app, text_string(&bytes), bytes.length, NULL, true);
    else
        app_start_own(app);
    text_free(&path);
    text_free(&bytes);
}

/* A file that is not there yet is begun by the own-slab questions, unless its folder is missing; of
 * any other trouble a sentence says what is wrong. */
static int load(struct app *app, const char *path)
{
    struct text bytes = {0};
    enum status status = file_read(path, &bytes);

    if (status == STATUS_NO_FILE && file_can_begin(path)) {
        load_example(app);
        app_start_new(app, path);
        return 0;
    }
    if (status == STATUS_OK &&
        app_load(app, text_string(&bytes), bytes.length, path, false) == STATUS_NO_MEMORY)
        status = STATUS_NO_MEMORY;
    text_free(&bytes);
    return status == STATUS_OK ? 0 : complain(path, status);
}

int ui_run(const char *path)
{
    const struct weather_source weather = {weather_file_read};
    struct app *app = app_make(today());
    int code = 0;

    if (app == NULL)
        return complain("slabgap", STATUS_NO_MEMORY);
    app_set_weather(app, &weather);
    if (path != NULL)
        code = load(app, path);
    else
        load_example(app);
    if (code == 0)
        code = terminal_run(app);
    app_free(app);
    return code;
}
