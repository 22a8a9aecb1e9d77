/* canvas.c - widths of characters, and plain letters for terminals that have no others. */
#include "beamhours/screen/canvas.h"

#include <stdlib.h>
#include <string.h>

#include "beamhours/document/source.h"

bool bh_canvas_size(bh_canvas *canvas, int rows, int columns)
{
    const size_t needed = (size_t)rows * (size_t)columns;
    if (needed > canvas->room) {
        bh_cell *more = realloc(canvas->cells, needed * sizeof *more);
        if (!more)
            return false;
        canvas->cells = more;
        canvas->room = needed;
    }
    canvas->rows = rows;
    canvas->columns = columns;
    canvas->cursor_row = canvas->cursor_column = 0;
    for (size_t i = 0; i < needed; i++)
        canvas->cells[i] = (bh_cell){' ', 0, BH_LOOK_PLAIN};
    return true;
}

void bh_canvas_free(bh_canvas *canvas)
{
    free(canvas->cells);
    *canvas = (bh_canvas){.rows = 0};
}

bool bh_cell_same(const bh_cell *a, const bh_cell *b)
{
    return a->point == b->point && a->mark == b->mark && a->look == b->look;
}

bh_cell *bh_canvas_at(const bh_canvas *canvas, int row, int column)
{
    if (row < 0 || column < 0 || row >= canvas->rows || column >= canvas->columns)
        return NULL;
    return &canvas->cells[(size_t)row * (size_t)canvas->columns + (size_t)column];
}

/* First and last code points that stand on the character before them, and of wide characters:
 * the large blocks of Unicode 15. */
static const uint32_t marks[][2] = {{0x300, 0x36F},   {0x483, 0x489},   {0x591, 0x5BD},
                                    {0x610, 0x61A},   {0x64B, 0x65F},   {0x1AB0, 0x1AFF},
                                    {0x1DC0, 0x1DFF}, {0x200B, 0x200F}, {0x20D0, 0x20FF},
                                    {0xFE00, 0xFE0F}, {0xFE20, 0xFE2F}};
static const uint32_t wide[][2] = {{0x1100, 0x115F},   {0x2E80, 0x303E},  {0x3041, 0xA4CF},
                                   {0xAC00, 0xD7A3},   {0xF900, 0xFAFF},  {0xFE30, 0xFE6F},
                                   {0xFF00, 0xFF60},   {0xFFE0, 0xFFE6},  {0x1F300, 0x1F64F},
                                   {0x1F900, 0x1F9FF}, {0x20000, 0x3FFFD}};

static bool among(const uint32_t (*list)[2], size_t count, uint32_t point)
{
    for (size_t i = 0; i < count; i++)
        if (point >= list[i][0] && point <= list[i][1])
            return true;
    return false;
}

static int width_of(uint32_t point)
{
    if (point < 0x300)
        return 1;
    if (among(marks, sizeof marks / sizeof *marks, point))
        return 0;
    return among(wide, sizeof wide / sizeof *wide, point) ? 2 : 1;
}

/* What stands for a character on a terminal that has only ASCII. */
static const struct {
    uint32_t point;
    const char *plain;
} plain_letters[] = {{0xB1, "+-"},  {0xB5, "u"},   {0x3BC, "u"},  {0xB7, "."},   {0xB0, "deg"},
                     {0xB2, "2"},   {0xB3, "3"},   {0xD7, "x"},   {0x2026, "."}, {0x2502, "|"},
                     {0x2500, "-"}, {0x253C, "+"}, {0x252C, "+"}, {0x2534, "+"}, {0x251C, "+"},
                     {0x2524, "+"}, {0x2212, "-"}, {0x25B8, ">"}, {0x25BE, "v"}, {0x2192, ">"},
                     {0x2191, "^"}, {0x2193, "v"}, {0x2594, "="}, {0x2580, "#"}, {0x2248, "~"},
                     {0x2022, "*"}, {0xB9, "1"},   {0x2070, "0"}, {0x2074, "4"}, {0x2075, "5"},
                     {0x2076, "6"}, {0x2077, "7"}, {0x2078, "8"}, {0x2079, "9"}, {0x207B, "-"}};

static const char *in_ascii(uint32_t point)
{
    for (size_t i = 0; i < sizeof plain_letters / sizeof *plain_letters; i++)
        if (plain_letters[i].point == point)
            return plain_letters[i].plain;
    return width_of(point) == 0 ? "" : width_of(point) == 2 ? "??" : "?";
}

/* Reads one character; bytes that are none are one each. */
static size_t read_point(const char *text, uint32_t *point)
{
    const size_t left = strnlen(text, 4);
    const size_t n = bh_utf8_read(text, left, point);
    if (n == 0)
        *point = '?';
    if (*point < ' ' || (*point >= 0x7F && *point < 0xA0))
        *point = '?';
    return n ? n : 1;
}

int bh_text_columns(const char *text, bool ascii)
{
    int columns = 0;
    while (*text) {
        uint32_t point = 0;
        text += read_point(text, &point);
        columns += ascii && point > 0x7E ? (int)strlen(in_ascii(point)) : width_of(point);
    }
    return columns;
}

size_t bh_text_fit(const char *text, int columns)
{
    const char *at = text;
    while (*at) {
        uint32_t point = 0;
        const size_t n = read_point(at, &point);
        columns -= width_of(point);
        if (columns < 0)
            break;
        at += n;
    }
    return (size_t)(at - text);
}

/* Writes one character at `column`; the columns it took, -1 where it did not fit. */
static int put_point(bh_canvas *canvas, int row, int column, bh_cell cell)
{
    const int width = width_of(cell.point);
    bh_cell *here = bh_canvas_at(canvas, row, column);
    if (width == 0) {
        bh_cell *before = bh_canvas_at(canvas, row, column - 1);
        if (before && before->point)
            before->mark = cell.point;
        return 0;
    }
    bh_cell *half = width == 2 ? bh_canvas_at(canvas, row, column + 1) : NULL;
    if (!here || (width == 2 && !half))
        return -1;
    *here = cell;
    if (half)
        *half = (bh_cell){0, 0, cell.look};
    return width;
}

int bh_canvas_put(bh_canvas *canvas, bh_spot spot, bh_look look, const char *text)
{
    int used = 0;
    while (*text) {
        uint32_t point = 0;
        text += read_point(text, &point);
        const char *plain = canvas->ascii && point > 0x7E ? in_ascii(point) : NULL;
        const int width = plain ? (int)strlen(plain) : width_of(point);
        if (used + width > spot.width)
            break;
        if (!plain &&
            put_point(canvas, spot.row, spot.column + used, (bh_cell){point, 0, look}) < 0)
            break;
        for (int i = 0; plain && plain[i]; i++)
            (void)put_point(canvas, spot.row, spot.column + used + i,
                            (bh_cell){(uint32_t)plain[i], 0, look});
        used += width;
    }
    return used;
}

void bh_canvas_put_cut(bh_canvas *canvas, bh_spot spot, bh_look look, const char *text)
{
    (void)bh_canvas_put(canvas, spot, look, text);
    if (spot.width > 0 && bh_text_columns(text, canvas->ascii) > spot.width)
        (void)bh_canvas_put(canvas, (bh_spot){spot.row, spot.column + spot.width - 1, 1},
                            BH_LOOK_QUIET, "\u2026");
}

int bh_canvas_put_right(bh_canvas *canvas, bh_spot spot, bh_look look, const char *text)
{
    const int columns = bh_text_columns(text, canvas->ascii);
    if (columns < spot.width) {
        spot.column += spot.width - columns;
        spot.width = columns;
    }
    return bh_canvas_put(canvas, spot, look, text);
}

void bh_canvas_paint(bh_canvas *canvas, bh_spot spot, bh_look look)
{
    for (int i = 0; i < spot.width; i++) {
        bh_cell *cell = bh_canvas_at(canvas, spot.row, spot.column + i);
        if (cell)
            cell->look = look;
    }
}

void bh_canvas_clear(bh_canvas *canvas, bh_spot spot)
{
    for (int i = 0; i < spot.width; i++) {
        bh_cell *cell = bh_canvas_at(canvas, spot.row, spot.column + i);
        if (cell)
            *cell = (bh_cell){' ', 0, BH_LOOK_PLAIN};
    }
}

void bh_canvas_join_words(bh_canvas *canvas, const bool blank[BH_LOOK_COUNT])
{
    for (int r = 0; r < canvas->rows; r++)
        for (int c = 1; c < canvas->columns; c++) {
            bh_cell *cell = bh_canvas_at(canvas, r, c);
            const bh_look before = bh_canvas_at(canvas, r, c - 1)->look;
            if (cell->point == ' ' && !cell->mark && blank[cell->look] && blank[before])
                cell->look = before;
        }
}

static void append_point(bh_text *into, uint32_t point)
{
    char out[5] = {0};
    if (point < 0x80) {
        out[0] = (char)point;
    } else if (point < 0x800) {
        out[0] = (char)(0xC0 | point >> 6);
        out[1] = (char)(0x80 | (point & 0x3F));
    } else if (point < 0x10000) {
        out[0] = (char)(0xE0 | point >> 12);
        out[1] = (char)(0x80 | (point >> 6 & 0x3F));
        out[2] = (char)(0x80 | (point & 0x3F));
    } else {
        out[0] = (char)(0xF0 | point >> 18);
        out[1] = (char)(0x80 | (point >> 12 & 0x3F));
        out[2] = (char)(0x80 | (point >> 6 & 0x3F));
        out[3] = (char)(0x80 | (point & 0x3F));
    }
    bh_text_append(into, out);
}

void bh_canvas_print(const bh_canvas *canvas, bh_text *into)
{
    for (int row = 0; row < canvas->rows; row++) {
        int end = canvas->columns;
        while (end > 0 && bh_canvas_at(canvas, row, end - 1)->point == ' ')
            end--;
        for (int column = 0; column < end; column++) {
            const bh_cell *cell = bh_canvas_at(canvas, row, column);
            if (cell->point)
                append_point(into, cell->point);
            if (cell->mark)
                append_point(into, cell->mark);
        }
        bh_text_append(into, "\n");
    }
}
