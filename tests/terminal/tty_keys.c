/* tty_keys.c - keys, mouse and pasted text, as a terminal sends them. */
#include <errno.h>
#include <stdio.h>
#include <string.h>
#include <unistd.h>

#include "tty.h"

static const struct {
    const char *name, *bytes;
} keys[] = {
    {"Up", "\033OA"},      {"Down", "\033OB"},      {"Right", "\033OC"},   {"Left", "\033OD"},
    {"PageUp", "\033[5~"}, {"PageDown", "\033[6~"}, {"Home", "\033OH"},    {"End", "\033OF"},
    {"Tab", "\t"},         {"BackTab", "\033[Z"},   {"Enter", "\r"},       {"Escape", "\033"},
    {"F1", "\033OP"},      {"F5", "\033[15~"},      {"F12", "\033[24~"},   {"Insert", "\033[2~"},
    {"Rubout", "\177"},    {"Delete", "\033[3~"},   {"Interrupt", "\003"}, {"Suspend", "\032"}};

static void send_bytes(tty *t, const char *bytes, size_t length)
{
    while (length > 0) {
        const ssize_t n = write(t->master, bytes, length);
        if (n > 0) {
            bytes += n;
            length -= (size_t)n;
        } else {
            ck_assert_msg(errno == EAGAIN || errno == EINTR, "%s", strerror(errno));
            tty_pump(t, 10);
        }
    }
}

/* A mouse event as xterm sends it: button, column and row from 1. */
static void send_button(tty *t, int button, int row, int column)
{
    char bytes[64];
    int n = snprintf(bytes, sizeof bytes, "\033[<%d;%d;%dM", button, column + 1, row + 1);
    send_bytes(t, bytes, (size_t)n);
    if (button)
        return;
    n = snprintf(bytes, sizeof bytes, "\033[<0;%d;%dm", column + 1, row + 1);
    send_bytes(t, bytes, (size_t)n);
}

static size_t send_mouse(tty *t, const char *at)
{
    int row = 0, column = 0, used = 0;
    if (sscanf(at, "<Click %d,%d>%n", &row, &column, &used) == 2 && used)
        send_button(t, 0, row, column);
    else if (sscanf(at, "<WheelUp %d,%d>%n", &row, &column, &used) == 2 && used)
        send_button(t, 64, row, column);
    else if (sscanf(at, "<WheelDown %d,%d>%n", &row, &column, &used) == 2 && used)
        send_button(t, 65, row, column);
    return (size_t)used;
}

static size_t send_key(tty *t, const char *at)
{
    if (at[0] != '<' || at[1] == '<') {
        send_bytes(t, at, 1);
        return at[0] == '<' ? 2 : 1;
    }
    for (size_t i = 0; i < sizeof keys / sizeof *keys; i++) {
        const size_t n = strlen(keys[i].name);
        if (strncmp(at + 1, keys[i].name, n) == 0 && at[n + 1] == '>') {
            send_bytes(t, keys[i].bytes, strlen(keys[i].bytes));
            return n + 2;
        }
    }
    const size_t used = send_mouse(t, at);
    ck_assert_msg(used > 0, "no such key: %s", at);
    return used;
}

void tty_type(tty *t, const char *script)
{
    while (*script)
        script += send_key(t, script);
}

void tty_send(tty *t, const char *bytes)
{
    send_bytes(t, bytes, strlen(bytes));
}

void tty_paste(tty *t, const char *text)
{
    send_bytes(t, "\033[200~", 6);
    send_bytes(t, text, strlen(text));
    send_bytes(t, "\033[201~", 6);
}
