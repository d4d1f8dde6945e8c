/* What the pages of the work share: rows of fields, their help. */
#include "ui/app_ask.h"
#include <stdio.h>

bool page_no_key(struct app *app, uint32_t pressed)
{
    (void)app;
    (void)pressed;
    return false;
}

bool page_row_of(const enum field_id *ids, int count, int index, struct entry *out)
{
    if (index < 0 || index >= count)
        return false;
    row_of_field(ids[index], out);
    return true;
}

const char *page_help_words(const struct app *app, struct text *words)
{
    struct entry entry;

    if (page_of(app->page)->row(app, app->at[app->page], &entry))
        row_help(app, &entry, words);
    return text_string(words);
}

void page_draw_rows(const struct app *app, struct canvas *canvas, int line, int label, int value)
{
    struct entry entry;

    for (int i = 0; i < page_of(app->page)->count(app); i++)
        if (page_of(app->page)->row(app, i, &entry) && line + i < app->rows - 3)
            draw_row(app, canvas, &entry, app->at[app->page] == i,
                     (struct row_place){line + i, 1, label, value, 6});
}

void page_small(const struct app *app, char out[16], double si, enum quantity quantity)
{
    struct text words = {0};

    draw_size(app, &words, si, quantity);
    snprintf(out, 16, "%.15s", text_string(&words));
    text_free(&words);
}
