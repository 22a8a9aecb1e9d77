/* background_atomic.c - leptons scattered by atomic electrons, and those electrons. */
#include <math.h>

#include "beamhours/base/sentences.h"
#include "beamhours/physics/atomic_electron.h"
#include "beamhours/physics/momentum_range.h"
#include "beamhours/units/constants.h"

#define RYDBERG 13.605693e-6 /* [MeV] */

static bool applies(const bh_particle *beam, int z, int a)
{
    (void)a;
    return beam->kind == BH_KIND_LEPTON && z > 0;
}

static bool knocks_on(const bh_particle *beam, int z, int a)
{
    const bool identical = beam->charge < 0 && beam->mass < 2.0 * BH_MASS_ELECTRON;
    return applies(beam, z, a) && !identical;
}

/* Adds what is seen at one angle, if its momentum is in the range. */
static void add(const bh_encounter *x, const bh_momentum_range *range, bh_atomic_seen seen,
                double *value, bh_background_validity *validity)
{
    bh_atomic_event e;
    if (bh_atomic_electron(x->beam, x->kinetic, seen, range->angle, &e) != BH_OK)
        return; /* no particle comes out there */
    if (!(e.momentum >= range->momentum_from && e.momentum <= range->momentum_to))
        return;
    const double electron = seen == BH_ATOMIC_STRUCK ? e.kinetic : e.other_kinetic;
    const double slower = x->beam->charge < 0 ? fmin(electron, e.kinetic) : electron;
    if (slower < 10.0 * RYDBERG * x->z * x->z) {
        *validity = (bh_background_validity){BH_NOT_COMPUTED, 0.0, 0.0, BH_SAY_ATOMIC_BOUND};
        return;
    }
    *value += x->z * e.cross_section;
    validity->uncertainty = 0.01;
}

static void begin(double *value, bh_background_validity *validity)
{
    *value = 0.0;
    *validity = (bh_background_validity){BH_COMPUTED, 1.0, 0.0, ""};
}

static void scattered(const bh_encounter *encounter, const bh_momentum_range *range, double *value,
                      bh_background_validity *validity)
{
    if (!bh_momentum_range_good(encounter, range, value, validity))
        return;
    begin(value, validity);
    add(encounter, range, BH_ATOMIC_SCATTERED, value, validity);
    if (encounter->beam->mass > 2.0 * BH_MASS_ELECTRON)
        add(encounter, range, BH_ATOMIC_SCATTERED_SLOW, value, validity);
}

static void struck(const bh_encounter *encounter, const bh_momentum_range *range, double *value,
                   bh_background_validity *validity)
{
    if (!bh_momentum_range_good(encounter, range, value, validity))
        return;
    begin(value, validity);
    add(encounter, range, BH_ATOMIC_STRUCK, value, validity);
}

#define SOURCE                                                                                  \
    "Berestetskii, Lifshitz & Pitaevskii, Quantum Electrodynamics, section 81: Moller, Bhabha " \
    "and "                                                                                      \
    "muon-electron by one photon, masses exact"
#define RANGE                                                                                     \
    "atomic electrons at rest and free: 1 % in a rate; not computed below ten times the binding " \
    "energy 13.6 eV Z^2"

const bh_background bh_background_atomic = {
    .name = "atomic-electrons",
    .summary = "leptons scattered by atomic electrons: Moller (both electrons), Bhabha, muons",
    .source = SOURCE,
    .range = RANGE,
    .sharp = true,
    .applies = applies,
    .momentum_integral = scattered,
};

const bh_background bh_background_knock_on = {
    .name = "knock-on",
    .summary = "electrons that positrons or muons knock out of atoms",
    .source = SOURCE,
    .range = RANGE,
    .recoil = true,
    .sharp = true,
    .applies = knocks_on,
    .momentum_integral = struck,
};
