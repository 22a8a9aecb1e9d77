/* choices.h - what there is to choose from; for the files of this room. */
#ifndef BH_SCREEN_CHOICES_H
#define BH_SCREEN_CHOICES_H

#include "beamhours/screen/model.h"

/* Adds a choice to the open chooser; texts are copied. */
void bh_choices_add(bh_model *model, const char *name, const char *about, const char *more);

/* Fills it with what may stand at `path` of the plan; false where that is no choice of a few. */
bool bh_choices_for(bh_model *model, const char *path);

/* Fills it with the keys that may be added to the mapping at `path`; `more` is an example. */
void bh_choices_of_keys(bh_model *model, const char *path);

/* The row in focus is among those in view. */
void bh_choose_keep_in_view(bh_model *model);

/* What there is to say of a choice below the list, into `out`: of a material it is worked out only
 * when it is asked for. */
void bh_choices_more(const bh_model *model, const bh_choice *choice, bh_text *out);

#endif
