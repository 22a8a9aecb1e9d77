/* field.c - typing, in one line or several, and stepping a number digit by digit. */
#include "beamhours/screen/field.h"

#include <stdio.h>
#include <stdlib.h>
#include <string.h>

#include "beamhours/screen/canvas.h"

bool bh_field_set(bh_field *field, const char *text)
{
    const size_t length = strlen(text);
    if (length + 8 >= BH_FIELD_SIZE)
        return false;
    memcpy(field->bytes, text, length + 1);
    field->width = 0;
    field->length = field->cursor = length;
    return true;
}

static bool inside(unsigned char byte)
{
    return (byte & 0xC0) == 0x80; /* of a character that began before */
}

static size_t before(const bh_field *f)
{
    size_t at = f->cursor;
    while (at > 0 && inside((unsigned char)f->bytes[--at]))
        ;
    return at;
}

static size_t behind(const bh_field *f)
{
    size_t at = f->cursor;
    if (at < f->length)
        at++;
    while (at < f->length && inside((unsigned char)f->bytes[at]))
        at++;
    return at;
}

static void take_out(bh_field *f, size_t from, size_t to)
{
    memmove(f->bytes + from, f->bytes + to, f->length - to + 1);
    f->length -= to - from;
    f->cursor = from;
}

static size_t encode(uint32_t p, char out[5])
{
    if (p < 0x80) {
        out[0] = (char)p;
        return 1;
    }
    const size_t n = p < 0x800 ? 2 : p < 0x10000 ? 3 : 4;
    for (size_t i = n - 1; i > 0; i--, p >>= 6)
        out[i] = (char)(0x80 | (p & 0x3F));
    out[0] = (char)((n == 2 ? 0xC0U : n == 3 ? 0xE0U : 0xF0U) | p);
    return n;
}

static void put_in(bh_field *f, uint32_t point)
{
    char bytes[5];
    const size_t n = encode(point, bytes);
    if (f->length + n + 1 >= BH_FIELD_SIZE)
        return;
    memmove(f->bytes + f->cursor + n, f->bytes + f->cursor, f->length - f->cursor + 1);
    memcpy(f->bytes + f->cursor, bytes, n);
    f->length += n;
    f->cursor += n;
}

/* --- several lines --- */

size_t bh_field_row(const bh_field *field, size_t from, size_t *length)
{
    const char *text = field->bytes + from;
    const size_t line = strcspn(text, "\n");
    size_t n = bh_text_fit(text, field->width > 1 ? field->width : 1);
    if (n >= line) {
        *length = line;
        return text[line] ? from + line + 1 : BH_FIELD_SIZE;
    }
    const size_t most = n ? n : 1;
    while (n > 0 && text[n] != ' ')
        n--;
    *length = n ? n : most;
    return from + (n ? n + 1 : most); /* the blank stays behind */
}

size_t bh_field_at(const bh_field *field)
{
    size_t from = 0, length = 0;
    for (;;) {
        const size_t next = bh_field_row(field, from, &length);
        if (next > field->cursor || next >= BH_FIELD_SIZE)
            return from;
        from = next;
    }
}

/* Into the row above or below, at about the same column. */
static void go_row(bh_field *f, bool down)
{
    const size_t at = bh_field_at(f);
    size_t to = 0, length = 0;
    char left_of_it[BH_FIELD_SIZE];
    (void)snprintf(left_of_it, sizeof left_of_it, "%.*s", (int)(f->cursor - at), f->bytes + at);
    if (down)
        to = bh_field_row(f, at, &length);
    for (size_t next = 0; !down && at > 0 && next < at; next = bh_field_row(f, to, &length))
        to = next;
    if (to >= BH_FIELD_SIZE || (!down && at == 0))
        return;
    (void)bh_field_row(f, to, &length);
    const size_t fit = bh_text_fit(f->bytes + to, bh_text_columns(left_of_it, false));
    f->cursor = to + (fit < length ? fit : length);
}

static bool press_in_lines(bh_field *f, const bh_press *press)
{
    size_t length = 0;
    switch (press->kind) {
    case BH_PRESS_UP:
    case BH_PRESS_DOWN:
        go_row(f, press->kind == BH_PRESS_DOWN);
        return true;
    case BH_PRESS_HOME:
        f->cursor = bh_field_at(f);
        return true;
    case BH_PRESS_END: {
        const size_t at = bh_field_at(f);
        (void)bh_field_row(f, at, &length);
        f->cursor = at + length;
        return true;
    }
    case BH_PRESS_TAB:
        put_in(f, '\n');
        return true;
    default:
        return false;
    }
}

/* --- keys --- */

bool bh_field_press(bh_field *field, const bh_press *press)
{
    if (field->width > 0 && press_in_lines(field, press))
        return true;
    switch (press->kind) {
    case BH_PRESS_POINT:
        put_in(field, press->point);
        return true;
    case BH_PRESS_LEFT:
        field->cursor = before(field);
        return true;
    case BH_PRESS_RIGHT:
        field->cursor = behind(field);
        return true;
    case BH_PRESS_HOME:
        field->cursor = 0;
        return true;
    case BH_PRESS_END:
        field->cursor = field->length;
        return true;
    case BH_PRESS_RUBOUT:
        take_out(field, before(field), field->cursor);
        return true;
    case BH_PRESS_DELETE:
        take_out(field, field->cursor, behind(field));
        return true;
    default:
        return false;
    }
}

static bool of_number(char c)
{
    return (c >= '0' && c <= '9') || c == '.';
}

/* The digits around the cursor: from and to, and which of them is stepped. */
static bool find_number(const bh_field *f, size_t *from, size_t *to, size_t *digit)
{
    size_t at = f->cursor;
    while (at > 0 && !of_number(f->bytes[at - 1]))
        at--; /* behind a unit: its number */
    if (at == 0)
        return false;
    for (*from = at; *from > 0 && of_number(f->bytes[*from - 1]);)
        (*from)--;
    for (*to = at; of_number(f->bytes[*to]);)
        (*to)++;
    *digit = at - 1;
    if (f->bytes[*digit] == '.')
        (*digit)--;
    return *to - *from < 16 && *digit >= *from && f->bytes[*digit] != '.' && *digit < *to;
}

bool bh_field_step(bh_field *field, int direction)
{
    size_t from = 0, to = 0, digit = 0;
    char number[32], out[64];
    if (!find_number(field, &from, &to, &digit))
        return false;
    memcpy(number, field->bytes + from, to - from);
    number[to - from] = '\0';
    const char *point = strchr(number, '.');
    if (point && strchr(point + 1, '.'))
        return false;
    const size_t whole = point ? (size_t)(point - number) : to - from;
    const int decimals = point ? (int)(to - from - whole - 1) : 0;
    const size_t place = digit - from;
    const int power = place < whole ? (int)(whole - place) - 1 : -(int)(place - whole);
    double step = 1, value = strtod(number, NULL); /* digits and a point only */
    for (int i = 0; i < abs(power); i++)
        step = power > 0 ? step * 10 : step / 10;
    value += direction * step;
    if (value < 0)
        return false;
    const int n = snprintf(out, sizeof out, "%.*f", decimals, value);
    const size_t behind_number = field->length - to, back = field->length - field->cursor;
    if (n < 0 || from + (size_t)n + behind_number + 1 >= BH_FIELD_SIZE)
        return false;
    memmove(field->bytes + from + n, field->bytes + to, behind_number + 1);
    memcpy(field->bytes + from, out, (size_t)n);
    field->length = from + (size_t)n + behind_number;
    field->cursor = field->length - back;
    return true;
}
