/* test_alike.c - rows of a kind, against looking at all pairs. */
#include "../counter_random.h"
#include "../suite.h"

#include <string.h>

#include "beamhours/report/alike.h"

enum { MOST = 300 };

static int by_name(const void *a, const void *b)
{
    return strcmp(a, b);
}

/* Kinds in the order of their first rows, each with its rows in order: as pairs would find them. */
START_TEST(as_pairs_find_them)
{
    static const char *const names[] = {"zinc", "gold", "iron", "lead", "neon", "gold2", ""};
    for (int count = 0; count < MOST; count = count < 40 ? count + 1 : count * 2 + 1) {
        bh_alike rows[MOST];
        bh_alike_head heads[MOST];
        const char *name[MOST];
        for (int i = 0; i < count; i++) {
            double u[2];
            even_pair(7, (uint64_t)count * MOST + (uint64_t)i, 0, u);
            name[i] = names[(size_t)(u[0] * COUNT(names))];
            rows[i] = (bh_alike){name[i], (size_t)i};
        }
        ck_assert(bh_alike_sort(rows, (size_t)count, by_name));
        const size_t kinds = bh_alike_heads(rows, (size_t)count, by_name, heads);
        size_t found = 0;
        for (int i = 0; i < count; i++) {
            bool seen = false;
            for (int k = 0; k < i; k++)
                seen = seen || strcmp(name[k], name[i]) == 0;
            if (seen)
                continue;
            ck_assert_uint_lt(found, kinds);
            const bh_alike *of = heads[found++].first;
            for (int k = i; k < count; k++)
                if (strcmp(name[k], name[i]) == 0)
                    ck_assert_uint_eq((of++)->row, (size_t)k);
            ck_assert(of == rows + count || strcmp(of->what, name[i]) != 0);
        }
        ck_assert_uint_eq(found, kinds);
    }
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("alike");
    tcase_add_test(tests, as_pairs_find_them);
    return run_suite("report/alike", tests);
}
