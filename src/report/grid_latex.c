/* grid_latex.c - a longtable; in commands that versions 2 and 3 of siunitx know: units that version
 * 3 no longer has are declared. */
#include "beamhours/report/grid.h"

#include <string.h>

#include "beamhours/base/number.h"

void bh_latex_needs(bh_text *out)
{
    static const char *const lines[] = {"To be read with \\input; the preamble needs:",
                                        "\\usepackage[utf8]{inputenc}",
                                        "\\usepackage[T1]{fontenc}",
                                        "\\usepackage{booktabs}",
                                        "\\usepackage{longtable}",
                                        "\\usepackage{siunitx}",
                                        "\\DeclareSIUnit\\bhbarn{b}",
                                        "\\DeclareSIUnit\\bhlight{\\ensuremath{c}}",
                                        "\\DeclareSIUnit\\bhhour{h}"};
    for (size_t i = 0; i < sizeof lines / sizeof lines[0]; i++)
        bh_text_appendf(out, "%% %s\n", lines[i]);
}

/* --- words --- */

static const struct {
    const char *read, *written;
} signs[] = {{"\\", "\\textbackslash{}"},
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
             {"\"", "\\textquotedbl{}"},
             {"`", "\\textasciigrave{}"},
             {"''", "'{}'{}"},
             {"--", "-{}-{}"},
             {"[", "{[}"}, /* behind a line's end it would be a length */
             {"]", "{]}"},
             {"*", "{*}"},
             {"\n", " "},
             {"\r", " "},
             {"±", "\\ensuremath{\\pm}"},
             {"×", "\\ensuremath{\\times}"},
             {"²", "\\ensuremath{^2}"},
             {"µ", "\\ensuremath{\\mu}"}};

void bh_latex_words(bh_text *out, const char *words)
{
    const size_t count = sizeof signs / sizeof signs[0];
    while (*words) {
        size_t i = 0;
        while (i < count && strncmp(words, signs[i].read, strlen(signs[i].read)) != 0)
            i++;
        if (i < count)
            bh_text_append(out, signs[i].written);
        else
            bh_text_append_bytes(out, words, 1);
        words += i < count ? strlen(signs[i].read) : 1;
    }
}

/* --- units --- */

static const struct {
    const char *word, *macro;
} units[] = {{"MeV", "\\mega\\electronvolt"},
             {"GeV", "\\giga\\electronvolt"},
             {"GeV2", "\\giga\\electronvolt\\squared"},
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
             {"cm2", "\\centi\\metre\\squared"},
             {"s", "\\second"},
             {"h", "\\bhhour"},
             {"Hz", "\\hertz"},
             {"mC", "\\milli\\coulomb"},
             {"%", "\\percent"}};

static const char *macro_of(const char *word, size_t length)
{
    for (size_t i = 0; i < sizeof units / sizeof units[0]; i++)
        if (strlen(units[i].word) == length && strncmp(units[i].word, word, length) == 0)
            return units[i].macro;
    return NULL;
}

/* "1/cm2/s" as \si{\per\centi\metre\squared\per\second}; what is no such unit as it stands. */
static void unit(const char *word, bh_text *out)
{
    bh_text macros = {0};
    bool known = true;
    for (const char *at = word; known && *at;) {
        const size_t length = strcspn(at, "/");
        const char *macro = macro_of(at, length);
        if (macro)
            bh_text_appendf(&macros, "%s%s", at > word ? "\\per" : "", macro);
        else
            known = at == word && length == 1 && *at == '1' && at[1];
        at += length + (at[length] == '/');
    }
    if (known && macros.bytes)
        bh_text_appendf(out, "\\si{%s}", macros.bytes);
    else
        bh_latex_words(out, word);
    out->failed |= macros.failed;
    bh_text_free(&macros);
}

/* --- the table --- */

static bool is_number(const char *text)
{
    const char *end = NULL;
    double value = 0.0;
    return !bh_number_parse(text, &end, &value) && *end == '\0';
}

/* In a column of numbers whatever is none stands in braces. */
static void cell(const bh_grid_column *column, const char *text, bh_text *out)
{
    if (!column->number) {
        bh_latex_words(out, text);
    } else if (is_number(text)) {
        bh_text_append(out, text);
    } else {
        bh_text_append(out, "{");
        bh_latex_words(out, text);
        bh_text_append(out, "}");
    }
}

static void headings(const bh_grid *grid, bool of_units, bh_text *out)
{
    for (size_t c = 0; c < grid->column_count; c++) {
        bh_text_append(out, c ? " & {" : "{");
        if (of_units)
            unit(grid->columns[c].unit, out);
        else
            bh_latex_words(out, grid->columns[c].heading);
        bh_text_append(out, "}");
    }
    bh_text_append(out, " \\\\\n");
}

void bh_grid_latex(const bh_grid *grid, bh_text *out)
{
    out->failed |= grid->cells.failed;
    if (out->failed || grid->column_count == 0)
        return;
    bh_text_append(out, "{\\footnotesize\\setlength{\\tabcolsep}{4pt}\n\\begin{longtable}{");
    for (size_t c = 0; c < grid->column_count; c++)
        bh_text_append(out, grid->columns[c].number ? "S" : "l");
    bh_text_append(out, "}\n\\toprule\n");
    headings(grid, false, out);
    headings(grid, true, out);
    bh_text_append(out, "\\midrule\n\\endhead\n\\bottomrule\n\\endfoot\n");
    const char *text = grid->cells.bytes;
    for (size_t i = 0; i < grid->cell_count; i++) {
        const size_t c = i % grid->column_count;
        bh_text_append(out, c ? " & " : "");
        cell(&grid->columns[c], text, out);
        if (c + 1 == grid->column_count)
            bh_text_append(out, " \\\\\n");
        text += strlen(text) + 1;
    }
    bh_text_append(out, "\\end{longtable}}\n");
}
