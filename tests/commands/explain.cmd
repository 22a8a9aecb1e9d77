# One row, number by number.
plan=plans/hydrogen-separation.yaml
for columns in 80 120; do
    COLUMNS=$columns beamhours explain $plan low-3 2>/dev/null | awk -v most=$columns '{ gsub(/[\200-\277]/, "") } length > most { print "too wide: " $0 }'
done
beamhours explain $plan low-3 2>/dev/null | grep -E '^[A-Za-z]'
beamhours explain $plan low-3 2>/dev/null | sed -n '/^Inputs/,/^$/p'
beamhours explain $plan low-3 2>/dev/null | grep -E -A3 '^  (structure model|from structure|with kelly|spread|luminosity|efficiency)'
beamhours explain plans/hydrogen-jet.yaml forward.2; echo "status $?"
beamhours explain plans/hydrogen-jet.yaml forward.2 --arm monitor 2>/dev/null | grep -A2 prescale
beamhours explain $plan low-3 --with 'beam.current=1 uA' --with 'settings.low-3.beam.current=3 uA' 2>/dev/null | grep beam.current
beamhours explain plans/muon-rings.yaml all --bin 2 2>/dev/null | head -2
