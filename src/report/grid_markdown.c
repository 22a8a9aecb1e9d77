/* grid_markdown.c - a table with pipes; what a name holds is shown, never obeyed. */
#include "beamhours/report/grid.h"

#include <string.h>

void bh_markdown_words(bh_text *out, const char *words)
{
    for (; *words; words++) {
        if (*words == '\n' || *words == '\r')
            bh_text_append(out, " ");
        else
            bh_text_appendf(out, strchr("\\`*_[]<>|#&~", *words) ? "\\%c" : "%c", *words);
    }
}

static void cell(const char *words, const char *unit, bh_text *out)
{
    bh_text_append(out, " ");
    bh_markdown_words(out, words);
    if (unit[0]) {
        bh_text_append(out, ", ");
        bh_markdown_words(out, unit);
    }
    bh_text_append(out, " |");
}

void bh_grid_markdown(const bh_grid *grid, bh_text *out)
{
    out->failed |= grid->cells.failed;
    if (out->failed || grid->column_count == 0)
        return;
    bh_text_append(out, "|");
    for (size_t c = 0; c < grid->column_count; c++)
        cell(grid->columns[c].heading, grid->columns[c].unit, out);
    bh_text_append(out, "\n|");
    for (size_t c = 0; c < grid->column_count; c++)
        bh_text_append(out, grid->columns[c].number ? " ---: |" : " --- |");
    const char *words = grid->cells.bytes;
    for (size_t i = 0; i < grid->cell_count; i++) {
        if (i % grid->column_count == 0)
            bh_text_append(out, "\n|");
        cell(words, "", out);
        words += strlen(words) + 1;
    }
    bh_text_append(out, "\n\n");
}
