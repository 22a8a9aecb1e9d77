/* beam.c - a particle and its kinetic energy from the command line. */
#include "beamhours/command/beam.h"

#include "beamhours/units/quantity.h"

int bh_beam_particle(const bh_arguments *arguments, bh_particle *out)
{
    char sentence[256];
    const char *given = arguments->value[BH_OPT_PARTICLE];
    if (!given)
        return bh_usage(arguments, "needs --particle, such as electron, muon-, proton, alpha, 12C");
    if (bh_particle_find(given, out))
        return 0;
    const char *near = bh_particle_suggest(given);
    (void)snprintf(sentence, sizeof sentence, "no particle \"%.60s\"; %s%s%s", given,
                   near ? "did you mean " : "there are electron, proton, alpha, 12C ...",
                   near ? near : "", near ? "?" : "");
    return bh_usage(arguments, sentence);
}

int bh_beam_kinetic(const bh_arguments *arguments, const bh_particle *particle, double *kinetic)
{
    bh_quantity q;
    bh_error err;
    const char *given = arguments->value[BH_OPT_KINETIC];
    if (!given)
        return 0;
    if (bh_quantity_parse(given, BH_DIM_ENERGY_OR_PER_U, &q, &err))
        return bh_usage_option(arguments, BH_OPT_KINETIC, err.text);
    if (q.per_u && particle->a == 0)
        return bh_usage(arguments, "the particle has no mass number; give the energy of all of it");
    *kinetic = q.per_u ? q.value * particle->a : q.value;
    return 0;
}
