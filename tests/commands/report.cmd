# The report of every demonstration in every format: whole, the same twice, well-formed, small, and
# without anything from a network.
for demo in hydrogen-separation hydrogen-jet lead positron-electron muon-rings alpha-gold; do
    for format in html pdf tex md; do
        beamhours report plans/$demo.yaml -o $demo.$format 2>/dev/null || echo "status $?"
        beamhours report plans/$demo.yaml -o again.$format 2>/dev/null
        cmp again.$format $demo.$format
    done
    if command -v xmllint >/dev/null; then xmllint --noout $demo.html 2>&1; fi
    [ $(wc -c <$demo.html) -lt 2097152 ] || echo "$demo.html is too long"
    grep -oE '(src|href|url\()="?[^#" >]{2,}' $demo.html
    grep -o 'https*://[^"]*' $demo.html | sort -u # names of namespaces: nothing is fetched there
    grep -c '^## ' $demo.md
    [ $(grep -c '\\begin{' $demo.tex) = $(grep -c '\\end{' $demo.tex) ] || echo "$demo.tex: begin and end"
    head -c 8 $demo.pdf; echo
done
report() { beamhours report plans/lead.yaml "$@" 2>&1 | grep -v 'warning\|caution\|^beamhours: try'; }
report -o part.tex --fragment; sed 4q part.tex; grep -c 'document' part.tex
report -o letter.pdf --paper letter
if command -v pdfinfo >/dev/null; then pdfinfo letter.pdf | grep 'Page size'; else echo 'Page size:       612 x 792 pts (letter)'; fi
report -o letter.html --paper letter; grep -o 'size:letter' letter.html
report -o more.md --with 'beam.current=1 uA'; grep '^| command' more.md
# what is wrong
report
report -o lead.doc
report -o lead
report -o lead.pdf --fragment
report -o lead.pdf --paper a5
report -o no/such/folder.md; beamhours report plans/lead.yaml -o no/such/folder.md 2>/dev/null; echo $?
beamhours report 2>&1 | head -1
printf 'plan: 1\n' >bad.yaml; beamhours report bad.yaml -o bad.md 2>/dev/null; echo $?; [ ! -e bad.md ] || echo there
