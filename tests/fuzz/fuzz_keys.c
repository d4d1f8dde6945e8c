/* Keys and sizes on the pure form: never crashes, the canvas stays in bounds.
 *   clang -fsanitize=fuzzer,address,undefined ... tests/fuzz/fuzz_keys.c
 * Each input byte is one key; bytes from 0xE0 take the next two as a new size. */
#include "ui/app.h"
#include "ui/keys.h"
#include <stdlib.h>

int LLVMFuzzerTestOneInput(const uint8_t *bytes, size_t count);

static const char job[] = "format = 1\n[job]\ntitle = Bay\n[slab]\nuse = yard\nthickness = 200 mm\n"
                          "[outline]\npoint = 0, 0 m\npoint = 12, 0 m\npoint = 12, 8 m\n"
                          "point = 0, 8 m\n";

static void look(const struct app *app, int columns, int rows)
{
    struct canvas canvas = {0};

    if (!canvas_make(&canvas, columns, rows, columns % 2 == 0))
        return;
    app_draw(app, &canvas);
    if (canvas.cursor_row >= canvas.rows || canvas.cells == NULL)
        abort();
    canvas_free(&canvas);
}

int LLVMFuzzerTestOneInput(const uint8_t *bytes, size_t count)
{
    struct app *app = app_make((struct date){2027, 4, 11});
    struct request request;
    int columns = 80, rows = 24;

    if (app == NULL)
        return 0;
    app_load(app, job, sizeof job - 1, NULL, count % 2 == 0);
    for (size_t i = 0; i < count && i < 400; i++) {
        if (bytes[i] >= 0xE0 && i + 2 < count) {
            columns = 1 + bytes[i + 1] % 160;
            rows = 1 + bytes[i + 2] % 60;
            app_resize(app, columns, rows);
            i += 2;
        } else {
            app_key(app, bytes[i] < 0x10 ? PRESS_UP + bytes[i] % 14u : bytes[i]);
        }
        app_take_request(app, &request);
        if (i % 4 == 0)
            look(app, columns, rows);
    }
    look(app, columns, rows);
    app_free(app);
    return 0;
}
