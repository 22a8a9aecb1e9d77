/* bench_kinematics.c - nanoseconds per event, as a ratio to the bare cost of the library calls that
 * an event cannot do without, so that a slowdown shows on any machine. */
#include <math.h>

#include "beamhours/physics/kinematics.h"
#include "beamhours/physics/process.h"
#include "beamhours/units/constants.h"
#include "bench.h"

enum { EVENTS = 512, ROUNDS = 2000 };

static double per_event(double start)
{
    return 1e9 * (bench_now() - start) / EVENTS / ROUNDS;
}

int main(void)
{
    const bh_collision in = {BH_MASS_ELECTRON, BH_MASS_PROTON, 855.0};
    static double angle[EVENTS], out[EVENTS];
    static bh_event event[EVENTS];
    double sum = 0.0;
    for (int i = 0; i < EVENTS; i++)
        angle[i] = 0.2 + 2.5 * i / EVENTS;

    double start = bench_now();
    for (int r = 0; r < ROUNDS; r++)
        for (int i = 0; i < EVENTS; i++)
            sum += sqrt(angle[i] + r) + cos(angle[i]);
    const double two = per_event(start);

    start = bench_now();
    for (int r = 0; r < ROUNDS; r++)
        for (int i = 0; i < EVENTS; i++)
            sum += cos(angle[i]) + sin(angle[i]) + sqrt(angle[i]) + sqrt(angle[i] + r) +
                   sqrt(angle[i] + 2 * r) + atan2(angle[i], 1.0 + r);
    const double bare = per_event(start);

    start = bench_now();
    for (int r = 0; r < ROUNDS; r++) {
        angle[r % EVENTS] += 1e-9;
        bh_kinematics_batch(&in, EVENTS, angle, BH_BRANCH_FAST, event);
        sum += event[r % EVENTS].q2;
    }
    const double batch = per_event(start);

    start = bench_now();
    for (int r = 0; r < ROUNDS; r++)
        for (int i = 0; i < EVENTS; i++) {
            if (bh_kinematics_scattered(&in, angle[i], BH_BRANCH_FAST, &event[i], NULL) != BH_OK)
                return 1;
            sum += event[i].q2;
        }
    const double checked = per_event(start);

    bh_particle beam;
    bh_structure *structure = bh_structure_new("dipole", 1, 1, NULL);
    if (!structure || !bh_particle_find("electron", &beam))
        return 1;
    const bh_encounter x = {&beam, -1, 1, 1, in.target, in.kinetic, structure, 0.0};
    start = bench_now();
    for (int r = 0; r < ROUNDS; r++) {
        bh_process_find("elastic")->cross_section(&x, EVENTS, event, out);
        sum += out[r % EVENTS];
    }
    const double cross = per_event(start);
    bh_structure_free(structure);

    printf("      sqrt + cos %.1f ns; sin, cos, atan2 and three sqrt %.1f ns; elastic with dipole "
           "%.1f ns/event (checksum %g)\n",
           two, bare, cross, sum);
    bool met = bench_goal("an event of many over the calls it needs", batch / bare, 4, "");
    met &= bench_goal("an event alone, checked, over the calls it needs", checked / bare, 4, "");
    return bench_end(met);
}
