/* test_depth.c - run tables where beam and detected particle lose energy. */
#include "evaluated.h"

#include <gsl/gsl_integration.h>

#include "beamhours/matter/range.h"
#include "beamhours/physics/kinematics.h"
#include "beamhours/run/workspace.h"
#include "beamhours/units/constants.h"

enum { TEXT = 2048 };

/* --- the mean over depth against adaptive integration --- */

static const struct {
    const char *particle, *material, *scatterer;
    double kinetic, areal, angle; /* MeV, g/cm2, deg */
} means[] = {
    {"electron", "liquid-hydrogen", "1H", 100, 2, 60},
    {"electron", "carbon-12", "12C", 400, 1, 40}, /* steep form factor */
    {"proton", "carbon-12", "12C", 20, 0.1, 50},  /* a third of the energy */
    {"alpha", "gold", "Au", 5, 2e-3, 150},        /* a tenth */
    {"alpha", "gold", "Au", 5, 12e-3, 150},       /* most of it */
};

struct depth {
    int row;
    const bh_range *range;
};

static void write_plan(char *text, int row, double kinetic, const char *areal, const char *loss)
{
    snprintf(text, TEXT,
             "plan: 1\nbeam: {particle: %s, kinetic_energy: %.17g MeV, particle_rate: 1e6 /s}\n"
             "models: {energy_loss: %s}\n"
             "target: {name: t, layers: [{material: %s, areal_density: %s}], scatterer: %s}\n"
             "arms: [{name: A, solid_angle: 1 msr}]\nsettings: [{name: K, angle: %.17g deg}]\n",
             means[row].particle, kinetic, loss, means[row].material, areal, means[row].scatterer,
             means[row].angle);
}

static double at_depth(double path, void *context)
{
    const struct depth *d = context;
    char text[TEXT];
    const double kinetic = bh_range_after(d->range, means[d->row].kinetic, path);
    write_plan(text, d->row, kinetic, "1 ug/cm2", "none");
    struct evaluated e = evaluate(text);
    const double sigma = cell(&e, 0, BH_COL_CROSS_SECTION);
    done(&e);
    return sigma;
}

START_TEST(mean_over_depth)
{
    char text[TEXT], areal[32];
    snprintf(areal, sizeof areal, "%.17g g/cm2", means[_i].areal);
    write_plan(text, _i, means[_i].kinetic, areal, "full");
    struct evaluated e = evaluate(text);
    bh_workspace *workspace = bh_workspace_new();
    const bh_layer *layer = &e.plan->targets[0].layers[0];
    const bh_substance in = {layer->material, layer->density.value};
    struct depth d = {
        _i, bh_workspace_range(workspace, &e.plan->beam.particle, &in, means[_i].kinetic, NULL)};
    gsl_integration_workspace *points = gsl_integration_workspace_alloc(200);
    gsl_function f = {at_depth, &d};
    double sum, error;
    ck_assert_ptr_nonnull(d.range);
    gsl_integration_qag(&f, 0, means[_i].areal, 0, 1e-7, 200, GSL_INTEG_GAUSS15, points, &sum,
                        &error);
    ck_assert_relative(cell(&e, 0, BH_COL_CROSS_SECTION), sum / means[_i].areal, 1e-5,
                       means[_i].material);
    ck_assert_double_lt(cell(&e, 0, BH_COL_VERTEX_KINETIC), means[_i].kinetic);
    gsl_integration_workspace_free(points);
    bh_workspace_free(workspace);
    done(&e);
}
END_TEST

/* --- what must change nothing --- */

static const bh_column_id compared[] = {
    BH_COL_CROSS_SECTION, BH_COL_KEPT,         BH_COL_SIGNAL,
    BH_COL_BACKGROUND,    BH_COL_SEEN,         BH_COL_VERTEX_KINETIC,
    BH_COL_PER_MRAD,      BH_COL_PER_PERMILLE, BH_COL_CENTRAL_MOMENTUM};

static void same_rows(const char *one, const char *other, double tolerance)
{
    struct evaluated a = evaluate(one), b = evaluate(other);
    for (size_t r = 0; r < bh_table_rows(a.table, false); r++)
        for (int c = 0; c < COUNT(compared); c++)
            if (isfinite(cell(&a, r, compared[c])) || isfinite(cell(&b, r, compared[c])))
                ck_assert_msg(fabs(cell(&b, r, compared[c]) - cell(&a, r, compared[c])) <=
                                  tolerance * fabs(cell(&a, r, compared[c])) + 1e-12,
                              "row %zu, %s: %.12g and %.12g", r,
                              bh_column_at((int)compared[c])->key, cell(&a, r, compared[c]),
                              cell(&b, r, compared[c]));
    done(&a);
    done(&b);
}

#define ELECTRONS  "plan: 1\nbeam: {particle: electron, kinetic_energy: 855 MeV, current: 1 uA}\n"
#define ARM(more)  "arms: [{name: A, in_plane: ±28 mrad, out_of_plane: ±70 mrad, bins: 3" more "}]\n"
#define AT(angles) "settings: [{name: K, angle: " angles ", time: 1 h}]\n"

START_TEST(splitting_a_layer)
{
/* radiation has tests of its own: where a bite ends inside the acceptance its factor falls to 0
 * there, and sums of it agree to 2e-3 only */
#define BORN "models: {radiative: none}\n"
#define CELL_OF(hydrogen, more, angles)                                                       \
    ELECTRONS BORN "target:\n  name: t\n  scatterer: H\n  layers:\n"                          \
                   "    - {material: aluminium, thickness: 0.2 mm, role: window}\n" hydrogen  \
                   "    - {material: aluminium, thickness: 0.2 mm, role: window}\n" ARM(more) \
                       AT(angles)
    static const char one[] = CELL_OF("    - {material: liquid-hydrogen, thickness: 50 mm}\n", "",
                                      "[20 deg, 60 deg, 120 deg]");
    static const char two[] =
        CELL_OF("    - {material: liquid-hydrogen, thickness: 13 mm}\n    - {material: "
                "liquid-hydrogen, thickness: 37 mm}\n",
                "", "[20 deg, 60 deg, 120 deg]");
    same_rows(one, two, 1e-6);
    /* also where the bite cuts, as its edges move with the depth */
    static const char one_cut[] = CELL_OF("    - {material: liquid-hydrogen, thickness: 50 mm}\n",
                                          ", momentum_bite: ±0.8 %", "[30 deg, 50 deg]");
    static const char two_cut[] =
        CELL_OF("    - {material: liquid-hydrogen, thickness: 13 mm}\n    - {material: "
                "liquid-hydrogen, thickness: 37 mm}\n",
                ", momentum_bite: ±0.8 %", "[30 deg, 50 deg]");
    same_rows(one_cut, two_cut, 1e-5);
}
END_TEST

START_TEST(a_thin_target_has_the_point_rate)
{
#define THIN(loss)                                                                          \
    ELECTRONS                                                                               \
    "models: {energy_loss: " loss "}\n"                                                     \
    "target: {name: t, layers: [{material: carbon-12, areal_density: 1e-10 g/cm2}]}\n" ARM( \
        ", momentum_bite: ±0.8 %") AT("[30 deg, 60 deg]")
    same_rows(THIN("none"), THIN("full"), 1e-9);
}
END_TEST

START_TEST(without_loss_the_note_says_so)
{
    struct evaluated e = evaluate(THIN("none"));
    bool said = false;
    for (size_t i = 0; bh_table_note(e.table, i); i++)
        said = said || strstr(bh_table_note(e.table, i), "Energy loss is switched off");
    ck_assert(said);
    done(&e);
}
END_TEST

/* --- what stops --- */

START_TEST(a_beam_that_stops)
{
    struct evaluated e =
        evaluate("plan: 1\nbeam: {particle: alpha, kinetic_energy: 5 MeV, particle_rate: 1e6 /s}\n"
                 "target:\n  name: t\n  scatterer: Au\n  layers:\n"
                 "    - {material: kapton, thickness: 50 um, role: window}\n"
                 "    - {material: gold, thickness: 0.1 um}\n"
                 "arms: [{name: A, solid_angle: 1 msr, bins: 1}]\n"
                 "settings: [{name: K, angle: 150 deg, goal: 1 %}]\n");
    ck_assert(warns(&e, "the beam stops in layer 1 (kapton), in K, and does not come through"));
    static const bh_column_id empty[] = {BH_COL_SIGNAL, BH_COL_BACKGROUND, BH_COL_COUNTS,
                                         BH_COL_VERTEX_KINETIC, BH_COL_CROSS_SECTION};
    for (int i = 0; i < COUNT(empty); i++) {
        ck_assert(isnan(cell(&e, 0, empty[i])));
        ck_assert_str_eq(bh_table_reason(e.table, false, 0, empty[i]),
                         "the beam stops before it has come through the sample");
    }
    ck_assert_double_eq(cell(&e, 0, BH_COL_BEAM_KINETIC), 5);
    const bh_diags *w = bh_table_warnings(e.table);
    ck_assert_int_eq(bh_diags_at(w, 0)->at.line, 7);
    done(&e);
}
END_TEST

START_TEST(a_beam_that_stops_behind_the_sample)
{
    struct evaluated e =
        evaluate("plan: 1\nbeam: {particle: alpha, kinetic_energy: 5 MeV, particle_rate: 1e6 /s}\n"
                 "target:\n  name: t\n  scatterer: Au\n  layers:\n"
                 "    - {material: gold, thickness: 0.1 um}\n"
                 "    - {material: kapton, thickness: 50 um, role: backing}\n"
                 "arms: [{name: A, solid_angle: 1 msr}]\nsettings: [{name: K, angle: 150 deg}]\n");
    ck_assert(warns(&e, "the beam stops in layer 2 (kapton) behind the sample"));
    ck_assert_double_gt(cell(&e, 0, BH_COL_SIGNAL), 0);
    ck_assert_double_eq(cell(&e, 0, BH_COL_BACKGROUND), 0);
    done(&e);
}
END_TEST

/* Slow recoil protons come out of the last part of the cell alone: as long as their range. */
START_TEST(recoil_protons_of_a_hydrogen_cell)
{
    static const char form[] =
        ELECTRONS "target: {name: t, scatterer: 1H, layers: [{material: liquid-hydrogen, "
                  "thickness: 50 mm}]}\n"
                  "arms: [{name: P, detects: recoil, solid_angle: 1 msr%s}]\n"
                  "settings: [{name: K, angle: 75 deg, central_momentum: 350 MeV/c}]\n";
    char text[TEXT];
    snprintf(text, sizeof text, form, "");
    struct evaluated e = evaluate(text);
    const bh_collision in = {BH_MASS_ELECTRON, BH_MASS_PROTON, cell(&e, 0, BH_COL_VERTEX_KINETIC)};
    bh_event event;
    ck_assert(!bh_kinematics_recoil(&in, 75 * BH_DEGREE, &event, NULL));
    bh_workspace *workspace = bh_workspace_new();
    bh_particle proton;
    ck_assert(bh_particle_find("proton", &proton));
    const bh_layer *layer = &e.plan->targets[0].layers[0];
    const bh_range *range = bh_workspace_range(
        workspace, &proton, &(bh_substance){layer->material, layer->density.value}, 855, NULL);
    const double thick = layer->areal_density.value / cos(75 * BH_DEGREE);
    const double share = bh_range_of(range, event.recoil_kinetic) / thick;
    ck_assert_double_lt(share, 0.9);
    ck_assert_relative(cell(&e, 0, BH_COL_KEPT), share, 0.02, "as far as the range");
    done(&e);
    /* with a threshold as far as it takes to lose the rest */
    const double least = 0.8 * event.recoil_kinetic;
    char threshold[64];
    snprintf(threshold, sizeof threshold, ", threshold: %.12g MeV", least);
    snprintf(text, sizeof text, form, threshold);
    e = evaluate(text);
    const double far =
        (bh_range_of(range, event.recoil_kinetic) - bh_range_of(range, least)) / thick;
    ck_assert_relative(cell(&e, 0, BH_COL_KEPT), far, 0.02, "above the threshold");
    done(&e);
    snprintf(text, sizeof text, form, ", threshold: 100 MeV");
    e = evaluate(text);
    ck_assert_double_eq(cell(&e, 0, BH_COL_SIGNAL), 0);
    done(&e);
    bh_workspace_free(workspace);
}
END_TEST

/* --- the way out --- */

#define HYDROGEN(more)                                                                             \
    "target: {name: t, scatterer: H, layers: [{material: liquid-hydrogen, thickness: 50 mm}]" more \
    "}\n"
#define PROTIUM \
    "target: {name: t, scatterer: 1H, layers: [{material: liquid-hydrogen, thickness: 50 mm}]}\n"
#define RIGHT_ANGLE "settings: [{name: K, angle: 90 deg}]\n"

START_TEST(at_right_angles_only_a_wall_lets_out)
{
    struct evaluated slab = evaluate(ELECTRONS HYDROGEN("") ARM("") RIGHT_ANGLE);
    ck_assert(warns(&slab, "what is scattered along the axis of A stops before it reaches"));
    ck_assert(isnan(cell(&slab, 0, BH_COL_CENTRAL_MOMENTUM)));
    ck_assert_str_eq(bh_table_reason(slab.table, false, 0, BH_COL_CENTRAL_MOMENTUM),
                     "what is scattered along the arm's axis stops on its way");
    done(&slab);
    struct evaluated cell_ = evaluate(ELECTRONS HYDROGEN(
        ", wall: {radius: 3 cm, material: aluminium, thickness: 0.13 mm}") ARM("") RIGHT_ANGLE);
    ck_assert(!warns(&cell_, "stops before"));
    /* 3 cm of hydrogen and the wall: 4.5 and 1.7 MeV cm2/g */
    ck_assert_double_eq_tol(cell(&cell_, 0, BH_COL_SCATTERED_MOMENTUM) -
                                cell(&cell_, 0, BH_COL_CENTRAL_MOMENTUM),
                            4.5 * 0.2124 + 1.7 * 0.0351, 0.03);
    ck_assert_double_eq(cell(&cell_, 0, BH_COL_KEPT), 1);
    done(&cell_);
}
END_TEST

START_TEST(exit_layers_take_their_part)
{
    static const char form[] =
        ELECTRONS "target: {name: t, layers: [{material: carbon-12, areal_density: 10 mg/cm2}]}\n"
                  "arms: [{name: A, solid_angle: 1 msr%s}]\nsettings: [{name: K, angle: 40 deg}]\n";
    char text[TEXT];
    snprintf(text, sizeof text, form, "");
    struct evaluated bare = evaluate(text);
    snprintf(text, sizeof text, form, ", exit: [{material: aluminium, thickness: 1 mm}]");
    struct evaluated window = evaluate(text);
    /* 1 mm of aluminium: 0.2699 g/cm2 of 1.9 MeV cm2/g (ESTAR, 800 MeV) */
    ck_assert_double_eq_tol(cell(&bare, 0, BH_COL_CENTRAL_MOMENTUM) -
                                cell(&window, 0, BH_COL_CENTRAL_MOMENTUM),
                            0.2699 * 1.9, 0.03);
    ck_assert_double_eq(cell(&bare, 0, BH_COL_SIGNAL), cell(&window, 0, BH_COL_SIGNAL));
    done(&bare);
    done(&window);
}
END_TEST

/* The bite acts on what arrives: set to the momentum at the collision it misses. */
START_TEST(a_bite_on_arrival)
{
    static const char form[] =
        ELECTRONS PROTIUM "arms: [{name: A, solid_angle: 1 msr, momentum_bite: ±0.2 %%%s}]\n"
                          "settings: [{name: K, angle: 40 deg%s}]\n";
    char text[TEXT], central[64];
    snprintf(text, sizeof text, form, "", "");
    struct evaluated right = evaluate(text);
    ck_assert_double_eq(cell(&right, 0, BH_COL_KEPT), 1);
    snprintf(central, sizeof central, ", central_momentum: %.10g MeV/c",
             1.0015 * cell(&right, 0, BH_COL_SCATTERED_MOMENTUM));
    snprintf(text, sizeof text, form, "", central);
    struct evaluated wrong = evaluate(text);
    ck_assert_double_lt(cell(&wrong, 0, BH_COL_KEPT), 0.7);
    done(&right);
    done(&wrong);
}
END_TEST

/* Alphas from the back of gold: 0.1 um in and out at 170 deg, with the published loss of 5 MeV
 * alphas in gold, 0.2261 MeV cm2/mg (ASTAR, 4.5 to 5 MeV: 0.221 to 0.233). */
START_TEST(backwards_out_of_the_first_face)
{
    struct evaluated e =
        evaluate("plan: 1\nbeam: {particle: alpha, kinetic_energy: 5 MeV, particle_rate: 1e6 /s}\n"
                 "target: {name: t, layers: [{material: gold, thickness: 0.1 um}]}\n"
                 "arms: [{name: A, solid_angle: 1 msr}]\nsettings: [{name: K, angle: 170 deg}]\n");
    const double p = cell(&e, 0, BH_COL_CENTRAL_MOMENTUM);
    const double arrives = sqrt(p * p + BH_MASS_ALPHA * BH_MASS_ALPHA) - BH_MASS_ALPHA;
    const double lost = 0.0966 * 0.227; /* half of it in, half out, on average */
    ck_assert_double_eq_tol(cell(&e, 0, BH_COL_SCATTERED_KINETIC) - arrives, lost, 0.1 * lost);
    ck_assert_double_eq_tol(5 - cell(&e, 0, BH_COL_VERTEX_KINETIC), lost, 0.1 * lost);
    done(&e);
}
END_TEST

/* A foil turned towards the arm is crossed straight, turned away at a slant. */
START_TEST(a_tilt_has_a_side)
{
    static const char form[] =
        "plan: 1\nbeam: {particle: proton, kinetic_energy: 20 MeV, current: 1 nA}\n"
        "target: {name: t, layers: [{material: carbon-12, areal_density: 20 mg/cm2}], tilt: 40 "
        "deg}\narms: [{name: A, solid_angle: 1 msr, side: %s}]\n"
        "settings: [{name: K, angle: 40 deg}]\n";
    double lost[2];
    for (int i = 0; i < 2; i++) {
        char text[TEXT];
        snprintf(text, sizeof text, form, i ? "left" : "right");
        struct evaluated e = evaluate(text);
        lost[i] = cell(&e, 0, BH_COL_SCATTERED_MOMENTUM) - cell(&e, 0, BH_COL_CENTRAL_MOMENTUM);
        done(&e);
    }
    ck_assert_relative(lost[1] / lost[0], 1 / cos(80 * BH_DEGREE), 0.1, "slants");
}
END_TEST

START_TEST(the_view_sees_the_middle)
{
    struct evaluated all = evaluate(ELECTRONS HYDROGEN("") ARM("") AT("30 deg"));
    struct evaluated part =
        evaluate(ELECTRONS HYDROGEN("") ARM(", target_view: {from: 0 mm, to: 10 mm}") AT("30 deg"));
    ck_assert_double_lt(cell(&part, 0, BH_COL_VERTEX_KINETIC),
                        cell(&all, 0, BH_COL_VERTEX_KINETIC) - 0.2);
    done(&all);
    done(&part);
}
END_TEST

/* --- current --- */

START_TEST(a_liquid_thins_under_the_beam)
{
    static const char form[] =
        "plan: 1\nbeam: {particle: electron, kinetic_energy: 855 MeV, current: 20 uA}\n"
        "target: {name: t, scatterer: H, layers: [{material: liquid-hydrogen, thickness: 50 mm%s}]}"
        "\narms: [{name: A, solid_angle: 1 msr}]\nsettings: [{name: K, angle: 40 deg}]\n";
    char text[TEXT];
    snprintf(text, sizeof text, form, "");
    struct evaluated cold = evaluate(text);
    ck_assert(warns(&cold, "liquid-hydrogen under 20.0 uA of beam without density_loss"));
    snprintf(text, sizeof text, form, ", density_loss: 0.1 %/uA");
    struct evaluated warm = evaluate(text);
    ck_assert(!warns(&warm, "without density_loss"));
    ck_assert_relative(cell(&warm, 0, BH_COL_LUMINOSITY), 0.98 * cell(&cold, 0, BH_COL_LUMINOSITY),
                       1e-12, "luminosity");
    ck_assert_double_gt(cell(&warm, 0, BH_COL_VERTEX_KINETIC),
                        cell(&cold, 0, BH_COL_VERTEX_KINETIC));
    done(&cold);
    done(&warm);
}
END_TEST

static bool cautions(const struct evaluated *e, const char *words)
{
    for (size_t i = 0; i < bh_table_cautions(e->table); i++)
        if (strstr(bh_table_caution(e->table, i)->text, words))
            return true;
    return false;
}

START_TEST(heat_is_a_caution)
{
    struct evaluated cool = evaluate(ELECTRONS HYDROGEN("") ARM("") AT("30 deg"));
    ck_assert(cautions(
        &cool,
        "Target t: the beam leaves about 1.62 W in it (screening estimates, spot of 1 mm radius "
        "assumed). The facility's target group, its rules"));
    done(&cool);
    struct evaluated hot = evaluate(
        "plan: 1\nbeam: {particle: electron, kinetic_energy: 855 MeV, current: 20 uA, spot: {x: "
        "0.2 "
        "mm, y: 0.2 mm}}\ntarget: {name: t, layers: [{material: lead, thickness: 10 um}]}\n"
        "arms: [{name: A, solid_angle: 1 msr}]\nsettings: [{name: K, angle: 40 deg}]\n");
    ck_assert(cautions(&hot, "lead may reach its melting point"));
    ck_assert(cautions(&hot, "(screening estimates, spot of 0.40 mm radius)"));
    done(&hot);
    struct evaluated faint = evaluate(
        "plan: 1\nbeam: {particle: electron, kinetic_energy: 855 MeV, current: 1 pA}\n" HYDROGEN("")
            ARM("") AT("30 deg"));
    ck_assert(!cautions(&faint, "the beam leaves"));
    done(&faint);
}
END_TEST

int main(void)
{
    TCase *t = tcase_create("depth");
    tcase_set_timeout(t, 120);
    tcase_add_loop_test(t, mean_over_depth, 0, COUNT(means));
    tcase_add_test(t, splitting_a_layer);
    tcase_add_test(t, a_thin_target_has_the_point_rate);
    tcase_add_test(t, without_loss_the_note_says_so);
    tcase_add_test(t, a_beam_that_stops);
    tcase_add_test(t, a_beam_that_stops_behind_the_sample);
    tcase_add_test(t, recoil_protons_of_a_hydrogen_cell);
    tcase_add_test(t, at_right_angles_only_a_wall_lets_out);
    tcase_add_test(t, exit_layers_take_their_part);
    tcase_add_test(t, a_bite_on_arrival);
    tcase_add_test(t, backwards_out_of_the_first_face);
    tcase_add_test(t, a_tilt_has_a_side);
    tcase_add_test(t, the_view_sees_the_middle);
    tcase_add_test(t, a_liquid_thins_under_the_beam);
    tcase_add_test(t, heat_is_a_caution);
    return run_suite("depth", t);
}
