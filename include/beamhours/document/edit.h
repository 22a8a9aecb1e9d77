/* edit.h - a document being changed, byte for byte the user's wherever nothing was changed. */
#ifndef BH_DOCUMENT_EDIT_H
#define BH_DOCUMENT_EDIT_H

#include <stdbool.h>
#include <stddef.h>

#include "beamhours/base/diag.h"
#include "beamhours/base/text.h"
#include "beamhours/document/node.h"

/*
 * An open text with its history.  A change is a splice of the bytes it concerns: order, comments,
 * spacing, quotes, line ends, a byte order mark and a missing end of the last line stay as they
 * are. After each change the text is read again and every node that was not meant must be equal to
 * what it was; else nothing is changed and the reason is said.  One thread at a time.
 */
typedef struct bh_edit bh_edit;

/* Opens `bytes`, called `name` in messages.  Returns NULL, with every fault in `diags`, where the
 * text cannot be read as a document: such a text can only be shown. */
bh_edit *bh_edit_open(const char *bytes, size_t length, const char *name, bh_diags *diags);
void bh_edit_free(bh_edit *edit);

/* The text as it is now, and what was read from it: both good until the next change, undo or redo.
 * `bh_edit_said`: warnings of reading it. */
const char *bh_edit_bytes(const bh_edit *edit, size_t *length);
const bh_document *bh_edit_document(const bh_edit *edit);
const bh_diags *bh_edit_said(const bh_edit *edit);

/* A number that is another one after every change, undo and redo. */
size_t bh_edit_version(const bh_edit *edit);

typedef enum {
    BH_EDIT_SET,       /* the value at `path` becomes `text`; a key that is not there is added, at
                          `place`, with those it stands in */
    BH_EDIT_RENAME,    /* the key at `path` becomes `text`, its value stays */
    BH_EDIT_INSERT,    /* `text` becomes a new item, at `place`, of the list at `path`; `key: value`
                          of the mapping there */
    BH_EDIT_DUPLICATE, /* the item or key at `path` again, just behind it, with its comments; `text`
                          names the copy: NULL for an item that keeps its name or has none */
    BH_EDIT_REMOVE,    /* the item or key at `path` goes, with its comments */
    BH_EDIT_MOVE       /* it goes to `place` among its like, with its comments */
} bh_edit_kind;

/*
 * One change.  `path` is dotted, list items by name or by number from 1; where `node` is not NULL
 * it, a value of bh_edit_document, is meant instead.
 *
 * `text` is what the user typed, not YAML: it is put in quotes where it needs them, and keeps the
 * quotes, or the | or > above it, that the old value had.  Two texts are taken as they stand where
 * the old value was neither quoted nor a | or > text: a whole list or mapping in brackets,
 * `[20 deg, 25 deg]`, `{from: 20 deg, to: 60 deg, step: 5 deg}`; and a whole text in quotes.  Only
 * a | or > text may have line ends (LF) in it; it ends with as many as its heading says.
 *
 * Full lines of comment just above an item or key are its own; so is what follows it on its line,
 * and full lines of comment below it that are indented more than it.  Those at the top of the file
 * belong to the file.
 */
typedef struct {
    bh_edit_kind kind;
    const char *path;
    const char *text;
    size_t place; /* [1] from 1; 0: the end */
    const bh_node *node;
} bh_edit_change;

/*
 * Makes `count` changes, all or none, as one step of the history; what was undone can then no
 * longer be redone.  A `node` may only be in the first of them.  A change that leaves the text as
 * it was makes no step.  Returns false, with the reason in `diags` and nothing changed, where one
 * of them cannot be made or memory ran out.
 */
bool bh_edit_apply(bh_edit *edit, const bh_edit_change *changes, size_t count, bh_diags *diags);

/* Appends to `into` the text as it would be after these changes, and changes nothing. */
bool bh_edit_try(const bh_edit *edit, const bh_edit_change *changes, size_t count, bh_text *into,
                 bh_diags *diags);

/* Makes `bytes`, which are in the file, the text, as one step of the history called `note`; they
 * count as saved.  Returns false where they cannot be read as a document or memory ran out: then
 * the text is what it was, or (without memory) does not count as saved. */
bool bh_edit_replace(bh_edit *edit, const char *bytes, size_t length, const char *note);

/* The most frequent change: BH_EDIT_SET of `text` at `path`. */
bool bh_edit_set(bh_edit *edit, const char *path, const char *text, bh_diags *diags);

/* Could a change of this kind be made to `node` (BH_EDIT_INSERT: into it)?  If not, the reason goes
 * to `diags`.  Takes as long as a change. */
bool bh_edit_allows(const bh_edit *edit, bh_edit_kind kind, const bh_node *node, bh_diags *diags);

/* Appends what the user is to see in the field where `node` is edited, which BH_EDIT_SET takes
 * back: the value of a scalar; a list or mapping in brackets as it stands.  False for others. */
bool bh_edit_field(const bh_edit *edit, const bh_node *node, bh_text *into);

/* --- history --- */

/* One step.  Belongs to the edit; good until the next change. */
typedef struct {
    const char *text; /* "beam.current: 20 uA -> 30 uA", at most some 100 bytes */
    const char *path; /* of what changed first: as it is called after the step; "" for none left */
    int line;         /* [1] the first line that changed, from 1 */
    int lines_before; /* [1] how many lines there were that changed */
    int lines_after;  /* [1] and how many there are of them after the step */
} bh_edit_step;

/* How many steps there are, and how many of them are done (the others can be redone). */
size_t bh_edit_steps(const bh_edit *edit);
size_t bh_edit_done(const bh_edit *edit);

/* Step i (0 <= i < steps), or NULL. */
const bh_edit_step *bh_edit_step_at(const bh_edit *edit, size_t i);

/* Takes back the last step that is done; does the next one again.  Returns false where there is
 * none, or no memory (then said in `diags`); nothing has changed then. */
bool bh_edit_undo(bh_edit *edit, bh_diags *diags);
bool bh_edit_redo(bh_edit *edit, bh_diags *diags);

/* --- what is not saved --- */

/* The text as it is now has been saved.  False when there was no memory: then it counts as not
 * saved. */
bool bh_edit_saved(bh_edit *edit);

/* How many steps, done or undone, lie between the text and what was last saved (or opened); 0
 * exactly where the bytes are the same. */
size_t bh_edit_unsaved(const bh_edit *edit);

/* Bytes of the current text, the end excluded; from == to where something was taken away. */
typedef struct {
    size_t from, to; /* [bytes] */
} bh_edit_range;

/* Where the text differs from what was last saved: at most `room` ranges, in order and apart; more
 * are joined into the last.  Returns how many.  They cover every difference, perhaps a bit more. */
size_t bh_edit_changed(const bh_edit *edit, bh_edit_range *ranges, size_t room);

#endif
