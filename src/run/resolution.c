/* resolution.c - what an arm's angle resolution and the deflections in matter do to its bins. */
#include "beamhours/run/resolution.h"

#include <math.h>
#include <stddef.h>
#include <string.h>

#include "beamhours/matter/multiple_scattering.h"
#include "beamhours/rates/migration.h"

/* [1] in radiation lengths: what goes further along the layers does not arrive. */
static const double thickest = 10;

/* Mean square of the deflection of one event [rad^2]. */
static double deflected(const bh_view *view, const bh_vertex *v, const bh_channel *channel)
{
    bh_channel there = *channel;
    bh_event event;
    there.encounter.kinetic = v->kinetic[BH_AS_IT_IS];
    if (!bh_channel_has(&there, view->axis, &event))
        return 0;
    const bh_particle detected = bh_channel_detected(channel);
    const double behind = bh_way_after(&view->way, v, view->axis).lengths;
    const double before = v->before.lengths, all = before + behind;
    if (!(all > 0 && all < thickest))
        return 0;
    const double kinetic = channel->recoil ? event.recoil_kinetic : event.scattered_kinetic;
    const double of_beam = bh_highland(&view->way.beam, v->kinetic[BH_AS_IT_IS], all);
    const double of_detected = bh_highland(&detected, kinetic, all);
    return (of_beam * of_beam * before + of_detected * of_detected * behind) / all;
}

double bh_view_angle_rms(const bh_yielder *yielder, const bh_view *view, const bh_channel *channel,
                         size_t count)
{
    double sum = 0;
    for (size_t i = 0; view->way.losing && i < count; i++)
        sum += yielder->vertices[i].weight * deflected(view, &yielder->vertices[i], channel);
    return hypot(view->arm->arm.angle_resolution.value, sqrt(sum));
}

/* --- bins --- */

enum { MOST_CELLS = BH_MOST_BINS + 2 };

/* The bins, and what the aperture has on either side of them. */
struct cells {
    bh_migration migration;
    int before;                   /* 1 where there is a cell in front of the bins */
    int beside;                   /* how many cells are no bins */
    double edges[MOST_CELLS + 1]; /* [rad] */
    double counts[MOST_CELLS], slope[MOST_CELLS];
};

static void set_cells(const bh_yield *yield, const bh_acceptance *acceptance, struct cells *c)
{
    const int bins = acceptance->bins;
    const double from = acceptance->whole.in_from, to = acceptance->whole.in_to;
    const double rounding = 1e-9 * (to - from);
    const bool front = bh_acceptance_edge(acceptance, 0) > from + rounding;
    const bool back = bh_acceptance_edge(acceptance, bins) < to - rounding;
    c->before = front;
    c->beside = front + back;
    c->edges[0] = from;
    for (int i = 0; i <= bins; i++)
        c->edges[c->before + i] = bh_acceptance_edge(acceptance, i);
    c->edges[bins + c->beside] = back ? to : bh_acceptance_edge(acceptance, bins);
    c->migration = (bh_migration){
        .cells = bins + c->beside, .edges = c->edges, .sigma = yield->view.angle_rms};
}

/* Share of what lies beside the bins that lies in front of them: the densities of the outermost
 * bins go on. */
static double share_in_front(const struct cells *c, int bins)
{
    const double width[2] = {c->edges[1] - c->edges[0],
                             c->edges[c->migration.cells] - c->edges[c->migration.cells - 1]};
    const int outer[2] = {c->before, c->before + bins - 1};
    double amount[2];
    if (c->beside < 2)
        return c->before;
    for (int k = 0; k < 2; k++) {
        const int i = outer[k];
        const double bin = c->edges[i + 1] - c->edges[i];
        const double away = (k ? 1 : -1) * (bin + width[k]) / 2;
        amount[k] = c->counts[i] / bin * width[k] * exp(fmax(-30, fmin(30, c->slope[i] * away)));
    }
    return amount[0] + amount[1] > 0 ? amount[0] / (amount[0] + amount[1]) : 0.5;
}

/* One kind of sum, which stands `at` so many bytes behind the beginning of a part. */
static double *member(bh_part *part, size_t at)
{
    return (double *)(void *)((unsigned char *)part + at);
}

/* Fills counts with one kind of sum in each cell; `front`: the share of the rest in front. */
static void fill_counts(const bh_yield *yield, size_t at, double front, const struct cells *c,
                        double *counts)
{
    const int bins = yield->view.parts - 1;
    double rest = *member(&yield->part[0], at);
    for (int i = 0; i < bins; i++) {
        counts[c->before + i] = *member(&yield->part[1 + i], at);
        rest -= counts[c->before + i];
    }
    if (c->before)
        counts[0] = rest * front;
    if (c->beside > c->before)
        counts[c->migration.cells - 1] = rest * (1 - front);
}

enum { MOST_KINDS = 4 };

/* Sums that go the same ways. */
struct kinds {
    size_t count, at[MOST_KINDS]; /* the first decides how events are spread within their cells */
};

/* How events of these kinds are spread within their cells; false where there are none. */
static bool find_slopes(const bh_yield *yield, const struct kinds *kinds, struct cells *c,
                        double *slope)
{
    if (!(*member(&yield->part[0], kinds->at[0]) != 0))
        return false;
    fill_counts(yield, kinds->at[0], 0.5, c, c->counts);
    bh_migration_slopes(&c->migration, c->counts, slope);
    return true;
}

static void move(const bh_yield *yield, const struct kinds *kinds,
                 const bh_migration_likeness *likeness, struct cells *c)
{
    const int bins = yield->view.parts - 1, cells = c->migration.cells;
    double counts[MOST_KINDS][MOST_CELLS], measured[MOST_KINDS][MOST_CELLS];
    double share[MOST_CELLS];
    bh_migration_column column = {.share = share};
    for (size_t k = 0; k < kinds->count; k++)
        memset(measured[k], 0, (size_t)cells * sizeof measured[k][0]);
    fill_counts(yield, kinds->at[0], 0.5, c, c->counts);
    const double front = share_in_front(c, bins);
    for (size_t k = 0; k < kinds->count; k++)
        fill_counts(yield, kinds->at[k], front, c, counts[k]);
    for (int i = 0; i < cells; i++) {
        bh_migration_reach(&c->migration, likeness, i, c->slope[i], &column);
        for (size_t k = 0; k < kinds->count; k++)
            for (int n = 0; n < column.count; n++)
                measured[k][column.first + n] += counts[k][i] * share[n];
    }
    for (size_t k = 0; k < kinds->count; k++)
        for (int i = 0; i < bins; i++)
            *member(&yield->part[1 + i], kinds->at[k]) = measured[k][c->before + i];
}

enum { SORTS = 3 };

/* All that is in the cells moves; what cells have in common is found for all of it. */
static void move_all(const bh_yield *yield, const struct kinds *kinds, struct cells *c)
{
    const int cells = c->migration.cells;
    double slope[SORTS][MOST_CELLS], all[SORTS * MOST_CELLS];
    bool some[SORTS];
    bh_migration_likeness likeness;
    size_t count = 0;
    for (int k = 0; k < SORTS; k++) {
        some[k] = find_slopes(yield, &kinds[k], c, slope[k]);
        for (int i = 0; some[k] && i < cells; i++)
            all[count++] = slope[k][i];
    }
    bh_migration_compare(&c->migration, count, all, &likeness);
    for (int k = 0; k < SORTS; k++) {
        if (!some[k])
            continue;
        memcpy(c->slope, slope[k], (size_t)cells * sizeof c->slope[0]);
        move(yield, &kinds[k], &likeness, c);
    }
}

void bh_resolve_bins(bh_yield *yield)
{
    /* sensitivities are differences of the signal and go where it goes */
    static const struct kinds kinds[SORTS] = {
        {4,
         {offsetof(bh_part, kept), offsetof(bh_part, radiative), offsetof(bh_part, per_radian),
          offsetof(bh_part, per_momentum)}},
        {3, {offsetof(bh_part, windows), offsetof(bh_part, dummy), offsetof(bh_part, beside[0])}},
        {2, {offsetof(bh_part, other), offsetof(bh_part, beside[1])}}};
    struct cells c;
    const int bins = yield->view.parts - 1;
    for (int i = 0; i <= bins; i++)
        yield->part[i].belonging = yield->part[i].kept;
    if (bins < 1 || !(yield->view.angle_rms > 0))
        return;
    set_cells(yield, &yield->view.acceptance, &c);
    if (c.migration.cells < 2 || bh_migration_check(&c.migration, NULL))
        return;
    move_all(yield, kinds, &c);
}
