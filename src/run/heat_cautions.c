/* heat_cautions.c - what the heat of the beam in a target should make people think of. */
#include "beamhours/run/heat_cautions.h"

#include <stdlib.h>

#include "beamhours/base/number.h"
#include "beamhours/run/beam_power.h"
#include "beamhours/run/heat.h"

static const double least = 0.1; /* [W] worth a word */
static const double close = 0.5; /* of the melting point */

const bh_setting *bh_heat_setting(const bh_plan *plan, const bh_target *target)
{
    const bh_setting *best = NULL;
    for (size_t i = 0; i < plan->setting_count; i++) {
        const bh_setting *s = &plan->settings[i];
        if (s->target == target &&
            (!best || s->beam.particle_rate.value > best->beam.particle_rate.value))
            best = s;
    }
    return best;
}

static void append(bh_text *text, const char *before, double value, const char *unit)
{
    char number[BH_NUMBER_SIZE];
    bh_number_digits(value, 2, number, sizeof number);
    bh_text_appendf(text, "%s%s %s", before, number, unit);
}

/* How near a layer comes to melting; 0 where nothing is known. */
static double nearness(const bh_layer *layer, const bh_layer_heat *heat)
{
    const double melting = layer->material->melting;
    return melting > 0 ? heat->temperature / melting : 0;
}

static void say_hottest(const bh_setting *setting, const bh_layer_heat *heat, bh_text *text)
{
    const bh_layer *layers = setting->target->layers;
    size_t hot = 0;
    for (size_t i = 1; i < setting->target->layer_count; i++)
        if (nearness(&layers[i], &heat[i]) > nearness(&layers[hot], &heat[hot]))
            hot = i;
    const double near = nearness(&layers[hot], &heat[hot]);
    if (!(near > 0))
        return;
    bh_text_appendf(text, "; %s", layers[hot].material->name);
    if (near >= 1) {
        append(text, " may reach its melting point, ", layers[hot].material->melting, "K");
        return;
    }
    append(text, " may reach ", heat[hot].temperature, "K");
    append(text, near > close ? ", more than half of the " : " of the ",
           layers[hot].material->melting, "K at which it melts");
}

static void say(const bh_setting *setting, const bh_layer_heat *heat, double sum, bh_text *text)
{
    const bh_heated_spot spot = bh_spot_of(&setting->beam);
    bh_text_appendf(text, "Target %s: the beam leaves about ", setting->target->name.text);
    bh_power_append(text, sum);
    bh_text_append(text, " in it");
    say_hottest(setting, heat, text);
    if (spot.assumed)
        bh_text_append(text, " (screening estimates, spot of 1 mm radius assumed)");
    else
        append(text, " (screening estimates, spot of ", spot.radius * 10, "mm radius)");
}

bool bh_heat_say(const bh_setting *setting, bh_text *text)
{
    bh_layer_heat *heat = calloc(setting->target->layer_count + 1, sizeof *heat);
    if (!heat)
        return false;
    const double sum = bh_target_heat(setting, heat);
    if (sum >= least)
        say(setting, heat, sum, text);
    free(heat);
    return sum >= least;
}
