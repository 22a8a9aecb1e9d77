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
    const char *words, *unit;
    const struct prefix *prefixes;
    int shown;
    int measured; /* 1: with the uncertainty of the signal */
} all_words[] = {
    {"beam kinetic energy", "MeV", energies, BH_COL_BEAM_KINETIC, 0},
    {"beam kinetic energy at the vertex", "MeV", energies, BH_COL_VERTEX_KINETIC, 0},
    {"laboratory angle of the detected particle", "deg", NULL, BH_COL_ANGLE, 0},
    {"laboratory angle of the scattered particle", "deg", NULL, BH_COL_SCATTERED_ANGLE, 0},
    {"kinetic energy of the scattered particle", "MeV", energies, BH_COL_SCATTERED_KINETIC, 0},
    {"momentum of the scattered particle", "MeV/c", NULL, BH_COL_SCATTERED_MOMENTUM, 0},
    {"kinetic energy of the recoil", "MeV", energies, BH_COL_RECOIL_KINETIC, 0},
    {"laboratory angle of the recoil", "deg", NULL, BH_COL_RECOIL_ANGLE, 0},
    {"central momentum of the arm", "MeV/c", NULL, BH_COL_CENTRAL_MOMENTUM, 0},
    {"four-momentum transfer squared Q²", "GeV²", NULL, BH_COL_Q2, 0},
    {"three-momentum transfer", "1/fm", NULL, BH_COL_Q, 0},
    {"polarisation of the virtual photon ε", "", NULL, BH_COL_EPSILON, 0},
    {"cross section per nucleus, laboratory", "µb/sr", cross_sections, BH_COL_POINT_CROSS_SECTION,
     1},
    {"mean cross section per nucleus, laboratory", "µb/sr", cross_sections, BH_COL_CROSS_SECTION,
     1},
    {"solid angle", "msr", NULL, BH_COL_SOLID_ANGLE, 0},
    {"beam particles", "/s", NULL, BH_COL_BEAM, 0},
    {"nuclei seen", "/cm²", NULL, BH_COL_SEEN, 0},
    {"luminosity per nucleus", "/cm²/s", NULL, BH_COL_LUMINOSITY, 0},
    {"share left by radiation", "", NULL, BH_COL_RADIATIVE, 0},
    {"share inside bite and resolution", "", NULL, BH_COL_KEPT, 0},
    {"signal rate", "Hz", rates, BH_COL_SIGNAL, 1},
    {"background rate", "Hz", rates, BH_COL_BACKGROUND, 0},
    {"live fraction", "%", shares, BH_COL_LIVE, 0},
    {"hours on the full target", "h", NULL, BH_COL_HOURS, 0},
    {"hours on the empty target", "h", NULL, BH_COL_EMPTY_HOURS, 0},
    {"beam charge", "mC", NULL, BH_COL_CHARGE, 0},
    {"signal counts recorded", "", NULL, BH_COL_COUNTS, 1},
    {"statistical uncertainty of the signal", "%", shares, BH_COL_STATISTICAL, 0},
    {"systematic uncertainty of the signal", "%", shares, BH_COL_SYSTEMATIC, 0},
    {"hours that reach the goal", "h", NULL, BH_COL_HOURS_TO_GOAL, 0},
    {"change of the rate for +1 mrad", "%", shares, BH_COL_PER_MRAD, 0},
    {"change of the rate for +0.1 % of momentum", "%", shares, BH_COL_PER_PERMILLE, 0},
    {"figure of merit, 1/(uncertainty² × hours)", "/h", NULL, BH_SHOWN_MERIT, 0},
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
    return w && w->measured != 0;
}

/* "10³⁶ /cm²/s" where bare numbers would need too many digits. */
static bh_shown_unit with_power(const char *unit, double most)
{
    static const char *const raised[] = {"⁰", "¹", "²", "³", "⁴", "⁵", "⁶", "⁷", "⁸", "⁹"};
    bh_shown_unit out = {1.0, ""};
    char power[24] = "", digits[16];
    if (most > 0.0 && isfinite(most) && (most >= 1e5 || most < 1e-3)) {
        const int n = 3 * (int)floor(log10(most) / 3.0);
        out.scale = n < 0 ? pow(10.0, -n) : 1.0 / pow(10.0, n);
        size_t used = (size_t)snprintf(power, sizeof power, "10%s", n < 0 ? "⁻" : "");
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
    const double most = logarithmic ? pow(lo, 0.25) * pow(hi, 0.75) : fmax(fabs(lo), fabs(hi));
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
