/* nearest.h - the word that was probably meant. */
#ifndef BH_BASE_NEAREST_H
#define BH_BASE_NEAREST_H

#include <stddef.h>

/*
 * The one of `count` `words` nearest to `word`: fewest letters added, dropped, changed or swapped
 * with their neighbour, without regard to case of ASCII letters or to - against _.  At most one
 * slip for each three letters counts as near (one for words of two); a word that `word` shortens
 * (three letters or more) is near too.  The first of equals.  NULL entries are passed over.
 * Returns NULL when none is near.
 */
const char *bh_nearest(const char *word, const char *const *words, size_t count);

#endif
