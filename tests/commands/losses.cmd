# losses.cmd - what a material does to a particle that passes.
beamhours materials copper --particle proton --kinetic-energy 10MeV
beamhours materials liquid-hydrogen -p electron -E 855MeV
beamhours materials aluminum -p muon- -E 160GeV
beamhours materials water -p 12C -E 100MeV/u
beamhours materials silicon -p alpha -E 5.486MeV --format json | sed -n '/per_cm2\|cm2_per\|range\|density_g/p'
# what cannot be
beamhours materials vacuum -p proton -E 3MeV; echo "status $?"
beamhours materials gold -p gold -E 3MeV; echo "status $?"
beamhours materials gold -p e- -E 3MeV; echo "status $?"
beamhours materials gold -p proton; echo "status $?"
beamhours materials gold -E 3MeV; echo "status $?"
beamhours materials gold -p proton -E 3; echo "status $?"
beamhours materials water -p 12C -E 100eV; echo "status $?"
beamhours materials lead -p electron -E 10MeV/u; echo "status $?"
beamhours materials -p proton -E 1MeV; echo "status $?"
# a beam that stops in the window: one line, no rates
cat >stops.yaml <<'END'
plan: 1
beam: {particle: alpha, kinetic_energy: 5 MeV, particle_rate: 1e6 /s}
target:
  scatterer: Au
  layers:
    - {material: kapton, thickness: 50 um, role: window}
    - {material: gold, thickness: 0.1 um}
arms: [{name: A, solid_angle: 1 msr}]
settings: [{name: K, angle: 150 deg}]
END
beamhours table stops.yaml --columns setting,vertex_kinetic_MeV,signal_rate_Hz --format csv; echo "status $?"
