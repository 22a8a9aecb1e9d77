/* ticks.c - steps of 1, 2, 5, from fine to coarse, until the labels have room. */
#include "beamhours/base/ticks.h"

#include <math.h>
#include <stdio.h>
#include <string.h>

/* A step of an axis: `digit` (1, 2, 5) times ten to the `power`. */
struct step {
    int digit, power;
};

/* Farther from 1 than these, labels become powers of ten. */
enum { PLAIN_FROM = -4, PLAIN_TO = 5 };

double bh_axis_place(const bh_axis *axis, double value)
{
    if (!axis->logarithmic)
        return (value - axis->from) / (axis->to - axis->from);
    if (!(value > 0.0))
        return NAN;
    return log(value / axis->from) / log(axis->to / axis->from);
}

/* --- labels --- */

static void put(char out[BH_TICK_LABEL], size_t *used, const char *piece)
{
    const size_t length = strlen(piece);
    if (*used + length + 1 > BH_TICK_LABEL)
        return;
    memcpy(out + *used, piece, length + 1);
    *used += length;
}

/* "12.50" with a true minus sign; no sign before a zero. */
static void plain_label(double value, int decimals, char out[BH_TICK_LABEL])
{
    char digits[400];
    size_t used = 0;
    (void)snprintf(digits, sizeof digits, "%.*f", decimals, fabs(value));
    out[0] = '\0';
    if (value < 0.0 && strspn(digits, "0.") < strlen(digits))
        put(out, &used, "−");
    put(out, &used, digits);
}

/* "10⁻³" or "2·10⁻³". */
static void power_label(int digit, int power, char out[BH_TICK_LABEL])
{
    static const char *const raised[] = {"⁰", "¹", "²", "³", "⁴", "⁵", "⁶", "⁷", "⁸", "⁹"};
    char digits[16];
    size_t used = 0;
    out[0] = '\0';
    if (digit > 1) {
        (void)snprintf(digits, sizeof digits, "%d·", digit);
        put(out, &used, digits);
    }
    put(out, &used, "10");
    if (power < 0)
        put(out, &used, "⁻");
    (void)snprintf(digits, sizeof digits, "%d", power < 0 ? -power : power);
    for (const char *d = digits; *d; d++)
        put(out, &used, raised[*d - '0']);
}

/* --- room --- */

static double half(const bh_tick_room *room, const bh_tick *tick)
{
    return tick->label[0] ? room->extent(room->asker, tick->label) / 2.0 : 0.0;
}

/* Whether every label keeps its distance from the one before. */
static bool fits(const bh_axis *axis, const bh_tick_room *room, const bh_ticks *t)
{
    for (int i = 1; i < t->count; i++) {
        const double apart = room->length * (bh_axis_place(axis, t->tick[i].at) -
                                             bh_axis_place(axis, t->tick[i - 1].at));
        const double need = half(room, &t->tick[i]) + half(room, &t->tick[i - 1]) + room->apart;
        if (apart < need || apart < room->space)
            return false;
    }
    return true;
}

/* Takes the labels away that come too close to the last one kept: where nothing else helps. */
static void thin(const bh_axis *axis, const bh_tick_room *room, bh_ticks *t)
{
    int kept = 0;
    for (int i = 1; i < t->count; i++) {
        const double apart = room->length * (bh_axis_place(axis, t->tick[i].at) -
                                             bh_axis_place(axis, t->tick[kept].at));
        if (apart < half(room, &t->tick[i]) + half(room, &t->tick[kept]) + room->apart)
            t->tick[i].label[0] = '\0';
        else
            kept = i;
    }
}

/* --- linear --- */

static double step_size(struct step s)
{
    return s.power < 0 ? s.digit / pow(10.0, -s.power) : s.digit * pow(10.0, s.power);
}

static struct step coarser(struct step s)
{
    if (s.digit == 1)
        return (struct step){2, s.power};
    return s.digit == 2 ? (struct step){5, s.power} : (struct step){1, s.power + 1};
}

/* The n-th multiple of a step, without the error that adding up would gather. */
static double multiple(double n, struct step s)
{
    return s.power < 0 ? n * s.digit / pow(10.0, -s.power) : n * s.digit * pow(10.0, s.power);
}

/* Numbers of the first and last multiple of a step inside the axis. */
static void inside(const bh_axis *axis, struct step s, double *first, double *last)
{
    const double size = step_size(s), slack = 1e-9 * (axis->to - axis->from) / size;
    *first = ceil(axis->from / size - slack);
    *last = floor(axis->to / size + slack);
}

static void linear_minor(const bh_axis *axis, struct step s, bh_ticks *out)
{
    static const struct step finer[] = {[1] = {2, -1}, [2] = {5, -1}, [5] = {1, 0}};
    const struct step f = {finer[s.digit].digit, s.power + finer[s.digit].power};
    double first, last;
    inside(axis, f, &first, &last);
    out->minor_count = 0;
    if (last - first >= BH_MOST_MINOR_TICKS)
        return;
    const int each = s.digit == 2 ? 4 : 5, count = (int)(last - first) + 1;
    for (int i = 0; i < count; i++)
        if (fabs(remainder(first + i, each)) > 0.5)
            out->minor[out->minor_count++] = multiple(first + i, f);
}

static bool linear_try(const bh_axis *axis, struct step s, bh_ticks *out)
{
    double first, last;
    inside(axis, s, &first, &last);
    if (last - first >= BH_MOST_TICKS)
        return false;
    out->count = (int)(last - first) + 1;
    for (int i = 0; i < out->count; i++) {
        bh_tick *t = &out->tick[i];
        t->at = multiple(first + i, s);
        plain_label(t->at, s.power < 0 ? -s.power : 0, t->label);
    }
    return true;
}

static void linear(const bh_axis *axis, const bh_tick_room *room, bh_ticks *out)
{
    struct step s = {1, (int)floor(log10(axis->to - axis->from)) - 2};
    bh_ticks found = {.count = 0};
    bool have = false;
    for (int tries = 0; tries < 12; tries++, s = coarser(s)) {
        bh_ticks t = {.count = 0};
        if (!linear_try(axis, s, &t))
            continue;
        if (have && t.count < 2)
            break; /* rather the ones before with fewer labels than an axis without a scale */
        linear_minor(axis, s, &t);
        found = t;
        have = true;
        if (fits(axis, room, &t))
            break;
    }
    *out = found;
    thin(axis, room, out);
}

/* --- logarithmic --- */

/* Which ticks of each decade have labels: `digits`, in each `every`-th decade. */
struct plan {
    const char *digits;
    int every;
};

static double times_power(int digit, int power)
{
    return power < 0 ? digit / pow(10.0, -power) : digit * pow(10.0, power);
}

static bool within(const bh_axis *axis, double value)
{
    return value >= axis->from * (1.0 - 1e-9) && value <= axis->to * (1.0 + 1e-9);
}

static void add_minor(bh_ticks *out, double value)
{
    if (out->minor_count < BH_MOST_MINOR_TICKS)
        out->minor[out->minor_count++] = value;
}

static bool add_major(bh_ticks *out, int digit, int power, bool plain)
{
    if (out->count == BH_MOST_TICKS)
        return false;
    bh_tick *t = &out->tick[out->count++];
    t->at = times_power(digit, power);
    if (plain)
        plain_label(t->at, power < 0 ? -power : 0, t->label);
    else
        power_label(digit, power, t->label);
    return true;
}

/* One decade: ten to the `power` and its multiples. */
static bool decade(const bh_axis *axis, const struct plan *p, int power, bool plain, bh_ticks *out)
{
    for (int digit = 1; digit <= 9; digit++) {
        const double value = times_power(digit, power);
        if (!within(axis, value))
            continue;
        const bool labelled = strchr(p->digits, '0' + digit) && power % p->every == 0;
        if (labelled && !add_major(out, digit, power, plain))
            return false;
        if (!labelled && (p->every == 1 || digit == 1))
            add_minor(out, value);
    }
    return true;
}

static bool logarithmic_try(const bh_axis *axis, const struct plan *p, bh_ticks *out)
{
    const int first = (int)floor(log10(axis->from) + 1e-9), last = (int)floor(log10(axis->to));
    const bool plain = first >= PLAIN_FROM && last <= PLAIN_TO;
    out->count = out->minor_count = 0;
    for (int power = first; power <= last; power++)
        if (!decade(axis, p, power, plain, out))
            return false;
    return true;
}

static void logarithmic(const bh_axis *axis, const bh_tick_room *room, bh_ticks *out)
{
    static const struct plan plans[] = {{"125", 1}, {"1", 1},  {"1", 2},  {"1", 5},
                                        {"1", 10},  {"1", 20}, {"1", 50}, {"1", 100}};
    const double decades = log10(axis->to / axis->from);
    bh_ticks found = {.count = 0};
    for (size_t i = 0; i < sizeof plans / sizeof plans[0]; i++) {
        bh_ticks t = {.count = 0};
        if ((i == 0 && decades > 3.0) || !logarithmic_try(axis, &plans[i], &t))
            continue;
        if (found.count && t.count < 2)
            break;
        found = t;
        if (fits(axis, room, &t))
            break;
    }
    if (found.count >= 3 || decades >= 1.5) {
        *out = found;
        thin(axis, room, out);
    } else {
        linear(axis, room, out);
    }
}

void bh_ticks_choose(const bh_axis *axis, const bh_tick_room *room, bh_ticks *out)
{
    *out = (bh_ticks){.count = 0};
    if (!(axis->from < axis->to) || !isfinite(axis->to - axis->from))
        return;
    if (!axis->logarithmic)
        linear(axis, room, out);
    else if (axis->from > 0.0)
        logarithmic(axis, room, out);
}

/* --- range --- */

bh_axis bh_axis_around(double lo, double hi, bool logarithmic)
{
    const double room = 0.05, near_zero = 0.35;
    bh_axis axis = {lo, hi, logarithmic};
    if (logarithmic) {
        const double wider = fmax(pow(hi / lo, room), hi > lo * 1.001 ? 1.0 : 1.5);
        axis.from = lo / wider;
        axis.to = hi * wider;
        return axis;
    }
    double wider = room * (hi - lo);
    if (!(hi - lo > 1e-9 * fmax(fabs(lo), fabs(hi))))
        wider = fabs(hi) > 0.0 ? 0.2 * fabs(hi) : 1.0;
    axis.from = lo >= 0.0 && lo <= near_zero * hi ? 0.0 : lo - wider;
    axis.to = hi <= 0.0 && hi >= near_zero * lo ? 0.0 : hi + wider;
    if (!(axis.from < axis.to))
        axis.to = axis.from + 1.0;
    return axis;
}
