/* sum_places.c - where an arm is while it is summed over, and where it is moved to. */
#include "beamhours/run/sum_places.h"

#include <math.h>

#include "beamhours/units/constants.h"

static bh_code set_moved(const bh_channel_request *r, bh_sum_places *p, double *edges,
                         bh_error *err)
{
    bh_code code = BH_OK;
    for (int i = 0; !code && i < 2; i++) {
        const double by = i ? BH_STEP_ANGLE : -BH_STEP_ANGLE;
        bh_acceptance_spec spec = r->acceptance;
        double *moved = edges + (size_t)i * (BH_MOST_BINS + 1);
        spec.angle += by;
        for (int k = 0; spec.edges && k <= spec.bins; k++)
            moved[k] = spec.edges[k] + by;
        spec.edges = spec.edges ? moved : NULL;
        code = bh_acceptance_make(&spec, &p->moved[i], err);
        if (!code) {
            p->polar.from = fmin(p->polar.from, p->moved[i].whole.polar.from);
            p->polar.to = fmax(p->polar.to, p->moved[i].whole.polar.to);
        }
    }
    return code;
}

bh_code bh_sum_places_of(const bh_channel_request *r, bh_sum_places *p, double *edges,
                         bh_error *err)
{
    const bh_code code = bh_acceptance_make(&r->acceptance, &p->at, err);
    if (code)
        return code;
    p->polar = bh_average_range(&p->at);
    p->turns = r->sensitivities && r->acceptance.shape != BH_ACCEPTANCE_RING &&
               r->acceptance.angle > BH_STEP_ANGLE && r->acceptance.angle < BH_PI - BH_STEP_ANGLE;
    if (p->turns && r->acceptance.shape == BH_ACCEPTANCE_POINT)
        p->polar = (bh_interval){p->polar.from - BH_STEP_ANGLE, p->polar.to + BH_STEP_ANGLE};
    return p->turns && !r->without_changes ? set_moved(r, p, edges, err) : BH_OK;
}
