/* radiative.c - the registry of internal radiative corrections; a new one is one function and one
 * row here. */
#include "beamhours/physics/radiative.h"

#include <math.h>
#include <stdbool.h>
#include <stdio.h>
#include <string.h>

#include "beamhours/base/sentences.h"
#include "beamhours/physics/soft_photons.h"
#include "beamhours/physics/vacuum_polarisation.h"
#include "beamhours/units/constants.h"

#define SOFT_SHARE 0.03  /* of the scattered energy, up to which soft photons are all there is */
#define LIGHT      100.0 /* q2/m^2, from which a lepton is light */

static bool radiates(const bh_encounter *x)
{
    return x->beam->kind == BH_KIND_LEPTON;
}

static bh_soft soft_of(const bh_encounter *x, double cut, const bh_event *e)
{
    const bh_collision in = {x->beam->mass, x->target, x->kinetic};
    return bh_soft_of(&in, e, cut > e->scattered_kinetic ? e->scattered_kinetic : cut);
}

/* Without momentum transfer, and for what is no lepton, there is nothing to correct. */
static bool nothing(const bh_encounter *x, const bh_event *e)
{
    return !radiates(x) || e->q2 == 0.0;
}

static bh_radiative_parts none(const bh_encounter *x, double cut, const bh_event *e)
{
    (void)x;
    (void)cut;
    (void)e;
    return (bh_radiative_parts){0};
}

static bh_radiative_parts schwinger(const bh_encounter *x, double cut, const bh_event *e)
{
    if (nothing(x, e))
        return (bh_radiative_parts){0};
    const bh_soft in = soft_of(x, cut, e);
    return (bh_radiative_parts){.z0 = bh_soft_lepton(&in), .vacuum = bh_vacuum(e->q2)};
}

static bool heavy_lepton(const bh_encounter *x)
{
    return x->beam->mass > 2.0 * BH_MASS_ELECTRON;
}

static bh_radiative_parts mo_tsai(const bh_encounter *x, double cut, const bh_event *e)
{
    if (nothing(x, e))
        return (bh_radiative_parts){0};
    const bh_soft in = soft_of(x, cut, e);
    const bh_soft_parts soft =
        heavy_lepton(x) ? (bh_soft_parts){bh_soft_lepton(&in), bh_soft_interference_tsai(&in),
                                          bh_soft_target(&in)}
                        : bh_soft_mo_tsai(&in);
    return (bh_radiative_parts){.z0 = soft.lepton,
                                .z1 = x->beam->charge * soft.interference,
                                .z2 = soft.target,
                                .vacuum = bh_vacuum(e->q2)};
}

static bh_radiative_parts maximon_tjon(const bh_encounter *x, double cut, const bh_event *e)
{
    if (nothing(x, e))
        return (bh_radiative_parts){0};
    const bh_soft in = soft_of(x, cut, e);
    return (bh_radiative_parts){.z0 = bh_soft_lepton(&in),
                                .z1 = x->beam->charge * bh_soft_interference(&in),
                                .z2 = bh_soft_target(&in),
                                .vacuum = bh_vacuum(e->q2)};
}

/* --- how they change with the logarithm of the cut, in which they are linear --- */

static bh_radiative_parts schwinger_rate(const bh_encounter *x, double cut, const bh_event *e)
{
    if (nothing(x, e))
        return (bh_radiative_parts){0};
    const bh_soft in = soft_of(x, cut, e);
    return (bh_radiative_parts){.z0 = bh_soft_rate(&in)};
}

static bh_radiative_parts maximon_tjon_rate(const bh_encounter *x, double cut, const bh_event *e)
{
    if (nothing(x, e))
        return (bh_radiative_parts){0};
    const bh_soft in = soft_of(x, cut, e);
    return (bh_radiative_parts){.z0 = bh_soft_rate(&in),
                                .z1 = x->beam->charge * bh_soft_interference_rate(&in),
                                .z2 = bh_soft_target_rate(&in)};
}

/* Its closed forms for light leptons are taken as they are, from half the cut. */
static bh_radiative_parts mo_tsai_rate(const bh_encounter *x, double cut, const bh_event *e)
{
    const double top = fmin(cut, e->scattered_kinetic), per = 1.0 / log(2.0);
    const bh_radiative_parts full = mo_tsai(x, top, e), half = mo_tsai(x, top / 2.0, e);
    return (bh_radiative_parts){.z0 = (full.z0 - half.z0) * per,
                                .z1 = (full.z1 - half.z1) * per,
                                .z2 = (full.z2 - half.z2) * per};
}

double bh_radiative_combine(const bh_radiative_parts *x, int z)
{
    const double loops = 1.0 - 0.5 * x->vacuum;
    return exp(x->z0 + z * (x->z1 + z * x->z2)) / (loops * loops);
}

double bh_radiative_uncertainty(const bh_radiative_parts *x, int z, double share)
{
    if (x->z0 == 0.0 && x->z1 == 0.0 && x->z2 == 0.0 && x->vacuum == 0.0)
        return 0.0;
    const double deltas = fabs(x->z0) + fabs(z * x->z1) + fabs((double)z * z * x->z2);
    return hypot(0.01 * deltas, 0.3 * share);
}

typedef bh_radiative_parts parts_function(const bh_encounter *, double, const bh_event *);

static double one(parts_function *parts, const bh_encounter *x, double cut, const bh_event *e)
{
    if (nothing(x, e))
        return 1.0;
    if (cut == 0.0)
        return 0.0; /* where the deltas are infinite */
    const bh_radiative_parts made = parts(x, cut, e);
    return bh_radiative_combine(&made, x->z);
}

static void unity(const bh_encounter *x, double cut, size_t n, const bh_event *event,
                  double *factor)
{
    (void)x;
    (void)cut;
    (void)event;
    for (size_t i = 0; i < n; i++)
        factor[i] = 1.0;
}

#define FACTOR_OF(parts)                                                                           \
    static void parts##_factor(const bh_encounter *x, double cut, size_t n, const bh_event *event, \
                               double *factor)                                                     \
    {                                                                                              \
        for (size_t i = 0; i < n; i++)                                                             \
            factor[i] = one(parts, x, cut, &event[i]);                                             \
    }
FACTOR_OF(schwinger)
FACTOR_OF(mo_tsai)
FACTOR_OF(maximon_tjon)

/* Of the bytes that snprintf would have written: a length, whatever went wrong. */
static int length(int n)
{
    return n > 0 ? n : 0;
}

static int silent(const bh_encounter *x, double cut, const bh_event *e, char *out, size_t size)
{
    (void)x;
    (void)cut;
    (void)e;
    if (size)
        out[0] = '\0';
    return 0;
}

static int wide_cut(const bh_encounter *x, double cut, const bh_event *e, char *out, size_t size)
{
    if (nothing(x, e))
        return silent(x, cut, e, out, size);
    if (!(cut < e->scattered_kinetic))
        return length(snprintf(out, size, BH_WARN_RADIATIVE_ALL, cut, e->scattered_kinetic));
    const double share = cut / (e->scattered_kinetic + x->beam->mass);
    if (share > SOFT_SHARE)
        return length(snprintf(out, size, BH_WARN_RADIATIVE_WIDE, cut, 100.0 * share));
    return silent(x, cut, e, out, size);
}

static int light_only(const bh_encounter *x, double cut, const bh_event *e, char *out, size_t size)
{
    const double m2 = x->beam->mass * x->beam->mass;
    if (!nothing(x, e) && !heavy_lepton(x) && e->q2 < LIGHT * m2)
        return length(snprintf(out, size, BH_WARN_RADIATIVE_LIGHT, 1e-6 * e->q2));
    return wide_cut(x, cut, e, out, size);
}

#define SOFT_RANGE "leptons; soft photons: a cut up to 3 % of the scattered energy; "

static const bh_radiative models[] = {
    {"none", "no radiation: the cross section as it stands", "definition",
     "heavy particles; electrons lose 5 to 30 % to radiation", unity, none, none, silent},
    {"schwinger", "the lepton's own photons alone, with recoil and the lepton mass exact",
     "Schwinger, Phys. Rev. 76 (1949) 790; recoil: Maximon & Tjon, Phys. Rev. C 62 (2000) 054320",
     SOFT_RANGE "the target is silent: heavy nuclei at small angles", schwinger_factor, schwinger,
     schwinger_rate, wide_cut},
    {"mo-tsai", "eq. II.6 for electrons and positrons; for muons its recipe with the mass exact",
     "Mo & Tsai, Rev. Mod. Phys. 41 (1969) 205; Tsai, Phys. Rev. 122 (1961) 1898",
     SOFT_RANGE "electrons: q2 far above their mass squared", mo_tsai_factor, mo_tsai, mo_tsai_rate,
     light_only},
    {"maximon-tjon",
     "lepton, target and their interference, soft integrals and the lepton mass exact",
     "Maximon & Tjon, Phys. Rev. C 62 (2000) 054320; loops of hadrons: Burkhardt & Pietrzyk, Phys. "
     "Lett. B 513 (2001) 46",
     SOFT_RANGE "two-photon exchange: its infrared part", maximon_tjon_factor, maximon_tjon,
     maximon_tjon_rate, wide_cut},
};

const bh_radiative *bh_radiative_at(int i)
{
    return i >= 0 && (size_t)i < sizeof models / sizeof models[0] ? &models[i] : NULL;
}

const bh_radiative *bh_radiative_find(const char *name)
{
    const bh_radiative *row = NULL;
    if (!name || strcmp(name, "default") == 0)
        name = "maximon-tjon"; /* 1 for what is no lepton */
    for (int i = 0; (row = bh_radiative_at(i)) && strcmp(row->name, name) != 0; i++)
        ;
    return row;
}
