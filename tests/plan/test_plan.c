/* test_plan.c - plans become the typed values that they say. */
#include "../suite.h"

#include <math.h>

#include "beamhours/units/constants.h"
#include "reading.h"

#define HEAD    \
    "plan: 1\n" \
    "beam: {particle: electron, kinetic_energy: 855 MeV, current: 20 uA}\n"
#define TARGET "target: {layers: [{material: liquid-hydrogen, thickness: 50 mm}]}\n"
#define ARM    "arms: [{name: A, in_plane: ±28 mrad, out_of_plane: ±70 mrad}]\n"
#define TWO    "arms: [{name: A, solid_angle: 1 msr}, {name: B, solid_angle: 2 msr, prescale: 7}]\n"
#define FIXED \
    "arms: [{name: A, solid_angle: 1 msr}, {name: M, solid_angle: 2 msr, angle: 40 deg}]\n"
#define RINGS "arms: [{name: R, ring: {from: 20 deg, to: 40 deg}, bins: 4}]\n"
#define ONE   "settings: [{name: K1, angle: 30 deg, goal: 1 %}]\n"

static struct read good(const char *text)
{
    struct read r = read_text(text, NULL, 0);
    if (!r.plan)
        read_print(&r);
    ck_assert_msg(r.plan != NULL, "no plan from:\n%s", text);
    return r;
}

static void same(double got, double want, const char *what)
{
    ck_assert_msg(fabs(got - want) <= 1e-12 * fabs(want), "%s: %.17g, want %.17g", what, got, want);
}

/* --- energies, currents and rates --- */

static const struct {
    const char *beam;
    double kinetic, rate, current; /* MeV, /s, A */
} beams[] = {
    {"particle: electron, kinetic_energy: 855 MeV, current: 20 uA", 855.0, 20e-6 / BH_ELEMENTARY,
     20e-6},
    {"particle: electron, total_energy: 855 MeV, current: 20 uA", 855.0 - BH_MASS_ELECTRON,
     20e-6 / BH_ELEMENTARY, 20e-6},
    /* sqrt(170^2 + m^2) - m with the muon mass of CODATA 2022, by a general-purpose library */
    {"particle: muon-, momentum: 170 MeV/c, particle_rate: 3e5 /s", 94.50079194755659, 3e5,
     3e5 * BH_ELEMENTARY},
    {"particle: proton, momentum: 1 keV/c, particle_rate: 1 /s", 5.3289467190e-10, 1.0,
     BH_ELEMENTARY},
    {"particle: 12C, kinetic_energy: 100 MeV/u, current: 6 nA", 1200.0, 1e-9 / BH_ELEMENTARY, 6e-9},
    {"particle: 12C, charge: 4, kinetic_energy: 100 MeV/u, current: 4 nA", 1200.0,
     1e-9 / BH_ELEMENTARY, 4e-9},
    {"particle: alpha, kinetic_energy: 5 MeV, particle_rate: 2.5e3 /s", 5.0, 2.5e3,
     5e3 * BH_ELEMENTARY},
    /* half the particles carry two charges */
    {"particle: proton, kinetic_energy: 90 MeV, current: 15 nA, fraction: 50 %, others: {alpha: 50 "
     "%}",
     90.0, 1e-8 / BH_ELEMENTARY, 15e-9},
};

START_TEST(beams_in_every_unit)
{
    char text[900];
    snprintf(text, sizeof text, "plan: 1\nbeam: {%s}\n%s", beams[_i].beam, TARGET ARM ONE);
    struct read r = read_text(text, NULL, 0);
    if (beams[_i].kinetic < 1e-3) { /* too slow to compute, yet converted without cancelling */
        ck_assert_ptr_null(r.plan);
        read_free(&r);
        return;
    }
    const bool heavy = strstr(beams[_i].beam, "12C") || strstr(beams[_i].beam, "alpha, k");
    if (heavy) { /* 30 degrees cannot be reached on hydrogen */
        read_free(&r);
        snprintf(text, sizeof text, "plan: 1\nbeam: {%s}\n%s", beams[_i].beam,
                 "target: {layers: [{material: gold, thickness: 1 um}]}\n" ARM ONE);
        r = read_text(text, NULL, 0);
    }
    ck_assert_msg(r.plan != NULL, "%s", beams[_i].beam);
    same(r.plan->beam.kinetic_energy.value, beams[_i].kinetic, beams[_i].beam);
    same(r.plan->beam.particle_rate.value, beams[_i].rate, beams[_i].beam);
    same(r.plan->beam.current.value, beams[_i].current, beams[_i].beam);
    ck_assert(r.plan->beam.current.given != r.plan->beam.particle_rate.given);
    read_free(&r);
}
END_TEST

START_TEST(uncertainties_follow)
{
    struct read r = good(
        "plan: 1\n"
        "beam: {particle: muon-, momentum: 170 ± 1 MeV/c, current: 20 uA ± 1 %}\n" TARGET ARM ONE);
    /* dT = beta dp */
    same(r.plan->beam.kinetic_energy.uncertainty, 170.0 / hypot(170.0, BH_MASS_MUON), "dT");
    same(r.plan->beam.current.uncertainty, 0.2e-6, "dI");
    same(r.plan->beam.particle_rate.uncertainty, 0.2e-6 / BH_ELEMENTARY, "dN");
    ck_assert_int_eq(r.plan->beam.kinetic_energy.at.line, 2);
    ck_assert_int_eq(r.plan->beam.kinetic_energy.at.column, 35);
    read_free(&r);
}
END_TEST

/* --- layers --- */

static const struct {
    const char *layer;
    double density, areal; /* g/cm3, g/cm2 */
} layers[] = {
    {"material: graphite, density: 2 g/cm3, thickness: 1 mm", 2.0, 0.2},
    {"material: graphite, density: 2 g/cm3, areal_density: 200 mg/cm2", 2.0, 0.2},
    {"material: graphite, density: 2000 kg/m3, areal_density: 2 kg/m2", 2.0, 0.2},
};

START_TEST(layers_in_every_size)
{
    char text[600];
    snprintf(text, sizeof text, HEAD "target: {layers: [{%s}]}\n%s", layers[_i].layer, ARM ONE);
    struct read r = good(text);
    const bh_layer *layer = &r.plan->targets[0].layers[0];
    same(layer->density.value, layers[_i].density, "density");
    same(layer->areal_density.value, layers[_i].areal, "areal density");
    same(layer->thickness.value, layers[_i].areal / layers[_i].density, "thickness");
    same(layer->areal_number.value,
         layers[_i].areal * BH_AVOGADRO / layer->material->mean_atomic_mass, "number");
    ck_assert_str_eq(r.plan->targets[0].name.text, "graphite");
    ck_assert_str_eq(r.plan->targets[0].scatterer.text, "C");
    ck_assert_int_eq(r.plan->targets[0].scatterer_a, 0);
    read_free(&r);
}
END_TEST

START_TEST(layers_by_atoms)
{
    struct read r = good(HEAD "target: {layers: [{material: hydrogen-gas, areal_number: 1.6e18 "
                              "/cm2}]}\n" ARM ONE);
    const bh_layer *layer = &r.plan->targets[0].layers[0];
    same(layer->areal_number.value, 1.6e18, "number");
    same(layer->areal_density.value, 1.6e18 * layer->material->mean_atomic_mass / BH_AVOGADRO,
         "areal density");
    ck_assert_str_eq(layer->size_key.text, "areal_number");
    read_free(&r);
}
END_TEST

START_TEST(gas_and_vacuum)
{
    struct read r = good(
        HEAD
        "target: {layers: [{material: vacuum}, {material: vacuum, thickness: 10 cm},\n"
        " {material: helium-gas, thickness: 10 cm, temperature: 300 K, pressure: 2 bar}]}\n" ARM
            ONE);
    const bh_layer *layer = r.plan->targets[0].layers;
    ck_assert(layer[0].thickness.value == 0.0 && layer[0].areal_density.value == 0.0);
    same(layer[1].thickness.value, 10.0, "vacuum");
    /* p M / R T, helium 4.002602 g/mol */
    same(round(layer[2].density.value / (2e5 * 4.002602 / (BH_BOLTZMANN_R * 300.0) * 1e-6) * 1e5),
         1e5, "density of the gas");
    read_free(&r);
}
END_TEST

START_TEST(scatterers)
{
    struct read r =
        good(HEAD "targets:\n"
                  " - {name: a, layers: [{material: polyethylene, thickness: 1 mm}], scatterer: "
                  "12C}\n"
                  " - {name: b, layers: [{material: polyethylene, thickness: 1 mm}], scatterer: H,"
                  " empty_target: {share: best, use: a}, tilt: -10 deg}\n" ARM
                  "settings: [{angle: 30 deg, target: a}, {angle: 30 deg, target: b}]\n");
    ck_assert_int_eq(r.plan->targets[0].scatterer_z, 6);
    ck_assert_int_eq(r.plan->targets[0].scatterer_a, 12);
    ck_assert_int_eq(r.plan->targets[1].scatterer_z, 1);
    ck_assert_int_eq(r.plan->targets[1].scatterer_a, 0);
    ck_assert_int_eq(r.plan->targets[0].empty, BH_EMPTY_NONE);
    ck_assert_int_eq(r.plan->targets[1].empty, BH_EMPTY_BEST);
    ck_assert_ptr_eq(r.plan->targets[1].empty_use, &r.plan->targets[0]);
    same(r.plan->settings[1].tilt.value, -10.0 * BH_DEGREE, "tilt");
    ck_assert_str_eq(r.plan->settings[0].name, "1");
    ck_assert_str_eq(r.plan->settings[1].name, "2");
    read_free(&r);
}
END_TEST

/* --- settings: names and angles after sweeps and with several arms --- */

static const struct {
    const char *arms, *settings;
    const char *wanted; /* setting/arm/angle in degrees/want, a blank between rows */
} sweeps[] = {
    {ARM, "settings: [{name: K1, angle: 30 deg}]", "K1/A/30/0"},
    {ARM, "settings: [{name: K1, angle: [20 deg, 25 deg], goal: 1 %}]", "K1.1/A/20/1 K1.2/A/25/1"},
    {ARM, "settings: [{name: K, angle: [20 deg]}]", "K.1/A/20/0"},
    {ARM, "settings: [{name: K, angle: {from: 30 deg, to: 60 deg, step: 10 deg}}]",
     "K.1/A/30/0 K.2/A/40/0 K.3/A/50/0 K.4/A/60/0"},
    {ARM, "settings: [{name: K, angle: {from: 60 deg, to: 30 deg, step: -15 deg}}]",
     "K.1/A/60/0 K.2/A/45/0 K.3/A/30/0"},
    {ARM, "settings: [{name: K, angle: {from: 20 deg, to: 40 deg, count: 3}}]",
     "K.1/A/20/0 K.2/A/30/0 K.3/A/40/0"},
    {ARM, "settings: [{name: K, angle: {from: 0.1 deg, to: 0.7 deg, step: 0.2 deg}}]", NULL},
    {ARM, "every_setting: {time: 2 h}\nsettings: [{angle: 30 deg}, {angle: 31 deg, counts: 9}]",
     "1/A/30/2 2/A/31/4"},
    {ARM, "every_setting: {angle: 33 deg}\nsettings: [{name: K, charge: 1 C}]", "K/A/33/3"},
    {TWO, "settings: [{name: K, arm: B, angle: 30 deg}]", "K/B/30/0"},
    {TWO, "every_setting: {arm: B}\nsettings: [{name: K, angle: 30 deg}]", "K/B/30/0"},
    {TWO,
     "every_setting: {arm: B, goal: 1 %}\n"
     "settings: [{name: K, arms: [{arm: A, angle: 30 deg, time: 1 h}, {arm: B, angle: 40 deg}]}]",
     "K/A/30/2 K/B/40/1"},
    {TWO, "settings: [{name: K, angle: [30 deg, 40 deg], arms: [{arm: A}, {arm: B}]}]",
     "K.1/A/30/0 K.1/B/30/0 K.2/A/40/0 K.2/B/40/0"},
    {TWO,
     "settings: [{name: K, arms: [{arm: A, angle: [30 deg, 40 deg]}, {arm: B, angle: 50 deg}]}]",
     "K.1/A/30/0 K.1/B/50/0 K.2/A/40/0 K.2/B/50/0"},
    {FIXED, "settings: [{name: K, angle: 30 deg, goal: 1 %}]", "K/A/30/1 K/M/40/0"},
    {FIXED, "settings: [{name: K, arms: [{arm: M, goal: 2 %}, {arm: A, angle: 30 deg}]}]",
     "K/M/40/1 K/A/30/0"},
    {FIXED, "settings: [{name: K, arm: M, goal: 2 %}]", "K/M/40/1"},
    {RINGS, "settings: [{name: K, goal: 2 %}]", "K/R/0/1"},
    {ARM, "settings: [{name: K, angle: 30 deg, beam: {current: [1 uA, 2 uA]}}]",
     "K.1/A/30/0 K.2/A/30/0"},
    {ARM,
     "settings: [{name: K, angle: 30 deg, beam: {momentum: {from: 300 MeV/c, to: 1 GeV/c,"
     " count: 2}}}]",
     "K.1/A/30/0 K.2/A/30/0"},
};

START_TEST(settings_after_sweeps)
{
    char text[1200], got[500] = "";
    snprintf(text, sizeof text, HEAD TARGET "%s%s\n", sweeps[_i].arms, sweeps[_i].settings);
    struct read r = read_text(text, NULL, 0);
    if (!sweeps[_i].wanted) { /* overlaps the beam; the steps themselves are whole */
        ck_assert_ptr_null(r.plan);
        read_free(&r);
        return;
    }
    if (!r.plan)
        read_print(&r);
    ck_assert_msg(r.plan != NULL, "%s", sweeps[_i].settings);
    for (size_t i = 0; i < r.plan->setting_count; i++)
        for (size_t k = 0; k < r.plan->settings[i].arm_count; k++) {
            const bh_setting_arm *row = &r.plan->settings[i].arms[k];
            const size_t used = strlen(got);
            snprintf(got + used, sizeof got - used, "%s%s/%s/%.12g/%d", used ? " " : "",
                     r.plan->settings[i].name, row->arm.name.text, row->angle.value / BH_DEGREE,
                     (int)row->want);
        }
    ck_assert_str_eq(got, sweeps[_i].wanted);
    read_free(&r);
}
END_TEST

START_TEST(beam_of_a_setting)
{
    struct read r = good(
        "plan: 1\n"
        "beam: {particle: electron, kinetic_energy: 855 MeV, current: 20 uA, polarisation: 10 %,\n"
        "  limits: {current: 100 uA, power: 50 kW}}\n" TARGET ARM
        "every_setting: {beam: {current: 10 uA}}\n"
        "settings:\n"
        "  - {angle: 30 deg}\n"
        "  - {angle: 30 deg, beam: {particle: positron, total_energy: 600 MeV}}\n"
        "  - {angle: 30 deg, beam: {particle_rate: 1e12 /s, limits: {power: 1 kW}}}\n");
    const bh_setting *s = r.plan->settings;
    same(s[0].beam.current.value, 10e-6, "current of every setting");
    same(s[0].beam.kinetic_energy.value, 855.0, "energy of the plan");
    ck_assert_str_eq(s[1].beam.particle.name, "positron");
    same(s[1].beam.kinetic_energy.value, 600.0 - BH_MASS_ELECTRON, "energy of the setting");
    same(s[1].beam.current.value, 10e-6, "current");
    ck_assert_str_eq(s[1].beam.energy_key.text, "total_energy");
    same(s[2].beam.particle_rate.value, 1e12, "rate");
    ck_assert(s[2].beam.rate_written);
    same(s[2].beam.limit_power.value, 1e3, "one limit replaced");
    same(s[2].beam.limit_current.value, 100e-6, "the other kept");
    same(s[2].beam.polarisation.value, 0.1, "polarisation");
    same(r.plan->beam.current.value, 20e-6, "the plan's own");
    read_free(&r);
}
END_TEST

START_TEST(angle_from_q2)
{
    static const char *const detects[] = {"scattered", "recoil"};
    char text[700];
    snprintf(text, sizeof text,
             HEAD TARGET "arms: [{name: A, solid_angle: 1 msr, detects: %s}]\n"
                         "settings: [{name: K, q2: 0.6 GeV2}]\n",
             detects[_i]);
    struct read r = good(text);
    /* Elastic kinematics with E = 855.511 MeV, by hand: cos from Q2 = 2 (E E' - p p' cos - m^2) */
    const double m = BH_MASS_ELECTRON, M = BH_MASS_PROTON, E = 855.0 + m, Q2 = 0.6e6;
    const double e = E - Q2 / (2.0 * M), p = sqrt(E * E - m * m), q = sqrt(e * e - m * m);
    const double cosine = (E * e - m * m - Q2 / 2.0) / (p * q);
    const double P = sqrt((E - e) * (E - e + 2.0 * M));
    const double recoil = acos((p - q * cosine) / P);
    const double angle = r.plan->settings[0].arms[0].angle.value;
    ck_assert_double_eq_tol(angle, _i ? recoil : acos(cosine), 1e-7);
    same(r.plan->settings[0].arms[0].q2.value, Q2, "q2");
    read_free(&r);
}
END_TEST

START_TEST(arms_in_full)
{
    struct read r = good(
        HEAD TARGET
        "arms:\n"
        "  - {name: A, side: left, detects: either, in_plane: {from: -20 mrad, to: 30 mrad},\n"
        "     out_of_plane: ±70 mrad, solid_angle: 6 msr, edges: [29 deg, 30 deg, 31.5 deg],\n"
        "     angle_range: {from: 10 deg, to: 110 deg}, momentum_bite: ±5 %, target_view: ±5 cm,\n"
        "     dead_time: 5 us, dead_time_model: paralyzable, rate_limit: 4 kHz, prescale: 3,\n"
        "     other_rate: 10 Hz, efficiency: 95 %}\n"
        "settings: [{arms: [{arm: A, angle: 30 deg, prescale: 10, goal: 1 %, goal_for: each-bin,\n"
        "  central_momentum: 700 MeV/c}]}]\n");
    const bh_arm *arm = &r.plan->arms[0];
    ck_assert_int_eq(arm->side, BH_SIDE_LEFT);
    ck_assert_int_eq(arm->detects, BH_DETECTS_EITHER);
    ck_assert_int_eq(arm->shape, BH_SHAPE_RECTANGLE);
    ck_assert_int_eq(arm->dead_time_model, BH_DEAD_PARALYSABLE);
    ck_assert_int_eq(arm->bins, 2);
    same(arm->edges[2], 31.5 * BH_DEGREE, "edge");
    same(arm->in_plane.to, 0.03, "in_plane");
    same(arm->out_of_plane.from, -0.07, "out_of_plane");
    same(arm->solid_angle.value, 6e-3, "solid angle");
    same(arm->momentum_bite.from, -0.05, "bite");
    same(arm->target_view.to, 5.0, "view");
    same(arm->dead_time.value, 5e-6, "dead time");
    same(arm->rate_limit.value, 4e3, "rate limit");
    same(arm->efficiency.value, 0.95, "efficiency");
    ck_assert_int_eq(arm->prescale, 3);
    const bh_setting_arm *row = &r.plan->settings[0].arms[0];
    ck_assert_int_eq(row->arm.prescale, 10);
    ck_assert(row->each_bin);
    same(row->central_momentum.value, 700.0, "central momentum");
    read_free(&r);
}
END_TEST

START_TEST(defaults)
{
    struct read r = good(HEAD TARGET "arms: [{name: A, solid_angle: 6 msr}]\n" ONE);
    const bh_plan *p = r.plan;
    const bh_arm *arm = &p->arms[0];
    ck_assert(arm->side == BH_SIDE_RIGHT && arm->detects == BH_DETECTS_SCATTERED);
    ck_assert(arm->shape == BH_SHAPE_POINT && arm->bins == 1 && arm->prescale == 1);
    ck_assert(arm->efficiency.value == 1.0 && arm->dead_time.value == 0.0 && !arm->angle.given);
    ck_assert(!arm->momentum_bite.given && !arm->rate_limit.given && arm->other_rate.value == 0.0);
    ck_assert(p->beam.fraction.value == 1.0 && p->beam.duty_factor.value == 1.0);
    ck_assert_str_eq(p->models.process.text, "elastic");
    ck_assert_str_eq(p->models.structure.text, "default");
    ck_assert_str_eq(p->models.radiative.text, "default");
    ck_assert_str_eq(p->models.energy_loss.text, "full");
    ck_assert(!p->schedule.given && p->schedule.availability.value == 1.0);
    same(p->schedule.shift.value, 8.0 * 3600.0, "shift");
    same(p->schedule.week.value, 168.0 * 3600.0, "week");
    ck_assert_uint_eq(bh_diags_count(r.diags), 0);
    read_free(&r);
}
END_TEST

START_TEST(schedules)
{
    struct read r = good(HEAD TARGET ARM ONE "schedule:\n"
                                             "  available: 14 d\n"
                                             "  available_as: beam\n"
                                             "  changes: {energy: 8 h, angle: 30 min}\n"
                                             "  tasks:\n"
                                             "    - {name: optics, time: 8 h, every: energy}\n"
                                             "    - {name: a survey, time: 16 h, beam: none}\n"
                                             "    - {name: cooling, time: 1 h, every: 5 d}\n");
    const bh_schedule *s = &r.plan->schedule;
    ck_assert(s->given && s->available_is_beam);
    same(s->available.value, 14.0 * 86400.0, "available");
    same(s->change_energy.value, 8.0 * 3600.0, "energy");
    same(s->change_angle.value, 1800.0, "angle");
    ck_assert(s->change_target.value == 0.0 && !s->change_target.given);
    ck_assert_uint_eq(s->task_count, 3);
    ck_assert_int_eq(s->tasks[0].every, BH_EVERY_ENERGY);
    ck_assert(s->tasks[0].needs_beam && !s->tasks[1].needs_beam);
    ck_assert_int_eq(s->tasks[1].every, BH_EVERY_ONCE);
    ck_assert_int_eq(s->tasks[2].every, BH_EVERY_TIME);
    same(s->tasks[2].period.value, 5.0 * 86400.0, "period");
    read_free(&r);
}
END_TEST

START_TEST(structure_by_nuclide)
{
    struct read r = good(HEAD TARGET ARM ONE "models: {structure: {1H: kelly-2004, C: helm}}\n");
    ck_assert_str_eq(bh_plan_structure(r.plan, 1, 1), "kelly-2004");
    ck_assert_str_eq(bh_plan_structure(r.plan, 6, 12), "helm");
    ck_assert_str_eq(bh_plan_structure(r.plan, 6, 13), "helm");
    ck_assert_str_eq(bh_plan_structure(r.plan, 13, 27), "default");
    read_free(&r);
    r = good(HEAD TARGET ARM ONE "models: {structure: kelly-2004}\n");
    ck_assert_str_eq(bh_plan_structure(r.plan, 1, 1), "kelly-2004");
    ck_assert_str_eq(bh_plan_structure(r.plan, 13, 27), "default"); /* windows */
    read_free(&r);
}
END_TEST

/* --- warnings --- */

static const struct {
    const char *text;
    const char *key; /* NULL: no warning */
} warnings[] = {
    {HEAD
     "target: {layers: [{material: liquid-hydrogen, density: 0.0723 g/cm3, thickness: 5 cm}]}\n" ARM
         ONE,
     NULL},
    {HEAD "target: {layers: [{material: graphite, density: 1 g/cm3, thickness: 5 mm}]}\n" ARM ONE,
     "target.layers.1.density"},
    {HEAD "target: {layers: [{material: helium-gas, density: 1 kg/m3, thickness: 5 mm}]}\n" ARM ONE,
     NULL},
    {HEAD
     "target: {layers: [{material: graphite, thickness: 5 mm, density_loss: 0.1 %/uA}]}\n" ARM ONE,
     NULL},
    {HEAD
     "target: {layers: [{material: graphite, thickness: 5 mm, density_loss: 0 %/uA}]}\n" ARM ONE,
     NULL},
    {HEAD TARGET "arms: [{name: A, solid_angle: 1 msr, pointing: 0 ± 0.2 mrad}]\n" ONE, NULL},
    {HEAD TARGET "arms: [{name: A, solid_angle: 1 msr, threshold: 0 MeV}]\n" ONE, NULL},
    {HEAD TARGET "arms: [{name: A, solid_angle: 1 msr, energy_cut: 15 MeV}]\n" ONE, NULL},
    {HEAD TARGET
     "arms: [{name: A, solid_angle: 1 msr, exit: [{material: air, thickness: 1 m}]}]\n" ONE,
     NULL},
    {HEAD TARGET ARM ONE "models: {radiative: schwinger}\n", NULL},
    {HEAD TARGET ARM ONE "models: {radiative: none, coulomb: plane-wave, energy_loss: none}\n",
     NULL},
    {HEAD TARGET ARM ONE "models: {energy_loss: full}\n", NULL},
    {HEAD TARGET ARM "settings: [{name: K, angle: 30 deg, beam: {polarization: 80 %}}]\n",
     "settings.K.beam.polarisation"},
    {HEAD TARGET ARM "settings: [{name: K, angle: 30 deg, beam: {polarisation: 0 %}}]\n", NULL},
    {HEAD "target: {layers: [{material: graphite, thickness: 5 mm}],\n"
          "  wall: {radius: 3 cm, material: aluminium, thickness: 1 mm}}\n" ARM ONE,
     NULL},
};

START_TEST(warnings_for_what_is_not_computed)
{
    struct read r = good(warnings[_i].text);
    const size_t n = bh_diags_count(r.diags);
    const char *key = n ? bh_diags_at(r.diags, 0)->key : NULL;
    ck_assert_uint_eq(n, warnings[_i].key ? 1 : 0);
    if (warnings[_i].key)
        ck_assert_str_eq(key, warnings[_i].key);
    read_free(&r);
}
END_TEST

/* --- changes for one run --- */

static const struct {
    const char *path, *yaml;
    double angle, q2, kinetic, areal; /* deg, MeV2, MeV, g/cm2: -1 whatever */
} changes[] = {
    {"settings.K1.angle", "27 deg", 27.0, 0.0, 855.0, -1.0},
    {"settings.1.angle", "27 deg", 27.0, 0.0, 855.0, -1.0},
    {"settings.K1.q2", "0.1 GeV2", -1.0, 0.1e6, 855.0, -1.0},
    {"beam.total_energy", "855 MeV", 30.0, 0.0, 855.0 - BH_MASS_ELECTRON, -1.0},
    {"target.layers.1.areal_density", "0.5 g/cm2", 30.0, 0.0, 855.0, 0.5},
    {"settings.K1.beam", "{kinetic_energy: 500 MeV}", 30.0, 0.0, 500.0, -1.0},
};

START_TEST(changes_replace_their_group)
{
    const bh_change change = {changes[_i].path, changes[_i].yaml};
    struct read r = read_text(HEAD TARGET ARM ONE, &change, 1);
    if (!r.plan)
        read_print(&r);
    ck_assert_msg(r.plan != NULL, "%s=%s", change.path, change.yaml);
    const bh_setting *s = &r.plan->settings[0];
    if (changes[_i].angle >= 0.0)
        same(s->arms[0].angle.value, changes[_i].angle * BH_DEGREE, "angle");
    same(s->arms[0].q2.value, changes[_i].q2, "q2");
    same(s->beam.kinetic_energy.value, changes[_i].kinetic, "energy");
    if (changes[_i].areal >= 0.0)
        same(s->target->layers[0].areal_density.value, changes[_i].areal, "areal density");
    read_free(&r);
}
END_TEST

/* --- limits --- */

START_TEST(largest_plan)
{
    struct read r = good(HEAD TARGET "arms: [{name: A, in_plane: ±28 mrad, out_of_plane: ±70 mrad, "
                                     "bins: 100}]\n"
                                     "settings: [{name: K, angle: {from: 20 deg, to: 60 deg, "
                                     "count: 10000}}]\n");
    ck_assert_uint_eq(r.plan->setting_count, 10000);
    ck_assert_str_eq(r.plan->settings[9999].name, "K.10000");
    same(r.plan->settings[9999].arms[0].angle.value, 60.0 * BH_DEGREE, "last angle");
    read_free(&r);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("plan");
    tcase_add_loop_test(tests, beams_in_every_unit, 0, COUNT(beams));
    tcase_add_test(tests, uncertainties_follow);
    tcase_add_loop_test(tests, layers_in_every_size, 0, COUNT(layers));
    tcase_add_test(tests, layers_by_atoms);
    tcase_add_test(tests, gas_and_vacuum);
    tcase_add_test(tests, scatterers);
    tcase_add_loop_test(tests, settings_after_sweeps, 0, COUNT(sweeps));
    tcase_add_test(tests, beam_of_a_setting);
    tcase_add_loop_test(tests, angle_from_q2, 0, 2);
    tcase_add_test(tests, arms_in_full);
    tcase_add_test(tests, defaults);
    tcase_add_test(tests, schedules);
    tcase_add_test(tests, structure_by_nuclide);
    tcase_add_loop_test(tests, warnings_for_what_is_not_computed, 0, COUNT(warnings));
    tcase_add_loop_test(tests, changes_replace_their_group, 0, COUNT(changes));
    tcase_add_test(tests, largest_plan);
    return run_suite("plan", tests);
}
