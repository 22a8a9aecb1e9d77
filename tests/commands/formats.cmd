# The run table for a document: the columns and digits of the text, names shown as they are.
plan=plans/hydrogen-separation.yaml
beamhours table $plan --format markdown
beamhours table $plan --format latex --only low --columns setting,angle_deg,luminosity_per_cm2_s,cross_section_ub_per_sr 2>/dev/null
for demo in plans/*.yaml; do
    for format in markdown latex; do
        beamhours table "$demo" -f $format -o got.$format 2>/dev/null || echo "$demo, $format: status $?"
    done
    # cell by cell the same: what stands in the rows of both
    sed -n '/^| setting/,/^$/ { s/\\//g; s/^| //; s/ |$//; s/ | / /g; p }' got.markdown | sed '1,2d; $d' >markdown.rows
    sed -n '/^\\begin{longtable}{l[^}]*}$/,/^\\end{/p' got.latex | sed '/^\\/d; /^{/d; s/{-}/-/g; s/ \\\\$//; s/ & / /g; s/\\//g' | awk 'NR <= '"$(wc -l <markdown.rows)" >latex.rows
    cmp markdown.rows latex.rows && [ -s latex.rows ] || echo "$demo: the formats differ"
done
beamhours table $plan -f latex --with 'beam.current=4 uA' --against --only low-1 --columns setting,hours 2>/dev/null | sed -n '/toprule/,/end.longtable/p'
beamhours table $plan -f tex; echo "status $?"
# what a page holds in the smallest letters, and what it does not
few=setting,angle_deg,q2_GeV2,q_per_fm,epsilon,signal_rate_Hz,background_rate_Hz,live_fraction,hours,counts,statistical_uncertainty
for columns in $few $few,luminosity_per_cm2_s,cross_section_ub_per_sr,kept_fraction,radiative_factor,central_momentum_MeV_per_c,recoil_angle_deg,recoil_kinetic_MeV; do
    beamhours table plans/lead.yaml -f latex --columns $columns 2>&1 >/dev/null | grep '^beamhours' || echo "fits: $(echo $columns | tr ',' '\n' | grep -c .) columns"
done
