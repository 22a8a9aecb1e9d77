/* paper_latex.c - sections, longtables and lists; numbers and units through siunitx. */
#include "beamhours/report/paper.h"

#include <math.h>
#include <string.h>

#include "beamhours/base/number.h"
#include "beamhours/report/latex.h"
#include "beamhours/report/power.h"

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

static void words_part(const char *text, size_t length, bh_text *out)
{
    bh_text part = {0};
    bh_text_append_bytes(&part, text, length);
    bh_latex_words(out, part.bytes ? part.bytes : "");
    out->failed |= part.failed;
    bh_text_free(&part);
}

static void power_of_ten(const char *factor, size_t length, int power, bh_text *out)
{
    bh_text_append(out, "\\num{");
    bh_text_append_bytes(out, factor, length);
    bh_text_appendf(out, "e%d}", power);
}

static void cell(const bh_paper_column *c, const char *text, bh_text *out)
{
    static const bh_power_style style = {words_part, power_of_ten};
    if (c->number && whole_number(text))
        bh_text_appendf(out, "\\num{%s}", text);
    else
        bh_power_set(text, &style, out);
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

enum { SENTENCE = 28, LEAST = 10 }; /* letters */
enum { WHOLE = 16 };                /* rows of a table that is not broken over pages */

/* The longest word of a column, which is not broken. */
static size_t longest_word(const bh_paper_table *t, size_t column)
{
    size_t most = LEAST;
    for (size_t r = 0; r < t->row_count; r++)
        for (const char *at = t->cells[r * t->column_count + column]; *at;) {
            const size_t n = strcspn(at, " ");
            most = n > most ? n : most;
            at += n + (at[n] == ' ');
        }
    return most;
}

static bool is_sentence(const bh_paper_table *t, size_t column)
{
    return !t->columns[column].number && longest(t, column) > SENTENCE;
}

/* Letters of the columns of numbers and short words. */
static size_t taken(const bh_paper_table *t)
{
    size_t sum = 0;
    for (size_t c = 0; c < t->column_count; c++)
        sum += is_sentence(t, c) ? 0 : longest(t, c);
    return sum;
}

/* [pt] of a column of sentences that should be no wider than `most`: a little more than of digits,
 * and never less than its longest word. */
static double sentence_wide(const bh_paper_table *t, size_t column, const bh_latex_size *size,
                            double most)
{
    const double letter = 1.1 * size->letter;
    return fmax(fmin(letter * (double)longest(t, column), most),
                letter * (double)longest_word(t, column));
}

static double sentences_wide(const bh_paper_table *t, const bh_latex_size *size, double most)
{
    double sum = 0.0;
    for (size_t c = 0; c < t->column_count; c++)
        sum += is_sentence(t, c) ? sentence_wide(t, c, size, most) : 0.0;
    return sum;
}

static const bh_latex_size *size_of(const bh_paper_table *t)
{
    size_t letters = taken(t);
    for (size_t c = 0; c < t->column_count; c++)
        letters += is_sentence(t, c) ? LEAST + longest_word(t, c) : 0;
    return bh_latex_fit(letters, t->column_count);
}

/* The widest columns of sentences give way until the table fits. */
static void columns(const bh_paper_table *t, const bh_latex_size *size, bh_text *out)
{
    enum { HALVINGS = 20 };
    const double others = size->letter * (double)taken(t) + size->gap * (double)t->column_count;
    const double left = fmax(BH_LATEX_PAGE - others, 0.25 * BH_LATEX_PAGE);
    double low = LEAST * size->letter, most = BH_LATEX_PAGE;
    for (int i = 0; i < HALVINGS && sentences_wide(t, size, BH_LATEX_PAGE) > left; i++) {
        const double middle = 0.5 * (low + most);
        if (sentences_wide(t, size, middle) > left)
            most = middle;
        else
            low = middle;
    }
    for (size_t c = 0; c < t->column_count; c++)
        if (is_sentence(t, c))
            bh_text_appendf(out, ">{\\raggedright\\arraybackslash}p{%.0fpt}",
                            sentence_wide(t, c, size, most));
        else
            bh_text_append(out, t->columns[c].number ? "r" : "l");
}

static void table(const bh_block *b, bh_text *out)
{
    const bh_paper_table *t = b->table;
    const bh_latex_size *size = size_of(t);
    const char *end = t->row_count <= WHOLE ? " \\\\*\n" : " \\\\\n";
    bh_text_appendf(out,
                    "{%s\\setlength{\\tabcolsep}{%gpt}\\setlength{\\LTcapwidth}{\\linewidth}\n"
                    "\\begin{longtable}{",
                    size->name, size->gap / 2.0);
    columns(t, size, out);
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
        bh_text_append(out, r + 1 < t->row_count ? end : " \\\\\n");
    }
    bh_text_append(out, "\\bottomrule\n\\end{longtable}}\n\n");
}

/* The drawing is a file of its own. */
static void figure(const bh_block *b, const char *figures, bh_text *out)
{
    if (!figures) {
        bh_text_appendf(out, "\\paragraph{Figure %d.} ", b->number);
        within("", b->text, ". ", out);
        within("", b->figure->description, "\n\n", out);
        return;
    }
    bh_text_appendf(out,
                    "\\noindent\\begin{minipage}{\\linewidth}\n\\centering\n"
                    "\\includegraphics[width=0.85\\linewidth]{%s-%d.pdf}\\par\n"
                    "\\refstepcounter{figure}",
                    figures, b->number);
    within("{\\raggedright\\small Figure~\\thefigure: ", b->text,
           ".\\par}\n\\end{minipage}\\par\\bigskip\n\n", out);
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

static void block(const bh_block *b, const char *figures, bh_text *out)
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
        figure(b, figures, out);
        break;
    }
}

static void preamble(const bh_paper *paper, const bh_latex_form *form, bh_text *out)
{
    static const char drawn[] = "\\usepackage{array,graphicx}\n";
    if (form->fragment) {
        bh_latex_needs(out);
        bh_text_appendf(out, "%% %s", drawn);
        if (form->figures)
            bh_text_appendf(
                out,
                "%% Figures are in %s-1.pdf and so on; \\graphicspath says where, if not "
                "beside the main file.\n",
                form->figures);
        return;
    }
    bh_text_appendf(out, "\\documentclass[%s]{article}\n",
                    form->page == BH_PAGE_A4 ? "a4paper" : "letterpaper");
    bh_latex_packages(out, "");
    bh_text_appendf(out,
                    "%s\\usepackage[margin=20mm]{geometry}\n\\setlength{\\parindent}{0pt}\n"
                    "\\setlength{\\parskip}{4pt}\n\\sloppy\n\\begin{document}\n",
                    drawn);
    within("{\\LARGE\\bfseries\\raggedright ", paper->title, "\\par}\n\n", out);
}

bh_code bh_paper_latex(const bh_paper *paper, const bh_latex_form *form, bh_text *out,
                       bh_error *err)
{
    preamble(paper, form, out);
    for (size_t i = 0; i < paper->count; i++) {
        list_edges(paper, i, true, out);
        block(&paper->blocks[i], form->figures, out);
        list_edges(paper, i, false, out);
    }
    if (!form->fragment)
        bh_text_append(out, "\\end{document}\n");
    return out->failed ? bh_fail(err, BH_ENOMEM, "%s", bh_code_text(BH_ENOMEM)) : BH_OK;
}
