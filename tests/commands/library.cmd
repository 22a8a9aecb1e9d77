# What the program knows: keys, models, materials.
beamhours keys | head -4
beamhours keys beam.current
beamhours keys polarization
beamhours keys in_plane | head -1
beamhours keys settings.K1.angle | head -1
beamhours keys angle; echo "status $?"
beamhours keys beam.curent; echo "status $?"
beamhours models | grep -E '^[a-z]|kelly|plane'
beamhours models kelly-2004
beamhours models kelly-2004 -f json | tr -d ' '
beamhours models -f json | grep -c '"kind"' | awk '{ print ($1 > 20) ? "many" : $1 }'
beamhours materials | awk 'END { print (NR >= 60) ? "at least 60" : NR }'
beamhours materials aluminum | head -3
beamhours materials liquid-hydrogen -f json | tr -d ' ' | grep -E 'name|state|density_g'
mkdir -p own && sed 's/^name: .*/name: my-carbon/' materials/carbon-12.yaml >own/my-carbon.yaml
BEAMHOURS_MATERIALS=nowhere:own beamhours materials my-carbon | head -1
mkdir -p home/.local/share/beamhours/materials && cp own/my-carbon.yaml home/.local/share/beamhours/materials
beamhours materials my-carbon | head -1
XDG_DATA_HOME=$PWD/elsewhere beamhours materials my-carbon; echo "status $?"
