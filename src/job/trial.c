#include "job/trial.h"
#include <string.h>

static bool digit(char c)
{
    return c >= '0' && c <= '9';
}

/* hh:mm or h:mm; the bytes taken, 0 when it is none. */
static size_t read_clock(const char *at, int *minutes)
{
    const size_t hours = digit(at[0]) ? (digit(at[1]) ? 2 : 1) : 0;
    int h = 0;

    for (size_t i = 0; i < hours; i++)
        h = 10 * h + (at[i] - '0');
    if (hours == 0 || at[hours] != ':' || !digit(at[hours + 1]) || !digit(at[hours + 2]))
        return 0;
    *minutes = 60 * h + 10 * (at[hours + 1] - '0') + (at[hours + 2] - '0');
    return h < 24 && at[hours + 1] < '6' ? hours + 3 : 0;
}

static size_t read_word(const char *at, bool *clean)
{
    static const char *const words[] = {"ravels", "clean"};

    for (size_t i = 0; i < 2; i++)
        if (strncmp(at, words[i], strlen(words[i])) == 0) {
            *clean = i == 1;
            return strlen(words[i]);
        }
    return 0;
}

bool trials_parse(const char *words, struct trials *trials, const char **wrong)
{
    const char *at = words + strspn(words, " ");

    *trials = (struct trials){.count = 0};
    while (*at != '\0') {
        struct trial *trial = &trials->items[trials->count];
        size_t taken = trials->count < TRIALS_MOST ? read_clock(at, &trial->minutes) : 0;
        const char *word = at + taken + strspn(at + taken, " ");
        size_t length = taken > 0 ? read_word(word, &trial->clean) : 0;
        const char *next = word + length + strspn(word + length, " ");
        if (length == 0 || (*next != ',' && *next != '\0')) {
            if (wrong != NULL)
                *wrong = at;
            return false;
        }
        trials->count++;
        at = *next == ',' ? next + 1 + strspn(next + 1, " ") : next;
    }
    return true;
}
