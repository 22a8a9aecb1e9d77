/* faults.h - lets the k-th call for memory or to the disk fail, for tests named *_faults.c.
 *
 * The Makefile links these with --wrap; the YAML library asks for memory through functions of its
 * own, which are replaced here too. */
#ifndef TESTS_FAULTS_H
#define TESTS_FAULTS_H

#include <errno.h>
#include <stdbool.h>
#include <stdlib.h>
#include <string.h>
#include <unistd.h>

static long fault_at;    /* which call is to fail, counted from 1; 0: none */
static long fault_calls; /* calls so far */
static bool fault_hit;   /* has one failed? */
static int fault_number; /* what errno then is; 0: EIO or ENOMEM */
static bool fault_disk;  /* do calls to the disk count, instead of those for memory? */

static inline void fail_at(long call, bool disk)
{
    fault_at = call;
    fault_calls = 0;
    fault_hit = false;
    fault_disk = disk;
}

static inline bool fails(bool disk)
{
    if (disk != fault_disk || fault_at == 0 || ++fault_calls != fault_at)
        return false;
    fault_hit = true;
    errno = disk ? EIO : ENOMEM;
    if (fault_number)
        errno = fault_number;
    return true;
}

void *__real_malloc(size_t size);
void *__real_calloc(size_t count, size_t size);
void *__real_realloc(void *old, size_t size);
ssize_t __real_write(int fd, const void *bytes, size_t length);
int __real_fsync(int fd);
int __real_fchmod(int fd, mode_t mode);
int __real_close(int fd);
int __real_rename(const char *from, const char *to);

void *__wrap_malloc(size_t size);
void *__wrap_calloc(size_t count, size_t size);
void *__wrap_realloc(void *old, size_t size);
ssize_t __wrap_write(int fd, const void *bytes, size_t length);
int __wrap_fsync(int fd);
int __wrap_fchmod(int fd, mode_t mode);
int __wrap_close(int fd);
int __wrap_rename(const char *from, const char *to);

void *__wrap_malloc(size_t size)
{
    return fails(false) ? NULL : __real_malloc(size);
}

void *__wrap_calloc(size_t count, size_t size)
{
    return fails(false) ? NULL : __real_calloc(count, size);
}

void *__wrap_realloc(void *old, size_t size)
{
    return fails(false) ? NULL : __real_realloc(old, size);
}

ssize_t __wrap_write(int fd, const void *bytes, size_t length)
{
    return fails(true) ? -1 : __real_write(fd, bytes, length > 7 ? length / 2 : length);
}

int __wrap_fsync(int fd)
{
    return fails(true) ? -1 : __real_fsync(fd);
}

int __wrap_fchmod(int fd, mode_t mode)
{
    return fails(true) ? -1 : __real_fchmod(fd, mode);
}

int __wrap_close(int fd)
{
    const bool failed = fails(true);
    const int closed = __real_close(fd);
    return failed ? -1 : closed;
}

int __wrap_rename(const char *from, const char *to)
{
    return fails(true) ? -1 : __real_rename(from, to);
}

/* What the YAML library calls; the linker lets the program's own come first. */
#define SHOWN __attribute__((visibility("default")))
SHOWN void *yaml_malloc(size_t size);
SHOWN void *yaml_realloc(void *old, size_t size);
SHOWN unsigned char *yaml_strdup(const unsigned char *text);

void *yaml_malloc(size_t size)
{
    return __wrap_malloc(size ? size : 1);
}

void *yaml_realloc(void *old, size_t size)
{
    return old ? __wrap_realloc(old, size ? size : 1) : yaml_malloc(size);
}

unsigned char *yaml_strdup(const unsigned char *text)
{
    const size_t size = text ? strlen((const char *)text) + 1 : 0;
    unsigned char *copy = text ? yaml_malloc(size) : NULL;
    return copy ? memcpy(copy, text, size) : NULL;
}

#endif
