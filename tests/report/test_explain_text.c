/* test_explain_text.c - how an explanation is laid out. */
#include "shown.h"

#include "beamhours/report/explain_text.h"

static bh_text text_of(const struct evaluated *e, const char *setting, const char *arm, int width)
{
    bh_error err = {.code = BH_OK};
    bh_text out = {0};
    bh_explanation *x = bh_explain(e->table, setting, arm, 0, &err);
    ck_assert_msg(x != NULL, "%s", err.text);
    bh_report_explanation(x, width, &out);
    ck_assert(!out.failed);
    bh_explanation_free(x);
    return out;
}

static const char *const wanted[] = {
    "plan.yaml: setting K1, arm A, the whole acceptance\n  Two arms, \"both\" on "
    "carbon\n\nInputs\n",
    "\n  beam.current                       10 uA                 line 3, column 62\n",
    "\n  beam.fraction                      100 %                 default\n",
    "\n  in_plane                           ±28 mrad              line 8, column 25\n",
    "\n  sample of carbon-12                1 mm                  line 6, column 12\n"
    "      = 0.1 cm of 2.208 g/cm3 (density of the material): 0.2208 g/cm2,\n",
    "\n  cross section of the point charge  ",
    "\n\nAssumed without being asked\n  A point-like, parallel beam on the axis.\n",
};

START_TEST(names_values_and_places_stand_in_columns)
{
    struct evaluated e = evaluate(two_arms);
    bh_text text = text_of(&e, "K1", "A", 0);
    ck_assert_msg(strstr(text.bytes, wanted[_i]) != NULL, "%s\nin\n%.1500s", wanted[_i],
                  text.bytes);
    bh_text_free(&text);
    done(&e);
}
END_TEST

/* Nothing is wider than the terminal, and at least 80 columns are used. */
START_TEST(lines_keep_to_the_width)
{
    static const int widths[] = {40, 80, 100, 200};
    struct evaluated e = evaluate(two_arms);
    for (int w = 0; w < COUNT(widths); w++) {
        bh_text text = text_of(&e, "K2.1", "M", widths[w]);
        int most = 0, here = 0;
        for (const char *s = text.bytes; *s; s++) {
            here = *s == '\n' ? 0 : here + (((unsigned char)*s & 0xC0) != 0x80);
            most = here > most ? here : most;
        }
        ck_assert_int_le(most, widths[w] > 80 ? widths[w] : 80);
        ck_assert_int_gt(most, 60);
        bh_text_free(&text);
    }
    done(&e);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("explain text");
    tcase_add_loop_test(tests, names_values_and_places_stand_in_columns, 0, COUNT(wanted));
    tcase_add_test(tests, lines_keep_to_the_width);
    return run_suite("report/explain_text", tests);
}
