/* test_waiting.c - a line over the one before, none before its time, none where no terminal is. */
#define _XOPEN_SOURCE 700 /* for the pseudo-terminal */
#include "../suite.h"

#include <fcntl.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>
#include <time.h>
#include <unistd.h>

#include "beamhours/command/waiting.h"

/* The writing side of a new pseudo-terminal; the other one in *reads. */
static FILE *terminal(int *reads)
{
    *reads = posix_openpt(O_RDWR | O_NOCTTY);
    ck_assert(*reads >= 0 && grantpt(*reads) == 0 && unlockpt(*reads) == 0);
    FILE *to = fopen(ptsname(*reads), "w");
    ck_assert_ptr_nonnull(to);
    ck_assert(fcntl(*reads, F_SETFL, O_NONBLOCK) == 0);
    return to;
}

static void rest(long milliseconds)
{
    const struct timespec t = {.tv_sec = milliseconds / 1000,
                               .tv_nsec = milliseconds % 1000 * 1000000};
    nanosleep(&t, NULL);
}

/* What has come since the last time. */
static const char *shown(int reads)
{
    static char got[256];
    const ssize_t n = read(reads, got, sizeof got - 1);
    got[n > 0 ? n : 0] = '\0';
    return got;
}

START_TEST(one_line_over_the_other)
{
    int reads;
    FILE *to = terminal(&reads);
    bh_waiting w;
    bh_waiting_begin(&w, to);
    bh_progress_tell(&w.progress, "settings", 1, 5000);
    ck_assert_str_eq(shown(reads), ""); /* too early */
    rest(550);
    bh_progress_tell(&w.progress, "settings", 1200, 5000);
    bh_progress_tell(&w.progress, "settings", 1201, 5000); /* too soon after it */
    ck_assert_str_eq(shown(reads), "\rworking: settings, 1200 of 5000");
    rest(150);
    bh_progress_tell(&w.progress, "pages", 0, 0);
    ck_assert_str_eq(shown(reads), "\rworking: pages                 ");
    bh_waiting_end(&w);
    ck_assert_str_eq(shown(reads), "\r              \r");
    bh_waiting_end(&w);
    ck_assert_str_eq(shown(reads), "");
    fclose(to);
    close(reads);
}
END_TEST

START_TEST(nothing_into_a_file)
{
    FILE *to = tmpfile();
    bh_waiting w;
    bh_waiting_begin(&w, to);
    rest(550);
    bh_progress_tell(&w.progress, "settings", 1, 5000);
    bh_waiting_end(&w);
    ck_assert_int_eq(ftell(to), 0);
    fclose(to);
    bh_progress_tell(NULL, "settings", 1, 5000); /* nobody asked */
    bh_progress_tell(&(bh_progress){.told = NULL}, "settings", 1, 5000);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("waiting");
    tcase_add_test(tests, one_line_over_the_other);
    tcase_add_test(tests, nothing_into_a_file);
    return run_suite("command/waiting", tests);
}
