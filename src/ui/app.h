/* The form as pure state: keys in, a canvas out. No curses, no clock, no files: what needs one of
 * these is a request that the terminal loop takes and carries out. */
#ifndef SLABGAP_UI_APP_H
#define SLABGAP_UI_APP_H

#include "base/status.h"
#include "job/job.h"
#include "ui/canvas.h"
#include <stdbool.h>
#include <stdint.h>

enum { PATH_MOST = 512 };
enum request_kind { REQUEST_NONE, REQUEST_SAVE, REQUEST_OPEN, REQUEST_LEAVE };
struct request {
    enum request_kind kind;
    char path[PATH_MOST];
    bool replace; /* save: an existing other file may be overwritten; the user said so */
    bool leave;   /* save: leave afterwards */
};

struct app;
struct job;
struct plan;

/* Who makes plans for the form. Without one the form makes them itself, at once. */
struct plan_maker {
    /* True: *plan and *status are there. False: later, by app_take_plan(); or *status is not
     * STATUS_OK and nothing was begun. */
    bool (*make)(void *context, const struct job *job, struct plan *plan, enum status *status);
    void (*stop)(void *context);
    double (*share)(void *context); /* 0 to 1 of the plan that is being made */
    void *context;
};

/* Who reads weather files for the form. Without one a job that names a file says it was not read.
 */
struct weather_source {
    /* As weather_file_read(). */
    enum status (*read)(const char *job_path, const char *name, struct weather **weather,
                        struct finding_list *findings);
};

/* `today` is the day shown; year 0 shows none. NULL without memory. */
struct app *app_make(struct date today);
void app_free(struct app *app);
/* Starts with a job's text. A NULL path: not saved yet. An example is marked on every page.
 * STATUS_REFUSED: errors in it are shown in the form; STATUS_NO_MEMORY: nothing changed. */
enum status app_load(struct app *app, const char *bytes, size_t count, const char *path,
                     bool example);
/* A new slab by the questions of the own-slab page. */
void app_start_own(struct app *app);
/* The same for a file that is not there yet: the slab is saved there. */
void app_start_new(struct app *app, const char *path);
void app_resize(struct app *app, int columns, int rows);
void app_key(struct app *app, uint32_t key);
/* Whether a letter pressed now is text: then no letter is dropped as a bounce of the key. */
bool app_takes_text(const struct app *app);
void app_draw(const struct app *app, struct canvas *canvas);
/* The next thing to do outside; false when there is none. */
void app_set_maker(struct app *app, const struct plan_maker *maker);
void app_set_weather(struct app *app, const struct weather_source *source);
/* Whether a plan is being made; the answers shown are those of the job before. */
bool app_working(const struct app *app);
/* The plan that was to come later; the form owns it then. */
void app_take_plan(struct app *app, struct plan *plan, enum status status);
bool app_take_request(struct app *app, struct request *request);
/* The job's text, to be saved. */
void app_write(const struct app *app, struct text *out);
/* It was saved there at that clock time ("17:42"). */
void app_saved(struct app *app, const char *path, const char *clock);
/* The file is there and is another one: ask before overwriting. */
void app_ask_replace(struct app *app, const struct request *request);
/* One sentence in the help row until the next key. */
void app_say(struct app *app, const char *sentence);

#endif
