#!/bin/sh
# mutate.sh BUILD - makes one mistake at a time in a copy of a source file, and fails unless a test notices each
# or survivors.tsv explains why none can.  The tree itself is not touched.
# From the environment: CC, COMPILE (flags), LINKS (libraries), KEEP (one mistake in so many), JOBS.
set -u
build=$1 folder=$1/mutation least=100
export CK_FORK=no LC_ALL=C

# The tests of a file: the one of its name first, then those of its room and of the rooms above, the quickest first.
programs() {
    room=${1#src/} room=${room%%/*}
    case $room in matter) above='matter|run' ;; physics) above='physics|rates|run' ;; rates) above='rates|run' ;; *) above=run ;; esac
    {
        ls "$build/tests/$room/test_$(basename "$1" .c)" 2>/dev/null
        grep -E "/tests/($above)/" "$folder/quickest"
    } | awk '!seen[$0]++'
}
compile() { $CC $COMPILE -O1 -g0 -w -c -o "$2" "$1"; }

# One mistake: prints its number and what became of it.
try() { # try NUMBER FILE
    new=$folder/$1
    compile "$new.c" "$new.o" 2>"$new.said" || { echo "$1	refused by the compiler"; return; }
    if objcopy --strip-all "$new.o" "$new.bare" && cmp -s "$new.bare" "$folder/$(basename "$2" .c).bare"; then
        echo "$1	the same to the compiler"
        return
    fi
    for program in $(programs "$2"); do
        $CC $COMPILE -pie -Wl,-s -o "$new.test" "$program.o" "$new.o" "$build/front.a" "$build/libbeamhours.a" $LINKS || exit 255
        timeout 300 "$new.test" >"$new.said" 2>&1 || { echo "$1	noticed by $(basename "$program")"; return; }
    done
    echo "$1	survives"
}
tried() { try "$1" "$2"; rm -f "$folder/$1.test" "$folder/$1.o" "$folder/$1.bare"; }
if [ $# -eq 3 ]; then tried "$2" "$3"; exit; fi

rm -rf "$folder" && mkdir -p "$folder" || exit 1
# Not yet under this run: backgrounds beside elastic scattering, particles on their way through matter, and the
# uncertainties that follow from a plan's.
later='atomic_electron|inclusive|inelastic|quasi_elastic|structure_functions|background|arriving|leaving|passage|energies|collect|systematic|model_spread|gate'
formulas() { find "src/$1" -name '*.c' ! -name '*_table.c' | grep -Ev "$later" | sort; }
# of run/, what multiplies a row out: not what only says it
rows() { find src/run -name '*.c' ! -name 'explain*' ! -name 'cautions.c' ! -name 'remarks.c' ! -name 'columns.c' |
    grep -Ev "$later" | sort; }
# what particles cross and lose, and the heat of it: so far a few
passing='src/matter/heating.c src/run/passage.c src/run/leaving.c src/run/gate.c'
for program in $(find "$build"/tests/physics "$build"/tests/rates "$build"/tests/run "$build"/tests/matter/test_heating \
    -name 'test_*' ! -name '*.*' ! -name '*_faults'); do
    start=$(date +%s%N) # a test that fails anyway would notice everything
    "$program" >"$folder/said" 2>&1 || { echo "mutate.sh: $program fails before any mistake is made" >&2; exit 1; }
    echo "$(($(date +%s%N) - start)) $program"
done >"$folder/times"
sort -n "$folder/times" | cut -d' ' -f2 >"$folder/quickest"
awk -v out="$folder" -f tests/mutation/mutants.awk keep="${KEEP:-40}" $(formulas physics) \
    keep="${KEEP:-10}" $(formulas rates) keep="${KEEP:-8}" $(rows) \
    keep="${KEEP:-60}" $passing >"$folder/list" || exit 1
for file in $(cut -f2 "$folder/list" | sort -u); do
    name=$folder/$(basename "$file" .c)
    compile "$file" "$name.o" && objcopy --strip-all "$name.o" "$name.bare" || exit 1
done
cut -f1,2 "$folder/list" | xargs -L 1 -P "${JOBS:-2}" sh "$0" "$build" >"$folder/fate" || exit 1
sort "$folder/fate" | awk -F '\t' -v least=$least -f tests/mutation/judge.awk tests/mutation/survivors.tsv - "$folder/list"
