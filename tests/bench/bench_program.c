/* bench_program.c - the same average as a NumPy script, and a demo plan from start to finish. */
#include <fcntl.h>
#include <math.h>
#include <string.h>
#include <sys/wait.h>
#include <unistd.h>

#include "beamhours/physics/process.h"
#include "beamhours/rates/average.h"
#include "bench.h"

#define PYTHON "/usr/bin/python3"
#define SCRIPT "tests/bench/average.py"
#define PLAN   "plans/hydrogen-separation.yaml"

enum { BINS = 20, ARMS = 50, ROUNDS = 5, RUNS = 15 };

/* --- against NumPy --- */

static void cross_section(void *context, size_t n, const double *theta, double *value)
{
    const bh_encounter *x = context;
    const bh_collision in = {x->beam->mass, x->target, x->kinetic};
    bh_event event[64];
    for (size_t i = 0; i < n; i += 64) {
        const size_t now = n - i < 64 ? n - i : 64;
        bh_kinematics_batch(&in, now, theta + i, BH_BRANCH_FAST, event);
        bh_process_find("elastic")->cross_section(x, now, event, value + i);
    }
}

/* Fills the sum over all bins of all arms [ub]; microseconds per bin, the best of some rounds. */
static double averages(double *total)
{
    bh_particle massless;
    bh_structure *dipole = bh_structure_new("dipole", 1, 1, NULL);
    bh_average_workspace *workspace = bh_average_workspace_new();
    if (!dipole || !workspace || !bh_particle_find("electron", &massless))
        return -1;
    massless.mass = 0; /* as the script has it */
    bh_encounter x = {&massless, -1, 1, 1, 938.27208943, 855, dipole, 0};
    const bh_average_request request = {.function = cross_section, .context = &x};
    static bh_average bins[BINS];
    double best = HUGE_VAL;
    for (int round = 0; round < ROUNDS; round++) {
        const double start = bench_now();
        *total = 0;
        for (int i = 0; i < ARMS; i++) {
            const bh_acceptance_spec spec = {.shape = BH_ACCEPTANCE_RECTANGLE,
                                             .angle = 0.4 + 0.02 * i,
                                             .in_plane_from = -0.028,
                                             .in_plane_to = 0.028,
                                             .out_of_plane_from = -0.07,
                                             .out_of_plane_to = 0.07,
                                             .bins = BINS};
            bh_acceptance a;
            bh_averages sums = {.bins = bins};
            if (bh_acceptance_make(&spec, &a, NULL) ||
                bh_average_over(&a, &request, workspace, &sums, NULL))
                return -1;
            for (int b = 0; b < BINS; b++)
                *total += bins[b].total;
        }
        best = fmin(best, (bench_now() - start) / BINS / ARMS * 1e6);
    }
    bh_average_workspace_free(workspace);
    bh_structure_free(dipole);
    return best;
}

static bool against_numpy(void)
{
    double theirs = 0, their_total = 0, total = 0;
    FILE *script = access(PYTHON, X_OK) == 0 ? popen(PYTHON " " SCRIPT " 2>/dev/null", "r") : NULL;
    const bool told = script && fscanf(script, "%lf %lf", &theirs, &their_total) == 2;
    if (script)
        (void)pclose(script);
    const double ours = averages(&total);
    if (!told) {
        printf("SKIP  the same average in NumPy: no " PYTHON " with numpy here (ours: %.2f us a "
               "bin)\n",
               ours);
        return true;
    }
    printf("      a bin: %.3f us, in NumPy %.3f us\n", ours, theirs);
    bool met =
        bench_goal("the same average, time over that of a NumPy script", ours / theirs, 1, "");
    met &= bench_goal("its difference from the script's sum", fabs(total / their_total - 1) + 1e-18,
                      1e-6, "");
    return met;
}

/* --- the program --- */

static double wall(void)
{
    struct timespec t;
    clock_gettime(CLOCK_MONOTONIC, &t);
    return (double)t.tv_sec + 1e-9 * (double)t.tv_nsec;
}

/* Seconds of one run of the program; -1 when it fails. */
static double one_run(const char *program)
{
    const double start = wall();
    const pid_t child = fork();
    if (child == 0) {
        const int nothing = open("/dev/null", O_WRONLY);
        if (nothing >= 0) {
            (void)dup2(nothing, 1);
            (void)dup2(nothing, 2);
        }
        execl(program, "beamhours", "table", PLAN, (char *)NULL);
        _exit(127);
    }
    int status = 1;
    if (child < 0 || waitpid(child, &status, 0) != child || status != 0)
        return -1;
    return wall() - start;
}

static bool demo_plan(const char *self)
{
    char program[512];
    const char *tests = strstr(self, "/tests/");
    snprintf(program, sizeof program, "%.*s/beamhours", tests ? (int)(tests - self) : 0, self);
    double best = HUGE_VAL;
    for (int i = 0; i < RUNS; i++) {
        const double took = one_run(program);
        best = took < 0 ? -1 : fmin(best, took);
        if (best < 0)
            break;
    }
    return bench_goal("beamhours table " PLAN ", start to finish", best * 1e3, 20, "ms");
}

int main(int count, char **arguments)
{
    bool met = against_numpy();
    met &= count > 0 && demo_plan(arguments[0]);
    return bench_end(met);
}
