# A figure of every demonstration in every format: whole, the same twice, refused where it must be.
kind() { head -c 8 "$1" | tr -cd 'A-Za-z<?%'; }
for demo in hydrogen-separation hydrogen-jet lead positron-electron muon-rings alpha-gold; do
    for format in svg pdf png; do
        beamhours curve plans/$demo.yaml -f $format -o $demo.$format 2>/dev/null || echo "status $?"
        beamhours curve plans/$demo.yaml -f $format 2>/dev/null | cmp - $demo.$format
    done
    echo $demo $(kind $demo.svg) $(kind $demo.pdf) $(kind $demo.png)
done
plan=plans/hydrogen-separation.yaml
curve() { beamhours curve $plan "$@" 2>&1 | grep -v 'warning\|caution\|^beamhours: try'; }
beamhours curve plans/hydrogen-separation.yaml -f svg 2>&1 >/dev/null | grep -c caution
desc() { sed -n 's|.*<desc id="desc">\(.*\)</desc>|\1|p'; }
curve -f svg --against q2 --show figure_of_merit_per_h | desc
curve -f svg --against energy --structure kelly-2004,ye-2018 | desc
curve -f svg --against epsilon --show signal_rate_Hz | desc
# published points
cat >points.csv <<'END'
angle_deg,point_cross_section_ub_per_sr,uncertainty,source
30,0.6,0.05,"Nobody and others, 1971"
45,0.07,0.01,"Nobody and others, 1971"
100,0.0012,0.0002,"Somebody, 1988"
END
curve -f svg --data points.csv | desc
curve --data points.csv
sed 's/0.01/0,01/' points.csv >comma.csv; curve -f svg --data comma.csv
sed '1s/uncertainty/error/' points.csv >heading.csv; curve -f svg --data heading.csv
curve -f svg --data none.csv -o none.svg; [ ! -e none.svg ] || echo there
curve -f svg --show q2_GeV2 --data points.csv
head -c 1100000 /dev/zero | tr '\0' 'x' >long.csv; curve -f svg --data long.csv
# what is wrong
curve -f svg --coulomb plane-waves
curve -f jpeg
curve -f svg --show figure_of_merits
curve -f pdf -o no/such/folder.pdf; beamhours curve $plan -f pdf -o no/such/folder.pdf 2>/dev/null; echo $?
beamhours curve $plan -f png >/dev/full 2>/dev/null; echo $?
# a terminal is no place for a PDF
if command -v script >/dev/null; then
    script -qec "$build/beamhours curve $plan -f pdf" /dev/null </dev/null | tr -d '\r'
else
    printf 'beamhours: curve: a terminal shows no figure; write it with --output FILE\nbeamhours: try: beamhours curve --help\n'
fi
