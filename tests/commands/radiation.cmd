# radiation.cmd - what a cut keeps of one elastic point.
only() { grep -E 'radiative|delta_|vacuum|warning' | cut -c1-50; }
beamhours point -p electron --scatterer 1H -E 855MeV -a 50deg --energy-cut 10MeV 2>&1 | only
beamhours point -p positron --scatterer 1H -E 855MeV -a 50deg --radiative mo-tsai --energy-cut 10MeV 2>&1 | only
beamhours point -p muon- --scatterer 1H --momentum 115MeV/c -a 60deg --energy-cut 4MeV 2>&1 | only
beamhours point -p electron --scatterer 1H -E 855MeV -a 50deg --energy-cut 10MeV --detects recoil >/dev/null
# what cannot be
beamhours point -p electron --scatterer 12C -E 400MeV -a 40deg --energy-cut 400MeV >/dev/null
beamhours point -p electron --scatterer 12C -E 400MeV -a 40deg --radiative schwinger; echo "status $?"
beamhours point -p electron --scatterer 12C -E 400MeV -a 40deg --radiative peaking --energy-cut 5MeV; echo "status $?"
beamhours point -p electron --scatterer 12C -E 400MeV -a 40deg --energy-cut 0MeV; echo "status $?"
beamhours models maximon-tjon
