/* history.h - the steps of an edit, each a splice that can be undone. */
#ifndef BH_DOCUMENT_HISTORY_H
#define BH_DOCUMENT_HISTORY_H

#include <stdbool.h>
#include <stddef.h>

#include "beamhours/base/text.h"
#include "beamhours/document/edit.h"
#include "beamhours/document/pieces.h"

/* One step: `was` at byte `at` became `is`. */
typedef struct {
    size_t at; /* [bytes] */
    bh_text was, is, note, path;
    bh_edit_step shown;
} bh_step;

typedef struct {
    bh_step *steps;
    size_t count, room;
    size_t done;  /* of count */
    size_t saved; /* how many steps were done when the text was last saved, */
    size_t aside; /* and how many more that can no longer be redone */
} bh_history;

void bh_history_free(bh_history *history);

/* Adds a step from text `before` to text `after`, done, in place of those that were undone.  Note
 * and path are taken over in every case.  False without memory: nothing has changed. */
bool bh_history_add(bh_history *history, bh_bytes before, bh_bytes after, bh_text *note,
                    bh_text *path);

/* Appends the text before step i where `text` is the one after it, or (`again`) the reverse. */
void bh_history_turn(const bh_step *step, bh_bytes text, bool again, bh_text *into);

/* [1] how many steps lie between the text and what was saved. */
size_t bh_history_distance(const bh_history *history);

/* Where a text differs from what was saved, as in bh_edit_changed; false where only a comparison
 * of the two can tell. */
bool bh_history_changed(const bh_history *history, bh_edit_range *ranges, size_t room,
                        size_t *count);

/* The range of `after` outside which it equals `before`. */
bh_edit_range bh_bytes_differ(bh_bytes before, bh_bytes after);

#endif
