# The example program, compiled against the library as it was built.
flags=
for kind in asan:-fsanitize=address,undefined gcov:--coverage; do
    nm "$build/libbeamhours.a" 2>/dev/null | grep -q "__${kind%%:*}" && flags=${kind#*:}
done
"${CC:-cc}" -std=c11 $flags -I"$top/include" -o example "$top/tests/api/example.c" "$build/libbeamhours.a" $(pkg-config --libs gsl yaml-0.1 json-c) -lm
unset -f beamhours
./example plans/hydrogen-separation.yaml materials
./example plans/none.yaml materials; echo "status $?"
