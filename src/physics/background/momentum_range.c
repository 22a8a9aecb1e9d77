/* momentum_range.c - pieces of a spectrum between its edges, each integrated adaptively. */
#include "beamhours/physics/momentum_range.h"

#include <math.h>
#include <stdlib.h>

#include "beamhours/base/sentences.h"

enum { DEPTH = 24, HALVINGS_MOST = 400 };

typedef struct {
    double value, doubt; /* [ub/sr]; the second weighted by its relative uncertainty */
} integral;

/* Gauss-Legendre with 8 points over momentum [MeV/c]; dE' = p'/E' dp'. */
static integral gauss(const bh_spectrum *s, double from, double to)
{
    static const double x[4] = {0.1834346424956498, 0.5255324099163290, 0.7966664774136267,
                                0.9602898564975363};
    static const double w[4] = {0.3626837833783620, 0.3137066458778873, 0.2223810344533745,
                                0.1012285362903763};
    const double middle = 0.5 * (from + to), half = 0.5 * (to - from);
    integral sum = {0.0, 0.0};
    for (int i = 0; i < 8; i++) {
        const double p = middle + (i < 4 ? x[i] : -x[i - 4]) * half;
        const bh_transfer at = bh_inclusive_transfer(s->in, p);
        double value, doubt;
        s->spectrum(s->context, s->in, &at, &value, &doubt);
        value *= w[i & 3] * half * p / at.energy;
        sum.value += value;
        sum.doubt += value * doubt;
    }
    return sum;
}

/* One stack of halves; `scale` is what the whole comes to, roughly. */
static integral piece(const bh_spectrum *s, double from, double to, double scale)
{
    struct {
        double from, to;
        integral sum;
    } stack[DEPTH];
    size_t top = 1;
    integral total = {0.0, 0.0};
    stack[0].from = from;
    stack[0].to = to;
    stack[0].sum = gauss(s, from, to);
    for (int turn = 0; top > 0; turn++) {
        const double lo = stack[top - 1].from, hi = stack[top - 1].to, mid = 0.5 * (lo + hi);
        const integral whole = stack[top - 1].sum;
        const integral left = gauss(s, lo, mid), right = gauss(s, mid, hi);
        const double off = fabs(left.value + right.value - whole.value);
        if (off <= 1e-6 * fmax(scale, whole.value) || top == DEPTH || turn > HALVINGS_MOST) {
            total.value += left.value + right.value;
            total.doubt += left.doubt + right.doubt;
            top--;
            continue;
        }
        stack[top - 1].from = mid;
        stack[top - 1].sum = right;
        stack[top].from = lo;
        stack[top].to = mid;
        stack[top].sum = left;
        top++;
    }
    return total;
}

static int rising(const void *a, const void *b)
{
    const double x = *(const double *)a, y = *(const double *)b;
    return (x > y) - (x < y);
}

/* Fills node with the ends of the range and the edges inside, rising; returns how many. */
static size_t nodes(const bh_spectrum *s, double from, double to,
                    double node[BH_SPECTRUM_EDGES + 2])
{
    size_t n = 0;
    node[n++] = from;
    for (size_t i = 0; i < s->count; i++)
        if (s->edge[i] > from && s->edge[i] < to)
            node[n++] = s->edge[i];
    node[n++] = to;
    qsort(node, n, sizeof node[0], rising);
    return n;
}

static const char *outside(const bh_spectrum *s, double from, double to)
{
    const bh_transfer middle = bh_inclusive_transfer(s->in, 0.5 * (from + to));
    return s->outside(s->context, &middle);
}

static bh_computed state(double computed, double width)
{
    if (computed >= width * (1.0 - 1e-12))
        return BH_COMPUTED;
    return computed > 0.0 ? BH_COMPUTED_PART : BH_NOT_COMPUTED;
}

void bh_momentum_range_integral(const bh_spectrum *spectrum, const bh_momentum_range *range,
                                double *value, bh_background_validity *validity)
{
    const double from = range->momentum_from;
    const double to = fmin(range->momentum_to, bh_inclusive_beam(spectrum->in));
    double node[BH_SPECTRUM_EDGES + 2], scale = 0.0, computed = 0.0;
    *value = 0.0;
    *validity = (bh_background_validity){BH_COMPUTED, 1.0, 0.0, ""};
    if (!(from < to))
        return; /* nothing is faster than the beam */
    const size_t n = nodes(spectrum, from, to, node);
    bool within[BH_SPECTRUM_EDGES + 2] = {false};
    for (size_t i = 1; i < n; i++) {
        const char *reason = outside(spectrum, node[i - 1], node[i]);
        within[i] = reason == NULL;
        if (reason) {
            validity->reason = reason;
            continue;
        }
        scale += gauss(spectrum, node[i - 1], node[i]).value;
        computed += node[i] - node[i - 1];
    }
    integral sum = {0.0, 0.0};
    for (size_t i = 1; i < n; i++) {
        if (!within[i])
            continue;
        const integral more = piece(spectrum, node[i - 1], node[i], scale);
        sum.value += more.value;
        sum.doubt += more.doubt;
    }
    *value = sum.value;
    validity->state = state(computed, to - from);
    validity->share = computed / (to - from);
    validity->uncertainty = sum.value > 0.0 ? sum.doubt / sum.value : 0.0;
    if (validity->state == BH_COMPUTED)
        validity->reason = "";
}

bool bh_momentum_range_good(const bh_encounter *encounter, const bh_momentum_range *range,
                            double *value, bh_background_validity *validity)
{
    const double kinetic = encounter->kinetic;
    const bool good = range->angle > 0.0 && range->angle <= 3.1415926535897932 &&
                      range->momentum_from >= 0.0 && range->momentum_to > range->momentum_from &&
                      isfinite(range->momentum_from) && kinetic >= 1e-3 && kinetic <= 1e6;
    if (!good) {
        *value = 0.0;
        *validity = (bh_background_validity){BH_NOT_COMPUTED, 0.0, 0.0, BH_SAY_BACKGROUND_INPUT};
    }
    return good;
}
