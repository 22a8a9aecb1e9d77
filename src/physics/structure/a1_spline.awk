# a1_spline.awk - makes the table of the A1 spline fit:
#   LC_ALL=C awk -f src/physics/structure/a1_spline.awk src/physics/structure/a1_spline.csv >src/physics/structure/a1_spline_table.c
BEGIN {
    FS = ","
    print "/* a1_spline_table.c - generated from a1_spline.csv by a1_spline.awk: change those. */"
    print "#include \"beamhours/physics/form_factor.h\"\n"
    print "/* clang-format off */"
    print "/* GE, GM over its moment, their errors; Q = 0, 1, 2 ... MeV/c */"
    print "const double bh_a1_spline[BH_A1_ROWS][4] = {"
}
/^[0-9]/ { printf "    {%s, %s, %s, %s},\n", $2, $4, $3, $5 }
END { print "};\n/* clang-format on */" }
