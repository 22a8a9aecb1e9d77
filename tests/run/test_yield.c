/* test_yield.c - what an arm sees, counts and needs, through plans whose answer is known by hand.
 */
#include "evaluated.h"

#include "beamhours/physics/kinematics.h"
#include "beamhours/physics/structure.h"
#include "beamhours/run/channel.h"
#include "beamhours/units/constants.h"
#include "beamhours/units/nuclide.h"

#define BEAM                                                                                     \
    "plan: 1\nmodels: {energy_loss: none}\nbeam: {particle: electron, kinetic_energy: 855 MeV, " \
    "current: 10 uA}\n"

/* --- sensitivities of a target that is partly seen --- */

static const char *const views[] = {"", ", target_view: ±1 cm",
                                    ", target_view: {from: -3 cm, to: 0.5 cm}"};

/* d ln rate / d angle by moving the arm 2 mrad both ways: a view of +-w sees 2 w / sin(angle). */
START_TEST(sensitivity_of_a_viewed_target)
{
    static const char form[] =
        BEAM "target:\n  tilt: %s\n  name: t\n  layers: [{material: liquid-hydrogen, thickness: 10 "
             "cm}]\n  scatterer: 1H\narms: [{name: A, solid_angle: 1 msr%s}]\n"
             "settings: [{name: K, angle: %.12g deg, time: 1 h}]\n";
    static const char *const tilts[] = {"0 deg", "25 deg"};
    const double h = 2e-3;
    for (int tilt = 0; tilt < 2; tilt++) {
        double rate[3], per_mrad = 0, seen = 0;
        for (int i = -1; i <= 1; i++) {
            char text[1024];
            snprintf(text, sizeof text, form, tilts[tilt], views[_i], 40 + i * h / BH_DEGREE);
            struct evaluated e = evaluate(text);
            rate[1 + i] = cell(&e, 0, BH_COL_SIGNAL);
            if (i == 0) {
                per_mrad = cell(&e, 0, BH_COL_PER_MRAD);
                seen = cell(&e, 0, BH_COL_SEEN);
            }
            done(&e);
        }
        ck_assert_relative(per_mrad, (rate[2] - rate[0]) / (2 * h) / rate[1] * 1e-3, 3e-4,
                           "d ln rate / d angle");
        /* 0.0708 g/cm3, or what the material says; 1H per cm of path */
        const double paths[] = {10 / cos(tilt ? 25 * BH_DEGREE : 0), 2 / sin(40 * BH_DEGREE),
                                3.5 / sin(40 * BH_DEGREE)};
        static const double per_cm = 4.226e22; /* 0.0708 / 1.00794 x N_A */
        ck_assert_relative(seen, paths[_i] * per_cm, 0.02, "seen length by hand");
    }
}
END_TEST

/* --- isotopes that are a trace --- */

/* Deuterium of natural hydrogen is summed with less effort; alone it is the main nuclide. */
START_TEST(a_trace_adds_what_it_is)
{
    static const char form[] =
        BEAM "target: {name: t, layers: [{material: liquid-hydrogen, thickness: 5 cm}], scatterer: "
             "%s}\narms: [{name: A, in_plane: ±28 mrad, out_of_plane: ±70 mrad, bins: 3%s}]\n"
             "settings: [{name: K, angle: 60 deg, time: 1 h%s}]\n";
    static const char *const of[] = {"H", "1H", "2H"};
    /* all of both, and the line of deuterium alone: 694 MeV/c, hydrogen's is at 587 */
    static const char *const bites[] = {"", ", momentum_bite: ±3 %"};
    static const char *const set_to[] = {"", ", central_momentum: 694 MeV/c"};
    double rate[3], per_permille[3];
    for (int i = 0; i < 3; i++) {
        char text[1024];
        snprintf(text, sizeof text, form, of[i], bites[_i], set_to[_i]);
        struct evaluated e = evaluate(text);
        rate[i] = cell(&e, 0, BH_COL_SIGNAL);
        per_permille[i] = cell(&e, 0, BH_COL_PER_PERMILLE);
        done(&e);
    }
    ck_assert_double_gt(rate[2], 0);
    ck_assert_relative(rate[0], (_i ? 0 : rate[1]) + rate[2], 1e-8, "both are the sum of each");
    ck_assert_relative(per_permille[0], per_permille[_i ? 2 : 1], 3e-4, "sensitivity of the main");
}
END_TEST

/* From a thousandth of the rate on a rare isotope has its part in the sensitivities.  The arm opens
 * just below the largest angle of alphas on protons, far below that on deuterons: much of the rate
 * of hydrogen is beyond reach, and what is left follows the momentum as deuterium's does. */
START_TEST(a_trace_of_a_thousandth_is_none)
{
    static const char form[] =
        "plan: 1\nmodels: {energy_loss: none}\nbeam: {particle: alpha, kinetic_energy: 4 MeV, "
        "current: 10 nA}\ntarget: {layers: [{material: liquid-hydrogen, thickness: 1 um}], "
        "scatterer: %s}\narms: [{name: A, in_plane: {from: 0.2 mrad, to: 200 mrad}, out_of_plane: "
        "±5 mrad}]\nsettings: [{name: K, angle: 14.54 deg, time: 1 h}]\n";
    static const char *const of[] = {"H", "1H", "2H"};
    double rate[3], per_permille[3];
    for (int i = 0; i < 3; i++) {
        char text[1024];
        snprintf(text, sizeof text, form, of[i]);
        struct evaluated e = evaluate(text);
        rate[i] = cell(&e, 0, BH_COL_SIGNAL);
        per_permille[i] = cell(&e, 0, BH_COL_PER_PERMILLE);
        done(&e);
    }
    ck_assert_double_gt(rate[2] / rate[1], 1.0e-3);
    ck_assert_double_lt(rate[2] / rate[1], 1.5e-3);
    ck_assert_relative(rate[0], rate[1] + rate[2], 1e-8, "both are the sum of each");
    ck_assert_relative(per_permille[0] * rate[0],
                       per_permille[1] * rate[1] + per_permille[2] * rate[2], 1e-4,
                       "changes of rates add");
}
END_TEST

/* --- kinematic columns --- */

/* Electron of 1 GeV at 30 deg on the proton, massless to 1e-6: closed form at 30 digits. */
START_TEST(a_row_has_the_event_at_its_axis)
{
    struct evaluated e =
        evaluate("plan: 1\nmodels: {energy_loss: none}\nbeam: {particle: electron, total_energy: 1 "
                 "GeV, current: 10 uA}\n"
                 "target: {name: t, layers: [{material: liquid-hydrogen, thickness: 5 cm}], "
                 "scatterer: 1H}\narms: [{name: A, solid_angle: 1 msr}]\n"
                 "settings: [{name: K, angle: 30 deg, time: 1 h}]\n");
    static const struct {
        bh_column_id column;
        double value;
    } rows[] = {{BH_COL_SCATTERED_ANGLE, 30},
                {BH_COL_SCATTERED_MOMENTUM, 875.052450141},
                {BH_COL_SCATTERED_KINETIC, 875.052450141 - 0.51099895},
                {BH_COL_CENTRAL_MOMENTUM, 875.052450141},
                {BH_COL_RECOIL_KINETIC, 124.947549859},
                {BH_COL_RECOIL_ANGLE, 61.0343109472},
                {BH_COL_Q2, 0.23446959735},
                {BH_COL_Q, 500.081480927 / 197.3269804593},
                {BH_COL_EPSILON, 0.867186448657}};
    for (int i = 0; i < COUNT(rows); i++)
        ck_assert_relative(cell(&e, 0, rows[i].column), rows[i].value, 2e-6,
                           bh_column_at((int)rows[i].column)->key);
    done(&e);
}
END_TEST

/* Recoil protons above a threshold are those at angles below that of its energy. */
START_TEST(a_threshold_is_an_energy)
{
    static const char form[] =
        BEAM "target: {name: t, layers: [{material: liquid-hydrogen, thickness: 5 cm}], scatterer: "
             "1H}\narms: [{name: A, detects: recoil, ring: {from: 20 deg, to: %.12g deg}%s}]\n"
             "settings: [{name: K, time: 1 h}]\n";
    const bh_collision in = {BH_MASS_ELECTRON, BH_MASS_PROTON, 855};
    bh_event e;
    ck_assert_int_eq(bh_kinematics_q2(&in, 2 * BH_MASS_PROTON * 100, &e, NULL), BH_OK);
    ck_assert_double_eq_tol(e.recoil_kinetic, 100, 1e-9);
    char text[1024];
    snprintf(text, sizeof text, form, 75.0, ", threshold: 100 MeV");
    struct evaluated cut = evaluate(text);
    snprintf(text, sizeof text, form, e.recoil_angle / BH_DEGREE, "");
    struct evaluated short_of = evaluate(text);
    ck_assert_double_lt(e.recoil_angle / BH_DEGREE, 74);
    ck_assert_relative(cell(&cut, 0, BH_COL_SIGNAL), cell(&short_of, 0, BH_COL_SIGNAL), 2e-6,
                       "above 100 MeV");
    done(&cut);
    done(&short_of);
}
END_TEST

/* --- backgrounds --- */

/* A compound with windows.  What a part gives does not depend on its name: the signal of a plan
 * that wants the oxygen is the `other` background of one that wants the deuterium. */
#define WATER                                                        \
    "target:\n  name: cell\n  layers:\n"                             \
    "    - {material: aluminium, thickness: 0.2 mm, role: window}\n" \
    "    - {material: heavy-water, thickness: 1 cm}\n"               \
    "    - {material: aluminium, thickness: 0.3 mm, role: window}\n"

static const char water[] =
    BEAM WATER "  scatterer: %s\narms: [{name: A, solid_angle: 1 msr, dead_time: 2 us}]\n"
               "settings: [{name: K, angle: 25 deg, time: 1 h}]\n";

static double recorded(const struct evaluated *e, bh_column_id column)
{
    return cell(e, 0, column) * cell(e, 0, BH_COL_LIVE);
}

START_TEST(all_that_is_counted_is_the_same_whoever_is_wanted)
{
    static const char *const wanted[] = {"2H", "16O", "O", "H"};
    double all = 0, signal[COUNT(wanted)];
    for (int i = 0; i < COUNT(wanted); i++) {
        char text[1024];
        snprintf(text, sizeof text, water, wanted[i]);
        struct evaluated e = evaluate(text);
        signal[i] = cell(&e, 0, BH_COL_SIGNAL);
        const double sum = signal[i] + cell(&e, 0, BH_COL_BACKGROUND);
        if (i)
            ck_assert_relative(sum, all, 1e-9, "signal and background");
        all = sum;
        /* statistics of what is recorded: sqrt((s + w + o) T) / (s T) */
        const double s = recorded(&e, BH_COL_SIGNAL), b = recorded(&e, BH_COL_BACKGROUND);
        ck_assert_relative(cell(&e, 0, BH_COL_STATISTICAL), sqrt((s + b) * 3600) / (s * 3600),
                           1e-12, "Poisson");
        ck_assert_relative(cell(&e, 0, BH_COL_LIVE), 1 / (1 + sum * 2e-6), 1e-12, "dead time");
        done(&e);
    }
    ck_assert_double_gt(signal[2], signal[1]); /* 17O and 18O too */
    ck_assert_double_ge(signal[3], signal[0]); /* heavy water without 1H */
    ck_assert_double_lt(signal[2] + signal[3], all);
}
END_TEST

/* With an empty target sigma^2 = (s + w + o) T + w T / phi: the windows alone are measured. */
START_TEST(the_empty_target_measures_the_windows)
{
    char text[1024];
    snprintf(text, sizeof text, water, "16O");
    struct evaluated plain = evaluate(text);
    const double other = cell(&plain, 0, BH_COL_BACKGROUND), s = cell(&plain, 0, BH_COL_SIGNAL);
    done(&plain);
    struct evaluated windows = evaluate(
        BEAM "target:\n  name: cell\n  layers:\n    - {material: aluminium, thickness: 0.5 "
             "mm}\n  scatterer: Al\narms: [{name: A, solid_angle: 1 msr}]\n"
             "settings: [{name: K, angle: 25 deg, time: 1 h}]\n");
    const double w = cell(&windows, 0, BH_COL_SIGNAL) + cell(&windows, 0, BH_COL_BACKGROUND);
    done(&windows);
    struct evaluated e = evaluate(
        BEAM WATER "  scatterer: 16O\n  empty_target: {share: 20 %}\narms: [{name: A, solid_angle: "
                   "1 msr, dead_time: 2 us}]\nsettings: [{name: K, angle: 25 deg, time: 1 h}]\n");
    const double live = cell(&e, 0, BH_COL_LIVE);
    ck_assert_relative(cell(&e, 0, BH_COL_STATISTICAL),
                       sqrt((s + other + w / 0.2) * live * 3600) / (s * live * 3600), 1e-9,
                       "s, w and o by hand");
    done(&e);
}
END_TEST

/* A dummy cell gives all of itself, whatever its layers are called. */
START_TEST(a_dummy_cell_gives_all_of_itself)
{
    static const char form[] =
        BEAM "targets:\n  - name: cell\n    layers:\n"
             "      - {material: aluminium, thickness: 0.3 mm, role: window}\n"
             "      - {material: liquid-hydrogen, thickness: 50 mm}\n"
             "    scatterer: H\n    empty_target: {share: 10 %%, use: dummy}\n"
             "  - name: dummy\n    layers:\n      - {material: aluminium, thickness: %s}\n%s"
             "arms:\n  - {name: A, solid_angle: 6 msr}\nevery_setting: {target: cell}\n"
             "settings:\n  - {name: K, angle: 30 deg, time: 1 h}\n";
    static const char *const dummies[][2] = {
        {"3 mm", ""}, {"1 mm", "      - {material: aluminium, thickness: 2 mm, role: window}\n"}};
    double statistical[2];
    for (int i = 0; i < 2; i++) {
        char text[2048];
        snprintf(text, sizeof text, form, dummies[i][0], dummies[i][1]);
        struct evaluated e = evaluate(text);
        statistical[i] = cell(&e, 0, BH_COL_STATISTICAL);
        const double s = cell(&e, 0, BH_COL_SIGNAL), w = cell(&e, 0, BH_COL_BACKGROUND);
        /* ten times as thick: its counts divided by ten */
        ck_assert_relative(statistical[i], sqrt((s + w + w / (0.1 * 10)) * 3600) / (s * 3600), 1e-9,
                           "w / (phi k)");
        done(&e);
    }
    ck_assert_relative(statistical[0], statistical[1], 1e-12, "same dummy");
}
END_TEST

/* --- best shares and bins --- */

/* Two bins of different background: the share belongs to the one that needs more time in all. */
START_TEST(the_share_suits_the_bin_that_needs_most)
{
    static const char form[] =
        BEAM "target:\n  name: cell\n  layers:\n    - {material: aluminium, thickness: 0.5 mm, "
             "role: window}\n    - {material: liquid-hydrogen, thickness: 50 mm}\n"
             "  scatterer: H\n  empty_target: {share: %s}\n"
             "arms:\n  - {name: A, ring: {from: 20 deg, to: 80 deg}, bins: 3}\n"
             "settings:\n  - {name: K, goal: 1 %%, goal_for: each-bin}\n";
    char text[1024];
    snprintf(text, sizeof text, form, "best");
    struct evaluated e = evaluate(text);
    const double full = cell(&e, 0, BH_COL_HOURS), empty = cell(&e, 0, BH_COL_EMPTY_HOURS);
    done(&e);
    for (int i = 0; i < 2; i++) {
        char share[32];
        snprintf(share, sizeof share, "%.9f %%", 100 * empty / full * (i ? 1.1 : 0.9));
        snprintf(text, sizeof text, form, share);
        e = evaluate(text);
        ck_assert_double_gt(cell(&e, 0, BH_COL_HOURS) + cell(&e, 0, BH_COL_EMPTY_HOURS),
                            full + empty);
        done(&e);
    }
}
END_TEST

/* 10 % of empty time on top of the hours of the worst bin: 1 h more than granted is a warning. */
START_TEST(a_bin_that_cannot_reach_the_goal)
{
    static const char form[] =
        BEAM "target:\n  name: cell\n  layers:\n    - {material: aluminium, thickness: 0.5 mm, "
             "role: window}\n    - {material: liquid-hydrogen, thickness: 50 mm}\n"
             "  scatterer: H\n  empty_target: {share: 50 %%}\n"
             "arms:\n  - {name: A, ring: {from: 20 deg, to: 80 deg}, bins: 3}\n"
             "settings:\n  - {name: K, goal: 0.01 %%, goal_for: each-bin}\n"
             "schedule: {start_up: 0 h, available: %.6f h}\n";
    char text[1024];
    snprintf(text, sizeof text, form, 1e6);
    struct evaluated e = evaluate(text);
    const double needed = cell(&e, 0, BH_COL_HOURS) * 1.5;
    ck_assert(!warns(&e, "to reach the goal"));
    done(&e);
    for (int i = 0; i < 2; i++) {
        snprintf(text, sizeof text, form, needed * (i ? 0.999 : 1.001));
        e = evaluate(text);
        ck_assert_int_eq(warns(&e, "to reach the goal"), i);
        done(&e);
    }
}
END_TEST

/* Edges that differ in the last one alone are another arm, also for a workspace that has seen the
 * first. */
START_TEST(the_last_edge_counts)
{
    static const char form[] =
        BEAM "target: {name: t, layers: [{material: liquid-hydrogen, thickness: 5 cm}], scatterer: "
             "1H}\narms:\n  - {name: A, ring: {from: 20 deg, to: 80 deg}, edges: [30 deg, 40 "
             "deg, %s]}\nsettings:\n  - {name: K, time: 1 h}\n";
    bh_workspace *workspace = bh_workspace_new();
    const bh_evaluation with = {.bins = true, .workspace = workspace};
    double second[2];
    for (int i = 0; i < 2; i++) {
        char text[1024];
        snprintf(text, sizeof text, form, i ? "60 deg" : "50 deg");
        struct evaluated used = evaluate_with(text, &with), fresh = evaluate(text);
        second[i] = bin_cell(&used, 1, BH_COL_SIGNAL);
        ck_assert_double_eq(second[i], bin_cell(&fresh, 1, BH_COL_SIGNAL));
        done(&fresh);
        done(&used);
    }
    ck_assert_double_gt(second[1], 1.05 * second[0]);
    bh_workspace_free(workspace);
}
END_TEST

/* A rectangle with edges: the sensitivities of its bins by moving the arm and its edges. */
START_TEST(bins_with_edges_have_sensitivities)
{
    static const char form[] =
        BEAM "target: {name: t, layers: [{material: liquid-hydrogen, thickness: 5 cm}], scatterer: "
             "1H}\narms:\n  - {name: A, in_plane: ±50 mrad, out_of_plane: ±20 mrad, edges: "
             "[%.12g deg, %.12g deg, %.12g deg]}\n"
             "settings:\n  - {name: K, angle: %.12g deg, time: 1 h}\n";
    const double h = 0.05; /* deg */
    double rate[3][2], per_mrad[2] = {0};
    for (int i = -1; i <= 1; i++) {
        char text[1024];
        const double by = i * h;
        snprintf(text, sizeof text, form, 38 + by, 40 + by, 42.5 + by, 40 + by);
        struct evaluated e = evaluate(text);
        for (size_t b = 0; b < 2; b++) {
            rate[1 + i][b] = bin_cell(&e, b, BH_COL_SIGNAL);
            if (i == 0)
                per_mrad[b] = bin_cell(&e, b, BH_COL_PER_MRAD);
        }
        done(&e);
    }
    for (int b = 0; b < 2; b++)
        ck_assert_relative(per_mrad[b],
                           (rate[2][b] - rate[0][b]) / rate[1][b] / (2 * h * BH_DEGREE * 1e3), 3e-4,
                           "d ln rate / d angle of a bin");
}
END_TEST

/* --- one channel --- */

/* Many angles at once are the same as one at a time, and nothing beyond the largest angle. */
START_TEST(many_angles_as_one_by_one)
{
    bh_particle alpha;
    bh_error err;
    ck_assert(bh_particle_find("alpha", &alpha));
    bh_structure *point = bh_structure_new("point", 1, 1, &err);
    const bh_channel channel = {.process = bh_process_find("elastic"),
                                .encounter = {.beam = &alpha,
                                              .charge = 2,
                                              .z = 1,
                                              .a = 1,
                                              .target = bh_nuclide_find(1, 1)->mass,
                                              .kinetic = 5,
                                              .structure = point},
                                .recoil = _i == 1,
                                .branch = BH_BRANCH_FAST};
    enum { ANGLES = 100 };
    double angle[2 * ANGLES], sigma[2 * ANGLES], momentum[2 * ANGLES];
    const double largest = _i ? BH_PI / 2 : asin(BH_MASS_PROTON / BH_MASS_ALPHA);
    ck_assert_double_eq_tol(bh_channel_largest_angle(&channel), largest, 1e-5);
    for (int i = 0; i < 2 * ANGLES; i++) {
        sigma[i] = momentum[i] = -7; /* nothing is written behind the end */
        angle[i] = 1.5 * largest * (i + 0.5) / ANGLES;
    }
    bh_channel_eval(&channel, ANGLES, angle, sigma, momentum);
    for (int i = 0; i < ANGLES; i++) {
        double one = 0, p = 0;
        bh_channel_eval(&channel, 1, &angle[i], &one, &p);
        ck_assert(sigma[i] == one && momentum[i] == p);
        ck_assert_int_eq(sigma[i] > 0, angle[i] < largest);
        ck_assert(sigma[ANGLES + i] == -7 && momentum[ANGLES + i] == -7);
    }
    bh_structure_free(point);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("yield");
    tcase_add_loop_test(tests, a_trace_adds_what_it_is, 0, 2);
    tcase_add_test(tests, a_trace_of_a_thousandth_is_none);
    tcase_add_loop_test(tests, sensitivity_of_a_viewed_target, 0, COUNT(views));
    tcase_add_test(tests, a_row_has_the_event_at_its_axis);
    tcase_add_test(tests, a_threshold_is_an_energy);
    tcase_add_test(tests, all_that_is_counted_is_the_same_whoever_is_wanted);
    tcase_add_test(tests, the_empty_target_measures_the_windows);
    tcase_add_test(tests, a_dummy_cell_gives_all_of_itself);
    tcase_add_test(tests, the_share_suits_the_bin_that_needs_most);
    tcase_add_test(tests, a_bin_that_cannot_reach_the_goal);
    tcase_add_test(tests, the_last_edge_counts);
    tcase_add_test(tests, bins_with_edges_have_sensitivities);
    tcase_add_loop_test(tests, many_angles_as_one_by_one, 0, 2);
    return run_suite("run/yield", tests);
}
