# The screen without a terminal.
beamhours edit plans/lead.yaml </dev/null
beamhours edit nowhere.yaml </dev/null
beamhours edit /dev/null </dev/null
beamhours edit plans/lead.yaml plans/lead.yaml
beamhours edit --help
