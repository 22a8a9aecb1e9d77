/* test_differences.c - what two plans do not have in common, and what is not worth telling. */
#include "shown.h"

#include "beamhours/report/differences.h"

#define TAIL(current, angle, rest)                                                                \
    "plan: 1\nbeam: {particle: electron, kinetic_energy: 400 MeV, current: " current "}\n" TARGET \
    "arms:\n  - {name: A, solid_angle: 5 msr, dead_time: 1 us}\n"                                 \
    "settings:\n  - {name: K1, angle: " angle                                                     \
    ", time: 1 h}\n  - {name: K2, angle: 40 deg, time: 1 h}\n" rest

static const struct {
    const char *before, *after;
    const char *told; /* path=before>after+more; one after the other */
} cases[] = {
    {TAIL("10 uA", "30 deg", ""), TAIL("10 uA", "30 deg", ""), ""},
    /* settings take the beam over: told once */
    {TAIL("10 uA", "30 deg", ""), TAIL("12 uA", "30 deg", ""), "beam.current=10 uA>12 uA+0;"},
    {TAIL("10 uA", "30 deg", ""), TAIL("10 uA", "31 deg", ""),
     "settings.K1.arms.A.angle=30 deg>31 deg+0;"},
    /* an item that only one plan has, without what belongs to it; either way */
    {TAIL("10 uA", "30 deg", ""),
     TAIL("10 uA", "30 deg", "  - {name: K3, angle: 50 deg, time: 1 h}\n"),
     "settings.K3=->present+0;"},
    {TAIL("10 uA", "30 deg", "  - {name: K3, angle: 50 deg, time: 1 h}\n"),
     TAIL("10 uA", "30 deg", ""), "settings.K3=present>-+0;"},
    /* a sweep has dots in its names; the same change of several settings is told once */
    {TAIL("10 uA", "30 deg", "  - {name: S, angle: [50 deg, 60 deg], time: 1 h}\n"),
     TAIL("10 uA", "30 deg", "  - {name: S, angle: [50 deg, 60 deg], time: 2 h}\n"),
     "settings.S.1.arms.A.time=1 h>2 h+1;"},
    /* a layer goes by its number, a new key is absent before */
    {TAIL("10 uA", "30 deg", "schedule: {start_up: 1 h}\n"),
     TAIL("10 uA", "30 deg", "schedule: {start_up: 1 h, contingency: 10 %}\n"),
     "schedule.contingency=0 %>10 %+0;"},
    {TAIL("10 uA", "30 deg", "schedule: {shift: 8 h}\n"),
     TAIL("10 uA", "30 deg", "schedule: {shift: 8 h, available: 2 d}\n"),
     "schedule.available=->2 d+0;"},
};

START_TEST(inputs_that_differ)
{
    struct evaluated a = read_text(cases[_i].before), b = read_text(cases[_i].after);
    bh_arena *arena = bh_arena_new();
    bh_differences found;
    bh_error err = {.code = BH_OK};
    bh_text told = {0};
    ck_assert_int_eq(bh_differences_find(a.plan, b.plan, arena, &found, &err), BH_OK);
    bh_text_append(&told, "");
    for (size_t i = 0; i < found.count; i++) {
        const bh_difference *d = &found.items[i];
        bh_text_appendf(&told, "%s=%s>%s+%zu;", d->path, d->before ? d->before : "-",
                        d->after ? d->after : "-", d->more);
    }
    ck_assert_str_eq(told.bytes ? told.bytes : "", cases[_i].told);
    bh_text_free(&told);
    bh_arena_free(arena);
    done(&a);
    done(&b);
}
END_TEST

/* The angle that a q2 asks for follows from it: only the energy was changed. */
START_TEST(what_follows_is_no_input)
{
    static const char with_q2[] =
        "plan: 1\nbeam: {particle: electron, kinetic_energy: %s, "
        "current: 1 uA}\n" TARGET "arms: [{name: A, solid_angle: 5 msr}]\n"
        "settings: [{name: K, q2: 0.01 GeV2, time: 1 h}]\n";
    char first[600], second[600];
    snprintf(first, sizeof first, with_q2, "400 MeV");
    snprintf(second, sizeof second, with_q2, "500 MeV");
    struct evaluated a = read_text(first), b = read_text(second);
    bh_arena *arena = bh_arena_new();
    bh_differences found;
    bh_error err = {.code = BH_OK};
    ck_assert_int_eq(bh_differences_find(a.plan, b.plan, arena, &found, &err), BH_OK);
    ck_assert_uint_eq(found.count, 1);
    ck_assert_str_eq(found.items[0].path, "beam.kinetic_energy");
    bh_arena_free(arena);
    done(&a);
    done(&b);
}
END_TEST

/* Rows belong together by name: a plan with another order of settings has the same numbers. */
START_TEST(rows_go_by_name)
{
    struct evaluated a = evaluate(cases[4].before), b = evaluate(cases[2].after);
    bh_arena *arena = bh_arena_new();
    bh_differences found;
    bh_error err = {.code = BH_OK};
    bh_text text = {0}, markdown = {0}, json = {0};
    ck_assert_int_eq(bh_differences_find(a.plan, b.plan, arena, &found, &err), BH_OK);
    const bh_comparison c = {a.table, b.table, &found, "1"};
    bh_comparison_text(&c, 100, &text);
    bh_comparison_markdown(&c, &markdown);
    ck_assert_int_eq(bh_comparison_json(&c, &json), BH_OK);
    ck_assert_ptr_nonnull(strstr(text.bytes, "input   settings.K1.arms.A.angle: 30 deg -> 31 deg"));
    const char *still = strstr(markdown.bytes, "| K2 | A |"),
               *gone = strstr(markdown.bytes, "| K3 | A |");
    ck_assert_ptr_nonnull(still);
    ck_assert_ptr_nonnull(gone);
    char line[200];
    snprintf(line, sizeof line, "%.*s", (int)strcspn(still, "\n"), still);
    ck_assert_msg(strstr(line, " | 0.00 | ") != NULL, "%s", line); /* not moved */
    snprintf(line, sizeof line, "%.*s", (int)strcspn(gone, "\n"), gone);
    ck_assert_msg(strstr(line, " | - | - | ") != NULL, "%s", line);
    ck_assert_ptr_nonnull(strstr(json.bytes, "\"after\":null"));
    bh_text_free(&text);
    bh_text_free(&markdown);
    bh_text_free(&json);
    bh_arena_free(arena);
    done(&a);
    done(&b);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("differences");
    tcase_add_loop_test(tests, inputs_that_differ, 0, COUNT(cases));
    tcase_add_test(tests, what_follows_is_no_input);
    tcase_add_test(tests, rows_go_by_name);
    return run_suite("report/differences", tests);
}
