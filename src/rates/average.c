/* average.c - a cross section summed over the acceptance of an arm and over each of its bins. */
#include "beamhours/rates/average.h"

#include <math.h>
#include <stdlib.h>

#include "beamhours/rates/quadrature.h"

/* Polynomials are asked for more digits than the sums, so that the sums decide the error. */
#define FIT_SHARE        0.01
#define QUADRATURE_SHARE 0.5
#define USUAL_TOLERANCE  1e-6

/* Kept pieces exceed the total by rounding and quadrature; by more where the total, summed without
 * knowing of them, is the worse of the two. */
#define RAGGED 1e-6

struct bh_average_workspace {
    bh_interpolant *interpolant;
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
                                           .tolerance = FIT_SHARE * tolerance_of(request)};
    return bh_interpolant_fit(workspace->interpolant, &wanted, err);
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
    bh_integrand integrand;
} summing;

/* A point has one value: its solid angle times the function there. */
static bh_quadrature sum_point(const summing *s, const bh_acceptance_part *part)
{
    const double half = sin(part->polar.from / 2);
    const double versine = 2 * half * half;
    double value = 0;
    bh_interpolant_eval(s->interpolant, 1, &versine, &value);
    return (bh_quadrature){value * part->solid_angle, 0, true};
}

/* What of the part lies within `polar`. */
static bh_quadrature sum_within(const summing *s, const bh_acceptance_part *part, bh_interval polar)
{
    const bool whole = polar.from <= part->polar.from && polar.to >= part->polar.to;
    if (!(part->solid_angle > 0) || polar.to < part->polar.from || polar.from > part->polar.to)
        return (bh_quadrature){0, 0, true};
    if (part->polar.from == part->polar.to)
        return sum_point(s, part);
    return whole ? bh_quadrature_directions(part, &s->integrand)
                 : bh_quadrature_polar(part, polar, &s->integrand);
}

static bh_interval up_to_limit(const bh_average_request *request, bh_interval polar)
{
    if (request->limit > 0)
        polar.to = fmin(polar.to, request->limit);
    return polar;
}

static double sum_kept(const summing *s, const bh_acceptance_part *part, double total,
                       bool *converged)
{
    const bh_average_request *r = s->request;
    const bh_interval all = up_to_limit(r, part->polar);
    if (!r->cut)
        return total;
    double kept = 0;
    for (size_t i = 0; i < r->allowed_count; i++) {
        bh_interval some = up_to_limit(r, r->allowed[i]);
        if (some.from <= all.from && some.to >= all.to)
            return total;
        const bh_quadrature q = sum_within(s, part, some);
        kept += q.sum;
        *converged = *converged && q.error <= tolerance_of(r) * fmax(q.sum, total);
    }
    return kept < total * (1 + RAGGED) ? fmin(kept, total) : kept;
}

static bh_average sum_part(const summing *s, const bh_acceptance_part *part)
{
    bh_average out = {.solid_angle = part->solid_angle};
    const bh_interval all = up_to_limit(s->request, part->polar);
    const bh_quadrature q =
        all.from <= all.to ? sum_within(s, part, all) : (bh_quadrature){0, 0, true};
    out.total = q.sum;
    out.error = q.sum > 0 ? q.error / q.sum + bh_interpolant_error(s->interpolant, all) : 0;
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
        bh_acceptance_part part;
        bh_acceptance_part_of(&one, 1, &part);
        const bh_average average = sum_part(s, &part);
        add(whole, &average);
    }
}

bh_code bh_average_sum(const bh_acceptance *acceptance, const bh_average_request *request,
                       bh_average_workspace *workspace, bh_averages *out, bh_error *err)
{
    if (!bh_interpolant_covers(workspace->interpolant, acceptance->whole.polar))
        return bh_fail(err, BH_EDOMAIN, "the acceptance reaches outside the fitted polar angles");
    const summing s = {
        request,
        workspace->interpolant,
        {read_interpolant, workspace->interpolant, QUADRATURE_SHARE * tolerance_of(request)}};
    if (!out->bins) {
        out->whole = sum_part(&s, &acceptance->whole);
        return BH_OK;
    }
    bh_average sum = {.solid_angle = acceptance->whole.solid_angle, .converged = true};
    for (int i = 0; i < acceptance->bins; i++) {
        bh_acceptance_part part;
        bh_acceptance_part_of(acceptance, i + 1, &part);
        out->bins[i] = sum_part(&s, &part);
        add(&sum, &out->bins[i]);
    }
    add_left_over(&s, acceptance, &sum);
    out->whole = sum;
    return BH_OK;
}

bh_code bh_average_over(const bh_acceptance *acceptance, const bh_average_request *request,
                        bh_average_workspace *workspace, bh_averages *out, bh_error *err)
{
    const bh_code code = bh_average_fit(request, acceptance->whole.polar, workspace, err);
    return code == BH_OK ? bh_average_sum(acceptance, request, workspace, out, err) : code;
}

double bh_average_value(const bh_average_workspace *workspace, double theta)
{
    double value = 0;
    const double half = sin(theta / 2);
    const double versine = 2 * half * half;
    if (!bh_interpolant_covers(workspace->interpolant, (bh_interval){theta, theta}))
        return (double)NAN;
    bh_interpolant_eval(workspace->interpolant, 1, &versine, &value);
    return value;
}

size_t bh_average_calls(const bh_average_workspace *workspace)
{
    return bh_interpolant_calls(workspace->interpolant);
}
