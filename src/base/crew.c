/* crew.c - threads that wait for the next piece of work. */
#include "beamhours/base/crew.h"

#include <pthread.h>
#include <signal.h>
#include <stdbool.h>
#include <stdlib.h>
#include <unistd.h>

struct hand {
    bh_crew *crew;
    size_t number;
    pthread_t thread;
};

struct bh_crew {
    pthread_mutex_t lock;
    pthread_cond_t begun, done;
    void (*work)(void *of, size_t hand);
    void *of;
    size_t piece;   /* number of the piece of work; another one: it is to be done */
    size_t at_work; /* hands besides the caller's that are not done with it */
    bool over;
    size_t hands;
    struct hand hand[BH_MOST_HANDS]; /* the first stands for the caller */
};

size_t bh_crew_worthwhile(void)
{
    const long processors = sysconf(_SC_NPROCESSORS_ONLN);
    if (processors < 1)
        return 1;
    return processors < BH_MOST_HANDS ? (size_t)processors : BH_MOST_HANDS;
}

static void *wait_and_work(void *of)
{
    const struct hand *hand = of;
    bh_crew *crew = hand->crew;
    size_t did = 0;
    (void)pthread_mutex_lock(&crew->lock);
    while (!crew->over) {
        if (crew->piece == did) {
            (void)pthread_cond_wait(&crew->begun, &crew->lock);
            continue;
        }
        did = crew->piece;
        (void)pthread_mutex_unlock(&crew->lock);
        crew->work(crew->of, hand->number);
        (void)pthread_mutex_lock(&crew->lock);
        if (--crew->at_work == 0)
            (void)pthread_cond_signal(&crew->done);
    }
    (void)pthread_mutex_unlock(&crew->lock);
    return NULL;
}

bh_crew *bh_crew_new(size_t hands)
{
    bh_crew *crew = calloc(1, sizeof *crew);
    sigset_t all, before;
    if (!crew)
        return NULL;
    (void)pthread_mutex_init(&crew->lock, NULL);
    (void)pthread_cond_init(&crew->begun, NULL);
    (void)pthread_cond_init(&crew->done, NULL);
    (void)sigfillset(&all);
    (void)pthread_sigmask(SIG_SETMASK, &all, &before);
    for (crew->hands = 1; crew->hands < hands && crew->hands < BH_MOST_HANDS; crew->hands++) {
        struct hand *hand = &crew->hand[crew->hands];
        *hand = (struct hand){.crew = crew, .number = crew->hands};
        if (pthread_create(&hand->thread, NULL, wait_and_work, hand))
            break;
    }
    (void)pthread_sigmask(SIG_SETMASK, &before, NULL);
    return crew;
}

void bh_crew_free(bh_crew *crew)
{
    if (!crew)
        return;
    (void)pthread_mutex_lock(&crew->lock);
    crew->over = true;
    (void)pthread_cond_broadcast(&crew->begun);
    (void)pthread_mutex_unlock(&crew->lock);
    for (size_t i = 1; i < crew->hands; i++)
        (void)pthread_join(crew->hand[i].thread, NULL);
    (void)pthread_cond_destroy(&crew->done);
    (void)pthread_cond_destroy(&crew->begun);
    (void)pthread_mutex_destroy(&crew->lock);
    free(crew);
}

size_t bh_crew_hands(const bh_crew *crew)
{
    return crew->hands;
}

void bh_crew_work(bh_crew *crew, void (*work)(void *of, size_t hand), void *of)
{
    (void)pthread_mutex_lock(&crew->lock);
    crew->work = work;
    crew->of = of;
    crew->at_work = crew->hands - 1;
    crew->piece++;
    (void)pthread_cond_broadcast(&crew->begun);
    (void)pthread_mutex_unlock(&crew->lock);
    work(of, 0);
    (void)pthread_mutex_lock(&crew->lock);
    while (crew->at_work)
        (void)pthread_cond_wait(&crew->done, &crew->lock);
    (void)pthread_mutex_unlock(&crew->lock);
}
