/* report_rows.c - the sections that are the run table's own columns, and the backgrounds. */
#include <math.h>
#include <string.h>

#include "beamhours/report/prefix.h"
#include "beamhours/report/reporting.h"

#define COUNT(list) (sizeof(list) / sizeof(list)[0])

void bh_report_kinematics(bh_reporting *x)
{
    static const int columns[] = {BH_COL_SETTING,
                                  BH_COL_ARM,
                                  BH_COL_PARTICLE,
                                  BH_COL_TARGET,
                                  BH_COL_BEAM_KINETIC,
                                  BH_COL_ANGLE,
                                  BH_COL_SCATTERED_ANGLE,
                                  BH_COL_SCATTERED_KINETIC,
                                  BH_COL_SCATTERED_MOMENTUM,
                                  BH_COL_RECOIL_KINETIC,
                                  BH_COL_RECOIL_ANGLE,
                                  BH_COL_CENTRAL_MOMENTUM,
                                  BH_COL_Q2,
                                  BH_COL_Q,
                                  BH_COL_EPSILON};
    bh_paper_add(&x->w, BH_BLOCK_SECTION, "Kinematics");
    bh_report_rows(x,
                   "Kinematics of each setting: laboratory angles; energy: kinetic, entering the "
                   "target; T', p': of the scattered particle at the vertex; T recoil and recoil: "
                   "of the struck nucleus; Q2 positive; epsilon: virtual-photon polarisation",
                   columns, COUNT(columns));
}

void bh_report_rates(bh_reporting *x)
{
    static const int sections[] = {
        BH_COL_SETTING,       BH_COL_ARM,         BH_COL_POINT_CROSS_SECTION,
        BH_COL_CROSS_SECTION, BH_COL_SOLID_ANGLE, BH_COL_BEAM,
        BH_COL_SEEN,          BH_COL_LUMINOSITY};
    static const int rates[] = {
        BH_COL_SETTING, BH_COL_ARM,        BH_COL_RADIATIVE, BH_COL_KEPT,   BH_COL_EFFICIENCY,
        BH_COL_SIGNAL,  BH_COL_BACKGROUND, BH_COL_LIVE,      BH_COL_COUNTS, BH_COL_STATISTICAL};
    bh_paper_add(&x->w, BH_BLOCK_SECTION, "Rates");
    bh_paper_add(&x->w, BH_BLOCK_WORDS,
                 "Signal rate = luminosity x mean cross section x solid angle x radiative factor x "
                 "kept share x efficiency, before dead time. Cross sections, nuclei and "
                 "luminosities are per nucleus of the scatterer, in the laboratory.");
    bh_report_rows(
        x,
        "Cross sections per nucleus (at angle: at the arm's centre; sigma: mean over "
        "acceptance and depth), solid angle, beam particles of the named kind, scatterer "
        "nuclei seen, luminosity per nucleus",
        sections, COUNT(sections));
    bh_report_rows(x,
                   "Factors and rates: radiative: share left by radiation inside the cut; kept: "
                   "share inside momentum bite and resolution; eff: efficiency; bkg: all "
                   "background, before dead time; live: share recorded after dead time, prescale "
                   "and rate limit; counts: signal recorded; stat: relative, of the "
                   "background-subtracted signal",
                   rates, COUNT(rates));
}

/* "1.06276 Hz" without its unit. */
static const char *bare(bh_reporting *x, const char *value)
{
    const char *end = strstr(value, " Hz");
    return end ? bh_paper_text(&x->w, "%.*s", (int)(end - value), value) : value;
}

static bool in_background(const char *section)
{
    return strcmp(section, "Background") == 0;
}

/* "quasi-elastic" of "quasi-elastic on 27Al in layer 1": lines of one kind have one source, which
 * the first of them says. */
static size_t kind_length(const char *name)
{
    const char *on = strstr(name, " on ");
    return on ? (size_t)(on - name) : strlen(name);
}

static const char *source_of(const bh_explanation *e, size_t line)
{
    const char *name = bh_explanation_line(e, line)->name;
    const size_t n = kind_length(name);
    for (size_t i = line + 1; i-- > 0;) {
        const bh_line *l = bh_explanation_line(e, i);
        if (l->kind == BH_LINE_SECTION)
            break;
        if (l->source && kind_length(l->name) == n && strncmp(l->name, name, n) == 0)
            return l->source;
    }
    return NULL;
}

static void items(bh_reporting *x, size_t told)
{
    const bh_explanation *e = x->told[told];
    bool inside = false;
    for (size_t i = 0; i < bh_explanation_lines(e); i++) {
        const bh_line *l = bh_explanation_line(e, i);
        if (l->kind == BH_LINE_SECTION)
            inside = in_background(l->name);
        if (!inside || l->kind != BH_LINE_FACTOR || !l->value || !strstr(l->value, " Hz"))
            continue;
        bh_paper_cell(&x->w, bh_report_row_name(x, x->told_row[told]));
        bh_paper_cell(&x->w, bh_paper_text(&x->w, "%s", l->name));
        bh_paper_cell(&x->w, bare(x, l->value));
        const char *source = source_of(e, i);
        bh_paper_cell(&x->w,
                      source ? bh_paper_text(&x->w, "[%d]", bh_paper_cite(&x->w, source)) : "");
    }
}

void bh_report_backgrounds(bh_reporting *x)
{
    static const bh_paper_column columns[] = {
        {"setting", "", false}, {"from", "", false}, {"rate", "Hz", true}, {"source", "", false}};
    bh_paper_add(&x->w, BH_BLOCK_SECTION, "Backgrounds");
    if (!x->all_told)
        bh_paper_add(&x->w, BH_BLOCK_WORDS,
                     "Item by item for the first setting of each beam particle, target and arm; "
                     "the sums of all settings stand in the table of rates.");
    bh_paper_table_open(&x->w,
                        "What each arm counts beside the signal, before dead time, largest first; "
                        "the last of a setting is the sum",
                        columns, COUNT(columns));
    for (size_t i = 0; i < x->told_count; i++)
        items(x, i);
    bh_paper_table_close(&x->w);
}

void bh_report_sensitivities(bh_reporting *x)
{
    static const int columns[] = {BH_COL_SETTING, BH_COL_ARM, BH_COL_ANGLE, BH_COL_PER_MRAD,
                                  BH_COL_PER_PERMILLE};
    bh_paper_add(&x->w, BH_BLOCK_SECTION, "Sensitivities");
    bh_report_rows(x,
                   "Relative change of the signal rate for +1 mrad of the arm's angle, and for "
                   "+0.1 % of beam momentum with the arm fixed",
                   columns, COUNT(columns));
}
