# What goes wrong, and with which status.
cat >bad.yaml <<'YAML'
plan: 1
beam: {particle: electron, kinetic_energy: 855, curent: 20 uA}
target: {layers: [{material: carbon-12, thickness: 1 mm}]}
arms: [{name: A, solid_angle: 6 msr, energy_cut: 5 MeV}]
settings: [{name: K, angle: 25 deg, time: 1 h}]
YAML
sed 's/855,/855 MeV,/; s/curent/current/' bad.yaml >good.yaml
says() { "$@"; echo "status $?"; }
says beamhours check bad.yaml
says beamhours check good.yaml bad.yaml missing.yaml
says beamhours table bad.yaml
says beamhours explain bad.yaml K
says beamhours curve bad.yaml
says beamhours table missing.yaml
says beamhours table .
says beamhours check - <good.yaml
says beamhours check - <bad.yaml
says beamhours table good.yaml --columns setting,counts --format csv --output no/such/folder.csv
says beamhours table good.yaml --columns setting,counts --format csv --output .
(says beamhours table good.yaml --format csv 2>/dev/null) >/dev/full
beamhours table good.yaml >/dev/full 2>full.txt; echo "status $?"; grep -c 'No space left' full.txt
for command in '' --help --version keys models materials plans 'plans lead' 'point -p electron --scatterer 1H -E 1GeV -a 9deg' \
    'explain good.yaml K' 'curve good.yaml' 'check good.yaml' 'help table'; do
    beamhours $command >/dev/full 2>/dev/null; echo "$? $command"
done
beamhours table good.yaml --columns counts --format csv --output /dev/full 2>/dev/null; echo "status $?"
says beamhours table good.yaml --columns setting,cuonts
says beamhours table good.yaml --columns ,
says beamhours table good.yaml --sort huors
says beamhours table good.yaml --only L
says beamhours explain good.yaml L
says beamhours explain good.yaml K --arm B
says beamhours explain good.yaml K --bin 2
says beamhours curve good.yaml --against time
says beamhours curve good.yaml --show cuonts
says beamhours curve good.yaml --setting L
says beamhours curve good.yaml --arm B
says beamhours curve good.yaml --structure kelly-2004
cp good.yaml kept.yaml && ln -s kept.yaml other.csv
says beamhours table kept.yaml --output other.csv
says beamhours curve kept.yaml -o ./kept.yaml
cmp good.yaml kept.yaml && says beamhours point -p electron --scatterer 1H -E 1GeV -a 9deg --angle 8deg
cp "$build/beamhours" alone && (unset BEAMHOURS_MATERIALS; cd / && says "$OLDPWD/alone" materials)
echo kept >data.csv
says beamhours curve good.yaml --format svg --data data.csv --output ./data.csv && cat data.csv
