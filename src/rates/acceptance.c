/* acceptance.c - what part of all directions an arm covers, as a weight over the polar angle. */
#include "beamhours/rates/acceptance.h"

#include <math.h>
#include <stddef.h>

#include "beamhours/rates/quadrature.h"
#include "beamhours/units/constants.h"

#define HALF_PI (BH_PI / 2)

/* A stretch of one coordinate, folded into 0 .. its quarter's end. */
typedef struct {
    double from, to; /* [rad] */
} stretch;

static double clamp(double x, double lo, double hi)
{
    return x < lo ? lo : (x > hi ? hi : x);
}

/* --- checks --- */

static bool edges_rise(const bh_acceptance_spec *spec, int bins)
{
    for (int i = 0; spec->edges && i < bins; i++)
        if (!(spec->edges[i] < spec->edges[i + 1]))
            return false;
    return true;
}

static bh_code check_rectangle(const bh_acceptance_spec *spec, bh_error *err)
{
    const double width = spec->in_plane_to - spec->in_plane_from;
    /* a whole turn written as +-180 degrees is allowed its rounding */
    if (!(width > 0 && width <= 2 * BH_PI * (1 + 1e-12)))
        return bh_fail(err, BH_EDOMAIN, "an in-plane acceptance from %g to %g rad is no extent",
                       spec->in_plane_from, spec->in_plane_to);
    if (!(spec->in_plane_from >= -2 * BH_PI && spec->in_plane_to <= 2 * BH_PI))
        return bh_fail(err, BH_EDOMAIN, "an in-plane acceptance from %g to %g rad is too far out",
                       spec->in_plane_from, spec->in_plane_to);
    if (!(spec->out_of_plane_from < spec->out_of_plane_to && spec->out_of_plane_from >= -HALF_PI &&
          spec->out_of_plane_to <= HALF_PI))
        return bh_fail(err, BH_EDOMAIN,
                       "an out-of-plane acceptance from %g to %g rad: it must rise, within 90 deg",
                       spec->out_of_plane_from, spec->out_of_plane_to);
    return BH_OK;
}

static bh_code check_ring(const bh_acceptance_spec *spec, bh_error *err)
{
    if (!(spec->ring_from >= 0 && spec->ring_from < spec->ring_to && spec->ring_to <= BH_PI))
        return bh_fail(err, BH_EDOMAIN,
                       "a ring from %g to %g rad: it must rise, within 0 to 180 deg",
                       spec->ring_from, spec->ring_to);
    if (!(spec->azimuth >= 0 && spec->azimuth <= 2 * BH_PI))
        return bh_fail(err, BH_EDOMAIN, "a ring of %g rad of azimuth: at most 360 deg",
                       spec->azimuth);
    return BH_OK;
}

static bh_code check(const bh_acceptance_spec *spec, bh_error *err)
{
    const bool ring = spec->shape == BH_ACCEPTANCE_RING;
    if (!ring && !(spec->angle >= 0 && spec->angle <= BH_PI))
        return bh_fail(err, BH_EDOMAIN, "an arm at %g rad: it must be within 0 to 180 deg",
                       spec->angle);
    if (!(spec->solid_angle >= 0 && spec->solid_angle <= 4 * BH_PI))
        return bh_fail(err, BH_EDOMAIN, "a solid angle of %g sr", spec->solid_angle);
    if (spec->bins < 0 || !edges_rise(spec, spec->bins))
        return bh_fail(err, BH_EDOMAIN, "the edges of %d bins must rise", spec->bins);
    if (ring)
        return check_ring(spec, err);
    if (spec->shape == BH_ACCEPTANCE_RECTANGLE)
        return check_rectangle(spec, err);
    if (!(spec->solid_angle > 0))
        return bh_fail(err, BH_EDOMAIN, "an arm without extents needs a solid angle");
    return BH_OK;
}

/* --- rectangle: quarter-sphere patches --- */

/* Cuts an in-plane stretch at every multiple of pi and folds it into 0 .. pi: left and right of the
 * beam are alike.  Returns how many (at most 4). */
static int fold_in_plane(double from, double to, stretch *out)
{
    const int first = (int)floor(from / BH_PI);
    int n = 0;
    for (int turn = first; turn * BH_PI < to && n < 4; turn++) {
        const double a = clamp(from - turn * BH_PI, 0, BH_PI);
        const double b = clamp(to - turn * BH_PI, 0, BH_PI);
        if (a < b)
            out[n++] = turn % 2 == 0 ? (stretch){a, b} : (stretch){BH_PI - b, BH_PI - a};
    }
    return n;
}

/* The same for up and down: 1 or 2 stretches within 0 .. pi/2. */
static int fold_out_of_plane(double from, double to, stretch *out)
{
    int n = 0;
    if (to > 0)
        out[n++] = (stretch){fmax(from, 0), to};
    if (from < 0)
        out[n++] = (stretch){fmax(-to, 0), -from};
    return n;
}

static double hypot_angle(double in, double out)
{
    /* sin^2(theta/2) = sin^2(in/2) cos(out) + sin^2(out/2): exact near the axis and behind */
    const double si = sin(in / 2);
    const double so = sin(out / 2);
    const double ci = cos(in / 2);
    const double half = si * si * cos(out) + so * so;
    const double rest = ci * ci * cos(out) + so * so;
    return 2 * atan2(sqrt(half), sqrt(rest));
}

static void corners_of(const bh_patch *patch, double corner[4])
{
    corner[0] = hypot_angle(patch->in_from, patch->out_from);
    corner[1] = hypot_angle(patch->in_from, patch->out_to);
    corner[2] = hypot_angle(patch->in_to, patch->out_from);
    corner[3] = hypot_angle(patch->in_to, patch->out_to);
}

static void make_patches(bh_acceptance_part *part)
{
    stretch in[4];
    stretch out[2];
    const int ins = fold_in_plane(part->in_from, part->in_to, in);
    const int outs = fold_out_of_plane(part->out_from, part->out_to, out);
    /* up and down alike: one patch, twice */
    const bool alike = outs == 2 && out[0].from == out[1].from && out[0].to == out[1].to;
    for (int i = 0; i < ins; i++)
        for (int j = 0; j < (alike ? 1 : outs); j++)
            part->patches[part->patch_count++] =
                (bh_patch){in[i].from, in[i].to, out[j].from, out[j].to, alike ? 2 : 1};
}

static bh_interval reach_of(const bh_acceptance_part *part)
{
    bh_interval reach = {BH_PI, 0};
    for (int i = 0; i < part->patch_count; i++) {
        double corner[4];
        corners_of(&part->patches[i], corner);
        for (int j = 0; j < 4; j++) {
            reach.from = fmin(reach.from, corner[j]);
            reach.to = fmax(reach.to, corner[j]);
        }
    }
    return reach;
}

/* --- parts --- */

static void make_rectangle(const bh_acceptance_spec *spec, double from, double to,
                           bh_acceptance_part *part)
{
    const double first = spec->angle + spec->in_plane_from;
    const double last = spec->angle + spec->in_plane_to;
    part->in_from = clamp(from, first, last);
    part->in_to = clamp(to, first, last);
    part->out_from = spec->out_of_plane_from;
    part->out_to = spec->out_of_plane_to;
    /* sin b - sin a without cancellation */
    const double height =
        2 * cos((part->out_to + part->out_from) / 2) * sin((part->out_to - part->out_from) / 2);
    part->solid_angle = (part->in_to - part->in_from) * height;
    if (part->in_from < part->in_to)
        make_patches(part);
    part->polar = part->patch_count ? reach_of(part) : (bh_interval){part->in_from, part->in_from};
}

static void make_ring(const bh_acceptance_spec *spec, double from, double to,
                      bh_acceptance_part *part)
{
    part->in_from = clamp(from, spec->ring_from, spec->ring_to);
    part->in_to = clamp(to, spec->ring_from, spec->ring_to);
    part->azimuth = spec->azimuth > 0 ? spec->azimuth : 2 * BH_PI;
    part->polar = (bh_interval){part->in_from, part->in_to};
    /* cos a - cos b without cancellation */
    part->solid_angle = part->azimuth * 2 * sin((part->in_to + part->in_from) / 2) *
                        sin((part->in_to - part->in_from) / 2);
}

/* The part between two edges of the shape's first coordinate, not scaled. */
static void make_part(const bh_acceptance_spec *spec, double from, double to,
                      bh_acceptance_part *part)
{
    *part = (bh_acceptance_part){.scale = 1};
    if (spec->shape == BH_ACCEPTANCE_RECTANGLE)
        make_rectangle(spec, from, to, part);
    else if (spec->shape == BH_ACCEPTANCE_RING)
        make_ring(spec, from, to, part);
    else {
        part->solid_angle = spec->solid_angle;
        part->polar = (bh_interval){spec->angle, spec->angle};
    }
}

bh_code bh_acceptance_make(const bh_acceptance_spec *spec, bh_acceptance *out, bh_error *err)
{
    const bh_code code = check(spec, err);
    if (code != BH_OK)
        return code;
    const bool point = spec->shape == BH_ACCEPTANCE_POINT;
    bh_acceptance made = {.spec = *spec, .bins = spec->bins > 0 && !point ? spec->bins : 1};
    if (point || spec->bins == 0)
        made.spec.edges = NULL;
    make_part(spec, -HUGE_VAL, HUGE_VAL, &made.whole);
    if (!point && spec->solid_angle > 0)
        made.whole.scale = spec->solid_angle / made.whole.solid_angle;
    made.whole.solid_angle *= made.whole.scale;
    *out = made;
    return BH_OK;
}

double bh_acceptance_edge(const bh_acceptance *acceptance, int i)
{
    const bh_acceptance_spec *spec = &acceptance->spec;
    if (spec->shape == BH_ACCEPTANCE_POINT)
        return spec->angle;
    if (spec->edges)
        return spec->edges[i];
    const double from = acceptance->whole.in_from;
    const double to = acceptance->whole.in_to;
    return i == acceptance->bins ? to : from + (to - from) * i / acceptance->bins;
}

void bh_acceptance_part_of(const bh_acceptance *acceptance, int bin, bh_acceptance_part *out)
{
    if (bin == 0 || acceptance->spec.shape == BH_ACCEPTANCE_POINT) {
        *out = acceptance->whole;
        return;
    }
    make_part(&acceptance->spec, bh_acceptance_edge(acceptance, bin - 1),
              bh_acceptance_edge(acceptance, bin), out);
    out->scale = acceptance->whole.scale;
    out->solid_angle *= out->scale;
}

/* --- the weight --- */

/* sqrt(sin^2 theta - sin^2 edge), without cancellation. */
static double root_above(double theta, double edge)
{
    return sqrt(fmax(0, sin(theta - edge) * sin(theta + edge)));
}

/* Azimuth inside a patch, for theta of at most 90 degrees. */
static double forward_azimuth(const bh_patch *patch, double theta)
{
    if (!(theta > patch->in_from && theta > patch->out_from))
        return 0;
    /* upper end: out-of-plane angle reaches out_to, or in-plane angle falls to in_from */
    double upper = HALF_PI;
    if (theta > patch->out_to)
        upper = atan2(sin(patch->out_to), root_above(theta, patch->out_to));
    if (patch->in_from > 0)
        upper =
            fmin(upper, atan2(root_above(theta, patch->in_from), sin(patch->in_from) * cos(theta)));
    /* lower end: out-of-plane angle is still out_from, or in-plane angle still in_to */
    double lower = 0;
    if (patch->out_from > 0)
        lower = atan2(sin(patch->out_from), root_above(theta, patch->out_from));
    if (theta > patch->in_to)
        lower = fmax(lower, atan2(root_above(theta, patch->in_to), sin(patch->in_to) * cos(theta)));
    return fmax(0, upper - lower);
}

static double patch_azimuth(const bh_patch *patch, double theta)
{
    if (theta <= HALF_PI)
        return forward_azimuth(patch, theta);
    const bh_patch mirrored = {BH_PI - patch->in_to, BH_PI - patch->in_from, patch->out_from,
                               patch->out_to, patch->times};
    return forward_azimuth(&mirrored, BH_PI - theta);
}

double bh_acceptance_azimuth(const bh_acceptance_part *part, double theta)
{
    if (part->azimuth > 0)
        return theta >= part->polar.from && theta <= part->polar.to ? part->azimuth : 0;
    double sum = 0;
    for (int i = 0; i < part->patch_count; i++)
        sum += part->patches[i].times * patch_azimuth(&part->patches[i], theta);
    return sum;
}

double bh_acceptance_weight(const bh_acceptance_part *part, double theta)
{
    return part->scale * sin(theta) * bh_acceptance_azimuth(part, theta);
}

int bh_acceptance_kinks(const bh_acceptance_part *part, double *kinks)
{
    int n = 0;
    if (part->azimuth > 0) {
        kinks[n++] = part->polar.from;
        kinks[n++] = part->polar.to;
    }
    for (int i = 0; i < part->patch_count; i++, n += 4)
        corners_of(&part->patches[i], kinks + n);
    for (int i = 1; i < n; i++) {
        const double x = kinks[i];
        int j = i;
        for (; j > 0 && kinks[j - 1] > x; j--)
            kinks[j] = kinks[j - 1];
        kinks[j] = x;
    }
    int kept = 0;
    for (int i = 0; i < n; i++)
        if (kept == 0 || kinks[i] > kinks[kept - 1])
            kinks[kept++] = kinks[i];
    return kept;
}

bool bh_acceptance_meets_beam(const bh_acceptance_part *part)
{
    return part->polar.from == 0;
}

static void polar_angles(void *context, size_t n, const double *versine, double *value)
{
    (void)context;
    for (size_t i = 0; i < n; i++)
        value[i] = 2 * atan2(sqrt(versine[i]), sqrt(fmax(0, 2 - versine[i])));
}

double bh_acceptance_mean_angle(const bh_acceptance_part *part)
{
    const bh_integrand angle = {.function = polar_angles, .tolerance = 1e-6};
    if (!(part->polar.from < part->polar.to))
        return part->polar.from;
    return bh_quadrature_directions(part, &angle).sum / part->solid_angle;
}
