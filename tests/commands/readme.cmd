# What the README shows works as it is written there.
sed -n '/^```yaml$/,/^```$/p' "$top/README.md" | sed '1d;$d' >my.yaml
beamhours check my.yaml
beamhours table my.yaml --columns setting,counts 2>/dev/null | grep -cE '^K1\.[1-4] +[56][0-9]{4}$'
beamhours table my.yaml 2>/dev/null | grep -E '^(beam|target|arm) '
cp my.yaml first.yaml && mv my.yaml second.yaml # compared by a line of it
sed -n '/^## What it answers/,/^A plan names/p; /^Then a plan of your own/,/^## What it answers/p' "$top/README.md" |
    sed -nE 's|^    (build/)?(beamhours .*)|\2|p' | sed -E 's/   +[a-z].*$//' >lines
{ grep ' new ' lines; grep -vE ' (new|edit) ' lines; } >sorted # edit needs a terminal: tests/terminal
while read -r line; do
    eval "$line" >out.txt 2>err.txt </dev/null || { echo "status $?: $line"; cat err.txt; }
    case $line in *--output*) made=${line##*--output } ;; *) made=out.txt ;; esac
    [ -s "$made" ] || echo "nothing: $line"
done <sorted
wc -l <sorted
# Every file that the README names is there.
grep -oE '\]\([A-Za-z/._]+\)|`(docs|include|tests)/[A-Za-z/._]*`' "$top/README.md" | tr -d '[]()`' | while read -r file; do
    [ -e "$top/$file" ] || echo "no $file"
done
