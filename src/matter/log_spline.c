/* log_spline.c - natural cubic splines in logarithms. */
#include "beamhours/matter/log_spline.h"

#include <math.h>

void bh_log_spline_add(bh_log_spline *s, double x, double y)
{
    if (s->count == BH_LOG_SPLINE_KNOTS)
        return;
    s->x[s->count] = log(x);
    s->y[s->count++] = log(y);
}

static double slope(const bh_log_spline *s, size_t i)
{
    return (s->y[i + 1] - s->y[i]) / (s->x[i + 1] - s->x[i]);
}

/* The usual tridiagonal system; `upper` keeps the eliminated diagonal. */
void bh_log_spline_close(bh_log_spline *s)
{
    double upper[BH_LOG_SPLINE_KNOTS] = {0.0};
    const size_t n = s->count;
    for (size_t i = 0; i < n; i++)
        s->second[i] = 0.0;
    if (n < 3)
        return;
    for (size_t i = 1; i + 1 < n; i++) {
        const double left = s->x[i] - s->x[i - 1];
        const double right = s->x[i + 1] - s->x[i];
        const double pivot = 2.0 * (left + right) - left * upper[i - 1];
        upper[i] = right / pivot;
        s->second[i] = (6.0 * (slope(s, i) - slope(s, i - 1)) - left * s->second[i - 1]) / pivot;
    }
    for (size_t i = n - 2; i > 0; i--)
        s->second[i] -= upper[i] * s->second[i + 1];
}

static size_t piece(const bh_log_spline *s, double x)
{
    size_t low = 0;
    size_t high = s->count - 1;
    while (high - low > 1) {
        const size_t middle = (low + high) / 2;
        if (x < s->x[middle])
            high = middle;
        else
            low = middle;
    }
    return low;
}

double bh_log_spline_at(const bh_log_spline *s, double x)
{
    if (s->count < 2)
        return s->count ? exp(s->y[0]) : 1.0;
    const double u = log(x);
    const size_t i = piece(s, u);
    const double h = s->x[i + 1] - s->x[i];
    const double a = fmin(fmax((u - s->x[i]) / h, 0.0), 1.0);
    const double b = 1.0 - a;
    const double inside =
        b * s->y[i] + a * s->y[i + 1] +
        ((b * b * b - b) * s->second[i] + (a * a * a - a) * s->second[i + 1]) * h * h / 6.0;
    const double beyond = u - (s->x[i] + a * h); /* 0 within */
    const double curved =
        h / 6.0 *
        (a > 0.5 ? s->second[i] + 2.0 * s->second[i + 1] : -2.0 * s->second[i] - s->second[i + 1]);
    return exp(beyond != 0.0 ? inside + beyond * (slope(s, i) + curved) : inside);
}
