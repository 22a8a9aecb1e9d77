/* test_average.c - sums over acceptances: against brute force, splitting, cuts, odd functions. */
#include "beamhours/rates/average.h"

#include <gsl/gsl_integration.h>
#include <math.h>
#include <string.h>

#include "../suite.h"
#include "beamhours/units/constants.h"

#define D BH_DEGREE

/* --- cross sections to sum, each in closed form --- */

/* Electrons of 855 MeV on protons with a dipole form factor, roughly. */
static double mott(double theta)
{
    const double s2 = sin(theta / 2) * sin(theta / 2);
    const double recoil = 1 / (1 + 2 * 855 / 938.27 * s2);
    const double dipole = 1 + 4 * 0.855 * 0.855 * recoil * s2 / 0.71;
    return 0.07 * (1 - s2 + 0.01) / (s2 * s2) * recoil / pow(dipole, 4);
}

static double rutherford(double theta)
{
    return 1e-3 / pow(sin(theta / 2), 4);
}

/* Eight zeros between 10 and 115 degrees: a heavy sphere. */
static double diffraction(double theta)
{
    const double x = 16 * sin(theta / 2) + 1e-9;
    const double f = 3 * (sin(x) - x * cos(x)) / (x * x * x);
    return f * f / pow(sin(theta / 2), 4);
}

static double even(double theta)
{
    (void)theta;
    return 2.5;
}

static double nothing(double theta)
{
    (void)theta;
    return 0;
}

/* Grows like an inverse root towards 40 degrees and does not exist beyond. */
static double heavy_beam(double theta)
{
    return theta < 40 * D ? 1.0 / (theta * theta) / sqrt(40 * D - theta) : (double)NAN;
}

static double kinked(double theta)
{
    return 1 + fabs(theta - 31.1 * D);
}

static double jump(double theta)
{
    return theta < 31.1 * D ? 1 : 3;
}

typedef double angular(double theta);

static const struct {
    const char *what;
    angular *f;
} functions[] = {
    {"mott", mott}, {"rutherford", rutherford}, {"diffraction", diffraction}, {"even", even}};

/* What the averages call: one function of an angle for many angles. */
typedef struct {
    angular *f;
    double highest; /* [rad] largest angle asked for */
} caller;

static void call(void *context, size_t n, const double *theta, double *value)
{
    caller *c = context;
    for (size_t i = 0; i < n; i++) {
        value[i] = c->f(theta[i]);
        c->highest = fmax(c->highest, theta[i]);
    }
}

/* --- shapes, in degrees --- */

static const struct {
    const char *what;
    double angle, in, out;
} shapes[] = {{"spectrometer", 25, 1.6, 4}, {"wide", 60, 20, 15},      {"at 90", 90, 12, 30},
              {"backward", 150, 10, 10},    {"around 180", 178, 6, 6}, {"small", 12.54, 1.64, 3.44},
              {"near the beam", 6, 3, 3.5}};

static bh_acceptance arm(int i, int bins)
{
    const bh_acceptance_spec spec = {.shape = BH_ACCEPTANCE_RECTANGLE,
                                     .angle = shapes[i].angle * D,
                                     .in_plane_from = -shapes[i].in * D,
                                     .in_plane_to = shapes[i].in * D,
                                     .out_of_plane_from = -shapes[i].out * D,
                                     .out_of_plane_to = 0.9 * shapes[i].out * D,
                                     .bins = bins};
    bh_acceptance out;
    ck_assert_int_eq(bh_acceptance_make(&spec, &out, NULL), BH_OK);
    return out;
}

static bh_average_workspace *space;

static void open_space(void)
{
    space = bh_average_workspace_new();
    ck_assert_ptr_nonnull(space);
}

static void close_space(void)
{
    bh_average_workspace_free(space);
    bh_average_workspace_free(NULL);
}

static bh_average sum_of(const bh_acceptance *a, const bh_average_request *r, bh_average *bins)
{
    bh_averages out = {.bins = bins};
    bh_error err;
    ck_assert_msg(bh_average_over(a, r, space, &out, &err) == BH_OK, "%s", err.text);
    return out.whole;
}

/* --- brute force over both angles --- */

typedef struct {
    angular *f;
    double in; /* [rad] */
    const bh_acceptance_part *part;
    gsl_integration_workspace *inner;
} brute;

static double polar_angle(double in, double out)
{
    const double si = sin(in / 2);
    const double so = sin(out / 2);
    return 2 * asin(sqrt(si * si * cos(out) + so * so));
}

static double at_out(double out, void *data)
{
    const brute *b = data;
    return b->f(polar_angle(b->in, out)) * cos(out);
}

static double at_in(double in, void *data)
{
    brute *b = data;
    b->in = in;
    gsl_function f = {at_out, b};
    double value;
    double error;
    gsl_integration_qag(&f, b->part->out_from, b->part->out_to, 0, 1e-9, 200, GSL_INTEG_GAUSS21,
                        b->inner, &value, &error);
    return value;
}

/* GSL's adaptive rules, one inside the other. */
static double by_force(const bh_acceptance_part *part, angular *g)
{
    brute b = {g, 0, part, gsl_integration_workspace_alloc(200)};
    gsl_integration_workspace *outer = gsl_integration_workspace_alloc(200);
    gsl_function f = {at_in, &b};
    double value;
    double error;
    gsl_integration_qag(&f, part->in_from, part->in_to, 0, 1e-8, 200, GSL_INTEG_GAUSS21, outer,
                        &value, &error);
    gsl_integration_workspace_free(outer);
    gsl_integration_workspace_free(b.inner);
    return value;
}

/* Midpoints, of which those count whose angle lies in one of two intervals. */
static double on_a_grid(const bh_acceptance_part *part, angular *g, const bh_interval allowed[2])
{
    enum { IN = 1500, OUT = 301 };
    const double in_step = (part->in_to - part->in_from) / IN;
    const double out_step = (part->out_to - part->out_from) / OUT;
    double sum = 0;
    for (int i = 0; i < IN * OUT; i++) {
        const double out = part->out_from + (i / IN + 0.5) * out_step;
        const double theta = polar_angle(part->in_from + (i % IN + 0.5) * in_step, out);
        const int counts = (theta >= allowed[0].from && theta <= allowed[0].to) ||
                           (theta >= allowed[1].from && theta <= allowed[1].to);
        sum += counts ? g(theta) * cos(out) : 0;
    }
    return sum * in_step * out_step;
}

START_TEST(sums_are_brute_force)
{
    const int s = _i % COUNT(shapes);
    const int f = _i / COUNT(shapes);
    const bh_acceptance a = arm(s, 1);
    caller c = {.f = functions[f].f};
    const bh_average_request r = {.function = call, .context = &c};
    const bh_average whole = sum_of(&a, &r, NULL);
    const double exact = by_force(&a.whole, functions[f].f);
    ck_assert_msg(whole.converged && whole.error < 1e-6, "%s, %s: %g", shapes[s].what,
                  functions[f].what, whole.error);
    ck_assert_msg(fabs(whole.total / exact - 1) < 1e-7, "%s, %s: %.10g, brute force %.10g",
                  shapes[s].what, functions[f].what, whole.total, exact);
    ck_assert(whole.kept == whole.total && whole.solid_angle == a.whole.solid_angle);
}
END_TEST

START_TEST(splitting_conserves)
{
    static const int counts[] = {1, 2, 7, 20, 1000};
    const int s = _i % COUNT(shapes);
    const int f = _i / COUNT(shapes);
    caller c = {.f = functions[f].f};
    const bh_average_request r = {.function = call, .context = &c};
    const bh_acceptance one = arm(s, 1);
    const double alone = sum_of(&one, &r, NULL).total;
    for (int i = 0; i < COUNT(counts); i++) {
        static bh_average bins[1000];
        const bh_acceptance a = arm(s, counts[i]);
        const bh_average whole = sum_of(&a, &r, bins);
        double sum = 0;
        double off = 0;
        for (int b = 0; b < a.bins; b++) {
            sum += bins[b].total;
            off += bins[b].error * bins[b].total;
            ck_assert_msg(bins[b].converged, "%s, %s: bin %d of %d is off by %g", shapes[s].what,
                          functions[f].what, b + 1, a.bins, bins[b].error);
        }
        ck_assert_msg(fabs(whole.total / alone - 1) < 2e-7, "%s, %s in %d bins: %.10g not %.10g",
                      shapes[s].what, functions[f].what, counts[i], whole.total, alone);
        ck_assert_double_eq_tol(sum / whole.total, 1, 1e-12);
        ck_assert_double_eq_tol(off / sum, whole.error, 1e-6 * whole.error + 1e-16);
    }
}
END_TEST

START_TEST(cuts_keep_their_part)
{
    const int s = _i % COUNT(shapes);
    const int f = _i / COUNT(shapes);
    const bh_acceptance a = arm(s, 5);
    const double width = a.whole.polar.to - a.whole.polar.from;
    const double edges[] = {a.whole.polar.from + 0.13 * width, a.whole.polar.from + 0.58 * width,
                            a.whole.polar.from + 0.81 * width};
    const bh_interval allowed[] = {{edges[0], edges[1]}, {edges[2], 4}};
    const bh_interval rest[] = {{0, edges[0]}, {edges[1], edges[2]}};
    caller c = {.f = functions[f].f};
    bh_average bins[5];
    bh_average_request r = {
        .function = call, .context = &c, .cut = true, .allowed_count = 2, .allowed = allowed};
    const bh_average kept = sum_of(&a, &r, bins);
    const double in_bins = bins[0].kept + bins[1].kept + bins[2].kept + bins[3].kept + bins[4].kept;
    r.allowed = rest;
    const bh_average lost = sum_of(&a, &r, bins);
    ck_assert_msg(kept.converged && lost.converged, "%s, %s", shapes[s].what, functions[f].what);
    ck_assert_double_eq_tol(in_bins / kept.kept, 1, 1e-12);
    ck_assert_msg(fabs((kept.kept + lost.kept) / kept.total - 1) < 1e-7, "%s, %s: %g",
                  shapes[s].what, functions[f].what, (kept.kept + lost.kept) / kept.total - 1);
    const bh_acceptance single = arm(s, 1);
    r.allowed = allowed;
    r.kept_only = true; /* the same, without what it would be out of */
    const bh_average alone = sum_of(&a, &r, bins);
    ck_assert(alone.converged && alone.total == alone.kept);
    ck_assert_double_eq_tol(alone.kept / kept.kept, 1, 1e-9);
    r.kept_only = false;
    ck_assert_double_eq_tol(sum_of(&single, &r, NULL).kept / kept.kept, 1, 1e-6);
    /* a grid sees the edges as steps: few digits */
    const double exact = on_a_grid(&a.whole, functions[f].f, allowed);
    ck_assert_msg(fabs(kept.kept / exact - 1) < 3e-4, "%s, %s: %g not %g", shapes[s].what,
                  functions[f].what, kept.kept, exact);
}
END_TEST

START_TEST(all_and_nothing)
{
    const bh_acceptance a = arm(0, 1);
    caller c = {.f = mott};
    const bh_interval all = {0, 4};
    const bh_interval elsewhere = {1, 2};
    bh_average_request r = {.function = call, .context = &c, .cut = true};
    ck_assert(sum_of(&a, &r, NULL).kept == 0);
    r.allowed_count = 1;
    r.allowed = &all;
    const bh_average every = sum_of(&a, &r, NULL);
    ck_assert(every.kept == every.total && every.total > 0);
    r.allowed = &elsewhere;
    ck_assert(sum_of(&a, &r, NULL).kept == 0);
    c.f = nothing;
    const bh_average none = sum_of(&a, &r, NULL);
    ck_assert(none.total == 0 && none.kept == 0 && none.converged && none.error == 0);
}
END_TEST

START_TEST(rings_in_closed_form)
{
    /* integral of 1 / sin^4(theta/2) over a ring is 4 pi (1/sin^2 a - 1/sin^2 b) of half angles */
    const bh_acceptance_spec spec = {.shape = BH_ACCEPTANCE_RING,
                                     .ring_from = 5 * D,
                                     .ring_to = 175 * D,
                                     .solid_angle = 1,
                                     .bins = 34};
    bh_acceptance a;
    ck_assert_int_eq(bh_acceptance_make(&spec, &a, NULL), BH_OK);
    caller c = {.f = rutherford};
    bh_average bins[34];
    const bh_interval allowed = {0, 47 * D};
    const bh_average_request r = {
        .function = call, .context = &c, .cut = true, .allowed_count = 1, .allowed = &allowed};
    const bh_average whole = sum_of(&a, &r, bins);
    for (int i = 0; i < 34; i++) {
        const double lo = pow(sin((5 + 5 * i) * D / 2), -2);
        const double hi = pow(sin((10 + 5 * i) * D / 2), -2);
        const double cut = pow(sin(47 * D / 2), -2);
        const double unit = 1e-3 * 4 * BH_PI * a.whole.scale;
        ck_assert_double_eq_tol(bins[i].total / (unit * (lo - hi)), 1, 1e-8);
        ck_assert_double_eq_tol(bins[i].kept / bins[i].total,
                                i < 8 ? 1 : (i > 8 ? 0 : (lo - cut) / (lo - hi)), 1e-8);
    }
    ck_assert(whole.converged && whole.solid_angle == 1);
}
END_TEST

START_TEST(a_point_is_one_value)
{
    const bh_acceptance_spec spec = {
        .shape = BH_ACCEPTANCE_POINT, .angle = 33 * D, .solid_angle = 0.006};
    bh_acceptance a;
    ck_assert_int_eq(bh_acceptance_make(&spec, &a, NULL), BH_OK);
    caller c = {.f = mott};
    const bh_interval allowed[] = {{10 * D, 20 * D}, {30 * D, 33 * D}};
    bh_average_request r = {
        .function = call, .context = &c, .cut = true, .allowed_count = 2, .allowed = allowed};
    bh_average bin;
    const bh_average whole = sum_of(&a, &r, &bin);
    ck_assert_double_eq_tol(whole.total / (mott(33 * D) * 0.006), 1, 1e-13);
    ck_assert(whole.kept == whole.total && bin.total == whole.total && whole.converged);
    r.allowed_count = 1;
    ck_assert(sum_of(&a, &r, NULL).kept == 0);
    r.limit = 20 * D;
    ck_assert(sum_of(&a, &r, NULL).total == 0);
}
END_TEST

START_TEST(edges_leave_the_whole_alone)
{
    const double edges[] = {24 * D, 25 * D, 25.5 * D};
    bh_acceptance a = arm(0, 1);
    caller c = {.f = mott};
    const bh_average_request r = {.function = call, .context = &c};
    const double alone = sum_of(&a, &r, NULL).total;
    bh_acceptance_spec spec = a.spec;
    spec.bins = 2;
    spec.edges = edges;
    ck_assert_int_eq(bh_acceptance_make(&spec, &a, NULL), BH_OK);
    bh_average bins[2];
    const bh_average whole = sum_of(&a, &r, bins);
    ck_assert_double_eq_tol(whole.total / alone, 1, 1e-7);
    ck_assert(bins[0].total + bins[1].total < 0.6 * alone);
    ck_assert(bins[0].total > bins[1].total);
}
END_TEST

/* The part of brute force below the largest angle, in s = sqrt(limit - theta). */
static double below_limit(double s, void *part)
{
    const double theta = 40 * D - s * s;
    return 2 / (theta * theta) * bh_acceptance_weight(part, theta);
}

START_TEST(a_limit_with_its_root)
{
    const double arms[] = {37, 39.5, 41};
    const bh_acceptance_spec spec = {.shape = BH_ACCEPTANCE_RECTANGLE,
                                     .angle = arms[_i] * D,
                                     .in_plane_from = -2 * D,
                                     .in_plane_to = 2 * D,
                                     .out_of_plane_from = -3 * D,
                                     .out_of_plane_to = 3 * D,
                                     .bins = 4};
    bh_acceptance a;
    ck_assert_int_eq(bh_acceptance_make(&spec, &a, NULL), BH_OK);
    caller c = {.f = heavy_beam};
    const bh_average_request r = {.function = call, .context = &c, .limit = 40 * D};
    bh_average bins[4];
    const bh_average whole = sum_of(&a, &r, bins);
    gsl_integration_workspace *inner = gsl_integration_workspace_alloc(500);
    gsl_function f = {below_limit, &a.whole};
    double exact;
    double error;
    const double end = sqrt(40 * D - a.whole.polar.from);
    gsl_integration_qag(&f, 0, end, 0, 1e-9, 500, GSL_INTEG_GAUSS61, inner, &exact, &error);
    gsl_integration_workspace_free(inner);
    ck_assert(c.highest < 40 * D);
    ck_assert_msg(whole.converged, "%g deg: error %g", arms[_i], whole.error);
    ck_assert_msg(fabs(whole.total / exact - 1) < 1e-6, "%g deg: %.9g not %.9g", arms[_i],
                  whole.total, exact);
}
END_TEST

START_TEST(fit_once_and_move_the_arm)
{
    const bh_acceptance a = arm(0, 3);
    bh_acceptance_spec moved = a.spec;
    moved.angle += 1e-3;
    bh_acceptance b;
    ck_assert_int_eq(bh_acceptance_make(&moved, &b, NULL), BH_OK);
    caller c = {.f = mott};
    const bh_average_request r = {.function = call, .context = &c};
    const bh_interval polar = {a.whole.polar.from, b.whole.polar.to};
    bh_average bins[3];
    bh_averages here = {.bins = bins};
    bh_averages there = {.bins = bins};
    ck_assert_int_eq(bh_average_fit(&r, polar, space, NULL), BH_OK);
    const size_t calls = bh_average_calls(space);
    ck_assert_int_eq(bh_average_sum(&a, &r, space, &here, NULL), BH_OK);
    ck_assert_int_eq(bh_average_sum(&b, &r, space, &there, NULL), BH_OK);
    ck_assert_uint_eq(bh_average_calls(space), calls);
    ck_assert(calls <= 17);
    ck_assert_double_eq_tol(here.whole.total / sum_of(&a, &r, NULL).total, 1, 1e-7);
    ck_assert(there.whole.total < here.whole.total);
    ck_assert_double_eq_tol(bh_average_value(space, 25 * D) / mott(25 * D), 1, 1e-8);
    ck_assert(isnan(bh_average_value(space, 45 * D)));
    bh_error err;
    here.whole.total = 77;
    ck_assert_int_eq(bh_average_sum(&b, &r, space, &here, &err), BH_EDOMAIN);
    ck_assert(here.whole.total == 77);
}
END_TEST

START_TEST(used_or_new_workspace_same_bits)
{
    const bh_acceptance a = arm(1, 9);
    caller c = {.f = diffraction};
    const bh_average_request r = {.function = call, .context = &c};
    bh_average fresh[9];
    bh_average used[9];
    memset(fresh, 0, sizeof fresh);
    memset(used, 0, sizeof used);
    (void)sum_of(&a, &r, fresh);
    c.f = mott;
    (void)sum_of(&a, &r, used);
    c.f = diffraction;
    (void)sum_of(&a, &r, used);
    for (int i = 0; i < 9; i++)
        ck_assert(fresh[i].total == used[i].total && fresh[i].error == used[i].error);
}
END_TEST

START_TEST(rough_functions_say_so_or_are_right)
{
    const bh_acceptance a = arm(1, 1); /* 40 to 80 degrees; the step lies outside */
    const bh_acceptance_spec spec = {
        .shape = BH_ACCEPTANCE_RING, .ring_from = 30 * D, .ring_to = 33 * D, .bins = 1};
    bh_acceptance ring;
    ck_assert_int_eq(bh_acceptance_make(&spec, &ring, NULL), BH_OK);
    caller c = {.f = jump};
    const bh_average_request r = {.function = call, .context = &c};
    ck_assert(sum_of(&a, &r, NULL).converged);
    const bh_average stepped = sum_of(&ring, &r, NULL);
    const double exact =
        2 * BH_PI * ((cos(30 * D) - cos(31.1 * D)) + 3 * (cos(31.1 * D) - cos(33 * D)));
    ck_assert_double_eq_tol(stepped.total / exact, 1, 1e-4);
    c.f = kinked;
    const bh_average bent = sum_of(&ring, &r, NULL);
    ck_assert(!bent.converged || bent.error <= 1e-6);
    const bh_average_request sharp = {.function = call, .context = &c, .tolerance = 1e-15};
    ck_assert(!sum_of(&ring, &sharp, NULL).converged);
}
END_TEST

START_TEST(bad_functions_are_refused)
{
    bh_acceptance a = arm(0, 1);
    caller c = {.f = heavy_beam};
    bh_average_request r = {.function = call, .context = &c};
    bh_averages out = {.whole = {.total = 77}};
    bh_error err;
    bh_acceptance_spec spec = a.spec;
    spec.angle = 40 * D;
    ck_assert_int_eq(bh_acceptance_make(&spec, &a, NULL), BH_OK);
    ck_assert_int_eq(bh_average_over(&a, &r, space, &out, &err), BH_EDOMAIN);
    ck_assert(out.whole.total == 77 && strstr(err.text, "deg"));
    spec.angle = 0.01; /* the beam axis inside */
    ck_assert_int_eq(bh_acceptance_make(&spec, &a, NULL), BH_OK);
    c.f = rutherford;
    ck_assert_int_eq(bh_average_over(&a, &r, space, &out, &err), BH_EDOMAIN);
    c.f = even; /* finite there: no harm */
    ck_assert_double_eq_tol(sum_of(&a, &r, NULL).total, 2.5 * a.whole.solid_angle, 1e-9);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("average");
    const int pairs = COUNT(shapes) * COUNT(functions);
    tcase_set_timeout(tests, 120);
    tcase_add_checked_fixture(tests, open_space, close_space);
    tcase_add_loop_test(tests, sums_are_brute_force, 0, pairs);
    tcase_add_loop_test(tests, splitting_conserves, 0, pairs);
    tcase_add_loop_test(tests, cuts_keep_their_part, 0, pairs);
    tcase_add_test(tests, all_and_nothing);
    tcase_add_test(tests, rings_in_closed_form);
    tcase_add_test(tests, a_point_is_one_value);
    tcase_add_test(tests, edges_leave_the_whole_alone);
    tcase_add_loop_test(tests, a_limit_with_its_root, 0, 3);
    tcase_add_test(tests, fit_once_and_move_the_arm);
    tcase_add_test(tests, used_or_new_workspace_same_bits);
    tcase_add_test(tests, rough_functions_say_so_or_are_right);
    tcase_add_test(tests, bad_functions_are_refused);
    return run_suite("average", tests);
}
