/* drawing_module.c - what beamhours-draw.so offers to the program. */
#include "beamhours/report/drawing.h"

__attribute__((visibility("default"))) bh_drawing_offer bh_drawing_offered;

const bh_drawing *bh_drawing_offered(void)
{
    static const bh_drawing all = {.figure = sizeof(bh_figure),
                                   .paper = sizeof(bh_paper),
                                   .write = bh_figure_write,
                                   .inline_svg = bh_figure_inline,
                                   .pdf = bh_paper_pdf};
    return &all;
}
