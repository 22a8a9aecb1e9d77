# One value changed for this run only.
plan=plans/hydrogen-separation.yaml
says() { "$@" 2>&1 | grep -v -e caution: -e 'plans/.*: warning:'; }
all() { says beamhours table $plan --columns setting,beam_kinetic_MeV,angle_deg,luminosity_per_cm2_s,hours --only low-1 --format csv "$@" |
    awk -F, -v OFS=, '/,/ && NR > 1 { for (i = 2; i <= NF; i++) $i = sprintf("%.6g", $i) } { print }'; }
all
all --with 'settings.low-1.beam.current=40 uA'
all --with 'targets.1.layers.2.thickness=4.5 cm'
all --with 'targets.hydrogen.layers.2.thickness=4.5 cm'
all --with 'target.layers.2.areal_density=0.3 g/cm2'
all --with 'settings.1.angle=45 deg'
all --with 'settings.low-1.beam.momentum=1000 MeV/c'
all --with 'every_setting.goal=1 %' --with 'target.tilt=0 deg'
all --with 'every_setting.time=2 h'
beamhours check $plan --with 'beam.current=lots'; echo "status $?"
beamhours check $plan --with 'every_setting.time=2 h' --with 'beam.curent=40 uA'; echo "status $?"
beamhours check $plan --with 'beam.current=[1, 2'; echo "status $?"
beamhours check $plan --with 'settings.nobody.angle=40 deg'; echo "status $?"
cp $plan mine.yaml
says beamhours table mine.yaml --against --with 'arms.east.solid_angle=4 msr' --only low-1 --columns setting,solid_angle_msr,counts | sed -n '/^ *setting/,/signal/p'
cmp $plan mine.yaml && echo the file is as it was
