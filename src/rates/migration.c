/* migration.c - events that a finite resolution moves out of their bin: exponentials under a normal
 * curve, in closed form. */
#include "beamhours/rates/migration.h"

#include <math.h>
#include <stdbool.h>
#include <stddef.h>

#include "beamhours/units/constants.h"

/* No event goes further than this many sigma: the normal tail beyond is 1e-9. */
static const double furthest = 6;

/* A density that changes by more within one cell, or within one sigma, is taken to change by that
 * much: what is that steep is no smooth density. */
static const double steepest_cell = 30, steepest_sigma = 2;

/* Cells narrower than these shares of sigma are summed over three points, and over two: shares
 * are then within 1e-8. */
static const double narrow = 0.4, thin = 0.12;

/* Below this change over a cell the closed form cancels and its series is exact. */
static const double flat = 1e-4;

bh_code bh_migration_check(const bh_migration *m, bh_error *err)
{
    bool sense = m->cells >= 1 && m->sigma >= 0 && isfinite(m->sigma);
    for (int i = 0; sense && i < m->cells; i++)
        sense = m->edges[i] < m->edges[i + 1];
    if (sense)
        return BH_OK;
    return bh_fail(err, BH_EDOMAIN,
                   "%d bins with a resolution of %g rad: there must be one bin or more, edges that "
                   "rise and a resolution of 0 or more",
                   m->cells, m->sigma);
}

/* --- the normal distribution --- */

/* Probability of a deviate below x. */
static double below(double x)
{
    return 0.5 * erfc(-x / sqrt(2));
}

static double density(double x)
{
    return exp(-0.5 * x * x) / sqrt(2 * BH_PI);
}

/* Probability of a deviate between x and y, without loss in either tail. */
static double between(double x, double y)
{
    return x > 0 && y > 0 ? below(-x) - below(-y) : below(y) - below(x);
}

/* Integrals from -infinity to t of below(x), and of x below(x) (less a constant). */
static double first_integral(double t)
{
    return t * below(t) + density(t);
}

static double second_integral(double t)
{
    return 0.5 * ((t * t - 1) * below(t) + t * density(t));
}

/* --- one cell --- */

enum { POINTS = 3 };

struct cell {
    double from, to;                   /* [rad] */
    double sigma;                      /* [rad] */
    double slope;                      /* [1/rad] */
    int points;                        /* of a narrow one, else 0 */
    double at[POINTS], weight[POINTS]; /* [rad] [1] of a narrow one */
};

/* Share measured below `edge` of a density 1 + slope (x - centre). */
static double below_flat(const struct cell *c, double edge)
{
    const double width = c->to - c->from, centre = (c->from + c->to) / 2;
    const double near = (edge - c->from) / c->sigma, far = (edge - c->to) / c->sigma;
    const double first = c->sigma * (first_integral(near) - first_integral(far));
    const double second = c->sigma * c->sigma * (second_integral(near) - second_integral(far));
    return (first + c->slope * ((edge - centre) * first - second)) / width;
}

/* The same of exp(slope x), integrated by parts; angles from the centre of the cell. */
static double below_steep(const struct cell *c, double edge)
{
    const double half = (c->to - c->from) / 2;
    const double e = edge - (c->from + c->to) / 2;
    const double s = c->slope, shift = s * c->sigma;
    const double ends = exp(s * half) * below((e - half) / c->sigma) -
                        exp(-s * half) * below((e + half) / c->sigma);
    const double moved = exp(s * e + shift * shift / 2) *
                         between((-half - e) / c->sigma - shift, (half - e) / c->sigma - shift);
    return (ends + moved) / (2 * sinh(s * half));
}

/* A cell narrower than the resolution by Gauss and Legendre's points. */
static double below_points(const struct cell *c, double edge)
{
    double sum = 0;
    for (int i = 0; i < c->points; i++)
        sum += c->weight[i] * below((edge - c->at[i]) / c->sigma);
    return sum;
}

static double measured_below(const struct cell *c, double edge)
{
    if (edge >= c->to + furthest * c->sigma)
        return 1;
    if (edge <= c->from - furthest * c->sigma)
        return 0;
    if (c->points)
        return below_points(c, edge);
    const bool level = fabs(c->slope) * (c->to - c->from) < flat;
    const double share = level ? below_flat(c, edge) : below_steep(c, edge);
    return fmin(fmax(share, 0), 1);
}

static void set_points(struct cell *c)
{
    static const double node[2][POINTS] = {{-0.577350269189625765, 0.577350269189625765},
                                           {-0.774596669241483377, 0, 0.774596669241483377}};
    static const double share[2][POINTS] = {{1, 1}, {5, 8, 5}};
    const double half = (c->to - c->from) / 2;
    const bool three = 2 * half > thin * c->sigma || fabs(c->slope) * half > thin;
    double sum = 0;
    c->points = !(2 * half < narrow * c->sigma && fabs(c->slope) * half < 1) ? 0 : three ? 3 : 2;
    for (int i = 0; i < c->points; i++) {
        c->at[i] = (c->from + c->to) / 2 + half * node[three][i];
        c->weight[i] = share[three][i] * exp(c->slope * half * node[three][i]);
        sum += c->weight[i];
    }
    for (int i = 0; i < c->points; i++)
        c->weight[i] /= sum;
}

static double slope_within(const bh_migration *m, int i, double slope)
{
    const double width = m->edges[i + 1] - m->edges[i];
    const double most = fmin(steepest_cell / width, steepest_sigma / m->sigma);
    return fmin(fmax(slope, -most), most);
}

static struct cell cell_of(const bh_migration *m, int i, double slope)
{
    struct cell c = {.from = m->edges[i], .to = m->edges[i + 1], .sigma = m->sigma};
    c.slope = slope_within(m, i, slope);
    set_points(&c);
    return c;
}

/* --- cells that are alike --- */

static bool equal_widths(const bh_migration *m)
{
    const double width = (m->edges[m->cells] - m->edges[0]) / m->cells;
    for (int i = 0; i < m->cells; i++)
        if (fabs(m->edges[i + 1] - m->edges[i] - width) > 1e-9 * width)
            return false;
    return true;
}

/* Lagrange's polynomials through the slopes that a likeness has, at `slope`. */
static void lagrange(const bh_migration_likeness *l, double slope, double *part)
{
    for (int k = 0; k < BH_MIGRATION_SLOPES; k++) {
        part[k] = 1;
        for (int i = 0; i < BH_MIGRATION_SLOPES; i++)
            if (i != k)
                part[k] *= (slope - l->slope[i]) / (l->slope[k] - l->slope[i]);
    }
}

void bh_migration_compare(const bh_migration *m, size_t count, const double *slope,
                          bh_migration_likeness *l)
{
    static const double too_much =
        0.2; /* [1] of the density over a cell or a sigma, between slopes */
    double least = HUGE_VAL, most = -HUGE_VAL;
    l->alike = false;
    if (!(m->sigma > 0) || m->cells < 2 * BH_MIGRATION_SLOPES || !equal_widths(m) || !count)
        return;
    for (size_t i = 0; i < count; i++) {
        const double s = slope_within(m, 0, slope[i]);
        least = fmin(least, s);
        most = fmax(most, s);
    }
    const double width = m->edges[1] - m->edges[0], apart = most - least;
    const double reach = ceil(furthest * m->sigma / width) + 1;
    if (!(apart * (width + m->sigma) < too_much) || reach > BH_MIGRATION_FAR)
        return;
    l->alike = true;
    l->reach = (int)reach;
    const int middle = m->cells / 2;
    for (int k = 0; k < BH_MIGRATION_SLOPES; k++) {
        const double turn = BH_PI * (2 * k + 1) / (2 * BH_MIGRATION_SLOPES);
        l->slope[k] = (least + most) / 2 - fmax(apart, 1e-9 / width) / 2 * cos(turn);
        const struct cell c = cell_of(m, middle, l->slope[k]);
        for (int n = 0; n < 2 * l->reach + 2; n++)
            l->below[n][k] = measured_below(&c, c.from + (n - l->reach) * width);
    }
}

/* --- columns of the matrix --- */

/* What is measured below edge i of an event that belongs in a cell. */
struct lookup {
    const bh_migration *m;
    const bh_migration_likeness *likeness; /* NULL: */
    struct cell cell;
    int from;
    double part[BH_MIGRATION_SLOPES];
};

static double look_up(const struct lookup *x, int edge)
{
    const bh_migration_likeness *l = x->likeness;
    if (!l)
        return measured_below(&x->cell, x->m->edges[edge]);
    const int n = edge - x->from + l->reach;
    double sum = 0;
    if (n < 0 || n > 2 * l->reach + 1)
        return n > 0;
    for (int k = 0; k < BH_MIGRATION_SLOPES; k++)
        sum += x->part[k] * l->below[n][k];
    return sum;
}

void bh_migration_reach(const bh_migration *m, const bh_migration_likeness *likeness, int from,
                        double slope, bh_migration_column *column)
{
    column->first = from;
    column->count = 1;
    column->share[0] = 1;
    if (!(m->sigma > 0) || m->cells == 1)
        return;
    struct lookup x = {
        .m = m, .likeness = likeness && likeness->alike ? likeness : NULL, .from = from};
    if (x.likeness)
        lagrange(x.likeness, slope_within(m, from, slope), x.part);
    else
        x.cell = cell_of(m, from, slope);
    const int last = m->cells - 1;
    const double reach = furthest * m->sigma, begin = m->edges[from], end = m->edges[from + 1];
    int first = from;
    while (first > 0 && m->edges[first] > begin - reach)
        first--;
    double sum = 0; /* what is measured below the cell at hand */
    int n = 0;
    for (int i = first; i <= last; i++) {
        const double next = i == last ? 1 : fmin(fmax(sum, look_up(&x, i + 1)), 1);
        column->share[n++] = next - sum;
        sum = next;
        if (m->edges[i + 1] >= end + reach)
            break;
    }
    column->first = first;
    column->count = n;
}

void bh_migration_shares(const bh_migration *m, int from, double slope, double *share)
{
    bh_migration_column column = {.share = share};
    bh_migration_reach(m, NULL, from, slope, &column);
    for (int i = column.count - 1; i >= 0; i--)
        share[column.first + i] = share[i];
    for (int i = 0; i < m->cells; i++)
        if (i < column.first || i >= column.first + column.count)
            share[i] = 0;
}

/* --- slopes --- */

static double width_of(const bh_migration *m, int i)
{
    return m->edges[i + 1] - m->edges[i];
}

static double centre_of(const bh_migration *m, int i)
{
    return (m->edges[i] + m->edges[i + 1]) / 2;
}

/* By how much the logarithm of a mean over cell i exceeds that in its middle, of exp(slope x). */
static double bulge(const bh_migration *m, double slope, int i)
{
    const double half = fmin(fabs(slope) * width_of(m, i), steepest_cell) / 2;
    return half < flat ? 0 : log(sinh(half) / half);
}

/* Slope between the middles of cells i and i + 1; false where one of them is empty or does not
 * exist. */
static bool chord(const bh_migration *m, const double *counts, int i, double *out)
{
    if (i < 0 || i + 1 >= m->cells || !(counts[i] > 0) || !(counts[i + 1] > 0))
        return false;
    const double apart = centre_of(m, i + 1) - centre_of(m, i);
    const double ratio = counts[i + 1] / width_of(m, i + 1) / (counts[i] / width_of(m, i));
    const double slope = log(ratio) / apart;
    *out = slope - (bulge(m, slope, i + 1) - bulge(m, slope, i)) / apart;
    return true;
}

/* The chord from a cell to the next. */
struct chord {
    bool there;
    double slope; /* [1/rad] */
};

static struct chord chord_at(const bh_migration *m, const double *counts, int i)
{
    struct chord c = {.slope = 0};
    c.there = chord(m, counts, i, &c.slope);
    return c;
}

/* Slope of the parabola through three middles, cell i's and its neighbours' or the next two to one
 * side; of the chord where there are but two.  `near`: the chords before and behind the cell. */
static double slope_at(const bh_migration *m, const double *counts, int i,
                       const struct chord near[2])
{
    if (near[0].there && near[1].there) {
        const double b = centre_of(m, i) - centre_of(m, i - 1);
        const double a = centre_of(m, i + 1) - centre_of(m, i);
        return (near[0].slope * a + near[1].slope * b) / (a + b);
    }
    if (!near[0].there && !near[1].there)
        return 0;
    const bool ahead = near[1].there;
    const int step = ahead ? 1 : -1;
    const struct chord next = chord_at(m, counts, ahead ? i + 1 : i - 2);
    if (!next.there)
        return near[ahead].slope;
    const double b = centre_of(m, i + step) - centre_of(m, i);
    return near[ahead].slope -
           (next.slope - near[ahead].slope) * b / (centre_of(m, i + 2 * step) - centre_of(m, i));
}

void bh_migration_slopes(const bh_migration *m, const double *counts, double *slope)
{
    struct chord near[2] = {chord_at(m, counts, -1)};
    for (int i = 0; i < m->cells; i++) {
        near[1] = chord_at(m, counts, i);
        slope[i] = slope_at(m, counts, i, near);
        near[0] = near[1];
    }
}
