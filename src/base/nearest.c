/* nearest.c - the word that was probably meant. */
#include "beamhours/base/nearest.h"

#include <stdbool.h>
#include <string.h>

enum { LONGEST = 64, FAR = 1000, SHORTENED = 3 };

/* Case and the kind of dash count for nothing. */
static int plain(char c)
{
    if (c == '-')
        return '_';
    return c >= 'A' && c <= 'Z' ? c - 'A' + 'a' : c;
}

static bool same(char a, char b)
{
    return plain(a) == plain(b);
}

static int least(int a, int b)
{
    return a < b ? a : b;
}

/* Row i of the table of distances between the first letters of a and of b, from the two above. */
static void next_row(const char *a, const char *b, size_t i, int rows[3][LONGEST + 1])
{
    const int *above = rows[(i + 2) % 3], *two_above = rows[(i + 1) % 3];
    int *row = rows[i % 3];
    row[0] = (int)i;
    for (size_t j = 1; b[j - 1]; j++) {
        row[j] = least(above[j], row[j - 1]) + 1;
        row[j] = least(row[j], above[j - 1] + !same(a[i - 1], b[j - 1]));
        if (i > 1 && j > 1 && same(a[i - 1], b[j - 2]) && same(a[i - 2], b[j - 1]))
            row[j] = least(row[j], two_above[j - 2] + 1);
    }
}

static int distance(const char *a, const char *b)
{
    const size_t n = strlen(a), m = strlen(b);
    if (n > LONGEST || m > LONGEST)
        return FAR;
    int rows[3][LONGEST + 1] = {{0}};
    for (size_t j = 0; j <= m; j++)
        rows[0][j] = (int)j;
    for (size_t i = 1; i <= n; i++)
        next_row(a, b, i, rows);
    return rows[n % 3][m];
}

static bool shortens(const char *word, const char *whole)
{
    size_t i = 0;
    while (word[i] && same(word[i], whole[i]))
        i++;
    return i >= SHORTENED && !word[i];
}

const char *bh_nearest(const char *word, const char *const *words, size_t count)
{
    const size_t length = strlen(word);
    const int limit = length == 2 ? 1 : length > LONGEST ? 0 : (int)length / 3;
    const char *best = NULL, *longer = NULL;
    int best_distance = limit + 1;
    for (size_t i = 0; i < count; i++) {
        const int d = words[i] ? distance(word, words[i]) : FAR;
        if (d < best_distance) {
            best_distance = d;
            best = words[i];
        }
        if (!longer && words[i] && shortens(word, words[i]))
            longer = words[i];
    }
    return best ? best : longer;
}
