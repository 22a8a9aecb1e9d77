# One point without a plan: every pair of what fixes it, and what else can be asked.
beamhours point -p electron --scatterer 1H -E 855MeV -a 25deg
key() { tr -d ' ,"' | awk -F: -v key="$1" '$1 == key { printf "%.9g\n", $2 }'; }
same() { beamhours point -p electron --scatterer 1H "$@" -f json | key point_cross_section_ub_per_sr; }
same -E 855MeV -a 25deg
same --total-energy 855.51099895069MeV --angle=25deg
same --momentum '855.51084637 MeV/c' -a25deg
same -E 855MeV --q2 0.1263524GeV2
same --q2 '0.1263524 GeV2' --epsilon 0.9075863
same --q2 '0.1263524 GeV2' -E 0.855GeV
same -a 25deg --q2 '0.1263524 GeV2'
same -a 25deg --epsilon 0.9075863
same -E 855MeV --epsilon 0.9075863
recoil() { beamhours point -p electron --scatterer 1H --detects recoil "$@" -f json | key scattered_angle_deg; }
recoil -E 855MeV -a 67.03109deg
recoil -a 67.03109deg --q2 '0.1263524 GeV2'
recoil -a 67.03109deg --epsilon 0.9075863
recoil -E 855MeV --q2 '0.1263524 GeV2'
rate() { beamhours point -p electron --scatterer 12C -E 400MeV -a 40deg "$@" -f json; }
rate --current 10uA --material carbon-12 --thickness 1mm --solid-angle 5msr | key signal_rate_Hz
rate --current 20uA --material carbon-12 --thickness 1mm --solid-angle 5msr | key signal_rate_Hz
rate --current 10uA; echo "status $?"
rate --current 10uA --material lead --thickness 1mm --solid-angle 5msr; echo "status $?"
rate --current 10uA --material nothing --thickness 1mm --solid-angle 5msr; echo "status $?"
beamhours point -p alpha --scatterer 197Au -E 5MeV -a 150deg | grep -E 'structure|cross'
beamhours point -p 12C --scatterer 208Pb -E 2MeV/u -a 60deg -f json 2>/dev/null | key beam_kinetic_MeV
for wrong in '' '-p electron' '-p electron --scatterer 1H' '-p electron --scatterer 1H -E 855MeV' \
    '-p electron --scatterer 1H -E 855MeV -a 25deg --epsilon 0.5' '-p electron --scatterer H -E 855MeV -a 25deg' \
    '-p electron --scatterer Xy -E 855MeV -a 25deg' '-p elektron --scatterer 1H -E 855MeV -a 25deg' \
    '-p electron --scatterer 999Pb -E 855MeV -a 25deg' \
    '-p electron --scatterer 1H -E 855 -a 25deg' '-p electron --scatterer 1H -E 855MeV -a 25' \
    '-p electron --scatterer 1H -E 855MeV --momentum 855MeV/c -a 25deg' '-p electron --scatterer 1H -E 855MeV --q2 9GeV2' \
    '-p electron --scatterer 1H -E 855MeV --epsilon x' '-p electron --scatterer 1H -E 855MeV --epsilon 2' \
    '-p alpha --scatterer 1H -E 5MeV -a 50deg' '-p electron --scatterer 1H -E -5MeV -a 50deg' \
    '-p electron --scatterer 1H -E 855MeV -a 25deg --structure kely-2004' \
    '-p electron --scatterer 1H -E 855MeV -a 25deg --coulomb none' \
    '-p electron --scatterer 1H -E 855MeV -a 25deg --process moller' \
    '-p electron --scatterer 1H -E 855MeV -a 25deg --detects both' \
    '-p electron --scatterer 1H --total-energy 0.1MeV -a 25deg' \
    '-p electron --scatterer 1H --detects recoil -E 855MeV -a 95deg'; do
    beamhours point $wrong 2>&1 | head -1
done
beamhours point -p electron --scatterer 1H -E 855MeV -a 25deg --structure point | grep -E '^(structure|point)'
