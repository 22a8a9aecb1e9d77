/* event_search.c - closed forms where there is one; for a recoil's angle Brent's method on a
 * bracket. */
#include "beamhours/run/event_search.h"

#include <gsl/gsl_errno.h>
#include <gsl/gsl_roots.h>
#include <math.h>

enum { STEPS = 400, MOST = 200 };

static const double least = 1e-3, most = 1e6; /* [MeV] energies that are looked at */

static bh_code at_angle(const bh_collision *in, double angle, bool recoil, bh_event *out,
                        bh_error *err)
{
    return recoil ? bh_kinematics_recoil(in, angle, out, err)
                  : bh_kinematics_scattered(in, angle, BH_BRANCH_FAST, out, err);
}

struct search {
    bh_collision in;
    const bh_known *known;
};

/* Returns [1] by how much the wanted quantity is missed at the logarithm `x` of the energy; NAN
 * where there is no event. */
static double miss(double x, void *context)
{
    struct search *s = context;
    bh_event e;
    s->in.kinetic = exp(x);
    if (bh_kinematics_recoil(&s->in, s->known->angle, &e, NULL))
        return (double)NAN;
    return isnan(s->known->q2) ? e.epsilon - s->known->epsilon : e.q2 / s->known->q2 - 1.0;
}

static bool bracket(struct search *s, double *lo, double *hi)
{
    const double from = log(least), to = log(most);
    double before = (double)NAN, x0 = to;
    for (int i = 0; i <= STEPS; i++) { /* downwards: the more energetic solution first */
        const double x = to - (to - from) * i / STEPS, now = miss(x, s);
        if (!isnan(before) && !isnan(now) && (before > 0.0) != (now > 0.0)) {
            *lo = x;
            *hi = x0;
            return true;
        }
        before = now;
        x0 = x;
    }
    return false;
}

static bool solve(struct search *s, double *x)
{
    double lo = 0.0, hi = 0.0;
    if (!bracket(s, &lo, &hi))
        return false;
    gsl_root_fsolver *solver = gsl_root_fsolver_alloc(gsl_root_fsolver_brent);
    gsl_function f = {miss, s};
    if (!solver)
        return false;
    int status = gsl_root_fsolver_set(solver, &f, lo, hi);
    for (int i = 0; i < MOST && status == GSL_SUCCESS; i++) {
        status = gsl_root_fsolver_iterate(solver);
        lo = gsl_root_fsolver_x_lower(solver);
        hi = gsl_root_fsolver_x_upper(solver);
        if (status || gsl_root_test_interval(lo, hi, 0.0, 4e-16) == GSL_SUCCESS)
            break;
    }
    *x = gsl_root_fsolver_root(solver);
    gsl_root_fsolver_free(solver);
    return status == GSL_SUCCESS;
}

static bh_code energy_given(const bh_collision *in, const bh_known *known, bh_event *out,
                            bh_error *err)
{
    if (!isnan(known->angle))
        return at_angle(in, known->angle, known->recoil, out, err);
    if (!isnan(known->q2))
        return bh_kinematics_q2(in, known->q2, out, err);
    return bh_kinematics_epsilon(in, known->epsilon, out, err);
}

static bh_code recoil_given(bh_collision *in, const bh_known *known, bh_event *out, bh_error *err)
{
    struct search s = {*in, known};
    double x = 0.0;
    if (!solve(&s, &x))
        return bh_fail(err, BH_EDOMAIN,
                       "no beam energy from 1 keV to 1 TeV gives these two together");
    in->kinetic = exp(x);
    return at_angle(in, known->angle, true, out, err);
}

static bh_code energy_wanted(bh_collision *in, const bh_known *known, bh_event *out, bh_error *err)
{
    if (!isnan(known->angle) && known->recoil)
        return recoil_given(in, known, out, err);
    bh_code bad = BH_OK;
    if (isnan(known->angle))
        bad = bh_kinematics_energy_epsilon(in, known->q2, known->epsilon, &in->kinetic, err);
    else if (isnan(known->epsilon))
        bad = bh_kinematics_energy(in, known->q2, known->angle, &in->kinetic, err);
    else
        bad =
            bh_kinematics_energy_angle_epsilon(in, known->angle, known->epsilon, &in->kinetic, err);
    if (bad)
        return bad;
    return isnan(known->angle) ? bh_kinematics_q2(in, known->q2, out, err)
                               : at_angle(in, known->angle, false, out, err);
}

bh_code bh_event_search(const bh_collision *masses, const bh_known *known, double *kinetic,
                        bh_event *out, bh_error *err)
{
    bh_collision in = *masses;
    const int given =
        !isnan(known->kinetic) + !isnan(known->angle) + !isnan(known->q2) + !isnan(known->epsilon);
    if (given != 2)
        return bh_fail(err, BH_EDOMAIN,
                       "give exactly two of energy, angle, q2 and epsilon; %d were given", given);
    in.kinetic = known->kinetic;
    const bh_code bad = isnan(known->kinetic) ? energy_wanted(&in, known, out, err)
                                              : energy_given(&in, known, out, err);
    if (!bad)
        *kinetic = in.kinetic;
    return bad;
}
