/* diag.h - everything there is to say about a document: all its errors and warnings, in file order.
 */
#ifndef BH_BASE_DIAG_H
#define BH_BASE_DIAG_H

#include <stdarg.h>
#include <stdbool.h>
#include <stddef.h>

#include "beamhours/base/error.h"

typedef enum { BH_SEVERITY_ERROR, BH_SEVERITY_WARNING } bh_severity;

typedef struct {
    bh_severity severity;
    bh_mark at;      /* where; `file` is the list's own copy */
    const char *key; /* dotted path of the key meant, such as "beam.current"; "plan" for the root */
    const char *text; /* one sentence: what was read; what would do */
} bh_diag;

/* A growing list.  One thread at a time. */
typedef struct bh_diags bh_diags;

/* An empty list, or NULL when there is no memory.  The caller owns it; NULL may be freed. */
bh_diags *bh_diags_new(void);
void bh_diags_free(bh_diags *diags);

/* Adds one; everything is copied.  `fmt` is a sentence of base/sentences.h.  When memory runs out
 * the list remembers that it is incomplete: one more error, the last one, then says so. */
void bh_diags_add(bh_diags *diags, bh_severity severity, bh_mark at, const char *key,
                  const char *fmt, ...) BH_PRINTF(5, 6);

/* The same for a function that was itself called with `...`. */
typedef struct {
    const char *key, *fmt;
    va_list *args; /* used up */
} bh_said;
void bh_diags_addv(bh_diags *diags, bh_severity severity, bh_mark at, bh_said said);

/* Memory ran out elsewhere while the document was being read: the list is incomplete. */
void bh_diags_lose(bh_diags *diags);

/* How many there are, how many of them are errors, and the i-th (0 <= i < count). */
size_t bh_diags_count(const bh_diags *diags);
size_t bh_diags_errors(const bh_diags *diags);
const bh_diag *bh_diags_at(const bh_diags *diags, size_t i);

/* Whether the same text at the same place is in the list; of a long list too this takes no time. */
bool bh_diags_told(bh_diags *diags, bh_mark at, const char *text);

/* The file called `name` counts as having appeared now, for the order of files. */
void bh_diags_expect(bh_diags *diags, const char *name);

/* Puts the list in file order: by line and column within a file, files in the order they first
 * appeared; equal places keep their order. */
void bh_diags_sort(bh_diags *diags);

#endif
