/* momentum_range.c - pieces of a spectrum between its edges, each integrated adaptively. */
#include "beamhours/physics/momentum_range.h"

#include <math.h>
#include <stdlib.h>

#include "beamhours/base/sentences.h"

enum { DEPTH = 24, HALVINGS_MOST = 400 };

#define AGREE 3e-5 /* the coarser rule's departure, of the whole; the finer one is far closer */

typedef struct {
    double from, to;     /* [MeV/c] */
    double value, doubt; /* [ub/sr]; the second weighted by its relative uncertainty */
    double off;          /* [ub/sr] by which the coarser rule departs */
} part;

/* Kronrod's 15 points over momentum [MeV/c], every second of which are Gauss's 7; dE' = p'/E' dp'.
 */
static part kronrod(const bh_spectrum *s, double from, double to)
{
    static const double x[8] = {0.0,
                                0.20778495500789847,
                                0.40584515137739717,
                                0.58608723546769113,
                                0.74153118559939444,
                                0.86486442335976907,
                                0.94910791234275852,
                                0.99145537112081264};
    static const double fine[8] = {0.20948214108472783,  0.20443294007529889, 0.19035057806478541,
                                   0.16900472663926790,  0.14065325971552592, 0.10479001032225018,
                                   0.063092092629978553, 0.022935322010529225};
    static const double coarse[4] = {0.41795918367346939, 0.38183005050511894, 0.27970539148927667,
                                     0.12948496616886969};
    const double middle = 0.5 * (from + to), half = 0.5 * (to - from);
    part out = {from, to, 0.0, 0.0, 0.0};
    for (int i = -7; i <= 7; i++) {
        const int k = i < 0 ? -i : i;
        const bh_transfer at = bh_inclusive_transfer(s->in, middle + (i < 0 ? -x[k] : x[k]) * half);
        double value, doubt;
        s->spectrum(s->context, s->in, &at, &value, &doubt);
        value *= half * at.momentum / at.energy;
        out.value += fine[k] * value;
        out.doubt += fine[k] * value * doubt;
        out.off += (fine[k] - (k % 2 ? 0.0 : coarse[k / 2])) * value;
    }
    out.off = fabs(out.off);
    return out;
}

/* Adds `first` to `total`, halved until the rules agree; `scale` is what the whole comes to,
 * roughly. */
static void add_piece(const bh_spectrum *s, part first, double scale, part *total)
{
    part stack[DEPTH];
    size_t top = 1;
    stack[0] = first;
    for (int turn = 0; top > 0; turn++) {
        const part now = stack[--top];
        const double most = AGREE * fmax(scale, now.value), middle = 0.5 * (now.from + now.to);
        if (now.off <= most || top + 2 > DEPTH || turn > HALVINGS_MOST) {
            total->value += now.value;
            total->doubt += now.doubt;
            continue;
        }
        stack[top++] = kronrod(s, middle, now.to);
        stack[top++] = kronrod(s, now.from, middle);
    }
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
    /* cppcheck-suppress returnDanglingLifetime ; a constant sentence, never its argument */
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
    const double end = fmin(range->momentum_to, bh_inclusive_beam(spectrum->in));
    const double to = spectrum->fastest > 0.0 ? fmin(end, fmax(from, spectrum->fastest)) : end;
    double node[BH_SPECTRUM_EDGES + 2], scale = 0.0, computed = end - to; /* of nothing */
    *value = 0.0;
    *validity = (bh_background_validity){BH_COMPUTED, 1.0, 0.0, ""};
    if (!(from < to))
        return; /* nothing is so fast */
    const size_t n = nodes(spectrum, from, to, node);
    part piece[BH_SPECTRUM_EDGES + 1], sum = {0};
    size_t pieces = 0;
    for (size_t i = 1; i < n; i++) {
        const char *reason = outside(spectrum, node[i - 1], node[i]);
        if (reason) {
            validity->reason = reason;
            continue;
        }
        piece[pieces] = kronrod(spectrum, node[i - 1], node[i]);
        scale += piece[pieces++].value;
        computed += node[i] - node[i - 1];
    }
    for (size_t i = 0; i < pieces; i++)
        add_piece(spectrum, piece[i], scale, &sum);
    *value = sum.value;
    validity->state = state(computed, end - from);
    validity->share = computed / (end - from);
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
