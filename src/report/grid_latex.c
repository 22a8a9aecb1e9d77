/* grid_latex.c - a longtable with the S columns of siunitx. */
#include "beamhours/report/grid.h"

#include <string.h>

#include "beamhours/base/number.h"
#include "beamhours/report/latex.h"

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
            bh_latex_unit(out, grid->columns[c].unit);
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
