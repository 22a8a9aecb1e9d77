/* sha256.h - the digest by which a reader tells that two files are the same. */
#ifndef BH_BASE_SHA256_H
#define BH_BASE_SHA256_H

#include <stddef.h>

enum { BH_SHA256_SIZE = 65 }; /* [bytes] 64 digits and the NUL */

/* Writes the SHA-256 digest of `length` [bytes] in hexadecimal digits.  FIPS 180-4 (2015). */
void bh_sha256(const void *bytes, size_t length, char out[BH_SHA256_SIZE]);

#endif
