/* test_file.c - files are read whole, and appear whole or not at all. */
#include "../suite.h"

#include <dirent.h>
#include <fcntl.h>
#include <stdio.h>
#include <string.h>
#include <sys/stat.h>
#include <unistd.h>

#include "beamhours/base/file.h"

static char folder[] = "/tmp/test_file.XXXXXX";

static void enter(void)
{
    ck_assert_ptr_nonnull(mkdtemp(folder));
    ck_assert_int_eq(chdir(folder), 0);
}

static void leave(void)
{
    DIR *d = opendir(".");
    for (struct dirent *e = readdir(d); e; e = readdir(d))
        (void)remove(e->d_name);
    (void)closedir(d);
    ck_assert_int_eq(chdir("/"), 0);
    (void)rmdir(folder);
    strcpy(folder, "/tmp/test_file.XXXXXX");
}

static int files(void)
{
    int count = 0;
    DIR *d = opendir(".");
    for (struct dirent *e = readdir(d); e; e = readdir(d))
        count += strcmp(e->d_name, ".") != 0 && strcmp(e->d_name, "..") != 0;
    (void)closedir(d);
    return count;
}

static void put(const char *path, const char *text)
{
    FILE *f = fopen(path, "wb");
    ck_assert_ptr_nonnull(f);
    (void)fputs(text, f);
    (void)fclose(f);
}

static void demand_content(const char *path, const char *wanted)
{
    bh_text text = {0};
    ck_assert_int_eq(bh_file_read(path, 1000, &text, NULL), BH_OK);
    ck_assert_str_eq(text.bytes, wanted);
    bh_text_free(&text);
}

START_TEST(reads_up_to_its_limit)
{
    static const struct {
        size_t limit, length;
    } rows[] = {{100, 10}, {10, 10}, {9, 10}, {3, 4}, {0, 1}, {SIZE_MAX, 10}};
    put("a", "0123456789");
    for (int i = 0; i < COUNT(rows); i++) {
        bh_text text = {0};
        ck_assert_int_eq(bh_file_read("a", rows[i].limit, &text, NULL), BH_OK);
        ck_assert_uint_eq(text.length, rows[i].length);
        ck_assert_int_eq(strncmp(text.bytes, "0123456789", text.length), 0);
        ck_assert_int_eq(text.bytes[text.length], '\0');
        bh_text_free(&text);
    }
    put("empty", "");
    demand_content("empty", "");
}
END_TEST

START_TEST(reads_streams_and_appends)
{
    int ends[2];
    ck_assert_int_eq(pipe(ends), 0);
    ck_assert_int_eq((int)write(ends[1], "b\0c", 3), 3);
    (void)close(ends[1]);
    FILE *from = fdopen(ends[0], "rb");
    bh_text text = {0};
    bh_text_append(&text, "a");
    ck_assert_int_eq(bh_file_read_stream(from, "-", 100, &text, NULL), BH_OK);
    ck_assert_uint_eq(text.length, 4);
    ck_assert_mem_eq(text.bytes, "ab\0c", 5);
    bh_text_free(&text);
    (void)fclose(from);
}
END_TEST

START_TEST(says_what_cannot_be_read)
{
    bh_error err;
    bh_text text = {0};
    ck_assert_int_eq(bh_file_read("absent.yaml", 10, &text, &err), BH_EABSENT);
    ck_assert_str_eq(err.file, "absent.yaml");
    ck_assert_str_eq(err.text, "cannot be opened: No such file or directory");
    ck_assert_int_eq(bh_file_read(".", 10, &text, &err), BH_EIO);
    ck_assert_str_eq(err.text, "cannot be read: Is a directory");
    ck_assert_int_eq(bh_file_read("absent.yaml", 10, &text, NULL), BH_EABSENT);
    bh_text_free(&text);
}
END_TEST

START_TEST(writes_new_files)
{
    const mode_t mask = umask(027);
    ck_assert_int_eq(bh_file_write("new", "text", 4, NULL), BH_OK);
    (void)umask(mask);
    demand_content("new", "text");
    struct stat is;
    ck_assert_int_eq(stat("new", &is), 0);
    ck_assert_int_eq((int)(is.st_mode & 07777), 0640);
    ck_assert_int_eq(bh_file_write("empty", "", 0, NULL), BH_OK);
    demand_content("empty", "");
    ck_assert_int_eq(files(), 2);
}
END_TEST

START_TEST(replaces_and_keeps_mode_and_links)
{
    put("real", "old");
    ck_assert_int_eq(chmod("real", 0604), 0);
    ck_assert_int_eq(symlink("real", "link"), 0);
    ck_assert_int_eq(bh_file_write("./link", "new", 3, NULL), BH_OK);
    demand_content("real", "new");
    struct stat is;
    ck_assert_int_eq(lstat("link", &is), 0);
    ck_assert(S_ISLNK(is.st_mode));
    ck_assert_int_eq(stat("real", &is), 0);
    ck_assert_int_eq((int)(is.st_mode & 07777), 0604);
    ck_assert_int_eq(files(), 2);
}
END_TEST

START_TEST(writes_devices_and_pipes_directly)
{
    bh_error err;
    ck_assert_int_eq(bh_file_write("/dev/null", "x", 1, &err), BH_OK);
    struct stat is;
    ck_assert_int_eq(stat("/dev/null", &is), 0);
    ck_assert(S_ISCHR(is.st_mode));
    ck_assert_int_eq(bh_file_write("/dev/full", "x", 1, &err), BH_EIO);
    ck_assert_str_eq(err.text, "cannot be written: No space left on device");
    ck_assert_int_eq(mkfifo("pipe", 0600), 0);
    const int reader = open("pipe", O_RDONLY | O_NONBLOCK);
    ck_assert_int_eq(bh_file_write("pipe", "abc", 3, &err), BH_OK);
    char got[4] = "";
    ck_assert_int_eq((int)read(reader, got, 3), 3);
    ck_assert_str_eq(got, "abc");
    (void)close(reader);
}
END_TEST

START_TEST(refuses_what_it_may_not_replace)
{
    static const struct {
        const char *path, *begins;
    } rows[] = {
        {"folder", "is a folder"},
        {"absent/file", "cannot be created: No such file or directory"},
        {"two", "has a second name"},
        {"nowhere", "is a symbolic link to nothing"},
        {"file/below", "cannot be created: Not a directory"},
        {"", "cannot be created"},
        {"read-only", "may not be replaced"},
    };
    ck_assert_int_eq(mkdir("folder", 0700), 0);
    put("file", "old");
    put("one", "old");
    ck_assert_int_eq(link("one", "two"), 0);
    ck_assert_int_eq(symlink("absent", "nowhere"), 0);
    put("read-only", "old");
    ck_assert_int_eq(chmod("read-only", 0444), 0);
    const int root = geteuid() == 0; /* may replace anything */
    for (int i = 0; i < COUNT(rows) - root; i++) {
        bh_error err = {.code = BH_OK};
        ck_assert_int_eq(bh_file_write(rows[i].path, "new", 3, &err), BH_ECREATE);
        ck_assert_int_eq(strncmp(err.text, rows[i].begins, strlen(rows[i].begins)), 0);
        ck_assert_str_eq(err.file, rows[i].path);
        bh_error before = {.code = BH_OK}; /* asked before, it says the same */
        ck_assert_int_eq(bh_file_may_write(rows[i].path, &before), BH_ECREATE);
        ck_assert_str_eq(before.text, err.text);
        ck_assert_str_eq(before.file, rows[i].path);
    }
    static const char *const could[] = {"file", "new", "folder/new", "/dev/null"};
    for (int i = 0; i < COUNT(could); i++)
        ck_assert_int_eq(bh_file_may_write(could[i], NULL), BH_OK);
    demand_content("one", "old");
    demand_content("file", "old");
    ck_assert_int_eq(files(), 6);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("file");
    tcase_add_checked_fixture(tests, enter, leave);
    tcase_add_test(tests, reads_up_to_its_limit);
    tcase_add_test(tests, reads_streams_and_appends);
    tcase_add_test(tests, says_what_cannot_be_read);
    tcase_add_test(tests, writes_new_files);
    tcase_add_test(tests, replaces_and_keeps_mode_and_links);
    tcase_add_test(tests, writes_devices_and_pipes_directly);
    tcase_add_test(tests, refuses_what_it_may_not_replace);
    return run_suite("base/file", tests);
}
