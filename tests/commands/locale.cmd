# A locale with decimal commas changes nothing.
for locale in de_DE.UTF-8 fr_FR.UTF-8; do
    for what in 'table plans/lead.yaml --format csv' 'table plans/lead.yaml --format json' 'table plans/lead.yaml' \
        'explain plans/lead.yaml scan.1' 'point -p muon- --scatterer 1H --momentum 160MeV/c -a 40.5deg --format json' \
        'curve plans/lead.yaml' 'materials liquid-hydrogen' 'models kelly-2004'; do
        beamhours $what >plain.txt 2>&1
        LC_ALL=$locale beamhours $what >local.txt 2>&1
        cmp plain.txt local.txt && echo the same
    done
done
