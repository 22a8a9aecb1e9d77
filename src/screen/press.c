/* press.c - characters that are keys, and those that are text. */
#include "beamhours/screen/press.h"

#include <stddef.h>

static bool is_text(uint32_t code)
{
    return code >= ' ' && !(code >= 0x7F && code < 0xA0);
}

bh_press bh_press_of(uint32_t code)
{
    static const struct {
        uint32_t code;
        bh_press_kind kind;
    } controls[] = {{'\t', BH_PRESS_TAB},    {'\r', BH_PRESS_ENTER}, {'\n', BH_PRESS_ENTER},
                    {27, BH_PRESS_ESCAPE},   {127, BH_PRESS_RUBOUT}, {8, BH_PRESS_RUBOUT},
                    {3, BH_PRESS_INTERRUPT}, {26, BH_PRESS_SUSPEND}};
    for (size_t i = 0; i < sizeof controls / sizeof controls[0]; i++)
        if (controls[i].code == code)
            return (bh_press){.kind = controls[i].kind};
    if (!is_text(code))
        return (bh_press){.kind = BH_PRESS_NOTHING};
    return (bh_press){.kind = BH_PRESS_POINT, .point = code};
}

bh_press bh_press_pasted(uint32_t code)
{
    if (code == '\r')
        code = '\n';
    if (code == '\t')
        code = ' ';
    if (code != '\n' && !is_text(code))
        return (bh_press){.kind = BH_PRESS_NOTHING};
    return (bh_press){.kind = BH_PRESS_POINT, .point = code, .pasted = true};
}
