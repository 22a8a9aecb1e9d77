/* radiation_findings.c - what the radiative factor of an arm rests on, as warnings. */
#include <math.h>

#include "beamhours/run/yield.h"
#include "beamhours/units/constants.h"

static const double soft_most = 0.03; /* of the scattered energy: radiative.h */

static bh_remark remark_of(const bh_yield *yield, bh_remark_kind kind)
{
    const bh_arm *arm = &yield->view.arm->arm;
    return (bh_remark){.kind = kind,
                       .at = arm->energy_cut.given      ? arm->energy_cut.at
                             : arm->momentum_bite.given ? arm->momentum_bite.at
                                                        : arm->at,
                       .key = arm->energy_cut.given || !arm->momentum_bite.given ? "energy_cut"
                                                                                 : "momentum_bite",
                       .who = arm->name.text,
                       .setting = yield->view.setting->name};
}

static void find_cut(bh_yielder *yielder, const bh_yield *yield, const bh_radiated_detail *at)
{
    const bh_view *view = &yield->view;
    const bh_encounter *e = &view->line.encounter;
    char text[512];
    bh_remark r = remark_of(yield, BH_REMARK_WIDE_CUT);
    const double share = at->cut / (at->event.scattered_kinetic + e->beam->mass);
    r.low = r.high = 100 * share;
    if (share > soft_most)
        bh_remarks_note(yielder->remarks, &r);
    r = remark_of(yield, BH_REMARK_RADIATION);
    r.what = text;
    if (share <= soft_most &&
        view->radiative->caveat(e, at->cut, &at->event, text, sizeof text) > 0)
        bh_remarks_note(yielder->remarks, &r);
}

void bh_find_radiation(bh_yielder *yielder, const bh_yield *yield)
{
    const bh_view *view = &yield->view;
    bh_radiated_request request = bh_view_radiated(yielder, view, &view->line, NULL, 0);
    bh_radiated_detail at;
    if (view->line.encounter.beam->kind != BH_KIND_LEPTON ||
        view->radiative == bh_radiative_find("none"))
        return;
    bh_remark r = remark_of(yield, BH_REMARK_NO_CUT);
    if (!view->gate.given) {
        bh_remarks_note(yielder->remarks, &r);
        return;
    }
    request.signal = true;
    if (!bh_radiated_at(&request, view->axis, &at) || !(at.cut > 0))
        return;
    find_cut(yielder, yield, &at);
    r.kind = BH_REMARK_RECOIL_CUT;
    if (view->line.recoil)
        bh_remarks_note(yielder->remarks, &r);
}
