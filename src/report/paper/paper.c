/* paper.c - a document grows block by block, and never shrinks. */
#include "beamhours/report/paper.h"

#include <stdarg.h>
#include <stdio.h>
#include <string.h>

enum { FIRST_ROOM = 64 };

/* A copy of `count` things of `size` with more room; NULL when there is none. */
static void *grown(bh_paper_writing *w, const void *from, size_t count, size_t size)
{
    void *to = bh_arena_take(w->arena, count ? 2 * count : FIRST_ROOM, size);
    if (to && count)
        memcpy(to, from, count * size);
    w->failed |= !to;
    return to;
}

const char *bh_paper_text(bh_paper_writing *w, const char *fmt, ...)
{
    va_list args, again;
    va_start(args, fmt);
    va_copy(again, args);
    const int length = vsnprintf(NULL, 0, fmt, args);
    va_end(args);
    char *copy = length < 0 ? NULL : bh_arena_take(w->arena, (size_t)length + 1, 1);
    if (copy)
        (void)vsnprintf(copy, (size_t)length + 1, fmt, again);
    va_end(again);
    w->failed |= !copy;
    return copy ? copy : "";
}

const char *bh_paper_keep(bh_paper_writing *w, bh_text *text)
{
    const char *copy = bh_paper_text(w, "%s", text->bytes ? text->bytes : "");
    w->failed |= text->failed;
    bh_text_free(text);
    return copy;
}

static bh_block *next(bh_paper_writing *w, bh_block_kind kind, const char *text)
{
    if (w->count == w->room) {
        bh_block *blocks = grown(w, w->blocks, w->count, sizeof *blocks);
        if (!blocks)
            return NULL;
        w->blocks = blocks;
        w->room = w->count ? 2 * w->count : FIRST_ROOM;
    }
    bh_block *b = &w->blocks[w->count++];
    *b = (bh_block){.kind = kind, .number = ++w->numbers[kind], .text = text};
    return b;
}

void bh_paper_add(bh_paper_writing *w, bh_block_kind kind, const char *text)
{
    if (!w->failed && text[0])
        (void)next(w, kind, text);
}

void bh_paper_figure(bh_paper_writing *w, const char *caption, const bh_figure *figure)
{
    bh_block *b = w->failed ? NULL : next(w, BH_BLOCK_FIGURE, caption);
    if (b)
        b->figure = figure;
}

int bh_paper_cite(bh_paper_writing *w, const char *source)
{
    for (size_t i = 0; i < w->source_count; i++)
        if (strcmp(w->sources[i], source) == 0)
            return (int)i + 1;
    if (w->source_count == w->source_room) {
        const char **sources = grown(w, (const void *)w->sources, w->source_count, sizeof *sources);
        if (!sources)
            return 0;
        w->sources = sources;
        w->source_room = w->source_count ? 2 * w->source_count : FIRST_ROOM;
    }
    w->sources[w->source_count++] = bh_paper_text(w, "%s", source);
    return (int)w->source_count;
}

void bh_paper_table_open(bh_paper_writing *w, const char *caption, const bh_paper_column *columns,
                         size_t count)
{
    bh_paper_column *copy = bh_arena_take(w->arena, count, sizeof *copy);
    w->open = bh_arena_take(w->arena, 1, sizeof *w->open);
    w->cells = NULL;
    w->cell_count = w->cell_room = 0;
    w->failed |= !copy || !w->open;
    if (w->failed)
        return;
    memcpy(copy, columns, count * sizeof *copy);
    *w->open = (bh_paper_table){.caption = caption, .column_count = count, .columns = copy};
}

void bh_paper_cell(bh_paper_writing *w, const char *text)
{
    if (w->failed)
        return;
    if (w->cell_count == w->cell_room) {
        const char **cells = grown(w, (const void *)w->cells, w->cell_count, sizeof *cells);
        if (!cells)
            return;
        w->cells = cells;
        w->cell_room = w->cell_count ? 2 * w->cell_count : FIRST_ROOM;
    }
    w->cells[w->cell_count++] = text;
}

void bh_paper_table_close(bh_paper_writing *w)
{
    if (w->failed || !w->cell_count)
        return;
    w->open->cells = w->cells;
    w->open->row_count = w->cell_count / w->open->column_count;
    bh_block *b = next(w, BH_BLOCK_TABLE, w->open->caption);
    if (b)
        b->table = w->open;
}

void bh_paper_references(bh_paper_writing *w)
{
    for (size_t i = 0; i < w->source_count; i++)
        bh_paper_add(w, BH_BLOCK_REFERENCE, w->sources[i]);
}
