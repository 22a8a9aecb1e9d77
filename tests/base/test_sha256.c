/* test_sha256.c - published digests, and every length around the ends of blocks. */
#include "../suite.h"

#include <stdlib.h>
#include <string.h>

#include "beamhours/base/sha256.h"

static const struct {
    const char *text, *digest, *source;
} rows[] = {
    {"abc", "ba7816bf8f01cfea414140de5dae2223b00361a396177a9cb410ff61f20015ad",
     "NIST, FIPS 180-2 (2002), appendix B.1"},
    {"abcdbcdecdefdefgefghfghighijhijkijkljklmklmnlmnomnopnopq",
     "248d6a61d20638b8e5c026930c3e6039a33ce45964ff2167f6ecedd419db06c1",
     "NIST, FIPS 180-2 (2002), appendix B.2"},
    {"", "e3b0c44298fc1c149afbf4c8996fb92427ae41e4649b934ca495991b7852b855",
     "GNU coreutils sha256sum of an empty file"},
};

START_TEST(published)
{
    char digest[BH_SHA256_SIZE];
    bh_sha256(rows[_i].text, strlen(rows[_i].text), digest);
    ck_assert_msg(strcmp(digest, rows[_i].digest) == 0, "%s: %s", rows[_i].source, digest);
}
END_TEST

/* NIST, FIPS 180-2 (2002), appendix B.3: a million times the letter a. */
START_TEST(long_text)
{
    enum { MILLION = 1000000 };
    char digest[BH_SHA256_SIZE], *text = malloc(MILLION);
    ck_assert_ptr_nonnull(text);
    memset(text, 'a', MILLION);
    bh_sha256(text, MILLION, digest);
    free(text);
    ck_assert_str_eq(digest, "cdc76e5c9914fb9281a1c7e284d73e67f1809a48a497200e046d39ccc7112cd0");
}
END_TEST

/* Each length from 0 to two blocks has a digest of its own, digits only. */
START_TEST(ends_of_blocks)
{
    enum { LONGEST = 130 };
    static char digests[LONGEST][BH_SHA256_SIZE];
    char text[LONGEST];
    memset(text, 0, sizeof text);
    for (size_t n = 0; n < LONGEST; n++) {
        bh_sha256(text, n, digests[n]);
        ck_assert_uint_eq(strspn(digests[n], "0123456789abcdef"), 64);
        for (size_t k = 0; k < n; k++)
            ck_assert_str_ne(digests[n], digests[k]);
    }
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("sha256");
    tcase_add_loop_test(tests, published, 0, COUNT(rows));
    tcase_add_test(tests, long_text);
    tcase_add_test(tests, ends_of_blocks);
    return run_suite("base/sha256", tests);
}
