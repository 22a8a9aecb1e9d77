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

/* How far the numbers of a column reach: what siunitx needs to line them up in no more room. */
struct reach {
    size_t sign, before, behind, power; /* letters */
    size_t words;                       /* of the longest cell that is no number, or heading */
};

static void measure(const char *text, struct reach *r)
{
    if (!is_number(text)) {
        r->words = strlen(text) > r->words ? strlen(text) : r->words;
        return;
    }
    const char *digits = text + (*text == '-' || *text == '+'), *power = strpbrk(text, "eE");
    const size_t before = strspn(digits, "0123456789");
    const size_t behind = digits[before] == '.' ? strspn(digits + before + 1, "0123456789") : 0;
    const size_t raised = power ? strlen(power + 1) - (power[1] == '+') : 0;
    r->sign = digits > text ? 1 : r->sign;
    r->before = before > r->before ? before : r->before;
    r->behind = behind > r->behind ? behind : r->behind;
    r->power = raised > r->power ? raised : r->power;
}

static size_t letters_of(const struct reach *r)
{
    size_t n = r->sign + r->before + r->before / 4; /* with the gaps between thousands */
    n += r->behind ? r->behind + 1 : 0;
    n += r->power ? r->power + 4 : 0;
    return n > r->words ? n : r->words;
}

/* "S[table-format=-2.4e2]" */
static void column(const bh_grid_column *c, const struct reach *r, bh_text *out)
{
    if (!c->number || r->before == 0) {
        bh_text_append(out, c->number ? "r" : "l");
        return;
    }
    bh_text_appendf(out, "S[table-format=%s%zu.%zu", r->sign ? "-" : "", r->before, r->behind);
    if (r->power)
        bh_text_appendf(out, "e%s", r->power > 2 ? "-2" : r->power > 1 ? "2" : "1");
    bh_text_append(out, "]");
}

/* Reads all cells; appends the columns to `format` and returns how many letters they take. */
static size_t columns(const bh_grid *grid, bh_text *format)
{
    struct reach reach[BH_MOST_GRID_COLUMNS] = {{0, 0, 0, 0, 0}};
    const char *text = grid->cells.bytes;
    size_t letters = 0;
    for (size_t c = 0; c < grid->column_count; c++)
        reach[c].words = strlen(grid->columns[c].heading);
    for (size_t i = 0; i < grid->cell_count; i++) {
        const size_t c = i % grid->column_count;
        if (grid->columns[c].number)
            measure(text, &reach[c]);
        else if (strlen(text) > reach[c].words)
            reach[c].words = strlen(text);
        text += strlen(text) + 1;
    }
    for (size_t c = 0; c < grid->column_count; c++)
        column(&grid->columns[c], &reach[c], format);
    for (size_t c = 0; c < grid->column_count; c++)
        letters += letters_of(&reach[c]);
    return letters;
}

double bh_grid_latex_wide(const bh_grid *grid)
{
    bh_text format = {0};
    const size_t letters = grid->cells.failed ? 0 : columns(grid, &format);
    bh_text_free(&format);
    return bh_latex_wide(bh_latex_fit(letters, grid->column_count), letters, grid->column_count);
}

void bh_grid_latex(const bh_grid *grid, bh_text *out)
{
    out->failed |= grid->cells.failed;
    if (out->failed || grid->column_count == 0)
        return;
    bh_text format = {0};
    const bh_latex_size *size = bh_latex_fit(columns(grid, &format), grid->column_count);
    out->failed |= format.failed;
    bh_text_appendf(out, "{%s\\setlength{\\tabcolsep}{%gpt}\n\\begin{longtable}{%s}\n\\toprule\n",
                    size->name, size->gap / 2.0, format.bytes ? format.bytes : "");
    bh_text_free(&format);
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
