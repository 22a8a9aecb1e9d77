/* test_event_search.c - any two of energy, angle, Q2 and epsilon give back the other two. */
#include "../suite.h"

#include <math.h>
#include <stdbool.h>
#include <string.h>

#include "beamhours/run/event_search.h"
#include "beamhours/units/constants.h"

static const struct {
    const char *name;
    double mass, target, kinetic, angle; /* MeV, MeV, MeV, deg of the detected particle */
    bool recoil;
} events[] = {
    {"e p", 0.51099895069, 938.27208943, 855, 25, false},
    {"e p backward", 0.51099895069, 938.27208943, 80, 115, false},
    {"mu p", 105.6583755, 938.27208943, 86, 40, false},
    {"mu C", 105.6583755, 11174.8632, 200, 60, false},
    {"e d", 0.51099895069, 1875.612945, 4000, 8, false},
    {"e p, recoil", 0.51099895069, 938.27208943, 855, 60, true},
    {"mu p, recoil", 105.6583755, 938.27208943, 900, 50, true},
};

enum { KINETIC = 1, ANGLE = 2, Q2 = 4, EPSILON = 8 };

static const int pairs[] = {KINETIC | ANGLE, KINETIC | Q2,    KINETIC | EPSILON,
                            ANGLE | Q2,      ANGLE | EPSILON, Q2 | EPSILON};

static bh_known only(int which, const bh_known *all)
{
    return (bh_known){which & KINETIC ? all->kinetic : NAN, which & ANGLE ? all->angle : NAN,
                      which & Q2 ? all->q2 : NAN, which & EPSILON ? all->epsilon : NAN,
                      all->recoil};
}

/* Derivatives of epsilon near its ends make an energy from it less sharp than the energy itself. */
START_TEST(every_pair_gives_the_same_event)
{
    const bh_collision masses = {events[_i].mass, events[_i].target, NAN};
    const double angle = events[_i].angle * BH_DEGREE;
    bh_known all = {events[_i].kinetic, angle, NAN, NAN, events[_i].recoil};
    bh_event first, found;
    double kinetic = 0;
    bh_error err = {.code = BH_OK};
    ck_assert_int_eq(bh_event_search(&masses, &all, &kinetic, &first, &err), BH_OK);
    ck_assert_double_eq(kinetic, events[_i].kinetic);
    all.q2 = first.q2;
    all.epsilon = first.epsilon;
    for (int p = 0; p < COUNT(pairs); p++) {
        const bh_known known = only(pairs[p], &all);
        const bh_code bad = bh_event_search(&masses, &known, &kinetic, &found, &err);
        ck_assert_msg(!bad, "%s, pair %d: %s", events[_i].name, p, err.text);
        ck_assert_msg(fabs(kinetic / all.kinetic - 1) < 1e-9, "%s, pair %d: %.15g MeV",
                      events[_i].name, p, kinetic);
        ck_assert_msg(fabs(found.q2 / first.q2 - 1) < 1e-9, "%s, pair %d: Q2 %.15g",
                      events[_i].name, p, found.q2);
        const double got = events[_i].recoil ? found.recoil_angle : found.scattered_angle;
        ck_assert_msg(fabs(got - angle) < 1e-9, "%s, pair %d: %.15g rad", events[_i].name, p, got);
    }
}
END_TEST

static const struct {
    bh_known known;
    const char *words;
} mistakes[] = {
    {{NAN, NAN, NAN, NAN, false}, "exactly two of energy, angle, q2 and epsilon; 0 were given"},
    {{855, NAN, NAN, NAN, false}, "1 were given"},
    {{855, 0.5, 1e5, NAN, false}, "3 were given"},
    {{855, 0.5, 1e5, 0.5, true}, "4 were given"},
    {{855, -0.5, NAN, NAN, false}, "angle"},
    {{855, 2.0, NAN, NAN, true}, "recoil angle"},
    {{855, NAN, 1e9, NAN, false}, "Q2"},
    {{NAN, 1.5, 1e14, NAN, true}, "no beam energy from 1 keV to 1 TeV"},
    {{NAN, 1.5, NAN, -1, true}, "no beam energy from 1 keV to 1 TeV"},
};

START_TEST(what_cannot_be_is_refused)
{
    const bh_collision masses = {0.51099895069, 938.27208943, NAN};
    bh_event found = {.q2 = -1};
    double kinetic = -1;
    bh_error err = {.code = BH_OK};
    ck_assert_int_eq(bh_event_search(&masses, &mistakes[_i].known, &kinetic, &found, &err),
                     BH_EDOMAIN);
    ck_assert_msg(strstr(err.text, mistakes[_i].words) != NULL, "%s", err.text);
    ck_assert_double_eq(kinetic, -1); /* untouched */
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("event search");
    tcase_add_loop_test(tests, every_pair_gives_the_same_event, 0, COUNT(events));
    tcase_add_loop_test(tests, what_cannot_be_is_refused, 0, COUNT(mistakes));
    return run_suite("run/event_search", tests);
}
