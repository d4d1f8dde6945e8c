/* The questions in the help row, and what the pages do with the answers. */
#ifndef SLABGAP_UI_APP_ASK_H
#define SLABGAP_UI_APP_ASK_H

#include "ui/app_state.h"

void ask_key(struct app *app, uint32_t key);
bool ask_has_text(enum ask ask); /* answered by typing */
void ask_words(const struct app *app, struct text *out);
void ask_save(struct app *app, const char *path, bool replace, bool leave);

/* page_plan.c */
const char *plan_kind_word(int kind);
void plan_next_kind(struct app *app, int step);
void plan_add_kind(struct app *app);
void plan_add(struct app *app);
void plan_cross_to(struct app *app);
void plan_point_words(double x, double y, char *out, size_t size);
const struct object *plan_object_under(const struct app *app);
bool plan_on_slab(const struct app *app);   /* whether the cross is */
int plan_line_under(const struct app *app); /* joint line under the cross, 0 = none */
double plan_reach(const struct app *app);   /* how near the cross counts as on it, m */

/* One length of a list; moves behind it and the comma. */
bool plan_read_coordinate(const char **string, const char *bare, double *out);

/* page_plan_line.c */
void plan_add_crack(struct app *app); /* from the cross through the points typed */
bool plan_crack_words(const struct app *app,
                      struct text *out); /* what the one under the cross means */
bool plan_take_crack(struct app *app);   /* false: there is no crack under the cross */
void plan_draw_line(struct app *app, const char *kind, bool level);
void plan_keep_line(struct app *app);       /* or lets a kept or drawn one go */
bool plan_line_kept(const struct app *app); /* a [joint] is under the cross */
bool plan_take_line(struct app *app);       /* false: there is no line under the cross */
void plan_keep_box(struct app *app, const struct object *object); /* or lets it go */
void plan_move_box(struct app *app, const struct object *object);
bool plan_move_words(const struct app *app, struct text *out); /* false: no line to move */
void plan_move_line(struct app *app);

/* page_rows.c */
bool page_no_key(struct app *app, uint32_t pressed);
bool page_row_of(const enum field_id *ids, int count, int index, struct entry *out);
const char *page_help_words(const struct app *app, struct text *words); /* of the row in hand */
/* A number with its unit in at most 15 bytes. */
void page_small(const struct app *app, char out[16], double si, enum quantity quantity);
void page_draw_rows(const struct app *app, struct canvas *canvas, int line, int label, int value);

/* page_seal_now.c */
void seal_take_measured(struct app *app);
bool seal_draw_now(const struct app *app, struct canvas *canvas, int at, int rows);

/* page_seal_view.c */
enum { SEAL_VIEW_WORK, SEAL_VIEW_WIDTHS, SEAL_VIEW_KINDS, SEAL_VIEWS };
void seal_draw_view(const struct app *app, struct canvas *canvas, int top, int rows);

/* page_cut.c */
void cut_fill(struct app *app);

/* page_year.c */
void year_fill(struct app *app);

#endif
