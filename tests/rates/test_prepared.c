/* test_prepared.c - parts of acceptances kept ready are those made anew. */
#include "../suite.h"
#include "beamhours/rates/prepared.h"

static bh_acceptance arm_at(double angle, int bins)
{
    bh_acceptance a;
    const bh_acceptance_spec spec = {.shape = BH_ACCEPTANCE_RECTANGLE,
                                     .angle = angle,
                                     .in_plane_from = -0.03,
                                     .in_plane_to = 0.02,
                                     .out_of_plane_from = -0.07,
                                     .out_of_plane_to = 0.06,
                                     .bins = bins};
    ck_assert_int_eq(bh_acceptance_make(&spec, &a, NULL), BH_OK);
    return a;
}

/* More parts than there is room for, each asked for twice in turns with others. */
START_TEST(same_as_made_anew)
{
    bh_prepared *prepared = calloc(1, sizeof *prepared);
    ck_assert_ptr_nonnull(prepared);
    for (int round = 0; round < 2; round++)
        for (int k = 0; k < 20; k++) {
            const bh_acceptance a = arm_at(0.5 + 0.01 * k, 60);
            for (int bin = 0; bin <= 60; bin++) {
                bh_acceptance_part part;
                bh_acceptance_part_of(&a, bin, &part);
                const bh_prepared_part *p = bh_prepared_part_of(prepared, &a, bin);
                ck_assert_double_eq(p->part.in_from, part.in_from);
                ck_assert_double_eq(p->part.in_to, part.in_to);
                ck_assert_double_eq(p->part.polar.from, part.polar.from);
                ck_assert_double_eq(p->part.solid_angle, part.solid_angle);
                double sum = 0;
                for (int i = 0; i < p->rule.fine; i++)
                    sum += p->rule.weight[i];
                ck_assert_double_eq_tol(sum / part.solid_angle, 1, 1e-12);
            }
        }
    free(prepared);
}
END_TEST

/* A ring has no rule of its own; its sums are taken over the polar angle. */
START_TEST(no_rule_for_a_ring)
{
    bh_prepared_part wanted;
    bh_prepared *prepared = calloc(1, sizeof *prepared);
    const bh_acceptance_spec spec = {
        .shape = BH_ACCEPTANCE_RING, .ring_from = 0.2, .ring_to = 0.4, .bins = 2};
    bh_acceptance a;
    ck_assert_ptr_nonnull(prepared);
    ck_assert_int_eq(bh_acceptance_make(&spec, &a, NULL), BH_OK);
    wanted = *bh_prepared_part_of(prepared, &a, 1);
    ck_assert_int_eq(wanted.rule.fine, 0);
    ck_assert_double_eq(wanted.part.polar.from, 0.2);
    free(prepared);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("prepared");
    tcase_add_test(tests, same_as_made_anew);
    tcase_add_test(tests, no_rule_for_a_ring);
    return run_suite("prepared", tests);
}
