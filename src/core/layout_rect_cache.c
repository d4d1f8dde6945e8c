/* A zone's question is written out as a row of numbers, all that rect_solve reads; the answer as
 * another, all that it changes. */
#include "core/layout_rect_cache.h"
#include <stdlib.h>
#include <string.h>

enum { ENTRIES_MOST = 4096 };
static const size_t bytes_most = (size_t)24 << 20; /* own choice */

struct row { /* of numbers; failed: no memory, then nothing is remembered */
    int64_t *list;
    size_t count, room;
    bool failed;
};
struct layout_cache_entry {
    uint64_t hash;
    struct row question, answer;
};

static void put(struct row *row, int64_t value)
{
    if (row->count == row->room && !row->failed) {
        const size_t room = row->room ? 2 * row->room : 256;
        int64_t *more = realloc(row->list, room * sizeof *more);
        row->failed = !more;
        if (more) {
            row->list = more;
            row->room = room;
        }
    }
    if (!row->failed)
        row->list[row->count++] = value;
}

static void put_real(struct row *row, double value)
{
    int64_t bits;
    memcpy(&bits, &value, sizeof bits);
    put(row, bits);
}

static double real_of(int64_t bits)
{
    double value;
    memcpy(&value, &bits, sizeof value);
    return value;
}

static void put_arc(struct row *row, const struct rect_arc *a, bool solved)
{
    put(row, a->u0);
    put(row, a->u1);
    put(row, a->v0);
    put(row, a->v1);
    put(row, a->end_room[0]);
    put(row, a->end_room[1]);
    put(row, (int64_t)a->forced_count);
    for (size_t i = 0; i < a->forced_count; i++) {
        put(row, a->forced[i]);
        put(row, a->room[i][0]);
        put(row, a->room[i][1]);
    }
    put(row, solved ? (int64_t)a->cut_count : -1);
    for (size_t i = 0; solved && i < a->cut_count; i++)
        put(row, a->cut[i]);
}

static void put_family(struct row *row, const struct rect_family *f, bool solved)
{
    put(row, f->limit);
    put(row, (int64_t)f->arc_count);
    for (size_t i = 0; i < f->arc_count; i++)
        put_arc(row, &f->arcs[i], solved);
    put(row, (int64_t)f->gate_count);
    for (size_t i = 0; i < f->gate_count; i++) {
        const struct rect_gate *g = &f->gates[i];
        put(row, g->u);
        put(row, g->v0);
        put(row, g->v1);
        put(row, (int64_t)g->left);
        put(row, (int64_t)g->right);
        put(row, 2 * g->on + g->forced);
    }
}

static void put_rules(struct row *row, const struct rect_slab *slab, enum rect_depth depth)
{
    put(row, (int64_t)depth);
    put_real(row, slab->rules.side[0]);
    put_real(row, slab->rules.side[1]);
    put_real(row, slab->rules.aspect);
    put_real(row, slab->rules.least);
    put(row, slab->rules.raster);
    put(row, (int64_t)slab->allowed);
    put(row, (int64_t)slab->evaluations);
    put(row, slab->extra);
    put(row, slab->fine);
    put(row, slab->solved);
    put(row, slab->longest_tip);
    if (slab->solved) {
        put_real(row, slab->cost);
        put(row, (int64_t)slab->broken);
    }
}

static void put_question(struct row *row, const struct rect_slab *slab, enum rect_depth depth)
{
    put_rules(row, slab, depth);
    put_family(row, &slab->family[0], slab->solved);
    put_family(row, &slab->family[1], slab->solved);
    for (size_t i = 0; i < slab->corner_count; i++) {
        const struct rect_corner *c = &slab->corners[i];
        put(row, c->x);
        put(row, c->y);
        put(row, (int64_t)c->gate[0]);
        put(row, (int64_t)c->gate[1]);
        put(row, c->choice);
        put(row, c->type);
        put(row, (int64_t)c->group);
    }
    for (size_t i = 0; i < slab->box_count; i++) {
        put(row, slab->boxes[i].x);
        put(row, slab->boxes[i].y);
        for (int k = 0; k < 4; k++)
            put(row, slab->boxes[i].tip[k]);
    }
    for (size_t i = 0; i < slab->ban_count; i++) {
        put(row, slab->bans[i].axis);
        put(row, slab->bans[i].u);
        put(row, slab->bans[i].v0);
        put(row, slab->bans[i].v1);
    }
}

static void put_answer(struct row *row, const struct rect_slab *slab)
{
    put_real(row, slab->cost);
    put(row, (int64_t)slab->broken);
    put(row, slab->solved);
    put(row, (int64_t)slab->evaluations);
    put(row, (int64_t)slab->allowed);
    put(row, (int64_t)slab->start_cost);
    for (size_t i = 0; i < slab->corner_count; i++)
        put(row, slab->corners[i].choice);
    for (int axis = 0; axis < 2; axis++) {
        const struct rect_family *f = &slab->family[axis];
        for (size_t i = 0; i < f->gate_count; i++)
            put(row, f->gates[i].on);
        for (size_t i = 0; i < f->arc_count; i++) {
            put(row, (int64_t)f->arcs[i].cut_count);
            for (size_t k = 0; k < f->arcs[i].cut_count; k++)
                put(row, f->arcs[i].cut[k]);
        }
    }
}

static bool take_cuts(struct rect_family *f, const int64_t **at)
{
    for (size_t i = 0; i < f->gate_count; i++)
        f->gates[i].on = *(*at)++;
    for (size_t i = 0; i < f->arc_count; i++) {
        const size_t n = (size_t) * (*at)++;
        int64_t *cut = calloc(n + 1, sizeof *cut);
        if (!cut)
            return false;
        if (n)
            memcpy(cut, *at, n * sizeof *cut);
        free(f->arcs[i].cut);
        f->arcs[i].cut = cut;
        f->arcs[i].cut_count = n;
        *at += n;
    }
    return true;
}

static enum status take_answer(struct rect_slab *slab, const struct row *row)
{
    const int64_t *at = row->list;
    slab->cost = real_of(*at++);
    slab->broken = (size_t)*at++;
    slab->solved = *at++;
    slab->evaluations = (uint64_t)*at++;
    slab->allowed = (uint64_t)*at++;
    slab->start_cost = (uint64_t)*at++;
    for (size_t i = 0; i < slab->corner_count; i++)
        slab->corners[i].choice = (int)*at++;
    return take_cuts(&slab->family[0], &at) && take_cuts(&slab->family[1], &at) ? STATUS_OK
                                                                                : STATUS_NO_MEMORY;
}

static uint64_t hash_of(const struct row *row)
{
    uint64_t hash = 0xcbf29ce484222325u; /* FNV-1a over whole numbers, mixed once more */
    for (size_t i = 0; i < row->count; i++) {
        hash = (hash ^ (uint64_t)row->list[i]) * 0x100000001b3u;
        hash ^= hash >> 29;
    }
    return hash;
}

static void entry_free(struct layout_cache *cache, struct layout_cache_entry *e)
{
    cache->bytes -= (e->question.room + e->answer.room) * sizeof *e->question.list;
    free(e->question.list);
    free(e->answer.list);
    *e = (struct layout_cache_entry){0};
}

void layout_cache_free(struct layout_cache *cache)
{
    for (size_t i = 0; cache->entries && i < ENTRIES_MOST; i++)
        entry_free(cache, &cache->entries[i]);
    free(cache->entries);
    *cache = (struct layout_cache){0};
}

static const struct layout_cache_entry *find(const struct layout_cache *cache, uint64_t hash,
                                             const struct row *question)
{
    for (size_t i = 0; i < cache->count; i++) {
        const struct layout_cache_entry *e = &cache->entries[i];
        if (e->hash == hash && e->question.count == question->count && question->count &&
            !memcmp(e->question.list, question->list, question->count * sizeof *question->list))
            return e;
    }
    return NULL;
}

/* Takes both rows over; the oldest entries go when there are too many. */
static void remember(struct layout_cache *cache, uint64_t hash, struct row question,
                     struct row answer)
{
    const size_t bytes = (question.room + answer.room) * sizeof *question.list;
    if (!cache->entries)
        cache->entries = calloc(ENTRIES_MOST, sizeof *cache->entries);
    if (question.failed || answer.failed || !cache->entries || bytes > bytes_most / 8) {
        free(question.list);
        free(answer.list);
        return;
    }
    struct layout_cache_entry *e = &cache->entries[cache->next];
    cache->next = (cache->next + 1) % ENTRIES_MOST;
    cache->count += cache->count < ENTRIES_MOST;
    entry_free(cache, e);
    *e = (struct layout_cache_entry){hash, question, answer};
    cache->bytes += bytes;
    for (size_t i = 0; cache->bytes > bytes_most && i < ENTRIES_MOST; i++)
        entry_free(cache, &cache->entries[(cache->next + i) % ENTRIES_MOST]);
}

enum status rect_solve_cached(struct layout_cache *cache, struct rect_slab *slab,
                              enum rect_depth depth)
{
    struct row question = {0}, answer = {0};
    if (!cache)
        return rect_solve(slab, depth);
    put_question(&question, slab, depth);
    const uint64_t hash = hash_of(&question);
    const struct layout_cache_entry *known = question.failed ? NULL : find(cache, hash, &question);
    if (known) {
        cache->hits++;
        free(question.list);
        return take_answer(slab, &known->answer);
    }
    cache->misses++;
    const enum status status = rect_solve(slab, depth);
    if (!status)
        put_answer(&answer, slab);
    answer.failed |= status != STATUS_OK;
    remember(cache, hash, question, answer);
    return status;
}
