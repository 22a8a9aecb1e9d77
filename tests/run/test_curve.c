/* test_curve.c - a curve is the setting itself, evaluated at other places. */
#include "evaluated.h"

#include "beamhours/run/curve.h"

#define BEAM                                                                                     \
    "plan: 1\nmodels: {energy_loss: none}\nbeam: {particle: electron, kinetic_energy: 400 MeV, " \
    "current: 10 uA}\n"
#define TARGET "target: {layers: [{material: carbon-12, thickness: 1 mm}]}\n"
static const char *const plan =
    BEAM TARGET "arms:\n  - {name: A, in_plane: ±28 mrad, out_of_plane: ±70 mrad}\n"
                "  - {name: R, detects: recoil, solid_angle: 1 msr, angle_range: {from: 20 deg, "
                "to: 80 deg}}\n"
                "  - {name: O, ring: {from: 20 deg, to: 30 deg}}\n"
                "settings:\n  - {name: K1, arm: A, angle: 30 deg}\n"
                "  - {name: K2, arm: A, angle: 45 deg}\n"
                "  - {name: K3, arm: A, angle: 45 deg, beam: {kinetic_energy: 500 MeV}}\n"
                "  - {name: K4, arm: R, angle: 60 deg}\n"
                "  - {name: K5, arm: A, angle: 45 deg, beam: {particle: muon-}}\n"
                "  - {name: K6, arm: O}\n";

static bh_curve *curve(const struct evaluated *e, const bh_curve_request *r)
{
    bh_error err = {.code = BH_OK};
    bh_curve *c = bh_curve_new(e->plan, r, &err);
    ck_assert_msg(c != NULL, "%s", err.text);
    return c;
}

static const struct {
    bh_curve_request request;
    const char *key;
    double lo, hi;
    const char *marks; /* names, one point after the other, without repetition */
} curves[] = {
    {{"K1", "A", BH_AGAINST_ANGLE, NULL, false, 0, NULL, NULL}, "angle_deg", 5, 175, "K1 K2"},
    {{"K2", "A", BH_AGAINST_Q2, NULL, false, 0, NULL, NULL}, "q2_GeV2", 4e-4, 0.7, "K1 K2"},
    {{"K2", "A", BH_AGAINST_ENERGY, NULL, false, 0, NULL, NULL},
     "beam_kinetic_MeV",
     100,
     1600,
     "K2 K3"},
    {{"K2", "A", BH_AGAINST_EPSILON, NULL, false, 0, NULL, NULL}, "epsilon", 0.02, 0.98, "K2"},
    {{"K4", "R", BH_AGAINST_ANGLE, NULL, false, 0, NULL, NULL}, "angle_deg", 20, 80, "K4"},
    {{"K6", "O", BH_AGAINST_ANGLE, NULL, false, 0, NULL, NULL}, "angle_deg", 20, 30, "K6"},
    {{"K6", "O", BH_AGAINST_ENERGY, NULL, false, 0, NULL, NULL},
     "beam_kinetic_MeV",
     100,
     1600,
     "K6"},
};

START_TEST(points_rise_and_settings_are_marked)
{
    struct evaluated e = read_text(plan);
    bh_curve *c = curve(&e, &curves[_i].request);
    char seen[256] = "", last[64] = "";
    ck_assert_str_eq(bh_curve_key(curves[_i].request.against), curves[_i].key);
    ck_assert_uint_gt(bh_curve_count(c), 10);
    for (size_t i = 0; i < bh_curve_count(c); i++) {
        const double x = bh_curve_x(c, i);
        ck_assert(x >= curves[_i].lo * (1 - 1e-9) && x <= curves[_i].hi * (1 + 1e-9));
        ck_assert(i == 0 || x > bh_curve_x(c, i - 1));
        ck_assert_double_gt(bh_curve_y(c, i, BH_COL_CROSS_SECTION), 0);
        const char *marks = bh_curve_marks(c, i);
        if (marks[0] && strcmp(marks, last) != 0) {
            snprintf(last, sizeof last, "%s", marks);
            strcat(strcat(seen, seen[0] ? " " : ""), marks);
        }
    }
    ck_assert_str_eq(seen, curves[_i].marks);
    bh_curve_free(c);
    done(&e);
}
END_TEST

/* Each point is what a plan that says so gives. */
START_TEST(a_point_is_a_setting)
{
    struct evaluated e = read_text(plan);
    bh_curve *c =
        curve(&e, &(bh_curve_request){"K1", "A", BH_AGAINST_ANGLE, NULL, false, 0, NULL, NULL});
    for (size_t i = 0; i < bh_curve_count(c); i += 20) {
        char text[1024];
        snprintf(text, sizeof text,
                 BEAM TARGET "arms: [{name: A, in_plane: ±28 mrad, out_of_plane: ±70 mrad}]\n"
                             "settings: [{name: K, angle: %.17g deg}]\n",
                 bh_curve_x(c, i));
        struct evaluated f = evaluate(text);
        ck_assert_relative(bh_curve_y(c, i, BH_COL_SIGNAL), cell(&f, 0, BH_COL_SIGNAL), 1e-9,
                           "signal");
        ck_assert_relative(bh_curve_y(c, i, BH_COL_Q2), cell(&f, 0, BH_COL_Q2), 1e-12, "Q2");
        done(&f);
    }
    bh_curve_free(c);
    done(&e);
}
END_TEST

START_TEST(epsilon_varies_at_the_same_q2)
{
    struct evaluated e = read_text(plan);
    bh_curve *c =
        curve(&e, &(bh_curve_request){"K1", "A", BH_AGAINST_EPSILON, NULL, false, 0, NULL, NULL});
    for (size_t i = 0; i < bh_curve_count(c); i++) {
        ck_assert_relative(bh_curve_y(c, i, BH_COL_Q2), bh_curve_y(c, 0, BH_COL_Q2), 1e-9, "Q2");
        ck_assert_relative(bh_curve_y(c, i, BH_COL_EPSILON), bh_curve_x(c, i), 1e-9, "epsilon");
    }
    bh_curve_free(c);
    done(&e);
}
END_TEST

START_TEST(another_structure_changes_the_struck_nucleus)
{
    struct evaluated e = read_text(plan);
    bh_curve *a =
        curve(&e, &(bh_curve_request){"K1", "A", BH_AGAINST_ANGLE, "point", false, 0, NULL, NULL});
    bh_curve *b =
        curve(&e, &(bh_curve_request){"K1", "A", BH_AGAINST_ANGLE, NULL, false, 0, NULL, NULL});
    ck_assert_uint_eq(bh_curve_count(a), bh_curve_count(b));
    for (size_t i = 0; i < bh_curve_count(a); i++)
        ck_assert_double_gt(bh_curve_y(a, i, BH_COL_POINT_CROSS_SECTION),
                            bh_curve_y(b, i, BH_COL_POINT_CROSS_SECTION));
    bh_curve_free(a);
    bh_curve_free(b);
    done(&e);
}
END_TEST

/* Models are asked for what is in the sample, not for what nature has most of. */
START_TEST(models_of_the_isotope_in_the_sample)
{
    struct evaluated e =
        read_text(BEAM "target: {scatterer: H, layers: [{material: liquid-deuterium, thickness: 1 "
                       "cm}]}\narms: [{name: A, in_plane: ±28 mrad, out_of_plane: ±70 mrad}]\n"
                       "settings: [{name: K1, angle: 30 deg}]\n");
    static const char *const models[] = {"abbott-2000-i", "abbott-2000-ii"};
    double last = 0;
    for (int i = 0; i < 2; i++) {
        bh_curve_request r = {.against = BH_AGAINST_ANGLE, .structure = models[i]};
        bh_curve *c = curve(&e, &r);
        const double here = bh_curve_y(c, 20, BH_COL_POINT_CROSS_SECTION);
        ck_assert(here > 0 && here != last);
        last = here;
        bh_curve_free(c);
    }
    bh_error err = {.code = BH_OK};
    const bh_curve_request proton = {.against = BH_AGAINST_ANGLE, .structure = "kelly-2004"};
    ck_assert_ptr_null(bh_curve_new(e.plan, &proton, &err));
    ck_assert_ptr_nonnull(strstr(err.text, "does not describe 2H"));
    done(&e);
}
END_TEST

static const struct {
    bh_curve_request request;
    const char *words;
} mistakes[] = {
    {{"K9", NULL, BH_AGAINST_ANGLE, NULL, false, 0, NULL, NULL},
     "no setting \"K9\"; there are K1, K2, K3"},
    {{"K1", "B", BH_AGAINST_ANGLE, NULL, false, 0, NULL, NULL},
     "setting K1 has no arm \"B\"; there is A"},
    {{"K6", "O", BH_AGAINST_EPSILON, NULL, false, 0, NULL, NULL}, "a ring stands still"},
    {{"K1", "A", BH_AGAINST_ANGLE, "kelly-2004", false, 0, NULL, NULL}, "does not describe 12C"},
    {{"K1", "A", BH_AGAINST_ANGLE, "fermi-2q", false, 0, NULL, NULL}, "did you mean"},
};

START_TEST(what_cannot_be_drawn_is_refused)
{
    struct evaluated e = read_text(plan);
    bh_error err = {.code = BH_OK};
    ck_assert_ptr_null(bh_curve_new(e.plan, &mistakes[_i].request, &err));
    ck_assert_int_eq(err.code, BH_EDOMAIN);
    ck_assert_msg(strstr(err.text, mistakes[_i].words) != NULL, "%s", err.text);
    ck_assert_ptr_null(bh_curve_new(e.plan, &mistakes[_i].request, NULL));
    done(&e);
}
END_TEST

/* Bernauer et al. (A1), Phys. Rev. C 90 (2014) 015206: cross sections up to Q2 0.977 GeV2. */
START_TEST(a_model_ends_somewhere)
{
    struct evaluated e = read_text(BEAM "target: {name: T, scatterer: H, layers: [{material: "
                                        "liquid-hydrogen, thickness: 5 cm}]}\n"
                                        "arms: [{name: A, in_plane: ±28 mrad, out_of_plane: ±70 "
                                        "mrad}]\nsettings: [{name: K1, angle: 30 deg, beam: "
                                        "{kinetic_energy: 1500 MeV}}]\n");
    const bh_curve_request request = {.structure = "a1-2014"};
    bh_curve *c = curve(&e, &request);
    const bh_curve_model m = bh_curve_structure(c);
    size_t inside = 0;
    ck_assert_str_eq(m.name, "a1-2014");
    ck_assert(m.low == 0 && m.high == 0.977);
    for (size_t i = 0; i < bh_curve_count(c); i++) {
        ck_assert(bh_curve_inside(c, i) == (bh_curve_y(c, i, BH_COL_Q2) <= 0.977));
        inside += bh_curve_inside(c, i);
    }
    ck_assert(inside > 0 && inside < bh_curve_count(c));
    bh_curve_free(c);
    done(&e);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("curve");
    tcase_add_loop_test(tests, points_rise_and_settings_are_marked, 0, COUNT(curves));
    tcase_add_test(tests, a_point_is_a_setting);
    tcase_add_test(tests, epsilon_varies_at_the_same_q2);
    tcase_add_test(tests, models_of_the_isotope_in_the_sample);
    tcase_add_test(tests, another_structure_changes_the_struck_nucleus);
    tcase_add_loop_test(tests, what_cannot_be_drawn_is_refused, 0, COUNT(mistakes));
    bh_curve_free(NULL);
    tcase_add_test(tests, a_model_ends_somewhere);
    return run_suite("run/curve", tests);
}
