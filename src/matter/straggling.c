/* straggling.c - xi, most probable loss and width; the fraction beyond a cut. */
#include "beamhours/matter/straggling.h"

#include <math.h>

#include "beamhours/matter/electron_loss.h"
#include "beamhours/matter/heavy_loss.h"
#include "beamhours/matter/vavilov_modes.h"
#include "beamhours/units/constants.h"

static const double euler = 0.57721566490153286061;
static const double landau_mode = -0.22278298;
static const double landau_width = 4.0186457;
static const double normal_width = 2.35482004503094938202; /* 2 sqrt(2 ln 2) */

#define KAPPA_LANDAU 0.01
#define KAPPA_NORMAL 10.0

/* Cubic through four neighbouring values, the inner interval. */
static double cubic(const double y[4], double part)
{
    const double left = 0.5 * (y[2] - y[0]);
    const double right = 0.5 * (y[3] - y[1]);
    const double rise = y[2] - y[1];
    return y[1] + part * (left + part * (3.0 * rise - 2.0 * left - right +
                                         part * (left + right - 2.0 * rise)));
}

static bh_vavilov_mode across_beta(int row, double beta2)
{
    const double at = beta2 * (BH_VAVILOV_BETAS - 1);
    const int i = (int)fmin(fmax(at, 0.0), BH_VAVILOV_BETAS - 2);
    const bh_vavilov_mode *m = &bh_vavilov_modes[row][i];
    const double part = at - i;
    return (bh_vavilov_mode){m[0].mode + part * (m[1].mode - m[0].mode),
                             m[0].width + part * (m[1].width - m[0].width)};
}

static bh_vavilov_mode vavilov_mode(double kappa, double beta2)
{
    const double at = 8.0 * (log10(kappa) + 2.0);
    const int i = (int)fmin(fmax(at, 0.0), BH_VAVILOV_KAPPAS - 2);
    double mode[4];
    double width[4];
    for (int k = 0; k < 4; k++) {
        const int row = i - 1 + k;
        const int within = row < 0 ? 0 : (row >= BH_VAVILOV_KAPPAS ? BH_VAVILOV_KAPPAS - 1 : row);
        const bh_vavilov_mode m = across_beta(within, beta2);
        mode[k] = m.mode;
        width[k] = m.width;
    }
    return (bh_vavilov_mode){cubic(mode, at - i), cubic(width, at - i)};
}

static bh_straggling_law law_of(const bh_particle *particle, double kappa)
{
    if (kappa < KAPPA_LANDAU || bh_particle_is_electron(particle))
        return BH_STRAGGLING_LANDAU;
    return kappa < KAPPA_NORMAL ? BH_STRAGGLING_VAVILOV : BH_STRAGGLING_NORMAL;
}

/* The loss that belongs to Landau's lambda: he knows no largest transfer. */
static double landau_loss(const bh_straggling *s, double lambda)
{
    return s->most_probable + s->xi * (lambda - landau_mode);
}

static void set_peak(bh_straggling *s)
{
    if (s->law == BH_STRAGGLING_LANDAU) {
        s->fwhm = landau_width * s->xi;
    } else if (s->law == BH_STRAGGLING_VAVILOV) {
        const bh_vavilov_mode m = vavilov_mode(s->kappa, s->beta2);
        s->most_probable = s->mean + s->xi * (m.mode + 1.0 - euler + s->beta2 + log(s->kappa));
        s->fwhm = m.width * s->xi;
    } else {
        s->most_probable = s->mean;
        s->fwhm = normal_width * s->sigma;
    }
}

bh_code bh_straggling_of(const bh_particle *particle, const bh_medium *medium, double kinetic,
                         double path, bh_straggling *out)
{
    if (!(kinetic > 0.0) || !(path > 0.0) || !isfinite(kinetic) || !isfinite(path))
        return BH_EDOMAIN;
    const bh_flight f = bh_flight_of(particle, kinetic);
    const double charge = particle->charge * bh_effective_charge(particle->charge, f.beta);
    bh_straggling s = {.beta2 = f.beta * f.beta};
    s.xi = 0.5 * bh_bethe_constant() * medium->z_over_a * charge * charge * path / s.beta2;
    s.kappa = s.xi / f.transfer;
    s.sigma = sqrt(s.xi * f.transfer * (1.0 - 0.5 * s.beta2));
    s.law = law_of(particle, s.kappa);
    const double i = medium->mean_excitation;
    const double delta = bh_medium_density_effect(medium, f.beta_gamma);
    const double logarithm = log(2.0 * BH_MASS_ELECTRON * f.beta_gamma * f.beta_gamma / i);
    if (bh_particle_is_electron(particle))
        s.mean = bh_berger_seltzer(medium, particle->charge, kinetic) * path;
    else
        s.mean = s.xi * (logarithm + log(f.transfer / i) - 2.0 * s.beta2 - delta);
    s.most_probable = s.xi * (logarithm + log(s.xi / i) + 0.200 - s.beta2 - delta);
    set_peak(&s);
    *out = s;
    return BH_OK;
}

double bh_straggling_beyond(const bh_straggling *s, double loss)
{
    if (s->law == BH_STRAGGLING_LANDAU)
        return bh_landau_beyond((loss - landau_loss(s, 0.0)) / s->xi);
    if (s->law == BH_STRAGGLING_NORMAL)
        return 0.5 * erfc((loss - s->mean) / (sqrt(2.0) * s->sigma));
    return bh_vavilov_beyond((bh_vavilov){s->kappa, s->beta2},
                             (loss - s->mean) / s->xi - 1.0 + euler - s->beta2 - log(s->kappa));
}
