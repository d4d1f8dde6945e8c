/* Allocation failing on purpose: link with -Wl,--wrap=malloc,--wrap=calloc,--wrap=realloc,
 * --wrap=strdup. The n-th call after memory_arm(n) fails, and with `all` every later one too. */
#ifndef SLABGAP_TESTS_MEMORY_FAIL_H
#define SLABGAP_TESTS_MEMORY_FAIL_H

#include <stdbool.h>
#include <stddef.h>

void *__real_malloc(size_t size);
void *__real_calloc(size_t count, size_t size);
void *__real_realloc(void *old, size_t size);
char *__real_strdup(const char *string);
void *__wrap_malloc(size_t size);
void *__wrap_calloc(size_t count, size_t size);
void *__wrap_realloc(void *old, size_t size);
char *__wrap_strdup(const char *string);

static struct {
    bool armed, all;
    long left;            /* calls until the one that fails */
    long calls, failures; /* since it was armed */
} memory;

static inline void memory_arm(long n, bool all)
{
    memory.armed = true;
    memory.all = all;
    memory.left = n;
    memory.calls = memory.failures = 0;
}

static inline void memory_disarm(void)
{
    memory.armed = false;
}

static bool memory_refuses(void)
{
    bool refuse;

    if (!memory.armed)
        return false;
    memory.calls++;
    refuse = memory.calls == memory.left || (memory.all && memory.calls > memory.left);
    memory.failures += refuse;
    return refuse;
}

void *__wrap_malloc(size_t size)
{
    return memory_refuses() ? NULL : __real_malloc(size);
}

void *__wrap_calloc(size_t count, size_t size)
{
    return memory_refuses() ? NULL : __real_calloc(count, size);
}

void *__wrap_realloc(void *old, size_t size)
{
    return memory_refuses() ? NULL : __real_realloc(old, size);
}

char *__wrap_strdup(const char *string)
{
    return memory_refuses() ? NULL : __real_strdup(string);
}

#endif
