/* alike.h - rows that are of the same kind, found by sorting. */
#ifndef BH_REPORT_ALIKE_H
#define BH_REPORT_ALIKE_H

#include <stdbool.h>
#include <stddef.h>

typedef struct {
    const void *what; /* by which kinds are told apart */
    size_t row;
} bh_alike;

/* Says which of two kinds comes first: negative, 0 for the same, positive. */
typedef int bh_alike_order(const void *a, const void *b);

/* Sorts by kind; rows of the same kind keep their order.  False without memory. */
bool bh_alike_sort(bh_alike *rows, size_t count, bh_alike_order *order);

/* The first row of a kind. */
typedef struct {
    const bh_alike *first;
} bh_alike_head;

/* Of sorted rows, fills `heads` (room for `count`) with one for each kind, in the order in which
 * they stand in the table, and returns how many kinds there are. */
size_t bh_alike_heads(const bh_alike *rows, size_t count, bh_alike_order *order,
                      bh_alike_head *heads);

#endif
