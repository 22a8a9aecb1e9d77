/* presence.h - who else has the same file open for change. */
#ifndef BH_BASE_PRESENCE_H
#define BH_BASE_PRESENCE_H

#include <stdbool.h>
#include <time.h>

#include "beamhours/base/error.h"

/* While a file is being edited, .PLAN.yaml.open beside it says by which process on which host, and
 * is locked by that process, so that a mark whose process has ended is known to be stale.  Who goes
 * on although another has it open marks it with a number: .PLAN.yaml.open-2 is the second's. */
typedef struct bh_presence bh_presence;

/* So many sessions can have a file open at once [1]. */
enum { BH_MOST_SESSIONS = 32 };

typedef struct {
    long process;  /* 0 where the mark cannot be read */
    char host[64]; /* its name; empty where the mark cannot be read */
    bool here;     /* it runs on this host */
    time_t since;  /* [s] since 1970 */
} bh_other;

typedef enum {
    BH_PRESENCE_ALONE,  /* the mark is ours */
    BH_PRESENCE_OTHER,  /* someone else has the file open; `other` says who; nothing was written */
    BH_PRESENCE_UNKNOWN /* no mark can be made or read here: whether someone has it open is not
                           known; err says why */
} bh_presence_state;

/*
 * Marks the file at `path` (symbolic links followed) as open here.  A stale mark of this host is
 * replaced.  A mark of another host is believed, since nothing here can tell whether its process
 * still runs.  With `insist` the mark is set beside those of others.  The first number is taken
 * that neither a living session has nor the unsaved work of one that ended (rescue.h).
 * `mark` is the caller's in every case and may be NULL only without memory (BH_PRESENCE_UNKNOWN).
 * It must not be kept over a fork: a lock belongs to one process.
 */
bh_presence_state bh_presence_open(const char *path, bool insist, bh_presence **mark,
                                   bh_other *other, bh_error *err);

/* Is the mark still ours, or has it been taken away? */
bool bh_presence_ours(const bh_presence *mark);

/* The number of the session, from 1; that which it would have, where it could not be marked. */
int bh_presence_number(const bh_presence *mark);

/* Has a session of another process this number of the file at `path`? */
bool bh_presence_held(const char *path, int number);

/* As bh_presence_open with `insist`, with this number and no other. */
bh_presence_state bh_presence_take(const char *path, int number, bh_presence **mark, bh_error *err);

/* Takes our mark away.  NULL is allowed. */
void bh_presence_close(bh_presence *mark);

/* Where the mark is; for a signal handler that is to unlink it. */
const char *bh_presence_path(const bh_presence *mark);

#endif
