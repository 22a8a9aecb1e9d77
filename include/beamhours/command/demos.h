/* demos.h - the demonstration plans that come with the program. */
#ifndef BH_COMMAND_DEMOS_H
#define BH_COMMAND_DEMOS_H

#include <stddef.h>

#include "beamhours/base/arena.h"
#include "beamhours/base/text.h"

enum { BH_MOST_DEMOS = 256 };

/* Names of the demonstrations, sorted, without ".yaml". */
typedef struct {
    char folder[4096];
    bh_arena *arena; /* of the names */
    char *name[BH_MOST_DEMOS];
    size_t count;
} bh_demos;

/* Lists them; free the arena, also after a failure.  Returns 0, or the exit status after saying
 * why.
 */
int bh_demos_find(bh_demos *demos);

/* Appends the text of the i-th.  Returns as above. */
int bh_demos_read(const bh_demos *demos, size_t i, bh_text *out);

/* Appends the title that a plan's text has, if any. */
void bh_demos_title(const bh_text *bytes, bh_text *out);

#endif
