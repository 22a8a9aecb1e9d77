/* terminal_letters.c - which letters the terminal is said to have. */
#include <langinfo.h>
#include <locale.h>
#include <string.h>

#include "beamhours/screen/terminal.h"

bool bh_terminal_unicode(void)
{
    if (!setlocale(LC_CTYPE, ""))
        return false;
    return strcmp(nl_langinfo(CODESET), "UTF-8") == 0;
}
