#include "ui/worker.h"
#include <errno.h>
#include <pthread.h>
#include <stdatomic.h>
#include <stdlib.h>
#include <string.h>
#include <sys/eventfd.h>
#include <time.h>
#include <unistd.h>

enum state { STATE_IDLE, STATE_ASKED, STATE_RUNNING, STATE_READY };

struct worker {
    pthread_t thread;
    pthread_mutex_t lock;
    pthread_cond_t asked, ready;
    enum state state;
    bool ending;
    struct job job; /* asked for */
    struct plan plan;
    struct plan_cache cache; /* the thread's own */
    enum status status;
    atomic_bool stop;     /* of the running job */
    atomic_int per_mille; /* progress of it */
    int event;
};

static bool go_on(void *context, double share)
{
    struct worker *worker = context;

    atomic_store(&worker->per_mille, (int)(1000 * share));
    return !atomic_load(&worker->stop);
}

/* Takes the job that was asked for; called with the lock held, which is given back meanwhile. */
static void run(struct worker *worker)
{
    struct plan_progress progress = {go_on, worker};
    struct job job = worker->job;
    struct plan plan;
    enum status status;

    memset(&worker->job, 0, sizeof worker->job);
    worker->state = STATE_RUNNING;
    atomic_store(&worker->stop, false);
    atomic_store(&worker->per_mille, 0);
    pthread_mutex_unlock(&worker->lock);
    status = plan_make(&job, &worker->cache, &progress, &plan);
    job_free(&job);
    pthread_mutex_lock(&worker->lock);
    if (worker->state != STATE_RUNNING || atomic_load(&worker->stop)) {
        plan_free(&plan); /* replaced or stopped meanwhile */
        if (worker->state == STATE_RUNNING)
            worker->state = STATE_IDLE;
        return;
    }
    worker->plan = plan;
    worker->status = status;
    worker->state = STATE_READY;
    pthread_cond_broadcast(&worker->ready);
    eventfd_write(worker->event, 1);
}

static void *serve(void *context)
{
    struct worker *worker = context;

    pthread_mutex_lock(&worker->lock);
    while (!worker->ending) {
        if (worker->state == STATE_ASKED)
            run(worker);
        else
            pthread_cond_wait(&worker->asked, &worker->lock);
    }
    pthread_mutex_unlock(&worker->lock);
    return NULL;
}

struct worker *worker_make(void)
{
    struct worker *worker = calloc(1, sizeof *worker);
    pthread_condattr_t monotonic;

    if (worker == NULL)
        return NULL;
    worker->event = eventfd(0, EFD_NONBLOCK | EFD_CLOEXEC);
    if (worker->event < 0) {
        free(worker);
        return NULL;
    }
    pthread_mutex_init(&worker->lock, NULL);
    pthread_condattr_init(&monotonic);
    pthread_condattr_setclock(&monotonic, CLOCK_MONOTONIC);
    pthread_cond_init(&worker->asked, NULL);
    pthread_cond_init(&worker->ready, &monotonic);
    pthread_condattr_destroy(&monotonic);
    if (pthread_create(&worker->thread, NULL, serve, worker) != 0) {
        close(worker->event);
        free(worker);
        return NULL;
    }
    return worker;
}

/* Drops what is asked for, running or ready; with the lock held. */
static void drop(struct worker *worker)
{
    eventfd_t count;

    atomic_store(&worker->stop, true);
    if (worker->state == STATE_ASKED)
        job_free(&worker->job);
    if (worker->state == STATE_READY)
        plan_free(&worker->plan);
    if (worker->state != STATE_RUNNING)
        worker->state = STATE_IDLE;
    eventfd_read(worker->event, &count); /* nothing is ready any more */
}

void worker_free(struct worker *worker)
{
    if (worker == NULL)
        return;
    pthread_mutex_lock(&worker->lock);
    drop(worker);
    worker->ending = true;
    pthread_cond_broadcast(&worker->asked);
    pthread_mutex_unlock(&worker->lock);
    pthread_join(worker->thread, NULL);
    pthread_mutex_destroy(&worker->lock);
    pthread_cond_destroy(&worker->asked);
    pthread_cond_destroy(&worker->ready);
    close(worker->event);
    plan_cache_free(&worker->cache);
    free(worker);
}

static bool wait_ready(struct worker *worker, int patience_ms)
{
    struct timespec until;

    clock_gettime(CLOCK_MONOTONIC, &until);
    until.tv_sec += patience_ms / 1000;
    until.tv_nsec += patience_ms % 1000 * 1000000L;
    if (until.tv_nsec >= 1000000000L) {
        until.tv_sec++;
        until.tv_nsec -= 1000000000L;
    }
    while (worker->state != STATE_READY)
        if (pthread_cond_timedwait(&worker->ready, &worker->lock, &until) == ETIMEDOUT)
            break;
    return worker->state == STATE_READY;
}

bool worker_begin(struct worker *worker, const struct job *job, int patience_ms,
                  enum status *status)
{
    bool ready = false;

    pthread_mutex_lock(&worker->lock);
    drop(worker);
    *status = job_copy(&worker->job, job);
    if (*status == STATUS_OK) {
        worker->state = STATE_ASKED; /* a running job sees that it was replaced */
        pthread_cond_broadcast(&worker->asked);
        ready = wait_ready(worker, patience_ms);
    }
    pthread_mutex_unlock(&worker->lock);
    return ready;
}

bool worker_take(struct worker *worker, struct plan *plan, enum status *status)
{
    bool taken = false;
    eventfd_t count;

    pthread_mutex_lock(&worker->lock);
    if (worker->state == STATE_READY) {
        *plan = worker->plan;
        *status = worker->status;
        worker->state = STATE_IDLE;
        eventfd_read(worker->event, &count);
        taken = true;
    }
    pthread_mutex_unlock(&worker->lock);
    return taken;
}

void worker_stop(struct worker *worker)
{
    pthread_mutex_lock(&worker->lock);
    drop(worker);
    pthread_mutex_unlock(&worker->lock);
}

int worker_descriptor(const struct worker *worker)
{
    return worker->event;
}

double worker_share(const struct worker *worker)
{
    return atomic_load(&worker->per_mille) / 1000.0;
}
