/* test_canvas.c - what is told to a terminal: blanks that need no look of their own. */
#include "../suite.h"

#include "beamhours/screen/canvas.h"

static const bool blank[BH_LOOK_COUNT] = {
    [BH_LOOK_PLAIN] = true, [BH_LOOK_TITLE] = true, [BH_LOOK_WARNING] = true};

static bh_look look_at(const bh_canvas *canvas, int column)
{
    return bh_canvas_at(canvas, 0, column)->look;
}

START_TEST(blanks_go_along)
{
    bh_canvas c = {0};
    ck_assert(bh_canvas_size(&c, 2, 40));
    (void)bh_canvas_put(&c, (bh_spot){0, 0, 9}, BH_LOOK_TITLE, "two words");
    (void)bh_canvas_put(&c, (bh_spot){0, 12, 4}, BH_LOOK_TITLE, "more");
    (void)bh_canvas_put(&c, (bh_spot){0, 20, 4}, BH_LOOK_FOCUS, "shown");
    bh_canvas_paint(&c, (bh_spot){0, 24, 4}, BH_LOOK_FOCUS);
    (void)bh_canvas_put(&c, (bh_spot){0, 30, 4}, BH_LOOK_PLAIN, "rest");
    bh_canvas_join_words(&c, blank);
    for (int i = 0; i < 20; i++) /* up to what shows */
        ck_assert_int_eq(look_at(&c, i), BH_LOOK_TITLE);
    for (int i = 20; i < 28; i++)
        ck_assert_int_eq(look_at(&c, i), BH_LOOK_FOCUS);
    for (int i = 28; i < 40; i++) /* a look that shows is not carried on */
        ck_assert_int_eq(look_at(&c, i), BH_LOOK_PLAIN);
    ck_assert_int_eq(bh_canvas_at(&c, 1, 0)->look, BH_LOOK_PLAIN); /* nor to the next row */
    bh_text text = {0};
    bh_canvas_print(&c, &text);
    ck_assert_str_eq(text.bytes, "two words   more    show      rest\n\n");
    bh_text_free(&text);
    bh_canvas_free(&c);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("canvas");
    tcase_add_test(tests, blanks_go_along);
    return run_suite("screen/canvas", tests);
}
