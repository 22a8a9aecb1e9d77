/* bench_table.c - 1,000 settings of 20 bins with windows, background and sensitivities; growth. */
#include <stdio.h>
#include <stdlib.h>
#include <string.h>
#include <sys/resource.h>
#include <time.h>

#include "beamhours/run/table.h"

/* What the run table promises on a machine of two ordinary cores, one of them used. */
static const double most_seconds = 0.25, most_mib = 64, most_growth = 1.6;

enum { REPEATS = 3, LAYERS = 32 };

struct size {
    int settings, bins, windows;
};

static double now(void)
{
    struct timespec t;
    clock_gettime(CLOCK_PROCESS_CPUTIME_ID, &t); /* other programs may be running */
    return (double)t.tv_sec + 1e-9 * (double)t.tv_nsec;
}

static double peak_mib(void)
{
    struct rusage usage;
    getrusage(RUSAGE_SELF, &usage);
    return (double)usage.ru_maxrss / 1024;
}

static void write_plan(char *text, size_t room, struct size size)
{
    size_t n = (size_t)snprintf(
        text, room,
        "plan: 1\nbeam: {particle: electron, kinetic_energy: 855 MeV, current: 10 uA}\n"
        "target:\n  name: cell\n  scatterer: H\n  empty_target: {share: 10 %%}\n  layers:\n"
        "    - {material: liquid-hydrogen, thickness: 50 mm}\n");
    for (int i = 0; i < size.windows; i++)
        n += (size_t)snprintf(text + n, room - n,
                              "    - {material: aluminium, thickness: 0.1 mm, role: window}\n");
    snprintf(text + n, room - n,
             "arms:\n  - {name: A, in_plane: ±28 mrad, out_of_plane: ±70 mrad, bins: %d,\n"
             "     momentum_bite: ±10 %%, dead_time: 5 us}\n"
             "settings:\n"
             "  - {name: K, angle: {from: 15 deg, to: 95 deg, count: %d}, goal: 1 %%}\n",
             size.bins, size.settings);
}

static bh_plan *read_plan(struct size size, bh_material_library *library)
{
    char text[16384];
    write_plan(text, sizeof text, size);
    bh_diags *diags = bh_diags_new();
    bh_plan *plan = bh_plan_read(text, strlen(text), "bench", NULL, 0, library, diags);
    for (size_t i = 0; !plan && i < bh_diags_count(diags); i++)
        fprintf(stderr, "%s\n", bh_diags_at(diags, i)->text);
    bh_diags_free(diags);
    return plan;
}

/* Seconds of the fastest of some evaluations; -1 when there is none. */
static double seconds(struct size size, bh_material_library *library)
{
    bh_plan *plan = read_plan(size, library);
    double best = -1;
    for (int i = 0; plan && i < REPEATS; i++) {
        const double start = now();
        bh_table *table = bh_table_new(plan, &(bh_evaluation){.bins = true}, NULL, NULL);
        const double took = now() - start;
        if (!table)
            break;
        bh_table_free(table);
        best = best < 0 || took < best ? took : best;
    }
    bh_plan_free(plan);
    return best;
}

/* Twice as many of one thing may take twice as long, and a little. */
static int growth(const char *what, struct size small, struct size large,
                  bh_material_library *library)
{
    const double ratio = seconds(large, library) / seconds(small, library);
    const bool linear = ratio < 2 * most_growth;
    printf("twice the %s: %.2f times as long%s\n", what, ratio, linear ? "" : ", too long");
    return !linear;
}

int main(void)
{
    static const char *const folders[] = {"materials", NULL};
    bh_material_library *library = bh_material_library_new(folders);
    const struct size full = {1000, 20, 2};
    const double took = seconds(full, library), mib = peak_mib();
    const bool fast = took > 0 && took < most_seconds, small = mib < most_mib;
    printf("1,000 settings of 20 bins: %.3f s, %.1f us a bin, at most %.0f MiB%s%s\n", took,
           took * 1e6 / 20000, mib, fast ? "" : ", too slow", small ? "" : ", too large");
    int failed = !fast || !small;
    failed |= growth("settings", (struct size){200, 20, 2}, (struct size){400, 20, 2}, library);
    failed |= growth("bins", (struct size){200, 100, 2}, (struct size){200, 200, 2}, library);
    failed |= growth("layers", (struct size){200, 20, LAYERS}, (struct size){200, 20, 2 * LAYERS},
                     library);
    bh_material_library_free(library);
    return failed ? EXIT_FAILURE : EXIT_SUCCESS;
}
