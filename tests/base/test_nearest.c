/* test_nearest.c - slips of the keyboard find their word; other words find none. */
#include "../suite.h"

#include <string.h>

#include "beamhours/base/nearest.h"

static const char *const words[] = {
    "beam", "particle", "particle_rate", "current",     NULL, "momentum", "target", "targets",
    "goal", "q2",       "in_plane",      "solid_angle", "1H", "muon-"};

static const struct {
    const char *word, *wanted;
} rows[] = {
    {"curent", "current"},
    {"currnet", "current"},
    {"Current", "current"},
    {"ucrrent", "current"},
    {"current", "current"},
    {"beem", "beam"},
    {"in-plane", "in_plane"},
    {"Solid Angle", "solid_angle"},
    {"targts", "targets"},
    {"target", "target"},
    {"momntm", "momentum"},
    {"q3", "q2"},
    {"1h", "1H"},
    {"muon_", "muon-"},
    {"mom", "momentum"},
    {"part", "particle"},
    {"solid", "solid_angle"},
    {"", NULL},
    {"x", NULL},
    {"zz", NULL},
    {"kinetic_energy", NULL},
    {"be", NULL},
    {"gaol", "goal"},
    {"boat", NULL},
    {"a_word_of_more_than_sixty_four_letters_that_nobody_would_ever_use_as_a_key", NULL},
};

START_TEST(finds)
{
    const char *found = bh_nearest(rows[_i].word, words, COUNT(words));
    if (rows[_i].wanted) {
        ck_assert_msg(found != NULL, "%s found none", rows[_i].word);
        ck_assert_str_eq(found, rows[_i].wanted);
    } else {
        ck_assert_msg(found == NULL, "%s found %s", rows[_i].word, found);
    }
}
END_TEST

START_TEST(none_of_none)
{
    ck_assert_ptr_null(bh_nearest("beam", words, 0));
    ck_assert_ptr_null(bh_nearest("beam", NULL, 0));
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("nearest");
    tcase_add_loop_test(tests, finds, 0, COUNT(rows));
    tcase_add_test(tests, none_of_none);
    return run_suite("base/nearest", tests);
}
