/* The form in a pseudo-terminal read by libvterm: every cell of the terminal against the canvas of
 * a second app that got the same keys. The program tells in band how many events it has handled;
 * the harness waits for that count, never for time, and kills at a deadline. Run in the project's
 * folder; TERMINFO_FOLDER holds the private terminal type. */
#include <setjmp.h>
#include <stdarg.h>
#include <stddef.h>
#include <stdint.h>
#include <cmocka.h>

#include "base/utf8.h"
#include "ui/terminal.h"
#include "ui/ui_help.h"
#include <errno.h>
#include <locale.h>
#include <poll.h>
#include <pty.h>
#include <signal.h>
#include <sys/ioctl.h>
#include <sys/wait.h>
#include <termios.h>
#include <time.h>
#include <unistd.h>
#include <vterm.h>

enum { DEADLINE_MS = 20000 };

struct harness {
    pid_t child;
    int master;
    VTerm *vterm;
    VTermScreen *screen;
    long seen; /* events the program says it has handled; -1: none yet */
    long sent;
    struct app *app; /* the second app */
    int columns, rows;
    bool closed, colour;
};

static long long now_ms(void)
{
    struct timespec now;

    clock_gettime(CLOCK_MONOTONIC, &now);
    return now.tv_sec * 1000LL + now.tv_nsec / 1000000;
}

static int on_osc(const char *command, size_t length, void *user)
{
    struct harness *harness = user;
    char words[64];

    if (length > 5 && length < sizeof words && strncmp(command, "7777;", 5) == 0) {
        memcpy(words, command + 5, length - 5);
        words[length - 5] = '\0';
        harness->seen = strtol(words, NULL, 10);
        return 1;
    }
    return 0;
}

static const VTermParserCallbacks fallbacks = {.osc = on_osc};

static int run_child(const char *term)
{
    struct app *app;
    int code;

    setenv("TERM", term, 1);
    setenv("TERMINFO", TERMINFO_FOLDER, 1);
    setenv("SLABGAP_COUNT_EVENTS", "1", 1);
    setlocale(LC_CTYPE, "");
    app = open_example(true);
    code = app != NULL ? terminal_run(app) : 99;
    app_free(app);
    return code;
}

static void start_with(struct harness *harness, int columns, int rows, const char *term,
                       const char *no_color, const char *locale)
{
    struct winsize size = {.ws_row = (unsigned short)rows, .ws_col = (unsigned short)columns};

    *harness = (struct harness){.seen = -1, .columns = columns, .rows = rows};
    setenv("LC_ALL", locale, 1);
    if (no_color != NULL)
        setenv("NO_COLOR", no_color, 1);
    else
        unsetenv("NO_COLOR");
    harness->colour = no_color == NULL;
    harness->child = forkpty(&harness->master, NULL, NULL, &size);
    assert_true(harness->child >= 0);
    if (harness->child == 0)
        _exit(run_child(term));
    harness->vterm = vterm_new(rows, columns);
    vterm_set_utf8(harness->vterm, 1);
    harness->screen = vterm_obtain_screen(harness->vterm);
    vterm_screen_enable_altscreen(harness->screen, 1);
    vterm_screen_set_unrecognised_fallbacks(harness->screen, &fallbacks, harness);
    vterm_screen_reset(harness->screen, 1);
    harness->app = open_example(true);
    app_resize(harness->app, columns, rows);
}

static void start(struct harness *harness, int columns, int rows)
{
    start_with(harness, columns, rows, "slabgap-term", NULL, "C.UTF-8");
}

static void stop(struct harness *harness)
{
    app_free(harness->app);
    if (harness->vterm != NULL)
        vterm_free(harness->vterm);
    if (harness->master > 0)
        close(harness->master);
    if (harness->child > 0) {
        kill(harness->child, SIGKILL);
        waitpid(harness->child, NULL, 0);
    }
}

/* Reads what the program wrote; hands the terminal's answers back. */
static void pump(struct harness *harness, int wait_ms)
{
    struct pollfd input = {.fd = harness->master, .events = POLLIN};
    char bytes[4096];
    ssize_t count;

    if (poll(&input, 1, wait_ms) <= 0)
        return;
    count = read(harness->master, bytes, sizeof bytes);
    if (count <= 0) {
        harness->closed = true;
        return;
    }
    vterm_input_write(harness->vterm, bytes, (size_t)count);
    count = (ssize_t)vterm_output_read(harness->vterm, bytes, sizeof bytes);
    if (count > 0)
        assert_int_equal(write(harness->master, bytes, (size_t)count), count);
}

static void wait_for(struct harness *harness, long events)
{
    long long end = now_ms() + DEADLINE_MS;

    while (harness->seen < events && !harness->closed && now_ms() < end)
        pump(harness, 100);
    assert_true(harness->seen >= events);
}

/* The bytes a terminal sends for a key of the tests. */
static const char *bytes_of(char c, char out[2])
{
    switch (c) {
    case '^':
        return "\033";
    case '~':
        return "\r";
    case '<':
        return "\033OD";
    case '>':
        return "\033OC";
    case '(':
        return "\033OA";
    case ')':
        return "\033OB";
    case '\b':
        return "\177";
    default:
        out[0] = c;
        out[1] = '\0';
        return out;
    }
}

static void send_keys(struct harness *harness, const char *keys)
{
    for (; *keys != '\0'; keys++) {
        char one[2];
        const char *bytes = bytes_of(*keys, one);
        assert_int_equal(write(harness->master, bytes, strlen(bytes)), (ssize_t)strlen(bytes));
        wait_for(harness, ++harness->sent);
        app_key(harness->app, test_key(*keys));
    }
}

static bool cell_agrees(const struct harness *harness, const struct canvas *canvas, int row,
                        int column)
{
    const struct cell *cell = canvas_cell(canvas, row, column);
    VTermPos place = {.row = row, .col = column};
    VTermScreenCell there;
    uint32_t code;

    vterm_screen_get_cell(harness->screen, place, &there);
    code = there.chars[0] == 0 ? ' ' : there.chars[0];
    if (cell->code == 0)
        return there.chars[0] == (uint32_t)-1;
    return code == cell->code && there.attrs.bold == ((cell->style & STYLE_BOLD) != 0) &&
           there.attrs.reverse == ((cell->style & STYLE_REVERSE) != 0) &&
           (there.attrs.underline != 0) == ((cell->style & STYLE_UNDERLINE) != 0);
}

static void compare(struct harness *harness, bool ascii)
{
    struct canvas canvas = {0};
    int wrong = 0;

    assert_true(canvas_make(&canvas, harness->columns, harness->rows, ascii));
    app_draw(harness->app, &canvas);
    for (int row = 0; row < harness->rows; row++)
        for (int column = 0; column < harness->columns; column++)
            if (!cell_agrees(harness, &canvas, row, column) && wrong++ < 5)
                fprintf(stderr, "cell %d,%d differs\n", row, column);
    canvas_free(&canvas);
    assert_int_equal(wrong, 0);
}

static void test_session(void **state)
{
    static const char *const steps[] = {"",  ")~", ">~", "(180", "^", "p", ">>)a",  "~~", "c",  "s",
                                        "b", "w",  ")",  "m",    ")", "j", "fric~", "n",  "~>~"};
    struct harness harness;

    (void)state;
    start(&harness, 80, 24);
    wait_for(&harness, 0);
    for (size_t i = 0; i < sizeof steps / sizeof *steps; i++) {
        send_keys(&harness, steps[i]);
        compare(&harness, false);
    }
    stop(&harness);
}

static void test_roomy(void **state)
{
    struct harness harness;

    (void)state;
    start(&harness, 120, 40);
    wait_for(&harness, 0);
    compare(&harness, false);
    send_keys(&harness, "p>z");
    compare(&harness, false);
    stop(&harness);
}

static void resize(struct harness *harness, int columns, int rows)
{
    struct winsize size = {.ws_row = (unsigned short)rows, .ws_col = (unsigned short)columns};

    vterm_set_size(harness->vterm, rows, columns);
    harness->columns = columns;
    harness->rows = rows;
    assert_int_equal(ioctl(harness->master, TIOCSWINSZ, &size), 0);
    wait_for(harness, ++harness->sent);
    app_resize(harness->app, columns, rows);
}

static void test_resize(void **state)
{
    static const int sizes[][2] = {{120, 40}, {60, 16}, {40, 10}, {80, 24}, {100, 30}, {61, 17}};
    struct harness harness;

    (void)state;
    start(&harness, 80, 24);
    wait_for(&harness, 0);
    send_keys(&harness, ")~");
    for (size_t i = 0; i < sizeof sizes / sizeof *sizes; i++) {
        resize(&harness, sizes[i][0], sizes[i][1]);
        compare(&harness, false);
    }
    stop(&harness);
}

static void test_ascii_without_colour(void **state)
{
    struct harness harness;

    (void)state;
    start_with(&harness, 80, 24, "slabgap-term", "1", "C");
    wait_for(&harness, 0);
    compare(&harness, true);
    send_keys(&harness, "s");
    compare(&harness, true);
    for (int row = 0; row < 24; row++)
        for (int column = 0; column < 80; column++) {
            VTermScreenCell cell;
            vterm_screen_get_cell(harness.screen, (VTermPos){.row = row, .col = column}, &cell);
            assert_true(VTERM_COLOR_IS_DEFAULT_FG(&cell.fg));
        }
    stop(&harness);
}

/* A paste is thrown away as a whole; the keys behind it count. */
static void test_paste_is_ignored(void **state)
{
    static const char paste[] = "\033[200~mq0099\rxyz\033[201~";
    struct harness harness;

    (void)state;
    start(&harness, 80, 24);
    wait_for(&harness, 0);
    assert_int_equal(write(harness.master, paste, strlen(paste)), (ssize_t)strlen(paste));
    harness.sent += (long)strlen("mq0099\rxyz") + 2;
    wait_for(&harness, harness.sent);
    app_say(harness.app, "Pasted text is not taken; type the value.");
    compare(&harness, false);
    send_keys(&harness, "p");
    compare(&harness, false);
    stop(&harness);
}

/* Waits for the child's end; -1 when it did not end by itself. */
static int end_of(struct harness *harness)
{
    long long end = now_ms() + DEADLINE_MS;
    int status = 0;

    while (now_ms() < end) {
        if (waitpid(harness->child, &status, WNOHANG) == harness->child) {
            harness->child = 0;
            return WIFEXITED(status) ? WEXITSTATUS(status) : -2;
        }
        if (!harness->closed)
            pump(harness, 20);
    }
    return -1;
}

static void test_leave_restores(void **state)
{
    struct harness harness;
    struct termios before, after;

    (void)state;
    start(&harness, 80, 24);
    assert_int_equal(tcgetattr(harness.master, &before), 0);
    wait_for(&harness, 0);
    send_keys(&harness, "m))))))))))");
    assert_int_equal(write(harness.master, "\r", 1), 1);
    assert_int_equal(end_of(&harness), 0);
    if (tcgetattr(harness.master, &after) == 0)
        assert_true((after.c_lflag & (ICANON | ECHO)) == (before.c_lflag & (ICANON | ECHO)) ||
                    (after.c_lflag & (ICANON | ECHO)) == (ICANON | ECHO));
    stop(&harness);
}

static void test_signals_end(void **state)
{
    static const int signals[] = {SIGHUP, SIGTERM};

    (void)state;
    for (size_t i = 0; i < 2; i++) {
        struct harness harness;
        struct termios after;
        start(&harness, 80, 24);
        wait_for(&harness, 0);
        kill(harness.child, signals[i]);
        assert_int_equal(end_of(&harness), 0);
        if (tcgetattr(harness.master, &after) == 0)
            assert_int_equal(after.c_lflag & (ICANON | ECHO), ICANON | ECHO);
        stop(&harness);
    }
}

static void test_hangup_ends(void **state)
{
    struct harness harness;

    (void)state;
    start(&harness, 80, 24);
    wait_for(&harness, 0);
    close(harness.master);
    harness.master = -1;
    harness.closed = true;
    assert_int_equal(end_of(&harness), 0);
    stop(&harness);
}

static void test_unknown_terminal(void **state)
{
    struct harness harness;

    (void)state;
    start_with(&harness, 80, 24, "no-such-terminal", NULL, "C.UTF-8");
    assert_int_equal(end_of(&harness), 2);
    stop(&harness);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(test_session),          cmocka_unit_test(test_roomy),
        cmocka_unit_test(test_resize),           cmocka_unit_test(test_ascii_without_colour),
        cmocka_unit_test(test_paste_is_ignored), cmocka_unit_test(test_leave_restores),
        cmocka_unit_test(test_signals_end),      cmocka_unit_test(test_hangup_ends),
        cmocka_unit_test(test_unknown_terminal),
    };

    signal(SIGPIPE, SIG_IGN);
    return cmocka_run_group_tests(tests, NULL, NULL);
}
