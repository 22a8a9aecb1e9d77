/* paper_latex.c - LaTeX with booktabs, longtable and siunitx, in commands that versions 2 and 3 of
 * it know; units that version 3 no longer has are declared. */
#include "beamhours/report/paper.h"

#include <math.h>
#include <string.h>

#include "beamhours/base/number.h"

/* What a committee's own document needs, too. */
static const char *const needs[] = {"\\usepackage[utf8]{inputenc}",
                                    "\\usepackage[T1]{fontenc}",
                                    "\\usepackage{booktabs}",
                                    "\\usepackage{longtable}",
                                    "\\usepackage{siunitx}",
                                    "\\DeclareSIUnit\\bhbarn{b}",
                                    "\\DeclareSIUnit\\bhlight{\\ensuremath{c}}",
                                    "\\DeclareSIUnit\\bhhour{h}",
                                    "\\DeclareSIUnit\\bhday{d}",
                                    "\\DeclareSIUnit\\bhweek{weeks}",
                                    "\\DeclareSIUnit\\bhshift{shifts}"};

static const struct {
    const char *read, *written;
} letters[] = {
    {"\\", "\\textbackslash{}"},
    {"{", "\\{"},
    {"}", "\\}"},
    {"$", "\\$"},
    {"&", "\\&"},
    {"#", "\\#"},
    {"%", "\\%"},
    {"_", "\\_"},
    {"^", "\\textasciicircum{}"},
    {"~", "\\textasciitilde{}"},
    {"<", "\\textless{}"},
    {">", "\\textgreater{}"},
    {"|", "\\textbar{}"},
    {"\"", "''"},
    {"±", "\\ensuremath{\\pm}"},
    {"²", "\\ensuremath{^2}"},
    {"µ", "\\ensuremath{\\mu}"},
    {"θ", "\\ensuremath{\\theta}"},
    {"σ", "\\ensuremath{\\sigma}"},
    {"×", "\\ensuremath{\\times}"},
};

enum { LETTERS = sizeof letters / sizeof letters[0] };

static void escaped(const char *s, bh_text *out)
{
    while (*s) {
        size_t i = 0;
        while (i < LETTERS && strncmp(s, letters[i].read, strlen(letters[i].read)) != 0)
            i++;
        if (i < LETTERS) {
            bh_text_append(out, letters[i].written);
            s += strlen(letters[i].read);
        } else {
            bh_text_append_bytes(out, *s == '\n' ? " " : s, 1);
            s++;
        }
    }
}

static void within(const char *before, const char *text, const char *behind, bh_text *out)
{
    bh_text_append(out, before);
    escaped(text, out);
    bh_text_append(out, behind);
}

/* --- units --- */

static const struct {
    const char *word, *macro;
} units[] = {
    {"MeV", "\\mega\\electronvolt"},
    {"GeV", "\\giga\\electronvolt"},
    {"keV", "\\kilo\\electronvolt"},
    {"c", "\\bhlight"},
    {"b", "\\bhbarn"},
    {"mb", "\\milli\\bhbarn"},
    {"ub", "\\micro\\bhbarn"},
    {"nb", "\\nano\\bhbarn"},
    {"pb", "\\pico\\bhbarn"},
    {"fb", "\\femto\\bhbarn"},
    {"sr", "\\steradian"},
    {"msr", "\\milli\\steradian"},
    {"deg", "\\degree"},
    {"fm", "\\femto\\metre"},
    {"cm", "\\centi\\metre"},
    {"s", "\\second"},
    {"h", "\\bhhour"},
    {"d", "\\bhday"},
    {"weeks", "\\bhweek"},
    {"shifts", "\\bhshift"},
    {"Hz", "\\hertz"},
    {"mC", "\\milli\\coulomb"},
    {"uA", "\\micro\\ampere"},
    {"W", "\\watt"},
    {"mg", "\\milli\\gram"},
    {"g", "\\gram"},
    {"%", "\\percent"},
    {"mm", "\\milli\\metre"},
};

/* The macro of a word of `length` bytes, or NULL. */
static const char *macro_of(const char *word, size_t length)
{
    for (size_t i = 0; i < sizeof units / sizeof units[0]; i++)
        if (strlen(units[i].word) == length && strncmp(units[i].word, word, length) == 0)
            return units[i].macro;
    return NULL;
}

/* "cm2" or "cm": the macro of the word and its power; false for a word that is none. */
static bool append_unit(const char *word, size_t length, bool per, bh_text *out)
{
    const char *last = length > 1 ? &word[length - 1] : "";
    const char *power = *last == '2' ? "\\squared" : *last == '3' ? "\\cubed" : "";
    const char *macro = macro_of(word, length - (power[0] != '\0'));
    if (!macro)
        return false;
    bh_text_appendf(out, "%s%s%s", per ? "\\per" : "", macro, power);
    return true;
}

/* "1/cm2/s" as \si{\per\centi\metre\squared\per\second}; what is no such unit as it stands. */
static void unit(const char *s, bh_text *out)
{
    bh_text macros = {0};
    bool known = true, per = false;
    const char *at = s;
    while (known && *at) {
        const size_t n = strcspn(at, "/");
        if (per || n != 1 || at[0] != '1')
            known = append_unit(at, n, per, &macros);
        per = true;
        at += n + (at[n] == '/');
    }
    if (known && macros.bytes)
        bh_text_appendf(out, "\\si{%s}", macros.bytes);
    else
        escaped(s, out);
    out->failed |= macros.failed;
    bh_text_free(&macros);
}

/* --- blocks --- */

static bool whole_number(const char *s)
{
    const char *end = NULL;
    double value = 0.0;
    return !bh_number_parse(s, &end, &value) && *end == '\0';
}

/* Behind the end of a row and an item a bracket or a star would be read as something else. */
static const char *opening(const char *text)
{
    return text[0] == '[' || text[0] == '*' ? "{}" : "";
}

static void cell(const bh_paper_column *c, const char *text, bh_text *out)
{
    if (c->number && whole_number(text))
        bh_text_appendf(out, "\\num{%s}", text);
    else
        escaped(text, out);
}

static void heading_row(const bh_paper_table *t, bool of_units, bh_text *out)
{
    for (size_t c = 0; c < t->column_count; c++) {
        bh_text_append(out, c ? " & " : "");
        if (!of_units)
            within("{", t->columns[c].heading, "}", out);
        else if (t->columns[c].unit[0]) {
            bh_text_append(out, "{");
            unit(t->columns[c].unit, out);
            bh_text_append(out, "}");
        }
    }
    bh_text_append(out, " \\\\\n");
}

static bool has_units(const bh_paper_table *t)
{
    for (size_t c = 0; c < t->column_count; c++)
        if (t->columns[c].unit[0])
            return true;
    return false;
}

static size_t longest(const bh_paper_table *t, size_t column)
{
    size_t most = strlen(t->columns[column].heading);
    for (size_t r = 0; r < t->row_count; r++) {
        const size_t n = strlen(t->cells[r * t->column_count + column]);
        most = n > most ? n : most;
    }
    return most;
}

enum { SENTENCE = 28, PAGE = 88, LEAST = 10 }; /* letters */

static bool is_sentence(const bh_paper_table *t, size_t column)
{
    return !t->columns[column].number && longest(t, column) > SENTENCE;
}

/* Columns of sentences share what the others leave of the page. */
static void columns(const bh_paper_table *t, bh_text *out)
{
    size_t taken = 0, sentences = 0;
    for (size_t c = 0; c < t->column_count; c++)
        if (is_sentence(t, c))
            sentences += longest(t, c);
        else
            taken += longest(t, c) + 2;
    const double left = taken + LEAST + LEAST < PAGE ? (double)(PAGE - taken) / PAGE : 0.25;
    for (size_t c = 0; c < t->column_count; c++) {
        if (!is_sentence(t, c)) {
            bh_text_append(out, t->columns[c].number ? "r" : "l");
            continue;
        }
        const double share = 0.95 * left * (double)longest(t, c) / (double)sentences;
        bh_text_appendf(out, "p{%.2f\\linewidth}", fmax(share, (double)LEAST / 100.0));
    }
}

static void table(const bh_block *b, bh_text *out)
{
    const bh_paper_table *t = b->table;
    const char *size = t->column_count > 9   ? "\\tiny"
                       : t->column_count > 6 ? "\\scriptsize"
                                             : "\\footnotesize";
    bh_text_appendf(out, "{%s\\setlength{\\tabcolsep}{3pt}\n\\begin{longtable}{", size);
    columns(t, out);
    within("}\n\\caption{", b->text, "} \\\\\n\\toprule\n", out);
    heading_row(t, false, out);
    if (has_units(t))
        heading_row(t, true, out);
    bh_text_append(out, "\\midrule\n\\endhead\n");
    for (size_t r = 0; r < t->row_count; r++) {
        for (size_t c = 0; c < t->column_count; c++) {
            bh_text_append(out, c ? " & " : opening(t->cells[r * t->column_count]));
            cell(&t->columns[c], t->cells[r * t->column_count + c], out);
        }
        bh_text_append(out, " \\\\\n");
    }
    bh_text_append(out, "\\bottomrule\n\\end{longtable}}\n\n");
}

/* A .tex file holds no drawing: what is on it is said. */
static void figure(const bh_block *b, bh_text *out)
{
    bh_text_appendf(out, "\\paragraph{Figure %d.} ", b->number);
    within("", b->text, ". ", out);
    within("", b->figure->description, "\n\n", out);
}

static void list_edges(const bh_paper *paper, size_t i, bool before, bh_text *out)
{
    const bh_block_kind kind = paper->blocks[i].kind;
    const bool edge = before ? i == 0 || paper->blocks[i - 1].kind != kind
                             : i + 1 == paper->count || paper->blocks[i + 1].kind != kind;
    const char *name = kind == BH_BLOCK_ITEM ? "itemize" : "enumerate";
    if (edge && (kind == BH_BLOCK_ITEM || kind == BH_BLOCK_REFERENCE))
        bh_text_appendf(out, "\\%s{%s}\n%s", before ? "begin" : "end", name, before ? "" : "\n");
}

static void block(const bh_block *b, bh_text *out)
{
    switch (b->kind) {
    case BH_BLOCK_SECTION:
        within("\\section{", b->text, "}\n\n", out);
        break;
    case BH_BLOCK_WORDS:
        within("", b->text, "\n\n", out);
        break;
    case BH_BLOCK_ITEM:
    case BH_BLOCK_REFERENCE:
        bh_text_appendf(out, "\\item %s", opening(b->text));
        within("", b->text, "\n", out);
        break;
    case BH_BLOCK_CAUTION:
        within("\\begin{quote}\\textbf{Caution.} ", b->text, "\\end{quote}\n\n", out);
        break;
    case BH_BLOCK_TABLE:
        table(b, out);
        break;
    case BH_BLOCK_FIGURE:
        figure(b, out);
        break;
    }
}

static void preamble(const bh_paper *paper, bh_page page, bool fragment, bh_text *out)
{
    if (fragment)
        bh_text_append(out, "% To be read with \\input; the preamble needs:\n");
    else
        bh_text_appendf(out, "\\documentclass[%s]{article}\n",
                        page == BH_PAGE_A4 ? "a4paper" : "letterpaper");
    for (size_t i = 0; i < sizeof needs / sizeof needs[0]; i++)
        bh_text_appendf(out, "%s%s\n", fragment ? "% " : "", needs[i]);
    if (fragment)
        return;
    bh_text_append(out, "\\usepackage[margin=20mm]{geometry}\n\\setlength{\\parindent}{0pt}\n"
                        "\\setlength{\\parskip}{4pt}\n\\sloppy\n");
    within("\\title{", paper->title, "}\n\\author{}\n\\date{}\n", out);
    bh_text_append(out, "\\begin{document}\n\\maketitle\n");
}

bh_code bh_paper_latex(const bh_paper *paper, bh_page page, bool fragment, bh_text *out,
                       bh_error *err)
{
    preamble(paper, page, fragment, out);
    for (size_t i = 0; i < paper->count; i++) {
        list_edges(paper, i, true, out);
        block(&paper->blocks[i], out);
        list_edges(paper, i, false, out);
    }
    if (!fragment)
        bh_text_append(out, "\\end{document}\n");
    return out->failed ? bh_fail(err, BH_ENOMEM, "%s", bh_code_text(BH_ENOMEM)) : BH_OK;
}
