# What it would take.
plan=plans/hydrogen-separation.yaml
solve() { beamhours solve "$@"; echo "status $?"; }
solve $plan low-1 q2=0.6 --by angle
solve $plan low-1 q2='60 fm-2' --by angle
solve $plan low-1 hours=12min --by current
solve $plan low-1 time=0.2 --by current --with 'settings.low-1.goal=0.4 %'
solve $plan low-1 hours=0.2 --by thickness
solve $plan low-1 rate=1kHz --by solid-angle
# the nearest first; a unit written on both sides of the sign
solve plans/lead.yaml scan.4 cross_section_ub_per_sr=2 --by angle 2>/dev/null
solve plans/lead.yaml forward hours=0.01 --by current --with 'beam.current=2 uA ± 0.1 uA' 2>/dev/null
solve $plan high-2 hours=1 --by energy
solve $plan high-2 hours=1 --by energy --from 1.2GeV --to 1.5GeV
solve $plan low-1 uncertainty=0.1% --by current
solve $plan low-1 uncertainty=0.1% --by every_setting.goal
solve $plan low-1 live_fraction=0.9 --by arms.east.dead_time
solve $plan low-1 statistical_uncertainty=0.001 --by current --with 'settings.low-1={name: low-1, angle: 60 deg, time: 2 h}'
solve plans/lead.yaml scan.2 q2=0.02 --by angle
solve plans/hydrogen-jet.yaml forward.2 rate=2 --by angle --arm monitor
solve plans/muon-rings.yaml all rate=1000 --by angle
# What makes no sense.
solve $plan low-1
solve $plan low-1 hours=1
solve $plan low-1 hours --by current
solve $plan low-1 housr=1 --by current
solve $plan low-1 zzz=1 --by current
solve $plan low-1 setting=1 --by current
solve $plan low-1 hours='1 GeV' --by current
solve $plan low-1 hours=long --by current
solve $plan low-1 q_per_fm=x --by current
solve $plan low-9 hours=1 --by current
solve $plan low-1 hours=1 --by current --arm west
solve plans/hydrogen-jet.yaml forward.2 hours=1 --by current
solve $plan low-1 hours=1 --by title
solve $plan low-1 hours=1 --by current --from 3uA --to 2uA
solve $plan low-1 hours=1 --by current --from 3deg
solve $plan low-1 hours=1 --by current --with 'beam.current=2 GeV'
solve nowhere.yaml low-1 hours=1 --by current
