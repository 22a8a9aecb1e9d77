/* bench_radiative.c - nanoseconds per radiative factor, as a ratio to the bare logarithms and
 * dilogarithms that one cannot do without; and what tails cost beside it. */
#include <math.h>
#include <stdio.h>
#include <time.h>

#include "beamhours/physics/dilog.h"
#include "beamhours/physics/radiative.h"
#include "beamhours/physics/radiative_tail.h"
#include "beamhours/units/constants.h"

/* maximon-tjon: four dilogarithms for each of three pairs of momenta, three for those with a
 * particle at rest, two in the vertices; logarithms as asinh and log1p in front of them and in the
 * loops. */
enum { EVENTS = 256, ROUNDS = 400, DILOGS = 17, LOGS = 27 };

static double seconds(void)
{
    struct timespec now;
    (void)clock_gettime(CLOCK_MONOTONIC, &now);
    return (double)now.tv_sec + 1e-9 * (double)now.tv_nsec;
}

static double bare(double *sum)
{
    const double start = seconds();
    for (int r = 0; r < ROUNDS; r++)
        for (int i = 0; i < EVENTS; i++) {
            for (int k = 0; k < DILOGS; k++)
                *sum += bh_dilog(1.0 - exp2(k - 12) * (i + 1.0));
            for (int k = 0; k < LOGS; k++)
                *sum += log(k + i + 1.0 + 1e-9 * r);
        }
    return 1e9 * (seconds() - start) / ROUNDS / EVENTS;
}

int main(void)
{
    static double angle[EVENTS], factor[EVENTS];
    static bh_event event[EVENTS];
    static const char *const beams[] = {"electron", "muon-"};
    double sum = 0.0;
    const double calls = bare(&sum);
    printf("%d dilogarithms and %d logarithms %.0f ns\n", DILOGS, LOGS, calls);
    bh_structure *dipole = bh_structure_new("dipole", 1, 1, NULL);
    for (int b = 0; b < 2 && dipole; b++) {
        bh_particle beam;
        if (!bh_particle_find(beams[b], &beam))
            return 1;
        const bh_encounter x = {&beam, -1, 1, 1, BH_MASS_PROTON, 855.0, dipole, 0.0};
        const bh_collision in = {beam.mass, x.target, x.kinetic};
        for (int i = 0; i < EVENTS; i++)
            angle[i] = 0.2 + 2.5 * i / EVENTS;
        bh_kinematics_batch(&in, EVENTS, angle, BH_BRANCH_FAST, event);
        for (int k = 0; bh_radiative_at(k); k++) {
            const bh_radiative *row = bh_radiative_at(k);
            const double start = seconds();
            for (int r = 0; r < ROUNDS; r++) {
                row->factor(&x, 10.0 + 1e-6 * r, EVENTS, event, factor);
                sum += factor[r % EVENTS];
            }
            const double each = 1e9 * (seconds() - start) / ROUNDS / EVENTS;
            printf("%-8s %-12s %5.0f ns/event, %.2f times the calls\n", beams[b], row->name, each,
                   each / calls);
        }
        const double kinetic[] = {300.0, 400.0, 500.0, 600.0};
        double tail[4], start = seconds();
        for (int r = 0; r < ROUNDS / 4; r++) {
            bh_radiative_tail_exact(&x, 0.5, 4, kinetic, tail);
            sum += tail[r % 4];
        }
        const double exact = 1e9 * (seconds() - start) / ROUNDS;
        start = seconds();
        for (int r = 0; r < ROUNDS / 4; r++) {
            bh_radiative_tail_peaking(&x, 0.5, 4, kinetic, tail);
            sum += tail[r % 4];
        }
        const double peaking = 1e9 * (seconds() - start) / ROUNDS;
        printf("%-8s tail: exact %.0f ns, peaking %.0f ns (checksum %g)\n", beams[b], exact,
               peaking, sum);
    }
    bh_structure_free(dipole);
    return dipole ? 0 : 1;
}
