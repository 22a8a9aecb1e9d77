#!/bin/sh
# endure.sh TIMES PROGRAM...: runs the programs so often in a row while every processor is busy, the
# kills at 50 moments once; says what failed, and ends with 1 then.
times=$1
shift
busy=
stop() { [ -z "$busy" ] || kill $busy 2>/dev/null; }
trap stop EXIT
trap 'exit 1' INT TERM HUP
for _ in $(seq "$(nproc)"); do
    (while :; do :; done) &
    busy="$busy $!"
done
failed=0 passed=0
log=$(mktemp)
for round in $(seq "$times"); do
    for program; do
        kills=5
        [ "$round" -eq 1 ] && kills=50
        if KILLS=$kills PATIENCE=300 "$program" >"$log" 2>&1; then
            passed=$((passed + 1))
        else
            failed=$((failed + 1))
            printf 'round %s, %s:\n' "$round" "${program##*/}"
            cat "$log"
        fi
    done
    printf 'round %s of %s: %s passed, %s failed\n' "$round" "$times" "$passed" "$failed"
done
rm -f "$log"
printf '%s passed, %s failed\n' "$passed" "$failed"
[ "$failed" -eq 0 ]
