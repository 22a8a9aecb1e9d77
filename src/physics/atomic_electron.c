/* atomic_electron.c - Moller, Bhabha and muon-electron as crossings of one amplitude. */
#include "beamhours/physics/atomic_electron.h"

#include <math.h>

#include "beamhours/physics/one_photon.h"
#include "beamhours/units/constants.h"

#define M BH_MASS_ELECTRON

static bool is_electron(const bh_particle *beam)
{
    return beam->mass < 2.0 * M;
}

/* How the two ways of exchanging a photon interfere, over the product of their denominators; of the
 * three Mandelstam variables it knows the one that is in neither. */
static double interference(double third, double product)
{
    const double e2 = 4.0 * BH_PI * BH_ALPHA, m2 = M * M;
    return 16.0 * e2 * e2 * (0.5 * third - m2) * (0.5 * third - 3.0 * m2) / product;
}

/* The squared amplitude: direct; for electrons also exchanged, for positrons annihilated. */
static double amplitude2(const bh_particle *beam, const bh_event *e)
{
    const bh_invariants direct = {e->s, e->t, e->u};
    if (!(e->q2 > 0.0))
        return (double)INFINITY;
    const double sum = bh_dirac_amplitude2(&direct, beam->mass, M);
    if (!is_electron(beam))
        return sum;
    if (beam->charge < 0) {
        const bh_invariants exchanged = {e->s, e->u, e->t};
        return sum + bh_dirac_amplitude2(&exchanged, M, M) + interference(e->s, e->t * e->u);
    }
    const bh_invariants annihilated = {e->t, e->s, e->u};
    return sum + bh_dirac_amplitude2(&annihilated, M, M) + interference(e->u, e->s * e->t);
}

double bh_atomic_centre_of_mass(const bh_particle *beam, const bh_event *e)
{
    return BH_HBARC2_UB * amplitude2(beam, e) / (64.0 * BH_PI * BH_PI * e->s);
}

static bh_code scattered(const bh_particle *beam, const bh_collision *in, double angle,
                         bh_branch branch, bh_atomic_event *out)
{
    bh_event e;
    const bh_code code = bh_kinematics_scattered(in, angle, branch, &e, NULL);
    if (code != BH_OK)
        return code;
    const double rate = e.scattered_momentum > 0.0
                            ? bh_atomic_centre_of_mass(beam, &e) * e.cm_per_lab
                            : (double)INFINITY;
    *out = (bh_atomic_event){e.scattered_momentum, e.scattered_kinetic, e.recoil_kinetic, rate};
    return BH_OK;
}

/* dt/dcos(angle) of the struck electron in closed form: the product of jacobians would be 0 times
 * infinity where the scattered particle turns back. */
static bh_code struck(const bh_particle *beam, const bh_collision *in, double angle,
                      bh_atomic_event *out)
{
    bh_event e;
    const bh_code code = bh_kinematics_recoil(in, angle, &e, NULL);
    if (code != BH_OK)
        return code;
    const double p2 = e.beam_momentum * e.beam_momentum, sum = e.beam_energy + M;
    const double across = sin(angle), along = fmax(cos(angle), 0.0);
    const double below = e.s + p2 * across * across;
    const double slope = 8.0 * M * M * p2 * along * sum * sum / (below * below);
    const double dt = BH_HBARC2_UB * amplitude2(beam, &e) / (64.0 * BH_PI * M * M * p2);
    const double rate = e.q2 > 0.0 ? dt * slope / (2.0 * BH_PI) : (double)INFINITY;
    *out = (bh_atomic_event){e.recoil_momentum, e.recoil_kinetic, e.scattered_kinetic, rate};
    return BH_OK;
}

bh_code bh_atomic_electron(const bh_particle *beam, double kinetic, bh_atomic_seen seen,
                           double angle, bh_atomic_event *out)
{
    if (beam->kind != BH_KIND_LEPTON)
        return BH_EDOMAIN;
    const bh_collision in = {is_electron(beam) ? M : beam->mass, M, kinetic};
    const bool identical = is_electron(beam) && beam->charge < 0;
    if (seen == BH_ATOMIC_STRUCK && !identical)
        return struck(beam, &in, angle, out);
    return scattered(beam, &in, angle,
                     seen == BH_ATOMIC_SCATTERED_SLOW ? BH_BRANCH_SLOW : BH_BRANCH_FAST, out);
}
