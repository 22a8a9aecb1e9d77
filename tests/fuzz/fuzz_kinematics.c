/* fuzz_kinematics.c - whatever the bytes, a question about an event is refused or answered with
 * physics: finite, conserving, consistent with its inverse. */
#include <math.h>
#include <stdbool.h>
#include <stdint.h>
#include <stdlib.h>
#include <string.h>

#include "beamhours/physics/kinematics.h"
#include "beamhours/physics/one_photon.h"

int LLVMFuzzerTestOneInput(const uint8_t *data, size_t size);

static void demand(bool holds)
{
    if (!holds)
        abort();
}

static void judge(const bh_collision *in, const bh_event *e)
{
    const double T = in->kinetic, energy = T + in->mass, total = energy + in->target;
    demand(e->scattered_kinetic >= 0.0 && e->recoil_kinetic >= 0.0 && e->q2 >= 0.0);
    demand(fabs(e->scattered_kinetic + e->recoil_kinetic - T) <= 1e-12 * energy);
    demand(e->recoil_angle >= 0.0 && e->recoil_angle <= 1.5707963267948968);
    demand(e->scattered_angle >= 0.0 && e->scattered_angle <= 3.1415926535897936);
    demand(e->epsilon >= 0.0 && isfinite(e->epsilon) && e->transverse2 >= 0.0);
    demand(e->q2 <= bh_kinematics_largest_q2(in) * (1.0 + 1e-12));
    demand(fabs(e->s + e->t + e->u - in->mass * in->mass - in->target * in->target -
                in->mass * in->mass - in->target * in->target) <= 1e-11 * total * total);
    demand(e->cm_per_lab >= 0.0 && e->scattered_per_recoil >= 0.0);
    demand(bh_mott(in, e, 1) >= 0.0 && bh_spinless(in, e, 1) >= 0.0);
}

int LLVMFuzzerTestOneInput(const uint8_t *data, size_t size)
{
    double v[5];
    if (size < sizeof v)
        return 0;
    memcpy(v, data, sizeof v);
    bh_collision in = {v[0], v[1], v[2]};
    const bh_branch branch =
        size > sizeof v && data[sizeof v] % 2 ? BH_BRANCH_SLOW : BH_BRANCH_FAST;
    bh_event e;
    bh_error err;
    double T;
    if (bh_kinematics_scattered(&in, v[3], branch, &e, &err) == BH_OK)
        judge(&in, &e);
    if (bh_kinematics_recoil(&in, v[3], &e, &err) == BH_OK)
        judge(&in, &e);
    if (bh_kinematics_q2(&in, v[3], &e, &err) == BH_OK)
        judge(&in, &e);
    if (bh_kinematics_epsilon(&in, v[3], &e, &err) == BH_OK)
        judge(&in, &e);
    if (bh_kinematics_energy(&in, v[3], v[4], &T, &err) == BH_OK)
        demand(T >= 1e-3 && isfinite(T));
    if (bh_kinematics_energy_epsilon(&in, v[3], v[4], &T, &err) == BH_OK) {
        in.kinetic = T;
        if (bh_kinematics_q2(&in, v[3], &e, &err) == BH_OK)
            judge(&in, &e);
    }
    if (bh_kinematics_energy_angle_epsilon(&in, v[3], v[4], &T, &err) == BH_OK)
        demand(T >= 1e-3 * 0.999999 && isfinite(T));
    return 0;
}
