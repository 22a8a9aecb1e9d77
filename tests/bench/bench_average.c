/* bench_average.c - time per bin of a sum over an acceptance, against bare calls of the function.
 */
#include <math.h>

#include "beamhours/rates/average.h"
#include "beamhours/units/constants.h"
#include "bench.h"

enum { CALLS_PER_BIN = 15, BATCH = 15, MOST_BINS = 800 };

/* About what a cross section costs: a few powers and an exponential. */
static void cross_section(void *context, size_t n, const double *theta, double *value)
{
    (void)context;
    for (size_t i = 0; i < n; i++) {
        const double s2 = sin(theta[i] / 2) * sin(theta[i] / 2);
        const double recoil = 1 / (1 + 1.8 * s2);
        const double q2 = 2.9 * s2 * recoil;
        value[i] = (1 - s2) / (s2 * s2) * recoil * pow(1 + q2 / 0.71, -4) * exp(-0.1 * q2);
    }
}

static double now(void)
{
    return bench_now() * 1e9;
}

/* [ns] of one call, the best of some rounds. */
static double bare_call(void)
{
    double theta[BATCH];
    double value[BATCH];
    double best = HUGE_VAL;
    double sum = 0;
    for (int i = 0; i < BATCH; i++)
        theta[i] = 0.4 + 0.002 * i;
    for (int round = 0; round < 20; round++) {
        const double start = now();
        for (int i = 0; i < 1000; i++) {
            theta[0] += 1e-9;
            cross_section(NULL, BATCH, theta, value);
            sum += value[round % BATCH];
        }
        best = fmin(best, (now() - start) / 1000 / BATCH);
    }
    return sum > 0 ? best : 0;
}

/* [ns] per arm of `bins` bins, the best of some rounds. */
static double one_arm(bh_acceptance_spec spec, int bins, bh_average_workspace *workspace)
{
    static bh_average out[MOST_BINS];
    const bh_average_request request = {.function = cross_section};
    double best = HUGE_VAL;
    spec.bins = bins;
    const int times = 1 + 200 / bins; /* the clock costs as much as a small arm */
    for (int round = 0; round < 50; round++) {
        bh_acceptance a;
        bh_averages sums = {.bins = out};
        const double start = now();
        for (int i = 0; i < times; i++)
            if (bh_acceptance_make(&spec, &a, NULL) != BH_OK ||
                bh_average_over(&a, &request, workspace, &sums, NULL) != BH_OK ||
                !sums.whole.converged)
                exit(EXIT_FAILURE);
        best = fmin(best, (now() - start) / times);
    }
    return best;
}

int main(void)
{
    static const int counts[] = {1, 20, 200, MOST_BINS};
    const bh_acceptance_spec narrow = {.shape = BH_ACCEPTANCE_RECTANGLE,
                                       .angle = 25 * BH_DEGREE,
                                       .in_plane_from = -0.028,
                                       .in_plane_to = 0.028,
                                       .out_of_plane_from = -0.07,
                                       .out_of_plane_to = 0.07};
    const bh_acceptance_spec ring = {
        .shape = BH_ACCEPTANCE_RING, .ring_from = 20 * BH_DEGREE, .ring_to = 115 * BH_DEGREE};
    bh_average_workspace *workspace = bh_average_workspace_new();
    const double call = bare_call();
    printf("      a cross section costs %.0f ns; a bin by 5 x 3 points %.2f us\n", call,
           CALLS_PER_BIN * call / 1e3);
    bool met = workspace != NULL;
    for (int i = 0; workspace && i < 4; i++) {
        const double bare = CALLS_PER_BIN * call * counts[i];
        const double rectangle = one_arm(narrow, counts[i], workspace);
        const double round = one_arm(ring, counts[i], workspace);
        char line[80];
        snprintf(line, sizeof line, "%d bins of a rectangle over bare calls of the function",
                 counts[i]);
        met &= bench_goal(line, rectangle / bare, 4, "");
        printf("      a wide ring of as many bins %.2f\n", round / bare);
    }
    bh_average_workspace_free(workspace);
    return bench_end(met);
}
