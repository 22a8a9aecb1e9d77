/* pasting.c - the marks around what is pasted. */
#include "beamhours/screen/pasting.h"

static const double silence = 2; /* s */

bh_press bh_pasting_mark(bh_pasting *pasting, bool begins, double now)
{
    *pasting = (bh_pasting){.on = begins, .heard = now};
    return (bh_press){.kind = begins ? BH_PRESS_NOTHING : BH_PRESS_PASTED};
}

/* On a slow line the mark is not known as one: then its characters are taken out here.  They say
 * nothing in a text, so none is put back where the mark breaks off. */
bh_press bh_pasting_take(bh_pasting *pasting, uint32_t code, double now)
{
    static const char end[] = "\033[201~";
    pasting->heard = now;
    if (!pasting->on)
        return bh_press_of(code);
    if (code == (uint32_t)end[pasting->came])
        pasting->came++;
    else
        pasting->came = code == (uint32_t)end[0];
    if (!end[pasting->came])
        return bh_pasting_mark(pasting, false, now);
    if (pasting->came)
        return (bh_press){.kind = BH_PRESS_NOTHING};
    return bh_press_pasted(code);
}

bh_press bh_pasting_rest(bh_pasting *pasting, double now)
{
    if (!pasting->on || now - pasting->heard < silence)
        return (bh_press){.kind = BH_PRESS_NOTHING};
    return bh_pasting_mark(pasting, false, now);
}

double bh_pasting_wait(const bh_pasting *pasting, double most)
{
    return pasting->on && (most < 0 || most > silence) ? silence : most;
}
