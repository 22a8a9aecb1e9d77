# One whole table, then the ways to choose from it.
beamhours table plans/hydrogen-separation.yaml
plan=plans/hydrogen-jet.yaml
csv() { beamhours table $plan --format csv "$@" 2>/dev/null | tr -d '\r'; }
csv | head -1
csv --columns setting,arm --sort -angle_deg
csv --columns setting,arm --only backward.3,forward --sort arm
csv --columns setting,arm --sort -setting | head -3
printf 'plan: 1\nbeam: {particle: electron, kinetic_energy: 855 MeV, current: 1 uA}\ntarget: {layers: [{material: graphite, thickness: 1 mm}]}\narms: [{name: A, solid_angle: 1 msr}]\nsettings: [{name: s, angle: {from: 30 deg, to: 41 deg, step: 1 deg}, time: 1 h}]\n' >twelve.yaml
beamhours table twelve.yaml --format csv --columns setting --sort -setting 2>/dev/null | tr -d '\r' | paste -s -d' '
csv --columns setting,arm,bin --bins | head -2
csv --columns efficiency,setting,efficiency | head -2
NO_COLOR=1 beamhours table $plan >without.txt 2>/dev/null
beamhours table $plan 2>/dev/null | cmp - without.txt && echo no colour either way
beamhours table - --columns setting,arm --format csv <$plan 2>/dev/null | head -2 | tr -d '\r'
beamhours table $plan --columns setting,counts --output out.txt 2>/dev/null; grep -c forward out.txt
for columns in 80 100 120 200; do COLUMNS=$columns beamhours table plans/lead.yaml 2>/dev/null | awk '/^setting/ { print; print length }'; done
for plan in plans/*.yaml; do COLUMNS=80 beamhours table "$plan" 2>/dev/null | awk -v plan="$plan" '{ gsub(/[\200-\277]/, "") } length > 80 { wide++ } END { if (wide) print plan ": " wide " lines wider than 80, long names" }'; done
for plan in plans/*.yaml; do beamhours table "$plan" --format json 2>/dev/null | tail -2 | head -1 | sed 's/[0-9.]\{5,\}/VERSION/'; done
beamhours keys columns | head -n 4
