# rounded.awk - numbers of twelve figures and more, to eleven; every other byte as it is.
{
    line = ""
    while (match($0, /[0-9]+\.[0-9]+(e[-+]?[0-9]+)?/)) {
        number = substr($0, RSTART, RLENGTH)
        digits = number
        sub(/e.*/, "", digits)
        sub(/^0\.0*/, "", digits)
        sub(/\./, "", digits)
        if (length(digits) >= 12) number = sprintf("%.11g", number)
        line = line substr($0, 1, RSTART - 1) number
        $0 = substr($0, RSTART + RLENGTH)
    }
    print line $0
}
