/* paper_latex.c - sections, longtables and lists; numbers and units through siunitx. */
#include "beamhours/report/paper.h"

#include <math.h>
#include <string.h>

#include "beamhours/base/number.h"
#include "beamhours/report/latex.h"

static void within(const char *before, const char *text, const char *behind, bh_text *out)
{
    bh_text_append(out, before);
    bh_latex_words(out, text);
    bh_text_append(out, behind);
}

static bool whole_number(const char *s)
{
    const char *end = NULL;
    double value = 0.0;
    return !bh_number_parse(s, &end, &value) && *end == '\0';
}

static void cell(const bh_paper_column *c, const char *text, bh_text *out)
{
    if (c->number && whole_number(text))
        bh_text_appendf(out, "\\num{%s}", text);
    else
        bh_latex_words(out, text);
}

static void heading_row(const bh_paper_table *t, bool of_units, bh_text *out)
{
    for (size_t c = 0; c < t->column_count; c++) {
        bh_text_append(out, c ? " & " : "");
        if (!of_units)
            within("{", t->columns[c].heading, "}", out);
        else if (t->columns[c].unit[0]) {
            bh_text_append(out, "{");
            bh_latex_unit(out, t->columns[c].unit);
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
            bh_text_append(out, c ? " & " : "");
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
        within("\\item ", b->text, "\n", out);
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
    if (fragment) {
        bh_latex_needs(out);
        return;
    }
    bh_text_appendf(out, "\\documentclass[%s]{article}\n",
                    page == BH_PAGE_A4 ? "a4paper" : "letterpaper");
    bh_latex_packages(out, "");
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
