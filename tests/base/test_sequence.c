/* test_sequence.c - names stand as people count them. */
#include "../suite.h"

#include <string.h>

#include "beamhours/base/sequence.h"

/* In order: each comes before all that follow.  common practice */
static const char *const names[] = {"",
                                    "0",
                                    "007",
                                    "7",
                                    "8",
                                    "10",
                                    "10.2",
                                    "10.10",
                                    "K",
                                    "K1",
                                    "K1.1",
                                    "K1.2",
                                    "K1.10",
                                    "K2.1",
                                    "K10",
                                    "K10a",
                                    "K10b",
                                    "Ka",
                                    "k1",
                                    "scan.009",
                                    "scan.9a",
                                    "scan.0010",
                                    "scan.10",
                                    "scan.99999999999999999999999",
                                    "scan.100000000000000000000000",
                                    "\u00E4"};

static int sign(int x)
{
    return (x > 0) - (x < 0);
}

START_TEST(each_against_each)
{
    const int count = (int)COUNT(names);
    for (int i = 0; i < count; i++)
        ck_assert_msg(sign(bh_sequence(names[_i], names[i])) == sign(_i - i),
                      "\"%s\" against \"%s\": %d", names[_i], names[i],
                      bh_sequence(names[_i], names[i]));
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("sequence");
    tcase_add_loop_test(tests, each_against_each, 0, (int)COUNT(names));
    return run_suite("base/sequence", tests);
}
