/* A one-line field editor: text, a cursor between characters, no surprises. */
#ifndef SLABGAP_UI_EDITOR_H
#define SLABGAP_UI_EDITOR_H

#include "ui/canvas.h"
#include <stdbool.h>
#include <stdint.h>

enum { EDITOR_MOST = 512 };

struct editor {
    char bytes[EDITOR_MOST];
    size_t length, cursor; /* bytes; the cursor stands on a character's first byte */
    bool touched;          /* something was typed since it was opened */
};

/* Opens with a text, the cursor behind it. */
void editor_open(struct editor *editor, const char *string);
/* Types a character or moves; false when the key means nothing here (Enter, Esc, Tab, up ...). */
bool editor_key(struct editor *editor, uint32_t key);
/* Draws it in `most` columns (scrolled so that the cursor shows) and places the canvas's cursor. */
void editor_draw(const struct editor *editor, struct canvas *canvas, int row, int column, int most,
                 int style);

#endif
