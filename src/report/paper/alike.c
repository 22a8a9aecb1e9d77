/* alike.c - a merge sort, which takes the order as an argument and keeps equals as they stand. */
#include "beamhours/report/alike.h"

#include <stdlib.h>
#include <string.h>

/* Merges two sorted stretches, from .. middle .. to, into `out`. */
static void merge(const bh_alike *rows, const size_t at[3], bh_alike_order *order, bh_alike *out)
{
    size_t left = at[0], right = at[1];
    for (size_t i = at[0]; i < at[2]; i++) {
        const bool second =
            left == at[1] || (right < at[2] && order(rows[right].what, rows[left].what) < 0);
        out[i] = rows[second ? right++ : left++];
    }
}

bool bh_alike_sort(bh_alike *rows, size_t count, bh_alike_order *order)
{
    bh_alike *other = malloc((count + 1) * sizeof *other);
    for (size_t width = 1; other && width < count; width *= 2) {
        for (size_t from = 0; from < count; from += 2 * width) {
            const size_t middle = from + width < count ? from + width : count;
            const size_t to = middle + width < count ? middle + width : count;
            merge(rows, (const size_t[]){from, middle, to}, order, other);
        }
        memcpy(rows, other, count * sizeof *rows);
    }
    free(other);
    return other != NULL;
}

static int earlier(const void *a, const void *b)
{
    const bh_alike_head *p = a, *q = b;
    return (p->first->row > q->first->row) - (p->first->row < q->first->row);
}

size_t bh_alike_heads(const bh_alike *rows, size_t count, bh_alike_order *order,
                      bh_alike_head *heads)
{
    size_t kinds = 0;
    for (size_t i = 0; i < count; i++)
        if (i == 0 || order(rows[i - 1].what, rows[i].what) != 0)
            heads[kinds++].first = &rows[i];
    if (kinds > 1)
        qsort(heads, kinds, sizeof *heads, earlier);
    return kinds;
}
