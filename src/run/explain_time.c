/* explain_time.c - hours, counts, and what the statistical uncertainty is made of. */
#include <math.h>

#include "beamhours/run/explaining.h"

static void factor(bh_explaining *x, const char *name, const char *value, const char *formula)
{
    bh_explain_add(
        x, (bh_line){.kind = BH_LINE_FACTOR, .name = name, .value = value, .formula = formula});
}

static const char *percent(bh_explaining *x, double share)
{
    return bh_explain_number(x, 100 * share, "%");
}

static const char *asked_by(bh_want want)
{
    switch (want) {
    case BH_WANT_GOAL:
        return "what the goal takes";
    case BH_WANT_TIME:
        return "the time that the setting asks for";
    case BH_WANT_CHARGE:
        return "charge / current";
    case BH_WANT_COUNTS:
        return "counts / (signal rate x live fraction x 3600)";
    default:
        return NULL;
    }
}

static void explain_hours(bh_explaining *x)
{
    const double hours = x->hours.full;
    const bh_part *p = x->part;
    const double live = x->arm->live.live_fraction;
    bh_explain_section(x, "Time");
    if (!isfinite(hours)) {
        bh_explain_add(x, (bh_line){.kind = BH_LINE_NOTE,
                                    .remark = bh_why_text(x->hours.wanted ? BH_WHY_NO_SIGNAL
                                                                          : BH_WHY_NO_WANT)});
        return;
    }
    factor(x, "hours with full target", bh_explain_number(x, hours, "h"),
           x->setting->arm_count > 1 ? "the slowest arm of the setting decides"
                                     : asked_by(x->arm->yield->view.arm->want));
    factor(x, "hours with empty target", bh_explain_number(x, hours * x->hours.share, "h"),
           bh_explain_text(x, "%s of the full-target time", percent(x, x->hours.share)));
    factor(
        x, "beam charge",
        bh_explain_number(x, bh_counting_charge(x->setting->beam.current.value, hours) * 1e3, "mC"),
        "current x hours with full target");
    factor(x, "counts", bh_explain_number(x, bh_counting_counts(p->signal, live, hours), ""),
           "signal rate x live fraction x 3600 x hours");
}

/* sigma^2 = (s + w + o) T + w T / (phi k): what each term gives. */
static void explain_variance(bh_explaining *x)
{
    const bh_recorded *r = &x->arm->recorded[x->bin];
    const bh_empty *e = &x->arm->empty;
    const double second = e->measured ? r->windows / (e->share * e->advantage) : 0;
    const double sum = r->signal + r->windows + r->other + second;
    const double stat = bh_precision_uncertainty(r, e, x->hours.full);
    bh_explain_section(x, "Statistical uncertainty");
    if (!(sum > 0) || !isfinite(stat))
        return;
    factor(x, "from signal counts", percent(x, r->signal / sum), "share of the variance");
    factor(x, "from windows", percent(x, r->windows / sum), "share of the variance");
    factor(x, "from background computed", percent(x, r->other / sum),
           "what no empty target measures: share of the variance");
    factor(x, "from the empty target", percent(x, second / sum),
           e->measured ? "share of the variance" : "background taken as known exactly");
    bh_explain_add(x, (bh_line){.kind = BH_LINE_FACTOR,
                                .name = "statistical uncertainty",
                                .value = percent(x, stat),
                                .formula = "sqrt((s + w + o) T + w T / phi) / (s T)",
                                .source = "Poisson statistics"});
    const double to_goal = bh_hours_to_goal(x->arm, x->bin);
    if (isfinite(to_goal))
        factor(x, "hours to goal", bh_explain_number(x, to_goal, "h"),
               "full-target hours that, with the empty share, reach the goal");
}

void bh_explain_time(bh_explaining *x)
{
    explain_hours(x);
    explain_variance(x);
}

const char *bh_assumption_at(size_t i)
{
    static const char *const silent[] = {
        "A point-like, parallel beam on the axis.",
        "The target covers the beam and is uniform.",
        "Atoms are at rest and nuclei spherical.",
        "One photon is exchanged; the beam is a plane wave.",
        "Other particles in the beam have its momentum and lose no energy in the target.",
        "Quasi-elastic and inelastic spectra are without radiation of their own.",
        "Excited levels of nuclei, pions and other hadrons, and decays are not counted.",
        "The vertices of background lose on their way out what the scatterer's do on the axis."};
    return i < sizeof silent / sizeof silent[0] ? silent[i] : NULL;
}

void bh_explain_assumptions(bh_explaining *x)
{
    const char *sentence;
    bh_explain_section(x, "Assumed without being asked");
    for (size_t i = 0; (sentence = bh_assumption_at(i)); i++)
        bh_explain_add(x, (bh_line){.kind = BH_LINE_NOTE, .remark = sentence});
    const char *note;
    for (size_t i = 0; (note = bh_table_note(x->table, i)); i++)
        bh_explain_add(x,
                       (bh_line){.kind = BH_LINE_NOTE, .remark = bh_explain_text(x, "%s", note)});
}
