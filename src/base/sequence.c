/* sequence.c - names in the order in which people count. */
#include "beamhours/base/sequence.h"

#include <string.h>

static const char digits[] = "0123456789";

/* Of the whole numbers that both begin with; they end behind them. */
static int by_number(const char **a, const char **b)
{
    *a += strspn(*a, "0");
    *b += strspn(*b, "0");
    const size_t m = strspn(*a, digits), n = strspn(*b, digits);
    const int order = m == n ? strncmp(*a, *b, m) : m < n ? -1 : 1;
    *a += m;
    *b += n;
    return order;
}

int bh_sequence(const char *a, const char *b)
{
    const char *x = a, *y = b;
    while (*x && *y) {
        if (strspn(x, digits) && strspn(y, digits)) {
            const int order = by_number(&x, &y);
            if (order)
                return order;
        } else if (*x != *y) {
            break;
        } else {
            x++;
            y++;
        }
    }
    const int order = (unsigned char)*x - (unsigned char)*y;
    return order ? order : strcmp(a, b);
}
