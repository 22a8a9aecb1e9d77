/* test_report_sums.c - who redoes the sums of a report with a pocket calculator, from the numbers
 * printed in it alone, comes to what is printed, within the digits that are. */
#include "../run/evaluated.h"

#include "beamhours/base/file.h"
#include "beamhours/base/number.h"
#include "beamhours/physics/structure.h"
#include "beamhours/report/report.h"

static const char *const demos[] = {
    "plans/alpha-gold.yaml", "plans/hydrogen-jet.yaml", "plans/hydrogen-separation.yaml",
    "plans/lead.yaml",       "plans/muon-rings.yaml",   "plans/positron-electron.yaml"};

/* More rows than are told one by one. */
static const char many[] =
    "plan: 1\nbeam: {particle: electron, kinetic_energy: 400 MeV, current: 10 uA}\n"
    "target:\n  name: foil\n  layers: [{material: polyethylene, thickness: 0.1 mm}]\n"
    "  scatterer: C\narms: [{name: A, solid_angle: 2 msr, momentum_bite: ±20 %}]\n"
    "settings: [{name: K, angle: {from: 30 deg, to: 68 deg, count: 20}, time: 1 h}]\n";

struct read {
    struct evaluated e;
    bh_text bytes;
    bh_report report;
};

static struct read read_plan(const char *text)
{
    struct read r = {.e = evaluate(text)};
    bh_error err = {.code = BH_OK};
    const bh_report_request request = {.table = r.e.table, .version = "9.9", .command = "x"};
    ck_assert_msg(!bh_report_make(&request, &r.report, &err), "%s", err.text);
    return r;
}

static struct read read_demo(int i)
{
    bh_text bytes = {0};
    ck_assert(!bh_file_read(demos[i], 1 << 20, &bytes, NULL));
    struct read r = read_plan(bytes.bytes);
    r.bytes = bytes;
    return r;
}

static void put_away(struct read *r)
{
    bh_report_free(&r->report);
    bh_text_free(&r->bytes);
    done(&r->e);
}

static int column_of(const bh_paper_table *t, const char *heading)
{
    for (size_t c = 0; c < t->column_count; c++)
        if (strcmp(t->columns[c].heading, heading) == 0)
            return (int)c;
    return -1;
}

/* The table with a column of this heading whose first column has the other. */
static const bh_paper_table *table_with(const struct read *r, const char *first,
                                        const char *heading)
{
    for (size_t i = 0; i < r->report.paper.count; i++) {
        const bh_paper_table *t = r->report.paper.blocks[i].table;
        if (t && strcmp(t->columns[0].heading, first) == 0 && column_of(t, heading) > 0)
            return t;
    }
    return NULL;
}

static const char *cell_of(const bh_paper_table *t, size_t row, int column)
{
    ck_assert_int_ge(column, 0);
    return t->cells[row * t->column_count + (size_t)column];
}

/* NAN for "-". */
static double number(const bh_paper_table *t, size_t row, const char *heading)
{
    double value = NAN;
    const char *text = cell_of(t, row, column_of(t, heading));
    if (strcmp(text, "-") != 0)
        ck_assert_msg(!bh_number_parse(text, NULL, &value), "%s: %s", heading, text);
    return value;
}

static double prefix(const bh_paper_table *t, const char *heading)
{
    static const struct {
        const char *unit;
        double size;
    } sizes[] = {{"b/sr", 1e-24},  {"mb/sr", 1e-27}, {"ub/sr", 1e-30},
                 {"nb/sr", 1e-33}, {"pb/sr", 1e-36}, {"fb/sr", 1e-39}};
    const char *unit = t->columns[column_of(t, heading)].unit;
    for (int i = 0; i < COUNT(sizes); i++)
        if (strcmp(sizes[i].unit, unit) == 0)
            return sizes[i].size;
    ck_abort_msg("%s in %s", heading, unit);
}

static void follows(double got, double wanted, double slack, const char *what, size_t row)
{
    ck_assert_msg(fabs(got - wanted) <= slack, "%s, row %zu: %.9g, but %.9g is printed", what, row,
                  got, wanted);
}

/* Six factors of four digits make 6 x 0.05 %; three of the rate itself 0.5 %. */
START_TEST(the_rate_is_the_product_that_is_said)
{
    struct read r = read_demo(_i);
    const bh_paper_table *one = table_with(&r, "setting", "luminosity"),
                         *two = table_with(&r, "setting", "radiative");
    int compared = 0;
    ck_assert(one && two && one->row_count == two->row_count);
    for (size_t i = 0; i < one->row_count; i++) {
        const double rate = number(one, i, "luminosity") * number(one, i, "sigma") *
                            prefix(one, "sigma") * number(one, i, "solid") * 1e-3 *
                            number(two, i, "radiative") * number(two, i, "kept") *
                            number(two, i, "eff");
        const double said = number(two, i, "signal");
        if (!isfinite(rate) || !isfinite(said))
            continue;
        follows(rate, said, 4e-3 * said, "signal rate", i);
        follows(number(one, i, "beam") * number(one, i, "nuclei"), number(one, i, "luminosity"),
                1.5e-3 * number(one, i, "luminosity"), "luminosity", i);
        compared++;
    }
    ck_assert_int_gt(compared, 0);
    put_away(&r);
}
END_TEST

START_TEST(counts_are_rate_times_live_times_hours)
{
    struct read r = read_demo(_i);
    const bh_paper_table *rates = table_with(&r, "setting", "radiative"),
                         *time = table_with(&r, "setting", "to goal");
    time = time ? time : table_with(&r, "setting", "charge");
    ck_assert(rates && time);
    for (size_t i = 0; i < rates->row_count; i++) {
        const double counts = number(rates, i, "signal") * number(rates, i, "live") * 3600.0 *
                              number(time, i, "hours"),
                     said = number(rates, i, "counts");
        if (isfinite(counts))
            follows(counts, said, 5e-3 * said + 1.0, "counts", i);
    }
    put_away(&r);
}
END_TEST

/* The last digit of four, for each that is added. */
static void check_backgrounds(const struct read *r, size_t sums_wanted)
{
    const bh_paper_table *t = table_with(r, "setting", "from");
    double sum = 0.0;
    size_t sums = 0;
    for (size_t i = 0; t && i < t->row_count; i++) {
        const double rate = number(t, i, "rate");
        ck_assert_double_ge(rate, 0.0);
        if (strcmp(cell_of(t, i, 1), "background rate") != 0) {
            sum += rate;
            continue;
        }
        follows(sum, rate, 1.1e-3 * rate, "background", i);
        sum = 0.0;
        sums++;
    }
    ck_assert_uint_eq(sums, sums_wanted);
}

/* What the bins of an arm count is what the arm counts, but for what the angle's resolution moves
 * over the edges of the arm. */
START_TEST(bins_add_up_to_their_arm)
{
    struct read r = read_demo(_i);
    const bh_paper_table *whole = table_with(&r, "setting", "radiative"),
                         *bins = table_with(&r, "setting", "bin");
    for (size_t i = 0; bins && i < whole->row_count; i++) {
        double sum = 0.0;
        const int arm = column_of(whole, "arm");
        for (size_t k = 0; k < bins->row_count; k++)
            if (strcmp(cell_of(bins, k, 0), cell_of(whole, i, 0)) == 0 &&
                (arm < 0 ||
                 strcmp(cell_of(bins, k, column_of(bins, "arm")), cell_of(whole, i, arm)) == 0))
                sum += number(bins, k, "signal");
        if (sum > 0.0)
            follows(sum, number(whole, i, "signal"), 3e-3 * sum, "signal of bins", i);
    }
    put_away(&r);
}
END_TEST

/* Which models, goals and lost density are in force stands in the report; nothing reads like a key.
 */
START_TEST(what_is_in_force_is_said)
{
    static const char *const wanted[] = {"statistical uncertainty 0.2 % in low-1; low-2",
                                         "default: amt-2007-effective",
                                         "default: maximon-tjon",
                                         "default: plane-wave",
                                         "in plane ±20 mrad",
                                         "0.0200"};
    struct read r = read_demo(2);
    for (int w = 0; w < COUNT(wanted); w++) {
        bool found = false;
        for (size_t i = 0; i < r.report.paper.count; i++) {
            const bh_paper_table *t = r.report.paper.blocks[i].table;
            for (size_t c = 0; t && c < t->row_count * t->column_count; c++)
                found = found || strstr(t->cells[c], wanted[w]) != NULL;
        }
        ck_assert_msg(found, "%s is not said", wanted[w]);
    }
    put_away(&r);
}
END_TEST

/* A reference is a publication, a definition or an edition of data, not the name of a model. */
START_TEST(references_are_no_names_of_models)
{
    struct read r = read_demo(_i);
    int seen = 0;
    for (size_t i = 0; i < r.report.paper.count; i++) {
        const bh_block *b = &r.report.paper.blocks[i];
        if (b->kind != BH_BLOCK_REFERENCE)
            continue;
        for (int m = 0; bh_structure_model_at(m); m++)
            ck_assert_str_ne(b->text, bh_structure_model_at(m)->name);
        ck_assert(strchr(b->text, ' ') || strcmp(b->text, "definition") == 0);
        seen++;
    }
    ck_assert_int_gt(seen, 5);
    put_away(&r);
}
END_TEST

/* Every line of a background has its source, and the largest stands first. */
START_TEST(backgrounds_are_in_order_and_have_sources)
{
    struct read r = read_demo(_i);
    const bh_paper_table *t = table_with(&r, "setting", "from");
    double before = INFINITY;
    for (size_t i = 0; t && i < t->row_count; i++) {
        const char *from = cell_of(t, i, 1);
        const bool sum = strcmp(from, "background rate") == 0,
                   rest = strcmp(from, "all else together") == 0;
        ck_assert_msg(sum || rest || cell_of(t, i, 3)[0] == '[', "%s has no source", from);
        ck_assert_msg(sum || rest || number(t, i, "rate") <= before, "%s is larger", from);
        before = sum ? INFINITY : number(t, i, "rate");
    }
    put_away(&r);
}
END_TEST

static size_t rows_with_background(const struct read *r)
{
    size_t n = 0;
    for (size_t i = 0; i < bh_table_rows(r->e.table, false); i++)
        n += bh_table_number(r->e.table, false, i, BH_COL_BACKGROUND) > 0.0;
    return n;
}

START_TEST(each_background_adds_up)
{
    struct read r = read_demo(_i);
    check_backgrounds(&r, rows_with_background(&r));
    put_away(&r);
}
END_TEST

START_TEST(backgrounds_of_many_rows_are_all_there)
{
    struct read r = read_plan(many);
    ck_assert_uint_eq(rows_with_background(&r), 20);
    check_backgrounds(&r, 20);
    put_away(&r);
}
END_TEST

static double hours_of(const bh_paper_table *t, const char *line)
{
    for (size_t i = 0; i < t->row_count; i++)
        if (strcmp(cell_of(t, i, 0), line) == 0)
            return number(t, i, "hours");
    return 0.0;
}

START_TEST(hours_add_up)
{
    struct read r = read_demo(_i);
    const bh_plan *plan = bh_table_plan(r.e.table);
    const bh_paper_table *t = table_with(&r, "time", "hours");
    const double share = plan->schedule.availability.given ? plan->schedule.availability.value : 1;
    ck_assert_ptr_nonnull(t);
    follows(hours_of(t, "data") + hours_of(t, "empty target") + hours_of(t, "tasks"),
            hours_of(t, "beam hours"), 0.016, "beam hours", 0);
    follows(hours_of(t, "beam hours") / share + hours_of(t, "changes"), hours_of(t, "scheduled"),
            0.011 + 0.005 / share, "scheduled", 0);
    follows(hours_of(t, "scheduled") + hours_of(t, "contingency"), hours_of(t, "asked"), 0.016,
            "asked", 0);
    put_away(&r);
}
END_TEST

START_TEST(causes_add_up_in_quadrature)
{
    struct read r = read_demo(_i);
    const bh_paper_table *t = table_with(&r, "setting", "together");
    ck_assert_ptr_nonnull(t);
    for (size_t i = 0; i < t->row_count; i++) {
        const double all = number(t, i, "together");
        if (isfinite(all))
            follows(hypot(number(t, i, "syst"), number(t, i, "stat")), all, 0.011 * all, "together",
                    i);
    }
    put_away(&r);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("sums");
    tcase_set_timeout(tests, 120);
    tcase_add_loop_test(tests, the_rate_is_the_product_that_is_said, 0, COUNT(demos));
    tcase_add_loop_test(tests, counts_are_rate_times_live_times_hours, 0, COUNT(demos));
    tcase_add_loop_test(tests, each_background_adds_up, 0, COUNT(demos));
    tcase_add_test(tests, backgrounds_of_many_rows_are_all_there);
    tcase_add_loop_test(tests, bins_add_up_to_their_arm, 0, COUNT(demos));
    tcase_add_loop_test(tests, backgrounds_are_in_order_and_have_sources, 0, COUNT(demos));
    tcase_add_loop_test(tests, references_are_no_names_of_models, 0, COUNT(demos));
    tcase_add_test(tests, what_is_in_force_is_said);
    tcase_add_loop_test(tests, hours_add_up, 0, COUNT(demos));
    tcase_add_loop_test(tests, causes_add_up_in_quadrature, 0, COUNT(demos));
    return run_suite("report/report_sums", tests);
}
