# nuclides.awk - makes the table of nuclides:
#   LC_ALL=C awk -f src/units/nuclides.awk src/units/nuclides.csv >src/units/nuclide_table.c
# Reads the file twice: first the sum of each element's abundances, then the rows.
BEGIN {
    FS = ","
    # Bare masses that CODATA 2022 gives directly, so that a proton is the same proton as beam and as target.
    direct["0,1"] = "NEUTRON"; direct["1,1"] = "PROTON"; direct["1,2"] = "DEUTERON"
    direct["1,3"] = "TRITON"; direct["2,3"] = "HELION"; direct["2,4"] = "ALPHA"
    csv = ARGV[1]
    while ((getline <csv) > 0) if (is_row()) sum[$1] += percent()
    print "/* nuclide_table.c - generated from nuclides.csv by nuclides.awk: change those. */"
    print "#include \"beamhours/units/constants.h\""
    print "#include \"beamhours/units/nuclide.h\"\n"
    print "/* clang-format off */"
    print "/* Bare nucleus: atom less its electrons, plus what bound them [eV]. */"
    print "#define BARE(u, z, bound) ((u) * BH_MASS_U - (z) * BH_MASS_ELECTRON + (bound) * 1e-6)\n"
    print "/* z, a, atomic mass, mass, abundance, radius, its uncertainty, twice the spin, name */"
    print "const bh_nuclide bh_nuclide_table[] = {"
}
function is_row() { return $0 !~ /^#/ && $1 != "Z" }
function percent() { return $1 == 3 || $1 == 5 || $7 == "" ? $8 : $7 } # Li, B and 180Ta: 1997
function bound(z) { return 14.4381 * z ^ 2.39 + 1.55468e-6 * z ^ 5.35 }
function or_zero(text) { return text == "" ? "0" : text }
is_row() {
    mass = ($1 "," $2) in direct ? "BH_MASS_" direct[$1 "," $2] : sprintf("BARE(%s, %d, %.2f)", $4, $1, bound($1))
    printf "    {%d, %d, %s, %s, %s, %s, %s, %d, \"%d%s\"},\n", $1, $2, $4, mass,
        percent() == "" ? "0" : percent() " / " sprintf("%.7g", sum[$1]), or_zero($9), or_zero($10), $11, $2, $3
    rows++
}
END { print "};\n\nconst size_t bh_nuclide_table_size = sizeof bh_nuclide_table / sizeof bh_nuclide_table[0];" }
