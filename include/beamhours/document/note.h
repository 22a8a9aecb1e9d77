/* note.h - a change in a few words, and what changed as it is called afterwards. */
#ifndef BH_DOCUMENT_NOTE_H
#define BH_DOCUMENT_NOTE_H

#include "beamhours/base/text.h"
#include "beamhours/document/splice.h"

/* Of a change that was made: what changed, in the document after it; the list or mapping that lost
 * an item or key. */
const bh_node *bh_note_node(const bh_splice *made);

/* Of a change that was made, while the document before it is still there: appends "beam.current:
 * 20 uA -> 30 uA" to `note`, and to `path` the path of what changed in the document after it. */
void bh_note_change(const bh_splice *made, bh_text *note, bh_text *path);

#endif
