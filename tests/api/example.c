/* example.c - what another program does with libbeamhours: load a plan, change a value, evaluate
 * it, read the run table by column.
 *
 *     cc example.c $(pkg-config --cflags --libs beamhours) && ./a.out plan.yaml MATERIALS-FOLDER
 */
#include <beamhours.h>

#include <stdio.h>
#include <stdlib.h>

static int fail(const bh_session *session)
{
    for (size_t i = 0; i < bh_session_messages(session); i++)
        fprintf(stderr, "%s\n", bh_session_message(session, i));
    return EXIT_FAILURE;
}

static void print_rows(const bh_session *session, const char *title)
{
    printf("%s\n", title);
    for (size_t row = 0; row < bh_session_rows(session); row++)
        printf("  %-8s %7.2f deg %10.3f Hz %8.3f h\n", bh_session_text(session, row, "setting"),
               bh_session_number(session, row, "angle_deg"),
               bh_session_number(session, row, "signal_rate_Hz"),
               bh_session_number(session, row, "hours"));
}

static int run(bh_session *session, const char *plan)
{
    if (bh_session_load(session, plan) || bh_session_evaluate(session))
        return fail(session);
    print_rows(session, "as planned");
    if (bh_session_change(session, "every_setting.goal", "1 %") || bh_session_evaluate(session))
        return fail(session);
    print_rows(session, "for 1 %");
    return EXIT_SUCCESS;
}

int main(int argc, char **argv)
{
    if (argc != 3) {
        fprintf(stderr, "usage: %s PLAN MATERIALS-FOLDER\n", argv[0]);
        return EXIT_FAILURE;
    }
    const char *const folders[] = {argv[2], NULL};
    bh_session *session = bh_session_new(folders);
    const int status = session ? run(session, argv[1]) : EXIT_FAILURE;
    bh_session_free(session);
    return status;
}
