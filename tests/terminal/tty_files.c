/* tty_files.c - the folder that a program in a pseudo-terminal runs in. */
#define _GNU_SOURCE 1
#include <errno.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>
#include <unistd.h>

#include "beamhours/base/text.h"
#include "tty.h"

static void path_of(const tty *t, const char *name, char out[256])
{
    snprintf(out, 256, "%s/%s", t->folder, name);
}

void tty_write(const tty *t, const char *name, const char *text)
{
    char path[256];
    path_of(t, name, path);
    FILE *f = fopen(path, "w");
    ck_assert_ptr_nonnull(f);
    ck_assert_int_ge(fputs(text, f), 0);
    ck_assert_int_eq(fclose(f), 0);
}

static char *read_path(const char *path)
{
    bh_text text = {0};
    char bytes[4096];
    size_t n = 0;
    FILE *f = fopen(path, "r");
    ck_assert_msg(f != NULL, "%s: %s", path, strerror(errno));
    while ((n = fread(bytes, 1, sizeof bytes, f)) > 0)
        bh_text_append_bytes(&text, bytes, n);
    fclose(f);
    bh_text_append(&text, "");
    return bh_text_take(&text);
}

char *tty_read(const tty *t, const char *name)
{
    char path[256];
    path_of(t, name, path);
    return read_path(path);
}

bool tty_exists(const tty *t, const char *name)
{
    char path[256];
    path_of(t, name, path);
    return access(path, F_OK) == 0;
}

void tty_folder(tty *t, const char *demo)
{
    *t = (tty){.master = -1};
    snprintf(t->folder, sizeof t->folder, "/tmp/beamhours-tty-XXXXXX");
    ck_assert_ptr_nonnull(mkdtemp(t->folder));
    if (!demo)
        return;
    char path[256];
    snprintf(path, sizeof path, "plans/%s.yaml", demo);
    char *text = read_path(path);
    tty_write(t, "plan.yaml", text);
    free(text);
}
