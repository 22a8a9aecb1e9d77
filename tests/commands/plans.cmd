# The demonstrations, a plan of one's own, and checks of both.
beamhours plans
beamhours plans lead | cmp - plans/lead.yaml && echo the same
beamhours new my.yaml; echo "status $?"
beamhours check my.yaml
beamhours table my.yaml --columns setting,q2_GeV2,hours --format csv 2>/dev/null
beamhours new my.yaml; echo "status $?"
beamhours new jet.yaml --like hydrogen-jet; echo "status $?"
cmp jet.yaml plans/hydrogen-jet.yaml && echo the same
beamhours new other.yaml --like hydrogen; echo "status $?"
beamhours new no/such/folder.yaml; echo "status $?"
ls *.yaml
for plan in plans/*.yaml; do beamhours check "$plan"; echo "status $?"; done 2>&1 | sed 's/: warning: \([a-z._]*\): .*/: warning: \1/'
