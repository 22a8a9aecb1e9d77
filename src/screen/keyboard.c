/* keyboard.c - what is typed, read without ever waiting for it. */
#include "beamhours/screen/keyboard.h"

#include <fcntl.h>
#include <unistd.h>

/* Flags belong to what is opened: those of standard input are the shell's too. */
static FILE *open_again(void)
{
    char name[256];
    if (ttyname_r(STDIN_FILENO, name, sizeof name))
        return NULL;
    const int file = open(name, O_RDONLY | O_NONBLOCK | O_NOCTTY | O_CLOEXEC);
    FILE *keyboard = file < 0 ? NULL : fdopen(file, "r");
    if (!keyboard && file >= 0)
        (void)close(file);
    return keyboard;
}

FILE *bh_keyboard_open(struct termios *before)
{
    if (!isatty(STDIN_FILENO) || !isatty(STDOUT_FILENO) || tcgetattr(STDIN_FILENO, before))
        return NULL;
    FILE *keyboard = open_again();
    return keyboard ? keyboard : stdin;
}

void bh_keyboard_close(FILE *keyboard)
{
    if (keyboard && keyboard != stdin)
        (void)fclose(keyboard);
}

bool bh_keyboard_ours(void)
{
    const pid_t front = tcgetpgrp(STDIN_FILENO);
    return front < 0 || front == getpgrp();
}
