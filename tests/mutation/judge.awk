# judge.awk - what became of the mistakes: survivors.tsv (file, line before, line after, why), fates, list.
FNR == 1 { part++ }
part == 1 && !/^#/ {
    if (NF != 4 || $4 == "") { print FILENAME ":" FNR ": want file, line before, line after, why"; bad = 1 }
    why[$1, $2, $3] = $4; row[$1, $2, $3] = FNR
}
part == 2 { fate[$1] = $2; count[$2 ~ /compiler$/ ? "not made" : $2 ~ /^noticed/ ? "noticed" : "survives"]++ }
part == 3 {
    key = $2 SUBSEP $5 SUBSEP $6
    if (fate[$1] ~ /^noticed|compiler$/) { if (key in why) { print "survivors.tsv:" row[key] ": " fate[$1] ": not needed"; bad = 1 } }
    else if (key in why) { explained++ }
    else {
        bad = 1
        printf "%s:%d: nobody notices (%s)\n  - %s\n  + %s\n", $2, $3, $4, $5, $6
    }
}
END {
    n = count["noticed"] + count["survives"]
    printf "%d mistakes made: %d noticed, %d survive (%d explained); %d more were refused by the compiler or the same to it\n",
        n, count["noticed"], count["survives"], explained, count["not made"]
    if (n < least) { print "fewer than " least; bad = 1 }
    exit bad
}
