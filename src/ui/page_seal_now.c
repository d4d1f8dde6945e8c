/* What was measured at the joint, typed as one line, and the judgement of it on the seal page. */
#include "export/seal_text.h"
#include "ui/app_ask.h"
#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

/* Words of the line; numbers come in the order slab, width, air, damp. */
static bool take_word(const char *word, size_t length, struct seal_now_input *input)
{
    static const struct {
        const char *word;
        int trend, dry, clean;
    } words[] = {{"rising", TREND_RISING, -1, -1},
                 {"steady", TREND_STEADY, -1, -1},
                 {"falling", TREND_FALLING, -1, -1},
                 {"dry", -1, 1, -1},
                 {"wet", -1, 0, -1},
                 {"clean", -1, -1, 1},
                 {"dirty", -1, -1, 0}};

    for (size_t i = 0; i < sizeof words / sizeof *words; i++) {
        if (length < 2 || length > strlen(words[i].word) ||
            strncmp(words[i].word, word, length) != 0)
            continue;
        if (words[i].trend >= 0)
            input->trend = (enum trend)words[i].trend;
        if (words[i].dry >= 0)
            input->dry = words[i].dry;
        if (words[i].clean >= 0)
            input->clean = words[i].clean;
        return true;
    }
    return false;
}

static bool take_number(const struct app *app, const char *word, size_t length, int place,
                        struct seal_now_input *input)
{
    static const enum quantity quantities[] = {QUANTITY_TEMPERATURE, QUANTITY_SMALL_LENGTH,
                                               QUANTITY_TEMPERATURE, QUANTITY_RATIO};
    static const double least[] = {-40, 0.001, -40, 0.01}, most[] = {72, 0.1, 55, 1};
    double *into[] = {&input->slab_c, &input->width_m, &input->air_c, &input->humidity};
    struct unit_reading reading;

    if (place > 3)
        return false;
    reading =
        unit_read(word, length, quantities[place], unit_name(quantities[place], app_units(app)));
    if (place == 3 && !reading.has_unit) { /* bare: per cent */
        reading = unit_read_number(word, length);
        reading.si /= reading.si > 1 ? 100 : 1;
    }
    *into[place] = reading.si;
    return reading.problem == NULL && reading.length == length && reading.si >= least[place] &&
           reading.si <= most[place];
}

/* "15 9.5 12 70 rising dry clean"; false with what is wrong. */
static bool read_line(const struct app *app, const char *line, struct seal_now_input *input,
                      struct text *trouble)
{
    int place = 0;

    seal_now_input_clear(input);
    while (line[strspn(line, " ,")] != '\0') {
        size_t length;
        line += strspn(line, " ,");
        length = strcspn(line, " ,");
        if (line[0] >= 'a' && line[0] <= 'z') {
            if (!take_word(line, length, input)) {
                text_format(trouble,
                            "'%.*s': the words are rising, steady, falling, dry, wet, clean, "
                            "dirty.",
                            (int)length, line);
                return false;
            }
        } else if (!take_number(app, line, length, place++, input)) {
            text_format(trouble, "'%.*s': numbers in this order: slab, width, air, damp in %%.",
                        (int)length, line);
            return false;
        }
        line += length;
    }
    if (isnan(input->slab_c))
        text_add(trouble, "Type the slab's temperature first.");
    return isfinite(input->slab_c);
}

void seal_take_measured(struct app *app)
{
    struct seal_now_input input;
    struct text trouble = {0};

    if (read_line(app, app->editor.bytes, &input, &trouble))
        snprintf(app->measured, sizeof app->measured, "%s", app->editor.bytes);
    else
        app_tell(app, "%s", text_string(&trouble));
    text_free(&trouble);
}

/* The judgement in up to `rows` lines; false when nothing was measured yet. */
bool seal_draw_now(const struct app *app, struct canvas *canvas, int at, int rows)
{
    struct seal_now_input input;
    struct seal_now now;
    struct text words = {0};
    bool drawn = false;

    if (app->measured[0] != '\0' && app->has_plan &&
        read_line(app, app->measured, &input, &words) &&
        seal_now_judge(&app->plan, &input, &now) == STATUS_OK) {
        text_clear(&words);
        seal_now_headline(&words, &app->plan, &now);
        for (size_t i = 1; i < now.against_count; i++)
            text_format(&words, " Also: %s", now.against[i]);
        if (now.unknown_count > 0) {
            text_add(&words, " Not looked at: ");
            for (size_t i = 0; i < now.unknown_count; i++)
                text_format(&words, "%s%s", i > 0 ? ", " : "", now.unknown[i]);
            text_add(&words, ".");
        }
        canvas_words(canvas, at, 0, 8, STYLE_BOLD, "NOW");
        canvas_wrap(canvas, at, 8, app->columns - 8, rows,
                    now.go ? STYLE_BOLD | STYLE_GOOD : STYLE_BOLD | STYLE_BAD, text_string(&words));
        drawn = true;
    }
    text_free(&words);
    return drawn;
}
