/* text.c - a text that grows at its end. */
#include "beamhours/base/text.h"

#include <stdarg.h>
#include <stdint.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

#include "beamhours/base/number.h"

char *bh_text_reserve(bh_text *text, size_t length)
{
    if (text->failed)
        return NULL;
    if (length > SIZE_MAX / 4 - text->length) {
        text->failed = true;
        return NULL;
    }
    const size_t need = text->length + length + 1;
    if (need > text->room) {
        const size_t room = need < 128 ? 128 : need + need / 2;
        char *grown = realloc(text->bytes, room);
        if (!grown) {
            text->failed = true;
            return NULL;
        }
        text->bytes = grown;
        text->room = room;
    }
    return text->bytes + text->length;
}

void bh_text_append_bytes(bh_text *text, const void *bytes, size_t length)
{
    char *to = bh_text_reserve(text, length);
    if (!to)
        return;
    if (length > 0)
        memcpy(to, bytes, length);
    to[length] = '\0';
    text->length += length;
}

void bh_text_append(bh_text *text, const char *string)
{
    bh_text_append_bytes(text, string, strlen(string));
}

void bh_text_appendf(bh_text *text, const char *fmt, ...)
{
    va_list args, again;
    va_start(args, fmt);
    va_copy(again, args);
    const int length = vsnprintf(NULL, 0, fmt, args);
    char *to = length < 0 ? NULL : bh_text_reserve(text, (size_t)length);
    if (to) {
        (void)vsnprintf(to, (size_t)length + 1, fmt, again);
        text->length += (size_t)length;
    } else {
        text->failed = true;
    }
    va_end(again);
    va_end(args);
}

void bh_text_append_number(bh_text *text, double value)
{
    char number[BH_NUMBER_SIZE];
    bh_text_append_bytes(text, number, bh_number_print(value, number, sizeof number));
}

char *bh_text_take(bh_text *text)
{
    bh_text_append_bytes(text, "", 0);
    char *taken = text->bytes;
    if (text->failed) {
        free(taken);
        taken = NULL;
    }
    *text = (bh_text){0};
    return taken;
}

void bh_text_free(bh_text *text)
{
    free(text->bytes);
    *text = (bh_text){0};
}
