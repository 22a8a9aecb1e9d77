/* keeper.h - the user's file: reading, saving, noticing what others did to it, and unsaved work. */
#ifndef BH_SCREEN_KEEPER_H
#define BH_SCREEN_KEEPER_H

#include "beamhours/base/presence.h"
#include "beamhours/base/rescue.h"
#include "beamhours/base/stamp.h"
#include "beamhours/screen/model.h"

typedef struct {
    char path[4096];
    bh_stamp stamp;
    bh_rescue *rescue; /* NULL before it is known which session of several this is */
    bh_presence *mark;
    bh_rescue *offered; /* of a session that ended, and its mark; NULL: none is */
    bh_presence *offered_mark;
    uint32_t passed; /* numbers of sessions of which no work is to be offered any more */
    bool asked;      /* others and unsaved work were asked about */
    bool insists;    /* the user goes on although someone else has the file open */
    size_t version;  /* of the text that the rescue was last told of */
    double pending;  /* [s] since when unsaved work waits to be written; below 0: none does */
    double looked;   /* [s] when the file was last looked at */
    bool warned;     /* that unsaved work cannot be written */
} bh_keeper;

/* Reads the file into `into`.  Errors as bh_stamp_read. */
BH_CHECKED bh_code bh_keeper_open(bh_keeper *keeper, const char *path, bh_text *into,
                                  bh_error *err);

/* Begins a file that is not there yet: NAME.yaml here, or the next free name. */
void bh_keeper_begin(bh_keeper *keeper, const char *name);

/* Lets go of it.  `drop`: the unsaved work is not wanted; else it stays beside the file. */
void bh_keeper_close(bh_keeper *keeper, bool drop);

/* Marks the plan as open here; asks, and returns true, where someone else has it open. */
bool bh_keeper_others(bh_keeper *keeper, bh_model *model);

/* What is offered stays where it is. */
void bh_keeper_leave_offer(bh_keeper *keeper);

/* Asks what has to be asked before work begins: someone else has it open, unsaved work is there. */
void bh_keeper_greet(bh_keeper *keeper, bh_model *model);
void bh_keeper_take_over(bh_keeper *keeper, bh_model *model);

/* Puts the unsaved work that is offered into `into`. */
bool bh_keeper_rescued(bh_keeper *keeper, bh_model *model, bh_text *into);

/* It became the text: it is this screen's now.  Is there more that was not offered yet? */
bool bh_keeper_adopt(bh_keeper *keeper);

/* Throws it away; what is older is offered next. */
void bh_keeper_refuse(bh_keeper *keeper, bh_model *model);

/* Saves, or asks, and says what came of it; `over`: although the file is another one. */
bool bh_keeper_save(bh_keeper *keeper, bh_model *model, bool over);

/* Saves under the name in the model's field. */
bool bh_keeper_save_as(bh_keeper *keeper, bh_model *model);

/* Reads the file again, for BH_WISH_RELOAD. */
bool bh_keeper_read(bh_keeper *keeper, bh_model *model, bh_text *into);

/* Makes unsaved work ready to be written, at the time `now` [s]. */
void bh_keeper_tell(bh_keeper *keeper, bh_model *model, double now);

/* Writes what is ready, and says when that becomes impossible or possible again. */
bool bh_keeper_write(bh_keeper *keeper, bh_model *model);

/* Looks after unsaved work at the time `now` [s]; returns [s] after how long it has to again, below
 * 0: never. */
double bh_keeper_tend(bh_keeper *keeper, bh_model *model, double now);

/* Before a key at the time `now` [s]: did the file change?  Asks, and returns true, where it did.
 */
bool bh_keeper_look(bh_keeper *keeper, bh_model *model, double now);

#endif
