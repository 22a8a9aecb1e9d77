/* interpolant.c - a cross section as Chebyshev polynomials on as many pieces as it takes. */
#include "beamhours/rates/interpolant_parts.h"

#include <math.h>
#include <stdlib.h>
#include <string.h>

#include "beamhours/units/constants.h"

enum { PIECES = BH_INTERPOLANT_PIECES, DEPTH = 36, BLOCK = 8, NODES = BH_INTERPOLANT_NODES };

typedef bh_interpolant_piece piece;

static double versine_of(double theta)
{
    const double s = sin(theta / 2);
    return 2 * s * s;
}

bh_interpolant *bh_interpolant_new(void)
{
    bh_interpolant *in = calloc(1, sizeof *in);
    if (in)
        for (int i = 0; i < 2 * (NODES - 1); i++)
            in->cosine[i] = cos(BH_PI * i / (NODES - 1));
    return in;
}

void bh_interpolant_free(bh_interpolant *interpolant)
{
    free(interpolant);
}

/* --- variable and weight --- */

static double variable_of(const bh_interpolant *in, double versine)
{
    return in->limit > 0 ? sqrt(fmax(0, in->limit_versine - versine)) : versine;
}

static double versine_at(const bh_interpolant *in, double variable)
{
    return in->limit > 0 ? fmax(0, in->limit_versine - variable * variable) : variable;
}

/* What f is multiplied by before it is represented: it takes out the point charge's 1 / y^2 and the
 * root at the limit. */
static double flattening(const bh_interpolant *in, double versine, double variable)
{
    const double charge = in->axis ? 1 : versine * versine;
    return in->limit > 0 ? charge * variable : charge;
}

/* --- fitting one piece --- */

/* Values of f times its flattening at the Chebyshev-Lobatto points of a piece; node i stands at
 * t = cos(pi i / 16). */
typedef struct {
    const bh_interpolant_request *request;
    bool bad;         /* a value was not finite or negative */
    double bad_angle; /* [rad] where */
    double value[NODES];
} samples;

/* Fills nodes first, first + step, ... below NODES. */
static void sample(bh_interpolant *in, const piece *p, int first, int step, samples *s)
{
    double theta[NODES];
    double flat[NODES] = {0};
    double value[NODES];
    size_t n = 0;
    for (int i = first; i < NODES; i += step, n++) {
        const double half = (p->to - p->from) / 2;
        const double variable = p->middle + half * in->cosine[i];
        const double versine = versine_at(in, variable);
        theta[n] = 2 * asin(fmin(1, sqrt(versine / 2)));
        theta[n] = fmin(fmax(theta[n], in->polar.from), in->polar.to);
        flat[n] = flattening(in, versine, variable);
    }
    s->request->function(s->request->context, n, theta, value);
    in->calls += n;
    n = 0;
    for (int i = first; i < NODES; i += step, n++) {
        s->value[i] = value[n] * flat[n];
        in->top = fmax(in->top, s->value[i]);
        if (!(value[n] >= 0 && isfinite(s->value[i])) && !s->bad) {
            s->bad = true;
            s->bad_angle = theta[n];
        }
    }
}

/* The last terms, of which the even or the odd may vanish by symmetry. */
static double tail_of(const double *c, int n)
{
    return fmax(fabs(c[n - 1]), fmax(fabs(c[n - 2]), fabs(c[n - 3]) / 4));
}

/* Terms too small to matter are not kept. */
static int needed(const double *c, int n, double least)
{
    while (n > 1 && fabs(c[n - 1]) < least)
        n--;
    return n;
}

/* f is at the largest `top` there.  Values that vanish somewhere leave f itself; it is asked for
 * more digits, as bins may lie where it is small. */
static bool try_linear(const bh_interpolant *in, piece *p, const samples *s, int step)
{
    static const double extra = 1e-3;
    const double common = s->request->common;
    double top = common;
    for (int i = 0; i < NODES; i += step)
        top = fmax(top, s->value[i]);
    p->logarithm = false;
    p->count = bh_chebyshev_coefficients(in, s->value, step, p->c);
    p->tail = top > 0 ? tail_of(p->c, p->count) / top : 0;
    const double wanted = s->request->tolerance * (common > 0 ? 1 : extra);
    p->resolved = p->tail <= wanted;
    p->count = needed(p->c, p->count, top * wanted / NODES);
    return p->resolved;
}

static bool try_logarithm(const bh_interpolant *in, piece *p, const samples *s, int step)
{
    double value[NODES] = {0};
    for (int i = 0; i < NODES; i += step) {
        if (!(s->value[i] > 0))
            return false;
        value[i] = log(s->value[i]);
    }
    p->logarithm = true;
    p->count = bh_chebyshev_coefficients(in, value, step, p->c);
    p->tail = tail_of(p->c, p->count);
    p->resolved = p->tail <= s->request->tolerance;
    p->count = needed(p->c, p->count, s->request->tolerance / NODES);
    return p->resolved;
}

/* 5 points where few digits are asked for, 9, then 17; true when the piece is good. */
static bool fit_piece(bh_interpolant *in, piece *p, samples *s)
{
    static const double few = 1e-7; /* [1] tolerance for which 5 points may do */
    p->middle = (p->from + p->to) / 2;
    p->slope = p->to > p->from ? 2 / (p->to - p->from) : 0;
    const bool coarse = s->request->tolerance >= few;
    if (coarse) {
        sample(in, p, 0, 4, s);
        if (s->bad || try_logarithm(in, p, s, 4))
            return true;
    }
    sample(in, p, coarse ? 2 : 0, coarse ? 4 : 2, s);
    if (s->bad || try_logarithm(in, p, s, 2) || try_linear(in, p, s, 2))
        return true;
    sample(in, p, 1, 2, s);
    return s->bad || try_logarithm(in, p, s, 1) || try_linear(in, p, s, 1);
}

/* --- fitting all --- */

static void start(bh_interpolant *in, const bh_interpolant_request *request)
{
    in->polar = request->polar;
    in->limit = request->limit > 0 && request->limit < BH_PI ? request->limit : 0;
    in->limit_versine = versine_of(in->limit);
    /* not quite up to the limit, where f may be infinite */
    if (in->limit > 0)
        in->polar.to = fmin(in->polar.to, in->limit * (1 - 1e-9));
    in->axis = request->polar.from == 0;
    in->calls = 0;
    in->count = in->unresolved = 0;
    in->worst = 0;
    in->top = 0;
}

static void keep(bh_interpolant *in, const piece *p)
{
    if (p->resolved)
        in->worst = fmax(in->worst, p->tail);
    else
        in->unresolved++;
    in->pieces[in->count++] = *p;
}

static bh_code refuse(const samples *s, bh_error *err)
{
    return bh_fail(err, BH_EDOMAIN,
                   "the cross section at %.6g deg is not a finite number of 0 or more",
                   s->bad_angle / BH_DEGREE);
}

/* Stretches of the variable that are still to be fitted, the last one first. */
struct pending {
    bh_interval part[DEPTH + 2 + BH_INTERPOLANT_KINKS]; /* [1] */
    int depth[DEPTH + 2 + BH_INTERPOLANT_KINKS];
    int count;
};

static void put_off(struct pending *p, double from, double to, int depth)
{
    p->part[p->count] = (bh_interval){from, to};
    p->depth[p->count++] = depth;
}

/* The whole range, cut at the kinks; the lowest stretch last. */
static void begin(const bh_interpolant *in, const bh_interpolant_request *request,
                  struct pending *p)
{
    const double one = variable_of(in, versine_of(in->polar.from));
    const double other = variable_of(in, versine_of(in->polar.to));
    const double low = fmin(one, other);
    double high = fmax(one, other);
    const bool falls = other < one; /* the variable, with the angle */
    p->count = 0;
    for (int i = 0; i < request->kink_count; i++) {
        const double angle = request->kinks[falls ? i : request->kink_count - 1 - i];
        const double at = variable_of(in, versine_of(angle));
        if (!(at > low && at < high))
            continue;
        put_off(p, at, high, 0);
        high = at;
    }
    put_off(p, low, high, 0);
}

bh_code bh_interpolant_fit(bh_interpolant *interpolant, const bh_interpolant_request *request,
                           bh_error *err)
{
    bh_interpolant *in = interpolant;
    struct pending pending;
    start(in, request);
    if (!(in->polar.from <= in->polar.to))
        return BH_OK; /* all of it is beyond the limit */
    begin(in, request, &pending);
    while (pending.count > 0) {
        pending.count--;
        const bh_interval part = pending.part[pending.count];
        const int deep = pending.depth[pending.count];
        piece p = {.from = part.from, .to = part.to};
        samples s = {.request = request};
        const bool good = fit_piece(in, &p, &s);
        if (s.bad) {
            in->count = 0;
            return refuse(&s, err);
        }
        if (good || deep >= DEPTH || in->count + pending.count + 2 > PIECES) {
            keep(in, &p);
            continue;
        }
        put_off(&pending, p.middle, p.to, deep + 1);
        put_off(&pending, p.from, p.middle, deep + 1);
    }
    return BH_OK;
}

/* --- reading --- */

/* Clenshaw's sum at BLOCK values of t at once, so that they overlap in the processor. */
static void clenshaw(const piece *p, const double *t, double *sum)
{
    double one[BLOCK] = {0};
    double two[BLOCK] = {0};
    for (int k = p->count - 1; k > 0; k--) {
        const double c = p->c[k];
#pragma omp simd
        for (int i = 0; i < BLOCK; i++) {
            const double next = 2 * t[i] * one[i] - two[i] + c;
            two[i] = one[i];
            one[i] = next;
        }
    }
    for (int i = 0; i < BLOCK; i++)
        sum[i] = t[i] * one[i] - two[i] + p->c[0];
}

static const piece *piece_of(const bh_interpolant *in, double variable)
{
    int lo = 0;
    int hi = in->count - 1;
    while (lo < hi) {
        const int middle = (lo + hi) / 2;
        if (variable <= in->pieces[middle].to)
            hi = middle;
        else
            lo = middle + 1;
    }
    return &in->pieces[lo];
}

/* Up to BLOCK values that share a piece; returns how many were done. */
static size_t eval_block(const bh_interpolant *in, size_t n, const double *versine, double *value)
{
    double variable[BLOCK] = {0};
    double t[BLOCK] = {0};
    double sum[BLOCK];
    variable[0] = variable_of(in, versine[0]);
    const piece *p = in->count == 1 ? in->pieces : piece_of(in, variable[0]);
    size_t m = 0;
    do {
        t[m] = (variable[m] - p->middle) * p->slope;
        m++;
        if (m < n && m < BLOCK)
            variable[m] = variable_of(in, versine[m]);
    } while (m < n && m < BLOCK &&
             (in->count == 1 || (variable[m] >= p->from && variable[m] <= p->to)));
    clenshaw(p, t, sum);
    for (size_t i = 0; i < m; i++) {
        const double flat = flattening(in, versine[i], variable[i]);
        const bool beyond = in->limit > 0 && versine[i] >= in->limit_versine;
        value[i] = beyond ? 0 : (p->logarithm ? exp(sum[i]) : fmax(0, sum[i])) / flat;
    }
    return m;
}

void bh_interpolant_eval(const bh_interpolant *interpolant, size_t n, const double *versine,
                         double *value)
{
    if (interpolant->count == 0) {
        memset(value, 0, n * sizeof *value);
        return;
    }
    for (size_t i = 0; i < n;)
        i += eval_block(interpolant, n - i, versine + i, value + i);
}

bool bh_interpolant_covers(const bh_interpolant *interpolant, bh_interval polar)
{
    static const double rounding = 1e-12;
    if (interpolant->limit > 0)
        polar.to = fmin(polar.to, interpolant->limit * (1 - 1e-9));
    if (polar.from > polar.to)
        return true;
    return interpolant->count > 0 && polar.from >= interpolant->polar.from - rounding &&
           polar.to <= interpolant->polar.to + rounding;
}

double bh_interpolant_error(const bh_interpolant *interpolant, bh_interval polar)
{
    const bh_interpolant *in = interpolant;
    if (in->unresolved == 0 || in->count == 0)
        return in->worst;
    const double one = variable_of(in, versine_of(polar.from));
    const double other = variable_of(in, versine_of(polar.to));
    const double from = fmin(one, other);
    const double to = fmax(one, other);
    double error = in->worst;
    for (int i = 0; i < in->count; i++) {
        const piece *p = &in->pieces[i];
        const double inside = fmin(to, p->to) - fmax(from, p->from);
        if (!p->resolved && inside >= 0)
            error += fmin(1, p->tail) * (to > from ? inside / (to - from) : 1);
    }
    return error;
}

bool bh_interpolant_vanishes(const bh_interpolant *interpolant)
{
    return !(interpolant->top > 0);
}

double bh_interpolant_top(const bh_interpolant *interpolant)
{
    return interpolant->top;
}

size_t bh_interpolant_calls(const bh_interpolant *interpolant)
{
    return interpolant->calls;
}
