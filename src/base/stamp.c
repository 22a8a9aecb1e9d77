/* stamp.c - a file that is being worked on: has it changed since, and saving into it. */
#include "beamhours/base/stamp.h"

#include <errno.h>
#include <fcntl.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>
#include <sys/stat.h>
#include <time.h>
#include <unistd.h>

#include "beamhours/base/beside.h"
#include "beamhours/base/file.h"

enum { READS = 5 /* until a file that keeps changing is given up */ };
enum { COARSE = 2 /* [s] the coarsest clock of a file system */ };

uint64_t bh_stamp_hash(const char *bytes, size_t length)
{
    uint64_t hash = 0xCBF29CE484222325U; /* Fowler, Noll and Vo, 64 bits, variant 1a */
    for (size_t i = 0; i < length; i++)
        hash = (hash ^ (unsigned char)bytes[i]) * 0x100000001B3U;
    return hash;
}

static bh_stamp stamp_of(const struct stat *s, uint64_t hash)
{
    return (bh_stamp){.there = true,
                      .settled = time(NULL) - s->st_mtim.tv_sec > COARSE,
                      .device = (uint64_t)s->st_dev,
                      .inode = (uint64_t)s->st_ino,
                      .size = (uint64_t)s->st_size,
                      .hash = hash,
                      .changed_s = (int64_t)s->st_mtim.tv_sec,
                      .changed_ns = (int64_t)s->st_mtim.tv_nsec};
}

static bool same_look(const bh_stamp *a, const bh_stamp *b)
{
    return a->there == b->there && a->device == b->device && a->inode == b->inode &&
           a->size == b->size && a->changed_s == b->changed_s && a->changed_ns == b->changed_ns;
}

/* --- reading --- */

/* Reads once; `rest` says whether the file looked the same before and behind. */
static bh_code read_once(const char *path, size_t limit, bh_text *into, bh_stamp *stamp, bool *rest)
{
    struct stat before, after;
    FILE *from = fopen(path, "rb");
    if (!from)
        return BH_EABSENT;
    const size_t start = into->length;
    bool good = fstat(fileno(from), &before) == 0;
    const bh_code code = bh_file_read_stream(from, path, limit, into, NULL);
    good = good && fstat(fileno(from), &after) == 0;
    const int why = errno;
    (void)fclose(from); /* it was only read */
    errno = why;
    if (code != BH_OK)
        return code;
    if (!good)
        return BH_EIO;
    const bh_stamp early = stamp_of(&before, 0);
    *stamp = stamp_of(&after, bh_stamp_hash(into->bytes + start, into->length - start));
    *rest = same_look(&early, stamp);
    return BH_OK;
}

bh_code bh_stamp_read(const char *path, size_t limit, bh_text *into, bh_stamp *stamp, bh_error *err)
{
    bh_text all = {0};
    bool rest = false;
    bh_code code = BH_OK;
    for (int i = 0; i < READS && code == BH_OK && !rest; i++) {
        all.length = 0;
        code = read_once(path, limit, &all, stamp, &rest);
    }
    if (code != BH_OK) { /* read again in the usual way, for its sentence */
        bh_text_free(&all);
        const bh_code again = bh_file_read(path, limit, &all, err);
        bh_text_free(&all);
        return again != BH_OK ? again : bh_fail(err, code, "%s", bh_code_text(code));
    }
    bh_text_append_bytes(into, all.bytes, all.length);
    bh_text_free(&all);
    if (into->failed)
        return bh_fail(err, BH_ENOMEM, "%s", bh_code_text(BH_ENOMEM));
    if (!rest)
        return bh_fail(err, BH_EIO, "changes all the time; try again when nothing writes to it");
    return BH_OK;
}

/* --- comparing --- */

/* Reads as much of the file as the stamp says there was, and one byte more. */
static bh_file_state compare_content(const char *path, bh_stamp *stamp)
{
    bh_text content = {0};
    bh_stamp now = {0};
    bool rest = false;
    const bh_code code = read_once(path, (size_t)stamp->size, &content, &now, &rest);
    bh_text_free(&content);
    if (code != BH_OK)
        return BH_FILE_UNREADABLE;
    if (now.size != stamp->size || now.hash != stamp->hash)
        return BH_FILE_CHANGED;
    *stamp = now;
    return BH_FILE_SAME;
}

/* With `closely` its content is read in any case. */
static bh_file_state check(const char *path, bh_stamp *stamp, bool closely)
{
    struct stat s;
    if (stat(path, &s) != 0) {
        if (errno != ENOENT)
            return BH_FILE_UNREADABLE;
        return stamp->there ? BH_FILE_GONE : BH_FILE_SAME;
    }
    const bh_stamp now = stamp_of(&s, 0);
    if (!stamp->there || now.size != stamp->size)
        return BH_FILE_CHANGED;
    if (same_look(&now, stamp) && stamp->settled && !closely)
        return BH_FILE_SAME;
    return compare_content(path, stamp);
}

bh_file_state bh_stamp_check(const char *path, bh_stamp *stamp)
{
    return check(path, stamp, false);
}

bh_code bh_stamp_accept(const char *path, bh_stamp *stamp, bh_error *err)
{
    bh_text content = {0};
    struct stat s;
    if (stat(path, &s) != 0 && errno == ENOENT) {
        *stamp = (bh_stamp){0};
        return BH_OK;
    }
    bh_stamp now = {0};
    const bh_code code = bh_stamp_read(path, SIZE_MAX / 8, &content, &now, err);
    bh_text_free(&content);
    if (code == BH_OK)
        *stamp = now;
    return code;
}

/* --- saving --- */

/* Says why not; `what` would do, in whole sentences. */
static bh_save_state refuse(bh_error *err, const char *path, bh_save_state state, const char *what)
{
    (void)bh_fail(err, BH_EIO, "%s", what);
    (void)bh_fail_at(err, BH_EIO, (bh_mark){.file = path});
    return state;
}

static bh_save_state refuse_number(bh_error *err, const char *path, int number, bool folder)
{
    char why[128];
    if (number == EACCES || number == EPERM || number == EROFS)
        return refuse(err, path, BH_SAVE_READ_ONLY,
                      folder ? "its folder may not be written; save under another name or change "
                               "the folder's rights"
                             : "it may not be written; save under another name or change its "
                               "rights");
    if (number == ENOSPC || number == EDQUOT || number == EFBIG)
        return refuse(err, path, BH_SAVE_FULL,
                      "the disk, or your share of it, is full; make room and save again, or save "
                      "elsewhere");
    if (strerror_r(number, why, sizeof why) != 0)
        (void)snprintf(why, sizeof why, "error %d", number);
    (void)bh_fail(err, BH_EIO, "cannot be written: %s; save again, or under another name", why);
    (void)bh_fail_at(err, BH_EIO, (bh_mark){.file = path});
    return BH_SAVE_FAILED;
}

/* The folder of a real path, for access(). */
static bool folder_writable(const char *real)
{
    const size_t length = bh_folder_length(real);
    char *folder = malloc(length + 2);
    if (!folder)
        return true; /* saving will tell */
    (void)snprintf(folder, length + 2, "%.*s", (int)length, real);
    const bool may = access(length ? folder : ".", W_OK | X_OK) == 0;
    const int why = errno;
    free(folder);
    errno = why;
    return may;
}

static bh_save_state may_replace(const char *path, const char *real, const struct stat *old,
                                 bh_error *err)
{
    if (!S_ISREG(old->st_mode))
        return refuse(err, path, BH_SAVE_UNFIT,
                      S_ISDIR(old->st_mode) ? "is a folder; give the name of a file"
                                            : "is a pipe or a device; give the name of a file");
    if (old->st_nlink > 1)
        return refuse(err, path, BH_SAVE_UNFIT,
                      "has a second name (hard link) that would keep the old content; save under "
                      "another name");
    if (access(real, W_OK) != 0) /* renaming would not ask */
        return refuse_number(err, path, errno, false);
    return folder_writable(real) ? BH_SAVE_DONE : refuse_number(err, path, errno, true);
}

/* Looks at what is there; `old` is of it where `there`. */
static bh_save_state look(const char *path, const char *real, struct stat *old, bool *there,
                          bh_error *err)
{
    *there = stat(path, old) == 0;
    if (*there)
        return may_replace(path, real, old, err);
    if (errno != ENOENT || !*path)
        return refuse_number(err, path, errno, true);
    if (lstat(path, old) == 0)
        return refuse(err, path, BH_SAVE_UNFIT, "is a symbolic link to nothing; remove it");
    return folder_writable(real) ? BH_SAVE_DONE : refuse_number(err, path, errno, true);
}

bh_save_state bh_stamp_may_save(const char *path, bh_error *err)
{
    struct stat old;
    bool there = false;
    char *real = bh_real_path(path);
    if (!real)
        return refuse(err, path, BH_SAVE_FAILED, bh_code_text(BH_ENOMEM));
    const bh_save_state state = look(path, real, &old, &there, err);
    free(real);
    return state;
}

struct asker {
    const char *path;
    bh_stamp *stamp;
    bh_file_state state;
};

/* Is the file what it was?  It is asked when the new content is ready to take its place. */
static bool still(void *asker)
{
    struct asker *a = asker;
    a->state = check(a->path, a->stamp, true);
    return a->state == BH_FILE_SAME;
}

static bh_save_state refuse_state(bh_error *err, const char *path, bh_file_state state)
{
    if (state == BH_FILE_GONE)
        return refuse(err, path, BH_SAVE_GONE,
                      "was taken away or renamed since it was read; save it anew, or under another "
                      "name");
    if (state == BH_FILE_CHANGED)
        return refuse(err, path, BH_SAVE_CHANGED,
                      "was changed on disk since it was read; save over that, read it again, or "
                      "save under another name");
    return refuse(err, path, BH_SAVE_FAILED,
                  "can no longer be read, so that a change of it would not show; save under "
                  "another name");
}

static bh_save_state save_at(struct asker *a, const char *real, const bh_replacing *what,
                             bh_error *err)
{
    struct stat made;
    switch (bh_replace(real, what, &made)) {
    case BH_REPLACED:
        *a->stamp = stamp_of(&made, bh_stamp_hash(what->bytes, what->length));
        return BH_SAVE_DONE;
    case BH_REPLACE_NO_MEMORY:
        return refuse(err, a->path, BH_SAVE_FAILED, bh_code_text(BH_ENOMEM));
    case BH_REPLACE_NOT_STILL:
        return refuse_state(err, a->path, a->state);
    case BH_REPLACE_NO_FILE:
        return refuse_number(err, a->path, errno, true);
    default:
        return refuse_number(err, a->path, errno, false);
    }
}

bh_save_state bh_stamp_save(const char *path, const char *bytes, size_t length, bh_stamp *stamp,
                            bh_error *err)
{
    struct stat old;
    bool there = false;
    struct asker asker = {path, stamp, BH_FILE_SAME};
    char *real = bh_real_path(path);
    if (!real)
        return refuse(err, path, BH_SAVE_FAILED, bh_code_text(BH_ENOMEM));
    bh_save_state state = look(path, real, &old, &there, err);
    if (state == BH_SAVE_DONE && !still(&asker))
        state = refuse_state(err, path, asker.state);
    if (state == BH_SAVE_DONE) {
        const bh_replacing what = {bytes, length, there ? &old : NULL, still, &asker};
        state = save_at(&asker, real, &what, err);
    }
    const int why = errno;
    free(real);
    errno = why;
    return state;
}
