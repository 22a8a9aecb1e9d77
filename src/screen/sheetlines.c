/* sheetlines.c - wrapping. */
#include <stdio.h>
#include <string.h>

#include "beamhours/screen/sheet.h"

enum { PAIR = 22, NARROWEST = 20 };

bool bh_sheet_begin(bh_model *model, bh_sheet_kind kind, const char *title, bh_sheet_writer *out)
{
    bh_sheet_close(&model->sheet);
    model->sheet.arena = bh_arena_new();
    if (!model->sheet.arena) {
        bh_model_note(model, true, "no memory is left to show this");
        return false;
    }
    model->sheet.kind = kind;
    model->sheet.title = title;
    model->over = BH_OVER_SHEET;
    const int width = bh_arrange(model).over_columns - 2;
    *out = (bh_sheet_writer){&model->sheet, width < NARROWEST ? NARROWEST : width};
    return true;
}

static void push(bh_sheet *s, bh_look look, const char *text)
{
    if (s->count == s->room) {
        const size_t room = s->room ? 2 * s->room : 128;
        bh_sheet_line *more = bh_arena_take(s->arena, room, sizeof *more);
        if (!more)
            return;
        if (s->count)
            memcpy(more, s->lines, s->count * sizeof *more);
        s->lines = more;
        s->room = room;
    }
    s->lines[s->count++] = (bh_sheet_line){look, text};
}

/* How much of `text` fits into `columns`, cut between words where that can be. */
static size_t cut(const char *text, int columns)
{
    const size_t most = bh_text_fit(text, columns);
    if (!text[most])
        return most;
    size_t n = most;
    while (n > 0 && text[n] != ' ')
        n--;
    return n ? n : most ? most : strlen(text);
}

void bh_sheet_add(bh_sheet_writer *writer, bh_look look, const char *lead, const char *text)
{
    const int indent = bh_text_columns(lead, false);
    const int columns = writer->width - indent > 8 ? writer->width - indent : 8;
    const char *before = lead;
    do {
        const size_t n = cut(text, columns), gap = strlen(before);
        const size_t blanks = before == lead ? gap : (size_t)indent;
        char *line = bh_arena_take(writer->sheet->arena, blanks + n + 1, 1);
        if (!line)
            return;
        memset(line, ' ', blanks);
        if (before == lead)
            memcpy(line, lead, gap);
        memcpy(line + blanks, text, n);
        push(writer->sheet, look, line);
        text += n;
        while (*text == ' ')
            text++;
        before = "";
    } while (*text);
}

void bh_sheet_pair(bh_sheet_writer *writer, const char *name, const char *text)
{
    char lead[128];
    const int columns = bh_text_columns(name, false);
    const int gap = PAIR - columns > 1 ? PAIR - columns : 1;
    (void)snprintf(lead, sizeof lead, "  %.80s%*s", name, gap, "");
    bh_sheet_add(writer, BH_LOOK_PLAIN, lead, text);
}

void bh_sheet_explained(bh_sheet_writer *writer, const bh_line *line)
{
    if (line->kind == BH_LINE_SECTION) {
        if (writer->sheet->count)
            push(writer->sheet, BH_LOOK_PLAIN, "");
        bh_sheet_add(writer, BH_LOOK_TITLE, "", line->name ? line->name : "");
        return;
    }
    char lead[128];
    bh_text text = {0};
    const char *const parts[] = {line->value, line->formula, line->remark, line->source};
    for (size_t i = 0; i < 4; i++)
        if (parts[i])
            bh_text_appendf(&text, "%s%s", text.length ? "; " : "", parts[i]);
    (void)snprintf(lead, sizeof lead, "  %-*.80s ", PAIR, line->name ? line->name : "");
    bh_sheet_add(writer, line->kind == BH_LINE_DEFAULT ? BH_LOOK_QUIET : BH_LOOK_PLAIN,
                 line->name ? lead : "  ", text.bytes ? text.bytes : "");
    bh_text_free(&text);
}
