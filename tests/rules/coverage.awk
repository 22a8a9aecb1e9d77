# coverage.awk - shows gcovr's table and fails when a room that computes has lines the tests do not reach.
{ print }
NF == 1 && /^src\// { name = $1; next } # a long name has its numbers on the line after
name { $0 = name " " $0; name = "" }
$1 ~ /^src\// {
    split($1, part, "/"); room = part[2]
    if ($2 ~ /^[0-9]+$/) { lines[room] += $2; run[room] += $3 }
}
END {
    for (r in lines) {
        share = 100 * run[r] / lines[r]
        printf "%-10s %5d lines %6.2f %%\n", r, lines[r], share
        if (r ~ /^(units|physics|schema|rates|plan|run)$/ && share < 95) { print "below 95 %: " r; bad = 1 }
    }
    exit bad
}
