#include "ui/editor.h"
#include "base/utf8.h"
#include "ui/keys.h"
#include <stdio.h>
#include <string.h>

void editor_open(struct editor *editor, const char *string)
{
    size_t length = strlen(string);

    *editor = (struct editor){0};
    if (length >= EDITOR_MOST || utf8_invalid_at(string, length) != length)
        return;
    memcpy(editor->bytes, string, length + 1);
    editor->length = editor->cursor = length;
}

static size_t before(const struct editor *editor)
{
    size_t i = editor->cursor;

    while (i > 0 && ((unsigned char)editor->bytes[--i] & 0xC0) == 0x80)
        continue;
    return i;
}

static size_t behind(const struct editor *editor)
{
    size_t i = editor->cursor;

    if (i < editor->length)
        i++;
    while (i < editor->length && ((unsigned char)editor->bytes[i] & 0xC0) == 0x80)
        i++;
    return i;
}

static void cut(struct editor *editor, size_t from, size_t to)
{
    memmove(editor->bytes + from, editor->bytes + to, editor->length - to + 1);
    editor->length -= to - from;
    editor->cursor = from;
    editor->touched = true;
}

static void type(struct editor *editor, uint32_t key)
{
    char bytes[4];
    size_t count = utf8_encode(key, bytes);

    if (count == 0 || utf8_width(key) == 0 || editor->length + count >= EDITOR_MOST)
        return;
    memmove(editor->bytes + editor->cursor + count, editor->bytes + editor->cursor,
            editor->length - editor->cursor + 1);
    memcpy(editor->bytes + editor->cursor, bytes, count);
    editor->length += count;
    editor->cursor += count;
    editor->touched = true;
}

bool editor_key(struct editor *editor, uint32_t key)
{
    switch (key) {
    case PRESS_LEFT:
        editor->cursor = before(editor);
        return true;
    case PRESS_RIGHT:
        editor->cursor = behind(editor);
        return true;
    case PRESS_HOME:
        editor->cursor = 0;
        return true;
    case PRESS_END:
        editor->cursor = editor->length;
        return true;
    case PRESS_RUB:
        cut(editor, before(editor), editor->cursor);
        return true;
    case PRESS_DELETE:
        cut(editor, editor->cursor, behind(editor));
        return true;
    default:
        if (key < 0x20 || key >= KEY_NONE_PRESSED)
            return false;
        type(editor, key);
        return true;
    }
}

void editor_draw(const struct editor *editor, struct canvas *canvas, int row, int column, int most,
                 int style)
{
    char head[EDITOR_MOST];
    size_t from = 0;
    int place;

    if (most < 2)
        return;
    memcpy(head, editor->bytes, editor->cursor);
    head[editor->cursor] = '\0';
    place = utf8_columns(head);
    while (place > most - 1 && from < editor->cursor) {
        from++;
        while (((unsigned char)head[from] & 0xC0) == 0x80)
            from++;
        place = utf8_columns(head + from);
    }
    for (int i = 0; i < most; i++)
        canvas_put(canvas, row, column + i, ' ', style);
    canvas_words(canvas, row, column, most, style, editor->bytes + from);
    canvas->cursor_row = row;
    canvas->cursor_column = column + place;
}
