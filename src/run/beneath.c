/* beneath.c - what an arm counts beside elastic events. */
#include "beamhours/run/beneath.h"

#include <math.h>
#include <stdio.h>
#include <string.h>

#include "beamhours/base/sentences.h"
#include "beamhours/rates/average.h"
#include "beamhours/run/elastic_tail.h"
#include "beamhours/units/constants.h"
#include "beamhours/units/nuclide.h"

static const double worth_saying = 0.01, soft_share = 0.03;

void bh_beneath_begin(const bh_view *view, bh_beneath *sum)
{
    *sum = (bh_beneath){.at = {.count = 0}};
    if (view->arm->arm.detects == BH_DETECTS_RECOIL ||
        view->setting->beam.particle.kind != BH_KIND_LEPTON)
        return;
    sum->polar = view->acceptance.whole.polar;
    if (!(sum->polar.to > 0))
        return;
    sum->polar.from = fmax(sum->polar.from, 1e-4);
    const int more =
        sum->polar.to > sum->polar.from && bh_angle_points(sum->polar) < BH_ANGLE_NODES;
    bh_angle_nodes_of(sum->polar, bh_angle_points(sum->polar) + more, &sum->at);
}

static double momentum_of(double mass, double kinetic)
{
    return sqrt(kinetic * (kinetic + 2 * mass));
}

/* The momenta that the arm takes at an angle; false where it takes none. */
static bool range_at(const bh_radiated_request *r, double least, double mass,
                     bh_momentum_range *range)
{
    const double from = fmax(bh_gate_from(&r->gate, &r->line, range->angle), least);
    if (!(from < r->gate.to) || !(from < r->channel.encounter.kinetic))
        return false;
    range->momentum_from = momentum_of(mass, from);
    range->momentum_to = momentum_of(mass, r->gate.to);
    return true;
}

/* Too few of them to matter, or too light. */
static bool matters(const bh_yielder *yielder, const bh_beneath_of *of)
{
    double all = 0;
    for (size_t n = 0; n < of->list->count; n++)
        for (int o = 0; o < BH_ORIGINS; o++)
            all += yielder->seen[n].of[o] * of->list->nuclides[n].a;
    return of->nuclei * of->struck->a > worth_saying * all;
}

/* How far below the elastic line of a deuteron [MeV] its break-up begins at an angle, for light
 * leptons: where the final mass is that of two nucleons. */
static double breakup_below(const bh_encounter *e, double angle)
{
    static const double free = BH_MASS_PROTON + BH_MASS_NEUTRON;
    const double total = e->kinetic + e->beam->mass;
    return (free * free - e->target * e->target) / (2 * (e->target + total * (1 - cos(angle))));
}

/* The least of that over the arm: what a cut must stay below to leave no break-up.  0 where the
 * nuclide is no deuteron, or not the one that a cut counts from. */
static double spared_below(const bh_view *view, const bh_beneath_of *of,
                           const bh_background_validity *validity, const bh_beneath *grid)
{
    const bh_encounter *line = &view->line.encounter;
    const bool deuteron = of->struck->z == 1 && of->struck->a == 2;
    if (validity->state == BH_COMPUTED || !deuteron || line->z != 1 || line->a != 2 ||
        strcmp(validity->reason, BH_SAY_INELASTIC_BREAKUP) != 0)
        return 0;
    return breakup_below(&of->radiated->channel.encounter, grid->polar.to);
}

static void note(bh_yielder *yielder, const bh_view *view, const bh_beneath_of *of,
                 const bh_background_validity *validity, double spared)
{
    char nuclide[8], what[256];
    if (!yielder->remarks || validity->state == BH_COMPUTED || !matters(yielder, of))
        return;
    bh_nuclide_name(of->struck->z, of->struck->a, nuclide);
    snprintf(what, sizeof what, BH_WARN_BESIDE, view->beside ? view->beside : "", validity->reason);
    bh_remarks_note(yielder->remarks, &(bh_remark){.kind = BH_REMARK_NOT_COMPUTED,
                                                   .at = view->setting->process.at,
                                                   .key = "models.process",
                                                   .who = nuclide,
                                                   .what = view->beside ? what : validity->reason,
                                                   .setting = view->setting->name,
                                                   .low = spared,
                                                   .high = spared});
}

/* The hard part of the tail of a line that is background. */
static double tail_at(const bh_radiated_request *r, double angle)
{
    bh_event event;
    if (r->signal || !r->gate.given || !bh_channel_has(&r->channel, angle, &event))
        return 0;
    const double line = event.scattered_kinetic;
    const double soft = soft_share * (line + r->channel.encounter.beam->mass);
    const double above = r->gate.to < (double)INFINITY ? line - r->gate.to : 0;
    const double down = line - bh_gate_from(&r->gate, &r->line, angle);
    return bh_elastic_tail(r, angle, fmax(soft, above), down);
}

static void add_row(bh_yielder *yielder, const bh_view *view, const bh_beneath_of *of,
                    const bh_background *row, bh_beneath *sum)
{
    const bh_encounter *e = &of->radiated->channel.encounter;
    bh_background_validity worst = {.state = BH_COMPUTED};
    if (row->sharp || row->recoil || !row->applies(e->beam, of->struck->z, of->struck->a))
        return;
    for (int i = 0; i < sum->at.count; i++) {
        bh_momentum_range range = {.angle = sum->at.angle[i]};
        bh_background_validity validity;
        double value;
        if (!range_at(of->radiated, 0, e->beam->mass, &range))
            continue;
        row->momentum_integral(e, &range, &value, &validity);
        sum->value[i] += of->nuclei * value;
        if (validity.state > worst.state)
            worst = validity;
    }
    note(yielder, view, of, &worst, spared_below(view, of, &worst, sum));
}

void bh_beneath_add(bh_yielder *yielder, const bh_view *view, const bh_beneath_of *of,
                    bh_beneath *sum)
{
    const bh_background *row;
    for (int i = 0;
         i < sum->at.count && (of->which == BH_BENEATH_ALL || of->which == BH_BENEATH_TAIL); i++)
        sum->value[i] += of->nuclei * tail_at(of->radiated, sum->at.angle[i]);
    for (int k = 0; sum->at.count && (row = bh_background_at(k)); k++)
        if (of->which == BH_BENEATH_ALL || of->which == k)
            add_row(yielder, view, of, row, sum);
}

/* --- sums over the solid angle --- */

struct smooth {
    const bh_beneath *sum;
    bool logarithm;
    double level[BH_ANGLE_NODES];
};

static void evaluate_smooth(void *context, size_t n, const double *theta, double *value)
{
    const struct smooth *s = context;
    const bh_beneath *b = s->sum;
    for (size_t i = 0; i < n; i++) {
        double share[BH_ANGLE_NODES];
        bh_angle_shares(&b->at, fmax(theta[i], 1e-6), share);
        const double v = bh_angle_between(&b->at, share, s->level);
        value[i] = s->logarithm ? exp(v) : fmax(0, v);
    }
}

/* Averages a function and adds it to the totals of all parts. */
static bh_code add_average(bh_yielder *yielder, const bh_view *view,
                           const bh_average_request *request, double *total, bh_error *err)
{
    bh_sum_scratch *scratch = bh_workspace_scratch(yielder->workspace);
    bh_averages sums = {.bins = view->parts > 1 ? scratch->bins : NULL};
    const bh_code code = bh_average_over(&view->acceptance, request,
                                         bh_workspace_averages(yielder->workspace), &sums, err);
    for (int i = 0; !code && i < view->parts; i++)
        total[i] += i ? scratch->bins[i - 1].total : sums.whole.total;
    return code;
}

bh_code bh_beneath_sum(bh_yielder *yielder, const bh_view *view, const bh_beneath *sum,
                       double *total, bh_error *err)
{
    struct smooth s = {.sum = sum, .logarithm = true};
    double most = 0;
    for (int i = 0; i < sum->at.count; i++) {
        most = fmax(most, sum->value[i]);
        s.logarithm = s.logarithm && sum->value[i] > 0;
    }
    if (!(most > 0))
        return BH_OK;
    for (int i = 0; i < sum->at.count; i++)
        s.level[i] = s.logarithm ? log(sum->value[i]) : sum->value[i];
    const bh_average_request request = {
        .function = evaluate_smooth, .context = &s, .tolerance = 1e-4};
    return add_average(yielder, view, &request, total, err);
}

/* --- electrons of atoms --- */

struct sharp {
    const bh_beneath_of *of;
    const bh_background *row;
    double least; /* [MeV] that comes out */
    double mass;  /* [MeV] of what comes out */
    bh_background_validity worst;
};

static void evaluate_sharp(void *context, size_t n, const double *theta, double *value)
{
    struct sharp *s = context;
    for (size_t i = 0; i < n; i++) {
        bh_momentum_range range = {.angle = theta[i]};
        bh_background_validity validity;
        value[i] = 0;
        if (!range_at(s->of->radiated, s->least, s->mass, &range))
            continue;
        s->row->momentum_integral(&s->of->radiated->channel.encounter, &range, &value[i],
                                  &validity);
        value[i] *= s->of->nuclei;
        if (validity.state > s->worst.state)
            s->worst = validity;
    }
}

/* Whether some of them get in; a line falls with the angle, so that none does where the first does
 * not, unless the upper edge keeps it out. */
static bool gets_in(struct sharp *s, const bh_beneath *grid)
{
    double value[BH_ANGLE_NODES + 2];
    const double ends[] = {grid->polar.from, grid->polar.to};
    evaluate_sharp(s, (size_t)grid->at.count, grid->at.angle, value);
    evaluate_sharp(s, 2, ends, value + grid->at.count);
    double most = 0;
    for (int i = 0; i < grid->at.count + 2; i++)
        most = fmax(most, value[i]);
    return most > 0;
}

bh_code bh_beneath_atomic(bh_yielder *yielder, const bh_view *view, const bh_beneath_of *of,
                          double *total, bh_error *err)
{
    const bh_encounter *e = &of->radiated->channel.encounter;
    const bh_background *row;
    bh_code code = BH_OK;
    bh_beneath grid;
    bh_beneath_begin(view, &grid);
    if (!view->gate.given && !(view->gate.from > 0)) /* nobody says which electrons count */
        return BH_OK;
    for (int k = 0; !code && grid.at.count && (row = bh_background_at(k)); k++) {
        if (!row->sharp || !row->applies(e->beam, of->struck->z, of->struck->a) ||
            (of->which != BH_BENEATH_ALL && of->which != k))
            continue;
        struct sharp s = {.of = of,
                          .row = row,
                          .least = view->least,
                          .mass = row->recoil ? BH_MASS_ELECTRON : e->beam->mass};
        if (gets_in(&s, &grid))
            code = add_average(
                yielder, view,
                &(bh_average_request){.function = evaluate_sharp, .context = &s, .tolerance = 1e-4},
                total, err);
        note(yielder, view, of, &s.worst, 0);
    }
    return code;
}
