/* coincidence.c - both particles of one elastic event in two arms at once: arcs of azimuth that
 * both shapes share, summed over the polar angle. */
#include "beamhours/rates/coincidence.h"

#include <math.h>

#include "beamhours/units/constants.h"

/* --- arcs --- */

enum { MOST_CUTS = 8 };

/* Azimuths [rad] where a particle at one polar angle crosses a border of a shape. */
struct cuts {
    int count;
    double at[2 * MOST_CUTS];
};

static bool is_ring(const bh_acceptance_part *part)
{
    return part->azimuth > 0;
}

static void add_cut(struct cuts *cuts, double azimuth)
{
    const double turn = 2 * BH_PI;
    cuts->at[cuts->count++] = azimuth - turn * floor(azimuth / turn);
}

/* Azimuths counted from the direction in which the arm stands, upwards. */
static void cut_rectangle(const bh_acceptance_part *part, double theta, double found[MOST_CUTS],
                          int *count)
{
    const double out[] = {part->out_from, part->out_to}, in[] = {part->in_from, part->in_to};
    const double s = sin(theta), c = cos(theta);
    for (int i = 0; i < 2; i++) {
        const double up = sin(out[i]) / s; /* sin psi = sin theta sin azimuth */
        if (fabs(up) < 1) {
            found[(*count)++] = asin(up);
            found[(*count)++] = BH_PI - asin(up);
        }
        const double flat = c * sin(in[i]) / (s * cos(in[i])); /* tan phi = tan theta cos azimuth */
        if (fabs(flat) < 1) {
            found[(*count)++] = acos(flat);
            found[(*count)++] = -acos(flat);
        }
    }
}

static int cut_shape(const bh_acceptance_part *part, double theta, double found[MOST_CUTS])
{
    int count = 0;
    if (!is_ring(part)) {
        cut_rectangle(part, theta, found, &count);
    } else if (part->azimuth < 2 * BH_PI) {
        found[count++] = part->azimuth / 2;
        found[count++] = -part->azimuth / 2;
    }
    return count;
}

static bool inside(const bh_acceptance_part *part, double theta, double azimuth)
{
    if (theta < part->polar.from || theta > part->polar.to)
        return false;
    if (is_ring(part))
        return fabs(remainder(azimuth, 2 * BH_PI)) <= part->azimuth / 2;
    const double out = asin(sin(theta) * sin(azimuth));
    const double in = atan2(sin(theta) * cos(azimuth), cos(theta));
    if (out < part->out_from || out > part->out_to)
        return false;
    for (int turn = -1; turn <= 1; turn++)
        if (in + 2 * BH_PI * turn >= part->in_from && in + 2 * BH_PI * turn <= part->in_to)
            return true;
    return false;
}

/* The partner's azimuth as its own arm counts it; the way back is the same way. */
static double partner_azimuth(const bh_pair_shape *pair, double azimuth)
{
    return pair->opposite ? -azimuth : azimuth + BH_PI;
}

static void sort(struct cuts *cuts)
{
    for (int i = 1; i < cuts->count; i++) {
        const double at = cuts->at[i];
        int k = i;
        for (; k > 0 && cuts->at[k - 1] > at; k--)
            cuts->at[k] = cuts->at[k - 1];
        cuts->at[k] = at;
    }
}

double bh_pair_azimuth(const bh_pair_shape *pair, double theta, double partner)
{
    const bh_acceptance_part *first = pair->first, *second = pair->second;
    if (!(theta >= first->polar.from && theta <= first->polar.to && partner >= second->polar.from &&
          partner <= second->polar.to))
        return 0;
    struct cuts cuts = {.count = 0};
    double found[MOST_CUTS];
    for (int n = cut_shape(first, theta, found); n > 0; n--)
        add_cut(&cuts, found[n - 1]);
    for (int n = cut_shape(second, partner, found); n > 0; n--)
        add_cut(&cuts, partner_azimuth(pair, found[n - 1]));
    if (cuts.count == 0)
        add_cut(&cuts, 0);
    sort(&cuts);
    double sum = 0;
    for (int i = 0; i < cuts.count; i++) {
        const double to = i + 1 < cuts.count ? cuts.at[i + 1] : cuts.at[0] + 2 * BH_PI;
        const double middle = (cuts.at[i] + to) / 2;
        if (to > cuts.at[i] && inside(first, theta, middle) &&
            inside(second, partner, partner_azimuth(pair, middle)))
            sum += to - cuts.at[i];
    }
    return sum;
}

/* --- kinematics --- */

double bh_pair_partner(const bh_collision *in, bh_detected detected, double theta)
{
    bh_event event;
    bh_code code = BH_EDOMAIN;
    if (detected == BH_DETECTED_RECOIL)
        code = bh_kinematics_recoil(in, theta, &event, NULL);
    else
        code = bh_kinematics_scattered(
            in, theta, detected == BH_DETECTED_SLOW ? BH_BRANCH_SLOW : BH_BRANCH_FAST, &event,
            NULL);
    if (code)
        return (double)NAN;
    return detected == BH_DETECTED_RECOIL ? event.scattered_angle : event.recoil_angle;
}

int bh_pair_breaks(const bh_collision *in, bh_detected detected, const bh_acceptance_part *second,
                   double *breaks)
{
    double kinks[BH_KINKS];
    const int count = bh_acceptance_kinks(second, kinks);
    const bool both = detected == BH_DETECTED_RECOIL && in->mass > in->target;
    int n = 0;
    for (int i = 0; i < count; i++) {
        if (detected != BH_DETECTED_RECOIL) {
            breaks[n++] = bh_pair_partner(in, BH_DETECTED_RECOIL, kinks[i]);
            continue;
        }
        breaks[n++] = bh_pair_partner(in, BH_DETECTED_SCATTERED, kinks[i]);
        if (both)
            breaks[n++] = bh_pair_partner(in, BH_DETECTED_SLOW, kinks[i]);
    }
    return n;
}

/* --- sums --- */

enum { POINTS = 15, SUMS = 3, DEEPEST = 40, USUAL = 1000000 };

/* Nodes and weights of Kronrod's rule, and weights of Gauss's on every other node; Piessens and
 * others, QUADPACK (1983).  From the outside to the middle. */
static const double node[8] = {
    0.991455371120812639206854697526329, 0.949107912342758524526189684047851,
    0.864864423359769072789712788640926, 0.741531185599394439863864773280788,
    0.586087235467691130294144691693013, 0.405845151377397166906606412076961,
    0.207784955007898467600689403773245, 0};
static const double kronrod[8] = {
    0.022935322010529224963732008058970, 0.063092092629978553290700663189204,
    0.104790010322250183839876322541518, 0.140653259715525918745189590510238,
    0.169004726639267902826583426598550, 0.190350578064785409913256402421014,
    0.204432940075298892414161999234649, 0.209482141084727828012999174891714};
static const double gauss[4] = {
    0.129484966168869693270611432679082, 0.279705391489276667901467771423780,
    0.381830050505118944950369775488975, 0.417959183673469387755102040816327};

/* Solid angle, total and kept. */
struct triple {
    double of[SUMS];
};

struct adding {
    const bh_pair_request *request;
    bh_pair_value value[POINTS];
    struct triple sum;
    double enough[SUMS]; /* errors of pieces below this do not matter */
    bool converged, finite;
};

/* One stretch of polar angles by 15 points, and by how much 7 of them differ. */
static struct triple rule(struct adding *a, bh_interval piece, struct triple *error)
{
    const double middle = (piece.from + piece.to) / 2, half = (piece.to - piece.from) / 2;
    double theta[POINTS], weight[POINTS], coarse[POINTS];
    for (int i = 0; i < POINTS; i++) {
        const int k = i < 8 ? i : 14 - i;
        const double u = i < 8 ? -node[k] : node[k];
        const double stretch = 1.5 * half * (1 - u * u); /* theta = middle + half (3 u - u^3) / 2 */
        theta[i] = middle + half * u * (3 - u * u) / 2;
        weight[i] = kronrod[k] * stretch;
        coarse[i] = k % 2 ? gauss[k / 2] * stretch : 0;
    }
    a->request->function(a->request->context, POINTS, theta, a->value);
    struct triple fine = {{0}}, rough = {{0}};
    for (int i = 0; i < POINTS; i++) {
        const bh_pair_value *v = &a->value[i];
        const double w = sin(theta[i]) * bh_pair_azimuth(&a->request->shape, theta[i], v->partner);
        const double values[SUMS] = {1, v->total, v->kept};
        for (int s = 0; s < SUMS && w > 0; s++) {
            fine.of[s] += weight[i] * w * values[s];
            rough.of[s] += coarse[i] * w * values[s];
        }
    }
    for (int s = 0; s < SUMS; s++) {
        error->of[s] = fabs(fine.of[s] - rough.of[s]);
        a->finite = a->finite && isfinite(fine.of[s]);
    }
    return fine;
}

static bool good_enough(const struct adding *a, const struct triple *error)
{
    for (int s = 0; s < SUMS; s++)
        if (error->of[s] > a->enough[s])
            return false;
    return true;
}

/* Halves a piece until its rules agree. */
static void add_piece(struct adding *a, bh_interval piece)
{
    bh_interval waiting[DEEPEST + 1];
    int depth[DEEPEST + 1], n = 0;
    waiting[n] = piece;
    depth[n++] = 0;
    while (n > 0 && a->finite) {
        const bh_interval now = waiting[--n];
        const int deep = depth[n];
        struct triple error;
        const struct triple part = rule(a, now, &error);
        const double middle = (now.from + now.to) / 2;
        const bool last = deep == DEEPEST - 1 || middle <= now.from || middle >= now.to;
        if (last || good_enough(a, &error)) {
            a->converged = a->converged && good_enough(a, &error);
            for (int s = 0; s < SUMS; s++)
                a->sum.of[s] += part.of[s];
            continue;
        }
        waiting[n] = (bh_interval){now.from, middle};
        depth[n++] = deep + 1;
        waiting[n] = (bh_interval){middle, now.to};
        depth[n++] = deep + 1;
    }
}

/* Between which polar angles the pieces lie: kinks of the first shape and the caller's breaks.
 * Returns how many angles, 0 where nothing is shared. */
static int set_breaks(const bh_pair_request *r, double *at)
{
    const bh_interval polar = r->shape.first->polar;
    const double to = r->limit > 0 ? fmin(polar.to, r->limit) : polar.to;
    int count = bh_acceptance_kinks(r->shape.first, at), kept = 0;
    for (int i = 0; i < r->break_count && i < BH_PAIR_MOST_BREAKS; i++)
        at[count++] = r->breaks[i];
    at[count++] = to;
    for (int i = 0; i < count; i++)
        if (at[i] >= polar.from && at[i] <= to) {
            int k = kept++;
            const double here = at[i];
            for (; k > 0 && at[k - 1] > here; k--)
                at[k] = at[k - 1];
            at[k] = here;
        }
    return kept;
}

bh_code bh_pair_add_up(const bh_pair_request *request, bh_pair_sum *out, bh_error *err)
{
    double at[BH_KINKS + BH_PAIR_MOST_BREAKS + 1];
    const bh_pair_shape *shape = &request->shape;
    if (!(shape->first->polar.from < shape->first->polar.to &&
          shape->second->polar.from < shape->second->polar.to)) {
        const bool bin =
            shape->first->solid_angle == 0; /* a bin outside its shape shares nothing */
        *out = (bh_pair_sum){.converged = true};
        return bin ? BH_OK : bh_fail(err, BH_EDOMAIN, "an arm without extents in a coincidence");
    }
    const int count = set_breaks(request, at);
    const double tolerance = request->tolerance > 0 ? request->tolerance : 1.0 / USUAL;
    struct adding a = {.request = request, .converged = true, .finite = true};
    struct triple coarse = {{0}}, error;
    for (int i = 0; i + 1 < count; i++) {
        const struct triple part = rule(&a, (bh_interval){at[i], at[i + 1]}, &error);
        for (int s = 0; s < SUMS; s++)
            coarse.of[s] += part.of[s] + error.of[s];
    }
    for (int s = 0; s < SUMS; s++)
        a.enough[s] = tolerance * coarse.of[s] / fmax(1, count);
    for (int i = 0; i + 1 < count && a.finite; i++)
        add_piece(&a, (bh_interval){at[i], at[i + 1]});
    if (!a.finite)
        return bh_fail(err, BH_EDOMAIN, "a cross section in the joint acceptance is not finite");
    const double scale = shape->first->scale * shape->second->scale;
    *out = (bh_pair_sum){.total = scale * a.sum.of[1],
                         .kept = scale * a.sum.of[2],
                         .solid_angle = scale * a.sum.of[0],
                         .converged = a.converged};
    return BH_OK;
}
