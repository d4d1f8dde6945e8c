#include "ui/terminal.h"
#include "base/utf8.h"
#include "file/file.h"
#include "ui/keys.h"
#include "ui/worker.h"
#include <curses.h>
#include <errno.h>
#include <langinfo.h>
#include <poll.h>
#include <signal.h>
#include <stdlib.h>
#include <string.h>
#include <sys/ioctl.h>
#include <time.h>
#include <unistd.h>

/* Signals arrive only inside ppoll, so a flag set there is always seen. */
static volatile sig_atomic_t told_to_end;

enum { PASTE_BEGINS = KEY_MAX + 1, PASTE_ENDS, BOUNCE_MS = 150 };
/* A plan that is ready within a frame is shown with the key that asked for it; progress is shown so
 * often. Under test every plan is waited for, so that a screen follows from the keys alone. */
enum { FRAME_MS = 16, PROGRESS_MS = 200, TEST_MS = 60000 };

struct terminal {
    SCREEN *screen;
    struct canvas canvas;
    struct app *app;
    bool ascii, colour, pasting, over, gone;
    sigset_t before; /* the mask while waiting */
    struct sigaction old_winch, old_hup, old_term;
    unsigned long events;
    bool count_events;
    uint32_t last_letter;
    long long last_ms;
    struct worker *worker; /* NULL: plans are made at once */
};

static void on_end(int signal_number)
{
    (void)signal_number;
    told_to_end = 1;
}

static void on_resize(int signal_number)
{
    (void)signal_number;
}

static void set_signals(struct terminal *terminal)
{
    struct sigaction action = {.sa_handler = on_end};
    sigset_t blocked;

    sigemptyset(&action.sa_mask);
    sigemptyset(&blocked);
    sigaddset(&blocked, SIGWINCH);
    sigaddset(&blocked, SIGHUP);
    sigaddset(&blocked, SIGTERM);
    sigprocmask(SIG_BLOCK, &blocked, &terminal->before);
    sigdelset(&terminal->before, SIGWINCH);
    sigdelset(&terminal->before, SIGHUP);
    sigdelset(&terminal->before, SIGTERM);
    sigaction(SIGHUP, &action, &terminal->old_hup);
    sigaction(SIGTERM, &action, &terminal->old_term);
}

static void set_colours(struct terminal *terminal)
{
    const char *none = getenv("NO_COLOR");

    terminal->colour = (none == NULL || none[0] == '\0') && has_colors();
    if (!terminal->colour)
        return;
    start_color();
    use_default_colors();
    init_pair(1, COLOR_GREEN, -1);
    init_pair(2, COLOR_YELLOW, -1);
    init_pair(3, COLOR_RED, -1);
}

/* Bracketed paste is asked for so that a paste is known as one, and then thrown away: pasted
 * letters would run through the pages. */
static void ask_for_paste(bool on)
{
    const char *words = on ? "\033[?2004h" : "\033[?2004l";

    define_key(on ? "\033[200~" : NULL, PASTE_BEGINS);
    define_key(on ? "\033[201~" : NULL, PASTE_ENDS);
    fputs(words, stdout);
    fflush(stdout);
}

static bool start(struct terminal *terminal)
{
    struct sigaction resize = {.sa_handler = on_resize};
    const char *term = getenv("TERM");

    set_signals(terminal);
    terminal->screen = newterm(NULL, stdout, stdin);
    if (terminal->screen == NULL) {
        fprintf(stderr,
                "slabgap: the terminal type '%s' is not known here; set TERM, for example "
                "TERM=xterm.\n",
                term != NULL ? term : "");
        return false;
    }
    set_term(terminal->screen);
    sigemptyset(&resize.sa_mask);
    sigaction(SIGWINCH, &resize, &terminal->old_winch);
    raw();
    noecho();
    nonl();
    keypad(stdscr, TRUE);
    nodelay(stdscr, TRUE);
    set_escdelay(25);
    set_colours(terminal);
    ask_for_paste(true);
    terminal->ascii = strcmp(nl_langinfo(CODESET), "UTF-8") != 0;
    terminal->count_events = getenv("SLABGAP_COUNT_EVENTS") != NULL;
    return true;
}

static void stop(struct terminal *terminal)
{
    if (terminal->screen != NULL) {
        ask_for_paste(false);
        curs_set(1);
        endwin();
        delscreen(terminal->screen);
        sigaction(SIGWINCH, &terminal->old_winch, NULL);
    }
    sigprocmask(SIG_SETMASK, &terminal->before, NULL); /* what is pending goes to our handler */
    if (terminal->gone)
        signal(SIGHUP, SIG_IGN); /* the hang-up's signal may come behind its end of input */
    else
        sigaction(SIGHUP, &terminal->old_hup, NULL);
    sigaction(SIGTERM, &terminal->old_term, NULL);
    canvas_free(&terminal->canvas);
}

/* ---- drawing ---- */

static attr_t attributes(unsigned style)
{
    attr_t result = A_NORMAL;

    if (style & STYLE_BOLD)
        result |= A_BOLD;
    if (style & STYLE_REVERSE)
        result |= A_REVERSE;
    if (style & STYLE_UNDERLINE)
        result |= A_UNDERLINE;
    return result;
}

static short pair_of(const struct terminal *terminal, unsigned style)
{
    if (!terminal->colour)
        return 0;
    return style & STYLE_GOOD ? 1 : style & STYLE_CARE ? 2 : style & STYLE_BAD ? 3 : 0;
}

static void put_cell(const struct terminal *terminal, int row, int column)
{
    const struct cell *cell = canvas_cell(&terminal->canvas, row, column);
    wchar_t words[2] = {(wchar_t)cell->code, L'\0'};
    cchar_t wide;

    if (cell->code == 0)
        return;
    setcchar(&wide, words, attributes(cell->style), pair_of(terminal, cell->style), NULL);
    mvadd_wch(row, column, &wide);
}

static bool fit_canvas(struct terminal *terminal)
{
    struct winsize size;
    int columns = COLS, rows = LINES;

    if (ioctl(STDOUT_FILENO, TIOCGWINSZ, &size) == 0 && size.ws_col > 0 && size.ws_row > 0) {
        columns = size.ws_col < CANVAS_MOST ? size.ws_col : CANVAS_MOST;
        rows = size.ws_row < CANVAS_MOST ? size.ws_row : CANVAS_MOST;
    }
    if (columns != COLS || rows != LINES)
        resize_term(rows, columns);
    if (terminal->canvas.columns == columns && terminal->canvas.rows == rows)
        return true;
    canvas_free(&terminal->canvas);
    app_resize(terminal->app, columns, rows);
    return canvas_make(&terminal->canvas, columns, rows, terminal->ascii);
}

static bool redraw(struct terminal *terminal)
{
    if (!fit_canvas(terminal))
        return false;
    app_draw(terminal->app, &terminal->canvas);
    erase();
    for (int row = 0; row < terminal->canvas.rows; row++)
        for (int column = 0; column < terminal->canvas.columns; column++)
            put_cell(terminal, row, column);
    if (terminal->canvas.cursor_row >= 0) {
        curs_set(1);
        move(terminal->canvas.cursor_row, terminal->canvas.cursor_column);
    } else {
        curs_set(0);
    }
    refresh();
    if (terminal->count_events) {
        printf("\033]7777;%lu\a", terminal->events);
        fflush(stdout);
    }
    return true;
}

/* ---- keys ---- */

static uint32_t pressed_of(int code, wint_t key)
{
    static const struct {
        wint_t key;
        uint32_t pressed;
    } table[] = {{KEY_UP, PRESS_UP},         {KEY_DOWN, PRESS_DOWN},       {KEY_LEFT, PRESS_LEFT},
                 {KEY_RIGHT, PRESS_RIGHT},   {KEY_HOME, PRESS_HOME},       {KEY_END, PRESS_END},
                 {KEY_PPAGE, PRESS_PAGE_UP}, {KEY_NPAGE, PRESS_PAGE_DOWN}, {KEY_ENTER, PRESS_ENTER},
                 {KEY_BTAB, PRESS_TAB_BACK}, {KEY_BACKSPACE, PRESS_RUB},   {KEY_DC, PRESS_DELETE}};

    if (code == KEY_CODE_YES) {
        for (size_t i = 0; i < sizeof table / sizeof *table; i++)
            if (table[i].key == key)
                return table[i].pressed;
        return KEY_NONE_PRESSED;
    }
    switch (key) {
    case '\r':
    case '\n':
        return PRESS_ENTER;
    case 27:
        return PRESS_BACK;
    case '\t':
        return PRESS_TAB;
    case 8:
    case 127:
        return PRESS_RUB;
    default:
        return key < 0x20 || key >= KEY_NONE_PRESSED ? KEY_NONE_PRESSED : (uint32_t)key;
    }
}

static long long now_ms(void)
{
    struct timespec now;

    clock_gettime(CLOCK_MONOTONIC, &now);
    return now.tv_sec * 1000LL + now.tv_nsec / 1000000;
}

/* A letter repeated within 150 ms is a glove resting on the key; digits never are. */
static bool is_bounce(struct terminal *terminal, uint32_t key)
{
    long long now = now_ms();
    bool letter = (key >= 'a' && key <= 'z') || (key >= 'A' && key <= 'Z');
    bool bounce = letter && key == terminal->last_letter && now - terminal->last_ms < BOUNCE_MS &&
                  !app_takes_text(terminal->app);

    terminal->last_letter = letter ? key : 0;
    terminal->last_ms = now;
    return bounce;
}

static void take_key(struct terminal *terminal, int code, wint_t key)
{
    uint32_t pressed = pressed_of(code, key);

    if (code == KEY_CODE_YES && (key == PASTE_BEGINS || key == PASTE_ENDS)) {
        terminal->pasting = key == PASTE_BEGINS;
        if (terminal->pasting)
            app_say(terminal->app, "Pasted text is not taken; type the value.");
        return;
    }
    if (terminal->pasting || (code == KEY_CODE_YES && key == KEY_RESIZE))
        return;
    if (code != KEY_CODE_YES && key == 3) { /* Ctrl-C ends nothing unsaved: say how to leave */
        app_say(terminal->app, "To leave: m, then Leave, Enter.");
        return;
    }
    if (pressed != KEY_NONE_PRESSED && !is_bounce(terminal, pressed))
        app_key(terminal->app, pressed);
}

/* ---- requests ---- */

static void clock_words(char out[8])
{
    time_t now = time(NULL);
    struct tm parts;

    out[0] = '\0';
    if (localtime_r(&now, &parts) != NULL)
        strftime(out, 8, "%H:%M", &parts);
}

static void save(struct terminal *terminal, const struct request *request)
{
    struct text bytes = {0}, old = {0}, words = {0};
    enum status status;
    char clock[8];

    status = request->replace ? STATUS_NO_FILE : file_read(request->path, &old);
    if (status == STATUS_OK && old.length > 0) {
        app_ask_replace(terminal->app, request);
    } else {
        app_write(terminal->app, &bytes);
        status = bytes.failed ? STATUS_NO_MEMORY
                              : file_replace(request->path, text_string(&bytes), bytes.length);
        if (status == STATUS_OK) {
            clock_words(clock);
            app_saved(terminal->app, request->path, clock);
            terminal->over = request->leave;
        } else {
            file_explain(&words, request->path, status);
            app_say(terminal->app, text_string(&words));
        }
    }
    text_free(&bytes);
    text_free(&old);
    text_free(&words);
}

static void open_file(struct terminal *terminal, const char *path)
{
    struct text bytes = {0}, words = {0};
    enum status status = file_read(path, &bytes);

    if (status == STATUS_OK) {
        app_load(terminal->app, text_string(&bytes), bytes.length, path, false);
    } else {
        file_explain(&words, path, status);
        app_say(terminal->app, text_string(&words));
    }
    text_free(&bytes);
    text_free(&words);
}

static void serve(struct terminal *terminal)
{
    struct request request;

    while (!terminal->over && app_take_request(terminal->app, &request)) {
        if (request.kind == REQUEST_SAVE)
            save(terminal, &request);
        else if (request.kind == REQUEST_OPEN)
            open_file(terminal, request.path);
        else
            terminal->over = true;
    }
}

/* ---- plans from the worker ---- */

static bool begin_plan(void *context, const struct job *job, struct plan *plan, enum status *status)
{
    struct terminal *terminal = context;
    int patience = terminal->count_events ? TEST_MS : FRAME_MS;

    return worker_begin(terminal->worker, job, patience, status) &&
           worker_take(terminal->worker, plan, status);
}

static void stop_plan(void *context)
{
    worker_stop(((struct terminal *)context)->worker);
}

static double share_of_plan(void *context)
{
    return worker_share(((struct terminal *)context)->worker);
}

static void start_worker(struct terminal *terminal)
{
    const struct plan_maker maker = {begin_plan, stop_plan, share_of_plan, terminal};

    terminal->worker = worker_make();
    if (terminal->worker != NULL)
        app_set_maker(terminal->app, &maker);
}

static void stop_worker(struct terminal *terminal)
{
    const struct plan_maker none = {0};

    app_set_maker(terminal->app, &none);
    worker_free(terminal->worker);
}

static void take_plan(struct terminal *terminal)
{
    struct plan plan;
    enum status status;

    if (worker_take(terminal->worker, &plan, &status))
        app_take_plan(terminal->app, &plan, status);
}

/* ---- the loop ---- */

static bool take_keys(struct terminal *terminal)
{
    wint_t key;
    int code;
    bool any = false;

    while (!terminal->over && (code = get_wch(&key)) != ERR) {
        any = true;
        terminal->events++;
        take_key(terminal, code, key);
        serve(terminal);
    }
    return any;
}

/* Waits for a key, a resize, a plan, the next look at its progress, or the end. False: the terminal
 * is gone. */
static bool wait_event(struct terminal *terminal)
{
    const struct timespec progress = {0, PROGRESS_MS * 1000000L};
    struct pollfd events[2] = {{.fd = STDIN_FILENO, .events = POLLIN},
                               {.fd = -1, .events = POLLIN}};
    bool working = app_working(terminal->app);
    int ready;

    if (working)
        events[1].fd = worker_descriptor(terminal->worker);
    ready = ppoll(events, 2, working ? &progress : NULL, &terminal->before);
    if (told_to_end)
        return false;
    if (ready < 0) {
        terminal->events++;
        return errno == EINTR;
    }
    if (events[1].revents & POLLIN)
        take_plan(terminal);
    if (events[0].revents & POLLIN)
        return take_keys(terminal) || (events[0].revents & (POLLHUP | POLLERR | POLLNVAL)) == 0;
    return (events[0].revents & (POLLHUP | POLLERR | POLLNVAL)) == 0;
}

/* End of input looks like readable with nothing to read; ncurses reports no key for it. */
static bool at_end_of_input(void)
{
    int waiting = 0;
    struct pollfd input = {.fd = STDIN_FILENO, .events = POLLIN};

    return poll(&input, 1, 0) == 1 && (input.revents & POLLIN) != 0 &&
           ioctl(STDIN_FILENO, FIONREAD, &waiting) == 0 && waiting == 0;
}

int terminal_run(struct app *app)
{
    struct terminal terminal = {.app = app};

    told_to_end = 0;
    if (!start(&terminal)) {
        stop(&terminal);
        return 2;
    }
    start_worker(&terminal);
    while (!terminal.over && redraw(&terminal)) {
        terminal.gone = !wait_event(&terminal) || at_end_of_input();
        if (terminal.gone)
            break;
    }
    stop_worker(&terminal);
    stop(&terminal);
    return 0;
}
