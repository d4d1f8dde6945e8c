/* Inside of the form, shared by its pages. */
#ifndef SLABGAP_UI_APP_STATE_H
#define SLABGAP_UI_APP_STATE_H

#include "job/document.h"
#include "job/field.h"
#include "plan/plan.h"
#include "plan/saw_band.h"
#include "plan/year.h"
#include "ui/app.h"
#include "ui/editor.h"
#include "ui/history.h"
#include "ui/keys.h"
#include "ui/own.h"

enum page_id {
    PAGE_JOB,
    PAGE_PLAN,
    PAGE_CUT,
    PAGE_SEAL,
    PAGE_BUY,
    PAGE_WHY,
    PAGE_YEAR,
    PAGE_MORE,
    PAGE_REST,
    PAGE_SIDES,
    PAGE_OWN,
    PAGE_HELP,
    PAGE_CAUTIONS,
    PAGE_COUNT
};

/* How a row's text maps to fields; most are one field. */
enum row_kind {
    ROW_FIELD, /* `path` and `field` */
    ROW_SHAPE,
    ROW_STANDS,
    ROW_TOUCHES,
    ROW_YEAR,      /* two temperatures: "-8 to 40 °C" */
    ROW_STARTS,    /* pour date and clock time */
    ROW_SLAB_THEN, /* sealing temperature and date */
    ROW_GOOD_FOR,  /* class and kind */
    ROW_DRYING,    /* mm a metre */
    ROW_REST,
    ROW_HEADING
};
struct entry {
    enum row_kind kind;
    const struct field *field; /* the first one, NULL for none */
    enum field_id id;          /* FIELD_COUNT: a field of a named section */
    enum field_id second;      /* of a pair, else FIELD_COUNT */
    char path[64];
    char label[40];
    const char *group, *help;
    bool guess, roomy_only;
};

/* A sentence with an answer wanted, in the help row. */
enum ask {
    ASK_NONE,
    ASK_EXAMPLE,
    ASK_OPEN,
    ASK_SAVE,
    ASK_REPLACE,
    ASK_LEAVE,
    ASK_DISCARD,
    ASK_FIND,
    ASK_ADD_KIND,
    ASK_ADD_SIZE,
    ASK_MOVE,
    ASK_CRACK,
    ASK_MEASURED,
    ASK_CROSS
};

enum open_as { OPEN_NOT, OPEN_TEXT, OPEN_CHOICE };
enum { WORDS_MOST = 256, OPENED_MOST = 32 };

struct app {
    struct date today;
    int columns, rows;
    struct document *document;
    struct job job;          /* settled, from the document */
    struct plan plan;        /* the last good one */
    int seal_view;           /* what the page seal shows below its answers */
    struct plan_cache cache; /* of plans the form makes itself */
    struct plan_maker maker;
    struct weather_source source;
    struct { /* the weather file as it was last read */
        char name[TITLE_MOST], job_path[PATH_MOST];
        struct weather *record; /* NULL: none, or refused */
        struct finding_list findings;
    } weather;
    bool working;                 /* a plan is being made elsewhere */
    bool has_plan, stale;         /* stale: the document asks for something that was refused */
    struct finding_list findings; /* of the document as it stands */
    struct history history;
    char path[PATH_MOST], saved[8];
    char new_path[PATH_MOST]; /* of a file that is not there yet: the own slab goes there */
    bool example, asked_example;

    enum page_id page, before;
    int at[PAGE_COUNT]; /* the row in hand; on the job page -1 = the title */
    enum open_as open;
    struct entry row;     /* the opened one */
    struct editor editor; /* of the row or of the question */
    int choice;
    bool filling;     /* begun by a digit: arrows move in the text */
    char trouble[16]; /* at most 14 cells beside the row */
    unsigned opened;  /* guess rows looked at, by sheet index */

    enum ask ask;
    char held[EDITOR_MOST]; /* what the question keeps: a text, a path */
    struct request request;
    char said[WORDS_MOST], change[WORDS_MOST];
    bool show_change;

    double cross_x, cross_y, zoom; /* plan page */
    int add_kind;
    char under[WORDS_MOST];
    int why_question;
    char why_path[64];
    char measured[EDITOR_MOST]; /* at the joint, as typed; not of the job */
    struct year *year;          /* of the plan; NULL: none */
    bool year_done;             /* tried for this plan */
    int year_day;               /* the mark, a day of it */
    struct saw_band band;       /* of the night, for the plan */
    bool band_done, has_band;
    bool cut_fields; /* the page cut shows what the night hangs on */
    struct own own;
};

struct page {
    const char *word;
    int (*count)(const struct app *app);                              /* rows to move over */
    bool (*row)(const struct app *app, int index, struct entry *row); /* false: no row to fill in */
    void (*draw)(const struct app *app, struct canvas *canvas);
    bool (*key)(struct app *app, uint32_t key); /* its own keys; false: not mine */
};
const struct page *page_of(enum page_id id);
extern const struct page page_job, page_plan, page_cut, page_seal, page_buy, page_why, page_year,
    page_more, page_rest, page_sides, page_own, page_help, page_cautions;

/* ---- app_edit.c: changing the document ---- */
struct change_item {
    char path[64];
    char value[EDITOR_MOST];
};
/* All or nothing; on refusal the reason is said and false returned. `words` says it for people. */
bool edit_change(struct app *app, const struct change_item *items, size_t count, const char *words);
bool edit_replace(struct app *app, const char *bytes, size_t count, const char *path, bool example,
                  const char *words);
void edit_undo(struct app *app, int step); /* -1 undo, 1 redo */
const char *edit_first_error(const struct finding_list *findings);
void edit_recompute(struct app *app);
void edit_stop(struct app *app); /* of a plan that is being made */
/* ---- app_weather.c ---- */
/* Gives the job the record it names, read anew only when the name or the job's place is another.
 * STATUS_REFUSED: it cannot be used, the findings of the form say why. */
enum status weather_attach(struct app *app, struct job *job);
void weather_drop(struct app *app); /* the next job reads its file anew */
/* ---- page_cut.c ---- */
void cut_drop(struct app *app); /* the night shown is of an older plan */
/* ---- page_year.c ---- */
void year_drop(struct app *app); /* the year shown is of an older plan */
/* Whether there is something not saved. */
bool edit_unsaved(const struct app *app);

/* ---- sheet.c: the rows of the first screen ---- */
int sheet_count(void);
void sheet_row(int index, struct entry *row);
void row_of_field(enum field_id id, struct entry *row);
void row_show(const struct app *app, const struct entry *row, struct text *out);
const char *row_whose(const struct app *app, const struct entry *row);
/* The text an opened row starts with. */
void row_text(const struct app *app, const struct entry *row, struct text *out);
/* Makes the change a text means; false when refused (said, and app->trouble). */
bool row_apply(struct app *app, const struct entry *row, const char *string);
bool row_is_choice(const struct entry *row);
void row_help(const struct app *app, const struct entry *row, struct text *out);

void row_path_of(const struct field *field, char out[64]);
bool row_given(const struct app *app, const struct entry *row);
unsigned row_bit(const struct entry *row); /* its bit in app->opened; 0: none */
void row_show_year(const struct app *app, const struct entry *row, struct text *out);
const char *month_word(int month);

/* ---- app_row.c: an opened row ---- */
bool row_has_own_page(struct app *app, const struct entry *row); /* and goes there */
void row_key(struct app *app, uint32_t key);

/* ---- app.c ---- */
void app_move(struct app *app, int step); /* to the next row that can be stood on */
void app_go(struct app *app, enum page_id page);
void app_open_row(struct app *app, const struct entry *row, uint32_t first);
void app_ask(struct app *app, enum ask ask, const char *start);
__attribute__((format(printf, 2, 3))) void app_tell(struct app *app, const char *format, ...);
bool app_roomy(const struct app *app);
enum unit_system app_units(const struct app *app);
void app_goto_field(struct app *app, const char *path);

/* ---- app_draw.c: what pages share ---- */
void draw_title(const struct app *app, struct canvas *canvas, bool in_hand);
void draw_foot(const struct app *app, struct canvas *canvas, const char *help);
/* One row to fill in: label, value, whose. Widths in columns. */
struct row_place {
    int row, column, label, value, whose;
};
void draw_row(const struct app *app, struct canvas *canvas, const struct entry *row, bool in_hand,
              struct row_place place);
/* The answers from `first` on, `lines` lines each; returns the rows used. */
int draw_answers(const struct app *app, struct canvas *canvas, int row, size_t first, size_t last,
                 int lines);
void draw_plan(const struct app *app, struct canvas *canvas, int row, int column, int rows,
               int columns, bool cross);
void draw_size(const struct app *app, struct text *out, double si, enum quantity quantity);
int verdict_style(enum verdict verdict);
/* First of `count` lines shown in a window so that `at` is inside. */
int draw_scroll(int count, int window, int at);

#endif
