/* keyboard.h - what is typed, read without ever waiting for it. */
#ifndef BH_SCREEN_KEYBOARD_H
#define BH_SCREEN_KEYBOARD_H

#include <stdbool.h>
#include <stdio.h>
#include <termios.h>

/*
 * The terminal of standard input, opened once more so that a read of it returns at once: others who
 * use the terminal may have taken what there was, and they still wait in their own reads.  Standard
 * input itself where that cannot be done; how the terminal is set goes to `before`.  NULL where
 * standard input or output is none.
 */
FILE *bh_keyboard_open(struct termios *before);
void bh_keyboard_close(FILE *keyboard); /* NULL: nothing to close */

/* Whether what is typed is for the program, and not for those that run it in the background. */
bool bh_keyboard_ours(void);

#endif
