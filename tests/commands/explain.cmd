# One row, number by number.
plan=plans/hydrogen-separation.yaml
beamhours explain $plan low-3 2>/dev/null | awk '{ gsub(/[\200-\277]/, "") } length > 80 { print "too wide: " $0 }'
beamhours explain $plan low-3 2>/dev/null | grep -E '^[A-Z]'
beamhours explain $plan low-3 2>/dev/null | grep -E -A2 'kinetic_energy|beam.current|efficiency |luminosity'
beamhours explain plans/hydrogen-jet.yaml forward.2; echo "status $?"
beamhours explain plans/hydrogen-jet.yaml forward.2 --arm monitor 2>/dev/null | grep -A2 prescale
beamhours explain $plan low-3 --with 'beam.current=1 uA' --with 'settings.low-3.beam.current=3 uA' 2>/dev/null | grep -A1 beam.current
