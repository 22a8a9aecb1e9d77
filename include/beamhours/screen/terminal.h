/* terminal.h - the desk on a terminal. */
#ifndef BH_SCREEN_TERMINAL_H
#define BH_SCREEN_TERMINAL_H

#include "beamhours/screen/desk.h"

/* How it ended. */
typedef enum {
    BH_TERMINAL_DONE,
    BH_TERMINAL_NONE,  /* there is no terminal that could show it */
    BH_TERMINAL_SIGNAL /* a signal ended it; the terminal is as it was, unsaved work beside the
                          plan */
} bh_terminal_end;

/* Can the terminal show more than ASCII?  Looks at the locale, which it sets. */
bool bh_terminal_unicode(void);

/* Shows the desk until the user leaves.  `signal` is the one that ended it, or 0.  Only once in a
 * process at a time. */
bh_terminal_end bh_terminal_run(bh_desk *desk, int *signal);

#endif
