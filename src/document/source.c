/* source.c - the bytes of a document: is it plain text, and where in it is line 3, column 7. */
#include "beamhours/document/source.h"

#include <string.h>

#include "beamhours/base/sentences.h"

enum { CUT = 3 /* the dots of a cut excerpt */ };

static const char order_mark[] = "\xEF\xBB\xBF";

bh_cursor bh_cursor_start(const char *bytes, size_t length, const char *name)
{
    const size_t mark = sizeof order_mark - 1;
    const bool marked = length >= mark && memcmp(bytes, order_mark, mark) == 0;
    return (bh_cursor){bytes, length, marked ? mark : 0, {name, 1, 1}};
}

static void step(bh_cursor *c)
{
    uint32_t point = 0;
    const size_t width = bh_utf8_read(c->bytes + c->byte, c->length - c->byte, &point);
    c->byte += width ? width : 1;
    if (point == '\n') {
        c->at.line++;
        c->at.column = 1;
    } else {
        c->at.column++;
    }
}

void bh_cursor_go(bh_cursor *cursor, size_t line, size_t column)
{
    const size_t now = (size_t)cursor->at.line - 1;
    if (line < now || (line == now && column < (size_t)cursor->at.column - 1))
        *cursor = bh_cursor_start(cursor->bytes, cursor->length, cursor->at.file);
    while (cursor->byte < cursor->length && (size_t)cursor->at.line - 1 < line)
        step(cursor);
    while (cursor->byte < cursor->length && (size_t)cursor->at.line - 1 == line &&
           (size_t)cursor->at.column - 1 < column && cursor->bytes[cursor->byte] != '\n')
        step(cursor);
}

/* How many bytes the code point has that begins with this one; 0 where none does. */
static size_t width_of(unsigned char first)
{
    if (first < 0x80)
        return 1;
    if (first < 0xC2 || first > 0xF4)
        return 0;
    return first < 0xE0 ? 2 : first < 0xF0 ? 3 : 4;
}

size_t bh_utf8_read(const char *bytes, size_t left, uint32_t *point)
{
    static const uint32_t least[] = {0, 0, 0x80, 0x800, 0x10000};
    const unsigned char *b = (const unsigned char *)bytes;
    const size_t width = left > 0 ? width_of(b[0]) : 0;
    if (width == 0 || width > left)
        return 0;
    uint32_t p = width == 1 ? b[0] : b[0] & (0x7FU >> width);
    for (size_t i = 1; i < width; i++) {
        if ((b[i] & 0xC0U) != 0x80)
            return 0;
        p = p << 6 | (b[i] & 0x3FU);
    }
    if (p < least[width] || p > 0x10FFFF || (p >= 0xD800 && p <= 0xDFFF))
        return 0;
    *point = p;
    return width;
}

bool bh_utf8_hidden(uint32_t point)
{
    if (point == '\t' || point == '\n')
        return false;
    const bool mark = point == 0x200B || point == 0x200E || point == 0x200F || point == 0x2060;
    const bool turn = (point >= 0x202A && point <= 0x202E) || (point >= 0x2066 && point <= 0x2069);
    return point < 0x20 || (point >= 0x7F && point < 0xA0) || point == 0xFEFF || point == 0xFFFE ||
           point == 0xFFFF || mark || turn;
}

bool bh_utf8_line_end(uint32_t point)
{
    return point == '\r' || point == 0x85 || point == 0x2028 || point == 0x2029;
}

/* A CR is good before LF. */
static bool good(const bh_cursor *c, uint32_t point)
{
    if (point == '\r')
        return c->byte + 1 < c->length && c->bytes[c->byte + 1] == '\n';
    return !bh_utf8_line_end(point) && !bh_utf8_hidden(point);
}

bool bh_source_check(bh_cursor start, const char *key, bh_diags *diags)
{
    bh_cursor c = start;
    uint32_t point = 0;
    while (c.byte < c.length && bh_utf8_read(c.bytes + c.byte, c.length - c.byte, &point) &&
           good(&c, point))
        step(&c);
    if (c.byte == c.length)
        return true;
    if (!bh_utf8_read(c.bytes + c.byte, c.length - c.byte, &point))
        bh_diags_add(diags, BH_SEVERITY_ERROR, c.at, key, BH_SAY_NOT_UTF8,
                     (unsigned)(unsigned char)c.bytes[c.byte]);
    else if (bh_utf8_line_end(point))
        bh_diags_add(diags, BH_SEVERITY_ERROR, c.at, key, BH_SAY_LINE_END, (unsigned)point);
    else
        bh_diags_add(diags, BH_SEVERITY_ERROR, c.at, key, BH_SAY_HIDDEN, (unsigned)point);
    return false;
}

void bh_source_excerpt(const bh_cursor *cursor, size_t from, size_t to, char *out, size_t size)
{
    const char *text = cursor->bytes + from;
    const size_t most = (to < cursor->length ? to : cursor->length) - from;
    size_t n = 0;
    while (n < most && text[n] != '\n' && text[n] != '\r')
        n++;
    while (n > 0 && (text[n - 1] == ' ' || text[n - 1] == '\t'))
        n--;
    const bool cut = n >= size;
    if (cut) {
        n = size - 1 - CUT;
        while (n > 0 && ((unsigned char)text[n] & 0xC0U) == 0x80)
            n--;
    }
    memcpy(out, text, n);
    memcpy(out + n, "...", cut ? CUT : 0);
    out[n + (cut ? CUT : 0)] = '\0';
}
