/* reading.h - what the files of the schema room share: one value of each kind. */
#ifndef BH_SCHEMA_READING_H
#define BH_SCHEMA_READING_H

#include "beamhours/schema/schema.h"

/* What is read, by which row. */
typedef struct {
    const bh_key *key;
    const bh_node *node; /* the value written under it */
} bh_written;

/* Adds an error about `node` at its own place. */
void bh_say_node(const bh_reading *reading, const bh_node *node, const char *fmt, ...)
    BH_PRINTF(3, 4);

/* Whether `node` is of `kind`, and no scalar without text; else complains.  */
bool bh_read_is(const bh_reading *reading, bh_written written, bh_node_kind kind);

/* Whether value [1], in the key's internal unit, is within the key's bounds; else complains. */
bool bh_read_within(const bh_reading *reading, bh_written written, double value);

/* One quantity with its bounds.  False after a complaint; `out` is then untouched. */
bool bh_read_quantity(const bh_reading *reading, bh_written written, bh_quantity *out);

/* The readers of the kinds.  `out` is the member; each fills it whole. */
void bh_read_value(const bh_reading *reading, bh_written written, bh_value *out);
void bh_read_word(const bh_reading *reading, bh_written written, bh_word *out);
void bh_read_either(const bh_reading *reading, bh_written written, bh_either *out);
void bh_read_extent(const bh_reading *reading, bh_written written, bh_extent *out);
BH_CHECKED bh_code bh_read_sweep(const bh_reading *reading, bh_written written, bh_sweep *out);
BH_CHECKED bh_code bh_read_values(const bh_reading *reading, bh_written written, bh_values *out);
BH_CHECKED bh_code bh_read_words(const bh_reading *reading, bh_written written, bh_words *out);
BH_CHECKED bh_code bh_read_table(const bh_reading *reading, bh_written written, bh_pairs *out);
BH_CHECKED bh_code bh_read_list(const bh_reading *reading, bh_written written, bh_list *out);

/* The default `text` of a key that is a bh_value or bh_either; `out` stays without one. */
void bh_read_fallback(const bh_key *key, const char *text, bh_quantity *out);

enum { BH_QUANTITY_SIZE = 96 };
/* The text that a quantity of `dimension` is written as: value [1], in its internal unit. */
const char *bh_quantity_text(double value, bh_dimension dimension, char out[BH_QUANTITY_SIZE]);

/* "a, b or c" of NULL-terminated `words`, cut to `size` bytes; returns `out`. */
const char *bh_words_text(const char *const *words, char *out, size_t size);

/* The spelling the tables use for an American one; `word` itself where there is none. */
const char *bh_british(const char *word);

#endif
