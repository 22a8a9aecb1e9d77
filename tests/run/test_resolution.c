/* test_resolution.c - bins and bites under resolutions, against events drawn one by one. */
#include "../counter_random.h"
#include "beamhours/physics/structure.h"
#include "beamhours/run/channel.h"
#include "beamhours/units/constants.h"
#include "evaluated.h"

enum { BINS = 6, EVENTS = 200000 };

static const double half_in = 0.04, half_out = 0.06, width = 2 * 0.04 / BINS;

static void write_plan(char *text, size_t size, const char *arm, const char *beam,
                       const char *model)
{
    snprintf(text, size,
             "plan: 1\nbeam: {particle: electron, kinetic_energy: 855 MeV, current: 1 uA%s}\n"
             "target: {layers: [{material: liquid-hydrogen, thickness: 20 mm}]}\n"
             "models: {energy_loss: %s, structure: dipole}\n"
             "arms:\n  - {name: A, in_plane: ±40 mrad, out_of_plane: ±60 mrad%s}\n"
             "settings:\n  - {name: K, angle: 40 deg, time: 1 h}\n",
             beam, model, arm);
}

static struct evaluated table_of(const char *arm, const char *beam, const char *model)
{
    char text[1024];
    write_plan(text, sizeof text, arm, beam, model);
    return evaluate(text);
}

/* --- events drawn one by one; only the point cross section is the program's --- */

struct drawing {
    double angle_rms, momentum_rms, energy_rms, spread;
    double bite;      /* half, relative to the momentum on the axis */
    double threshold; /* [MeV] kinetic */
};

static bh_structure *structure;

static double momentum_of(double kinetic)
{
    return sqrt(kinetic * (kinetic + 2 * BH_MASS_ELECTRON));
}

static double scattered_momentum(double kinetic, double theta)
{
    const bh_collision in = {BH_MASS_ELECTRON, BH_MASS_PROTON, kinetic};
    bh_event e;
    ck_assert_int_eq(bh_kinematics_scattered(&in, theta, BH_BRANCH_FAST, &e, NULL), BH_OK);
    return e.scattered_momentum;
}

static double point(double theta)
{
    static const bh_particle electron = {.name = "electron",
                                         .kind = BH_KIND_LEPTON,
                                         .mass = BH_MASS_ELECTRON,
                                         .charge = -1,
                                         .twice_spin = 1};
    const bh_channel c = {.process = bh_process_find("elastic"),
                          .encounter = {.beam = &electron,
                                        .charge = -1,
                                        .z = 1,
                                        .a = 1,
                                        .target = BH_MASS_PROTON,
                                        .kinetic = 855,
                                        .structure = structure}};
    double sigma, momentum;
    bh_channel_eval(&c, 1, &theta, &sigma, &momentum);
    return sigma;
}

struct drawn {
    double sum[BINS], squares[BINS]; /* weights of events counted, by measured bin */
    double all;                      /* weights of all in the aperture */
};

static void draw(uint64_t seed, const struct drawing *d, struct drawn *out)
{
    const double axis = 40 * BH_DEGREE, central = scattered_momentum(855, axis);
    *out = (struct drawn){.all = 0};
    for (uint64_t n = 0; n < EVENTS; n++) {
        double u[2];
        even_pair(seed, n, 0, u);
        const double in = half_in * (2 * u[0] - 1);
        const double out_of = asin(sin(half_out) * (2 * u[1] - 1));
        const double theta = acos(cos(out_of) * cos(axis + in));
        const double weight = point(theta);
        const double beam = momentum_of(855) * (1 + d->spread * normal_deviate(seed, n, 1));
        const double kinetic = beam * beam / (sqrt(beam * beam + 0.2611) + BH_MASS_ELECTRON);
        double p = scattered_momentum(kinetic, theta);
        p += p * d->momentum_rms * normal_deviate(seed, n, 2);
        p += d->energy_rms * normal_deviate(seed, n, 3); /* beta is 1 */
        out->all += weight;
        if (d->bite > 0 && fabs(p / central - 1) > d->bite)
            continue;
        if (p < momentum_of(d->threshold))
            continue;
        const double measured = in + d->angle_rms * normal_deviate(seed, n, 4);
        const int bin = (int)floor((measured + half_in) / width);
        const int k = bin < 0 ? 0 : bin >= BINS ? BINS - 1 : bin;
        out->sum[k] += weight;
        out->squares[k] += weight * weight;
    }
}

/* What the table has of a bin, relative to all that pass the aperture. */
static double share_of(const struct evaluated *e, size_t bin)
{
    const double whole = cell(e, 0, BH_COL_CROSS_SECTION) * cell(e, 0, BH_COL_SOLID_ANGLE);
    return bin_cell(e, bin, BH_COL_CROSS_SECTION) * bin_cell(e, bin, BH_COL_SOLID_ANGLE) *
           bin_cell(e, bin, BH_COL_KEPT) / whole;
}

static const struct {
    const char *arm, *beam;
    struct drawing as;
} cases[] = {
    {", bins: 6, angle_resolution: 6 mrad", "", {.angle_rms = 6e-3}},
    {", bins: 6, angle_resolution: 40 mrad", "", {.angle_rms = 40e-3}},
    {", bins: 6, momentum_bite: ±2 %, momentum_resolution: 0.5 %",
     "",
     {.momentum_rms = 5e-3, .bite = 0.02}},
    {", bins: 6, momentum_bite: ±2 %, energy_resolution: 8 MeV",
     "",
     {.energy_rms = 8, .bite = 0.02}},
    {", bins: 6, momentum_bite: ±2 %", ", momentum_spread: 1 %", {.spread = 1e-2, .bite = 0.02}},
    {", bins: 6, momentum_bite: ±2.2 %, momentum_resolution: 0.4 %, angle_resolution: 5 mrad",
     ", momentum_spread: 0.6 %",
     {.angle_rms = 5e-3, .momentum_rms = 4e-3, .spread = 6e-3, .bite = 0.022}},
    {", bins: 6, threshold: 703 MeV, momentum_resolution: 0.5 %",
     "",
     {.momentum_rms = 5e-3, .threshold = 703}},
    {", bins: 6, momentum_bite: ±1 %, momentum_resolution: 0.01 %",
     "",
     {.momentum_rms = 1e-4, .bite = 0.01}},
};

START_TEST(as_events_drawn)
{
    static const uint64_t seeds[] = {3, 33, 333};
    const int k = _i / COUNT(seeds);
    const uint64_t seed = seeds[_i % COUNT(seeds)];
    struct evaluated e = table_of(cases[k].arm, cases[k].beam, "none");
    struct drawn drawn;
    structure = bh_structure_new("dipole", 1, 1, NULL);
    draw(seed, &cases[k].as, &drawn);
    double chi2 = 0;
    for (size_t i = 0; i < BINS; i++) {
        const double got = share_of(&e, i), found = drawn.sum[i] / drawn.all;
        const double sigma = sqrt(drawn.squares[i] * (1 - found)) / drawn.all;
        if (got == 0 && found == 0)
            continue;
        const double pull = (got - found) / sigma;
        ck_assert_msg(fabs(pull) < 4.5, "%s, bin %d: %g, drawn %g +- %g", cases[k].arm, (int)i + 1,
                      got, found, sigma);
        chi2 += pull * pull;
    }
    /* 6 degrees of freedom: 22.5 has a probability of 0.001 */
    ck_assert_msg(chi2 < 22.5, "%s%s, seed %d: chi2 %g", cases[k].arm, cases[k].beam, (int)seed,
                  chi2);
    bh_structure_free(structure);
    done(&e);
}
END_TEST

/* --- laws --- */

/* Bins exchange events and lose none: what the whole arm counts stays. */
START_TEST(bins_conserve_counts)
{
    static const char *const arms[] = {", bins: 6", ", bins: 6, angle_resolution: 6 mrad",
                                       ", bins: 6, angle_resolution: 200 mrad"};
    for (int i = 0; i < COUNT(arms); i++) {
        struct evaluated e = table_of(arms[i], "", "full");
        double sum = 0;
        for (size_t k = 0; k < BINS; k++)
            sum += bin_cell(&e, k, BH_COL_SIGNAL);
        ck_assert_relative(sum, cell(&e, 0, BH_COL_SIGNAL), 1e-12, arms[i]);
        done(&e);
    }
}
END_TEST

/* Fine resolutions give what none gives. */
START_TEST(narrow_resolutions_are_none)
{
    static const char *const pairs[][2] = {
        {", bins: 6", ", bins: 6, angle_resolution: 1 urad"},
        {", bins: 6, momentum_bite: ±1 %",
         ", bins: 6, momentum_bite: ±1 %, momentum_resolution: 1 ppm"},
        {", bins: 6, momentum_bite: ±1 %",
         ", bins: 6, momentum_bite: ±1 %, energy_resolution: 0.1 keV"},
        {", bins: 6, momentum_bite: ±8 %",
         ", bins: 6, momentum_bite: ±8 %, momentum_resolution: 0.1 %"},
    };
    for (int i = 0; i < COUNT(pairs); i++) {
        struct evaluated sharp = table_of(pairs[i][0], "", "none");
        struct evaluated fine = table_of(pairs[i][1], "", "none");
        for (size_t k = 0; k < BINS; k++) {
            ck_assert_relative(bin_cell(&fine, k, BH_COL_SIGNAL),
                               bin_cell(&sharp, k, BH_COL_SIGNAL), 2e-5, pairs[i][1]);
            if (bin_cell(&sharp, k, BH_COL_SIGNAL) > 0)
                ck_assert_relative(bin_cell(&fine, k, BH_COL_PER_MRAD),
                                   bin_cell(&sharp, k, BH_COL_PER_MRAD), 2e-3, pairs[i][1]);
        }
        done(&sharp);
        done(&fine);
    }
}
END_TEST

/* Bins narrower than the aperture: what is measured beside them is in none of them. */
START_TEST(bins_inside_the_aperture)
{
    static const char arm[] = ", edges: [39 deg, 40 deg, 41 deg]";
    static const char wide[] = ", edges: [39 deg, 40 deg, 41 deg], angle_resolution: 8 mrad";
    struct evaluated sharp = table_of(arm, "", "none"), e = table_of(wide, "", "none");
    struct drawn drawn = {.all = 0};
    double in_bin[2] = {0}, squares[2] = {0};
    structure = bh_structure_new("dipole", 1, 1, NULL);
    for (uint64_t n = 0; n < EVENTS; n++) {
        double u[2];
        even_pair(5, n, 0, u);
        const double in = half_in * (2 * u[0] - 1), up = asin(sin(half_out) * (2 * u[1] - 1));
        const double weight = point(acos(cos(up) * cos(40 * BH_DEGREE + in)));
        const double measured = (in + 8e-3 * normal_deviate(5, n, 1)) / BH_DEGREE;
        drawn.all += weight;
        if (fabs(measured) > 1)
            continue;
        in_bin[measured > 0] += weight;
        squares[measured > 0] += weight * weight;
    }
    for (size_t k = 0; k < 2; k++) {
        const double found = in_bin[k] / drawn.all, sigma = sqrt(squares[k]) / drawn.all;
        ck_assert_msg(fabs(share_of(&e, k) - found) < 3.9 * sigma, "bin %d: %g, drawn %g +- %g",
                      (int)k + 1, share_of(&e, k), found, sigma);
    }
    ck_assert_relative(cell(&e, 0, BH_COL_SIGNAL), cell(&sharp, 0, BH_COL_SIGNAL), 1e-12, "whole");
    bh_structure_free(structure);
    done(&sharp);
    done(&e);
}
END_TEST

/* Deflections in the target alone: 20 mm of liquid hydrogen, 1.4e-3 / 63.04 radiation lengths. */
START_TEST(matter_deflects)
{
    struct evaluated thin = table_of(", bins: 6", "", "none"),
                     e = table_of(", bins: 6", "", "full");
    bh_explanation *x = bh_explain(e.table, "K", "A", 1, NULL);
    const bh_line *found = NULL;
    for (size_t i = 0; i < bh_explanation_lines(x); i++) {
        const bh_line *line = bh_explanation_line(x, i);
        if (line->name && strcmp(line->name, "measured - true angle") == 0)
            found = line;
    }
    ck_assert_ptr_nonnull(found);
    /* Highland by hand: t = 0.0708 x 2 (1 + 1 / cos 40) / 2 / 63.04 = 2.589e-3, of which 1.123e-3
     * at 855.5 MeV/c and 1.466e-3 at 705 MeV/c: 13.6 sqrt(1.123e-3 / 855.5^2 + 1.466e-3 / 705^2) (1
     * + 0.038 ln 2.589e-3) = 0.706 mrad */
    ck_assert_relative(strtod(found->value, NULL), 0.706, 0.01, "mrad");
    bh_explanation_free(x);
    ck_assert_double_gt(fabs(bin_cell(&e, 0, BH_COL_KEPT) - 1), 1e-6);
    ck_assert_double_eq(bin_cell(&thin, 0, BH_COL_KEPT), 1);
    done(&thin);
    done(&e);
}
END_TEST

/* A layer split into five is the same layer: depths stand as close as the resolution asks for. */
START_TEST(splitting_changes_nothing)
{
    static const char *const layers[] = {
        "{material: liquid-hydrogen, thickness: 50 mm}",
        "{material: liquid-hydrogen, thickness: 10 mm}, {material: liquid-hydrogen, thickness: "
        "10 mm}, {material: liquid-hydrogen, thickness: 10 mm}, {material: liquid-hydrogen, "
        "thickness: 10 mm}, {material: liquid-hydrogen, thickness: 10 mm}"};
    static const char *const resolutions[] = {"0.1 %", "1 %"};
    struct evaluated e[2];
    for (int k = 0; k < 2; k++) {
        char text[2048];
        snprintf(text, sizeof text,
                 "plan: 1\nbeam: {particle: electron, kinetic_energy: 855 MeV, current: 1 uA}\n"
                 "target: {scatterer: H, layers: [%s]}\n"
                 "arms:\n  - {name: A, bins: 6, in_plane: ±28 mrad, out_of_plane: ±70 mrad, "
                 "momentum_bite: ±1 %%, momentum_resolution: %s}\n"
                 "settings:\n  - {name: K, angle: 65 deg, time: 1 h}\n",
                 layers[k], resolutions[_i]);
        e[k] = evaluate(text);
    }
    ck_assert_double_lt(cell(&e[0], 0, BH_COL_KEPT), 0.9);
    for (size_t i = 0; i < BINS; i++)
        ck_assert_relative(bin_cell(&e[1], i, BH_COL_SIGNAL), bin_cell(&e[0], i, BH_COL_SIGNAL),
                           2e-5, resolutions[_i]);
    done(&e[0]);
    done(&e[1]);
}
END_TEST

/* A bite that nothing reaches keeps nothing, resolution or not; a hopeless threshold likewise. */
START_TEST(nothing_is_kept)
{
    static const char *const arms[] = {", threshold: 800 MeV",
                                       ", threshold: 800 MeV, momentum_resolution: 0.01 %"};
    for (int i = 0; i < COUNT(arms); i++) {
        struct evaluated e = table_of(arms[i], "", "none");
        ck_assert_double_lt(cell(&e, 0, BH_COL_KEPT), 1e-8);
        done(&e);
    }
}
END_TEST

/* Sensitivities under a resolution are differences of rates under it. */
START_TEST(sensitivities_follow)
{
    static const char *const arms[] = {
        ", bins: 6, momentum_bite: ±2 %, momentum_resolution: 0.5 %",
        ", bins: 6, angle_resolution: 6 mrad",
    };
    const char *arm = arms[_i];
    char text[3][1024];
    double rate[3][BINS];
    struct evaluated e = table_of(arm, "", "none");
    static const double momentum[] = {855.51084888 * 0.9998, 855.51084888, 855.51084888 * 1.0002};
    char central[32];
    snprintf(central, sizeof central, "%.9g MeV/c", cell(&e, 0, BH_COL_CENTRAL_MOMENTUM));
    for (int k = 0; k < 3; k++) {
        snprintf(text[k], sizeof text[k],
                 "plan: 1\nbeam: {particle: electron, momentum: %.12g MeV/c, current: 1 uA}\n"
                 "target: {layers: [{material: liquid-hydrogen, thickness: 20 mm}]}\n"
                 "models: {energy_loss: none, structure: dipole}\n"
                 "arms:\n  - {name: A, in_plane: ±40 mrad, out_of_plane: ±60 mrad%s}\n"
                 "settings:\n  - {name: K, angle: 40 deg, time: 1 h, central_momentum: %s}\n",
                 momentum[k], arm, central);
        struct evaluated one = evaluate(text[k]);
        for (size_t i = 0; i < BINS; i++)
            rate[k][i] = bin_cell(&one, i, BH_COL_SIGNAL);
        done(&one);
    }
    for (size_t i = 0; i < BINS; i++) {
        const double slope = (rate[2][i] - rate[0][i]) / rate[1][i] / 0.4;
        ck_assert_msg(fabs(bin_cell(&e, i, BH_COL_PER_PERMILLE) - slope) <
                          0.01 * fabs(slope) + 1e-5,
                      "bin %d: %g, %g", (int)i + 1, bin_cell(&e, i, BH_COL_PER_PERMILLE), slope);
    }
    done(&e);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("resolution");
    tcase_set_timeout(tests, 120);
    tcase_add_loop_test(tests, as_events_drawn, 0, 3 * COUNT(cases));
    tcase_add_test(tests, bins_conserve_counts);
    tcase_add_test(tests, narrow_resolutions_are_none);
    tcase_add_test(tests, bins_inside_the_aperture);
    tcase_add_test(tests, matter_deflects);
    tcase_add_loop_test(tests, splitting_changes_nothing, 0, 2);
    tcase_add_test(tests, nothing_is_kept);
    tcase_add_loop_test(tests, sensitivities_follow, 0, 2);
    return run_suite("resolution", tests);
}
