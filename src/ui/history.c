#include "ui/history.h"
#include "base/array.h"
#include <stdint.h>
#include <stdlib.h>
#include <string.h>

static void free_step(struct history_step *step)
{
    free(step->bytes);
    free(step->path);
    free(step->words);
    *step = (struct history_step){0};
}

static bool make_step(struct history_step *step, const char *bytes, size_t count, const char *path,
                      const char *words)
{
    step->bytes = malloc(count + 1);
    step->path = strdup(path);
    step->words = strdup(words);
    if (step->bytes == NULL || step->path == NULL || step->words == NULL) {
        free_step(step);
        return false;
    }
    memcpy(step->bytes, bytes, count);
    step->bytes[count] = '\0';
    step->count = count;
    return true;
}

static void drop_first(struct history *history)
{
    free_step(&history->steps[0]);
    memmove(history->steps, history->steps + 1, (history->count - 1) * sizeof *history->steps);
    history->count--;
    if (history->saved != SIZE_MAX)
        history->saved = history->saved > 0 ? history->saved - 1 : SIZE_MAX;
}

bool history_add(struct history *history, const char *bytes, size_t count, const char *path,
                 bool example, const char *words)
{
    struct history_step step = {.example = example};
    size_t keep = history->count > 0 ? history->now + 1 : 0;

    if (!array_reserve((void **)&history->steps, &history->capacity, keep + 1, sizeof step) ||
        !make_step(&step, bytes, count, path, words))
        return false;
    if (history->count == 0 || (history->saved >= keep && history->saved != SIZE_MAX))
        history->saved = SIZE_MAX;
    while (history->count > keep)
        free_step(&history->steps[--history->count]);
    history->steps[history->count++] = step;
    if (history->count > HISTORY_MOST)
        drop_first(history);
    history->now = history->count - 1;
    return true;
}

void history_free(struct history *history)
{
    for (size_t i = 0; i < history->count; i++)
        free_step(&history->steps[i]);
    free(history->steps);
    *history = (struct history){.saved = SIZE_MAX};
}
