/* presence.h - who else has the same file open for change. */
#ifndef BH_BASE_PRESENCE_H
#define BH_BASE_PRESENCE_H

#include <stdbool.h>
#include <time.h>

#include "beamhours/base/error.h"

/* While a file is being edited, .PLAN.yaml.open beside it says by which process on which host, and
 * is locked by that process, so that a mark whose process has ended is known to be stale. */
typedef struct bh_presence bh_presence;

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
 * still runs; with `insist`, any mark is taken over.
 * `mark` is the caller's in every case and may be NULL only without memory (BH_PRESENCE_UNKNOWN).
 * It must not be kept over a fork: a lock belongs to one process.
 */
bh_presence_state bh_presence_open(const char *path, bool insist, bh_presence **mark,
                                   bh_other *other, bh_error *err);

/* Is the mark still ours, or has another taken the file over or the mark away? */
bool bh_presence_ours(const bh_presence *mark);

/* Takes our mark away.  NULL is allowed. */
void bh_presence_close(bh_presence *mark);

/* Where the mark is; for a signal handler that is to unlink it. */
const char *bh_presence_path(const bh_presence *mark);

#endif
