/* test_systematic.c - systematic uncertainties against plans evaluated with other values. */
#include "uncertain.h"

#include <json-c/json.h>
#include <stdint.h>

#include "beamhours/base/text.h"
#include "beamhours/report/json.h"

enum { MOST = 64 };

/* Effects without those of models. */
struct picked {
    unsigned cause[MOST];
    double effect[MOST];
    bh_effects effects;
};

static void pick_inputs(const struct evaluated *e, size_t row, struct picked *p)
{
    const bh_effects all = bh_table_effects(e->table, false, row);
    size_t n = 0;
    for (size_t i = 0; i < all.count; i++) {
        const bh_cause_kind kind = bh_causes_at(bh_table_causes(e->table), all.cause[i])->kind;
        if (kind >= BH_CAUSE_STRUCTURE && kind <= BH_CAUSE_BACKGROUND)
            continue;
        ck_assert_int_lt((int)n, MOST);
        p->cause[n] = all.cause[i];
        p->effect[n++] = all.effect[i];
    }
    p->effects = (bh_effects){n, p->cause, p->effect};
}

/* --- all inputs at once, at random --- */

static const char *const random_plan =
    "plan: 1\n"
    "beam: {particle: electron, total_energy: 600 ± 0.6 MeV, current: 10 ± 0.1 uA,\n"
    "  fraction: 90 ± 0.5 %}\n"
    "target:\n"
    "  name: cell\n"
    "  scatterer: H\n"
    "  layers:\n"
    "    - {material: liquid-hydrogen, thickness: 40 ± 0.3 mm, density: 0.0708 ± 0.0004 g/cm3}\n"
    "arms:\n"
    "  - {name: A, in_plane: ±20 mrad, out_of_plane: ±40 mrad, efficiency: 95 ± 0.5 %,\n"
    "     momentum_bite: ±10 %}\n"
    "  - {name: M, side: left, angle: 35 ± 0.02 deg, solid_angle: 2 ± 0.02 msr}\n"
    "settings:\n"
    "  - name: K\n"
    "    arms: [{arm: A, angle: 40 ± 0.04 deg, central_momentum: 530 MeV/c}, {arm: M}]\n"
    "  - name: L\n"
    "    arms: [{arm: A, angle: 60 ± 0.04 deg, central_momentum: 463 MeV/c}, {arm: M}]\n";

static const struct {
    const char *path, *unit;
    double value, sigma;
} drawn[] = {{"beam.total_energy", "MeV", 600, 0.6},
             {"beam.current", "uA", 10, 0.1},
             {"beam.fraction", "%", 90, 0.5},
             {"target.layers.1.thickness", "mm", 40, 0.3},
             {"target.layers.1.density", "g/cm3", 0.0708, 0.0004},
             {"arms.A.efficiency", "%", 95, 0.5},
             {"arms.M.angle", "deg", 35, 0.02},
             {"arms.M.solid_angle", "msr", 2, 0.02},
             {"settings.K.arms.1.angle", "deg", 40, 0.04},
             {"settings.L.arms.1.angle", "deg", 60, 0.04}};

enum { DRAWN = COUNT(drawn), TIMES = 3000, ROWS = 4 };

/* Uniform in 0 .. 1 from a counter: splitmix64 of Steele, Lea & Flood 2014. */
static double uniform(uint64_t *counter)
{
    uint64_t x = *counter += 0x9e3779b97f4a7c15u;
    x = (x ^ (x >> 30)) * 0xbf58476d1ce4e5b9u;
    x = (x ^ (x >> 27)) * 0x94d049bb133111ebu;
    return ((double)((x ^ (x >> 31)) >> 11) + 0.5) * 0x1p-53;
}

static double normal(uint64_t *counter)
{
    const double u = uniform(counter), v = uniform(counter);
    return sqrt(-2 * log(u)) * cos(2 * acos(-1.0) * v);
}

static void draw(uint64_t *counter, double logarithm[ROWS])
{
    char text[DRAWN][64];
    bh_change changes[DRAWN];
    for (int i = 0; i < DRAWN; i++) {
        snprintf(text[i], sizeof text[i], "%.12g %s",
                 drawn[i].value + drawn[i].sigma * normal(counter), drawn[i].unit);
        changes[i] = (bh_change){drawn[i].path, text[i]};
    }
    struct evaluated e = with(random_plan, changes, DRAWN, false);
    for (size_t r = 0; r < ROWS; r++)
        logarithm[r] = log(cell(&e, r, BH_COL_SIGNAL));
    done(&e);
}

/* Sums for the spread of each row and of the ratio of each pair. */
struct spread {
    double sum[ROWS][ROWS], sum2[ROWS][ROWS]; /* [i][i]: the row itself */
};

static double sigma_of(const struct spread *s, int i, int k)
{
    const double mean = s->sum[i][k] / TIMES;
    return sqrt(s->sum2[i][k] / TIMES - mean * mean);
}

static void add_to(struct spread *s, const double *logarithm, const double *middle)
{
    for (int i = 0; i < ROWS; i++)
        for (int k = 0; k <= i; k++) {
            const double off = logarithm[i] - middle[i];
            const double x = i == k ? off : off - (logarithm[k] - middle[k]);
            s->sum[i][k] += x;
            s->sum2[i][k] += x * x;
        }
}

START_TEST(as_wide_as_the_rates_of_plans_drawn_at_random)
{
    struct evaluated e = with(random_plan, NULL, 0, false);
    struct spread s = {.sum = {{0}}};
    double middle[ROWS], logarithm[ROWS];
    uint64_t counter = 20240501;
    for (size_t r = 0; r < ROWS; r++)
        middle[r] = log(cell(&e, r, BH_COL_SIGNAL));
    for (int n = 0; n < TIMES; n++) {
        draw(&counter, logarithm);
        add_to(&s, logarithm, middle);
    }
    const bh_causes *causes = bh_table_causes(e.table);
    for (int i = 0; i < ROWS; i++)
        for (int k = 0; k <= i; k++) {
            char what[32];
            struct picked a, b;
            pick_inputs(&e, (size_t)i, &a);
            pick_inputs(&e, (size_t)k, &b);
            snprintf(what, sizeof what, "rows %d, %d", i, k);
            const double got = i == k ? bh_effects_total(causes, &a.effects)
                                      : bh_effects_of_ratio(causes, &a.effects, &b.effects);
            if (i == 3 && k == 1) /* the same arm at the same place twice */
                ck_assert_double_lt(got, 1e-12);
            else
                ck_assert_relative(got, sigma_of(&s, i, k), 0.03, what);
        }
    done(&e);
}
END_TEST

/* --- one input at a time --- */

/* Moved by one standard uncertainty both ways, the rate moves by what the row says. */
static const struct {
    const char *plan; /* with %s in the place of the value */
    double value, sigma;
    const char *unit;
    bh_cause_kind kind;
    bh_column_id column; /* that moves */
} inputs[] = {
    {"plan: 1\nbeam: {particle: electron, momentum: %s, current: 1 uA}\n" HYDROGEN ARM
     "settings: [{name: K, angle: 50 deg}]\n",
     400, 1, "MeV/c", BH_CAUSE_ENERGY, BH_COL_SIGNAL},
    {"plan: 1\nbeam: {particle: muon-, momentum: 200 MeV/c, particle_rate: %s}\n" HYDROGEN ARM
     "settings: [{name: K, angle: 50 deg}]\n",
     1e6, 2e4, "/s", BH_CAUSE_PARTICLE_RATE, BH_COL_SIGNAL},
    {"plan: 1\nbeam: {particle: electron, kinetic_energy: 500 MeV, current: 1 uA, fraction: 60 %%, "
     "others: {alpha: %s}}\n" HYDROGEN ARM "settings: [{name: K, angle: 50 deg}]\n",
     30, 1, "%", BH_CAUSE_OTHERS, BH_COL_SIGNAL},
    {BEAM_500 HYDROGEN ARM "settings: [{name: K, angle: %s}]\n", 50, 0.05, "deg", BH_CAUSE_ANGLE,
     BH_COL_SIGNAL},
    {BEAM_500 HYDROGEN ARM "settings: [{name: K, q2: %s}]\n", 0.15, 0.0003, "GeV2", BH_CAUSE_ANGLE,
     BH_COL_SIGNAL},
    {BEAM_500 HYDROGEN "arms: [{name: A, solid_angle: 1 msr, detects: recoil}]\n"
                       "settings: [{name: K, q2: %s}]\n",
     0.15, 0.0003, "GeV2", BH_CAUSE_ANGLE, BH_COL_SIGNAL},
    {BEAM_500 HYDROGEN
     "arms: [{name: A, in_plane: ±20 mrad, out_of_plane: ±40 mrad, momentum_bite: "
     "±1 %%}]\nsettings: [{name: K, angle: 50 deg, central_momentum: %s}]\n",
     421, 1, "MeV/c", BH_CAUSE_CENTRAL_MOMENTUM, BH_COL_SIGNAL},
    {BEAM_500 "target: {name: t, layers: [{material: graphite, thickness: 1 mm}]}\n" ARM
              "settings: [{name: K, angle: 30 deg, tilt: %s}]\n",
     30, 0.5, "deg", BH_CAUSE_TILT, BH_COL_SIGNAL},
    {BEAM_500
     "target: {name: t, layers: [{material: graphite, thickness: 1 mm}, {material: graphite, "
     "thickness: %s}]}\n" ARM "settings: [{name: K, angle: 30 deg}]\n",
     2, 0.1, "mm", BH_CAUSE_THICKNESS, BH_COL_SIGNAL},
    {BEAM_500 "target: {name: t, layers: [{material: graphite, areal_density: %s}]}\n" ARM
              "settings: [{name: K, angle: 30 deg}]\n",
     100, 3, "mg/cm2", BH_CAUSE_THICKNESS, BH_COL_SIGNAL},
    {BEAM_500
     "target: {name: t, scatterer: H, layers: [{material: liquid-hydrogen, thickness: %s}]}\n"
     "arms: [{name: A, solid_angle: 1 msr, target_view: ±1 cm}]\n"
     "settings: [{name: K, angle: 60 deg}]\n",
     20, 0.5, "mm", BH_CAUSE_THICKNESS, BH_COL_SIGNAL}, /* seen as a whole */
    {BEAM_500
     "models: {energy_loss: none}\n"
     "target: {name: t, layers: [{material: graphite, areal_density: 20 g/cm2, density: %s}]}\n"
     "arms: [{name: A, solid_angle: 1 msr, target_view: ±1 cm}]\n"
     "settings: [{name: K, angle: 60 deg}]\n",
     1.8, 0.02, "g/cm3", BH_CAUSE_DENSITY, BH_COL_SIGNAL}, /* denser: more of it in view */
    {BEAM_500 "target: {name: t, scatterer: H, layers: [{material: hydrogen-gas, thickness: 10 cm, "
              "temperature: %s, pressure: 1 bar}]}\n" ARM "settings: [{name: K, angle: 30 deg}]\n",
     295, 3, "K", BH_CAUSE_TEMPERATURE, BH_COL_SIGNAL},
    {BEAM_500 "target: {name: t, scatterer: H, layers: [{material: hydrogen-gas, thickness: 10 cm, "
              "temperature: 295 K, pressure: %s}]}\n" ARM "settings: [{name: K, angle: 30 deg}]\n",
     2, 0.02, "bar", BH_CAUSE_PRESSURE, BH_COL_SIGNAL},
    {BEAM_500
     "target: {name: t, scatterer: H, layers: [{material: liquid-hydrogen, thickness: 5 cm, "
     "density_loss: %s}]}\n" ARM "settings: [{name: K, angle: 30 deg}]\n",
     1, 0.1, "%/uA", BH_CAUSE_DENSITY_LOSS, BH_COL_SIGNAL},
    {"plan: 1\nbeam: {particle: electron, kinetic_energy: 500 MeV, current: %s}\n"
     "target: {name: t, scatterer: H, layers: [{material: liquid-hydrogen, thickness: 5 cm, "
     "density_loss: 1 %%/uA}]}\n" ARM "settings: [{name: K, angle: 30 deg}]\n",
     20, 0.2, "uA", BH_CAUSE_CURRENT, BH_COL_SIGNAL},
    {"plan: 1\nbeam: {particle: alpha, kinetic_energy: 20 MeV, particle_rate: 1e6 /s}\n"
     "target: {name: t, layers: [{material: gold, thickness: %s}]}\n"
     "arms: [{name: A, solid_angle: 1 msr}]\nsettings: [{name: K, angle: 150 deg}]\n",
     8, 0.4, "um", BH_CAUSE_THICKNESS, BH_COL_SIGNAL}, /* slows down and reflects more */
    {"plan: 1\nbeam: {particle: alpha, kinetic_energy: 20 MeV, particle_rate: 1e6 /s}\n"
     "target: {name: t, layers: [{material: aluminium, thickness: %s, role: window}, {material: "
     "gold, thickness: 1 um}]}\narms: [{name: A, solid_angle: 1 msr}]\n"
     "settings: [{name: K, angle: 150 deg}]\n",
     10, 0.5, "um", BH_CAUSE_THICKNESS, BH_COL_SIGNAL}, /* slows down only */
    {BEAM_500 HYDROGEN "arms: [{name: A, ring: {from: 20 deg, to: 40 deg}, azimuth: %s}]\n"
                       "settings: [{name: K}]\n",
     180, 2, "deg", BH_CAUSE_AZIMUTH, BH_COL_SIGNAL},
    {BEAM_500 HYDROGEN "arms: [{name: A, solid_angle: 5 msr, dead_time: %s}]\n"
                       "settings: [{name: K, angle: 20 deg}]\n",
     5, 0.5, "us", BH_CAUSE_DEAD_TIME, BH_COL_LIVE},
    {BEAM_500 HYDROGEN "arms: [{name: A, solid_angle: 5 msr, dead_time: 1 us, other_rate: %s}]\n"
                       "settings: [{name: K, angle: 20 deg}]\n",
     100, 10, "kHz", BH_CAUSE_OTHER_RATE, BH_COL_LIVE},
    {BEAM_500 HYDROGEN "arms: [{name: A, solid_angle: 5 msr, rate_limit: %s}]\n"
                       "settings: [{name: K, angle: 20 deg}]\n",
     1, 0.1, "kHz", BH_CAUSE_RATE_LIMIT, BH_COL_LIVE},
    {"plan: 1\nbeam: {particle: electron, kinetic_energy: 500 MeV, current: 1 uA, duty_factor: "
     "%s}\n" HYDROGEN "arms: [{name: A, solid_angle: 5 msr, dead_time: 5 us}]\n"
     "settings: [{name: K, angle: 20 deg}]\n",
     50, 2, "%", BH_CAUSE_DUTY_FACTOR, BH_COL_LIVE}};

static struct evaluated fill_in(int i, const char *value)
{
    char text[1024];
/* The plans of the table are formats. */
#pragma GCC diagnostic push
#pragma GCC diagnostic ignored "-Wformat-nonliteral"
    snprintf(text, sizeof text, inputs[i].plan, value);
#pragma GCC diagnostic pop
    return evaluate(text);
}

static double moved(int i, double by)
{
    char value[64];
    snprintf(value, sizeof value, "%.12g %s", inputs[i].value + by * inputs[i].sigma,
             inputs[i].unit);
    struct evaluated e = fill_in(i, value);
    const double rate = cell(&e, 0, inputs[i].column);
    done(&e);
    return rate;
}

START_TEST(one_input_moves_the_rate_by_what_the_row_says)
{
    char value[96];
    snprintf(value, sizeof value, "%.12g ± %.12g %s", inputs[_i].value, inputs[_i].sigma,
             inputs[_i].unit);
    struct evaluated e = fill_in(_i, value);
    const double up = moved(_i, 1), down = moved(_i, -1), at = moved(_i, 0);
    const bh_effects effects = bh_table_effects(e.table, false, 0);
    double got = 0;
    for (size_t k = 0; k < effects.count; k++)
        if (bh_causes_at(bh_table_causes(e.table), effects.cause[k])->kind == inputs[_i].kind)
            got += effects.effect[k];
    ck_assert_msg(fabs(got) > 1e-6 || fabs(up - down) < 1e-6 * at, "no effect: %g, %g", got,
                  (up - down) / at);
    ck_assert_relative(got, (up - down) / 2 / at, 0.02, bh_cause_source(inputs[_i].kind));
    done(&e);
}
END_TEST

/* --- what is subtracted as computed --- */

#define WINDOWS(empty)                                                                             \
    BEAM_500 "target: {name: t, scatterer: H, " empty "layers: [{material: aluminium, thickness: " \
             "0.2 ± 0.01 mm, role: window}, {material: liquid-hydrogen, thickness: 50 mm}]}\n" ARM \
             "settings: [{name: K, angle: 20 deg}]\n"

START_TEST(windows_count_as_long_as_no_empty_target_measures_them)
{
    struct evaluated computed = evaluate(WINDOWS(""));
    struct evaluated measured = evaluate(WINDOWS("empty_target: {share: 20 %}, "));
    const double share = cell(&computed, 0, BH_COL_BACKGROUND) / cell(&computed, 0, BH_COL_SIGNAL);
    ck_assert(share > 1e-3);
    ck_assert_relative(from(&computed, 0, BH_CAUSE_THICKNESS), 0.05 * share, 0.03, "thickness");
    ck_assert(from(&computed, 0, BH_CAUSE_BACKGROUND) > 0.001 * share);
    ck_assert(from(&measured, 0, BH_CAUSE_THICKNESS) < 0.002 * share); /* it slows the beam */
    ck_assert(from(&measured, 0, BH_CAUSE_BACKGROUND) == 0);
    ck_assert(cell(&measured, 0, BH_COL_SYSTEMATIC) < cell(&computed, 0, BH_COL_SYSTEMATIC));
    done(&computed);
    done(&measured);
}
END_TEST

/* Of others, with their share written as `share`, on hydrogen behind a window. */
static struct evaluated beside(const char *others, const char *empty)
{
    char text[1024];
    snprintf(
        text, sizeof text,
        "plan: 1\nbeam: {particle: muon-, momentum: 200 MeV/c, particle_rate: 1e6 /s, fraction: "
        "30 %%, others: {%s}}\ntarget: {name: t, scatterer: H, %slayers: [{material: kapton, "
        "thickness: 0.5 mm, role: window}, {material: liquid-hydrogen, thickness: 50 ± 1 "
        "mm}]}\n" ARM "settings: [{name: K, angle: 50 deg}]\n",
        others, empty);
    return evaluate(text);
}

/* What an empty target does not measure of other particles is subtracted as computed. */
static const char *const empties[] = {"", "empty_target: {share: 20 %}, "};

START_TEST(other_particles_are_subtracted_as_computed)
{
    struct evaluated e = beside("electron: 40 ± 5 %", empties[_i]);
    struct evaluated more = beside("electron: 45 %", empties[_i]);
    struct evaluated pions = beside("pion-: 10 %", empties[_i]);
    const double signal = cell(&e, 0, BH_COL_SIGNAL);
    const double by = (cell(&more, 0, BH_COL_BACKGROUND) - cell(&e, 0, BH_COL_BACKGROUND)) / signal;
    ck_assert_double_gt(by, 0.1);
    const double known = _i ? from(&e, 0, BH_CAUSE_OTHERS) : by;
    ck_assert_relative(from(&e, 0, BH_CAUSE_OTHERS), known, 1e-3, "share");
    ck_assert_double_gt(by, (_i ? 1.1 : 0.999) * from(&e, 0, BH_CAUSE_OTHERS));
    ck_assert_double_gt(from(&e, 0, BH_CAUSE_OTHERS), by / 4);
    ck_assert(from(&more, 0, BH_CAUSE_OTHERS) == 0);
    ck_assert_double_gt(from(&e, 0, BH_CAUSE_BACKGROUND), 1e-3 * 8 * by);
    ck_assert_double_lt(from(&e, 0, BH_CAUSE_BACKGROUND), 0.1 * 8 * by);
    /* without nuclear forces nothing is known of pions */
    struct evaluated none = beside("electron: 0 %", empties[_i]);
    const double pion =
        (cell(&pions, 0, BH_COL_BACKGROUND) - cell(&none, 0, BH_COL_BACKGROUND)) / signal;
    ck_assert_double_gt(from(&pions, 0, BH_CAUSE_BACKGROUND), 0.5 * pion);
    ck_assert_double_lt(from(&pions, 0, BH_CAUSE_BACKGROUND), 1.001 * pion);
    /* more hydrogen is more of both */
    const double own = from(&none, 0, BH_CAUSE_THICKNESS);
    ck_assert_relative(own, 0.02, 0.05, "thickness");
    ck_assert_double_gt(from(&e, 0, BH_CAUSE_THICKNESS), own * (1 + 4 * by));
    done(&e);
    done(&more);
    done(&pions);
    done(&none);
}
END_TEST

/* --- nuclear forces --- */

START_TEST(where_nuclear_forces_rule_nothing_is_said_of_uncertainty)
{
    struct evaluated e =
        evaluate("plan: 1\nbeam: {particle: proton, kinetic_energy: 12 MeV, current: 1 ± 0.02 nA}\n"
                 "target: {name: t, layers: [{material: carbon-12, thickness: 1 um}]}\n"
                 "arms: [{name: A, solid_angle: 1 msr}]\n"
                 "settings: [{name: K, angle: [8 deg, 60 deg]}, {name: slow, angle: 60 deg, beam: "
                 "{kinetic_energy: 2 MeV}}]\n");
    ck_assert_relative(from(&e, 0, BH_CAUSE_CURRENT), 0.02, 1e-6, "forward");
    ck_assert_relative(from(&e, 2, BH_CAUSE_CURRENT), 0.02, 1e-6, "slow");
    ck_assert(cell(&e, 0, BH_COL_SYSTEMATIC) >= 0.02 && cell(&e, 2, BH_COL_SYSTEMATIC) >= 0.02);
    ck_assert(isnan(cell(&e, 1, BH_COL_SYSTEMATIC)));
    ck_assert_ptr_nonnull(
        strstr(bh_table_reason(e.table, false, 1, BH_COL_SYSTEMATIC), "nuclear forces"));
    ck_assert_uint_eq(bh_table_effects(e.table, false, 1).count, 0);
    bh_explanation *x = bh_explain(e.table, "K.2", "A", 0, NULL);
    bool said = false;
    for (size_t i = 0; i < bh_explanation_lines(x); i++) {
        const bh_line *line = bh_explanation_line(x, i);
        said = said || (line->remark && strstr(line->remark, "nuclear forces, left out, may"));
    }
    ck_assert(said);
    bh_explanation_free(x);
    done(&e);
}
END_TEST

/* --- pointing --- */

START_TEST(pointing_acts_through_the_sensitivity_to_the_angle)
{
    struct evaluated e =
        evaluate(BEAM_500 HYDROGEN "arms: [{name: A, in_plane: ±20 mrad, out_of_plane: ±40 mrad, "
                                   "pointing: 0 ± 0.2 mrad, energy_cut: 8 MeV}]\n"
                                   "settings: [{name: K, angle: [30 deg, 60 deg]}]\n");
    const bh_causes *causes = bh_table_causes(e.table);
    double per_mrad[2];
    for (size_t r = 0; r < 2; r++) {
        per_mrad[r] = cell(&e, r, BH_COL_PER_MRAD);
        ck_assert_relative(from(&e, r, BH_CAUSE_POINTING), 0.2 * fabs(per_mrad[r]), 1e-9,
                           "pointing");
    }
    struct picked a, b;
    pick_inputs(&e, 0, &a);
    pick_inputs(&e, 1, &b);
    ck_assert_relative(bh_effects_of_ratio(causes, &a.effects, &b.effects),
                       0.2 * fabs(per_mrad[0] - per_mrad[1]), 1e-9, "one pointing, two angles");
    ck_assert(!warns(&e, "not"));
    done(&e);
}
END_TEST

/* --- JSON --- */

static json_object *member(json_object *of, const char *key)
{
    json_object *found = NULL;
    ck_assert_msg(json_object_object_get_ex(of, key, &found), "no %s", key);
    return found;
}

START_TEST(json_has_sources_that_add_up_and_causes_with_rows)
{
    struct evaluated e = with(random_plan, NULL, 0, true);
    bh_selection view;
    bh_text out = {0};
    ck_assert_int_eq(
        bh_selection_new(e.table, &(bh_selection_request){.sort = "-signal_rate_Hz"}, &view, NULL),
        BH_OK);
    ck_assert_int_eq(bh_report_json(&view, "test", &out), BH_OK);
    json_object *all = json_tokener_parse(out.bytes);
    ck_assert_ptr_nonnull(all);
    json_object *rows = member(all, "rows"), *causes = member(all, "systematic_causes");
    ck_assert_int_eq((int)json_object_array_length(rows), ROWS);
    for (size_t r = 0; r < ROWS; r++) {
        json_object *row = json_object_array_get_idx(rows, r);
        double sum = 0;
        json_object_object_foreach(member(row, "systematic_sources"), key, size)
        {
            ck_assert_int_gt((int)strlen(key), 0);
            sum += json_object_get_double(size) * json_object_get_double(size);
        }
        ck_assert_relative(sqrt(sum), json_object_get_double(member(row, "systematic_uncertainty")),
                           1e-9, "quadrature");
    }
    int currents = 0;
    for (size_t i = 0; i < json_object_array_length(causes); i++) {
        json_object *c = json_object_array_get_idx(causes, i);
        ck_assert_int_eq((int)json_object_array_length(member(c, "rows")),
                         (int)json_object_array_length(member(c, "effects")));
        if (strcmp(json_object_get_string(member(c, "cause")), "current") != 0)
            continue;
        currents++;
        ck_assert_str_eq(json_object_get_string(member(c, "key")), "beam.current");
        ck_assert_int_eq(json_object_get_int(member(c, "line")), 2);
        ck_assert_int_eq((int)json_object_array_length(member(c, "rows")), ROWS);
    }
    ck_assert_int_eq(currents, 1);
    json_object_put(all);
    bh_text_free(&out);
    bh_selection_free(&view);
    done(&e);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("systematic");
    tcase_set_timeout(tests, 120);
    tcase_add_test(tests, as_wide_as_the_rates_of_plans_drawn_at_random);
    tcase_add_loop_test(tests, one_input_moves_the_rate_by_what_the_row_says, 0, COUNT(inputs));
    tcase_add_test(tests, windows_count_as_long_as_no_empty_target_measures_them);
    tcase_add_loop_test(tests, other_particles_are_subtracted_as_computed, 0, COUNT(empties));
    tcase_add_test(tests, where_nuclear_forces_rule_nothing_is_said_of_uncertainty);
    tcase_add_test(tests, pointing_acts_through_the_sensitivity_to_the_angle);
    tcase_add_test(tests, json_has_sources_that_add_up_and_causes_with_rows);
    return run_suite("systematic", tests);
}
