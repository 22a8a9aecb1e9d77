/* bench_screen.c - from a key to the finished screen, through a pseudo-terminal; bytes sent; idle.
 */
#include <stdio.h>
#include <stdlib.h>
#include <string.h>
#include <time.h>
#include <unistd.h>

#include "../bench/bench.h"
#include "../suite.h"
#include "beamhours/base/text.h"
#include "tty.h"

/* What the screen promises on a machine of two ordinary cores. */
static const double most_median = 8, most_p99 = 16, most_rest = 50, most_bytes = 4096;

enum { MOST_KEYS = 400, SILENCE = 60 };

static double wall(void)
{
    struct timespec t;
    clock_gettime(CLOCK_MONOTONIC, &t);
    return (double)t.tv_sec + 1e-9 * (double)t.tv_nsec;
}

/* Windows, background, energy loss, radiation, cuts: all that is corrected for. */
static void write_plan(const tty *t, int settings)
{
    bh_text text = {0};
    bh_text_append(
        &text, "plan: 1\n"
               "beam: {particle: electron, kinetic_energy: 855 MeV, current: 20 uA}\n"
               "target:\n  name: cell\n  scatterer: H\n  empty_target: {share: 10 %}\n  layers:\n"
               "    - {material: aluminium, thickness: 0.1 mm, role: window}\n"
               "    - {material: liquid-hydrogen, thickness: 50 mm, density_loss: 0.02 %/uA}\n"
               "    - {material: aluminium, thickness: 0.1 mm, role: window}\n"
               "  wall: {radius: 35 mm, material: aluminium, thickness: 0.2 mm}\n"
               "arms:\n"
               "  - {name: A, in_plane: \u00B128 mrad, out_of_plane: \u00B170 mrad, bins: 20,\n"
               "     momentum_bite: \u00B14.5 %, dead_time: 5 us, energy_cut: 15 MeV, target_view: "
               "\u00B160 mm}\n"
               "settings:\n");
    for (int i = 0; i < settings; i += 10)
        bh_text_appendf(
            &text,
            "  - {name: K%d, angle: {from: %.3f deg, to: %.3f deg, count: 10}, goal: 1 %%}\n",
            i / 10 + 1, 15 + 80.0 * i / settings, 15 + 80.0 * (i + 9.5) / settings);
    bh_text_append(&text, "schedule: {available: 30 d}\n");
    tty_write(t, "plan.yaml", text.bytes);
    bh_text_free(&text);
}

struct times {
    double view[MOST_KEYS], all[MOST_KEYS], bytes; /* [ms], [ms], largest */
    int count;
};

/* Is what is in view computed? */
static bool in_view(const tty *t)
{
    const int row = tty_find_row(t, "computing");
    return row < 0 || strstr(tty_row(t, row), "computing ") != NULL;
}

/* One key: until the rows in view are exact, and until nothing more is sent. */
static void press(tty *t, const char *key, struct times *times)
{
    const double start = wall();
    double last = start, view = -1;
    t->received = 0;
    tty_type(t, key);
    while (tty_pump(t, SILENCE) || tty_shows(t, "computing")) {
        last = wall();
        if (view < 0 && in_view(t))
            view = last;
        if (t->ended || last - start > 20)
            break;
    }
    if (t->received == 0 || times->count == MOST_KEYS)
        return; /* nothing changed on the screen: no answer was due */
    times->view[times->count] = 1e3 * ((view < 0 ? last : view) - start);
    times->all[times->count++] = 1e3 * (last - start);
    times->bytes = (double)t->received > times->bytes ? (double)t->received : times->bytes;
    if (getenv("BENCH_KEYS"))
        printf("      %-10s %7.2f ms %7.2f ms %6zu bytes\n", key, times->view[times->count - 1],
               times->all[times->count - 1], t->received);
}

static int by_size(const void *a, const void *b)
{
    const double x = *(const double *)a, y = *(const double *)b;
    return (x > y) - (x < y);
}

static double quantile(const double *values, int count, double q)
{
    static double sorted[MOST_KEYS];
    memcpy(sorted, values, (size_t)count * sizeof *values);
    qsort(sorted, (size_t)count, sizeof *sorted, by_size);
    const int i = (int)(q * (count - 1) + 0.999);
    return sorted[i < count ? i : count - 1];
}

/* What someone does who asks "what if": types values, looks around, takes changes back. */
static void work(tty *t, struct times *times, int rounds)
{
    static const char *const keys[] = {/* the goal of a sweep */
                                       "l", "g", "o", "a", "l", "<Escape>", "2", " ", "%",
                                       "<Enter>", "b",
                                       /* the current: every row */
                                       "<Home>", "l", "c", "u", "r", "r", "<Escape>", "2", "1", " ",
                                       "u", "A", "<Up>", "<Up>", "<Escape>",
                                       /* around in the table */
                                       "<Tab>", "<Down>", "<Down>", "<PageDown>", "<Right>",
                                       "<Right>", "o", "o", "o", "<Home>", "<Tab>"};
    for (int r = 0; r < rounds; r++)
        for (size_t i = 0; i < sizeof keys / sizeof *keys; i++)
            press(t, keys[i], times);
}

static double processor_time(pid_t pid)
{
    char path[64], line[1024];
    unsigned long user = 0, system = 0;
    snprintf(path, sizeof path, "/proc/%d/stat", (int)pid);
    FILE *f = fopen(path, "r");
    if (!f)
        return -1;
    char *got = fgets(line, sizeof line, f);
    fclose(f);
    const char *from = got ? strrchr(line, ')') : NULL;
    if (!from ||
        sscanf(from, ") %*c %*d %*d %*d %*d %*d %*u %*u %*u %*u %*u %lu %lu", &user, &system) != 2)
        return -1;
    return (double)(user + system) / (double)sysconf(_SC_CLK_TCK);
}

static void start(tty *t, int settings, int rows, int columns)
{
    tty_folder(t, NULL);
    write_plan(t, settings);
    tty_run(t, &(tty_start){.rows = rows, .columns = columns, .arguments = {"plan.yaml"}});
    tty_wait(t, "asked");
    tty_wait_gone(t, "computing");
    while (tty_pump(t, 300)) /* the curve */
        ;
}

static bool fifty(void)
{
    static struct times times;
    tty t;
    start(&t, 50, 24, 80);
    work(&t, &times, 10);
    while (tty_pump(&t, 1000)) /* the curve of the last row */
        ;
    const double before = processor_time(t.child), from = wall();
    while (wall() - from < 2)
        tty_pump(&t, 500);
    const double idle = processor_time(t.child) - before;
    printf("      %d keys, 50 settings of 20 bins: 90 %% within %.2f ms, longest %.1f ms\n",
           times.count, quantile(times.view, times.count, 0.9),
           quantile(times.view, times.count, 1));
    bool good = bench_goal("50 settings: key to rows in view, median",
                           quantile(times.view, times.count, 0.5), most_median, "ms");
    good &= bench_goal("the same, 99 of 100 keys", quantile(times.view, times.count, 0.99),
                       most_p99, "ms");
    good &= bench_goal("50 settings: key to all of it, 99 of 100 keys",
                       quantile(times.all, times.count, 0.99), most_rest, "ms");
    good &= bench_goal("processor time while nothing happens, of 2 s", idle + 1e-9, 0.02, "s");
    tty_end(&t);
    return good;
}

static bool five_hundred(void)
{
    static struct times times;
    tty t;
    start(&t, 500, 24, 80);
    work(&t, &times, 4);
    printf("      %d keys, 500 settings of 20 bins: longest %.1f ms in view, %.1f ms all\n",
           times.count, quantile(times.view, times.count, 1), quantile(times.all, times.count, 1));
    bool good = bench_goal("500 settings: key to rows in view, 99 of 100 keys",
                           quantile(times.view, times.count, 0.99), most_p99, "ms");
    good &= bench_goal("500 settings: key to all of it, 99 of 100 keys",
                       quantile(times.all, times.count, 0.99), most_rest, "ms");
    tty_end(&t);
    return good;
}

static bool large_terminal(void)
{
    static struct times times;
    tty t;
    start(&t, 50, 60, 200);
    work(&t, &times, 2);
    static const char *const keys[] = {"?", "<Escape>", "c", "<Escape>", "<Tab>",
                                       "e", "<Escape>", "w", "<Escape>", "<Tab>"};
    for (size_t i = 0; i < sizeof keys / sizeof *keys; i++)
        press(&t, keys[i], &times);
    const bool good =
        bench_goal("200x60: bytes sent for a key, largest", times.bytes, most_bytes, "bytes");
    printf("      median %.2f ms\n", quantile(times.view, times.count, 0.5));
    tty_end(&t);
    return good;
}

static bool met = true;

START_TEST(all_goals)
{
    met = fifty();
    met = large_terminal() && met;
    met = five_hundred() && met;
}
END_TEST

int main(void)
{
    setenv("CK_FORK", "no", 1); /* the pseudo-terminal's helpers are made for tests */
    TCase *tests = tcase_create("bench");
    tcase_set_timeout(tests, 600);
    tcase_add_test(tests, all_goals);
    (void)run_suite("bench_screen", tests);
    return bench_end(met);
}
