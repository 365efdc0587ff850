package catalogue

import "dregs/equilibrium"

// group is an atom group that stays together, as it is written in formulas, with
// what it brings.
type group struct {
	text   string
	charge float64
	parts  []equilibrium.Part
}

func brings(text string, charge float64, cell string) group {
	parts, err := parseBrings(cell)
	if err != nil {
		panic("catalogue: " + err.Error())
	}
	return group{text, charge, parts}
}

// groups are tried longest first. What is not here is taken atom by atom: O as
// O^2- and H as H^+, so that OH, HCO3, HPO4, SiO3, B4O7 and water of
// crystallisation need no entry. Phosphorus, sulfur (beside sulfide), carbon and
// nitrogen have no such rule: they must be in a group, since condensed phosphates,
// thionates or alcohols with the same atoms are other substances.
var groups = []group{
	brings("SO4", -2, "SO4^2-"),
	brings("SO3", -2, "SO3^2-"),
	brings("S2O3", -2, "S2O3^2-"),
	brings("S2O5", -2, "2 SO3^2- + 2 H^+ - H2O"),
	brings("S2O7", -2, "2 SO4^2- + 2 H^+ - H2O"),
	brings("SO2", 0, "SO3^2- + 2 H^+ - H2O"),
	brings("CO3", -2, "CO3^2-"),
	brings("CO2", 0, "CO3^2- + 2 H^+ - H2O"),
	brings("PO4", -3, "PO4^3-"),
	brings("NO3", -1, "NO3^-"),
	brings("NO2", -1, "NO2^-"),
	brings("NH4", 1, "NH4^+"),
	brings("NH3", 0, "NH4^+ - H^+"),
	brings("CN", -1, "CN^-"),
	brings("SCN", -1, "SCN^-"),
	brings("CNS", -1, "SCN^-"),
	brings("ClO4", -1, "ClO4^-"),
	brings("MnO4", -1, "MnO4^-"),
	brings("CrO4", -2, "CrO4^2-"),
	brings("Cr2O7", -2, "2 CrO4^2- + 2 H^+ - H2O"),
	brings("CrO3", 0, "CrO4^2- + 2 H^+ - H2O"),
	brings("MoO4", -2, "MoO4^2-"),
	brings("MoO3", 0, "MoO4^2- + 2 H^+ - H2O"),
	brings("Mo7O24", -6, "7 MoO4^2- + 8 H^+ - 4 H2O"),

	brings("C2H3O2", -1, "Acetate^-"),
	brings("CH3COO", -1, "Acetate^-"),
	brings("CH3CO2", -1, "Acetate^-"),
	brings("CHO2", -1, "Formate^-"),
	brings("HCOO", -1, "Formate^-"),
	brings("HCO2", -1, "Formate^-"),
	brings("C2O4", -2, "Oxalate^2-"),
	brings("C6H5O7", -3, "Citrate^3-"),
	brings("C4H4O6", -2, "Tartrate^2-"),
	brings("C3H5O3", -1, "Lactate^-"),
	brings("CH3CHOHCOO", -1, "Lactate^-"),
	brings("CH3CH(OH)COO", -1, "Lactate^-"),
	brings("C6H11O7", -1, "Gluconate^-"),
	brings("C7H5O2", -1, "Benzoate^-"),
	brings("C6H5COO", -1, "Benzoate^-"),
	brings("C6H5CO2", -1, "Benzoate^-"),
	brings("C8H4O4", -2, "Phthalate^2-"),
	brings("C2H4NO2", -1, "Glycinate^-"),
	brings("NH2CH2COO", -1, "Glycinate^-"),
	brings("H2NCH2COO", -1, "Glycinate^-"),
	brings("C10H12N2O8", -4, "EDTA^4-"),
	brings("C6H6NO6", -3, "NTA^3-"),
}

// whole are formulas that their groups would misread.
var whole = map[string]string{
	"SO3":   "SO4^2- + 2 H^+ - H2O", // the gas, not the sulfite
	"P2O5":  "2 PO4^3- + 6 H^+ - 3 H2O",
	"P4O10": "4 PO4^3- + 12 H^+ - 6 H2O",
}

// oxo are elements that enter water as an uncharged acid: the charge the atom
// counts for, and what it brings.
var oxo = map[string]group{
	"O":  brings("O", -2, "H2O - 2 H^+"),
	"H":  brings("H", 1, "H^+"),
	"S":  brings("S", -2, "HS^- - H^+"),
	"Si": brings("Si", 4, "H4SiO4(aq) + 4 H^+ - 4 H2O"),
	"B":  brings("B", 3, "B(OH)3(aq) + 3 H^+ - 3 H2O"),
}
