/* test_curve_values.c - a setting while one quantity varies, against plans that say the same. */
#include "evaluated.h"

#include "beamhours/physics/kinematics.h"
#include "beamhours/run/curve.h"
#include "beamhours/units/constants.h"

#define HEAD                                                                                       \
    "plan: 1\nmodels: {energy_loss: none}\nbeam: {particle: electron, kinetic_energy: %.17g MeV, " \
    "current: 10 uA}\n"                                                                            \
    "target: {name: t, layers: [{material: liquid-hydrogen, thickness: 5 cm}], scatterer: 1H}\n"
#define ARM      "arms:\n  - {name: A, in_plane: ±40 mrad, out_of_plane: ±60 mrad%s}\n"
#define SETTINGS "settings:\n  - {name: K, angle: %.17g deg, time: 1 h}\n"

static struct evaluated plan_at(double kinetic, const char *more, double degrees)
{
    char text[2048];
    snprintf(text, sizeof text, HEAD ARM SETTINGS "  - {name: L, angle: 70 deg, time: 1 h}\n",
             kinetic, more, degrees);
    return evaluate(text);
}

static bh_curve *curve_of(const struct evaluated *e, bh_against against)
{
    bh_error err = {.text = ""};
    const bh_curve_request r = {.setting = "K", .against = against};
    bh_curve *curve = bh_curve_new(e->plan, &r, &err);
    ck_assert_msg(curve != NULL, "%s", err.text);
    return curve;
}

/* The plan that stands where a point of the curve does has the same numbers. */
static void same_as_plan(const bh_curve *curve, size_t i, double kinetic, double degrees)
{
    struct evaluated there = plan_at(kinetic, "", degrees);
    static const bh_column_id columns[] = {BH_COL_SIGNAL, BH_COL_CROSS_SECTION, BH_COL_Q2,
                                           BH_COL_EPSILON, BH_COL_ANGLE};
    for (int c = 0; c < COUNT(columns); c++)
        ck_assert_relative(bh_curve_y(curve, i, columns[c]), cell(&there, 0, columns[c]), 1e-7,
                           bh_column_at((int)columns[c])->key);
    done(&there);
}

START_TEST(against_the_angle)
{
    struct evaluated e = plan_at(855, "", 40);
    bh_curve *curve = curve_of(&e, BH_AGAINST_ANGLE);
    const size_t n = bh_curve_count(curve);
    ck_assert_double_eq_tol(bh_curve_x(curve, 0), 5, 1e-9);
    ck_assert_double_eq_tol(bh_curve_x(curve, n - 1), 175, 1e-9);
    const double step = bh_curve_x(curve, 1) - bh_curve_x(curve, 0);
    for (size_t i = 0; i < n; i++)
        ck_assert_double_eq_tol(bh_curve_x(curve, i), 5 + step * (double)i, 1e-9);
    same_as_plan(curve, n / 3, 855, bh_curve_x(curve, n / 3));
    done(&e);
    bh_curve_free(curve);
    e = plan_at(855, ", angle_range: {from: 1 deg, to: 120 deg}", 40);
    curve = curve_of(&e, BH_AGAINST_ANGLE);
    /* 40 mrad and 1 more keep the arm's edge out of the beam */
    ck_assert_double_eq_tol(bh_curve_x(curve, 0), 0.041 / BH_DEGREE, 1e-9);
    ck_assert_double_eq_tol(bh_curve_x(curve, bh_curve_count(curve) - 1), 120, 1e-9);
    done(&e);
    bh_curve_free(curve);
}
END_TEST

static size_t closest(const bh_curve *curve, double x, bool ratio)
{
    size_t best = 0;
    double least = HUGE_VAL;
    for (size_t i = 0; i < bh_curve_count(curve); i++) {
        const double at = bh_curve_x(curve, i);
        const double off = ratio ? fabs(log(at / x)) : fabs(at - x);
        if (off < least) {
            least = off;
            best = i;
        }
    }
    return best;
}

/* K at 40 deg, L at 70: both at 855 MeV, so that L is not on the curve of K against energy or
 * epsilon. */
START_TEST(marks_stand_where_the_settings_do)
{
    struct evaluated e = plan_at(855, "", 40);
    const struct {
        bh_against against;
        double k, l;   /* where they stand; NAN: not on this curve */
        double covers; /* [deg] half of the arm's width, where the angle varies */
    } rows[] = {
        {BH_AGAINST_ANGLE, 40, 70, 0.04 / BH_DEGREE},
        {BH_AGAINST_ENERGY, 855, (double)NAN, -1},
        {BH_AGAINST_Q2, cell(&e, 0, BH_COL_Q2), cell(&e, 1, BH_COL_Q2), 0.04 / BH_DEGREE},
        {BH_AGAINST_EPSILON, cell(&e, 0, BH_COL_EPSILON), (double)NAN, -1},
    };
    for (int r = 0; r < COUNT(rows); r++) {
        bh_curve *curve = curve_of(&e, rows[r].against);
        const bool ratio = rows[r].against == BH_AGAINST_ENERGY;
        const size_t k = closest(curve, rows[r].k, ratio), l = closest(curve, rows[r].l, ratio);
        for (size_t i = 0; i < bh_curve_count(curve); i++) {
            const double angle = bh_curve_y(curve, i, BH_COL_ANGLE);
            const bool on_k = i == k || fabs(angle - 40) <= rows[r].covers;
            const bool on_l = !isnan(rows[r].l) && (i == l || fabs(angle - 70) <= rows[r].covers);
            ck_assert_msg((strchr(bh_curve_marks(curve, i), 'K') != NULL) == on_k &&
                              (strchr(bh_curve_marks(curve, i), 'L') != NULL) == on_l,
                          "curve %d at %g: %s", r, bh_curve_x(curve, i), bh_curve_marks(curve, i));
        }
        bh_curve_free(curve);
    }
    done(&e);
}
END_TEST

/* Every energy on the curve has its mark, at whichever of the ever wider steps. */
START_TEST(each_energy_is_marked_once)
{
    static const double energies[] = {220, 300, 433, 700, 1000, 1350, 1700, 2222, 3000, 3400};
    for (int i = 0; i < COUNT(energies); i++) {
        char text[2048];
        snprintf(text, sizeof text,
                 HEAD ARM SETTINGS "  - {name: L, angle: 40 deg, time: 1 h, beam: {kinetic_energy: "
                                   "%.17g MeV}}\n",
                 855.0, "", 40.0, energies[i]);
        struct evaluated e = read_text(text);
        bh_curve *curve = curve_of(&e, BH_AGAINST_ENERGY);
        int marks = 0;
        for (size_t k = 0; k < bh_curve_count(curve); k++)
            if (strcmp(bh_curve_marks(curve, k), "L") == 0) {
                marks++;
                ck_assert_uint_eq(k, closest(curve, energies[i], false));
            }
        ck_assert_msg(marks == 1, "%g MeV: %d marks", energies[i], marks);
        bh_curve_free(curve);
        done(&e);
    }
}
END_TEST

START_TEST(against_the_energy)
{
    struct evaluated e = plan_at(855, "", 40);
    bh_curve *curve = curve_of(&e, BH_AGAINST_ENERGY);
    const size_t n = bh_curve_count(curve);
    ck_assert_double_eq_tol(bh_curve_x(curve, 0), 855.0 / 4, 1e-9);
    ck_assert_double_eq_tol(bh_curve_x(curve, n - 1), 855 * 4, 1e-8);
    ck_assert_double_eq_tol(bh_curve_x(curve, 2) / bh_curve_x(curve, 1),
                            bh_curve_x(curve, 1) / bh_curve_x(curve, 0), 1e-12);
    same_as_plan(curve, 3, bh_curve_x(curve, 3), 40);
    bh_curve_free(curve);
    done(&e);
}
END_TEST

START_TEST(against_q2)
{
    struct evaluated e = plan_at(855, "", 40);
    bh_curve *curve = curve_of(&e, BH_AGAINST_Q2);
    const size_t n = bh_curve_count(curve);
    const bh_collision in = {BH_MASS_ELECTRON, BH_MASS_PROTON, 855};
    const double most = bh_kinematics_largest_q2(&in) * 1e-6;
    ck_assert_double_lt(bh_curve_x(curve, n - 1), most);
    ck_assert_double_gt(bh_curve_x(curve, n - 1), 0.97 * most);
    ck_assert_double_lt(bh_curve_x(curve, 0), 0.02 * most);
    for (size_t i = 0; i < n; i++)
        ck_assert_double_eq_tol(bh_curve_x(curve, i), bh_curve_y(curve, i, BH_COL_Q2), 1e-9);
    same_as_plan(curve, n / 2, 855, bh_curve_y(curve, n / 2, BH_COL_ANGLE));
    bh_curve_free(curve);
    done(&e);
}
END_TEST

START_TEST(against_epsilon)
{
    struct evaluated e = plan_at(855, "", 40);
    bh_curve *curve = curve_of(&e, BH_AGAINST_EPSILON);
    const double q2 = cell(&e, 0, BH_COL_Q2);
    for (size_t i = 0; i < bh_curve_count(curve); i++) {
        ck_assert_double_eq_tol(bh_curve_x(curve, i), bh_curve_y(curve, i, BH_COL_EPSILON), 1e-9);
        ck_assert_double_eq_tol(bh_curve_y(curve, i, BH_COL_Q2) / q2, 1, 1e-9);
    }
    ck_assert_double_lt(bh_curve_x(curve, 0), 0.03);
    ck_assert_double_gt(bh_curve_x(curve, bh_curve_count(curve) - 1), 0.96);
    ck_assert_str_eq(bh_curve_marks(curve, 0), "");
    bh_curve_free(curve);
    done(&e);
}
END_TEST

/* From a thousandth of what the beam can reach, where the arm can stand so far forward. */
START_TEST(q2_from_a_thousandth_on)
{
    struct evaluated e = read_text(
        "plan: 1\nbeam: {particle: electron, kinetic_energy: 855 MeV, current: 10 uA}\n"
        "target: {name: t, layers: [{material: liquid-hydrogen, thickness: 5 cm}], scatterer: 1H}\n"
        "arms:\n  - {name: A, solid_angle: 1 msr, angle_range: {from: 1 deg, to: 179 deg}}\n"
        "settings:\n  - {name: K, angle: 40 deg, time: 1 h}\n");
    bh_curve *curve = curve_of(&e, BH_AGAINST_Q2);
    const bh_collision in = {BH_MASS_ELECTRON, BH_MASS_PROTON, 855};
    const double most = 0.999e-6 * bh_kinematics_largest_q2(&in);
    ck_assert_double_eq_tol(bh_curve_x(curve, 0) / most, 1e-3, 1e-12);
    ck_assert_double_eq_tol(bh_curve_x(curve, bh_curve_count(curve) - 1) / most, 1, 1e-12);
    bh_curve_free(curve);
    done(&e);
}
END_TEST

/* An alpha on hydrogen scatters by at most 14.5 deg; a recoil by at most 90. */
START_TEST(up_to_the_largest_angle)
{
    static const struct {
        const char *detects;
        double most; /* deg, before the arm's own width of 0.04 + 0.001 rad */
    } rows[] = {{"scattered", 0}, {"recoil", 90}};
    for (int i = 0; i < COUNT(rows); i++) {
        char text[1024];
        snprintf(text, sizeof text,
                 "plan: 1\nbeam: {particle: alpha, kinetic_energy: 3 MeV, particle_rate: 1e6 /s}\n"
                 "target: {name: t, layers: [{material: hydrogen-gas, areal_number: 1e18 /cm2}], "
                 "scatterer: 1H}\narms:\n  - {name: A, detects: %s, in_plane: ±40 mrad, "
                 "out_of_plane: ±40 mrad}\nsettings:\n  - {name: K, angle: 10 deg, time: 1 h}\n",
                 rows[i].detects);
        struct evaluated e = evaluate(text);
        bh_curve *curve = curve_of(&e, BH_AGAINST_ANGLE);
        const double limit =
            rows[i].most > 0 ? rows[i].most : asin(BH_MASS_PROTON / BH_MASS_ALPHA) / BH_DEGREE;
        ck_assert_double_eq_tol(bh_curve_x(curve, bh_curve_count(curve) - 1),
                                limit - 0.041 / BH_DEGREE, 1e-9);
        bh_curve_free(curve);
        done(&e);
    }
}
END_TEST

START_TEST(another_structure_moves_the_curve)
{
    struct evaluated e = plan_at(855, "", 40);
    bh_error err = {.text = ""};
    const bh_curve_request r = {.against = BH_AGAINST_ANGLE, .structure = "point"};
    bh_curve *curve = curve_of(&e, BH_AGAINST_ANGLE), *point = bh_curve_new(e.plan, &r, &err);
    ck_assert_msg(point != NULL, "%s", err.text);
    const size_t i = bh_curve_count(curve) / 2;
    ck_assert_double_gt(bh_curve_y(point, i, BH_COL_SIGNAL),
                        1.5 * bh_curve_y(curve, i, BH_COL_SIGNAL));
    bh_curve_free(point);
    bh_curve_free(curve);
    done(&e);
}
END_TEST

START_TEST(what_cannot_be_is_refused)
{
    static const char text[] =
        "plan: 1\nbeam: {particle: electron, kinetic_energy: 855 MeV, current: 10 uA}\n"
        "target: {name: t, layers: [{material: liquid-hydrogen, thickness: 5 cm}], scatterer: 1H}\n"
        "arms:\n  - {name: R, ring: {from: 20 deg, to: 40 deg}}\n  - {name: B, solid_angle: 1 "
        "msr}\n"
        "settings:\n  - {name: K, arms: [{arm: R}, {arm: B, angle: 30 deg}], time: 1 h}\n";
    static const struct {
        bh_curve_request r;
        const char *words;
    } rows[] = {{{.arm = "R", .against = BH_AGAINST_EPSILON}, "a ring stands still"},
                {{.setting = "X", .arm = "B", .against = BH_AGAINST_ANGLE}, "X"},
                {{.setting = "K", .arm = "C", .against = BH_AGAINST_ANGLE}, "C"},
                {{.setting = "K", .against = BH_AGAINST_EPSILON}, "a ring stands still"}};
    struct evaluated e = read_text(text);
    for (int i = 0; i < COUNT(rows); i++) {
        bh_error err = {.text = ""};
        ck_assert_ptr_null(bh_curve_new(e.plan, &rows[i].r, &err));
        ck_assert_msg(strstr(err.text, rows[i].words) != NULL, "%s", err.text);
    }
    done(&e);
    ck_assert_str_eq(bh_curve_key(BH_AGAINST_ANGLE), "angle_deg");
}
END_TEST

/* Slices as wide as the bins, at the bins' own middle: nearly the bins of the table, whose angles
 * are averages. */
START_TEST(a_ring_is_seen_slice_by_slice)
{
    static const char text[] =
        "plan: 1\nbeam: {particle: electron, kinetic_energy: 855 MeV, current: 10 nA}\n"
        "target: {name: t, layers: [{material: liquid-hydrogen, thickness: 5 mm}], scatterer: 1H}\n"
        "arms:\n  - {name: R, ring: {from: 30 deg, to: 50 deg}, edges: [30 deg, 35 deg, 38 deg, "
        "50 deg], azimuth: 90 deg}\n"
        "settings:\n  - {name: K, time: 1 h}\n";
    static const double middles[] = {32.5, 36.5, 44.0}, tolerances[] = {0.03, 0.01, 0.1};
    struct evaluated e = evaluate(text);
    bh_error err = {.text = ""};
    bh_curve *c =
        bh_curve_new(e.plan, &(bh_curve_request){.against = BH_AGAINST_ANGLE, .points = 41}, &err);
    ck_assert_msg(c != NULL, "%s", err.text);
    ck_assert_uint_eq(bh_curve_count(c), 41); /* half a degree apart */
    for (int i = 0; i < 3; i++) {
        const size_t at = (size_t)((middles[i] - 30.0) / 0.5 + 0.5);
        ck_assert_double_eq_tol(bh_curve_x(c, at), middles[i], 1e-9);
        ck_assert_relative(bh_curve_y(c, at, BH_COL_SOLID_ANGLE),
                           bin_cell(&e, (size_t)i, BH_COL_SOLID_ANGLE), 1e-6, "solid angle");
        ck_assert_relative(bh_curve_y(c, at, BH_COL_SIGNAL), bin_cell(&e, (size_t)i, BH_COL_SIGNAL),
                           tolerances[i], "signal");
        ck_assert(isnan(bh_curve_y(c, at, BH_COL_LIVE)));
        ck_assert(isnan(bh_curve_y(c, at, BH_COL_HOURS)));
        ck_assert_str_eq(bh_curve_marks(c, at), "K");
    }
    bh_curve_free(c);
    done(&e);
}
END_TEST

/* What is quick is the same at the centre of the arm. */
START_TEST(the_centre_is_the_centre)
{
    static const char text[] =
        "plan: 1\nbeam: {particle: electron, kinetic_energy: 855 MeV, current: 10 nA}\n"
        "target: {name: t, layers: [{material: liquid-hydrogen, thickness: 5 cm}], scatterer: 1H}\n"
        "arms: [{name: A, in_plane: ±60 mrad, out_of_plane: ±80 mrad, energy_cut: 10 MeV}]\n"
        "settings: [{name: K, angle: 40 deg, time: 1 h}]\n";
    struct evaluated e = evaluate(text);
    bh_curve_request r = {.against = BH_AGAINST_ANGLE, .points = 11};
    bh_curve *whole = bh_curve_new(e.plan, &r, NULL);
    r.centre = true;
    bh_curve *centre = bh_curve_new(e.plan, &r, NULL);
    ck_assert(whole && centre);
    ck_assert_uint_eq(bh_curve_count(whole), bh_curve_count(centre));
    for (size_t i = 0; i < bh_curve_count(whole); i++)
        ck_assert_relative(bh_curve_y(centre, i, BH_COL_POINT_CROSS_SECTION),
                           bh_curve_y(whole, i, BH_COL_POINT_CROSS_SECTION), 1e-9, "at angle");
    bh_curve_free(whole);
    bh_curve_free(centre);
    done(&e);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("curve values");
    tcase_add_test(tests, against_the_angle);
    tcase_add_test(tests, marks_stand_where_the_settings_do);
    tcase_add_test(tests, each_energy_is_marked_once);
    tcase_add_test(tests, against_the_energy);
    tcase_add_test(tests, against_q2);
    tcase_add_test(tests, q2_from_a_thousandth_on);
    tcase_add_test(tests, against_epsilon);
    tcase_add_test(tests, up_to_the_largest_angle);
    tcase_add_test(tests, another_structure_moves_the_curve);
    tcase_add_test(tests, what_cannot_be_is_refused);
    tcase_add_test(tests, a_ring_is_seen_slice_by_slice);
    tcase_add_test(tests, the_centre_is_the_centre);
    return run_suite("run/curve_values", tests);
}
