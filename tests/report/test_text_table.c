/* test_text_table.c - what a terminal shows: which columns, how wide, in which units. */
#include "shown.h"

#include "beamhours/report/prefix.h"
#include "beamhours/report/text_table.h"

static bh_text text_of(const struct evaluated *e, const bh_selection_request *request, int width)
{
    bh_selection view = view_of(e, request);
    bh_text out = {0};
    bh_report_text(&view, width, &out);
    ck_assert(!out.failed);
    bh_selection_free(&view);
    return out;
}

/* The n-th line from the one that begins with `word`, without its line end. */
static const char *line_of(const bh_text *text, const char *word, int n, char *out, size_t size)
{
    const char *s = text->bytes;
    while (s && strncmp(s, word, strlen(word)) != 0)
        s = strchr(s, '\n') ? strchr(s, '\n') + 1 : NULL;
    ck_assert_msg(s != NULL, "no line begins with %s in\n%s", word, text->bytes);
    for (; n > 0; n--)
        s = strchr(s, '\n') + 1;
    snprintf(out, size, "%.*s", (int)strcspn(s, "\n"), s);
    return out;
}

/* Code points of the widest line. */
static int widest(const bh_text *text)
{
    int most = 0, here = 0;
    for (const char *s = text->bytes; *s; s++) {
        here = *s == '\n' ? 0 : here + (((unsigned char)*s & 0xC0) != 0x80);
        most = here > most ? here : most;
    }
    return most;
}

static const char *squeezed(char *line)
{
    char *out = line;
    for (const char *s = line; *s; s++)
        if (*s != ' ' || (out > line && out[-1] != ' '))
            *out++ = *s;
    *out = '\0';
    return line;
}

/* In 80 columns the table is that of docs/output.md; what does not vary is said above. */
START_TEST(eighty_columns_hold_the_usual_ones)
{
    struct evaluated e = evaluate(one_arm);
    static const char headings[] = "setting angle Q2 sigma signal bkg live hours counts stat";
    static const char units[] = "deg GeV2 ub/sr Hz Hz 1 h 1 %";
    char line[400];
    bh_text text = text_of(&e, &(bh_selection_request){0}, 72);
    line_of(&text, "setting", 0, line, sizeof line);
    ck_assert_msg(strncmp(squeezed(line), headings, sizeof headings - 1) == 0, "%s", line);
    line_of(&text, "setting", 1, line, sizeof line);
    ck_assert_msg(strncmp(squeezed(line), units, sizeof units - 1) == 0, "%s", line);
    ck_assert_int_le(widest(&text), 80); /* 80 are used though 72 were given */
    bh_text_free(&text);
    done(&e);
}
END_TEST

START_TEST(names_and_energies_that_vary_get_columns)
{
    struct evaluated e = evaluate(two_arms);
    char line[400];
    bh_text text = text_of(&e, &(bh_selection_request){0}, 80);
    line_of(&text, "setting", 0, line, sizeof line);
    ck_assert_msg(strncmp(squeezed(line), "setting arm energy angle Q2 sigma", 33) == 0, "%s",
                  line);
    ck_assert_ptr_null(strstr(line, "target"));
    ck_assert_ptr_null(strstr(line, "particle"));
    bh_text_free(&text);
    text = text_of(&e, &(bh_selection_request){.bins = true, .only = "K1"}, 80);
    line_of(&text, "setting", 0, line, sizeof line);
    ck_assert_msg(strncmp(squeezed(line), "setting arm bin angle Q2", 24) == 0, "%s", line);
    bh_text_free(&text);
    done(&e);
}
END_TEST

/* A wider terminal shows more, never wider than it is, and beginning the same. */
START_TEST(width_adds_columns)
{
    struct evaluated e = evaluate(one_arm);
    char narrow[600], wide[600];
    size_t before = 0;
    for (int width = 80; width <= 240; width += 20) {
        bh_text text = text_of(&e, &(bh_selection_request){0}, width);
        line_of(&text, "setting", 0, wide, sizeof wide);
        ck_assert_int_le(widest(&text), width);
        ck_assert_uint_ge(strlen(wide), before);
        before = strlen(wide);
        if (width == 80)
            strcpy(narrow, wide);
        ck_assert_int_eq(strncmp(narrow, wide, strlen("setting  angle")), 0);
        bh_text_free(&text);
    }
    ck_assert_uint_gt(before, strlen(narrow));
    ck_assert_ptr_nonnull(strstr(wide, "epsilon"));
    ck_assert_ptr_nonnull(strstr(wide, "luminosity"));
    done(&e);
}
END_TEST

/* Two long names and four columns of numbers that go over five orders: fewer digits make room. */
START_TEST(digits_give_way_before_the_width_does)
{
    struct evaluated e = evaluate(
        BEAM TARGET
        "arms:\n  - {name: turning, solid_angle: 5 msr, energy_cut: 5 MeV}\n"
        "  - {name: monitor, angle: 25 deg, solid_angle: 2 msr, energy_cut: 5 MeV}\n"
        "settings:\n  - {name: backward, arm: turning, angle: [40 deg, 80 deg], time: 20 h}\n");
    bh_text text = text_of(&e, &(bh_selection_request){0}, 80);
    ck_assert_int_le(widest(&text), 80);
    bh_text_free(&text);
    done(&e);
}
END_TEST

START_TEST(an_empty_cell_is_a_dash)
{
    struct evaluated e = evaluate(two_arms);
    char line[400];
    bh_text text =
        text_of(&e, &(bh_selection_request){.columns = "hours,setting,counts", .only = "K3"}, 80);
    line_of(&text, "hours", 2, line, sizeof line);
    ck_assert_str_eq(squeezed(line), "- K3 -");
    bh_text_free(&text);
    done(&e);
}
END_TEST

/* Headings stand over the ends of their numbers. */
START_TEST(columns_are_aligned)
{
    struct evaluated e = evaluate(one_arm);
    bh_text text = text_of(&e, &(bh_selection_request){.columns = "setting,angle_deg,counts"}, 80);
    char row[4][200];
    for (int i = 0; i < 4; i++)
        line_of(&text, "setting", i, row[i], sizeof row[i]);
    for (int i = 1; i < 4; i++)
        ck_assert_uint_eq(strlen(row[i]), strlen(row[0]));
    ck_assert_str_eq(row[0], "setting angle counts");
    ck_assert_str_eq(row[1], "          deg      1");
    ck_assert_str_eq(row[2], "K.1     40.00  10000");
    bh_text_free(&text);
    done(&e);
}
END_TEST

/* Cross sections get the prefix that the largest of the column reads well with. */
START_TEST(one_prefix_a_column)
{
    static const struct {
        const char *angle, *unit;
        double scale;
    } rows[] = {{"5 deg", "mb/sr", 1e-3}, {"40 deg", "ub/sr", 1}, {"70 deg", "nb/sr", 1e3}};
    for (int i = 0; i < COUNT(rows); i++) {
        char plan[1024];
        snprintf(plan, sizeof plan,
                 BEAM TARGET "arms: [{name: A, solid_angle: 1 msr}]\n"
                             "settings: [{name: K, angle: %s}]\n",
                 rows[i].angle);
        struct evaluated e = evaluate(plan);
        bh_selection view = view_of(&e, &(bh_selection_request){0});
        const bh_shown_column shown = bh_prefix_scale(&view, NULL, BH_COL_CROSS_SECTION);
        ck_assert_str_eq(shown.unit, rows[i].unit);
        ck_assert_double_eq_tol(shown.scale, rows[i].scale, 1e-12);
        char cell[BH_CELL_SIZE];
        bh_prefix_print(&view, 0, &shown, cell);
        const double back = strtod(cell, NULL) / shown.scale;
        ck_assert_relative(back, bh_selection_number(&view, 0, BH_COL_CROSS_SECTION), 1e-3, cell);
        bh_selection_free(&view);
        done(&e);
    }
}
END_TEST

START_TEST(constant_columns_are_found)
{
    struct evaluated e = evaluate(two_arms);
    bh_selection view = view_of(&e, &(bh_selection_request){0});
    ck_assert(bh_prefix_constant(&view, BH_COL_TARGET));
    ck_assert(!bh_prefix_constant(&view, BH_COL_SYSTEMATIC));
    ck_assert(!bh_prefix_constant(&view, BH_COL_ARM));
    ck_assert(!bh_prefix_constant(&view, BH_COL_BEAM_KINETIC));
    ck_assert(!bh_prefix_constant(&view, BH_COL_HOURS));
    bh_selection_free(&view);
    done(&e);
}
END_TEST

static const struct {
    const char *plan, *words;
} inputs[] = {
    {NULL, "electron, 380 MeV to 400 MeV kinetic, 10 uA"},
    {NULL, "foil: carbon-12 1 mm; scatterer C (12C)"},
    {NULL, "A: right, detects scattered, in_plane ±28 mrad, out_of_plane ±70"},
    {NULL, "M: left, detects scattered, angle 30 deg, solid_angle 2 msr"},
    {"beam: {particle: muon-, momentum: 160 MeV/c, particle_rate: 3e5 /s, fraction: 20 %}\n",
     "muon-, 160 MeV/c, 86.08023 MeV kinetic, 300000 particles per second in all, fraction 20 %"},
    {"beam: {particle: electron, total_energy: 1 GeV, current: 1 ± 0.1 uA, duty_factor: 10 %}\n",
     "electron, 1 GeV total, 1 uA, duty_factor 10 %"},
};

START_TEST(inputs_stand_above_as_they_were_written)
{
    char plan[2048], joined[8192] = "";
    snprintf(plan, sizeof plan,
             "plan: 1\n%s" TARGET "arms: [{name: A, solid_angle: 5 msr}]\n"
             "settings: [{name: K, angle: 40 deg, time: 1 h}]\n",
             inputs[_i].plan ? inputs[_i].plan : "");
    struct evaluated e = evaluate(inputs[_i].plan ? plan : two_arms);
    bh_text text = text_of(&e, &(bh_selection_request){0}, 200);
    strncat(joined, text.bytes, sizeof joined - 1);
    ck_assert_msg(strstr(joined, inputs[_i].words) != NULL, "%s", joined);
    bh_text_free(&text);
    done(&e);
}
END_TEST

START_TEST(totals_notes_and_cautions_stand_below)
{
    struct evaluated e = evaluate(two_arms);
    bh_text text = text_of(&e, &(bh_selection_request){0}, 80);
    char line[200];
    const bh_totals *t = bh_table_totals(e.table);
    ck_assert_double_eq_tol(strtod(line_of(&text, "  asked", 0, line, sizeof line) + 9, NULL),
                            t->asked_hours, 0.006);
    ck_assert_ptr_nonnull(strstr(line, "shifts of 8 h"));
    line_of(&text, "  scheduled", 0, line, sizeof line);
    ck_assert_ptr_nonnull(strstr(line, "= beam hours / 50 % + changes"));
    line_of(&text, "  none given: ", 0, line, sizeof line);
    const char *time = strstr(text.bytes, "\ntime "), *note = strstr(text.bytes, "\nnote "),
               *caution = strstr(text.bytes, "\nCAUTION ");
    ck_assert(time && caution && time < caution);
    ck_assert(!note || (time < note && note < caution));
    bh_text_free(&text);
    done(&e);
}
END_TEST

START_TEST(a_change_is_shown_row_by_row)
{
    struct evaluated e = evaluate(two_arms);
    char twice[4096];
    strcpy(twice, two_arms);
    memcpy(strstr(twice, "10 uA"), "20 uA", 5);
    struct evaluated f = evaluate(twice);
    const bh_selection_request request = {.columns = "setting,arm,counts", .sort = "-counts"};
    bh_selection before = view_of(&e, &request), after = view_of(&f, &request);
    bh_text out = {0};
    char line[200];
    bh_report_text_against(&before, &after, 80, &out);
    int pairs = 0;
    for (const char *s = out.bytes; (s = strstr(s, "\nbefore K")); s++) {
        const char *next = strchr(s + 1, '\n');
        ck_assert_int_eq(strncmp(next, "\nafter  K", 9), 0);
        ck_assert_int_eq(strncmp(s + 8, next + 8, strlen("K2.1    A")), 0); /* same row */
        pairs++;
    }
    ck_assert_int_eq(pairs, 8);
    line_of(&out, "       signal", 0, line, sizeof line);
    ck_assert_msg(strstr(line, "signal +100 %") != NULL, "%s", line);
    bh_text_free(&out);
    bh_selection_free(&before);
    bh_selection_free(&after);
    done(&e);
    done(&f);
}
END_TEST

/* Settings that a change adds or takes away stand alone. */
START_TEST(rows_without_a_counterpart_stand_alone)
{
    struct evaluated e = evaluate(two_arms), f = evaluate(one_arm);
    bh_selection before = view_of(&e, &(bh_selection_request){.only = "K1"});
    bh_selection after = view_of(&f, &(bh_selection_request){0});
    bh_text out = {0};
    bh_report_text_against(&before, &after, 80, &out);
    ck_assert_ptr_nonnull(strstr(out.bytes, "\nbefore K1"));
    ck_assert_ptr_nonnull(strstr(out.bytes, "\nafter  K.1"));
    ck_assert_ptr_null(strstr(out.bytes, "       signal "));
    bh_text_free(&out);
    bh_selection_free(&before);
    bh_selection_free(&after);
    done(&e);
    done(&f);
}
END_TEST

START_TEST(sentences_are_wrapped_between_words)
{
    static const struct {
        const char *lead, *sentence, *lines;
        int width;
    } rows[] = {{"x ", "one two three", "x one\n  two\n  three\n", 7},
                {"x ", "one two three", "x one two\n  three\n", 9},
                {"", "±±± ±±", "±±±\n±±\n", 4},
                {"", "unbreakable", "unbrea\nkable\n", 6},
                {"- ", "two\nlines", "- two\n  lines\n", 40},
                {"", "", "", 40}};
    for (int i = 0; i < COUNT(rows); i++) {
        bh_text out = {0};
        bh_report_wrapped(rows[i].lead, rows[i].sentence, rows[i].width, &out);
        ck_assert_str_eq(out.bytes ? out.bytes : "", rows[i].lines);
        bh_text_free(&out);
    }
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("text table");
    tcase_add_test(tests, eighty_columns_hold_the_usual_ones);
    tcase_add_test(tests, names_and_energies_that_vary_get_columns);
    tcase_add_test(tests, width_adds_columns);
    tcase_add_test(tests, digits_give_way_before_the_width_does);
    tcase_add_test(tests, an_empty_cell_is_a_dash);
    tcase_add_test(tests, columns_are_aligned);
    tcase_add_test(tests, one_prefix_a_column);
    tcase_add_test(tests, constant_columns_are_found);
    tcase_add_loop_test(tests, inputs_stand_above_as_they_were_written, 0, COUNT(inputs));
    tcase_add_test(tests, totals_notes_and_cautions_stand_below);
    tcase_add_test(tests, a_change_is_shown_row_by_row);
    tcase_add_test(tests, rows_without_a_counterpart_stand_alone);
    tcase_add_test(tests, sentences_are_wrapped_between_words);
    return run_suite("report/text_table", tests);
}
