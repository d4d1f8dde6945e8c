/* The terminal: the only curses. Draws the app's canvas, hands it keys, carries out its requests.
 */
#ifndef SLABGAP_UI_TERMINAL_H
#define SLABGAP_UI_TERMINAL_H

#include "ui/app.h"

/* Runs the app until it leaves, the terminal goes away (HUP, end of input) or TERM arrives. The
 * terminal is as it was afterwards. Returns the exit status: 0, or 2 with one sentence on standard
 * error when TERM is unknown. With SLABGAP_COUNT_EVENTS set, the number of events handled is told
 * in band after each refresh, for the tests. */
int terminal_run(struct app *app);

#endif
