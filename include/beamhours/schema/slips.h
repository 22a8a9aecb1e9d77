/* slips.h - keys that people write from habit, and what they mean here. */
#ifndef BH_SCHEMA_SLIPS_H
#define BH_SCHEMA_SLIPS_H

#include <stddef.h>

/* The one of `count` `names` that `word` stands for by habit ("theta" for angle), or NULL. */
const char *bh_slip(const char *word, const char *const *names, size_t count);

#endif
