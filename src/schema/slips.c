/* slips.c - keys that people write from habit, and what they mean here. */
#include "beamhours/schema/slips.h"

#include <string.h>
#include <strings.h>

struct slip {
    const char *written, *meant;
};

/* A word may stand for several keys: the first that the mapping at hand knows is suggested. */
static const struct slip slips[] = {
    {"energy", "kinetic_energy"},
    {"beam_energy", "kinetic_energy"},
    {"e", "kinetic_energy"},
    {"e0", "kinetic_energy"},
    {"t", "kinetic_energy"},
    {"ekin", "kinetic_energy"},
    {"p", "momentum"},
    {"i", "current"},
    {"intensity", "current"},
    {"intensity", "particle_rate"},
    {"rate", "particle_rate"},
    {"flux", "particle_rate"},
    {"type", "particle"},
    {"species", "particle"},
    {"projectile", "particle"},
    {"energy_spread", "momentum_spread"},
    {"purity", "fraction"},
    {"contamination", "others"},
    {"duty_cycle", "duty_factor"},
    {"size", "spot"},
    {"theta", "angle"},
    {"polar_angle", "angle"},
    {"scattering_angle", "angle"},
    {"theta", "ring"},
    {"q", "q2"},
    {"qsq", "q2"},
    {"q2_gev2", "q2"},
    {"q^2", "q2"},
    {"phi", "azimuth"},
    {"omega", "solid_angle"},
    {"domega", "solid_angle"},
    {"acceptance", "solid_angle"},
    {"horizontal", "in_plane"},
    {"vertical", "out_of_plane"},
    {"delta", "momentum_bite"},
    {"momentum_acceptance", "momentum_bite"},
    {"length", "thickness"},
    {"width", "thickness"},
    {"density_thickness", "areal_density"},
    {"mass_thickness", "areal_density"},
    {"nucleus", "scatterer"},
    {"isotope", "scatterer"},
    {"element", "scatterer"},
    {"temp", "temperature"},
    {"rho", "density"},
    {"kind", "role"},
    {"type", "role"},
    {"spectrometer", "arm"},
    {"detector", "arm"},
    {"spectrometers", "arms"},
    {"detectors", "arms"},
    {"precision", "goal"},
    {"accuracy", "goal"},
    {"uncertainty", "goal"},
    {"error", "goal"},
    {"duration", "time"},
    {"hours", "time"},
    {"events", "counts"},
    {"statistics", "counts"},
    {"runs", "settings"},
    {"points", "settings"},
    {"kinematics", "settings"},
    {"defaults", "every_setting"},
    {"default", "every_setting"},
    {"beamtime", "schedule"},
    {"beam_time", "schedule"},
    {"comment", "notes"},
    {"description", "notes"},
    {"name", "title"},
    {"version", "plan"},
    {"model", "structure"},
    {"form_factor", "structure"},
    {"form_factors", "structure"},
    {"reaction", "process"},
    {"radiation", "radiative"},
    {"cut", "energy_cut"},
    {"resolution", "energy_resolution"},
    {"overhead", "changes"},
    {"overheads", "changes"},
    {"reserve", "contingency"},
    {"uptime", "availability"},
    {"setup", "start_up"},
    {"startup", "start_up"},
};

const char *bh_slip(const char *word, const char *const *names, size_t count)
{
    for (size_t s = 0; s < sizeof slips / sizeof slips[0]; s++) {
        if (strcasecmp(word, slips[s].written) != 0)
            continue;
        for (size_t i = 0; i < count; i++)
            if (strcmp(names[i], slips[s].meant) == 0)
                return names[i];
    }
    return NULL;
}
