# Input that is hostile or absurd: no crash, no hang, nothing that a terminal would obey.
says() { timeout 60 "$@" >said.txt 2>&1; echo "status $?, $(wc -l <said.txt | tr -d ' ') lines$(grep -q "$(printf '\033')" said.txt && echo ', an escape')"; }
runs() { says "$@" | sed 's/, [0-9]* lines//'; } # where the number of lines is another's business
plain() { # SETTINGS [BEAM [TARGET [ARM]]]
    printf 'plan: 1\nbeam: {particle: electron, kinetic_energy: 500 MeV, %s}\ntarget: {layers: [%s], scatterer: 12C}\narms: [{name: A, %s}]\nsettings: [%s]\n' \
        "${2:-current: 1 uA}" "${3:-{material: carbon-12, thickness: 1 mm\}}" "${4:-solid_angle: 6 msr}" "$1"
}
repeat() { awk -v n="$1" -v text="$2" 'BEGIN { while (i++ < n) printf text, i }'; } # the text is a format for the number
one='{name: K, angle: 40 deg, goal: 1 %}'
# The lines of good.yaml but one, then that one with many of something in it.
many() { # KEY BEFORE COUNT FORMAT BEHIND
    grep -v "^$1:" good.yaml
    printf '%s: %s' "$1" "$2"
    repeat "$3" "$4"
    printf '%s\n' "$5"
}
esc=$(printf 'a\033[31m.yaml')
plain "$one" >good.yaml

echo "size"; { cat good.yaml; yes '#' | head -c 1048577; } >long.yaml; says beamhours table long.yaml; head -c 100 said.txt
echo; echo "zeros without end"; says beamhours table /dev/zero
echo "a folder"; says beamhours table .
echo "a loop"; ln -s loop loop; says beamhours table loop
echo "a pipe"; mkfifo pipe; cat good.yaml >pipe & runs beamhours check pipe; wait
echo "a program"; says beamhours table /bin/true
echo "NUL"; printf 'plan: 1\000\n' >nul.yaml; says beamhours table nul.yaml; cat said.txt
echo "brackets"; { printf 'plan: '; repeat 100000 '['; } >deep.yaml; says beamhours table deep.yaml
echo "a number of 100000 digits"; many beam '{particle: electron, kinetic_energy: 500 MeV, current: ' 100000 9 ' uA}' >number.yaml; says beamhours table number.yaml
echo "30000 unknown keys"; { echo 'plan: 1'; repeat 30000 'k%d: 1
'; } >keys.yaml; says beamhours table keys.yaml
echo "20000 equal keys"; { echo 'plan: 1'; repeat 20000 'k: 1
'; } >equal.yaml; says beamhours table equal.yaml
echo "9000 angles in the beam"; many settings '[' 9000 '{angle: 0 deg, goal: 1 %%},' ']' >beam.yaml; says beamhours table beam.yaml
echo "a sweep of 9000 over the beam"; plain '{angle: {from: 1 deg, to: 2 deg, count: 9000}, goal: 1 %}' '' '' 'in_plane: ±4 deg, out_of_plane: ±3 deg' >sweep.yaml; says beamhours table sweep.yaml
echo "30000 equal edges"; many arms '[{name: A, in_plane: ±4 deg, out_of_plane: ±3 deg, edges: [' 30000 '40 deg,' ']}]' >edges.yaml; says beamhours table edges.yaml
echo "10000 layers of vacuum"; many target '{layers: [' 10000 '{material: vacuum, areal_density: 1 g/cm2},' ']}' >vacuum.yaml; says beamhours table vacuum.yaml
echo "20000 names for structures"; many models '{structure: {' 20000 'x%d: a,' '}}' >names.yaml; says beamhours table names.yaml
echo "a path of 20000 parts"; says beamhours table good.yaml --with "$(repeat 20000 'a.')a=1"; cat said.txt
echo "65 changes"; set --; for i in $(seq 65); do set -- "$@" --with 'beam.current=2 uA'; done; says beamhours table good.yaml "$@"

echo "orders to a terminal"
cp good.yaml "$esc"; says beamhours table "$esc" --with 'beam.current=1'; cat said.txt
runs beamhours explain "$esc" K; grep -m 1 "setting K, arm A" said.txt
says beamhours table good.yaml --with "beam.$esc=1"
for command in "$esc" "--$esc" "table --$esc" "table none-$esc" "table good.yaml --only $esc" "table good.yaml --columns $esc" \
    "table good.yaml --format $esc" "explain good.yaml $esc" "keys $esc" "materials $esc" "models $esc" "plans $esc" "new $esc" \
    "point --particle $esc --scatterer 1H" "help $esc"; do
    runs beamhours $command
done

echo "absurd amounts"
for thickness in 1e-30 1e30; do
    for current in 1e-30 1e30; do
        for want in 'goal: 1e-12 %' 'time: 1e29 s' 'time: 1e-300 s' 'charge: 1e29 C' 'counts: 999999999999999'; do
            plain "{name: K, angle: 40 deg, $want}" "current: $current A" "{material: carbon-12, thickness: $thickness cm}" >absurd.yaml
            for command in 'table absurd.yaml' 'table absurd.yaml --format json' 'explain absurd.yaml K'; do
                timeout 60 beamhours $command >said.txt 2>&1 || echo "status $? of $command: $thickness cm, $current A, $want"
                grep -n -w -i -e nan -e inf said.txt && echo "in $command: $thickness cm, $current A, $want"
            done
        done
    done
done
plain "{name: K, angle: 40 deg, time: 1e300 s}" 'current: 1e300 A' >more.yaml; says beamhours table more.yaml; cat said.txt
for angle in 0.1 179.9 180; do
    for energy in '1 keV' '1 TeV'; do
        for command in 'table good.yaml' 'explain good.yaml K' 'curve good.yaml'; do
            timeout 60 beamhours $command --with "settings.K.angle=$angle deg" --with "beam.kinetic_energy=$energy" \
                --with 'arms.A.momentum_bite=±1e-6 %' --with 'models.energy_loss=none' >said.txt 2>&1 || echo "status $? of $command: $angle deg, $energy"
            grep -n -w -i -e nan -e inf said.txt && echo "in $command: $angle deg, $energy"
        done
    done
done

echo "little memory"
sizes='7000 12000 20000 60000'
case ${UNDER-}$build in *valgrind* | */san) sizes= ;; esac # these take more for themselves
for kilobytes in $sizes; do
    (ulimit -v $kilobytes 2>/dev/null && beamhours table keys.yaml >said.txt 2>&1; s=$?; case $s in 65 | 70 | 127) ;; *) echo "status $s with $kilobytes kB" ;; esac)
done
echo "nowhere to write"
(beamhours table good.yaml >&-) 2>/dev/null; echo "status $?"
(beamhours table keys.yaml 2>&-); echo "status $?"
mkdir closed && chmod a-w closed && { [ -w closed ] || beamhours table good.yaml --output closed/x 2>/dev/null; }
says beamhours table good.yaml --output /proc/x.csv
echo "odd surroundings"
runs env COLUMNS=1 beamhours table good.yaml
runs env COLUMNS=-5 LC_ALL=de_DE.UTF-8 BEAMHOURS_MATERIALS=:::/nowhere:"$(repeat 3000 /x)" beamhours table good.yaml
