# mutants.awk - writes copies of C files in which one sign, power, mass or factor is wrong.
# awk -v out=FOLDER -v keep=N -f mutants.awk FILES: one in N of the mistakes that can be made, chosen by a
# hash of the line and the mistake, so that a line is tried or not whatever changes around it.
# Prints: number, file, line, kind, line before, line after; FOLDER/NUMBER.c is the whole file.
BEGIN {
    FS = "\n"
    for (i = 32; i < 127; i++) code[sprintf("%c", i)] = i
    MASSES = " m:M M:m m2:M2 M2:m2 mass:target "
}
function hash(text,   i, h) {
    h = 17
    for (i = 1; i <= length(text); i++) h = (h * 131 + code[substr(text, i, 1)]) % 1000003
    return (h * 7919) % 1000003
}
function trimmed(text) { sub(/^[ \t]+/, "", text); sub(/[ \t]+$/, "", text); return text }

# The same line with comments and strings blanked out, so that places still agree.
function bare(text,   i, c, two, got) {
    got = ""
    for (i = 1; i <= length(text); i++) {
        c = substr(text, i, 1); two = substr(text, i, 2)
        if (comment) { if (two == "*/") { comment = 0; got = got "  "; i++ } else got = got " "; continue }
        if (quoted) { if (c == "\\") { got = got "  "; i++ } else { got = got " "; if (c == quoted) quoted = "" } continue }
        if (two == "/*") { comment = 1; got = got "  "; i++; continue }
        if (two == "//") break
        if (c == "\"" || c == "'") { quoted = c; got = got " "; continue }
        got = got c
    }
    quoted = ""
    return got
}

# Takes down one mistake: `long` characters from `at` become `with`.
function mistake(kind, at, long, with,   after, key, h) {
    after = substr(raw, 1, at - 1) with substr(raw, at + long)
    key = kind ":" trimmed(raw) ":" trimmed(after)
    file_key = FILENAME; sub(/^.*\//, "", file_key)
    h = hash(file_key ":" key ":" (++times[FILENAME ":" key]))
    possible++
    if (h % keep != 0) return
    n++
    where[n] = FNR; what[n] = kind; before[n] = trimmed(raw); with_line[n] = after; from[n] = FILENAME
}
function word_at(text) { return match(text, /^[A-Za-z_][A-Za-z_0-9]*/) ? substr(text, 1, RLENGTH) : "" }

function look(text,   i, c, tail, last, word, twice, number) {
    for (i = 1; i <= length(text); i++) {
        c = substr(text, i, 1); tail = substr(text, i); last = i > 1 ? substr(text, i - 1, 1) : " "
        if (tail ~ /^[-+]=/) { mistake("sign", i, 1, c == "+" ? "-" : "+"); i++; continue }
        if (tail ~ /^[-+]( |$)/ && last == " ") mistake("sign", i, 1, c == "+" ? "-" : "+")
        else if (tail ~ /^-[A-Za-z_(0-9]/ && last ~ /[ (]/) mistake("sign", i, 1, "")
        if (tail ~ /^\*( |$)/ && last == " ") mistake("power", i, 1, "/")
        if (tail ~ /^\/( |$)/ && last == " ") mistake("power", i, 1, "*")
        if (last ~ /[A-Za-z_0-9.]/) continue
        word = word_at(tail)
        if (word != "") {
            if (tail ~ /^sqrt\(/) mistake("power", i, 4, "")
            if (tail ~ /^sin\(/) mistake("factor", i, 3, "cos")
            if (tail ~ /^cos\(/) mistake("factor", i, 3, "sin")
            if (tail ~ /^fmin\(/) mistake("factor", i, 4, "fmax")
            if (tail ~ /^fmax\(/) mistake("factor", i, 4, "fmin")
            twice = word " * " word
            if (substr(tail, 1, length(twice)) == twice && substr(tail, length(twice) + 1) !~ /^[A-Za-z_0-9.(\[-]/)
                mistake("power", i, length(twice), word)
            mass(text, i, word)
            i += length(word) - 1
        } else if (match(tail, /^([0-9]+\.[0-9]*|\.[0-9]+)(e[-+]?[0-9]+)?|^[0-9]+e[-+]?[0-9]+/)) {
            number = substr(tail, 1, RLENGTH)
            if (number + 0 != 0) mistake("factor", i, RLENGTH, "(1.5 * " number ")")
            i += RLENGTH - 1
        } else if (match(tail, /^[1-9][0-9]*/)) {
            number = substr(tail, 1, RLENGTH)
            if (substr(tail, RLENGTH + 1) ~ /^ [*\/]/ || substr(text, 1, i - 1) ~ /[*\/] $/)
                mistake("factor", i, RLENGTH, number + 1)
            i += RLENGTH - 1
        }
    }
}
function mass(text, i, word,   rest) {
    rest = substr(text, i + length(word))
    if (rest ~ /^ = / || text ~ /^#define/) return
    if (match(MASSES, " " word ":[A-Za-z0-9]+"))
        mistake("mass", i, length(word), substr(MASSES, RSTART + length(word) + 2, RLENGTH - length(word) - 2))
}
FNR == 1 { comment = 0 }
{
    line[FILENAME, FNR] = $0; lines[FILENAME] = FNR
    raw = $0
    text = bare(raw)
    if (text !~ /^#include/) look(text)
}
END {
    for (k = 1; k <= n; k++) {
        id = sprintf("%04d", k); file = out "/" id ".c"
        for (i = 1; i <= lines[from[k]]; i++) print i == where[k] ? with_line[k] : line[from[k], i] >file
        close(file)
        printf "%s\t%s\t%d\t%s\t%s\t%s\n", id, from[k], where[k], what[k], before[k], trimmed(with_line[k])
    }
    printf "%d mistakes are possible, %d are tried\n", possible, n >"/dev/stderr"
}
