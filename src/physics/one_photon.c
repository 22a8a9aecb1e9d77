/* one_photon.c - Rosenbluth, Mott, Rutherford and Dirac on Dirac as cases of one expression. */
#include "beamhours/physics/one_photon.h"

#include <math.h>
#include <stdbool.h>

#include "beamhours/units/constants.h"

#define ALPHA_HBARC2 (BH_ALPHA * BH_ALPHA * BH_HBARC2_UB) /* [MeV^2 ub] */

/*
 * Contracting the two currents, each split into its part along the sum of its momenta and the part
 * across the momentum transfer, leaves a sum of positive terms only:
 *   GE_t^2 (C k^2 + m^2 GE_b^2) + tau GM_t^2 (C k^2 + GM_b^2 q2/2),
 *   C = (GE_b^2 + tau_b GM_b^2) / (1 + tau_b), tau_b = q2 / 4 m^2, k^2 = transverse2.
 * For a lepton (C = 1) that is the epsilon GE^2 + tau GM^2 of the textbooks.
 */
double bh_one_photon(const bh_collision *in, const bh_event *e, bh_vertex beam, bh_vertex target)
{
    const double m2 = in->mass * in->mass, M2 = in->target * in->target;
    const double q2 = e->q2, k2 = e->transverse2;
    const double C = beam.ge2 == beam.gm2
                         ? beam.ge2 /* leptons: nothing to divide, and right for m = 0 = q2 */
                         : (4.0 * m2 * beam.ge2 + q2 * beam.gm2) / (4.0 * m2 + q2);
    const double along = C * k2;
    const double electric = along + m2 * beam.ge2;
    const double magnetic = along + 0.5 * q2 * beam.gm2;
    const double sum = 4.0 * M2 * target.ge2 * electric + q2 * target.gm2 * magnetic;
    return ALPHA_HBARC2 * e->cm_per_lab * sum / (e->s * q2 * q2);
}

static bh_vertex charge_without_spin(double mass, double q2)
{
    return (bh_vertex){1.0 + 0.25 * q2 / (mass * mass), 0.0};
}

double bh_mott(const bh_collision *in, const bh_event *e, int charges)
{
    const double z = charges;
    return z * z *
           bh_one_photon(in, e, (bh_vertex){1.0, 1.0}, charge_without_spin(in->target, e->q2));
}

double bh_mott_static(const bh_collision *in, double angle, int charges)
{
    const double z = charges, half = sin(0.5 * angle);
    const double p2 = in->kinetic * (in->kinetic + 2.0 * in->mass), q2 = 4.0 * p2 * half * half;
    /* E^2 - p^2 sin^2(angle/2), which would cancel backwards at high energy */
    const double part = in->mass * in->mass + p2 * cos(0.5 * angle) * cos(0.5 * angle);
    return z * z * ALPHA_HBARC2 * 4.0 * part / (q2 * q2);
}

double bh_spinless(const bh_collision *in, const bh_event *e, int charges)
{
    const double z = charges, m2 = in->mass * in->mass, M2 = in->target * in->target;
    /* (s - u)^2 / 4, of which the beam mass may be 0 */
    const double sum = (4.0 * M2 + e->q2) * (e->transverse2 + m2 + 0.25 * e->q2);
    return z * z * ALPHA_HBARC2 * e->cm_per_lab * sum / (e->s * e->q2 * e->q2);
}

double bh_rutherford(const bh_collision *in, const bh_event *e, int charges)
{
    const double m = in->mass, M = in->target;
    const double c = cos(e->scattered_angle), sn = sin(e->scattered_angle);
    const double root = sqrt(fmax((M - m * sn) * (M + m * sn), 0.0));
    const double larger = M * fabs(c) + root, total = e->scattered_kinetic + m;
    const bool fast = e->scattered_momentum * (e->beam_energy + M) >= total * e->beam_momentum * c;
    const double top =
        c > 0.0 && fast ? larger : sn * sn * (M - m) * (M + m) / larger; /* root - M |c| */
    const double z = charges, ratio = 2.0 * top / (sn * sn);
    const double length2 = ALPHA_HBARC2 / (16.0 * in->kinetic * in->kinetic);
    return z * z * length2 * ratio * ratio / (M * root);
}

double bh_rutherford_heavy(double kinetic, double angle, int charges)
{
    const double half = sin(0.5 * angle), x = charges / (4.0 * kinetic * half * half);
    return ALPHA_HBARC2 * x * x;
}

double bh_dirac_amplitude2(const bh_invariants *x, double m, double M)
{
    const double sum = m * m + M * M, s = x->s - sum, u = x->u - sum;
    const double e2 = 4.0 * BH_PI * BH_ALPHA;
    return 2.0 * e2 * e2 * (s * s + u * u + 2.0 * x->t * sum) / (x->t * x->t);
}
