/* test_figure.c - files of figures: whole, well formed, the same bytes each time, complete in
 * themselves. */
#include "../suite.h"

#include <math.h>
#include <stdio.h>
#include <string.h>
#include <time.h>
#include <unistd.h>

#include "beamhours/report/figure_draw.h"
#include "beamhours/report/figure_layout.h"

enum { POINTS = 50, SPANS = 200 };

/* A figure with everything in it. */
struct full {
    bh_figure figure;
    bh_figure_point line[2][POINTS], planned[3], published[3];
    double x[POINTS], low[POINTS], high[POINTS], edges[2];
    bh_figure_series series[4];
    bh_figure_band band;
    bh_figure_span spans[SPANS];
    char names[SPANS][16];
};

static void make(struct full *f, size_t spans)
{
    *f = (struct full){.edges = {21.0, 22.0}};
    for (int i = 0; i < POINTS; i++) {
        f->x[i] = 10.0 + 2.0 * i;
        for (int k = 0; k < 2; k++)
            f->line[k][i] = (bh_figure_point){f->x[i], pow(10.0, 3.0 - 0.1 * i - 0.1 * k), 0, 0};
        f->high[i] = f->line[0][i].y;
        f->low[i] = f->line[1][i].y;
    }
    f->line[1][20].y = f->low[20] = (double)NAN;
    f->planned[0] = (bh_figure_point){20, 300, 30, 50};
    f->planned[1] = (bh_figure_point){40, 30, 40, 60}; /* bars reach below 0 */
    f->planned[2] = (bh_figure_point){60, (double)NAN, 1, 1};
    for (int i = 0; i < 3; i++)
        f->published[i] = (bh_figure_point){30.0 + 20.0 * i, 90.0 / (1 + i * i), 5, 0};
    f->series[0] = (bh_figure_series){BH_SERIES_LINE, 0, "one & <two>", POINTS, f->line[0]};
    f->series[1] = (bh_figure_series){BH_SERIES_LINE, 5, "three", POINTS, f->line[1]};
    f->series[2] = (bh_figure_series){BH_SERIES_PLANNED, 0, "planned", 3, f->planned};
    f->series[3] = (bh_figure_series){BH_SERIES_PUBLISHED, 1, "published", 3, f->published};
    f->band = (bh_figure_band){"spread", POINTS, f->x, f->low, f->high};
    for (size_t i = 0; i < spans; i++) {
        snprintf(f->names[i], sizeof f->names[i], "K%zu", i);
        const double from = 20.0 + 80.0 * (double)(i % 60) / 60.0;
        f->spans[i] = (bh_figure_span){f->names[i], from, from + 3.0, 2, f->edges};
    }
    f->figure = (bh_figure){.title = "A title with <marks> & signs",
                            .subtitle = "what is kept",
                            .foot = "what made it",
                            .description = "a \"description\" > 0",
                            .x = {"angle", "deg", {8.0, 112.0, false}},
                            .y = {"cross section", "nb/sr", {1e-3, 2e3, true}},
                            .band_count = 1,
                            .series_count = 4,
                            .span_count = spans,
                            .band = &f->band,
                            .series = f->series,
                            .span = f->spans,
                            .span_name = "settings"};
}

static bh_text written(const bh_figure *figure, bh_figure_format format)
{
    bh_text out = {0};
    bh_error err = {.code = BH_OK};
    ck_assert_msg(!bh_figure_write(figure, format, &out, &err), "%s", err.text);
    return out;
}

static bool same(const bh_text *a, const bh_text *b)
{
    return a->length == b->length && memcmp(a->bytes, b->bytes, a->length) == 0;
}

static bool has(const bh_text *text, const char *words)
{
    const size_t n = strlen(words);
    for (size_t i = 0; i + n <= text->length; i++)
        if (memcmp(text->bytes + i, words, n) == 0)
            return true;
    return false;
}

START_TEST(equal_figures_are_equal_bytes)
{
    struct full f, other;
    make(&f, 12);
    make(&other, 3);
    bh_text first = written(&f.figure, (bh_figure_format)_i);
    bh_text between = written(&other.figure, (bh_figure_format)((_i + 1) % 3));
    bh_text third = written(&other.figure, (bh_figure_format)_i);
    bh_text second = written(&f.figure, (bh_figure_format)_i);
    ck_assert(same(&first, &second));
    ck_assert(!same(&first, &third));
    bh_text_free(&first);
    bh_text_free(&between);
    bh_text_free(&third);
    bh_text_free(&second);
}
END_TEST

/* Runs `command` on the text as a file; what it says into `out`.  False where it is not there. */
static bool asked(const char *command, const bh_text *text, char *out, size_t size)
{
    char path[] = "/tmp/beamhours-figure-XXXXXX", line[300];
    const int file = mkstemp(path);
    ck_assert_int_ge(file, 0);
    ck_assert_int_eq(write(file, text->bytes, text->length), (ssize_t)text->length);
    close(file);
    snprintf(line, sizeof line, "command -v %.*s >/dev/null || exit 9; %s %s 2>&1",
             (int)strcspn(command, " "), command, command, path);
    FILE *said = popen(line, "r");
    ck_assert_ptr_nonnull(said);
    out[fread(out, 1, size - 1, said)] = '\0';
    const int status = pclose(said);
    unlink(path);
    if (status >> 8 == 9)
        printf("not here, left out: %s\n", command);
    return status >> 8 != 9;
}

START_TEST(a_pdf_is_whole_and_has_its_fonts)
{
    struct full f;
    char said[4000];
    make(&f, 12);
    bh_text pdf = written(&f.figure, BH_FIGURE_PDF);
    ck_assert_int_eq(strncmp(pdf.bytes, "%PDF-1.5\n", 9), 0);
    ck_assert_str_eq(pdf.bytes + pdf.length - 6, "%%EOF\n");
    ck_assert(has(&pdf, "/FontFile2"));
    ck_assert(has(&pdf, "20000101000000"));
    if (asked("pdffonts", &pdf, said, sizeof said)) {
        int fonts = 0;
        for (char *line = strtok(said, "\n"); line; line = strtok(NULL, "\n"))
            if (strstr(line, "DejaVu")) {
                ck_assert_msg(strstr(line, " yes yes yes ") != NULL, "%s", line);
                fonts++;
            }
        ck_assert_int_ge(fonts, 2);
    }
    bh_text_free(&pdf);
}
END_TEST

static unsigned long big_endian(const char *bytes)
{
    unsigned long n = 0;
    for (int i = 0; i < 4; i++)
        n = n << 8 | (unsigned char)bytes[i];
    return n;
}

START_TEST(a_png_has_its_size)
{
    struct full f;
    double wide = 0.0, high = 0.0;
    make(&f, 12);
    bh_text png = written(&f.figure, BH_FIGURE_PNG);
    ck_assert(!bh_figure_size(&f.figure, &wide, &high, NULL));
    ck_assert_double_eq_tol(wide, 468.0, 1e-9);
    ck_assert_int_eq(memcmp(png.bytes, "\x89PNG\r\n\x1a\n", 8), 0);
    ck_assert_uint_eq(big_endian(png.bytes + 16), (unsigned long)lround(wide * 300.0 / 72.0));
    ck_assert_uint_eq(big_endian(png.bytes + 20), (unsigned long)lround(high * 300.0 / 72.0));
    ck_assert_int_eq(memcmp(png.bytes + png.length - 8, "IEND\xae\x42\x60\x82", 8), 0);
    bh_text_free(&png);
}
END_TEST

/* Elements are closed in the order they were opened, attributes quoted, & only before a name. */
static void check_xml(const char *s)
{
    char open[64][24];
    int depth = 0;
    while ((s = strpbrk(s, "<&")) != NULL) {
        if (*s == '&') {
            ck_assert_msg(strchr(s, ';') && strchr(s, ';') - s < 8, "%.20s", s);
            s++;
            continue;
        }
        const char *end = strchr(s, '>');
        ck_assert_ptr_nonnull(end);
        int quotes = 0;
        for (const char *c = s; c < end; c++)
            quotes += *c == '"';
        ck_assert_msg(quotes % 2 == 0, "%.60s", s);
        char name[24] = "";
        sscanf(s + 1 + (s[1] == '/'), "%23[^ />]", name);
        if (s[1] == '/') {
            ck_assert_int_gt(depth, 0);
            ck_assert_str_eq(open[--depth], name);
        } else if (s[1] != '?' && end[-1] != '/') {
            ck_assert_int_lt(depth, 64);
            strcpy(open[depth++], name);
        }
        s = end + 1;
    }
    ck_assert_int_eq(depth, 0);
}

START_TEST(an_svg_is_well_formed_and_complete_in_itself)
{
    static const char *const foreign[] = {"<script", "<text",       "font-family", "@import",
                                          "<image",  "href=\"http", "surface",     "javascript"};
    struct full f;
    char said[4000];
    make(&f, 12);
    bh_text svg = written(&f.figure, BH_FIGURE_SVG);
    check_xml(svg.bytes);
    for (int i = 0; i < COUNT(foreign); i++)
        ck_assert_msg(!has(&svg, foreign[i]), "%s", foreign[i]);
    ck_assert(has(&svg, "role=\"img\" aria-labelledby=\"title desc\""));
    ck_assert(has(&svg, "<title id=\"title\">A title with &lt;marks&gt; &amp; signs</title>"));
    ck_assert(has(&svg, "<desc id=\"desc\">a \"description\" &gt; 0</desc>"));
    if (asked("xmllint --noout", &svg, said, sizeof said))
        ck_assert_str_eq(said, "");
    bh_text_free(&svg);
}
END_TEST

/* Every id begins with `id`, and every one that is used is there. */
static void check_ids(const char *svg, const char *id)
{
    static const char *const uses[] = {"xlink:href=\"#", "url(#"};
    for (const char *s = svg; (s = strstr(s, " id=\"")) != NULL; s++)
        ck_assert_msg(strncmp(s + 5, id, strlen(id)) == 0, "%.30s", s);
    for (int i = 0; i < 2; i++)
        for (const char *s = svg; (s = strstr(s, uses[i])) != NULL; s++) {
            char name[64], wanted[80];
            sscanf(s + strlen(uses[i]), "%63[^\")]", name);
            snprintf(wanted, sizeof wanted, "id=\"%s\"", name);
            ck_assert_msg(strstr(svg, wanted) != NULL, "%s is nowhere", wanted);
        }
}

START_TEST(two_figures_in_a_page_do_not_share_names)
{
    struct full f;
    make(&f, 12);
    bh_text out = {0}, plain = {0};
    ck_assert(!bh_figure_inline(&f.figure, "fig1", &out, NULL));
    check_xml(out.bytes);
    check_ids(out.bytes, "fig1");
    ck_assert_int_eq(strncmp(out.bytes, "<svg ", 5), 0);
    ck_assert(has(&out, "aria-labelledby=\"fig1title fig1desc\""));
    f.figure.title = "";
    ck_assert(!bh_figure_inline(&f.figure, "f", &plain, NULL));
    ck_assert(has(&plain, "<title id=\"ftitle\">cross section</title>"));
    bh_text_free(&out);
    bh_text_free(&plain);
}
END_TEST

START_TEST(an_axis_without_length_is_refused)
{
    static const bh_axis bad[] = {{1.0, 1.0, false},
                                  {2.0, 1.0, false},
                                  {NAN, 1.0, false},
                                  {0.0, 1.0, true},
                                  {0.0, INFINITY, false}};
    for (int i = 0; i < COUNT(bad); i++)
        for (int y = 0; y < 2; y++)
            for (int format = 0; format < 3; format++) {
                struct full f;
                bh_text out = {0};
                bh_error err = {.code = BH_OK};
                make(&f, 3);
                *(y ? &f.figure.y.axis : &f.figure.x.axis) = bad[i];
                ck_assert_int_eq(bh_figure_write(&f.figure, (bh_figure_format)format, &out, &err),
                                 BH_EDOMAIN);
                ck_assert_str_ne(err.text, "");
                bh_text_free(&out);
            }
}
END_TEST

/* Nothing overlaps in the legend or the bars of settings, and all is on the page. */
START_TEST(nothing_stands_on_something_else)
{
    static const size_t spans[] = {0, 1, 12, 60, 200};
    struct full f;
    bh_figure_layout l;
    bh_pen pen;
    cairo_surface_t *s = cairo_recording_surface_create(CAIRO_CONTENT_COLOR, NULL);
    cairo_t *to = cairo_create(s);
    make(&f, spans[_i]);
    ck_assert(!bh_pen_open(to, &pen, NULL));
    ck_assert(!bh_figure_layout_make(&f.figure, &pen, &l, NULL));
    for (size_t i = 0; i < l.entry_count; i++) {
        const bh_lettering how = bh_figure_letters(BH_LETTERS_LEGEND);
        double wide = 0.0;
        bh_pen_measure(&pen, &how, l.entries[i].name, &wide, NULL);
        const double end = l.entries[i].x + BH_LEGEND_SAMPLE + BH_LEGEND_GAP + wide;
        ck_assert_double_le(end, l.wide);
        ck_assert_double_lt(l.entries[i].y, l.foot_y);
        if (i + 1 < l.entry_count && l.entries[i + 1].y - l.entries[i].y < 1.0)
            ck_assert_double_le(end, l.entries[i + 1].x);
    }
    for (size_t i = 0; i < spans[_i]; i++)
        for (size_t k = 0; k < i; k++)
            if (l.lanes < 20 && l.spans[i].lane == l.spans[k].lane)
                ck_assert(l.spans[i].from >= l.spans[k].to || l.spans[k].from >= l.spans[i].to);
    ck_assert(l.names ? l.lanes <= 6 : spans[_i] > 12);
    ck_assert_double_ge(l.frame.y - l.lanes * l.lane_high, l.subtitle_y);
    ck_assert_double_le(l.high, 480.0);
    bh_figure_layout_free(&l);
    bh_pen_close(&pen);
    cairo_destroy(to);
    cairo_surface_destroy(s);
}
END_TEST

START_TEST(two_hundred_settings_are_drawn_in_time)
{
    struct full f;
    make(&f, SPANS);
    struct timespec a, b;
    bh_text warm = written(&f.figure, BH_FIGURE_SVG); /* fonts are looked for once */
    clock_gettime(CLOCK_PROCESS_CPUTIME_ID, &a);
    bh_text out = written(&f.figure, BH_FIGURE_SVG);
    clock_gettime(CLOCK_PROCESS_CPUTIME_ID, &b);
    const double took = (double)(b.tv_sec - a.tv_sec) + 1e-9 * (double)(b.tv_nsec - a.tv_nsec);
    printf("200 settings: %.0f ms, %zu bytes\n", 1e3 * took, out.length);
    if (!getenv("CK_FORK")) /* sanitizers and valgrind are slower */
        ck_assert_double_lt(took, 0.3);
    ck_assert_uint_lt(out.length, 200000);
    bh_text_free(&warm);
    bh_text_free(&out);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("figure");
    tcase_set_timeout(tests, 60);
    tcase_add_loop_test(tests, equal_figures_are_equal_bytes, 0, 3);
    tcase_add_test(tests, a_pdf_is_whole_and_has_its_fonts);
    tcase_add_test(tests, a_png_has_its_size);
    tcase_add_test(tests, an_svg_is_well_formed_and_complete_in_itself);
    tcase_add_test(tests, two_figures_in_a_page_do_not_share_names);
    tcase_add_test(tests, an_axis_without_length_is_refused);
    tcase_add_loop_test(tests, nothing_stands_on_something_else, 0, 5);
    tcase_add_test(tests, two_hundred_settings_are_drawn_in_time);
    return run_suite("report/figure", tests);
}
