/* sentences.h - every sentence an error or a warning of a plan or a material may use, in one list.
 */
#ifndef BH_BASE_SENTENCES_H
#define BH_BASE_SENTENCES_H

/* Printf formats, passed as they stand to bh_diags_add so that the compiler checks the arguments.
 * Errors are named BH_SAY_..., warnings BH_WARN_...; each says what was read and what would do.
 * A test reads this file and demands that the bad plans provoke every BH_SAY_ sentence. */

/* document: YAML */
#define BH_SAY_TOO_LONG \
    "the file is longer than 1 MiB; shorten it, with sweeps in place of many lines"
#define BH_SAY_EMPTY \
    "the file holds only blank lines or comments; write lines of the form `key: value`"
#define BH_SAY_NOT_UTF8 "the byte 0x%02X is not UTF-8; save the file as UTF-8 with your editor"
#define BH_SAY_LINE_END                                                                        \
    "the character U+%04X would end a line though editors do not show it; save the file with " \
    "usual line ends"
#define BH_SAY_HIDDEN "the character U+%04X cannot be seen; delete it"
#define BH_SAY_DEPTH  "values are nested more than %d deep; take away brackets or indentation"
#define BH_SAY_SECOND_DOCUMENT                                                                     \
    "a second document begins here, after --- or ...; keep one in a file, the others in files of " \
    "their own"
#define BH_SAY_DIRECTIVE "a line may not begin with %%; delete it, or put the text in quotes"
#define BH_SAY_ANCHOR                                                                         \
    "`%s` names a value for reuse, which is not done here; leave it out, or put the text in " \
    "quotes"
#define BH_SAY_ALIAS                                                                               \
    "`%s` repeats a value from elsewhere, which is not done here; write the value itself, or put " \
    "the text in quotes"
#define BH_SAY_TAG \
    "`%s` prescribes a type, which is not done here; leave it out, or put the text in quotes"
#define BH_SAY_MERGE \
    "`<<` takes over other values, which is not done here; write those values themselves"
#define BH_SAY_KEY_TWICE "`%s` was already given in line %d; delete one of the two"
#define BH_SAY_KEY_NO_WORD \
    "brackets or a list stand where a key is needed; write one word before the colon"
#define BH_SAY_KEY_EMPTY    "nothing stands before the colon; write `key: value`"
#define BH_SAY_SECOND_COLON "`%s` has a second colon; put the text behind the first one in quotes"
#define BH_SAY_DEEPER                                                                          \
    "this line is indented more than the one above, which already has its value; indent both " \
    "alike"
#define BH_SAY_NO_COLON    "`%s` has no colon with a blank behind it; write `key: value`"
#define BH_SAY_COLON_TIGHT "the colon has no blank behind it; write `key: value`"
#define BH_SAY_COMMA_PARTS                                                                      \
    "the comma between `%s` and `%s` ends a value; write a decimal point, and nothing between " \
    "thousands"
#define BH_SAY_QUOTE_OPEN \
    "the text in quotes that begins here has no end; close it with the same quote"
#define BH_SAY_BRACKET_OPEN \
    "`%c` in line %d is not closed: before `%s` a comma or `%c` is missing; put it there"
#define BH_SAY_AFTER_VALUE                                                                         \
    "`%s` follows a value that has ended; put the whole text in one pair of quotes, or take this " \
    "away"
#define BH_SAY_NO_VALUE_HERE \
    "`%s` stands where a value is needed; write the value, or put the text in quotes"
#define BH_SAY_TAB       "a tab stands where only blanks may; indent with blanks"
#define BH_SAY_CHARACTER "`%s` cannot begin a value; put the text in quotes"
#define BH_SAY_DASH                                                                            \
    "a list with dashes cannot begin behind other text; give each item a line of its own, or " \
    "write [a, b]"
#define BH_SAY_LINED_UP \
    "this line does not line up with the lines it belongs to; indent them all alike"
#define BH_SAY_MIXED \
    "`%s` mixes list items and keys on one level; give the list a key of its own and indent it"
#define BH_SAY_ESCAPE \
    "`%s` has no meaning within double quotes; write \\\\ for a backslash, or use single quotes"
#define BH_SAY_BLOCK_HEADER "`%s` cannot stand here; begin the text on the line after | or >"
#define BH_SAY_PATH_PART \
    "`%s` has an empty part; write names with dots between them, such as beam.current"
#define BH_SAY_NO_ITEM \
    "there is no `%s` in this list of %zu; name one of %s, or give a number from 1"
#define BH_SAY_NO_ITEM_NUMBER "there is no item `%s` in this list; give a number from 1 to %zu"
#define BH_SAY_NOTHING_INSIDE \
    "`%s` cannot be found inside the single value `%s`; end the path before it"
#define BH_SAY_NOTHING_GIVEN "no value is given for `%s`; write it behind the equals sign"
#define BH_SAY_MORE_THAN_VALUE \
    "`%s` goes beyond one value; give one value on one line, in quotes if it has # or : in it"
#define BH_WARN_CUT \
    "everything from `%s` on is left out as a comment; put the text in quotes if it belongs to it"

/* document: a change that is not made, and why */
#define BH_REFUSE_NOTHING_THERE "there is no `%s` to change; name what is in the file"
#define BH_REFUSE_ROOT          "the whole file cannot be changed at once; change its parts"
#define BH_REFUSE_PARTS                                                                            \
    "`%s` has parts and comments of its own on several lines; change its parts, or remove it and " \
    "add it again"
#define BH_REFUSE_LAYOUT \
    "`%s` is laid out in a way that only an editor can change safely; change it there"
#define BH_REFUSE_MORE                                                                           \
    "the change would have changed something else in the file too, so nothing was done; change " \
    "`%s` with an editor"
#define BH_REFUSE_BLOCK                                                                          \
    "a text under | or > cannot begin with blanks, nor a text under > have lines that do; take " \
    "the "                                                                                       \
    "blanks away"
#define BH_REFUSE_HIDDEN  "the character U+%04X cannot be seen in an editor; leave it out"
#define BH_REFUSE_NO_NAME "a key in `%s` needs a name of one line; type one"
#define BH_REFUSE_TAKEN   "there is a `%s` here already; type another name"
#define BH_REFUSE_NO_LIKE "there is nothing else beside `%s` to move it past"
#define BH_REFUSE_NO_KEY  "`%s` is an item of a list and has no key; change its name in it"
#define BH_REFUSE_ALONE   "`%s` is all there is in the file; the file cannot be left empty"
#define BH_REFUSE_NO_LIST "`%s` holds a single value, to which nothing can be added; add beside it"
#define BH_REFUSE_NO_COLON \
    "`%s` has no colon with a blank behind it; type a key and its value as `key: value`"
#define BH_REFUSE_PLACE "there is no place %zu among %zu; give one from 1 to %zu"

/* units: quantities.  First the text, then what is needed and two units that would do. */
#define BH_SAY_NO_NUMBER   "'%s' does not begin with a number: %s is needed, in %s"
#define BH_SAY_NO_QUANTITY "'%s' is not one number with one unit: %s is needed, in %s"
#define BH_SAY_NO_UNIT     "'%s' has no unit: %s is needed, in %s"
#define BH_SAY_BARE_SHARE  "'%s' has no unit: for a share write %s%s %%"
#define BH_SAY_AREAL_DENSITY \
    "'%s' is a mass per area, which the key areal_density takes: a length is needed, in %s"
#define BH_SAY_UNKNOWN_UNIT    "'%s' has the unknown unit '%s': %s is needed, in %s"
#define BH_SAY_MISSPELT_UNIT   "'%s' has the unknown unit '%s' ('%s'?): %s is needed, in %s"
#define BH_SAY_WRONG_DIMENSION "'%s' is %s: %s is needed, in %s"
#define BH_SAY_WRONG_UNIT      "'%s' has the unit '%s': %s is needed, in %s"
#define BH_SAY_COULOMB         "'%s' is a charge, as C is the coulomb: %s is needed, in %s"
#define BH_SAY_OUT_OF_RANGE    "'%s' is too large or too small to compute with: %s is needed, in %s"
#define BH_SAY_DECIMAL_COMMA   "'%s' has a decimal comma: write '%s'"
#define BH_SAY_COMMA           "'%s' has a comma in its number: write '%s', or '%s' if it marks thousands"
#define BH_SAY_THOUSANDS       "'%s' has a mark between its thousands: write '%s'"
#define BH_SAY_POWER_OF_TEN    "'%s' spells out its power of ten: write '%s'"
#define BH_SAY_NEGATIVE_SIGMA  "'%s' has a negative uncertainty: what follows ± must be 0 or more"
#define BH_SAY_SIGMA_UNIT \
    "'%s' has an uncertainty that is not %s: give it in %s, or in %% of the value"
#define BH_SAY_SHARE_OF_DEGC \
    "'%s' has an uncertainty in %% of a temperature in degC: give it in degC or K"

/* physics: kinematics */

/* Arguments [MeV]: read, least, most. */
#define BH_SAY_KINEMATICS_ENERGY "beam kinetic energy %g MeV: %g to %g MeV would do"
/* Arguments [deg]: read, most. */
#define BH_SAY_KINEMATICS_ANGLE  "angle %g deg: 0 to %g deg would do"
/* Arguments [deg]: read, largest. */
#define BH_SAY_KINEMATICS_UNREACHABLE                                                          \
    "angle %g deg cannot be reached by a beam particle heavier than what it strikes: at most " \
    "%.10g deg would do"
/* Arguments [MeV]: beam and target mass. */
#define BH_SAY_KINEMATICS_ONE_BRANCH                                                             \
    "a second, slower solution needs a beam particle (%g MeV) heavier than what it strikes (%g " \
    "MeV)"
/* Argument [deg]: read. */
#define BH_SAY_KINEMATICS_RECOIL  "recoil angle %g deg: 0 to 90 deg would do"
/* Arguments [GeV^2]: read, largest. */
#define BH_SAY_KINEMATICS_Q2      "Q2 of %g GeV2: 0 to %.10g GeV2 can be reached at this beam energy"
/* Arguments [1]: read, least, most. */
#define BH_SAY_KINEMATICS_EPSILON "epsilon %g: %.10g to %.10g can be reached here"
/* Arguments [MeV]: beam and target mass. */
#define BH_SAY_KINEMATICS_HEAVY                                                                 \
    "epsilon does not fix the energy where the beam particle (%g MeV) is heavier than what it " \
    "strikes (%g MeV): give an angle or Q2"
/* Arguments [GeV^2] and [deg]: read. */
#define BH_SAY_KINEMATICS_NO_ENERGY \
    "no beam energy gives a Q2 of %g GeV2 at %g deg: a Q2 above 0 and an angle above 0 would do"

/* schema: keys and values */
#define BH_SAY_UNKNOWN_KEY     "no such key in %s; did you mean %s?"
#define BH_SAY_UNKNOWN_KEY_OF  "no such key in %s; the keys there are %s"
#define BH_SAY_MISSING_KEY     "missing in %s; add for example %s: %s"
#define BH_SAY_MISSING_GROUP   "%s has none of %s; give one of them"
#define BH_SAY_TWO_OF_GROUP    "%s and %s exclude each other; keep one of them"
#define BH_SAY_NEED_VALUE      "%s where one value is needed; write for example %s"
#define BH_SAY_NEED_LIST       "%s where a list is needed; write for example %s"
#define BH_SAY_NEED_KEYS       "%s where keys with values are needed; write for example %s"
#define BH_SAY_NOTHING_WRITTEN "nothing is written here; write for example %s"
#define BH_SAY_UNKNOWN_WORD    "%s is not known here; did you mean %s?"
#define BH_SAY_UNKNOWN_WORD_OF "%s is not known here; one of %s would do"
#define BH_SAY_TOO_SMALL       "%s is too small; %s or more would do"
#define BH_SAY_NOT_ABOVE       "%s is too small; more than %s would do"
#define BH_SAY_TOO_LARGE       "%s is too large; %s or less would do"
#define BH_SAY_NO_COUNT        "%s is not a whole number; write digits alone, such as %s"
#define BH_SAY_NOT_A_NUMBER    "%s is not a number; write one without unit, such as %s"
#define BH_SAY_NO_NAME         "%s cannot be a name; letters, digits, _ - and + would do"
#define BH_SAY_NAME_TWICE      "%s is also the name in line %d; change one of the two"
#define BH_SAY_BARE_EXTENT     "%s: half or full? write ±%s for half, or {from: -%s, to: %s}"
#define BH_SAY_NEED_RANGE      "%s where two limits are needed; write for example %s"
#define BH_SAY_EXTENT_ORDER    "from %s to %s does not rise; let from be less than to"
#define BH_SAY_EMPTY_LIST      "an empty list; write at least one entry, such as %s"
#define BH_SAY_SWEEP_STEP      "steps of %s from %s meet %s and %s but not %s; change to or step"
#define BH_SAY_SWEEP_WAY       "a step of %s does not lead from %s to %s; change its sign or size"
#define BH_SAY_SWEEP_UNITS \
    "%s and %s do not mix in one sweep; write both for the whole ion or both per mass number"
#define BH_SAY_SWEEP_LONG "more than %d values; make the sweep shorter"

/* physics: structure */
#define BH_SAY_STRUCTURE_UNKNOWN "%s is no structure model; did you mean %s?"
#define BH_SAY_STRUCTURE_NUCLEUS "%s does not describe %s; one of %s does"
#define BH_SAY_STRUCTURE_SET     "there is no %s: the sets of %s for %s end at %d"

/* physics: validity, behind why nuclear forces matter */
#define BH_WARN_NUCLEAR_RULES                                                                     \
    "; this far above it these numbers are of use at small angles only: real cross sections may " \
    "differ by orders of magnitude"

/* physics: background; why something is not computed, behind "not computed: " */
/* Argument: read. */
#define BH_SAY_QUASI_NUCLEUS                                                                      \
    "quasi-elastic scattering on %s: there is no published Fermi momentum; 6Li or heavier would " \
    "do"
#define BH_SAY_QUASI_LIGHT \
    "quasi-elastic scattering on nuclei lighter than 6Li, for want of a published Fermi momentum"
#define BH_SAY_QUASI_SLOW                                                                         \
    "quasi-elastic scattering at a momentum transfer under 200 MeV/c, where nuclei respond as a " \
    "whole"
#define BH_SAY_QUASI_FAST \
    "quasi-elastic and inelastic scattering on nuclei at a momentum transfer above 1400 MeV/c"
#define BH_SAY_QUASI_DEEP                                                                       \
    "what lies beyond the quasi-elastic peak (psi' above 0.8), where nuclei absorb photons in " \
    "pairs of nucleons and mesons are made"
#define BH_SAY_INELASTIC_LOW \
    "inelastic scattering between the meson threshold and a final mass W of 1.18 GeV"
#define BH_SAY_INELASTIC_BREAKUP \
    "break-up of the deuteron and its quasi-elastic peak, to a final mass W of 1.18 GeV"
#define BH_SAY_INELASTIC_Q2 \
    "inelastic scattering at a Q2 under 0.3 GeV2 (0.5 GeV2 where W2 exceeds 3.2 GeV2)"
#define BH_SAY_INELASTIC_Q2_MOST \
    "scattering to the resonances (W2 up to 4 GeV2) at a Q2 above 20 GeV2"
#define BH_SAY_INELASTIC_X  "inelastic scattering at Bjorken x outside 0.006 to 0.86"
#define BH_SAY_ATOMIC_BOUND "electrons struck with less than ten times their binding energy"
#define BH_WARN_BESIDE      "%ss in the beam: %s" /* particle; one of these */
#define BH_WARN_REACTIONS   "inelastic scattering and other reactions by nuclear forces"
#define BH_SAY_BACKGROUND_INPUT \
    "a background whose angle, momenta or beam energy are no numbers in range"

/* matter: materials */
#define BH_SAY_NO_MATERIAL_NEAR "there is no material %s; did you mean %s?"
#define BH_SAY_NO_MATERIAL                                                                         \
    "there is no material %s; `beamhours materials` lists them, and a path ending in .yaml would " \
    "do"
#define BH_SAY_NOT_A_MATERIAL \
    "%s is no material: it does not begin with `material: 1`; choose another name or mend it"
#define BH_SAY_MATERIAL_UNREAD  "%s %s; give a file that can be read, or a name of the library"
#define BH_SAY_MATERIAL_BROKEN  "the file %s has errors; mend it or choose another material"
#define BH_SAY_COMPOSED_OF_NEAR "%s is neither an element nor a nuclide; did you mean %s?"
#define BH_SAY_COMPOSED_OF \
    "%s is neither an element nor a nuclide; write symbols such as Pb or 208Pb"
#define BH_SAY_NUCLIDE_LACKS "%s is not in the table of nuclides; name another element"
#define BH_SAY_ISOTOPE_LACKS "%s is not in the table of nuclides; one such as %s would do"
#define BH_SAY_NOT_NATURAL   "nature has no %s; name its isotopes, such as %s"
#define BH_SAY_SHARE_SUM     "the shares add up to %s %%; let them add up to 100 %%"
#define BH_SAY_VACUUM_HAS    "vacuum has no %s; leave it out, or write another state"
#define BH_SAY_ONLY_GAS      "only a gas has %s here; leave it out, or write `state: gas`"
#define BH_WARN_GAS_DENSITY \
    "an ideal gas of this temperature and pressure has %s g/cm3; look at the units again"
#define BH_WARN_EFFECT_C \
    "mean excitation energy and density of the set belong to c = %s; look at all three again"
#define BH_WARN_EFFECT_JOIN \
    "these parameters do not meet at x0, which needs a = %s; look at the signs again"

/* matter: passage of particles */
#define BH_SAY_STOPPING_VACUUM  "vacuum slows nothing; name a material"
#define BH_SAY_STOPPING_DENSITY "the density of %s is not known; give one"
#define BH_SAY_STOPPING_ELEMENT \
    "energy loss in the element with Z = %d is not computed; elements up to Z = %d would do"
#define BH_SAY_STOPPING_ELEMENTS "more than %d elements in one material; fewer would do"
#define BH_SAY_STOPPING_NEUTRAL  "%s has no charge and is not slowed; name a charged particle"
#define BH_SAY_STOPPING_ENERGY \
    "%g MeV for the energy of %s; more than 1 keV and at most 10 TeV would do"

/* plan: sense */
#define BH_SAY_VERSION      "version %s of the format is not known; this program reads plan: 1"
#define BH_SAY_CHARGE_OF    "%s cannot be the charge of %s; from 1 to %d would do"
#define BH_SAY_CHARGE_FIXED "a charge for %s, which always has %d; leave charge out"
#define BH_SAY_BEAM_SWEEP   "a sweep in the beam of the plan; write it in the beam of a setting"
#define BH_SAY_BELOW_REST \
    "%s of total energy is no more than the rest energy of %s, %s; more would do"
#define BH_SAY_ENERGY_RANGE                                                                      \
    "%s of kinetic energy cannot be computed; from 1 keV to 1 TeV, for each nucleon of an ion, " \
    "would do"
#define BH_SAY_NO_NUCLEONS  "%s, but %s has no mass number; give the energy of the whole particle"
#define BH_SAY_SHARES_ADD   "fraction %s and others %s add to %s; together 100 %% or less would do"
#define BH_SAY_OWN_OTHER    "%s is the beam's own particle; leave it out of others"
#define BH_SAY_PAST_CURRENT "%s is past the facility's limit of %s; that or less would do"
#define BH_SAY_PAST_POWER \
    "%s of beam power (%s at %s) is past the facility's limit of %s; %s or less would do"
#define BH_SAY_NOT_A_GAS       "%s for %s, which is no gas; give density instead"
#define BH_SAY_GAS_HALF        "%s without %s; give both, or density instead"
#define BH_SAY_VACUUM          "%s for vacuum; give its thickness alone, or nothing"
#define BH_SAY_NO_SAMPLE       "target %s has no sample; give the layer that is measured role: sample"
#define BH_SAY_NUCLIDE_NEAR    "%s is no element and no nuclide; did you mean %s?"
#define BH_SAY_NO_NUCLIDE      "%s is no element and no nuclide; write for example %s"
#define BH_SAY_NOT_IN_SAMPLE   "no %s in the sample of target %s; it holds %s"
#define BH_SAY_WHICH_SCATTERER "the sample of target %s holds %s; add scatterer: and one of them"
#define BH_SAY_NO_TARGET       "no target is called %s; did you mean %s?"
#define BH_SAY_NO_TARGET_OF    "no target is called %s; there is %s"
#define BH_SAY_WHICH_TARGET    "there are several targets; add target: %s"
#define BH_SAY_DUMMY_ITSELF    "target %s stands in for itself; name another one, or leave use out"
#define BH_SAY_HALF_SHAPE      "%s without %s; give both"
#define BH_SAY_NO_RING         "azimuth without ring; add ring, or leave azimuth out"
#define BH_SAY_POINT_BINS      "bins of a bare solid angle; add in_plane and out_of_plane, or a ring"
#define BH_SAY_EDGES_RISE      "%s after %s; let the edges rise"
#define BH_SAY_ONE_EDGE        "one edge makes no bin; give two or more"
#define BH_SAY_EDGE_OUTSIDE \
    "the edge %s is outside the acceptance, %s to %s; an edge within it would do"
#define BH_SAY_ARM_BINS   "%zu bins; at most %d in an arm would do"
#define BH_SAY_ALL_BINS   "%zu bins in all settings; at most %d would do"
#define BH_SAY_RING_ANGLE "arm %s is a ring around the beam; leave %s out"
#define BH_SAY_RING_BEAM  "a ring from %s holds the beam itself; let it begin at a larger angle"
#define BH_SAY_OVERLAPS_BEAM \
    "at %s the acceptance, %s inwards, overlaps the beam; more than %s would do"
#define BH_SAY_NO_ARM    "no arm is called %s; did you mean %s?"
#define BH_SAY_NO_ARM_OF "no arm is called %s; there is %s"
#define BH_SAY_WHICH_ARM "there are several arms; add arm: %s"
#define BH_SAY_ARM_TWICE "arm %s takes part twice in setting %s; once would do"
#define BH_SAY_ARM_FIXED "arm %s is fixed at %s; leave %s out"
#define BH_SAY_PAIR_TWO \
    "a coincidence has two arms, and here %s named; two names such as [A, B] would do"
#define BH_SAY_PAIR_SAME "arm %s twice; a coincidence has two different arms"
#define BH_SAY_PAIR_ABSENT \
    "arm %s takes no part in setting %s; name it under arms of the setting too"
#define BH_SAY_PAIR_DETECTS                                                                     \
    "arms %s and %s both detect the %s particle, and of an event there is one; detects: %s in " \
    "one "                                                                                      \
    "of them would do"
#define BH_SAY_PAIR_POINT                                                                     \
    "arm %s has a solid_angle and no shape; in a coincidence in_plane with out_of_plane, or " \
    "ring, "                                                                                  \
    "would do"
#define BH_SAY_PAIR_NAME \
    "the row of the coincidence would be called %s as an arm is; another name of the arm would do"
#define BH_SAY_PAIR_APART                                                                        \
    "no elastic event of %s on %s has one particle in %s and the other in %s; angle: conjugate " \
    "for "                                                                                       \
    "one of them, on the other side of the beam, would do"
#define BH_SAY_CONJUGATE_ALONE                                                                     \
    "arm %s has no partner in setting %s; conjugate wants a second arm with an angle of its own, " \
    "or a coincidence that names it"
#define BH_SAY_CONJUGATE_NONE                                                                 \
    "the partner of what arm %s detects at %s goes nowhere that an arm could stand; another " \
    "angle "                                                                                  \
    "would do"
#define BH_SAY_NO_ANGLE      "arm %s has no angle in setting %s; add angle or q2"
#define BH_SAY_TWO_SWEEPS    "%s and %s are both swept; sweep one of them in a setting"
#define BH_SAY_MANY_SETTINGS "%zu settings after sweeps; at most %d would do"
#define BH_SAY_ANGLE_BEYOND  "%s is beyond the largest angle of %s on %s, %s; less would do"
#define BH_SAY_CUT_BEYOND                                                                     \
    "a cut of %s takes in all of the %s that elastic scattering leaves at %s; a smaller one " \
    "would "                                                                                  \
    "do"
#define BH_SAY_RECOIL_BEYOND "%s, but recoils leave at less than 90 deg; less would do"
#define BH_SAY_Q2_BEYOND     "%s is beyond the largest for %s of %s on %s, %s; less would do"
#define BH_SAY_OUTSIDE_ANGLES \
    "%s is outside where arm %s can stand, %s to %s; an angle in between would do"
#define BH_SAY_OUTSIDE_MOMENTA \
    "%s is outside what arm %s can be set to, %s to %s; a momentum in between would do"
#define BH_SAY_MOMENTUM_AWAY                                                                   \
    "particles of %s arrive, but arm %s can be set to %s to %s; change the angle or the beam " \
    "energy"
#define BH_SAY_NOT_COMPUTED "%s is not computed by this version; elastic would do"
#define BH_SAY_NOT_EVERY    "a name in every_setting; names belong to the settings themselves"
#define BH_SAY_WANT_TWICE   "%s of the arm beside %s of the setting; keep one of them"
#define BH_SAY_TASKS_FILL                                                                      \
    "the tasks that return with every shift or period take %s h of each scheduled hour; give " \
    "them "                                                                                    \
    "less time or a longer period"
#define BH_WARN_NOT_BUILT "read and kept, but this version computes without it"
#define BH_WARN_DENSITY   "%s is %s from the %s that %s has in the library"

/* run: evaluation */
#define BH_WARN_MODEL_RANGE                                                                     \
    "%s of %s describes data from Q2 %s to %s GeV2; in %s the arm reaches from %s to %s GeV2, " \
    "extrapolated: another name under models.structure may reach there"
#define BH_WARN_MODEL_FLAGGED \
    "structure of %s: %s; take its rates as an estimate, or name another model"
#define BH_WARN_PROCESS_CAVEAT "%s: %s"
#define BH_WARN_PLANE_WAVES                                                                      \
    "plane waves on %s (Z alpha = %s) leave out the distortion by its charge; %s may be off by " \
    "tens of percent, and by more near a diffraction minimum: take it as an order of magnitude"
#define BH_WARN_RATE_LIMIT                                                                         \
    "%s would record %s Hz while beam is on, over its limit of %s Hz, in %s; a prescale %d times " \
    "as large, a lower current or a smaller acceptance would do"
#define BH_WARN_DEAD                                                                          \
    "%s is ready for only %s %% of its triggers in %s, the rest falls into its dead time; a " \
    "prescale, a lower current or a smaller acceptance would do"
#define BH_WARN_BIN_TOO_SLOW                                                                   \
    "bin %s of %s needs %s h to reach the goal, and %s h are available; fewer bins, a weaker " \
    "goal or goal_for: acceptance would do"
#define BH_WARN_NO_EMPTY_TARGET                                                        \
    "%s has windows and no empty_target: their background is taken as known exactly; " \
    "empty_target: {share: best} would measure it"
#define BH_WARN_NOT_CONVERGED                                                                     \
    "the average over the acceptance of %s did not settle to 1e-6 in %s; more bins or a smaller " \
    "acceptance would do"
#define BH_WARN_SHORTAGE                                                                          \
    "the plan asks for %s h %sand %s h are available; fewer settings, weaker goals or more time " \
    "would do"
#define BH_WARN_BEAM_STOPS                                                                     \
    "the beam stops in %s, in %s, and does not come through the sample: no rate is computed; " \
    "less "                                                                                    \
    "matter or more beam energy would do"
#define BH_WARN_STOPS_BEHIND                                                                       \
    "the beam stops in %s behind the sample, in %s: what it strikes from there on is not counted " \
    "as "                                                                                          \
    "background; a thinner layer would do"
#define BH_WARN_STAYS_INSIDE                                                                      \
    "what is scattered along the axis of %s stops before it reaches the detector, in %s: a wall " \
    "for "                                                                                        \
    "the target, another tilt or angle, or less matter would do"
#define BH_WARN_NOT_SLOWED "%s: nothing loses energy there in these numbers"
#define BH_WARN_LIQUID                                                                      \
    "%s under %s uA of beam without density_loss: heat thins a liquid, often by percents; " \
    "density_loss: 0.02 %%/uA, as measured with this cell, would do"
#define BH_WARN_NO_SIGNAL                                                                 \
    "nothing scattered by %s is counted by %s in %s; another angle, central_momentum or " \
    "momentum_bite would do"

#define BH_WARN_NOT_COMPUTED "the background on %s in %s is a lower limit: not computed: %s"
#define BH_WARN_NOT_COMPUTED_BEGINS                                                              \
    "the background on %s in %s is a lower limit: not computed: %s; it begins %s MeV below the " \
    "line: an energy_cut below %s MeV would avoid it"
#define BH_WARN_OTHERS "the background by the beam's %s in %s: %s"
#define BH_WARN_NO_CUT                                                                           \
    "%s has neither energy_cut nor momentum_bite, so nothing says what radiation may take: its " \
    "factor is 1 in %s; an energy_cut, or models.radiative: none, would do"
#define BH_WARN_CUT_WIDE                                                                        \
    "what %s lets electrons and muons lose is up to %s %% of the scattered energy in %s; soft " \
    "photons describe up to 3 %%: a smaller energy_cut would do"
#define BH_WARN_RECOIL_CUT                                                                        \
    "%s sees recoils: the radiative factor in %s is that of the unseen lepton losing as much as " \
    "the cut, and up to half of the correction may be too much"

/* physics: radiation */
#define BH_WARN_RADIATIVE_ALL                                                                    \
    "a cut of %.4g MeV takes in all of the scattered %.4g MeV; photons that hard are not soft, " \
    "and "                                                                                       \
    "the elastic tail would do better"
#define BH_WARN_RADIATIVE_WIDE                                                                     \
    "a cut of %.4g MeV is %.2g %% of the scattered energy; soft-photon forms hold to 1 %% of the " \
    "correction up to 3 %%, and the elastic tail counts the harder photons"
#define BH_WARN_RADIATIVE_LIGHT \
    "at Q2 = %.3g GeV2 an electron is not light enough for mo-tsai; maximon-tjon would do"
#define BH_WARN_RADIATIVE_RECOIL                                                                  \
    "the radiative factor is that of the scattered particle losing up to %s; with the recoil "    \
    "seen "                                                                                       \
    "instead take it as an estimate: photons along the unseen particle cost no counts, so up to " \
    "half of the correction may be too much"

#endif
