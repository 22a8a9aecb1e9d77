/* desk.h - model, worker and file together: everything but the terminal. */
#ifndef BH_SCREEN_DESK_H
#define BH_SCREEN_DESK_H

#include <stdbool.h>

#include "beamhours/base/error.h"
#include "beamhours/base/rescue.h"
#include "beamhours/base/text.h"
#include "beamhours/screen/canvas.h"
#include "beamhours/screen/press.h"

/* A plan that can be begun from. */
typedef struct {
    const char *name, *title, *bytes;
} bh_beginning;

/* What to open. */
typedef struct {
    const char *path;           /* the plan; NULL: one of `beginnings` is chosen */
    const char *const *folders; /* of materials, NULL-terminated */
    const bh_beginning *beginnings;
    size_t beginning_count;
    bool ascii; /* the terminal shows nothing else */
} bh_desk_start;

typedef struct bh_desk bh_desk;

/* Opens the plan.  NULL with the reason in err: BH_EABSENT, BH_EIO, BH_ENOMEM. */
bh_desk *bh_desk_open(const bh_desk_start *start, bh_error *err);
void bh_desk_close(bh_desk *desk);

/* What a key does, at the time `now` [s] of any steady clock. */
void bh_desk_press(bh_desk *desk, const bh_press *press, double now);
void bh_desk_resize(bh_desk *desk, int rows, int columns);

/* Begins what is due: evaluations, answers, what the user wished.  `now` [s] by the same clock.
 * Returns [s] after how long it wants to be called again though nothing happens; below 0: never. */
double bh_desk_tend(bh_desk *desk, double now);

/* A descriptor that can be read when there is news, and taking it up: whether there was some. */
int bh_desk_wake(const bh_desk *desk);
bool bh_desk_news(bh_desk *desk);

/* Is what is to be seen all there: nothing in view is still being computed? */
bool bh_desk_settled(bh_desk *desk);
bool bh_desk_quiet(bh_desk *desk); /* and nothing else either */

void bh_desk_draw(const bh_desk *desk, bh_canvas *canvas);

bool bh_desk_over(const bh_desk *desk);
bool bh_desk_suspends(bh_desk *desk); /* asked once for each wish */

typedef enum { BH_KEPT_NOTHING, BH_KEPT, BH_KEPT_NOT } bh_kept;

/* Writes unsaved work beside the plan now, at the time `now` [s]. */
bh_kept bh_desk_secure(bh_desk *desk, double now);

/* Back at the time `now` [s], when much may have happened to the plan: looks at it. */
void bh_desk_awake(bh_desk *desk, double now);

/* Whether it has said something since it was last asked. */
bool bh_desk_spoke(bh_desk *desk);
void bh_desk_say(bh_desk *desk, const char *text); /* in the line of messages */

/* For a signal handler: writes unsaved work beside the plan.  NULL before one is open. */
bh_rescue *bh_desk_rescue(bh_desk *desk);
const char *bh_desk_mark(const bh_desk *desk); /* path of the mark that it is open, or NULL */

/* How many settings were evaluated so far, not taken from before. */
size_t bh_desk_evaluated(bh_desk *desk);

#endif
