#include "ui/keys.h"

const struct key_row key_table[] = {
    {'j', ACTION_JOB, PLACE_EVERYWHERE, "j", "job", "The job: all rows, the plan and the answers."},
    {'p', ACTION_PLAN, PLACE_EVERYWHERE, "p", "plan",
     "The plan: look under the cross, add things."},
    {'c', ACTION_CUT, PLACE_EVERYWHERE, "c", "cut", "How deep and in which order to saw."},
    {'s', ACTION_SEAL, PLACE_EVERYWHERE, "s", "seal", "The joint at every slab temperature."},
    {'b', ACTION_BUY, PLACE_EVERYWHERE, "b", "buy", "What to order, and other widths."},
    {'w', ACTION_WHY, PLACE_EVERYWHERE, "w", "why", "Why an answer is what it is."},
    {'m', ACTION_MORE, PLACE_EVERYWHERE, "m", "more", "Open, save, units, help, leave."},
    {'u', ACTION_UNDO, PLACE_EVERYWHERE, "u", "undo", "Takes the last change back."},
    {'f', ACTION_FIND, PLACE_EVERYWHERE, "f", "find", "Finds a row by a part of its name."},
    {'y', ACTION_YEAR, PLACE_EVERYWHERE, "y", NULL, "The joint's width through the year."},
    {'r', ACTION_REDO, PLACE_EVERYWHERE, "r", NULL, "Makes a change again that undo took back."},
    {'n', ACTION_NEW, PLACE_EVERYWHERE, "n", NULL, "A slab of your own, nothing typed in it."},
    {'o', ACTION_OPEN_JOB, PLACE_EVERYWHERE, "o", NULL, "Opens a job file."},
    {'h', ACTION_HELP, PLACE_EVERYWHERE, "h", NULL, "This list of keys."},
    {PRESS_TAB, ACTION_NEXT_PAGE, PLACE_EVERYWHERE, "Tab", NULL, "The next page."},
    {PRESS_TAB_BACK, ACTION_PAGE_BEFORE, PLACE_EVERYWHERE, "back Tab", NULL, "The page before."},
    {PRESS_ENTER, ACTION_ENTER, PLACE_EVERYWHERE, "Enter", NULL,
     "Opens the row in hand; again: keeps what stands there."},
    {PRESS_BACK, ACTION_BACK, PLACE_EVERYWHERE, "Esc", NULL,
     "Gives the old value back; else one step back."},
    {PRESS_UP, ACTION_UP, PLACE_EVERYWHERE, "up", NULL,
     "The row above; on the plan one step north."},
    {PRESS_DOWN, ACTION_DOWN, PLACE_EVERYWHERE, "down", NULL,
     "The row below; keeps an opened row first."},
    {'a', ACTION_ADD, PLACE_PLAN, "a", NULL, "Plan: adds a column, manhole, hole, wall ... here."},
    {'d', ACTION_TAKE_AWAY, PLACE_PLAN, "d", NULL,
     "Plan: takes away what is under the cross; forbids a line there."},
    {'k', ACTION_KEEP, PLACE_PLAN, "k", NULL,
     "Plan: keeps the line under the cross, or lets it go."},
    {'v', ACTION_MOVE, PLACE_PLAN, "v", NULL, "Plan: moves the line under the cross."},
    {'g', ACTION_MEASURED, PLACE_SEAL, "g", NULL,
     "Seal: go or not, from what is measured at the joint."},
    {'v', ACTION_VIEW, PLACE_SEAL, "v", NULL,
     "Seal: which width at which slab temperature; which sealant; back."},
    {'z', ACTION_NEARER, PLACE_PLAN, "z", NULL, "Plan: nearer."},
    {'x', ACTION_FARTHER, PLACE_PLAN, "x", NULL, "Plan: farther."},
};
const size_t key_count = sizeof key_table / sizeof *key_table;

enum action key_action(uint32_t key, enum key_place place)
{
    if (key >= 'A' && key <= 'Z')
        key += 'a' - 'A';
    for (size_t i = 0; i < key_count; i++)
        if (key_table[i].key == key &&
            (key_table[i].place == PLACE_EVERYWHERE || key_table[i].place == place))
            return key_table[i].action;
    return ACTION_NONE;
}
