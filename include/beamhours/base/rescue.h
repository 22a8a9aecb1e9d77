/* rescue.h - unsaved work beside the file it belongs to, for the day the program ends unasked. */
#ifndef BH_BASE_RESCUE_H
#define BH_BASE_RESCUE_H

#include <stdbool.h>
#include <stddef.h>
#include <stdint.h>
#include <time.h>

#include "beamhours/base/error.h"
#include "beamhours/base/text.h"

/*
 * The unsaved work on PLAN.yaml is kept in .PLAN.yaml.unsaved in the same folder, of mode 0600: the
 * bytes as they would have been saved and behind them one line of comment with their number and
 * fingerprint, and that of the file they began from.  It appears whole or not at all.  Each session
 * that has the plan open has one of its own: .PLAN.yaml.unsaved-2 the second.
 */
typedef struct bh_rescue bh_rescue;

/* For the file at `path`, which need not exist, and the session of this `number` (presence.h);
 * symbolic links are followed.  NULL without memory.  Nothing is written yet. */
bh_rescue *bh_rescue_new(const char *path, int number);

/* Forgets it; the recovery file stays as it is. */
void bh_rescue_free(bh_rescue *rescue);

/* Where the recovery file is, or would be. */
const char *bh_rescue_path(const bh_rescue *rescue);

/* Makes `length` bytes, begun from a file of fingerprint `base` (base/stamp.h), what is to be
 * rescued from now on.  Writes nothing.  False without memory: what was to be rescued before stays.
 */
bool bh_rescue_prepare(bh_rescue *rescue, const char *bytes, size_t length, uint64_t base);

/* Nothing is to be rescued from now on, as after saving. */
void bh_rescue_clear(bh_rescue *rescue);

/*
 * Writes what is to be rescued, unless it is written already: beside it, made durable, renamed.
 * Calls only what a signal handler may call, and may itself be called from one, in the thread that
 * uses the rescue.  Returns true where it is safely there (or nothing is to be rescued); else errno
 * says why, and an older recovery file is still there.
 */
bool bh_rescue_write(bh_rescue *rescue);

/* Is there something to be rescued that is not written? */
bool bh_rescue_pending(const bh_rescue *rescue);

/* Takes the recovery file away, after saving or when its offer was refused; also what is to be
 * rescued is cleared.  No file is no error. */
BH_CHECKED bh_code bh_rescue_discard(bh_rescue *rescue, bh_error *err);

/* Is there a recovery file, and when was it written [ns since 1970]? */
bool bh_rescue_there(const bh_rescue *rescue, int64_t *written);

/* What was found at the start. */
typedef struct {
    bool there;
    bool whole;     /* its last line fits its bytes: else it is damaged, perhaps edited */
    bool same_base; /* it was begun from the content that the file has now */
    bool differs;   /* it differs from what the file holds now */
    time_t written; /* [s] since 1970, by the clock of the disk */
    double age;     /* [s] since then; not below 0 */
    int lines;      /* [1] how many lines of it are not in the file, the equal ones at the
                       beginning and the end left out */
    size_t length;  /* [bytes] of the work in it */
} bh_rescue_found;

/*
 * Looks for a recovery file and compares it with `now`, what the file holds.  The work goes to
 * `into` (may be NULL), appended; of a damaged file all that is there, without the last line where
 * it is ours. Returns BH_OK also where there is none; BH_EIO, BH_ENOMEM, with the reason in err.
 */
BH_CHECKED bh_code bh_rescue_find(const bh_rescue *rescue, const bh_text *now, bh_text *into,
                                  bh_rescue_found *found, bh_error *err);

#endif
