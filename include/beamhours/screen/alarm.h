/* alarm.h - signals, for the file that shows the screen. */
#ifndef BH_SCREEN_ALARM_H
#define BH_SCREEN_ALARM_H

#include <signal.h>
#include <stdbool.h>
#include <termios.h>

#include "beamhours/base/rescue.h"

/* Catches what resizes, ends, stops, resumes or fails the program.  There is one of it in a
 * process. */
void bh_alarm_catch(void);
void bh_alarm_clear(void);

/* Keeps these signals back (the mask before goes to `before`), or lets them through. */
void bh_alarm_block(bool on, sigset_t *before);

/* For a failure of the program itself: how the terminal was, what is sent to put it back, whether
 * it has to be put back, what unsaved work there is and which mark of an open file. */
void bh_alarm_begin(const struct termios *before);
void bh_alarm_way_back(const char *text);
void bh_alarm_screen(bool on);
void bh_alarm_keep(bh_rescue *rescue, const char *mark);

/* What happened since it was last asked; the signal that is to end the program, or 0. */
bool bh_alarm_resized(void);
bool bh_alarm_stopping(void); /* it is to stop, the terminal put back before */
bool bh_alarm_resumed(void);
int bh_alarm_ended(void);

/* Stops the program, `whole`: with the job it belongs to, until it is resumed; false at once where
 * nobody is there who could resume it. */
bool bh_alarm_stop(bool whole);

/* Stops until it is called back, and has the screen set up anew; false as bh_alarm_stop. */
bool bh_alarm_step_aside(void);

/* The size of the terminal, 24 by 80 where it does not say; whether that is another one. */
bool bh_alarm_size(int *rows, int *columns);

/* As if a signal had come. */
void bh_alarm_resume(void);
void bh_alarm_end(int number);

#endif
