/* test_presence.c - who has a file open, and marks of programs that have ended. */
#include "../suite.h"

#include <signal.h>
#include <stdbool.h>

#include "../folder.h"

#include "beamhours/base/presence.h"

/* Another process that has the file open until it is told to end, by closing the pipe. */
struct session {
    pid_t process;
    int end[2], ready[2];
};

static struct session start(const char *path, bool insist, bool killed)
{
    struct session s;
    char byte = 0;
    ck_assert(pipe(s.end) == 0 && pipe(s.ready) == 0);
    s.process = fork();
    if (s.process == 0) {
        bh_presence *mark = NULL;
        bh_other other;
        (void)close(s.end[1]);
        if (bh_presence_open(path, insist, &mark, &other, NULL) != BH_PRESENCE_ALONE)
            _exit(1);
        if (write(s.ready[1], "x", 1) != 1 || read(s.end[0], &byte, 1) != 0)
            _exit(2);
        if (!killed)
            bh_presence_close(mark);
        _exit(0);
    }
    ck_assert_int_eq(read(s.ready[0], &byte, 1), 1);
    return s;
}

static struct session begin(const char *path, bool killed)
{
    return start(path, false, killed);
}

static struct session begin_beside(const char *path)
{
    return start(path, true, false);
}

static void end(struct session *s)
{
    int status = 0;
    (void)close(s->end[1]);
    ck_assert_int_eq(waitpid(s->process, &status, 0), s->process);
    ck_assert(WIFEXITED(status) && WEXITSTATUS(status) == 0);
    (void)close(s->end[0]);
    (void)close(s->ready[0]);
    (void)close(s->ready[1]);
}

static bh_presence_state look(const char *path, bool insist, bh_other *other)
{
    bh_presence *mark = NULL;
    const bh_presence_state state = bh_presence_open(path, insist, &mark, other, NULL);
    ck_assert_ptr_nonnull(mark);
    ck_assert_int_eq(bh_presence_ours(mark), state == BH_PRESENCE_ALONE);
    bh_presence_close(mark);
    return state;
}

START_TEST(one_session_at_a_time)
{
    bh_other other;
    folder_put("p.yaml", "a: 1\n");
    struct session s = begin("p.yaml", false);
    ck_assert_int_eq(look("./p.yaml", false, &other), BH_PRESENCE_OTHER);
    ck_assert(other.here && other.process == (long)s.process);
    ck_assert(time(NULL) - other.since < 60 && other.host[0]);
    ck_assert_int_eq(look("p.yaml", false, &other), BH_PRESENCE_OTHER);
    end(&s);
    ck_assert_int_eq(folder_files(false), 1);
    ck_assert_int_eq(look("p.yaml", false, &other), BH_PRESENCE_ALONE);
    ck_assert_int_eq(folder_files(false), 1);
    bh_presence_close(NULL);
}
END_TEST

START_TEST(a_killed_session_leaves_a_stale_mark)
{
    bh_other other;
    struct session s = begin("p.yaml", true);
    end(&s);
    ck_assert_str_ne(folder_get(".p.yaml.open"), "");
    ck_assert_int_eq(look("p.yaml", false, &other), BH_PRESENCE_ALONE);
    ck_assert_int_eq(other.process, 0);
    ck_assert_int_eq(folder_files(false), 0);
}
END_TEST

START_TEST(who_insists_is_the_second)
{
    bh_other other;
    bh_presence *mark = NULL, *none = NULL;
    struct session s = begin("p.yaml", false);
    ck_assert_int_eq(bh_presence_open("p.yaml", true, &mark, &other, NULL), BH_PRESENCE_ALONE);
    ck_assert_int_eq(bh_presence_number(mark), 2);
    ck_assert_int_eq(folder_files(false), 2);
    ck_assert(bh_presence_held("p.yaml", 1) && !bh_presence_held("p.yaml", 3));
    ck_assert_int_eq(bh_presence_take("p.yaml", 1, &none, NULL), BH_PRESENCE_OTHER);
    bh_presence_close(none);
    end(&s);
    ck_assert_str_eq(folder_get(".p.yaml.open"), "");
    ck_assert(bh_presence_ours(mark) && !bh_presence_held("p.yaml", 1));
    ck_assert_str_eq(bh_presence_path(mark) + strlen(bh_presence_path(mark)) - 14,
                     ".p.yaml.open-2");
    ck_assert_int_eq(remove(".p.yaml.open-2"), 0);
    ck_assert(!bh_presence_ours(mark));
    bh_presence_close(mark);
}
END_TEST

/* The first is gone: the second still counts, and a third is told of it. */
START_TEST(any_of_several_counts)
{
    bh_other other;
    struct session first = begin("p.yaml", false);
    struct session second = begin_beside("p.yaml");
    int status = 0;
    ck_assert_int_eq(kill(first.process, SIGKILL), 0);
    ck_assert_int_eq(waitpid(first.process, &status, 0), first.process);
    ck_assert_int_eq(look("p.yaml", false, &other), BH_PRESENCE_OTHER);
    ck_assert_int_eq(other.process, (long)second.process);
    ck_assert(bh_presence_held("p.yaml", 2));
    end(&second);
    ck_assert_int_eq(look("p.yaml", false, &other), BH_PRESENCE_ALONE);
    ck_assert_int_eq(folder_files(false), 0);
}
END_TEST

/* Unsaved work of a session that ended keeps its number, however many there are. */
START_TEST(numbers_with_work_stay_free)
{
    bh_other other;
    bh_error err;
    bh_presence *mark = NULL;
    folder_put(".p.yaml.unsaved", "a: 1\n");
    ck_assert_int_eq(bh_presence_open("p.yaml", false, &mark, &other, NULL), BH_PRESENCE_ALONE);
    ck_assert_int_eq(bh_presence_number(mark), 2);
    bh_presence_close(mark);
    ck_assert_int_eq(bh_presence_take("p.yaml", 1, &mark, NULL), BH_PRESENCE_ALONE);
    ck_assert(bh_presence_number(mark) == 1 && bh_presence_ours(mark));
    bh_presence_close(mark);
    for (int i = 2; i <= BH_MOST_SESSIONS; i++) {
        char name[32];
        (void)snprintf(name, sizeof name, ".p.yaml.unsaved-%d", i);
        folder_put(name, "a: 1\n");
    }
    ck_assert_int_eq(bh_presence_open("p.yaml", false, &mark, &other, &err), BH_PRESENCE_UNKNOWN);
    ck_assert_ptr_nonnull(strstr(err.text, "too much unsaved work"));
    ck_assert_int_eq(bh_presence_number(mark), 0);
    bh_presence_close(mark);
}
END_TEST

START_TEST(marks_of_other_hosts_are_believed)
{
    bh_other other;
    folder_put(".p.yaml.open", "17 1700000000 another-host\n");
    ck_assert_int_eq(look("p.yaml", false, &other), BH_PRESENCE_OTHER);
    ck_assert(!other.here && other.process == 17 && other.since == 1700000000);
    ck_assert_str_eq(other.host, "another-host");
    ck_assert_str_eq(folder_get(".p.yaml.open"), "17 1700000000 another-host\n");
    ck_assert_int_eq(look("p.yaml", true, &other), BH_PRESENCE_ALONE);
    folder_put(".p.yaml.open", "what is this\n");
    ck_assert_int_eq(look("p.yaml", false, &other), BH_PRESENCE_ALONE);
}
END_TEST

START_TEST(no_mark_can_be_made)
{
    bh_other other;
    bh_error err;
    bh_presence *mark = NULL;
    ck_assert_int_eq(bh_presence_open("no/such/p", false, &mark, &other, &err),
                     BH_PRESENCE_UNKNOWN);
    ck_assert_int_eq(strncmp(err.text, "cannot be marked as open here: ", 31), 0);
    ck_assert(!bh_presence_ours(mark));
    bh_presence_close(mark);
    ck_assert_int_eq(mkdir(".q.open", 0777), 0);
    ck_assert_int_eq(look("q", false, &other), BH_PRESENCE_UNKNOWN);
}
END_TEST

static int look_as_nobody(void)
{
    bh_other other;
    return (int)look("p", false, &other);
}

START_TEST(where_it_may_not_be_written)
{
    ck_assert_int_eq(chmod(".", 0555), 0);
    ck_assert_int_eq(folder_as_nobody(look_as_nobody), BH_PRESENCE_UNKNOWN);
    ck_assert_int_eq(chmod(".", 0777), 0);
    if (geteuid() != 0)
        return;
    struct session s = begin("p", false);
    ck_assert_int_eq(chmod(".p.open", 0644), 0);
    ck_assert_int_eq(folder_as_nobody(look_as_nobody), BH_PRESENCE_OTHER);
    end(&s);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("presence");
    tcase_add_checked_fixture(tests, folder_enter, folder_leave);
    tcase_add_test(tests, one_session_at_a_time);
    tcase_add_test(tests, a_killed_session_leaves_a_stale_mark);
    tcase_add_test(tests, who_insists_is_the_second);
    tcase_add_test(tests, any_of_several_counts);
    tcase_add_test(tests, numbers_with_work_stay_free);
    tcase_add_test(tests, marks_of_other_hosts_are_believed);
    tcase_add_test(tests, no_mark_can_be_made);
    tcase_add_test(tests, where_it_may_not_be_written);
    return run_suite("base/presence", tests);
}
