/* test_curve_figure.c - what is drawn stands where the numbers say: the paths of the SVG are read
 * back through the axes and compared with the curve, the table and the published points. */
#include "shown.h"

#include "beamhours/base/number.h"
#include "beamhours/report/curve_figure.h"
#include "beamhours/report/figure_draw.h"
#include "beamhours/report/figure_layout.h"
#include "beamhours/report/stands.h"

enum { MOST = 600 };

static const char *const proton =
    "plan: 1\ntitle: \"Protons & others\"\n"
    "beam: {particle: electron, kinetic_energy: 800 MeV, current: 10 uA}\n"
    "target:\n  name: cell\n  layers: [{material: liquid-hydrogen, thickness: 50 mm}]\n"
    "arms:\n"
    "  - {name: A, in_plane: ±28 mrad, out_of_plane: ±70 mrad, bins: 4, energy_cut: 10 MeV}\n"
    "settings:\n"
    "  - {name: K1, angle: 30 deg, goal: 5 %}\n"
    "  - {name: K2, angle: [50 deg, 70 deg], time: 1 s}\n"
    "  - {name: K3, angle: 30 deg, time: 2 h, beam: {kinetic_energy: 600 MeV}}\n"
    "  - {name: K4, angle: 40 deg, time: 2 h, beam: {particle: positron}}\n";

static const char *const rings =
    "plan: 1\nbeam: {particle: muon-, kinetic_energy: 100 MeV, particle_rate: 3e5 /s}\n"
    "target:\n  layers: [{material: liquid-hydrogen, thickness: 60 mm}]\n"
    "arms: [{name: R, ring: {from: 20 deg, to: 100 deg}, bins: 8, energy_cut: 5 MeV}]\n"
    "settings: [{name: all, time: 20 h}]\n";

/* Everything that a figure of curves is made from. */
struct made {
    struct evaluated e;
    bh_curves curves;
    bh_arena *arena;
    bh_figure figure;
    bh_figure_layout layout;
    bh_text svg;
};

static void lay_out(struct made *m)
{
    cairo_surface_t *s = cairo_recording_surface_create(CAIRO_CONTENT_COLOR, NULL);
    cairo_t *to = cairo_create(s);
    bh_pen pen;
    ck_assert(!bh_pen_open(to, &pen, NULL));
    ck_assert(!bh_figure_layout_make(&m->figure, &pen, &m->layout, NULL));
    bh_pen_close(&pen);
    cairo_destroy(to);
    cairo_surface_destroy(s);
}

static struct made draw(const char *plan, const bh_curves_request *request, int shown,
                        const bh_measured *measured)
{
    struct made m = {.e = evaluate(plan), .arena = bh_arena_new()};
    bh_error err = {.code = BH_OK};
    ck_assert_msg(!bh_curves_make(m.e.plan, request, &m.curves, &err), "%s", err.text);
    const bh_curve_picture p = {.table = m.e.table,
                                .curves = &m.curves,
                                .shown = shown,
                                .measured = measured,
                                .measured_name = "points.csv",
                                .version = "9.9"};
    ck_assert_msg(!bh_curve_figure(&p, m.arena, &m.figure, &err), "%s", err.text);
    ck_assert_msg(!bh_figure_write(&m.figure, BH_FIGURE_SVG, &m.svg, &err), "%s", err.text);
    lay_out(&m);
    return m;
}

static void put_away(struct made *m)
{
    bh_figure_layout_free(&m->layout);
    bh_text_free(&m->svg);
    bh_curves_free(&m->curves);
    bh_arena_free(m->arena);
    done(&m->e);
}

/* --- back from paths --- */

/* The corners of the n-th path (from 0) whose style has all the words, on the page. */
static size_t path(const char *svg, const char *words, int n, double (*out)[2])
{
    for (const char *s = svg; (s = strstr(s, "<path ")) != NULL; s++) {
        const char *end = strchr(s, '>'), *at = strstr(s, words), *d = strstr(s, " d=\"");
        if (!at || at > end || n-- > 0)
            continue;
        size_t count = 0;
        for (d += 4; *d != '"' && count < MOST;) {
            if (*d == 'M' || *d == 'L' || *d == ' ') {
                d++;
            } else if (*d == 'Z' || *d == 'C') {
                break;
            } else {
                ck_assert(!bh_number_parse(d, &d, &out[count][0]));
                d += *d == ' ';
                ck_assert(!bh_number_parse(d, &d, &out[count++][1]));
            }
        }
        return count;
    }
    return 0;
}

static double from_page(const bh_axis *a, double share)
{
    return a->logarithmic ? a->from * pow(a->to / a->from, share)
                          : a->from + share * (a->to - a->from);
}

static double x_of(const struct made *m, double page)
{
    return from_page(&m->figure.x.axis, (page - m->layout.frame.x) / m->layout.frame.wide);
}

static double y_of(const struct made *m, double page)
{
    return from_page(&m->figure.y.axis, 1.0 - (page - m->layout.frame.y) / m->layout.frame.high);
}

static void colour(int style, char out[80])
{
    const bh_figure_style *s = bh_figure_style_at(style);
    snprintf(out, 80, "stroke:rgb(%.2f", floor(s->red / 255.0 * 1e4) / 100.0);
    if (out[strlen(out) - 1] == '0') /* 12.90 is written 12.9 */
        out[strlen(out) - 1] = '\0';
}

/* Each curve in the SVG against the numbers that CSV prints. */
static void compare_curves(const struct made *m, int shown)
{
    static double at[MOST][2];
    for (size_t k = 0; k < m->curves.count; k++) {
        char words[80];
        colour((int)k, words);
        const size_t n = path(m->svg.bytes, words, 0, at);
        const bh_curve *c = m->curves.curve[k];
        const double scale = m->figure.series[k].point[0].y / bh_shown_on_curve(c, 0, shown);
        const double x_scale = m->figure.series[k].point[0].x / bh_curve_x(c, 0);
        ck_assert_uint_ge(n, 2);
        for (size_t i = 0, p = 0; i < bh_curve_count(c); i++) {
            const double x = bh_curve_x(c, i) * x_scale, y = bh_shown_on_curve(c, i, shown) * scale,
                         page = bh_figure_x(&m->figure, &m->layout, x);
            /* points on a straight piece are left out of the path: look between its corners */
            while (p + 2 < n && at[p + 1][0] < page)
                p++;
            const double share = (page - at[p][0]) / (at[p + 1][0] - at[p][0]);
            ck_assert_double_ge(share, -0.01);
            ck_assert_double_le(share, 1.01);
            ck_assert_double_eq_tol(y_of(m, at[p][1] + share * (at[p + 1][1] - at[p][1])), y,
                                    2e-3 * y);
            if (i % 10 == 0) /* and that the frame is what the axis says */
                ck_assert_double_eq_tol(x_of(m, page), x, 1e-9 * x);
        }
    }
}

START_TEST(curves_stand_where_their_numbers_are)
{
    static const struct {
        bh_against against;
        int shown;
        const char *unit;
        bool logarithmic;
    } rows[] = {
        {BH_AGAINST_ANGLE, BH_COL_POINT_CROSS_SECTION, "µb/sr", true},
        {BH_AGAINST_ANGLE, BH_COL_Q2, "GeV²", true},
        {BH_AGAINST_Q2, BH_COL_SIGNAL, "MHz", true},
        {BH_AGAINST_ENERGY, BH_COL_SIGNAL, "kHz", true},
        {BH_AGAINST_EPSILON, BH_COL_POINT_CROSS_SECTION, "µb/sr", true},
        {BH_AGAINST_ANGLE, BH_COL_SCATTERED_KINETIC, "MeV", false},
        {BH_AGAINST_ANGLE, BH_SHOWN_MERIT, "/h", true},
        {BH_AGAINST_ANGLE, BH_COL_COUNTS, "", false},
    };
    const bh_curves_request r = {.against = rows[_i].against, .points = 101};
    struct made m = draw(proton, &r, rows[_i].shown, NULL);
    ck_assert_str_eq(m.figure.y.unit, rows[_i].unit);
    ck_assert_int_eq(m.figure.y.axis.logarithmic, rows[_i].logarithmic);
    compare_curves(&m, rows[_i].shown);
    put_away(&m);
}
END_TEST

/* The scale between the key's unit and the axis is what the unit says. */
START_TEST(units_and_scales_agree)
{
    static const struct {
        int shown;
        double lo, hi;
        bool logarithmic;
        double scale;
        const char *unit;
    } rows[] = {
        {BH_COL_CROSS_SECTION, 0.0, 5e3, false, 1e-3, "mb/sr"},
        {BH_COL_CROSS_SECTION, 0.0, 5e-4, false, 1e6, "pb/sr"},
        {BH_COL_CROSS_SECTION, 1e-9, 1e0, true, 1e3, "nb/sr"},
        {BH_COL_CROSS_SECTION, 1e-15, 1e-14, true, 1e12, "ab/sr"},
        {BH_COL_SIGNAL, 0.0, 2e6, false, 1e-6, "MHz"},
        {BH_COL_SIGNAL, 0.0, 0.02, false, 1e3, "mHz"},
        {BH_COL_BEAM_KINETIC, 0.0, 855.0, false, 1.0, "MeV"},
        {BH_COL_BEAM_KINETIC, 0.0, 12e3, false, 1e-3, "GeV"},
        {BH_COL_STATISTICAL, 0.0, 0.01, false, 100.0, "%"},
        {BH_COL_LUMINOSITY, 0.0, 4e37, false, 1e-36, "10³⁶ /cm²/s"},
        {BH_COL_LUMINOSITY, 1e36, 4e37, true, 1.0, "/cm²/s"},
        {BH_COL_COUNTS, 0.0, 1.5e6, false, 1e-6, "10⁶"},
        {BH_COL_COUNTS, 0.0, 15e3, false, 1.0, ""},
        {BH_COL_Q2, 0.0, 2e-4, false, 1e6, "10⁻⁶ GeV²"},
        {BH_COL_EPSILON, 0.0, 1.0, false, 1.0, ""},
    };
    const bh_shown_unit u =
        bh_shown_prefix(rows[_i].shown, rows[_i].lo, rows[_i].hi, rows[_i].logarithmic);
    ck_assert_str_eq(u.unit, rows[_i].unit);
    ck_assert_double_eq_tol(u.scale, rows[_i].scale, 1e-12 * rows[_i].scale);
}
END_TEST

START_TEST(every_column_with_numbers_can_be_shown)
{
    int n = 0;
    for (int i = 0; i < BH_COLUMN_COUNT; i++) {
        const bool number = bh_column_at(i)->kind == BH_CELL_NUMBER;
        ck_assert_int_eq(bh_shown_find(bh_column_at(i)->key), number ? i : -1);
        if (number)
            ck_assert_str_ne(bh_shown_words(i), "");
        n += number;
    }
    ck_assert_int_gt(n, 30);
    ck_assert_int_eq(bh_shown_find("figure_of_merit_per_h"), BH_SHOWN_MERIT);
    ck_assert_str_eq(bh_shown_suggest("figure_of_merit"), "figure_of_merit_per_h");
}
END_TEST

/* --- settings, bands, points --- */

static const bh_figure_series *series(const struct made *m, const char *words)
{
    for (size_t i = 0; i < m->figure.series_count; i++)
        if (strstr(m->figure.series[i].name, words))
            return &m->figure.series[i];
    ck_abort_msg("no series %s", words);
    return NULL;
}

START_TEST(planned_points_are_the_rows_of_the_table)
{
    struct made m =
        draw(proton, &(bh_curves_request){.against = BH_AGAINST_ANGLE}, BH_COL_CROSS_SECTION, NULL);
    const bh_figure_series *s = series(&m, "planned");
    ck_assert_uint_eq(s->count, 3); /* K1, K2.1, K2.2: K3 and K4 lie on other curves */
    for (size_t i = 0; i < s->count; i++) {
        const double sigma = cell(&m.e, i, BH_COL_CROSS_SECTION), /* ub */
            stat = cell(&m.e, i, BH_COL_STATISTICAL), syst = cell(&m.e, i, BH_COL_SYSTEMATIC);
        ck_assert_relative(s->point[i].x, cell(&m.e, i, BH_COL_ANGLE), 1e-9, "angle");
        ck_assert_relative(s->point[i].y, sigma, 1e-12, "sigma");
        ck_assert_relative(s->point[i].inner, sigma * stat, 1e-12, "statistical");
        ck_assert_relative(s->point[i].outer, sigma * hypot(stat, syst), 1e-12, "total");
    }
    ck_assert_uint_eq(m.figure.span_count, 3);
    ck_assert_str_eq(m.figure.span[2].name, "K2.2");
    /* edges of four bins of +-28 mrad around 70 deg */
    ck_assert_uint_eq(m.figure.span[2].edge_count, 3);
    ck_assert_double_eq_tol(m.figure.span[2].from, 70.0 - 1.604282, 1e-5);
    ck_assert_double_eq_tol(m.figure.span[2].to, 70.0 + 1.604282, 1e-5);
    ck_assert_double_eq_tol(m.figure.span[2].edge[0], 70.0 - 0.802141, 1e-5);
    ck_assert_double_eq_tol(m.figure.span[2].edge[1], 70.0, 1e-5);
    put_away(&m);
}
END_TEST

/* The capped bar of the first setting in the SVG: its length on the page is the uncertainty. */
START_TEST(error_bars_are_as_long_as_the_uncertainty)
{
    static double at[MOST][2];
    struct made m = draw(proton, &(bh_curves_request){.against = BH_AGAINST_ANGLE},
                         BH_COL_POINT_CROSS_SECTION, NULL);
    const bh_figure_point *p = &series(&m, "planned")->point[0];
    size_t n = 0;
    int seen = 0;
    for (int i = 0; (n = path(m.svg.bytes, "stroke-width:0.9;", i, at)) > 0; i++) {
        if (n != 2 || fabs(at[0][0] - at[1][0]) > 1e-3 || fabs(x_of(&m, at[0][0]) - p->x) > 1e-2)
            continue;
        seen++;
        ck_assert_double_eq_tol(y_of(&m, at[0][1]), p->y - p->inner, 1e-3 * p->y);
        ck_assert_double_eq_tol(y_of(&m, at[1][1]), p->y + p->inner, 1e-3 * p->y);
    }
    ck_assert_int_eq(seen, 1);
    ck_assert_double_eq_tol(p->inner / p->y, 0.05, 1e-6); /* the goal */
    put_away(&m);
}
END_TEST

START_TEST(in_q2_the_acceptance_follows_the_kinematics)
{
    struct made m =
        draw(proton, &(bh_curves_request){.against = BH_AGAINST_Q2}, BH_COL_SIGNAL, NULL);
    const bh_figure_series *s = series(&m, "planned");
    ck_assert_uint_eq(s->count, 3);
    for (size_t i = 0; i < 3; i++) {
        ck_assert_relative(s->point[i].x, cell(&m.e, i, BH_COL_Q2), 3e-3,
                           "Q2"); /* the table's is behind the losses in half the target */
        ck_assert(m.figure.span[i].from < s->point[i].x && m.figure.span[i].to > s->point[i].x);
        ck_assert_uint_eq(m.figure.span[i].edge_count, 3);
    }
    put_away(&m);
}
END_TEST

START_TEST(the_band_spans_all_models)
{
    const bh_curves_request r = {.against = BH_AGAINST_ANGLE,
                                 .structures = "kelly-2004,dipole,ye-2018",
                                 .coulombs = "plane-wave"};
    struct made m = draw(proton, &r, BH_COL_POINT_CROSS_SECTION, NULL);
    ck_assert_uint_eq(m.curves.count, 3);
    ck_assert_str_eq(m.curves.name[1], "dipole plane-wave");
    compare_curves(&m, BH_COL_POINT_CROSS_SECTION);
    ck_assert_uint_eq(m.figure.band_count, 1);
    const bh_figure_band *b = m.figure.band;
    bool open = false;
    for (size_t i = 0; i < b->count; i++) {
        double lo = INFINITY, hi = -INFINITY;
        for (size_t k = 0; k < 3; k++) {
            lo = fmin(lo, m.figure.series[k].point[i].y);
            hi = fmax(hi, m.figure.series[k].point[i].y);
        }
        ck_assert_double_eq(b->low[i], lo);
        ck_assert_double_eq(b->high[i], hi);
        open = open || hi > lo;
    }
    ck_assert(open);
    put_away(&m);
}
END_TEST

START_TEST(published_points_are_drawn_by_source)
{
    static const bh_measured_point points[] = {
        {30, 0.5, 0.1, 0}, {45, 0.05, 0.2, 1}, {160, 1e-4, 0, 0}};
    static const char *const sources[] = {"Nobody, 1971", ""};
    const bh_measured measured = {3, 2, points, sources};
    struct made m = draw(proton, &(bh_curves_request){.against = BH_AGAINST_ANGLE},
                         BH_COL_POINT_CROSS_SECTION, &measured);
    const bh_figure_series *s = series(&m, "Nobody"), *t = series(&m, "points.csv");
    ck_assert_uint_eq(s->count, 2);
    ck_assert_uint_eq(t->count, 1);
    ck_assert_int_ne(s->style, t->style);
    ck_assert_int_eq(s->kind, BH_SERIES_PUBLISHED);
    ck_assert_double_eq_tol(s->point[0].y, 0.5, 1e-12);
    ck_assert_double_eq_tol(s->point[0].inner, 0.1, 1e-12);
    ck_assert_double_eq_tol(s->point[1].x, 160.0, 1e-12);
    ck_assert_double_eq_tol(t->point[0].inner, 0.2, 1e-12); /* reaches below 0 */
    ck_assert(m.figure.y.axis.logarithmic);
    ck_assert(strstr(m.figure.description, "3 published points") != NULL);
    put_away(&m);
}
END_TEST

/* A published 0 does not turn the axis linear, nor does it widen it. */
START_TEST(a_zero_leaves_a_logarithmic_axis)
{
    static const bh_measured_point points[] = {{30, 0.0, 0.0, 0}, {45, 0.05, 0.01, 0}};
    static const char *const sources[] = {"Nobody, 1971"};
    const bh_measured measured = {2, 1, points, sources};
    struct made with = draw(proton, &(bh_curves_request){.against = BH_AGAINST_ANGLE},
                            BH_COL_POINT_CROSS_SECTION, &measured);
    struct made without = draw(proton, &(bh_curves_request){.against = BH_AGAINST_ANGLE},
                               BH_COL_POINT_CROSS_SECTION, NULL);
    ck_assert(with.figure.y.axis.logarithmic);
    ck_assert_double_eq(with.figure.y.axis.from, without.figure.y.axis.from);
    put_away(&with);
    put_away(&without);
}
END_TEST

START_TEST(rings_are_drawn_bin_by_bin)
{
    const bh_curves_request r = {.against = _i ? BH_AGAINST_Q2 : BH_AGAINST_ANGLE};
    struct made m = draw(rings, &r, BH_COL_SIGNAL, NULL);
    const bh_figure_series *s = series(&m, "planned");
    ck_assert_uint_eq(s->count, 8);
    for (size_t i = 0; i < 8; i++)
        ck_assert_relative(s->point[i].x, bin_cell(&m.e, i, _i ? BH_COL_Q2 : BH_COL_ANGLE), 1e-12,
                           "bin");
    compare_curves(&m, BH_COL_SIGNAL);
    ck_assert_double_eq_tol(bh_curve_x(m.curves.curve[0], 0), _i ? 0.0041 : 20.0, _i ? 1e-3 : 1e-9);
    ck_assert_uint_eq(m.figure.span_count, 1);
    ck_assert_uint_eq(m.figure.span[0].edge_count, 7);
    put_away(&m);
}
END_TEST

/* What the readout and the hours of the whole ring decide has no curve, only the bins. */
START_TEST(counts_of_a_ring_are_bins_alone)
{
    struct made m =
        draw(rings, &(bh_curves_request){.against = BH_AGAINST_ANGLE}, BH_COL_COUNTS, NULL);
    ck_assert_uint_eq(m.figure.series_count, 1);
    ck_assert_uint_eq(series(&m, "planned")->count, 8);
    put_away(&m);
}
END_TEST

/* --- below --- */

/* Of all that is drawn the ratio to the first curve, at the points of which it is exact. */
START_TEST(models_stand_below_as_ratios)
{
    const bh_curves_request r = {.against = BH_AGAINST_ANGLE,
                                 .structures = "kelly-2004,arrington-2004,ye-2018",
                                 .points = 121};
    struct made m = draw(proton, &r, BH_COL_POINT_CROSS_SECTION, NULL);
    const bh_figure *below = m.figure.below;
    ck_assert_ptr_nonnull(below);
    ck_assert_str_eq(below->title, "ratio to kelly-2004");
    ck_assert_ptr_nonnull(strstr(m.figure.description, "below it the ratio to kelly-2004"));
    for (size_t s = 0; s < 3; s++)
        for (size_t i = 0; i < below->series[s].count; i++) {
            const double ratio = m.figure.series[s].point[i].y / m.figure.series[0].point[i].y,
                         got = below->series[s].point[i].y;
            ck_assert_double_eq_tol(got, ratio, 1e-9);
            ck_assert(got > below->y.axis.from && got < below->y.axis.to);
            ck_assert(below->band[0].low[i] <= got * (1.0 + 1e-9));
            ck_assert(below->band[0].high[i] >= got * (1.0 - 1e-9));
        }
    ck_assert_double_gt(m.layout.below.y, m.layout.frame.y + m.layout.frame.high);
    ck_assert_double_gt(m.layout.below.high, 50.0);
    put_away(&m);
}
END_TEST

/* The plan's own model first: planned points stand at 1, their bars relative. */
START_TEST(planned_points_stand_at_one_below)
{
    const bh_curves_request r = {
        .against = BH_AGAINST_ANGLE, .structures = "amt-2007-effective,kelly-2004", .points = 121};
    struct made m = draw(proton, &r, BH_COL_POINT_CROSS_SECTION, NULL);
    const bh_figure_series *s = &m.figure.below->series[2];
    ck_assert_int_eq(s->kind, BH_SERIES_PLANNED);
    ck_assert_uint_eq(s->count, 3);
    for (size_t i = 0; i < 3; i++) {
        ck_assert_double_eq_tol(s->point[i].y, 1.0, 2e-4);
        ck_assert_double_eq_tol(s->point[i].inner, cell(&m.e, i, BH_COL_STATISTICAL), 1e-4);
    }
    put_away(&m);
}
END_TEST

START_TEST(one_curve_has_nothing_below)
{
    struct made m = draw(proton, &(bh_curves_request){.against = BH_AGAINST_ANGLE},
                         BH_COL_POINT_CROSS_SECTION, NULL);
    ck_assert_ptr_null(m.figure.below);
    put_away(&m);
}
END_TEST

START_TEST(the_legend_says_where_models_are_from)
{
    static const struct {
        bh_curves_request r;
        const char *legend;
    } rows[] = {
        {{.against = BH_AGAINST_ANGLE},
         "amt-2007-effective: Arrington, Melnitchouk & Tjon, Phys. Rev. C 76 (2007) 035205"},
        {{.against = BH_AGAINST_ANGLE, .structures = "kelly-2004"},
         "kelly-2004: Kelly, Phys. Rev. C 70 (2004) 068202"},
        {{.against = BH_AGAINST_ANGLE, .structures = "kelly-2004", .coulombs = "plane-wave"},
         "kelly-2004 plane-wave: Kelly, Phys. Rev. C 70 (2004) 068202; Born, Z. Phys. 38 (1926) "
         "803"},
        {{.against = BH_AGAINST_ANGLE, .coulombs = "plane-wave"},
         "plane-wave: Born, Z. Phys. 38 (1926) 803"},
    };
    struct made m = draw(proton, &rows[_i].r, BH_COL_POINT_CROSS_SECTION, NULL);
    ck_assert_str_eq(m.figure.series[0].name, rows[_i].legend);
    for (size_t i = 0; i < m.layout.entry_count; i++) /* long ones are broken, inside the page */
        ck_assert_double_le(m.layout.entries[i].x + BH_LEGEND_SAMPLE + BH_LEGEND_GAP +
                                m.layout.entries[i].wide,
                            m.layout.wide + m.layout.entries[i].x - m.layout.frame.x);
    put_away(&m);
}
END_TEST

START_TEST(a_ring_against_energy_is_a_curve)
{
    struct made m =
        draw(rings, &(bh_curves_request){.against = BH_AGAINST_ENERGY}, BH_COL_SIGNAL, NULL);
    compare_curves(&m, BH_COL_SIGNAL);
    ck_assert_uint_eq(series(&m, "planned")->count, 1);
    ck_assert(m.figure.x.axis.logarithmic);
    put_away(&m);
}
END_TEST

START_TEST(what_cannot_be_drawn_is_refused)
{
    static const struct {
        bh_curves_request request;
        const char *words;
    } rows[] = {
        {{.structures = "kelly-2004,"}, "--structure has an empty name"},
        {{.structures = ","}, "--structure has an empty name"},
        {{.structures = "a,b,c,d,e,f,g,h,i"}, "--structure takes 8 names at most"},
        {{.structures = "a,b,c", .coulombs = "plane-wave,default,plane-wave"},
         "more than 8 curves"},
        {{.coulombs = "plain"}, "no Coulomb model \"plain\""},
        {{.coulombs = ""}, "--coulomb has an empty name"},
        {{.structures = "kelly-2004,kelly-2005"}, "did you mean"},
        {{.setting = "K9"}, "no setting \"K9\""},
        {{.arm = "B"}, "no arm \"B\""},
    };
    struct evaluated e = evaluate(proton);
    for (int i = 0; i < COUNT(rows); i++) {
        bh_curves c;
        bh_error err = {.code = BH_OK};
        ck_assert_int_eq(bh_curves_make(e.plan, &rows[i].request, &c, &err), BH_EDOMAIN);
        ck_assert_msg(strstr(err.text, rows[i].words) != NULL, "%s", err.text);
        ck_assert_uint_eq(c.count, 0);
    }
    done(&e);
}
END_TEST

START_TEST(an_empty_column_says_why)
{
    static const char *const wishless =
        BEAM TARGET "arms: [{name: A, in_plane: ±28 mrad, out_of_plane: ±70 mrad}]\n"
                    "settings: [{name: K, angle: 40 deg}]\n";
    struct evaluated e = evaluate(wishless);
    bh_arena *arena = bh_arena_new();
    bh_curves c;
    bh_figure figure;
    bh_error err = {.code = BH_OK};
    ck_assert(!bh_curves_make(e.plan, &(bh_curves_request){.against = BH_AGAINST_ANGLE}, &c, &err));
    const bh_curve_picture p = {.table = e.table, .curves = &c, .shown = BH_COL_COUNTS};
    ck_assert_int_eq(bh_curve_figure(&p, arena, &figure, &err), BH_EDOMAIN);
    ck_assert_msg(strstr(err.text, "counts is empty all along the curve: the setting asks for"),
                  "%s", err.text);
    bh_curves_free(&c);
    bh_arena_free(arena);
    done(&e);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("curve_figure");
    tcase_set_timeout(tests, 60);
    tcase_add_loop_test(tests, curves_stand_where_their_numbers_are, 0, 8);
    tcase_add_loop_test(tests, units_and_scales_agree, 0, 15);
    tcase_add_test(tests, every_column_with_numbers_can_be_shown);
    tcase_add_test(tests, planned_points_are_the_rows_of_the_table);
    tcase_add_test(tests, error_bars_are_as_long_as_the_uncertainty);
    tcase_add_test(tests, in_q2_the_acceptance_follows_the_kinematics);
    tcase_add_test(tests, the_band_spans_all_models);
    tcase_add_test(tests, published_points_are_drawn_by_source);
    tcase_add_test(tests, a_zero_leaves_a_logarithmic_axis);
    tcase_add_loop_test(tests, rings_are_drawn_bin_by_bin, 0, 2);
    tcase_add_test(tests, a_ring_against_energy_is_a_curve);
    tcase_add_test(tests, counts_of_a_ring_are_bins_alone);
    tcase_add_test(tests, models_stand_below_as_ratios);
    tcase_add_test(tests, planned_points_stand_at_one_below);
    tcase_add_test(tests, one_curve_has_nothing_below);
    tcase_add_loop_test(tests, the_legend_says_where_models_are_from, 0, 4);
    tcase_add_test(tests, what_cannot_be_drawn_is_refused);
    tcase_add_test(tests, an_empty_column_says_why);
    return run_suite("report/curve_figure", tests);
}
