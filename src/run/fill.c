/* fill.c - the cells of a row, in the units of their columns. */
#include <math.h>

#include "beamhours/run/evaluate.h"
#include "beamhours/units/constants.h"

static const double per_permille = 1e-3, msr = 1e-3, mev2_per_gev2 = 1e6, millicoulomb = 1e-3;

/* What a row is filled from. */
struct source {
    const bh_setting_hours *hours;
    const bh_arm_hours *arm;
    const bh_view *view;
    const bh_part *part;
    const bh_recorded *recorded;
};

/* The event of the most abundant isotope that brings the detected particle to the row's angle. */
static bool event_of(bh_yielder *yielder, const struct source *s, bh_event *event)
{
    const bh_struck *struck = &s->view->list->nuclides[s->view->list->main];
    bh_channels channels;
    bh_error ignored;
    if (bh_view_channels(yielder, s->view, struck, &channels, &ignored))
        return false;
    return s->part->angle <= bh_channel_largest_angle(&channels.list[0]) &&
           !bh_channel_event(&channels.list[0], s->part->angle, event, NULL);
}

static void put_event(const struct source *s, const bh_event *e, bh_row *row)
{
    const bool lepton = s->view->setting->beam.particle.kind == BH_KIND_LEPTON;
    bh_row_put(row, BH_COL_SCATTERED_ANGLE, e->scattered_angle / BH_DEGREE, BH_WHY_UNREACHED);
    bh_row_put(row, BH_COL_SCATTERED_KINETIC, e->scattered_kinetic, BH_WHY_UNREACHED);
    bh_row_put(row, BH_COL_SCATTERED_MOMENTUM, e->scattered_momentum, BH_WHY_UNREACHED);
    bh_row_put(row, BH_COL_RECOIL_KINETIC, e->recoil_kinetic, BH_WHY_UNREACHED);
    bh_row_put(row, BH_COL_RECOIL_ANGLE, e->recoil_angle / BH_DEGREE, BH_WHY_UNREACHED);
    bh_row_put(row, BH_COL_Q2, e->q2 / mev2_per_gev2, BH_WHY_UNREACHED);
    bh_row_put(row, BH_COL_Q, e->recoil_momentum / BH_HBARC, BH_WHY_UNREACHED);
    bh_row_put(row, BH_COL_EPSILON, lepton ? e->epsilon : (double)NAN,
               lepton ? BH_WHY_UNREACHED : BH_WHY_NOT_LEPTON);
}

static void put_kinematics(bh_yielder *yielder, const struct source *s, bh_row *row)
{
    const double kinetic = s->view->setting->beam.kinetic_energy.value;
    const double none = (double)NAN;
    bh_event event = {.scattered_angle = none,
                      .scattered_kinetic = none,
                      .scattered_momentum = none,
                      .recoil_kinetic = none,
                      .recoil_angle = none,
                      .recoil_momentum = none,
                      .q2 = none,
                      .epsilon = none};
    (void)event_of(yielder, s, &event); /* an event that is not leaves its cells empty */
    put_event(s, &event, row);
    bh_row_put(row, BH_COL_BIN, row->bin ? row->bin : none, BH_WHY_WHOLE_ARM);
    bh_row_put(row, BH_COL_BEAM_KINETIC, kinetic, BH_WHY_NOTHING);
    bh_row_put(row, BH_COL_VERTEX_KINETIC, s->view->vertex_kinetic, BH_WHY_NOTHING);
    bh_row_put(row, BH_COL_ANGLE, s->part->angle / BH_DEGREE, BH_WHY_EMPTY_BIN);
    bh_row_put(row, BH_COL_CENTRAL_MOMENTUM, s->view->central_momentum,
               s->view->stuck ? BH_WHY_STAYS_INSIDE : BH_WHY_UNREACHED);
}

/* A beam that does not come through makes no rate that could be computed. */
static void put_blocked(bh_row *row)
{
    static const bh_column_id empty[] = {BH_COL_VERTEX_KINETIC,
                                         BH_COL_POINT_CROSS_SECTION,
                                         BH_COL_CROSS_SECTION,
                                         BH_COL_SEEN,
                                         BH_COL_LUMINOSITY,
                                         BH_COL_KEPT,
                                         BH_COL_SIGNAL,
                                         BH_COL_BACKGROUND,
                                         BH_COL_LIVE,
                                         BH_COL_COUNTS,
                                         BH_COL_STATISTICAL,
                                         BH_COL_SYSTEMATIC,
                                         BH_COL_HOURS_TO_GOAL,
                                         BH_COL_CENTRAL_MOMENTUM,
                                         BH_COL_PER_MRAD,
                                         BH_COL_PER_PERMILLE,
                                         BH_COL_SCATTERED_ANGLE,
                                         BH_COL_SCATTERED_KINETIC,
                                         BH_COL_RECOIL_KINETIC,
                                         BH_COL_SCATTERED_MOMENTUM,
                                         BH_COL_RECOIL_ANGLE,
                                         BH_COL_Q2,
                                         BH_COL_Q,
                                         BH_COL_EPSILON};
    for (size_t i = 0; i < sizeof empty / sizeof empty[0]; i++)
        bh_row_put(row, empty[i], (double)NAN, BH_WHY_STOPPED);
}

static void put_rates(const struct source *s, bh_row *row)
{
    const bh_part *p = s->part;
    const bh_view *v = s->view;
    const double seen = s->arm->yield->seen;
    const bh_why none = v->without_changes ? BH_WHY_NOT_ASKED : BH_WHY_NO_EVENTS;
    const bh_why turn = v->arm->arm.shape == BH_SHAPE_RING ? BH_WHY_RING : none;
    bh_row_put(row, BH_COL_POINT_CROSS_SECTION, p->point_cross_section, BH_WHY_EMPTY_BIN);
    bh_row_put(row, BH_COL_CROSS_SECTION, p->cross_section, BH_WHY_EMPTY_BIN);
    bh_row_put(row, BH_COL_SOLID_ANGLE, p->solid_angle / msr, BH_WHY_EMPTY_BIN);
    bh_row_put(row, BH_COL_BEAM, v->beam, BH_WHY_NOTHING);
    bh_row_put(row, BH_COL_SEEN, seen, BH_WHY_NOTHING);
    bh_row_put(row, BH_COL_LUMINOSITY, v->beam * seen, BH_WHY_NOTHING);
    bh_row_put(row, BH_COL_RADIATIVE, p->radiative, BH_WHY_NO_EVENTS);
    bh_row_put(row, BH_COL_KEPT, p->kept, BH_WHY_NO_EVENTS);
    bh_row_put(row, BH_COL_EFFICIENCY, v->arm->arm.efficiency.value, BH_WHY_NOTHING);
    bh_row_put(row, BH_COL_SIGNAL, p->signal, BH_WHY_NO_EVENTS);
    bh_row_put(row, BH_COL_BACKGROUND, p->windows + p->other, BH_WHY_NO_EVENTS);
    bh_row_put(row, BH_COL_LIVE, s->arm->live.live_fraction, BH_WHY_NOTHING);
    bh_row_put(row, BH_COL_PER_MRAD, p->per_radian * 1e-3, turn);
    bh_row_put(row, BH_COL_PER_PERMILLE, p->per_momentum * per_permille, none);
}

/* Why there is no time, where there is none. */
static bh_why why_no_hours(const struct source *s)
{
    return s->hours->wanted ? BH_WHY_NO_SIGNAL : BH_WHY_NO_WANT;
}

static bh_why why_no_goal(const struct source *s)
{
    return s->view->arm->want == BH_WANT_GOAL ? BH_WHY_NO_SIGNAL : BH_WHY_NO_GOAL;
}

static void put_hours(const struct source *s, bh_row *row)
{
    const double hours = s->hours->full;
    const bh_why why = why_no_hours(s);
    const double current = s->view->setting->beam.current.value;
    bh_row_put(row, BH_COL_HOURS, hours, why);
    bh_row_put(row, BH_COL_EMPTY_HOURS, hours * s->hours->share, why);
    bh_row_put(row, BH_COL_CHARGE, bh_counting_charge(current, hours) / millicoulomb, why);
    bh_row_put(row, BH_COL_COUNTS,
               bh_counting_counts(s->part->signal, s->arm->live.live_fraction, hours), why);
    bh_row_put(row, BH_COL_STATISTICAL,
               bh_precision_uncertainty(s->recorded, &s->arm->empty, hours),
               isfinite(hours) ? BH_WHY_NO_SIGNAL : why);
    bh_row_put(row, BH_COL_HOURS_TO_GOAL, bh_hours_to_goal(s->arm, row->bin), why_no_goal(s));
}

void bh_row_fill(bh_yielder *yielder, const bh_setting_hours *hours, const bh_arm_hours *arm,
                 bh_row *row)
{
    const struct source s = {.hours = hours,
                             .arm = arm,
                             .view = &arm->yield->view,
                             .part = &arm->yield->part[row->bin],
                             .recorded = &arm->recorded[row->bin]};
    for (int c = 0; c < BH_COL_BIN; c++)
        bh_row_put(row, (bh_column_id)c, (double)NAN, BH_WHY_NOTHING);
    for (int c = BH_COL_PARTICLE; c <= BH_COL_SCATTERER; c++)
        bh_row_put(row, (bh_column_id)c, (double)NAN, BH_WHY_NOTHING);
    put_kinematics(yielder, &s, row);
    put_rates(&s, row);
    put_hours(&s, row);
    if (s.view->blocked)
        put_blocked(row);
}
