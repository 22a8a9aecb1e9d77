/* test_crew.c - every hand works once a piece, side by side, and the caller waits for all. */
#include "../suite.h"

#include <pthread.h>
#include <stdatomic.h>

#include "beamhours/base/crew.h"

struct tally {
    atomic_size_t next, done[BH_MOST_HANDS];
    size_t pieces;
    atomic_size_t turn; /* of the hand that must come next */
};

static void take_pieces(void *of, size_t hand)
{
    struct tally *t = of;
    while (atomic_fetch_add(&t->next, 1U) < t->pieces)
        (void)atomic_fetch_add(&t->done[hand], 1U);
}

static size_t sum(struct tally *t)
{
    size_t all = 0;
    for (size_t i = 0; i < BH_MOST_HANDS; i++)
        all += atomic_load(&t->done[i]);
    return all;
}

static const size_t crews[] = {1, 2, 3, 8, BH_MOST_HANDS};

START_TEST(does_all_of_it)
{
    bh_crew *crew = bh_crew_new(crews[_i]);
    ck_assert_ptr_nonnull(crew);
    ck_assert_uint_eq(bh_crew_hands(crew), crews[_i]);
    for (size_t piece = 0; piece < 200; piece++) {
        struct tally t = {.pieces = piece};
        bh_crew_work(crew, take_pieces, &t);
        ck_assert_uint_eq(sum(&t), piece);
        for (size_t i = crews[_i]; i < BH_MOST_HANDS; i++)
            ck_assert_uint_eq(atomic_load(&t.done[i]), 0);
    }
    bh_crew_free(crew);
}
END_TEST

/* Each hand waits for the one before it: it ends only where all of them are there. */
static void wait_for_turn(void *of, size_t hand)
{
    struct tally *t = of;
    while (atomic_load(&t->turn) != hand)
        ;
    atomic_store(&t->done[hand], 1);
    atomic_store(&t->turn, hand + 1);
}

START_TEST(side_by_side)
{
    bh_crew *crew = bh_crew_new(4);
    struct tally t = {.pieces = 0};
    bh_crew_work(crew, wait_for_turn, &t);
    ck_assert_uint_eq(sum(&t), 4);
    bh_crew_free(crew);
}
END_TEST

static void note_thread(void *of, size_t hand)
{
    if (hand == 0)
        *(pthread_t *)of = pthread_self();
}

START_TEST(hand_0_is_who_calls)
{
    pthread_t who = {0};
    bh_crew *crew = bh_crew_new(2);
    bh_crew_work(crew, note_thread, &who);
    ck_assert(pthread_equal(who, pthread_self()));
    bh_crew_free(crew);
    bh_crew_free(NULL);
}
END_TEST

START_TEST(limits)
{
    bh_crew *crew = bh_crew_new(10 * (size_t)BH_MOST_HANDS);
    ck_assert_uint_le(bh_crew_hands(crew), BH_MOST_HANDS);
    bh_crew_free(crew);
    ck_assert_uint_ge(bh_crew_worthwhile(), 1);
    ck_assert_uint_le(bh_crew_worthwhile(), BH_MOST_HANDS);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("crew");
    tcase_set_timeout(tests, 60);
    tcase_add_loop_test(tests, does_all_of_it, 0, COUNT(crews));
    tcase_add_test(tests, side_by_side);
    tcase_add_test(tests, hand_0_is_who_calls);
    tcase_add_test(tests, limits);
    return run_suite("base/crew", tests);
}
