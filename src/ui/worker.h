/* Makes plans in a thread of its own, so that typing never waits for a large slab. One job at a
 * time: a newer one stops and replaces an older one. */
#ifndef SLABGAP_UI_WORKER_H
#define SLABGAP_UI_WORKER_H

#include "plan/plan.h"

struct worker;

/* Starts the thread. NULL: no memory or no thread; then make plans directly. */
struct worker *worker_make(void);
/* Stops what is running and ends the thread; safe on NULL. */
void worker_free(struct worker *worker);
/* Gives it a job (copied). Waits up to `patience_ms`: true when the plan is ready by then, to be
 * taken at once. False: later, or *status is STATUS_NO_MEMORY and nothing was begun. */
bool worker_begin(struct worker *worker, const struct job *job, int patience_ms,
                  enum status *status);
/* Takes a finished plan and its status; false while there is none. */
bool worker_take(struct worker *worker, struct plan *plan, enum status *status);
/* Stops what is running; nothing of it will be taken. */
void worker_stop(struct worker *worker);
/* Readable when a plan is ready. */
int worker_descriptor(const struct worker *worker);
/* How far the running job is, 0 to 1. */
double worker_share(const struct worker *worker);

#endif
