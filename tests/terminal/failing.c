/* failing.c - loaded before the C library by test_disk: lets calls to the disk fail while the
 * program runs.
 *
 * The file that FAILING names holds CALL ERRNO PART: calls of that name on a path with that part in
 * it, or on the path that stands behind a =, fail.  It may be written anew, or taken away, at any
 * time.  `half` writes half of what there is, and then nothing more. */
#define _GNU_SOURCE 1
#include <errno.h>
#include <fcntl.h>
#include <stdarg.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>
#include <sys/stat.h>
#include <sys/syscall.h>
#include <sys/types.h>
#include <unistd.h>

/* What is to fail now; false where nothing is. */
static int wanted(char call[32], int *number, char part[96])
{
    const char *file = getenv("FAILING");
    char line[192];
    if (!file)
        return 0;
    const int fd = (int)syscall(SYS_openat, AT_FDCWD, file, O_RDONLY | O_CLOEXEC);
    if (fd < 0)
        return 0;
    const ssize_t n = read(fd, line, sizeof line - 1);
    (void)syscall(SYS_close, fd);
    line[n > 0 ? n : 0] = '\0';
    return sscanf(line, "%31s %d %95s", call, number, part) == 3;
}

/* Is this call to fail?  errno then says why. */
static int fails_at(const char *name, const char *path)
{
    const int kept = errno;
    char call[32], part[96];
    int number = 0;
    const int yes = wanted(call, &number, part) && strcmp(call, name) == 0 &&
                    (part[0] == '=' ? strcmp(path, part + 1) == 0 : strstr(path, part) != NULL);
    errno = yes ? number : kept;
    return yes;
}

static int fails(const char *name, int fd)
{
    const int kept = errno;
    char link[64], path[4096];
    snprintf(link, sizeof link, "/proc/self/fd/%d", fd);
    const ssize_t n = readlink(link, path, sizeof path - 1);
    path[n > 0 ? n : 0] = '\0';
    errno = kept;
    return fails_at(name, path);
}

int open(const char *path, int flags, ...)
{
    va_list rest;
    va_start(rest, flags);
    const unsigned mode = flags & O_CREAT ? va_arg(rest, unsigned) : 0;
    va_end(rest);
    return fails_at("open", path) ? -1 : (int)syscall(SYS_openat, AT_FDCWD, path, flags, mode);
}

ssize_t write(int fd, const void *bytes, size_t length)
{
    struct stat file;
    if (fails("write", fd))
        return -1;
    if (fails("half", fd)) {
        if (length < 2 || fstat(fd, &file) != 0 || file.st_size > 0)
            return -1;
        length /= 2;
    }
    return syscall(SYS_write, fd, bytes, length);
}

int fsync(int fd)
{
    return fails("fsync", fd) ? -1 : (int)syscall(SYS_fsync, fd);
}

int fchmod(int fd, mode_t mode)
{
    return fails("fchmod", fd) ? -1 : (int)syscall(SYS_fchmod, fd, mode);
}

int close(int fd)
{
    const int failed = fails("close", fd), number = errno;
    const int done = (int)syscall(SYS_close, fd);
    if (failed)
        errno = number;
    return failed ? -1 : done;
}

int rename(const char *from, const char *to)
{
    return fails_at("rename", to) ? -1
                                  : (int)syscall(SYS_renameat2, AT_FDCWD, from, AT_FDCWD, to, 0);
}
