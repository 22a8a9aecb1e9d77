/* test_explain.c - an explanation holds what a reviewer asks for, with places and sources. */
#include "evaluated.h"

static const char *const hydrogen =
    "plan: 1\n"
    "beam: {particle: electron, kinetic_energy: 855 ± 1 MeV, current: 10 ± 0.1 uA}\n"
    "target:\n"
    "  name: cell\n"
    "  scatterer: H\n"
    "  empty_target: {share: 10 %}\n"
    "  layers:\n"
    "    - {material: aluminium, thickness: 0.1 mm, role: window}\n"
    "    - {material: liquid-hydrogen, thickness: 50 ± 1 mm}\n"
    "arms:\n"
    "  - {name: A, in_plane: ±28 mrad, out_of_plane: ±70 mrad, bins: 2, efficiency: 95 %,\n"
    "     dead_time: 5 us, prescale: 2, energy_cut: 12 MeV}\n"
    "  - {name: M, side: left, angle: 30 deg, solid_angle: 2 ± 0.01 msr}\n"
    "settings:\n"
    "  - {name: K, arm: A, angle: [25 deg, 40 deg], goal: 0.5 %}\n";

static const bh_line *find_line(const bh_explanation *x, const char *name)
{
    for (size_t i = 0; i < bh_explanation_lines(x); i++) {
        const bh_line *line = bh_explanation_line(x, i);
        if (line->name && strcmp(line->name, name) == 0)
            return line;
    }
    return NULL;
}

static const bh_line *must_find(const bh_explanation *x, const char *name)
{
    const bh_line *line = find_line(x, name);
    ck_assert_msg(line != NULL, "no line is called %s", name);
    return line;
}

/* The number a line begins with. */
static double number(const bh_explanation *x, const char *name)
{
    return strtod(must_find(x, name)->value, NULL);
}

static const struct {
    const char *name;
    bh_column_id column;
    double unit; /* of the column in the unit of the line */
} numbers[] = {{"angle of the detected particle", BH_COL_ANGLE, 1},
               {"Q2", BH_COL_Q2, 1},
               {"scattered particle", BH_COL_SCATTERED_MOMENTUM, 1},
               {"recoil", BH_COL_RECOIL_KINETIC, 1},
               {"epsilon", BH_COL_EPSILON, 1},
               {"beam particles per second", BH_COL_BEAM, 1},
               {"scatterer nuclei seen", BH_COL_SEEN, 1},
               {"luminosity", BH_COL_LUMINOSITY, 1},
               {"mean cross section", BH_COL_CROSS_SECTION, 1},
               {"solid angle", BH_COL_SOLID_ANGLE, 1},
               {"kept", BH_COL_KEPT, 1},
               {"signal rate", BH_COL_SIGNAL, 1},
               {"background rate", BH_COL_BACKGROUND, 1},
               {"live fraction", BH_COL_LIVE, 1},
               {"hours with full target", BH_COL_HOURS, 1},
               {"hours with empty target", BH_COL_EMPTY_HOURS, 1},
               {"beam charge", BH_COL_CHARGE, 1},
               {"counts", BH_COL_COUNTS, 1},
               {"statistical uncertainty", BH_COL_STATISTICAL, 100},
               {"hours to goal", BH_COL_HOURS_TO_GOAL, 1},
               {"change of rate for 1 mrad of angle", BH_COL_PER_MRAD, 100},
               {"change of rate for 0.1 % of beam momentum", BH_COL_PER_PERMILLE, 100}};

/* Every number of the row stands in its explanation, for the arm and for each of its bins. */
START_TEST(the_numbers_are_those_of_the_row)
{
    struct evaluated e = evaluate(hydrogen);
    bh_explanation *x = bh_explain(e.table, "K.2", "A", _i, NULL);
    ck_assert_ptr_nonnull(x);
    const size_t row = _i ? 3 + (size_t)_i - 1 : 2; /* arm M has a bin too */
    for (int i = 0; i < COUNT(numbers); i++)
        ck_assert_relative(number(x, numbers[i].name),
                           numbers[i].unit *
                               bh_table_number(e.table, _i > 0, row, numbers[i].column),
                           1e-5, numbers[i].name);
    bh_explanation_free(x);
    done(&e);
}
END_TEST

START_TEST(factors_lead_from_the_point_charge_to_the_rate)
{
    struct evaluated e = evaluate(hydrogen);
    bh_explanation *x = bh_explain(e.table, "K.1", "A", 0, NULL);
    ck_assert_relative(number(x, "cross section of the point charge") *
                           number(x, "form factors leave"),
                       number(x, "cross section"), 1e-4, "structure");
    ck_assert_relative(number(x, "average over the acceptance"),
                       number(x, "mean cross section") / cell(&e, 0, BH_COL_POINT_CROSS_SECTION),
                       1e-4, "average");
    ck_assert_relative(number(x, "dead time leaves") * number(x, "prescale leaves") *
                           number(x, "rate limit leaves"),
                       number(x, "live fraction"), 1e-4, "live fraction");
    ck_assert_relative(number(x, "from signal counts") + number(x, "from windows") +
                           number(x, "from background computed") +
                           number(x, "from the empty target"),
                       100, 1e-4, "shares of the variance");
    ck_assert_relative(number(x, "27Al in layer 1 (aluminium)") +
                           number(x, "hard radiative tail on 27Al in layer 1") +
                           number(x, "quasi-elastic on 27Al in layer 1"),
                       number(x, "background rate"), 1e-4, "background");
    ck_assert_relative(number(x, "internal factor") * number(x, "external bremsstrahlung") *
                           number(x, "single hard collisions"),
                       number(x, "radiative factor"), 2e-3, "radiation");
    ck_assert_relative(number(x, "energy that may be lost"), 12, 1e-6, "cut");
    ck_assert_relative(number(x, "1H in layer 2 (liquid-hydrogen)") +
                           number(x, "2H in layer 2 (liquid-hydrogen)"),
                       number(x, "scatterer nuclei seen"), 1e-5, "nuclei");
    bh_explanation_free(x);
    done(&e);
}
END_TEST

START_TEST(inputs_say_where_they_stand)
{
    struct evaluated e = evaluate(hydrogen);
    bh_explanation *x = bh_explain(e.table, "K.1", "A", 0, NULL);
    ck_assert_str_eq(must_find(x, "beam.current")->source, "plan.yaml:2:66");
    ck_assert_str_eq(must_find(x, "beam.current")->value, "10 ± 0.1 uA");
    ck_assert_int_eq(must_find(x, "beam.current")->kind, BH_LINE_INPUT);
    ck_assert_int_eq(must_find(x, "other_rate")->kind, BH_LINE_DEFAULT);
    ck_assert_str_eq(must_find(x, "other_rate")->source, "default");
    ck_assert_int_eq(must_find(x, "prescale")->kind, BH_LINE_INPUT);
    ck_assert_int_eq(must_find(x, "sample of liquid-hydrogen")->kind, BH_LINE_INPUT);
    ck_assert_str_eq(must_find(x, "in_plane")->value, "±28 mrad");
    bh_explanation_free(x);
    done(&e);
}
END_TEST

START_TEST(the_model_is_named_with_reason_and_spread)
{
    struct evaluated e = evaluate(hydrogen);
    bh_explanation *x = bh_explain(e.table, "K.1", "A", 0, NULL);
    const bh_line *model = NULL;
    int others = 0;
    for (size_t i = 0; i < bh_explanation_lines(x); i++) {
        const bh_line *line = bh_explanation_line(x, i);
        if (line->kind != BH_LINE_MODEL)
            continue;
        if (strcmp(line->name, "structure model") == 0)
            model = line;
        others += strstr(line->name, " instead") != NULL;
        ck_assert_ptr_nonnull(line->source);
    }
    ck_assert_ptr_nonnull(model);
    ck_assert_ptr_nonnull(strstr(model->remark, "cross sections"));
    ck_assert_ptr_nonnull(strstr(model->formula, "valid for Q2"));
    ck_assert_int_ge(others, 5);
    const double spread = number(x, "spread over the models");
    ck_assert(spread > 0.3 && spread < 4);
    bh_explanation_free(x);
    done(&e);
}
END_TEST

static const char *const inputs[] = {"from current", "from energy", "from thickness",
                                     "from structure"};

/* The plan's own uncertainties: current 1 %, length 2 %; in quadrature they are the total. */
START_TEST(what_the_rate_is_uncertain_by)
{
    struct evaluated e = evaluate(hydrogen);
    bh_explanation *x = bh_explain(e.table, "K.1", "A", 0, NULL);
    ck_assert_relative(number(x, "from thickness"), 2, 5e-3, "thickness");
    ck_assert_str_eq(must_find(x, "from thickness")->source, "plan.yaml:9:46");
    ck_assert_relative(number(x, "from current"), 1, 5e-3, "current");
    ck_assert_relative(fabs(number(x, "from energy")),
                       fabs(cell(&e, 0, BH_COL_PER_PERMILLE)) * 1e5 / 855, 3e-3, "energy");
    double sum = 0;
    for (int i = 0; i < COUNT(inputs); i++)
        sum += number(x, inputs[i]) * number(x, inputs[i]);
    ck_assert_relative(number(x, "systematic uncertainty"), sqrt(sum), 5e-3, "sum");
    ck_assert_relative(number(x, "systematic uncertainty"), 100 * cell(&e, 0, BH_COL_SYSTEMATIC),
                       5e-3, "total");
    bool named = false;
    for (size_t i = 0; i < bh_explanation_lines(x); i++) {
        const bh_line *line = bh_explanation_line(x, i);
        named = named || (line->remark && strcmp(line->remark, "The largest is thickness.") == 0);
    }
    ck_assert(named);
    double shares = 0;
    for (size_t i = 0; i < bh_explanation_lines(x); i++) {
        const bh_line *line = bh_explanation_line(x, i);
        if (line->name && strncmp(line->name, "from ", 5) == 0 && line->remark &&
            strstr(line->remark, "of the variance"))
            shares += strtod(line->remark, NULL);
    }
    ck_assert_relative(shares, 100, 5e-3, "shares of the variance");
    ck_assert_relative(number(x, "with counting statistics"),
                       hypot(number(x, "systematic uncertainty"), 0.5), 5e-3, "statistics");
    bh_explanation_free(x);
    x = bh_explain(e.table, "K.1", "M", 0, NULL);
    ck_assert_relative(number(x, "solid angle"), 2, 1e-6, "solid angle");
    ck_assert_relative(number(x, "from solid_angle"), 0.5, 5e-3, "its uncertainty");
    bh_explanation_free(x);
    done(&e);
}
END_TEST

/* Current and length cancel; energy and form factors in part. */
START_TEST(ratios_are_surer_than_rates)
{
    struct evaluated e = evaluate(hydrogen);
    bh_explanation *x = bh_explain(e.table, "K.1", "A", 0, NULL);
    const bh_effects own = bh_table_effects(e.table, false, 0);
    const bh_effects other = bh_table_effects(e.table, false, 2);
    const double ratio = number(x, "ratio to K.2, arm A");
    ck_assert_relative(ratio, 100 * bh_effects_of_ratio(bh_table_causes(e.table), &own, &other),
                       5e-3, "ratio");
    ck_assert(ratio > 0 && ratio < 0.5 * number(x, "systematic uncertainty"));
    ck_assert_ptr_nonnull(find_line(x, "ratio to K.1, arm M"));
    ck_assert_ptr_null(find_line(x, "ratio to K.1, arm A"));
    bh_explanation_free(x);
    x = bh_explain(e.table, "K.2", "A", 1, NULL);
    ck_assert(number(x, "ratio to bin 2") < 0.5 * number(x, "systematic uncertainty"));
    ck_assert_relative(number(x, "systematic uncertainty"),
                       100 * bin_cell(&e, 3, BH_COL_SYSTEMATIC), 5e-3, "total of the bin");
    bh_explanation_free(x);
    done(&e);
}
END_TEST

/* What a reader must know first: the file, the row, the title of the plan. */
START_TEST(the_row_is_named_first)
{
    char titled[2048];
    snprintf(titled, sizeof titled, "%stitle: Form factors\n%s", "plan: 1\n", hydrogen + 8);
    struct evaluated e = evaluate(titled);
    bh_explanation *x = bh_explain(e.table, "K.2", "A", 2, NULL);
    ck_assert_str_eq(bh_explanation_line(x, 0)->name, "plan.yaml: setting K.2, arm A, bin 2 of 2");
    ck_assert_str_eq(bh_explanation_line(x, 1)->remark, "Form factors");
    bh_explanation_free(x);
    x = bh_explain(e.table, "K.1", "M", 0, NULL);
    ck_assert_str_eq(bh_explanation_line(x, 0)->name,
                     "plan.yaml: setting K.1, arm M, the whole acceptance");
    bh_explanation_free(x);
    done(&e);
}
END_TEST

START_TEST(assumptions_are_listed)
{
    struct evaluated e = evaluate(hydrogen);
    bh_explanation *x = bh_explain(e.table, "K.1", "A", 0, NULL);
    int notes = 0, radiation = 0;
    for (size_t i = 0; i < bh_explanation_lines(x); i++) {
        const bh_line *line = bh_explanation_line(x, i);
        notes += line->kind == BH_LINE_NOTE;
        radiation += line->remark && strstr(line->remark, "without radiation of their own") != NULL;
    }
    ck_assert_int_ge(notes, 8);
    ck_assert_int_eq(radiation, 1);
    bh_explanation_free(x);
    done(&e);
}
END_TEST

static const struct {
    const char *setting, *arm;
    int bin;
    const char *words;
} refusals[] = {{"L", "A", 0, "no setting is called L; there are K.1, K.2"},
                {"K.1", "B", 0, "setting K.1 has no arm B; there are A, M"},
                {"K.1", NULL, 0, "setting K.1 has several arms; say which: A, M"},
                {"K.1", "A", 3, "arm A has no bin 3; its bins are 1 to 2"},
                {"K.1", "A", -1, "arm A has no bin -1"}};

START_TEST(what_is_not_there_is_refused)
{
    struct evaluated e = evaluate(hydrogen);
    bh_error err = {.code = BH_OK};
    ck_assert_ptr_null(
        bh_explain(e.table, refusals[_i].setting, refusals[_i].arm, refusals[_i].bin, &err));
    ck_assert_int_eq(err.code, BH_EPLAN);
    ck_assert_msg(strstr(err.text, refusals[_i].words) != NULL, "%s", err.text);
    ck_assert_ptr_null(
        bh_explain(e.table, refusals[_i].setting, refusals[_i].arm, refusals[_i].bin, NULL));
    done(&e);
}
END_TEST

/* Other kinds of rows: each must be explained without a number missing that is in the row. */
static const struct {
    const char *plan, *line, *value, *remark;
} others[] = {
    {"plan: 1\nbeam: {particle: alpha, kinetic_energy: 5 MeV, particle_rate: 1e6 /s}\n"
     "target: {name: t, layers: [{material: gold, thickness: 0.8 um}]}\n"
     "arms: [{name: A, ring: {from: 150 deg, to: 170 deg}, dead_time_model: paralysable}]\n"
     "settings: [{name: K, counts: 500}]\n",
     "structure model", "point", "too slow"},
    {"plan: 1\nbeam: {particle: electron, momentum: 400 MeV/c, current: 1 uA}\n"
     "target: {name: t, layers: [{material: graphite, areal_density: 100 mg/cm2}], empty_target: "
     "{share: best}}\narms: [{name: A, solid_angle: 5 msr, rate_limit: 1 MHz, momentum_bite: ±3 "
     "%}]\nmodels: {structure: {12C: fourier-bessel}}\n"
     "settings: [{name: K, angle: 40 deg, charge: 1 mC, central_momentum: 395 MeV/c}]\n",
     "central_momentum", "395 MeV/c", NULL},
    {"plan: 1\nbeam: {particle: electron, total_energy: 1 GeV, current: 1 uA}\n"
     "target: {name: t, layers: [{material: liquid-deuterium, thickness: 3 cm}]}\n"
     "arms: [{name: A, detects: recoil, solid_angle: 5 msr, target_view: ±1 cm}]\n"
     "models: {structure: abbott-2000-i}\nsettings: [{name: K, angle: 60 deg, time: 2 h}]\n",
     "structure model", "abbott-2000-i", NULL},
    {"plan: 1\nbeam: {particle: electron, total_energy: 1 GeV, current: 1 uA}\n"
     "target: {name: t, layers: [{material: liquid-hydrogen, thickness: 3 cm}], scatterer: H}\n"
     "arms: [{name: A, solid_angle: 5 msr}]\nmodels: {structure: kelly-2004}\n"
     "settings: [{name: K, q2: 0.3 GeV2}]\n",
     "structure model", "kelly-2004", "polarisation observables"}};

START_TEST(every_kind_of_row)
{
    struct evaluated e = evaluate(others[_i].plan);
    bh_explanation *x = bh_explain(e.table, "K", NULL, 0, NULL);
    ck_assert_ptr_nonnull(x);
    const bh_line *found = NULL;
    for (size_t i = 0; i < bh_explanation_lines(x); i++) {
        const bh_line *line = bh_explanation_line(x, i);
        if (line->name && line->value && strcmp(line->name, others[_i].line) == 0 &&
            strcmp(line->value, others[_i].value) == 0)
            found = line;
    }
    ck_assert_ptr_nonnull(found);
    if (others[_i].remark)
        ck_assert_ptr_nonnull(strstr(found->remark, others[_i].remark));
    ck_assert_relative(number(x, "signal rate"), cell(&e, 0, BH_COL_SIGNAL), 1e-5, "signal");
    bh_explanation_free(x);
    done(&e);
}
END_TEST

/* Rows whose background has many parts; all of them, in words or in one sum, are the whole. */
static const struct {
    const char *plan;
    int bin;
    const char *item; /* that must be among them */
} mixed[] = {
#define MUONS                                                                                    \
    "plan: 1\nbeam: {particle: muon-, momentum: 210 MeV/c, particle_rate: 1e6 /s, fraction: 22 " \
    "%, "                                                                                        \
    "others: {electron: 68 %, pion-: 10 %}}\n"                                                   \
    "target: {name: t, scatterer: H, empty_target: {share: 20 %}, layers: [{material: kapton, "  \
    "thickness: 0.1 mm, role: window}, {material: polyethylene, thickness: 5 mm}, {material: "   \
    "kapton, thickness: 0.1 mm, role: window}]}\n"
    {MUONS "arms: [{name: A, ring: {from: 20 deg, to: 90 deg}, bins: 4, energy_cut: 9 MeV}]\n"
           "settings: [{name: K, time: 1 h}]\n",
     0, "electron: quasi-elastic on 12C outside windows"},
    {MUONS "arms: [{name: A, ring: {from: 20 deg, to: 90 deg}, bins: 4, energy_cut: 9 MeV}]\n"
           "settings: [{name: K, time: 1 h}]\n",
     3, "pion-: elastic on 1H outside windows"},
    {MUONS
     "arms: [{name: A, in_plane: ±80 mrad, out_of_plane: ±50 mrad, bins: 8, angle_resolution: "
     "10 mrad, momentum_bite: ±8 %}]\nsettings: [{name: K, angle: 40 deg, time: 1 h}]\n",
     2, "exchanged with other bins"}};

START_TEST(the_items_of_the_background_add_up)
{
    struct evaluated e = evaluate(mixed[_i].plan);
    bh_explanation *x = bh_explain(e.table, "K", "A", mixed[_i].bin, NULL);
    const double all = number(x, "background rate");
    double sum = 0;
    bool inside = false, found = false;
    int cited = 0;
    for (size_t i = 0; i < bh_explanation_lines(x); i++) {
        const bh_line *line = bh_explanation_line(x, i);
        inside = line->kind == BH_LINE_SECTION ? strcmp(line->name, "Background") == 0 : inside;
        if (!inside || line->kind != BH_LINE_FACTOR || strcmp(line->name, "background rate") == 0)
            continue;
        sum += atof(line->value);
        found = found || strcmp(line->name, mixed[_i].item) == 0;
        cited += line->source && strstr(line->source, "scaling function") != NULL;
        ck_assert_msg(strstr(line->name, "smaller") || strstr(line->name, "bins") ||
                          atof(line->value) >= 0.9999e-4 * all,
                      "%s", line->name);
    }
    ck_assert_msg(found, "%s", mixed[_i].item);
    ck_assert_int_le(cited, 1);
    ck_assert_relative(sum, all, 1e-4, mixed[_i].item);
    ck_assert_relative(all,
                       mixed[_i].bin ? bin_cell(&e, (size_t)mixed[_i].bin - 1, BH_COL_BACKGROUND)
                                     : cell(&e, 0, BH_COL_BACKGROUND),
                       1e-5, "row");
    bh_explanation_free(x);
    done(&e);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("explain");
    tcase_add_loop_test(tests, the_numbers_are_those_of_the_row, 0, 3);
    tcase_add_test(tests, factors_lead_from_the_point_charge_to_the_rate);
    tcase_add_test(tests, inputs_say_where_they_stand);
    tcase_add_test(tests, the_model_is_named_with_reason_and_spread);
    tcase_add_test(tests, what_the_rate_is_uncertain_by);
    tcase_add_test(tests, the_row_is_named_first);
    tcase_add_test(tests, ratios_are_surer_than_rates);
    tcase_add_test(tests, assumptions_are_listed);
    tcase_add_loop_test(tests, what_is_not_there_is_refused, 0, COUNT(refusals));
    tcase_add_loop_test(tests, the_items_of_the_background_add_up, 0, COUNT(mixed));
    tcase_add_loop_test(tests, every_kind_of_row, 0, COUNT(others));
    return run_suite("explain", tests);
}
