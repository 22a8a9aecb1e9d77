/* particle.c - the named particles, nuclides as beams, and what a wrong name probably meant. */
#include "beamhours/units/particle.h"

#include <stddef.h>
#include <stdio.h>
#include <string.h>

#include "beamhours/base/nearest.h"
#include "beamhours/units/constants.h"
#include "beamhours/units/nuclide.h"

/* Nuclear magnetons to the particle's own: times charge-less mass over the proton's. */
#define OWN(moment, mass) ((moment) * (mass) / BH_MASS_PROTON)

static const bh_particle particles[] = {
    {"electron", BH_KIND_LEPTON, -1, 1, 0, 0, BH_MASS_ELECTRON, -BH_MOMENT_ELECTRON},
    {"positron", BH_KIND_LEPTON, +1, 1, 0, 0, BH_MASS_ELECTRON, +BH_MOMENT_ELECTRON},
    {"muon-", BH_KIND_LEPTON, -1, 1, 0, 0, BH_MASS_MUON, -BH_MOMENT_MUON},
    {"muon+", BH_KIND_LEPTON, +1, 1, 0, 0, BH_MASS_MUON, +BH_MOMENT_MUON},
    {"pion-", BH_KIND_HADRON, -1, 0, 0, 0, BH_MASS_PION, 0.0},
    {"pion+", BH_KIND_HADRON, +1, 0, 0, 0, BH_MASS_PION, 0.0},
    {"proton", BH_KIND_HADRON, 1, 1, 1, 1, BH_MASS_PROTON, BH_MOMENT_PROTON},
    {"deuteron", BH_KIND_ION, 1, 2, 1, 2, BH_MASS_DEUTERON,
     OWN(BH_MOMENT_DEUTERON, BH_MASS_DEUTERON)},
    {"triton", BH_KIND_ION, 1, 1, 1, 3, BH_MASS_TRITON, OWN(BH_MOMENT_TRITON, BH_MASS_TRITON)},
    {"helion", BH_KIND_ION, 2, 1, 2, 3, BH_MASS_HELION, OWN(BH_MOMENT_HELION, BH_MASS_HELION)},
    {"alpha", BH_KIND_ION, 2, 0, 2, 4, BH_MASS_ALPHA, 0.0},
};
enum { PARTICLES = sizeof particles / sizeof particles[0] };

/* Short forms and other words in use.  A suggestion, not a synonym: a plan has one name a thing. */
static const struct {
    char wrong[12];
    char right[12];
} short_forms[] = {
    {"e", "electron"},
    {"e-", "electron"},
    {"e+", "positron"},
    {"beta-", "electron"},
    {"beta+", "positron"},
    {"mu", "muon-"},
    {"mu-", "muon-"},
    {"mu+", "muon+"},
    {"muon", "muon-"},
    {"antimuon", "muon+"},
    {"pi", "pion-"},
    {"pi-", "pion-"},
    {"pi+", "pion+"},
    {"pion", "pion-"},
    {"p", "proton"},
    {"p+", "proton"},
    {"h+", "proton"},
    {"hydrogen", "proton"},
    {"d", "deuteron"},
    {"deuterium", "deuteron"},
    {"t", "triton"},
    {"tritium", "triton"},
    {"helium-3", "helion"},
    {"helium3", "helion"},
    {"a", "alpha"},
    {"he", "alpha"},
    {"helium", "alpha"},
    {"helium-4", "alpha"},
    {"antielectron", "positron"},
};

const char *bh_particle_name(int i)
{
    return i >= 0 && i < PARTICLES ? particles[i].name : NULL;
}

static bool from_nuclide(const char *name, bh_particle *out)
{
    int z, a;
    if (!bh_nuclide_parse(name, &z, &a) || z < 1)
        return false;
    for (int i = 0; i < PARTICLES; i++)
        if (particles[i].z == z && particles[i].a == a) {
            *out = particles[i];
            return true;
        }
    const bh_nuclide *nuclide = bh_nuclide_find(z, a);
    if (!nuclide)
        return false;
    *out = (bh_particle){.kind = BH_KIND_ION,
                         .charge = z,
                         .twice_spin = nuclide->twice_spin,
                         .z = z,
                         .a = a,
                         .mass = nuclide->mass};
    (void)snprintf(out->name, sizeof out->name, "%s", nuclide->name);
    return true;
}

bool bh_particle_find(const char *name, bh_particle *out)
{
    for (int i = 0; i < PARTICLES; i++)
        if (strcmp(name, particles[i].name) == 0) {
            *out = particles[i];
            return true;
        }
    return from_nuclide(name, out);
}

/* "Alpha particles" -> "alpha", "Protons" -> "proton": small letters, no plural, no "particle". */
static void plain_form(const char *name, char out[24])
{
    static const char *const tails[] = {" beam", "s", " particle", "-particle"};
    size_t n = 0;
    for (; n < 23 && name[n]; n++)
        out[n] = (char)(name[n] >= 'A' && name[n] <= 'Z' ? name[n] | 0x20 : name[n]);
    out[n] = '\0';
    for (size_t i = 0; i < sizeof tails / sizeof tails[0]; i++) {
        const size_t length = strlen(tails[i]);
        if (n > length && strcmp(out + n - length, tails[i]) == 0)
            out[n -= length] = '\0';
    }
}

static const char *short_form(const char *plain)
{
    for (size_t i = 0; i < sizeof short_forms / sizeof short_forms[0]; i++)
        if (strcmp(plain, short_forms[i].wrong) == 0)
            return short_forms[i].right;
    return NULL;
}

const char *bh_particle_suggest(const char *name)
{
    char plain[24];
    plain_form(name, plain);
    const char *found = short_form(plain);
    if (found)
        return found;
    const bh_nuclide *nuclide = bh_nuclide_suggest(name);
    if (!nuclide || nuclide->z == 0) {
        const char *names[PARTICLES];
        for (int i = 0; i < PARTICLES; i++)
            names[i] = particles[i].name;
        return bh_nearest(plain, names, PARTICLES);
    }
    for (int i = 0; i < PARTICLES; i++)
        if (particles[i].z == nuclide->z && particles[i].a == nuclide->a)
            return particles[i].name;
    return nuclide->name;
}
