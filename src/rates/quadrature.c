/* quadrature.c - sums over the directions an acceptance covers, refined until they hold. */
#include "beamhours/rates/quadrature.h"

#include <math.h>

/* Gauss-Legendre nodes and weights on -1 .. 1. */
typedef struct {
    double node, weight; /* [1] */
} gauss_point;

/* Half of the symmetric rules of 4 and of 6 points, weights doubled: for even functions. */
static const gauss_point even_4[] = {{0.33998104358485626, 1.30429030972509228},
                                     {0.86113631159405258, 0.69570969027490772}};
static const gauss_point even_6[] = {{0.23861918608319691, 0.93582786914538254},
                                     {0.66120938646626451, 0.72152314609627714},
                                     {0.93246951420315203, 0.34264898475834032}};
static const gauss_point gauss_3[] = {{-0.77459666924148338, 0.55555555555555556},
                                      {0, 0.88888888888888889},
                                      {0.77459666924148338, 0.55555555555555556}};
static const gauss_point gauss_4[] = {{-0.86113631159405258, 0.34785484513745386},
                                      {-0.33998104358485626, 0.65214515486254614},
                                      {0.33998104358485626, 0.65214515486254614},
                                      {0.86113631159405258, 0.34785484513745386}};
static const gauss_point gauss_5[] = {{-0.90617984593866399, 0.23692688505618909},
                                      {-0.53846931010568309, 0.47862867049936647},
                                      {0, 0.56888888888888889},
                                      {0.53846931010568309, 0.47862867049936647},
                                      {0.90617984593866399, 0.23692688505618909}};
static const gauss_point gauss_10[] = {
    {-0.97390652851717172, 0.066671344308688138}, {-0.86506336668898451, 0.14945134915058059},
    {-0.67940956829902441, 0.21908636251598204},  {-0.43339539412924719, 0.26926671930999636},
    {-0.14887433898163121, 0.29552422471475287},  {0.14887433898163121, 0.29552422471475287},
    {0.43339539412924719, 0.26926671930999636},   {0.67940956829902441, 0.21908636251598204},
    {0.86506336668898451, 0.14945134915058059},   {0.97390652851717172, 0.066671344308688138}};
static const gauss_point gauss_16[] = {
    {-0.98940093499164993, 0.027152459411754095}, {-0.94457502307323258, 0.062253523938647893},
    {-0.86563120238783174, 0.095158511682492785}, {-0.75540440835500303, 0.12462897125553387},
    {-0.61787624440264375, 0.14959598881657673},  {-0.45801677765722739, 0.16915651939500254},
    {-0.28160355077925891, 0.18260341504492359},  {-0.09501250983763744, 0.1894506104550685},
    {0.09501250983763744, 0.1894506104550685},    {0.28160355077925891, 0.18260341504492359},
    {0.45801677765722739, 0.16915651939500254},   {0.61787624440264375, 0.14959598881657673},
    {0.75540440835500303, 0.12462897125553387},   {0.86563120238783174, 0.095158511682492785},
    {0.94457502307323258, 0.062253523938647893},  {0.98940093499164993, 0.027152459411754095}};

enum { DEPTH = 40, PENDING = DEPTH + 1, MOST_PIECES = 2000 };

/* A rectangle of directions; or a stretch of theta, out-of-plane angles unused. */
typedef struct {
    double in_from, in_to, out_from, out_to; /* [rad] */
    double times;                            /* [1] so many of them by symmetry */
    int depth;
    bool even; /* symmetric about the plane, where the function is even */
} panel;

/* What a fine and a coarse rule make of a panel. */
typedef struct {
    double fine, coarse; /* [sr] times the unit of the function */
} estimate;

typedef struct {
    const bh_acceptance_part *part;
    const bh_integrand *f;
    estimate (*rules)(const bh_acceptance_part *part, const bh_integrand *f, const panel *p);
    void (*halve)(const panel *p, panel *lower, panel *upper);
} scheme;

static double square(double x)
{
    return x * x;
}

/* --- refinement --- */

/* Halves panels until both rules agree, each within its own sum or within a small share of the
 * whole's first estimate; adds what it finds to `result`. */
static void refine(const scheme *s, panel first, bh_quadrature *result)
{
    panel pending[PENDING];
    int count = 0;
    int pieces = 0;
    double scale = 0;
    pending[count++] = first;
    while (count > 0) {
        const panel p = pending[--count];
        const estimate e = s->rules(s->part, s->f, &p);
        if (pieces++ == 0)
            scale = fmax(0.01 * fabs(e.fine), s->f->least * s->part->solid_angle / s->part->scale);
        const double off = fabs(e.fine - e.coarse);
        const bool agreed = off <= s->f->tolerance * fmax(fabs(e.fine), scale);
        if (agreed || p.depth >= DEPTH || pieces >= MOST_PIECES || !isfinite(e.fine)) {
            result->sum += e.fine;
            result->error += off;
            result->converged = result->converged && agreed;
            continue;
        }
        s->halve(&p, &pending[count], &pending[count + 1]);
        count += 2;
    }
}

static bh_quadrature scaled(bh_quadrature q, double scale)
{
    return (bh_quadrature){q.sum * scale, q.error * scale, q.converged};
}

/* --- directions --- */

/* A tensor rule on a panel. */
typedef struct {
    const gauss_point *in, *out;
    size_t ins, outs;
} tensor;

static size_t place_nodes(const panel *p, const tensor *rule, double *versine, double *weight)
{
    const double in_middle = (p->in_from + p->in_to) / 2;
    const double in_half = (p->in_to - p->in_from) / 2;
    const double out_middle = (p->out_from + p->out_to) / 2;
    const double out_half = (p->out_to - p->out_from) / 2;
    double in_versine[5];
    for (size_t i = 0; i < rule->ins; i++)
        in_versine[i] = 2 * square(sin((in_middle + in_half * rule->in[i].node) / 2));
    size_t n = 0;
    for (size_t j = 0; j < rule->outs; j++) {
        const double out_versine = 2 * square(sin((out_middle + out_half * rule->out[j].node) / 2));
        const double area = in_half * out_half * rule->out[j].weight * (1 - out_versine);
        for (size_t i = 0; i < rule->ins; i++) {
            versine[n] = out_versine + (1 - out_versine) * in_versine[i];
            weight[n++] = area * rule->in[i].weight;
        }
    }
    return n;
}

static double dot(size_t n, const double *a, const double *b)
{
    double sum = 0;
    for (size_t i = 0; i < n; i++)
        sum += a[i] * b[i];
    return sum;
}

/* Both rules on a panel. */
static void place_rules(const panel *p, bh_quadrature_rule *rule)
{
    static const tensor fine[2] = {{gauss_5, gauss_4, 5, 4}, {gauss_5, even_6, 5, 3}};
    static const tensor coarse[2] = {{gauss_4, gauss_3, 4, 3}, {gauss_4, even_4, 4, 2}};
    const size_t n = place_nodes(p, &fine[p->even], rule->versine, rule->weight);
    rule->fine = (int)n;
    rule->coarse = (int)place_nodes(p, &coarse[p->even], rule->versine + n, rule->weight + n);
}

static estimate apply_rules(const bh_quadrature_rule *rule, const bh_integrand *f, double times)
{
    double value[BH_QUADRATURE_BATCH];
    const size_t n = (size_t)rule->fine, m = (size_t)rule->coarse;
    f->function(f->context, n + m, rule->versine, value);
    return (estimate){times * dot(n, value, rule->weight),
                      times * dot(m, value + n, rule->weight + n)};
}

static estimate panel_rules(const bh_acceptance_part *part, const bh_integrand *f, const panel *p)
{
    bh_quadrature_rule rule;
    (void)part;
    place_rules(p, &rule);
    return apply_rules(&rule, f, p->times);
}

/* Along the angle over which the versine changes more. */
static void halve_panel(const panel *p, panel *lower, panel *upper)
{
    panel half = *p;
    half.depth++;
    const double in = (p->in_from + p->in_to) / 2;
    const double out = (p->out_from + p->out_to) / 2;
    const double wide = p->in_to - p->in_from;
    const double high = p->out_to - p->out_from;
    const double along_in = fabs(sin(in)) * cos(out) * wide + wide * wide / 4;
    const double along_out = fabs(sin(out) * cos(in)) * high + high * high / 4;
    if (along_in >= along_out) {
        *lower = *upper = half;
        lower->in_to = upper->in_from = in;
        return;
    }
    if (p->even) { /* the upper half, twice */
        half.even = false;
        half.out_from = 0;
        half.times *= 2;
    }
    *lower = *upper = half;
    lower->out_to = upper->out_from = (half.out_from + half.out_to) / 2;
}

static panel whole_of(const bh_acceptance_part *part)
{
    return (panel){part->in_from,
                   part->in_to,
                   part->out_from,
                   part->out_to,
                   1,
                   0,
                   part->out_from == -part->out_to};
}

bh_quadrature bh_quadrature_directions(const bh_acceptance_part *part, const bh_integrand *f)
{
    if (part->azimuth > 0)
        return bh_quadrature_polar(part, part->polar, f);
    bh_quadrature result = {.converged = true};
    if (!(part->in_from < part->in_to))
        return result;
    const scheme s = {part, f, panel_rules, halve_panel};
    refine(&s, whole_of(part), &result);
    return scaled(result, part->scale);
}

void bh_quadrature_prepare(const bh_acceptance_part *part, bh_quadrature_rule *rule)
{
    rule->fine = rule->coarse = 0;
    if (part->azimuth > 0 || !(part->in_from < part->in_to))
        return;
    const panel whole = whole_of(part);
    place_rules(&whole, rule);
}

bh_quadrature bh_quadrature_prepared(const bh_acceptance_part *part, const bh_quadrature_rule *rule,
                                     const bh_integrand *f)
{
    if (rule->fine == 0)
        return bh_quadrature_directions(part, f);
    const estimate e = apply_rules(rule, f, 1);
    const double off = fabs(e.fine - e.coarse);
    if (!(off <= f->tolerance * fmax(fabs(e.fine), f->least * part->solid_angle / part->scale)))
        return bh_quadrature_directions(part, f);
    return scaled((bh_quadrature){e.fine, off, true}, part->scale);
}

/* --- polar angle --- */

static void place_polar(const panel *p, const gauss_point *rule, size_t n, double *theta,
                        double *weight)
{
    const double middle = (p->in_from + p->in_to) / 2;
    const double half = (p->in_to - p->in_from) / 2;
    for (size_t i = 0; i < n; i++) {
        const double u = rule[i].node;
        theta[i] = middle + half * u * (3 - u * u) / 2;
        weight[i] = half * rule[i].weight * 1.5 * (1 - u * u);
    }
}

static estimate polar_rules(const bh_acceptance_part *part, const bh_integrand *f, const panel *p)
{
    enum { FINE = 16, COARSE = 10, ALL = FINE + COARSE };
    double theta[ALL];
    double weight[ALL];
    double versine[ALL];
    double value[ALL];
    place_polar(p, gauss_16, FINE, theta, weight);
    place_polar(p, gauss_10, COARSE, theta + FINE, weight + FINE);
    for (size_t i = 0; i < ALL; i++) {
        const double s = sin(theta[i] / 2);
        versine[i] = 2 * s * s;
        weight[i] *= 2 * s * cos(theta[i] / 2) * bh_acceptance_azimuth(part, theta[i]);
    }
    f->function(f->context, ALL, versine, value);
    return (estimate){dot(FINE, value, weight), dot(COARSE, value + FINE, weight + FINE)};
}

static void halve_polar(const panel *p, panel *lower, panel *upper)
{
    *lower = *upper = *p;
    lower->depth = upper->depth = p->depth + 1;
    lower->in_to = upper->in_from = (p->in_from + p->in_to) / 2;
}

bh_quadrature bh_quadrature_polar(const bh_acceptance_part *part, bh_interval polar,
                                  const bh_integrand *f)
{
    /* kinks nearer than this are one: rounding of the corners */
    static const double nothing = 1e-14;
    const scheme s = {part, f, polar_rules, halve_polar};
    bh_quadrature result = {.converged = true};
    double kinks[BH_KINKS];
    const int n = bh_acceptance_kinks(part, kinks);
    for (int i = 0; i + 1 < n; i++) {
        const double from = fmax(kinks[i], polar.from);
        const double to = fmin(kinks[i + 1], polar.to);
        if (to - from > nothing)
            refine(&s, (panel){.in_from = from, .in_to = to}, &result);
    }
    return scaled(result, part->scale);
}
