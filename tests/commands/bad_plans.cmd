# The real program on every plan of tests/bad-plans: status 65, nothing on standard output, and on
# standard error lines FILE:LINE:COLUMN: KEY: words, all within 30 s of a processor.
folder=tests/bad-plans log=$work/said.txt
cd "$top" || exit 1
nr=0
for plan in $folder/*.yaml; do
    nr=$((nr + 1))
    # A memory checker takes a second for each: one in 25 will do; tests/plan reads them all.
    if [ -n "${UNDER-}" ] && [ $((nr % 25)) -ne 0 ]; then continue; fi
    set --
    while IFS= read -r line; do
        case $line in
        '# with '*) set -- "$@" --with "${line#\# with }" ;;
        '#'*) ;;
        *) break ;;
        esac
    done <"$plan"
    printf '== %s\n' "$plan"
    beamhours table "$plan" "$@" 2>&1 >"$work/table.txt" </dev/null
    status=$?
    if [ -s "$work/table.txt" ]; then echo "== $status and a table"; else echo "== $status"; fi
done >"$log"
times >$work/times.txt
case "${UNDER-}$build" in
*valgrind* | */san | */cov) ;;
*) awk 'NR == 2 { gsub(/[ms]/, " "); $0 = $0; took = 60 * ($1 + $3) + $2 + $4
        if (took > 30) print "the plans took " took " s" }' "$work/times.txt" ;;
esac
awk '
    function fault(what) { print plan ": " what; faults++ }
    /^== [0-9]+/ {
        if ($2 != 65) fault("status " $2)
        if (NF > 2) fault("something on standard output")
        if (errors == 0) fault("no error")
        next
    }
    /^== / { plan = substr($0, 4); errors = 0; plans++; next }
    {
        rest = $0
        if (index(rest, plan ":") == 1) rest = substr(rest, length(plan) + 1)
        else if (!sub(/^(--with [1-9][0-9]*|tests\/bad-plans\/materials\/[a-z-]+\.yaml)/, "", rest)) rest = ""
        if (rest !~ /^:[1-9][0-9]*:[1-9][0-9]*: [^ ].*: [^ ].* .*[^ ]$/) fault("not FILE:LINE:COLUMN: KEY: words: " $0)
        else if (rest !~ /^:[0-9]+:[0-9]+: warning: /) errors++
    }
    END { print (plans >= (many ? 520 : 20) ? "enough plans" : plans " plans"); print faults + 0, "faults" }
' many="$([ -n "${UNDER-}" ] || echo yes)" "$log"
