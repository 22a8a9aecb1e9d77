/* one_point.h - one point without a plan: kinematics, cross sections, and a rate when asked. */
#ifndef BH_RUN_ONE_POINT_H
#define BH_RUN_ONE_POINT_H

#include <stdbool.h>
#include <stddef.h>

#include "beamhours/base/error.h"
#include "beamhours/matter/material.h"
#include "beamhours/units/particle.h"

/* What is known.  Two of kinetic, angle, q2 and epsilon; NAN for the others and for what is not
 * wanted. */
typedef struct {
    bh_particle beam;
    int z, a;              /* the struck nucleus */
    double kinetic;        /* [MeV] of the whole particle */
    double angle;          /* [rad] of the detected particle */
    double q2;             /* [MeV^2] */
    double epsilon;        /* [1] */
    bool recoil;           /* the detected particle is the recoil */
    const char *process;   /* NULL: elastic */
    const char *structure; /* NULL: default */
    const char *radiative; /* NULL: default where there is a cut, else none */
    double energy_cut;     /* [MeV] below the elastic line; 0: no radiation */
    double current;        /* [A] electrical; a rate needs these four */
    const bh_material *material;
    double thickness;   /* [cm] */
    double solid_angle; /* [sr] */
} bh_single_request;

enum { BH_SINGLE_MOST = 40 };

/* One number of the answer. */
typedef struct {
    const char *key;  /* as in run/columns.h, or one of docs/output.md's own for a point */
    const char *unit; /* for people */
    double value;     /* [1] in the unit that the key names; NAN: empty */
    const char *text; /* instead of a number; NULL */
} bh_single_value;

typedef struct {
    size_t count;
    bh_single_value values[BH_SINGLE_MOST];
    char scatterer[8], structure[48]; /* names that values[] point to */
    char formula[160];                /* which formula, in words */
    char source[256];                 /* of that formula */
    char structure_source[256];       /* of the structure model */
    char warning[5][320];             /* "" where there is none */
} bh_single;

/*
 * Computes the point.  BH_EDOMAIN with what would do when not exactly two of the four are given,
 * when they contradict each other (an angle that cannot be reached), or when a name is unknown.
 * Accuracy: that of physics/kinematics.h; 1e-10 where an energy is searched for.
 */
BH_CHECKED bh_code bh_single_compute(const bh_single_request *request, bh_single *out,
                                     bh_error *err);

#endif
