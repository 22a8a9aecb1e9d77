/* shown.c - words, units and prefixes of what is drawn; a column without a row here is shown under
 * its heading. */
#include "beamhours/report/shown.h"

#include <math.h>
#include <stdio.h>
#include <string.h>

#include "beamhours/base/nearest.h"

struct prefix {
    double scale; /* unit of the key in units of `unit` */
    const char *unit;
};

/* Falling size; the first in which the number is at least 1 is taken, else the last. */
static const struct prefix cross_sections[] = {{1e-6, "b/sr"},  {1e-3, "mb/sr"}, {1.0, "µb/sr"},
                                               {1e3, "nb/sr"},  {1e6, "pb/sr"},  {1e9, "fb/sr"},
                                               {1e12, "ab/sr"}, {0.0, NULL}};
static const struct prefix rates[] = {{1e-9, "GHz"}, {1e-6, "MHz"}, {1e-3, "kHz"},
                                      {1.0, "Hz"},   {1e3, "mHz"},  {0.0, NULL}};
static const struct prefix energies[] = {
    {1e-6, "TeV"}, {1e-3, "GeV"}, {1.0, "MeV"}, {1e3, "keV"}, {0.0, NULL}};
static const struct prefix shares[] = {{100.0, "%"}, {0.0, NULL}};

static const struct words {
    int shown;
    const char *words, *unit;
    const struct prefix *prefixes;
    bool measured;
} all_words[] = {
    {BH_COL_BEAM_KINETIC, "beam kinetic energy", "MeV", energies, false},
    {BH_COL_VERTEX_KINETIC, "beam kinetic energy at the vertex", "MeV", energies, false},
    {BH_COL_ANGLE, "laboratory angle of the detected particle", "deg", NULL, false},
    {BH_COL_SCATTERED_ANGLE, "laboratory angle of the scattered particle", "deg", NULL, false},
    {BH_COL_SCATTERED_KINETIC, "kinetic energy of the scattered particle", "MeV", energies, false},
    {BH_COL_SCATTERED_MOMENTUM, "momentum of the scattered particle", "MeV/c", NULL, false},
    {BH_COL_RECOIL_KINETIC, "kinetic energy of the recoil", "MeV", energies, false},
    {BH_COL_RECOIL_ANGLE, "laboratory angle of the recoil", "deg", NULL, false},
    {BH_COL_CENTRAL_MOMENTUM, "central momentum of the arm", "MeV/c", NULL, false},
    {BH_COL_Q2, "four-momentum transfer squared Q²", "GeV²", NULL, false},
    {BH_COL_Q, "three-momentum transfer", "1/fm", NULL, false},
    {BH_COL_EPSILON, "polarisation of the virtual photon ε", "", NULL, false},
    {BH_COL_POINT_CROSS_SECTION, "cross section per nucleus, laboratory", "µb/sr", cross_sections,
     true},
    {BH_COL_CROSS_SECTION, "mean cross section per nucleus, laboratory", "µb/sr", cross_sections,
     true},
    {BH_COL_SOLID_ANGLE, "solid angle", "msr", NULL, false},
    {BH_COL_BEAM, "beam particles", "/s", NULL, false},
    {BH_COL_SEEN, "nuclei seen", "/cm²", NULL, false},
    {BH_COL_LUMINOSITY, "luminosity per nucleus", "/cm²/s", NULL, false},
    {BH_COL_RADIATIVE, "share left by radiation", "", NULL, false},
    {BH_COL_KEPT, "share inside bite and resolution", "", NULL, false},
    {BH_COL_SIGNAL, "signal rate", "Hz", rates, true},
    {BH_COL_BACKGROUND, "background rate", "Hz", rates, false},
    {BH_COL_LIVE, "live fraction", "%", shares, false},
    {BH_COL_HOURS, "hours on the full target", "h", NULL, false},
    {BH_COL_EMPTY_HOURS, "hours on the empty target", "h", NULL, false},
    {BH_COL_CHARGE, "beam charge", "mC", NULL, false},
    {BH_COL_COUNTS, "signal counts recorded", "", NULL, true},
    {BH_COL_STATISTICAL, "statistical uncertainty of the signal", "%", shares, false},
    {BH_COL_SYSTEMATIC, "systematic uncertainty of the signal", "%", shares, false},
    {BH_COL_HOURS_TO_GOAL, "hours that reach the goal", "h", NULL, false},
    {BH_COL_PER_MRAD, "change of the rate for +1 mrad", "%", shares, false},
    {BH_COL_PER_PERMILLE, "change of the rate for +0.1 % of momentum", "%", shares, false},
    {BH_SHOWN_MERIT, "figure of merit, 1/(uncertainty² × hours)", "/h", NULL, false},
};

static const struct words *find(int shown)
{
    for (size_t i = 0; i < sizeof all_words / sizeof all_words[0]; i++)
        if (all_words[i].shown == shown)
            return &all_words[i];
    return NULL;
}

const char *bh_shown_key(int shown)
{
    return shown == BH_SHOWN_MERIT ? "figure_of_merit_per_h" : bh_column_at(shown)->key;
}

static bool is_number(int shown)
{
    return shown == BH_SHOWN_MERIT || bh_column_at(shown)->kind == BH_CELL_NUMBER;
}

int bh_shown_find(const char *key)
{
    for (int i = 0; i < BH_SHOWN_COUNT; i++)
        if (is_number(i) && strcmp(bh_shown_key(i), key) == 0)
            return i;
    return -1;
}

const char *bh_shown_suggest(const char *key)
{
    const char *keys[BH_SHOWN_COUNT];
    size_t n = 0;
    for (int i = 0; i < BH_SHOWN_COUNT; i++)
        if (is_number(i))
            keys[n++] = bh_shown_key(i);
    return bh_nearest(key, keys, n);
}

const char *bh_shown_words(int shown)
{
    const struct words *w = find(shown);
    return w ? w->words : bh_column_at(shown)->heading;
}

static double merit(double uncertainty, double full, double empty)
{
    const double hours = full + (isfinite(empty) ? empty : 0.0);
    return 1.0 / (uncertainty * uncertainty * hours);
}

double bh_shown_number(const bh_table *table, bool bins, size_t row, int shown)
{
    if (shown != BH_SHOWN_MERIT)
        return bh_table_number(table, bins, row, (bh_column_id)shown);
    return merit(bh_table_number(table, bins, row, BH_COL_STATISTICAL),
                 bh_table_number(table, bins, row, BH_COL_HOURS),
                 bh_table_number(table, bins, row, BH_COL_EMPTY_HOURS));
}

double bh_shown_on_curve(const bh_curve *curve, size_t i, int shown)
{
    if (shown != BH_SHOWN_MERIT)
        return bh_curve_y(curve, i, (bh_column_id)shown);
    return merit(bh_curve_y(curve, i, BH_COL_STATISTICAL), bh_curve_y(curve, i, BH_COL_HOURS),
                 bh_curve_y(curve, i, BH_COL_EMPTY_HOURS));
}

bool bh_shown_measured(int shown)
{
    const struct words *w = find(shown);
    return w && w->measured;
}

/* "10³⁶ /cm²/s" where bare numbers would need too many digits. */
static bh_shown_unit with_power(const char *unit, double most)
{
    static const char *const raised[] = {"⁰", "¹", "²", "³", "⁴", "⁵", "⁶", "⁷", "⁸", "⁹"};
    bh_shown_unit out = {1.0, ""};
    char power[24] = "", digits[16];
    size_t used = 0;
    if (most > 0.0 && isfinite(most) && (most >= 1e5 || most < 1e-3)) {
        const int n = 3 * (int)floor(log10(most) / 3.0);
        out.scale = n < 0 ? pow(10.0, -n) : 1.0 / pow(10.0, n);
        used = (size_t)snprintf(power, sizeof power, "10%s", n < 0 ? "⁻" : "");
        (void)snprintf(digits, sizeof digits, "%d", n < 0 ? -n : n);
        for (const char *d = digits; *d; d++)
            used += (size_t)snprintf(power + used, sizeof power - used, "%s", raised[*d - '0']);
    }
    (void)snprintf(out.unit, sizeof out.unit, "%s%s%s", power, power[0] && unit[0] ? " " : "",
                   unit);
    return out;
}

bh_shown_unit bh_shown_prefix(int shown, double lo, double hi, bool logarithmic)
{
    const struct words *w = find(shown);
    const double most = logarithmic ? sqrt(lo) * sqrt(hi) : fmax(fabs(lo), fabs(hi));
    if (!w || !w->prefixes) {
        const char *unit = w ? w->unit : bh_column_at(shown)->unit;
        return with_power(strcmp(unit, "1") == 0 ? "" : unit, logarithmic ? 1.0 : most);
    }
    const struct prefix *p = w->prefixes;
    while (p[1].unit && most > 0.0 && most * p->scale < 1.0)
        p++;
    bh_shown_unit out = {p->scale, ""};
    (void)snprintf(out.unit, sizeof out.unit, "%s", p->unit);
    return out;
}
