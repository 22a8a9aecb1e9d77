/* beside.c - a file replaced by another that was written beside it. */
#define _XOPEN_SOURCE 700 /* for realpath; NOLINT: the name is the standard's */
#include "beamhours/base/beside.h"

#include <dirent.h>
#include <errno.h>
#include <fcntl.h>
#include <signal.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>
#include <time.h>
#include <unistd.h>
#ifdef __linux__
#include <sys/xattr.h>
#endif

enum { TRIES = 100, NUMBERS = 48 /* bytes that two numbers and a few signs fit into */ };
enum { STALE = 3600 /* [s] a file left behind for longer than this is nobody's */ };

/* --- names --- */

size_t bh_folder_length(const char *path)
{
    const char *slash = strrchr(path, '/');
    return slash ? (size_t)(slash - path) + 1 : 0;
}

char *bh_beside_name(const char *path, const char *ending)
{
    const size_t folder = bh_folder_length(path), room = strlen(path) + strlen(ending) + 2;
    char *name = malloc(room);
    if (name)
        (void)snprintf(name, room, "%.*s.%s%s", (int)folder, path, path + folder, ending);
    return name;
}

char *bh_beside_session(const char *path, const char *ending, int number, const char *tail)
{
    char all[NUMBERS];
    if (number > 1)
        (void)snprintf(all, sizeof all, "%s-%d%s", ending, number, tail);
    else
        (void)snprintf(all, sizeof all, "%s%s", ending, tail);
    return bh_beside_name(path, all);
}

char *bh_real_path(const char *path)
{
    char *real = realpath(path, NULL);
    if (real || errno == ENOMEM)
        return real;
    const size_t size = strlen(path) + 1;
    real = malloc(size);
    return real ? memcpy(real, path, size) : NULL;
}

/* --- writing --- */

bool bh_write_all(int fd, const char *bytes, size_t length)
{
    while (length > 0) {
        const ssize_t done = write(fd, bytes, length);
        if (done < 0 && errno == EINTR)
            continue;
        if (done < 0)
            return false;
        bytes += done;
        length -= (size_t)done;
    }
    return true;
}

/* Creates a hidden file beside `path`; its name goes to `name`, room for NUMBERS more than it. */
static int open_beside(const char *path, mode_t mode, char *name)
{
    const size_t folder = bh_folder_length(path), room = strlen(path) + NUMBERS;
    int fd = -1;
    for (int i = 0; i < TRIES && fd < 0; i++) {
        (void)snprintf(name, room, "%.*s.%s.%ld-%d~", (int)folder, path, path + folder,
                       (long)getpid(), i);
        fd = open(name, O_WRONLY | O_CREAT | O_EXCL | O_CLOEXEC, mode);
        if (fd < 0 && errno != EEXIST)
            break;
    }
    return fd;
}

/* A name such as .NAME.123-0~ of a process of this host that has ended. */
static bool left_behind(const char *entry, const char *name)
{
    const size_t length = strlen(name);
    char *end = NULL;
    if (entry[0] != '.' || strncmp(entry + 1, name, length) != 0 || entry[length + 1] != '.')
        return false;
    const long process = strtol(entry + length + 2, &end, 10);
    if (process <= 0 || *end != '-' || end[1 + strspn(end + 1, "0123456789")] != '~' ||
        entry[strlen(entry) - 1] != '~')
        return false;
    return kill((pid_t)process, 0) != 0 && errno == ESRCH;
}

/* Takes away what an earlier program left beside `path` when it was killed in mid-save. */
static void sweep(const char *path, const char *folder)
{
    const char *name = path + bh_folder_length(path);
    DIR *dir = opendir(folder);
    const struct dirent *entry = NULL;
    while (dir && (entry = readdir(dir))) { /* NOLINT(concurrency-mt-unsafe): a DIR of our own */
        struct stat old;
        if (left_behind(entry->d_name, name) &&
            fstatat(dirfd(dir), entry->d_name, &old, AT_SYMLINK_NOFOLLOW) == 0 &&
            S_ISREG(old.st_mode) && old.st_uid == geteuid() && time(NULL) - old.st_mtime > STALE)
            (void)unlinkat(dirfd(dir), entry->d_name, 0);
    }
    if (dir)
        (void)closedir(dir);
}

/* Makes the renaming itself durable; a file system that cannot is no reason to complain. */
static void sync_folder(const char *folder)
{
    const int fd = open(folder, O_RDONLY | O_CLOEXEC);
    if (fd >= 0) {
        (void)fsync(fd);
        (void)close(fd);
    }
}

/* --- rights --- */

/* Copies the access list of the file at `path`; true also where it has none. */
static bool copy_access(int fd, const char *path)
{
#ifdef __linux__
    static const char name[] = "system.posix_acl_access";
    char list[4096];
    const ssize_t length = getxattr(path, name, list, sizeof list);
    if (length < 0)
        return errno == ENODATA || errno == ENOTSUP || errno == ENOENT;
    return fsetxattr(fd, name, list, (size_t)length, 0) == 0;
#else
    (void)fd;
    (void)path;
    return true;
#endif
}

/* The owner may stay another's only where the system lets us; the mode is ours to set, and gives
 * nobody more than the old one did. */
static bool take_over(int fd, const char *path, const struct stat *old)
{
    mode_t mode = old->st_mode & 07777;
    if (fchown(fd, old->st_uid, old->st_gid) != 0) {
        mode &= 01777;
        if (fchown(fd, (uid_t)-1, old->st_gid) != 0)
            mode = (mode & ~(mode_t)070) | (mode & (mode & 07) << 3);
    }
    return fchmod(fd, mode) == 0 && copy_access(fd, path);
}

/* --- replacing --- */

struct place {
    const char *path;
    char *name;   /* of the file beside it */
    char *folder; /* "." where there is none */
};

static bh_replace_result fill(const struct place *p, int fd, const bh_replacing *what,
                              struct stat *made)
{
    bool good = bh_write_all(fd, what->bytes, what->length) &&
                (!what->old || take_over(fd, p->path, what->old)) && fsync(fd) == 0 &&
                (!made || fstat(fd, made) == 0);
    int why = errno;
    if (close(fd) != 0 && good) {
        good = false;
        why = errno;
    }
    bh_replace_result result = good ? BH_REPLACED : BH_REPLACE_FAILED;
    if (good && what->still && !what->still(what->asker))
        result = BH_REPLACE_NOT_STILL;
    if (result == BH_REPLACED && rename(p->name, p->path) != 0) {
        result = BH_REPLACE_FAILED;
        why = errno;
    }
    if (result == BH_REPLACED)
        sync_folder(p->folder);
    else
        (void)unlink(p->name);
    errno = why;
    return result;
}

static bh_replace_result replace_at(const struct place *p, const bh_replacing *what,
                                    struct stat *made)
{
    sweep(p->path, p->folder);
    /* What replaces a file is for nobody else's eyes until it has the old one's rights. */
    const int fd = open_beside(p->path, what->old ? 0600 : 0666, p->name);
    return fd < 0 ? BH_REPLACE_NO_FILE : fill(p, fd, what, made);
}

bh_replace_result bh_replace(const char *path, const bh_replacing *what, struct stat *made)
{
    const size_t folder = bh_folder_length(path);
    struct place p = {path, malloc(strlen(path) + NUMBERS), malloc(folder + 2)};
    bh_replace_result result = BH_REPLACE_NO_MEMORY;
    if (p.name && p.folder) {
        (void)snprintf(p.folder, folder + 2, "%.*s", (int)(folder ? folder : 1),
                       folder ? path : ".");
        result = replace_at(&p, what, made);
    }
    const int why = errno;
    free(p.name);
    free(p.folder);
    errno = why;
    return result;
}
