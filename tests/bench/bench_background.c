/* bench_background.c - time of one integral over a momentum bite, of each background. */
#include <stdio.h>
#include <time.h>

#include "beamhours/physics/background.h"
#include "beamhours/units/constants.h"

enum { TURNS = 3000 };

static double seconds(void)
{
    struct timespec now;
    (void)clock_gettime(CLOCK_MONOTONIC, &now);
    return (double)now.tv_sec + 1e-9 * (double)now.tv_nsec;
}

int main(void)
{
    static const struct {
        const char *row, *beam;
        int z, a;
        double kinetic, degrees, from, to; /* [MeV] [deg] [MeV/c] */
    } rows[] = {
        {"quasi-elastic", "electron", 6, 12, 855.0, 40.0, 700.0, 800.0},
        {"quasi-elastic", "electron", 82, 208, 855.0, 40.0, 100.0, 855.0},
        {"inelastic", "electron", 1, 1, 4000.0, 25.0, 1800.0, 2400.0},
        {"inelastic", "electron", 1, 2, 10000.0, 20.0, 1000.0, 6000.0},
        {"atomic-electrons", "electron", 6, 12, 855.0, 2.0, 100.0, 855.0},
        {"knock-on", "muon-", 6, 12, 855.0, 20.0, 0.0, 855.0},
    };
    for (size_t i = 0; i < sizeof rows / sizeof rows[0]; i++) {
        bh_particle beam;
        if (!bh_particle_find(rows[i].beam, &beam))
            return 1;
        const bh_encounter x = {
            .beam = &beam, .z = rows[i].z, .a = rows[i].a, .kinetic = rows[i].kinetic};
        const bh_background *b = bh_background_find(rows[i].row);
        double value = 0.0;
        bh_background_validity validity;
        const double start = seconds();
        for (int turn = 0; turn < TURNS; turn++) {
            const bh_momentum_range range = {(rows[i].degrees + 1e-4 * turn) * BH_DEGREE,
                                             rows[i].from, rows[i].to};
            b->momentum_integral(&x, &range, &value, &validity);
        }
        const double took = (seconds() - start) * 1e9 / TURNS;
        printf("%-18s %-8s z %2d %8.0f ns an integral\n", b->name, beam.name, rows[i].z, took);
    }
    return 0;
}
