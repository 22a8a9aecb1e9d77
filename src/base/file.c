/* file.c - whole files: read at once, written at once. */
#define _XOPEN_SOURCE 700 /* for realpath; NOLINT: the name is the standard's */
#include "beamhours/base/file.h"

#include <errno.h>
#include <fcntl.h>
#include <stdbool.h>
#include <stdint.h>
#include <stdlib.h>
#include <string.h>
#include <sys/stat.h>
#include <unistd.h>

enum { CHUNK = 16 * 1024, TRIES = 100 };

/* The sentence of an errno value, without strerror's shared buffer. */
static void reason(int number, char *out, size_t size)
{
    if (strerror_r(number, out, size) != 0)
        (void)snprintf(out, size, "error %d", number);
}

static bh_code fail(bh_error *err, bh_code code, const char *name, const char *what)
{
    char why[128];
    reason(errno, why, sizeof why);
    (void)bh_fail(err, code, "%s: %s", what, why);
    return bh_fail_at(err, code, (bh_mark){.file = name});
}

static bh_code fail_because(bh_error *err, bh_code code, const char *name, const char *why)
{
    (void)bh_fail(err, code, "%s", why);
    return bh_fail_at(err, code, (bh_mark){.file = name});
}

/* --- reading --- */

bh_code bh_file_read_stream(FILE *from, const char *name, size_t limit, bh_text *into,
                            bh_error *err)
{
    size_t left = limit < SIZE_MAX ? limit + 1 : limit;
    while (left > 0 && !feof(from) && !ferror(from)) {
        const size_t wanted = left < CHUNK ? left : CHUNK;
        char *to = bh_text_reserve(into, wanted);
        if (!to)
            return fail_because(err, BH_ENOMEM, name, bh_code_text(BH_ENOMEM));
        const size_t got = fread(to, 1, wanted, from);
        into->length += got;
        left -= got;
    }
    if (ferror(from))
        return fail(err, BH_EIO, name, "cannot be read");
    bh_text_append(into, "");
    if (into->failed)
        return fail_because(err, BH_ENOMEM, name, bh_code_text(BH_ENOMEM));
    return BH_OK;
}

bh_code bh_file_read(const char *path, size_t limit, bh_text *into, bh_error *err)
{
    FILE *from = fopen(path, "rb");
    if (!from)
        return fail(err, BH_EABSENT, path, "cannot be opened");
    const bh_code code = bh_file_read_stream(from, path, limit, into, err);
    (void)fclose(from); /* it was only read */
    return code;
}

/* --- writing --- */

struct content {
    const char *bytes;
    size_t length;
};

static bool write_all(int fd, struct content content)
{
    while (content.length > 0) {
        const ssize_t done = write(fd, content.bytes, content.length);
        if (done < 0 && errno == EINTR)
            continue;
        if (done < 0)
            return false;
        content.bytes += done;
        content.length -= (size_t)done;
    }
    return true;
}

static bh_code write_directly(const char *path, struct content content, bh_error *err)
{
    const int fd = open(path, O_WRONLY | O_CLOEXEC | O_NOCTTY);
    if (fd < 0)
        return fail(err, BH_ECREATE, path, "cannot be opened for writing");
    const bool written = write_all(fd, content);
    const int why = errno;
    const bool closed = close(fd) == 0;
    if (!written)
        errno = why;
    return written && closed ? BH_OK : fail(err, BH_EIO, path, "cannot be written");
}

/* Bytes of the folder part of `path`, its last '/' included; 0 where it has none. */
static size_t folder_length(const char *path)
{
    const char *slash = strrchr(path, '/');
    return slash ? (size_t)(slash - path) + 1 : 0;
}

/* Creates a hidden file beside `path`; its name goes to `name`, room for strlen(path) + 48. */
static int open_beside(const char *path, char *name)
{
    const size_t folder = folder_length(path), room = strlen(path) + 48;
    int fd = -1;
    for (int i = 0; i < TRIES && fd < 0; i++) {
        (void)snprintf(name, room, "%.*s.%s.%ld-%d~", (int)folder, path, path + folder,
                       (long)getpid(), i);
        fd = open(name, O_WRONLY | O_CREAT | O_EXCL | O_CLOEXEC, 0666);
        if (fd < 0 && errno != EEXIST)
            break;
    }
    return fd;
}

/* Makes the renaming itself durable; a file system that cannot is no reason to complain. */
static void sync_folder(const char *path, char *name)
{
    const size_t folder = folder_length(path);
    (void)snprintf(name, folder + 2, "%.*s", (int)folder, path);
    const int fd = open(folder ? name : ".", O_RDONLY | O_CLOEXEC);
    if (fd >= 0) {
        (void)fsync(fd);
        (void)close(fd);
    }
}

/* The owner may stay another's only where the system lets us; the mode is ours to set. */
static bool take_over(int fd, const struct stat *old)
{
    if (fchown(fd, old->st_uid, old->st_gid) != 0 && fchown(fd, (uid_t)-1, old->st_gid) != 0)
        errno = 0;
    return fchmod(fd, old->st_mode & 07777) == 0;
}

/* `old` is the file that is there, or NULL. */
static bh_code replace(const char *path, const struct stat *old, struct content content,
                       bh_error *err)
{
    char *name = malloc(strlen(path) + 48);
    if (!name)
        return fail_because(err, BH_ENOMEM, path, bh_code_text(BH_ENOMEM));
    const int fd = open_beside(path, name);
    if (fd < 0) {
        const bh_code code = fail(err, BH_ECREATE, path, "cannot be created");
        free(name);
        return code;
    }
    bool good = write_all(fd, content) && (!old || take_over(fd, old)) && fsync(fd) == 0;
    int why = errno;
    if (close(fd) != 0 && good) {
        good = false;
        why = errno;
    }
    if (good && rename(name, path) != 0) {
        good = false;
        why = errno;
    }
    if (good)
        sync_folder(path, name);
    else
        (void)unlink(name);
    free(name);
    errno = why;
    return good ? BH_OK : fail(err, BH_EIO, path, "cannot be written");
}

static bh_code replace_existing(const char *path, const struct stat *old, struct content content,
                                bh_error *err)
{
    if (S_ISDIR(old->st_mode))
        return fail_because(err, BH_ECREATE, path, "is a folder; give the name of a file");
    if (!S_ISREG(old->st_mode))
        return write_directly(path, content, err);
    if (old->st_nlink > 1)
        return fail_because(err, BH_ECREATE, path,
                            "has a second name (hard link) that would keep the old content; "
                            "give another file");
    if (access(path, W_OK) != 0) /* renaming would not ask */
        return fail(err, BH_ECREATE, path, "may not be replaced");
    char *real = realpath(path, NULL);
    if (!real)
        return fail(err, BH_ECREATE, path, "cannot be found");
    const bh_code code = replace(real, old, content, err);
    free(real);
    return code;
}

bh_code bh_file_write(const char *path, const char *bytes, size_t length, bh_error *err)
{
    const struct content content = {bytes, length};
    struct stat old;
    if (stat(path, &old) == 0)
        return replace_existing(path, &old, content, err);
    if (errno != ENOENT || !*path)
        return fail(err, BH_ECREATE, path, "cannot be created");
    if (lstat(path, &old) == 0)
        return fail_because(err, BH_ECREATE, path, "is a symbolic link to nothing; remove it");
    return replace(path, NULL, content, err);
}
