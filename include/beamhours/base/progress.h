/* progress.h - how far long work has come, told to whoever asked for it. */
#ifndef BH_BASE_PROGRESS_H
#define BH_BASE_PROGRESS_H

#include <stddef.h>

/* `told` is called now and then, from the thread that works, with what is being done ("settings"),
 * and that `done` of `count` are; a count of 0: nobody knows how many there are. */
typedef struct {
    void (*told)(void *asker, const char *what, size_t done, size_t count);
    void *asker;
} bh_progress;

/* NULL may be told. */
void bh_progress_tell(const bh_progress *progress, const char *what, size_t done, size_t count);

#endif
