/* beam_power.c - the power of a beam, and how it is written. */
#include "beamhours/run/beam_power.h"

#include "beamhours/base/number.h"
#include "beamhours/units/constants.h"

double bh_beam_power(const bh_beam *beam)
{
    return beam->particle_rate.value * beam->kinetic_energy.value * 1e6 * BH_ELEMENTARY;
}

void bh_power_append(bh_text *text, double watts)
{
    static const struct {
        double size; /* [W] */
        const char *unit;
    } units[] = {{1e6, "MW"}, {1e3, "kW"}, {1, "W"}, {1e-3, "mW"}, {1e-6, "uW"}, {1e-9, "nW"}};
    size_t i = 0;
    while (i + 1 < sizeof units / sizeof units[0] && watts < units[i].size)
        i++;
    char number[BH_NUMBER_SIZE];
    bh_number_digits(watts / units[i].size, 3, number, sizeof number);
    bh_text_appendf(text, "%s %s", number, units[i].unit);
}
