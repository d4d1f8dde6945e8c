/* What the form's tests share: an app on an example, keys as a string, the screen as text. */
#ifndef SLABGAP_TESTS_UI_HELP_H
#define SLABGAP_TESTS_UI_HELP_H

#include "ui/app.h"
#include "ui/keys.h"
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

static const struct date test_day = {2027, 4, 11};

static inline char *read_whole(const char *path, size_t *count)
{
    FILE *file = fopen(path, "rb");
    char *bytes = calloc(1, 1 << 20);

    *count = 0;
    if (file != NULL && bytes != NULL)
        *count = fread(bytes, 1, (1 << 20) - 1, file);
    if (file != NULL)
        fclose(file);
    return bytes;
}

static inline struct app *open_example(bool example)
{
    struct app *app = app_make(test_day);
    size_t count;
    char *bytes = read_whole("share/examples/e1-service-yard.slab", &count);

    if (app != NULL && bytes != NULL && count > 0)
        app_load(app, bytes, count, example ? NULL : "yard.slab", example);
    free(bytes);
    return app;
}

/* '^' Esc, '~' Enter, '<' '>' '(' ')' left right up down, '\b' Backspace; all else itself. */
static inline uint32_t test_key(char c)
{
    switch (c) {
    case '^':
        return PRESS_BACK;
    case '~':
        return PRESS_ENTER;
    case '<':
        return PRESS_LEFT;
    case '>':
        return PRESS_RIGHT;
    case '(':
        return PRESS_UP;
    case ')':
        return PRESS_DOWN;
    case '\b':
        return PRESS_RUB;
    default:
        return (uint32_t)(unsigned char)c;
    }
}

static inline void press(struct app *app, const char *keys)
{
    for (; *keys != '\0'; keys++)
        app_key(app, test_key(*keys));
}

/* The screen as text; the caller frees it. */
static inline struct text screen(const struct app *app, int columns, int rows, bool ascii)
{
    struct canvas canvas = {0};
    struct text out = {0};

    if (canvas_make(&canvas, columns, rows, ascii)) {
        app_draw(app, &canvas);
        canvas_print(&canvas, &out);
    }
    canvas_free(&canvas);
    return out;
}

static inline bool shows(const struct app *app, const char *words)
{
    struct text text = screen(app, 80, 24, false);
    bool found = strstr(text_string(&text), words) != NULL;

    if (!found)
        fprintf(stderr, "'%s' is not on:\n%s", words, text_string(&text));
    text_free(&text);
    return found;
}

#endif
