/* counter_random.h - random numbers for tests that are functions of a counter: the same anywhere,
 * in any order.  Philox 4x32-10, Salmon, Moraes, Dror and Shaw, SC11 (2011). */
#ifndef BH_TESTS_COUNTER_RANDOM_H
#define BH_TESTS_COUNTER_RANDOM_H

#include <math.h>
#include <stdint.h>

typedef struct {
    uint32_t word[4];
} philox_block;

static inline philox_block philox(philox_block counter, uint64_t seed)
{
    uint32_t key[2] = {(uint32_t)seed, (uint32_t)(seed >> 32)};
    philox_block c = counter;
    for (int round = 0; round < 10; round++) {
        const uint64_t a = (uint64_t)0xD2511F53u * c.word[0];
        const uint64_t b = (uint64_t)0xCD9E8D57u * c.word[2];
        c = (philox_block){{(uint32_t)(b >> 32) ^ c.word[1] ^ key[0], (uint32_t)b,
                            (uint32_t)(a >> 32) ^ c.word[3] ^ key[1], (uint32_t)a}};
        key[0] += 0x9E3779B9u;
        key[1] += 0xBB67AE85u;
    }
    return c;
}

/* Two numbers evenly between 0 and 1, ends excluded, of event `n` and draw `draw`. */
static inline void even_pair(uint64_t seed, uint64_t n, uint32_t draw, double out[2])
{
    const philox_block counter = {{(uint32_t)n, (uint32_t)(n >> 32), draw, 0}};
    const philox_block r = philox(counter, seed);
    for (int i = 0; i < 2; i++) {
        const uint64_t bits = ((uint64_t)r.word[2 * i] << 20) ^ r.word[2 * i + 1];
        out[i] = ((double)(bits & 0xFFFFFFFFFFFFFull) + 0.5) / 4503599627370496.0;
    }
}

/* A standard normal deviate of event `n` and draw `draw`: Box and Muller. */
static inline double normal_deviate(uint64_t seed, uint64_t n, uint32_t draw)
{
    double u[2];
    even_pair(seed, n, draw, u);
    return sqrt(-2 * log(u[0])) * cos(6.283185307179586 * u[1]);
}

#endif
