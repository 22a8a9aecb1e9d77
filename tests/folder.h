/* folder.h - a folder of its own for each test, empty, and gone afterwards. */
#ifndef TESTS_FOLDER_H
#define TESTS_FOLDER_H

#include <check.h>
#include <dirent.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>
#include <sys/stat.h>
#include <sys/wait.h>
#include <unistd.h>

static char folder_name[64];

static inline void folder_enter(void)
{
    (void)strcpy(folder_name, "/tmp/beamhours_test.XXXXXX");
    ck_assert_ptr_nonnull(mkdtemp(folder_name));
    ck_assert_int_eq(chmod(folder_name, 0777), 0);
    ck_assert_int_eq(chdir(folder_name), 0);
}

/* How many files there are; with `take`, there were: they are taken away. */
static inline int folder_files(bool take)
{
    int count = 0;
    DIR *d = opendir(".");
    for (struct dirent *e = readdir(d); e; e = readdir(d)) {
        count += strcmp(e->d_name, ".") != 0 && strcmp(e->d_name, "..") != 0;
        if (take)
            (void)remove(e->d_name);
    }
    (void)closedir(d);
    return count;
}

static inline void folder_leave(void)
{
    (void)chmod(".", 0777);
    (void)folder_files(true);
    ck_assert_int_eq(chdir("/"), 0);
    ck_assert_int_eq(rmdir(folder_name), 0);
}

static inline void folder_put(const char *path, const char *text)
{
    FILE *f = fopen(path, "wb");
    ck_assert_ptr_nonnull(f);
    (void)fputs(text, f);
    (void)fclose(f);
}

/* The content of a file; "" where there is none. */
static inline const char *folder_get(const char *path)
{
    static char content[4096];
    FILE *f = fopen(path, "rb");
    content[f ? fread(content, 1, sizeof content - 1, f) : 0] = '\0';
    if (f)
        (void)fclose(f);
    return content;
}

/* What `work` returns in a process of its own, not the superuser's. */
static inline int folder_as_nobody(int (*work)(void))
{
    int status = 0;
    const pid_t child = fork();
    if (child == 0) {
        if (geteuid() == 0 && (setgid(65534) != 0 || setuid(65534) != 0))
            _exit(99);
        _exit(work());
    }
    ck_assert_int_eq(waitpid(child, &status, 0), child);
    return WIFEXITED(status) ? WEXITSTATUS(status) : 98;
}

#endif
