/* waiting.h - a line on the terminal while a command works for long. */
#ifndef BH_COMMAND_WAITING_H
#define BH_COMMAND_WAITING_H

#include <stdbool.h>
#include <stdio.h>

#include "beamhours/base/progress.h"

typedef struct {
    FILE *to;
    bool shows;         /* it is a terminal */
    double begun, last; /* [s] when it began; when the line was last written */
    int width;          /* [1] characters of the line that stands there; 0: none */
    bh_progress progress;
} bh_waiting;

/* Begins.  Nothing is ever written where `to` is no terminal, and nothing before half a second has
 * passed; then at most ten lines a second, one over the other.  `waiting` must stay where it is:
 * its `progress` is what is to be told. */
void bh_waiting_begin(bh_waiting *waiting, FILE *to);

/* Takes the line away. */
void bh_waiting_end(bh_waiting *waiting);

#endif
