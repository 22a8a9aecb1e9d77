# A plan against its second round: inputs, rows, time.
old=plans/hydrogen-separation.yaml
sed 's/goal: 0.2 %/goal: 0.3 %/; s/high-3/high-4/; s/density_loss: 0.02/density_loss: 0.03/; s/current: 2 uA/current: 3 uA/' $old >new.yaml
beamhours compare $old new.yaml 2>/dev/null
beamhours compare $old new.yaml --format markdown -o out.md 2>/dev/null; grep '^|' out.md
beamhours compare $old new.yaml --format json 2>/dev/null | sed -n '/"inputs"/,/"statistical/p'
beamhours compare $old - <$old 2>/dev/null | head -6
beamhours compare $old $old --with 'beam.current=9 uA' 2>/dev/null | head -4
for wrong in "$old" "- -" "$old no-such.yaml" "$old $old -f csv"; do echo "\$ compare $wrong"; beamhours compare $wrong; echo "status $?"; done
