# summary.awk - the closing line of `make check`: adds up what the test programs said; fails when one failed.
/^[0-9]+%: Checks: / {
    gsub(/,/, "")
    passed += $3 - $5 - $7; failed += $5 + $7
}
/\[.*\.run\] Error/ { broken++; match($0, /\[[^][]*\.run\]/); names = names "\n    " substr($0, RSTART, RLENGTH) }
/^command lines: / { passed += $3; failed += $5 }
/: skipped: / { skipped++ }
/^status / { status = $2 }
END {
    if (broken) printf "failed:%s\n", names
    if (status && !failed) failed = broken ? broken : 1
    printf "%d passed, %d failed, %d skipped\n", passed, failed, skipped
    exit status || failed || !passed
}
