/* bench_structure.c - time of a form factor, in units of the exp, sin and cos it cannot do without.
 */
#include <math.h>

#include "beamhours/physics/structure.h"
#include "bench.h"

enum { POINTS = 1000, TURNS = 300 };

/* ns for one bare call of f */
static double bare(double (*f)(double))
{
    volatile double sink = 0.0;
    const double start = bench_now();
    for (int turn = 0; turn < TURNS; turn++)
        for (int i = 0; i < POINTS; i++)
            sink = f(0.013 * i);
    (void)sink;
    return (bench_now() - start) * 1e9 / (TURNS * POINTS);
}

/* ns for one value of ge2 and gm2 */
static double structured(const bh_structure *structure)
{
    static double q2[POINTS], ge2[POINTS], gm2[POINTS];
    for (int i = 0; i < POINTS; i++)
        q2[i] = 40.0 * i;
    const double start = bench_now();
    for (int turn = 0; turn < TURNS; turn++)
        bh_structure_eval(structure, POINTS, q2, ge2, gm2);
    return (bench_now() - start) * 1e9 / (TURNS * POINTS);
}

int main(void)
{
    static const struct {
        const char *name;
        int z, a;
        int exps, sines; /* calls needed: sines counts sin and cos alike */
    } rows[] = {
        {"kelly-2004", 1, 1, 0, 0},
        {"amt-2007-effective", 1, 1, 0, 0},
        {"ye-2018", 1, 1, 0, 0},
        {"a1-2014", 1, 1, 0, 0},
        {"abbott-2000-ii", 1, 2, 0, 0},
        {"amroun-1994", 2, 3, 2, 48},
        {"oscillator", 6, 12, 1, 0},
        {"helm", 82, 208, 1, 2},
        {"fermi-2p", 82, 208, 1, 2},
        {"fermi-3p", 20, 40, 1, 2},
        {"gauss-3p", 40, 90, 0, 1},
        {"fourier-bessel", 82, 208, 0, 1},
        {"sum-of-gaussians", 6, 12, 1, 22},
    };
    const double one_exp = bare(exp), one_sine = bare(sin);
    printf("%-20s %8.1f ns\n%-20s %8.1f ns\n", "exp", one_exp, "sin", one_sine);
    for (size_t i = 0; i < sizeof rows / sizeof rows[0]; i++) {
        bh_structure *structure = bh_structure_new(rows[i].name, rows[i].z, rows[i].a, NULL);
        if (!structure)
            return 1;
        const double took = structured(structure);
        const double needed = rows[i].exps * one_exp + rows[i].sines * one_sine;
        printf("%-20s %8.1f ns", rows[i].name, took);
        if (needed > 0.0)
            printf("  %5.2f of the calls it needs", took / needed);
        printf("\n");
        bh_structure_free(structure);
    }
    return 0;
}
