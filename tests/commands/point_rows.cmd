# Reference rows through the program's JSON; a line for each that misses its tolerance, with its source.
grep -v '^#' "$top/tests/commands/point_rows.csv" | while read -r particle scatterer structure energy angle key wanted tolerance source; do
    beamhours point -p "$particle" --scatterer "$scatterer" --structure "$structure" "$energy" -a "$angle" -f json 2>/dev/null |
        tr -d ' ,"' | awk -F: -v key="$key" -v wanted="$wanted" -v tolerance="$tolerance" -v what="$particle $scatterer $energy $angle $key: $source" '
            $1 == key { off = $2 / wanted - 1; seen = 1 }
            END { print (seen && off < tolerance && off > -tolerance) ? "as wanted" : "MISSED " what ": off by " off }'
done | sort | uniq -c | sed 's/^ *//'
