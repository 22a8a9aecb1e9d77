# complete.awk - completions for one shell (-v shell=bash|zsh|fish) from the list of options, which the
# preprocessor has laid out as one record "@@ id, ..." for each row of the two lists.
function unquote(s) { gsub(/^[ \t\n]+|[ \t\n]+$/, "", s); gsub(/" *"/, "", s); gsub(/^"|"$/, "", s); return s }
# Splits at commas outside quotes.
function fields(s, out,   n, i, c, quoted) {
    split("", out); n = 1
    for (i = 1; i <= length(s); i++) {
        c = substr(s, i, 1)
        if (c == "\"") quoted = !quoted
        if (c == "," && !quoted) n++
        else out[n] = out[n] c
    }
    for (i = 1; i <= n; i++) out[i] = unquote(out[i])
    return n
}
function single(s) { gsub(/'/, "'\\''", s); return s }
BEGIN { RS = "@@" }
{ n = fields($0, f) }
f[1] ~ /^BH_CMD_/ { name[++nc] = f[2]; behind[nc] = f[3]; summary[nc] = f[4] }
f[1] ~ /^BH_OPT_/ { no++; letter[no] = f[2]; long[no] = f[3]; argument[no] = f[4]; knows[no] = "," f[5] ","; values[no] = f[6]; meaning[no] = f[7]; gsub(/'/, "", letter[no]) }
END { if (shell == "bash") bash(); else if (shell == "zsh") zsh(); else fish() }

function options_of(c,   o, s) {
    for (o = 1; o <= no; o++) if (index(knows[o], "," name[c] ",")) s = s " --" long[o] (letter[o] != "0" ? " -" letter[o] : "")
    return substr(s, 2)
}
function bash(   c, o, v, all) {
    for (c = 1; c <= nc; c++) all = all " " name[c]
    print "# bash completion for beamhours\n_beamhours() {"
    print "    local word=${COMP_WORDS[COMP_CWORD]} before=${COMP_WORDS[COMP_CWORD-1]} command=${COMP_WORDS[1]}"
    print "    [ \"$before\" != = ] || before=${COMP_WORDS[COMP_CWORD-2]} # --option=value comes in three words"
    print "    [ \"$word\" != = ] || { before=${COMP_WORDS[COMP_CWORD-1]} word=; }"
    printf "    if [ \"$COMP_CWORD\" -eq 1 ]; then COMPREPLY=($(compgen -W '%s --help --version' -- \"$word\")); return; fi\n", substr(all, 2)
    print "    case $command:$before in"
    for (c = 1; c <= nc; c++)
        for (o = 1; o <= no; o++)
            if (argument[o] != "" && index(knows[o], "," name[c] ",")) {
                v = values[o]; gsub(/,/, " ", v)
                printf "    %s:--%s%s) ", name[c], long[o], letter[o] != "0" ? " | " name[c] ":-" letter[o] : ""
                if (values[o] == "file") print "COMPREPLY=($(compgen -f -- \"$word\")); return ;;"
                else printf "COMPREPLY=($(compgen -W '%s' -- \"$word\")); return ;;\n", v
            }
    print "    esac\n    case $command in"
    for (c = 1; c <= nc; c++) {
        printf "    %s) ", name[c]
        if (behind[c] ~ /PLAN|FILE/) printf "if [[ $word != -* ]]; then COMPREPLY=($(compgen -f -- \"$word\")); return; fi; "
        if (name[c] == "help") printf "COMPREPLY=($(compgen -W '%s' -- \"$word\")) ;;\n", substr(all, 2)
        else printf "COMPREPLY=($(compgen -W '%s' -- \"$word\")) ;;\n", options_of(c)
    }
    print "    esac\n}\ncomplete -o filenames -F _beamhours beamhours"
}
function zsh(   c, o, v, s) {
    print "#compdef beamhours\n_beamhours() {\n    local -a commands\n    commands=("
    for (c = 1; c <= nc; c++) printf "        '%s:%s'\n", name[c], single(summary[c])
    print "    )\n    if (( CURRENT == 2 )); then _describe command commands; return; fi\n    local name=$words[2]\n    shift words; (( CURRENT-- ))\n    case $name in"
    for (c = 1; c <= nc; c++) {
        printf "    %s) _arguments", name[c]
        for (o = 1; o <= no; o++) {
            if (!index(knows[o], "," name[c] ",")) continue
            s = meaning[o]; gsub(/\[/, "\\[", s); gsub(/\]/, "\\]", s); gsub(/:/, "\\:", s); s = single(s)
            v = values[o]; gsub(/,/, " ", v)
            v = argument[o] == "" ? "" : ":" argument[o] ":" (values[o] == "file" ? "_files" : v != "" ? "(" v ")" : "")
            gsub(/'/, "", v)
            printf " \\\n        '*--%s[%s]%s'", long[o], s, v
            if (letter[o] != "0") printf " '-%s[%s]%s'", letter[o], s, v
        }
        print behind[c] ~ /PLAN|FILE/ ? " \\\n        '*:file:_files' ;;" : " ;;"
    }
    print "    esac\n}\n_beamhours \"$@\""
}
function fish(   c, o, v, who) {
    print "# fish completion for beamhours\ncomplete -c beamhours -f"
    for (c = 1; c <= nc; c++) {
        printf "complete -c beamhours -n __fish_use_subcommand -a %s -d '%s'\n", name[c], single(summary[c])
        if (behind[c] ~ /PLAN|FILE/) printf "complete -c beamhours -n '__fish_seen_subcommand_from %s' -F\n", name[c]
    }
    for (o = 1; o <= no; o++) {
        who = substr(knows[o], 2, length(knows[o]) - 2); gsub(/,/, " ", who)
        v = values[o]; gsub(/,/, " ", v)
        printf "complete -c beamhours -n '__fish_seen_subcommand_from %s' -l %s%s%s -d '%s'\n", who, long[o], letter[o] != "0" ? " -s " letter[o] : "", \
            argument[o] == "" ? "" : values[o] == "file" ? " -r -F" : v != "" ? " -x -a '" v "'" : " -x", single(meaning[o])
    }
}
