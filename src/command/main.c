/* main.c - one table of commands; nothing here computes anything. */
#include <gsl/gsl_errno.h>
#include <stdio.h>

#include "beamhours.h"

int main(void)
{
    (void)gsl_set_error_handler_off(); /* called nowhere else: GSL reports, never aborts */
    return printf("beamhours %s\n", bh_version()) < 0;
}
