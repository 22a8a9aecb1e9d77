/* stamp.h - a file that is being worked on: has it changed since, and saving into it. */
#ifndef BH_BASE_STAMP_H
#define BH_BASE_STAMP_H

#include <stdbool.h>
#include <stddef.h>
#include <stdint.h>

#include "beamhours/base/error.h"
#include "beamhours/base/text.h"

/* What a file was when it was last read or saved.  {0} is a file that was not there. */
typedef struct {
    bool there;
    bool settled; /* it was old enough then that a further change would show in its times */
    uint64_t device, inode, size, hash; /* hash: of the content */
    int64_t changed_s, changed_ns;      /* time of the last change of content */
} bh_stamp;

/* Reads a file as bh_file_read does, and takes its stamp.  A file that changes meanwhile is read
 * again; BH_EIO when it does not come to rest. */
BH_CHECKED bh_code bh_stamp_read(const char *path, size_t limit, bh_text *into, bh_stamp *stamp,
                                 bh_error *err);

/* The fingerprint of `length` bytes that stamps carry. */
uint64_t bh_stamp_hash(const char *bytes, size_t length);

typedef enum {
    BH_FILE_SAME,      /* as it was; also where only its times or its place on disk changed */
    BH_FILE_CHANGED,   /* its content is another one, or it is there though it was not */
    BH_FILE_GONE,      /* it is not there any more */
    BH_FILE_UNREADABLE /* it cannot be looked at */
} bh_file_state;

/* Compares the file with its stamp; takes microseconds where nothing changed.  What only looks
 * changed (another time, the same content) brings the stamp up to date. */
bh_file_state bh_stamp_check(const char *path, bh_stamp *stamp);

typedef enum {
    BH_SAVE_DONE,
    BH_SAVE_CHANGED,   /* the file changed on disk since the stamp was taken */
    BH_SAVE_GONE,      /* it was taken away or renamed since */
    BH_SAVE_READ_ONLY, /* it, or its folder, may not be written */
    BH_SAVE_UNFIT,     /* a folder, a device, a second hard link, a link to nothing */
    BH_SAVE_FULL,      /* the disk, or what the user may have of it, is full */
    BH_SAVE_FAILED     /* anything else, no memory included */
} bh_save_state;

/*
 * Saves `length` bytes into the file at `path`, whole or not at all: written beside it, made
 * durable, looked at whether the file is still what `stamp` says, renamed over it, and the folder
 * made durable.  Mode, owner, group, access list and symbolic links stay; a file that was not there
 * gets the usual mode.  In every case but BH_SAVE_DONE the file is untouched, no other file is left
 * behind, and `err` (may be NULL) says why in one sentence and what would do.  After BH_SAVE_DONE
 * `stamp` is that of the new file.
 * To save over what changed or went away: bh_stamp_accept, then save.
 */
BH_CHECKED bh_save_state bh_stamp_save(const char *path, const char *bytes, size_t length,
                                       bh_stamp *stamp, bh_error *err);

/* Takes the file as it is on disk now, or that it is not there, for known. */
BH_CHECKED bh_code bh_stamp_accept(const char *path, bh_stamp *stamp, bh_error *err);

/* The same question as bh_stamp_save would ask before writing: could the file be saved at all?
 * BH_SAVE_DONE where it could; nothing is written. */
bh_save_state bh_stamp_may_save(const char *path, bh_error *err);

#endif
