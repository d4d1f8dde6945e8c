/* What a person can press, and what it does: one list of named actions with a help sentence. Key
 * help, bottom line and manual come from it. */
#ifndef SLABGAP_UI_KEYS_H
#define SLABGAP_UI_KEYS_H

#include <stddef.h>
#include <stdint.h>

/* Keys that are no character; characters are their own code point. */
enum {
    KEY_NONE_PRESSED = 0x110000,
    PRESS_UP,
    PRESS_DOWN,
    PRESS_LEFT,
    PRESS_RIGHT,
    PRESS_HOME,
    PRESS_END,
    PRESS_PAGE_UP,
    PRESS_PAGE_DOWN,
    PRESS_ENTER,
    PRESS_BACK, /* Esc */
    PRESS_TAB,
    PRESS_TAB_BACK,
    PRESS_RUB, /* Backspace */
    PRESS_DELETE
};

enum action {
    ACTION_NONE,
    ACTION_JOB,
    ACTION_PLAN,
    ACTION_CUT,
    ACTION_SEAL,
    ACTION_BUY,
    ACTION_WHY,
    ACTION_YEAR,
    ACTION_MORE,
    ACTION_UNDO,
    ACTION_REDO,
    ACTION_FIND,
    ACTION_NEW,
    ACTION_OPEN_JOB,
    ACTION_HELP,
    ACTION_NEXT_PAGE,
    ACTION_PAGE_BEFORE,
    ACTION_ENTER,
    ACTION_BACK,
    ACTION_UP,
    ACTION_DOWN,
    ACTION_ADD,
    ACTION_TAKE_AWAY,
    ACTION_KEEP,
    ACTION_MOVE,
    ACTION_MEASURED,
    ACTION_VIEW,
    ACTION_NEARER,
    ACTION_FARTHER
};
enum key_place { PLACE_EVERYWHERE, PLACE_PLAN, PLACE_SEAL };

struct key_row {
    uint32_t key;
    enum action action;
    enum key_place place;
    const char *name; /* as printed: "j", "Enter" */
    const char *word; /* in the bottom line, NULL: not there; its first letter is the key */
    const char *help;
};
extern const struct key_row key_table[];
extern const size_t key_count;

/* The action of a key on the plan page or elsewhere. Upper-case letters count as lower-case. */
enum action key_action(uint32_t key, enum key_place place);

#endif
