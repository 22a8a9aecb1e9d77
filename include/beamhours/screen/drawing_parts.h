/* drawing_parts.h - the model drawn into cells: all of it, and its parts. */
#ifndef BH_SCREEN_DRAWING_PARTS_H
#define BH_SCREEN_DRAWING_PARTS_H

#include "beamhours/screen/model.h"

void bh_draw(const bh_model *model, bh_canvas *canvas);
void bh_draw_title(const bh_model *model, const bh_arrangement *places, bh_canvas *canvas);
void bh_draw_plan(const bh_model *model, const bh_arrangement *places, bh_canvas *canvas);
void bh_draw_table(const bh_model *model, const bh_arrangement *places, bh_canvas *canvas);
void bh_draw_curve(const bh_model *model, const bh_arrangement *places, bh_canvas *canvas);
void bh_draw_over(const bh_model *model, const bh_arrangement *places, bh_canvas *canvas);
void bh_draw_solving(const bh_model *model, const bh_arrangement *places, bh_canvas *canvas);
void bh_draw_field(bh_canvas *canvas, bh_spot spot, const bh_field *field);

#endif
