/* test_report.c - every demonstration in all four formats: numbers read back from each are those of
 * the run table's JSON, pages are whole, accessible, small, and the same twice. */
#include "../run/evaluated.h"

#include <ctype.h>
#include <json-c/json.h>
#include <unistd.h>

#include "beamhours/base/file.h"
#include "beamhours/base/number.h"
#include "beamhours/report/json.h"
#include "beamhours/report/report.h"

static const char *const demos[] = {
    "plans/alpha-gold.yaml", "plans/hydrogen-jet.yaml", "plans/hydrogen-separation.yaml",
    "plans/lead.yaml",       "plans/muon-rings.yaml",   "plans/positron-electron.yaml"};

/* A report and what it was made from. */
struct made {
    struct evaluated e;
    bh_report report;
    bh_text bytes; /* of the plan */
};

static struct made make_from(const char *text)
{
    static const bh_report_file files[] = {{"plan.yaml", "0123"}};
    struct made m = {.e = evaluate(text)};
    bh_error err = {.code = BH_OK};
    const bh_report_request r = {.table = m.e.table,
                                 .version = "9.9",
                                 .command = "beamhours report plan.yaml --output FILE.html",
                                 .file_count = 1,
                                 .files = files};
    ck_assert_msg(!bh_report_make(&r, &m.report, &err), "%s", err.text);
    return m;
}

static struct made make(const char *path)
{
    bh_text bytes = {0};
    ck_assert(!bh_file_read(path, 1 << 20, &bytes, NULL));
    struct made m = make_from(bytes.bytes);
    m.bytes = bytes;
    return m;
}

static void put_away(struct made *m)
{
    bh_report_free(&m->report);
    bh_text_free(&m->bytes);
    done(&m->e);
}

enum format { HTML, PDF, TEX, MD, FORMATS };

static bh_text write_as(const struct made *m, enum format format, bh_page page)
{
    bh_text out = {0};
    bh_error err = {.code = BH_OK};
    const bh_paper *p = &m->report.paper;
    const bh_code bad =
        format == HTML  ? bh_paper_html(p, page, &out, &err)
        : format == PDF ? bh_paper_pdf(p, page, &out, &err)
        : format == TEX
            ? bh_paper_latex(p, &(bh_latex_form){.page = page, .figures = "r"}, &out, &err)
            : bh_paper_markdown(p, "r", &out, &err);
    ck_assert_msg(!bad, "%s", err.text);
    return out;
}

/* --- the paper's own cells against JSON --- */

static double unit_size(const char *unit)
{
    static const struct {
        const char *unit;
        double size; /* of the key's unit */
    } rows[] = {{"%", 1e2},     {"b/sr", 1e-6}, {"mb/sr", 1e-3},
                {"nb/sr", 1e3}, {"pb/sr", 1e6}, {"fb/sr", 1e9}};
    for (int i = 0; i < COUNT(rows); i++)
        if (strcmp(rows[i].unit, unit) == 0)
            return rows[i].size;
    return 1.0;
}

static int column_named(const char *heading)
{
    for (int id = 0; id < BH_COLUMN_COUNT; id++)
        if (strcmp(bh_column_at(id)->heading, heading) == 0 &&
            bh_column_at(id)->kind != BH_CELL_TEXT)
            return id;
    return -1;
}

static json_object *rows_of(const struct made *m, bool bins, json_object **root)
{
    bh_selection view;
    bh_text out = {0};
    json_object *rows = NULL;
    ck_assert(!bh_selection_new(m->e.table, &(bh_selection_request){.bins = bins}, &view, NULL));
    ck_assert(!bh_report_json(&view, "9.9", &out));
    *root = json_tokener_parse(out.bytes);
    ck_assert(json_object_object_get_ex(*root, "rows", &rows));
    bh_selection_free(&view);
    bh_text_free(&out);
    return rows;
}

static void same_number(const char *cell, double wanted, const bh_column *column)
{
    double got = 0.0;
    ck_assert_msg(!bh_number_parse(cell, NULL, &got), "%s: %s", column->key, cell);
    const int power = fabs(wanted) > 0.0 ? (int)floor(log10(fabs(wanted))) : 0;
    const double step = column->kind == BH_CELL_COUNT ? 1.0 : pow(10.0, power - column->digits + 1);
    ck_assert_msg(fabs(got - wanted) <= 0.5001 * step, "%s: %s, not %.9g", column->key, cell,
                  wanted);
}

/* Returns how many numbers of the table were compared. */
static int compare(const bh_paper_table *t, json_object *rows)
{
    int compared = 0;
    for (size_t c = 1; c < t->column_count; c++) {
        const int id = column_named(t->columns[c].heading);
        if (id < 0)
            continue;
        for (size_t r = 0; r < t->row_count; r++) {
            json_object *value = NULL, *row = json_object_array_get_idx(rows, r);
            const char *cell = t->cells[r * t->column_count + c];
            ck_assert(json_object_object_get_ex(row, bh_column_at(id)->key, &value));
            if (!value)
                ck_assert_str_eq(cell, "-");
            else
                same_number(cell, json_object_get_double(value) * unit_size(t->columns[c].unit),
                            bh_column_at(id));
            compared++;
        }
    }
    return compared;
}

static bool has_column(const bh_paper_table *t, const char *heading)
{
    for (size_t c = 0; c < t->column_count; c++)
        if (strcmp(t->columns[c].heading, heading) == 0)
            return true;
    return false;
}

START_TEST(tables_of_rows_say_what_json_says)
{
    struct made m = make(demos[_i]);
    json_object *root = NULL, *rows = rows_of(&m, false, &root);
    const size_t count = json_object_array_length(rows);
    int compared = 0;
    for (size_t i = 0; i < m.report.paper.count; i++) {
        const bh_paper_table *t = m.report.paper.blocks[i].table;
        if (t && t->row_count == count && strcmp(t->columns[0].heading, "setting") == 0 &&
            !has_column(t, "bin"))
            compared += compare(t, rows);
    }
    ck_assert_int_ge(compared, (int)count * 25);
    json_object_put(root);
    put_away(&m);
}
END_TEST

/* Bins of arms that have one alone are no rows of it. */
START_TEST(the_table_of_bins_says_what_json_says)
{
    struct made m = make(demos[_i]);
    json_object *root = NULL, *all = rows_of(&m, true, &root), *rows = json_object_new_array();
    for (size_t i = 0; i < json_object_array_length(all); i++) {
        const bh_place p = bh_table_place(m.e.table, true, i);
        if (m.e.plan->settings[p.setting].arms[p.arm].arm.bins > 1)
            json_object_array_add(rows, json_object_get(json_object_array_get_idx(all, i)));
    }
    const size_t count = json_object_array_length(rows);
    int compared = 0;
    for (size_t i = 0; i < m.report.paper.count; i++) {
        const bh_paper_table *t = m.report.paper.blocks[i].table;
        if (t && has_column(t, "bin")) {
            ck_assert_uint_eq(t->row_count, count);
            compared += compare(t, rows);
        }
    }
    ck_assert_int_ge(compared, (int)count * 7);
    json_object_put(rows);
    json_object_put(root);
    put_away(&m);
}
END_TEST

static double total(json_object *root, const char *key)
{
    json_object *totals = NULL, *value = NULL;
    ck_assert(json_object_object_get_ex(root, "totals", &totals));
    ck_assert_msg(json_object_object_get_ex(totals, key, &value), "%s", key);
    return value ? json_object_get_double(value) : NAN;
}

START_TEST(the_sum_of_time_says_what_json_says)
{
    static const char *const lines[][2] = {
        {"data", "data_hours"},           {"tasks", "task_hours"},
        {"beam hours", "beam_hours"},     {"changes", "change_hours"},
        {"scheduled", "scheduled_hours"}, {"contingency", "contingency_hours"},
        {"asked", "asked_hours"},         {"available", "available_hours"}};
    struct made m = make(demos[_i]);
    json_object *root = NULL;
    (void)rows_of(&m, false, &root);
    int compared = 0;
    for (size_t i = 0; i < m.report.paper.count; i++) {
        const bh_paper_table *t = m.report.paper.blocks[i].table;
        if (!t || strcmp(t->columns[0].heading, "time") != 0)
            continue;
        for (size_t r = 0; r < t->row_count; r++)
            for (int l = 0; l < COUNT(lines); l++)
                if (strcmp(t->cells[3 * r], lines[l][0]) == 0) {
                    const double hours = total(root, lines[l][1]);
                    ck_assert_msg(fabs(atof(t->cells[3 * r + 1]) - hours) <= 0.00501, "%s: %s",
                                  lines[l][0], t->cells[3 * r + 1]);
                    compared++;
                }
    }
    ck_assert_int_ge(compared, 7);
    json_object_put(root);
    put_away(&m);
}
END_TEST

/* --- the formats against the paper --- */

/* The next cell of a body, unescaped, into `out`; NULL at the end. */
typedef const char *(*next_cell)(const char *s, char *out);

enum { ROOM = 4096 };

static void unescape(const char *from, size_t n, const char *const (*pairs)[2], char *out)
{
    size_t used = 0;
    for (size_t i = 0; i < n;) {
        int p = 0;
        while (pairs[p][0] && strncmp(from + i, pairs[p][0], strlen(pairs[p][0])) != 0)
            p++;
        const char *piece = pairs[p][0] ? pairs[p][1] : NULL;
        ck_assert_uint_lt(used + 8, ROOM);
        if (piece) {
            strcpy(out + used, piece);
            used += strlen(piece);
            i += strlen(pairs[p][0]);
        } else {
            out[used++] = from[i++];
        }
    }
    out[used] = '\0';
}

static const char *html_cell(const char *s, char *out)
{
    static const char *const pairs[][2] = {{"&lt;", "<"},
                                           {"&gt;", ">"},
                                           {"&amp;", "&"},
                                           {"&quot;", "\""},
                                           {"&#160;×&#160;10<sup>−", "E-"},
                                           {"&#160;×&#160;10<sup>", "E"},
                                           {"</sup>", ""},
                                           {NULL, NULL}};
    const char *td = strstr(s, "<td"), *th = strstr(s, "<th scope=\"row\"");
    const char *at = td && (!th || td < th) ? td : th;
    if (!at)
        return NULL;
    at = strchr(at, '>') + 1;
    const char *end = strstr(at, at > s && td && at > td && (!th || td < th) ? "</td>" : "</th>");
    unescape(at, (size_t)(end - at), pairs, out);
    return end;
}

/* Lines that begin with "| ", the one of headings and the one of dashes left out. */
static const char *md_cell(const char *s, char *out)
{
    static const char *const pairs[][2] = {{"\\\\", "\\"}, {"\\`", "`"}, {"\\*", "*"}, {"\\_", "_"},
                                           {"\\[", "["},   {"\\]", "]"}, {"\\<", "<"}, {"\\>", ">"},
                                           {"\\|", "|"},   {"\\#", "#"}, {"\\&", "&"}, {"\\~", "~"},
                                           {NULL, NULL}};
    while (strncmp(s, " |\n\n", 4) != 0 && strncmp(s, " |\n| ", 5) != 0 &&
           strncmp(s, " | ", 3) != 0)
        if (!*s++)
            return NULL;
    if (strncmp(s, " |\n\n", 4) == 0 || (strncmp(s, " |\n| -", 6) == 0 && strchr("-", s[6]))) {
        s = strstr(s + 3, "| --- |"); /* of the next table */
        if (!s)
            return NULL;
        s = strchr(s, '\n') - 2;
        return md_cell(s, out);
    }
    s += s[2] == '\n' ? 5 : 3;
    const char *end = s;
    while (strncmp(end, " |", 2) != 0)
        end++;
    unescape(s, (size_t)(end - s), pairs, out);
    return end;
}

static const char *tex_cell(const char *s, char *out)
{
    static const char *const pairs[][2] = {{"\\textbackslash{}", "\\"},
                                           {"\\textasciicircum{}", "^"},
                                           {"\\textasciitilde{}", "~"},
                                           {"\\textless{}", "<"},
                                           {"\\textgreater{}", ">"},
                                           {"\\textbar{}", "|"},
                                           {"\\ensuremath{\\pm}", "±"},
                                           {"\\ensuremath{^2}", "²"},
                                           {"\\num{", ""},
                                           {"\\{", "{"},
                                           {"\\}", "}"},
                                           {"\\$", "$"},
                                           {"\\&", "&"},
                                           {"\\#", "#"},
                                           {"\\%", "%"},
                                           {"\\_", "_"},
                                           {"\\textquotedbl{}", "\""},
                                           {"\\textasciigrave{}", "`"},
                                           {"'{}'{}", "''"},
                                           {"-{}-{}", "--"},
                                           {"{[}", "["},
                                           {"{]}", "]"},
                                           {"{*}", "*"},
                                           {"}", ""}, /* of \num */
                                           {NULL, NULL}};
    if (strncmp(s, " \\\\*\n", 5) == 0) { /* of a short table, which is not broken */
        s += 5;
    } else if (strncmp(s, " \\\\\n\\bottomrule", 14) == 0 ||
               strncmp(s, "\\documentclass", 14) == 0) {
        s = strstr(s, "\\endhead\n");
        if (!s)
            return NULL;
        s += strlen("\\endhead\n");
    } else {
        s += strncmp(s, " & ", 3) == 0 ? 3 : 4;
    }
    const char *end = s;
    while (strncmp(end, " & ", 3) != 0 && strncmp(end, " \\\\\n", 4) != 0 &&
           strncmp(end, " \\\\*\n", 5) != 0)
        end++;
    unescape(s, (size_t)(end - s), pairs, out);
    return end;
}

/* "1.2e+08" and "1.2e8" become "1.2E8". */
static const char *with_powers(const char *s, char *out)
{
    char *to = out;
    for (const char *c = s; *c; c++) {
        const size_t sign = strspn(c + 1, "+-");
        *to++ = *c;
        if (*c != 'e' || c == s || !isdigit((unsigned char)c[-1]) || sign > 1 ||
            !isdigit((unsigned char)c[1 + sign]))
            continue;
        to[-1] = 'E';
        if (c[1] == '-')
            *to++ = '-';
        c += sign;
        while (c[1] == '0')
            c++;
    }
    *to = '\0';
    return out;
}

/* "1.2e-08" becomes "1.2 × 10⁻⁸". */
static const char *with_raised(const char *s, char *out)
{
    static const char *const raised[] = {"⁰", "¹", "²", "³", "⁴", "⁵", "⁶", "⁷", "⁸", "⁹"};
    char powers[ROOM];
    const char *power = strchr(with_powers(s, powers), 'E');
    if (!power)
        return s;
    sprintf(out, "%.*s × 10%s", (int)(power - powers), powers, power[1] == '-' ? "⁻" : "");
    for (const char *c = power + 1 + (power[1] == '-'); *c; c++)
        strcat(out, raised[*c - '0']);
    return out;
}

static void compare_cells(const struct made *m, enum format format, next_cell next)
{
    bh_text text = write_as(m, format, BH_PAGE_A4);
    const char *at = format == MD ? strstr(text.bytes, "| --- |") : text.bytes;
    char got[ROOM], powers[2][ROOM];
    int compared = 0;
    if (format == MD)
        at = strchr(at, '\n') - 2;
    for (size_t i = 0; i < m->report.paper.count; i++) {
        const bh_paper_table *t = m->report.paper.blocks[i].table;
        for (size_t k = 0; t && k < t->row_count * t->column_count; k++) {
            at = next(at, got);
            ck_assert_ptr_nonnull(at);
            ck_assert_msg(
                strcmp(with_powers(got, powers[0]), with_powers(t->cells[k], powers[1])) == 0,
                "table %d: %s, not %s", m->report.paper.blocks[i].number, got, t->cells[k]);
            compared++;
        }
    }
    ck_assert_int_gt(compared, 150);
    ck_assert_ptr_null(next(at, got));
    bh_text_free(&text);
}

START_TEST(html_has_every_cell)
{
    struct made m = make(demos[_i]);
    compare_cells(&m, HTML, html_cell);
    put_away(&m);
}
END_TEST

START_TEST(markdown_has_every_cell)
{
    struct made m = make(demos[_i]);
    compare_cells(&m, MD, md_cell);
    put_away(&m);
}
END_TEST

START_TEST(latex_has_every_cell)
{
    struct made m = make(demos[_i]);
    compare_cells(&m, TEX, tex_cell);
    put_away(&m);
}
END_TEST

/* Poppler's text of the pages, or NULL where it is not installed. */
static char *pdf_text(const bh_text *pdf)
{
    char path[] = "/tmp/beamhours-test-XXXXXX", command[128];
    bh_text text = {0};
    const int file = mkstemp(path);
    ck_assert_int_ge(file, 0);
    ck_assert_int_eq(write(file, pdf->bytes, pdf->length), (ssize_t)pdf->length);
    close(file);
    (void)snprintf(command, sizeof command, "pdftotext -layout %s - 2>/dev/null", path);
    FILE *from = popen(command, "r");
    ck_assert_ptr_nonnull(from);
    ck_assert(!bh_file_read_stream(from, "pdftotext", 1 << 22, &text, NULL));
    pclose(from);
    unlink(path);
    return bh_text_take(&text);
}

/* All numbers, in the order of the rows. */
START_TEST(pdf_has_every_number)
{
    struct made m = make(demos[_i]);
    bh_text pdf = write_as(&m, PDF, _i % 2 ? BH_PAGE_LETTER : BH_PAGE_A4);
    char *text = pdf_text(&pdf);
    const char *at = text;
    if (!text || !text[0])
        puts("report/report: no pdftotext: the text of the PDF is not read back");
    for (size_t i = 0; text && text[0] && i < m.report.paper.count; i++) {
        const bh_paper_table *t = m.report.paper.blocks[i].table;
        for (size_t k = 0; t && k < t->row_count * t->column_count; k++) {
            if (!t->columns[k % t->column_count].number)
                continue;
            char raised[ROOM];
            const char *cell = with_raised(t->cells[k], raised);
            at = strstr(at, cell);
            ck_assert_msg(at != NULL, "table %d: no %s", m.report.paper.blocks[i].number, cell);
            at += strlen(cell);
        }
    }
    free(text);
    bh_text_free(&pdf);
    put_away(&m);
}
END_TEST

/* --- what pages must be --- */

START_TEST(bytes_are_the_same_twice)
{
    struct made a = make(demos[_i]), b = make(demos[_i]);
    for (int f = 0; f < FORMATS; f++) {
        bh_text one = write_as(&a, (enum format)f, BH_PAGE_A4);
        bh_text two = write_as(&b, (enum format)f, BH_PAGE_A4);
        ck_assert_uint_eq(one.length, two.length);
        ck_assert_int_eq(memcmp(one.bytes, two.bytes, one.length), 0);
        bh_text_free(&one);
        bh_text_free(&two);
    }
    put_away(&a);
    put_away(&b);
}
END_TEST

static int occurrences(const char *text, const char *word)
{
    int n = 0;
    for (const char *s = text; (s = strstr(s, word)); s += strlen(word))
        n++;
    return n;
}

START_TEST(html_is_for_everybody)
{
    struct made m = make(demos[_i]);
    bh_text html = write_as(&m, HTML, BH_PAGE_A4);
    int tables = 0, figures = 0;
    for (size_t i = 0; i < m.report.paper.count; i++) {
        tables += m.report.paper.blocks[i].kind == BH_BLOCK_TABLE;
        figures += m.report.paper.blocks[i].kind == BH_BLOCK_FIGURE;
    }
    ck_assert_int_ge(tables, 12);
    ck_assert_int_ge(figures, 1);
    ck_assert_int_eq(occurrences(html.bytes, "<caption>"), tables);
    ck_assert_int_eq(occurrences(html.bytes, "<figcaption>"), figures);
    ck_assert_int_eq(occurrences(html.bytes, "role=\"img\""), figures);
    ck_assert_int_eq(occurrences(html.bytes, "<desc "), figures);
    static const char *const once[] = {
        "<html lang=\"en\">", "<h1>",     "<header>", "<nav ", "<main>",
        "<footer>",           "<script>", "<title>"};
    for (int i = 0; i < COUNT(once); i++)
        ck_assert_msg(occurrences(html.bytes, once[i]) == 1, "%s", once[i]);
    ck_assert_int_eq(occurrences(html.bytes, "<section "), occurrences(html.bytes, "</section>"));
    static const char *const fetched[] = {"src=",     "@import", "<link",
                                          "url(http", "fetch(",  "<iframe"};
    for (int i = 0; i < COUNT(fetched); i++)
        ck_assert_msg(!strstr(html.bytes, fetched[i]), "%s", fetched[i]);
    ck_assert_uint_lt(html.length, 2u << 20);
    bh_text_free(&html);
    put_away(&m);
}
END_TEST

/* Every section that a committee asks for; a number's column has a unit; a model a source. */
START_TEST(nothing_is_missing)
{
    static const char *const sections[] = {"Summary",
                                           "Kinematics",
                                           "Rates",
                                           "Backgrounds",
                                           "Beam time",
                                           "Uncertainties",
                                           "Sensitivities",
                                           "What if",
                                           "Figures",
                                           "Beam and radiation inputs",
                                           "Assumptions and defaults",
                                           "Models",
                                           "References",
                                           "Cautions and warnings",
                                           "How to make this report again"};
    struct made m = make(demos[_i]);
    int n = 0;
    for (size_t i = 0; i < m.report.paper.count; i++) {
        const bh_block *b = &m.report.paper.blocks[i];
        if (b->kind == BH_BLOCK_SECTION)
            ck_assert_str_eq(b->text, sections[n++]);
        if (b->kind != BH_BLOCK_TABLE)
            continue;
        for (size_t c = 0; c < b->table->column_count; c++)
            ck_assert(!b->table->columns[c].number || b->table->columns[c].unit[0] ||
                      strcmp(b->table->columns[c].heading, "bin") == 0);
        if (strcmp(b->table->columns[0].heading, "model or formula") == 0)
            for (size_t r = 0; r < b->table->row_count; r++)
                ck_assert_int_eq(b->table->cells[4 * r + 3][0], '[');
    }
    ck_assert_int_eq(n, COUNT(sections));
    put_away(&m);
}
END_TEST

/* What a plan's words may hold stays words in every format. */
START_TEST(odd_words_are_only_words)
{
    struct made m =
        make_from("plan: 1\ntitle: '<b>A & \"B\"</b> 100 % $x_1^2$ \\end{document} | `c` ±1 µm'\n"
                  "beam: {particle: electron, kinetic_energy: 400 MeV, current: 10 uA}\n"
                  "target:\n  name: foil\n  layers: [{material: carbon-12, thickness: 1 mm}]\n"
                  "arms: [{name: A, solid_angle: 2 msr}]\n"
                  "settings: [{name: K_1, angle: 30 deg, time: 2 h}]\n");
    bh_text html = write_as(&m, HTML, BH_PAGE_LETTER), tex = write_as(&m, TEX, BH_PAGE_LETTER);
    bh_text md = write_as(&m, MD, BH_PAGE_A4), pdf = write_as(&m, PDF, BH_PAGE_LETTER);
    ck_assert_ptr_nonnull(strstr(html.bytes, "<h1>&lt;b&gt;A &amp; &quot;B&quot;&lt;/b&gt;"));
    ck_assert_ptr_nonnull(strstr(html.bytes, "size:letter"));
    ck_assert_ptr_nonnull(strstr(tex.bytes, "\\$x\\_1\\textasciicircum{}2\\$"));
    ck_assert_int_eq(occurrences(tex.bytes, "\\end{document}"), 1);
    ck_assert_ptr_nonnull(strstr(tex.bytes, "letterpaper"));
    ck_assert_ptr_nonnull(strstr(tex.bytes, "K\\_1"));
    ck_assert_ptr_nonnull(strstr(md.bytes, "\\<b\\>A \\& "));
    ck_assert_int_eq(memcmp(pdf.bytes, "%PDF-", 5), 0);
    bh_text_free(&html);
    bh_text_free(&tex);
    bh_text_free(&md);
    bh_text_free(&pdf);
    put_away(&m);
}
END_TEST

START_TEST(a_fragment_has_no_document_around_it)
{
    struct made m = make(demos[0]);
    bh_text tex = {0};
    ck_assert(!bh_paper_latex(&m.report.paper, &(bh_latex_form){.fragment = true}, &tex, NULL));
    ck_assert_ptr_null(strstr(tex.bytes, "\\documentclass"));
    ck_assert_ptr_null(strstr(tex.bytes, "{document}"));
    ck_assert_ptr_nonnull(strstr(tex.bytes, "% \\usepackage{siunitx}\n"));
    ck_assert_ptr_nonnull(strstr(tex.bytes, "\\si{\\mega\\electronvolt\\per\\bhlight}"));
    bh_text_free(&tex);
    put_away(&m);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("report");
    tcase_set_timeout(tests, 120);
    tcase_add_loop_test(tests, tables_of_rows_say_what_json_says, 0, COUNT(demos));
    tcase_add_loop_test(tests, the_table_of_bins_says_what_json_says, 0, COUNT(demos));
    tcase_add_loop_test(tests, the_sum_of_time_says_what_json_says, 0, COUNT(demos));
    tcase_add_loop_test(tests, html_has_every_cell, 0, COUNT(demos));
    tcase_add_loop_test(tests, markdown_has_every_cell, 0, COUNT(demos));
    tcase_add_loop_test(tests, latex_has_every_cell, 0, COUNT(demos));
    tcase_add_loop_test(tests, pdf_has_every_number, 0, COUNT(demos));
    tcase_add_loop_test(tests, bytes_are_the_same_twice, 0, COUNT(demos));
    tcase_add_loop_test(tests, html_is_for_everybody, 0, COUNT(demos));
    tcase_add_loop_test(tests, nothing_is_missing, 0, COUNT(demos));
    tcase_add_test(tests, odd_words_are_only_words);
    tcase_add_test(tests, a_fragment_has_no_document_around_it);
    return run_suite("report/report", tests);
}
