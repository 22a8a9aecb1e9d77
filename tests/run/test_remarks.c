/* test_remarks.c - every warning of an evaluation, provoked, said once, at its line. */
#include "evaluated.h"

#include "beamhours/run/remarks.h"

#define BEAM "plan: 1\nbeam: {particle: electron, kinetic_energy: 855 MeV, current: 10 uA}\n"
#define HYDROGEN                                                                             \
    "target: {name: t, scatterer: H, layers: [{material: liquid-hydrogen, thickness: 5 cm, " \
    "density_loss: 0.02 %/uA}]}\n"
#define POINT "arms: [{name: A, solid_angle: 5 msr, energy_cut: 15 MeV}]\n"

#define PROTONS(energy)                                                              \
    "plan: 1\nbeam: {particle: proton, kinetic_energy: " energy ", current: 1 nA}\n" \
    "target: {name: t, layers: [{material: carbon-12, thickness: 1 um}]}\n"          \
    "arms: [{name: A, solid_angle: 1 msr}]\n"
#define DEUTERIUM(cut, angle)                                                              \
    "plan: 1\nbeam: {particle: electron, kinetic_energy: 400 MeV, current: 1 uA}\n"        \
    "target: {name: t, scatterer: H, layers: [{material: liquid-deuterium, thickness: 1 "  \
    "mm}]}\narms: [{name: A, in_plane: ±20 mrad, out_of_plane: ±40 mrad, energy_cut: " cut \
    "}]\nsettings: [{name: K, angle: " angle ", time: 1 h}]\n"

static const struct {
    const char *plan, *words;
    int line; /* where it must stand */
} rows[] = {
    /* the fit ends at 0.06 GeV2 */
    {BEAM HYDROGEN POINT "models: {structure: prad-2019}\n"
                         "settings: [{name: K, angle: 40 deg, time: 1 h}]\n",
     "prad-2019 of 1H describes data from Q2 0 to 0.06 GeV2; in K the arm reaches from 0.28", 5},
    {BEAM HYDROGEN POINT "models: {structure: prad-2019}\n"
                         "settings: [{name: K, angle: [30 deg, 40 deg, 50 deg], time: 1 h}]\n",
     "in K.1 and 2 more settings", 5},
    {BEAM HYDROGEN POINT "models: {structure: prad-2019}\n"
                         "settings: [{name: K, angle: [30 deg, 40 deg], time: 1 h}]\n",
     "in K.1 and 1 more setting the arm", 5},
    {BEAM "target: {name: t, layers: [{material: lead, areal_density: 20 mg/cm2}]}\n" POINT
          "settings: [{name: K, angle: 20 deg, time: 1 h}]\n",
     "structure of 206Pb: radius from Angeli & Marinova 2013", 1},
    {BEAM "target: {name: t, layers: [{material: lead, areal_density: 20 mg/cm2}]}\n" POINT
          "settings: [{name: K, angle: 20 deg, time: 1 h}]\n",
     "plane waves on Pb (Z alpha = 0.598)", 1},
    {"plan: 1\nbeam: {particle: proton, kinetic_energy: 100 MeV, particle_rate: 1e9 /s}\n"
     "target: {name: t, layers: [{material: gold, thickness: 1 um}]}\n" POINT
     "settings: [{name: K, angle: 150 deg, time: 1 h}]\n",
     "K: ", 1},
    {BEAM HYDROGEN "arms: [{name: A, solid_angle: 5 msr, rate_limit: 1 kHz}]\n"
                   "settings: [{name: K, angle: 20 deg, time: 1 h}]\n",
     "over its limit of 1000 Hz, in K; a prescale", 5},
    {BEAM HYDROGEN "arms: [{name: A, solid_angle: 5 msr, energy_cut: 15 MeV, dead_time: 20 us}]\n"
                   "settings: [{name: K, angle: 20 deg, time: 1 h}]\n",
     "of its triggers in K, the rest falls into its dead time", 5},
    {BEAM HYDROGEN "arms: [{name: A, in_plane: ±90 mrad, out_of_plane: ±5 mrad, bins: 3}]\n"
                   "settings: [{name: K, angle: 90 deg, goal: 0.001 %, goal_for: each-bin}]\n"
                   "schedule: {available: 10 h}\n",
     "bin 3 of A needs ", 5},
    {BEAM HYDROGEN POINT "settings: [{name: K, angle: 90 deg, time: 20 h}]\n"
                         "schedule: {available: 10 h}\n",
     "the plan asks for 20.0 h and 10 h are available", 6},
    {BEAM "target: {name: t, scatterer: H, layers: [{material: aluminium, thickness: 1 mm, role: "
          "window}, {material: liquid-hydrogen, thickness: 5 cm, density_loss: 0.02 %/uA}]}\n" POINT
          "settings: [{name: K, angle: 30 deg, time: 1 h}]\n",
     "t has windows and no empty_target", 3},
    {BEAM HYDROGEN "arms: [{name: A, solid_angle: 5 msr}]\n"
                   "settings: [{name: K, angle: 20 deg, time: 1 h}]\n",
     "A has neither energy_cut nor momentum_bite", 4},
    {BEAM HYDROGEN "arms: [{name: A, solid_angle: 5 msr, momentum_bite: ±6 %}]\n"
                   "settings: [{name: K, angle: [20 deg, 30 deg], time: 1 h}]\n",
     "what A lets electrons and muons lose is up to 5.99 % of the scattered energy in K.1 and 1 "
     "more setting;",
     4},
    {BEAM HYDROGEN "arms: [{name: A, solid_angle: 5 msr, energy_cut: 40 MeV, momentum_bite: ±6 "
                   "%}]\nsettings: [{name: K, angle: 20 deg, time: 1 h}]\n",
     "is up to 4.94 % of the scattered energy in K;", 4},
    {BEAM HYDROGEN "arms: [{name: A, solid_angle: 5 msr, energy_cut: 5 MeV, detects: recoil}]\n"
                   "settings: [{name: K, angle: 50 deg, time: 1 h}]\n",
     "A sees recoils: the radiative factor in K", 4},
    {BEAM HYDROGEN "models: {radiative: mo-tsai}\n"
                   "arms: [{name: A, solid_angle: 5 msr, energy_cut: 5 MeV}]\n"
                   "settings: [{name: K, angle: 0.3 deg, time: 1 h}]\n",
     "an electron is not light enough for mo-tsai", 5},
    {BEAM HYDROGEN "arms: [{name: A, solid_angle: 5 msr, threshold: 10 MeV}]\n"
                   "settings: [{name: K, angle: 40 deg, time: 1 h}]\n",
     "the background on 1H in K is a lower limit: not computed: inelastic scattering between", 1},
    {"plan: 1\nbeam: {particle: muon-, momentum: 200 MeV/c, particle_rate: 1e6 /s, fraction: 80 %, "
     "others: {pion-: 20 %}}\n" HYDROGEN POINT "settings: [{name: K, angle: 40 deg, time: 1 h}]\n",
     "the background by the beam's pion- in K: nuclear forces are left out", 2},
    {PROTONS("12 MeV") "settings: [{name: K, angle: {from: 40 deg, to: 60 deg, step: 10 deg}}]\n",
     "the background on 12C in K.1 and 2 more settings is a lower limit: not computed: inelastic "
     "scattering and other reactions by nuclear forces",
     1},
    {PROTONS("12 MeV") "settings: [{name: K, angle: {from: 40 deg, to: 60 deg, step: 10 deg}}]\n",
     "real cross sections may differ by orders of magnitude", 1},
    {"plan: 1\nbeam: {particle: muon-, momentum: 200 MeV/c, particle_rate: 1e6 /s, fraction: 80 %, "
     "others: {proton: 20 %}}\n"
     "target: {name: t, scatterer: 12C, layers: [{material: carbon-12, thickness: 1 mm}]}\n" POINT
     "settings: [{name: K, angle: 40 deg, time: 1 h}]\n",
     "the background on 12C in K is a lower limit: not computed: protons in the beam: inelastic",
     2},
    {DEUTERIUM("2.1 MeV", "{from: 40 deg, to: 60 deg, step: 10 deg}"),
     "in K.2 and 1 more setting is a lower limit: not computed: break-up of the deuteron and its "
     "quasi-elastic peak, "
     "to a final mass W of 1.18 GeV; it begins 2.00 MeV below the line: an energy_cut below 1.9 "
     "MeV "
     "would avoid it",
     1},
    {BEAM HYDROGEN "arms: [{name: A, solid_angle: 5 msr, momentum_bite: ±2 %}]\n"
                   "settings: [{name: K, angle: 40 deg, central_momentum: 300 MeV/c, time: 1 h}]\n",
     "nothing scattered by H is counted by A in K", 5},
};

START_TEST(a_warning_is_given)
{
    struct evaluated e = evaluate(rows[_i].plan);
    const bh_diags *w = bh_table_warnings(e.table);
    int found = 0;
    for (size_t i = 0; i < bh_diags_count(w); i++) {
        const bh_diag *d = bh_diags_at(w, i);
        if (!strstr(d->text, rows[_i].words))
            continue;
        found++;
        ck_assert_int_eq(d->severity, BH_SEVERITY_WARNING);
        ck_assert_str_eq(d->at.file, "plan.yaml");
        ck_assert_int_eq(d->at.line, rows[_i].line);
        ck_assert_str_ne(d->key, "");
    }
    if (found != 1)
        print_diags(w);
    ck_assert_int_eq(found, 1);
    done(&e);
}
END_TEST

START_TEST(a_sound_plan_has_none)
{
    struct evaluated e =
        evaluate(BEAM HYDROGEN POINT "settings: [{name: K, angle: 40 deg, time: 1 h}]\n");
    print_diags(bh_table_warnings(e.table));
    ck_assert_uint_eq(bh_diags_count(bh_table_warnings(e.table)), 0);
    done(&e);
}
END_TEST

/* The cut that a warning proposes leaves it none; below the barrier protons only scatter. */
static const char *const avoided[][2] = {
    {DEUTERIUM("1.9 MeV", "{from: 40 deg, to: 60 deg, step: 10 deg}"), "break-up"},
    {PROTONS("0.9 MeV") "settings: [{name: K, angle: 60 deg}]\n", "lower limit"},
    {PROTONS("2 MeV") "settings: [{name: K, angle: 60 deg}]\n", "orders of magnitude"}};

START_TEST(a_warning_can_be_avoided)
{
    struct evaluated e = evaluate(avoided[_i][0]);
    ck_assert(!warns(&e, avoided[_i][1]));
    done(&e);
}
END_TEST

START_TEST(warnings_of_the_reader_come_along)
{
    struct evaluated e = evaluate(BEAM "target: {name: t, layers: [{material: liquid-hydrogen, "
                                       "thickness: 5 cm, density_loss: 0.02 %/uA, density: "
                                       "0.09 g/cm3}], scatterer: H}\n" POINT
                                       "settings: [{name: K, angle: 40 deg, time: 1 h}]\n");
    ck_assert_uint_eq(bh_diags_count(bh_table_warnings(e.table)), bh_diags_count(e.diags));
    ck_assert_uint_eq(bh_diags_count(e.diags), 1);
    ck_assert_uint_eq(bh_diags_errors(bh_table_warnings(e.table)), 0);
    done(&e);
}
END_TEST

/* Straight to the list: kinds that a plan seldom gives, numbers joined, keys as paths. */
START_TEST(remarks_are_joined)
{
    bh_remarks *remarks = bh_remarks_new();
    bh_diags *diags = bh_diags_new();
    bh_remark r = {.kind = BH_REMARK_NOT_CONVERGED,
                   .at = {"p", 4, 2},
                   .key = "settings",
                   .who = "A",
                   .setting = "K1"};
    for (int i = 0; i < 40; i++)
        bh_remarks_note(remarks, &r); /* the same again and again */
    r.at.line = 5;
    r.setting = "K2";
    bh_remarks_note(remarks, &r);
    r = (bh_remark){.kind = BH_REMARK_LIMIT, .at = {"p", 6, 1}, .key = "rate_limit", .who = "B"};
    r.setting = "K3";
    r.from = 100;
    r.high = 150;
    bh_remarks_note(remarks, &r);
    r.high = 250;
    bh_remarks_note(remarks, &r);
    r = (bh_remark){.kind = BH_REMARK_COULOMB, .at = {"p", 1, 1}, .key = "models.coulomb"};
    bh_remarks_note(remarks, &r);
    ck_assert(bh_remarks_say(remarks, diags));
    ck_assert_uint_eq(bh_diags_count(diags), 4);
    ck_assert_ptr_nonnull(
        strstr(bh_diags_at(diags, 0)->text, "of A did not settle to 1e-6 in K1;"));
    ck_assert_str_eq(bh_diags_at(diags, 1)->key, "settings.K2");
    ck_assert_str_eq(bh_diags_at(diags, 2)->key, "arms.B.rate_limit");
    ck_assert_ptr_nonnull(strstr(bh_diags_at(diags, 2)->text, "would record 250 Hz"));
    ck_assert_ptr_nonnull(strstr(bh_diags_at(diags, 2)->text, "a prescale 3 times as large"));
    ck_assert_str_eq(bh_diags_at(diags, 3)->key, "models.coulomb");
    bh_diags_free(diags);
    bh_remarks_free(remarks);
    bh_remarks_free(NULL);
}
END_TEST

/* More kinds of remarks than the list first has room for. */
START_TEST(the_list_grows)
{
    bh_remarks *remarks = bh_remarks_new();
    bh_diags *diags = bh_diags_new();
    for (int i = 0; i < 100; i++)
        bh_remarks_note(remarks, &(bh_remark){.kind = BH_REMARK_NO_SIGNAL,
                                              .at = {"p", i + 1, 1},
                                              .key = "settings",
                                              .who = "A",
                                              .what = "H",
                                              .setting = "K"});
    ck_assert(bh_remarks_say(remarks, diags));
    ck_assert_uint_eq(bh_diags_count(diags), 100);
    ck_assert_int_eq(bh_diags_at(diags, 99)->at.line, 100);
    bh_diags_free(diags);
    bh_remarks_free(remarks);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("remarks");
    tcase_add_loop_test(tests, a_warning_is_given, 0, COUNT(rows));
    tcase_add_loop_test(tests, a_warning_can_be_avoided, 0, COUNT(avoided));
    tcase_add_test(tests, a_sound_plan_has_none);
    tcase_add_test(tests, warnings_of_the_reader_come_along);
    tcase_add_test(tests, remarks_are_joined);
    tcase_add_test(tests, the_list_grows);
    return run_suite("remarks", tests);
}
