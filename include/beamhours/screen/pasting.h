/* pasting.h - what is pasted comes between two marks, which may come in pieces. */
#ifndef BH_SCREEN_PASTING_H
#define BH_SCREEN_PASTING_H

#include <stdbool.h>
#include <stdint.h>

#include "beamhours/screen/press.h"

typedef struct {
    bool on;
    int came;     /* [1] characters of the mark at the end that came one by one */
    double heard; /* [s] when something last came */
} bh_pasting;

/* A mark came as a whole at `now` [s]: the one that begins, or the one that ends. */
bh_press bh_pasting_mark(bh_pasting *pasting, bool begins, double now);

/* A character came at `now` [s]: a key, or one that is pasted; perhaps the last one of the mark at
 * the end. */
bh_press bh_pasting_take(bh_pasting *pasting, uint32_t code, double now);

/* Nothing more is there at `now` [s]: what is pasted and lacks its end is over after a while. */
bh_press bh_pasting_rest(bh_pasting *pasting, double now);

/* Returns [s] how long to wait where `most` [s] was meant; below 0: without limit. */
double bh_pasting_wait(const bh_pasting *pasting, double most);

#endif
