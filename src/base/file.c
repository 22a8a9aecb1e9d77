/* file.c - whole files: read at once, written at once. */
#include "beamhours/base/file.h"

#include <errno.h>
#include <fcntl.h>
#include <stdbool.h>
#include <stdint.h>
#include <stdlib.h>
#include <string.h>
#include <sys/stat.h>
#include <unistd.h>

#include "beamhours/base/beside.h"

enum { CHUNK = 16 * 1024 };

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

static bh_code write_directly(const char *path, struct content content, bh_error *err)
{
    const int fd = open(path, O_WRONLY | O_CLOEXEC | O_NOCTTY);
    if (fd < 0)
        return fail(err, BH_ECREATE, path, "cannot be opened for writing");
    const bool written = bh_write_all(fd, content.bytes, content.length);
    const int why = errno;
    const bool closed = close(fd) == 0;
    if (!written)
        errno = why;
    return written && closed ? BH_OK : fail(err, BH_EIO, path, "cannot be written");
}

/* `old` is the file that is there, or NULL. */
static bh_code replace(const char *path, const struct stat *old, struct content content,
                       bh_error *err)
{
    const bh_replacing what = {.bytes = content.bytes, .length = content.length, .old = old};
    switch (bh_replace(path, &what, NULL)) {
    case BH_REPLACED:
        return BH_OK;
    case BH_REPLACE_NO_MEMORY:
        return fail_because(err, BH_ENOMEM, path, bh_code_text(BH_ENOMEM));
    case BH_REPLACE_NO_FILE:
        return fail(err, BH_ECREATE, path, "cannot be created");
    default:
        return fail(err, BH_EIO, path, "cannot be written");
    }
}

/* Whether what is there may become another content. */
static bh_code may_replace(const char *path, const struct stat *old, bh_error *err)
{
    if (S_ISDIR(old->st_mode))
        return fail_because(err, BH_ECREATE, path, "is a folder; give the name of a file");
    if (!S_ISREG(old->st_mode))
        return BH_OK;
    if (old->st_nlink > 1)
        return fail_because(err, BH_ECREATE, path,
                            "has a second name (hard link) that would keep the old content; "
                            "give another file");
    if (access(path, W_OK) != 0) /* renaming would not ask */
        return fail(err, BH_ECREATE, path, "may not be replaced");
    return BH_OK;
}

static bh_code may_create(const char *path, bh_error *err)
{
    struct stat link;
    if (errno != ENOENT || !*path)
        return fail(err, BH_ECREATE, path, "cannot be created");
    if (lstat(path, &link) == 0)
        return fail_because(err, BH_ECREATE, path, "is a symbolic link to nothing; remove it");
    return BH_OK;
}

bh_code bh_file_may_write(const char *path, bh_error *err)
{
    struct stat old;
    if (stat(path, &old) == 0)
        return may_replace(path, &old, err);
    const bh_code code = may_create(path, err);
    if (code)
        return code;
    const size_t folder = bh_folder_length(path);
    char *name = folder ? strndup(path, folder) : strdup(".");
    if (!name)
        return fail_because(err, BH_ENOMEM, path, bh_code_text(BH_ENOMEM));
    const bool may = access(name, W_OK | X_OK) == 0;
    const int why = errno;
    free(name);
    errno = why;
    return may ? BH_OK : fail(err, BH_ECREATE, path, "cannot be created");
}

static bh_code replace_existing(const char *path, const struct stat *old, struct content content,
                                bh_error *err)
{
    bh_code code = may_replace(path, old, err);
    if (code)
        return code;
    if (!S_ISREG(old->st_mode))
        return write_directly(path, content, err);
    char *real = bh_real_path(path);
    if (!real)
        return fail_because(err, BH_ENOMEM, path, bh_code_text(BH_ENOMEM));
    code = replace(real, old, content, err);
    free(real);
    return code;
}

bh_code bh_file_write(const char *path, const char *bytes, size_t length, bh_error *err)
{
    const struct content content = {bytes, length};
    struct stat old;
    if (stat(path, &old) == 0)
        return replace_existing(path, &old, content, err);
    const bh_code code = may_create(path, err);
    return code ? code : replace(path, NULL, content, err);
}
