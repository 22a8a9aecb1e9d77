/* figure_style.c - eight styles of our own: luminances in equal ratios, hues far apart, the first
 * ones the most different. */
#include "beamhours/report/figure_style.h"

static const bh_figure_style styles[BH_STYLES] = {
    {9, 33, 107, 0, {0}, BH_MARK_CIRCLE},
    {205, 132, 5, 2, {6.0, 2.5}, BH_MARK_SQUARE},
    {148, 55, 8, 4, {7.0, 2.0, 1.2, 2.0}, BH_MARK_TRIANGLE},
    {4, 124, 164, 2, {1.5, 2.0}, BH_MARK_DIAMOND},
    {4, 82, 43, 2, {11.0, 3.0}, BH_MARK_DOWN},
    {227, 60, 172, 6, {6.0, 2.0, 1.2, 1.6, 1.2, 2.0}, BH_MARK_CROSS},
    {94, 43, 0, 2, {3.5, 1.5}, BH_MARK_PLUS},
    {125, 64, 210, 4, {12.0, 2.0, 3.0, 2.0}, BH_MARK_HEXAGON},
};

const bh_figure_style *bh_figure_style_at(int number)
{
    return &styles[((number % BH_STYLES) + BH_STYLES) % BH_STYLES];
}
