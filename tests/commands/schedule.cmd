# What a run coordinator pins to the wall.
plan=plans/hydrogen-separation.yaml
COLUMNS=100 beamhours schedule $plan --start '2026-03-01 08:00' 2>/dev/null
beamhours schedule plans/positron-electron.yaml --format markdown 2>/dev/null | grep '^|'
beamhours schedule $plan --with 'schedule.tasks=[{name: check, time: 15 min, every: shift}]' --with 'every_setting={time: 11 h}' --format csv 2>/dev/null | head -12 | tr -d '\r'
beamhours schedule $plan --format json --start '2026-03-01 08:00' 2>/dev/null | sed -n '1,/"setting":"low-2"/p'
for demo in plans/*.yaml; do
    for format in text markdown csv json; do
        beamhours schedule "$demo" -f $format -o got.$format 2>/dev/null || echo "$demo, $format: status $?"
    done
    # the schedule ends when all that is asked for has gone by
    asked=$(sed -n 's/ *"asked_hours":\([0-9.e+]*\),*/\1/p' got.json)
    tail -n 1 got.csv | tr -d '\r' | sed 's/"[^"]*"//' |
        awk -F, -v asked="$asked" '{ end = $2 + $15; if (end - asked > 1e-6 || asked - end > 1e-6) print "ends at " end ", not " asked }'
done
# as wide as it may be
for demo in plans/*.yaml; do
    for start in '' --start=2026-03-01\ 08:00; do
        beamhours schedule "$demo" ${start:+"$start"} 2>/dev/null | awk -v d="$demo" '{ gsub(/±/, "+") } length > 80 { print d ": " $0 }'
    done
    beamhours compare "$demo" "$demo" 2>/dev/null | awk 'length > 80'
done
COLUMNS=80 beamhours schedule plans/positron-electron.yaml --start '2026-03-01 08:00' 2>/dev/null | sed -n '3,9p;/charge.*mC/p;/^begins.*counts/,+2p'
for wrong in "" "$plan --start tomorrow" "$plan -f latex" "no-such.yaml"; do echo "\$ schedule $wrong"; beamhours schedule $wrong; echo "status $?"; done
