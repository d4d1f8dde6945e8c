#include "base/text.h"
#include "base/array.h"
#include <stdint.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

static bool make_room(struct text *text, size_t count)
{
    if (text->failed)
        return false;
    if (count > SIZE_MAX - text->length - 1 ||
        !array_reserve((void **)&text->bytes, &text->capacity, text->length + count + 1, 1)) {
        text->failed = true;
        return false;
    }
    return true;
}

void text_add_bytes(struct text *text, const char *bytes, size_t count)
{
    if (!make_room(text, count))
        return;
    if (count > 0)
        memcpy(text->bytes + text->length, bytes, count);
    text->length += count;
    text->bytes[text->length] = '\0';
}

void text_add(struct text *text, const char *string)
{
    text_add_bytes(text, string, strlen(string));
}

void text_add_char(struct text *text, char c, size_t times)
{
    if (!make_room(text, times))
        return;
    memset(text->bytes + text->length, c, times);
    text->length += times;
    text->bytes[text->length] = '\0';
}

void text_vformat(struct text *text, const char *format, va_list arguments)
{
    va_list again;
    int needed;

    va_copy(again, arguments);
    needed = vsnprintf(NULL, 0, format, again);
    va_end(again);
    if (needed < 0) {
        text->failed = true;
        return;
    }
    if (!make_room(text, (size_t)needed))
        return;
    vsnprintf(text->bytes + text->length, (size_t)needed + 1, format, arguments);
    text->length += (size_t)needed;
}

void text_format(struct text *text, const char *format, ...)
{
    va_list arguments;

    va_start(arguments, format);
    text_vformat(text, format, arguments);
    va_end(arguments);
}

const char *text_string(const struct text *text)
{
    return text->bytes != NULL ? text->bytes : "";
}

void text_clear(struct text *text)
{
    text->length = 0;
    if (text->bytes != NULL)
        text->bytes[0] = '\0';
}

void text_free(struct text *text)
{
    free(text->bytes);
    *text = (struct text){0};
}
