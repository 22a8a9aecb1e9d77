/* one_point.c - any two of energy, angle, q2 and epsilon fix an elastic event; the rest follows. */
#include "beamhours/run/one_point.h"

#include <math.h>
#include <stdio.h>
#include <string.h>

#include "beamhours/base/number.h"
#include "beamhours/base/sentences.h"
#include "beamhours/physics/kinematics.h"
#include "beamhours/physics/one_photon.h"
#include "beamhours/physics/process.h"
#include "beamhours/physics/radiative.h"
#include "beamhours/physics/validity.h"
#include "beamhours/run/columns.h"
#include "beamhours/run/event_search.h"
#include "beamhours/units/constants.h"
#include "beamhours/units/nuclide.h"

static void add(bh_single *out, const char *key, const char *unit, double value)
{
    if (out->count < BH_SINGLE_MOST)
        out->values[out->count++] = (bh_single_value){key, unit, value, NULL};
}

static void add_text(bh_single *out, const char *key, const char *text)
{
    if (out->count < BH_SINGLE_MOST)
        out->values[out->count++] = (bh_single_value){key, "", NAN, text};
}

static void add_column(bh_single *out, int id, double value)
{
    add(out, bh_column_at(id)->key, bh_column_at(id)->unit, value);
}

static void add_event(bh_single *out, const bh_single_request *r, const bh_event *e, double kinetic)
{
    const double degree = BH_DEGREE, gev2 = 1e6;
    add_column(out, BH_COL_BEAM_KINETIC, kinetic);
    add_column(out, BH_COL_ANGLE, (r->recoil ? e->recoil_angle : e->scattered_angle) / degree);
    add_column(out, BH_COL_SCATTERED_ANGLE, e->scattered_angle / degree);
    add_column(out, BH_COL_SCATTERED_KINETIC, e->scattered_kinetic);
    add_column(out, BH_COL_SCATTERED_MOMENTUM, e->scattered_momentum);
    add_column(out, BH_COL_RECOIL_KINETIC, e->recoil_kinetic);
    add_column(out, BH_COL_RECOIL_ANGLE, e->recoil_angle / degree);
    add_column(out, BH_COL_CENTRAL_MOMENTUM,
               r->recoil ? e->recoil_momentum : e->scattered_momentum);
    add_column(out, BH_COL_Q2, e->q2 / gev2);
    add_column(out, BH_COL_Q, e->recoil_momentum / BH_HBARC);
    if (r->beam.kind == BH_KIND_LEPTON)
        add_column(out, BH_COL_EPSILON, e->epsilon);
    add(out, "s_GeV2", "GeV2", e->s / gev2);
    add(out, "t_GeV2", "GeV2", e->t / gev2);
    add(out, "u_GeV2", "GeV2", e->u / gev2);
}

static void warn_range(bh_single *out, const bh_structure *structure, double q2)
{
    double lo = 0.0, hi = 0.0;
    bh_structure_range(structure, &lo, &hi);
    if (q2 / 1e6 < lo || q2 / 1e6 > hi)
        (void)snprintf(out->warning[0], sizeof out->warning[0],
                       "%s is fitted to data from Q2 %g to %g GeV2; this is at %.4g GeV2",
                       bh_structure_name(structure), lo, hi, q2 / 1e6);
    if (bh_structure_flagged(structure))
        (void)snprintf(out->warning[1], sizeof out->warning[1], "%s", bh_structure_note(structure));
}

static double beam_per_second(const bh_single_request *r)
{
    return r->current / (fabs((double)r->beam.charge) * BH_ELEMENTARY);
}

/* Nuclei of the struck kind, all isotopes of the material taken apart. */
static double nuclei_per_cm2(const bh_single_request *r)
{
    double share = 0.0;
    for (size_t i = 0; i < r->material->count; i++)
        if (r->material->parts[i].z == r->z && r->material->parts[i].a == r->a)
            share += r->material->parts[i].per_atom;
    return r->thickness * r->material->density / r->material->mean_atomic_mass * BH_AVOGADRO *
           share;
}

/* The models that a request names. */
typedef struct {
    const bh_process *process;
    const bh_radiative *radiative;
} bh_chosen;

static bh_code choose(const bh_single_request *r, bh_chosen *out, bh_error *err)
{
    const bool cut = r->energy_cut != 0.0;
    out->process = bh_process_find(r->process ? r->process : "elastic");
    out->radiative = bh_radiative_find(cut || r->radiative ? r->radiative : "none");
    if (!out->process)
        return bh_fail(err, BH_EDOMAIN, "no process \"%s\"; there is %s", r->process,
                       bh_process_at(0)->name);
    if (!out->radiative)
        return bh_fail(err, BH_EDOMAIN,
                       "no radiative correction \"%s\"; there are none, schwinger, mo-tsai and "
                       "maximon-tjon",
                       r->radiative);
    if (cut && !(r->energy_cut > 0.0))
        return bh_fail(err, BH_EDOMAIN, "an energy cut of %g MeV; it must be above 0 MeV",
                       r->energy_cut);
    if (!cut && out->radiative != bh_radiative_find("none"))
        return bh_fail(err, BH_EDOMAIN, "%s needs an energy cut, such as --energy-cut 10MeV",
                       out->radiative->name);
    return BH_OK;
}

/* Adds what the cut keeps and what that is made of, where radiation was asked for.  Returns the
 * factor. */
static double add_radiation(bh_single *out, const bh_single_request *r, const bh_radiative *model,
                            const bh_encounter *encounter, const bh_event *e)
{
    if (r->energy_cut == 0.0 && !r->radiative)
        return 1.0;
    const double cut = r->energy_cut;
    const bh_radiative_parts parts = model->parts(encounter, cut, e);
    double factor = 1.0;
    model->factor(encounter, cut, 1, e, &factor);
    add_text(out, "radiative", model->name);
    add(out, "radiative_factor_internal", "", factor);
    add(out, "delta_z0", "", parts.z0);
    add(out, "delta_z1", "", parts.z1);
    add(out, "delta_z2", "", parts.z2);
    add(out, "vacuum_polarisation", "", parts.vacuum);
    (void)model->caveat(encounter, cut, e, out->warning[3], sizeof out->warning[3]);
    char lost[BH_NUMBER_SIZE + 4];
    (void)snprintf(lost, sizeof lost, "%.4g MeV", cut);
    if (r->recoil && factor != 1.0)
        (void)snprintf(out->warning[4], sizeof out->warning[4], BH_WARN_RADIATIVE_RECOIL, lost);
    return factor;
}

static bh_code add_rate(bh_single *out, const bh_single_request *r, double cross_section,
                        bh_error *err)
{
    const bool any = r->current > 0.0 || r->material || r->thickness > 0.0 || r->solid_angle > 0.0;
    if (!any)
        return BH_OK;
    if (!(r->current > 0.0 && r->material && r->thickness > 0.0 && r->solid_angle > 0.0))
        return bh_fail(err, BH_EDOMAIN,
                       "a rate needs all of --current, --material, --thickness, --solid-angle");
    const double nuclei = nuclei_per_cm2(r), beam = beam_per_second(r);
    if (!(nuclei > 0.0))
        return bh_fail(err, BH_EDOMAIN, "there is no %s in %s", out->scatterer, r->material->name);
    add_column(out, BH_COL_BEAM, beam);
    add_column(out, BH_COL_SEEN, nuclei);
    add_column(out, BH_COL_LUMINOSITY, beam * nuclei);
    add_column(out, BH_COL_SOLID_ANGLE, r->solid_angle * 1e3);
    add_column(out, BH_COL_SIGNAL, beam * nuclei * 1e-30 * cross_section * r->solid_angle);
    return BH_OK;
}

/* Returns [ub/sr] the cross section that counts: of the detected particle, what the cut keeps. */
static double add_cross_sections(bh_single *out, const bh_single_request *r,
                                 const bh_chosen *chosen, const bh_encounter *encounter,
                                 const bh_event *e)
{
    const bh_collision in = {r->beam.mass, encounter->target, encounter->kinetic};
    const int charges = encounter->charge * encounter->z;
    double sigma = 0.0;
    chosen->process->cross_section(encounter, 1, e, &sigma);
    const double detected = r->recoil ? sigma * e->scattered_per_recoil : sigma;
    add_column(out, BH_COL_POINT_CROSS_SECTION, detected);
    if (r->beam.kind == BH_KIND_LEPTON)
        add(out, "mott_cross_section_ub_per_sr", "ub/sr", bh_mott(&in, e, charges));
    add(out, "rutherford_cross_section_ub_per_sr", "ub/sr", bh_rutherford(&in, e, charges));
    (void)snprintf(out->formula, sizeof out->formula, "%s", chosen->process->formula(encounter));
    (void)snprintf(out->source, sizeof out->source, "%s", chosen->process->source);
    (void)snprintf(out->structure_source, sizeof out->structure_source, "%s",
                   bh_structure_source(encounter->structure));
    warn_range(out, encounter->structure, e->q2);
    (void)chosen->process->caveat(encounter, out->warning[2], sizeof out->warning[2]);
    return detected * add_radiation(out, r, chosen->radiative, encounter, e);
}

/* As in the run table: who is too slow to reach the nucleus meets its charge as a point. */
static const char *model_for(const bh_single_request *r, const bh_encounter *e)
{
    const bool unnamed = !r->structure || strcmp(r->structure, "default") == 0;
    const bool outside =
        r->beam.kind != BH_KIND_LEPTON && e->kinetic < bh_validity_nuclear(e).kinetic;
    return unnamed && outside ? "point" : r->structure;
}

static bh_code with_structure(const bh_single_request *r, const bh_chosen *chosen,
                              bh_encounter *encounter, bh_single *out, bh_error *err)
{
    const bh_collision collision = {r->beam.mass, encounter->target, r->kinetic};
    const bh_known known = {r->kinetic, r->angle, r->q2, r->epsilon, r->recoil};
    bh_event event;
    const bh_code bad = bh_event_search(&collision, &known, &encounter->kinetic, &event, err);
    if (bad)
        return bad;
    encounter->angle = event.scattered_angle;
    bh_structure *structure = bh_structure_new(model_for(r, encounter), r->z, r->a, err);
    if (!structure)
        return err ? err->code : BH_EDOMAIN;
    encounter->structure = structure;
    (void)snprintf(out->structure, sizeof out->structure, "%s", bh_structure_name(structure));
    add_text(out, "structure", out->structure);
    add_event(out, r, &event, encounter->kinetic);
    const double counts = add_cross_sections(out, r, chosen, encounter, &event);
    bh_structure_free(structure);
    return add_rate(out, r, counts, err);
}

bh_code bh_single_compute(const bh_single_request *request, bh_single *out, bh_error *err)
{
    const bh_nuclide *nuclide = bh_nuclide_find(request->z, request->a);
    bh_chosen chosen;
    *out = (bh_single){.count = 0};
    if (!nuclide)
        return bh_fail(err, BH_EDOMAIN, "no nuclide with Z = %d, A = %d in the table of masses",
                       request->z, request->a);
    const bh_code bad = choose(request, &chosen, err);
    if (bad)
        return bad;
    (void)bh_nuclide_name(request->z, request->a, out->scatterer);
    add_text(out, "particle", request->beam.name);
    add_text(out, "scatterer", out->scatterer);
    add_text(out, "process", chosen.process->name);
    bh_encounter encounter = {.beam = &request->beam,
                              .charge = request->beam.charge,
                              .z = request->z,
                              .a = request->a,
                              .target = nuclide->mass};
    return with_structure(request, &chosen, &encounter, out, err);
}
