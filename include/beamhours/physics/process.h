/* process.h - the registry of processes: from an event to a cross section. */
#ifndef BH_PHYSICS_PROCESS_H
#define BH_PHYSICS_PROCESS_H

#include <stddef.h>

#include "beamhours/base/error.h"
#include "beamhours/physics/kinematics.h"
#include "beamhours/physics/structure.h"
#include "beamhours/units/particle.h"

/* Who meets whom at what energy; the caller owns what it points to. */
typedef struct {
    const bh_particle *beam;
    int charge;                    /* of the beam particle as it arrives, in units of e; the
                                      bare beam->charge scatters */
    int z, a;                      /* of the struck nucleus */
    double target;                 /* [MeV] its mass */
    double kinetic;                /* [MeV] beam kinetic energy of the whole particle */
    const bh_structure *structure; /* of the struck nucleus */
    double angle; /* [rad] the most forward scattered angle of interest, for caveats; 0 not known */
} bh_encounter;

typedef struct bh_process {
    const char *name;    /* as in a plan: "elastic" */
    const char *summary; /* one line */
    const char *source;
    /* Fills cross_section [ub/sr], n values, per nucleus, lab, per solid angle of the scattered
     * particle, for n events of `encounter`; infinite at q2 = 0.  Where beam and target are
     * identical, either of the two is meant (both are in it).  No allocation; inputs were checked
     * by the kinematics. */
    void (*cross_section)(const bh_encounter *encounter, size_t n, const bh_event *event,
                          double *cross_section);
    /* Which formula is used for this encounter, in words, for explain. */
    const char *(*formula)(const bh_encounter *encounter);
    /* A sentence when the encounter is outside the formula's validity (nuclear forces for hadrons,
     * atomic screening), into `out`; returns its length, 0 when all is well. */
    int (*caveat)(const bh_encounter *encounter, char *out, size_t size);
} bh_process;

/* The rows, each in its file of process/. */
extern const bh_process bh_process_elastic;

/* By name; NULL when it is not in the registry.  The i-th; NULL past the end. */
const bh_process *bh_process_find(const char *name);
const bh_process *bh_process_at(int i);

#endif
