/* beside.h - a file replaced by another that was written beside it. */
#ifndef BH_BASE_BESIDE_H
#define BH_BASE_BESIDE_H

#include <stdbool.h>
#include <stddef.h>
#include <sys/stat.h>

/* What a file is to hold, and what is asked just before it takes the old one's place. */
typedef struct {
    const char *bytes;
    size_t length;              /* [bytes] */
    const struct stat *old;     /* of the file that is there; NULL where there is none */
    bool (*still)(void *asker); /* may it be replaced now?  NULL: always */
    void *asker;
} bh_replacing;

typedef enum {
    BH_REPLACED,
    BH_REPLACE_NO_MEMORY,
    BH_REPLACE_NO_FILE,  /* none can be made in the folder; errno says why */
    BH_REPLACE_FAILED,   /* writing, or making it durable, failed; errno says why */
    BH_REPLACE_NOT_STILL /* `still` said no */
} bh_replace_result;

/*
 * Makes the bytes the content of `path`, which is no symbolic link, whole or not at all: written to
 * a hidden file beside it, made durable, renamed over it, the folder made durable.  Mode, owner,
 * group and access list of the old file are kept; rights are only ever narrowed where the owner or
 * the group cannot be.  `made` (may be NULL) is what the new file is.  Unless BH_REPLACED, nothing
 * is changed or left behind.
 */
bh_replace_result bh_replace(const char *path, const bh_replacing *what, struct stat *made);

/* Writes all of it; false with errno.  May be called by a signal handler. */
bool bh_write_all(int fd, const char *bytes, size_t length);

/* Bytes of the folder part of `path`, its last '/' included; 0 where it has none. */
size_t bh_folder_length(const char *path);

/* The hidden file beside `path` that is called after it, ".NAME" and `ending`; NULL without memory.
 * The caller frees it. */
char *bh_beside_name(const char *path, const char *ending);

/* The same for one of several sessions that have `path` open: ".NAME" and `ending`, and for all but
 * the first of them "-" and its number; at the end `tail`. */
char *bh_beside_session(const char *path, const char *ending, int number, const char *tail);

/* `path` with all its symbolic links followed; a copy of it where there is no such file; NULL
 * without memory.  The caller frees it. */
char *bh_real_path(const char *path);

#endif
