package recipe

// CodeText explains a code of the RCP family.
type CodeText struct{ Code, Title, Text string }

// Codes of the RCP family: the recipe as text.
var Codes = []CodeText{
	{"RCP-01", "the file cannot be read", "The file is missing, no ordinary file, not UTF-8, or its syntax is broken. Only the first syntax error of a file is told, since the rest follow from it. Put it right and run again."},
	{"RCP-02", "an unknown name", "A material, water, tank, phase, parameter, attribute or block that nothing defines. The nearest right spelling is told. Define it, in the recipe or in a stock file that the recipe uses."},
	{"RCP-03", "a unit or an amount is wrong", "A bare number where a unit is needed, an unknown unit, a unit of another kind, or a value that cannot be (a negative mass, 120 wt%). Values are written with their unit in quotes: \"12.5 kg\"."},
	{"RCP-04", "an attribute is missing or does not belong here", "Each step says what it needs, once. The message names the attribute and what is expected."},
	{"RCP-05", "the steps do not fit together", "A step without a tank, a transfer into the tank it comes from, a name defined twice. The walk could not be done as written."},
	{"RCP-06", "defined and not used", "A parameter, material, water or tank of the recipe that no step uses. Often a misspelt name elsewhere. Things in stock files may stay unused."},
	{"RCP-07", "a waiver that does not hold", "A waiver without a reason, one whose date has passed, or one that waived nothing. Waivers are renewed or removed; they are no settings."},
	{"RCP-08", "too large or too deep", "Files are limited to 1 MiB, 4,000 blocks, brackets to 64 deep and numbers to 40 characters: no recipe needs more, and a hostile file could stop the machine."},
	{"RCP-09", "a file that may not be used", "A file outside the repository of the recipe, or files that use each other in a circle."},
	{"RCP-10", "a step could not be computed", "No equilibrium was found for the contents of a tank after a step, so what follows in that tank is not computed and nothing is said of it. Look for an amount that is far off, or a charge without water."},
}
