/* crew.h - several threads that do one piece of work together. */
#ifndef BH_BASE_CREW_H
#define BH_BASE_CREW_H

#include <stddef.h>

enum { BH_MOST_HANDS = 32 };

/* Threads that wait for work.  The one that calls is one of its hands. */
typedef struct bh_crew bh_crew;

/* [1] How many hands there can be use of: one for each processor, at most BH_MOST_HANDS. */
size_t bh_crew_worthwhile(void);

/* A crew of `hands` [1] (1 to BH_MOST_HANDS), of fewer where there are not so many threads to be
 * had; its threads leave signals to others.  NULL when there is no memory; NULL may be freed. */
bh_crew *bh_crew_new(size_t hands);
void bh_crew_free(bh_crew *crew);

/* [1] Its hands. */
size_t bh_crew_hands(const bh_crew *crew);

/* Calls work(of, hand) once for each hand from 0, side by side, hand 0 in the thread that calls;
 * returns when all of them have returned.  One thread at a time. */
void bh_crew_work(bh_crew *crew, void (*work)(void *of, size_t hand), void *of);

#endif
