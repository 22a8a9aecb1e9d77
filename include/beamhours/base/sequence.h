/* sequence.h - names in the order in which people count. */
#ifndef BH_BASE_SEQUENCE_H
#define BH_BASE_SEQUENCE_H

/*
 * Less than, equal to or greater than 0 as name `a` comes before `b`, is the same bytes, or comes
 * behind: byte for byte, but digits that follow each other count as one whole number of any length
 * (scan.2 before scan.10).  Names that differ by leading zeros alone come in the order of their
 * bytes.
 */
int bh_sequence(const char *a, const char *b);

#endif
