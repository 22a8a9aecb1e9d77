/* gate.c - which energies at the scattering point an arm takes. */
#include <math.h>

#include "beamhours/run/taking.h"
#include "beamhours/run/yield.h"
#include "beamhours/units/constants.h"

static double kinetic_of(double mass, double momentum)
{
    return momentum * momentum / (hypot(momentum, mass) + mass);
}

/* Energy [MeV] that the detected particle of an elastic event on the arm's axis loses on its way
 * out, mean over the depths it comes out of. */
static bh_code lost_behind(bh_yielder *yielder, const bh_view *view, const bh_way *way,
                           size_t count, double *lost)
{
    bh_leaver leaver = {.ranges = yielder->ranges};
    const bh_particle particle = bh_channel_detected(&view->line);
    double sum = 0, weight = 0;
    bh_event event;
    *lost = 0;
    if (!way->losing || !bh_channel_has(&view->line, view->axis, &event))
        return BH_OK;
    const double kinetic = bh_channel_kinetic(&view->line, &event);
    const bh_code code =
        bh_leaver_make(yielder->workspace, way, &particle, fmax(kinetic, way->kinetic), &leaver);
    for (size_t i = 0; !code && i < count; i++) {
        const bh_vertex *v = &yielder->vertices[i];
        const double left = bh_leaver_left(&leaver, v, view->axis, kinetic);
        sum += left > 0 ? v->weight * (kinetic - left) : 0;
        weight += left > 0 ? v->weight : 0;
    }
    *lost = weight > 0 ? sum / weight : 0;
    return code;
}

/* The least kinetic energy [MeV] with which an electron comes out from the middle of the vertices
 * on the arm's axis and is detected. */
static bh_code least_electron(bh_yielder *yielder, const bh_view *view, size_t count,
                              double threshold, double *least)
{
    bh_leaver leaver = {.ranges = yielder->ranges};
    bh_particle electron;
    double low = fmax(threshold, 1e-3), high = view->way.kinetic;
    *least = threshold;
    if (!view->way.losing || count == 0 || !(low < high) ||
        !bh_particle_find("electron", &electron))
        return BH_OK;
    const bh_code code =
        bh_leaver_make(yielder->workspace, &view->way, &electron, view->way.kinetic, &leaver);
    for (int i = 0; !code && i < 20; i++) {
        const double middle = sqrt(low * high);
        const bool out = bh_leaver_left(&leaver, &yielder->vertices[count / 2], view->axis,
                                        middle) > fmax(threshold, 1e-6);
        *(out ? &high : &low) = middle;
    }
    *least = code ? threshold : high;
    return code;
}

/* With what rms [MeV] the energy at the lower end of the bite is measured. */
static double blur_at(const bh_view *view, double mass, double kinetic)
{
    const double momentum = bh_bite_momentum(mass, kinetic);
    const bh_momentum_rms rms = bh_taking_rms(&view->arm->arm, &view->setting->beam);
    const double sigma = bh_bite_sigma(&rms, mass, momentum, momentum);
    return sigma * momentum / (kinetic + mass);
}

bh_code bh_view_gate(bh_yielder *yielder, bh_view *view, size_t count)
{
    const bh_arm *arm = &view->arm->arm;
    const double mass = bh_channel_detected(&view->line).mass;
    const double threshold = arm->threshold.given ? arm->threshold.value : 0;
    double lost = 0;
    bh_code code = lost_behind(yielder, view, &view->way, count, &lost);
    const double from = fmax(threshold, view->cut ? kinetic_of(mass, view->bite_from) : 0);
    view->gate =
        (bh_gate){.cut = arm->energy_cut.given ? arm->energy_cut.value : (double)INFINITY,
                  .from = from > 0 ? from + lost : 0,
                  .to = view->cut ? kinetic_of(mass, view->bite_to) + lost : (double)INFINITY,
                  .blur = from > 0 ? blur_at(view, mass, from) : 0,
                  .given = arm->energy_cut.given || view->cut};
    view->lost = lost;
    view->least = 0;
    if (!code && !view->cut && view->setting->beam.particle.kind == BH_KIND_LEPTON)
        code = least_electron(yielder, view, count, threshold, &view->least);
    return code;
}

bh_code bh_gate_there(bh_yielder *yielder, const bh_view *view, const bh_way *way, size_t count,
                      bh_gate *gate)
{
    double lost = view->lost;
    *gate = view->gate;
    if (!(gate->from > 0) && !(gate->to < (double)INFINITY))
        return BH_OK;
    const bh_code code = lost_behind(yielder, view, way, count, &lost);
    gate->from += gate->from > 0 ? lost - view->lost : 0;
    gate->to += lost - view->lost;
    return code;
}

bh_radiated_request bh_view_radiated(const bh_yielder *yielder, const bh_view *view,
                                     const bh_channel *channel, const bh_way *way, size_t count)
{
    bh_radiated_request request = {.model = view->radiative,
                                   .channel = *channel,
                                   .line = view->line,
                                   .gate = view->gate,
                                   .way = way,
                                   .vertices = yielder->vertices,
                                   .polar = view->acceptance.whole.polar,
                                   .count = count};
    return request;
}

const bh_channel_sum *bh_elastic_sums(bh_yielder *yielder, const bh_view *view,
                                      const bh_elastic_of *of, bh_error *err)
{
    bh_radiated_request radiated = bh_view_radiated(yielder, view, of->channel, of->way, of->count);
    bh_channel_request request = bh_view_request(yielder, view, of->channel, of->way, of->count);
    bh_radiated factor;
    radiated.signal = of->signal;
    radiated.trace = of->trace;
    radiated.unboosted = view->without_changes;
    bh_radiated_make(&radiated, &factor);
    request.radiated = &factor;
    request.sensitivities = of->signal && !of->trace;
    request.without_changes = view->without_changes;
    request.trace = of->trace;
    request.bins = request.bins && !of->binless;
    request.radiated_only = !of->signal && !of->whole;
    if (!of->signal && !factor.idle) /* the factor knows the edges */
        request.cut = false;
    return bh_channel_sums(yielder->workspace, &request, err);
}
