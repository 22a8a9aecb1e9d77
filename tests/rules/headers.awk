# headers.awk - every number a header offers says its unit, every constant also its source.
#   double energy;              /* [MeV] ... */   a member: the comment behind it, or alone on the line above
#   double x, *y, z[3];         /* [cm] ... */    one unit for all, or one for each: [cm] [rad] [1]
#   double f(double angle);     the comment above says  angle [rad]  and  Returns [unit]
#   #define NAME number         /* [unit] +- uncertainty, or exact; source */
# A new unit is one word in this list.
BEGIN {
    for (n = split("MeV GeV c u pt rad deg sr cm g fm ub s h Hz K Pa A C V T W mol bytes", w, " "); n > 0; n--) known[w[n]] = 1
}
FNR == 1 { finish(); file = FILENAME; start() }
{ read_line($0) }
END { finish(); exit bad }

function refuse(line, why) { printf "%s:%d: %s\n", file, line, why; bad = 1 }
function start() { nt = nc = nd = open = define = 0; split("", word); split("", note); split("", dir) }

# --- reading: words of code, comments (with the place they stand at), directives ---
function read_line(s,   t) {
    alone = 1
    if (!define && !open && s ~ /^[ \t]*#/) { define = 1; dir[++nd] = ""; dir_line[nd] = FNR; dir_note[nd] = 0 }
    while (s != "") {
        if (open) { # inside a comment
            t = index(s, "*/")
            note[nc] = note[nc] " " (t ? substr(s, 1, t - 1) : s)
            note_end[nc] = FNR
            if (!t) return
            open = 0; s = substr(s, t + 2); continue
        }
        if (match(s, /^[ \t]+/)) t = ""
        else if (match(s, /^\/\*/) || match(s, /^\/\/.*/)) {
            note[++nc] = substr(s, 3, RLENGTH - 2)
            note_at[nc] = nt; note_line[nc] = note_end[nc] = FNR; note_alone[nc] = alone
            if (define && !dir_note[nd]) dir_note[nd] = nc
            open = substr(s, 2, 1) == "*"; s = substr(s, RLENGTH + 1); continue
        }
        else if (match(s, /^"([^"\\]|\\.)*"/) || match(s, /^'([^'\\]|\\.)*'/)) t = "\"\""
        else if (match(s, /^[A-Za-z_][A-Za-z_0-9]*/) || match(s, /^\.?[0-9]([.A-Za-z_0-9]|[eEpP][-+])*/) || match(s, /^./)) t = substr(s, 1, RLENGTH)
        if (define) dir[nd] = dir[nd] (t == "" ? " " : t)
        else if (t != "") { word[++nt] = t; word_line[nt] = FNR }
        if (t != "") alone = 0
        s = substr(s, RLENGTH + 1)
    }
    if (define && !open && dir[nd] !~ /\\[ \t]*$/) define = 0
}

# --- units ---
function is_unit(u,   n, p) {
    if (u == "1") return 1
    if (u ~ /^1\//) u = substr(u, 2)
    if (u !~ /^[A-Za-z\/(]/) return 0
    gsub(/\^?-?[0-9]+/, " ", u)
    gsub(/[\/*()]/, " ", u)
    n = split(u, p, " ")
    if (!n) return 0
    for (; n > 0; n--) if (!(p[n] in known)) return 0
    return 1
}
function units(text,   n, u) { # how many units a text has; `odd` is the last bracket that is none
    odd = ""
    while (match(text, /\[[^][]*\]/)) {
        u = substr(text, RSTART + 1, RLENGTH - 2)
        if (substr(text, RSTART - 1, 1) !~ /[A-Za-z0-9_]/ || RSTART == 1) { if (is_unit(u)) n++; else odd = " ([" u "] is not known)" }
        text = substr(text, RSTART + RLENGTH)
    }
    return n + 0
}
function says(text, name) { # "name [unit]", also "name, other [unit]"
    odd = ""
    return match(text, "(^|[^A-Za-z0-9_])" name "`?([ \t]*,[ \t]*`?[A-Za-z0-9_]+`?)*[ \t]*\\[[^][]*\\]") && units(substr(text, RSTART, RLENGTH)) == 1
}

# --- what stands where ---
function above(a,   c) { # the comment that ends on the line above word a
    for (c = nc; c > 0; c--) if (note_at[c] == a - 1 && note_alone[c] && note_end[c] == word_line[a] - 1) return note[c]
    return ""
}
function beside(a, b,   c, s) { # comments within words a..b, and behind b on its line
    for (c = 1; c <= nc; c++)
        if (note_at[c] >= a && (note_at[c] < b || (note_at[c] == b && note_line[c] == word_line[b]))) s = s " " note[c]
    return s
}
function is_double(t) { return t ~ /^(double|float|double_t|float_t|_Float[0-9]+x?|gsl_complex)$/ }
function name_after(j, b) { # the word a declarator names, or ""
    for (j++; j <= b && word[j] ~ /^(\*|\(|long|double|complex|_Complex|const|volatile|restrict|static)$/; j++) ;
    found = j
    return word[j] ~ /^[A-Za-z_]/ ? word[j] : ""
}
function statement(a, b,   j, depth, n, doc, name, valued, called) {
    if (word[a] ~ /^(_Static_assert|static_assert)$/) return
    doc = above(a) " " beside(a, b)
    for (j = a; j <= b; j++) {
        if (word[j] == "(") depth++
        else if (word[j] == ")") depth--
        else if (is_double(word[j]) && depth > 0) {
            name = name_after(j, b)
            if (name == "") refuse(word_line[j], "name the parameter, so that its unit can be given")
            else if (!says(doc, name)) refuse(word_line[j], "the comment must say \"" name " [unit]\"" odd)
        } else if (is_double(word[j]) && depth == 0 && !n) {
            name = name_after(j, b)
            called = word[found + 1] == "(" || (word[found + 1] == ")" && word[found + 2] == "(")
            if (word[a] == "typedef" && !called) { refuse(word_line[j], "a typedef hides the unit: write double"); return }
            if (called) { n = -1; if (!says(doc, "[Rr]eturns")) refuse(word_line[j], "the comment must say \"Returns [unit]\"" odd) }
            else n = 1
        } else if (word[j] == "," && depth == 0 && n > 0 && !inside(a, j)) n++
        else if (word[j] == "=" && depth == 0) valued = 1
    }
    if (n < 1) return
    doc = beside(a, b); if (!units(doc)) doc = doc " " above(a)
    if (units(doc) != 1 && units(doc) != n) refuse(word_line[b], n == 1 ? "one number, one unit" odd : n " numbers need one unit, or " n odd)
    else if (valued && doc !~ /;[ ]*[^ ]/) refuse(word_line[b], "a value needs a source")
}
function inside(a, j,   d) { for (; a < j; a++) d += (word[a] ~ /^[{[]$/) - (word[a] ~ /^[]}]$/); return d > 0 }
function skip(j,   d) { for (; j <= nt; j++) { d += (word[j] == "{") - (word[j] == "}"); if (!d) return j } return nt }

function finish(   a, j, depth, valued, lead, text) {
    if (file == "") return
    text = file; sub(/.*\//, "", text)
    if (!index(note[1] " " note[2], text " - ")) refuse(1, "must begin with /* " text " - what it is. */")
    for (a = j = 1; j <= nt; j++) {
        if (word[j] == "(") { if (!depth++) lead = word[j - 2] }
        else if (word[j] == ")") depth--
        else if (depth) continue
        else if (word[j] == "=") valued = 1
        else if (word[j] == "{" && (valued || word[j - 1] == "enum" || word[j - 2] == "enum")) j = skip(j)
        else if (word[j] == "{" && word[j - 1] == ")" && lead !~ /^(struct|union)$/) { # the body of a function
            statement(a, j - 1); j = skip(j); a = j + 1
        }
        else if (word[j] ~ /^[{}]$/) { a = j + 1; valued = 0 }
        else if (word[j] == ";") { statement(a, j); a = j + 1; valued = 0 }
    }
    for (j = 1; j <= nd; j++) directive(dir[j], dir_line[j], note[dir_note[j]])
}
function directive(d, line, comment,   body) {
    if (!match(d, /^[ \t]*#[ \t]*define[ \t]+[A-Za-z_][A-Za-z0-9_]*/)) return
    body = substr(d, RSTART + RLENGTH)
    if (body ~ /(^|[^A-Za-z0-9_])(double|float)([^A-Za-z0-9_]|$)/) refuse(line, "a macro hides the unit: write double")
    if ((body ~ /^\(/ && body !~ /[0-9]\.|\.[0-9]/) || body ~ /__attribute__/ || (" " body) !~ /[^A-Za-z0-9_]\.?[0-9]/) return
    if (comment !~ /^[ ]*\[[^][]+\] [^;]*[^; ][^;]*;[ ]*[^ ]/ || !units(comment)) refuse(line, "a constant needs /* [unit] +- uncertainty, or exact; source */" odd)
}
