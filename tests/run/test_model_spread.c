/* test_model_spread.c - what models make rates uncertain by, against other models and by hand. */
#include "uncertain.h"

#include "beamhours/physics/structure.h"

static const char *const nuclei[] = {
    BEAM_500 HYDROGEN ARM "settings: [{name: K, angle: [25 deg, 70 deg]}]\n",
    "plan: 1\nbeam: {particle: electron, kinetic_energy: 300 MeV, current: 10 uA}\n"
    "target: {name: t, scatterer: 12C, layers: [{material: graphite, thickness: 1 mm}]}\n"
    "arms: [{name: A, in_plane: ±28 mrad, out_of_plane: ±70 mrad}]\n"
    "settings: [{name: K, angle: [30 deg, 60 deg]}]\n",
    "plan: 1\nbeam: {particle: electron, kinetic_energy: 400 MeV, current: 10 uA}\n"
    "target: {name: t, scatterer: 2H, layers: [{material: liquid-deuterium, thickness: 1 cm}]}\n"
    "arms: [{name: A, in_plane: ±28 mrad, out_of_plane: ±70 mrad}]\n"
    "settings: [{name: K, angle: [30 deg, 60 deg]}]\n"};

/* With another description of the nucleus the rate is what its effect says. */
START_TEST(other_descriptions_give_the_rates_they_are_said_to)
{
    struct evaluated e = evaluate(nuclei[_i]);
    const bh_causes *causes = bh_table_causes(e.table);
    int compared = 0;
    for (size_t i = 0; i < bh_causes_count(causes); i++) {
        const bh_cause *c = bh_causes_at(causes, i);
        if (c->kind != BH_CAUSE_STRUCTURE || !c->model)
            continue;
        const bh_change change = {"models", NULL};
        char yaml[128];
        snprintf(yaml, sizeof yaml, "{structure: %s}", c->model);
        struct evaluated other = with(nuclei[_i], &(bh_change){change.path, yaml}, 1, false);
        for (size_t r = 0; r < 2; r++) {
            const bh_effects effects = bh_table_effects(e.table, false, r);
            for (size_t k = 0; k < effects.count; k++)
                if (effects.cause[k] == i && !isnan(effects.effect[k])) {
                    const double off =
                        cell(&other, r, BH_COL_SIGNAL) / cell(&e, r, BH_COL_SIGNAL) - 1;
                    ck_assert_msg(fabs(effects.effect[k] - off) < 2e-4 + 0.03 * fabs(off),
                                  "%s in row %zu: %g, wanted %g", c->model, r, effects.effect[k],
                                  off);
                    compared++;
                }
        }
        done(&other);
    }
    ck_assert_int_ge(compared, 2);
    done(&e);
}
END_TEST

/* NAN where the cause is not among those of the row. */
static double effect_of(const bh_effects *row, unsigned cause)
{
    for (size_t i = 0; i < row->count; i++)
        if (row->cause[i] == cause)
            return row->effect[i];
    return (double)NAN;
}

/* Half the range over the models, in a row and (those with data in both rows) in a ratio. */
START_TEST(models_count_as_half_the_range_they_span)
{
    struct evaluated e = evaluate(nuclei[0]);
    const bh_causes *causes = bh_table_causes(e.table);
    const bh_effects a = bh_table_effects(e.table, false, 0);
    const bh_effects b = bh_table_effects(e.table, false, 1);
    double low = 0, high = 0, low_ratio = 0, high_ratio = 0, data = 0, data_ratio = 0;
    int common = 0;
    for (size_t k = 0; k < a.count; k++) {
        if (bh_causes_at(causes, a.cause[k])->kind != BH_CAUSE_STRUCTURE)
            continue;
        const double off = a.effect[k] - effect_of(&b, a.cause[k]);
        if (!bh_causes_at(causes, a.cause[k])->model) { /* the data behind the model in use */
            data = a.effect[k];
            data_ratio = off;
            continue;
        }
        common += isnan(off) ? 0 : 1;
        low = fmin(low, a.effect[k]);
        high = fmax(high, a.effect[k]);
        low_ratio = fmin(low_ratio, off);
        high_ratio = fmax(high_ratio, off);
    }
    ck_assert_int_ge(common, 4);
    ck_assert_int_lt(common, (int)a.count); /* one fit ends between the two */
    ck_assert_relative(from(&e, 0, BH_CAUSE_STRUCTURE), hypot((high - low) / 2, data), 1e-12,
                       "row");
    ck_assert_double_gt(data, 1e-4);
    ck_assert_double_lt(data, 0.01);
    const double there = bh_effects_of_ratio(causes, &a, &b);
    ck_assert_relative(there, hypot((high_ratio - low_ratio) / 2, data_ratio), 1e-3, "ratio");
    ck_assert_relative(bh_effects_of_ratio(causes, &b, &a), there, 1e-12, "its inverse");
    done(&e);
}
END_TEST

/* Light nuclei are not doubted by shapes of heavy ones, and never surer than their data. */
/* GE^2 / Z^2 at the angle of a row. */
static double form_left(const struct evaluated *e, size_t row)
{
    const bh_target *target = e->plan->settings[row].target;
    bh_structure *s = bh_structure_new(NULL, target->scatterer_z, target->scatterer_a, NULL);
    const double q2 = cell(e, row, BH_COL_Q2) * 1e6, z = target->scatterer_z;
    double ge2, gm2;
    bh_structure_eval(s, 1, &q2, &ge2, &gm2);
    bh_structure_free(s);
    return ge2 / (z * z);
}

static const struct {
    const char *nucleus, *material;
    double data; /* [1] */
    int others;  /* published descriptions beside the one in use */
} light[] = {{"2H", "liquid-deuterium", 0.03, 1},
             {"3He", "helium-3-gas", 0.03, 2},
             {"4He", "liquid-helium", 0.02, 2},

             {"12C", "graphite", 0.01, 6}};

START_TEST(light_nuclei_are_doubted_by_their_own)
{
    char text[1024];
    snprintf(text, sizeof text,
             "plan: 1\nbeam: {particle: electron, kinetic_energy: 400 MeV, current: 1 nA}\n"
             "target: {name: t, scatterer: %s, layers: [{material: %s, thickness: 0.1 mm}]}\n" ARM
             "settings: [{name: K, angle: {from: 15 deg, to: 65 deg, step: 5 deg}}]\n",
             light[_i].nucleus, light[_i].material);
    struct evaluated e = evaluate(text);
    const bh_causes *causes = bh_table_causes(e.table);
    int others = 0;
    for (size_t i = 0; i < bh_causes_count(causes); i++) {
        const bh_cause *c = bh_causes_at(causes, i);
        if (c->kind != BH_CAUSE_STRUCTURE || !c->model)
            continue;
        others++;
        ck_assert_msg(light[_i].others > 4 ||
                          (!strstr(c->model, "helm") && !strstr(c->model, "uniform") &&
                           !strstr(c->model, "fermi-2p")),
                      "%s by %s", light[_i].nucleus, c->model);
    }
    ck_assert_int_eq(others, light[_i].others);
    double before = 0;
    for (size_t r = 0; r < bh_table_rows(e.table, false); r++) {
        const double size = from(&e, r, BH_CAUSE_STRUCTURE);
        const double data = light[_i].data * (1 - form_left(&e, r));
        ck_assert_msg(size >= 0.97 * data, "%s: %g below %g", light[_i].nucleus, size, data);
        ck_assert_msg(_i > 0 || size < 1.2 * data, "%s: %g, %g", light[_i].nucleus, size, data);
        ck_assert_double_gt(size, 0.9 * before); /* two fits that cross do not make it surer */
        before = _i == 0 ? size : 0;
    }
    done(&e);
}
END_TEST

/* Ye et al. 2018 publish the uncertainty of their fit. */
START_TEST(a_published_uncertainty_is_preferred_to_the_spread)
{
    struct evaluated e = with(nuclei[0], &(bh_change){"models", "{structure: ye-2018}"}, 1, false);
    bh_structure *ye = bh_structure_new("ye-2018", 1, 1, NULL);
    const double published = bh_structure_uncertainty(ye, cell(&e, 1, BH_COL_Q2) * 1e6);
    ck_assert_relative(from(&e, 1, BH_CAUSE_STRUCTURE), published, 0.01, "Ye et al. 2018");
    bh_structure_free(ye);
    done(&e);
}
END_TEST

/* McKinley & Feshbach 1948: pi Z alpha s (1 - s) / (1 - s^2), s = sin 30 deg, and the sign of the
 * charge; the form factor hardly matters at 5 MeV. */
START_TEST(plane_waves_on_carbon_are_off_by_the_second_born_term)
{
    static const char *const particles[] = {"electron", "positron"};
    for (int i = 0; i < 2; i++) {
        char text[512];
        snprintf(text, sizeof text,
                 "plan: 1\nbeam: {particle: %s, kinetic_energy: 5 MeV, current: 1 uA}\n"
                 "target: {name: t, scatterer: 12C, layers: [{material: graphite, thickness: 1 "
                 "mm}]}\narms: [{name: A, solid_angle: 1 msr}]\n"
                 "settings: [{name: K, angle: 60 deg}]\n",
                 particles[i]);
        struct evaluated e = evaluate(text);
        ck_assert_relative(from(&e, 0, BH_CAUSE_COULOMB), 0.0457, 0.08, "McKinley & Feshbach 1948");
        done(&e);
    }
}
END_TEST

/* Andersen et al. 1980 for alphas of 5 MeV on gold at 160 deg: V1/E = 0.00688 by hand. */
START_TEST(screening_is_what_a_slow_ion_is_uncertain_by)
{
    struct evaluated e =
        evaluate("plan: 1\nbeam: {particle: alpha, kinetic_energy: 5 MeV, particle_rate: 1e6 /s}\n"
                 "target: {name: t, layers: [{material: gold, thickness: 0.1 um}]}\n"
                 "arms: [{name: A, solid_angle: 1 msr}]\nsettings: [{name: K, angle: 160 deg}]\n");
    ck_assert_relative(from(&e, 0, BH_CAUSE_SCREENING), 0.0069, 0.03, "Andersen et al. 1980");
    ck_assert(from(&e, 0, BH_CAUSE_STRUCTURE) == 0);
    ck_assert_relative(cell(&e, 0, BH_COL_SYSTEMATIC), from(&e, 0, BH_CAUSE_SCREENING), 1e-9,
                       "total");
    done(&e);
}
END_TEST

/* Lead has four isotopes; their form factors are wrong together. */
START_TEST(isotopes_are_wrong_together)
{
    static const char *const scatterers[] = {"Pb", "208Pb"};
    double size[2];
    for (int i = 0; i < 2; i++) {
        char text[512];
        snprintf(text, sizeof text,
                 BEAM_500
                 "target: {name: t, scatterer: %s, layers: [{material: lead, thickness: 0.1 "
                 "mm}]}\narms: [{name: A, solid_angle: 1 msr}]\n"
                 "settings: [{name: K, angle: 15 deg}]\n",
                 scatterers[i]);
        struct evaluated e = evaluate(text);
        size[i] = from(&e, 0, BH_CAUSE_STRUCTURE);
        done(&e);
    }
    ck_assert_msg(size[0] > 0.5 * size[1] && size[0] < 2 * size[1], "%g, %g", size[0], size[1]);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("model spread");
    tcase_add_loop_test(tests, other_descriptions_give_the_rates_they_are_said_to, 0,
                        COUNT(nuclei));
    tcase_add_test(tests, models_count_as_half_the_range_they_span);
    tcase_add_loop_test(tests, light_nuclei_are_doubted_by_their_own, 0, COUNT(light));
    tcase_add_test(tests, a_published_uncertainty_is_preferred_to_the_spread);
    tcase_add_test(tests, plane_waves_on_carbon_are_off_by_the_second_born_term);
    tcase_add_test(tests, screening_is_what_a_slow_ion_is_uncertain_by);
    tcase_add_test(tests, isotopes_are_wrong_together);
    return run_suite("model spread", tests);
}
