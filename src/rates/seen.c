/* seen.c - how much of each target layer an arm sees. */
#include "beamhours/rates/seen.h"

#include <math.h>

#include "beamhours/units/constants.h"

/* A stretch along the beam. */
typedef struct {
    double from, to; /* [cm] */
} stretch;

static double overlap(stretch a, stretch b)
{
    return fmax(0, fmin(a.to, b.to) - fmax(a.from, b.from));
}

static bool view_makes_sense(const bh_seen_view *view)
{
    if (!(fabs(view->tilt) < BH_PI / 2))
        return false;
    return !view->limited || (view->angle >= 0 && view->angle <= BH_PI && view->from < view->to);
}

/* The middle of the sample layers along the beam, the first layer beginning at 0; `slant` is the
 * length along the beam per thickness. */
static double centre_of(double slant, size_t count, const bh_seen_layer *layers)
{
    double at = 0;
    stretch sample = {(double)NAN, (double)NAN};
    for (size_t i = 0; i < count; i++) {
        const double end = at + layers[i].thickness * slant;
        if (layers[i].sample) {
            sample.from = isnan(sample.from) ? at : sample.from;
            sample.to = end;
        }
        at = end;
    }
    return isnan(sample.from) ? at / 2 : (sample.from + sample.to) / 2;
}

/* What the arm sees along the beam. */
static stretch seen_stretch(const bh_seen_view *view, size_t count, const bh_seen_layer *layers)
{
    const double narrowing = sin(view->angle);
    /* sin(pi) is not quite 0 in floating point */
    if (!view->limited || narrowing < 1e-12)
        return (stretch){-HUGE_VAL, HUGE_VAL};
    const double centre = centre_of(1 / cos(view->tilt), count, layers);
    return (stretch){centre + view->from / narrowing, centre + view->to / narrowing};
}

static double seen_share(stretch seen, stretch layer)
{
    if (layer.to > layer.from)
        return overlap(seen, layer) / (layer.to - layer.from);
    return layer.from >= seen.from && layer.from <= seen.to ? 1 : 0;
}

static bool layers_make_sense(size_t count, const bh_seen_layer *layers)
{
    for (size_t i = 0; i < count; i++)
        if (!(layers[i].thickness >= 0 && isfinite(layers[i].thickness)))
            return false;
    return true;
}

static bh_code check(const bh_seen_view *view, size_t count, const bh_seen_layer *layers,
                     bh_error *err)
{
    if (!view_makes_sense(view))
        return bh_fail(
            err, BH_EDOMAIN,
            "a target view of %g to %g cm at %g rad with a tilt of %g rad makes no sense",
            view->from, view->to, view->angle, view->tilt);
    if (!layers_make_sense(count, layers))
        return bh_fail(err, BH_EDOMAIN, "a target layer has no thickness of 0 cm or more");
    return BH_OK;
}

bh_code bh_seen_paths(const bh_seen_view *view, size_t count, const bh_seen_layer *layers,
                      double *path, bh_error *err)
{
    const bh_code code = check(view, count, layers, err);
    if (code)
        return code;
    const double slant = 1 / cos(view->tilt);
    const stretch seen = seen_stretch(view, count, layers);
    double at = 0;
    for (size_t i = 0; i < count; i++) {
        const double end = at + layers[i].thickness * slant;
        path[i] = slant * seen_share(seen, (stretch){at, end});
        at = end;
    }
    return BH_OK;
}

bh_code bh_seen_spans(const bh_seen_view *view, size_t count, const bh_seen_layer *layers,
                      bh_seen_span *span, bh_error *err)
{
    const bh_code code = check(view, count, layers, err);
    if (code)
        return code;
    const double slant = 1 / cos(view->tilt);
    const stretch seen = seen_stretch(view, count, layers);
    double at = 0;
    for (size_t i = 0; i < count; i++) {
        const double thickness = layers[i].thickness;
        span[i].from = fmin(fmax((seen.from - at) / slant, 0), thickness);
        span[i].to = fmin(fmax((seen.to - at) / slant, span[i].from), thickness);
        at += thickness * slant;
    }
    return BH_OK;
}

double bh_seen_length(const bh_seen_view *view, size_t count, const bh_seen_layer *layers)
{
    if (!view_makes_sense(view) || !layers_make_sense(count, layers))
        return (double)NAN;
    const double slant = 1 / cos(view->tilt);
    const stretch seen = seen_stretch(view, count, layers);
    double at = 0;
    double length = 0;
    for (size_t i = 0; i < count; i++) {
        const double end = at + layers[i].thickness * slant;
        if (layers[i].sample)
            length += overlap(seen, (stretch){at, end});
        at = end;
    }
    return length;
}
