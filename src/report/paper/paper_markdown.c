/* paper_markdown.c - pipes and dashes: what most sites and editors show as tables. */
#include "beamhours/report/paper.h"

#include "beamhours/report/grid.h"

static void heading_cell(const bh_paper_column *c, bh_text *out)
{
    bh_text_append(out, " ");
    bh_markdown_words(out, c->heading);
    if (c->unit[0]) {
        bh_text_append(out, " (");
        bh_markdown_words(out, c->unit);
        bh_text_append(out, ")");
    }
    bh_text_append(out, " |");
}

static void table(const bh_block *b, bh_text *out)
{
    const bh_paper_table *t = b->table;
    bh_text_appendf(out, "**Table %d.** ", b->number);
    bh_markdown_words(out, b->text);
    bh_text_append(out, "\n\n|");
    for (size_t c = 0; c < t->column_count; c++)
        heading_cell(&t->columns[c], out);
    bh_text_append(out, "\n|");
    for (size_t c = 0; c < t->column_count; c++)
        bh_text_append(out, t->columns[c].number ? " ---: |" : " --- |");
    for (size_t i = 0; i < t->row_count * t->column_count; i++) {
        bh_text_append(out, i % t->column_count ? " " : "\n| ");
        bh_markdown_words(out, t->cells[i]);
        bh_text_append(out, " |");
    }
    bh_text_append(out, "\n\n");
}

static void words(const char *lead, const char *text, const char *behind, bh_text *out)
{
    bh_text_append(out, lead);
    bh_markdown_words(out, text);
    bh_text_append(out, behind);
}

/* The drawing is a file of its own; what is on it is said for who cannot see it. */
static void figure(const bh_block *b, const char *figures, bh_text *out)
{
    if (figures) {
        words("![", b->figure->description, "](", out);
        bh_text_appendf(out, "%s-%d.svg)\n\n", figures, b->number);
    }
    bh_text_appendf(out, "**Figure %d.** ", b->number);
    words("", b->text, figures ? "\n\n" : ". ", out);
    if (!figures)
        words("", b->figure->description, "\n\n", out);
}

static void block(const bh_paper *paper, size_t i, const char *figures, bh_text *out)
{
    const bh_block *b = &paper->blocks[i];
    const bool last = i + 1 == paper->count || paper->blocks[i + 1].kind != b->kind;
    switch (b->kind) {
    case BH_BLOCK_SECTION:
        bh_text_appendf(out, "## %d. ", b->number);
        words("", b->text, "\n\n", out);
        break;
    case BH_BLOCK_WORDS:
        words("", b->text, "\n\n", out);
        break;
    case BH_BLOCK_ITEM:
        words("- ", b->text, last ? "\n\n" : "\n", out);
        break;
    case BH_BLOCK_CAUTION:
        words("> **Caution.** ", b->text, "\n\n", out);
        break;
    case BH_BLOCK_TABLE:
        table(b, out);
        break;
    case BH_BLOCK_FIGURE:
        figure(b, figures, out);
        break;
    case BH_BLOCK_REFERENCE:
        bh_text_appendf(out, "%d. ", b->number);
        words("", b->text, last ? "\n\n" : "\n", out);
        break;
    }
}

bh_code bh_paper_markdown(const bh_paper *paper, const char *figures, bh_text *out, bh_error *err)
{
    words("# ", paper->title, "\n\n", out);
    for (size_t i = 0; i < paper->count; i++)
        block(paper, i, figures, out);
    return out->failed ? bh_fail(err, BH_ENOMEM, "%s", bh_code_text(BH_ENOMEM)) : BH_OK;
}
