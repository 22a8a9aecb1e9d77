# densities.awk - makes the table of charge densities:
#   LC_ALL=C awk -f src/physics/structure/densities.awk src/physics/structure/densities.csv >src/physics/structure/density_table.c
BEGIN {
    FS = ","
    kind["2pF"] = "FERMI_2P"; kind["3pF"] = "FERMI_3P"; kind["3pG"] = "GAUSS_3P"; kind["HO"] = "OSCILLATOR"
    kind["FB"] = "FOURIER_BESSEL"; kind["SOG"] = "GAUSSIANS"
    source["V"] = "de Jager et al., At. Data Nucl. Data Tables 14 (1974) 479; de Vries et al., ibid. 36 (1987) 495"
    source["A"] = "Amroun et al., Nucl. Phys. A 579 (1994) 596; de Vries et al., At. Data Nucl. Data Tables 36 (1987) 495"
    source["M"] = "from memory, unconfirmed"
    print "/* density_table.c - generated from densities.csv by densities.awk: change those. */"
    print "#include \"beamhours/physics/form_factor.h\"\n"
    print "/* clang-format off */"
}
/^[0-9]/ {
    numbers = $4
    gsub(/[A-Za-z]+=/, "", numbers)
    count = gsub(/[; ]+/, ", ", numbers) + 1
    if (!($3 in kind) || !($8 in source)) { print FILENAME ":" FNR ": unknown shape or source" >"/dev/stderr"; exit 1 }
    printf "static const double set_%d[] = {%s};\n", ++n, numbers
    row[n] = sprintf("    {%d, %d, BH_SHAPE_%s, %d, set_%d, %s, %s, %s, %s,\n     \"%s\",\n     \"%s\"},", $1, $2, kind[$3], count, n, $5, $6, $7, $8 == "M" ? "false" : "true", source[$8], $9)
}
END {
    print "\n/* z, a, shape, count, values, rms, radius, its uncertainty, confirmed, source, note */"
    print "const bh_density bh_density_table[] = {"
    for (i = 1; i <= n; i++) print row[i]
    print "};\n/* clang-format on */"
    print "const size_t bh_density_table_size = sizeof bh_density_table / sizeof bh_density_table[0];"
}
