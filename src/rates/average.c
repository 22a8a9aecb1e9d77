/* average.c - a cross section summed over the acceptance of an arm and over each of its bins. */
#include "beamhours/rates/average.h"

#include <math.h>
#include <stdlib.h>

#include "beamhours/rates/prepared.h"
#include "beamhours/rates/quadrature.h"
#include "beamhours/rates/series.h"
#include "beamhours/units/constants.h"

/* Polynomials are asked for more digits than the sums, so that the sums decide the error. */
#define FIT_SHARE        0.01
#define QUADRATURE_SHARE 0.5
#define USUAL_TOLERANCE  1e-6

/* Kept pieces exceed the total by rounding and quadrature; by more where the total, summed without
 * knowing of them, is the worse of the two. */
#define RAGGED 1e-6

struct bh_average_workspace {
    bh_interpolant *interpolant;
    bh_series series[BH_SERIES_MOST]; /* of its first pieces, as far as they can be */
    int series_count;
    bh_prepared prepared;
};

bh_average_workspace *bh_average_workspace_new(void)
{
    bh_average_workspace *workspace = calloc(1, sizeof *workspace);
    if (!workspace)
        return NULL;
    workspace->interpolant = bh_interpolant_new();
    if (workspace->interpolant)
        return workspace;
    free(workspace);
    return NULL;
}

void bh_average_workspace_free(bh_average_workspace *workspace)
{
    if (!workspace)
        return;
    bh_interpolant_free(workspace->interpolant);
    free(workspace);
}

static double tolerance_of(const bh_average_request *request)
{
    return request->tolerance > 0 ? request->tolerance : USUAL_TOLERANCE;
}

bh_code bh_average_fit(const bh_average_request *request, bh_interval polar,
                       bh_average_workspace *workspace, bh_error *err)
{
    const bh_interpolant_request wanted = {.function = request->function,
                                           .context = request->context,
                                           .polar = polar,
                                           .limit = request->limit,
                                           .tolerance = FIT_SHARE * tolerance_of(request),
                                           .kink_count = request->kink_count,
                                           .kinks = request->kinks,
                                           .common = request->common};
    const bh_code code = bh_interpolant_fit(workspace->interpolant, &wanted, err);
    workspace->series_count = code ? 0 : bh_series_of(workspace->interpolant, workspace->series);
    return code;
}

/* The interpolant as a quadrature wants it. */
static void read_interpolant(void *context, size_t n, const double *versine, double *value)
{
    bh_interpolant_eval(context, n, versine, value);
}

/* One acceptance being summed. */
typedef struct {
    const bh_average_request *request;
    bh_interpolant *interpolant;
    const bh_series *series;
    int series_count;
    bh_prepared *prepared;
} summing;

static double versine_of(double theta)
{
    const double half = sin(theta / 2);
    return 2 * half * half;
}

/* A point has one value: its solid angle times the function there. */
static bh_quadrature sum_point(const summing *s, const bh_acceptance_part *part)
{
    const double versine = versine_of(part->polar.from);
    double value = 0;
    bh_interpolant_eval(s->interpolant, 1, &versine, &value);
    return (bh_quadrature){value * part->solid_angle, 0, true};
}

/* Sums of less than this over the solid angle [ub/sr] are as good as one of it. */
static double least_of(const summing *s, const bh_acceptance_part *part)
{
    const double versine = versine_of((part->polar.from + part->polar.to) / 2);
    return s->request->common > 0 ? s->request->common / (versine * versine) : 0;
}

static bh_integrand integrand_of(const summing *s, const bh_acceptance_part *part)
{
    return (bh_integrand){.function = read_interpolant,
                          .context = s->interpolant,
                          .tolerance = QUADRATURE_SHARE * tolerance_of(s->request),
                          .least = least_of(s, part)};
}

/* The series that holds all over a part, or NULL. */
static const bh_series *series_for(const summing *s, const bh_acceptance_part *part)
{
    const bh_series *one = s->series;
    if (s->series_count == 0 || isinf(one->from))
        return s->series_count ? one : NULL;
    const double from = versine_of(part->polar.from), to = versine_of(part->polar.to);
    for (; one < s->series + s->series_count; one++)
        if (from >= one->from && to <= one->to)
            return one;
    return NULL;
}

/* By the moments of the part, where they will do. */
static bh_quadrature sum_whole(const summing *s, bh_prepared_part *prepared, const bh_integrand *f)
{
    const bh_series *series = series_for(s, &prepared->part);
    if (series && prepared->rule.fine > 0) {
        bh_moments_of(&prepared->rule, series, &prepared->moments);
        const bh_quadrature q = bh_series_sum(series, &prepared->moments, &prepared->part, f);
        if (q.converged)
            return q;
    }
    return bh_quadrature_prepared(&prepared->part, &prepared->rule, f);
}

/* What of the part lies within `polar`. */
static bh_quadrature sum_within(const summing *s, bh_prepared_part *prepared, bh_interval polar)
{
    const bh_acceptance_part *part = &prepared->part;
    const bh_integrand f = integrand_of(s, part);
    const bool whole = polar.from <= part->polar.from && polar.to >= part->polar.to;
    if (!(part->solid_angle > 0) || polar.to < part->polar.from || polar.from > part->polar.to)
        return (bh_quadrature){0, 0, true};
    if (part->polar.from == part->polar.to)
        return sum_point(s, part);
    if (bh_interpolant_vanishes(s->interpolant))
        return (bh_quadrature){0, 0, true};
    return whole ? sum_whole(s, prepared, &f) : bh_quadrature_polar(part, polar, &f);
}

static bh_interval up_to_limit(const bh_average_request *request, bh_interval polar)
{
    if (request->limit > 0)
        polar.to = fmin(polar.to, request->limit);
    return polar;
}

static double sum_kept(const summing *s, bh_prepared_part *part, double total, bool *converged)
{
    const bh_average_request *r = s->request;
    const bh_interval all = up_to_limit(r, part->part.polar);
    if (!r->cut)
        return total;
    double kept = 0;
    const double least = least_of(s, &part->part) * part->part.solid_angle;
    for (size_t i = 0; i < r->allowed_count; i++) {
        bh_interval some = up_to_limit(r, r->allowed[i]);
        if (some.from <= all.from && some.to >= all.to)
            return total;
        const bh_quadrature q = sum_within(s, part, some);
        kept += q.sum;
        *converged = *converged && q.error <= tolerance_of(r) * fmax(fmax(q.sum, total), least);
    }
    return kept < total * (1 + RAGGED) ? fmin(kept, total) : kept;
}

/* Adds the pieces that lie in the part; each is as good as the tolerance asks of all of it. */
static bh_average sum_pieces(const summing *s, bh_prepared_part *part)
{
    const bh_average_request *r = s->request;
    const bh_interval all = up_to_limit(r, part->part.polar);
    bh_average out = {.solid_angle = part->part.solid_angle, .converged = true};
    double off = 0;
    for (size_t i = 0; i < r->allowed_count; i++) {
        const bh_interval some = up_to_limit(r, r->allowed[i]);
        const bool whole = some.from <= all.from && some.to >= all.to;
        const bh_quadrature q = sum_within(s, part, whole ? all : some);
        out.total += q.sum;
        off += q.error;
        if (whole)
            break;
    }
    const double least = least_of(s, &part->part) * part->part.solid_angle;
    if (out.total > 0)
        out.error = off / fmax(out.total, least) + bh_interpolant_error(s->interpolant, all);
    out.kept = out.total;
    out.converged = out.error <= tolerance_of(r);
    return out;
}

static bh_average sum_part(const summing *s, bh_prepared_part *part)
{
    if (s->request->cut && s->request->kept_only)
        return sum_pieces(s, part);
    bh_average out = {.solid_angle = part->part.solid_angle};
    const bh_interval all = up_to_limit(s->request, part->part.polar);
    const bh_quadrature q =
        all.from <= all.to ? sum_within(s, part, all) : (bh_quadrature){0, 0, true};
    out.total = q.sum;
    const double least = least_of(s, &part->part) * part->part.solid_angle;
    out.error =
        q.sum > 0 ? q.error / fmax(q.sum, least) + bh_interpolant_error(s->interpolant, all) : 0;
    out.converged = out.error <= tolerance_of(s->request);
    out.kept = sum_kept(s, part, q.sum, &out.converged);
    return out;
}

/* The whole grows by a part. */
static void add(bh_average *whole, const bh_average *part)
{
    const double sum = whole->total + part->total;
    if (sum > 0)
        whole->error = (whole->error * whole->total + part->error * part->total) / sum;
    whole->total = sum;
    whole->kept += part->kept;
    whole->converged = whole->converged && part->converged;
}

/* What lies before the first and behind the last edge that was given. */
static void add_left_over(const summing *s, const bh_acceptance *acceptance, bh_average *whole)
{
    bh_acceptance_spec spec = acceptance->spec;
    const double first = bh_acceptance_edge(acceptance, 0);
    const double last = bh_acceptance_edge(acceptance, acceptance->bins);
    const double outside[2][2] = {{-HUGE_VAL, first}, {last, HUGE_VAL}};
    if (!spec.edges)
        return;
    spec.bins = 1;
    for (int i = 0; i < 2; i++) {
        bh_acceptance one = {.spec = spec, .bins = 1, .whole = acceptance->whole};
        one.spec.edges = outside[i];
        const bh_average average = sum_part(s, bh_prepared_part_of(s->prepared, &one, 1));
        add(whole, &average);
    }
}

bh_code bh_average_sum(const bh_acceptance *acceptance, const bh_average_request *request,
                       bh_average_workspace *workspace, bh_averages *out, bh_error *err)
{
    if (!bh_interpolant_covers(workspace->interpolant, acceptance->whole.polar))
        return bh_fail(err, BH_EDOMAIN, "the acceptance reaches outside the fitted polar angles");
    const summing s = {.request = request,
                       .interpolant = workspace->interpolant,
                       .series = workspace->series,
                       .series_count = workspace->series_count,
                       .prepared = &workspace->prepared};
    if (!out->bins) {
        out->whole = sum_part(&s, bh_prepared_part_of(s.prepared, acceptance, 0));
        return BH_OK;
    }
    bh_average sum = {.solid_angle = acceptance->whole.solid_angle, .converged = true};
    for (int i = 0; i < acceptance->bins; i++) {
        out->bins[i] = sum_part(&s, bh_prepared_part_of(s.prepared, acceptance, i + 1));
        add(&sum, &out->bins[i]);
    }
    add_left_over(&s, acceptance, &sum);
    out->whole = sum;
    return BH_OK;
}

bh_interval bh_average_range(const bh_acceptance *acceptance)
{
    static const double margin = BH_AVERAGE_TURN * (1 + 1e-6); /* rounding of turned corners */
    const bh_interval range = acceptance->whole.polar;
    if (acceptance->spec.shape != BH_ACCEPTANCE_RECTANGLE || !(range.from > 0))
        return range;
    return (bh_interval){fmax(range.from - margin, range.from / 2), fmin(range.to + margin, BH_PI)};
}

const bh_acceptance_part *bh_average_part(bh_average_workspace *workspace,
                                          const bh_acceptance *acceptance, int bin)
{
    return &bh_prepared_part_of(&workspace->prepared, acceptance, bin)->part;
}

bh_code bh_average_over(const bh_acceptance *acceptance, const bh_average_request *request,
                        bh_average_workspace *workspace, bh_averages *out, bh_error *err)
{
    const bh_code code = bh_average_fit(request, bh_average_range(acceptance), workspace, err);
    return code == BH_OK ? bh_average_sum(acceptance, request, workspace, out, err) : code;
}

double bh_average_value(const bh_average_workspace *workspace, double theta)
{
    double value = 0;
    const double versine = versine_of(theta);
    if (!bh_interpolant_covers(workspace->interpolant, (bh_interval){theta, theta}))
        return (double)NAN;
    bh_interpolant_eval(workspace->interpolant, 1, &versine, &value);
    return value;
}

double bh_average_top(const bh_average_workspace *workspace)
{
    return bh_interpolant_top(workspace->interpolant);
}

size_t bh_average_calls(const bh_average_workspace *workspace)
{
    return bh_interpolant_calls(workspace->interpolant);
}
