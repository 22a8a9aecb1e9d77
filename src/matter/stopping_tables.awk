# stopping_tables.awk - makes the published tables of energy loss:
#   cd src/matter && LC_ALL=C awk -f stopping_tables.awk proton_stopping.csv alpha_stopping.csv electron_radiation.csv proton_slow.csv >stopping_tables.c
BEGIN {
    FS = ","
    n = split("H He Li Be B C N O F Ne Na Mg Al Si P S Cl Ar K Ca Sc Ti V Cr Mn Fe Co Ni Cu Zn Ga Ge As Se Br Kr Rb Sr Y Zr Nb Mo Tc Ru Rh Pd Ag Cd In Sn Sb Te I Xe Cs Ba La Ce Pr Nd Pm Sm Eu Gd Tb Dy Ho Er Tm Yb Lu Hf Ta W Re Os Ir Pt Au Hg Tl Pb Bi Po At Rn Fr Ra Ac Th Pa U", symbol, " ")
    for (i = 1; i <= n; i++) code[symbol[i]] = i
    n = split("hydrogen:1 helium:2 lithium:3 beryllium:4 graphite:6 nitrogen:7 oxygen:8 neon:10 aluminum:13 silicon:14 argon:18 titanium:22 iron:26 nickel:28 copper:29 germanium:32 molybdenum:42 silver:47 tin:50 xenon:54 tantalum:73 tungsten:74 platinum:78 gold:79 lead:82 uranium:92 " \
              "H2:1 C_graphite:6 N2:7 O2:8 C_amorphous:BH_STOPPING_AMORPHOUS air.dry:BH_STOPPING_AIR Air:BH_STOPPING_AIR AIR:BH_STOPPING_AIR " \
              "water.liquid:BH_STOPPING_WATER Water_I75:BH_STOPPING_WATER WATER:BH_STOPPING_WATER CH2:BH_STOPPING_POLYETHYLENE POLYETHYLENE:BH_STOPPING_POLYETHYLENE " \
              "Mylar:BH_STOPPING_MYLAR MYLAR:BH_STOPPING_MYLAR Kapton:BH_STOPPING_KAPTON KAPTON:BH_STOPPING_KAPTON SiO2:BH_STOPPING_SILICA SILICON_DIOXIDE:BH_STOPPING_SILICA " \
              "CsI:BH_STOPPING_CSI CESIUM_IODIDE:BH_STOPPING_CSI", pair, " ")
    for (i = 1; i <= n; i++) { split(pair[i], kv, ":"); code[kv[1]] = kv[2] }
    print "/* stopping_tables.c - generated from four .csv files by stopping_tables.awk: change those. */"
    print "#include \"beamhours/matter/stopping_tables.h\"\n"
    print "/* clang-format off */"
}
function finish() { if (rows) print energies "};\n" values "};\n"; rows = 0 }
FNR == 1 { finish(); name = FILENAME; sub(/.*\//, "", name); sub(/\.csv$/, "", name) }
/^#/ { next }
name == "proton_slow" {
    if ($1 == "Z") printf "const double bh_proton_slow[BH_SLOW_ELEMENTS][5] = {\n"
    else printf "    {%s, %s, %s, %s, %s},\n", $2, $3, $4, $5, $6
    next
}
/^T_MeV/ {
    printf "const int bh_%s_column[] = {", name
    for (i = 2; i <= NF; i++) { if (!($i in code)) { print "no code for " $i >"/dev/stderr"; exit 1 } printf "%s%s", (i > 2 ? ", " : ""), code[$i] }
    print "};"
    energies = "const double bh_" name "_energy[] = {"
    values = "const double bh_" name "[][" NF - 1 "] = {\n"
    next
}
{
    energies = energies (rows++ ? ", " : "") $1
    line = ""
    for (i = 2; i <= NF; i++) line = line (i > 2 ? ", " : "") $i
    values = values "    {" line "},\n"
}
END { print "};\n/* clang-format on */" }
