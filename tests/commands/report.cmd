# The report of every demonstration in every format: whole, the same twice, well-formed, small, and
# without anything from a network.
for demo in hydrogen-separation hydrogen-jet lead positron-electron muon-rings alpha-gold; do
    for format in html pdf tex md; do
        beamhours report plans/$demo.yaml -o $demo.$format 2>/dev/null || echo "status $?"
        mkdir -p again; beamhours report plans/$demo.yaml -o again/$demo.$format 2>/dev/null
        cmp again/$demo.$format $demo.$format
    done
    if command -v xmllint >/dev/null; then xmllint --noout $demo.html 2>&1; fi
    [ $(wc -c <$demo.html) -lt 2097152 ] || echo "$demo.html is too long"
    grep -oE '(src|href|url\()="?[^#" >]{2,}' $demo.html
    grep -o 'https*://[^"]*' $demo.html | sort -u # names of namespaces: nothing is fetched there
    grep -c '^## ' $demo.md
    [ $(grep -c '\\begin{' $demo.tex) = $(grep -c '\\end{' $demo.tex) ] || echo "$demo.tex: begin and end"
    head -c 8 $demo.pdf; echo
    # figures beside LaTeX and Markdown: as many as are named, whole, the same twice
    for n in $(seq $(grep -c includegraphics $demo.tex)); do
        head -c 5 $demo-$n.pdf | grep -q '%PDF-' && grep -q "{$demo-$n.pdf}" $demo.tex || echo "no $demo-$n.pdf"
        grep -q '</svg>' $demo-$n.svg && grep -q "]($demo-$n.svg)" $demo.md || echo "no $demo-$n.svg"
        cmp again/$demo-$n.pdf $demo-$n.pdf; cmp again/$demo-$n.svg $demo-$n.svg
    done
    ls $demo-*.pdf $demo-*.svg | wc -l
done
report() { beamhours report plans/lead.yaml "$@" 2>&1 | grep -v 'warning\|caution\|^beamhours: try'; }
report -o part.tex --fragment; sed 4q part.tex; grep -c 'document' part.tex
report -o letter.pdf --paper letter
if command -v pdfinfo >/dev/null; then pdfinfo letter.pdf | grep 'Page size'; else echo 'Page size:       612 x 792 pts (letter)'; fi
report -o letter.html --paper letter; grep -o 'size:letter' letter.html
report -o more.md --with 'beam.current=1 uA'; grep '^| command' more.md
report -o 'odd & %name.v2.tex'; ls odd*; grep -o '{odd.*pdf}' 'odd & %name.v2.tex'
# what is wrong
report
report -o lead.doc
report -o lead
report -o lead.pdf --fragment
report -o lead.pdf --paper a5
for e in md tex html pdf; do report -o no/such/folder.$e; done # the report is named, not its first figure
beamhours report plans/lead.yaml -o no/such/folder.md 2>/dev/null; echo $?
mkdir here.tex; report -o here.tex
beamhours report 2>&1 | head -1
printf 'plan: 1\n' >bad.yaml; beamhours report bad.yaml -o bad.md 2>/dev/null; echo $?; [ ! -e bad.md ] || echo there
