# A column against what varies.
plan=plans/hydrogen-separation.yaml
csv() { beamhours curve $plan --format csv "$@" 2>/dev/null | tr -d '\r'; }
csv | head -1
csv | wc -l
marked() { csv "$@" | awk -F, 'NR > 1 && $NF != "" { printf "%.4g %s\n", $1, $NF }'; }
marked
marked --against q2
marked --against epsilon
marked --against energy --setting high-2
csv --structure kelly-2004,ye-2018 --show q2_GeV2 | sed -n '1p;20p' | awk -F, -v OFS=, '{ if (NR > 1) for (i = 1; i < NF; i++) $i = sprintf("%.5g", $i); print }'
beamhours curve $plan --show q2_GeV2 2>/dev/null | sed -n '1,4p;$p'
beamhours curve $plan --show rate_change_per_mrad 2>/dev/null | sed -n '1,4p;$p'
beamhours curve $plan --structure kelly-2004,ye-2018 --against epsilon 2>/dev/null | sed -n '1,3p;/low/p'
beamhours curve plans/muon-rings.yaml --against energy 2>/dev/null | sed -n '1,2p' 
beamhours curve plans/muon-rings.yaml 2>/dev/null | sed -n '1,4p'
beamhours curve plans/muon-rings.yaml --against epsilon 2>&1 | grep -v -e warning -e caution
beamhours curve plans/hydrogen-jet.yaml --arm monitor 2>/dev/null | sed -n '1,2p'
beamhours curve plans/alpha-gold.yaml --against epsilon 2>&1 | grep -v warning
beamhours curve $plan --with 'settings.low-1.angle=45 deg' --output out.csv --format csv; grep -c low-1 out.csv
