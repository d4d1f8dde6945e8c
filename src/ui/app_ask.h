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

/* page_buy.c: the other widths, by plans of their own */
void buy_fill(struct app *app);

#endif
