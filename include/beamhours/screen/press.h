/* press.h - what the user does: keys, the mouse. */
#ifndef BH_SCREEN_PRESS_H
#define BH_SCREEN_PRESS_H

#include <stdbool.h>
#include <stdint.h>

typedef enum {
    BH_PRESS_POINT, /* a character: `point` */
    BH_PRESS_UP,
    BH_PRESS_DOWN,
    BH_PRESS_LEFT,
    BH_PRESS_RIGHT,
    BH_PRESS_PAGE_UP,
    BH_PRESS_PAGE_DOWN,
    BH_PRESS_HOME,
    BH_PRESS_END,
    BH_PRESS_TAB,
    BH_PRESS_BACK_TAB,
    BH_PRESS_ENTER,
    BH_PRESS_ESCAPE,
    BH_PRESS_RUBOUT,   /* takes the character before the cursor */
    BH_PRESS_DELETE,   /* and the one at it */
    BH_PRESS_FUNCTION, /* F1 and up: its number is `point`; 0: another key with a name, Insert */
    BH_PRESS_INTERRUPT,
    BH_PRESS_SUSPEND,
    BH_PRESS_CLICK, /* at row, column */
    BH_PRESS_DOUBLE_CLICK,
    BH_PRESS_WHEEL_UP,
    BH_PRESS_WHEEL_DOWN,
    BH_PRESS_PASTED, /* all of what was pasted has come */
    BH_PRESS_NOTHING /* what means nothing here */
} bh_press_kind;

typedef struct {
    bh_press_kind kind;
    uint32_t point;
    bool pasted;     /* a character that nobody typed: it commands nothing */
    int row, column; /* from 0 */
} bh_press;

/* What the character `code` that a terminal sends means. */
bh_press bh_press_of(uint32_t code);

/* The same between the marks around what is pasted: a new line is one, and no Enter. */
bh_press bh_press_pasted(uint32_t code);

#endif
