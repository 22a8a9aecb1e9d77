/* beam.h - a particle and its kinetic energy from the command line. */
#ifndef BH_COMMAND_BEAM_H
#define BH_COMMAND_BEAM_H

#include "beamhours/command/options.h"
#include "beamhours/units/particle.h"

/* The particle of --particle.  Returns 0, or 64 after saying what would do. */
int bh_beam_particle(const bh_arguments *arguments, bh_particle *out);

/* Sets `kinetic` [MeV] of the whole particle from --kinetic-energy, also given per nucleon; leaves
 * it alone when the option is absent.  Returns 0, or 64 after saying what would do. */
int bh_beam_kinetic(const bh_arguments *arguments, const bh_particle *particle, double *kinetic);

#endif
