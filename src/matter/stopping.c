/* stopping.c - the loss of any particle, from the formula or table that holds. */
#include "beamhours/matter/stopping.h"

#include <math.h>
#include <stdlib.h>

#include "beamhours/base/sentences.h"
#include "beamhours/matter/electron_loss.h"
#include "beamhours/matter/heavy_loss.h"
#include "beamhours/matter/muon_loss.h"
#include "beamhours/matter/slow_loss.h"
#include "beamhours/units/constants.h"

/* MeV, proton energy below which the terms of higher order in the charge are no longer scaled: they
 * would grow past what is measured for antiprotons. */
#define CHARGE_BOTTOM 2.0

#define ELECTRON_BOTTOM 1e-3 /* MeV */

struct bh_stopping {
    bh_particle particle;
    bh_medium medium;
    bh_slow_loss slow;
    bh_electron_photons photons;
    bh_log_spline muon;
    double join; /* of the charge 2: protons to alphas where the table of alphas ends */
};

/* The particle's loss over that of protons of equal speed, bare. */
static double charge_ratio(const bh_stopping *s, double speed)
{
    const double at = fmax(speed, CHARGE_BOTTOM);
    const bh_particle proton = bh_proton();
    return bh_bethe(&s->particle, &s->medium, at * s->particle.mass / proton.mass) /
           bh_bethe(&proton, &s->medium, at);
}

/* Of charge 2 above the table of alphas, up to where the formula holds. */
static double alpha_between(const bh_stopping *s, double speed)
{
    const double part = log(speed / s->slow.alpha_top) / log(BH_SLOW_TOP / s->slow.alpha_top);
    const double high = charge_ratio(s, BH_SLOW_TOP);
    return bh_slow_proton(&s->slow, speed) * s->join * pow(high / s->join, part);
}

/* `speed` [MeV] of a proton as fast, up to BH_SLOW_TOP. */
static double slow_loss(const bh_stopping *s, double speed)
{
    if (s->particle.charge == 2 && speed < s->slow.alpha_top)
        return bh_slow_alpha(&s->slow, speed);
    if (s->particle.charge == 2)
        return alpha_between(s, speed);
    return bh_slow_proton(&s->slow, speed) * charge_ratio(s, speed);
}

static double heavy_loss(const bh_stopping *s, double kinetic)
{
    const double speed = kinetic * BH_MASS_PROTON / s->particle.mass;
    const double charge =
        bh_effective_charge(abs(s->particle.charge), bh_flight_of(&s->particle, kinetic).beta);
    double loss;
    if (speed < BH_SLOW_TOP)
        loss = slow_loss(s, speed);
    else if (speed < BH_SLOW_CALIB)
        loss =
            bh_bethe(&s->particle, &s->medium, kinetic) * bh_log_spline_at(&s->slow.factor, speed);
    else
        loss = bh_bethe(&s->particle, &s->medium, kinetic);
    return loss * charge * charge;
}

static bool is_muon(const bh_particle *p)
{
    return p->kind == BH_KIND_LEPTON && !bh_particle_is_electron(p);
}

/* Below ELECTRON_BOTTOM the formula would come to nothing in heavy elements. */
static bh_loss electron_loss(const bh_stopping *s, double kinetic)
{
    const int charge = s->particle.charge;
    const double from = fmax(kinetic, ELECTRON_BOTTOM);
    return (bh_loss){bh_berger_seltzer(&s->medium, charge, from) * sqrt(kinetic / from),
                     bh_electron_photons_at(&s->photons, &s->medium, charge, kinetic)};
}

bh_loss bh_stopping_at(const bh_stopping *s, double kinetic)
{
    if (!(kinetic > 0.0) || !isfinite(kinetic))
        return (bh_loss){(double)NAN, (double)NAN};
    if (bh_particle_is_electron(&s->particle))
        return electron_loss(s, kinetic);
    bh_loss loss = {.collision = heavy_loss(s, kinetic)};
    if (is_muon(&s->particle))
        loss.radiative = bh_log_spline_at(&s->muon, kinetic);
    return loss;
}

bh_code bh_stopping_new(const bh_particle *particle, const bh_material *material, double density,
                        bh_stopping **out, bh_error *err)
{
    bh_medium medium;
    if (particle->charge == 0 || !(particle->mass > 0.0))
        return bh_fail(err, BH_EDOMAIN, BH_SAY_STOPPING_NEUTRAL, particle->name);
    const bh_code code = bh_medium_of(material, density, &medium, err);
    if (code != BH_OK)
        return code;
    bh_stopping *s = calloc(1, sizeof *s);
    if (!s)
        return bh_fail(err, BH_ENOMEM, "%s", bh_code_text(BH_ENOMEM));
    s->particle = *particle;
    s->medium = medium;
    if (bh_particle_is_electron(particle)) {
        bh_electron_photons_make(&medium, &s->photons);
    } else {
        bh_slow_loss_make(material, &medium, &s->slow);
        s->join = bh_slow_alpha(&s->slow, s->slow.alpha_top) /
                  bh_slow_proton(&s->slow, s->slow.alpha_top);
    }
    if (is_muon(particle))
        bh_muon_radiation_make(&medium, &s->muon);
    *out = s;
    return BH_OK;
}

void bh_stopping_free(bh_stopping *stopping)
{
    free(stopping);
}

const bh_particle *bh_stopping_particle(const bh_stopping *stopping)
{
    return &stopping->particle;
}

const bh_medium *bh_stopping_medium(const bh_stopping *stopping)
{
    return &stopping->medium;
}

static double kinetic_at(const bh_particle *p, double beta_gamma)
{
    return p->mass * (hypot(1.0, beta_gamma) - 1.0);
}

static void insert(double *kinetic, size_t *count, double value)
{
    size_t i = (*count)++;
    for (; i > 0 && kinetic[i - 1] > value; i--)
        kinetic[i] = kinetic[i - 1];
    kinetic[i] = value;
}

size_t bh_stopping_breaks(const bh_stopping *s, double kinetic[BH_STOPPING_BREAKS])
{
    size_t count = 0;
    const double scale = s->particle.mass / BH_MASS_PROTON;
    insert(kinetic, &count, kinetic_at(&s->particle, pow(10.0, s->medium.effect.x0)));
    insert(kinetic, &count, kinetic_at(&s->particle, pow(10.0, s->medium.effect.x1)));
    if (bh_particle_is_electron(&s->particle)) {
        insert(kinetic, &count, ELECTRON_BOTTOM);
        insert(kinetic, &count, 0.1);
        insert(kinetic, &count, 1000.0);
        return count;
    }
    insert(kinetic, &count, BH_SLOW_TOP * scale);
    insert(kinetic, &count, BH_SLOW_CALIB * scale);
    insert(kinetic, &count, CHARGE_BOTTOM * scale);
    if (s->particle.charge == 2)
        insert(kinetic, &count, s->slow.alpha_top * scale);
    insert(kinetic, &count, (s->particle.charge == 2 ? exp(s->slow.alpha.x[0]) : 1e-3) * scale);
    return count;
}
