/* file.h - whole files: read at once, written at once. */
#ifndef BH_BASE_FILE_H
#define BH_BASE_FILE_H

#include <stddef.h>
#include <stdio.h>

#include "beamhours/base/error.h"
#include "beamhours/base/text.h"

/*
 * Appends the bytes of the file at `path` to `into`.  Of a file longer than `limit` [bytes] one
 * byte more is read and the rest left, so that into->length > limit says it is too long (the
 * document's reader then says so at the right place).  "-" is not special.
 * Returns BH_EABSENT when the file cannot be opened, BH_EIO when it cannot be read (a folder, a
 * failing disk), BH_ENOMEM; `err` (may be NULL) names the file and the reason.
 */
BH_CHECKED bh_code bh_file_read(const char *path, size_t limit, bh_text *into, bh_error *err);

/* The same from an open stream such as standard input, called `name` in messages. */
BH_CHECKED bh_code bh_file_read_stream(FILE *from, const char *name, size_t limit, bh_text *into,
                                       bh_error *err);

/*
 * Makes `length` `bytes` the whole content of the file at `path`: it appears whole or not at all.
 * Written to a hidden file beside it, made durable, then renamed; an existing file keeps its mode
 * and, where the system allows it, its owner; a symbolic link keeps pointing where it did.  What is
 * no regular file (a terminal, a pipe, /dev/null) is written to directly.
 * Returns BH_ECREATE when the file cannot be created or may not be replaced (no such folder, a
 * folder of that name, read-only, further hard links), BH_EIO when writing failed - nothing is then
 * left behind -, BH_ENOMEM; `err` (may be NULL) names the file and the reason.
 */
BH_CHECKED bh_code bh_file_write(const char *path, const char *bytes, size_t length, bh_error *err);

/* Whether it would: BH_ECREATE with the reason when the file could not be created or replaced.
 * Writes nothing; asked before a long computation. */
BH_CHECKED bh_code bh_file_may_write(const char *path, bh_error *err);

#endif
