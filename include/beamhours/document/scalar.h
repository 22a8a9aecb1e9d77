/* scalar.h - the small print of YAML texts: comments that cut them, blanks behind them, escapes. */
#ifndef BH_DOCUMENT_SCALAR_H
#define BH_DOCUMENT_SCALAR_H

#include <stdbool.h>
#include <stddef.h>
#include <stdint.h>
#include <yaml.h>

#include "beamhours/document/node.h"

/* How the text, list or mapping is written that an event of the parser begins. */
bh_node_style bh_event_style(const yaml_event_t *event);

/* Has the document that begins lines with % before it? */
bool bh_event_directives(const yaml_event_t *event);

/* Is there nothing at all, as behind `key:` at the end of a line, or no node? */
bool bh_node_empty(const bh_node *node);

/* Of the NUL-terminated `bytes`, the plain text from byte `from` to `to` was read: is it followed
 * by a `#` that looks like part of it, as in `Run #3`?  A comment has a blank on both sides, or
 * more than one before it, or stands behind a quantity and begins with a letter. */
bool bh_scalar_looks_cut(const char *bytes, size_t from, size_t to);

/* The end of a text from `from` to `to`, blanks and line ends behind it left out; above `from`. */
size_t bh_scalar_trimmed(const char *bytes, size_t from, size_t to);

/* Holds the value a character that only an escape can have written?  Then `point` is the first. */
bool bh_scalar_hidden(const char *text, size_t length, uint32_t *point);

/* `{a: 1,5 cm}` is read as a value `1` and a key `5 cm` without one: are `value` and `key` such? */
bool bh_scalar_comma_parts(const bh_node *value, const bh_node *key);

/* Copies as much of `text` as fits into `size` bytes (at least 8); "..." marks a cut. */
void bh_scalar_short(const char *text, char *out, size_t size);

#endif
