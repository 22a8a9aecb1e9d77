# The first things that anyone types.
beamhours
beamhours | wc -l
beamhours --version | sed 's/[0-9.]\{5,\}/VERSION/'
beamhours table --version | sed 's/[0-9.]\{5,\}/VERSION/'
beamhours --help
for command in new plans keys check table explain point curve schedule compare edit materials models help; do
    beamhours "$command" --help >help.txt || echo "no help: $command"
    beamhours help "$command" | cmp - help.txt
    awk -v command="$command" 'length > 100 { print command ": a long line: " $0 }' help.txt
done
beamhours table --help
beamhours help | cmp - help.txt || beamhours help | head -1
for wrong in tabel --foo -x 'help foo' 'help a b' 'table' 'table a b' 'table x --fromat csv' 'table x --format cvs' \
    'table x --columns' 'table x --bins=3' 'table x --against' 'table x --with beam' 'explain x' 'explain x K --bin 0' \
    'explain x K --bin two' 'check' 'plans a b' 'plans hydrogen-jat' 'plans zzz' 'keys a b' 'new' 'new a b' 'curve' \
    'models a b' 'models kelly-204' 'materials a b' 'materials aluminum-28' 'materials -f csv' 'point -q' 'point 12C'; do
    echo "\$ beamhours $wrong"
    beamhours $wrong
    echo "status $?"
done
