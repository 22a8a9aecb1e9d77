/* particle.h - what a beam can be made of: leptons, hadrons, light ions, any nuclide. */
#ifndef BH_UNITS_PARTICLE_H
#define BH_UNITS_PARTICLE_H

#include <stdbool.h>

typedef enum { BH_KIND_LEPTON, BH_KIND_HADRON, BH_KIND_ION } bh_particle_kind;

typedef struct {
    char name[16];         /* "electron", "muon-", "alpha", "12C" */
    bh_particle_kind kind; /* proton and pion are hadrons; deuteron and heavier are ions */
    int charge;            /* of the bare particle, in units of e */
    int twice_spin;        /* 0 pion and alpha, 1 electron and proton, 2 deuteron; -1 not known */
    int z, a;              /* of the nucleus; 0, 0 for leptons and pions */
    double mass;           /* [MeV] of the bare particle */
    double magnetic; /* [1] magnetic moment in units of e hbar / 2 m of itself, e > 0: electron
                      * -1.001; 0 none or not known */
} bh_particle;

/* Finds a particle by the name used in a plan (also a nuclide such as 12C, any of the table); 1H to
 * 4He become the particle with a name of its own ("4He" -> "alpha").  False when unknown. */
bool bh_particle_find(const char *name, bh_particle *out);

/* The name that was probably meant ("e-" -> "electron", "C" -> "12C"), or NULL. */
const char *bh_particle_suggest(const char *name);

/* The i-th named particle (nuclides not among them), or NULL past the end: for choosers and docs.
 */
const char *bh_particle_name(int i);

#endif
