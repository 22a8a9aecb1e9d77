/* plain.c - the many ways to write a minus, a blank, a micro and a square, made one. */
#include <string.h>

#include "beamhours/units/unit.h"

/* Longer forms before their beginnings. */
static const struct {
    char written[5];
    char plain[4];
} forms[] = {
    {"+/-", "\001"},       {"+-", "\001"},        {"\302\261", "\001"},  {"\t", " "},
    {"\302\240", " "},     {"\342\200\202", " "}, {"\342\200\203", " "}, {"\342\200\204", " "},
    {"\342\200\205", " "}, {"\342\200\206", " "}, {"\342\200\207", " "}, {"\342\200\210", " "},
    {"\342\200\211", " "}, {"\342\200\212", " "}, {"\342\200\257", " "}, {"\342\201\237", " "},
    {"\342\210\222", "-"}, {"\302\265", "u"},     {"\316\274", "u"},     {"\302\260", "deg"},
    {"\302\267", "*"},     {"\303\227", "*"},     {"\342\213\205", "*"}, {"\342\210\231", "*"},
    {"\342\200\231", "'"},
};

/* Superscripts: a run of them becomes ^ and plain characters. */
static const struct {
    char written[4];
    char plain;
} superscripts[] = {
    {"\342\201\260", '0'}, {"\302\271", '1'},     {"\302\262", '2'},     {"\302\263", '3'},
    {"\342\201\264", '4'}, {"\342\201\265", '5'}, {"\342\201\266", '6'}, {"\342\201\267", '7'},
    {"\342\201\270", '8'}, {"\342\201\271", '9'}, {"\342\201\273", '-'}, {"\342\201\272", '+'},
};

static bool starts(const char *text, const char *with)
{
    return strncmp(text, with, strlen(with)) == 0;
}

/* Bytes of the code point that begins here, 0 where none does.  Control characters are none. */
static size_t code_point(const char *text)
{
    const unsigned char c = (unsigned char)text[0];
    if (c < 0x20 || c == 0x7f || (c >= 0x80 && c < 0xc2) || c > 0xf4)
        return 0;
    const size_t length = c < 0x80 ? 1 : c < 0xe0 ? 2 : c < 0xf0 ? 3 : 4;
    for (size_t i = 1; i < length; i++)
        if (((unsigned char)text[i] & 0xc0) != 0x80)
            return 0;
    return length;
}

/* The superscript that begins here, as a plain character; 0 for none. */
static char superscript(const char *text, size_t *length)
{
    for (size_t i = 0; i < sizeof superscripts / sizeof superscripts[0]; i++)
        if (starts(text, superscripts[i].written)) {
            *length = strlen(superscripts[i].written);
            return superscripts[i].plain;
        }
    return 0;
}

/* The plain form of what begins here: into `plain` (5 bytes), and how many bytes that was; 0 for
 * what is no text.  `raised`: the last one was a superscript. */
static size_t next_form(const char *text, bool *raised, char plain[5])
{
    size_t length = 0;
    if (text[0] > ' ' && text[0] < 0x7f && text[0] != '+') { /* what most are: nothing to look up */
        *raised = false;
        plain[0] = text[0];
        plain[1] = '\0';
        return 1;
    }
    const char digit = superscript(text, &length);
    if (digit) {
        const char *mark = *raised ? "" : "^";
        plain[0] = mark[0];
        plain[mark[0] != 0] = digit;
        plain[1 + (mark[0] != 0)] = '\0';
        *raised = true;
        return length;
    }
    *raised = false;
    for (size_t i = 0; i < sizeof forms / sizeof forms[0]; i++)
        if (starts(text, forms[i].written)) {
            memcpy(plain, forms[i].plain, sizeof forms[i].plain);
            return strlen(forms[i].written);
        }
    length = code_point(text);
    memcpy(plain, text, length);
    plain[length] = '\0';
    return length;
}

bool bh_plain_text(const char *text, char out[BH_PLAIN_SIZE])
{
    size_t n = 0;
    bool raised = false;
    while (*text) {
        char plain[5];
        const size_t read = next_form(text, &raised, plain);
        const size_t length = strlen(plain);
        if (read == 0 || n + length >= BH_PLAIN_SIZE) {
            out[0] = '\0';
            return false;
        }
        text += read;
        if (n == 0 && plain[0] == ' ') /* none at the start */
            continue;
        memcpy(out + n, plain, length);
        n += length;
    }
    while (n > 0 && out[n - 1] == ' ')
        n--;
    out[n] = '\0';
    return true;
}
